//! The unknowns as one vector in units of their prior standard deviations, and the forward model on it.

use std::ops::Range;

use nalgebra::{DMatrix, DVector};

use super::{Priors, Sounded, StringCase};
use crate::fretting::{Fixities, NutHeight};
use crate::mode::{Ends, bending_length_mm, mode_ratio};
use crate::{Contacts, FrettedString, OpenString, PhysicsError, StringSetup};

/// The unknowns of one string, in their order.
pub(super) const CREST: usize = 0;
pub(super) const NUT: usize = 1;
pub(super) const AXIAL: usize = 2;
pub(super) const BENDING: usize = 3;
pub(super) const SLOT: usize = 4;
pub(super) const ACTION: usize = 5;
pub(super) const TUNING: usize = 6;
pub(super) const OWN: usize = 7;
/// The shared unknowns: press depth, relief, how high the nut's slots are as a whole, the three end fixities where they
/// are looked for, then the frets.
const SHARED: usize = 3;

/// Where the plan presses to no depth at all a factor says nothing; a finger that only just seats the string.
const LEAST_PRESS_DEPTH_MM: f64 = 0.02;
/// Step of the difference quotients in prior standard deviations: the model's curvature over it changes a slope by
/// far less than one part in a hundred, and rounding by less than 1e-9.
const DIFFERENCE: f64 = 1e-2;

/// What is looked for.
pub(super) struct Unknowns<'a> {
    pub strings: &'a [StringCase],
    pub priors: &'a Priors,
    /// Prior standard deviation of the end fixities, where they are looked for.
    pub fixity_sd: Option<f64>,
    /// Indices of the frets that any string was pressed to.
    pub frets: Vec<usize>,
    /// Prior standard deviation of each of these frets' places, mm.
    pub fret_sd_mm: Vec<f64>,
    /// Prior standard deviation of each string's height over fret 1, mm.
    pub slot_sd_mm: Vec<f64>,
    /// Prior standard deviation of what the heights over fret 1 have in common, mm; 0 where each is its own.
    pub slots_sd_mm: f64,
    /// Noise of each string's readings, cents.
    pub noise_cents: Vec<f64>,
    /// Indices of the frets that each string was pressed to.
    pub pressed: Vec<Vec<usize>>,
}

/// A string at certain unknowns.
pub(super) struct Trial {
    pub setup: StringSetup,
    pub contacts: Contacts,
}

impl<'a> Unknowns<'a> {
    pub fn new(strings: &'a [StringCase], priors: &'a Priors) -> Self {
        let pressed: Vec<Vec<usize>> = strings.iter().map(pressed).collect();
        let mut frets: Vec<usize> = pressed.iter().flatten().copied().collect();
        frets.sort_unstable();
        frets.dedup();
        let fret_sd_mm = vec![priors.fret_mm; frets.len()];
        Self {
            strings,
            priors,
            fixity_sd: None,
            frets,
            fret_sd_mm,
            slot_sd_mm: vec![priors.slot_mm; strings.len()],
            slots_sd_mm: 0.0,
            noise_cents: vec![priors.reading_cents; strings.len()],
            pressed,
        }
    }

    /// Looks at these frets too on every string, read or not.
    pub fn look_at(&mut self, frets: &[usize]) {
        let add = |to: &mut Vec<usize>| {
            to.extend(frets);
            to.sort_unstable();
            to.dedup();
        };
        self.pressed.iter_mut().for_each(add);
        add(&mut self.frets);
        self.fret_sd_mm = vec![self.priors.fret_mm; self.frets.len()];
    }

    pub fn count(&self) -> usize {
        self.fret_column(self.frets.len())
    }

    pub fn press_column(&self) -> usize {
        OWN * self.strings.len()
    }

    pub fn relief_column(&self) -> usize {
        self.press_column() + 1
    }

    pub fn slots_column(&self) -> usize {
        self.press_column() + 2
    }

    pub fn fret_column(&self, place: usize) -> usize {
        self.fixity_columns().end + place
    }

    /// The columns of the fixities at nut, fret and saddle; none where they are not looked for.
    pub fn fixity_columns(&self) -> Range<usize> {
        let start = self.press_column() + SHARED;
        start..start + if self.fixity_sd.is_some() { 3 } else { 0 }
    }

    /// The fixities as they are expected, in the order of their columns.
    pub fn expected_fixities(&self) -> [f64; 3] {
        let Fixities { nut, fret, saddle } = self.strings[0].setup.fixities;
        [nut, fret, saddle]
    }

