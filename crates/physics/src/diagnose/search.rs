//! The search for the most probable unknowns.

use nalgebra::{Cholesky, DMatrix, DVector, Dyn};

use super::Sounded;
use super::unknowns::{TUNING, Unknowns};
use crate::PhysicsError;

/// Degrees of freedom of the readings' t distribution: usual for robust regression (Lange, Little and Taylor).
const FREEDOM: f64 = 4.0;
/// The noise is first taken this many times larger, so that large errors that the unknowns explain are not taken for
/// wrong readings before the unknowns have moved.
const WIDENED: [f64; 4] = [16.0, 6.0, 2.5, 1.0];
/// Steps while the noise is widened, and at the last.
const STEPS: [usize; 4] = [4, 4, 6, 60];
/// Step at which the search has come to rest, prior standard deviations.
const AT_REST: f64 = 1e-3;
/// How far from where they were taken slopes are still good for a step, prior standard deviations: the model is so
/// nearly linear that they change by a few parts in a hundred over it.
const SLOPES_GOOD: f64 = 0.2;
/// Damping beyond which no step can improve any more.
const MOST_DAMPING: f64 = 1e8;

/// Unknowns found, with what the covariance needs.
pub(super) struct Found {
    pub at: DVector<f64>,
    /// Fretted errors of every string there.
    pub errors: Vec<DVector<f64>>,
    /// Their slopes.
    pub slopes: Vec<DMatrix<f64>>,
    pub covariance: DMatrix<f64>,
    /// Minus the logarithm of the posterior density, up to what is the same for all priors of the same strings.
    pub cost: f64,
    pub settled: bool,
}

/// Slopes of every string, and where they were taken.
struct Slopes {
    of: Vec<DMatrix<f64>>,
    at: DVector<f64>,
}

/// A place with its model values and its cost, minus the logarithm of the posterior.
struct Place {
    at: DVector<f64>,
    errors: Vec<DVector<f64>>,
    cost: f64,
}

/// The weight of a reading with this residual, 1/cent²: that of the noise alone near zero, less far out.
fn weight(residual: f64, noise: f64) -> f64 {
    (FREEDOM + 1.0) / (FREEDOM * noise * noise + residual * residual)
}

