//! What to measure next, in plain words.

use serde::Serialize;

use super::axes::Input;
use super::shares::Shares;

/// Gain below which nothing is said of an input, mm: half of the last digit in which setbacks are given.
const WORTH_MM: f64 = 0.005;

/// One thing that could be measured or settled.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct MeasureNext {
    /// The input.
    pub input: Input,
    /// Part of the variance of the whole saddle that goes once it is known.
    pub share: f64,
    /// Half-width of the 90 % band now, root mean square over the strings, mm.
    pub plus_minus_mm: f64,
    /// The same once it is known exactly, mm.
    pub then_plus_minus_mm: f64,
    /// How much narrower that is, mm.
    pub gain_mm: f64,
    /// What to do, in words.
    pub text: String,
}

/// What would narrow the setbacks of the whole saddle, the greatest gain first.
#[must_use]
pub fn measure_next(shares: &Shares) -> Vec<MeasureNext> {
    let now_mm = shares.plus_minus_mm;
    shares
        .whole
        .iter()
        .filter(|share| share.gain_mm >= WORTH_MM)
        .map(|share| {
            let then_mm = now_mm - share.gain_mm;
            MeasureNext {
                input: share.input,
                share: 1.0 - (then_mm / now_mm).powi(2),
                plus_minus_mm: now_mm,
                then_plus_minus_mm: then_mm,
                gain_mm: share.gain_mm,
                text: share.input.how_to_know().to_owned(),
            }
        })
        .collect()
}

impl Input {
    /// A name for tables.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::CoreDiameter => "core diameter",
            Self::Modulus => "modulus",
            Self::Mass => "mass",
            Self::MeasuredStiffness => "measured stiffness",
            Self::Action => "action",
            Self::Pitch => "pitch",
            Self::Relief => "relief",
            Self::Scale => "scale",
            Self::FretPlaces => "fret places",
            Self::PressDepth => "press depth",
            Self::FingerPlace => "finger place",
            Self::Supports => "fixities",
            Self::Slip => "slip",
            Self::Crest => "crest",
            Self::NutEdge => "nut edge",
        }
    }

    /// What would make it known.
    #[must_use]
    pub const fn how_to_know(self) -> &'static str {
        match self {
            Self::CoreDiameter => "measure the cores with a micrometer, wound strings at their bare ends",
            Self::Modulus => {
                "measure the stiffness: pitch against stretch for the axial, the first partials for the bending one"
            }
            Self::Mass => "weigh a measured length of each string",
            Self::MeasuredStiffness => "measure axial and bending stiffness again",
            Self::Action => "measure the action over frets 1 and 12 with feeler gauges",
            Self::Pitch => "settle the pitch to which the instrument will be tuned",
            Self::Relief => "measure the relief with the strings at pitch",
            Self::Scale => "measure the distance from the nut to fret 12",
            Self::FretPlaces => "measure where each fret's crown stands",
            Self::PressDepth => {
                "check the press depth: let the player sound the notes, and compare the first frets"
            }
            Self::FingerPlace => "watch how far behind the fret the player presses",
            Self::Supports => {
                "find how firmly the ends hold: fit the fixities to tuner readings of a trial saddle whose crests are measured"
            }
            Self::Slip => "find whether the strings slip over nut and saddle, or clamp them behind",
            Self::Crest => "file the crests more closely to the line",
            Self::NutEdge => "trim the nut's edge more closely to the line",
        }
    }
}
