//! What was found, in a repairer's terms.

use nalgebra::DMatrix;

use super::causes::shares;
use super::moves::{SaddleMove, SaddleNutMove, best_move, rms};
use super::search::Found;
use super::unknowns::{ACTION, AXIAL, BENDING, CREST, NUT, OWN, SLOT, TUNING, Unknowns};
use super::{Diagnosed, DiagnosedString, Estimate, MisplacedFret, Trades};
use crate::{FrettedString, PhysicsError};

/// The unknowns found, and what had to be set free for it.
pub(super) struct Posterior {
    pub found: Found,
    /// Strings that nothing explains.
    pub suspects: Vec<bool>,
    /// Places, among the frets looked at, of those out of place.
    pub freed: Vec<usize>,
    /// Strings whose slots are far higher than expected.
    pub high_slots: Vec<bool>,
}

impl Posterior {
    pub fn diagnosed(&self, unknowns: &Unknowns) -> Result<Diagnosed, PhysicsError> {
        let strings = (0..unknowns.strings.len())
            .map(|string| self.string(unknowns, string))
            .collect::<Result<_, _>>()?;
        let depth_mm = unknowns.press_depth_mm(&self.found.at);
        let press_sd = self.sd(unknowns.press_column()) * unknowns.priors.press_factor.ln();
        let relief_sd = self.sd(unknowns.relief_column()) * unknowns.priors.relief_mm;
        let frets = self.freed.iter().map(|&place| self.fret(unknowns, place)).collect();
        Ok(Diagnosed {
            strings,
            press_depth_mm: Estimate { value: depth_mm, sd: depth_mm * press_sd },
            relief_mm: Estimate { value: unknowns.relief_mm(&self.found.at), sd: relief_sd },
            frets,
            settled: self.found.settled,
        })
    }

    fn sd(&self, column: usize) -> f64 {
        self.found.covariance[(column, column)].max(0.0).sqrt()
    }

    fn correlation(&self, a: usize, b: usize) -> f64 {
        let both = self.sd(a) * self.sd(b);
        if both > 0.0 { (self.found.covariance[(a, b)] / both).clamp(-1.0, 1.0) } else { 0.0 }
    }

    fn fret(&self, unknowns: &Unknowns, place: usize) -> MisplacedFret {
        let column = unknowns.fret_column(place);
        let prior_mm = unknowns.fret_sd_mm[place];
        MisplacedFret {
            index: unknowns.frets[place],
            shift_mm: prior_mm * self.found.at[column],
            sd_mm: prior_mm * self.sd(column),
        }
    }

    fn string(&self, unknowns: &Unknowns, string: usize) -> Result<DiagnosedString, PhysicsError> {
        let at = &self.found.at;
        let errors = &self.found.errors[string];
        let trial = unknowns.trial(string, at);
        let frets = unknowns.pressed[string].clone();
        let column = |which| OWN * string + which;
        let scaled = |which| {
            let prior = unknowns.own_sd(string, which);
            Estimate { value: prior * at[column(which)], sd: prior * self.sd(column(which)) }
        };
        let ratio = |which| {
            let log = scaled(which);
            Estimate { value: log.value.exp(), sd: log.value.exp() * log.sd }
        };
        let around = |centre: f64, which| {
            let off = scaled(which);
            Estimate { value: centre + off.value, sd: off.sd }
        };
        let residuals_cents = unknowns.residuals_cents(string, at, errors);
        let (saddle, saddle_and_nut) = self.moves(unknowns, string)?;
        let expected = unknowns.strings[string].contacts;
        Ok(DiagnosedString {
            contacts: trial.contacts,
            crest_mm: around(expected.saddle_setback_mm, CREST),
            nut_mm: around(expected.nut_setback_mm, NUT),
            axial_ratio: ratio(AXIAL),
            bending_ratio: ratio(BENDING),
            slot_higher_mm: scaled(SLOT),
            action_higher_mm: scaled(ACTION),
            tuning_cents: scaled(TUNING),
            errors_cents: errors.iter().take(frets.len()).copied().collect(),
            errors_sd_cents: self.errors_sd_cents(unknowns, string),
            frets,
            residual_rms_cents: rms(residuals_cents.iter().copied()),
            residuals_cents,
            saddle,
            saddle_and_nut,
            causes: shares(unknowns, string, at, errors)?,
            is_suspect: self.suspects[string],
            is_slot_high: self.high_slots[string],
            trades: Trades {
                crest_bending: self.correlation(column(CREST), column(BENDING)),
                nut_tuning: self.correlation(column(NUT), column(TUNING)),
                nut_pressing: self.correlation(column(NUT), unknowns.press_column()),
            },
            setup: trial.setup,
        })
    }

    /// Slopes of a string's fretted errors and the covariance of what they go with.
    fn known(&self, unknowns: &Unknowns, string: usize) -> (DMatrix<f64>, DMatrix<f64>) {
        let slopes = self.found.slopes[string].rows(0, unknowns.pressed[string].len()).into_owned();
        let columns: Vec<usize> = unknowns.columns(string).collect();
        let covariance = DMatrix::from_fn(columns.len(), columns.len(), |row, column| {
            self.found.covariance[(columns[row], columns[column])]
        });
        (slopes, covariance)
    }

    fn errors_sd_cents(&self, unknowns: &Unknowns, string: usize) -> Vec<f64> {
        let (slopes, covariance) = self.known(unknowns, string);
        let spread = &slopes * covariance;
        let variance = |row: usize| spread.row(row).dot(&slopes.row(row));
        (0..slopes.nrows()).map(|row| variance(row).max(0.0).sqrt()).collect()
    }

    fn moves(
        &self,
        unknowns: &Unknowns,
        string: usize,
    ) -> Result<(Option<SaddleMove>, Option<SaddleNutMove>), PhysicsError> {
        let frets = &unknowns.pressed[string];
        if frets.is_empty() {
            return Ok((None, None));
        }
        let trial = unknowns.trial(string, &self.found.at);
        let ready = FrettedString::new(trial.setup)?;
        let (slopes, covariance) = self.known(unknowns, string);
        let known = (&slopes, &covariance);
        let alone = best_move(&ready, trial.contacts, frets, 1, known)?;
        let both = best_move(&ready, trial.contacts, frets, 2, known)?;
        let sd = |variance: f64| variance.max(0.0).sqrt();
        Ok((
            Some(SaddleMove {
                saddle_mm: alone.by_mm[0],
                sd_mm: sd(alone.covariance[(0, 0)]),
                rms_after_cents: alone.rms_after_cents,
            }),
            Some(SaddleNutMove {
                saddle_mm: both.by_mm[0],
                saddle_sd_mm: sd(both.covariance[(0, 0)]),
                nut_mm: both.by_mm[1],
                nut_sd_mm: sd(both.covariance[(1, 1)]),
                rms_after_cents: both.rms_after_cents,
            }),
        ))
    }
}
