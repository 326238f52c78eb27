//! The taut line over the crowns: the shortest path in a vertical plane that passes below no crown.

/// A point of the string's side view: s along it from the nominal nut line, z above the crowns' base line, mm.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SidePoint {
    /// Along the string.
    pub s_mm: f64,
    /// Height.
    pub z_mm: f64,
}

impl SidePoint {
    /// Length of the straight piece to `next` over its run along s: √(Δs² + Δz²) − Δs, without cancellation.
    #[must_use]
    pub fn excess_mm(self, next: Self) -> f64 {
        let (run, rise) = (next.s_mm - self.s_mm, next.z_mm - self.z_mm);
        rise * rise / (run + (run * run + rise * rise).sqrt())
    }

    /// Straight distance to another point, mm.
    #[must_use]
    pub fn distance_mm(self, other: Self) -> f64 {
        let (run, rise) = (other.s_mm - self.s_mm, other.z_mm - self.z_mm);
        (run * run + rise * rise).sqrt()
    }

    /// Height of the straight line from here to `end` at `s_mm`.
    #[must_use]
    pub fn line_height_mm(self, end: Self, s_mm: f64) -> f64 {
        self.z_mm + (end.z_mm - self.z_mm) * (s_mm - self.s_mm) / (end.s_mm - self.s_mm)
    }
}

/// A taut piece of string between two held points.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct TautPath {
    /// Its length over its run along s, mm.
    pub excess_mm: f64,
    /// The point it leaves last before its end: the start, or the last crown that it bends over.
    pub last_support: SidePoint,
    /// Index among the crowns given of that crown; absent where the path is straight.
    pub last_crown: Option<usize>,
}

/// The shortest path from `start` to `end` that passes below none of `crowns` (in order along s, all between
/// the two): the upper convex hull of the points, walked from the start.
#[must_use]
pub fn taut_path(start: SidePoint, crowns: &[SidePoint], end: SidePoint) -> TautPath {
    let mut here = start;
    let mut path = TautPath { excess_mm: 0.0, last_support: start, last_crown: None };
    let mut next_crown = 0;
    loop {
        // The steepest of the crowns that stand above the straight line to the end.
        let mut steepest = slope(here, end);
        let mut lifted = None;
        for (index, crown) in crowns.iter().enumerate().skip(next_crown) {
            let upward = slope(here, *crown);
            if upward > steepest {
                steepest = upward;
                lifted = Some(index);
            }
        }
        let Some(index) = lifted else { break };
        path.excess_mm += here.excess_mm(crowns[index]);
        here = crowns[index];
        path.last_support = here;
        path.last_crown = Some(index);
        next_crown = index + 1;
    }
    path.excess_mm += here.excess_mm(end);
    path
}

fn slope(from: SidePoint, to: SidePoint) -> f64 {
    (to.z_mm - from.z_mm) / (to.s_mm - from.s_mm)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn point(s_mm: f64, z_mm: f64) -> SidePoint {
        SidePoint { s_mm, z_mm }
    }

    #[test]
    fn a_clear_path_is_straight() {
        let path = taut_path(point(0.0, 1.0), &[point(50.0, 0.0)], point(100.0, 2.0));
        assert_eq!(path.last_crown, None);
        assert!((path.excess_mm - (100f64.hypot(1.0) - 100.0)).abs() < 1e-12);
    }

    #[test]
    fn a_hill_of_crowns_is_followed_and_a_dip_is_not() {
        let crowns = [point(20.0, 1.0), point(40.0, 1.5), point(60.0, 0.2), point(80.0, 1.2)];
        let path = taut_path(point(0.0, 0.0), &crowns, point(100.0, 0.0));
        let pieces = 20f64.hypot(1.0) + 20f64.hypot(0.5) + 40f64.hypot(0.3) + 20f64.hypot(1.2);
        assert!((path.excess_mm + 100.0 - pieces).abs() < 1e-12);
        assert_eq!(path.last_crown, Some(3));
    }
}
