//! Note names and frequencies in twelve-tone equal temperament.
//!
//! Scientific pitch notation: C4 is middle C, A4 has the reference pitch (440 Hz by ISO 16:1975 where nothing
//! else is said), and the octave number changes between B and C.

use crate::{Pitch, limits};

const NAMES: [&str; 12] = ["C", "C#", "D", "D#", "E", "F", "F#", "G", "G#", "A", "A#", "B"];
/// Semitones from C0 to A4.
const A4: i32 = 57;
/// What a note name may be, for messages.
pub(crate) const NOTE_WORDS: &str = "a note name from C0 to B9 with # or b, such as B3, F#2 or Bb1";

/// Frequency of the note `name` (letter A to G, then perhaps `#` or `b`, then an octave digit), Hz, where A4 has
/// `reference_hz`: f = reference · 2^(k/12), k semitones above A4. `None` where it is not such a name.
#[must_use]
pub fn note_frequency_hz(name: &str, reference_hz: f64) -> Option<f64> {
    let semitones = semitones_above_c0(name)?;
    Some(reference_hz * (f64::from(semitones - A4) / 12.0).exp2())
}

fn semitones_above_c0(name: &str) -> Option<i32> {
    let mut rest = name.chars();
    let step = match rest.next()? {
        'C' => 0,
        'D' => 2,
        'E' => 4,
        'F' => 5,
        'G' => 7,
        'A' => 9,
        'B' => 11,
        _ => return None,
    };
    let rest = rest.as_str();
    let (shift, octave) = match rest.as_bytes() {
        [b'#', ..] => (1, &rest[1..]),
        [b'b', ..] => (-1, &rest[1..]),
        _ => (0, rest),
    };
    match octave.as_bytes() {
        [digit @ b'0'..=b'9'] => Some(12 * i32::from(digit - b'0') + step + shift),
        _ => None,
    }
}

/// The equal-tempered note nearest to `frequency_hz` where A4 has `reference_hz`, named with sharps, and how many
/// cents the frequency lies above it (−50 to 50). `None` outside C0 to B9 or where there is no such frequency.
#[must_use]
pub fn nearest_note(frequency_hz: f64, reference_hz: f64) -> Option<(String, f64)> {
    let ratio = frequency_hz / reference_hz;
    if !(ratio > 0.0 && ratio.is_finite()) {
        return None;
    }
    let semitones = 12.0 * ratio.log2();
    let nearest = semitones.round();
    // A finite ratio keeps |semitones| below 13,000, so the cast cannot saturate.
    let number = nearest as i32 + A4;
    let octave = number.div_euclid(12);
    let name = usize::try_from(number.rem_euclid(12)).ok().and_then(|step| NAMES.get(step))?;
    (0..=9).contains(&octave).then(|| (format!("{name}{octave}"), 100.0 * (semitones - nearest)))
}

impl Pitch {
    /// The frequency in hertz where A4 has `reference_hz`; `None` where the note has no such name or the
    /// frequency is outside [`limits::FREQUENCY_HZ`].
    #[must_use]
    pub fn frequency_hz(&self, reference_hz: f64) -> Option<f64> {
        let frequency = match self {
            Self::Note(name) => note_frequency_hz(name, reference_hz)?,
            Self::FrequencyHz(frequency) => *frequency,
        };
        limits::FREQUENCY_HZ.contains(frequency).then_some(frequency)
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use proptest::prelude::*;

    /// The reference values below are given to ten decimals or so.
    const ROUNDING_HZ: f64 = 1e-9;

    #[test]
    fn notes_have_their_published_frequencies() {
        // ISO 16:1975 with A4 = 440 Hz; computed with 30 digits.
        for (name, hz) in [("A4", 440.0), ("E2", 82.4068892282), ("B3", 246.941650628), ("E4", 329.627556913)]
        {
            assert!((note_frequency_hz(name, 440.0).unwrap() - hz).abs() < ROUNDING_HZ, "{name}");
        }
    }

    #[test]
    fn enharmonic_names_agree_across_the_octave_line() {
        for (one, other) in [("Bb1", "A#1"), ("Cb4", "B3"), ("B#3", "C4"), ("Fb2", "E2"), ("E#2", "F2")] {
            assert_eq!(note_frequency_hz(one, 415.0), note_frequency_hz(other, 415.0));
        }
    }

    #[test]
    fn what_is_no_note_is_refused() {
        for name in ["", "H2", "e4", "A", "A10", "A-1", "A##3", "A♯3", "#3", " A4", "A4 ", "Ab", "bb3", "Ä4"]
        {
            assert_eq!(note_frequency_hz(name, 440.0), None, "{name:?}");
        }
    }

    #[test]
    fn the_nearest_note_says_how_far_off() {
        let (name, cents) = nearest_note(445.0, 440.0).unwrap();
        // 1200·log2(445/440), computed independently: 19.56.
        assert_eq!(name, "A4");
        assert!((cents - 19.5623).abs() < 1e-3);
        for nothing in [0.0, -3.0, f64::NAN, f64::INFINITY, 1e-300, 1e300] {
            assert_eq!(nearest_note(nothing, 440.0), None);
        }
        assert_eq!(nearest_note(440.0, 0.0), None);
    }

    #[test]
    fn a_pitch_outside_the_audible_table_has_no_frequency() {
        assert_eq!(Pitch::Note("B9".into()).frequency_hz(440.0), None);
        assert_eq!(Pitch::FrequencyHz(4.0).frequency_hz(440.0), None);
        assert_eq!(Pitch::FrequencyHz(f64::NAN).frequency_hz(440.0), None);
        assert_eq!(Pitch::FrequencyHz(98.0).frequency_hz(440.0), Some(98.0));
    }

    proptest! {
        #[test]
        fn a_named_frequency_finds_its_name_again(number in 0_usize..120, reference in 220.0..880.0) {
            let name = format!("{}{}", NAMES[number % 12], number / 12);
            let (found, cents) = nearest_note(note_frequency_hz(&name, reference).unwrap(), reference).unwrap();
            prop_assert_eq!(found, name);
            prop_assert!(cents.abs() < 1e-9);
        }

        #[test]
        fn no_text_breaks_the_parser(text in ".{0,6}") {
            let _ = note_frequency_hz(&text, 440.0);
        }
    }
}
