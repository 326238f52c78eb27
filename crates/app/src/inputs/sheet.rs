//! Paper, units and datum of the drawing.

use crestline_plan::{Datum, Paper, Plan, Units};
use eframe::egui::Ui;

use crate::edit::command::Command;
use crate::fields::choice::{self, Choice};
use crate::fields::form::Form;
use crate::fields::row::row;
use crate::view::Page;

const PAPERS: [Choice<Paper>; 3] = [
    (Paper::A4, "A4", "210 × 297 mm"),
    (Paper::A3, "A3", "297 × 420 mm"),
    (Paper::Letter, "Letter", "8.5 × 11 in"),
];
const UNITS: [Choice<Units>; 2] =
    [(Units::Mm, "mm", "Dimensions in millimetres."), (Units::Inch, "inch", "Dimensions in inches.")];
const DATUMS: [Choice<Datum>; 3] = [
    (Datum::Nut, "Nut", "Measured from the nominal nut line."),
    (Datum::TwelfthFret, "Fret 12", "Measured from the crown of fret 12."),
    (Datum::SaddleLine, "Saddle line", "Measured from the nominal saddle line."),
];

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    row(ui, "Paper", |ui| choice::buttons(ui, form, "sheet.paper", "Paper", &PAPERS, &mut plan.sheet.paper));
    row(ui, "Units", |ui| choice::buttons(ui, form, "sheet.units", "Units", &UNITS, &mut plan.sheet.units));
    row(ui, "Datum", |ui| choice::buttons(ui, form, "sheet.datum", "Datum", &DATUMS, &mut plan.sheet.datum));
    if ui.button("Show the sheets").clicked() {
        form.commands.push(Command::ShowPage(Page::Sheets));
    }
}
