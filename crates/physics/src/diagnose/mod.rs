//! The inverse problem: from tuner readings back to what an instrument most probably is, and to the moves that make
//! it right.
//!
//! The forward model predicts every reading from a string's crest, nut edge, stiffnesses, heights and tuning and
//! from what all strings share: press depth, relief and the places of the frets. Each unknown has an expected value
//! and a prior standard deviation. [`diagnose`] finds the most probable unknowns (maximum a posteriori, Gauss–Newton
//! steps with a damping that is raised until a step improves) and their covariance.
//!
//! Reading noise follows Student's t distribution, whose heavier tails let a wrong reading go instead of bending
//! everything to it (K. L. Lange, R. J. A. Little and J. M. G. Taylor, J. Am. Stat. Assoc. 84 (1989) 881). The
//! covariance is the inverse of JᵀWJ + I in units of the prior standard deviations (A. Tarantola, Inverse Problem
//! Theory, ch. 3). Single unknowns trade against each other; a move of the crest is worked out from all of them
//! together, so that its standard deviation is that of what they agree on.

mod candidates;
mod causes;
mod chance;
mod fixities;
mod foresight;
mod moves;
mod outliers;
mod posterior;
mod priors;
mod search;
mod suspects;
mod unknowns;

pub use causes::{Cause, CauseShare};
pub use fixities::{FoundFixities, fit_fixities};
pub use foresight::foreseen_sd_mm;
pub use moves::{SaddleMove, SaddleNutMove};
pub use outliers::MisplacedFret;
pub use priors::Priors;

use crate::error::within;
use crate::{Contacts, FrettedString, PhysicsError, StringSetup};
use unknowns::Unknowns;

/// What was sounded for a reading.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Sounded {
    /// The open string.
    Open,
    /// The octave harmonic of the open string, its second partial.
    OctaveHarmonic,
    /// The string pressed to the fret with this index, 0 for fret 1.
    Fretted(usize),
}

/// One tuner reading.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Measurement {
    /// What was sounded.
    pub sounded: Sounded,
    /// Cents against the note that it should be: the open string's pitch, its octave, or its wanted interval. A
    /// string tuned sharp as a whole reads sharp in all three.
    pub cents: f64,
}

/// One string with what is expected of it and what was read on it.
#[derive(Debug, Clone, PartialEq)]
pub struct StringCase {
    /// The string as it is expected to be.
    pub setup: StringSetup,
    /// Where crest and nut edge are expected.
    pub contacts: Contacts,
    /// Whether those places were measured, so that the narrower prior holds for the crest.
    pub is_measured: bool,
    /// Where crest and nut edge should be; the shares of saddle and nut in the errors count from there.
    pub right: Contacts,
    /// Readings.
    pub readings: Vec<Measurement>,
}

/// The most probable instrument.
#[derive(Debug, Clone, PartialEq)]
pub struct Diagnosed {
    /// One entry a string.
    pub strings: Vec<DiagnosedString>,
    /// Press depth, mm.
    pub press_depth_mm: Estimate,
    /// Relief, mm.
    pub relief_mm: Estimate,
    /// Frets that lie out of place, in order.
    pub frets: Vec<MisplacedFret>,
    /// Whether the search came to rest.
    pub settled: bool,
}

/// A value with its standard deviation.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Estimate {
    /// The most probable value.
    pub value: f64,
    /// Its standard deviation.
    pub sd: f64,
}

/// One string of the most probable instrument.
#[derive(Debug, Clone, PartialEq)]
pub struct DiagnosedString {
    /// The string as found, with the shared values as found.
    pub setup: StringSetup,
    /// Crest and nut edge as found.
    pub contacts: Contacts,
    /// Crest setback, mm.
    pub crest_mm: Estimate,
    /// Nut setback, mm.
    pub nut_mm: Estimate,
    /// Axial stiffness over the expected one.
    pub axial_ratio: Estimate,
    /// Bending stiffness over the expected one.
    pub bending_ratio: Estimate,
    /// How much higher than expected the string lies over fret 1, mm.
    pub slot_higher_mm: Estimate,
    /// How much higher than expected the string lies over fret 12, mm.
    pub action_higher_mm: Estimate,
    /// How sharp the open string is tuned, cents.
    pub tuning_cents: Estimate,
    /// Indices of the frets with fretted readings, in order, each once.
    pub frets: Vec<usize>,
    /// Fretted errors of the string as found at these frets, cents.
    pub errors_cents: Vec<f64>,
    /// Their standard deviations, cents.
    pub errors_sd_cents: Vec<f64>,
    /// Reading less prediction, one a reading, cents.
    pub residuals_cents: Vec<f64>,
    /// Root mean square of the residuals, cents; 0 without readings.
    pub residual_rms_cents: f64,
    /// The crest moved alone; absent without fretted readings.
    pub saddle: Option<SaddleMove>,
    /// Crest and nut edge moved together; absent without fretted readings.
    pub saddle_and_nut: Option<SaddleNutMove>,
    /// What explains how much.
    pub causes: Vec<CauseShare>,
    /// Whether its readings are such as no setup explains, where the other strings' are.
    pub is_suspect: bool,
    /// Whether the string surely lies higher over fret 1 than expected.
    pub is_slot_high: bool,
    /// Which unknowns cannot be told apart.
    pub trades: Trades,
}

/// How far pairs of unknowns trade against each other: their posterior correlations, −1 to 1.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Trades {
    /// Crest and bending stiffness (which stands for the end fixities too).
    pub crest_bending: f64,
    /// Nut edge and the string's tuning.
    pub nut_tuning: f64,
    /// Nut edge and press depth.
    pub nut_pressing: f64,
}

/// Finds the most probable instrument.
///
/// # Errors
/// [`PhysicsError::OutOfRange`] for no string, a reading that is not finite or of a fret that is not there, a prior
/// that is not positive; as [`FrettedString::new`] and [`FrettedString::open`] where a string cannot be as expected.
pub fn diagnose(strings: &[StringCase], priors: &Priors) -> Result<Diagnosed, PhysicsError> {
    check(strings, priors)?;
    let mut unknowns = Unknowns::new(strings, priors);
    let posterior = outliers::settle(&mut unknowns)?;
    posterior.diagnosed(&unknowns)
}

fn check(strings: &[StringCase], priors: &Priors) -> Result<(), PhysicsError> {
    within("number of strings", strings.len() as f64, 1.0, 64.0)?;
    priors.check()?;
    for string in strings {
        FrettedString::new(string.setup.clone())?.open(string.contacts)?;
        let frets = string.setup.fret_mm.len() as f64;
        for reading in &string.readings {
            within("reading in cents", reading.cents, -2400.0, 2400.0)?;
            if let Sounded::Fretted(index) = reading.sounded {
                within("fret of a reading", index as f64 + 1.0, 1.0, frets)?;
            }
        }
    }
    Ok(())
}

#[cfg(test)]
mod tests;
