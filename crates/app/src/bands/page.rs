//! The page: the answer, setbacks with their bands, what to measure next, and the tolerances that it all rests on.

use std::sync::Arc;

use crestline_plan::{Plan, Shares, StringReport, Uncertainty};
use eframe::egui::{Frame, Margin, ScrollArea, Stroke, Ui};

use super::state::Trust;
use super::{band_plot, headline, next, share_bars, string_table, tolerances};
use crate::edit::command::Command;
use crate::edit::desk::Outcome;
use crate::fields::form::Form;
use crate::results::sides::{Side, columns};
use crate::theme::size;

/// Room in which the two parts stand side by side, points.
const SIDE_BY_SIDE: f32 = 1180.0;

/// The page. The fields edit `plan`; the sample is of the last plan without faults, if there has been one.
pub fn show(
    ui: &mut Ui,
    form: &mut Form,
    plan: &mut Plan,
    outcome: Option<&Outcome>,
    string: usize,
    trust: &mut Trust,
) {
    let frame = Frame::new()
        .fill(form.palette.sheet)
        .stroke(Stroke::new(size::EDGE, form.palette.edge))
        .inner_margin(Margin::symmetric(10, 8));
    frame.show(ui, |ui| {
        ui.set_min_size(ui.available_size());
        ScrollArea::vertical().auto_shrink([false, false]).show(ui, |ui| {
            if let Some(outcome) = outcome {
                trust.sampling.follow(ui.ctx(), &outcome.plan, true);
                ui.push_id("headline", |ui| {
                    headline::show(ui, form, plan, &outcome.plan, &mut trust.sampling)
                });
                ui.add_space(size::GAP);
            }
            // Above what comes of them, so that they stay in place when that appears; and with names of their own, so that
            // a click or the focus stays with its widget while the words above grow.
            ui.push_id("tolerances", |ui| tolerances::show(ui, form, plan, &mut trust.shows_tolerances));
            if let Some(found) = outcome.and_then(|outcome| Found::of(outcome, string, trust)) {
                ui.add_space(size::WIDE_GAP);
                found.show(ui, form, trust);
            }
        });
    });
}

/// What there is to show of a sample.
struct Found<'a> {
    uncertainty: Arc<Uncertainty>,
    shares: Option<Arc<Shares>>,
    /// The figures of the plan that was sampled, where they are still shown.
    built: Option<&'a [StringReport]>,
    string: usize,
}

impl<'a> Found<'a> {
    fn of(outcome: &'a Outcome, string: usize, trust: &Trust) -> Option<Self> {
        let found = trust.sampling.found()?;
        let report = &outcome.solution.report;
        Some(Self {
            uncertainty: Arc::clone(&found.uncertainty),
            shares: trust.sampling.shares().map(Arc::clone),
            built: found.is_of(&outcome.plan).then_some(report.strings.as_slice()),
            string,
        })
    }

    fn show(&self, ui: &mut Ui, form: &mut Form, trust: &mut Trust) {
        if ui.available_width() >= SIDE_BY_SIDE {
            columns(ui, |ui, side| match side {
                Side::Left => self.setbacks(ui, form),
                Side::Right => self.inputs(ui, form, trust),
            });
        } else {
            self.setbacks(ui, form);
            ui.add_space(size::WIDE_GAP);
            self.inputs(ui, form, trust);
        }
    }

    fn setbacks(&self, ui: &mut Ui, form: &mut Form) {
        let clicked = string_table::show(ui, form.palette, &self.uncertainty, self.string);
        form.commands.extend(clicked.map(Command::ChooseString));
        ui.add_space(size::WIDE_GAP);
        band_plot::show(ui, form.palette, &self.uncertainty, self.built);
    }

    fn inputs(&self, ui: &mut Ui, form: &Form, trust: &mut Trust) {
        next::show(ui, form.palette, self.shares.as_deref());
        if let Some(shares) = &self.shares {
            ui.add_space(size::WIDE_GAP);
            ui.scope(|ui| {
                share_bars::show(ui, form.palette, shares, self.string, &mut trust.of_one_string);
            });
        }
    }
}
