//! The table as it stands in the project's assets.

use std::sync::LazyLock;

use serde::Deserialize;

use crate::CoreShape;

/// The text of the table.
const TEXT: &str = include_str!("../../../../assets/materials/strings.json");

/// Materials, usual cores of wound strings, and common sets of gauges, each with its source.
#[derive(Debug, Clone, Default, Deserialize)]
pub struct StringTable {
    /// The materials.
    pub materials: Vec<Material>,
    /// The usual cores of wound strings.
    pub constructions: Vec<Construction>,
    /// Common sets.
    pub sets: Vec<StringSet>,
}

/// A figure with the key of its source.
#[derive(Debug, Clone, Deserialize)]
pub struct Sourced {
    /// The figure.
    pub value: f64,
    /// The key of its source.
    pub source: String,
}

/// A material of plain strings, cores or wraps.
#[derive(Debug, Clone, Deserialize)]
pub struct Material {
    /// Its key.
    pub id: String,
    /// Its name, which plans carry as the material's words.
    pub name: String,
    /// Where it serves: `plain`, `core`, `wrap`.
    pub uses: Vec<String>,
    /// Density as strung, kg/m³.
    pub density_kg_m3: Sourced,
    /// Young's modulus at playing stress.
    pub youngs_modulus_gpa: Modulus,
    /// Least tensile strength by diameter, where a standard gives one.
    pub least_tensile_mpa: Option<Strength>,
}

/// Young's modulus at playing stress.
#[derive(Debug, Clone, Deserialize)]
#[serde(tag = "rule", rename_all = "snake_case")]
pub enum Modulus {
    /// One figure.
    Constant {
        /// The modulus, GPa.
        gpa: f64,
    },
    /// A straight line over the stress in the core.
    RisesWithStress {
        /// At no stress, GPa.
        at_no_stress_gpa: f64,
        /// More for each gigapascal of stress.
        per_gpa_of_stress: f64,
    },
}

impl Modulus {
    /// The modulus at a stress in GPa, GPa.
    #[must_use]
    pub fn at(&self, stress_gpa: f64) -> f64 {
        match self {
            Self::Constant { gpa } => *gpa,
            Self::RisesWithStress { at_no_stress_gpa, per_gpa_of_stress } => {
                at_no_stress_gpa + per_gpa_of_stress * stress_gpa
            }
        }
    }

    /// Whether it depends on the stress, so that it belongs to one pitch and scale only.
    #[must_use]
    pub const fn rises(&self) -> bool {
        matches!(self, Self::RisesWithStress { .. })
    }
}

/// Least tensile strength by diameter.
#[derive(Debug, Clone, Deserialize)]
pub struct Strength {
    /// Pairs of diameter, mm, and strength, MPa, the thinnest first.
    pub points: Vec<[f64; 2]>,
}

impl Material {
    /// Least tensile strength of wire of this diameter, MPa, rounded to 5 MPa; between the table's diameters by
    /// straight lines, and none beyond them.
    #[must_use]
    pub fn tensile_mpa(&self, diameter_mm: f64) -> Option<f64> {
        const STEP_MPA: f64 = 5.0;
        let points = &self.least_tensile_mpa.as_ref()?.points;
        let within = points.first()?[0] <= diameter_mm && diameter_mm <= points.last()?[0];
        within.then(|| (along(points, diameter_mm) / STEP_MPA).round() * STEP_MPA)
    }
}

/// The usual core of a wound string for its outside diameter.
#[derive(Debug, Clone, Deserialize)]
pub struct Construction {
    /// Its key.
    pub id: String,
    /// What it is, in words.
    pub name: String,
    /// Key of the core's material.
    pub core: String,
    /// Shape of the core: `round` or `hex`.
    pub core_shape: String,
    /// Keys of the wraps' materials, the most usual first.
    pub wraps: Vec<String>,
    /// Outside diameters with their cores, the thinnest first.
    pub points: Vec<CorePoint>,
}

/// A core and where its figure comes from.
#[derive(Debug, Clone, Deserialize)]
pub struct CorePoint {
    /// Outside diameter, mm.
    pub outside_mm: f64,
    /// Core, across flats where it is hexagonal, mm.
    pub core_mm: f64,
    /// The key of its source.
    pub source: String,
}

impl Construction {
    /// The shape of the core.
    #[must_use]
    pub fn shape(&self) -> CoreShape {
        if self.core_shape == "hex" { CoreShape::Hex } else { CoreShape::Round }
    }

    /// The usual core for an outside diameter, mm, to 0.0001 mm; between the table's diameters by straight lines.
    /// Beyond them it keeps the ratio of core to outside of the nearest one, so that it stays inside the wrap.
    #[must_use]
    pub fn core_mm(&self, outside_mm: f64) -> f64 {
        const FINEST: f64 = 1e4;
        let points: Vec<[f64; 2]> =
            self.points.iter().map(|point| [point.outside_mm, point.core_mm]).collect();
        let (Some(first), Some(last)) = (points.first(), points.last()) else { return 0.5 * outside_mm };
        let core_mm = if outside_mm < first[0] {
            first[1] / first[0] * outside_mm
        } else if outside_mm > last[0] {
            last[1] / last[0] * outside_mm
        } else {
            along(&points, outside_mm)
        };
        (core_mm * FINEST).round() / FINEST
    }
}

