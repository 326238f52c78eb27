//! Spoils plans and tables of readings byte by byte for a number of minutes, and says what came of it.
//!
//! `fuzz MINUTES [SEED [FOLDER]]`. A text is kept for further spoiling when what the program says of it is new: the
//! paths of its faults without their numbers. A text that brings a panic, breaks a promise or takes too long is written to
//! FOLDER, and the exit status is 1. The same seed draws the same changes; how far it gets depends on the machine.
#![allow(clippy::print_stdout)]

use std::collections::{BTreeMap, HashSet};
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::PathBuf;
use std::process::ExitCode;
use std::time::{Duration, Instant};

use crestline_plan::{EXAMPLES, Fault, check, read, read_draft, readings_from_csv, solve, write};

/// Beyond this a text is a finding: an ordinary plan takes milliseconds without optimisation.
const TOO_LONG: Duration = Duration::from_secs(5);
/// One plan in so many is solved too, which takes a thousand times as long as reading it.
const SOLVED_ONE_IN: u64 = 64;
/// Longer texts are not kept: they only slow the search down.
const LONGEST_KEPT: usize = 64 * 1024;

/// Pieces of plans and tables that byte changes would seldom come upon.
const PIECES: [&str; 44] = [
    "\"",
    "{",
    "}",
    "[",
    "]",
    ",",
    ":",
    "null",
    "true",
    "false",
    "1e999",
    "-1e999",
    "1e-999",
    "-0",
    "0",
    "1",
    "12",
    "37",
    "1e300",
    "99999999999999999999",
    "\\ud800",
    "\\u0000",
    "\u{feff}",
    "\u{202e}",
    "½",
    "\"strings\":",
    "\"readings\":",
    "\"instrument\":",
    "\"targets\":",
    "\"across_mm\":",
    "\"fret_positions_mm\":",
    "\"scale_mm\":{\"bass\":700,\"treble\":650,\"square_fret\":7}",
    "\"zero_fret\":true",
    "\"style\":\"two_piece\"",
    "\"rule\":\"minimax\"",
    "\"style\":\"common\"",
    "string,fret,kind,cents",
    "open",
    "octave harmonic",
    ";",
    "\t",
    "\r\n",
    "\n",
    "[[[[[[[[",
];

/// A small generator of random numbers (G. Marsaglia, Journal of Statistical Software 8 (14), 2003: xorshift).
struct Random(u64);

impl Random {
    fn next(&mut self) -> u64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        self.0
    }

    /// Below `end`, which is at least 1.
    fn below(&mut self, end: usize) -> usize {
        (self.next() % end.max(1) as u64) as usize
    }

    /// 1 and upward, small numbers the most often: below 2 to the power of `most`.
    fn few(&mut self, most: usize) -> usize {
        let power = self.below(most);
        1 + self.below(1 << power)
    }

    fn pick<'a, T>(&mut self, of: &'a [T]) -> &'a T {
        &of[self.below(of.len())]
    }
}

/// One change of `bytes`; `other` is a text to take pieces from.
fn spoil(random: &mut Random, bytes: &mut Vec<u8>, other: &[u8]) {
    let at = random.below(bytes.len() + 1);
    let length = random.few(8);
    let end = (at + length).min(bytes.len());
    match random.below(8) {
        0 if at < bytes.len() => bytes[at] ^= 1 << random.below(8),
        1 => drop(bytes.drain(at..end)),
        2 => {
            let again = bytes[at..end].to_vec();
            bytes.splice(at..at, again);
        }
        3 => {
            let from = random.below(other.len() + 1);
            let piece = &other[from..(from + length).min(other.len())];
            bytes.splice(at..end, piece.iter().copied());
        }
        4 => drop(bytes.splice(at..end, random.pick(&PIECES).bytes())),
        5 => drop(bytes.splice(at..at, random.pick(&PIECES).bytes())),
        // Changes a number where there is one behind this place.
        6 | 7 => {
            if let Some(digit) = (at..bytes.len()).find(|at| bytes[*at].is_ascii_digit()) {
                bytes[digit] = b'0' + random.below(10) as u8;
                if random.below(3) == 0 {
                    bytes.splice(digit..digit, random.pick(&["-", "1e", "0.", "9"]).bytes());
                }
            }
        }
        _ => {}
    }
}

/// What the program says of a text, without numbers: new words mean that new parts of it were reached.
fn shape(faults: &[Fault]) -> String {
    let of = |fault: &Fault| {
        let path = fault.path.chars().filter(|sign| !sign.is_ascii_digit()).collect::<String>();
        format!("{path} {}", fault.allowed.split(' ').next().unwrap_or_default())
    };
    let mut shapes: Vec<_> = faults.iter().take(40).map(of).collect();
    shapes.sort();
    shapes.dedup();
    shapes.join("|")
}

