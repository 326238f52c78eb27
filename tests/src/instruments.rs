//! Diagnoses of synthetic instruments, whose true faults are known, against what was hidden in them.
//!
//! The instruments come from an independent script, see `tests/reference/README.md`, and were not looked at while the
//! limits of the diagnosis were set; that was done on others of the same script. Shares are printed by
//! `cargo test -p crestline-tests instruments:: -- --show-output`.

mod detection;

use std::sync::OnceLock;

use crestline_plan::{Diagnosis, Priors, RemedyKind, StringDiagnosis, check, diagnose, read};
use serde_json::Value;

use crate::places::{files_under, text_of, top};
use detection::Detection;

/// The fewest instruments that must be there: as many as the limits were set on, and 160 sound ones among them.
const FEWEST: usize = 600;
/// The fewest sound ones, so that a share says something: were one in ten taken for faulty, 150 would let that pass (with
/// seven or fewer) once in 60 times.
const FEWEST_SOUND: usize = 150;
/// Two standard deviations hold 95 % of a Gaussian; stated ones are good where they hold 90 to 99 %.
const WITHIN_TWO_SD: std::ops::RangeInclusive<f64> = 0.90..=0.99;
/// The share of dead strings that must be found: a repairer can do with one in ten that asks for a second look.
const FOUND: f64 = 0.90;
/// The share of sound instruments or strings that may be taken for faulty.
const FALSE_ALARMS: f64 = 0.05;

/// One instrument: what was hidden, and what was found.
struct Case {
    number: usize,
    truth: Value,
    found: Diagnosis,
}

impl Case {
    fn kind(&self) -> &str {
        self.truth["kind"].as_str().expect("a kind")
    }

    /// Strings with what is true of them.
    fn strings(&self) -> impl Iterator<Item = (&StringDiagnosis, &Value)> {
        let truths = self.truth["strings"].as_array().expect("strings");
        self.found.strings.iter().map(move |string| (string, &truths[string.string as usize - 1]))
    }

    /// The numbers of strings whose nut slots are to be filed.
    fn strings_to_file(&self) -> impl Iterator<Item = u64> {
        let jobs = self.found.remedies.iter().filter(|remedy| remedy.kind == RemedyKind::FileNutSlots);
        jobs.flat_map(|job| job.strings.iter().map(|&number| u64::from(number)))
    }

    /// The number of the dead string, 0 for none.
    fn dead_string(&self) -> u64 {
        self.truth["dead_string"]["string"].as_u64().unwrap_or(0)
    }
}

fn cases() -> &'static [Case] {
    static CASES: OnceLock<Vec<Case>> = OnceLock::new();
    CASES.get_or_init(|| {
        let mut cases = Vec::new();
        for path in files_under(&top().join("tests/reference/instruments"), "json") {
            let records: Vec<Value> = serde_json::from_str(&text_of(&path)).expect("a list of instruments");
            for record in records {
                let number = number_of(&record);
                let found = read(&record["plan"].to_string())
                    .and_then(|plan| check(&plan))
                    .and_then(|checked| diagnose(&checked, &Priors::default()))
                    .unwrap_or_else(|faults| panic!("instrument {number}: {faults:?}"));
                cases.push(Case { number, truth: record["truth"].clone(), found });
            }
        }
        assert!(cases.len() >= FEWEST, "only {} instruments are there", cases.len());
        cases
    })
}

/// The number that the script made an instrument from, the last word of its origin.
fn number_of(record: &Value) -> usize {
    let origin = record["origin"].as_str().expect("an origin");
    origin.rsplit(' ').next().and_then(|word| word.parse().ok()).expect("a number")
}

/// A share of what was looked at, with the places where it did not hold.
#[derive(Default)]
struct Share {
    held: usize,
    missed: Vec<String>,
}

impl Share {
    fn add(&mut self, holds: bool, place: String) {
        if holds {
            self.held += 1;
        } else {
            self.missed.push(place);
        }
    }

    fn count(&self) -> usize {
        self.held + self.missed.len()
    }

    fn value(&self) -> f64 {
        self.held as f64 / self.count() as f64
    }

    fn print(&self, what: &str) {
        let all = self.count();
        println!(
            "{what}: {} of {all}, {:.1} %; not {}",
            self.held,
            100.0 * self.value(),
            self.missed.join(", ")
        );
    }
}

