//! Lengths as people write them: one unit for the whole window, read and shown in one place.
//!
//! The plan holds millimetres throughout. [`LengthUnit`] is a setting of the view; what shows a length asks it for
//! the text, and what reads one hands the text to it. A text may name its own unit whatever the setting is.

mod figures;
mod length_unit;
mod read;
mod sentence;

pub use length_unit::{Fineness, LengthUnit};
pub use read::{list, read};
pub use sentence::{fault_words, in_unit};

/// Millimetres in an inch, by definition of the inch.
pub const MM_PER_INCH: f64 = 25.4;

/// The number to twelve significant digits, so that a change of unit leaves no binary dust.
#[must_use]
pub fn without_dust(value: f64) -> f64 {
    format!("{value:.11e}").parse().unwrap_or(value)
}
