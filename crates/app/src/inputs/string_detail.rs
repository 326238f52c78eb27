//! The chosen string in full.

use crestline_plan::{CoreShape, Plan, PlanString, StringReport};
use eframe::egui::{RichText, Ui};

use super::instrument::length;
use super::{Surroundings, make, wrap};
use crate::fields::choice::{self, Choice};
use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::row::{faults, faults_of_whole, remark, row, unit};
use crate::fields::{parse, pitch, text};
use crate::theme::size;
use crate::units::without_dust;

/// Grams in a kilogram.
const GRAMS: f64 = 1000.0;

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan, around: &Surroundings) {
    let index = around.string;
    let zero_fret = plan.instrument.zero_fret;
    let Some(string) = plan.strings.get_mut(index) else { return };
    ui.add_space(size::GAP);
    ui.separator();
    ui.label(RichText::new(format!("String {} in full", index + 1)).strong());
    let at = At { index };
    faults_of_whole(ui, form, &format!("strings[{index}]"));
    name_and_pitch(ui, form, &at, string);
    make::choice(ui, form, plan, index);
    let Some(string) = plan.strings.get_mut(index) else { return };
    core(ui, form, &at, string);
    wrap::show(ui, form, &at, string);
    heights(ui, form, &at, string, zero_fret);
    measured(ui, form, &at, string, around.report);
    if let Some(report) = around.report {
        figures(ui, form, report);
    }
    make::estimated(ui, form, plan, index);
}

/// Makes fields of one string.
pub struct At {
    index: usize,
}

impl At {
    /// The path of a value of the string.
    pub fn path(&self, field: &str) -> String {
        format!("strings[{}].{field}", self.index)
    }

    /// A field of the string.
    pub fn spec<'a>(&self, field: &str, name: &str, step: f64, help: &'a str) -> Spec<'a> {
        Spec::new(self.path(field), format!("String {}: {name}", self.index + 1), step, help).place("detail")
    }
}

fn name_and_pitch(ui: &mut Ui, form: &mut Form, at: &At, string: &mut PlanString) {
    row(ui, "Name", |ui| {
        let spec = at.spec("name", "name", 0.0, "A name for the string; it stands in tables and drawings.");
        let spec = spec.width(ui.available_width());
        text::line(ui, form, &spec, &mut string.name);
    });
    row(ui, "Pitch", |ui| {
        let help =
            "The open string's pitch: a note such as B3, F#2 or Bb1, or a frequency such as 246.94 Hz.";
        pitch::pitch(ui, form, &at.spec("pitch", "pitch", 0.0, help).words(), &mut string.pitch);
    });
    faults(ui, form, &[&at.path("pitch")]);
}

fn core(ui: &mut Ui, form: &mut Form, at: &At, string: &mut PlanString) {
    const SHAPES: [Choice<CoreShape>; 2] = [
        (CoreShape::Round, "Round", "Round wire or a plain string."),
        (CoreShape::Hex, "Hexagonal", "Hexagonal core wire, measured across its flats."),
    ];
    row(ui, "Core", |ui| {
        choice::buttons(ui, form, &at.path("core.shape"), "Core", &SHAPES, &mut string.core.shape);
    });
    let help = "Diameter of the core, or of a plain string, measured on the string; across flats for a hexagonal core.";
    let spec = at.spec("core.diameter_mm", "core diameter", 0.01, help);
    length(ui, form, "Core diameter", &spec, &mut string.core.diameter_mm);
    let core = &mut string.core;
    row(ui, "Young's modulus", |ui| {
        let help = "Stiffness of the core's material at playing stress: about 200 GPa for steel wire; for nylon and other \
                    polymers several times the handbook's figure.";
        let spec = at.spec("core.youngs_modulus_gpa", "Young's modulus, GPa", 1.0, help);
        number::number(ui, form, &spec, &mut core.youngs_modulus_gpa);
        unit(ui, form, "GPa");
    });
    faults(ui, form, &[&at.path("core.youngs_modulus_gpa")]);
    row(ui, "Density", |ui| {
        let spec = at.spec(
            "core.density_kg_m3",
            "core density, kg/m³",
            10.0,
            "Density of the core: about 7850 kg/m³ for steel.",
        );
        number::number(ui, form, &spec, &mut core.density_kg_m3);
        unit(ui, form, "kg/m³");
    });
    faults(ui, form, &[&at.path("core.density_kg_m3")]);
    row(ui, "Tensile strength", |ui| {
        let help = "Breaking stress of the core; leave it empty where it is not known, then no share of the breaking load is given.";
        let spec = at.spec("core.tensile_mpa", "tensile strength, MPa", 10.0, help).hint("not given");
        number::optional(ui, form, &spec, &mut core.tensile_mpa);
        unit(ui, form, "MPa");
    });
    faults(ui, form, &[&at.path("core.tensile_mpa")]);
    row(ui, "Material", |ui| {
        let spec = at.spec("core.material", "core material", 0.0, "In words, for the tables.");
        text::line(ui, form, &spec.width(ui.available_width()), &mut core.material);
    });
}

