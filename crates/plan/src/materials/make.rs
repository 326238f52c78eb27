//! How a string is made: what turns a gauge into a core, a wrap and their figures.

use crestline_physics::section::{self, Wrap as PhysicsWrap};

use super::table::{Construction, Material, string_table};
use crate::{Core, CoreShape, PlanString, Wrap};

/// Plain or wound, and of what, by the table.
#[derive(Debug, Clone, Copy)]
pub enum StringMake {
    /// A plain string.
    Plain(&'static Material),
    /// A wound string.
    Wound(&'static Construction, &'static Material),
}

impl PartialEq for StringMake {
    fn eq(&self, other: &Self) -> bool {
        self.key() == other.key()
    }
}

impl StringMake {
    /// Every make of the table: the plain ones, then the wound ones.
    #[must_use]
    pub fn all() -> Vec<Self> {
        let table = string_table();
        let plain = table.materials.iter().filter(|material| material.uses.iter().any(|of| of == "plain"));
        let wound = table.constructions.iter().flat_map(|construction| {
            let wraps = construction.wraps.iter().filter_map(|wrap| table.material(wrap));
            wraps.map(move |wrap| Self::Wound(construction, wrap))
        });
        plain.map(Self::Plain).chain(wound).collect()
    }

    fn key(&self) -> (&str, &str) {
        match self {
            Self::Plain(material) => ("plain", &material.id),
            Self::Wound(construction, wrap) => (&construction.id, &wrap.id),
        }
    }

    /// The make in words.
    #[must_use]
    pub fn words(&self) -> String {
        match self {
            Self::Plain(material) => format!("plain, {}", material.name),
            Self::Wound(construction, wrap) => format!("wound, {} ({})", wrap.name, construction.name),
        }
    }

    /// The make that a string's material words name, and for a wound string its core besides, if one does.
    #[must_use]
    pub fn of(string: &PlanString) -> Option<Self> {
        let mut fitting = Self::all().into_iter().filter(|make| make.names(string));
        let first = fitting.next();
        // Guitar and bass strings are made of the same: the core tells them apart.
        let by_core = |make: &Self| make.core_still_follows(string);
        first.filter(by_core).or_else(|| fitting.find(by_core)).or(first)
    }

    fn names(&self, string: &PlanString) -> bool {
        match (self, &string.wrap) {
            (Self::Plain(material), None) => material.name == string.core.material,
            (Self::Wound(construction, wrap), Some(entered)) => {
                let core = string_table().material(&construction.core);
                wrap.name == entered.material && core.is_some_and(|core| core.name == string.core.material)
            }
            _ => false,
        }
    }

    /// Whether a wound string's core is the one that the table gives for its outside diameter.
    #[must_use]
    pub fn core_still_follows(&self, string: &PlanString) -> bool {
        // Half of the last digit that the table's rule keeps, mm.
        const ROUNDED_MM: f64 = 0.5e-4;
        match (self, &string.wrap) {
            (Self::Wound(construction, _), Some(wrap)) => {
                (construction.core_mm(wrap.outside_mm) - string.core.diameter_mm).abs() <= ROUNDED_MM
            }
            _ => false,
        }
    }

    /// Makes `string` this way with this gauge in mm, for its scale in mm and its pitch in Hz. Its measured values are
    /// let go, because they belonged to another string; name, pitch, heights and lengths stay.
    pub fn string(&self, string: &mut PlanString, gauge_mm: f64, scale_mm: f64, frequency_hz: f64) {
        string.measured = crate::Measured::default();
        match self {
            Self::Plain(material) => {
                string.core = core(material, CoreShape::Round, gauge_mm);
                string.wrap = None;
            }
            Self::Wound(construction, wrap) => {
                let Some(material) = string_table().material(&construction.core) else { return };
                string.core = core(material, construction.shape(), construction.core_mm(gauge_mm));
                string.wrap = Some(Wrap {
                    outside_mm: gauge_mm,
                    density_kg_m3: wrap.density_kg_m3.value,
                    material: wrap.name.clone(),
                });
            }
        }
        if let Some(modulus_gpa) = modulus_at_pitch_gpa(string, scale_mm, frequency_hz) {
            string.core.youngs_modulus_gpa = modulus_gpa;
        }
    }

