//! How sure the setbacks are, for people: bands, chances and what to measure next.

use crestline_plan::{Band, Plan, StringShares, StringUncertainty, UncertaintyReport};

use crate::numbers::{cents, length, percent, signed_cents};
use crate::solve_table::NARROW_NAME;
use crate::table::{Column, rendered};
use crate::text::{clipped, push_paragraph};

/// How many inputs are named for a string.
const NAMED: usize = 3;
/// Smallest part of the variance that is worth naming.
const WORTH_NAMING: f64 = 0.02;

/// Setbacks, notes, what they hang on, and what to measure next.
pub(crate) fn text(plan: &Plan, report: &UncertaintyReport) -> String {
    let sample = &report.sample;
    let mut text = String::new();
    push_paragraph(
        &mut text,
        &format!(
            "{} instruments whose figures differ as the plan's tolerances say (seed {}). Setbacks in mm, errors in cents. \
             Nine of ten lie between 5 % and 95 %. Chances are for every note within ±{} cents on the saddle as built.",
            sample.samples,
            sample.seed,
            cents(sample.limit_cents)
        ),
    );
    text.push('\n');
    let rows: Vec<_> = sample.strings.iter().map(|string| setback_row(plan, string)).collect();
    text.push_str(&rendered(&setback_columns(), &rows));
    text.push('\n');
    let [first, last] = plan.fit.frets;
    push_paragraph(
        &mut text,
        &format!(
            "Every note of the instrument within ±{} cents: {} % over frets {first} to {last}, {} % over all frets.",
            cents(sample.limit_cents),
            percent(sample.chance_within_fit),
            percent(sample.chance_within)
        ),
    );
    if sample.left_out > 0 {
        push_paragraph(&mut text, &format!("{} instruments could not be worked out.", sample.left_out));
    }
    text.push_str("\nWhere the spread of the ideal setbacks comes from, share of the variance:\n");
    for (string, shares) in sample.strings.iter().zip(&report.shares.strings) {
        push_paragraph(&mut text, &share_line(string, shares));
    }
    text.push('\n');
    push_next(&mut text, report);
    text
}

fn setback_columns() -> Vec<Column> {
    vec![
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Ideal", "setback"),
        Column::numbers("5 %", ""),
        Column::numbers("95 %", ""),
        Column::numbers("sd", ""),
        Column::numbers("sd first", "order"),
        Column::numbers("Fret 12", "cents"),
        Column::numbers("5 %", ""),
        Column::numbers("95 %", ""),
        Column::numbers("Chance %", "fit"),
        Column::numbers("Chance %", "all frets"),
    ]
}

fn setback_row(plan: &Plan, string: &StringUncertainty) -> Vec<String> {
    let missing = || "–".to_owned();
    let show = |band: Option<Band>, figure: fn(&Band) -> f64, shown: fn(f64) -> String| {
        band.map_or_else(missing, |band| shown(figure(&band)))
    };
    let saddle = |figure| show(string.saddle_setback_mm, figure, length);
    let octave_band = string.frets.get(11).and_then(|fret| fret.error_cents);
    let octave = |figure| show(octave_band, figure, signed_cents);
    let name = plan.strings.get(string.string as usize - 1).map_or("", |string| &string.name);
    vec![
        string.string.to_string(),
        clipped(name, NARROW_NAME),
        saddle(|band| band.nominal),
        saddle(|band| band.p05),
        saddle(|band| band.p95),
        saddle(|band| band.sd),
        saddle(|band| band.first_order_sd),
        octave(|band| band.nominal),
        octave(|band| band.p05),
        octave(|band| band.p95),
        percent(string.chance_within_fit),
        percent(string.chance_within),
    ]
}

fn share_line(string: &StringUncertainty, shares: &StringShares) -> String {
    let named: Vec<String> = shares
        .shares
        .iter()
        .filter(|share| share.known() >= WORTH_NAMING)
        .take(NAMED)
        .map(|share| format!("{} {} %", share.input.name(), percent(share.known())))
        .collect();
    let named = if named.is_empty() { "nothing that is uncertain".to_owned() } else { named.join(", ") };
    format!("String {}, ±{}: {named}", string.string, length(shares.plus_minus_mm))
}

fn push_next(text: &mut String, report: &UncertaintyReport) {
    if report.measure_next.is_empty() {
        return push_paragraph(text, "Nothing that could be measured would narrow the setbacks by 0.01 mm.");
    }
    push_paragraph(
        text,
        &format!(
            "What to measure next. Over all strings the setbacks are known to ±{} mm now (90 % band, root mean square); \
             with one thing known exactly:",
            length(report.shares.plus_minus_mm)
        ),
    );
    for (number, next) in report.measure_next.iter().enumerate() {
        let line = format!(
            "{}. ±{} mm, {} less: {} ({}, {} % of the variance).",
            number + 1,
            length(next.then_plus_minus_mm),
            length(next.gain_mm),
            next.text,
            next.input.name(),
            percent(next.share)
        );
        push_paragraph(text, &line);
    }
}
