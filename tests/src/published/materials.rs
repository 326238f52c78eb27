//! The table of string materials and the steel of the example plans.

use crestline_physics::mode::{Ends, SpeakingString};
use crestline_plan::{EXAMPLES, Plan, read};
use serde_json::Value;

use super::{By, INCH_MM, KSI_MPA, assert_apart, assert_between, assert_near, origin};
use crate::places::{text_of, top};

checks![
    the_table_repeats_the_standard_for_music_wire,
    the_handbooks_power_law_agrees_with_the_table,
    other_standards_do_not_contradict_the_table,
    densities_and_moduli_lie_within_material_tables,
    nylon_gets_stiffer_with_stress_as_published,
    bulk_polymers_are_softer_than_strings,
    a_thin_wire_breaks_where_computed,
    the_steel_of_the_examples_is_music_wire,
    the_steel_example_has_the_cores_of_a_light_set,
];

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
    origin("ASTM A228, music wire, least tensile strength", By::SecondHand);
    let table = table();
    for (diameter_in, least_ksi, _) in A228 {
        let found = least_strength_mpa(&table, diameter_in * INCH_MM);
        assert_near(found, least_ksi * KSI_MPA, ROUNDED_MPA, &format!("{diameter_in:.3} in, MPa"));
    }
}

/// Power law 201 ksi·in^0.145: Shigley's Mechanical Engineering Design, table 10-4, memory (sure); within 2 % of the
/// standard's minima.
#[test]
fn the_handbooks_power_law_agrees_with_the_table() {
    origin("Shigley's Mechanical Engineering Design, table 10-4, 201 ksi·in^0.145", By::Memory("sure"));
    let table = table();
    for (diameter_in, ..) in A228 {
        let law = 201.0 * f64::powf(diameter_in, -0.145) * KSI_MPA;
        let found = least_strength_mpa(&table, diameter_in * INCH_MM);
        assert_near(found, law, 0.02 * law, &format!("{diameter_in:.3} in, MPa"));
    }
}

/// Least and greatest strengths of two other standards, MPa (second-hand): EN 10270-1 SH and JIS G 3522 SWP-B. What is least
/// by one standard must not be more than the most by another, and grades for springs lie within a tenth of each other.
#[test]
fn other_standards_do_not_contradict_the_table() {
    const GRADES_RELATIVE: f64 = 0.1;
    let table = table();
    let against = |standard, sizes: [(f64, f64, f64); 2]| {
        origin(standard, By::SecondHand);
        for (diameter_mm, least_mpa, most_mpa) in sizes {
            let found = least_strength_mpa(&table, diameter_mm);
            let what = format!("{diameter_mm:.2} mm, least strength, MPa");
            if found < least_mpa {
                let why = "another standard's grade: the table keeps to ASTM A228, and the lower figure is the careful one";
                assert_apart(found, [least_mpa, most_mpa], GRADES_RELATIVE * least_mpa, &what, why);
            } else {
                assert_between(found, [least_mpa, most_mpa], 0.0, &what);
            }
        }
    };
    against("EN 10270-1, wire SH", [(0.30, 2660.0, 2940.0), (0.40, 2560.0, 2830.0)]);
    against("JIS G 3522, wire SWP-B", [(0.26, 2750.0, 2990.0), (0.40, 2600.0, 2840.0)]);
}

/// Density g/cm³ and modulus GPa (material tables, read; 207 for nickel memory): lowest and highest.
#[test]
fn densities_and_moduli_lie_within_material_tables() {
    let table = table();
    let density = |id| material(&table, id)["density_kg_m3"]["value"].as_f64().expect("a density") / 1e3;
    let modulus = |id| material(&table, id)["youngs_modulus_gpa"]["gpa"].as_f64().expect("a modulus");
    origin("Tables of engineering materials", By::Read);
    for (id, densities, moduli) in [
        ("music_wire", [7.80, 7.85], [190.0, 207.0]),
        ("phosphor_bronze", [8.8, 8.9], [110.0, 110.0]),
        ("bronze_90_10", [8.8, 8.8], [117.0, 117.0]),
    ] {
        let name = material(&table, id)["name"].as_str().expect("a name");
        assert_between(density(id), densities, 0.0, &format!("{name}, density, g/cm³"));
        assert_between(modulus(id), moduli, 0.0, &format!("{name}, modulus, GPa"));
    }
    assert_near(density("nickel"), 8.88, 0.0, "nickel, density, g/cm³");
    assert_near(density("fluorocarbon"), 1.77, 0.0, "fluorocarbon (PVDF), density, g/cm³");
    assert_near(density("nylon_multifilament"), 1.14, 0.0, "nylon 6/6, density, g/cm³");
    origin("Tables of engineering materials", By::Memory("sure"));
    assert_near(modulus("nickel"), 207.0, 0.0, "nickel, modulus, GPa");
    origin("EN 10270-1, patented cold drawn steel", By::SecondHand);
    assert_near(density("music_wire"), 7.85, 0.0, "music wire, density, kg/dm³");
    assert_near(modulus("music_wire"), 206.0, 0.0, "music wire, modulus, GPa");
}

