//! How far the figures of a plan can be trusted: standard deviations of what is measured, taken from a catalogue or
//! done by hand. Key `tolerances` of the file; every key of it may be left out.
//!
//! A name that ends in `_fraction` is a share: the standard deviation of the value's natural logarithm, so that 0.05
//! means 5 % more or less. Everything else is in the unit of its name.

use serde::Serialize;

use crate::{Plan, PlanString, Slip, Supports};

/// Modulus below which a core counts as a polymer, GPa: polymer filament at pitch stays below 30, metals above 60.
const POLYMER_BELOW_GPA: f64 = 50.0;

/// Standard deviations of a plan's figures, and how they are to be followed through.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Tolerances {
    /// Number from which the sample is drawn: the same seed gives the same sample.
    pub seed: u32,
    /// Number of instruments in the sample, 64 to 32768.
    pub samples: u32,
    /// How far from true a note may be, cents, for the chance that all stay within.
    pub limit_cents: f64,
    /// Pitch of A4 to which the instrument is tuned, cents.
    pub reference_cents: f64,
    /// Neck and frets.
    pub neck: NeckTolerance,
    /// The finger.
    pub pressing: PressingTolerance,
    /// The three fixities.
    pub supports: Supports,
    /// The two slips.
    pub slip: Slip,
    /// The maker's own hand.
    pub making: MakingTolerance,
    /// Plain metal strings.
    pub plain: StringTolerance,
    /// Strings with a wrap on a metal core.
    pub wound: StringTolerance,
    /// Strings with a polymer core, wound or not.
    pub polymer: StringTolerance,
    /// Strings that are known better or worse than others of their kind.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub strings: Vec<OwnTolerance>,
}

/// Standard deviations of neck and frets.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct NeckTolerance {
    /// Relief, mm.
    pub relief_mm: f64,
    /// The scale that the frets are laid out to, mm; the nominal lines stay where the plan has them.
    pub scale_mm: f64,
    /// Place of each crown by itself, mm.
    pub fret_mm: f64,
}

/// Standard deviations of the finger.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct PressingTolerance {
    /// Place of the finger, as a part of the fret's space.
    pub finger_fraction: f64,
    /// Press depth, as a share of it.
    pub depth_fraction: f64,
}

/// Standard deviations of the maker's own work, for every string by itself.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct MakingTolerance {
    /// Place of the crest, mm.
    pub crest_mm: f64,
    /// Place of the nut edge, mm.
    pub nut_edge_mm: f64,
}

/// Standard deviations of a string's figures.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct StringTolerance {
    /// Diameter of the core, mm.
    pub core_diameter_mm: f64,
    /// Young's modulus at pitch, as a share of it: computed axial and bending stiffness follow it.
    pub modulus_fraction: f64,
    /// Mass per length as computed, as a share of it, beside what the core's diameter brings: density of core and
    /// wrap, outside diameter, and how close the wrap lies.
    pub mass_fraction: f64,
    /// Mass per length where it was measured, as a share of it.
    pub measured_mass_fraction: f64,
    /// Axial and bending stiffness where they were measured, as a share of each.
    pub measured_stiffness_fraction: f64,
    /// Pitch of the open string while it is played, cents.
    pub pitch_cents: f64,
    /// Gap over fret 1, mm.
    pub action_first_mm: f64,
    /// Gap over fret 12, mm.
    pub action_twelfth_mm: f64,
}

/// Standard deviations of one string; what is absent is as for its kind.
#[derive(Debug, Clone, Copy, PartialEq, Default, Serialize)]
pub struct OwnTolerance {
    /// String number, 1 first.
    pub string: u32,
    /// As in [`StringTolerance`].
    #[serde(skip_serializing_if = "Option::is_none")]
    pub core_diameter_mm: Option<f64>,
    /// As in [`StringTolerance`].
    #[serde(skip_serializing_if = "Option::is_none")]
    pub modulus_fraction: Option<f64>,
    /// As in [`StringTolerance`].
    #[serde(skip_serializing_if = "Option::is_none")]
    pub mass_fraction: Option<f64>,
    /// As in [`StringTolerance`].
    #[serde(skip_serializing_if = "Option::is_none")]
    pub measured_mass_fraction: Option<f64>,
    /// As in [`StringTolerance`].
    #[serde(skip_serializing_if = "Option::is_none")]
    pub measured_stiffness_fraction: Option<f64>,
    /// As in [`StringTolerance`].
    #[serde(skip_serializing_if = "Option::is_none")]
    pub pitch_cents: Option<f64>,
    /// As in [`StringTolerance`].
    #[serde(skip_serializing_if = "Option::is_none")]
    pub action_first_mm: Option<f64>,
    /// As in [`StringTolerance`].
    #[serde(skip_serializing_if = "Option::is_none")]
    pub action_twelfth_mm: Option<f64>,
}

/// Kinds of string, which differ in how well they are known.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum StringKind {
    /// Plain metal.
    Plain,
    /// A wrap on a metal core.
    Wound,
    /// A polymer core, wound or not.
    Polymer,
}

impl PlanString {
    /// The kind of string: by its core's modulus, and by whether it is wound.
    #[must_use]
    pub fn kind(&self) -> StringKind {
        if self.core.youngs_modulus_gpa < POLYMER_BELOW_GPA {
            StringKind::Polymer
        } else if self.wrap.is_some() {
            StringKind::Wound
        } else {
            StringKind::Plain
        }
    }
}

