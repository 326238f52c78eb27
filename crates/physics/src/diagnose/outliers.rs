//! What the priors do not foresee: a fret far out of place, a nut slot far too high, and a string that no setup
//! explains.
//!
//! Frets and slots that stand out are set free in turn, with a wide prior, and everything is found anew. What is free
//! stays so where the evidence, the probability of the readings with all unknowns integrated out (Laplace's
//! approximation; D. J. C. MacKay, Neural Computation 4 (1992) 415), rises by more than the odds against it. A string whose readings stay far from every
//! prediction is given the noise that it shows, so that it does not pull what it shares with the others.

use nalgebra::DVector;

use super::Sounded;
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

/// Standard deviations at which a fret, a slot or all slots together are looked at more closely, by an estimate that
/// the prior and the readings' heavy tails draw toward nothing.
const FRET_LOOKED_AT: f64 = 1.7;
const SLOT_LOOKED_AT: f64 = 1.0;
/// Logarithm of the odds against a fret lying far out of place: some one instrument in five of those that come to a
/// bench has one (estimated).
const FRET_ODDS: f64 = 1.5;
/// The same of nut slots, of which some one in three is high on such an instrument (estimated).
const SLOT_ODDS: f64 = 0.5;
/// A slot set free is first thought this much too high, mm: the stretch grows with the square of the height, so that
/// near the expected height the readings hardly show which way to go.
const SLOT_TRIED_MM: f64 = 0.4;
/// How much wider the prior of a fret or a slot gets that was set free.
const FREED: f64 = 8.0;
/// A slot set free is high where it is this many standard deviations above the expected height: that some slot is
/// high is settled by then, and this tells which.
const SLOT_IS_HIGH: f64 = 1.2;
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
/// A reading is wild where its residual exceeds this, in units of the noise.
const WILD: f64 = 4.0;
/// Least number and share of wild readings that make a string suspect: a slip or two are not the string's.
const WILD_COUNT: usize = 3;
const WILD_SHARE: f64 = 0.25;
/// Median absolute value of a normal distribution, inverse: makes a median a standard deviation.
const NORMAL_MEDIAN: f64 = 1.4826;

/// What may be set free.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Suspicion {
    /// A fret, by its place among those looked at.
    Fret(usize),
    /// A string's nut slot.
    Slot(usize),
    /// All nut slots.
    Slots,
}

/// Finds the unknowns, setting free what stands out.
pub(super) fn settle(unknowns: &mut Unknowns) -> Result<Posterior, PhysicsError> {
    let strings = unknowns.strings.len();
    let mut suspects = vec![false; strings];
    let mut found = unknowns.search(DVector::zeros(unknowns.count()))?;
    for _ in 0..strings {
        let Some((string, scale)) = most_suspect(unknowns, &found, &suspects) else { break };
        suspects[string] = true;
        unknowns.noise_cents[string] = scale;
        found = unknowns.search(DVector::zeros(unknowns.count()))?;
    }
    let mut freed: Vec<Suspicion> = Vec::new();
    while let Some((suspicion, freely)) = most_telling(unknowns, &found, &suspects, &freed)? {
        set_free(unknowns, suspicion, FREED);
        freed.push(suspicion);
        found = freely;
    }
    let place =
        |suspicion: &Suspicion| if let Suspicion::Fret(place) = *suspicion { Some(place) } else { None };
    let mut frets: Vec<usize> = freed.iter().filter_map(place).collect();
    frets.sort_unstable();
    let is_high = |string: usize| {
        let column = OWN * string + SLOT;
        let is_free = freed.contains(&Suspicion::Slot(string)) || freed.contains(&Suspicion::Slots);
        is_free && found.at[column] > SLOT_IS_HIGH * found.covariance[(column, column)].max(0.0).sqrt()
    };
    let high_slots = (0..strings).map(is_high).collect();
    Ok(Posterior { found, suspects, freed: frets, high_slots })
}

/// The suspicion that, set free, raises the evidence most beyond the odds against it, with what is found then.
fn most_telling(
    unknowns: &mut Unknowns,
    found: &Found,
    suspects: &[bool],
    freed: &[Suspicion],
) -> Result<Option<(Suspicion, Found)>, PhysicsError> {
    let mut best: Option<(f64, Suspicion, Found)> = None;
    for suspicion in suspicions(unknowns, found, suspects, freed) {
        let columns = set_free(unknowns, suspicion, FREED);
        let mut start = found.at.clone();
        for &column in &columns {
            start[column] = match suspicion {
                Suspicion::Fret(_) => start[column] / FREED,
                _ => SLOT_TRIED_MM / unknowns.slot_sd_mm[column / OWN],
            };
        }
        let freely = unknowns.search_nearby(start);
        set_free(unknowns, suspicion, FREED.recip());
        let freely = freely?;
        let odds = if matches!(suspicion, Suspicion::Fret(_)) { FRET_ODDS } else { SLOT_ODDS };
        let gain = freely.evidence - found.evidence - odds;
        let is_upward =
            matches!(suspicion, Suspicion::Fret(_)) || columns.iter().any(|&column| freely.at[column] > 0.0);
        if gain > 0.0 && is_upward && best.as_ref().is_none_or(|(most, ..)| gain > *most) {
            best = Some((gain, suspicion, freely));
        }
    }
    Ok(best.map(|(_, suspicion, freely)| (suspicion, freely)))
}

