//! The strings' markers and other small things that are painted outside plots.

use eframe::egui::text::{LayoutJob, TextWrapping};
use eframe::egui::{Align2, Color32, FontId, Painter, Pos2, Shape, Stroke, Vec2, vec2};
use egui_plot::MarkerShape;

use crate::theme::{Palette, marker, size};

/// Paints the marker of string `index` (0 first) about `centre`.
pub fn paint(painter: &Painter, centre: Pos2, index: usize, palette: &Palette, radius: f32) {
    painter.extend(shapes(marker(index), centre, radius, palette.string(index)));
}

/// Paints the lines of a head, each aligned by itself; `anchor` says which side of the last one stands at `at`.
pub fn head(painter: &Painter, at: Pos2, anchor: Align2, words: &str, colour: Color32) {
    const LINE: f32 = 14.0;
    for (up, line) in words.lines().rev().enumerate() {
        let font = FontId::proportional(size::SMALL);
        painter.text(at - Vec2::new(0.0, LINE * up as f32), anchor, line, font, colour);
    }
}

/// A line of text that ends in an ellipsis where it is wider than `width`.
pub struct Elided<'a> {
    /// The text.
    pub text: &'a str,
    /// Size of its letters.
    pub size: f32,
    /// Its colour.
    pub colour: Color32,
    /// The most that it may be wide.
    pub width: f32,
}

impl Elided<'_> {
    /// Paints it; `anchor` says which point of it stands at `at`.
    pub fn paint(&self, painter: &Painter, at: Pos2, anchor: Align2) {
        let font = FontId::proportional(self.size);
        let mut job = LayoutJob::simple_singleline(self.text.to_owned(), font, self.colour);
        job.wrap = TextWrapping::truncate_at_width(self.width.max(0.0));
        let galley = painter.layout_job(job);
        painter.galley(anchor.anchor_size(at, galley.size()).min, galley, self.colour);
    }
}

fn shapes(marker: MarkerShape, centre: Pos2, r: f32, colour: Color32) -> Vec<Shape> {
    let polygon = |corners: &[Vec2]| {
        let points = corners.iter().map(|corner| centre + *corner * r).collect();
        vec![Shape::convex_polygon(points, colour, Stroke::NONE)]
    };
    let strokes = |ends: &[(Vec2, Vec2)]| {
        let line = |(a, b): &(Vec2, Vec2)| {
            Shape::line_segment([centre + *a * r, centre + *b * r], Stroke::new(r * 0.45, colour))
        };
        ends.iter().map(line).collect::<Vec<_>>()
    };
    let cross = [(vec2(-0.8, -0.8), vec2(0.8, 0.8)), (vec2(-0.8, 0.8), vec2(0.8, -0.8))];
    let plus = [(vec2(-1.0, 0.0), vec2(1.0, 0.0)), (vec2(0.0, -1.0), vec2(0.0, 1.0))];
    match marker {
        MarkerShape::Circle => vec![Shape::circle_filled(centre, r, colour)],
        MarkerShape::Square => polygon(&[vec2(-0.9, -0.9), vec2(0.9, -0.9), vec2(0.9, 0.9), vec2(-0.9, 0.9)]),
        MarkerShape::Diamond => polygon(&[vec2(0.0, -1.1), vec2(1.1, 0.0), vec2(0.0, 1.1), vec2(-1.1, 0.0)]),
        MarkerShape::Up => polygon(&[vec2(0.0, -1.1), vec2(1.0, 0.8), vec2(-1.0, 0.8)]),
        MarkerShape::Down => polygon(&[vec2(-1.0, -0.8), vec2(1.0, -0.8), vec2(0.0, 1.1)]),
        MarkerShape::Left => polygon(&[vec2(-1.1, 0.0), vec2(0.8, -1.0), vec2(0.8, 1.0)]),
        MarkerShape::Right => polygon(&[vec2(-0.8, -1.0), vec2(1.1, 0.0), vec2(-0.8, 1.0)]),
        MarkerShape::Cross => strokes(&cross),
        MarkerShape::Plus => strokes(&plus),
        MarkerShape::Asterisk => strokes(&[
            (vec2(0.0, -1.0), vec2(0.0, 1.0)),
            (vec2(-0.87, -0.5), vec2(0.87, 0.5)),
            (vec2(-0.87, 0.5), vec2(0.87, -0.5)),
        ]),
    }
}
