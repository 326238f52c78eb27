//! Fields for text.

use eframe::egui::{Id, Response, TextEdit, Ui, Vec2};

use super::form::Form;
use super::number::{Spec, describe, tip};
use crate::edit::history::Edit;
use crate::theme::size;

/// A field for one line of text.
pub fn line(ui: &mut Ui, form: &mut Form, spec: &Spec, value: &mut String) -> Response {
    let id = Id::unique(("text", &spec.path, spec.place));
    let edit = TextEdit::singleline(value)
        .id(id)
        .frame(form.frame(ui, id, form.error(&spec.path).is_some()))
        .hint_text(spec.hint)
        .min_size(Vec2::new(0.0, size::FIELD_HEIGHT))
        .desired_width(spec.width);
    finish(ui, form, spec, id, edit)
}

/// A field for several lines of text.
pub fn lines(ui: &mut Ui, form: &mut Form, spec: &Spec, rows: usize, value: &mut String) -> Response {
    let id = Id::unique(("text", &spec.path, spec.place));
    let edit = TextEdit::multiline(value)
        .id(id)
        .frame(form.frame(ui, id, form.error(&spec.path).is_some()))
        .hint_text(spec.hint)
        .desired_width(spec.width)
        .desired_rows(rows);
    finish(ui, form, spec, id, edit)
}

fn finish(ui: &mut Ui, form: &mut Form, spec: &Spec, id: Id, edit: TextEdit) -> Response {
    let response = ui.add(edit);
    let error = form.error(&spec.path);
    describe(&response, spec, error.as_deref(), form.unit);
    form.arrive(ui, &spec.path, &response);
    if response.changed() {
        form.edit = Some(Edit { name: spec.name.clone(), gesture: Some(id) });
    }
    form.left |= response.lost_focus();
    tip(form, response, spec, error)
}
