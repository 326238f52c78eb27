//! The plan's title and notes.

use crestline_plan::Plan;
use eframe::egui::Ui;

use crate::fields::form::Form;
use crate::fields::number::Spec;
use crate::fields::text;

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    let width = ui.available_width();
    let title = Spec::new("title", "Title", 0.0, "A name for the plan; it stands on the drawing.")
        .width(width)
        .hint("Title");
    text::line(ui, form, &title, &mut plan.title);
    let notes = Spec::new("notes", "Notes", 0.0, "")
        .width(width)
        .hint("Notes: where the figures come from, what to remember");
    text::lines(ui, form, &notes, 4, &mut plan.notes);
}
