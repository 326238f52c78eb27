//! The key `strings`.

use super::spot::Spot;
use crate::{Action, Afterlength, Core, CoreShape, Measured, Pitch, PlanString, Wrap, limits, pitch};

const KEYS: &[&str] = &["name", "pitch", "core", "wrap", "measured", "action_mm", "afterlength_mm"];
const CORE_KEYS: &[&str] =
    &["shape", "diameter_mm", "youngs_modulus_gpa", "density_kg_m3", "tensile_mpa", "material"];
const MEASURED_KEYS: &[&str] = &["unit_mass_kg_per_m", "axial_stiffness_n", "bending_stiffness_n_mm2"];

/// Reads the string at `spot`, the first having index 0.
pub(super) fn string(spot: &Spot, index: usize) -> PlanString {
    let fields = spot.object(KEYS);
    PlanString {
        name: fields.get("name").text_or(&(index + 1).to_string()),
        pitch: pitch(&fields.get("pitch")),
        core: core(&fields.get("core")),
        wrap: fields.get("wrap").optional(wrap),
        measured: fields.get("measured").if_given(measured).unwrap_or_default(),
        action_mm: action(&fields.get("action_mm")),
        afterlength_mm: fields.get("afterlength_mm").if_given(afterlength).unwrap_or_default(),
    }
}

pub(super) fn pitch(spot: &Spot) -> Pitch {
    let fields = spot.object(&["note", "frequency_hz"]);
    match (fields.has("note"), fields.has("frequency_hz")) {
        (true, false) => {
            Pitch::Note(fields.get("note").text_of(pitch::NOTE_WORDS).unwrap_or_default().to_owned())
        }
        (false, true) => Pitch::FrequencyHz(fields.get("frequency_hz").number(&limits::FREQUENCY_HZ)),
        (both, _) => {
            if spot.is_object() {
                let found = if both { "both note and frequency_hz" } else { "neither note nor frequency_hz" };
                spot.odd(found, "one of note and frequency_hz");
            }
            Pitch::FrequencyHz(f64::NAN)
        }
    }
}

fn core(spot: &Spot) -> Core {
    let fields = spot.object(CORE_KEYS);
    Core {
        shape: fields.get("shape").word(CoreShape::Round),
        diameter_mm: fields.get("diameter_mm").number(&limits::CORE_DIAMETER_MM),
        youngs_modulus_gpa: fields.get("youngs_modulus_gpa").number(&limits::YOUNGS_MODULUS_GPA),
        density_kg_m3: fields.get("density_kg_m3").number(&limits::DENSITY_KG_M3),
        tensile_mpa: fields.get("tensile_mpa").number_if_any(&limits::TENSILE_MPA),
        material: fields.get("material").text_or(""),
    }
}

fn wrap(spot: &Spot) -> Wrap {
    let fields = spot.object(&["outside_mm", "density_kg_m3", "material"]);
    Wrap {
        outside_mm: fields.get("outside_mm").number(&limits::OUTSIDE_MM),
        density_kg_m3: fields.get("density_kg_m3").number(&limits::DENSITY_KG_M3),
        material: fields.get("material").text_or(""),
    }
}

fn measured(spot: &Spot) -> Measured {
    let fields = spot.object(MEASURED_KEYS);
    Measured {
        unit_mass_kg_per_m: fields.get("unit_mass_kg_per_m").number_if_any(&limits::UNIT_MASS_KG_PER_M),
        axial_stiffness_n: fields.get("axial_stiffness_n").number_if_any(&limits::AXIAL_STIFFNESS_N),
        bending_stiffness_n_mm2: fields
            .get("bending_stiffness_n_mm2")
            .number_if_any(&limits::BENDING_STIFFNESS_N_MM2),
    }
}

fn action(spot: &Spot) -> Action {
    let fields = spot.object(&["first", "twelfth"]);
    Action {
        first: fields.get("first").number_if_any(&limits::ACTION_FIRST_MM),
        twelfth: fields.get("twelfth").number(&limits::ACTION_TWELFTH_MM),
    }
}

fn afterlength(spot: &Spot) -> Afterlength {
    let fields = spot.object(&["head", "tail"]);
    Afterlength {
        head: fields.get("head").number(&limits::AFTERLENGTH_MM),
        tail: fields.get("tail").number(&limits::AFTERLENGTH_MM),
    }
}
