//! How firmly nut, frets and saddle hold the strings, from readings of strings whose crests were measured.
//!
//! A firmer end takes up to one bending length off a speaking length, and so does a crest that stands nearer: on one
//! string the two cannot be told apart. With the crests measured, and over strings of other bending lengths, they can.
//! To first order an error holds (k_fret + k_saddle)·2^(n/12) − (k_nut + k_saddle) bending lengths: readings decide
//! k_fret + k_saddle from what grows along the neck and k_fret − k_nut from what does not, and say nothing of
//! k_nut + k_fret − k_saddle.

use nalgebra::{Matrix3, Vector3};

use super::outliers;
use super::unknowns::Unknowns;
use super::{Estimate, Priors, StringCase, check};
use crate::PhysicsError;
use crate::error::within;
use crate::fretting::Fixities;

/// The most probable fixities, the same for all strings.
#[derive(Debug, Clone, PartialEq)]
pub struct FoundFixities {
    /// At nut, fret and saddle.
    pub fixities: Fixities,
    /// Their covariance, in the order nut, fret, saddle.
    pub covariance: Matrix3<f64>,
    /// Strings that no setup explains; they hardly counted.
    pub suspects: Vec<bool>,
    /// Whether the search came to rest.
    pub settled: bool,
}

impl FoundFixities {
    /// A sum of the fixities at nut, fret and saddle, each taken this many times.
    #[must_use]
    pub fn sum(&self, times: [f64; 3]) -> Estimate {
        let times = Vector3::from(times);
        let Fixities { nut, fret, saddle } = self.fixities;
        let variance = (self.covariance * times).dot(&times);
        Estimate { value: times.dot(&Vector3::new(nut, fret, saddle)), sd: variance.max(0.0).sqrt() }
    }
}

/// Finds the fixities that all strings share, together with everything that [`diagnose`](super::diagnose) looks for;
/// expected are those of the first string, each with the prior standard deviation `fixity_sd`.
///
/// # Errors
/// As [`diagnose`](super::diagnose); [`PhysicsError::OutOfRange`] for a standard deviation outside 0.01 to 10.
pub fn fit_fixities(
    strings: &[StringCase],
    priors: &Priors,
    fixity_sd: f64,
) -> Result<FoundFixities, PhysicsError> {
    check(strings, priors)?;
    within("standard deviation of the fixities", fixity_sd, 0.01, 10.0)?;
    let mut unknowns = Unknowns::new(strings, priors);
    unknowns.fixity_sd = Some(fixity_sd);
    let posterior = outliers::settle(&mut unknowns)?;
    let found = &posterior.found;
    let start = unknowns.fixity_columns().start;
    let expected = strings[0].setup.fixities;
    Ok(FoundFixities {
        fixities: unknowns.fixities(&found.at).unwrap_or(expected),
        covariance: found.covariance.fixed_view::<3, 3>(start, start) * fixity_sd.powi(2),
        suspects: posterior.suspects,
        settled: found.settled,
    })
}
