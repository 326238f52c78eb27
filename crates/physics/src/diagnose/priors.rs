//! What is held probable before anything is read.

use crate::PhysicsError;
use crate::error::within;

/// Prior standard deviations of the unknowns, and the noise of a reading.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Priors {
    /// Crest position where nothing is known of it, mm.
    pub crest_mm: f64,
    /// Crest position where it was measured, mm.
    pub measured_crest_mm: f64,
    /// Nut edge, mm.
    pub nut_mm: f64,
    /// Axial stiffness, as a fraction of it (of its logarithm).
    pub axial_fraction: f64,
    /// Bending stiffness, as a fraction of it (of its logarithm).
    pub bending_fraction: f64,
    /// Height of the string over fret 1, which the nut slot sets, mm.
    pub slot_mm: f64,
    /// Height of the string over fret 12, mm.
    pub action_mm: f64,
    /// How exactly a player tunes an open string before reading the others, cents.
    pub tuning_cents: f64,
    /// Press depth, as a factor: one standard deviation is this many times more or less.
    pub press_factor: f64,
    /// Relief, mm.
    pub relief_mm: f64,
    /// Place of each fret, mm.
    pub fret_mm: f64,
    /// Noise of a reading, cents.
    pub reading_cents: f64,
}

impl Default for Priors {
    /// Common practice: how well a repairer knows an instrument that was looked at but not measured.
    fn default() -> Self {
        Self {
            crest_mm: 2.0,
            measured_crest_mm: 0.3,
            nut_mm: 0.5,
            axial_fraction: 0.15,
            bending_fraction: 0.15,
            slot_mm: 0.1,
            action_mm: 0.15,
            tuning_cents: 3.0,
            press_factor: 1.6,
            relief_mm: 0.1,
            fret_mm: 0.08,
            reading_cents: 1.0,
        }
    }
}

impl Priors {
    /// Refuses what is not positive and finite, or wider than the model bears.
    ///
    /// # Errors
    /// [`PhysicsError::OutOfRange`] with the name of the first one that is out of range.
    pub fn check(&self) -> Result<(), PhysicsError> {
        const LEAST: f64 = 1e-6;
        within("standard deviation of the crest in mm", self.crest_mm, LEAST, 20.0)?;
        within("standard deviation of a measured crest in mm", self.measured_crest_mm, LEAST, 20.0)?;
        within("standard deviation of the nut edge in mm", self.nut_mm, LEAST, 10.0)?;
        within("standard deviation of the axial stiffness", self.axial_fraction, LEAST, 1.0)?;
        within("standard deviation of the bending stiffness", self.bending_fraction, LEAST, 1.0)?;
        within("standard deviation of the height over fret 1 in mm", self.slot_mm, LEAST, 2.0)?;
        within("standard deviation of the height over fret 12 in mm", self.action_mm, LEAST, 5.0)?;
        within("standard deviation of the tuning in cents", self.tuning_cents, LEAST, 100.0)?;
        within("factor of the press depth", self.press_factor, 1.0 + LEAST, 5.0)?;
        within("standard deviation of the relief in mm", self.relief_mm, LEAST, 2.0)?;
        within("standard deviation of a fret's place in mm", self.fret_mm, LEAST, 2.0)?;
        within("noise of a reading in cents", self.reading_cents, 1e-3, 100.0)?;
        Ok(())
    }
}
