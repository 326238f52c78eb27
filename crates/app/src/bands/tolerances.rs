//! How far the plan's figures can be trusted: a group of fields that its heading folds away.

use crestline_plan::{OwnTolerance, Plan, Tolerances};
use eframe::egui::{Button, Label, RichText, Ui};

use super::fields::{self, Measure, OF_KIND};
use crate::edit::command::Command;
use crate::fields::form::Form;
use crate::fields::parse;
use crate::fields::row::faults_of_whole;
use crate::theme::size;
use crate::units::Fineness;

/// The group.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan, is_open: &mut bool) {
    ui.horizontal_wrapped(|ui| {
        heading(ui, is_open);
        let is_usual = plan.tolerances == Some(Tolerances::default());
        let help =
            "The plan then carries them, and setbacks get a ± in schedule and drawing. Undo takes it back.";
        button(ui, form, Command::TakeTolerances, !is_usual, help);
        let help =
            "The plan is then as if all its figures were exact, and this page goes by the usual tolerances.";
        button(ui, form, Command::LeaveOutTolerances, plan.tolerances.is_some(), help);
        let state = match (&plan.tolerances, is_usual) {
            (None, _) => "none in the plan",
            (Some(_), true) => "in the plan, as usual",
            (Some(_), false) => "in the plan, changed",
        };
        ui.label(RichText::new(state).small().color(form.palette.quiet));
    });
    faults_of_whole(ui, form, "tolerances");
    if *is_open {
        contents(ui, form, plan);
    }
}

fn heading(ui: &mut Ui, is_open: &mut bool) {
    const NAME: &str = "Tolerances";
    let sign = if *is_open { "▾" } else { "▸" };
    let response = ui.add(Button::new(RichText::new(format!("{sign}  {NAME}")).strong()));
    let open = *is_open;
    response.ctx.accesskit_node_builder(response.id, |node| {
        node.set_label(NAME);
        node.set_expanded(open);
    });
    if response.clicked() {
        *is_open = !open;
    }
}

fn button(ui: &mut Ui, form: &mut Form, command: Command, is_possible: bool, help: &str) {
    let response = ui.add_enabled(is_possible, Button::new(command.name())).on_hover_text(help);
    if response.clicked() {
        form.commands.push(command);
    }
}

fn contents(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    let words = "One standard deviation each: two of three figures lie within one of it, nineteen of twenty within two. \
                 “of it” is a share of the figure, 0.05 for five in a hundred. 0 stands for what is known exactly.";
    ui.add(Label::new(RichText::new(words).small().color(form.palette.quiet)).wrap());
    fields::edit(plan, |tolerances| {
        ui.label(RichText::new("Neck, finger, supports and the maker's hand").strong());
        fields::shared(ui, form, tolerances);
        ui.add_space(size::GAP);
        ui.label(RichText::new("Strings by their kind").strong());
        fields::of_kinds(ui, form, tolerances);
        own(ui, form, tolerances);
    });
}

/// Strings that have tolerances of their own; they are changed in the file.
fn own(ui: &mut Ui, form: &mut Form, tolerances: &mut Tolerances) {
    if tolerances.strings.is_empty() {
        return;
    }
    ui.add_space(size::GAP);
    ui.label(RichText::new("Strings that are known better or worse than their kind").strong());
    let mut removed = None;
    for (index, own) in tolerances.strings.iter().enumerate() {
        ui.horizontal_wrapped(|ui| {
            ui.label(own_words(own, form));
            let name = format!("Remove string {}'s own tolerances", own.string);
            let response = ui.button("Remove").on_hover_text(&name);
            response.ctx.accesskit_node_builder(response.id, |node| node.set_label(name.clone()));
            if response.clicked() {
                removed = Some((index, name));
            }
        });
        faults_of_whole(ui, form, &format!("tolerances.strings[{index}]"));
    }
    if let Some((index, name)) = removed {
        tolerances.strings.remove(index);
        form.edited(name);
    }
}

fn own_words(own: &OwnTolerance, form: &Form) -> String {
    let part = |row: &fields::OfKind| {
        let value = (row.own)(own)?;
        let figure = match row.measure {
            Measure::Length => format!("{} {}", form.unit.shown(value, Fineness::Decimals), form.unit.sign()),
            Measure::Cents => format!("{} cents", parse::shown(value)),
            Measure::Share | Measure::Part => format!("{} of it", parse::shown(value)),
        };
        Some(format!("{} {figure}", row.name.to_lowercase()))
    };
    let parts: Vec<String> = OF_KIND.iter().filter_map(part).collect();
    format!("String {}: {}.", own.string, parts.join("; "))
}
