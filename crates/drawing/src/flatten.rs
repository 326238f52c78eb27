//! A sheet taken apart into what a pen can do: strokes, arcs, filled polygons and lines of text.
//!
//! Every writer and the window paint this, so that all of them show the same drawing.

use crate::{Item, LayerId, Pen, Point, Rect, Shape, Sheet, TextRun, pt};

/// Half the size of the cross that marks a point, mm.
pub const POINT_MARK_MM: f64 = 1.0;

/// Something to paint, with its layer and pen.
#[derive(Debug, Clone, PartialEq)]
pub struct Primitive {
    /// The layer it belongs to.
    pub layer: LayerId,
    /// The pen for strokes and arcs.
    pub pen: Pen,
    /// What to paint.
    pub mark: Mark,
}

/// What a pen can do.
#[derive(Debug, Clone, PartialEq)]
pub enum Mark {
    /// Straight lines through points.
    Stroke {
        /// The corners.
        points: Vec<Point>,
        /// Whether the last joins the first.
        closed: bool,
    },
    /// A part of a circle; a sweep of 360 is the whole circle.
    Arc {
        /// Centre.
        centre: Point,
        /// Radius, mm.
        radius_mm: f64,
        /// Start, degrees anticlockwise from x.
        start_deg: f64,
        /// Sweep anticlockwise, degrees, over 0 to 360.
        sweep_deg: f64,
    },
    /// A filled convex polygon.
    Fill(Vec<Point>),
    /// A line of text.
    Text(TextRun),
}

impl Mark {
    /// A single line.
    pub(crate) fn line(from: Point, to: Point) -> Self {
        Self::Stroke { points: vec![from, to], closed: false }
    }

    /// The points to join with straight lines: corners of strokes and fills, an arc cut into chords that
    /// leave it by no more than a tolerance (mm), the corners of a text's box. A closed figure ends where it began.
    #[must_use]
    pub fn outline(&self, tolerance_mm: f64) -> Vec<Point> {
        match self {
            Self::Stroke { points, closed } => {
                let closing = points.first().copied().filter(|_| *closed);
                points.iter().copied().chain(closing).collect()
            }
            Self::Fill(points) => points.iter().copied().chain(points.first().copied()).collect(),
            Self::Arc { centre, radius_mm, start_deg, sweep_deg } => {
                chords(*centre, *radius_mm, *start_deg, *sweep_deg, tolerance_mm)
            }
            Self::Text(run) => run.corners().to_vec(),
        }
    }

    /// The level box around it, without the pen's width; `None` for a stroke without points.
    #[must_use]
    pub fn bounds(&self) -> Option<Rect> {
        Rect::around(self.outline(0.001))
    }
}

/// Points on an arc whose chords leave it by no more than a tolerance.
fn chords(centre: Point, radius_mm: f64, start_deg: f64, sweep_deg: f64, tolerance_mm: f64) -> Vec<Point> {
    const MOST: f64 = 720.0;
    // The sagitta of a chord over the angle a is r·(1 − cos(a/2)).
    let ratio = (1.0 - tolerance_mm / radius_mm.max(tolerance_mm)).clamp(-1.0, 1.0);
    let step_deg = (2.0 * ratio.acos()).to_degrees().max(0.5);
    let count = (sweep_deg / step_deg).ceil().clamp(1.0, MOST);
    // The count lies between 1 and 720.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let last = count as u32;
    (0..=last)
        .map(|i| centre.toward(Point::direction(start_deg + sweep_deg * f64::from(i) / count), radius_mm))
        .collect()
}

/// The sweep of an arc from its start to its end, over 0 to 360 degrees.
pub(crate) fn sweep_deg(start_deg: f64, end_deg: f64) -> f64 {
    let sweep = (end_deg - start_deg).rem_euclid(360.0);
    if sweep > 0.0 { sweep } else { 360.0 }
}

impl Sheet {
    /// Everything on the sheet in painting order, taken apart.
    #[must_use]
    pub fn primitives(&self) -> Vec<Primitive> {
        self.items.iter().flat_map(Item::primitives).collect()
    }
}

impl Item {
    /// This item taken apart. Figures with a coordinate that is not finite are left out.
    #[must_use]
    pub fn primitives(&self) -> Vec<Primitive> {
        let Self { layer, pen, .. } = *self;
        let finite = |mark: &Mark| mark.outline(0.1).into_iter().all(Point::is_finite);
        self.shape.marks().into_iter().filter(finite).map(|mark| Primitive { layer, pen, mark }).collect()
    }
}

impl Shape {
    /// This shape taken apart.
    #[must_use]
    pub fn marks(&self) -> Vec<Mark> {
        match self {
            Self::Line(from, to) => vec![Mark::line(*from, *to)],
            Self::Polyline { points, closed } => {
                vec![Mark::Stroke { points: points.clone(), closed: *closed }]
            }
            Self::Arc { centre, radius_mm, start_deg, end_deg } => vec![Mark::Arc {
                centre: *centre,
                radius_mm: *radius_mm,
                start_deg: *start_deg,
                sweep_deg: sweep_deg(*start_deg, *end_deg),
            }],
            Self::Circle { centre, radius_mm } => {
                vec![Mark::Arc { centre: *centre, radius_mm: *radius_mm, start_deg: 0.0, sweep_deg: 360.0 }]
            }
            Self::Point(at) => cross(*at),
            Self::Fill(points) => vec![Mark::Fill(points.clone())],
            Self::Text(text) => vec![Mark::Text(text.run())],
            Self::Dimension(dimension) => dimension.marks(),
        }
    }
}

fn cross(at: Point) -> Vec<Mark> {
    let arms = [pt(POINT_MARK_MM, 0.0), pt(0.0, POINT_MARK_MM)];
    arms.map(|arm| Mark::line(at.minus(arm), at.plus(arm))).to_vec()
}

#[cfg(test)]
#[allow(clippy::unwrap_used)]
mod tests {
    use super::*;

    #[test]
    fn an_arc_stays_within_its_tolerance() {
        let arc = Shape::Arc { centre: pt(1.0, 2.0), radius_mm: 10.0, start_deg: 350.0, end_deg: 20.0 };
        let points = arc.marks()[0].outline(0.01);
        let worst =
            points.windows(2).map(|w| 10.0 - w[0].middle(w[1]).distance(pt(1.0, 2.0))).fold(0.0, f64::max);
        assert!(worst > 0.0 && worst <= 0.01, "{worst}");
        assert!(points.last().unwrap().distance(pt(1.0, 2.0).toward(Point::direction(20.0), 10.0)) < 1e-9);
    }

    #[test]
    fn what_is_not_finite_is_not_painted() {
        let mut sheet = Sheet::new("s", 10.0, 10.0);
        let pen = Pen::solid(crate::Width::W025);
        sheet.add(LayerId(0), pen, Shape::Line(pt(f64::NAN, 0.0), pt(1.0, 1.0)));
        sheet.add(LayerId(0), pen, Shape::Circle { centre: pt(1.0, 1.0), radius_mm: f64::INFINITY });
        assert!(sheet.primitives().is_empty());
    }
}
