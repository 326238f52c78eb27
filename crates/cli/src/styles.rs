//! Every way to make saddle and nut, side by side, for people.

use crestline_plan::{Comparison, ComparisonRow, Plan};

use crate::numbers::cents;
use crate::solve_table::{NAME_LIMIT, nut_words, saddle_words};
use crate::table::{Column, rendered};
use crate::text::{clipped, safe};

/// The comparison as a table, in the order in which it was worked out.
pub(crate) fn text(plan: &Plan, comparison: &Comparison) -> String {
    let columns = [
        Column::words("Saddle", ""),
        Column::words("Nut", ""),
        Column::numbers("Split", "after"),
        Column::numbers("Error", "rms"),
        Column::numbers("Error", "worst"),
        Column::words("Where", ""),
        Column::words("Fits", ""),
    ];
    let [first, last] = plan.fit.frets;
    let rows: Vec<_> = comparison.rows.iter().map(|row| style_row(plan, row)).collect();
    let sets = if plan.alternatives.is_empty() { "" } else { " of all sets, weighted" };
    format!(
        "Errors in cents over all strings{sets}, frets {first} to {last}.\n\n{}",
        rendered(&columns, &rows)
    )
}

fn style_row(plan: &Plan, row: &ComparisonRow) -> Vec<String> {
    let taken = plan.saddle.style == row.saddle && plan.nut.style == row.nut;
    let mark = if taken { " (this plan)" } else { "" };
    vec![
        saddle_words(row.saddle).to_owned(),
        format!("{}{mark}", nut_words(row.nut)),
        row.split_after.map_or_else(String::new, |split| split.to_string()),
        cents(row.rms_cents),
        cents(row.max_cents),
        place(plan, row),
        if row.fits { "yes" } else { "no" }.to_owned(),
    ]
}

fn place(plan: &Plan, row: &ComparisonRow) -> String {
    let name = row.worst_string.checked_sub(1).and_then(|index| plan.strings.get(index as usize));
    let name =
        name.map_or_else(|| row.worst_string.to_string(), |string| clipped(&safe(&string.name), NAME_LIMIT));
    let place = format!("string {name}, fret {}", row.worst_fret);
    let set = row.worst_alternative.and_then(|number| plan.alternatives.get(number as usize - 1));
    set.map_or_else(|| place.clone(), |set| format!("{}: {place}", clipped(&safe(&set.name), NAME_LIMIT)))
}
