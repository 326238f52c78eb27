//! Strings for the rule `robust`: what a string may be instead of what the plan says, each as likely as the others.

use crestline_physics::{Contacts, FrettedString};

use super::draw::draw;
use super::models::figures;
use crate::Checked;

/// Draws over which the expected squared error is taken. They are the same for all strings and styles: an expected sum
/// does not ask whether strings differ together, and what is compared then differs by the choice alone. A thousand
/// draws have their optimum less than a tenth of a millimetre away.
const DRAWS: u32 = 32;

/// Samples of the string with this index, each with those of `frets` (fret 1 is 0) on which it does not buzz with no
/// setback. Draws that cannot be built are left out.
pub(crate) fn samples(
    checked: &Checked,
    index: usize,
    own: &FrettedString,
    frets: &[usize],
) -> Vec<(FrettedString, Vec<usize>)> {
    drawn(checked, index, own, frets, DRAWS)
}

pub(super) fn drawn(
    checked: &Checked,
    index: usize,
    own: &FrettedString,
    frets: &[usize],
    draws: u32,
) -> Vec<(FrettedString, Vec<usize>)> {
    let plan = checked.plan();
    let tolerances = plan.tolerances.clone().unwrap_or_default();
    let figures = figures(checked, index, own.setup(), &tolerances);
    let all_frets = own.crowns().len();
    let sample = |number: u32| {
        let string = figures.string(&draw(number, tolerances.seed, 0, 1, all_frets), &tolerances).ok()?;
        let notes = string.notes(Contacts::default()).ok()?;
        let sounds = |fret: &usize| notes.get(*fret).is_some_and(|note| note.touches_fret.is_none());
        let frets = frets.iter().copied().filter(sounds).collect();
        Some((string, frets))
    };
    (0..draws).filter_map(sample).collect()
}
