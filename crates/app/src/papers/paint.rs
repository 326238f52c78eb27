//! Paints a sheet: white paper with the marks of the drawing, whatever the colours of the window.

use crestline_drawing::{Drawing, Mark, Point, Primitive, Rect as Area, TextRun};
use eframe::egui::epaint::TextShape;
use eframe::egui::{Color32, FontId, Painter, Pos2, Rect, Shape, Stroke, Vec2};

/// The thinnest line that is still seen, points.
const HAIRLINE: f32 = 0.6;
/// Text smaller than this is not painted, points.
const UNREADABLE: f32 = 1.5;
/// How far a chord may leave an arc, points.
const CHORD: f32 = 0.2;

/// A sheet on the screen.
#[derive(Debug, Clone, Copy)]
pub struct Paper {
    /// Where it lies.
    pub rect: Rect,
    /// The part of the plane that it shows, mm.
    pub area: Area,
    /// Points to the millimetre.
    pub scale: f32,
}

impl Paper {
    /// A sheet whose upper left corner lies at a place on the screen.
    #[must_use]
    pub fn at(corner: Pos2, area: Area, scale: f32) -> Self {
        Self { rect: Rect::from_min_size(corner, size(area, scale)), area, scale }
    }

    /// The place of a point of the sheet on the screen.
    #[must_use]
    pub fn place(&self, point: Point) -> Pos2 {
        let x = (point.x - self.area.min.x) as f32 * self.scale;
        let y = (self.area.max.y - point.y) as f32 * self.scale;
        self.rect.min + Vec2::new(x, y)
    }
}

/// Size of a sheet on the screen, points.
#[must_use]
pub fn size(area: Area, scale: f32) -> Vec2 {
    Vec2::new((area.max.x - area.min.x) as f32, (area.max.y - area.min.y) as f32) * scale
}

/// Paints a sheet.
pub fn paint(painter: &Painter, paper: &Paper, drawing: &Drawing, primitives: &[Primitive]) {
    painter.rect_filled(paper.rect.translate(Vec2::splat(2.0)), 0.0, Color32::from_black_alpha(60));
    painter.rect_filled(paper.rect, 0.0, Color32::WHITE);
    let seen = painter.clip_rect();
    for primitive in primitives {
        let colour = drawing.layer(primitive.layer).map_or(Color32::BLACK, |layer| {
            let [red, green, blue] = layer.colour.rgb();
            Color32::from_rgb(red, green, blue)
        });
        let width = (primitive.pen.width.mm() as f32 * paper.scale).max(HAIRLINE);
        let stroke = Stroke::new(width, colour);
        match &primitive.mark {
            Mark::Fill(points) => {
                let points = points.iter().map(|point| paper.place(*point)).collect();
                painter.add(Shape::convex_polygon(points, colour, Stroke::NONE));
            }
            Mark::Text(run) => text(painter, paper, run, colour),
            mark => {
                let outline = mark.outline(f64::from(CHORD / paper.scale));
                let points: Vec<Pos2> = outline.into_iter().map(|point| paper.place(point)).collect();
                if Rect::from_points(&points).expand(width).intersects(seen) {
                    line(painter, primitive, paper.scale, points, stroke);
                }
            }
        }
    }
}

fn line(painter: &Painter, primitive: &Primitive, scale: f32, points: Vec<Pos2>, stroke: Stroke) {
    let pattern = primitive.pen.style.pattern_mm(primitive.pen.width);
    if pattern.is_empty() {
        painter.add(Shape::line(points, stroke));
        return;
    }
    let lengths = |offset: usize| -> Vec<f32> {
        pattern.iter().skip(offset).step_by(2).map(|length| (*length as f32 * scale).max(0.5)).collect()
    };
    painter.extend(Shape::dashed_line_with_offset(&points, stroke, &lengths(0), &lengths(1), 0.0));
}

/// A line of text, set to the length that it has on the paper: the screen rounds letters to its own grid.
fn text(painter: &Painter, paper: &Paper, run: &TextRun, colour: Color32) {
    let em = run.font_size_mm() as f32 * paper.scale;
    if em < UNREADABLE || run.content.is_empty() {
        return;
    }
    // A font's size on the screen is the height of its line, which for this font is 1.164 em.
    let galley = painter.layout_no_wrap(run.content.clone(), FontId::proportional(em), colour);
    let ascent = galley.rows.first().and_then(|row| row.glyphs.first()).map_or(em, |glyph| glyph.font_ascent);
    let angle = -(run.angle_deg.to_radians() as f32);
    let up = Vec2::angled(angle - std::f32::consts::FRAC_PI_2);
    let corner = paper.place(run.start) + up * ascent;
    painter.add(TextShape::new(corner, galley, colour).with_angle(angle));
}
