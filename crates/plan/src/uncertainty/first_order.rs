//! First-order propagation: central differences over one standard deviation of each axis to both sides.

use crestline_physics::{Contacts, PhysicsError};

use super::model::{StringModel, Worked};
use crate::Tolerances;

/// What one standard deviation of each axis does to a string.
#[derive(Debug, Clone)]
pub(super) struct FirstOrder {
    /// With the plan's figures.
    pub nominal: Worked,
    /// Change of the ideal contacts, one an axis.
    pub ideal: Vec<Contacts>,
    /// Change of the errors as built at every fret, one list an axis.
    pub errors: Vec<Vec<f64>>,
}

impl FirstOrder {
    /// # Errors
    /// [`PhysicsError`] where one standard deviation leaves what can be built.
    pub fn of(model: &StringModel, tolerances: &Tolerances) -> Result<Self, PhysicsError> {
        let mut draw = vec![0.0; model.axes()];
        let nominal = model.work(&draw, tolerances)?;
        let still = model.figures.string(&draw, tolerances)?;
        let (mut ideal, mut errors) = (Vec::new(), Vec::new());
        for axis in 0..draw.len() {
            let mut at = |by: f64| {
                draw[axis] = by;
                let moved = model.figures.string(&draw, tolerances)?;
                // Nothing but the contacts as built answers to the maker's hand.
                let same = moved == still && !super::axes::is_making(axis);
                if same { Ok(nominal.clone()) } else { model.work(&draw, tolerances) }
            };
            let (ahead, behind) = (at(1.0)?, at(-1.0)?);
            draw[axis] = 0.0;
            ideal.push(Contacts {
                saddle_setback_mm: 0.5 * (ahead.ideal.saddle_setback_mm - behind.ideal.saddle_setback_mm),
                nut_setback_mm: 0.5 * (ahead.ideal.nut_setback_mm - behind.ideal.nut_setback_mm),
            });
            let half = |(ahead, behind): (&Option<f64>, &Option<f64>)| match (ahead, behind) {
                (Some(ahead), Some(behind)) => 0.5 * (ahead - behind),
                _ => 0.0,
            };
            errors.push(std::iter::zip(&ahead.errors, &behind.errors).map(half).collect());
        }
        Ok(Self { nominal, ideal, errors })
    }

    /// Standard deviation of the ideal saddle setback, mm.
    pub fn saddle_sd_mm(&self) -> f64 {
        norm(self.ideal.iter().map(|change| change.saddle_setback_mm))
    }

    /// Standard deviation of the ideal nut setback, mm.
    pub fn nut_sd_mm(&self) -> f64 {
        norm(self.ideal.iter().map(|change| change.nut_setback_mm))
    }

    /// Standard deviation of the error as built at a fret, cents.
    pub fn error_sd_cents(&self, fret: usize) -> f64 {
        norm(self.errors.iter().map(|changes| changes[fret]))
    }
}

fn norm(changes: impl Iterator<Item = f64>) -> f64 {
    changes.map(|change| change * change).sum::<f64>().sqrt()
}
