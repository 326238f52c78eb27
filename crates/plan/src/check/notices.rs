//! What is allowed but unusual, and may be a slip.

use crestline_physics::neck::fret_fraction;

use crate::limits::{self, Range, number_words, quantity_words};
use crate::{Notice, NutStyle, Plan, PlanString, Reading, Scale, Severity};

pub(super) fn notices(plan: &Plan) -> Vec<Notice> {
    let mut notices = vec![];
    neck_notices(plan, &mut notices);
    for (index, string) in plan.strings.iter().enumerate() {
        string_notices(index, string, &mut notices);
    }
    if plan.instrument.zero_fret && plan.nut.style != NutStyle::Plain {
        notices.push(note(
            "nut.style",
            "with a zero fret the string's length begins at its crown: a nut setback means moving the zero fret",
        ));
    }
    for (index, reading) in plan.readings.iter().enumerate() {
        reading_notices(index, reading, &plan.readings[..index], &mut notices);
    }
    notices
}

fn note(path: impl Into<String>, text: impl Into<String>) -> Notice {
    Notice { severity: Severity::Note, path: path.into(), text: text.into() }
}

fn unusual(path: impl Into<String>, value: f64, usual: &Range) -> Option<Notice> {
    let text = || format!("{} is unusual; usual is {}", quantity_words(value, usual.unit), usual.words());
    (!usual.contains(value)).then(|| note(path, text()))
}

fn neck_notices(plan: &Plan, notices: &mut Vec<Notice>) {
    let instrument = &plan.instrument;
    notices.extend(unusual("instrument.relief_mm", instrument.relief_mm, &limits::USUAL_RELIEF_MM));
    match (instrument.scale, &instrument.fret_positions_mm) {
        (Scale::Fanned(fan), _) if fan.bass < fan.treble => {
            notices.push(note("instrument.scale_mm", "the bass side has the shorter scale"));
        }
        (Scale::Single(scale_mm), Some(positions_mm)) => {
            for (index, position_mm) in positions_mm.iter().enumerate() {
                let off_mm = position_mm - scale_mm * fret_fraction((index + 1) as f64);
                if off_mm.abs() > limits::USUAL_FRET_SHIFT_MM {
                    let text =
                        format!("fret {} lies {off_mm:+.2} mm from its equal-tempered place", index + 1);
                    let path = format!("instrument.fret_positions_mm[{index}]");
                    notices.push(Notice { severity: Severity::Warning, path, text });
                }
            }
        }
        _ => {}
    }
}

fn string_notices(index: usize, string: &PlanString, notices: &mut Vec<Notice>) {
    let path = format!("strings[{index}].action_mm");
    let action = &string.action_mm;
    notices.extend(unusual(format!("{path}.twelfth"), action.twelfth, &limits::USUAL_ACTION_TWELFTH_MM));
    let Some(first_mm) = action.first else { return };
    notices.extend(unusual(format!("{path}.first"), first_mm, &limits::USUAL_ACTION_FIRST_MM));
    if first_mm > action.twelfth {
        let text = format!(
            "the action falls from {} mm over fret 1 to {} mm over fret 12",
            number_words(first_mm),
            number_words(action.twelfth)
        );
        notices.push(Notice { severity: Severity::Warning, path, text });
    }
}

fn reading_notices(index: usize, reading: &Reading, before: &[Reading], notices: &mut Vec<Notice>) {
    let path = format!("readings[{index}].cents");
    if !limits::USUAL_READING_CENTS.contains(reading.cents) {
        let text = format!(
            "{} cents is more than a neighbouring note away: is it right?",
            number_words(reading.cents)
        );
        notices.push(Notice { severity: Severity::Warning, path: path.clone(), text });
    }
    let same = |other: &&Reading| {
        other.string == reading.string && other.fret == reading.fret && other.kind == reading.kind
    };
    if let Some(other) = before.iter().find(same)
        && (other.cents - reading.cents).abs() > limits::READING_SPREAD_CENTS
    {
        let text = format!(
            "string {}, fret {} was read before with {} cents, now with {}",
            reading.string,
            reading.fret,
            number_words(other.cents),
            number_words(reading.cents)
        );
        notices.push(Notice { severity: Severity::Warning, path, text });
    }
}
