//! The nut end in plan, where the nut is compensated.

use crestline_plan::{Point, StringLine};
use eframe::egui::{Align2, Ui, WidgetInfo, accesskit};
use egui_plot::{LineStyle, PlotUi};

use super::camera::Camera;
use super::layout_plot::{around, plan_plot};
use super::plan_items::{PlanView, line, mark, text};
use crate::edit::desk::Outcome;
use crate::theme::Palette;
use crate::units::LengthUnit;

/// Room before the nut edges and behind them, mm.
const ROOM_MM: [f64; 2] = [3.0, 1.0];

/// The plot, as large as the room that is left.
pub fn show(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, chosen: usize, camera: &mut Camera) {
    let layout = &outcome.solution.layout;
    let points: Vec<Point> = layout.strings.iter().flat_map(|s| [s.nut, s.nut_edge]).collect();
    let whole = around(&points, ROOM_MM);
    let looking = *camera;
    let unit = LengthUnit::of(ui.ctx());
    let plot = plan_plot("nut in plan", palette, layout.datum_x_mm, unit).height(ui.available_height());
    let shown = plot.show(ui, |plot| {
        let rect = plot.response().rect;
        let bounds = looking.bounds(rect, &whole);
        plot.set_plot_bounds(bounds);
        let mm_per_point = bounds.width() / f64::from(rect.width().max(1.0));
        let view = PlanView { palette, outcome, chosen, unit, bounds, mm_per_point };
        line(plot, &layout.nut_line, palette.ink, 1.2, LineStyle::Dashed { length: 9.0 });
        for fret in &layout.frets {
            line(plot, fret, palette.edge, 2.0, LineStyle::Solid);
        }
        for (index, string) in layout.strings.iter().enumerate() {
            nut_end(plot, &view, index, string);
        }
    });
    let response = shown.response;
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, in_words(outcome, unit)));
    camera.follow(ui, &response, &shown.transform, &whole);
}

/// A string from its nut edge on, with the edge's setback beside it.
fn nut_end(plot: &mut PlotUi<'_>, view: &PlanView<'_>, index: usize, string: &StringLine) {
    let colour = view.palette.string(index);
    let width = if index == view.chosen { 2.4 } else { 1.2 };
    line(plot, &[string.nut_edge, string.saddle], colour, width, LineStyle::Solid);
    mark(plot, string.nut_edge, index, colour, true);
    let Some(report) = view.outcome.solution.report.strings.get(index) else { return };
    let (right, up) = (9.0 * view.mm_per_point, view.mm_per_point);
    let beside = Point { x: string.nut_edge.x + right, y: string.nut_edge.y + up };
    text(plot, beside, view.unit.figure(report.built.nut_setback_mm), view.palette.ink, Align2::LEFT_BOTTOM);
}

fn in_words(outcome: &Outcome, unit: LengthUnit) -> String {
    let setback = |s: &crestline_plan::StringReport| {
        format!(" String {}: nut setback {}.", s.string, unit.words(s.built.nut_setback_mm))
    };
    let strings: String = outcome.solution.report.strings.iter().map(setback).collect();
    format!("Nut in plan.{strings}")
}
