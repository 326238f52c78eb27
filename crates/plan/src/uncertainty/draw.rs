//! Quasi-random draws: an Owen-scrambled Sobol sequence mapped to standard normal numbers.
//!
//! I. M. Sobol, USSR Comput. Math. Math. Phys. 7 (1967) 86; A. B. Owen, Ann. Statist. 25 (1997) 1541; scrambling by
//! B. Burley, J. Comput. Graph. Tech. 9(4) (2020). The same index, axis and seed give the same number on every
//! machine, so a sample does not depend on the threads that share its work.

use std::f64::consts::SQRT_2;

use sobol_burley::sample;
use statrs::function::erf::erfc_inv;

use super::axes::{FRETS, OWN, SHARED};

/// Half the step of the sequence's numbers, 2⁻²⁴: with it none of them is 0, whose normal number would be infinite.
const HALF_STEP: f64 = 1.0 / (1 << 25) as f64;

/// A uniform number between 0 and 1, neither of them reached.
pub(super) fn uniform(index: u32, dimension: u32, seed: u32) -> f64 {
    f64::from(sample(index, dimension, seed)) + HALF_STEP
}

/// A standard normal number, by the inverse of its distribution.
fn normal(index: u32, dimension: usize, seed: u32) -> f64 {
    // A plan with the most strings and frets has 206 dimensions, so the cast is exact.
    -SQRT_2 * erfc_inv(2.0 * uniform(index, dimension as u32, seed))
}

/// The draw of one string of a plan of `strings` strings with `frets` frets. Shared numbers come first, where the
/// sequence is best, then every string's own, then the frets.
pub(super) fn draw(index: u32, seed: u32, string: usize, strings: usize, frets: usize) -> Vec<f64> {
    let own = SHARED + OWN * string;
    let fret = SHARED + OWN * strings;
    let dimension = |axis: usize| match axis {
        0..OWN => own + axis,
        OWN..FRETS => axis - OWN,
        _ => fret + axis - FRETS,
    };
    (0..FRETS + frets).map(|axis| normal(index, dimension(axis), seed)).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn draws_are_standard_normal_and_shared_where_they_are_shared() {
        // With 1024 points of a net the mean of a coordinate is off by less than 1/1024 of its spread, some 3; the
        // mean square loses what lies beyond the outermost 1/1024.
        const OFF: f64 = 0.02;
        let draws: Vec<Vec<f64>> = (0..1024).map(|index| draw(index, 7, 2, 6, 20)).collect();
        for axis in 0..FRETS + 20 {
            let mean = draws.iter().map(|draw| draw[axis]).sum::<f64>() / 1024.0;
            let square = draws.iter().map(|draw| draw[axis].powi(2)).sum::<f64>() / 1024.0;
            assert!(mean.abs() < OFF && (square - 1.0).abs() < OFF, "{axis}: {mean} {square}");
        }
        let other = draw(5, 7, 3, 6, 20);
        assert!(draws[5][..OWN].iter().zip(&other).all(|(one, other)| one != other));
        assert_eq!(draws[5][OWN..], other[OWN..]);
        assert_ne!(draws[5], draw(5, 8, 2, 6, 20));
    }
}