#[test]
fn the_true_move_lies_within_two_stated_standard_deviations() {
    let (mut alone, mut saddle, mut nut) = (Share::default(), Share::default(), Share::default());
    for case in cases() {
        for (string, truth) in case.strings() {
            if u64::from(string.string) == case.dead_string() {
                continue;
            }
            let place = format!("{}/{}", case.number, string.string);
            let near = |found: f64, truth: &Value, sd: f64| {
                (found - truth.as_f64().expect("a move")).abs() <= 2.0 * sd
            };
            let (one, both) = (&string.saddle_only, &string.saddle_and_nut);
            let (true_one, true_both) = (&truth["saddle_only"], &truth["saddle_and_nut"]);
            alone.add(near(one.saddle_move_mm, &true_one["saddle_move_mm"], one.sd_mm), place.clone());
            saddle.add(
                near(both.saddle_move_mm, &true_both["saddle_move_mm"], both.saddle_sd_mm),
                place.clone(),
            );
            nut.add(near(both.nut_move_mm, &true_both["nut_move_mm"], both.nut_sd_mm), place);
        }
    }
    for (share, what) in [(alone, "saddle alone"), (saddle, "saddle with nut"), (nut, "nut")] {
        share.print(&format!("{what}, within two standard deviations"));
        assert!(WITHIN_TWO_SD.contains(&share.value()), "{what}: {}", share.value());
    }
}

#[test]
fn a_sound_instrument_is_left_alone() {
    let mut left_alone = Share::default();
    for case in cases().iter().filter(|case| case.kind() == "sound") {
        let kind = case.found.remedies.first().map(|remedy| remedy.kind);
        left_alone.add(kind == Some(RemedyKind::Nothing), case.number.to_string());
    }
    left_alone.print("sound instruments left alone");
    assert!(left_alone.count() >= FEWEST_SOUND, "only {} sound instruments are there", left_alone.count());
    assert!(left_alone.value() > 1.0 - FALSE_ALARMS, "{}", left_alone.value());
}

#[test]
fn the_right_fret_is_found() {
    let (mut found, mut clean) = (Detection::default(), Share::default());
    for case in cases() {
        let bad = case.truth["bad_fret"]["fret"].as_u64();
        let named: Vec<_> = case.found.frets.iter().map(|fret| u64::from(fret.fret)).collect();
        match bad {
            Some(bad) if case.kind() == "fret" => {
                let frets = case.truth["measured_frets"].as_array().expect("frets").len();
                let limit = detection::limit(frets, 2);
                found.add(&case.truth["bad_fret"], limit, named.contains(&bad), case.number.to_string());
            }
            None if case.kind() != "mixture" => clean.add(named.is_empty(), case.number.to_string()),
            _ => {}
        }
    }
    clean.print("straight frets left alone");
    found.hold("misplaced frets");
    assert!(clean.value() > 1.0 - FALSE_ALARMS, "{}", clean.value());
}

#[test]
fn the_right_dead_string_is_found() {
    let (mut found, mut sound) = (Share::default(), Share::default());
    for case in cases() {
        for (string, _) in case.strings() {
            let place = format!("{}/{}", case.number, string.string);
            if u64::from(string.string) == case.dead_string() {
                found.add(string.suspect_string, place);
            } else {
                sound.add(!string.suspect_string, place);
            }
        }
    }
    found.print("dead strings found");
    sound.print("good strings left alone");
    assert!(found.value() >= FOUND, "{}", found.value());
    assert!(sound.value() > 1.0 - FALSE_ALARMS, "{}", sound.value());
}

#[test]
fn high_nut_slots_are_found() {
    let (mut found, mut clean) = (Detection::default(), Share::default());
    for case in cases() {
        let filed: Vec<u64> = case.strings_to_file().collect();
        let high = case.truth["high_slots"].as_array().expect("a list");
        for slot in high.iter().filter(|_| case.kind() == "nut_slots") {
            let number = slot["string"].as_u64().expect("a string's number");
            // Each string's slot, and all of the nut together; up is the only way.
            let limit = detection::limit(case.found.strings.len() + 1, 1);
            found.add(slot, limit, filed.contains(&number), format!("{}/{number}", case.number));
        }
        if high.is_empty() {
            clean.add(filed.is_empty(), case.number.to_string());
        }
    }
    clean.print("instruments without high slots left alone");
    found.hold("high slots");
    assert!(clean.value() > 1.0 - FALSE_ALARMS, "{}", clean.value());
}
