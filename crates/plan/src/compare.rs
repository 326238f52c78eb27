//! Every way to make saddle and nut for one plan, side by side.

use crestline_physics::Note;

use crate::solve::{Prepared, fit, fit_options, prepare};
use crate::{Checked, Comparison, ComparisonRow, Fault, NutStyle, SaddleStyle, Word};

/// Works out every pair of saddle and nut style for a checked plan; a two-piece saddle is split where the plan
/// says, or else where the strings part best.
///
/// # Errors
/// As [`crate::solve`].
pub fn compare(checked: &Checked) -> Result<Comparison, Vec<Fault>> {
    let prepared = prepare(checked)?;
    let mut rows = Vec::new();
    for &saddle in SaddleStyle::ALL {
        for &nut in NutStyle::ALL {
            rows.extend(row(checked, &prepared, saddle, nut)?);
        }
    }
    Ok(Comparison { format: "crestline-comparison", version: 1, rows })
}

/// One row; none for a two-piece saddle on a single string.
fn row(
    checked: &Checked,
    prepared: &Prepared,
    saddle: SaddleStyle,
    nut: NutStyle,
) -> Result<Option<ComparisonRow>, Vec<Fault>> {
    let plan = checked.plan();
    let strings = plan.strings.len();
    let mut options = vec![fit_options(plan, saddle, nut)];
    if saddle == SaddleStyle::TwoPiece && plan.saddle.split_after.is_none() {
        options = (1..strings as u32)
            .map(|split_after| {
                let mut split = plan.clone();
                split.saddle.split_after = Some(split_after);
                fit_options(&split, saddle, nut)
            })
            .collect();
    }
    let mut best: Option<ComparisonRow> = None;
    for option in options {
        if saddle == SaddleStyle::TwoPiece && strings < 2 {
            continue;
        }
        let fitted = fit(prepared, &option)?;
        let mut row = measured(prepared, &fitted.built.contacts)?;
        (row.saddle, row.nut, row.fits) = (saddle, nut, fitted.built.fits);
        if let crestline_physics::fit::SaddleShape::TwoPiece { split_after } = option.saddle {
            row.split_after = Some(split_after as u32);
        }
        if best.as_ref().is_none_or(|best| row.rms_cents < best.rms_cents) {
            best = Some(row);
        }
    }
    Ok(best)
}

fn measured(
    prepared: &Prepared,
    contacts: &[crestline_physics::Contacts],
) -> Result<ComparisonRow, Vec<Fault>> {
    let mut row = ComparisonRow {
        saddle: SaddleStyle::Separate,
        nut: NutStyle::Plain,
        split_after: None,
        rms_cents: 0.0,
        max_cents: 0.0,
        worst_string: 1,
        worst_fret: 1,
        fits: true,
        string_rms_cents: Vec::new(),
        saddle_setback_mm: contacts.iter().map(|contact| contact.saddle_setback_mm).collect(),
        nut_setback_mm: contacts.iter().map(|contact| contact.nut_setback_mm).collect(),
    };
    let (mut squares, mut count) = (0.0, 0);
    for (index, string) in prepared.strings.iter().enumerate() {
        let fault = |error| vec![crate::solve::fault(index, &error)];
        let notes: Vec<Note> = string.string.notes(contacts[index]).map_err(fault)?;
        let mut own = 0.0;
        for &fret in &string.frets {
            let error = notes[fret].error_cents;
            own += error * error;
            if error.abs() > row.max_cents {
                (row.max_cents, row.worst_string, row.worst_fret) =
                    (error.abs(), index as u32 + 1, fret as u32 + 1);
            }
        }
        squares += own;
        count += string.frets.len();
        row.string_rms_cents.push((own / string.frets.len().max(1) as f64).sqrt());
    }
    row.rms_cents = (squares / count.max(1) as f64).sqrt();
    Ok(row)
}