/// The line of a polymer's modulus in the table: GPa at no stress, and per GPa of stress.
fn stiffening(table: &Value, id: &str) -> [f64; 2] {
    let rule = &material(table, id)["youngs_modulus_gpa"];
    assert_eq!(rule["rule"], "rises_with_stress");
    ["at_no_stress_gpa", "per_gpa_of_stress"].map(|key| rule[key].as_f64().expect("a number"))
}

/// Nylon under string stress s GPa: bending modulus about 4.5 + 39·s GPa, J. Woodhouse and N. Lynch-Aird, Acta Acustica u.
/// Acustica 105 (2019); memory (unsure).
#[test]
fn nylon_gets_stiffer_with_stress_as_published() {
    origin(
        "J. Woodhouse and N. Lynch-Aird, Acta Acustica united with Acustica 105 (2019)",
        By::Memory("unsure"),
    );
    let [at_no_stress, per_gpa] = stiffening(&table(), "nylon");
    assert_near(at_no_stress, 4.5, 0.0, "nylon, bending modulus at no stress, GPa");
    assert_near(per_gpa, 39.0, 0.0, "nylon, rise of the bending modulus, GPa per GPa of stress");
}

/// Nylon filament 4.1 GPa, nylon 6/6 bulk 2.7 GPa, PVDF bulk 2.2 GPa (material tables, read). Strings are drawn, and stiffer.
#[test]
fn bulk_polymers_are_softer_than_strings() {
    const UNSURE_RELATIVE: f64 = 0.15; // the line is from memory
    let table = table();
    let [nylon, _] = stiffening(&table, "nylon");
    let [fluorocarbon, _] = stiffening(&table, "fluorocarbon");
    origin("Tables of engineering materials, polymers", By::Read);
    let why = "a string is drawn harder than the filament of the table; the line is from memory";
    assert_apart(nylon, [4.1; 2], UNSURE_RELATIVE * 4.1, "nylon filament, modulus at no stress, GPa", why);
    assert_between(nylon, [2.7, f64::INFINITY], 0.0, "nylon, modulus at no stress against the bulk, GPa");
    assert_between(
        fluorocarbon,
        [2.2, f64::INFINITY],
        0.0,
        "fluorocarbon, modulus at no stress against the bulk, GPa",
    );
}

/// A .010 in wire of 7850 kg/m³ and 387 ksi at 647.7 mm breaks at 450 Hz (computed).
#[test]
fn a_thin_wire_breaks_where_computed() {
    origin("A wire of .010 in, 7850 kg/m³ and 387 ksi on 647.7 mm", By::Computed);
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
        "pitch at breaking, Hz",
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

/// Cores of a light acoustic set, in (read in a maker's page): .016 and .012 plain, .013, .015, .016 and .0175 wound.
#[test]
fn the_steel_example_has_the_cores_of_a_light_set() {
    const ROUNDED_IN: f64 = 0.000_05; // the plan's millimetres have four decimals
    origin("Core sizes of a light acoustic set, a maker's page", By::Read);
    let steel = crestline_plan::example("steel_six").expect("the example is there");
    let plan = read(steel.text).expect("an example is a plan");
    assert_eq!(plan.strings.len(), 6);
    for (string, core_in) in plan.strings.iter().zip([0.012, 0.016, 0.013, 0.015, 0.016, 0.0175]) {
        let found = string.core.diameter_mm / INCH_MM;
        assert_near(found, core_in, ROUNDED_IN, &format!("{}, core of the example, in", string.name));
    }
}
