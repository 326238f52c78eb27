//! The page: styles above, figures for setting out below.

use eframe::egui::{Frame, Margin, RichText, ScrollArea, Stroke, Ui};

use super::study::Study;
use super::{sets, setting_out, string_plot, styles};
use crate::edit::command::Command;
use crate::edit::desk::Outcome;
use crate::theme::{Palette, size};

/// Room in which the two parts stand side by side, points.
const SIDE_BY_SIDE: f32 = 1180.0;

/// The page.
pub fn show(
    ui: &mut Ui,
    palette: &'static Palette,
    outcome: &Outcome,
    string: usize,
    study: &mut Study,
) -> Vec<Command> {
    let mut commands = Vec::new();
    let frame = Frame::new()
        .fill(palette.sheet)
        .stroke(Stroke::new(size::EDGE, palette.edge))
        .inner_margin(Margin::symmetric(8, 6));
    frame.show(ui, |ui| {
        ui.set_min_size(ui.available_size());
        let working = study.is_working();
        let mut step = study.step;
        let figures = match study.figures(ui.ctx(), &outcome.plan) {
            Some(Ok(figures)) => figures,
            Some(Err(faults)) => {
                for fault in faults {
                    ui.label(RichText::new(fault.to_string()).color(palette.fault));
                }
                return;
            }
            None => {
                ui.label(RichText::new("Working out every pair of saddle and nut …").color(palette.quiet));
                return;
            }
        };
        ScrollArea::vertical().auto_shrink([false, false]).show(ui, |ui| {
            let mut both = |ui: &mut Ui, part: usize| match part {
                0 => {
                    commands.extend(styles::show(ui, palette, outcome, &figures.comparison, working));
                    ui.add_space(size::WIDE_GAP);
                    let alternatives = &outcome.solution.report.alternatives;
                    if !alternatives.is_empty() {
                        sets::show(ui, palette, alternatives);
                        ui.add_space(size::WIDE_GAP);
                    }
                    string_plot::show(ui, palette, &figures.comparison, outcome.plan.nut.style);
                }
                _ => commands.extend(setting_out::show(ui, palette, figures, string, &mut step)),
            };
            if ui.available_width() >= SIDE_BY_SIDE {
                ui.columns(2, |columns| {
                    for (part, ui) in columns.iter_mut().enumerate() {
                        both(ui, part);
                    }
                });
            } else {
                both(ui, 0);
                ui.add_space(size::WIDE_GAP);
                both(ui, 1);
            }
        });
        study.step = step;
    });
    commands
}
