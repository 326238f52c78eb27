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

/// A note where the text begins with a letter, else a frequency, with or without its unit.
fn read(text: &str) -> Result<Pitch, String> {
    let trimmed = text.trim();
    if trimmed.is_empty() {
        return Err("a note such as B3 or F#2, or a frequency such as 246.94 Hz, is wanted here".to_owned());
    }
    let mut letters = trimmed.chars();
    if let Some(step) = letters.next().filter(|c| c.is_alphabetic()) {
        let rest = letters.as_str().replace('♯', "#").replace('♭', "b");
        return Ok(Pitch::Note(step.to_uppercase().chain(rest.chars()).collect()));
    }
    let lower = trimmed.to_lowercase();
    let bare = lower.strip_suffix("hz").unwrap_or(&lower);
    parse::number(bare).map(Pitch::FrequencyHz).map_err(|_| {
        format!(
            "“{}” is no pitch; write a note such as B3, F#2 or Bb1, or 246.94 Hz",
            parse::shorten(trimmed)
        )
    })
}

/// The field.
pub fn pitch(ui: &mut Ui, form: &mut Form, spec: &Spec, value: &mut Pitch) -> Response {
    let shown = shown(value);
    number::typed(ui, form, spec, &shown, read, |new| *value = new)
}

/// The field for a pitch that may be left empty.
pub fn optional(ui: &mut Ui, form: &mut Form, spec: &Spec, value: &mut Option<Pitch>) -> Response {
    let shown = value.as_ref().map(shown).unwrap_or_default();
    let read = |text: &str| if text.trim().is_empty() { Ok(None) } else { read(text).map(Some) };
    number::typed(ui, form, spec, &shown, read, |new| *value = new)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn notes_and_frequencies_are_read_as_people_write_them() {
        for (text, note) in [("B3", "B3"), (" bb3 ", "Bb3"), ("B♭3", "Bb3"), ("f♯2", "F#2")] {
            assert_eq!(read(text).unwrap(), Pitch::Note(note.into()), "{text}");
        }
        for text in ["246.94 Hz", "246,94Hz", "246.94", "246.94\u{202f}hz"] {
            assert_eq!(read(text).unwrap(), Pitch::FrequencyHz(246.94), "{text}");
        }
        assert!(read("").is_err() && read("440 foo").is_err() && read("4 4").is_err());
    }
}
