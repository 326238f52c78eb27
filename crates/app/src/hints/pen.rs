//! A pen for small sketches: places in a box of 160 by 90, whatever size it is shown at.

use eframe::egui::{Align2, Color32, FontId, Painter, Pos2, Rect, Shape, Stroke, Vec2, pos2};

use crate::theme::{Palette, size};

/// Width and height of the box.
pub const BOX: Vec2 = Vec2::new(160.0, 90.0);

/// The pen.
pub struct Pen<'a> {
    painter: &'a Painter,
    rect: Rect,
    /// Colours.
    pub palette: &'a Palette,
}

impl<'a> Pen<'a> {
    /// A pen in a rectangle of the box's shape.
    pub fn new(painter: &'a Painter, rect: Rect, palette: &'a Palette) -> Self {
        Self { painter, rect, palette }
    }

    fn at(&self, [x, y]: [f32; 2]) -> Pos2 {
        let scale = self.rect.width() / BOX.x;
        pos2(self.rect.left() + x * scale, self.rect.top() + y * scale)
    }

    /// A line in ink of this width.
    pub fn line(&self, from: [f32; 2], to: [f32; 2], width: f32) {
        self.painter.line_segment([self.at(from), self.at(to)], Stroke::new(width, self.palette.ink));
    }

    /// A broken line.
    pub fn broken(&self, from: [f32; 2], to: [f32; 2]) {
        let ends = [self.at(from), self.at(to)];
        self.painter.extend(Shape::dashed_line(&ends, Stroke::new(1.0, self.palette.quiet), 4.0, 3.0));
    }

    /// A line through points.
    pub fn curve(&self, points: &[[f32; 2]], width: f32) {
        let points = points.iter().map(|point| self.at(*point)).collect();
        self.painter.add(Shape::line(points, Stroke::new(width, self.palette.ink)));
    }

    /// A filled outline, convex.
    pub fn body(&self, points: &[[f32; 2]], fill: Color32) {
        let points = points.iter().map(|point| self.at(*point)).collect();
        self.painter.add(Shape::convex_polygon(points, fill, Stroke::new(1.0, self.palette.quiet)));
    }

    /// A filled circle.
    pub fn disc(&self, centre: [f32; 2], radius: f32, fill: Color32) {
        let radius = radius * self.rect.width() / BOX.x;
        self.painter.circle(self.at(centre), radius, fill, Stroke::new(1.0, self.palette.quiet));
    }

    /// A small word with its middle here.
    pub fn word(&self, at: [f32; 2], text: &str) {
        let font = FontId::proportional(size::SMALL - 1.0);
        self.painter.text(self.at(at), Align2::CENTER_CENTER, text, font, self.palette.quiet);
    }

    /// What is measured: a line with an arrow head at either end, in the accent colour. Where there is little room between
    /// its ends, the arrows stand outside and point inward.
    pub fn measure(&self, from: [f32; 2], to: [f32; 2]) {
        const HEAD: f32 = 5.0;
        const NARROW: f32 = 16.0;
        let (a, b) = (self.at(from), self.at(to));
        let along = (b - a).normalized();
        let stroke = Stroke::new(1.6, self.palette.accent);
        if a.distance(b) < NARROW {
            self.arrow(a - along * 12.0, a, HEAD, stroke);
            self.arrow(b + along * 12.0, b, HEAD, stroke);
        } else {
            self.arrow(a, b, HEAD, stroke);
            self.arrow(b, a, HEAD, stroke);
        }
    }

    fn arrow(&self, from: Pos2, tip: Pos2, head: f32, stroke: Stroke) {
        let back = (from - tip).normalized() * head;
        let side = Vec2::new(-back.y, back.x) * 0.5;
        self.painter.line_segment([from, tip], stroke);
        self.painter.line_segment([tip, tip + back + side], stroke);
        self.painter.line_segment([tip, tip + back - side], stroke);
    }
}
