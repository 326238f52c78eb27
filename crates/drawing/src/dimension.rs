//! Dimensions after ISO 129-1: extension lines, a dimension line with filled arrows, and the figure above it.

use crate::flatten::Mark;
use crate::{Anchor, Point, Text, lettering, pt};

/// A dimension: what is measured, and what is written about it.
#[derive(Debug, Clone, PartialEq)]
pub struct Dimension {
    /// What is measured.
    pub measure: Measure,
    /// The figure as it is written, with units and tolerances as the sheet wants them.
    pub label: String,
    /// Height of its figures, mm.
    pub height_mm: f64,
    /// The middle of the figure where it is to stand elsewhere; it is then level and a leader joins it.
    pub label_at: Option<Point>,
}

/// What a dimension measures.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Measure {
    /// The distance of two points along a direction.
    Linear {
        /// First point.
        from: Point,
        /// Second point.
        to: Point,
        /// The direction, degrees anticlockwise from x.
        direction_deg: f64,
        /// A point on the dimension line.
        line_at: Point,
    },
    /// The distance of two points.
    Aligned {
        /// First point.
        from: Point,
        /// Second point.
        to: Point,
        /// Distance of the dimension line to the left of the way from the first to the second, mm.
        offset_mm: f64,
    },
    /// The angle between two directions, anticlockwise from the first.
    Angular {
        /// Where the sides meet.
        vertex: Point,
        /// First side, degrees anticlockwise from x.
        start_deg: f64,
        /// Second side, degrees anticlockwise from x.
        end_deg: f64,
        /// Radius of the dimension line, mm.
        radius_mm: f64,
    },
}

/// Distance between a feature and its extension line, mm.
const EXTENSION_GAP_MM: f64 = 0.8;
/// How far an extension line goes beyond the dimension line, mm.
const EXTENSION_PAST_MM: f64 = 1.5;
/// Length of an arrow over the height of the figures.
const ARROW_LENGTH: f64 = 1.0;
/// Half the width of an arrow over its length: an arrow of 15 degrees (ISO 129-1, from memory).
const ARROW_HALF_WIDTH: f64 = 0.131_652;
/// Distance of a figure from the line below it, over its height.
const LABEL_GAP: f64 = 0.4;

impl Dimension {
    /// A dimension with figures of the usual height.
    #[must_use]
    pub fn new(measure: Measure, label: impl Into<String>) -> Self {
        Self { measure, label: label.into(), height_mm: lettering::SMALL_MM, label_at: None }
    }

    /// The same with its figure elsewhere.
    #[must_use]
    pub fn labelled_at(self, at: Point) -> Self {
        Self { label_at: Some(at), ..self }
    }

    /// The same moved by a step.
    #[must_use]
    pub fn moved(self, step: Point) -> Self {
        let measure = match self.measure {
            Measure::Linear { from, to, direction_deg, line_at } => {
                let [from, to, line_at] = [from, to, line_at].map(|p| p.plus(step));
                Measure::Linear { from, to, direction_deg, line_at }
            }
            Measure::Aligned { from, to, offset_mm } => {
                Measure::Aligned { from: from.plus(step), to: to.plus(step), offset_mm }
            }
            Measure::Angular { vertex, start_deg, end_deg, radius_mm } => {
                Measure::Angular { vertex: vertex.plus(step), start_deg, end_deg, radius_mm }
            }
        };
        Self { measure, label_at: self.label_at.map(|p| p.plus(step)), ..self }
    }

    /// What it measures, mm or degrees.
    #[must_use]
    pub fn value(&self) -> f64 {
        match self.measure {
            Measure::Linear { from, to, direction_deg, .. } => {
                to.minus(from).dot(Point::direction(direction_deg)).abs()
            }
            Measure::Aligned { from, to, .. } => from.distance(to),
            Measure::Angular { start_deg, end_deg, .. } => (end_deg - start_deg).rem_euclid(360.0),
        }
    }

    /// The dimension taken apart into lines, arrows and its figure.
    #[must_use]
    pub fn marks(&self) -> Vec<Mark> {
        match self.measure {
            Measure::Angular { vertex, start_deg, end_deg, radius_mm } => {
                self.angular_marks(vertex, start_deg, end_deg, radius_mm)
            }
            Measure::Linear { .. } | Measure::Aligned { .. } => self.linear_marks(),
        }
    }

