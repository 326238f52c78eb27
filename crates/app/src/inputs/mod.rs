//! The inputs beside the results, in the groups in which a builder thinks of them.

mod about;
mod alternatives;
mod fit;
mod group;
mod instrument;
mod lists;
mod make;
mod nut;
mod pressing;
mod saddle;
mod sheet;
mod spacing;
mod string_detail;
mod string_table;
mod wrap;

use std::collections::BTreeSet;

use crestline_plan::{Plan, StringReport};
use eframe::egui::{ScrollArea, Ui};

use crate::fields::form::Form;
use crate::view::Group;

/// What the inputs need to know about the window.
pub struct Surroundings<'a> {
    /// The chosen string, 0 first.
    pub string: usize,
    /// The groups that are folded away.
    pub folded: &'a BTreeSet<Group>,
    /// The chosen string's figures, for the hints of fields that override them.
    pub report: Option<&'a StringReport>,
}

/// All groups, one below the other.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan, around: &Surroundings) {
    ScrollArea::vertical().auto_shrink([false, false]).show(ui, |ui| {
        let folded = around.folded;
        group::show(ui, form, folded, Group::About, |ui, form| about::show(ui, form, plan));
        group::show(ui, form, folded, Group::Instrument, |ui, form| instrument::show(ui, form, plan));
        group::show(ui, form, folded, Group::Strings, |ui, form| {
            let before = plan.strings.clone();
            string_table::show(ui, form, plan, around.string);
            string_detail::show(ui, form, plan, around);
            if form.edit.is_some() {
                make::follow(&before, plan);
            }
        });
        group::show(ui, form, folded, Group::Alternatives, |ui, form| alternatives::show(ui, form, plan));
        group::show(ui, form, folded, Group::Saddle, |ui, form| saddle::show(ui, form, plan));
        group::show(ui, form, folded, Group::Nut, |ui, form| nut::show(ui, form, plan));
        group::show(ui, form, folded, Group::Pressing, |ui, form| pressing::show(ui, form, plan));
        group::show(ui, form, folded, Group::Fit, |ui, form| fit::show(ui, form, plan));
        group::show(ui, form, folded, Group::Sheet, |ui, form| sheet::show(ui, form, plan));
    });
}