    /// The fixities of all strings, where they are looked for.
    pub fn fixities(&self, at: &DVector<f64>) -> Option<Fixities> {
        let sd = self.fixity_sd?;
        let columns = self.fixity_columns();
        let found =
            |index: usize| (self.expected_fixities()[index] + sd * at[columns.start + index]).clamp(0.0, 1.0);
        Some(Fixities { nut: found(0), fret: found(1), saddle: found(2) })
    }

    /// The columns that a string depends on: its own, then the shared ones.
    pub fn columns(&self, string: usize) -> impl Iterator<Item = usize> + use<> {
        (OWN * string..OWN * (string + 1)).chain(self.press_column()..self.count())
    }

    /// Prior standard deviation of a string's own unknown.
    pub fn own_sd(&self, string: usize, which: usize) -> f64 {
        let priors = self.priors;
        let crest_mm =
            if self.strings[string].is_measured { priors.measured_crest_mm } else { priors.crest_mm };
        [
            crest_mm,
            priors.nut_mm,
            priors.axial_fraction,
            priors.bending_fraction,
            self.slot_sd_mm[string],
            priors.action_mm,
            priors.tuning_cents,
        ][which]
    }

    /// Press depth of all strings, mm.
    pub fn press_depth_mm(&self, at: &DVector<f64>) -> f64 {
        self.expected_depth_mm() * (self.priors.press_factor.ln() * at[self.press_column()]).exp()
    }

    fn expected_depth_mm(&self) -> f64 {
        self.strings[0].setup.pressing.depth_mm.max(LEAST_PRESS_DEPTH_MM)
    }

    fn expected_relief_mm(&self) -> f64 {
        self.strings[0].setup.relief_mm
    }

    /// Relief of all strings, mm.
    pub fn relief_mm(&self, at: &DVector<f64>) -> f64 {
        (self.expected_relief_mm() + self.priors.relief_mm * at[self.relief_column()]).max(0.0)
    }

    /// A string at these unknowns.
    pub fn trial(&self, string: usize, at: &DVector<f64>) -> Trial {
        let case = &self.strings[string];
        let own = |which| self.own_sd(string, which) * at[OWN * string + which];
        let mut setup = case.setup.clone();
        setup.properties.axial_stiffness_n *= own(AXIAL).exp();
        setup.properties.bending_stiffness_n_mm2 *= own(BENDING).exp();
        if let NutHeight::GapAtFirst(gap_mm) = setup.nut_height {
            let all_mm = self.slots_sd_mm * at[self.slots_column()];
            setup.nut_height = NutHeight::GapAtFirst((gap_mm + own(SLOT) + all_mm).max(0.0));
        }
        setup.gap_at_twelfth_mm = (setup.gap_at_twelfth_mm + own(ACTION)).max(0.0);
        setup.frequency_hz *= (own(TUNING) / 1200.0).exp2();
        setup.pressing.depth_mm = self.press_depth_mm(at);
        setup.relief_mm = self.relief_mm(at);
        setup.fixities = self.fixities(at).unwrap_or(setup.fixities);
        for (place, (&fret, sd_mm)) in self.frets.iter().zip(&self.fret_sd_mm).enumerate() {
            setup.fret_mm[fret] += sd_mm * at[self.fret_column(place)];
        }
        let contacts = Contacts {
            saddle_setback_mm: case.contacts.saddle_setback_mm + own(CREST),
            nut_setback_mm: case.contacts.nut_setback_mm + own(NUT),
        };
        Trial { setup, contacts }
    }

    /// Highest value of a column: a support cannot hold firmer than a clamp.
    pub fn highest(&self, column: usize) -> f64 {
        let columns = self.fixity_columns();
        match self.fixity_sd {
            Some(sd) if columns.contains(&column) => {
                (1.0 - self.expected_fixities()[column - columns.start]) / sd
            }
            _ => f64::INFINITY,
        }
    }

    /// Lowest value of a column: heights, relief and fixities cannot be below zero.
    pub fn lowest(&self, column: usize) -> f64 {
        if column == self.relief_column() {
            return -self.expected_relief_mm() / self.priors.relief_mm;
        }
        let columns = self.fixity_columns();
        if let Some(sd) = self.fixity_sd.filter(|_| columns.contains(&column)) {
            return -self.expected_fixities()[column - columns.start] / sd;
        }
        if column >= self.press_column() {
            return f64::NEG_INFINITY;
        }
        let (string, which) = (column / OWN, column % OWN);
        let setup = &self.strings[string].setup;
        match (which, setup.nut_height) {
            (SLOT, NutHeight::GapAtFirst(gap_mm)) => -gap_mm / self.own_sd(string, SLOT),
            (ACTION, _) => -setup.gap_at_twelfth_mm / self.own_sd(string, ACTION),
            _ => f64::NEG_INFINITY,
        }
    }

