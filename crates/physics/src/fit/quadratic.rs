//! Small dense convex quadratic programmes: minimise ½xᵀHx + cᵀx where Gx ≤ h.
//!
//! S. Mehrotra's predictor–corrector interior-point method (SIAM J. Optim. 2 (1992) 575) in the form of
//! J. Nocedal and S. J. Wright, Numerical Optimization, section 16.6. H = 0 makes it a linear programme.

use nalgebra::{Cholesky, DMatrix, DVector};

use crate::PhysicsError;

/// Iterations after which the programme is given up; some 15 are usual.
const MAX_ITERATIONS: usize = 80;
/// Residuals and mean complementarity, relative to the size of the data, at which it is solved.
const TOLERANCE: f64 = 1e-11;
/// What is accepted where rounding stops it before.
const ACCEPTABLE: f64 = 1e-8;

/// A convex quadratic programme.
#[derive(Debug, Clone)]
pub(crate) struct Quadratic {
    /// Symmetric, positive semidefinite.
    pub hessian: DMatrix<f64>,
    pub gradient: DVector<f64>,
    /// One row a constraint.
    pub rows: DMatrix<f64>,
    pub limits: DVector<f64>,
}

struct Iterate {
    x: DVector<f64>,
    slack: DVector<f64>,
    dual: DVector<f64>,
}

impl Quadratic {
    /// The minimiser.
    ///
    /// # Errors
    /// [`PhysicsError::NotSettled`] where there is no feasible point, or rounding keeps it from being reached.
    pub fn minimise(&self) -> Result<DVector<f64>, PhysicsError> {
        self.scaled().follow_path()
    }

    /// The same programme with an objective and constraints of size 1, which moves no minimiser: slacks and duals
    /// then start from a like size whatever the units.
    fn scaled(&self) -> Self {
        let objective = self.gradient.amax().max(self.hessian.amax()).max(f64::MIN_POSITIVE);
        let mut scaled = self.clone();
        scaled.hessian /= objective;
        scaled.gradient /= objective;
        for (mut row, limit) in scaled.rows.row_iter_mut().zip(scaled.limits.iter_mut()) {
            let size = row.norm();
            if size > 0.0 {
                row /= size;
                *limit /= size;
            }
        }
        scaled
    }

    fn follow_path(&self) -> Result<DVector<f64>, PhysicsError> {
        let count = self.limits.len();
        let mut at = Iterate {
            x: DVector::zeros(self.gradient.len()),
            slack: self.limits.map(|limit| limit.max(1.0)),
            dual: DVector::from_element(count, 1.0),
        };
        let (scale_dual, scale_primal) = (1.0 + self.gradient.amax(), 1.0 + self.limits.amax());
        let mut reached = f64::INFINITY;
        let mut best = at.x.clone();
        for _ in 0..MAX_ITERATIONS {
            let dual_residual = &self.hessian * &at.x + &self.gradient + self.rows.tr_mul(&at.dual);
            let primal_residual = &self.rows * &at.x + &at.slack - &self.limits;
            let gap = at.slack.dot(&at.dual) / count as f64;
            let worst = (dual_residual.amax() / scale_dual)
                .max(primal_residual.amax() / scale_primal)
                .max(gap / scale_dual);
            if !worst.is_finite() {
                break;
            }
            if worst < reached {
                reached = worst;
                best.copy_from(&at.x);
            }
            if worst < TOLERANCE {
                return Ok(best);
            }
            if !self.step(&mut at, &dual_residual, &primal_residual, gap) {
                break;
            }
        }
        if reached < ACCEPTABLE {
            return Ok(best);
        }
        Err(PhysicsError::NotSettled { what: "constrained step", iterations: MAX_ITERATIONS, reached })
    }

