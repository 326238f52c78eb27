//! The wrap of a wound string.

use crestline_plan::{PlanString, Wrap};
use eframe::egui::Ui;

use super::instrument::length;
use super::string_detail::At;
use crate::fields::choice;
use crate::fields::form::Form;
use crate::fields::number;
use crate::fields::row::{faults, row, unit};
use crate::fields::text;

/// Density of bronze wrap wire, kg/m³, with which a new wrap begins; common practice, for the user to correct.
const BRONZE_KG_M3: f64 = 8800.0;
/// Outside diameter over core diameter with which a new wrap begins.
const NEW_RATIO: f64 = 2.0;

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, at: &At, string: &mut PlanString) {
    let mut wound = string.wrap.is_some();
    row(ui, "Wrap", |ui| {
        if choice::tick(ui, form, &at.path("wrap"), "Wound string", "A close wrap of round wire.", &mut wound)
        {
            let outside_mm = (string.core.diameter_mm * NEW_RATIO * 100.0).round() / 100.0;
            string.wrap = wound.then(|| Wrap {
                outside_mm,
                density_kg_m3: BRONZE_KG_M3,
                material: "bronze".to_owned(),
            });
        }
    });
    let Some(wrap) = &mut string.wrap else { return };
    let help = "Outside diameter of the wound string, its gauge.";
    let spec = at.spec("wrap.outside_mm", "outside diameter", 0.01, help);
    length(ui, form, "Outside diameter", &spec, &mut wrap.outside_mm);
    row(ui, "Wrap density", |ui| {
        let help = "Density of the wrap wire: about 8900 kg/m³ for copper and nickel, 8800 for bronze.";
        number::number(
            ui,
            form,
            &at.spec("wrap.density_kg_m3", "wrap density, kg/m³", 10.0, help),
            &mut wrap.density_kg_m3,
        );
        unit(ui, form, "kg/m³");
    });
    faults(ui, form, &[&at.path("wrap.density_kg_m3")]);
    row(ui, "Wrap material", |ui| {
        let spec = at.spec("wrap.material", "wrap material", 0.0, "In words, for the tables.");
        text::line(ui, form, &spec.width(ui.available_width()), &mut wrap.material);
    });
}
