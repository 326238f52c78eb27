//! How a string is made, chosen from the table: its gauge stays, and core, wrap and their figures follow.

use crestline_plan::{Plan, PlanString, StringMake, estimates};
use eframe::egui::{ComboBox, RichText, Ui};

use crate::fields::form::Form;
use crate::fields::row::{remark, row};

/// Said where the table does not know the string's materials.
const OWN: &str = "as entered";

/// The choice.
pub fn choice(ui: &mut Ui, form: &mut Form, plan: &mut Plan, index: usize) {
    let (scale_mm, reference_hz) = (plan.scale_of_mm(index), plan.reference_hz);
    let Some(string) = plan.strings.get_mut(index) else { return };
    let now = StringMake::of(string);
    let mut chosen = None;
    row(ui, "Made of", |ui| {
        let words = now.map_or_else(|| OWN.to_owned(), |make| make.words());
        let combo = ComboBox::from_id_salt(("make", index))
            .width(ui.available_width())
            .truncate()
            .selected_text(&words);
        let response = combo.show_ui(ui, |ui| {
            for make in StringMake::all() {
                if ui.selectable_label(now == Some(make), make.words()).clicked() {
                    chosen = Some(make);
                }
            }
        });
        let help = "Core, wrap, densities, modulus and strength of the table for this gauge; all of it can be changed below.";
        let response = response.response.on_hover_text(help);
        response.ctx.accesskit_node_builder(response.id, |node| {
            node.set_label(format!("String {}: made of {words}", index + 1));
            node.set_description(help);
        });
    });
    let Some(make) = chosen else { return };
    let Some(frequency_hz) = string.frequency_hz(reference_hz) else { return };
    make.string(string, gauge_mm(string), scale_mm, frequency_hz);
    form.edited(format!("String {}: made of", index + 1));
}

/// Lets what still is the table's follow the gauges that differ from `before`.
pub fn follow(before: &[PlanString], plan: &mut Plan) {
    for (index, before) in before.iter().enumerate() {
        let (scale_mm, reference_hz) = (plan.scale_of_mm(index), plan.reference_hz);
        let Some(string) = plan.strings.get_mut(index) else { continue };
        let same_build =
            before.wrap.is_some() == string.wrap.is_some() && before.core.material == string.core.material;
        if !same_build || gauge_mm(before) == gauge_mm(string) {
            continue;
        }
        if let Some(frequency_hz) = string.frequency_hz(reference_hz) {
            StringMake::follow(before, string, scale_mm, frequency_hz);
        }
    }
}

/// The gauge: outside diameter of a wound string, diameter of a plain one.
fn gauge_mm(string: &PlanString) -> f64 {
    string.wrap.as_ref().map_or(string.core.diameter_mm, |wrap| wrap.outside_mm)
}

/// What of the string is an estimate.
pub fn estimated(ui: &mut Ui, form: &Form, plan: &Plan, index: usize) {
    for estimate in estimates(plan).iter().filter(|estimate| estimate.string as usize == index + 1) {
        let text = format!("● Estimate: {}.", estimate.text);
        ui.label(RichText::new(text).small().color(form.palette.caution));
    }
    if StringMake::of(&plan.strings[index]).is_none() {
        remark(ui, form, "The table does not know these materials; every figure is yours.");
    }
}
