//! What can go wrong in a computation.

use thiserror::Error;

/// A computation that has no answer, with the value that caused it.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum PhysicsError {
    /// A quantity is not a finite number or lies outside its range.
    #[error("{name} is {value}, allowed is {low} to {high}")]
    OutOfRange {
        /// The quantity.
        name: &'static str,
        /// What was given.
        value: f64,
        /// The least allowed value.
        low: f64,
        /// The greatest allowed value.
        high: f64,
    },
    /// The bending stiffness alone makes the string sound higher than the wanted pitch.
    #[error("at {frequency_hz} Hz the string is too stiff: even slack it would sound higher")]
    TooStiff {
        /// The wanted pitch, Hz.
        frequency_hz: f64,
    },
    /// An iteration ended without reaching its tolerance.
    #[error("{what} did not settle: after {iterations} steps the last change was {reached:e}")]
    NotSettled {
        /// The quantity looked for.
        what: &'static str,
        /// Steps taken.
        iterations: usize,
        /// Size of the last change.
        reached: f64,
    },
    /// Two lines of the neck do not cross.
    #[error("string {string} does not cross {line}")]
    NoCrossing {
        /// String number, 1 first.
        string: usize,
        /// The line.
        line: &'static str,
    },
}

/// Refuses a value that is not within `low..=high`; not-a-number is never within.
pub(crate) fn within(name: &'static str, value: f64, low: f64, high: f64) -> Result<f64, PhysicsError> {
    if value >= low && value <= high {
        Ok(value)
    } else {
        Err(PhysicsError::OutOfRange { name, value, low, high })
    }
}
