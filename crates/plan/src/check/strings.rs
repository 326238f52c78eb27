//! Checks of the key `strings`.

use super::checker::Checker;
use crate::fault::quoted;
use crate::limits::{self, number_words, quantity_words};
use crate::{CoreShape, Pitch, Plan, PlanString, pitch};

/// Most strings whose values are looked at; beyond the limit only their number matters.
const MOST_LOOKED_AT: usize = 64;

/// Checks all strings; gives their frequencies where all have one.
pub(super) fn strings(checker: &mut Checker, plan: &Plan) -> Option<Vec<f64>> {
    if !limits::STRINGS.contains(plan.strings.len() as f64) {
        let allowed = format!("{} strings", limits::STRINGS.words());
        checker.fault("strings", format!("{} strings", plan.strings.len()), allowed);
    }
    checker.range("reference_hz", plan.reference_hz, &limits::REFERENCE_HZ);
    let mut frequencies_hz = vec![];
    for (index, string) in plan.strings.iter().enumerate().take(MOST_LOOKED_AT) {
        let path = format!("strings[{index}]");
        frequencies_hz.push(frequency(checker, &path, &string.pitch, plan.reference_hz));
        sections(checker, &path, string);
        heights(checker, &path, string, plan.instrument.zero_fret);
        let lengths = string.afterlength_mm;
        checker.range(format_args!("{path}.afterlength_mm.head"), lengths.head, &limits::AFTERLENGTH_MM);
        checker.range(format_args!("{path}.afterlength_mm.tail"), lengths.tail, &limits::AFTERLENGTH_MM);
    }
    frequencies_hz.into_iter().collect()
}

fn frequency(checker: &mut Checker, path: &str, pitch: &Pitch, reference_hz: f64) -> Option<f64> {
    let range = &limits::FREQUENCY_HZ;
    match pitch {
        Pitch::FrequencyHz(hz) => checker.range(format_args!("{path}.pitch.frequency_hz"), *hz, range),
        Pitch::Note(name) => match pitch::note_frequency_hz(name, reference_hz) {
            None => checker.fault(format_args!("{path}.pitch.note"), quoted(name), pitch::NOTE_WORDS),
            Some(hz) if checker.sound(&["reference_hz"]) && !range.contains(hz) => {
                let found = format!("{name}, which is {hz:.1} Hz");
                checker.fault(format_args!("{path}.pitch.note"), found, range.words());
            }
            Some(_) => {}
        },
    }
    pitch.frequency_hz(reference_hz)
}

fn sections(checker: &mut Checker, path: &str, string: &PlanString) {
    let core = &string.core;
    checker.range(format_args!("{path}.core.diameter_mm"), core.diameter_mm, &limits::CORE_DIAMETER_MM);
    checker.range(
        format_args!("{path}.core.youngs_modulus_gpa"),
        core.youngs_modulus_gpa,
        &limits::YOUNGS_MODULUS_GPA,
    );
    checker.range(format_args!("{path}.core.density_kg_m3"), core.density_kg_m3, &limits::DENSITY_KG_M3);
    checker.range_if_any(format_args!("{path}.core.tensile_mpa"), core.tensile_mpa, &limits::TENSILE_MPA);
    if let Some(wrap) = &string.wrap {
        checker.range(format_args!("{path}.wrap.outside_mm"), wrap.outside_mm, &limits::OUTSIDE_MM);
        checker.range(format_args!("{path}.wrap.density_kg_m3"), wrap.density_kg_m3, &limits::DENSITY_KG_M3);
        wrap_over_core(checker, path, string, wrap.outside_mm);
    }
    let measured = &string.measured;
    for (key, value, range) in [
        ("unit_mass_kg_per_m", measured.unit_mass_kg_per_m, &limits::UNIT_MASS_KG_PER_M),
        ("axial_stiffness_n", measured.axial_stiffness_n, &limits::AXIAL_STIFFNESS_N),
        ("bending_stiffness_n_mm2", measured.bending_stiffness_n_mm2, &limits::BENDING_STIFFNESS_N_MM2),
    ] {
        checker.range_if_any(format_args!("{path}.measured.{key}"), value, range);
    }
}

fn wrap_over_core(checker: &mut Checker, path: &str, string: &PlanString, outside_mm: f64) {
    let outside = format!("{path}.wrap.outside_mm");
    let core = &string.core;
    if !checker.sound(&[&outside, &format!("{path}.core.diameter_mm"), &format!("{path}.core.shape")]) {
        return;
    }
    // The wrap lies on the corners of a hexagonal core, 2a/√3 apart.
    let (around_mm, words) = match core.shape {
        CoreShape::Round => (core.diameter_mm, "the diameter of its core"),
        CoreShape::Hex => (2.0 * core.diameter_mm / 3.0_f64.sqrt(), "its hexagonal core across the corners"),
    };
    if outside_mm <= around_mm {
        let allowed = format!("a wound string thicker than {words}, {} mm", number_words(round(around_mm)));
        checker.fault(outside, quantity_words(outside_mm, "mm"), allowed);
    }
}

/// To ten-thousandths, for messages.
fn round(value: f64) -> f64 {
    (value * 1e4).round() / 1e4
}

fn heights(checker: &mut Checker, path: &str, string: &PlanString, zero_fret: bool) {
    let action = &string.action_mm;
    let first = format!("{path}.action_mm.first");
    checker.range_if_any(&first, action.first, &limits::ACTION_FIRST_MM);
    checker.range(format_args!("{path}.action_mm.twelfth"), action.twelfth, &limits::ACTION_TWELFTH_MM);
    if !checker.sound(&["instrument.zero_fret", &first]) {
        return;
    }
    match action.first {
        Some(gap_mm) if zero_fret => {
            let allowed = "nothing: the zero fret sets the height there";
            checker.fault(first, quantity_words(gap_mm, "mm"), allowed);
        }
        None if !zero_fret => {
            let allowed =
                format!("the gap over fret 1, {}, as there is no zero fret", limits::ACTION_FIRST_MM.words());
            checker.fault(first, "nothing", allowed);
        }
        _ => {}
    }
}
