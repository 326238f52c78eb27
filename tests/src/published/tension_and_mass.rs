//! Pitch, tension and mass.

use crestline_physics::mode::{Ends, SpeakingString};
use crestline_physics::section::{Core, CoreShape, Overrides, Wrap, string_properties};
use crestline_plan::note_frequency_hz;

use super::{INCH_MM, POUND_N, assert_near, cents};

const STEEL_KG_M3: f64 = 7850.0;
/// Density of phosphor bronze, kg/m³ (material tables, read).
const PHOSPHOR_BRONZE_KG_M3: f64 = 8800.0;
/// Density of nickel, kg/m³ (material tables, read).
const NICKEL_KG_M3: f64 = 8880.0;

fn steel(gauge_in: f64) -> Core {
    let diameter_mm = gauge_in * INCH_MM;
    Core { shape: CoreShape::Round, diameter_mm, youngs_modulus_gpa: 200.0, density_kg_m3: STEEL_KG_M3 }
}

fn unit_mass(core: &Core, wrap: Option<&Wrap>) -> f64 {
    string_properties(core, wrap, &Overrides::default()).expect("a legal string").unit_mass_kg_per_m
}

/// Tension of the flexible string, pounds-force.
fn pull_lbf(length_mm: f64, unit_mass_kg_per_m: f64, frequency_hz: f64) -> f64 {
    let ends = Ends { first: 0.0, second: 0.0 };
    let string = SpeakingString { length_mm, unit_mass_kg_per_m, bending_stiffness_n_mm2: 0.0, ends };
    string.tension_for(frequency_hz).expect("a legal pitch").0 / POUND_N
}

fn note_hz(name: &str) -> f64 {
    note_frequency_hz(name, 440.0).expect("a note")
}

/// ISO 16:1975, A4 = 440 Hz; the others computed from it in equal temperament.
#[test]
fn notes_have_their_frequencies() {
    assert_eq!(note_hz("A4"), 440.0);
    for (name, expected) in [("E2", 82.406_889_228_2), ("B3", 246.941_650_628), ("E4", 329.627_556_913)] {
        assert_near(note_hz(name), expected, 1e-9, name);
    }
}

/// ISO 16's tolerance of 0.5 Hz at 440 Hz is 1.966 cents; memory (sure).
#[test]
fn the_standards_tolerance_of_pitch_in_cents() {
    let raised = note_frequency_hz("A4", 440.5).expect("a note");
    assert_near(cents(raised / note_hz("A4")), 1.966, 0.0005, "half a hertz at A4");
}

/// Plain steel .016 in at B3 on 25.5 in: 23.3 lbf on makers' labels (common practice).
#[test]
fn a_plain_second_pulls_as_its_label_says() {
    const LABEL_RELATIVE: f64 = 0.01; // labels stand on measured masses, which vary by a per cent
    let found = pull_lbf(25.5 * INCH_MM, unit_mass(&steel(0.016), None), note_hz("B3"));
    assert_near(found, 23.3, LABEL_RELATIVE * 23.3, "label");
}

/// A published set on 25.5 in, lbf (memory, sure): plain strings from their diameters alone.
#[test]
fn the_plain_strings_of_a_published_set() {
    const MEASURED_MASS_RELATIVE: f64 = 0.01; // drawn wire keeps its diameter to half a per cent
    for (gauge_in, note, expected) in [(0.010, "E4", 16.20), (0.013, "B3", 15.37), (0.017, "G3", 16.55)] {
        let found = pull_lbf(25.5 * INCH_MM, unit_mass(&steel(gauge_in), None), note_hz(note));
        assert_near(found, expected, MEASURED_MASS_RELATIVE * expected, note);
    }
}