impl Unknowns<'_> {
    /// The most probable unknowns, from `start`.
    pub(super) fn search(&self, start: DVector<f64>) -> Result<Found, PhysicsError> {
        self.search_from(start, 0)
    }

    /// As [`Self::search`], from a place that needs no more than a last look around.
    pub(super) fn search_nearby(&self, start: DVector<f64>) -> Result<Found, PhysicsError> {
        self.search_from(start, WIDENED.len() - 2)
    }

    fn search_from(&self, start: DVector<f64>, stage: usize) -> Result<Found, PhysicsError> {
        let mut slopes = Slopes { of: self.all_slopes(&start)?, at: start.clone() };
        let mut here = self.place(start, WIDENED[stage])?;
        let mut settled = false;
        for (widened, steps) in WIDENED.into_iter().zip(STEPS).skip(stage) {
            here = self.place(here.at, widened)?;
            (here, settled) = self.descend(here, &mut slopes, widened, steps)?;
        }
        let slopes = self.all_slopes(&here.at)?;
        let (normal, _) = self.normal(&here, &slopes, 1.0, true);
        let covariance = inverse(normal)?;
        Ok(Found { at: here.at, errors: here.errors, slopes, covariance, cost: here.cost, settled })
    }

    /// Steps down until at rest; false where the steps do not suffice.
    fn descend(
        &self,
        start: Place,
        slopes: &mut Slopes,
        widened: f64,
        steps: usize,
    ) -> Result<(Place, bool), PhysicsError> {
        let mut here = start;
        let mut damping = 1e-3;
        for _ in 0..steps {
            if (&here.at - &slopes.at).amax() > SLOPES_GOOD {
                *slopes = Slopes { of: self.all_slopes(&here.at)?, at: here.at.clone() };
            }
            let (mut normal, mut gradient) = self.normal(&here, &slopes.of, widened, false);
            self.hold_at_limits(&here.at, &mut normal, &mut gradient);
            let moved = loop {
                let next = damped_step(&normal, &gradient, damping)
                    .and_then(|step| self.place(self.kept_legal(&here.at + step), widened).ok())
                    .filter(|next| next.cost <= here.cost);
                if let Some(next) = next {
                    damping = (damping * 0.2).max(1e-9);
                    let moved = (&next.at - &here.at).amax();
                    here = next;
                    break moved;
                }
                damping *= 6.0;
                if damping > MOST_DAMPING {
                    // No step improves: the place is as good as rounding lets it be.
                    return Ok((here, true));
                }
            };
            if moved < AT_REST {
                return Ok((here, true));
            }
        }
        Ok((here, false))
    }

    fn kept_legal(&self, mut at: DVector<f64>) -> DVector<f64> {
        for column in 0..at.len() {
            at[column] = at[column].max(self.lowest(column)).min(self.highest(column));
        }
        at
    }

    /// Takes out of the step what would go through a limit.
    fn hold_at_limits(&self, at: &DVector<f64>, normal: &mut DMatrix<f64>, gradient: &mut DVector<f64>) {
        for column in 0..at.len() {
            let is_held = (at[column] <= self.lowest(column) && gradient[column] < 0.0)
                || (at[column] >= self.highest(column) && gradient[column] > 0.0);
            if is_held {
                normal.row_mut(column).fill(0.0);
                normal.column_mut(column).fill(0.0);
                normal[(column, column)] = 1.0;
                gradient[column] = 0.0;
            }
        }
    }

    fn all_slopes(&self, at: &DVector<f64>) -> Result<Vec<DMatrix<f64>>, PhysicsError> {
        (0..self.strings.len()).map(|string| self.slopes(string, at)).collect()
    }

    fn place(&self, at: DVector<f64>, widened: f64) -> Result<Place, PhysicsError> {
        let errors: Vec<DVector<f64>> =
            (0..self.strings.len()).map(|string| self.errors_cents(string, &at)).collect::<Result<_, _>>()?;
        let mut cost = 0.5 * at.norm_squared();
        for (string, errors) in errors.iter().enumerate() {
            let scale = FREEDOM * (widened * self.noise_cents[string]).powi(2);
            for residual in self.residuals_cents(string, &at, errors) {
                cost += 0.5 * (FREEDOM + 1.0) * (residual * residual / scale).ln_1p();
            }
        }
        if cost.is_finite() {
            Ok(Place { at, errors, cost })
        } else {
            Err(PhysicsError::NotSettled { what: "diagnosis", iterations: 0, reached: f64::MAX })
        }
    }

    /// JᵀWJ + I and Jᵀ W r − z. For the covariance no reading counts for more than the noise alone would let it.
    fn normal(
        &self,
        here: &Place,
        slopes: &[DMatrix<f64>],
        widened: f64,
        is_capped: bool,
    ) -> (DMatrix<f64>, DVector<f64>) {
        let count = self.count();
        let mut normal = DMatrix::identity(count, count);
        let mut gradient = -&here.at;
        for (string, slopes) in slopes.iter().enumerate() {
            let columns: Vec<usize> = self.columns(string).collect();
            let noise = widened * self.noise_cents[string];
            let residuals = self.residuals_cents(string, &here.at, &here.errors[string]);
            for (reading, residual) in self.strings[string].readings.iter().zip(residuals) {
                let mut heavy = weight(residual, noise);
                if is_capped {
                    heavy = heavy.min((noise * noise).recip());
                }
                let row = self.add_reading(&mut normal, (string, slopes), reading.sounded, heavy);
                for (&column, slope) in columns.iter().zip(row) {
                    gradient[column] += heavy * residual * slope;
                }
            }
        }
        (normal, gradient)
    }

    /// Adds one reading of this weight to the normal matrix; gives its slopes in the order of the string's columns.
    fn add_reading(
        &self,
        normal: &mut DMatrix<f64>,
        (string, slopes): (usize, &DMatrix<f64>),
        sounded: Sounded,
        weight: f64,
    ) -> Vec<f64> {
        let columns: Vec<usize> = self.columns(string).collect();
        let mut row = match self.row(string, sounded) {
            Some(from) => slopes.row(from).iter().copied().collect(),
            None => vec![0.0; columns.len()],
        };
        row[TUNING] += self.own_sd(string, TUNING);
        for (i, &column) in columns.iter().enumerate().filter(|&(i, _)| row[i] != 0.0) {
            for (j, &other) in columns.iter().enumerate() {
                normal[(column, other)] += weight * row[i] * row[j];
            }
        }
        row
    }

    /// Slopes of every string and the covariance at `at`, if readings were as predicted there.
    pub(super) fn foreseen(
        &self,
        at: &DVector<f64>,
    ) -> Result<(Vec<DMatrix<f64>>, DMatrix<f64>), PhysicsError> {
        let slopes = self.all_slopes(at)?;
        let mut normal = DMatrix::identity(self.count(), self.count());
        for (string, slopes) in slopes.iter().enumerate() {
            for reading in &self.strings[string].readings {
                self.add_reading(
                    &mut normal,
                    (string, slopes),
                    reading.sounded,
                    self.noise_cents[string].powi(-2),
                );
            }
        }
        Ok((slopes, inverse(normal)?))
    }
}

fn cholesky(matrix: DMatrix<f64>) -> Option<Cholesky<f64, Dyn>> {
    if matrix.iter().all(|value| value.is_finite()) { Cholesky::new(matrix) } else { None }
}

fn inverse(matrix: DMatrix<f64>) -> Result<DMatrix<f64>, PhysicsError> {
    let lost = PhysicsError::NotSettled { what: "covariance", iterations: 1, reached: f64::MAX };
    Ok(cholesky(matrix).ok_or(lost)?.inverse())
}

fn damped_step(normal: &DMatrix<f64>, gradient: &DVector<f64>, damping: f64) -> Option<DVector<f64>> {
    let mut damped = normal.clone();
    for place in 0..damped.nrows() {
        damped[(place, place)] *= 1.0 + damping;
    }
    let step = cholesky(damped)?.solve(gradient);
    step.iter().all(|value| value.is_finite()).then_some(step)
}
