//! How strings are pressed, and how nut, fret and saddle hold them.

use crestline_plan::{Plan, Supports};
use eframe::egui::Ui;

use super::instrument::length;
use crate::fields::choice::{self, Choice};
use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::row::{faults, remark, row};

const PRESETS: [Choice<Preset>; 4] = [
    (
        Preset([0.5, 0.5, 0.5]),
        "runs on",
        "The string runs on over nut, fret and saddle without friction; the usual choice.",
    ),
    (Preset([0.0, 0.0, 0.0]), "pinned", "Nut, fret and saddle let the string turn freely."),
    (Preset([1.0, 1.0, 1.0]), "clamped", "Nut, fret and saddle hold the string's direction."),
    (
        Preset([0.0, 0.0, 1.0]),
        "clamped saddle",
        "The saddle holds the string's direction, nut and fret let it turn.",
    ),
];

/// Fixities at nut, fret and saddle.
#[derive(Clone, Copy, PartialEq)]
struct Preset([f64; 3]);

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    fraction(
        ui,
        form,
        "Finger behind the fret",
        Spec::new(
            "pressing.finger_fraction",
            "Finger behind the fret, as a fraction of the fret's space",
            0.01,
            "How far behind the fret the finger presses, as a fraction of the space to the fret before.",
        ),
        &mut plan.pressing.finger_fraction,
    );
    let help = "How far the finger pushes the string below the crown. 0 is a touch that only just seats it.";
    let depth = Spec::new("pressing.depth_mm", "Press depth", 0.05, help);
    length(ui, form, "Press depth", &depth, &mut plan.pressing.depth_mm);
    supports(ui, form, &mut plan.supports);
    let gripped = "0 where the string is gripped, 1 where it slides without friction while it is pressed.";
    fraction(
        ui,
        form,
        "Slip over the nut",
        Spec::new("slip.head", "Slip over the nut", 0.05, gripped),
        &mut plan.slip.head,
    );
    fraction(
        ui,
        form,
        "Slip over the saddle",
        Spec::new("slip.tail", "Slip over the saddle", 0.05, gripped),
        &mut plan.slip.tail,
    );
}

fn supports(ui: &mut Ui, form: &mut Form, supports: &mut Supports) {
    let mut preset = Preset([supports.nut, supports.fret, supports.saddle]);
    ui.label("Supports");
    if choice::buttons(ui, form, "supports.preset", "Supports", &PRESETS, &mut preset) {
        let [nut, fret, saddle] = preset.0;
        *supports = Supports { nut, fret, saddle };
    }
    let meaning =
        "0 lets the string turn freely, 1 holds its direction, ½ is a string that runs on over the support.";
    fraction(
        ui,
        form,
        "Fixity at the nut",
        Spec::new("supports.nut", "Fixity at the nut", 0.05, meaning),
        &mut supports.nut,
    );
    fraction(
        ui,
        form,
        "Fixity at the fret",
        Spec::new("supports.fret", "Fixity at the fret", 0.05, meaning),
        &mut supports.fret,
    );
    let saddle = Spec::new("supports.saddle", "Fixity at the saddle", 0.05, meaning);
    fraction(ui, form, "Fixity at the saddle", saddle, &mut supports.saddle);
    remark(ui, form, "0 turns freely, 1 keeps its direction, ½ runs on.");
}

fn fraction(ui: &mut Ui, form: &mut Form, label: &str, spec: Spec, value: &mut f64) {
    row(ui, label, |ui| number::number(ui, form, &spec, value));
    faults(ui, form, &[&spec.path]);
}
