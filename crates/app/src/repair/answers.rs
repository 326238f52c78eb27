//! The answers as tables: moves of crest and nut edge with their standard deviations, and frets out of place.

use crestline_plan::{Diagnosis, FretDiagnosis, Plan, StringDiagnosis};
use eframe::egui::{RichText, ScrollArea, Ui};

use super::lengths::moved;
use crate::edit::command::Command;
use crate::results::figures::fixed;
use crate::results::table::{self, Cell, Column, Row};
use crate::theme::Palette;
use crate::units::LengthUnit;

/// The least width of the table.
const LEAST_WIDTH: f32 = 700.0;

/// Number of columns.
const COUNT: usize = 9;

fn columns() -> [Column; COUNT] {
    [
        Column::words("String", 1.1),
        Column::figures("RMS now\ncents", 0.8),
        Column::figures("Saddle alone\nmove", 1.3),
        Column::figures("RMS then\ncents", 0.8),
        Column::figures("Saddle with\nnut, move", 1.3),
        Column::figures("Nut edge\nmove", 1.3),
        Column::figures("RMS then\ncents", 0.8),
        Column::figures("Not ex-\nplained", 0.75),
        Column::words("Remark", 1.2),
    ]
}

/// The tables; a click on a row chooses its string.
pub fn show(
    ui: &mut Ui,
    palette: &Palette,
    plan: &Plan,
    diagnosis: &Diagnosis,
    chosen: usize,
) -> Vec<Command> {
    let unit = LengthUnit::of(ui.ctx());
    ui.label(RichText::new("Moves that make each string right").heading());
    let words = format!(
        "Moves in {} from where crest and nut edge are now, with one standard deviation: plus is away from the nut for \
         the saddle, toward the bridge for the nut edge.",
        unit.sign()
    );
    ui.label(RichText::new(words).small().color(palette.quiet));
    let mut clicked = None;
    ScrollArea::horizontal().id_salt("answers").auto_shrink([false, true]).show(ui, |ui| {
        ui.set_min_width(LEAST_WIDTH);
        let rows: Vec<Row> =
            (0..plan.strings.len()).map(|string| row(plan, diagnosis, string, palette, unit)).collect();
        clicked = table::show(ui, palette, &columns(), &rows, chosen);
    });
    ui.add_space(4.0);
    for fret in &diagnosis.frets {
        ui.label(format!("▲ {}", fret_words(fret, unit)));
    }
    clicked.map(Command::ChooseString).into_iter().collect()
}

/// A fret out of place.
fn fret_words(fret: &FretDiagnosis, unit: LengthUnit) -> String {
    let toward = if fret.shift_mm > 0.0 { "bridge" } else { "nut" };
    let (shift, sd) = (unit.words(fret.shift_mm.abs()), unit.words(fret.sd_mm));
    format!("Fret {} lies {shift} (± {sd}) too near the {toward}.", fret.fret)
}

fn row(plan: &Plan, diagnosis: &Diagnosis, string: usize, palette: &Palette, unit: LengthUnit) -> Row {
    let number = (string + 1).to_string();
    let name = &plan.strings[string].name;
    let called = if *name == number || name.is_empty() { number.clone() } else { format!("{number} {name}") };
    let found = diagnosis.strings.iter().find(|found| found.string as usize == string + 1);
    let Some(found) = found else {
        let mut cells = vec![Cell::plain(called)];
        cells.extend((1..COUNT - 1).map(|_| Cell::plain("—")));
        cells.push(Cell::plain("not read"));
        return Row { cells, words: format!("String {number}: no fretted reading") };
    };
    let (alone, both) = (&found.saddle_only, &found.saddle_and_nut);
    let figures = [
        fixed(found.rms_before_cents, 1),
        moved(unit, alone.saddle_move_mm, alone.sd_mm),
        fixed(alone.rms_after_cents, 1),
        moved(unit, both.saddle_move_mm, both.saddle_sd_mm),
        moved(unit, both.nut_move_mm, both.nut_sd_mm),
        fixed(both.rms_after_cents, 1),
        fixed(found.residual_cents, 1),
    ];
    let words = in_words(found, &figures, unit.sign());
    let mut cells = vec![Cell::plain(called)];
    cells.extend(figures.into_iter().map(Cell::plain));
    cells.push(if found.suspect_string {
        Cell { text: "▲ suspect".to_owned(), colour: Some(palette.caution), ..Cell::default() }
    } else {
        Cell::default()
    });
    Row { cells, words }
}

fn in_words(found: &StringDiagnosis, figures: &[String; 7], unit: &str) -> String {
    let [now, alone, after_alone, saddle, nut, after_both, left] = figures;
    let suspect = if found.suspect_string { ". Suspect: no setup explains its readings" } else { "" };
    format!(
        "String {}: root mean square now {now} cents; saddle alone {alone} {unit}, then {after_alone}; saddle {saddle} {unit} \
         with nut edge {nut} {unit}, then {after_both}; not explained {left} cents{suspect}",
        found.string
    )
}
