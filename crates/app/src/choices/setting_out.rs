//! Figures for setting out: setbacks in the maker's step with what that costs, what a slip costs, and every crest
//! and slot end from the datum.

use std::borrow::Cow;

use crestline_plan::{BenchPiece, Datum, Step, Word, WorkshopString};
use eframe::egui::{RichText, Ui, WidgetInfo, accesskit};

use super::study::Figures;
use crate::edit::command::Command;
use crate::results::figures::fixed;
use crate::results::table::{self, Cell, Column, Row};
use crate::theme::{Palette, size};
use crate::units::LengthUnit;

/// The slip for which the cost is given, mm and inches: what a careful hand keeps to in either unit.
const SLIP_MM: f64 = 0.1;
const SLIP_INCHES: f64 = 0.005;

/// The least width in which the figures of a table stand apart, points.
const LEAST_WIDTH: f32 = 580.0;

fn column(head: impl Into<Cow<'static, str>>) -> Column {
    Column::figures(head, 1.0)
}

fn name_column() -> Column {
    Column::words("String", 1.3)
}

/// The part of the page.
pub fn show(
    ui: &mut Ui,
    palette: &Palette,
    figures: &Figures,
    string: usize,
    step: &mut Step,
) -> Vec<Command> {
    let mut chosen = None;
    ui.label(RichText::new("Setting out in steps").heading());
    steps(ui, step);
    cost(ui, palette, figures);
    table::sideways(ui, "rounded", LEAST_WIDTH, |ui| chosen = rounded(ui, palette, figures, string));
    ui.add_space(size::WIDE_GAP);
    ui.label(RichText::new(format!("Crests and slot from {}", datum_words(figures.bench.datum))).heading());
    let words = "x along the centre line away from the nut, y toward string 1, z above the crowns of the first and \
                 last fret. The break is where the crest stands on the blank's top, from its face on the nut's side.";
    ui.label(RichText::new(words).small().color(palette.quiet));
    table::sideways(ui, "bench", LEAST_WIDTH, |ui| {
        let clicked = bench(ui, palette, figures, string);
        chosen = chosen.or(clicked);
    });
    for piece in &figures.bench.pieces {
        ui.label(piece_words(piece, figures.bench.pieces.len(), LengthUnit::of(ui.ctx())));
    }
    chosen.map(Command::ChooseString).into_iter().collect()
}

fn steps(ui: &mut Ui, step: &mut Step) {
    ui.horizontal_wrapped(|ui| {
        ui.label("Step");
        for choice in Step::ALL {
            let chosen = *step == *choice;
            let response = ui.selectable_label(chosen, choice.word());
            response.widget_info(|| {
                WidgetInfo::selected(
                    accesskit::Role::RadioButton,
                    true,
                    chosen,
                    format!("Step: {}", choice.word()),
                )
            });
            if response.clicked() {
                *step = *choice;
            }
        }
    });
}

fn cost(ui: &mut Ui, palette: &Palette, figures: &Figures) {
    let workshop = &figures.workshop;
    let unit = LengthUnit::of(ui.ctx());
    let text = format!(
        "In steps of {}: root mean square {} → {} cents, worst {} → {}; no note changes by more than {} cents.",
        workshop.step.word(),
        fixed(workshop.built_rms_cents, 2),
        fixed(workshop.rounded_rms_cents, 2),
        fixed(workshop.built_max_cents, 1),
        fixed(workshop.rounded_max_cents, 1),
        fixed(workshop.largest_change_cents, 2),
    );
    ui.label(text);
    for line in &workshop.lines {
        let text = format!(
            "Line from {} at string {} to {} at string {}.",
            unit.words(line.treble_setback_mm),
            line.treble_string,
            unit.words(line.bass_setback_mm),
            line.bass_string
        );
        ui.label(RichText::new(text).color(palette.quiet));
    }
}

