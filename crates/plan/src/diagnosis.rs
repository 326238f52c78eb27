//! What a diagnosis says: the report, key for key as it is printed in JSON, and the instrument found behind it.
//! Millimetres, newtons and cents.

use serde::Serialize;

use crate::{Notice, ReadingKind};

/// A diagnosed instrument.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Diagnosis {
    /// Always `crestline-diagnosis`.
    pub format: &'static str,
    /// Version of the report.
    pub version: u64,
    /// One entry a string with fretted readings, in the order of the strings.
    pub strings: Vec<StringDiagnosis>,
    /// Frets that lie out of place.
    pub frets: Vec<FretDiagnosis>,
    /// What to do, what helps most for its work first.
    pub remedies: Vec<Remedy>,
    /// What the user should know about the result.
    pub notices: Vec<Notice>,
    /// The instrument found; not printed.
    #[serde(skip)]
    pub found: FoundInstrument,
}

/// One string's readings, what they come from and what would cure them.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct StringDiagnosis {
    /// String number, 1 first.
    pub string: u32,
    /// Number of readings of every kind.
    pub readings: u32,
    /// Root mean square of the fretted readings, less what the open string was read off by.
    pub rms_before_cents: f64,
    /// The crest moved alone.
    pub saddle_only: SaddleCure,
    /// Crest and nut edge moved together.
    pub saddle_and_nut: SaddleNutCure,
    /// What each cause explains.
    pub causes: Vec<CauseReport>,
    /// Root mean square of what the fitted instrument leaves of the readings, cents.
    pub residual_cents: f64,
    /// Whether no setup explains the readings, where those of other strings are explained.
    pub suspect_string: bool,
}

/// The crest moved alone.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SaddleCure {
    /// From where the crest is now, away from the nut, mm.
    pub saddle_move_mm: f64,
    /// Standard deviation of that, mm.
    pub sd_mm: f64,
    /// Predicted root mean square of the errors then.
    pub rms_after_cents: f64,
}

/// Crest and nut edge moved together.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SaddleNutCure {
    /// The crest from where it is now, away from the nut, mm.
    pub saddle_move_mm: f64,
    /// Standard deviation of that, mm.
    pub saddle_sd_mm: f64,
    /// The nut edge from where it is now, toward the bridge, mm.
    pub nut_move_mm: f64,
    /// Standard deviation of that, mm.
    pub nut_sd_mm: f64,
    /// Predicted root mean square of the errors then.
    pub rms_after_cents: f64,
}

/// What a cause explains.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct CauseReport {
    /// The cause.
    pub cause: Cause,
    /// Root mean square of its share over the frets that were read.
    pub cents: f64,
}

/// Causes of errors.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Cause {
    /// The crest is not where it should be.
    Saddle,
    /// The nut edge is not where it should be.
    Nut,
    /// The string's height over fret 1 is not as the plan says.
    NutSlot,
    /// The string's height over fret 12 is not as the plan says.
    Action,
    /// Pressed harder or more lightly than the plan says.
    Pressing,
    /// Stiffer or softer than the plan says.
    Stiffness,
    /// Frets out of place.
    Frets,
    /// More or less relief than the plan says.
    Relief,
}

impl Cause {
    /// The cause in the words of the trade.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Saddle => "saddle",
            Self::Nut => "nut edge",
            Self::NutSlot => "nut slot's height",
            Self::Action => "action",
            Self::Pressing => "pressing",
            Self::Stiffness => "the string's stiffness",
            Self::Frets => "frets",
            Self::Relief => "relief",
        }
    }
}

/// A fret out of place.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct FretDiagnosis {
    /// Fret number.
    pub fret: u32,
    /// How far it lies toward the bridge from where it should, mm.
    pub shift_mm: f64,
    /// Standard deviation of that, mm.
    pub sd_mm: f64,
}

/// A job that helps.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Remedy {
    /// The job with its amounts, in words.
    pub text: String,
    /// What kind of job it is.
    pub kind: RemedyKind,
    /// Predicted root mean square of the errors of all strings after this job alone.
    pub rms_after_cents: f64,
    /// Moves of the crests, one a string, where the job moves them.
    pub saddle_moves_mm: Option<Vec<f64>>,
    /// The strings that it is done on, in order; not printed.
    #[serde(skip)]
    pub strings: Vec<u32>,
    /// Predicted errors after this job, as in [`FoundString::notes`]; one entry a string of the plan; not printed.
    #[serde(skip)]
    pub errors_cents: Vec<Vec<f64>>,
}

/// Kinds of jobs.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum RemedyKind {
    /// Nothing is worth doing.
    Nothing,
    /// New strings in place of suspect ones.
    ReplaceString,
    /// Lower nut slots.
    FileNutSlots,
    /// Lower the action.
    LowerAction,
    /// Raise the action.
    RaiseAction,
    /// Set the relief.
    SetRelief,
    /// File the crest anew on the blank that is there.
    ReshapeSaddle,
    /// Move the crests farther than the blank that is there allows, or move the pieces.
    MoveSaddle,
    /// Move crests and shorten the nut end of the fingerboard.
    ShortenNutEnd,
    /// Move crests and nut edges, some of them away from the bridge.
    MoveNutEdge,
    /// Put a fret in its place.
    CorrectFret,
}

/// The instrument that the readings make most probable.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct FoundInstrument {
    /// One entry a string of the plan.
    pub strings: Vec<FoundString>,
    /// Press depth, mm, with its standard deviation.
    pub press_depth_mm: [f64; 2],
    /// Relief, mm, with its standard deviation.
    pub relief_mm: [f64; 2],
}

/// One string as found; pairs are a value and its standard deviation.
#[derive(Debug, Clone, PartialEq)]
pub struct FoundString {
    /// Setback of the crest, mm.
    pub saddle_setback_mm: [f64; 2],
    /// Setback of the nut edge, mm.
    pub nut_setback_mm: [f64; 2],
    /// Axial stiffness, N.
    pub axial_stiffness_n: [f64; 2],
    /// Bending stiffness, N·mm².
    pub bending_stiffness_n_mm2: [f64; 2],
    /// Height over fret 1, mm; absent with a zero fret.
    pub first_mm: Option<[f64; 2]>,
    /// Height over fret 12, mm.
    pub twelfth_mm: [f64; 2],
    /// How sharp the open string is tuned, cents.
    pub tuning_cents: [f64; 2],
    /// Whether its nut slot is surely too high.
    pub slot_is_high: bool,
    /// One entry a fret that was read, in order.
    pub notes: Vec<FoundNote>,
    /// Readings less predictions, one entry a reading of this string.
    pub residuals: Vec<Residual>,
}

/// A fretted note of the instrument found.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FoundNote {
    /// Fret number.
    pub fret: u32,
    /// Error against the open string as found, cents.
    pub error_cents: f64,
    /// Standard deviation of that, cents.
    pub sd_cents: f64,
}

/// What is left of a reading.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Residual {
    /// Its index in the plan's readings.
    pub reading: usize,
    /// Fret number.
    pub fret: u32,
    /// What was sounded.
    pub kind: ReadingKind,
    /// Reading less prediction, cents.
    pub cents: f64,
}
