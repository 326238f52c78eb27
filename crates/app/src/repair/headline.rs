//! The answer in one sentence, and what is being worked out.

use crestline_plan::{Diagnosis, Fault, Remedy, RemedyKind};
use eframe::egui::{Label, RichText, Ui};

use super::inquiry::{Answer, Inquiry};
use super::notes::notes;
use crate::fields::form::place_in_words;
use crate::results::figures::fixed;
use crate::theme::{Palette, size};

/// The sentence, of a plan that has readings or none.
pub fn show(ui: &mut Ui, palette: &Palette, inquiry: &mut Inquiry, is_unread: bool) {
    let words = if is_unread { "Nothing has been read yet.".to_owned() } else { words(inquiry.answer()) };
    ui.add(Label::new(RichText::new(words).size(size::HEADING).strong()).wrap());
    progress(ui, palette, inquiry);
}

fn words(answer: Option<&Answer>) -> String {
    match answer {
        None => "Working out the instrument behind the readings …".to_owned(),
        Some(Err(faults)) => faults.iter().map(fault_words).collect::<Vec<_>>().join(" "),
        Some(Ok(diagnosis)) => {
            diagnosis.remedies.first().map_or_else(String::new, |remedy| first(diagnosis, remedy))
        }
    }
}

fn fault_words(fault: &Fault) -> String {
    format!("{}: {}; wanted: {}.", place_in_words(&fault.path), fault.found, fault.allowed)
}

/// The first remedy without its amounts, which stand in the list.
fn first(diagnosis: &Diagnosis, remedy: &Remedy) -> String {
    if remedy.kind == RemedyKind::Nothing {
        return remedy.text.clone();
    }
    format!(
        "First of all: {}. Errors read: {} cents (root mean square); expected then: {}.",
        job(remedy),
        fixed(read_rms_cents(diagnosis), 1),
        fixed(remedy.rms_after_cents, 1)
    )
}

/// Root mean square of all fretted readings against their open strings, cents.
fn read_rms_cents(diagnosis: &Diagnosis) -> f64 {
    let strings = notes(diagnosis, None);
    let read = || strings.iter().flat_map(|string| &string.notes).flat_map(|note| &note.measured_cents);
    let squares: f64 = read().map(|cents| cents * cents).sum();
    (squares / read().count().max(1) as f64).sqrt()
}

fn job(remedy: &Remedy) -> String {
    let numbers: Vec<String> = remedy.strings.iter().map(ToString::to_string).collect();
    let of_strings = match numbers.len() {
        0 => String::new(),
        1 => format!(" of string {}", numbers[0]),
        _ => format!(" of strings {}", numbers.join(", ")),
    };
    match remedy.kind {
        RemedyKind::Nothing => "nothing".to_owned(),
        RemedyKind::ReplaceString => format!("replace string {}", numbers.join(", ")),
        RemedyKind::FileNutSlots => format!("file the nut slots{of_strings}"),
        RemedyKind::LowerAction => format!("lower the action{of_strings}"),
        RemedyKind::RaiseAction => format!("raise the action{of_strings}"),
        RemedyKind::SetRelief => "set the relief".to_owned(),
        RemedyKind::ReshapeSaddle => "reshape the saddle on its blank".to_owned(),
        RemedyKind::MoveSaddle => "move the saddle".to_owned(),
        RemedyKind::ShortenNutEnd => "move the saddle and shorten the nut end".to_owned(),
        RemedyKind::MoveNutEdge => "move the saddle and the nut edges".to_owned(),
        RemedyKind::CorrectFret => "put the frets right that are out of place".to_owned(),
    }
}

/// What is being worked out, where it takes longer than a moment; it can be stopped.
fn progress(ui: &mut Ui, palette: &Palette, inquiry: &mut Inquiry) {
    if let Some(words) = inquiry.progress() {
        ui.horizontal(|ui| {
            ui.label(RichText::new(words).color(palette.quiet));
            if ui.button("Stop").clicked() {
                inquiry.stop();
            }
        });
    } else if inquiry.was_stopped() {
        ui.horizontal(|ui| {
            let words = "Stopped: what is shown is not of these readings.";
            ui.label(RichText::new(words).color(palette.caution));
            if ui.button("Work it out").clicked() {
                inquiry.resume();
            }
        });
    }
}
