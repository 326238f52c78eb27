//! The neck in plan: string lines, fret lines, and where they cross.
//!
//! x runs along the centre line toward the bridge, x = 0 where the nominal nut line crosses it; y across,
//! positive toward string 1. Millimetres.

use crate::PhysicsError;
use crate::error::within;

/// A point in plan, mm.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PlanPoint {
    /// Along the centre line.
    pub x_mm: f64,
    /// Across.
    pub y_mm: f64,
}

impl PlanPoint {
    /// The point at x, y.
    #[must_use]
    pub fn new(x_mm: f64, y_mm: f64) -> Self {
        Self { x_mm, y_mm }
    }

    /// Distance to another point, mm.
    #[must_use]
    pub fn distance_mm(self, other: Self) -> f64 {
        (self.x_mm - other.x_mm).hypot(self.y_mm - other.y_mm)
    }
}

/// One string in plan: a straight line from the nominal nut line through the nominal saddle line.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PlanLine {
    /// Where it crosses the nominal nut line, arc position 0.
    pub nut: PlanPoint,
    /// Where it crosses the nominal saddle line, arc position Λ.
    pub saddle: PlanPoint,
}

impl PlanLine {
    /// Distance of the nominal lines along the string, its scale Λ, mm.
    #[must_use]
    pub fn scale_mm(&self) -> f64 {
        self.nut.distance_mm(self.saddle)
    }

    /// The point at an arc position from the nominal nut line.
    #[must_use]
    pub fn at(&self, position_mm: f64) -> PlanPoint {
        let fraction = position_mm / self.scale_mm();
        PlanPoint::new(
            self.nut.x_mm + fraction * (self.saddle.x_mm - self.nut.x_mm),
            self.nut.y_mm + fraction * (self.saddle.y_mm - self.nut.y_mm),
        )
    }

    /// Arc position where the line through `a` and `b` crosses this string; absent where they are parallel.
    #[must_use]
    pub fn crossing_mm(&self, a: PlanPoint, b: PlanPoint) -> Option<f64> {
        let (run_x, run_y) = (self.saddle.x_mm - self.nut.x_mm, self.saddle.y_mm - self.nut.y_mm);
        let (line_x, line_y) = (b.x_mm - a.x_mm, b.y_mm - a.y_mm);
        let determinant = run_x * line_y - run_y * line_x;
        let fraction = ((a.x_mm - self.nut.x_mm) * line_y - (a.y_mm - self.nut.y_mm) * line_x) / determinant;
        fraction.is_finite().then(|| fraction * self.scale_mm())
    }
}

/// One scale, or the outer strings' scales of a fanned neck.
#[derive(Debug, Clone, PartialEq)]
pub enum NeckScale {
    /// Frets square to the centre line.
    Single {
        /// Scale along the centre line, mm.
        scale_mm: f64,
        /// Measured fret positions along the centre line, one a fret; equal temperament where absent.
        fret_positions_mm: Option<Vec<f64>>,
    },
    /// Frets join the outer strings' equal positions.
    Fanned {
        /// Scale of the last string along its plan line, mm.
        bass_mm: f64,
        /// Scale of string 1 along its plan line, mm.
        treble_mm: f64,
        /// The fret, which may be fractional, that lies square to the centre line.
        square_fret: f64,
    },
}

/// What a neck is laid out from.
#[derive(Debug, Clone, PartialEq)]
pub struct NeckShape {
    /// Scale or scales.
    pub scale: NeckScale,
    /// Number of frets.
    pub frets: usize,
    /// y of every string at the nominal nut line, string 1 first, mm.
    pub nut_y_mm: Vec<f64>,
    /// y of every string at the nominal saddle line, mm.
    pub saddle_y_mm: Vec<f64>,
}

/// A neck laid out in plan.
#[derive(Debug, Clone, PartialEq)]
pub struct Neck {
    /// The strings, string 1 first.
    pub strings: Vec<NeckString>,
    /// Fret lines between the outer strings, fret 1 first, treble end first.
    pub frets: Vec<[PlanPoint; 2]>,
    /// x where the crown of fret 12 crosses the centre line, mm.
    pub twelfth_fret_x_mm: f64,
    /// x where the nominal saddle line crosses the centre line, mm.
    pub saddle_line_x_mm: f64,
}

