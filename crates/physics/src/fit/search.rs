//! The search for unknowns: Gauss–Newton for least squares, a sequence of linear programmes for the smallest
//! largest error, both within linear(ised) limits and with step control.

use nalgebra::{Cholesky, DMatrix, DVector};

use crate::fit::quadratic::Quadratic;
use crate::fit::unknowns::Unknowns;
use crate::fit::{FitCase, FitString};
use crate::{Contacts, PhysicsError};

/// Steps after which a search ends; 3 or 4 are usual.
const MAX_STEPS: usize = 40;
/// Step at which a search has settled, mm.
const SETTLED_MM: f64 = 1e-8;
/// What rounding may add to what is made small, as a share of it (and at least of 1 cent or 1 cent²).
const HAIR: f64 = 1e-9;
/// Gain of a step, as such a share, at which a search has settled too: where unknowns outnumber what they can mend the
/// bottom is flat, and every place there is as good. For squared errors, which grow with the square of the way from
/// their least, and for the largest error, which grows with the way itself.
const FLAT_SQUARES: f64 = 1e-13;
const FLAT_LARGEST: f64 = 1e-9;
/// Derivatives are taken anew after a step longer than this, mm: what an older one would shift the optimum by is
/// below 1e-6 mm.
const FRESH_MM: f64 = 1e-4;
/// Step of the derivatives of errors with respect to contacts, mm: rounding and curvature each cost about 1e-6.
const DIFFERENCE_MM: f64 = 1e-4;
/// How far a limit may be overstepped before the constrained step is taken, and for nothing, mm: constrained steps end
/// about so near to a limit.
const FEASIBLE_MM: f64 = 1e-9;
/// Width left to the largest error while ties are settled, cents; moves a crest by less than 1e-6 mm.
const TIE_CENTS: f64 = 1e-6;

/// What is made small.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Objective {
    /// The sum of squared errors, weighted by case.
    SquaredErrors,
    /// The largest error; where several places share it, the one of them with the least squares.
    LargestError,
}

/// Where a search ended.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Found {
    pub unknowns: Vec<f64>,
    pub contacts: Vec<Contacts>,
    /// Whether the last step was below the tolerance.
    pub settled: bool,
    /// Length of the last step, mm.
    pub last_step_mm: f64,
}

/// One problem: strings, and the unknowns that place their contacts.
pub(crate) struct Search<'a> {
    strings: &'a [FitString<'a>],
    unknowns: &'a Unknowns,
    /// Square root of every error's weight, as a share of the greatest: what is flat then depends on no common factor.
    root_weights: DVector<f64>,
}

/// Errors and limits near a place, to first order.
struct Near {
    slopes: DMatrix<f64>,
    limit_slopes: DMatrix<f64>,
}

