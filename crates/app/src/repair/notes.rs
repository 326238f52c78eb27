//! What was measured and what the instrument found predicts, note by note.

use crestline_plan::{Diagnosis, ReadingKind, Remedy};

/// The notes of one string.
#[derive(Debug, Clone, PartialEq)]
pub struct StringNotes {
    /// The string, 0 first.
    pub string: usize,
    /// One entry a fret that was read.
    pub notes: Vec<Note>,
}

/// A fretted note, its errors against the open string in cents.
#[derive(Debug, Clone, PartialEq)]
pub struct Note {
    /// Fret number.
    pub fret: u32,
    /// What was read, once or several times, less what the open string is off by.
    pub measured_cents: Vec<f64>,
    /// What the instrument found predicts.
    pub predicted_cents: f64,
    /// Standard deviation of that.
    pub sd_cents: f64,
    /// What is predicted after a remedy.
    pub after_cents: Option<f64>,
}

/// The notes of all strings that were read, with the effect of a remedy if there is one.
#[must_use]
pub fn notes(diagnosis: &Diagnosis, remedy: Option<&Remedy>) -> Vec<StringNotes> {
    let strings = diagnosis.found.strings.iter().enumerate();
    let all = strings.map(|(string, found)| {
        let after = remedy.and_then(|remedy| remedy.errors_cents.get(string));
        let note = |(place, note): (usize, &crestline_plan::FoundNote)| {
            let here = |left: &&crestline_plan::Residual| {
                left.kind == ReadingKind::Fretted && left.fret == note.fret
            };
            Note {
                fret: note.fret,
                measured_cents: found
                    .residuals
                    .iter()
                    .filter(here)
                    .map(|left| note.error_cents + left.cents)
                    .collect(),
                predicted_cents: note.error_cents,
                sd_cents: note.sd_cents,
                after_cents: after.and_then(|errors| errors.get(place).copied()),
            }
        };
        StringNotes { string, notes: found.notes.iter().enumerate().map(note).collect() }
    });
    all.filter(|string| !string.notes.is_empty()).collect()
}
