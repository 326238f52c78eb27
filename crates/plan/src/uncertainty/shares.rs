//! Which inputs the spread of the ideal setbacks comes from.
//!
//! Linear shares from first-order propagation, and Sobol indices of groups of inputs: first-order index by
//! A. Saltelli et al., Comput. Phys. Commun. 181 (2010) 259, total index by M. J. W. Jansen, Comput. Phys. Commun. 117
//! (1999) 35; the total index is due to T. Homma and A. Saltelli, Reliab. Eng. Syst. Saf. 52 (1996) 1.
//!
//! For the whole saddle a share is the sum of the strings' variances that come from an input over the sum of their
//! variances: the generalised index of several outputs (M. Lamboni, H. Monod and D. Makowski, Reliab. Eng. Syst. Saf.
//! 96 (2011) 450).

use crestline_physics::PhysicsError;
use rayon::prelude::*;
use serde::Serialize;

use super::axes::{Input, is_making};
use super::draw::draw;
use super::model::StringModel;
use super::models::{Models, too_wide};
use crate::solve::fitted_models;
use crate::{Checked, Fault, Tolerances};

/// Draws of each of the two independent sets. With so many a first-order index has a standard error of about 0.03.
const DRAWS: u32 = 1024;
/// Difference of the linear from the sampled index up to which the linear one, which has no sampling error, is taken:
/// two standard errors.
const AGREES: f64 = 0.06;
/// Total index above which an input is one that most comes from.
const MOSTLY: f64 = 0.5;
/// What makes the second set's seed different from the first's.
const SECOND_SET: u32 = 0x9E37_79B9;
/// Half-width of the 90 % band of a normal quantity in standard deviations.
pub(crate) const HALF_BAND: f64 = 1.644_853_626_951_472_7;

/// Shares of all strings.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Shares {
    /// Half-width of the 90 % band of the ideal saddle setbacks, root mean square over the strings, mm.
    pub plus_minus_mm: f64,
    /// For the whole saddle, the largest gain first.
    pub whole: Vec<Share>,
    /// One entry a string, string 1 first.
    pub strings: Vec<StringShares>,
}

/// Shares of one string.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct StringShares {
    /// String number, 1 first.
    pub string: u32,
    /// Half-width of the 90 % band of its ideal saddle setback, mm: 1.645 standard deviations.
    pub plus_minus_mm: f64,
    /// The largest gain first.
    pub shares: Vec<Share>,
}

/// What comes from one input.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Share {
    /// The input.
    pub input: Input,
    /// Its part of the variance to first order.
    pub linear: f64,
    /// First-order Sobol index: the part of the variance that goes, on average, once it is known.
    pub first_order: f64,
    /// Total Sobol index: the part of the variance that is left, on average, where all others are known.
    pub total: f64,
    /// By how much the half-width of the 90 % band shrinks once it is known exactly, mm: ±(1 − √(1 − S)), S the
    /// linear share where it agrees with the first-order index within 0.06, and that index otherwise.
    pub gain_mm: f64,
}

impl Share {
    /// The part of the variance that goes, on average, once the input is known: the linear share where it agrees with
    /// the first-order index, and that index otherwise; 0 to 1.
    #[must_use]
    pub fn known(&self) -> f64 {
        let agrees = (self.linear - self.first_order).abs() <= AGREES;
        if agrees { self.linear } else { self.first_order }.clamp(0.0, 1.0)
    }
}

/// Sampled variances of one string.
struct Variances {
    linear: f64,
    sampled: f64,
    /// Of every input that matters: from it to first order by straight lines, first-order and total by the sample.
    inputs: Vec<(Input, [f64; 3])>,
}

/// Shares of the spread of every string's ideal saddle setback, and of the whole saddle's.
///
/// # Errors
/// As [`uncertainty`](super::uncertainty).
pub fn shares(checked: &Checked) -> Result<Shares, Vec<Fault>> {
    let models = fitted_models(checked)?;
    let found: Vec<Variances> = (0..models.strings.len())
        .map(|index| variances(&models, index).map_err(|error| vec![too_wide(index, &error)]))
        .collect::<Result<_, _>>()?;
    let number = |index: usize| u32::try_from(index + 1).unwrap_or(u32::MAX);
    let strings = found
        .iter()
        .enumerate()
        .map(|(index, own)| StringShares {
            string: number(index),
            plus_minus_mm: HALF_BAND * own.sampled.sqrt(),
            shares: ranked(std::slice::from_ref(own)),
        })
        .collect();
    let mean = found.iter().map(|own| own.sampled).sum::<f64>() / found.len() as f64;
    Ok(Shares { plus_minus_mm: HALF_BAND * mean.sqrt(), whole: ranked(&found), strings })
}

