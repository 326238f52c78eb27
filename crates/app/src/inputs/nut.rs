//! The nut to be made.

use crestline_plan::{NutStyle, Plan};
use eframe::egui::Ui;

use super::saddle::travel;
use crate::fields::choice::{self, Choice};
use crate::fields::form::Form;
use crate::fields::row::faults;

const STYLES: [Choice<NutStyle>; 3] = [
    (NutStyle::Plain, "Plain", "The nut edge stands on the nominal nut line."),
    (NutStyle::Common, "Common", "The fingerboard is shortened by the same amount for all strings."),
    (NutStyle::Shaped, "Shaped", "The nut edge is filed string by string."),
];

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    choice::buttons(ui, form, "nut.style", "Nut style", &STYLES, &mut plan.nut.style);
    faults(ui, form, &["nut.style"]);
    travel(ui, form, "nut.travel_mm", "Nut setback", &mut plan.nut.travel_mm);
}