/// A common set of gauges, string 1 first.
#[derive(Debug, Clone, Deserialize)]
pub struct StringSet {
    /// Its key.
    pub id: String,
    /// What it is for, in words.
    pub name: String,
    /// The scale for which it is meant, mm.
    pub scale_mm: f64,
    /// Key of the plain strings' material.
    pub plain_material: String,
    /// Key of the wound strings' construction.
    pub construction: Option<String>,
    /// Key of the wrap's material.
    pub wrap_material: Option<String>,
    /// The strings.
    pub strings: Vec<SetString>,
}

/// A string of a set.
#[derive(Debug, Clone, Deserialize)]
pub struct SetString {
    /// The note for which it is meant.
    pub note: String,
    /// Diameter, of a wound string the outside, mm.
    pub gauge_mm: f64,
    /// Whether it is wound.
    pub wound: bool,
}

impl StringTable {
    /// The material of this key.
    #[must_use]
    pub fn material(&self, id: &str) -> Option<&Material> {
        self.materials.iter().find(|material| material.id == id)
    }

    /// The material of this name.
    #[must_use]
    pub fn material_named(&self, name: &str) -> Option<&Material> {
        self.materials.iter().find(|material| material.name == name)
    }

    /// The construction of this key.
    #[must_use]
    pub fn construction(&self, id: &str) -> Option<&Construction> {
        self.constructions.iter().find(|construction| construction.id == id)
    }

    /// The set of this key.
    #[must_use]
    pub fn set(&self, id: &str) -> Option<&StringSet> {
        self.sets.iter().find(|set| set.id == id)
    }
}

/// The value at `x` on the straight lines between points that rise in their first number.
fn along(points: &[[f64; 2]], x: f64) -> f64 {
    let after = points.iter().position(|point| point[0] >= x).unwrap_or(points.len().saturating_sub(1));
    let [[x0, y0], [x1, y1]] = [points[after.saturating_sub(1)], points[after]];
    if x1 > x0 { y0 + (y1 - y0) * (x - x0) / (x1 - x0) } else { y1 }
}

/// The table. It is part of the program, and a test reads it, so it is empty only in a program that failed that test.
#[must_use]
pub fn string_table() -> &'static StringTable {
    static TABLE: LazyLock<StringTable> = LazyLock::new(|| serde_json::from_str(TEXT).unwrap_or_default());
    &TABLE
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn the_table_is_read_and_every_key_in_it_leads_somewhere() {
        let table: StringTable = serde_json::from_str(TEXT).unwrap();
        assert!(table.materials.len() >= 10 && table.constructions.len() >= 4 && table.sets.len() >= 12);
        for construction in &table.constructions {
            assert!(table.material(&construction.core).unwrap().uses.iter().any(|of| of == "core"));
            for wrap in &construction.wraps {
                assert!(table.material(wrap).unwrap().uses.iter().any(|of| of == "wrap"), "{wrap}");
            }
        }
        for set in &table.sets {
            assert!(table.material(&set.plain_material).is_some(), "{}", set.id);
            let wound = set.strings.iter().any(|string| string.wound);
            let construction = set.construction.as_deref().and_then(|id| table.construction(id));
            assert_eq!(wound, construction.is_some(), "{}", set.id);
            assert_eq!(wound, set.wrap_material.as_deref().and_then(|id| table.material(id)).is_some());
        }
    }

    /// Least tensile strengths: ASTM A228, second-hand, 377 ksi at 0.012 in and 362 ksi at 0.016 in; 2599 and 2496 MPa.
    #[test]
    fn strength_follows_the_diameter_and_ends_with_the_standards_sizes() {
        let wire = string_table().material("music_wire").unwrap();
        assert_eq!(wire.tensile_mpa(0.3048), Some(2600.0));
        assert_eq!(wire.tensile_mpa(0.4064), Some(2495.0));
        assert_eq!([wire.tensile_mpa(0.1), wire.tensile_mpa(2.0)], [None, None]);
        assert_eq!(string_table().material("nylon").unwrap().tensile_mpa(0.7), None);
    }

    #[test]
    fn cores_pass_through_the_tables_points_and_stay_inside_beyond_them() {
        let acoustic = string_table().construction("steel_acoustic").unwrap();
        assert_eq!(acoustic.core_mm(0.6096), 0.3302);
        let between = acoustic.core_mm(0.7112);
        assert!((between - 0.3556).abs() < 1e-9, "half-way between 0.3302 and 0.381: {between}");
        for outside_mm in [0.05, 0.3, 2.0, 10.0] {
            let core_mm = acoustic.core_mm(outside_mm);
            assert!(core_mm > 0.0 && core_mm < 0.7 * outside_mm, "{core_mm} in {outside_mm}");
        }
    }
}
