//! How sure an answer would be before anything is read.

use nalgebra::{DMatrix, DVector};

use super::moves::best_move;
use super::unknowns::Unknowns;
use super::{Priors, StringCase, check};
use crate::{FrettedString, PhysicsError};

/// How sure the moves of crest and nut edge would be that make the frets with the indices `frets` right, if every
/// string were read as its `readings` say (their cents do not count): for each string the standard deviations of
/// crest and nut edge, mm.
///
/// # Errors
/// As [`diagnose`](super::diagnose), and [`PhysicsError::OutOfRange`] where no fret is asked for.
pub fn foreseen_sd_mm(
    strings: &[StringCase],
    priors: &Priors,
    frets: &[usize],
) -> Result<Vec<[f64; 2]>, PhysicsError> {
    check(strings, priors)?;
    crate::error::within("number of frets", frets.len() as f64, 1.0, 99.0)?;
    let mut unknowns = Unknowns::new(strings, priors);
    unknowns.look_at(frets);
    let at = DVector::zeros(unknowns.count());
    let (slopes, covariance) = unknowns.foreseen(&at)?;
    (0..strings.len())
        .map(|string| {
            let trial = unknowns.trial(string, &at);
            let ready = FrettedString::new(trial.setup)?;
            let pressed = &unknowns.pressed[string];
            let own = slopes[string].rows(0, pressed.len()).into_owned();
            let columns: Vec<usize> = unknowns.columns(string).collect();
            let covariance = DMatrix::from_fn(columns.len(), columns.len(), |row, column| {
                covariance[(columns[row], columns[column])]
            });
            let both = best_move(&ready, trial.contacts, pressed, 2, (&own, &covariance))?;
            Ok([0, 1].map(|place| both.covariance[(place, place)].max(0.0).sqrt()))
        })
        .collect()
}