    /// Lets the figures that still are the table's follow a gauge that has changed from `before`: the core of a wound
    /// string, its strength, and a modulus that rises with stress. A figure that was entered by hand stays.
    pub fn follow(before: &PlanString, string: &mut PlanString, scale_mm: f64, frequency_hz: f64) {
        let Some(make) = Self::of(before) else { return };
        if let (Self::Wound(construction, _), Some(wrap)) = (make, &string.wrap)
            && make.core_still_follows(before)
            && before.core.diameter_mm == string.core.diameter_mm
        {
            string.core.diameter_mm = construction.core_mm(wrap.outside_mm);
        }
        if let Some(material) = string_table().material_named(&string.core.material)
            && before.core.tensile_mpa == material.tensile_mpa(before.core.diameter_mm)
        {
            string.core.tensile_mpa = material.tensile_mpa(string.core.diameter_mm);
        }
        let was_the_tables = modulus_at_pitch_gpa(before, scale_mm, frequency_hz)
            .is_some_and(|modulus_gpa| modulus_gpa == before.core.youngs_modulus_gpa);
        if was_the_tables && let Some(modulus_gpa) = modulus_at_pitch_gpa(string, scale_mm, frequency_hz) {
            string.core.youngs_modulus_gpa = modulus_gpa;
        }
    }
}

fn core(material: &Material, shape: CoreShape, diameter_mm: f64) -> Core {
    Core {
        shape,
        diameter_mm,
        youngs_modulus_gpa: material.youngs_modulus_gpa.at(0.0),
        density_kg_m3: material.density_kg_m3.value,
        tensile_mpa: material.tensile_mpa(diameter_mm),
        material: material.name.clone(),
    }
}

/// The table's modulus for the core of a string tuned to this pitch on this scale, GPa, to 0.1 GPa where it rises with
/// stress; none where the table does not know the material. The stress is the tension μ·(2·L·f)² of an ideal string
/// (Mersenne's law) over the area of the core, within a few per cent of the stiff string's.
pub(super) fn modulus_at_pitch_gpa(string: &PlanString, scale_mm: f64, frequency_hz: f64) -> Option<f64> {
    let modulus = &string_table().material_named(&string.core.material)?.youngs_modulus_gpa;
    if !modulus.rises() {
        return Some(modulus.at(0.0));
    }
    let stress_gpa = stress_gpa(string, scale_mm, frequency_hz)?;
    Some((modulus.at(stress_gpa) * 10.0).round() / 10.0)
}

/// Stress in the core at pitch, GPa; none where the wrap does not fit round the core.
fn stress_gpa(string: &PlanString, scale_mm: f64, frequency_hz: f64) -> Option<f64> {
    let core = crate::solve::physics_core(string);
    let wrap_kg_per_m = match &string.wrap {
        None => 0.0,
        Some(wrap) => {
            let wrap = PhysicsWrap { outside_mm: wrap.outside_mm, density_kg_m3: wrap.density_kg_m3 };
            section::wrap_mass_kg_per_m(&core, &wrap).ok()?
        }
    };
    let area_m2 = core.area_mm2() * 1e-6;
    let mass_kg_per_m =
        string.measured.unit_mass_kg_per_m.unwrap_or(core.density_kg_m3 * area_m2 + wrap_kg_per_m);
    let wave_m_s = 2.0 * scale_mm * 1e-3 * frequency_hz;
    let stress_gpa = mass_kg_per_m * wave_m_s * wave_m_s / area_m2 * 1e-9;
    (stress_gpa.is_finite() && stress_gpa > 0.0).then_some(stress_gpa)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crate::{example, read};

    fn strings(name: &str) -> Vec<PlanString> {
        read(example(name).unwrap().text).unwrap().strings
    }

    fn make(words: &str) -> StringMake {
        StringMake::all().into_iter().find(|make| make.words().contains(words)).unwrap()
    }

    #[test]
    fn the_table_makes_the_strings_of_the_steel_example() {
        let expected = strings("steel_six");
        for (index, gauge_mm) in [(0, 0.3048), (1, 0.4064), (2, 0.6096), (5, 1.3462)] {
            let make = if index < 2 { make("plain, music wire") } else { make("phosphor bronze") };
            let mut made = expected[index].clone();
            made.core.diameter_mm = 9.0;
            make.string(&mut made, gauge_mm, 647.7, 100.0);
            assert_eq!(made, expected[index], "string {}", index + 1);
        }
    }

    /// Modulus by hand: density 1770 kg/m³, scale 432 mm, A4 440 Hz: stress 1770·(2·0.432·440)² = 0.2558 GPa,
    /// 4.5 + 39·0.2558 = 14.5 GPa.
    #[test]
    fn a_modulus_that_rises_with_stress_is_that_at_pitch() {
        let mut string = strings("tenor_ukulele").remove(0);
        make("plain, fluorocarbon").string(&mut string, 0.52, 432.0, 440.0);
        assert_eq!(string.core.youngs_modulus_gpa, 14.5);
    }

    #[test]
    fn makes_are_recognised_by_their_words() {
        let steel = strings("steel_six");
        assert_eq!(StringMake::of(&steel[0]), Some(make("plain, music wire")));
        assert_eq!(StringMake::of(&steel[4]), Some(make("phosphor bronze")));
        let bass = strings("bass_four");
        assert_eq!(
            StringMake::of(&bass[0]),
            Some(make("nickel-plated steel (steel-cored, nickel-plated or nickel: bass)"))
        );
        let mut own = steel[0].clone();
        own.core.material = "something else".to_owned();
        assert_eq!(StringMake::of(&own), None);
    }

    #[test]
    fn a_core_follows_its_gauge_until_it_is_entered_by_hand() {
        let before = strings("steel_six").remove(3);
        let mut string = before.clone();
        string.wrap.as_mut().unwrap().outside_mm = 0.6096;
        StringMake::follow(&before, &mut string, 647.7, 146.8);
        assert_eq!((string.core.diameter_mm, string.core.tensile_mpa), (0.3302, Some(2570.0)));

        let mut measured = before.clone();
        measured.core.diameter_mm = 0.40;
        let mut string = measured.clone();
        string.wrap.as_mut().unwrap().outside_mm = 0.6096;
        StringMake::follow(&measured, &mut string, 647.7, 146.8);
        assert_eq!(string.core.diameter_mm, 0.40);
    }
}
