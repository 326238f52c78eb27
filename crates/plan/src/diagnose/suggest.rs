//! Which frets to read: the fewest that decide.

use crestline_physics::diagnose::{Measurement, Priors, Sounded, StringCase, foreseen_sd_mm};

use super::{cases::cases, not_found};
use crate::{Checked, Fault};

/// Frets that are easy to read cleanly on most instruments, those of the inlays first of all.
const CANDIDATES: [usize; 10] = [12, 1, 5, 7, 3, 2, 9, 14, 10, 15];
/// Frets that the moves are to make right.
const RIGHT: [usize; 7] = [1, 2, 3, 5, 7, 9, 12];
/// One more fret must make the moves surer by this share to be worth its reading.
const WORTH_READING: f64 = 0.08;
/// Fewest and most frets suggested; from fewer a string that nothing explains cannot be told.
const COUNT: [usize; 2] = [5, 8];

/// The frets to read on every string, besides the open string: chosen one after the other so that crest and nut edge
/// get as sure as they can, until one more makes little difference.
///
/// # Errors
/// As [`crate::solve`].
pub fn suggested_frets(checked: &Checked) -> Result<Vec<u32>, Vec<Fault>> {
    let mut strings = cases(checked)?.strings;
    thin_out(&mut strings);
    let count = strings[0].setup.fret_mm.len();
    let mut chosen: Vec<usize> = vec![12];
    let mut reached = spread(&mut strings, &chosen)?;
    while chosen.len() < COUNT[1] {
        let mut best: Option<(f64, usize)> = None;
        for &fret in CANDIDATES.iter().filter(|&&fret| fret <= count) {
            if !chosen.contains(&fret) {
                let with = [&chosen[..], &[fret]].concat();
                let sd_mm = spread(&mut strings, &with)?;
                if best.is_none_or(|(least, _)| sd_mm < least) {
                    best = Some((sd_mm, fret));
                }
            }
        }
        let Some((sd_mm, fret)) = best else { break };
        if chosen.len() >= COUNT[0] && sd_mm > reached * (1.0 - WORTH_READING) {
            break;
        }
        chosen.push(fret);
        reached = sd_mm;
    }
    chosen.sort_unstable();
    Ok(chosen.into_iter().map(|fret| fret as u32).collect())
}

/// Outer and middle strings stand for all.
fn thin_out(strings: &mut Vec<StringCase>) {
    let last = strings.len() - 1;
    let kept = [0, last / 2, last];
    let mut index = 0;
    strings.retain(|_| {
        index += 1;
        kept.contains(&(index - 1))
    });
}

/// Root mean square of the standard deviations of all moves if these frets were read, mm.
fn spread(strings: &mut [StringCase], frets: &[usize]) -> Result<f64, Vec<Fault>> {
    let read = |sounded| Measurement { sounded, cents: 0.0 };
    for string in strings.iter_mut() {
        string.readings = vec![read(Sounded::Open)];
        string.readings.extend(frets.iter().map(|fret| read(Sounded::Fretted(fret - 1))));
    }
    let right = RIGHT.map(|fret| fret - 1);
    let sds = foreseen_sd_mm(strings, &Priors::default(), &right).map_err(not_found)?;
    Ok(sds.iter().flatten().map(|sd| sd * sd).sum::<f64>().sqrt())
}
