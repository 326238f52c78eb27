//! What is worth being set free on trial: the frets and slots that stand out by a first estimate.

use super::Sounded;
use super::chance::limit;
use super::search::Found;
use super::unknowns::{OWN, SLOT, Unknowns};

/// How far below its limit a first estimate is still looked at, standard deviations: the readings' heavy tails and the curved
/// effect of a height draw it toward nothing.
const LOOKED_AT_BELOW: f64 = 1.5;
/// Fewest strings that must have been read at a fret before it is told from a slip on one of them.
const FEWEST_STRINGS_AT_FRET: usize = 2;
/// Most frets set free.
const MOST_FREED: usize = 4;
/// Share of the prior variance below which rounding would speak.
const LEAST_LEARNT: f64 = 1e-6;

/// What may be set free.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Suspicion {
    /// A fret, by its place among those looked at.
    Fret(usize),
    /// A string's nut slot.
    Slot(usize),
    /// All nut slots, higher by the same.
    Slots,
}

impl Suspicion {
    /// Its column among the unknowns.
    pub fn column(self, unknowns: &Unknowns) -> usize {
        match self {
            Self::Fret(place) => unknowns.fret_column(place),
            Self::Slot(string) => OWN * string + SLOT,
            Self::Slots => unknowns.slots_column(),
        }
    }

    /// Its prior standard deviation, mm.
    pub fn prior_mm<'a>(self, unknowns: &'a mut Unknowns) -> &'a mut f64 {
        match self {
            Self::Fret(place) => &mut unknowns.fret_sd_mm[place],
            Self::Slot(string) => &mut unknowns.slot_sd_mm[string],
            Self::Slots => &mut unknowns.slots_sd_mm,
        }
    }

    /// How far such a thing usually lies from where it is expected, mm.
    pub fn usual_mm(self, unknowns: &Unknowns) -> f64 {
        if matches!(self, Self::Fret(_)) { unknowns.priors.fret_mm } else { unknowns.priors.slot_mm }
    }
}

/// Something to be set free on trial.
pub(super) struct Candidate {
    pub suspicion: Suspicion,
    /// First estimate of how far it stands out, standard deviations.
    score: f64,
    /// What must be exceeded to rule chance out, standard deviations.
    pub limit: f64,
}

/// What is to be looked at: the fret and the slot that stand out most, and all slots together.
pub(super) fn candidates(
    unknowns: &Unknowns,
    found: &Found,
    suspects: &[bool],
    freed: &[Suspicion],
) -> Vec<Candidate> {
    let is_near = |one: &Candidate| one.score > one.limit - LOOKED_AT_BELOW;
    let fret = fret(unknowns, found, freed);
    let strings: Vec<usize> = (0..suspects.len()).filter(|&string| !suspects[string]).collect();
    let slot = slot(unknowns, found, &strings, freed);
    let slots = slots(found, &strings, freed);
    [fret, slot, slots].into_iter().flatten().filter(is_near).collect()
}

/// The fret that stands out most from how exactly frets usually lie.
fn fret(unknowns: &Unknowns, found: &Found, freed: &[Suspicion]) -> Option<Candidate> {
    let is_told = |&place: &usize| {
        let read = |pressed: &&Vec<usize>| pressed.binary_search(&unknowns.frets[place]).is_ok();
        unknowns.pressed.iter().filter(read).count() >= FEWEST_STRINGS_AT_FRET
    };
    let known = freed.iter().filter(|one| matches!(one, Suspicion::Fret(_))).count();
    let told: Vec<usize> = (0..unknowns.frets.len()).filter(is_told).collect();
    let limit = limit(told.len(), 2, known);
    told.into_iter()
        .filter(|&place| known < MOST_FREED && !freed.contains(&Suspicion::Fret(place)))
        .map(|place| {
            let score = standing_out(found, &[unknowns.fret_column(place)]).abs();
            Candidate { suspicion: Suspicion::Fret(place), score, limit }
        })
        .max_by(|a, b| a.score.total_cmp(&b.score))
}

/// The slot that lies highest above what is expected of it.
fn slot(unknowns: &Unknowns, found: &Found, strings: &[usize], freed: &[Suspicion]) -> Option<Candidate> {
    let known = freed.iter().filter(|one| matches!(one, Suspicion::Slot(_))).count();
    let limit = slot_limit(strings, known);
    strings
        .iter()
        .filter(|&&string| !freed.contains(&Suspicion::Slots) && !freed.contains(&Suspicion::Slot(string)))
        .map(|&string| {
            let by_estimate = above_expected(found, OWN * string + SLOT);
            let score = by_estimate.max(first_fret_residual(unknowns, found, string));
            Candidate { suspicion: Suspicion::Slot(string), score, limit }
        })
        .max_by(|a, b| a.score.total_cmp(&b.score))
}

/// All slots together, if none was set free yet.
fn slots(found: &Found, strings: &[usize], freed: &[Suspicion]) -> Option<Candidate> {
    let is_first = !freed.iter().any(|one| matches!(one, Suspicion::Slot(_) | Suspicion::Slots));
    let columns: Vec<usize> = strings.iter().map(|string| OWN * string + SLOT).collect();
    (is_first && strings.len() > 1).then(|| Candidate {
        suspicion: Suspicion::Slots,
        score: standing_out(found, &columns),
        limit: slot_limit(strings, 0),
    })
}

/// The limit of one slot out of all these strings' and of all together.
fn slot_limit(strings: &[usize], known: usize) -> f64 {
    limit(strings.len() + 1, 1, known)
}

/// How far unknowns stand out from their priors if all of them moved alike, in standard deviations; 0 where the readings
/// say nothing of it. What the readings say of a sum scatters about nothing with its prior variance less what is left of it.
fn standing_out(found: &Found, columns: &[usize]) -> f64 {
    let sum: f64 = columns.iter().map(|&column| found.at[column]).sum();
    let pairs = columns.iter().flat_map(|&row| columns.iter().map(move |&column| (row, column)));
    let left: f64 = pairs.map(|pair| found.covariance[pair]).sum();
    let learnt = columns.len() as f64 - left;
    if learnt > LEAST_LEARNT { sum / learnt.sqrt() } else { 0.0 }
}

/// How far an unknown lies above what is expected of it, in standard deviations of what the readings alone say.
fn above_expected(found: &Found, column: usize) -> f64 {
    let left = found.covariance[(column, column)];
    let learnt = 1.0 - left;
    if learnt.min(left) > LEAST_LEARNT { found.at[column] / (left * learnt).sqrt() } else { 0.0 }
}

/// What is left of a string's readings at the first fret, in units of the noise; 0 where it was not read.
fn first_fret_residual(unknowns: &Unknowns, found: &Found, string: usize) -> f64 {
    let residuals = unknowns.residuals_cents(string, &found.at, &found.errors[string]);
    let readings = unknowns.strings[string].readings.iter().zip(residuals);
    let at_first = readings.filter(|(reading, _)| reading.sounded == Sounded::Fretted(0));
    at_first.map(|(_, residual)| residual / unknowns.noise_cents[string]).fold(0.0, f64::max)
}
