//! `diagnose`: what is probably wrong with the instrument that was read, for people or as JSON.

use crestline_plan::{Cause, CauseReport, Diagnosis, Plan, Priors, StringDiagnosis};

use crate::arguments::Diagnose;
use crate::commands::{checked, refused};
use crate::numbers::{cents, fixed, length};
use crate::table::{Column, rendered};
use crate::text::{clipped, safe, wrapped};
use crate::{Failure, Streams, print};

/// The widest a string's name is shown.
const NAME_WIDTH: usize = 12;
/// Width of running text.
const TEXT_WIDTH: usize = 92;

/// Does the command.
pub(crate) fn diagnose(options: &Diagnose, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let path = &options.plan.plan;
    let checked = checked(path, streams)?;
    let diagnosis =
        crestline_plan::diagnose(&checked, &Priors::default()).map_err(|faults| refused(path, faults))?;
    print::notices(streams, &diagnosis.notices);
    if options.json {
        return print::json(streams, &diagnosis);
    }
    print::result(streams, text(checked.plan(), &diagnosis).as_bytes())
}

/// Moves, causes, frets and remedies.
fn text(plan: &Plan, diagnosis: &Diagnosis) -> String {
    let rows: Vec<_> = diagnosis.strings.iter().map(|string| move_row(plan, string)).collect();
    let mut text = format!(
        "What would make each string right: lengths in mm, errors in cents (root mean square of the fretted\n\
         notes). Crests move away from the nut, nut edges toward the bridge; ± is one standard deviation.\n\n{}\n",
        rendered(&move_columns(), &rows),
    );
    let rows: Vec<_> = diagnosis.strings.iter().map(cause_row).collect();
    text.push_str(&format!(
        "Cents that each cause explains, and what is left of the readings:\n\n{}\n",
        rendered(&cause_columns(), &rows)
    ));
    for string in diagnosis.strings.iter().filter(|string| string.suspect_string) {
        text.push_str(&format!("String {} is suspect: no setup explains its readings.\n", string.string));
    }
    for fret in &diagnosis.frets {
        let (toward, shift_mm) = (if fret.shift_mm > 0.0 { "bridge" } else { "nut" }, fret.shift_mm.abs());
        text.push_str(&format!(
            "Fret {} lies {} mm (± {}) too near the {toward}.\n",
            fret.fret,
            length(shift_mm),
            length(fret.sd_mm)
        ));
    }
    text.push_str("What to do, what helps most for its work first:\n");
    for (index, remedy) in diagnosis.remedies.iter().enumerate() {
        let lines = wrapped(&remedy.text, TEXT_WIDTH);
        for (row, line) in lines.iter().enumerate() {
            let mark = if row == 0 { format!("{:>2}. ", index + 1) } else { "    ".to_owned() };
            text.push_str(&format!("{mark}{line}\n"));
        }
    }
    text
}

fn move_columns() -> [Column; 11] {
    [
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Rms", "now"),
        Column::numbers("Saddle", "alone"),
        Column::numbers("", "±"),
        Column::numbers("Rms", "then"),
        Column::numbers("Saddle", "with nut"),
        Column::numbers("", "±"),
        Column::numbers("Nut", "with it"),
        Column::numbers("", "±"),
        Column::numbers("Rms", "then"),
    ]
}

fn move_row(plan: &Plan, string: &StringDiagnosis) -> Vec<String> {
    let name = plan.strings.get(string.string as usize - 1).map_or("", |entry| &entry.name);
    let (alone, both) = (&string.saddle_only, &string.saddle_and_nut);
    vec![
        string.string.to_string(),
        clipped(&safe(name), NAME_WIDTH),
        cents(string.rms_before_cents),
        signed_length(alone.saddle_move_mm),
        length(alone.sd_mm),
        cents(alone.rms_after_cents),
        signed_length(both.saddle_move_mm),
        length(both.saddle_sd_mm),
        signed_length(both.nut_move_mm),
        length(both.nut_sd_mm),
        cents(both.rms_after_cents),
    ]
}

/// A move with its sign, to 0.01 mm.
fn signed_length(mm: f64) -> String {
    let shown = fixed(mm, 2);
    if shown.starts_with('-') || shown == "0.00" { shown } else { format!("+{shown}") }
}

fn cause_columns() -> [Column; 10] {
    [
        Column::numbers("No.", ""),
        Column::numbers("Saddle", ""),
        Column::numbers("Nut", "edge"),
        Column::numbers("Nut", "slot"),
        Column::numbers("Action", ""),
        Column::numbers("Pressing", ""),
        Column::numbers("Stiffness", ""),
        Column::numbers("Frets", ""),
        Column::numbers("Relief", ""),
        Column::numbers("Left", ""),
    ]
}

fn cause_row(string: &StringDiagnosis) -> Vec<String> {
    const ORDER: [Cause; 8] = [
        Cause::Saddle,
        Cause::Nut,
        Cause::NutSlot,
        Cause::Action,
        Cause::Pressing,
        Cause::Stiffness,
        Cause::Frets,
        Cause::Relief,
    ];
    let share = |cause| {
        let found = string.causes.iter().find(|share: &&CauseReport| share.cause == cause);
        cents(found.map_or(0.0, |share| share.cents))
    };
    let mut row = vec![string.string.to_string()];
    row.extend(ORDER.map(share));
    row.push(cents(string.residual_cents));
    row
}
