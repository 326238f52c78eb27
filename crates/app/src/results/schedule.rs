//! The schedule: what a maker needs of every string on one line.

use crestline_plan::{FretReport, PlanString, StringReport};
use eframe::egui::{RichText, Ui};

use super::figures::{cents, fixed, mm, newtons};
use super::table::{self, Cell, Column, Row};
use crate::edit::desk::Outcome;
use crate::fields::pitch;
use crate::theme::Palette;

/// Share of the breaking load that is noted, and the one that is warned of.
const NOTED: f64 = 0.60;
const WARNED: f64 = 0.75;

/// The least width in which the figures stand apart, points.
pub const LEAST_WIDTH: f32 = 800.0;

/// Said where tensions are shown.
pub const CAUTION: &str = "Strings under tension can break and bridges can lift. Keep to the makers' ratings, and leave \
                           what carries the load to someone qualified for it.";

const fn column(head: &'static str, share: f32) -> Column {
    Column { head, share, is_text: false }
}

const COLUMNS: [Column; 11] = [
    Column { head: "String", share: 1.25, is_text: true },
    Column { head: "Pitch", share: 1.0, is_text: true },
    column("Gauge\nmm", 0.9),
    column("Tension\nN", 1.0),
    column("Of breaking\nload, %", 1.2),
    column("Ideal\nsetback, mm", 1.3),
    column("Built\nsetback, mm", 1.3),
    column("Crest from\ndatum, mm", 1.3),
    column("RMS error\ncents", 1.1),
    column("Worst\ncents", 1.0),
    column("at\nfret", 0.6),
];

/// The table; says which string has been clicked.
pub fn show(ui: &mut Ui, palette: &Palette, outcome: &Outcome, chosen: usize) -> Option<usize> {
    let datum_x = outcome.solution.layout.datum_x_mm;
    let strings = outcome.solution.report.strings.iter().zip(&outcome.plan.strings);
    let fit = outcome.plan.fit.frets;
    let rows: Vec<Row> = strings.map(|(report, string)| row(palette, report, string, datum_x, fit)).collect();
    table::show(ui, palette, &COLUMNS, &rows, chosen)
}

/// The total pull and the caution, below the table.
pub fn foot(ui: &mut Ui, palette: &Palette, outcome: &Outcome) {
    ui.horizontal_wrapped(|ui| {
        let total = newtons(outcome.solution.report.total_tension_n);
        ui.label(RichText::new(format!("Total tension {total} N.")).strong());
        ui.label(RichText::new(CAUTION).small().color(palette.caution));
    });
}

fn row(palette: &Palette, report: &StringReport, string: &PlanString, datum_x: f64, fit: [u32; 2]) -> Row {
    let worst = worst(&report.frets, fit);
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
        fixed(gauge, 3),
        newtons(report.tension_n),
        breaking.text.clone(),
        mm(report.ideal.saddle_setback_mm),
        mm(report.built.saddle_setback_mm),
        mm(report.built.crest_mm.x - datum_x),
        fixed(report.built.rms_cents, 1),
        worst_cents,
        worst_fret,
    ];
    let words = in_words(&texts);
    let mut cells: Vec<Cell> = texts.into_iter().map(Cell::plain).collect();
    cells[4] = breaking;
    Row { cells, words }
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

fn in_words(texts: &[String; 11]) -> String {
    let heads = COLUMNS.iter().map(|column| column.head.replace('\n', " "));
    heads.zip(texts).map(|(head, text)| format!("{head} {text}")).collect::<Vec<_>>().join(", ")
}
