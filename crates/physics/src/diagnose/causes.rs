//! How many cents each cause explains.

use nalgebra::DVector;

use super::moves::rms;
use super::unknowns::{ACTION, AXIAL, BENDING, CREST, NUT, OWN, SLOT, Unknowns};
use crate::PhysicsError;

/// A reason for errors that a repairer can act on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Cause {
    /// The crest is not where it should be.
    Saddle,
    /// The nut edge is not where it should be.
    Nut,
    /// The string lies higher or lower over fret 1 than expected.
    NutSlot,
    /// The string lies higher or lower over fret 12 than expected.
    Action,
    /// The player presses harder or more lightly than expected.
    Pressing,
    /// The string is stiffer or softer than expected, in stretching or in bending.
    Stiffness,
    /// Frets lie out of place.
    Frets,
    /// The neck has more or less relief than expected.
    Relief,
}

impl Cause {
    /// Every cause, in the order of the report.
    pub const ALL: [Self; 8] = [
        Self::Saddle,
        Self::Nut,
        Self::NutSlot,
        Self::Action,
        Self::Pressing,
        Self::Stiffness,
        Self::Frets,
        Self::Relief,
    ];
}

/// What a cause explains on a string.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CauseShare {
    /// The cause.
    pub cause: Cause,
    /// Root mean square, over the frets that were read, of the change of the errors if the cause were put right
    /// and all else stayed, cents.
    pub cents: f64,
}

/// What each cause explains on a string at the unknowns `at`, where its errors are `errors`.
pub(super) fn shares(
    unknowns: &Unknowns,
    string: usize,
    at: &DVector<f64>,
    errors: &DVector<f64>,
) -> Result<Vec<CauseShare>, PhysicsError> {
    let frets = unknowns.pressed[string].len();
    let share = |cause| {
        let without = unknowns.errors_cents(string, &put_right(unknowns, string, at, cause))?;
        let change = (errors - without).rows(0, frets).iter().copied().collect::<Vec<_>>();
        Ok(CauseShare { cause, cents: rms(change) })
    };
    Cause::ALL.into_iter().map(share).collect()
}

fn put_right(unknowns: &Unknowns, string: usize, at: &DVector<f64>, cause: Cause) -> DVector<f64> {
    let case = &unknowns.strings[string];
    let own = OWN * string;
    let mut right = at.clone();
    match cause {
        Cause::Saddle => {
            let off_mm = case.right.saddle_setback_mm - case.contacts.saddle_setback_mm;
            right[own + CREST] = off_mm / unknowns.own_sd(string, CREST);
        }
        Cause::Nut => {
            let off_mm = case.right.nut_setback_mm - case.contacts.nut_setback_mm;
            right[own + NUT] = off_mm / unknowns.own_sd(string, NUT);
        }
        Cause::NutSlot => right[own + SLOT] = 0.0,
        Cause::Action => right[own + ACTION] = 0.0,
        Cause::Pressing => right[unknowns.press_column()] = 0.0,
        Cause::Stiffness => (right[own + AXIAL], right[own + BENDING]) = (0.0, 0.0),
        Cause::Frets => right.rows_range_mut(unknowns.fret_column(0)..).fill(0.0),
        Cause::Relief => right[unknowns.relief_column()] = 0.0,
    }
    right
}