    /// First and second point, and where the dimension line meets their extension lines.
    pub(crate) fn feet(&self) -> Option<Feet> {
        let (from, to, along, line_at) = match self.measure {
            Measure::Linear { from, to, direction_deg, line_at } => {
                (from, to, Point::direction(direction_deg), line_at)
            }
            Measure::Aligned { from, to, offset_mm } => {
                let along = to.minus(from).unit();
                (from, to, along, from.toward(along.left(), offset_mm))
            }
            Measure::Angular { .. } => return None,
        };
        let aside = along.left();
        let foot = |p: Point| p.toward(aside, line_at.minus(p).dot(aside));
        let forward = to.minus(from).dot(along) >= 0.0;
        let along = if forward { along } else { along.times(-1.0) };
        Some(Feet { from, to, along, from_foot: foot(from), to_foot: foot(to) })
    }

    fn linear_marks(&self) -> Vec<Mark> {
        let Some(feet) = self.feet() else { return vec![] };
        let Feet { from, to, along, from_foot, to_foot } = feet;
        let mut marks: Vec<Mark> =
            [(from, from_foot), (to, to_foot)].into_iter().filter_map(extension).collect();
        let arrow_mm = ARROW_LENGTH * self.height_mm;
        let length_mm = from_foot.distance(to_foot);
        let inside = length_mm >= 3.0 * arrow_mm;
        let label_mm = crate::width_mm(&crate::clean(&self.label), self.height_mm);
        let between = self.label_at.is_none() && inside && label_mm <= length_mm - 2.0 * arrow_mm;
        let outward = if inside { 0.0 } else { 2.0 * arrow_mm };
        // A figure that does not fit between the arrows stands on the line beyond the second one.
        let beyond =
            if self.label_at.is_some() || between { outward } else { outward.max(arrow_mm) + label_mm };
        let line = (from_foot.toward(along, -outward), to_foot.toward(along, beyond));
        marks.push(Mark::line(line.0, line.1));
        let point_out = if inside { 1.0 } else { -1.0 };
        marks.push(arrow(from_foot, along.times(-point_out), arrow_mm));
        marks.push(arrow(to_foot, along.times(point_out), arrow_mm));
        match self.label_at {
            Some(at) => marks.extend(self.label_elsewhere(at, line)),
            None if between => marks.push(self.label_over(from_foot.middle(to_foot), along)),
            None => marks.push(self.label_over(line.1.toward(along, -label_mm / 2.0), along)),
        }
        marks
    }

    /// The figure above a point of the dimension line, readable from below or from the right.
    fn label_over(&self, foot: Point, along: Point) -> Mark {
        let angle_deg = readable(along.angle_deg());
        let up = Point::direction(angle_deg).left();
        let at = foot.toward(up, LABEL_GAP * self.height_mm);
        self.label_mark(at, angle_deg, Anchor::Middle)
    }

    fn label_mark(&self, at: Point, angle_deg: f64, anchor: Anchor) -> Mark {
        Mark::Text(Text::new(at, self.height_mm, self.label.clone()).turned(angle_deg).anchored(anchor).run())
    }

    /// A level figure with a leader from the nearer end of the dimension line.
    fn label_elsewhere(&self, at: Point, line: (Point, Point)) -> Vec<Mark> {
        let label = self.label_mark(at, 0.0, Anchor::Centre);
        let end = if line.0.distance(at) < line.1.distance(at) { line.0 } else { line.1 };
        let half_mm =
            crate::width_mm(&crate::clean(&self.label), self.height_mm) / 2.0 + 0.3 * self.height_mm;
        let side = pt(if end.x < at.x { at.x - half_mm } else { at.x + half_mm }, at.y);
        let near = end.distance(at) <= half_mm;
        if near { vec![label] } else { vec![Mark::line(end, side), label] }
    }

    fn angular_marks(&self, vertex: Point, start_deg: f64, end_deg: f64, radius_mm: f64) -> Vec<Mark> {
        let sweep_deg = self.value();
        let arrow_mm = ARROW_LENGTH * self.height_mm;
        let arrow_deg = (arrow_mm / radius_mm.max(arrow_mm)).to_degrees();
        let inside = sweep_deg >= 3.0 * arrow_deg;
        let outward_deg = if inside { 0.0 } else { 2.0 * arrow_deg };
        let foot = |angle_deg: f64| vertex.toward(Point::direction(angle_deg), radius_mm);
        let mut marks = vec![Mark::Arc {
            centre: vertex,
            radius_mm,
            start_deg: start_deg - outward_deg,
            sweep_deg: sweep_deg + 2.0 * outward_deg,
        }];
        // The arrow lies along the chord of the arc that it covers.
        let turn = if inside { 1.0 } else { -1.0 };
        for (angle_deg, way) in [(start_deg, -1.0), (end_deg, 1.0)] {
            let back = foot(angle_deg - way * turn * arrow_deg);
            marks.push(arrow(foot(angle_deg), foot(angle_deg).minus(back).unit(), arrow_mm));
        }
        let middle_deg = start_deg + sweep_deg / 2.0;
        let label_mm = crate::width_mm(&crate::clean(&self.label), self.height_mm);
        let at = self.label_at.unwrap_or_else(|| {
            let across_mm = 0.5 * label_mm * Point::direction(middle_deg).x.abs() + self.height_mm;
            vertex.toward(Point::direction(middle_deg), radius_mm + across_mm)
        });
        marks.push(self.label_mark(at, 0.0, Anchor::Centre));
        marks
    }
}

