//! Best contacts of one string near known ones: what a sample of thousands of slightly different strings needs.
//!
//! [`fit`](crate::fit) searches from nowhere, with several strings at once. Here one string differs little from one
//! whose contacts are known: one set of slopes and two or three sets of errors then do (Gauss–Newton with the slopes
//! of the start kept, the chord method; C. T. Kelley, Iterative Methods for Linear and Nonlinear Equations, ch. 5).

use crate::fit::FitRule;
use crate::{Contacts, FrettedString, PhysicsError};

/// Step below which the next would be lost: with kept slopes a step leaves less than a hundredth of itself.
pub const SETTLED_MM: f64 = 2e-4;
/// A longer step leaves the neighbourhood in which the slopes hold.
const FRESH_MM: f64 = 0.2;
/// The same for crest and nut edge together, whose slopes are nearly alike, so that little changes move them far.
const FRESH_BOTH_MM: f64 = 0.01;
/// Step of the differences for slopes, mm: they bend by a part in 300 a millimetre.
const DIFFERENCE_MM: f64 = 0.01;
/// Steps after which the search is given up; two are usual.
const MAX_STEPS: usize = 30;
/// Halvings of the interval in which the smallest largest error lies: 10 mm come down to 1e-8 mm.
const HALVINGS: usize = 30;
/// Index of fret 12.
const TWELFTH: usize = 11;

/// What is looked for and within which limits.
#[derive(Debug, Clone, PartialEq)]
pub struct NearFit {
    /// What is made small.
    pub rule: FitRule,
    /// Indices of the frets that count, fret 1 is 0. With the rule `Twelfth` they place the nut edge, and fret 12 the crest,
    /// whether it is among them or not.
    pub frets: Vec<usize>,
    /// Whether the nut edge is free too. With the rule `Minimax` it keeps its place all the same.
    pub nut_moves: bool,
    /// Least and greatest saddle setback, mm.
    pub saddle_travel_mm: [f64; 2],
    /// Least and greatest nut setback, mm.
    pub nut_travel_mm: [f64; 2],
}

impl NearFit {
    /// The best contacts of a string, from a start near by; the start itself where no fret counts.
    ///
    /// They lie within 1e-3 mm of those of [`ideal_setbacks`](crate::fit::ideal_setbacks) where the start is within
    /// some tenths of a millimetre.
    ///
    /// # Errors
    /// As [`FrettedString::errors_cents`]; [`PhysicsError::NotSettled`] where steps do not become short.
    pub fn contacts(&self, string: &FrettedString, start: Contacts) -> Result<Contacts, PhysicsError> {
        let open = string.open(start)?;
        let sounds = |&fret: &usize| string.note(&open, fret).is_ok_and(|note| note.touches_fret.is_none());
        let frets: Vec<usize> = self.frets.iter().copied().filter(sounds).collect();
        if frets.is_empty() {
            return Ok(start);
        }
        match self.rule {
            FitRule::LeastSquares if self.nut_moves => self.both(string, &frets, start),
            FitRule::LeastSquares => self.crest(string, &frets, start, least_squares),
            FitRule::Minimax => self.crest(string, &frets, start, least_worst),
            FitRule::Twelfth if !sounds(&TWELFTH) => Ok(start),
            FitRule::Twelfth => {
                let nut = if self.nut_moves { self.both(string, &frets, start)? } else { start };
                self.crest(string, &[TWELFTH], nut, least_squares)
            }
        }
    }

    /// The crest alone.
    fn crest(
        &self,
        string: &FrettedString,
        frets: &[usize],
        start: Contacts,
        step: impl Fn(&[f64], &[f64]) -> f64,
    ) -> Result<Contacts, PhysicsError> {
        let [low, high] = self.saddle_travel_mm;
        let mut at = start;
        let mut errors = string.errors_cents(at, frets)?;
        let mut slopes = by_crest(string, frets, at, &errors)?;
        for _ in 0..MAX_STEPS {
            let before = at.saddle_setback_mm;
            at.saddle_setback_mm = (before + step(&errors, &slopes)).clamp(low, high);
            let moved_mm = (at.saddle_setback_mm - before).abs();
            if moved_mm < SETTLED_MM {
                return Ok(at);
            }
            errors = string.errors_cents(at, frets)?;
            if moved_mm > FRESH_MM {
                slopes = by_crest(string, frets, at, &errors)?;
            }
        }
        Err(not_settled())
    }

