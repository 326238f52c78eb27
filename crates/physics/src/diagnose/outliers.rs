//! What the priors do not foresee: a fret far out of place, a nut slot far too high, and a string that no setup
//! explains.
//!
//! Frets and slots are tested by their own estimates: where all is as expected, the most probable shift over
//! √(prior² − posterior²) is normally distributed. What stands out most is set free and everything is found anew,
//! until nothing stands out. A string whose readings stay far from every
//! prediction is given the noise that it shows, so that it does not pull what it shares with the others.

use nalgebra::DVector;

use super::posterior::Posterior;
use super::search::Found;
use super::unknowns::{OWN, SLOT, Unknowns};
use crate::PhysicsError;

/// A fret out of place.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MisplacedFret {
    /// Its index, 0 for fret 1.
    pub index: usize,
    /// How far it lies toward the bridge from where it is expected, mm.
    pub shift_mm: f64,
    /// Standard deviation of that, mm.
    pub sd_mm: f64,
}

/// Standard deviations at which a fret stands out: some ten to twenty frets are looked at, of which by chance one in
/// a hundred instruments shows such a one.
const FRET_STANDS_OUT: f64 = 3.4;
/// Standard deviations at which a nut slot stands out as high. The readings say less of a slot than of a fret, and a
/// slot wrongly set free moves little, so this may be lower: by chance one slot in a hundred and twenty shows it.
const SLOT_STANDS_OUT: f64 = 2.4;
/// How much wider the prior of a fret or a slot gets that was set free.
const FREED: f64 = 8.0;
/// Fewest strings that must have been read at a fret before it is told from a slip on one of them.
const FEWEST_STRINGS_AT_FRET: usize = 2;
/// Most frets set free.
const MOST_FREED: usize = 4;
/// Fewest readings of a string that can say that nothing explains it.
const FEWEST_READINGS: usize = 5;
/// Typical residual beyond which a string is suspect, in units of the noise.
const SUSPECT_NOISE: f64 = 2.5;
/// The same in units of the other strings' typical residual.
const SUSPECT_OTHERS: f64 = 2.5;
/// Median absolute value of a normal distribution, inverse: makes a median a standard deviation.
const NORMAL_MEDIAN: f64 = 1.4826;

/// Finds the unknowns, setting free what stands out.
pub(super) fn settle(unknowns: &mut Unknowns) -> Result<Posterior, PhysicsError> {
    let mut suspects = vec![false; unknowns.strings.len()];
    let mut freed: Vec<usize> = Vec::new();
    let mut high_slots = vec![false; unknowns.strings.len()];
    let mut found = unknowns.search(DVector::zeros(unknowns.count()))?;
    for _ in 0..=MOST_FREED + 2 * unknowns.strings.len() {
        let residuals: Vec<Vec<f64>> = (0..suspects.len())
            .map(|string| unknowns.residuals_cents(string, &found.at, &found.errors[string]))
            .collect();
        if let Some((string, scale)) = most_suspect(unknowns, &residuals, &suspects) {
            suspects[string] = true;
            unknowns.noise_cents[string] = scale;
        } else if let Some(place) = most_displaced(unknowns, &found, &freed) {
            freed.push(place);
            unknowns.fret_sd_mm[place] *= FREED;
        } else if let Some(string) = highest_slot(unknowns, &found, &high_slots) {
            high_slots[string] = true;
            unknowns.slot_sd_mm[string] *= FREED;
        } else {
            break;
        }
        found = unknowns.search(DVector::zeros(unknowns.count()))?;
    }
    freed.sort_unstable();
    Ok(Posterior { found, suspects, freed, high_slots })
}

/// The string that is explained least, with its typical residual, if that is far from the noise and from the others.
fn most_suspect(unknowns: &Unknowns, residuals: &[Vec<f64>], known: &[bool]) -> Option<(usize, f64)> {
    let typical: Vec<f64> = residuals.iter().map(|own| NORMAL_MEDIAN * median_size(own)).collect();
    let noise = unknowns.priors.reading_cents;
    let stands_out = |&string: &usize| {
        let others: Vec<f64> = (0..typical.len())
            .filter(|&other| other != string && !known[other] && !residuals[other].is_empty())
            .map(|other| typical[other])
            .collect();
        let usual = if others.is_empty() { noise } else { median_size(&others).max(noise) };
        !known[string]
            && residuals[string].len() >= FEWEST_READINGS
            && typical[string] > SUSPECT_NOISE * noise
            && typical[string] > SUSPECT_OTHERS * usual
    };
    let worst = (0..typical.len()).filter(stands_out).max_by(|&a, &b| typical[a].total_cmp(&typical[b]))?;
    Some((worst, typical[worst]))
}

/// The fret that stands out most, by its place among those looked at.
fn most_displaced(unknowns: &Unknowns, found: &Found, freed: &[usize]) -> Option<usize> {
    if freed.len() >= MOST_FREED {
        return None;
    }
    let score = |place: usize| standing_out(found, unknowns.fret_column(place)).abs();
    let strings_at = |place: usize| {
        let fret = unknowns.frets[place];
        unknowns.pressed.iter().filter(|pressed| pressed.binary_search(&fret).is_ok()).count()
    };
    (0..unknowns.frets.len())
        .filter(|place| !freed.contains(place))
        .filter(|&place| strings_at(place) >= FEWEST_STRINGS_AT_FRET && score(place) > FRET_STANDS_OUT)
        .max_by(|&a, &b| score(a).total_cmp(&score(b)))
}

/// The string whose slot stands out most as high.
fn highest_slot(unknowns: &Unknowns, found: &Found, known: &[bool]) -> Option<usize> {
    let score = |string: usize| standing_out(found, OWN * string + SLOT);
    (0..unknowns.strings.len())
        .filter(|&string| !known[string] && score(string) > SLOT_STANDS_OUT)
        .max_by(|&a, &b| score(a).total_cmp(&score(b)))
}

/// How far an unknown stands out, in standard deviations; 0 where the readings say nothing of it.
fn standing_out(found: &Found, column: usize) -> f64 {
    /// Share of the prior variance below which rounding would speak.
    const LEAST_LEARNT: f64 = 1e-6;
    let learnt = 1.0 - found.covariance[(column, column)];
    if learnt > LEAST_LEARNT { found.at[column] / learnt.sqrt() } else { 0.0 }
}

/// Median of the absolute values; 0 for none.
fn median_size(values: &[f64]) -> f64 {
    let mut sizes: Vec<f64> = values.iter().map(|value| value.abs()).collect();
    sizes.sort_unstable_by(f64::total_cmp);
    match sizes.len() {
        0 => 0.0,
        odd if odd % 2 == 1 => sizes[odd / 2],
        even => 0.5 * (sizes[even / 2 - 1] + sizes[even / 2]),
    }
}