/// Reads a text as a plan and holds the promises of the format's functions.
fn as_plan(text: &str, solves: bool) -> String {
    if let Ok(draft) = read_draft(text) {
        assert_eq!(read(text).err(), check(&draft).err(), "a draft has the faults of its text");
    }
    let plan = match read(text) {
        Ok(plan) => plan,
        Err(faults) => {
            assert!(!faults.is_empty(), "a refusal has its reason");
            return shape(&faults);
        }
    };
    let written = write(&plan);
    assert_eq!(read(&written).as_ref(), Ok(&plan), "a plan written is read again");
    let checked = check(&plan);
    if let (Ok(checked), true) = (checked, solves) {
        return match solve(&checked) {
            Ok(solution) => {
                let total = solution.report.total_tension_n;
                assert!(total.is_finite(), "a finite total tension");
                let notices = solution
                    .report
                    .notices
                    .iter()
                    .map(|notice| notice.text.split(' ').next().unwrap_or_default());
                format!("solved {}", notices.collect::<Vec<_>>().join(" "))
            }
            Err(faults) => format!("not solved {}", shape(&faults)),
        };
    }
    format!("legal {} {:?} {:?}", plan.strings.len(), plan.saddle.style, plan.fit.rule)
}

/// Reads a text as a table of readings.
fn as_table(text: &str) -> String {
    match readings_from_csv(text) {
        Ok(readings) => {
            assert!(!readings.is_empty() && readings.iter().all(|reading| reading.cents.is_finite()));
            format!("{} readings", readings.len().min(8))
        }
        Err(faults) => {
            assert!(!faults.is_empty(), "a refusal has its reason");
            shape(&faults)
        }
    }
}

/// A kind of text with those kept so far and what was said of them.
struct Target {
    name: &'static str,
    run: fn(&str, bool) -> String,
    kept: Vec<Vec<u8>>,
    said: HashSet<String>,
    runs: u64,
    slowest: Duration,
}

fn targets() -> [Target; 2] {
    let target =
        |name, run, kept| Target { name, run, kept, said: HashSet::new(), runs: 0, slowest: Duration::ZERO };
    let plans = EXAMPLES.iter().map(|example| example.text.as_bytes().to_vec()).collect();
    let tables = [
        "string,fret,kind,cents\n1,0,open,0.0\n1,12,fretted,6.5\n1,12,octave harmonic,0.5\n",
        "1;5;fretted;−3.5\r\n2;7;;1\r\n2;0;;0\r\n",
        "\u{feff}cents\tkind\tfret\tstring\n1.5\tfretted\t3\t6\n\n",
        "\"1\",\"12\",\"fretted\",\"6.5\"\n",
    ];
    let tables = tables.map(|table| table.as_bytes().to_vec()).into();
    [target("plans", as_plan, plans), target("tables of readings", |text, _| as_table(text), tables)]
}

/// Spoils one text of a target and looks at it; what it broke, if anything.
fn once(random: &mut Random, target: &mut Target) -> Option<(String, Vec<u8>)> {
    let mut bytes = random.pick(&target.kept).clone();
    let other = random.pick(&target.kept).clone();
    for _ in 0..random.few(5) {
        spoil(random, &mut bytes, &other);
    }
    let solves = random.next().is_multiple_of(SOLVED_ONE_IN);
    let text = String::from_utf8_lossy(&bytes).into_owned();
    let began = Instant::now();
    let said = catch_unwind(AssertUnwindSafe(|| (target.run)(&text, solves)));
    let took = began.elapsed();
    target.runs += 1;
    target.slowest = target.slowest.max(took);
    match said {
        Err(_) => Some(("panicked".to_owned(), bytes)),
        Ok(_) if took > TOO_LONG => Some((format!("took {} s", took.as_secs()), bytes)),
        Ok(said) => {
            if bytes.len() <= LONGEST_KEPT && target.said.insert(said) {
                target.kept.push(bytes);
            }
            None
        }
    }
}

fn main() -> ExitCode {
    let arguments: Vec<_> = std::env::args().skip(1).collect();
    let number = |index: usize| arguments.get(index).and_then(|word| word.parse::<f64>().ok());
    let Some(minutes) = number(0).filter(|minutes| *minutes > 0.0 && *minutes < 1e5) else {
        println!("usage: fuzz MINUTES [SEED [FOLDER]]");
        return ExitCode::from(2);
    };
    let seed = number(1).map_or(1, |seed| seed as u64).max(1);
    let folder = PathBuf::from(arguments.get(2).map_or("fuzz-findings", String::as_str));
    // Panics are counted and kept; their words would drown the summary.
    std::panic::set_hook(Box::new(|_| {}));
    let mut random = Random(seed.wrapping_mul(0x9e37_79b9_7f4a_7c15) | 1);
    let mut targets = targets();
    let mut findings: BTreeMap<String, u64> = BTreeMap::new();
    let ends = Instant::now() + Duration::from_secs_f64(60.0 * minutes);
    while Instant::now() < ends {
        // Plans have far more to find in them than tables have.
        let target = &mut targets[usize::from(random.below(5) == 0)];
        let Some((what, bytes)) = once(&mut random, target) else { continue };
        let count = findings.entry(format!("{}: {what}", target.name)).or_default();
        *count += 1;
        let file = folder.join(format!("{}-{what}-{count}", target.name).replace(' ', "-"));
        if std::fs::create_dir_all(&folder).and_then(|()| std::fs::write(&file, bytes)).is_err() {
            println!("{} could not be written", file.display());
        }
    }
    for target in &targets {
        let (runs, kept, slowest) = (target.runs, target.kept.len(), target.slowest.as_millis());
        println!(
            "{}: {runs} texts, {} answers, {kept} kept, slowest {slowest} ms",
            target.name,
            target.said.len()
        );
    }
    for (finding, count) in &findings {
        println!("FOUND {count} times: {finding}");
    }
    if findings.is_empty() { ExitCode::SUCCESS } else { ExitCode::FAILURE }
}
