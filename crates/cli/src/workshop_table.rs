//! Setbacks rounded to a maker's step, what that costs, and what a slip of the hand costs, for people.

use crestline_plan::{NutStyle, Plan, Word, Workshop, WorkshopString};

use crate::numbers::{cents, fixed, length};
use crate::solve_table::NARROW_NAME;
use crate::table::{Column, rendered};
use crate::text::{clipped, push_paragraph, safe};

/// The rounded setbacks string by string, the lines to set out, and the errors before and after.
pub(crate) fn text(plan: &Plan, workshop: &Workshop) -> String {
    let with_nut = plan.nut.style != NutStyle::Plain;
    let rows: Vec<_> = workshop.strings.iter().map(|string| string_row(string, with_nut)).collect();
    let mut text = String::new();
    let frame = format!(
        "Setbacks rounded to {}, lengths in mm. Errors in cents; a slip is what 0.1 mm changes the fretted notes by, \
         root mean square.",
        workshop.step.word(),
    );
    push_paragraph(&mut text, &frame);
    if !plan.alternatives.is_empty() {
        push_paragraph(
            &mut text,
            "Errors are those of all sets of strings, weighted; slips are the plan's own strings'.",
        );
    }
    text.push_str(&format!("\n{}\n", rendered(&columns(with_nut), &rows)));
    for line in &workshop.lines {
        text.push_str(&format!(
            "Line to set out: setback {} at string {}, {} at string {}\n",
            length(line.treble_setback_mm),
            line.treble_string,
            length(line.bass_setback_mm),
            line.bass_string,
        ));
    }
    text.push_str(&format!(
        "All strings: rms {} as built, {} rounded; worst {} as built, {} rounded\n",
        cents(workshop.built_rms_cents),
        cents(workshop.rounded_rms_cents),
        cents(workshop.built_max_cents),
        cents(workshop.rounded_max_cents),
    ));
    text
}

fn columns(with_nut: bool) -> Vec<Column> {
    let mut columns = vec![
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Setback", "built"),
        Column::numbers("Setback", "rounded"),
    ];
    if with_nut {
        columns.extend([Column::numbers("Nut", "built"), Column::numbers("Nut", "rounded")]);
    }
    columns.extend([
        Column::numbers("Rms", "built"),
        Column::numbers("Rms", "rounded"),
        Column::numbers("Worst", "built"),
        Column::numbers("Worst", "rounded"),
        Column::numbers("Slip", "crest"),
        Column::numbers("Slip", "nut"),
    ]);
    columns
}

fn string_row(string: &WorkshopString, with_nut: bool) -> Vec<String> {
    let (built, rounded) = (&string.built, &string.rounded);
    let mut row = vec![
        string.string.to_string(),
        clipped(&safe(&string.name), NARROW_NAME),
        length(built.saddle_setback_mm),
        length(rounded.saddle_setback_mm),
    ];
    if with_nut {
        row.extend([length(built.nut_setback_mm), length(rounded.nut_setback_mm)]);
    }
    row.extend([
        cents(built.rms_cents),
        cents(rounded.rms_cents),
        cents(built.max_cents),
        cents(rounded.max_cents),
        // A slip of 0.1 mm is some tenths of a cent: one decimal would not tell the strings apart.
        fixed(string.sensitivity.crest_cents_per_tenth_mm, 2),
        fixed(string.sensitivity.nut_cents_per_tenth_mm, 2),
    ]);
    row
}
