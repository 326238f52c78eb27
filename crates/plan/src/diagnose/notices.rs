//! What else should be known about a diagnosis.

use crestline_physics::diagnose::{Diagnosed, DiagnosedString, Priors};

use super::cases::Cases;
use super::report::own_readings;
use crate::{Checked, Notice, ReadingKind, Severity};

/// Fretted readings below which a string's answer is mostly what was expected of it.
const FEW_READINGS: usize = 3;
/// Residual at which a reading is asked about, in units of the noise.
const READ_AGAIN: f64 = 5.0;
/// Correlation at which two unknowns are said to trade against each other.
const TRADES: f64 = 0.6;

/// The plan's own notices on readings, then what the diagnosis adds.
pub(super) fn notices(checked: &Checked, priors: &Priors, cases: &Cases, found: &Diagnosed) -> Vec<Notice> {
    let mut notices: Vec<Notice> =
        checked.notices().iter().filter(|notice| notice.path.starts_with("readings")).cloned().collect();
    few_readings(checked, cases, &mut notices);
    wrong_readings(priors, cases, found, &mut notices);
    notices.extend(trades(found));
    if found.press_depth_mm.value > checked.plan().instrument.fret_height_mm {
        notices.push(note(
            "pressing.depth_mm",
            "the press depth found exceeds the fret height; other causes hide in it",
        ));
    }
    if !found.settled {
        let text = "the search did not quite come to rest; the figures are the best that it reached";
        notices.push(Notice {
            severity: Severity::Warning,
            path: "readings".to_owned(),
            text: text.to_owned(),
        });
    }
    notices
}

fn note(path: impl Into<String>, text: impl Into<String>) -> Notice {
    Notice { severity: Severity::Note, path: path.into(), text: text.into() }
}

fn few_readings(checked: &Checked, cases: &Cases, notices: &mut Vec<Notice>) {
    let strings = cases.strings.len();
    let count = |string: usize, kind: ReadingKind| {
        own_readings(checked, cases, string).filter(|reading| reading.kind == kind).count()
    };
    let read: Vec<usize> = (0..strings).filter(|&string| count(string, ReadingKind::Fretted) > 0).collect();
    for string in 0..strings {
        let (fretted, number) = (count(string, ReadingKind::Fretted), string + 1);
        let path = format!("strings[{string}]");
        if fretted == 0 {
            notices.push(note(path, format!("string {number} has no fretted reading and is left out")));
            continue;
        }
        if fretted < FEW_READINGS {
            let text = format!(
                "string {number} has {fretted} fretted reading{}: causes cannot be told apart from so few",
                if fretted == 1 { "" } else { "s" }
            );
            notices.push(note(path.clone(), text));
        }
        if count(string, ReadingKind::Open) == 0 {
            notices.push(note(path, format!("string {number} was not read open; it is taken to be in tune")));
        }
    }
    if read.len() == 1 && strings > 1 {
        let text = "readings of one string alone cannot tell a fret out of place, a firm hand or a bad string from \
                    its setup";
        notices.push(note("readings", text));
    }
}

fn wrong_readings(priors: &Priors, cases: &Cases, found: &Diagnosed, notices: &mut Vec<Notice>) {
    for (own, string) in cases.readings.iter().zip(&found.strings) {
        if string.is_suspect {
            continue;
        }
        for (&index, &left) in own.iter().zip(&string.residuals_cents) {
            if left.abs() > READ_AGAIN * priors.reading_cents {
                let text = format!(
                    "{left:+.1} cents away from what the other readings say; it hardly counts: read it again"
                );
                let path = format!("readings[{index}].cents");
                notices.push(Notice { severity: Severity::Warning, path, text });
            }
        }
    }
}

/// Unknowns that the readings cannot tell apart, all strings in one notice a pair.
fn trades(found: &Diagnosed) -> Vec<Notice> {
    type Pair = (fn(&DiagnosedString) -> f64, &'static str);
    const PAIRS: [Pair; 3] = [
        (|string| string.trades.crest_bending, "crest position against bending stiffness and end fixity"),
        (|string| string.trades.nut_tuning, "nut edge against the tuning of the open string"),
        (|string| string.trades.nut_pressing, "nut edge against press depth"),
    ];
    PAIRS
        .iter()
        .filter_map(|(correlation, words)| {
            let read = |string: &DiagnosedString| !string.frets.is_empty();
            let trading: Vec<String> = (0..found.strings.len())
                .filter(|&string| read(&found.strings[string]))
                .filter(|&string| correlation(&found.strings[string]).abs() > TRADES)
                .map(|string| (string + 1).to_string())
                .collect();
            let text = format!(
                "readings cannot tell {words} (string {}); the moves count on what they agree on, and their standard \
                 deviations say how sure that is",
                trading.join(", ")
            );
            (!trading.is_empty()).then(|| note("", text))
        })
        .collect()
}
