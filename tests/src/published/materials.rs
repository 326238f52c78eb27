//! The table of string materials and the steel of the example plans.

use crestline_physics::mode::{Ends, SpeakingString};
use crestline_plan::{EXAMPLES, Plan, read};
use serde_json::Value;

use super::{INCH_MM, KSI_MPA, assert_near};
use crate::places::{text_of, top};

/// Music wire, ASTM A228 (second-hand): diameter in, least and greatest tensile strength ksi.
const A228: [(f64, f64, f64); 6] = [
    (0.010, 387.0, 428.0),
    (0.012, 377.0, 417.0),
    (0.016, 362.0, 400.0),
    (0.020, 350.0, 387.0),
    (0.024, 341.0, 377.0),
    (0.032, 327.0, 361.0),
];

fn table() -> Value {
    serde_json::from_str(&text_of(&top().join("assets/materials/strings.json"))).expect("the table is JSON")
}

fn material<'a>(table: &'a Value, id: &str) -> &'a Value {
    let materials = table["materials"].as_array().expect("materials");
    materials.iter().find(|material| material["id"] == id).unwrap_or_else(|| panic!("no material {id}"))
}

/// Least strength in MPa of music wire by the project's table, by straight lines between its points.
fn least_strength_mpa(table: &Value, diameter_mm: f64) -> f64 {
    let points: Vec<[f64; 2]> =
        serde_json::from_value(material(table, "music_wire")["least_tensile_mpa"]["points"].clone())
            .expect("pairs of diameter and strength");
    let after =
        points.iter().position(|point| point[0] >= diameter_mm - 1e-9).expect("a diameter of the table");
    let [[d0, s0], [d1, s1]] = [points[after.saturating_sub(1)], points[after]];
    if d1 == d0 { s1 } else { s0 + (s1 - s0) * (diameter_mm - d0) / (d1 - d0) }
}

#[test]
fn the_table_repeats_the_standard_for_music_wire() {
    const ROUNDED_MPA: f64 = 0.51; // the table rounds to whole megapascals
    let table = table();
    for (diameter_in, least_ksi, _) in A228 {
        let found = least_strength_mpa(&table, diameter_in * INCH_MM);
        assert_near(found, least_ksi * KSI_MPA, ROUNDED_MPA, &format!("wire of {diameter_in} in"));
    }
}

/// Power law 201 ksi·in^0.145: Shigley's Mechanical Engineering Design, table 10-4, memory (sure); within 2 % of the
/// standard's minima.
#[test]
fn the_handbooks_power_law_agrees_with_the_table() {
    let table = table();
    for (diameter_in, ..) in A228 {
        let law = 201.0 * f64::powf(diameter_in, -0.145) * KSI_MPA;
        assert_near(least_strength_mpa(&table, diameter_in * INCH_MM), law, 0.02 * law, "strength in MPa");
    }
}

/// Greatest strengths that two other standards allow, MPa (second-hand): EN 10270-1 SH and JIS G 3522 SWP-B. What is least
/// by one standard must not be more than the most by another.
#[test]
fn other_standards_do_not_contradict_the_table() {
    let table = table();
    for (diameter_mm, most_mpa) in [(0.30, 2940.0), (0.40, 2830.0), (0.26, 2990.0), (0.40, 2840.0)] {
        assert!(least_strength_mpa(&table, diameter_mm) < most_mpa, "wire of {diameter_mm} mm");
    }
}

/// Density g/cm³ and modulus GPa (material tables, read; 207 for nickel memory): lowest and highest.
#[test]
fn densities_and_moduli_lie_within_material_tables() {
    let table = table();
    for (id, densities, moduli) in [
        ("music_wire", [7.80, 7.85], [190.0, 207.0]),
        ("phosphor_bronze", [8.8, 8.9], [110.0, 110.0]),
        ("bronze_90_10", [8.8, 8.8], [117.0, 117.0]),
        ("nickel", [8.88, 8.88], [207.0, 207.0]),
    ] {
        let material = material(&table, id);
        let density = material["density_kg_m3"]["value"].as_f64().expect("a density") / 1e3;
        let modulus = material["youngs_modulus_gpa"]["gpa"].as_f64().expect("a modulus");
        assert!(densities[0] <= density && density <= densities[1], "{id}: {density} g/cm³");
        assert!(moduli[0] <= modulus && modulus <= moduli[1], "{id}: {modulus} GPa");
    }
    let fluorocarbon = material(&table, "fluorocarbon");
    assert_eq!(fluorocarbon["density_kg_m3"]["value"], 1770.0, "PVDF");
}

/// Nylon under string stress s GPa: bending modulus about 4.5 + 39·s GPa, J. Woodhouse and N. Lynch-Aird, Acta Acustica u.
/// Acustica 105 (2019); memory (unsure).
#[test]
fn nylon_gets_stiffer_with_stress_as_published() {
    let table = table();
    let rule = &material(&table, "nylon")["youngs_modulus_gpa"];
    assert_eq!(rule["rule"], "rises_with_stress");
    assert_eq!(
        (rule["at_no_stress_gpa"].as_f64(), rule["per_gpa_of_stress"].as_f64()),
        (Some(4.5), Some(39.0))
    );
}

/// A .010 in wire of 7850 kg/m³ and 387 ksi at 647.7 mm breaks at 450 Hz (computed).
#[test]
fn a_thin_wire_breaks_where_computed() {
    let area_m2 = std::f64::consts::PI / 4.0 * (0.010 * INCH_MM * 1e-3_f64).powi(2);
    let ends = Ends { first: 0.0, second: 0.0 };
    let string = SpeakingString {
        length_mm: 647.7,
        unit_mass_kg_per_m: 7850.0 * area_m2,
        bending_stiffness_n_mm2: 0.0,
        ends,
    };
    let breaking_n = 387.0 * KSI_MPA * 1e6 * area_m2;
    assert_near(
        string.frequency_hz(breaking_n).expect("a legal string"),
        450.0,
        0.5,
        "pitch at breaking in Hz",
    );
}

fn examples() -> Vec<Plan> {
    let plans: Vec<_> =
        EXAMPLES.iter().map(|example| read(example.text).expect("an example is a plan")).collect();
    assert!(plans.len() >= 6, "the examples were found");
    plans
}

/// Steel in the example plans: modulus and density of music wire as above, strength between the least and the most of
/// ASTM A228 (second-hand) at the diameter; between the standard's sizes the table's straight lines.
#[test]
fn the_steel_of_the_examples_is_music_wire() {
    const ROUNDED_MPA: f64 = 5.0; // the plans round strengths to 5 MPa
    const MOST_OVER_LEAST: f64 = 1.11; // 428/387, 417/377, 400/362 … of the standard lie between 1.10 and 1.11
    let table = table();
    let mut seen = 0;
    for plan in examples() {
        for string in plan.strings.iter().filter(|string| string.core.material == "music wire") {
            let core = &string.core;
            assert!((190.0..=207.0).contains(&core.youngs_modulus_gpa), "{}", string.name);
            assert!((7800.0..=7850.0).contains(&core.density_kg_m3), "{}", string.name);
            let least = least_strength_mpa(&table, core.diameter_mm);
            let strength = core.tensile_mpa.expect("steel has its strength in the examples");
            let allowed = least - ROUNDED_MPA..=least * MOST_OVER_LEAST;
            assert!(allowed.contains(&strength), "{}: {strength} MPa, least {least}", string.name);
            seen += 1;
        }
    }
    assert!(seen > 10, "steel strings were looked at");
}
