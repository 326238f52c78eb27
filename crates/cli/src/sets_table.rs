//! How one saddle suits several sets of strings, for people.

use crestline_plan::{NutStyle, Plan, Report, SetFretReport, SetReport, SetStringReport};

use crate::numbers::{cents, fixed, force, length, percent, signed_cents};
use crate::solve_table::NAME_LIMIT;
use crate::table::{Column, rendered};
use crate::text::{PAGE_WIDTH, clipped, push_paragraph, safe};

/// One table a set, the plan's own strings first; nothing where there are no alternatives.
pub(crate) fn text(plan: &Plan, report: &Report) -> String {
    let mut text = String::new();
    if report.alternatives.is_empty() {
        return text;
    }
    push_paragraph(
        &mut text,
        "Saddle and nut suit these sets of strings together; the ideal setbacks above are those of each string in all of \
         them. Here each has the setback that it would have alone, and the errors that the built one leaves it.",
    );
    let with_nut = plan.nut.style != NutStyle::Plain;
    for set in &report.alternatives {
        text.push_str(&format!("\n{}\n", heading(set)));
        let rows: Vec<_> = set.strings.iter().map(|string| string_row(string, with_nut)).collect();
        text.push_str(&rendered(&columns(with_nut), &rows));
        text.push_str(&format!(
            "All strings: pull {} N; error rms {}, worst {}\n",
            force(set.total_tension_n),
            cents(set.rms_cents),
            cents(set.max_cents),
        ));
    }
    text.push('\n');
    text
}

fn heading(set: &SetReport) -> String {
    format!("{}, weight {}", clipped(&safe(&set.name), PAGE_WIDTH / 2), set.weight)
}

fn columns(with_nut: bool) -> Vec<Column> {
    let mut columns = vec![
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Pitch", "Hz"),
        Column::numbers("Tension", "N"),
        Column::numbers("Load", "%"),
        Column::numbers("Setback", "alone"),
    ];
    if with_nut {
        columns.push(Column::numbers("Nut setback", "alone"));
    }
    columns.extend([Column::numbers("Error", "rms"), Column::numbers("Error", "worst")]);
    columns
}

fn string_row(string: &SetStringReport, with_nut: bool) -> Vec<String> {
    let mut row = vec![
        string.string.to_string(),
        clipped(&safe(&string.name), NAME_LIMIT),
        fixed(string.frequency_hz, 2),
        force(string.tension_n),
        string.breaking_fraction.map_or_else(|| "-".to_owned(), percent),
        length(string.ideal.saddle_setback_mm),
    ];
    if with_nut {
        row.push(length(string.ideal.nut_setback_mm));
    }
    row.extend([cents(string.built.rms_cents), cents(string.built.max_cents)]);
    row
}

/// The errors of every fretted note of every alternative; those of the plan's own strings have tables of their own.
pub(crate) fn fret_errors(report: &Report) -> String {
    let mut text = String::new();
    for set in report.alternatives.iter().skip(1) {
        for string in &set.strings {
            let name = clipped(&safe(&string.name), NAME_LIMIT);
            let set = clipped(&safe(&set.name), PAGE_WIDTH / 2);
            text.push_str(&format!("\n{set}: string {}, {name}\n", string.string));
            let columns = [
                Column::numbers("Fret", ""),
                Column::numbers("Error", "none"),
                Column::numbers("Error", "ideal alone"),
                Column::numbers("Error", "built"),
                Column::words("Touches", "fret"),
            ];
            text.push_str(&rendered(&columns, &string.frets.iter().map(fret_row).collect::<Vec<_>>()));
        }
    }
    text
}

fn fret_row(fret: &SetFretReport) -> Vec<String> {
    vec![
        fret.fret.to_string(),
        signed_cents(fret.none_cents),
        signed_cents(fret.ideal_cents),
        signed_cents(fret.built_cents),
        fret.touches_fret.map_or_else(String::new, |touched| touched.to_string()),
    ]
}
