//! Checks of the key `readings`.

use super::checker::Checker;
use crate::{Plan, Reading, ReadingKind, limits};

pub(super) fn readings(checker: &mut Checker, plan: &Plan) {
    if plan.readings.len() > limits::READINGS {
        let found = format!("{} readings", plan.readings.len());
        return checker.fault("readings", found, format_args!("at most {}", limits::READINGS));
    }
    for (index, reading) in plan.readings.iter().enumerate() {
        one(checker, plan, &format!("readings[{index}]"), reading);
    }
}

fn one(checker: &mut Checker, plan: &Plan, path: &str, reading: &Reading) {
    let strings = plan.strings.len();
    if checker.sound_itself("strings") && (reading.string == 0 || reading.string as usize > strings) {
        checker.fault(format_args!("{path}.string"), reading.string, format_args!("1 to {strings}"));
    }
    let fret = format!("{path}.fret");
    let frets = plan.instrument.frets;
    if checker.sound(&["instrument.frets"]) && reading.fret > frets {
        checker.fault(&fret, reading.fret, format_args!("0 to {frets}"));
    }
    let allowed = match (reading.kind, reading.fret) {
        (ReadingKind::Open, 1..) => Some("0 for an open string"),
        (ReadingKind::Fretted, 0) => Some("1 or more for a fretted note"),
        (ReadingKind::OctaveHarmonic, fret) if fret != 12 => Some("12 for the octave harmonic"),
        _ => None,
    };
    if let Some(allowed) = allowed
        && checker.sound(&[&fret, &format!("{path}.kind")])
    {
        checker.fault(fret, reading.fret, allowed);
    }
    checker.range(format_args!("{path}.cents"), reading.cents, &limits::READING_CENTS);
}
