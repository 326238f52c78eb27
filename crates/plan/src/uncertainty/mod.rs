//! How sure the setbacks of a plan are: its figures varied together as its tolerances say.
//!
//! **Shared by all strings of an instrument**: pitch of A4, relief, scale, place of every fret, press depth, place of
//! the finger, the three fixities and the two slips. One player presses all strings alike, and one neck carries them.
//! **Each string's own**: core diameter, modulus, mass, measured stiffness, pitch, both gaps of the action, and where
//! the maker's crest and nut edge come to stand.
//!
//! For every instrument of the sample each string gets its ideal setbacks by the plan's rule (with a common nut, or
//! with the rule `minimax`, the nut edge stays where the plan's figures put it; `robust` asks for least squares here,
//! since a single instrument is not uncertain), and the errors of its notes on the saddle as built, whose setbacks
//! stay what the plan's figures gave, but for the maker's own accuracy.

mod advice;
mod axes;
mod band;
mod draw;
mod first_order;
mod model;
mod models;
mod robust;
mod sample;
mod shares;

use std::ops::ControlFlow;

use serde::Serialize;

use crate::solve::fitted_models;
use crate::{Checked, Fault};
pub use advice::{MeasureNext, measure_next};
pub use axes::Input;
pub use band::Band;
pub(crate) use models::Models;
pub(crate) use robust::samples;
use sample::Sample;
pub(crate) use shares::HALF_BAND;
pub use shares::{Share, Shares, StringShares, shares};

/// Instruments worked out between two looks at whether to go on.
const CHUNK: u32 = 256;
/// Largest part of a sample that may be left out because a string of it cannot be worked out.
const MOST_LEFT_OUT: f64 = 0.01;

/// Sample, shares and what to measure next, as the command line writes them.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct UncertaintyReport {
    /// Always `crestline-uncertainty`.
    pub format: &'static str,
    /// Version of the report.
    pub version: u64,
    /// The sample.
    #[serde(flatten)]
    pub sample: Uncertainty,
    /// Where the spread of the ideal setbacks comes from.
    pub shares: Shares,
    /// What would narrow the setbacks, the greatest gain first.
    pub measure_next: Vec<MeasureNext>,
}

impl UncertaintyReport {
    /// A report of a sample and its shares.
    #[must_use]
    pub fn new(sample: Uncertainty, shares: Shares) -> Self {
        let measure_next = measure_next(&shares);
        Self { format: "crestline-uncertainty", version: 1, sample, shares, measure_next }
    }
}

/// What a sample of a plan's instruments says.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Uncertainty {
    /// Number of instruments drawn.
    pub samples: u32,
    /// How many of them were left out, because a string of them cannot be worked out; at most 1 %.
    pub left_out: u32,
    /// Seed of the draws.
    pub seed: u32,
    /// The limit for the chances, cents.
    pub limit_cents: f64,
    /// Part of the instruments on which every note of every fret stays within the limit.
    pub chance_within: f64,
    /// The same for the frets of the fit.
    pub chance_within_fit: f64,
    /// One entry a string, string 1 first.
    pub strings: Vec<StringUncertainty>,
}

/// What the sample says of one string.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct StringUncertainty {
    /// String number, 1 first.
    pub string: u32,
    /// Its name.
    pub name: String,
    /// Its ideal saddle setback, mm.
    pub saddle_setback_mm: Option<Band>,
    /// Its ideal nut setback, mm, where the nut is shaped string by string.
    pub nut_setback_mm: Option<Band>,
    /// Part of the instruments on which every note of this string stays within the limit.
    pub chance_within: f64,
    /// The same for the frets of the fit.
    pub chance_within_fit: f64,
    /// One entry a fret, fret 1 first.
    pub frets: Vec<FretUncertainty>,
}

/// What the sample says of one note of the saddle as built.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct FretUncertainty {
    /// Fret number.
    pub fret: u32,
    /// Part of the instruments on which the note sounds from this fret; on the others it buzzes on a higher one.
    pub sounds: f64,
    /// Its error on those, cents; absent where it buzzes with the plan's figures.
    pub error_cents: Option<Band>,
}

/// How far a sample has come.
#[derive(Debug, Clone, Copy)]
pub enum Progress<'u> {
    /// So many instruments are worked out.
    Worked {
        /// Instruments done.
        done: u32,
        /// Instruments wanted.
        of: u32,
    },
    /// A first or sharper answer, each from twice as many instruments as the one before.
    Sharper(&'u Uncertainty),
}

/// Draws the sample that the plan's tolerances ask for (the usual ones where it has none). `watch` is told how far it
/// has come and may end it; then there is no answer.
///
/// The result depends on the plan alone, not on the number of threads.
///
/// # Errors
/// A fault where the plan cannot be solved, where one standard deviation of a figure leaves what can be built, or
/// where more than 1 % of the sample do.
pub fn uncertainty(
    checked: &Checked,
    watch: &mut dyn FnMut(Progress<'_>) -> ControlFlow<()>,
) -> Result<Option<Uncertainty>, Vec<Fault>> {
    let models = fitted_models(checked)?;
    let plan = checked.plan();
    let names = plan.strings.iter().map(|string| string.name.clone()).collect();
    let mut sample = Sample::new(&models, names, plan.fit.frets);
    let wanted = models.tolerances.samples;
    let mut next_answer = CHUNK;
    while sample.drawn() < wanted {
        sample.extend(CHUNK.min(wanted - sample.drawn()));
        let done = sample.drawn();
        if watch(Progress::Worked { done, of: wanted }).is_break() {
            return Ok(None);
        }
        if done >= next_answer && done < wanted {
            next_answer *= 2;
            if watch(Progress::Sharper(&sample.summary())).is_break() {
                return Ok(None);
            }
        }
    }
    let result = sample.summary();
    if f64::from(result.left_out) > MOST_LEFT_OUT * f64::from(result.samples) {
        let found =
            format!("{} of {} instruments that cannot be worked out", result.left_out, result.samples);
        return Err(vec![Fault::new(
            "tolerances",
            found,
            "standard deviations that leave almost all of them",
        )]);
    }
    Ok(Some(result))
}

#[cfg(test)]
mod tests;