fn rounded(ui: &mut Ui, palette: &Palette, figures: &Figures, string: usize) -> Option<usize> {
    let unit = LengthUnit::of(ui.ctx());
    let figure = |length_mm| unit.figure(length_mm);
    let (slip, tenths) = match unit {
        LengthUnit::Millimetres => (format!("{SLIP_MM} mm"), 1.0),
        LengthUnit::Inches => (format!("{SLIP_INCHES} in"), unit.to_mm(SLIP_INCHES) / SLIP_MM),
    };
    let columns = [
        name_column(),
        column(unit.named("Setback\nbuilt")),
        column(unit.named("Setback\nset out")),
        column(unit.named("Nut\nset out")),
        column("RMS change\ncents"),
        column(format!("Crest slip\ncents/{slip}")),
        column(format!("Nut slip\ncents/{slip}")),
    ];
    let row = |string: &WorkshopString| {
        let cells = [
            name(string.string, &string.name),
            figure(string.built.saddle_setback_mm),
            figure(string.rounded.saddle_setback_mm),
            figure(string.rounded.nut_setback_mm),
            fixed(string.rms_change_cents, 2),
            fixed(string.sensitivity.crest_cents_per_tenth_mm * tenths, 2),
            fixed(string.sensitivity.nut_cents_per_tenth_mm * tenths, 2),
        ];
        in_row(&columns, cells)
    };
    let rows: Vec<Row> = figures.workshop.strings.iter().map(row).collect();
    table::show(ui, palette, &columns, &rows, string)
}

fn bench(ui: &mut Ui, palette: &Palette, figures: &Figures, string: usize) -> Option<usize> {
    let unit = LengthUnit::of(ui.ctx());
    let figure = |length_mm| unit.figure(length_mm);
    let columns = [
        name_column(),
        column(unit.named("Crest\nx")),
        column(unit.named("\ny")),
        column(unit.named("\nz")),
        column(unit.named("Drop to\nnext")),
        column(unit.named("Break from\nface")),
        column("of the\nthickness, %"),
    ];
    let rows: Vec<Row> = figures
        .bench
        .strings
        .iter()
        .map(|string| {
            let cells = [
                name(string.string, &string.name),
                figure(string.crest_mm.x),
                figure(string.crest_mm.y),
                figure(string.crest_mm.z),
                string.drop_to_next_mm.map_or_else(|| "—".to_owned(), figure),
                figure(string.break_from_front_mm),
                fixed(100.0 * string.break_fraction, 0),
            ];
            in_row(&columns, cells)
        })
        .collect();
    table::show(ui, palette, &columns, &rows, string)
}

fn in_row<const N: usize>(columns: &[Column; N], cells: [String; N]) -> Row {
    let said = columns.iter().zip(&cells).map(|(column, text)| {
        let head = column.head.replace('\n', " ");
        format!("{} {text}", head.trim())
    });
    let words = said.collect::<Vec<_>>().join(", ");
    Row { cells: cells.into_iter().map(Cell::plain).collect(), words }
}

fn name(number: u32, name: &str) -> String {
    let number = number.to_string();
    if name == number || name.is_empty() { number } else { format!("{number} {name}") }
}

fn datum_words(datum: Datum) -> &'static str {
    match datum {
        Datum::Nut => "the nominal nut line",
        Datum::TwelfthFret => "the crown of fret 12",
        Datum::SaddleLine => "the nominal saddle line",
    }
}

fn piece_words(piece: &BenchPiece, count: usize, unit: LengthUnit) -> String {
    let figure = |length_mm| unit.figure(length_mm);
    let called = if count == 1 { "Blank".to_owned() } else { format!("Blank {}", piece.piece) };
    format!(
        "{called}: {} × {} {}, centre line from x {}, y {} to x {}, y {}; slant {}°.",
        figure(piece.length_mm),
        figure(piece.thickness_mm),
        unit.sign(),
        figure(piece.treble_end_mm.x),
        figure(piece.treble_end_mm.y),
        figure(piece.bass_end_mm.x),
        figure(piece.bass_end_mm.y),
        fixed(piece.slant_degrees, 2),
    )
}
