//! The schedule as CSV: one row a string, for a spreadsheet or a jig.

use crestline_plan::{Plan, Solution};

use crate::facts::{Facts, StringFacts};
use crate::{LengthUnits, SheetOptions};

/// The schedule as UTF-8 text with a header that names the units, a row a string, plain decimal points.
///
/// Lengths are in millimetres to 0.001, or in inches to 0.0001 where the options ask for inches, decimal or not:
/// a file for a machine has no use for fractions. x is measured from the options' datum. Cells without a value
/// are empty. Where the plan has tolerances a last column holds the half-width of the ideal setback's 90 % band. A name that a spreadsheet would run as a formula has an apostrophe put before it.
#[must_use]
pub fn schedule_csv(plan: &Plan, solution: &Solution, options: &SheetOptions) -> String {
    let facts = Facts::new(plan, solution, options);
    let mut writer = csv::Writer::from_writer(vec![]);
    // Writing to memory cannot fail; were it to, the text would end early and the tests would see it.
    let _ = writer.write_record(header(&facts));
    for string in &facts.strings {
        let _ = writer.write_record(row(&facts, string));
    }
    writer.into_inner().ok().and_then(|bytes| String::from_utf8(bytes).ok()).unwrap_or_default()
}

fn header(facts: &Facts<'_>) -> Vec<String> {
    let unit = facts.options.units.sign();
    let lengths = [
        "gauge",
        "ideal_setback",
        "built_setback",
        "crest_x",
        "crest_y",
        "slot_offset",
        "crest_height",
        "nut_setback",
    ];
    let first = ["string", "name"].map(str::to_owned);
    let last = ["octave_error_cents", "worst_error_cents"].map(str::to_owned);
    let band = facts.has_bands().then(|| format!("ideal_plus_minus_{unit}"));
    first.into_iter().chain(lengths.map(|name| format!("{name}_{unit}"))).chain(last).chain(band).collect()
}

fn row(facts: &Facts<'_>, string: &StringFacts) -> Vec<String> {
    let units = facts.options.units;
    let length = |mm: f64| length(units, mm);
    let mut row = vec![
        string.number.to_string(),
        harmless(&string.name),
        length(string.gauge_mm),
        length(string.ideal_setback_mm),
        length(string.built.saddle_setback_mm),
        length(string.crest.x - facts.datum_x_mm),
        length(string.crest.y),
        string.built.slot_offset_mm.map(length).unwrap_or_default(),
        length(string.built.crest_mm.z),
        length(string.built.nut_setback_mm),
        string.octave_cents.map(|cents| plain(cents, 2)).unwrap_or_default(),
        plain(string.built.max_cents, 2),
    ];
    if facts.has_bands() {
        row.push(string.plus_minus_mm.map(length).unwrap_or_default());
    }
    row
}

fn length(units: LengthUnits, mm: f64) -> String {
    match units {
        LengthUnits::Millimetres => plain(mm, 3),
        LengthUnits::InchDecimal | LengthUnits::InchFraction => plain(mm / 25.4, 4),
    }
}

/// Fixed decimals with a hyphen as minus, as programs read it, and no negative zero.
fn plain(value: f64, count: usize) -> String {
    let text = format!("{value:.count$}");
    let zero = text.chars().all(|c| matches!(c, '-' | '0' | '.'));
    if zero { text.trim_start_matches('-').to_owned() } else { text }
}

/// A text cell that no spreadsheet runs: controls become spaces, and what starts like a formula
/// (after spaces too) is put behind an apostrophe.
fn harmless(text: &str) -> String {
    let flat: String = text.chars().map(|c| if c.is_control() { ' ' } else { c }).collect();
    let starts = |c: char| matches!(c, '=' | '+' | '-' | '@' | '＝' | '＋' | '－' | '＠' | '|' | '%');
    if flat.trim_start().starts_with(starts) { format!("'{flat}") } else { flat }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn formulas_are_made_harmless() {
        for bad in ["=1+1", "+A1", "-2", "@SUM(A1)", "  =cmd()", "\t=x", "＝1"] {
            assert!(harmless(bad).starts_with('\''), "{bad}");
        }
        assert_eq!(harmless("E4, plain"), "E4, plain");
        assert_eq!(harmless("a\r\nb"), "a  b");
    }

    #[test]
    fn numbers_are_plain() {
        assert_eq!(plain(-0.0001, 3), "0.000");
        assert_eq!(plain(-1.25, 3), "-1.250");
        assert_eq!(length(LengthUnits::InchFraction, 25.4), "1.0000");
    }
}