    /// One predictor–corrector step; false where the normal matrix cannot be factored.
    fn step(
        &self,
        at: &mut Iterate,
        dual_residual: &DVector<f64>,
        primal_residual: &DVector<f64>,
        gap: f64,
    ) -> bool {
        let weight = at.dual.component_div(&at.slack);
        let Some(factor) = self.normal_matrix(&weight) else { return false };
        let direction = |complementarity: &DVector<f64>| {
            let pull = complementarity.component_div(&at.slack) - weight.component_mul(primal_residual);
            let dx = factor.solve(&(self.rows.tr_mul(&pull) - dual_residual));
            let along = &self.rows * &dx;
            let dz =
                weight.component_mul(&(primal_residual + &along)) - complementarity.component_div(&at.slack);
            (dx, -primal_residual - along, dz)
        };
        let product = at.slack.component_mul(&at.dual);
        let (_, ds, dz) = direction(&product);
        let affine = longest_step(&at.slack, &ds).min(longest_step(&at.dual, &dz));
        let affine_gap = (&at.slack + affine * &ds).dot(&(&at.dual + affine * &dz)) / at.slack.len() as f64;
        let centring = (affine_gap / gap).powi(3) * gap;
        let corrected = product + ds.component_mul(&dz) - DVector::from_element(ds.len(), centring);
        let (dx, ds, dz) = direction(&corrected);
        let length = 0.995 * longest_step(&at.slack, &ds).min(longest_step(&at.dual, &dz));
        let length = length.min(1.0);
        at.x += length * dx;
        at.slack += length * ds;
        at.dual += length * dz;
        true
    }

    fn normal_matrix(&self, weight: &DVector<f64>) -> Option<Cholesky<f64, nalgebra::Dyn>> {
        let mut weighted = self.rows.clone();
        for (mut row, weight) in weighted.row_iter_mut().zip(weight.iter()) {
            row *= *weight;
        }
        let mut normal = &self.hessian + self.rows.tr_mul(&weighted);
        let ridge = 1e-15 * normal.diagonal().amax().max(1e-300);
        for index in 0..normal.nrows() {
            normal[(index, index)] += ridge;
        }
        Cholesky::new(normal)
    }
}

/// The largest step of at most 1/0.995 that keeps `value` positive.
fn longest_step(value: &DVector<f64>, change: &DVector<f64>) -> f64 {
    let limit = std::iter::zip(value, change)
        .filter(|(_, change)| **change < 0.0)
        .map(|(value, change)| -value / change)
        .fold(f64::INFINITY, f64::min);
    limit.min(1.0 / 0.995)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    /// Nocedal and Wright, example 16.4: minimum of (x − 1)² + (y − 2.5)² is at (1.4, 1.7).
    fn textbook() -> Quadratic {
        Quadratic {
            hessian: DMatrix::from_diagonal_element(2, 2, 2.0),
            gradient: DVector::from_vec(vec![-2.0, -5.0]),
            rows: DMatrix::from_row_slice(5, 2, &[-1.0, 2.0, 1.0, 2.0, 1.0, -2.0, -1.0, 0.0, 0.0, -1.0]),
            limits: DVector::from_vec(vec![2.0, 6.0, 2.0, 0.0, 0.0]),
        }
    }

    #[test]
    fn a_textbook_quadratic_programme() {
        let x = textbook().minimise().unwrap();
        assert!((x[0] - 1.4).abs() < 1e-9 && (x[1] - 1.7).abs() < 1e-9, "{x}");
    }

    #[test]
    fn units_of_any_size_make_no_difference() {
        let base = textbook();
        for size in [1e-9, 1e-4, 1e4, 1e9] {
            let mut programme = textbook();
            programme.hessian *= size;
            programme.gradient *= size;
            programme.rows.row_mut(1).scale_mut(size);
            programme.limits[1] *= size;
            let (x, expected) = (programme.minimise().unwrap(), base.minimise().unwrap());
            assert!((&x - &expected).amax() < 1e-9, "{size}: {x}");
        }
    }

    #[test]
    fn a_linear_programme_and_one_without_a_feasible_point() {
        let mut programme = Quadratic {
            hessian: DMatrix::zeros(1, 1),
            gradient: DVector::from_vec(vec![1.0]),
            rows: DMatrix::from_row_slice(2, 1, &[-1.0, 1.0]),
            limits: DVector::from_vec(vec![-2.0, 5.0]),
        };
        assert!((programme.minimise().unwrap()[0] - 2.0).abs() < 1e-9);
        programme.limits[1] = 1.0;
        assert!(programme.minimise().is_err());
    }
}