impl Tolerances {
    /// Standard deviations of a kind of string.
    #[must_use]
    pub const fn of_kind(&self, kind: StringKind) -> &StringTolerance {
        match kind {
            StringKind::Plain => &self.plain,
            StringKind::Wound => &self.wound,
            StringKind::Polymer => &self.polymer,
        }
    }

    /// Standard deviations of the string with this index in the plan's list: those of its kind, and over them its
    /// own.
    #[must_use]
    pub fn of_string(&self, plan: &Plan, index: usize) -> StringTolerance {
        let kind = plan.strings.get(index).map_or(StringKind::Plain, PlanString::kind);
        let own = self.strings.iter().find(|own| own.string as usize == index + 1);
        own.copied().unwrap_or_default().over(self.of_kind(kind))
    }
}

impl OwnTolerance {
    /// These standard deviations, and `kind` where there are none.
    #[must_use]
    pub fn over(&self, kind: &StringTolerance) -> StringTolerance {
        StringTolerance {
            core_diameter_mm: self.core_diameter_mm.unwrap_or(kind.core_diameter_mm),
            modulus_fraction: self.modulus_fraction.unwrap_or(kind.modulus_fraction),
            mass_fraction: self.mass_fraction.unwrap_or(kind.mass_fraction),
            measured_mass_fraction: self.measured_mass_fraction.unwrap_or(kind.measured_mass_fraction),
            measured_stiffness_fraction: self
                .measured_stiffness_fraction
                .unwrap_or(kind.measured_stiffness_fraction),
            pitch_cents: self.pitch_cents.unwrap_or(kind.pitch_cents),
            action_first_mm: self.action_first_mm.unwrap_or(kind.action_first_mm),
            action_twelfth_mm: self.action_twelfth_mm.unwrap_or(kind.action_twelfth_mm),
        }
    }
}

/// Plain metal strings. Diameter: ASTM A228 allows ±0.0003 in (0.008 mm) of wire of this thickness, taken as two
/// standard deviations (from memory). Modulus: handbooks give music wire 190 to 207 GPa. Mass: 7800 to 7850 kg/m³.
/// The rest is common practice: a tuner's cent or two, a feeler gauge over fret 1, a rule over fret 12.
const PLAIN: StringTolerance = StringTolerance {
    core_diameter_mm: 0.004,
    modulus_fraction: 0.03,
    mass_fraction: 0.005,
    measured_mass_fraction: 0.005,
    measured_stiffness_fraction: 0.05,
    pitch_cents: 2.0,
    action_first_mm: 0.03,
    action_twelfth_mm: 0.1,
};

impl Default for Tolerances {
    /// Wound strings: the core is seldom stated and often guessed to the nearest 0.001 in, so half of that; a round
    /// or hexagonal form and the grip of the wrap widen the modulus; the geometry of a close wrap gives catalogue
    /// masses within about 4 % (from memory). Polymers: the modulus depends on stress and moisture, the diameter on
    /// how far the string has stretched. Finger and slips are estimates: players differ that much.
    /// Fixities: a string that runs on to an anchor 10 to 100 mm behind its support has 1/(2 − λ/b), 0.50 to 0.56 for
    /// a bending length of 1 to 2 mm. ISO 16 allows ±0.5 Hz at 440 Hz, 2 cents. Frets: a slot by
    /// template or saw guide and a crown filed by hand. Scale: fret 12 found by a rule to 0.05 mm, doubled. The
    /// maker's hand: a filed crest and a trimmed nut end, each by a scribed line. All common practice.
    fn default() -> Self {
        Self {
            seed: 1,
            samples: 4096,
            limit_cents: 5.0,
            reference_cents: 2.0,
            neck: NeckTolerance { relief_mm: 0.05, scale_mm: 0.1, fret_mm: 0.04 },
            pressing: PressingTolerance { finger_fraction: 0.08, depth_fraction: 0.4 },
            supports: Supports { nut: 0.05, fret: 0.05, saddle: 0.05 },
            slip: Slip { head: 0.1, tail: 0.1 },
            making: MakingTolerance { crest_mm: 0.1, nut_edge_mm: 0.08 },
            plain: PLAIN,
            wound: StringTolerance {
                core_diameter_mm: 0.013,
                modulus_fraction: 0.05,
                mass_fraction: 0.03,
                ..PLAIN
            },
            polymer: StringTolerance {
                core_diameter_mm: 0.01,
                modulus_fraction: 0.2,
                mass_fraction: 0.03,
                ..PLAIN
            },
            strings: Vec::new(),
        }
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crate::{example, read};

    #[test]
    fn every_string_has_the_kind_that_its_maker_would_name() {
        let kinds = |name: &str| {
            let plan = read(example(name).unwrap().text).unwrap();
            plan.strings.iter().map(PlanString::kind).collect::<Vec<_>>()
        };
        use StringKind::{Plain, Polymer, Wound};
        assert_eq!(kinds("steel_six"), [Plain, Plain, Wound, Wound, Wound, Wound]);
        assert!(kinds("classical_nylon").iter().all(|kind| *kind == Polymer));
    }

    #[test]
    fn what_a_string_says_of_itself_goes_before_its_kind() {
        let plan = read(example("steel_six").unwrap().text).unwrap();
        let own = OwnTolerance { string: 3, core_diameter_mm: Some(0.001), ..OwnTolerance::default() };
        let tolerances = Tolerances { strings: vec![own], ..Tolerances::default() };
        let third = tolerances.of_string(&plan, 2);
        assert_eq!(third, StringTolerance { core_diameter_mm: 0.001, ..tolerances.wound });
        assert_eq!(tolerances.of_string(&plan, 3), tolerances.wound);
    }
}