    /// Crest and nut edge by least squares.
    fn both(
        &self,
        string: &FrettedString,
        frets: &[usize],
        start: Contacts,
    ) -> Result<Contacts, PhysicsError> {
        let mut at = start;
        let mut errors = string.errors_cents(at, frets)?;
        let mut slopes = [by_crest(string, frets, at, &errors)?, by_nut(string, frets, at, &errors)?];
        for _ in 0..MAX_STEPS {
            let next = self.best_of_plane(at, &errors, &slopes);
            let moved_mm = (next.saddle_setback_mm - at.saddle_setback_mm)
                .abs()
                .max((next.nut_setback_mm - at.nut_setback_mm).abs());
            at = next;
            if moved_mm < SETTLED_MM {
                return Ok(at);
            }
            errors = string.errors_cents(at, frets)?;
            if moved_mm > FRESH_BOTH_MM {
                slopes = [by_crest(string, frets, at, &errors)?, by_nut(string, frets, at, &errors)?];
            }
        }
        Err(not_settled())
    }

    /// The place within the travel where the linearised errors have the least squares: the free optimum, or the best
    /// on one of the four edges of the travel.
    fn best_of_plane(&self, at: Contacts, errors: &[f64], [crest, nut]: &[Vec<f64>; 2]) -> Contacts {
        let ([cc, cn, nn], [ce, ne]) =
            ([dot(crest, crest), dot(crest, nut), dot(nut, nut)], [dot(crest, errors), dot(nut, errors)]);
        let [crest_low, crest_high] = self.saddle_travel_mm.map(|end| end - at.saddle_setback_mm);
        let [nut_low, nut_high] = self.nut_travel_mm.map(|end| end - at.nut_setback_mm);
        let moved = |by: [f64; 2]| Contacts {
            saddle_setback_mm: at.saddle_setback_mm + by[0],
            nut_setback_mm: at.nut_setback_mm + by[1],
        };
        let determinant = cc * nn - cn * cn;
        let free = [(cn * ne - nn * ce) / determinant, (cn * ce - cc * ne) / determinant];
        if (crest_low..=crest_high).contains(&free[0]) && (nut_low..=nut_high).contains(&free[1]) {
            return moved(free);
        }
        let crest_for = |nut_by: f64| [(-(ce + cn * nut_by) / cc).clamp(crest_low, crest_high), nut_by];
        let nut_for = |crest_by: f64| [crest_by, (-(ne + cn * crest_by) / nn).clamp(nut_low, nut_high)];
        let edges = [crest_for(nut_low), crest_for(nut_high), nut_for(crest_low), nut_for(crest_high)];
        let change = |[c, n]: [f64; 2]| cc * c * c + 2.0 * cn * c * n + nn * n * n + 2.0 * (ce * c + ne * n);
        let best = edges.into_iter().min_by(|a, b| change(*a).total_cmp(&change(*b)));
        moved(best.unwrap_or([0.0; 2]))
    }
}

fn not_settled() -> PhysicsError {
    PhysicsError::NotSettled { what: "setback near a known one", iterations: MAX_STEPS, reached: SETTLED_MM }
}

fn dot(a: &[f64], b: &[f64]) -> f64 {
    std::iter::zip(a, b).map(|(a, b)| a * b).sum()
}

/// Step to the least squares of errors on straight lines.
fn least_squares(errors: &[f64], slopes: &[f64]) -> f64 {
    -dot(errors, slopes) / dot(slopes, slopes)
}

/// Step to the smallest largest of errors on straight lines: the largest is convex, so its slope says on which side
/// of a place the least lies.
fn least_worst(errors: &[f64], slopes: &[f64]) -> f64 {
    let middle = least_squares(errors, slopes);
    let (mut low, mut high) = (middle - 5.0, middle + 5.0);
    for _ in 0..HALVINGS {
        let at = 0.5 * (low + high);
        let worst = std::iter::zip(errors, slopes)
            .map(|(error, slope)| (error + slope * at, *slope))
            .max_by(|a, b| a.0.abs().total_cmp(&b.0.abs()));
        let rising = worst.is_some_and(|(error, slope)| error * slope > 0.0);
        if rising { high = at } else { low = at }
    }
    0.5 * (low + high)
}

fn by_crest(
    string: &FrettedString,
    frets: &[usize],
    at: Contacts,
    errors: &[f64],
) -> Result<Vec<f64>, PhysicsError> {
    let saddle_setback_mm = at.saddle_setback_mm + DIFFERENCE_MM;
    slopes(string, frets, Contacts { saddle_setback_mm, ..at }, errors)
}

fn by_nut(
    string: &FrettedString,
    frets: &[usize],
    at: Contacts,
    errors: &[f64],
) -> Result<Vec<f64>, PhysicsError> {
    let nut_setback_mm = at.nut_setback_mm + DIFFERENCE_MM;
    slopes(string, frets, Contacts { nut_setback_mm, ..at }, errors)
}

fn slopes(
    string: &FrettedString,
    frets: &[usize],
    moved: Contacts,
    errors: &[f64],
) -> Result<Vec<f64>, PhysicsError> {
    let after = string.errors_cents(moved, frets)?;
    Ok(std::iter::zip(after, errors).map(|(after, before)| (after - before) / DIFFERENCE_MM).collect())
}
