//! Which figures of a plan rest on the table and not on the string in hand.

use super::make::{StringMake, modulus_at_pitch_gpa};
use super::table::string_table;
use crate::diagnose::remedies::words::strings_words;
use crate::limits::number_words;
use crate::{Notice, Plan, PlanString, Scale, Severity, note_frequency_hz};

/// A figure that is an estimate.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Estimate {
    /// The string, 1 first.
    pub string: u32,
    /// Path of the figure, such as `strings[2].core.diameter_mm`.
    pub path: String,
    /// What it is estimated from and what would settle it, in words.
    pub text: String,
}

/// The figures of the strings that are estimates, string 1 first: the core of a wound string that still is the table's
/// for its gauge, and the modulus of a core whose modulus rises with stress. Measured values end them.
#[must_use]
pub fn estimates(plan: &Plan) -> Vec<Estimate> {
    plan.strings.iter().enumerate().flat_map(|(index, string)| of_string(plan, index, string)).collect()
}

/// The estimates as notes, those of one kind together: `strings 3, 4 and 5: the core is …`.
#[must_use]
pub fn estimate_notes(plan: &Plan) -> Vec<Notice> {
    let mut kinds: Vec<(String, String, Vec<u32>)> = Vec::new();
    for estimate in estimates(plan) {
        match kinds.iter_mut().find(|(_, text, _)| *text == estimate.text) {
            Some((_, _, strings)) => strings.push(estimate.string),
            None => kinds.push((estimate.path, estimate.text, vec![estimate.string])),
        }
    }
    let note = |(path, text, strings): (String, String, Vec<u32>)| {
        let text = format!("{}: {text}", strings_words(&strings));
        Notice { severity: Severity::Note, path, text }
    };
    kinds.into_iter().map(note).collect()
}

fn number(index: usize) -> u32 {
    u32::try_from(index + 1).unwrap_or(u32::MAX)
}

fn of_string(plan: &Plan, index: usize, string: &PlanString) -> Vec<Estimate> {
    let mut found = Vec::new();
    let mut add = |field: &str, text: String| {
        found.push(Estimate { string: number(index), path: format!("strings[{index}].{field}"), text });
    };
    let follows = StringMake::of(string).is_some_and(|make| make.core_still_follows(string));
    let settled =
        string.measured.bending_stiffness_n_mm2.is_some() && string.measured.axial_stiffness_n.is_some();
    if follows && !settled {
        let text =
            "the core is the usual one for this gauge, an estimate; cut an end off and measure it".to_owned();
        add("core.diameter_mm", text);
    }
    let rises = string_table()
        .material_named(&string.core.material)
        .is_some_and(|material| material.youngs_modulus_gpa.rises());
    if rises && string.measured.axial_stiffness_n.is_none() {
        add("core.youngs_modulus_gpa", modulus_words(plan, index, string));
    }
    found
}

fn modulus_words(plan: &Plan, index: usize, string: &PlanString) -> String {
    let material = &string.core.material;
    let at_pitch = string
        .frequency_hz(plan.reference_hz)
        .and_then(|frequency_hz| modulus_at_pitch_gpa(string, plan.scale_of_mm(index), frequency_hz));
    let words = format!("the modulus of {material} rises with its stress and is an estimate");
    match at_pitch {
        Some(gpa) if (gpa - string.core.youngs_modulus_gpa).abs() > 0.05 => {
            format!("{words}; at this pitch and scale the table's line gives {} GPa", number_words(gpa))
        }
        _ => words,
    }
}

impl PlanString {
    /// The pitch of the open string in Hz where its note can be read.
    #[must_use]
    pub fn frequency_hz(&self, reference_hz: f64) -> Option<f64> {
        match &self.pitch {
            crate::Pitch::Note(note) => note_frequency_hz(note, reference_hz),
            crate::Pitch::FrequencyHz(frequency_hz) => Some(*frequency_hz),
        }
    }
}

impl Plan {
    /// The scale of a string (0 first) as nearly as its number tells, mm: on a fanned neck between the outer scales in
    /// equal steps.
    #[must_use]
    pub fn scale_of_mm(&self, index: usize) -> f64 {
        match self.instrument.scale {
            Scale::Single(scale_mm) => scale_mm,
            Scale::Fanned(fan) => {
                let last = self.strings.len().saturating_sub(1).max(1);
                fan.treble + (fan.bass - fan.treble) * index as f64 / last as f64
            }
        }
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crate::{example, read};

    fn plan(name: &str) -> Plan {
        read(example(name).unwrap().text).unwrap()
    }

    #[test]
    fn wound_cores_of_the_table_are_estimates_until_they_are_measured() {
        let mut plan = plan("steel_six");
        let paths: Vec<String> = estimates(&plan).into_iter().map(|estimate| estimate.path).collect();
        let expected = [2, 3, 4, 5].map(|index| format!("strings[{index}].core.diameter_mm"));
        assert_eq!(paths, expected);
        let notes = estimate_notes(&plan);
        assert_eq!(notes.len(), 1);
        assert!(notes[0].text.starts_with("strings 3, 4, 5 and 6: the core"), "{}", notes[0].text);
        plan.strings[2].core.diameter_mm += 0.01;
        assert_eq!(estimates(&plan).len(), 3);
    }

    #[test]
    fn a_polymers_modulus_is_an_estimate_and_says_what_the_table_has_at_pitch() {
        let mut plan = plan("tenor_ukulele");
        let first = &estimates(&plan)[0];
        assert_eq!(first.path, "strings[0].core.youngs_modulus_gpa");
        assert!(!first.text.contains("GPa"), "the example has the table's figure: {}", first.text);
        plan.strings[0].core.youngs_modulus_gpa = 3.0;
        assert!(estimates(&plan)[0].text.contains("14.5 GPa"));
        plan.strings[0].measured.axial_stiffness_n = Some(3000.0);
        assert!(!estimates(&plan).iter().any(|estimate| estimate.path.starts_with("strings[0]")));
    }
}
