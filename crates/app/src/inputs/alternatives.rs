//! Other sets of strings and other tunings that the same saddle must suit.

use crestline_plan::{Alternative, OtherStrings, Pitch, Plan, PlanString, limits};
use eframe::egui::{Button, RichText, Ui};

use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::row::{faults, remark, row};
use crate::fields::{pitch, text};
use crate::theme::size;

const WEIGHT: &str = "What the squared errors count against those of the other sets, 0.01 to 100.";

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    remark(
        ui,
        form,
        "Setbacks are then those that suit all sets together; Compare shows what each set keeps.",
    );
    if !plan.alternatives.is_empty() {
        row(ui, "Plan's own weight", |ui| {
            let spec = Spec::new("strings_weight", "Weight of the plan's own strings", 0.5, WEIGHT);
            number::number(ui, form, &spec, &mut plan.strings_weight);
        });
        faults(ui, form, &["strings_weight"]);
    }
    let mut removed = None;
    let Plan { alternatives, strings, .. } = plan;
    for (index, alternative) in alternatives.iter_mut().enumerate() {
        ui.separator();
        if one(ui, form, index, alternative, strings) {
            removed = Some(index);
        }
    }
    if let Some(index) = removed {
        let name = plan.alternatives.remove(index).name;
        // What was typed belongs to places that are others' now.
        form.drafts.clear();
        form.edited(format!("Remove {name}"));
    }
    ui.add_space(size::GAP);
    let has_room = plan.alternatives.len() < limits::ALTERNATIVES;
    let add = ui.add_enabled(has_room, Button::new("Add a change of tuning"));
    if add.on_hover_text("The plan's own strings at other pitches, such as a dropped sixth.").clicked() {
        add_tuning(plan);
        form.edited("Add a change of tuning");
    }
}

/// One alternative; whether it is to be removed.
fn one(
    ui: &mut Ui,
    form: &mut Form,
    index: usize,
    alternative: &mut Alternative,
    strings: &[PlanString],
) -> bool {
    let path = format!("alternatives[{index}]");
    let called = format!("Other set {}", index + 1);
    let mut is_removed = false;
    row(ui, "Name", |ui| {
        let spec = Spec::new(format!("{path}.name"), format!("{called}: name"), 0.0, "A name for tables.");
        let room = ui.available_width() - REMOVE;
        text::line(ui, form, &spec.words().width(room), &mut alternative.name);
        let name = format!("Remove {}", alternative.name);
        let response = ui.button("Remove").on_hover_text(&name);
        response.ctx.accesskit_node_builder(response.id, |node| node.set_label(name));
        is_removed = response.clicked();
    });
    row(ui, "Weight", |ui| {
        let spec = Spec::new(format!("{path}.weight"), format!("{called}: weight"), 0.5, WEIGHT);
        number::number(ui, form, &spec, &mut alternative.weight);
    });
    match &mut alternative.other {
        OtherStrings::Pitches(pitches) => tuning(ui, form, &path, &called, pitches, strings),
        OtherStrings::Strings(strings) => {
            let list: Vec<String> = strings.iter().map(string_words).collect();
            ui.label(RichText::new(list.join("   ")).small());
            remark(ui, form, "A whole set of strings; it is changed in the plan file.");
        }
    }
    faults(ui, form, &[&path]);
    is_removed
}

/// Room for the button that removes, points.
const REMOVE: f32 = 84.0;
/// Width of a pitch, and how many stand side by side.
const PITCH: f32 = 56.0;
const ABREAST: usize = 4;

/// A pitch a string; an empty field leaves the string at its own.
fn tuning(
    ui: &mut Ui,
    form: &mut Form,
    path: &str,
    called: &str,
    pitches: &mut [Option<Pitch>],
    strings: &[PlanString],
) {
    let mut fields: Vec<_> = pitches.iter_mut().zip(strings).enumerate().collect();
    for line in fields.chunks_mut(ABREAST) {
        ui.horizontal(|ui| {
            for (index, (value, string)) in line {
                let own = pitch::shown(&string.pitch);
                let help = "Empty where the string keeps its own pitch.";
                let name = format!("{called}: pitch of string {}", *index + 1);
                let spec = Spec::new(format!("{path}.pitches[{index}]"), name, 0.0, help).words();
                ui.label(RichText::new((*index + 1).to_string()).color(form.palette.quiet));
                pitch::optional(ui, form, &spec.width(PITCH).hint(&own), value);
            }
        });
    }
}

/// A string's pitch and gauge.
fn string_words(string: &PlanString) -> String {
    let gauge_mm = string.wrap.as_ref().map_or(string.core.diameter_mm, |wrap| wrap.outside_mm);
    let wound = if string.wrap.is_some() { "w" } else { "" };
    format!("{} {gauge_mm}{wound}", pitch::shown(&string.pitch))
}

/// Adds a tuning that changes nothing yet, under a name that is free.
fn add_tuning(plan: &mut Plan) {
    let is_free = |name: &String| plan.alternatives.iter().all(|other| other.name.trim() != name);
    let names = (1..).map(|number| format!("Tuning {number}"));
    let name = names.take(limits::ALTERNATIVES + 1).find(is_free).unwrap_or_default();
    let pitches = OtherStrings::Pitches(vec![None; plan.strings.len()]);
    plan.alternatives.push(Alternative::new(&name, pitches));
}
