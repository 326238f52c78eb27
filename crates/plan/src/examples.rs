//! The example plans that the program carries.

/// An example plan.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Example {
    /// The name used on the command line.
    pub name: &'static str,
    /// One line on what it is.
    pub summary: &'static str,
    /// The plan file's text.
    pub text: &'static str,
}

macro_rules! examples {
    ($($name:literal: $summary:literal),+ $(,)?) => {
        &[$(Example {
            name: $name,
            summary: $summary,
            text: include_str!(concat!("../../../assets/examples/", $name, ".json")),
        }),+]
    };
}

/// The example plans, the one the window opens on first.
pub const EXAMPLES: &[Example] = examples! {
    "steel_six": "steel-string acoustic, 25.5 in scale, light set with a wound third",
    "classical_nylon": "classical guitar, 650 mm scale, with measured string properties",
    "bass_four": "electric bass, 864 mm scale, one bridge piece a string",
    "mandolin": "mandolin, 13 7/8 in scale, four paired courses",
    "tenor_ukulele": "tenor ukulele, 432 mm scale, high G",
    "fanned_eight": "eight-string with a fanned neck, 648 to 711 mm, and a zero fret",
    "steel_six_sharp": "steel-string acoustic in for repair, with tuner readings",
    "steel_six_tunings": "steel-string acoustic, one saddle for three tunings, with tolerances",
};

/// The example of this name.
#[must_use]
pub fn example(name: &str) -> Option<&'static Example> {
    EXAMPLES.iter().find(|example| example.name == name)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::panic)]
    use super::*;
    use crate::{check, read, write};

    #[test]
    fn every_example_is_a_legal_plan_without_notices() {
        for example in EXAMPLES {
            let plan = read(example.text).unwrap_or_else(|faults| panic!("{}: {faults:?}", example.name));
            let checked = check(&plan).unwrap_or_else(|faults| panic!("{}: {faults:?}", example.name));
            assert_eq!(checked.notices(), [], "{}", example.name);
            assert_eq!(read(&write(&plan)), Ok(plan), "{}", example.name);
        }
    }

    #[test]
    fn examples_are_found_by_name() {
        assert_eq!(example("mandolin").map(|example| example.name), Some("mandolin"));
        assert_eq!(example("Mandolin"), None);
    }
}