/// Shares of some strings together, the largest gain first; inputs that change nothing are left out.
fn ranked(strings: &[Variances]) -> Vec<Share> {
    let sum = |of: &dyn Fn(&Variances) -> f64| strings.iter().map(of).sum::<f64>();
    let (linear, sampled) = (sum(&|own| own.linear), sum(&|own| own.sampled));
    let plus_minus_mm = HALF_BAND * (sampled / strings.len() as f64).sqrt();
    let mut shares: Vec<Share> = Input::ALL
        .into_iter()
        .filter(|input| strings.iter().any(|own| own.inputs.iter().any(|(own, _)| own == input)))
        .map(|input| {
            let part = |which: usize| {
                let own = |own: &Variances| {
                    own.inputs.iter().find(|(of, _)| *of == input).map_or(0.0, |(_, v)| v[which])
                };
                sum(&own)
            };
            let (linear, first_order, total) = (part(0) / linear, part(1) / sampled, part(2) / sampled);
            let share = Share { input, linear, first_order, total, gain_mm: 0.0 };
            Share { gain_mm: plus_minus_mm * (1.0 - (1.0 - share.known()).sqrt()), ..share }
        })
        .collect();
    shares.sort_by(|a, b| b.gain_mm.total_cmp(&a.gain_mm));
    shares
}

fn variances(models: &Models, index: usize) -> Result<Variances, PhysicsError> {
    let (model, order) = (&models.strings[index], &models.first_order[index]);
    let squares = |input: Input| -> f64 {
        let of = |axis: &usize| Input::of_axis(*axis) == input && !is_making(*axis);
        (0..model.axes()).filter(of).map(|axis| order.ideal[axis].saddle_setback_mm.powi(2)).sum()
    };
    // Differences below this come from the search, which stops at 2e-4 mm, and say nothing.
    const NOTHING_MM2: f64 = 1e-8;
    let inputs: Vec<Input> = Input::ALL.into_iter().filter(|input| squares(*input) > NOTHING_MM2).collect();
    let linear = order.saddle_sd_mm().powi(2);
    if inputs.is_empty() {
        return Ok(Variances { linear: 1.0, sampled: 0.0, inputs: Vec::new() });
    }
    let columns = columns(model, &models.tolerances, &inputs);
    let (a, b) = (&columns[0], &columns[1]);
    let found = indices(a, b, &columns[2..]);
    let parts = std::iter::zip(&inputs, found.parts)
        .map(|(input, [first, total])| (*input, [squares(*input), first, total]))
        .collect();
    Ok(Variances { linear, sampled: found.variance, inputs: parts })
}

/// Ideal saddle setbacks for both sets of draws, and for the first with each input in turn from the second.
fn columns(model: &StringModel, tolerances: &Tolerances, inputs: &[Input]) -> Vec<Vec<f64>> {
    let frets = model.figures.setup.fret_mm.len();
    let rows: Vec<Option<Vec<f64>>> = (0..DRAWS)
        .into_par_iter()
        .map(|index| {
            let first = draw(index, tolerances.seed, 0, 1, frets);
            let second = draw(index, tolerances.seed ^ SECOND_SET, 0, 1, frets);
            let setback = |draw: &[f64]| Some(model.ideal_of(draw, tolerances).ok()?.saddle_setback_mm);
            let mut row = vec![setback(&first)?, setback(&second)?];
            for input in inputs {
                let mut mixed = first.clone();
                for (axis, value) in mixed.iter_mut().enumerate() {
                    if Input::of_axis(axis) == *input {
                        *value = second[axis];
                    }
                }
                row.push(setback(&mixed)?);
            }
            Some(row)
        })
        .collect();
    (0..inputs.len() + 2).map(|column| rows.iter().flatten().map(|row| row[column]).collect()).collect()
}

/// Variance of a function, and the parts of it that Sobol indices are made of.
struct Indices {
    variance: f64,
    /// First-order and total part of each input.
    parts: Vec<[f64; 2]>,
}