/// One string of a neck with its crown positions.
#[derive(Debug, Clone, PartialEq)]
pub struct NeckString {
    /// Its line in plan.
    pub line: PlanLine,
    /// Arc position of every crown from the nominal nut line, fret 1 first, mm.
    pub fret_mm: Vec<f64>,
}

/// Share of the scale that lies behind fret `fret` of equal temperament: 1 − 2^(−n/12).
#[must_use]
pub fn fret_fraction(fret: f64) -> f64 {
    -(-fret / 12.0 * std::f64::consts::LN_2).exp_m1()
}

/// Equal spacing by centres of `strings` strings over a spread, y of string 1 first, mm.
#[must_use]
pub fn equal_spacing_mm(strings: usize, spread_mm: f64) -> Vec<f64> {
    let gaps = strings.saturating_sub(1).max(1) as f64;
    let middle = 0.5 * strings.saturating_sub(1) as f64;
    (0..strings).map(|string| spread_mm * (middle - string as f64) / gaps).collect()
}

/// Lays a neck out.
///
/// # Errors
/// [`PhysicsError::OutOfRange`] where numbers of strings or frets do not match, or outer strings spread wider than
/// their scale; [`PhysicsError::NoCrossing`] where a string runs beside a fret line.
pub fn lay_out(shape: &NeckShape) -> Result<Neck, PhysicsError> {
    let strings = shape.nut_y_mm.len();
    within("number of strings", strings as f64, 1.0, 64.0)?;
    within(
        "number of string places at the saddle",
        shape.saddle_y_mm.len() as f64,
        strings as f64,
        strings as f64,
    )?;
    within("number of frets", shape.frets as f64, 12.0, 99.0)?;
    match &shape.scale {
        NeckScale::Single { scale_mm, fret_positions_mm } => {
            single(shape, *scale_mm, fret_positions_mm.as_deref())
        }
        NeckScale::Fanned { bass_mm, treble_mm, square_fret } => {
            fanned(shape, [*treble_mm, *bass_mm], *square_fret)
        }
    }
}

fn single(shape: &NeckShape, scale_mm: f64, measured: Option<&[f64]>) -> Result<Neck, PhysicsError> {
    within("scale in mm", scale_mm, f64::MIN_POSITIVE, 1e5)?;
    let x_mm: Vec<f64> = match measured {
        Some(positions) => {
            let count = shape.frets as f64;
            within("number of fret positions", positions.len() as f64, count, count)?;
            positions.to_vec()
        }
        None => (1..=shape.frets).map(|fret| scale_mm * fret_fraction(fret as f64)).collect(),
    };
    let strings: Vec<NeckString> = std::iter::zip(&shape.nut_y_mm, &shape.saddle_y_mm)
        .map(|(&nut_y, &saddle_y)| {
            let line =
                PlanLine { nut: PlanPoint::new(0.0, nut_y), saddle: PlanPoint::new(scale_mm, saddle_y) };
            let stretch = line.scale_mm() / scale_mm;
            NeckString { line, fret_mm: x_mm.iter().map(|x| x * stretch).collect() }
        })
        .collect();
    Ok(Neck { frets: fret_lines(&strings), strings, twelfth_fret_x_mm: x_mm[11], saddle_line_x_mm: scale_mm })
}

