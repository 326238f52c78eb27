//! What to measure, where nothing has been read yet.

use eframe::egui::{RichText, Ui};

use crate::theme::{Palette, size};

/// How readings are taken, step by step.
const STEPS: [&str; 5] = [
    "1.  Tune every string to its note, with the tuner that you will read. It need not be perfect: what the open \
     string is off by is taken into account.",
    "2.  Read each string open, and its octave harmonic: touch it lightly over fret 12 and pluck.",
    "3.  Read each string at the suggested frets, pressed as the player presses. A capo is not needed.",
    "4.  Type what the tuner shows in cents: plus is sharp, minus is flat. A cell may stay empty, and one reading of \
     each note is enough: a wrong one among good ones is noticed.",
    "5.  Arrow keys, Enter and Tab lead from cell to cell. A block copied from a spreadsheet can be pasted, and a CSV \
     file with the columns string, fret, kind and cents can be dropped on the window.",
];

/// The words.
pub fn show(ui: &mut Ui, palette: &Palette) {
    ui.label(RichText::new("How to measure").heading());
    let purpose = "From tuner readings this page finds what puts fretted notes out of tune, and the smallest job that \
                   cures it.";
    ui.label(RichText::new(purpose).color(palette.quiet));
    ui.add_space(size::GAP);
    for step in STEPS {
        ui.label(step);
    }
}
