//! The moves of crest and nut edge that make a string right, and how sure they are.
//!
//! A move is the least-squares one over the frets that were read. Near it the errors are e + A·m, so that it is
//! −A⁺·e, and what is uncertain about the unknowns reaches it through −A⁺·∂e/∂z alone: unknowns that change the
//! errors in opposite ways by what the readings cannot tell apart cancel.

use nalgebra::{DMatrix, DVector};

use crate::{Contacts, FrettedString, PhysicsError};

/// The crest moved alone.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SaddleMove {
    /// Away from the nut, from where the crest is now, mm.
    pub saddle_mm: f64,
    /// Its standard deviation, mm.
    pub sd_mm: f64,
    /// Root mean square of the errors then, cents.
    pub rms_after_cents: f64,
}

/// Crest and nut edge moved together.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SaddleNutMove {
    /// The crest away from the nut, mm.
    pub saddle_mm: f64,
    /// Its standard deviation, mm.
    pub saddle_sd_mm: f64,
    /// The nut edge toward the bridge, mm.
    pub nut_mm: f64,
    /// Its standard deviation, mm.
    pub nut_sd_mm: f64,
    /// Root mean square of the errors then, cents.
    pub rms_after_cents: f64,
}

/// A least-squares move in one or both contacts.
pub(super) struct Move {
    /// Crest, then nut edge if it moves, mm.
    pub by_mm: DVector<f64>,
    /// Covariance, mm².
    pub covariance: DMatrix<f64>,
    pub rms_after_cents: f64,
}

/// Farthest that a contact is moved, mm; a move this far is no adjustment any more.
const FARTHEST_MM: f64 = 40.0;
/// Step of the difference quotients, mm.
const DIFFERENCE_MM: f64 = 1e-3;
/// Pull toward no move, cents per millimetre: decides only where one fret cannot tell crest from nut.
const PULL_CENTS_PER_MM: f64 = 1e-3;
/// Step at which the move is found, mm.
const FOUND_MM: f64 = 1e-7;

/// Root mean square; 0 for none.
pub(super) fn rms(values: impl IntoIterator<Item = f64>) -> f64 {
    let (count, sum) = values.into_iter().fold((0usize, 0.0), |(n, sum), value| (n + 1, sum + value * value));
    if count == 0 { 0.0 } else { (sum / count as f64).sqrt() }
}

/// The move of `kinds` contacts (1: crest, 2: crest and nut edge) with the smallest squared errors at `frets`, each
/// counted once. `slopes` are those of the errors to the unknowns, of which `covariance` is known.
pub(super) fn best_move(
    string: &FrettedString,
    from: Contacts,
    frets: &[usize],
    kinds: usize,
    (slopes, covariance): (&DMatrix<f64>, &DMatrix<f64>),
) -> Result<Move, PhysicsError> {
    let mut by_mm = DVector::zeros(kinds);
    let mut pseudo_inverse = DMatrix::zeros(kinds, frets.len());
    for _ in 0..30 {
        let errors = DVector::from_vec(string.errors_cents(moved(from, &by_mm), frets)?);
        let contact_slopes = contact_slopes(string, from, &by_mm, frets, &errors)?;
        let mut normal = contact_slopes.tr_mul(&contact_slopes);
        for place in 0..kinds {
            normal[(place, place)] += PULL_CENTS_PER_MM * PULL_CENTS_PER_MM;
        }
        let Some(factor) = normal.cholesky() else { break };
        pseudo_inverse = factor.solve(&contact_slopes.transpose());
        let pull = factor.solve(&(&by_mm * (PULL_CENTS_PER_MM * PULL_CENTS_PER_MM)));
        let step = legal_step(string, from, &by_mm, -(&pseudo_inverse * &errors) - pull);
        by_mm += &step;
        if step.amax() < FOUND_MM {
            break;
        }
    }
    let after = string.errors_cents(moved(from, &by_mm), frets)?;
    let spread = &pseudo_inverse * slopes;
    Ok(Move { by_mm, covariance: &spread * covariance * spread.transpose(), rms_after_cents: rms(after) })
}

fn moved(from: Contacts, by_mm: &DVector<f64>) -> Contacts {
    Contacts {
        saddle_setback_mm: from.saddle_setback_mm + by_mm[0],
        nut_setback_mm: from.nut_setback_mm + by_mm.get(1).copied().unwrap_or(0.0),
    }
}

/// The step, halved until the string still stands and nothing moves too far; none where that does not help.
fn legal_step(
    string: &FrettedString,
    from: Contacts,
    by_mm: &DVector<f64>,
    step: DVector<f64>,
) -> DVector<f64> {
    let mut step = step;
    for _ in 0..20 {
        let there = by_mm + &step;
        if there.amax() <= FARTHEST_MM && string.open(moved(from, &there)).is_ok() {
            return step;
        }
        step *= 0.5;
    }
    DVector::zeros(by_mm.len())
}

fn contact_slopes(
    string: &FrettedString,
    from: Contacts,
    by_mm: &DVector<f64>,
    frets: &[usize],
    errors: &DVector<f64>,
) -> Result<DMatrix<f64>, PhysicsError> {
    let mut slopes = DMatrix::zeros(frets.len(), by_mm.len());
    let mut there = by_mm.clone();
    for place in 0..by_mm.len() {
        there[place] += DIFFERENCE_MM;
        let changed = DVector::from_vec(string.errors_cents(moved(from, &there), frets)?);
        slopes.set_column(place, &((changed - errors) / DIFFERENCE_MM));
        there[place] = by_mm[place];
    }
    Ok(slopes)
}
