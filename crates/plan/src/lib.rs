//! The plan: what a maker enters, what is wrong with it, and what comes of it.
//!
//! [`read`] turns a file's text into a [`Plan`], or lists every fault of it; [`write()`] turns a plan into a file's
//! text; [`check`] turns a plan, which may be wrong while someone edits it, into a [`Checked`] one or lists every
//! fault; [`solve`] turns a checked plan into a [`Solution`]. [`diagnose`] goes the other
//! way, from tuner readings to what is wrong with an instrument. Nothing here reads a file or a clock, or draws.
//!
//! Lengths are millimetres, moduli gigapascals, densities kg/m³, frequencies hertz, unless a name says otherwise.
//!
//! ```
//! use crestline_plan::{check, example, read, write};
//!
//! let example = example("steel_six").ok_or("no such example")?;
//! let mut plan = read(example.text).map_err(|faults| faults[0].to_string())?;
//! plan.strings[0].core.diameter_mm = 0.27;
//! assert!(check(&plan).is_ok());
//! plan.instrument.frets = 8;
//! let faults = check(&plan).err().ok_or("eight frets are too few")?;
//! assert_eq!(faults[0].to_string(), "instrument.frets: found 8; allowed: 12 to 36");
//! assert!(write(&plan).contains("\"frets\": 8"));
//! # Ok::<(), String>(())
//! ```

mod alternative;
mod bench;
mod check;
mod compare;
pub mod defaults;
mod diagnose;
mod diagnosis;
mod document;
mod examples;
mod fault;
mod kinds;
pub mod limits;
mod materials;
mod pitch;
mod read;
mod solution;
mod solve;
mod tolerances;
mod uncertainty;
mod words;
mod workshop;
mod write;

pub use alternative::{Alternative, OtherStrings};
pub use bench::{BenchLayout, BenchPiece, BenchString, bench_layout, bench_layout_from, datum_x_mm};
pub use check::{Checked, check};
pub use compare::compare;
pub use crestline_physics::diagnose::Priors;
pub use diagnose::{
    FixityReport, SupportsFit, diagnose, fit_supports, fitted_plan, readings_from_csv, suggested_frets,
};
pub use diagnosis::*;
pub use document::*;
pub use examples::{EXAMPLES, Example, example};
pub use fault::Fault;
pub use kinds::{Kind, kinds};
pub use materials::*;
pub use pitch::{nearest_note, note_frequency_hz};
pub use read::{read, read_draft};
pub use solution::*;
pub use solve::solve;
pub use tolerances::*;
pub use uncertainty::{
    Band, FretUncertainty, Input, MeasureNext, Progress, Share, Shares, StringShares, StringUncertainty,
    Uncertainty, UncertaintyReport, measure_next, shares, uncertainty,
};
pub use words::Word;
pub use workshop::{Sensitivity, Step, Workshop, WorkshopLine, WorkshopString, workshop};
pub use write::write;