    /// Fretted errors of a string at its pressed frets and, last, its second partial against twice the first, cents.
    pub fn errors_cents(&self, string: usize, at: &DVector<f64>) -> Result<DVector<f64>, PhysicsError> {
        let trial = self.trial(string, at);
        let ready = FrettedString::new(trial.setup)?;
        let open = ready.open(trial.contacts)?;
        let pressed = &self.pressed[string];
        let mut errors = DVector::zeros(pressed.len() + 1);
        for (row, &fret) in pressed.iter().enumerate() {
            errors[row] = ready.note(&open, fret)?.error_cents;
        }
        errors[pressed.len()] = second_partial_cents(&ready, &open)?;
        Ok(errors)
    }

    /// Slopes of [`Self::errors_cents`] in the order of [`Self::columns`].
    pub fn slopes(&self, string: usize, at: &DVector<f64>) -> Result<DMatrix<f64>, PhysicsError> {
        let here = self.errors_cents(string, at)?;
        let columns: Vec<usize> = self.columns(string).collect();
        let mut slopes = DMatrix::zeros(here.len(), columns.len());
        let mut there = at.clone();
        let is_idle = |column| column == self.slots_column() && self.slots_sd_mm <= 0.0;
        for (place, &column) in columns.iter().enumerate().filter(|&(_, &column)| !is_idle(column)) {
            // Away from a limit that the step would go through.
            let by = if at[column] + DIFFERENCE > self.highest(column) { -DIFFERENCE } else { DIFFERENCE };
            there[column] = at[column] + by;
            if column < self.fret_column(0) {
                slopes.set_column(place, &((self.errors_cents(string, &there)? - &here) / by));
            } else {
                self.fret_slopes(string, column, &there, &here, &mut slopes.column_mut(place))?;
            }
            there[column] = at[column];
        }
        Ok(slopes)
    }

    /// A fret's place matters to its own note and, by the finger, to the next; the frets that heights are measured
    /// from matter to all.
    fn fret_slopes(
        &self,
        string: usize,
        column: usize,
        there: &DVector<f64>,
        here: &DVector<f64>,
        slopes: &mut nalgebra::DVectorViewMut<'_, f64>,
    ) -> Result<(), PhysicsError> {
        let fret = self.frets[column - self.fret_column(0)];
        let last = self.strings[string].setup.fret_mm.len() - 1;
        let all = [0, 11, last].contains(&fret);
        let pressed = &self.pressed[string];
        let touched = |index: usize| all || index == fret || index == fret + 1;
        if !pressed.iter().any(|&index| touched(index)) {
            return Ok(());
        }
        let trial = self.trial(string, there);
        let ready = FrettedString::new(trial.setup)?;
        let open = ready.open(trial.contacts)?;
        for (row, &index) in pressed.iter().enumerate().filter(|&(_, &index)| touched(index)) {
            slopes[row] = (ready.note(&open, index)?.error_cents - here[row]) / DIFFERENCE;
        }
        Ok(())
    }

    /// The row of [`Self::errors_cents`] that a reading stands on; none for the open string.
    pub fn row(&self, string: usize, sounded: Sounded) -> Option<usize> {
        let pressed = &self.pressed[string];
        match sounded {
            Sounded::Open => None,
            Sounded::OctaveHarmonic => Some(pressed.len()),
            Sounded::Fretted(index) => pressed.binary_search(&index).ok(),
        }
    }

    /// Reading less prediction of every reading of a string, cents.
    pub fn residuals_cents(&self, string: usize, at: &DVector<f64>, errors: &DVector<f64>) -> Vec<f64> {
        let tuning_cents = self.own_sd(string, TUNING) * at[OWN * string + TUNING];
        let predicted = |sounded| tuning_cents + self.row(string, sounded).map_or(0.0, |row| errors[row]);
        let case = &self.strings[string];
        case.readings.iter().map(|reading| reading.cents - predicted(reading.sounded)).collect()
    }
}

fn pressed(case: &StringCase) -> Vec<usize> {
    let mut frets: Vec<usize> = case
        .readings
        .iter()
        .filter_map(|reading| match reading.sounded {
            Sounded::Fretted(index) => Some(index),
            _ => None,
        })
        .collect();
    frets.sort_unstable();
    frets.dedup();
    frets
}

/// The second mode against twice the first, cents: what stiffness alone adds to the octave harmonic.
fn second_partial_cents(string: &FrettedString, open: &OpenString) -> Result<f64, PhysicsError> {
    let setup = string.setup();
    let ends = Ends { first: setup.fixities.nut, second: setup.fixities.saddle };
    let bending_mm = bending_length_mm(setup.properties.bending_stiffness_n_mm2, open.tension_n);
    Ok(1200.0 * (mode_ratio(2, bending_mm / open.length_mm, ends)? / open.ratio).log2())
}
