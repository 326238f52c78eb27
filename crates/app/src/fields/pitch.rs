//! The field for a pitch: a note's name or a frequency.

use crestline_plan::Pitch;
use eframe::egui::{Response, Ui};

use super::form::Form;
use super::number::{self, Spec};
use super::parse;

/// A pitch as it is shown: the note, or the frequency with its unit.
#[must_use]
pub fn shown(pitch: &Pitch) -> String {
    match pitch {
        Pitch::Note(note) => note.clone(),
        Pitch::FrequencyHz(frequency_hz) => format!("{} Hz", parse::shown(*frequency_hz)),
    }
}

/// A note where the text begins with a letter, else a frequency.
fn read(text: &str) -> Result<Pitch, String> {
    let trimmed = text.trim();
    if trimmed.is_empty() {
        return Err("a note such as B3 or F#2, or a frequency such as 246.94 Hz, is wanted here".to_owned());
    }
    if trimmed.starts_with(|c: char| c.is_alphabetic()) {
        return Ok(Pitch::Note(trimmed.replace('♯', "#").replace('♭', "b")));
    }
    let bare = trimmed.trim_end_matches(|c: char| c.is_alphabetic());
    parse::number(bare).map(Pitch::FrequencyHz)
}

/// The field.
pub fn pitch(ui: &mut Ui, form: &mut Form, spec: &Spec, value: &mut Pitch) -> Response {
    let shown = shown(value);
    number::typed(ui, form, spec, &shown, read, |new| *value = new)
}