/// Where a straight dimension stands.
pub(crate) struct Feet {
    pub from: Point,
    pub to: Point,
    /// From the first foot to the second, length 1.
    pub along: Point,
    pub from_foot: Point,
    pub to_foot: Point,
}

/// The extension line from a feature to its foot; none where the dimension line passes near the feature.
fn extension((feature, foot): (Point, Point)) -> Option<Mark> {
    let way = foot.minus(feature);
    (way.length() > EXTENSION_GAP_MM).then(|| {
        let along = way.unit();
        Mark::line(feature.toward(along, EXTENSION_GAP_MM), foot.toward(along, EXTENSION_PAST_MM))
    })
}

/// A filled arrow with its tip at a point, pointing along a direction.
pub(crate) fn arrow(tip: Point, along: Point, length_mm: f64) -> Mark {
    let back = tip.toward(along, -length_mm);
    let half_mm = ARROW_HALF_WIDTH * length_mm;
    Mark::Fill(vec![tip, back.toward(along.left(), half_mm), back.toward(along.left(), -half_mm)])
}

/// The same line's angle over −90 to 90 degrees, so that figures are read from below or from the right.
fn readable(angle_deg: f64) -> f64 {
    let turned = (angle_deg + 90.0).rem_euclid(180.0) - 90.0;
    // A line straight up or down is read from the right.
    if (turned + 90.0).abs() < 1e-9 { 90.0 } else { turned }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn linear(length_mm: f64, direction_deg: f64) -> Dimension {
        let to = pt(10.0, 10.0).toward(Point::direction(direction_deg), length_mm);
        let measure = Measure::Linear { from: pt(10.0, 10.0), to, direction_deg, line_at: pt(10.0, 20.0) };
        Dimension::new(measure, "12.34")
    }

    #[test]
    fn values_are_measured_not_stated() {
        assert!((linear(7.25, 30.0).value() - 7.25).abs() < 1e-12);
        let aligned = Measure::Aligned { from: pt(0.0, 0.0), to: pt(3.0, 4.0), offset_mm: 9.0 };
        assert!((Dimension::new(aligned, "x").value() - 5.0).abs() < 1e-12);
        let slanted = Measure::Linear {
            from: pt(3.0, 4.0),
            to: pt(0.0, 0.0),
            direction_deg: 90.0,
            line_at: pt(0.0, 0.0),
        };
        assert!((Dimension::new(slanted, "x").value() - 4.0).abs() < 1e-12);
        let angle =
            Measure::Angular { vertex: pt(0.0, 0.0), start_deg: 350.0, end_deg: 15.0, radius_mm: 30.0 };
        assert!((Dimension::new(angle, "x").value() - 25.0).abs() < 1e-12);
    }

    #[test]
    fn figures_are_read_from_below_or_from_the_right() {
        for (angle, expected) in [(0.0, 0.0), (180.0, 0.0), (90.0, 90.0), (-90.0, 90.0), (135.0, -45.0)] {
            assert!((readable(angle) - expected).abs() < 1e-9, "{angle}: {}", readable(angle));
        }
    }

    #[test]
    fn a_short_dimension_has_its_arrows_and_figure_outside() {
        for length_mm in [1.0, 100.0] {
            let marks = linear(length_mm, 0.0).marks();
            let tips: Vec<f64> = marks
                .iter()
                .filter_map(|m| if let Mark::Fill(p) = m { Some(p[1].x - p[0].x) } else { None })
                .collect();
            let label =
                marks.iter().find_map(|m| if let Mark::Text(run) = m { Some(run.bounds()) } else { None });
            let label_left = label.map_or(f64::NAN, |b| b.min.x);
            if length_mm > 50.0 {
                assert!(tips[0] > 0.0 && tips[1] < 0.0 && label_left < 60.0);
            } else {
                assert!(tips[0] < 0.0 && tips[1] > 0.0 && label_left > 11.0);
            }
        }
    }
}