/// The wound strings of the same set. Neither its cores nor its wraps are published, so the pull must lie between that of
/// plated steel on a thin hexagonal core and that of nickel on a thick round one: a third and two thirds of the outside.
#[test]
fn the_wound_strings_of_a_published_set() {
    for (gauge_in, note, expected) in [(0.026, "D3", 18.39), (0.036, "A2", 19.52), (0.046, "E2", 17.47)] {
        let pull = |share: f64, shape, density_kg_m3| {
            let core = Core { shape, ..steel(share * gauge_in) };
            let wrap = Wrap { outside_mm: gauge_in * INCH_MM, density_kg_m3 };
            pull_lbf(25.5 * INCH_MM, unit_mass(&core, Some(&wrap)), note_hz(note))
        };
        let light = pull(1.0 / 3.0, CoreShape::Hex, STEEL_KG_M3);
        let heavy = pull(2.0 / 3.0, CoreShape::Round, NICKEL_KG_M3);
        assert!(light < expected && expected < heavy, "{note}: {expected} lies between {light} and {heavy}");
    }
}

/// Unit weights of a catalogue, phosphor bronze on steel, kg/m (memory, fair); the cores are those of a light acoustic
/// set (read in a maker's page).
#[test]
fn wound_strings_weigh_what_a_catalogue_says() {
    const GEOMETRY_RELATIVE: f64 = 0.04; // a wrap is drawn flatter and tighter than round wire laid side by side
    for (outside_in, core_in, expected) in [
        (0.024, 0.013, 2.086e-3),
        (0.032, 0.015, 3.753e-3),
        (0.042, 0.016, 6.558e-3),
        (0.053, 0.0175, 1.0156e-2),
    ] {
        let wrap = Wrap { outside_mm: outside_in * INCH_MM, density_kg_m3: PHOSPHOR_BRONZE_KG_M3 };
        let found = unit_mass(&steel(core_in), Some(&wrap));
        assert_near(found, expected, GEOMETRY_RELATIVE * expected, "unit mass in kg/m");
    }
}

/// J. Woodhouse, Acta Acustica u. Acustica 90 (2004), a nylon set on 650 mm; memory (sure): note, T N, μ g/m,
/// EI 1e-6 N·m². Frequency, tension and mass agree within 1 %.
const NYLON_SET: [(&str, f64, f64, f64); 6] = [
    ("E4", 70.3, 0.38, 130.0),
    ("B3", 53.4, 0.52, 160.0),
    ("G3", 58.3, 0.90, 310.0),
    ("D3", 71.2, 1.95, 51.0),
    ("A2", 73.9, 3.61, 40.0),
    ("E2", 71.6, 6.24, 57.0),
];

#[test]
fn a_measured_nylon_set_is_at_pitch() {
    // The masses are given to two or three digits.
    const GIVEN_RELATIVE: f64 = 0.015;
    for (note, tension_n, grams_per_m, _) in NYLON_SET {
        let found = pull_lbf(650.0, grams_per_m * 1e-3, note_hz(note)) * POUND_N;
        assert_near(found, tension_n, GIVEN_RELATIVE * tension_n, note);
    }
}

/// The bending stiffness of the plain strings above is more than twice what nylon's bulk modulus, 2.7 GPa (material
/// tables, read), gives for a round string of their mass and 1140 kg/m³.
#[test]
fn nylon_at_pitch_is_stiffer_than_its_bulk_modulus() {
    for (note, _, grams_per_m, stiffness_micro) in &NYLON_SET[..3] {
        let diameter_mm = (4.0 * grams_per_m * 1e-3 / (std::f64::consts::PI * 1140.0)).sqrt() * 1e3;
        let core =
            Core { shape: CoreShape::Round, diameter_mm, youngs_modulus_gpa: 2.7, density_kg_m3: 1140.0 };
        let bulk = string_properties(&core, None, &Overrides::default()).expect("a legal string");
        assert_near(bulk.unit_mass_kg_per_m, grams_per_m * 1e-3, 1e-12, "the mass is the one wanted");
        // 1e-6 N·m² is 1 N·mm².
        assert!(*stiffness_micro > 2.0 * bulk.bending_stiffness_n_mm2, "{note}");
    }
}