impl<'a> Search<'a> {
    pub fn new(strings: &'a [FitString<'a>], unknowns: &'a Unknowns) -> Self {
        let cases = || strings.iter().flat_map(FitString::counted);
        let greatest = cases().map(|case| case.weight).fold(0.0, f64::max);
        let root_weights: Vec<f64> =
            cases().flat_map(|case| vec![(case.weight / greatest).sqrt(); case.frets.len()]).collect();
        Self { strings, unknowns, root_weights: DVector::from_vec(root_weights) }
    }

    /// The best unknowns, looked for from given contacts.
    ///
    /// # Errors
    /// [`PhysicsError`] where the start itself cannot be worked out.
    pub fn run(&self, objective: Objective, start: &[Contacts]) -> Result<Found, PhysicsError> {
        let start = self.unknowns.near(start);
        let squared = |errors: &DVector<f64>| errors.component_mul(&self.root_weights).norm_squared();
        let found = self.descend(start, squared, FLAT_SQUARES, |near, errors, excesses| {
            self.least_squares_step(near, errors, excesses, None)
        })?;
        // Without a note there is no largest error, and the place is kept.
        if objective == Objective::SquaredErrors || self.root_weights.is_empty() {
            return Ok(found);
        }
        let found = self.descend(found.unknowns, largest, FLAT_LARGEST, |near, errors, excesses| {
            self.minimax_step(near, errors, excesses)
        })?;
        if self.unknowns.count() == 1 {
            return Ok(found);
        }
        let bound = largest(&self.errors(&found.unknowns)?) + TIE_CENTS;
        let merit = |errors: &DVector<f64>| squared(errors) + 1e6 * (largest(errors) - bound).max(0.0);
        self.descend(found.unknowns, merit, FLAT_SQUARES, |near, errors, excesses| {
            self.least_squares_step(near, errors, excesses, Some(bound))
        })
    }

    fn descend(
        &self,
        mut at: Vec<f64>,
        merit: impl Fn(&DVector<f64>) -> f64,
        flat_share: f64,
        step: impl Fn(&Near, &DVector<f64>, &DVector<f64>) -> Result<DVector<f64>, PhysicsError>,
    ) -> Result<Found, PhysicsError> {
        let mut errors = self.errors(&at)?;
        // A millimetre beyond a limit must never pay, however large the errors.
        let price = 1e3 * (1.0 + merit(&errors));
        let mut near = self.near(&at, &errors)?;
        let (mut last_step_mm, mut settled) = (0.0, false);
        for _ in 0..MAX_STEPS {
            let excesses = DVector::from_vec(self.unknowns.excesses_mm(&at));
            let total = |errors: &DVector<f64>, excesses: &DVector<f64>| {
                merit(errors)
                    + price * excesses.iter().map(|excess| (excess - FEASIBLE_MM).max(0.0)).sum::<f64>()
            };
            let before = total(&errors, &excesses);
            let Ok(mut change) = step(&near, &errors, &excesses) else { break };
            let (mut accepted, mut flat) = (false, false);
            for halvings in 0..12 {
                let next: Vec<f64> = std::iter::zip(&at, change.iter()).map(|(a, b)| a + b).collect();
                let after = self.errors(&next).ok().filter(|errors| errors.iter().all(|e| e.is_finite()));
                if let Some(after) = after {
                    let excesses = DVector::from_vec(self.unknowns.excesses_mm(&next));
                    let left = total(&after, &excesses);
                    // Rounding may lift the merit by a hair where a whole step ends at the optimum itself.
                    let hair = if halvings == 0 { HAIR } else { flat_share } * (1.0 + before.abs());
                    if left <= before + hair {
                        (at, errors, accepted) = (next, after, true);
                        flat = before - left <= flat_share * (1.0 + before.abs());
                        break;
                    }
                }
                change *= 0.5;
            }
            last_step_mm = if change.is_empty() { 0.0 } else { change.amax() };
            settled = flat || last_step_mm < SETTLED_MM || (!accepted && last_step_mm < 1e2 * SETTLED_MM);
            if !accepted || settled {
                break;
            }
            if last_step_mm > FRESH_MM {
                near = self.near(&at, &errors)?;
            }
        }
        let contacts = self.unknowns.contacts(&at);
        Ok(Found { unknowns: at, contacts, settled, last_step_mm })
    }

    /// Errors of all strings in all cases at their frets, one after the other.
    fn errors(&self, unknowns: &[f64]) -> Result<DVector<f64>, PhysicsError> {
        let mut all = Vec::new();
        for (string, contacts) in std::iter::zip(self.strings, self.unknowns.contacts(unknowns)) {
            for case in string.counted() {
                all.extend(case.string.errors_cents(contacts, &case.frets)?);
            }
        }
        Ok(DVector::from_vec(all))
    }

    /// First derivatives: of every error by its string's contacts (forward differences), and of the contacts and
    /// limits by the unknowns (central differences of plain geometry).
    fn near(&self, at: &[f64], errors: &DVector<f64>) -> Result<Near, PhysicsError> {
        let contacts = self.unknowns.contacts(at);
        let count = at.len();
        let around: Vec<(Vec<Contacts>, Vec<Contacts>)> =
            (0..count).map(|k| self.around(at, k, |place| self.unknowns.contacts(place))).collect();
        let mut slopes = DMatrix::zeros(errors.len(), count);
        let mut row = 0;
        let cases = self.strings.iter().enumerate();
        for (index, case) in cases.flat_map(|(index, string)| string.counted().map(move |case| (index, case)))
        {
            let rows = case.frets.len();
            let own = &errors.as_slice()[row..row + rows];
            let saddle = by_contact(case, contacts[index], own, |c, by| c.saddle_setback_mm += by)?;
            let nut = if self.unknowns.nut_moves() {
                by_contact(case, contacts[index], own, |c, by| c.nut_setback_mm += by)?
            } else {
                vec![0.0; rows]
            };
            for (k, (ahead, behind)) in around.iter().enumerate() {
                let (ahead, behind) = (ahead[index], behind[index]);
                let scale = 0.5 / DIFFERENCE_MM;
                let saddle_by = (ahead.saddle_setback_mm - behind.saddle_setback_mm) * scale;
                let nut_by = (ahead.nut_setback_mm - behind.nut_setback_mm) * scale;
                if saddle_by == 0.0 && nut_by == 0.0 {
                    continue;
                }
                for offset in 0..rows {
                    slopes[(row + offset, k)] = saddle[offset] * saddle_by + nut[offset] * nut_by;
                }
            }
            row += rows;
        }
        let limits = self.unknowns.excesses_mm(at).len();
        let mut limit_slopes = DMatrix::zeros(limits, count);
        for k in 0..count {
            let (ahead, behind) = self.around(at, k, |place| self.unknowns.excesses_mm(place));
            for (limit, (ahead, behind)) in std::iter::zip(&ahead, &behind).enumerate() {
                limit_slopes[(limit, k)] = (ahead - behind) * 0.5 / DIFFERENCE_MM;
            }
        }
        Ok(Near { slopes, limit_slopes })
    }

    fn around<T>(&self, at: &[f64], index: usize, function: impl Fn(&[f64]) -> T) -> (T, T) {
        let mut place = at.to_vec();
        place[index] = at[index] + DIFFERENCE_MM;
        let ahead = function(&place);
        place[index] = at[index] - DIFFERENCE_MM;
        (ahead, function(&place))
    }

    /// The step to the least squares of the linearised errors within the limits, and within a bound on every
    /// error where one is given.
    fn least_squares_step(
        &self,
        near: &Near,
        errors: &DVector<f64>,
        excesses: &DVector<f64>,
        bound_cents: Option<f64>,
    ) -> Result<DVector<f64>, PhysicsError> {
        let mut slopes = near.slopes.clone();
        slopes.column_iter_mut().for_each(|mut column| column.component_mul_assign(&self.root_weights));
        let mut hessian = slopes.tr_mul(&slopes);
        let ridge = 1e-12 * hessian.diagonal().amax().max(1.0);
        for index in 0..hessian.nrows() {
            hessian[(index, index)] += ridge;
        }
        let gradient = slopes.tr_mul(&errors.component_mul(&self.root_weights));
        if bound_cents.is_none()
            && let Some(factor) = Cholesky::new(hessian.clone())
        {
            let free = factor.solve(&-&gradient);
            let after = excesses + &near.limit_slopes * &free;
            if after.iter().all(|excess| *excess <= FEASIBLE_MM) {
                return Ok(free);
            }
        }
        let (rows, limits) = match bound_cents {
            None => (near.limit_slopes.clone(), -excesses),
            Some(bound) => {
                let (rows, mut limits) = both_sides(near, errors, excesses, 0);
                limits.rows_mut(0, 2 * errors.len()).add_scalar_mut(bound);
                (rows, limits)
            }
        };
        let programme = Quadratic { hessian, gradient, rows, limits };
        programme.minimise().or_else(|_| softened(&programme))
    }

    /// The step to the smallest largest linearised error within the limits; one more unknown is that error.
    fn minimax_step(
        &self,
        near: &Near,
        errors: &DVector<f64>,
        excesses: &DVector<f64>,
    ) -> Result<DVector<f64>, PhysicsError> {
        let count = near.slopes.ncols();
        let now = largest(errors);
        let (mut rows, limits) = both_sides(near, errors, excesses, 1);
        rows.view_mut((0, count), (2 * errors.len(), 1)).fill(-1.0);
        let mut gradient = DVector::zeros(count + 1);
        gradient[count] = 1.0;
        let hessian = DMatrix::zeros(count + 1, count + 1);
        let programme = Quadratic { hessian, gradient, rows, limits };
        let step = programme.minimise().or_else(|_| softened(&programme))?;
        // Where nothing is gained the place is kept: ties must not make it wander.
        let overstepped = excesses.iter().any(|excess| *excess > FEASIBLE_MM);
        if !overstepped && now - step[count] < 1e-9 {
            return Ok(DVector::zeros(count));
        }
        Ok(step.rows(0, count).into_owned())
    }
}

