//! A field for a list of numbers.

use eframe::egui::{Response, Ui};

use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::parse;
use crate::fields::row::row;

/// A wide field for numbers parted by blanks.
pub fn numbers(ui: &mut Ui, form: &mut Form, spec: &Spec, values: &mut Vec<f64>) -> Response {
    let spec = spec.clone().words().width(ui.available_width());
    let shown = parse::shown_list(values);
    number::typed(ui, form, &spec, &shown, parse::list, |new| *values = new)
}

/// The same behind a label.
pub fn labelled(ui: &mut Ui, form: &mut Form, label: &str, spec: &Spec, values: &mut Vec<f64>) {
    row(ui, label, |ui| numbers(ui, form, spec, values));
}
