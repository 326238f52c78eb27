//! One line of a form: a label, a field or two, a unit, and below it what is wrong.

use eframe::egui::{Align, Label, Layout, Response, RichText, Ui, Vec2};

use super::form::Form;
use crate::theme::size;

/// A line with `label` on the left; `fields` draws the rest.
pub fn row<R>(ui: &mut Ui, label: &str, fields: impl FnOnce(&mut Ui) -> R) -> R {
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = size::GAP;
        let label_size = Vec2::new(size::LABEL, size::FIELD_HEIGHT);
        ui.allocate_ui_with_layout(label_size, Layout::left_to_right(Align::Center), |ui| {
            ui.set_min_size(label_size);
            ui.add(Label::new(label).truncate());
        });
        fields(ui)
    })
    .inner
}

/// A unit behind a field.
pub fn unit(ui: &mut Ui, form: &Form, text: &str) -> Response {
    ui.label(RichText::new(text).color(form.palette.quiet))
}

/// A line of explanation below fields.
pub fn remark(ui: &mut Ui, form: &Form, text: &str) {
    ui.label(RichText::new(text).small().color(form.palette.quiet));
}

/// What is wrong with the fields at the paths given and inside them, one line each.
pub fn faults(ui: &mut Ui, form: &Form, paths: &[&str]) {
    for error in paths.iter().flat_map(|path| form.errors_inside(path)) {
        fault_line(ui, form, &error);
    }
}

/// What is wrong with the whole of what stands at `path`, one line each; its parts have lines of their own.
pub fn faults_of_whole(ui: &mut Ui, form: &Form, path: &str) {
    for error in form.errors_at(path) {
        fault_line(ui, form, &error);
    }
}

/// One line about a fault.
pub fn fault_line(ui: &mut Ui, form: &Form, text: &str) {
    ui.horizontal_wrapped(|ui| {
        ui.label(RichText::new(format!("▲ {text}")).small().color(form.palette.fault));
    });
}
