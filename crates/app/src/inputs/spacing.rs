//! Spacing of the strings across the neck.

use crestline_plan::{Across, Plan, Spread};
use eframe::egui::Ui;

use super::instrument::length;
use super::lists;
use crate::fields::choice::{self, Choice};
use crate::fields::form::Form;
use crate::fields::number::Spec;
use crate::fields::row::{faults, faults_of_whole, row};

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    const CHOICES: [Choice<bool>; 2] = [
        (
            false,
            "Equal",
            "The outer strings' distance; the inner strings are spaced equally by their centres.",
        ),
        (true, "Each string", "The place of every string across the neck, for paired courses and the like."),
    ];
    let mut each = plan.instrument.across_mm.is_some();
    row(ui, "String spacing", |ui| {
        if choice::buttons(ui, form, "instrument.spread_mm", "String spacing", &CHOICES, &mut each) {
            change_kind(plan, each);
        }
    });
    match &mut plan.instrument.across_mm {
        Some(across) => across_fields(ui, form, across),
        None => spread_fields(ui, form, plan),
    }
}

fn spread_fields(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    let Some(spread) = &mut plan.instrument.spread_mm else { return };
    let help = "Distance of the outer strings' centres, square to the centre line.";
    let nut = Spec::new("instrument.spread_mm.nut", "Outer strings apart at the nut", 0.5, help).fractions();
    length(ui, form, "Outer strings, nut", &nut, &mut spread.nut);
    let saddle =
        Spec::new("instrument.spread_mm.saddle", "Outer strings apart at the saddle", 0.5, help).fractions();
    length(ui, form, "Outer strings, saddle", &saddle, &mut spread.saddle);
    faults_of_whole(ui, form, "instrument.spread_mm");
}

fn across_fields(ui: &mut Ui, form: &mut Form, across: &mut Across) {
    let help = "Place of every string across the neck, string 1 first; positive toward string 1, \
                zero on the centre line.";
    let nut = Spec::new("instrument.across_mm.nut", "Places of the strings at the nut", 0.0, help);
    lists::labelled_lengths(ui, form, "At the nut", &nut, &mut across.nut);
    let saddle = Spec::new("instrument.across_mm.saddle", "Places of the strings at the saddle", 0.0, help);
    lists::labelled_lengths(ui, form, "At the saddle", &saddle, &mut across.saddle);
    faults(ui, form, &["instrument.across_mm"]);
}

/// Turns the spread into places, or the outer places into a spread.
fn change_kind(plan: &mut Plan, each: bool) {
    let count = plan.strings.len();
    if each {
        let spread = plan.instrument.spread_mm.unwrap_or(Spread { nut: 0.0, saddle: 0.0 });
        let across = Across { nut: equal(spread.nut, count), saddle: equal(spread.saddle, count) };
        plan.instrument.across_mm = Some(across);
    } else if let Some(across) = plan.instrument.across_mm.take() {
        let spread = Spread { nut: width(&across.nut), saddle: width(&across.saddle) };
        plan.instrument.spread_mm.get_or_insert(spread);
    }
}

/// `count` places over `width_mm`, equally spaced about the centre line, the treble side first.
fn equal(width_mm: f64, count: usize) -> Vec<f64> {
    let gaps = count.saturating_sub(1).max(1) as f64;
    let place = |i: usize| 0.5 * width_mm - width_mm * i as f64 / gaps;
    (0..count).map(|i| (place(i) * 1000.0).round() / 1000.0).collect()
}

fn width(places_mm: &[f64]) -> f64 {
    match (places_mm.first(), places_mm.last()) {
        (Some(first), Some(last)) => first - last,
        _ => 0.0,
    }
}