fn heights(ui: &mut Ui, form: &mut Form, at: &At, string: &mut PlanString, zero_fret: bool) {
    if let (Some(first), false) = (&mut string.action_mm.first, zero_fret) {
        let help = "Gap between the crown of fret 1 and the underside of the open string.";
        length(
            ui,
            form,
            "Action, fret 1",
            &at.spec("action_mm.first", "action over fret 1", 0.05, help),
            first,
        );
    }
    let help = "Gap between the crown of fret 12 and the underside of the open string.";
    let twelfth = at.spec("action_mm.twelfth", "action over fret 12", 0.05, help);
    length(ui, form, "Action, fret 12", &twelfth, &mut string.action_mm.twelfth);
    faults_of_whole(ui, form, &at.path("action_mm"));
    let help = "Length of string from the nut to where it is held, at the tuner's post. It stretches along as far as the string slips.";
    let head = at.spec("afterlength_mm.head", "afterlength behind the nut", 5.0, help);
    length(ui, form, "Behind the nut", &head, &mut string.afterlength_mm.head);
    let help = "Length of string from the saddle to where it is held.";
    let tail = at.spec("afterlength_mm.tail", "afterlength behind the saddle", 5.0, help);
    length(ui, form, "Behind the saddle", &tail, &mut string.afterlength_mm.tail);
}

/// Measured values; the hint of an empty field shows the computed one.
fn measured(ui: &mut Ui, form: &mut Form, at: &At, string: &mut PlanString, report: Option<&StringReport>) {
    remark(ui, form, "Measured values; empty fields are computed from the figures above.");
    let hint = |value: Option<f64>| value.map(|v| significant(v, 4)).unwrap_or_default();
    row(ui, "Mass per length", |ui| {
        let hint = hint(report.map(|r| r.unit_mass_kg_per_m * GRAMS));
        let help = "Weigh a known length of the string.";
        let spec =
            at.spec("measured.unit_mass_kg_per_m", "measured mass per length, g/m", 0.01, help).hint(&hint);
        grams(ui, form, &spec, &mut string.measured.unit_mass_kg_per_m);
        unit(ui, form, "g/m");
    });
    faults(ui, form, &[&at.path("measured.unit_mass_kg_per_m")]);
    row(ui, "Axial stiffness", |ui| {
        let hint = hint(report.map(|r| r.axial_stiffness_n));
        let help = "Force for a small further stretch at pitch, per unit of strain: what the string gives when it is pulled sharp.";
        let spec =
            at.spec("measured.axial_stiffness_n", "measured axial stiffness, N", 100.0, help).hint(&hint);
        number::optional(ui, form, &spec, &mut string.measured.axial_stiffness_n);
        unit(ui, form, "N");
    });
    faults(ui, form, &[&at.path("measured.axial_stiffness_n")]);
    row(ui, "Bending stiffness", |ui| {
        let hint = hint(report.map(|r| r.bending_stiffness_n_mm2));
        let help = "From the string's inharmonicity, where it has been measured.";
        let spec = at
            .spec("measured.bending_stiffness_n_mm2", "measured bending stiffness, N·mm²", 1.0, help)
            .hint(&hint);
        number::optional(ui, form, &spec, &mut string.measured.bending_stiffness_n_mm2);
        unit(ui, form, "N·mm²");
    });
    faults(ui, form, &[&at.path("measured.bending_stiffness_n_mm2")]);
}

/// A field in grams per metre for a value in kilograms per metre.
fn grams(ui: &mut Ui, form: &mut Form, spec: &Spec, value: &mut Option<f64>) {
    let shown = value.map(|kg| parse::shown(without_dust(kg * GRAMS))).unwrap_or_default();
    let read = |text: &str| match text.trim() {
        "" => Ok(None),
        some => parse::number(some).map(|grams| Some(grams / GRAMS)),
    };
    number::typed(ui, form, spec, &shown, read, |new| *value = new);
}

/// A number to so many significant digits, written plainly.
fn significant(value: f64, digits: usize) -> String {
    let rounded: f64 = format!("{value:.*e}", digits.saturating_sub(1)).parse().unwrap_or(value);
    parse::shown(rounded)
}

fn figures(ui: &mut Ui, form: &Form, report: &StringReport) {
    let text = format!(
        "Tension {:.1} N · strain {:.3} % · bending length {:.2} mm · inharmonicity {}",
        report.tension_n,
        report.strain * 100.0,
        report.bending_length_mm,
        significant(report.inharmonicity, 3),
    );
    remark(ui, form, &text);
}