fn fanned(shape: &NeckShape, scales_mm: [f64; 2], square_fret: f64) -> Result<Neck, PhysicsError> {
    let last = shape.nut_y_mm.len() - 1;
    within("number of strings on a fanned neck", last as f64 + 1.0, 2.0, 64.0)?;
    let outer_y = [0, last].map(|string| (shape.nut_y_mm[string], shape.saddle_y_mm[string]));
    // Run of the outer strings along x: the scale is measured along the string.
    let mut run_x = [0.0; 2];
    for (run, (scale_mm, (nut_y, saddle_y))) in run_x.iter_mut().zip(scales_mm.into_iter().zip(outer_y)) {
        let across = saddle_y - nut_y;
        within("scale in mm", scale_mm, across.abs().next_up(), 1e5)?;
        *run = (scale_mm * scale_mm - across * across).sqrt();
    }
    // The square fret gives x_treble − x_bass at the nut; x = 0 on the centre line gives the rest.
    let lead = (run_x[1] - run_x[0]) * fret_fraction(square_fret);
    let (treble_y, bass_y) = (outer_y[0].0, outer_y[1].0);
    within("distance of the outer strings at the nut in mm", treble_y - bass_y, f64::MIN_POSITIVE, 1e4)?;
    let nut_x = [lead * treble_y / (treble_y - bass_y), lead * bass_y / (treble_y - bass_y)];
    let outer: [PlanLine; 2] = [0, 1].map(|side| PlanLine {
        nut: PlanPoint::new(nut_x[side], outer_y[side].0),
        saddle: PlanPoint::new(nut_x[side] + run_x[side], outer_y[side].1),
    });
    let across_neck = |fret: usize| outer.map(|line| line.at(line.scale_mm() * fret_fraction(fret as f64)));
    let lines: Vec<[PlanPoint; 2]> = (1..=shape.frets).map(across_neck).collect();
    let nut_ends = outer.map(|line| line.nut);
    let saddle_ends = outer.map(|line| line.saddle);
    let strings = (0..=last)
        .map(|string| {
            let nut = at_y(nut_ends, shape.nut_y_mm[string]);
            let saddle = at_y(saddle_ends, shape.saddle_y_mm[string]);
            let line = PlanLine { nut, saddle };
            let crossing = |ends: &[PlanPoint; 2]| {
                line.crossing_mm(ends[0], ends[1])
                    .ok_or(PhysicsError::NoCrossing { string: string + 1, line: "a fret line" })
            };
            let fret_mm = lines.iter().map(crossing).collect::<Result<_, _>>()?;
            Ok(NeckString { line, fret_mm })
        })
        .collect::<Result<Vec<_>, PhysicsError>>()?;
    Ok(Neck {
        frets: lines.clone(),
        strings,
        twelfth_fret_x_mm: at_y(lines[11], 0.0).x_mm,
        saddle_line_x_mm: at_y(saddle_ends, 0.0).x_mm,
    })
}

/// The point of a line across the neck at a given y.
fn at_y([treble, bass]: [PlanPoint; 2], y_mm: f64) -> PlanPoint {
    let fraction = (y_mm - treble.y_mm) / (bass.y_mm - treble.y_mm);
    PlanPoint::new(treble.x_mm + fraction * (bass.x_mm - treble.x_mm), y_mm)
}

