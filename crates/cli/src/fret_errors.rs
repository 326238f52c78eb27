//! The error of every fretted note, string by string, for people.

use crestline_plan::{FretReport, Report, StringReport};

use crate::numbers::{force, length, signed_cents};
use crate::solve_table::NAME_LIMIT;
use crate::table::{Column, rendered};
use crate::text::{clipped, push_paragraph, safe};

/// One table a string: the errors with no setback, with the ideal and with the built setbacks, and the
/// parts of the first.
pub(crate) fn text(report: &Report) -> String {
    let mut text = "\n".to_owned();
    push_paragraph(
        &mut text,
        "Errors in cents, positive is sharp. Length, tension, mass and stiffness are the parts of the error with no \
         setback; the finger's force is in N.",
    );
    for string in &report.strings {
        text.push_str(&format!("\nString {}, {}\n", string.string, clipped(&safe(&string.name), NAME_LIMIT)));
        text.push_str(&string_table(string));
    }
    text
}

fn string_table(string: &StringReport) -> String {
    let as_built = string.frets.iter().any(|fret| fret.as_built_cents.is_some());
    let mut columns = vec![
        Column::numbers("Fret", ""),
        Column::numbers("Place", "mm"),
        Column::numbers("Error", "none"),
        Column::numbers("Error", "ideal"),
        Column::numbers("Error", "built"),
    ];
    if as_built {
        columns.push(Column::numbers("As", "built"));
    }
    columns.extend([
        Column::numbers("Length", ""),
        Column::numbers("Tension", ""),
        Column::numbers("Mass", ""),
        Column::numbers("Stiffness", ""),
        Column::numbers("Finger", "N"),
        Column::words("Touches", "fret"),
    ]);
    rendered(&columns, &string.frets.iter().map(|fret| fret_row(fret, as_built)).collect::<Vec<_>>())
}

fn fret_row(fret: &FretReport, as_built: bool) -> Vec<String> {
    let mut row = vec![
        fret.fret.to_string(),
        length(fret.position_mm),
        signed_cents(fret.none_cents),
        signed_cents(fret.ideal_cents),
        signed_cents(fret.built_cents),
    ];
    if as_built {
        row.push(fret.as_built_cents.map_or_else(|| "-".to_owned(), signed_cents));
    }
    row.extend([
        signed_cents(fret.length_cents),
        signed_cents(fret.tension_cents),
        signed_cents(fret.mass_cents),
        signed_cents(fret.stiffness_cents),
        force(fret.finger_force_n),
        fret.touches_fret.map_or_else(String::new, |touched| touched.to_string()),
    ]);
    row
}
