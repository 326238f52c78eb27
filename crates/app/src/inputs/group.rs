//! A group of fields under a heading that folds it away.

use std::collections::BTreeSet;

use eframe::egui::{Align, Button, CornerRadius, Frame, Layout, Margin, RichText, Stroke, Ui, accesskit};

use crate::edit::command::Command;
use crate::fields::form::Form;
use crate::theme::size;
use crate::view::Group;

/// A group with its heading; the heading says how many of its fields are wrong.
pub fn show(
    ui: &mut Ui,
    form: &mut Form,
    folded: &BTreeSet<Group>,
    group: Group,
    contents: impl FnOnce(&mut Ui, &mut Form),
) {
    let is_open = !folded.contains(&group);
    let palette = form.palette;
    let edge = Stroke::new(size::EDGE, palette.edge);
    Frame::new().fill(palette.sheet).stroke(edge).corner_radius(size::CORNER).show(ui, |ui| {
        heading(ui, form, group, is_open);
        if is_open {
            Frame::new().inner_margin(Margin { left: 10, right: 8, top: 2, bottom: 8 }).show(ui, |ui| {
                ui.set_min_width(ui.available_width());
                contents(ui, form);
            });
        }
    });
    ui.add_space(2.0);
}

fn heading(ui: &mut Ui, form: &mut Form, group: Group, is_open: bool) {
    let wrong = wrong_fields(form, group);
    let sign = if is_open { "▾" } else { "▸" };
    let button = Button::new(RichText::new(format!("{sign}  {}", group.name())).strong())
        .fill(form.palette.band)
        .stroke(Stroke::NONE)
        .corner_radius(CornerRadius::same(3))
        .right_text(if wrong > 0 {
            RichText::new(format!("▲ {wrong} to mend")).small().color(form.palette.fault)
        } else {
            RichText::new("")
        })
        .min_size([ui.available_width(), 24.0].into());
    let response = ui.with_layout(Layout::top_down_justified(Align::LEFT), |ui| ui.add(button)).inner;
    response.ctx.accesskit_node_builder(response.id, |node| {
        node.set_label(group.name());
        node.set_expanded(is_open);
        node.set_role(accesskit::Role::Button);
    });
    if response.clicked() {
        form.commands.push(Command::Fold(group));
    }
}

/// The number of fields of this group that are wrong.
fn wrong_fields(form: &Form, group: Group) -> usize {
    let typed = form.drafts.errors().map(|(path, _)| path);
    let checked = form.faults.iter().map(|fault| fault.path.as_str());
    let paths: BTreeSet<&str> = typed.chain(checked).filter(|path| Group::of_path(path) == group).collect();
    paths.len()
}
