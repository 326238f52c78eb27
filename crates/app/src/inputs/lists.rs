//! A field for a list of numbers.

use eframe::egui::{Response, Ui};

use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::parse;
use crate::fields::row::row;
use crate::units::{self, Fineness};

/// A wide field for numbers parted by blanks.
pub fn numbers(ui: &mut Ui, form: &mut Form, spec: &Spec, values: &mut Vec<f64>) -> Response {
    let spec = spec.clone().words().width(ui.available_width());
    let shown = parse::shown_list(values);
    number::typed(ui, form, &spec, &shown, parse::list, |new| *values = new)
}

/// A wide field for lengths parted by blanks, in the unit of the window; its name gets the unit.
pub fn lengths(ui: &mut Ui, form: &mut Form, spec: &Spec, values_mm: &mut Vec<f64>) -> Response {
    let unit = form.unit;
    let shown: Vec<String> = values_mm.iter().map(|mm| unit.shown(*mm, Fineness::Decimals)).collect();
    let shown = shown.join("  ");
    let draft = form.drafts.get(&spec.path);
    let start_mm = draft.and_then(|draft| draft.start_mm.clone()).unwrap_or_else(|| values_mm.clone());
    let start = draft.map_or_else(|| shown.clone(), |draft| draft.start.clone());
    let read = |text: &str| if text == start { Ok(start_mm.clone()) } else { units::list(text, unit) };
    let spec = Spec { name: unit.named(&spec.name), ..spec.clone() }.words().width(ui.available_width());
    let response = number::typed(ui, form, &spec, &shown, read, |new| *values_mm = new);
    form.drafts.keep_start_mm(&spec.path, start_mm);
    response
}

/// The same behind a label that gets the unit too.
pub fn labelled_lengths(ui: &mut Ui, form: &mut Form, label: &str, spec: &Spec, values_mm: &mut Vec<f64>) {
    let label = form.unit.named(label);
    row(ui, &label, |ui| lengths(ui, form, spec, values_mm));
}

/// A field for numbers behind a label.
pub fn labelled(ui: &mut Ui, form: &mut Form, label: &str, spec: &Spec, values: &mut Vec<f64>) {
    row(ui, label, |ui| numbers(ui, form, spec, values));
}
