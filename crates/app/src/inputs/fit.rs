//! What the setbacks are to make small, and the tuning they are to serve.

use crestline_plan::{FitRule, Plan, Targets};
use eframe::egui::Ui;

use super::lists;
use crate::fields::choice::{self, Choice};
use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::parse;
use crate::fields::row::{faults, remark, row};

const RULES: [Choice<FitRule>; 4] = [
    (
        FitRule::LeastSquares,
        "Least squares",
        "The sum of the squared errors over the frets of the fit is made least.",
    ),
    (FitRule::Twelfth, "True octave", "The note at fret 12 is made exactly true."),
    (FitRule::Minimax, "Least worst", "The largest error over the frets of the fit is made least."),
    (
        FitRule::Robust,
        "Robust",
        "The expected sum of the squared errors is made least, over all that the plan's tolerances allow for.",
    ),
];

/// The fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    choice::buttons(ui, form, "fit.rule", "Fit", &RULES, &mut plan.fit.rule);
    faults(ui, form, &["fit.rule"]);
    let [first, last] = &mut plan.fit.frets;
    row(ui, "Over frets", |ui| {
        let help = "The first fret of the fit.";
        number::whole(
            ui,
            form,
            &Spec::new("fit.frets[0]", "First fret of the fit", 1.0, help).width(48.0),
            first,
        );
        ui.label("to");
        let help = "The last fret of the fit.";
        number::whole(
            ui,
            form,
            &Spec::new("fit.frets[1]", "Last fret of the fit", 1.0, help).width(48.0),
            last,
        );
    });
    faults(ui, form, &["fit.frets"]);
    targets(ui, form, plan);
}

/// Wanted offsets from equal temperament.
fn targets(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    let count = plan.strings.len();
    let mut tempered = plan.targets.is_some();
    row(ui, "Tuning", |ui| {
        let meaning = "Offsets from equal temperament that the fretted notes are to have.";
        if choice::tick(ui, form, "targets", "Tempered", meaning, &mut tempered) {
            plan.targets =
                tempered.then(|| Targets { open_cents: vec![0.0; count], pitch_class_cents: [0.0; 12] });
        }
    });
    if let Some(targets) = &mut plan.targets {
        let help = "Offset of every open string from its equal-tempered pitch in cents, string 1 first.";
        let open = Spec::new("targets.open_cents", "Offsets of the open strings, cents", 0.0, help);
        lists::labelled(ui, form, "Open strings, cents", &open, &mut targets.open_cents);
        remark(ui, form, "Pitch classes C, C♯, D … B, cents:");
        pitch_classes(ui, form, &mut targets.pitch_class_cents);
    }
    faults(ui, form, &["targets"]);
}

fn pitch_classes(ui: &mut Ui, form: &mut Form, cents: &mut [f64; 12]) {
    let help = "Offset of the twelve pitch classes from equal temperament, C first.";
    let spec = Spec::new("targets.pitch_class_cents", "Offsets of the pitch classes, cents", 0.0, help)
        .words()
        .width(ui.available_width());
    let read = |text: &str| {
        let values = parse::list(text)?;
        <[f64; 12]>::try_from(values).map_err(|values| format!("{} numbers; twelve are wanted", values.len()))
    };
    number::typed(ui, form, &spec, &parse::shown_list(cents), read, |new| *cents = new);
}
