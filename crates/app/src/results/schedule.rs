//! The schedule: what a maker needs of every string on one line.

use crestline_plan::{FretReport, PlanString, StringReport};
use eframe::egui::{RichText, Ui};

use super::figures::{cents, fixed, newtons};
use super::table::{self, Cell, Column, Row};
use crate::edit::desk::Outcome;
use crate::fields::pitch;
use crate::theme::Palette;
use crate::units::LengthUnit;

/// Share of the breaking load that is noted, and the one that is warned of.
const NOTED: f64 = 0.60;
const WARNED: f64 = 0.75;

/// The place of the share of the breaking load among the columns.
const BREAKING: usize = 4;

/// The least width in which the figures stand apart, points.
pub const LEAST_WIDTH: f32 = 800.0;

/// Said where tensions are shown.
pub const CAUTION: &str = "Strings under tension can break and bridges can lift. Keep to the makers' ratings, and leave \
                           what carries the load to someone qualified for it.";

fn columns(unit: LengthUnit) -> [Column; 11] {
    [
        Column::words("String", 1.25),
        Column::words("Pitch", 1.0),
        Column::figures(format!("Gauge\n{}", unit.sign()), 0.9),
        Column::figures("Tension\nN", 1.0),
        Column::figures("Of breaking\nload, %", 1.2),
        Column::figures(unit.named("Ideal\nsetback"), 1.3),
        Column::figures(unit.named("Built\nsetback"), 1.3),
        Column::figures(unit.named("Crest from\ndatum"), 1.3),
        Column::figures("RMS error\ncents", 1.1),
        Column::figures("Worst\ncents", 1.0),
        Column::figures("at\nfret", 0.6),
    ]
}

/// The table; says which string has been clicked.
pub fn show(ui: &mut Ui, palette: &Palette, outcome: &Outcome, chosen: usize) -> Option<usize> {
    let unit = LengthUnit::of(ui.ctx());
    let columns = columns(unit);
    let strings = outcome.solution.report.strings.iter().zip(&outcome.plan.strings);
    let rows: Vec<Row> = strings
        .map(|(report, string)| {
            let (texts, breaking) = texts(palette, outcome, report, string, unit);
            let words = in_words(&columns, &texts);
            let mut cells: Vec<Cell> = texts.into_iter().map(Cell::plain).collect();
            cells[BREAKING] = breaking;
            Row { cells, words }
        })
        .collect();
    table::show(ui, palette, &columns, &rows, chosen)
}

/// The total pull and the caution, below the table.
pub fn foot(ui: &mut Ui, palette: &Palette, outcome: &Outcome) {
    ui.horizontal_wrapped(|ui| {
        let total = newtons(outcome.solution.report.total_tension_n);
        ui.label(RichText::new(format!("Total tension {total} N.")).strong());
        ui.label(RichText::new(CAUTION).small().color(palette.caution));
    });
}

/// The texts of a string's cells, and the cell of its share of the breaking load with its colours.
fn texts(
    palette: &Palette,
    outcome: &Outcome,
    report: &StringReport,
    string: &PlanString,
    unit: LengthUnit,
) -> ([String; 11], Cell) {
    let worst = worst(&report.frets, outcome.plan.fit.frets);
    let (worst_cents, worst_fret) =
        worst.map_or((String::new(), String::new()), |f| (cents(f.built_cents), f.fret.to_string()));
    let share = report.breaking_fraction;
    let breaking = Cell {
        text: share.map_or_else(|| "—".to_owned(), |share| fixed(share * 100.0, 0)),
        colour: share.and_then(|share| share_colour(palette, share)),
        ground: share.filter(|share| *share > WARNED).map(|_| palette.fault_ground),
    };
    let gauge = string.wrap.as_ref().map_or(string.core.diameter_mm, |wrap| wrap.outside_mm);
    let texts = [
        name(report),
        pitch::shown(&string.pitch),
        unit.gauge(gauge),
        newtons(report.tension_n),
        breaking.text.clone(),
        unit.figure(report.ideal.saddle_setback_mm),
        unit.figure(report.built.saddle_setback_mm),
        unit.figure(report.built.crest_mm.x - outcome.solution.layout.datum_x_mm),
        fixed(report.built.rms_cents, 1),
        worst_cents,
        worst_fret,
    ];
    (texts, breaking)
}

/// The string's number, and its name where that says more.
fn name(report: &StringReport) -> String {
    let number = report.string.to_string();
    if report.name == number || report.name.is_empty() { number } else { format!("{number} {}", report.name) }
}

fn share_colour(palette: &Palette, share: f64) -> Option<eframe::egui::Color32> {
    match share {
        s if s > WARNED => Some(palette.fault),
        s if s > NOTED => Some(palette.caution),
        _ => None,
    }
}

/// The fret with the largest error of those in the fit.
fn worst(frets: &[FretReport], fit: [u32; 2]) -> Option<&FretReport> {
    let within = frets.iter().filter(|f| (fit[0]..=fit[1]).contains(&f.fret));
    within.max_by(|a, b| a.built_cents.abs().total_cmp(&b.built_cents.abs()))
}

fn in_words(columns: &[Column; 11], texts: &[String; 11]) -> String {
    let heads = columns.iter().map(|column| column.head.replace('\n', " "));
    heads.zip(texts).map(|(head, text)| format!("{head} {text}")).collect::<Vec<_>>().join(", ")
}