/// From values at two independent sets of points, `a` and `b`, and at points of `a` with one input from `b` each.
/// Total: half the mean of (f(a) − f(ab))². First order: mean of f(b)·(f(ab) − f(a)), with the mean taken off f, which
/// changes no expectation and much noise; for an input that most comes from, M. J. W. Jansen's variance less half the
/// mean of (f(b) − f(ab))², whose noise goes with what comes from the others.
fn indices(a: &[f64], b: &[f64], mixed: &[Vec<f64>]) -> Indices {
    let count = a.len().max(1) as f64;
    let mean = a.iter().chain(b).sum::<f64>() / (2.0 * count);
    let variance = a.iter().chain(b).map(|value| (value - mean).powi(2)).sum::<f64>() / (2.0 * count);
    let part = |ab: &Vec<f64>| {
        let half_square = |set: &[f64]| {
            0.5 * std::iter::zip(set, ab).map(|(own, ab)| (own - ab).powi(2)).sum::<f64>() / count
        };
        let total = half_square(a);
        if total > MOSTLY * variance {
            return [variance - half_square(b), total];
        }
        let first: f64 = (0..ab.len()).map(|k| (b[k] - mean) * (ab[k] - a[k])).sum();
        [first / count, total]
    };
    Indices { variance, parts: mixed.iter().map(part).collect() }
}

#[cfg(test)]
mod tests {
    use std::f64::consts::PI;

    use super::*;
    use crate::uncertainty::draw::uniform;

    /// sin x + 7 sin² y + 0.1 z⁴ sin x, every argument uniform from −π to π: T. Ishigami and T. Homma, Proc. First
    /// Int. Symp. on Uncertainty Modeling and Analysis (1990) 398, with a = 7 and b = 0.1.
    fn ishigami([x, y, z]: [f64; 3]) -> f64 {
        x.sin() + 7.0 * y.sin().powi(2) + 0.1 * z.powi(4) * x.sin()
    }

    #[test]
    fn indices_of_the_function_of_ishigami_and_homma() {
        // Computed from the closed form: V = a²/8 + bπ⁴/5 + b²π⁸/18 + 1/2, V₁ = ½(1 + bπ⁴/5)², V₂ = a²/8,
        // V₁₃ = b²π⁸(1/18 − 1/50).
        const FIRST: [f64; 3] = [0.3139, 0.4424, 0.0];
        const TOTAL: [f64; 3] = [0.5576, 0.4424, 0.2437];
        // The sample tells its own standard error; four of them are passed by one sound estimate in 16000. An error
        // of more than 0.01 would tell little.
        const ERRORS: f64 = 4.0;
        const MOST: f64 = 0.01;
        let point =
            |index: u32, seed: u32| [0, 1, 2].map(|axis| PI * (2.0 * uniform(index, axis, seed) - 1.0));
        let points: Vec<_> = (0..32_768).map(|index| (point(index, 1), point(index, 2))).collect();
        let a: Vec<f64> = points.iter().map(|(a, _)| ishigami(*a)).collect();
        let b: Vec<f64> = points.iter().map(|(_, b)| ishigami(*b)).collect();
        let mixed = [0, 1, 2].map(|input| {
            let mix = |(a, b): &([f64; 3], [f64; 3])| {
                let mut point = *a;
                point[input] = b[input];
                ishigami(point)
            };
            points.iter().map(mix).collect::<Vec<f64>>()
        });
        let found = indices(&a, &b, &mixed);
        let mean = a.iter().sum::<f64>() / a.len() as f64;
        for (input, [first, total]) in found.parts.iter().enumerate() {
            let ab = &mixed[input];
            let firsts: Vec<f64> = if TOTAL[input] > MOSTLY {
                (0..a.len()).map(|k| found.variance - 0.5 * (b[k] - ab[k]).powi(2)).collect()
            } else {
                (0..a.len()).map(|k| (b[k] - mean) * (ab[k] - a[k])).collect()
            };
            let totals: Vec<f64> = (0..a.len()).map(|k| 0.5 * (a[k] - ab[k]).powi(2)).collect();
            for (terms, part, expected) in [(firsts, first, FIRST[input]), (totals, total, TOTAL[input])] {
                let scatter = terms.iter().map(|term| (term - part).powi(2)).sum::<f64>().sqrt();
                let error = scatter / terms.len() as f64 / found.variance;
                let index = part / found.variance;
                assert!(error < MOST, "input {input}: standard error {error}");
                assert!((index - expected).abs() <= ERRORS * error + 5e-5, "input {input}: {index}");
            }
        }
    }
}
