//! The saddle in plan: nominal line, strings, crests with their setbacks, and the blank.

use crestline_plan::{Layout, Point, SaddleStyle, StringLine};
use eframe::egui::{Align2, Ui, Vec2, WidgetInfo, accesskit};
use egui_plot::{LineStyle, Plot, PlotBounds, PlotUi};

use super::axes::{Along, with_axes};
use super::camera::Camera;
use super::error_plot::Shown;
use super::hover;
use super::plan_items::{PlanView, at_x, line, mark, outline, text};
use crate::bands::on_plots::{Ends, OnPlots};
use crate::theme::Palette;
use crate::units::LengthUnit;

/// Room on either side of what is drawn, mm.
const ROOM_MM: f64 = 3.0;
/// Room across the neck outside the outer strings, mm.
const ROOM_ACROSS_MM: f64 = 5.0;
/// Width of the string lines in points.
const STRING_WIDTH: f32 = 1.2;

/// The plot, as large as the room that is left.
pub fn show(ui: &mut Ui, palette: &'static Palette, shown: &Shown<'_>, camera: &mut Camera) {
    let (outcome, chosen) = (shown.outcome, shown.chosen);
    let layout = &outcome.solution.layout;
    let whole = whole(shown);
    let looking = *camera;
    let datum_x = layout.datum_x_mm;
    let unit = LengthUnit::of(ui.ctx());
    let plot = plan_plot("saddle in plan", palette, datum_x, unit).height(ui.available_height());
    let painted = plot.show(ui, |plot| {
        let rect = plot.response().rect;
        let bounds = looking.bounds(rect, &whole);
        plot.set_plot_bounds(bounds);
        let mm_per_point = bounds.width() / f64::from(rect.width().max(1.0));
        draw(plot, &PlanView { palette, outcome, chosen, unit, bounds, mm_per_point }, shown.bands);
    });
    let response = hover::crest(painted.response, &painted.transform, palette, outcome);
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, in_words(shown, unit)));
    camera.follow(ui, &response, &painted.transform, &whole);
}

/// A plot for a plan view: drag pans, the wheel zooms, and the axis counts from the datum.
pub fn plan_plot<'a>(
    name: &'static str,
    palette: &'static Palette,
    datum_x: f64,
    unit: LengthUnit,
) -> Plot<'a> {
    let plot = Plot::new(name)
        .allow_scroll(false)
        .allow_boxed_zoom(false)
        .allow_double_click_reset(false)
        .allow_axis_zoom_drag(false)
        .show_crosshair(false)
        .min_size(Vec2::new(60.0, 60.0))
        .label_formatter(|_| None);
    with_axes(plot, palette, Along::From(datum_x, unit), ["", ""])
}

fn draw(plot: &mut PlotUi<'_>, d: &PlanView<'_>, bands: Option<&OnPlots>) {
    let layout = &d.outcome.solution.layout;
    let p = d.palette;
    for blank in &layout.blanks {
        outline(plot, blank, p.blank, p.quiet);
    }
    for fret in &layout.frets {
        line(plot, fret, p.edge, 2.0, LineStyle::Solid);
    }
    let [treble, bass] = layout.saddle_line;
    let beyond = beyond(treble, bass, ROOM_ACROSS_MM * 0.6);
    line(plot, &beyond, p.ink, 1.2, LineStyle::Dashed { length: 9.0 });
    centre_line(plot, d);
    for (index, string) in layout.strings.iter().enumerate() {
        string_line(plot, d, index, string);
    }
    if matches!(d.outcome.plan.saddle.style, SaddleStyle::Separate) {
        for (index, string) in layout.strings.iter().enumerate() {
            travel(plot, d, index, string);
        }
    }
    crest_lines(plot, d);
    for (index, string) in layout.strings.iter().enumerate() {
        if let Some(ends) = bands.and_then(|bands| bands.setback_mm(index)) {
            whisker(plot, d, index, string, ends);
        }
        crest(plot, d, index, string);
    }
}

