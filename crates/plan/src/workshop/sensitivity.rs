//! How the errors of one string answer to its contacts.

use crestline_physics::{Contacts, PhysicsError};

use super::Sensitivity;
use crate::solve::PreparedString;

/// Half the way of the central differences, mm: short against the way to the finger and to the nearest kink, long
/// against rounding, which costs some 1e-9 cents.
const HALF_MM: f64 = 0.01;
/// The tenth of a millimetre for which changes are given.
const TENTH_MM: f64 = 0.1;
/// Index of fret 12.
const TWELFTH: usize = 11;

/// The sensitivity of a string with these contacts.
///
/// # Errors
/// As [`FrettedString::notes`](crestline_physics::FrettedString::notes).
pub(super) fn sensitivity(own: &PreparedString, at: Contacts) -> Result<Sensitivity, PhysicsError> {
    let crest = changes(own, at, |contacts, by_mm| contacts.saddle_setback_mm += by_mm)?;
    let nut = changes(own, at, |contacts, by_mm| contacts.nut_setback_mm += by_mm)?;
    let octave = |changes: &[f64]| own.twelfth_sounds.then(|| changes[TWELFTH]);
    Ok(Sensitivity {
        crest_cents_per_tenth_mm: root_mean_square(own, &crest),
        nut_cents_per_tenth_mm: root_mean_square(own, &nut),
        octave_crest_cents_per_tenth_mm: octave(&crest),
        octave_nut_cents_per_tenth_mm: octave(&nut),
    })
}

/// Change of every fret's error for a tenth of a millimetre.
fn changes(
    own: &PreparedString,
    at: Contacts,
    shift: impl Fn(&mut Contacts, f64),
) -> Result<Vec<f64>, PhysicsError> {
    let notes_after = |by_mm: f64| {
        let mut moved = at;
        shift(&mut moved, by_mm);
        own.string.notes(moved)
    };
    let (ahead, behind) = (notes_after(HALF_MM)?, notes_after(-HALF_MM)?);
    let scale = TENTH_MM / (2.0 * HALF_MM);
    Ok(std::iter::zip(ahead, behind)
        .map(|(ahead, behind)| (ahead.error_cents - behind.error_cents) * scale)
        .collect())
}

fn root_mean_square(own: &PreparedString, changes: &[f64]) -> f64 {
    let squares: f64 = own.frets.iter().map(|&fret| changes[fret].powi(2)).sum();
    (squares / own.frets.len().max(1) as f64).sqrt()
}