/// Widens priors; gives their columns.
fn set_free(unknowns: &mut Unknowns, suspicion: Suspicion, factor: f64) -> Vec<usize> {
    match suspicion {
        Suspicion::Fret(place) => {
            unknowns.fret_sd_mm[place] *= factor;
            vec![unknowns.fret_column(place)]
        }
        Suspicion::Slot(string) => {
            unknowns.slot_sd_mm[string] *= factor;
            vec![OWN * string + SLOT]
        }
        Suspicion::Slots => {
            unknowns.slot_sd_mm.iter_mut().for_each(|sd| *sd *= factor);
            (0..unknowns.strings.len()).map(|string| OWN * string + SLOT).collect()
        }
    }
}

/// The string that is explained least, with its typical residual, if that is far from the noise and from the others.
fn most_suspect(unknowns: &Unknowns, found: &Found, known: &[bool]) -> Option<(usize, f64)> {
    let residuals: Vec<Vec<f64>> = (0..known.len())
        .map(|string| unknowns.residuals_cents(string, &found.at, &found.errors[string]))
        .collect();
    let typical: Vec<f64> = residuals.iter().map(|own| NORMAL_MEDIAN * median_size(own)).collect();
    let noise = unknowns.priors.reading_cents;
    let is_wild = |own: &[f64]| {
        let wild = own.iter().filter(|residual| residual.abs() > WILD * noise).count();
        wild >= WILD_COUNT && wild as f64 >= WILD_SHARE * own.len() as f64
    };
    let stands_out = |&string: &usize| {
        let others: Vec<usize> = (0..typical.len())
            .filter(|&other| other != string && !known[other] && !residuals[other].is_empty())
            .collect();
        let sizes: Vec<f64> = others.iter().map(|&other| typical[other]).collect();
        let usual = median_size(&sizes).max(noise);
        let are_others_wild =
            2 * others.iter().filter(|&&other| is_wild(&residuals[other])).count() > others.len();
        let is_far = typical[string] > SUSPECT_NOISE * noise && typical[string] > SUSPECT_OTHERS * usual;
        !known[string]
            && residuals[string].len() >= FEWEST_READINGS
            && (is_far || (is_wild(&residuals[string]) && !are_others_wild))
    };
    let size = |string: usize| residuals[string].iter().map(|residual| residual * residual).sum::<f64>();
    let worst = (0..typical.len()).filter(stands_out).max_by(|&a, &b| size(a).total_cmp(&size(b)))?;
    Some((worst, (size(worst) / residuals[worst].len() as f64).sqrt().max(noise)))
}

/// What is to be looked at: the fret and the slot that stand out most, and all slots together.
fn suspicions(unknowns: &Unknowns, found: &Found, suspects: &[bool], freed: &[Suspicion]) -> Vec<Suspicion> {
    let strings_at = |place: usize| {
        let fret = unknowns.frets[place];
        unknowns.pressed.iter().filter(|pressed| pressed.binary_search(&fret).is_ok()).count()
    };
    let is_full = freed.iter().filter(|one| matches!(one, Suspicion::Fret(_))).count() >= MOST_FREED;
    let fret = (0..unknowns.frets.len())
        .filter(|&place| !is_full && strings_at(place) >= FEWEST_STRINGS_AT_FRET)
        .map(|place| (Suspicion::Fret(place), standing_out(found, unknowns.fret_column(place)).abs()))
        .filter(|(suspicion, score)| *score > FRET_LOOKED_AT && !freed.contains(suspicion))
        .max_by(|a, b| a.1.total_cmp(&b.1));
    let slots: Vec<(Suspicion, f64)> = (0..suspects.len())
        .filter(|&string| !suspects[string] && !freed.contains(&Suspicion::Slots))
        .map(|string| {
            let by_estimate = standing_out(found, OWN * string + SLOT);
            (Suspicion::Slot(string), by_estimate.max(first_fret_residual(unknowns, found, string)))
        })
        .collect();
    let together = slots.iter().map(|slot| slot.1).sum::<f64>() / (slots.len().max(1) as f64).sqrt();
    let slot = slots
        .into_iter()
        .filter(|(suspicion, score)| *score > SLOT_LOOKED_AT && !freed.contains(suspicion))
        .max_by(|a, b| a.1.total_cmp(&b.1));
    let is_first = !freed.iter().any(|one| matches!(one, Suspicion::Slot(_)));
    let all = (is_first && suspects.len() > 1 && together > SLOT_LOOKED_AT).then_some(Suspicion::Slots);
    fret.map(|one| one.0).into_iter().chain(slot.map(|one| one.0)).chain(all).collect()
}

/// What is left of a string's readings at the first fret, in units of the noise; 0 where it was not read.
fn first_fret_residual(unknowns: &Unknowns, found: &Found, string: usize) -> f64 {
    let residuals = unknowns.residuals_cents(string, &found.at, &found.errors[string]);
    let readings = unknowns.strings[string].readings.iter().zip(residuals);
    let at_first = readings.filter(|(reading, _)| reading.sounded == Sounded::Fretted(0));
    at_first.map(|(_, residual)| residual / unknowns.noise_cents[string]).fold(0.0, f64::max)
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
