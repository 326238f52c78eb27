//! The saddle to be made.

use crestline_plan::{AsBuilt, Plan, SaddleStyle};
use eframe::egui::Ui;

use super::instrument::length;
use super::lists;
use crate::fields::choice::{self, Choice};
use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::row::{faults, row, unit};

const STYLES: [Choice<SaddleStyle>; 4] = [
    (
        SaddleStyle::Straight,
        "Straight",
        "One straight crest across all strings, at the slant that suits them best.",
    ),
    (SaddleStyle::TwoPiece, "Two-piece", "Two straight crests, parted after a string."),
    (SaddleStyle::Shaped, "Shaped", "A straight thick blank, the crest filed string by string on its top."),
    (SaddleStyle::Separate, "Separate", "A piece for each string, set on its own."),
];

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    let last = u32::try_from(plan.strings.len().saturating_sub(1)).unwrap_or(1);
    if choice::buttons(ui, form, "saddle.style", "Saddle style", &STYLES, &mut plan.saddle.style)
        && plan.saddle.style == SaddleStyle::TwoPiece
    {
        plan.saddle.split_after.get_or_insert(last.div_ceil(2).max(1));
    }
    faults(ui, form, &["saddle.style"]);
    if let (SaddleStyle::TwoPiece, Some(after)) = (plan.saddle.style, &mut plan.saddle.split_after) {
        row(ui, "First piece up to string", |ui| {
            let spec = Spec::new(
                "saddle.split_after",
                "First piece carries strings 1 to",
                1.0,
                "The last string on the first piece.",
            );
            number::whole(ui, form, &spec, after);
        });
    }
    faults(ui, form, &["saddle.split_after"]);
    let thickness = Spec::new(
        "saddle.thickness_mm",
        "Thickness of the blank",
        0.1,
        "Thickness of the saddle blank along the strings.",
    );
    length(ui, form, "Blank thickness", &thickness, &mut plan.saddle.thickness_mm);
    let help = "What is left in front of and behind a filed crest on the blank's top.";
    let margin = Spec::new("saddle.edge_margin_mm", "Margin at the blank's edges", 0.1, help);
    length(ui, form, "Edge margin", &margin, &mut plan.saddle.edge_margin_mm);
    travel(ui, form, "saddle.travel_mm", "Crest setback", &mut plan.saddle.travel_mm);
    as_built(ui, form, plan);
}

/// The least and the greatest setback, side by side.
pub fn travel(ui: &mut Ui, form: &mut Form, path: &str, name: &str, travel_mm: &mut [f64; 2]) {
    let [least, greatest] = travel_mm;
    row(ui, &format!("{name} from"), |ui| {
        let help = "The least setback that the bridge or fingerboard allows.";
        let spec = Spec::new(format!("{path}[0]"), format!("{name}, least"), 0.5, help).width(64.0);
        number::length(ui, form, &spec, least);
        ui.label("to");
        let help = "The greatest setback that the bridge or fingerboard allows.";
        let spec = Spec::new(format!("{path}[1]"), format!("{name}, greatest"), 0.5, help).width(64.0);
        number::length(ui, form, &spec, greatest);
        unit(ui, form, form.unit.sign());
    });
    faults(ui, form, &[path]);
}

/// Where crests and nut edges are now.
fn as_built(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    let count = plan.strings.len();
    let mut known = plan.as_built.is_some();
    row(ui, "Existing instrument", |ui| {
        let meaning = "Where the crests and nut edges of an existing instrument are; its errors are then shown as well.";
        if choice::tick(ui, form, "as_built", "Setbacks known", meaning, &mut known) {
            let zeros = vec![0.0; count];
            plan.as_built =
                known.then(|| AsBuilt { saddle_setback_mm: zeros.clone(), nut_setback_mm: zeros });
        }
    });
    if let Some(built) = &mut plan.as_built {
        let help = "Setback of every crest as it is now, string 1 first.";
        let spec = Spec::new("as_built.saddle_setback_mm", "Crests as they are", 0.0, help);
        lists::labelled_lengths(ui, form, "Crests now", &spec, &mut built.saddle_setback_mm);
        let help = "Setback of every nut edge as it is now, string 1 first.";
        let spec = Spec::new("as_built.nut_setback_mm", "Nut edges as they are", 0.0, help);
        lists::labelled_lengths(ui, form, "Nut edges now", &spec, &mut built.nut_setback_mm);
    }
    faults(ui, form, &["as_built"]);
}