/// Rows and limits of ±(errors + slopes·step) ≤ bound and of the travel limits, with room for more unknowns and
/// a bound of zero; and a wide box round every unknown, so that none can run away.
fn both_sides(
    near: &Near,
    errors: &DVector<f64>,
    excesses: &DVector<f64>,
    more: usize,
) -> (DMatrix<f64>, DVector<f64>) {
    const BOX_MM: f64 = 50.0;
    let (count, length, held) = (near.slopes.ncols(), errors.len(), excesses.len());
    let mut rows = DMatrix::zeros(2 * length + held + 2 * count, count + more);
    let mut limits = DVector::from_element(rows.nrows(), BOX_MM);
    rows.view_mut((0, 0), (length, count)).copy_from(&near.slopes);
    rows.view_mut((length, 0), (length, count)).copy_from(&-&near.slopes);
    rows.view_mut((2 * length, 0), (held, count)).copy_from(&near.limit_slopes);
    limits.rows_mut(0, length).copy_from(&-errors);
    limits.rows_mut(length, length).copy_from(errors);
    limits.rows_mut(2 * length, held).copy_from(&-excesses);
    for index in 0..count {
        rows[(2 * length + held + 2 * index, index)] = 1.0;
        rows[(2 * length + held + 2 * index + 1, index)] = -1.0;
    }
    (rows, limits)
}

