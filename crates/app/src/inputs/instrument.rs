//! Neck and frets.

use crestline_plan::{Fan, Plan, Scale};
use eframe::egui::Ui;

use super::{lists, spacing};
use crate::fields::choice::{self, Choice};
use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::row::{faults, faults_of_whole, row, unit};

/// Action over fret 1 that a plan gets when its zero fret is taken away, mm: a common height; the user sets his own.
const FIRST_ACTION_MM: f64 = 0.4;

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    scale(ui, form, plan);
    row(ui, "Frets", |ui| {
        let spec = Spec::new("instrument.frets", "Number of frets", 1.0, "Number of frets on the neck.");
        number::whole(ui, form, &spec, &mut plan.instrument.frets);
    });
    faults(ui, form, &["instrument.frets"]);
    length(
        ui,
        form,
        "Relief",
        &Spec::new(
            "instrument.relief_mm",
            "Relief",
            0.05,
            "Greatest dip of the fret crowns below a straightedge laid from the first crown to the last.",
        ),
        &mut plan.instrument.relief_mm,
    );
    length(
        ui,
        form,
        "Fret height",
        &Spec::new(
            "instrument.fret_height_mm",
            "Fret height",
            0.05,
            "Height of the crowns above the fingerboard. A string cannot be pressed deeper than this.",
        ),
        &mut plan.instrument.fret_height_mm,
    );
    zero_fret(ui, form, plan);
    spacing::show(ui, form, plan);
    measured_frets(ui, form, plan);
}

/// A line with one field for a length.
pub fn length(ui: &mut Ui, form: &mut Form, label: &str, spec: &Spec, value: &mut f64) {
    row(ui, label, |ui| {
        number::length(ui, form, spec, value);
        unit(ui, form, form.unit.sign());
    });
    faults(ui, form, &[&spec.path]);
}

fn scale(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    const CHOICES: [Choice<bool>; 2] = [
        (false, "One scale", "All strings have the same scale along the centre line."),
        (true, "Fanned", "The outer strings have scales of their own, and the frets fan out."),
    ];
    let mut fanned = matches!(plan.instrument.scale, Scale::Fanned(_));
    row(ui, "Neck", |ui| {
        if choice::buttons(ui, form, "instrument.scale", "Neck", &CHOICES, &mut fanned) {
            change_kind(plan);
        }
    });
    match &mut plan.instrument.scale {
        Scale::Single(scale_mm) => {
            let help = "From the nominal nut line to the nominal saddle line, twice the way from the nut to fret 12. \
                        Without any compensation.";
            let spec = Spec::new("instrument.scale_mm", "Scale", 0.5, help).fractions();
            length(ui, form, "Scale", &spec, scale_mm);
        }
        Scale::Fanned(fan) => {
            fan_fields(ui, form, fan);
            faults_of_whole(ui, form, "instrument.scale_mm");
        }
    }
}

fn fan_fields(ui: &mut Ui, form: &mut Form, fan: &mut Fan) {
    let along = "Measured along the outer string's own line.";
    let treble = Spec::new("instrument.scale_mm.treble", "Scale on the treble side", 0.5, along).fractions();
    length(ui, form, "Scale, treble side", &treble, &mut fan.treble);
    let bass = Spec::new("instrument.scale_mm.bass", "Scale on the bass side", 0.5, along).fractions();
    length(ui, form, "Scale, bass side", &bass, &mut fan.bass);
    row(ui, "Square fret", |ui| {
        let help = "The fret that lies square to the centre line; it may be a fraction between two frets.";
        let spec = Spec::new("instrument.scale_mm.square_fret", "Square fret", 0.5, help);
        number::number(ui, form, &spec, &mut fan.square_fret);
    });
    faults(ui, form, &["instrument.scale_mm.square_fret"]);
}

/// Makes one scale of a fan, or a fan of one scale: the middle of the two, or the same on both sides.
fn change_kind(plan: &mut Plan) {
    plan.instrument.scale = match plan.instrument.scale {
        Scale::Single(scale_mm) => {
            plan.instrument.fret_positions_mm = None;
            Scale::Fanned(Fan { bass: scale_mm, treble: scale_mm, square_fret: 7.0 })
        }
        Scale::Fanned(fan) => Scale::Single(0.5 * (fan.bass + fan.treble)),
    };
}

fn zero_fret(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    row(ui, "At the nut", |ui| {
        let meaning = "A fret at the nut carries the open strings; the nut only spaces them.";
        if choice::tick(
            ui,
            form,
            "instrument.zero_fret",
            "Zero fret",
            meaning,
            &mut plan.instrument.zero_fret,
        ) {
            let first = (!plan.instrument.zero_fret).then_some(FIRST_ACTION_MM);
            for string in &mut plan.strings {
                string.action_mm.first = first;
            }
        }
    });
    faults(ui, form, &["instrument.zero_fret"]);
}

/// Measured positions instead of the rule; not for a fanned neck.
fn measured_frets(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    let Scale::Single(scale_mm) = plan.instrument.scale else { return };
    let frets = plan.instrument.frets;
    let positions = &mut plan.instrument.fret_positions_mm;
    let mut measured = positions.is_some();
    row(ui, "Fret positions", |ui| {
        let meaning = "Positions measured on the neck, instead of the twelfth root of two.";
        if choice::tick(ui, form, "instrument.fret_positions_mm", "Measured", meaning, &mut measured) {
            *positions = measured.then(|| equal_tempered_mm(scale_mm, frets));
        }
    });
    if let Some(positions) = positions {
        let spec = Spec::new(
            "instrument.fret_positions_mm",
            "Measured fret positions",
            0.0,
            "Distance of every fret's crown from the nominal nut line along the centre line, fret 1 first.",
        );
        lists::lengths(ui, form, &spec, positions);
    }
    faults(ui, form, &["instrument.fret_positions_mm"]);
}

/// Positions by the twelfth root of two, to a hundredth of a millimetre, for the user to correct.
fn equal_tempered_mm(scale_mm: f64, frets: u32) -> Vec<f64> {
    let place = |n: u32| scale_mm * (1.0 - (-f64::from(n) / 12.0).exp2());
    (1..=frets).map(|n| (place(n) * 100.0).round() / 100.0).collect()
}
