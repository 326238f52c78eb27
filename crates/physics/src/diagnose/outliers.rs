//! What the priors do not foresee: a fret far out of place, a nut slot far too high, and a string that no setup
//! explains.
//!
//! Frets and slots that stand out are set free in turn, with a wide prior, and everything is found anew. What is free
//! stays so where the readings become so much more likely by it that chance is ruled out ([`super::chance`]). Of several
//! that do, the one that stands out most beyond its limit comes first, so that a fault is not taken for another one that looks
//! like it. A string whose readings stay far from every prediction is given the noise that it shows, so that it
//! does not pull what it shares with the others.

use nalgebra::DVector;

use super::candidates::{Candidate, Suspicion, candidates};
use super::posterior::Posterior;
use super::search::Found;
use super::suspects::most_suspect;
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

/// A slot set free is first thought this much too high, mm: the stretch grows with the square of the height, so that
/// near the expected height the readings hardly show which way to go.
const SLOT_TRIED_MM: f64 = 0.4;
/// How much wider than the usual prior that of a fret or a slot is that was set free.
const FREED: f64 = 8.0;
/// How much narrower the prior of a slot is that is held at its expected height.
const HELD: f64 = 1e-3;
/// Where all slots were set free together a slot is high that lies this many standard deviations above the expected
/// height: that some are high is settled by then, and one that is not gets there once in twenty times.
const SLOT_IS_HIGH: f64 = 1.645;

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
        found = set_free(unknowns, suspicion, freely)?;
        freed.push(suspicion);
    }
    let place =
        |suspicion: &Suspicion| if let Suspicion::Fret(place) = *suspicion { Some(place) } else { None };
    let mut frets: Vec<usize> = freed.iter().filter_map(place).collect();
    frets.sort_unstable();
    let high_slots = (0..strings).map(|string| is_slot_high(&found, &freed, string)).collect();
    Ok(Posterior { found, suspects, freed: frets, high_slots })
}

fn is_slot_high(found: &Found, freed: &[Suspicion], string: usize) -> bool {
    let column = OWN * string + SLOT;
    let above = found.at[column];
    let is_sure = above > SLOT_IS_HIGH * found.covariance[(column, column)].max(0.0).sqrt();
    let is_called = freed.contains(&Suspicion::Slot(string)) && above > 0.0;
    is_called || (freed.contains(&Suspicion::Slots) && is_sure)
}

/// The suspicion that stands out most beyond its limit, with what is found where it is free.
fn most_telling(
    unknowns: &mut Unknowns,
    found: &Found,
    suspects: &[bool],
    freed: &[Suspicion],
) -> Result<Option<(Suspicion, Found)>, PhysicsError> {
    let mut best: Option<(f64, Suspicion, Found)> = None;
    for Candidate { suspicion, limit, .. } in candidates(unknowns, found, suspects, freed) {
        let (square, freely) = tried(unknowns, found, suspicion)?;
        let beyond = square - limit * limit;
        if beyond > 0.0 && best.as_ref().is_none_or(|(most, ..)| beyond > *most) {
            best = Some((beyond, suspicion, freely));
        }
    }
    Ok(best.map(|(_, suspicion, freely)| (suspicion, freely)))
}

/// The square of how far a suspicion stands out, in standard deviations, and what is found where it is free; 0 for a slot that
/// is too low. Twice the logarithm of the ratio of likelihoods is the square of a normal number where nothing is wrong
/// (S. S. Wilks, Ann. Math. Stat. 9 (1938) 60).
///
/// Frets and the slots as a whole stand out from how such things usually are. One slot is high where it lies
/// above its own expected height: whoever files it asks no more.
fn tried(unknowns: &mut Unknowns, found: &Found, suspicion: Suspicion) -> Result<(f64, Found), PhysicsError> {
    let column = suspicion.column(unknowns);
    let start_mm = match suspicion {
        Suspicion::Fret(_) => found.at[column] * *suspicion.prior_mm(unknowns),
        _ => SLOT_TRIED_MM,
    };
    let freely = search_with(unknowns, found, suspicion, (FREED, start_mm))?;
    let cost = match suspicion {
        Suspicion::Slot(_) => search_with(unknowns, found, suspicion, (HELD, 0.0))?.cost,
        _ => found.cost,
    };
    let is_fault = matches!(suspicion, Suspicion::Fret(_)) || freely.at[column] > 0.0;
    Ok((if is_fault { 2.0 * (cost - freely.cost) } else { 0.0 }, freely))
}

/// What is found near `found` where the prior is so many times as wide as usual, from a place in millimetres.
fn search_with(
    unknowns: &mut Unknowns,
    found: &Found,
    suspicion: Suspicion,
    (width, start_mm): (f64, f64),
) -> Result<Found, PhysicsError> {
    let before_mm = *suspicion.prior_mm(unknowns);
    let prior_mm = width * suspicion.usual_mm(unknowns);
    let mut start = found.at.clone();
    start[suspicion.column(unknowns)] = start_mm / prior_mm;
    *suspicion.prior_mm(unknowns) = prior_mm;
    let there = unknowns.search_nearby(start);
    *suspicion.prior_mm(unknowns) = before_mm;
    there
}

/// Widens the prior for good; gives what is found then. The slots as a whole leave each one a height of its own.
fn set_free(unknowns: &mut Unknowns, suspicion: Suspicion, freely: Found) -> Result<Found, PhysicsError> {
    let prior_mm = FREED * suspicion.usual_mm(unknowns);
    if suspicion != Suspicion::Slots {
        *suspicion.prior_mm(unknowns) = prior_mm;
        return Ok(freely);
    }
    let mut start = freely.at;
    let together_mm = prior_mm * std::mem::take(&mut start[unknowns.slots_column()]);
    for (string, slot_mm) in unknowns.slot_sd_mm.iter_mut().enumerate() {
        let own = &mut start[OWN * string + SLOT];
        *own = (*own * *slot_mm + together_mm) / prior_mm;
        *slot_mm = prior_mm;
    }
    unknowns.search_nearby(start)
}
