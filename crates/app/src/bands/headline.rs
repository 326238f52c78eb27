//! The answer in a sentence, how far the sample has come, and how it is drawn.

use crestline_plan::{Plan, Uncertainty};
use eframe::egui::{Label, ProgressBar, RichText, Ui, accesskit};

use super::fields;
use super::sampling::{Found, Progress, Sampling};
use crate::fields::form::{Form, place_in_words};
use crate::fields::parse;
use crate::results::figures::fixed;
use crate::theme::size;
use crate::units::fault_words;

/// Width of the progress bar, points.
const BAR: f32 = 260.0;

/// The sentence and the progress; `solved` is the plan that is sampled, `plan` the one in the fields.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan, solved: &Plan, sampling: &mut Sampling) {
    let faults = sampling.faults(solved);
    let refused: Vec<String> = faults
        .iter()
        .map(|fault| format!("{}: {}.", place_in_words(&fault.path), fault_words(fault, form.unit)))
        .collect();
    let found = sampling.found();
    let words = match (refused.is_empty(), found) {
        (false, _) => refused.join(" "),
        (true, Some(found)) => answer(found),
        (true, None) => "Instruments are drawn that differ as the tolerances say …".to_owned(),
    };
    ui.add(Label::new(RichText::new(words).size(size::HEADING).strong()).wrap());
    // The line is there before the first answer too, so that nothing below it jumps.
    let words = sample_words(found.map(|found| &*found.uncertainty), found.map_or(solved, Found::plan));
    ui.add(Label::new(RichText::new(words).small().color(form.palette.quiet)).wrap());
    progress(ui, form, solved, sampling);
    fields::sample(ui, form, plan);
}

/// The chance for the whole instrument.
fn answer(found: &Found) -> String {
    let uncertainty = &found.uncertainty;
    let [first, last] = found.plan().fit.frets;
    format!(
        "Chance that every note stays within {} cents: {}; that those of frets {first} to {last} do: {}.",
        parse::shown(uncertainty.limit_cents),
        chance(uncertainty.chance_within),
        chance(uncertainty.chance_within_fit),
    )
}

/// A chance in words, no finer than a sample tells it.
#[must_use]
pub fn chance(part: f64) -> String {
    match per_cent(part).as_str() {
        "< 1" => "less than 1 %".to_owned(),
        "> 99" => "more than 99 %".to_owned(),
        figure => format!("{figure} %"),
    }
}

/// The same as a figure, per cent.
#[must_use]
pub fn per_cent(part: f64) -> String {
    match part {
        part if part < 0.005 => "< 1".to_owned(),
        part if part >= 0.995 => "> 99".to_owned(),
        part => fixed(100.0 * part, 0),
    }
}

/// What the sample is of: so many instruments so far of this plan.
fn sample_words(uncertainty: Option<&Uncertainty>, plan: &Plan) -> String {
    let (samples, left_out) = uncertainty.map_or((0, 0), |found| (found.samples, found.left_out));
    let left_out = match left_out {
        0 => String::new(),
        n => format!(" {n} of them cannot be worked out and are left out."),
    };
    let whose = match plan.tolerances {
        None => "the usual tolerances, since the plan has none",
        Some(_) => "the plan's tolerances",
    };
    let sets = match plan.alternatives.len() {
        0 => "",
        _ => " Of the sets of strings that the saddle must suit, this page is about the plan's own.",
    };
    format!(
        "Of {samples} instruments with saddle and nut as built, drawn by {whose}.{left_out} The chance can be trusted \
         no further than they can.{sets}"
    )
}

/// How far the work has come; it can be stopped. The line is there at all times, so that nothing below it jumps.
fn progress(ui: &mut Ui, form: &Form, plan: &Plan, sampling: &mut Sampling) {
    ui.horizontal(|ui| {
        let is_current = sampling.found().is_some_and(|found| found.is_of(plan));
        if let Some(progress) = sampling.progress() {
            bar(ui, form, &progress);
            if ui.button("Stop").clicked() {
                sampling.stop();
                ui.ctx().request_repaint();
            }
        } else if sampling.was_stopped() {
            let words = if is_current {
                "Stopped: what is shown rests on the instruments drawn until then."
            } else {
                "Stopped: what is shown is not of this plan."
            };
            ui.label(RichText::new(words).color(form.palette.caution));
            if ui.button("Work it out").clicked() {
                sampling.resume();
                ui.ctx().request_repaint();
            }
        } else {
            let words = if is_current { "The sample is complete." } else { "" };
            ui.label(RichText::new(words).small().color(form.palette.quiet));
        }
    });
}

fn bar(ui: &mut Ui, form: &Form, progress: &Progress) {
    let text = RichText::new(&progress.words).color(form.palette.ink);
    let bar = ProgressBar::new(progress.part).desired_width(BAR).fill(form.palette.accent_ground);
    let response = ui.add(bar.text(text));
    response.ctx.accesskit_node_builder(response.id, |node| {
        node.set_role(accesskit::Role::ProgressIndicator);
        node.set_label(format!("Sample: {}", progress.words));
        node.set_numeric_value(f64::from(progress.part));
        node.set_min_numeric_value(0.0);
        node.set_max_numeric_value(1.0);
    });
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_chance_is_never_said_to_be_certain() {
        assert_eq!(chance(0.0), "less than 1 %");
        assert_eq!(chance(0.624), "62 %");
        assert_eq!(chance(1.0), "more than 99 %");
        assert_eq!(per_cent(0.994), "99");
    }
}
