//! A diagnosis for people: what to do first, then what each string's readings come from.

use crestline_plan::{Diagnosis, FretDiagnosis, Plan, StringDiagnosis};

use crate::numbers::{cents, length, signed_length};
use crate::print::notice_line;
use crate::solve_table::NARROW_NAME;
use crate::table::{Column, rendered};
use crate::text::{clipped, push_paragraph, safe};

/// The smallest share of a cause that is worth naming, cents.
const WORTH_NAMING_CENTS: f64 = 0.1;

/// What stands below every diagnosis.
const CAUTION: &str = "Caution: slacken the strings before you file, move or lift anything. A diagnosis from readings can be \
                       wrong; look at the instrument first, and leave what you are not used to doing to a qualified repairer.";

/// Remedies, strings, causes, frets, notices and the caution.
pub(crate) fn text(plan: &Plan, diagnosis: &Diagnosis) -> String {
    let mut text = String::new();
    push_paragraph(
        &mut text,
        "Errors in cents, root mean square over the fretted readings; moves in mm with one standard deviation, positive away \
         from the nut for the saddle and toward the bridge for the nut edge.",
    );
    text.push_str("\nWhat helps, most for its work first:\n");
    for (number, remedy) in diagnosis.remedies.iter().enumerate() {
        push_paragraph(&mut text, &format!("{}. {}", number + 1, safe(&remedy.text)));
    }
    text.push('\n');
    let rows: Vec<_> = diagnosis.strings.iter().map(|string| cure_row(plan, string)).collect();
    text.push_str(&rendered(&cure_columns(), &rows));
    text.push('\n');
    for string in &diagnosis.strings {
        push_paragraph(&mut text, &cause_line(plan, string));
    }
    for fret in &diagnosis.frets {
        push_paragraph(&mut text, &fret_line(fret));
    }
    for notice in &diagnosis.notices {
        push_paragraph(&mut text, &notice_line(notice));
    }
    text.push('\n');
    push_paragraph(&mut text, CAUTION);
    text
}

fn cure_columns() -> Vec<Column> {
    vec![
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Now", "cents"),
        Column::numbers("Saddle", "alone"),
        Column::numbers("±", "mm"),
        Column::numbers("Then", "cents"),
        Column::numbers("Saddle", "with nut"),
        Column::numbers("±", "mm"),
        Column::numbers("Nut", "edge"),
        Column::numbers("±", "mm"),
        Column::numbers("Then", "cents"),
        Column::numbers("Left", "over"),
    ]
}

fn cure_row(plan: &Plan, string: &StringDiagnosis) -> Vec<String> {
    let (alone, both) = (&string.saddle_only, &string.saddle_and_nut);
    vec![
        string.string.to_string(),
        clipped(&name(plan, string.string), NARROW_NAME),
        cents(string.rms_before_cents),
        signed_length(alone.saddle_move_mm),
        length(alone.sd_mm),
        cents(alone.rms_after_cents),
        signed_length(both.saddle_move_mm),
        length(both.saddle_sd_mm),
        signed_length(both.nut_move_mm),
        length(both.nut_sd_mm),
        cents(both.rms_after_cents),
        cents(string.residual_cents),
    ]
}

/// The causes of one string's errors, the greatest first.
fn cause_line(plan: &Plan, string: &StringDiagnosis) -> String {
    let mut causes: Vec<_> =
        string.causes.iter().filter(|cause| cause.cents.abs() >= WORTH_NAMING_CENTS).collect();
    causes.sort_by(|a, b| b.cents.abs().total_cmp(&a.cents.abs()));
    let shares: Vec<_> =
        causes.iter().map(|cause| format!("{} {}", cause.cause.words(), cents(cause.cents))).collect();
    let suspect =
        if string.suspect_string { "; no setup explains its readings: replace the string first" } else { "" };
    let shares = if shares.is_empty() { "nothing worth naming".to_owned() } else { shares.join(", ") };
    format!("String {} ({}): {shares}{suspect}", string.string, name(plan, string.string))
}

fn fret_line(fret: &FretDiagnosis) -> String {
    let toward = if fret.shift_mm > 0.0 { "bridge" } else { "nut" };
    let (shift, deviation) = (length(fret.shift_mm.abs()), length(fret.sd_mm));
    format!("Fret {} lies {shift} mm (± {deviation}) too near the {toward}", fret.fret)
}

fn name(plan: &Plan, number: u32) -> String {
    let string = number.checked_sub(1).and_then(|index| plan.strings.get(index as usize));
    string.map_or_else(|| number.to_string(), |string| safe(&string.name))
}
