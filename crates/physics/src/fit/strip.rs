//! The Chebyshev line of some crests: the straight line with the smallest largest distance to them.

use crate::fit::unknowns::offset_mm;
use crate::neck::PlanPoint;

/// The line and the largest distance of a crest from it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ChebyshevLine {
    /// Two points of the line, the one of greater y first.
    pub ends: [PlanPoint; 2],
    /// The largest distance of a point from it, mm.
    pub half_width_mm: f64,
}

/// The line through the middle of the narrowest strip that holds all points, steeper than 45° to the centre line
/// where there is such a one. One side of the narrowest strip always lies along an edge of the convex hull
/// (M. E. Houle and G. T. Toussaint, IEEE Trans. PAMI 10 (1988) 761), so all pairs of points are tried: there are
/// few. A single point gets the line square to the centre line.
#[must_use]
pub fn chebyshev_line(points: &[PlanPoint]) -> Option<ChebyshevLine> {
    let first = *points.first()?;
    let mut best: Option<(bool, ChebyshevLine)> = None;
    for (index, &a) in points.iter().enumerate() {
        for &b in &points[index + 1..] {
            if a.distance_mm(b) == 0.0 {
                continue;
            }
            let [upper, lower] = if a.y_mm >= b.y_mm { [a, b] } else { [b, a] };
            let along = (a.x_mm - b.x_mm).abs() > (a.y_mm - b.y_mm).abs();
            let candidate = middle_of_strip([upper, lower], points);
            let better = best.is_none_or(|(best_along, line)| {
                (along, candidate.half_width_mm) < (best_along, line.half_width_mm)
            });
            if better {
                best = Some((along, candidate));
            }
        }
    }
    let square = [first, PlanPoint::new(first.x_mm, first.y_mm - 1.0)];
    Some(best.map_or(ChebyshevLine { ends: square, half_width_mm: 0.0 }, |(_, line)| line))
}

fn middle_of_strip(ends: [PlanPoint; 2], points: &[PlanPoint]) -> ChebyshevLine {
    let (low, high) = points
        .iter()
        .map(|&point| offset_mm(ends, point))
        .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), offset| (low.min(offset), high.max(offset)));
    let [treble, bass] = ends;
    let length = treble.distance_mm(bass);
    let middle = 0.5 * (low + high) / length;
    // The side on which offsets are positive.
    let (side_x, side_y) = (treble.y_mm - bass.y_mm, bass.x_mm - treble.x_mm);
    let shifted =
        |point: PlanPoint| PlanPoint::new(point.x_mm + middle * side_x, point.y_mm + middle * side_y);
    ChebyshevLine { ends: [shifted(treble), shifted(bass)], half_width_mm: 0.5 * (high - low) }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn a_triangle_is_halved_along_its_longest_side() {
        let points = [PlanPoint::new(0.0, 30.0), PlanPoint::new(2.0, 0.0), PlanPoint::new(0.0, -30.0)];
        let line = chebyshev_line(&points).unwrap();
        assert!((line.half_width_mm - 1.0).abs() < 1e-12);
        assert!((line.ends[0].x_mm - 1.0).abs() < 1e-12 && (line.ends[1].x_mm - 1.0).abs() < 1e-12);
    }

    #[test]
    fn no_line_of_a_fine_fan_is_better() {
        let points: Vec<PlanPoint> =
            [(4.1, 27.0), (3.0, 16.0), (5.2, 5.4), (3.3, -5.4), (4.4, -16.2), (6.0, -27.0)]
                .map(|(x, y)| PlanPoint::new(x, y))
                .to_vec();
        let best = chebyshev_line(&points).unwrap().half_width_mm;
        for tilt in -200..200 {
            let bass = PlanPoint::new(f64::from(tilt) * 0.001 * 60.0, -60.0);
            let ends = [PlanPoint::new(0.0, 0.0), bass];
            assert!(middle_of_strip(ends, &points).half_width_mm >= best - 1e-12);
        }
    }
}
