//! The words that plan files and reports use for every choice, in one place for reader, messages and windows.

use crate::{CoreShape, Datum, FitRule, NutStyle, Paper, ReadingKind, SaddleStyle, Step, Units};

/// A choice that plan files and reports write as one word or a short one.
pub trait Word: Copy + PartialEq + 'static {
    /// Every choice in the order in which it is offered.
    const ALL: &'static [Self];

    /// The word in the file.
    fn word(self) -> &'static str;

    /// The choice that `word` stands for.
    fn from_word(word: &str) -> Option<Self> {
        Self::ALL.iter().copied().find(|choice| choice.word() == word)
    }

    /// All words, for messages, such as `"round" or "hex"`.
    fn all_words() -> String {
        let words: Vec<String> = Self::ALL.iter().map(|choice| format!("\"{}\"", choice.word())).collect();
        words.join(" or ")
    }
}

macro_rules! words {
    ($($choice:ident { $($variant:ident = $word:literal),+ })+) => {
        $(impl Word for $choice {
            const ALL: &'static [Self] = &[$(Self::$variant),+];

            fn word(self) -> &'static str {
                match self { $(Self::$variant => $word),+ }
            }
        })+
    };
}

words! {
    CoreShape { Round = "round", Hex = "hex" }
    FitRule { LeastSquares = "least_squares", Twelfth = "twelfth", Minimax = "minimax", Robust = "robust" }
    SaddleStyle { Separate = "separate", Shaped = "shaped", Straight = "straight", TwoPiece = "two_piece" }
    NutStyle { Plain = "plain", Common = "common", Shaped = "shaped" }
    ReadingKind { Fretted = "fretted", Open = "open", OctaveHarmonic = "octave_harmonic" }
    Paper { A4 = "a4", A3 = "a3", Letter = "letter" }
    Units { Mm = "mm", Inch = "inch" }
    Step {
        Mm005 = "0.05 mm", Mm01 = "0.1 mm", Mm025 = "0.25 mm", Mm05 = "0.5 mm", Inch64 = "1/64 in", Inch32 = "1/32 in"
    }
    Datum { Nut = "nut", TwelfthFret = "twelfth_fret", SaddleLine = "saddle_line" }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use serde::Serialize;

    fn reads_what_is_written<T: Word + Serialize + std::fmt::Debug>(count: usize) {
        assert_eq!(T::ALL.len(), count);
        for choice in T::ALL {
            let written = serde_json::to_value(choice).unwrap();
            assert_eq!(T::from_word(written.as_str().unwrap()), Some(*choice));
        }
        assert_eq!(T::from_word("Round "), None);
    }

    #[test]
    fn every_written_word_is_read_back() {
        reads_what_is_written::<CoreShape>(2);
        reads_what_is_written::<FitRule>(4);
        reads_what_is_written::<SaddleStyle>(4);
        reads_what_is_written::<NutStyle>(3);
        reads_what_is_written::<ReadingKind>(3);
        reads_what_is_written::<Paper>(3);
        reads_what_is_written::<Units>(2);
        reads_what_is_written::<Datum>(3);
        reads_what_is_written::<Step>(6);
    }

    #[test]
    fn messages_list_every_word() {
        assert_eq!(NutStyle::all_words(), r#""plain" or "common" or "shaped""#);
    }
}