fn fret_lines(strings: &[NeckString]) -> Vec<[PlanPoint; 2]> {
    let (Some(first), Some(last)) = (strings.first(), strings.last()) else { return Vec::new() };
    std::iter::zip(&first.fret_mm, &last.fret_mm)
        .map(|(&treble, &bass)| [first.line.at(treble), last.line.at(bass)])
        .collect()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    fn fan(square_fret: f64) -> Neck {
        lay_out(&NeckShape {
            scale: NeckScale::Fanned { bass_mm: 711.0, treble_mm: 648.0, square_fret },
            frets: 24,
            nut_y_mm: equal_spacing_mm(8, 48.0),
            saddle_y_mm: equal_spacing_mm(8, 74.0),
        })
        .unwrap()
    }

    #[test]
    fn the_square_fret_is_square_and_outer_strings_have_their_scales() {
        let neck = fan(7.0);
        let [treble, bass] = neck.frets[6];
        assert!((treble.x_mm - bass.x_mm).abs() < 1e-10);
        assert!((neck.strings[0].line.scale_mm() - 648.0).abs() < 1e-10);
        assert!((neck.strings[7].line.scale_mm() - 711.0).abs() < 1e-10);
        assert!((neck.strings[0].fret_mm[11] - 324.0).abs() < 1e-10);
    }

    #[test]
    fn a_fan_needs_two_strings_that_reach() {
        let shape = |scales: [f64; 2], nut_y_mm: Vec<f64>, saddle_y_mm: Vec<f64>| NeckShape {
            scale: NeckScale::Fanned { bass_mm: scales[1], treble_mm: scales[0], square_fret: 7.0 },
            frets: 24,
            nut_y_mm,
            saddle_y_mm,
        };
        let refused = |shape: &NeckShape| match lay_out(shape) {
            Err(PhysicsError::OutOfRange { name, value, .. }) => (name, value),
            other => ("laid out", other.map_or(f64::NAN, |neck| neck.strings.len() as f64)),
        };
        let one = shape([648.0, 711.0], vec![0.0], vec![0.0]);
        assert_eq!(refused(&one), ("number of strings on a fanned neck", 1.0));
        let two = |scales| shape(scales, vec![20.0, -20.0], vec![30.0, -30.0]);
        assert_eq!(refused(&two([648.0, 711.0])), ("laid out", 2.0));
        assert_eq!(refused(&two([9.0, 711.0])), ("scale in mm", 9.0));
        assert_eq!(refused(&two([648.0, 10.0])), ("scale in mm", 10.0));
    }

    #[test]
    fn fret_lines_run_from_the_first_string_to_the_last() {
        let shape = NeckShape {
            scale: NeckScale::Single { scale_mm: 640.0, fret_positions_mm: None },
            frets: 14,
            nut_y_mm: vec![18.0, 0.0, -18.0],
            saddle_y_mm: vec![26.0, 0.0, -26.0],
        };
        let neck = lay_out(&shape).unwrap();
        assert_eq!(neck.frets.len(), 14);
        // Fret 12 halves the strings.
        let [treble, bass] = neck.frets[11];
        assert!((treble.x_mm - 320.0).abs() < 1e-10 && (treble.y_mm - 22.0).abs() < 1e-10, "{treble:?}");
        assert!((bass.x_mm - 320.0).abs() < 1e-10 && (bass.y_mm + 22.0).abs() < 1e-10, "{bass:?}");
    }

    #[test]
    fn a_string_off_the_equal_spacing_is_crossed_where_it_is() {
        // Equally spaced strings are halved by fret 12 of a fanned neck; one that changes its place between its
        // neighbours is not.
        let mut saddle_y_mm = equal_spacing_mm(8, 74.0);
        let even = fan(7.0);
        saddle_y_mm[3] += 2.0;
        let shape = NeckShape {
            scale: NeckScale::Fanned { bass_mm: 711.0, treble_mm: 648.0, square_fret: 7.0 },
            frets: 24,
            nut_y_mm: equal_spacing_mm(8, 48.0),
            saddle_y_mm,
        };
        let neck = lay_out(&shape).unwrap();
        let half = |string: &NeckString| string.fret_mm[11] - string.line.scale_mm() / 2.0;
        assert!(half(&even.strings[3]).abs() < 1e-9);
        // Moved across by 1 mm at fret 12, where the fret line slants by (711 − 648)·(½ − 0.3326)/61 = 0.173
        // and the saddle line by 0.56: the two differ by 1·0.173 − ½·2·0.56 mm along the string.
        assert!((half(&neck.strings[3]).abs() - 0.39).abs() < 0.05, "{}", half(&neck.strings[3]));
        assert!((even.strings[3].line.scale_mm() - neck.strings[3].line.scale_mm()).abs() > 0.5);
    }

    #[test]
    fn the_nut_line_crosses_the_centre_at_zero() {
        let neck = fan(9.5);
        let (treble, bass) = (neck.strings[0].line.nut, neck.strings[7].line.nut);
        let fraction = treble.y_mm / (treble.y_mm - bass.y_mm);
        assert!((treble.x_mm + fraction * (bass.x_mm - treble.x_mm)).abs() < 1e-10);
    }

    #[test]
    fn a_fan_of_equal_scales_is_an_ordinary_neck() {
        let spaced = |spread| equal_spacing_mm(6, spread);
        let line = PlanLine { nut: PlanPoint::new(0.0, 18.0), saddle: PlanPoint::new(650.0, 27.0) };
        let outer_mm = line.scale_mm();
        let shape = |scale| NeckShape { scale, frets: 20, nut_y_mm: spaced(36.0), saddle_y_mm: spaced(54.0) };
        let fanned = NeckScale::Fanned { bass_mm: outer_mm, treble_mm: outer_mm, square_fret: 3.0 };
        let single = NeckScale::Single { scale_mm: 650.0, fret_positions_mm: None };
        let (fanned, single) = (lay_out(&shape(fanned)).unwrap(), lay_out(&shape(single)).unwrap());
        for (a, b) in std::iter::zip(&fanned.strings, &single.strings) {
            for (a, b) in std::iter::zip(&a.fret_mm, &b.fret_mm) {
                assert!((a - b).abs() < 1e-9);
            }
        }
    }
}
