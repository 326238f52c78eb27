//! The strings of the study: every set of the project's table of materials, on its own scale, and the ukulele's on the
//! shortest scale that is usual for them.

use std::f64::consts::PI;

use crestline_physics::StringProperties;
use crestline_physics::section::{Core, CoreShape, Overrides, Wrap, string_properties};
use crestline_plan::note_frequency_hz;
use serde_json::Value;

use crate::places::{text_of, top};

/// The shortest scale: a soprano ukulele's, tuned as the tenor (common practice).
const SHORTEST_MM: f64 = 330.0;

/// A string at pitch on a scale.
pub struct RealString {
    /// Set and note.
    pub name: String,
    pub scale_mm: f64,
    pub frequency_hz: f64,
    pub properties: StringProperties,
    /// Bending stiffness of a solid rod of the core's modulus as thick as the whole string, N·mm²; none for plain strings.
    pub solid_stiffness_n_mm2: Option<f64>,
    /// Nylon or fluorocarbon, in place of steel.
    pub is_polymer: bool,
}

fn number(value: &Value) -> f64 {
    value.as_f64().expect("a number in the table of materials")
}

fn by_id<'a>(list: &'a Value, id: &Value) -> &'a Value {
    let mut entries = list.as_array().expect("a list").iter();
    entries.find(|entry| entry["id"] == *id).expect("an entry of that name")
}

/// Core size of a wound string by the construction's table, by straight lines between its points.
fn core_mm(construction: &Value, outside_mm: f64) -> f64 {
    let points: Vec<[f64; 2]> = construction["points"]
        .as_array()
        .expect("points")
        .iter()
        .map(|point| [number(&point["outside_mm"]), number(&point["core_mm"])])
        .collect();
    let after = points.iter().position(|point| point[0] >= outside_mm).unwrap_or(points.len() - 1).max(1);
    let [[d0, c0], [d1, c1]] = [points[after - 1], points[after]];
    c0 + (c1 - c0) * (outside_mm - d0) / (d1 - d0)
}

/// Modulus in GPa: constant, or rising with the stress that the pitch asks for.
fn modulus_gpa(material: &Value, stress_gpa: f64) -> f64 {
    let rule = &material["youngs_modulus_gpa"];
    if rule["rule"] == "constant" {
        number(&rule["gpa"])
    } else {
        number(&rule["at_no_stress_gpa"]) + number(&rule["per_gpa_of_stress"]) * stress_gpa
    }
}

fn real_string(table: &Value, set: &Value, entry: &Value, scale_mm: f64) -> RealString {
    let note = entry["note"].as_str().expect("a note");
    let outside_mm = number(&entry["gauge_mm"]);
    let is_wound = entry["wound"] == true;
    let (material_id, shape, diameter_mm) = if is_wound {
        let construction = by_id(&table["constructions"], &set["construction"]);
        let shape = if construction["core_shape"] == "hex" { CoreShape::Hex } else { CoreShape::Round };
        (&construction["core"], shape, core_mm(construction, outside_mm))
    } else {
        (&set["plain_material"], CoreShape::Round, outside_mm)
    };
    let material = by_id(&table["materials"], material_id);
    let density_kg_m3 = number(&material["density_kg_m3"]["value"]);
    let wrap = is_wound.then(|| {
        let density = &by_id(&table["materials"], &set["wrap_material"])["density_kg_m3"]["value"];
        Wrap { outside_mm, density_kg_m3: number(density) }
    });
    let frequency_hz = note_frequency_hz(note, 440.0).expect("a note");
    let core = |youngs_modulus_gpa| Core { shape, diameter_mm, youngs_modulus_gpa, density_kg_m3 };
    let properties =
        |core: &Core| string_properties(core, wrap.as_ref(), &Overrides::default()).expect("a string");
    // The mass does not depend on the modulus; the flexible string's pull is near enough for the stress.
    let rough = core(1.0);
    let pull_n = properties(&rough).unit_mass_kg_per_m * (2e-3 * scale_mm * frequency_hz).powi(2);
    let modulus = modulus_gpa(material, pull_n / rough.area_mm2() * 1e-3);
    RealString {
        name: format!("{}, {note}", set["name"].as_str().expect("a name").split(" (").next().unwrap_or("")),
        scale_mm,
        frequency_hz,
        properties: properties(&core(modulus)),
        solid_stiffness_n_mm2: is_wound.then(|| modulus * 1e3 * PI * outside_mm.powi(4) / 64.0),
        is_polymer: material["youngs_modulus_gpa"]["rule"] != "constant",
    }
}

/// All strings of the study.
pub fn all() -> Vec<RealString> {
    let table: Value =
        serde_json::from_str(&text_of(&top().join("assets/materials/strings.json"))).expect("JSON");
    let mut strings = Vec::new();
    for set in table["sets"].as_array().expect("sets") {
        let mut add = |scale_mm| {
            let entries = set["strings"].as_array().expect("strings").iter();
            strings.extend(entries.map(|entry| real_string(&table, set, entry, scale_mm)));
        };
        add(number(&set["scale_mm"]));
        if set["id"] == "ukulele_tenor" {
            add(SHORTEST_MM);
        }
    }
    for string in &mut strings {
        string.name = format!("{} on {} mm", string.name, string.scale_mm);
    }
    strings
}