/// The straight crests, or for a shaped saddle the crest filed from string to string and the slot's centre line.
fn crest_lines(plot: &mut PlotUi<'_>, d: &PlanView<'_>) {
    let is_shaped = matches!(d.outcome.plan.saddle.style, SaddleStyle::Shaped);
    let (colour, style) = if is_shaped {
        (d.palette.quiet, LineStyle::Dashed { length: 5.0 })
    } else {
        (d.palette.accent, LineStyle::Solid)
    };
    for straight in &d.outcome.solution.report.saddle.lines {
        line(plot, &[straight.treble, straight.bass], colour, if is_shaped { 1.0 } else { 2.0 }, style);
    }
    if is_shaped {
        let crests: Vec<Point> =
            d.outcome.solution.layout.strings.iter().map(|string| string.crest).collect();
        line(plot, &crests, d.palette.accent, 2.0, LineStyle::Solid);
    }
}

fn centre_line(plot: &mut PlotUi<'_>, d: &PlanView<'_>) {
    let (min, max) = (d.bounds.min(), d.bounds.max());
    let ends = [Point { x: min[0], y: 0.0 }, Point { x: max[0], y: 0.0 }];
    line(plot, &ends, d.palette.edge, 1.0, LineStyle::Dashed { length: 4.0 });
}

/// The string from the left edge of the view to its crest, with its number.
fn string_line(plot: &mut PlotUi<'_>, d: &PlanView<'_>, index: usize, string: &StringLine) {
    let left = d.bounds.min()[0];
    let start =
        if left > string.nut_edge.x { at_x(string.nut, string.saddle, left) } else { string.nut_edge };
    let is_chosen = index == d.chosen;
    let width = if is_chosen { 2.0 * STRING_WIDTH } else { STRING_WIDTH };
    let colour = d.palette.string(index);
    line(plot, &[start, string.crest], colour, width, LineStyle::Solid);
    let place = at_x(string.nut, string.saddle, start.x + 8.0 * d.mm_per_point);
    let above = Point { x: place.x, y: place.y + 2.0 * d.mm_per_point };
    text(plot, above, (index + 1).to_string(), colour, Align2::LEFT_BOTTOM);
}

/// How far a separate piece may go.
fn travel(plot: &mut PlotUi<'_>, d: &PlanView<'_>, index: usize, string: &StringLine) {
    let [least, greatest] = string.travel;
    let colour = d.palette.string(index).gamma_multiply(0.45);
    line(plot, &[least, greatest], colour, 5.0, LineStyle::Solid);
    let tick = 5.0 * d.mm_per_point;
    for end in [least, greatest] {
        let ends = [Point { x: end.x, y: end.y - tick }, Point { x: end.x, y: end.y + tick }];
        line(plot, &ends, d.palette.string(index), 1.0, LineStyle::Solid);
    }
}

/// The band in which the ideal crest lies, as a line along the string with ends across.
fn whisker(plot: &mut PlotUi<'_>, d: &PlanView<'_>, index: usize, string: &StringLine, ends_mm: Ends) {
    let ends = ends_mm.map(|setback_mm| along(string, setback_mm));
    let colour = d.palette.string(index);
    line(plot, &ends, colour, 2.6, LineStyle::Solid);
    let tick = 5.0 * d.mm_per_point;
    for end in ends {
        let across = [Point { x: end.x, y: end.y - tick }, Point { x: end.x, y: end.y + tick }];
        line(plot, &across, colour, 1.6, LineStyle::Solid);
    }
}

/// The place of a crest with this setback along the string.
fn along(string: &StringLine, setback_mm: f64) -> Point {
    let (dx, dy) = (string.saddle.x - string.nut.x, string.saddle.y - string.nut.y);
    let by = setback_mm / dx.hypot(dy).max(f64::MIN_POSITIVE);
    Point { x: string.saddle.x + by * dx, y: string.saddle.y + by * dy }
}

