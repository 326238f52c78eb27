//! The page `Fretted notes`: every note's error as a figure, strings by frets.

use crestline_plan::{FretReport, StringReport};
use eframe::egui::{
    Align2, Color32, FontId, Frame, Margin, RichText, ScrollArea, Sense, Stroke, Ui, Vec2, WidgetInfo,
    accesskit, pos2,
};

use super::figures::{cents, newtons};
use super::marks;
use crate::edit::command::Command;
use crate::edit::desk::Outcome;
use crate::theme::{Palette, size};
use crate::view::{NoteFigure, View};

/// Width of a column of one string.
const COLUMN: f32 = 74.0;
/// Width of the column of fret numbers.
const FIRST: f32 = 56.0;
/// Height of a row.
const ROW: f32 = 21.0;
/// Errors below this are small to the ear, cents; from this on the ground of a cell deepens.
const SMALL_CENTS: f64 = 2.0;
/// Errors from this on have the deepest ground, cents.
const LARGE_CENTS: f64 = 10.0;

/// The page.
pub fn show(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, view: &mut View) -> Vec<Command> {
    let mut commands = Vec::new();
    let edge = Stroke::new(size::EDGE, palette.edge);
    Frame::new().fill(palette.sheet).stroke(edge).inner_margin(Margin::symmetric(10, 8)).show(ui, |ui| {
        ui.horizontal_wrapped(|ui| {
            ui.label(RichText::new("Every fretted note").strong());
            for figure in NoteFigure::ALL {
                let is_there = figure != NoteFigure::AsItIs || outcome.plan.as_built.is_some();
                if is_there {
                    ui.selectable_value(&mut view.note_figure, figure, figure.name());
                }
            }
        });
        ui.label(RichText::new(view.note_figure.meaning()).small().color(palette.quiet));
        ScrollArea::both().auto_shrink([false, false]).show(ui, |ui| {
            ui.spacing_mut().item_spacing = Vec2::ZERO;
            commands.extend(heads(ui, palette, outcome, view.string));
            for fret in 0..outcome.plan.instrument.frets as usize {
                row(ui, palette, &outcome.solution.report.strings, fret, view);
            }
        });
    });
    commands
}

fn heads(ui: &mut Ui, palette: &Palette, outcome: &Outcome, chosen: usize) -> Vec<Command> {
    let mut commands = Vec::new();
    ui.horizontal(|ui| {
        let (rect, _) = ui.allocate_exact_size(Vec2::new(FIRST, 26.0), Sense::hover());
        ui.painter().text(
            rect.center(),
            Align2::CENTER_CENTER,
            "Fret",
            FontId::proportional(size::SMALL),
            palette.quiet,
        );
        for (index, string) in outcome.solution.report.strings.iter().enumerate() {
            let (rect, response) = ui.allocate_exact_size(Vec2::new(COLUMN, 26.0), Sense::click());
            let name = format!("Choose string {}", string.string);
            response.widget_info(|| {
                WidgetInfo::selected(accesskit::Role::RadioButton, true, chosen == index, &name)
            });
            if chosen == index {
                ui.painter().rect_filled(rect.shrink(1.0), 3.0, palette.accent_ground);
            }
            if response.has_focus() || response.hovered() {
                ui.painter().rect_stroke(
                    rect.shrink(1.0),
                    3.0,
                    Stroke::new(1.0, palette.accent),
                    eframe::egui::StrokeKind::Inside,
                );
            }
            marks::paint(ui.painter(), pos2(rect.left() + 18.0, rect.center().y), index, palette, 4.5);
            let at = pos2(rect.right() - 12.0, rect.center().y);
            ui.painter().text(
                at,
                Align2::RIGHT_CENTER,
                string.string.to_string(),
                FontId::proportional(size::TEXT),
                palette.ink,
            );
            if response.clicked() {
                commands.push(Command::ChooseString(index));
            }
        }
    });
    commands
}

fn row(ui: &mut Ui, palette: &Palette, strings: &[StringReport], fret: usize, view: &View) {
    ui.horizontal(|ui| {
        let (rect, response) = ui.allocate_exact_size(Vec2::new(FIRST, ROW), Sense::hover());
        let number = (fret + 1).to_string();
        ui.painter().text(
            rect.center(),
            Align2::CENTER_CENTER,
            &number,
            FontId::proportional(size::TEXT),
            palette.quiet,
        );
        let mut words = format!("Fret {number}.");
        for (index, string) in strings.iter().enumerate() {
            let Some(report) = string.frets.get(fret) else { continue };
            let text = view.note_figure.text(report);
            words.push_str(&format!(" String {}: {text}.", string.string));
            cell(ui, palette, view, report, &text, index == view.string);
        }
        response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Row, true, &words));
    });
}

fn cell(ui: &mut Ui, palette: &Palette, view: &View, report: &FretReport, text: &str, is_chosen: bool) {
    let (rect, response) = ui.allocate_exact_size(Vec2::new(COLUMN, ROW), Sense::hover());
    if let Some(ground) = view.note_figure.cents(report).and_then(|cents| ground(palette, cents)) {
        ui.painter().rect_filled(rect.shrink(1.0), 2.0, ground);
    }
    if is_chosen {
        ui.painter().vline(rect.left() + 1.0, rect.y_range(), Stroke::new(1.5, palette.accent));
    }
    let at = pos2(rect.right() - 12.0, rect.center().y);
    ui.painter().text(at, Align2::RIGHT_CENTER, text, FontId::proportional(size::TEXT - 0.5), palette.ink);
    if let Some(touched) = report.touches_fret {
        let mark = pos2(rect.left() + 8.0, rect.center().y);
        ui.painter().text(
            mark,
            Align2::LEFT_CENTER,
            "▲",
            FontId::proportional(size::SMALL - 1.0),
            palette.fault,
        );
        response.on_hover_text(format!("Buzzes: the string touches fret {touched}"));
    }
}

/// The ground of a cell: none for small errors, deeper for large ones, one hue for sharp and one for flat.
fn ground(palette: &Palette, cents: f64) -> Option<Color32> {
    let share = ((cents.abs() - SMALL_CENTS) / (LARGE_CENTS - SMALL_CENTS)).clamp(0.0, 1.0);
    let hue = if cents > 0.0 { palette.caution_ground } else { palette.accent_ground };
    (cents.abs() >= SMALL_CENTS).then(|| palette.sheet.lerp_to_gamma(hue, 0.45 + 0.55 * share as f32))
}

impl NoteFigure {
    /// The figure as text.
    fn text(self, report: &FretReport) -> String {
        match self {
            Self::Force => newtons(report.finger_force_n),
            _ => self.cents(report).map(cents).unwrap_or_default(),
        }
    }

    fn cents(self, report: &FretReport) -> Option<f64> {
        match self {
            Self::Built => Some(report.built_cents),
            Self::Ideal => Some(report.ideal_cents),
            Self::None => Some(report.none_cents),
            Self::AsItIs => report.as_built_cents,
            Self::Force => None,
        }
    }
}
