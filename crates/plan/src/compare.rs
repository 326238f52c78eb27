//! Every way to make saddle and nut for one plan, side by side.

use crestline_physics::fit::{FitOptions, FitRule, SaddleShape, built_setbacks, ideal_setbacks};
use crestline_physics::{Contacts, Note};

use crate::solve::{Prepared, Squares, fault, fit_options, no_setbacks, prepare};
use crate::{Checked, Comparison, ComparisonRow, Fault, NutStyle, SaddleStyle, Word};

/// Works out every pair of saddle and nut style for a checked plan; a two-piece saddle is split where the plan
/// says, or else where it leaves the least error. A single string has no two-piece saddle.
///
/// # Errors
/// As [`crate::solve`].
pub fn compare(checked: &Checked) -> Result<Comparison, Vec<Fault>> {
    let prepared = prepare(checked)?;
    let strings = prepared.fit_strings();
    let mut rows = Vec::new();
    for &nut in NutStyle::ALL {
        // The ideal contacts depend on the nut alone.
        let options = fit_options(checked.plan(), SaddleStyle::Separate, nut);
        let ideal = ideal_setbacks(&strings, &options).map_err(no_setbacks)?;
        for &saddle in SaddleStyle::ALL {
            let mut options = fit_options(checked.plan(), saddle, nut);
            let mut split_after = None;
            if saddle == SaddleStyle::TwoPiece {
                split_after = best_split(checked, &prepared, &options)?;
                let Some(split_after) = split_after else { continue };
                options.saddle = SaddleShape::TwoPiece { split_after };
            }
            let built = built_setbacks(&strings, &options, &ideal).map_err(no_setbacks)?;
            rows.push(ComparisonRow {
                saddle,
                nut,
                split_after: split_after.map(|strings| strings as u32),
                fits: built.fits,
                ..measured(&prepared, &built.contacts)?
            });
        }
    }
    rows.sort_by_key(|row| SaddleStyle::ALL.iter().position(|style| *style == row.saddle));
    Ok(Comparison { format: "crestline-comparison", version: 1, rows })
}

/// Where to split a two-piece saddle: where the plan says, or else where two pieces leave the least squares with
/// this nut. None for a single string.
fn best_split(
    checked: &Checked,
    prepared: &Prepared,
    options: &FitOptions,
) -> Result<Option<usize>, Vec<Fault>> {
    let plan = checked.plan();
    let given = plan.saddle.split_after.map(|strings| strings as usize);
    if given.is_some_and(|strings| (1..plan.strings.len()).contains(&strings)) {
        return Ok(given);
    }
    if plan.strings.len() < 2 {
        return Ok(None);
    }
    let strings = prepared.fit_strings();
    let mut best: Option<(f64, usize)> = None;
    let options = FitOptions { rule: FitRule::LeastSquares, ..*options };
    let ideal = ideal_setbacks(&strings, &options).map_err(no_setbacks)?;
    for split_after in 1..plan.strings.len() {
        let options = FitOptions { saddle: SaddleShape::TwoPiece { split_after }, ..options };
        let built = built_setbacks(&strings, &options, &ideal).map_err(no_setbacks)?;
        let left = measured(prepared, &built.contacts)?.rms_cents;
        if best.is_none_or(|(least, _)| left < least) {
            best = Some((left, split_after));
        }
    }
    Ok(best.map(|(_, split_after)| split_after))
}

/// What given contacts leave of the errors of all sets.
fn measured(prepared: &Prepared, contacts: &[Contacts]) -> Result<ComparisonRow, Vec<Fault>> {
    let mut row = ComparisonRow {
        saddle: SaddleStyle::Separate,
        nut: NutStyle::Plain,
        split_after: None,
        rms_cents: 0.0,
        max_cents: 0.0,
        worst_alternative: None,
        worst_string: 1,
        worst_fret: 1,
        fits: true,
        string_rms_cents: Vec::new(),
        saddle_setback_mm: contacts.iter().map(|contact| contact.saddle_setback_mm).collect(),
        nut_setback_mm: contacts.iter().map(|contact| contact.nut_setback_mm).collect(),
    };
    let mut all = Squares::default();
    for (index, &at) in contacts.iter().enumerate() {
        let mut own = Squares::default();
        for (set, (weight, string)) in prepared.cases(index).enumerate() {
            let fault = |error| vec![fault(index, &error)];
            let notes: Vec<Note> = string.string.notes(at).map_err(fault)?;
            for &fret in &string.frets {
                let error = notes[fret].error_cents;
                own.add(weight, error);
                if error.abs() > row.max_cents {
                    row.max_cents = error.abs();
                    (row.worst_string, row.worst_fret) = (index as u32 + 1, fret as u32 + 1);
                    row.worst_alternative = (set > 0).then_some(set as u32);
                }
            }
        }
        row.string_rms_cents.push(own.root_mean());
        all.join(own);
    }
    row.rms_cents = all.root_mean();
    Ok(row)
}