/// The ideal crest hollow, the existing one as a ring, and the built one filled with its setback beside it.
fn crest(plot: &mut PlotUi<'_>, d: &PlanView<'_>, index: usize, string: &StringLine) {
    let colour = d.palette.string(index);
    let Some(report) = d.outcome.solution.report.strings.get(index) else { return };
    if let Some(now) = string.as_built {
        mark(plot, now, 0, d.palette.quiet, false);
    }
    mark(plot, string.ideal_crest, index, colour, false);
    mark(plot, string.crest, index, colour, true);
    let is_separate = matches!(d.outcome.plan.saddle.style, SaddleStyle::Separate);
    let marks = [
        Some(string.crest),
        Some(string.ideal_crest),
        string.as_built,
        is_separate.then_some(string.travel[1]),
    ];
    let rightmost = marks.into_iter().flatten().map(|mark| mark.x).fold(f64::MIN, f64::max);
    let gap = if is_separate { 6.0 } else { 11.0 };
    let beside = Point { x: rightmost + gap * d.mm_per_point, y: string.crest.y };
    let words = d.unit.figure(report.built.saddle_setback_mm);
    text(plot, beside, words, d.palette.ink, Align2::LEFT_CENTER);
}

/// The line through two points, longer by `by_mm` at either end.
fn beyond(a: Point, b: Point, by_mm: f64) -> [Point; 2] {
    let (dx, dy) = (b.x - a.x, b.y - a.y);
    let length = dx.hypot(dy).max(f64::MIN_POSITIVE);
    let (ux, uy) = (dx / length * by_mm, dy / length * by_mm);
    [Point { x: a.x - ux, y: a.y - uy }, Point { x: b.x + ux, y: b.y + uy }]
}

/// What must be in view.
fn whole(shown: &Shown<'_>) -> PlotBounds {
    let outcome = shown.outcome;
    let layout = &outcome.solution.layout;
    let mut points: Vec<Point> = layout.saddle_line.to_vec();
    points.extend(layout.blanks.iter().flatten());
    points.extend(layout.strings.iter().flat_map(|s| [s.crest, s.ideal_crest, s.saddle]));
    points.extend(layout.strings.iter().filter_map(|s| s.as_built));
    points.extend(whiskers(shown).flatten());
    if matches!(outcome.plan.saddle.style, SaddleStyle::Separate) {
        points.extend(layout.strings.iter().flat_map(|s| s.travel));
    }
    around(&points, [ROOM_MM, 0.5])
}

/// The ends of all whiskers.
fn whiskers<'a>(shown: &'a Shown<'_>) -> impl Iterator<Item = [Point; 2]> + 'a {
    let strings = shown.outcome.solution.layout.strings.iter().enumerate();
    strings.filter_map(|(index, string)| {
        let ends_mm = shown.bands?.setback_mm(index)?;
        Some(ends_mm.map(|setback_mm| along(string, setback_mm)))
    })
}

/// The box around points, with room before, behind and across.
#[must_use]
pub fn around(points: &[Point], room_mm: [f64; 2]) -> PlotBounds {
    let fold = |pick: fn(&Point) -> f64| {
        points.iter().map(pick).fold((f64::INFINITY, f64::NEG_INFINITY), |(lo, hi), v| (lo.min(v), hi.max(v)))
    };
    let ((x0, x1), (y0, y1)) = (fold(|p| p.x), fold(|p| p.y));
    if !(x0.is_finite() && y0.is_finite()) {
        return PlotBounds::from_min_max([-10.0, -10.0], [10.0, 10.0]);
    }
    PlotBounds::from_min_max([x0 - room_mm[0], y0 - ROOM_ACROSS_MM], [x1 + room_mm[1], y1 + ROOM_ACROSS_MM])
}

/// The plot's figures in words.
fn in_words(shown: &Shown<'_>, unit: LengthUnit) -> String {
    let setback = |(index, s): (usize, &crestline_plan::StringReport)| {
        let ends = shown.bands.and_then(|bands| bands.setback_mm(index));
        let ends = ends.map_or_else(String::new, |[low, high]| {
            format!(" (90 % from {} to {})", unit.figure(low), unit.words(high))
        });
        format!(
            " String {}: setback {}, ideal {}{ends}.",
            s.string,
            unit.words(s.built.saddle_setback_mm),
            unit.words(s.ideal.saddle_setback_mm)
        )
    };
    let strings: String = shown.outcome.solution.report.strings.iter().enumerate().map(setback).collect();
    format!("Saddle in plan.{strings}")
}

/// Whether the layout has anything to show at the nut.
#[must_use]
pub fn nut_is_moved(layout: &Layout) -> bool {
    layout.strings.iter().any(|s| (s.nut_edge.x - s.nut.x).abs() > 1e-6)
}
