//! Lines, marks and texts of the plan views.

use crestline_plan::Point;
use eframe::egui::{Align2, Color32, RichText};
use egui_plot::{Line, LineStyle, PlotBounds, PlotPoint, PlotPoints, PlotUi, Points, Polygon, Text};

use crate::edit::desk::Outcome;
use crate::theme::{Palette, marker, size};
use crate::units::LengthUnit;

/// Radius of a crest's marker in points.
const MARK: f32 = 4.5;

/// A plan view being drawn.
pub struct PlanView<'a> {
    /// Colours.
    pub palette: &'static Palette,
    /// What is drawn.
    pub outcome: &'a Outcome,
    /// The chosen string, 0 first.
    pub chosen: usize,
    /// The unit of lengths.
    pub unit: LengthUnit,
    /// The part that is in view, mm.
    pub bounds: PlotBounds,
    /// Its scale.
    pub mm_per_point: f64,
}

/// A straight line.
pub fn line(plot: &mut PlotUi<'_>, ends: &[Point], colour: Color32, width: f32, style: LineStyle) {
    let points: PlotPoints<'_> = ends.iter().map(|p| [p.x, p.y]).collect();
    plot.line(Line::new("", points).color(colour).width(width).style(style).allow_hover(false));
}

/// A filled outline.
pub fn outline(plot: &mut PlotUi<'_>, corners: &[Point], fill: Color32, edge: Color32) {
    let points: PlotPoints<'_> = corners.iter().map(|p| [p.x, p.y]).collect();
    plot.polygon(Polygon::new("", points).fill_color(fill).stroke((1.2, edge)).allow_hover(false));
}

/// The marker of string `index`.
pub fn mark(plot: &mut PlotUi<'_>, at: Point, index: usize, colour: Color32, filled: bool) {
    let points = Points::new("", [at.x, at.y]).shape(marker(index)).color(colour).filled(filled).radius(MARK);
    plot.points(points.allow_hover(false));
}

/// A text; `anchor` says which side of it stands at the point.
pub fn text(plot: &mut PlotUi<'_>, at: Point, words: impl Into<String>, colour: Color32, anchor: Align2) {
    let words = RichText::new(words).size(size::SMALL).color(colour);
    plot.text(Text::new("", PlotPoint::new(at.x, at.y), words).anchor(anchor).allow_hover(false));
}

/// The point on the straight line through `a` and `b` at this x.
#[must_use]
pub fn at_x(a: Point, b: Point, x: f64) -> Point {
    let run = b.x - a.x;
    let share = if run == 0.0 { 0.0 } else { (x - a.x) / run };
    Point { x, y: a.y + share * (b.y - a.y) }
}