/// The programme with limits that may be overstepped at a high price: it always has an answer.
fn softened(programme: &Quadratic) -> Result<DVector<f64>, PhysicsError> {
    let price = 1e3 * (10.0 + programme.gradient.amax());
    let (rows, columns) = programme.rows.shape();
    let mut soft = Quadratic {
        hessian: DMatrix::zeros(columns + 1, columns + 1),
        gradient: DVector::zeros(columns + 1),
        rows: DMatrix::zeros(rows + 1, columns + 1),
        limits: DVector::zeros(rows + 1),
    };
    soft.hessian.view_mut((0, 0), (columns, columns)).copy_from(&programme.hessian);
    soft.gradient.rows_mut(0, columns).copy_from(&programme.gradient);
    soft.gradient[columns] = price;
    soft.rows.view_mut((0, 0), (rows, columns)).copy_from(&programme.rows);
    soft.rows.view_mut((0, columns), (rows + 1, 1)).fill(-1.0);
    soft.limits.rows_mut(0, rows).copy_from(&programme.limits);
    Ok(soft.minimise()?.rows(0, columns).into_owned())
}

/// Derivatives of the errors of a case by a contact.
fn by_contact(
    case: &FitCase,
    contacts: Contacts,
    errors: &[f64],
    shift: impl Fn(&mut Contacts, f64),
) -> Result<Vec<f64>, PhysicsError> {
    let shifted = |by: f64| {
        let mut moved = contacts;
        shift(&mut moved, by);
        let slope = |after: Vec<f64>| {
            std::iter::zip(after, errors).map(|(after, before)| (after - before) / by).collect()
        };
        case.string.errors_cents(moved, &case.frets).map(slope)
    };
    shifted(DIFFERENCE_MM).or_else(|_| shifted(-DIFFERENCE_MM))
}

fn largest(errors: &DVector<f64>) -> f64 {
    if errors.is_empty() { 0.0 } else { errors.amax() }
}
