//! What to measure next: the ranked list in plain words.

use crestline_plan::{MeasureNext, Shares, measure_next};
use eframe::egui::{Frame, Label, Margin, RichText, Stroke, Ui, accesskit};

use crate::results::figures::fixed;
use crate::results::notices::sentence;
use crate::theme::{Palette, size};
use crate::units::LengthUnit;

/// The list; without shares, that they are yet to come.
pub fn show(ui: &mut Ui, palette: &Palette, shares: Option<&Shares>) {
    ui.label(RichText::new("What to measure next").heading());
    let Some(shares) = shares else {
        ui.label(RichText::new("This follows when the sample is done.").color(palette.quiet));
        return;
    };
    let unit = LengthUnit::of(ui.ctx());
    let words = format!(
        "The ideal setbacks are known to ± {}: nine of ten instruments lie within (root mean square over the strings). \
         What would narrow that most comes first.",
        unit.words(shares.plus_minus_mm)
    );
    ui.add(Label::new(RichText::new(words).small().color(palette.quiet)).wrap());
    let list = measure_next(shares);
    if list.is_empty() {
        ui.label("Nothing that could be measured would narrow the setbacks by as much as they are given to.");
    }
    for (index, next) in list.iter().enumerate() {
        one(ui, palette, index, next, unit, list.len());
    }
}

fn one(ui: &mut Ui, palette: &Palette, index: usize, next: &MeasureNext, unit: LengthUnit, count: usize) {
    let title = format!("{}. {}", index + 1, sentence(&next.text));
    let gain = format!(
        "Known exactly, it makes the setbacks {} surer: ± {} becomes ± {}. It brings {} % of the variance.",
        unit.words(next.gain_mm),
        unit.figure(next.plus_minus_mm),
        unit.words(next.then_plus_minus_mm),
        fixed(100.0 * next.share, 0),
    );
    let frame = Frame::new()
        .stroke(Stroke::new(size::EDGE, palette.edge))
        .corner_radius(size::CORNER)
        .inner_margin(Margin::symmetric(8, 4));
    let response = frame
        .show(ui, |ui| {
            ui.set_min_width(ui.available_width());
            ui.spacing_mut().item_spacing.y = 1.0;
            ui.add(Label::new(RichText::new(&title).strong()).wrap());
            ui.add(Label::new(RichText::new(&gain).small().color(palette.quiet)).wrap());
        })
        .response;
    response.ctx.accesskit_node_builder(response.id, |node| {
        node.set_role(accesskit::Role::ListItem);
        node.set_label(format!("{title}. {gain}"));
        node.set_position_in_set(index);
        node.set_size_of_set(count);
    });
}
