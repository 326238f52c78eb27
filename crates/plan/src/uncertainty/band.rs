//! A quantity over the sample: mean, standard deviation and quantiles.

use serde::Serialize;

/// How one quantity is spread over the sample.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Band {
    /// With the plan's figures.
    pub nominal: f64,
    /// Mean of the sample.
    pub mean: f64,
    /// Standard deviation of the sample.
    pub sd: f64,
    /// Standard deviation to first order, from central differences over one standard deviation of every figure to
    /// both sides: a check of the sample, and of how straight the way from figure to result is.
    pub first_order_sd: f64,
    /// The value that 5 % of the sample stay below.
    pub p05: f64,
    /// The value that half of the sample stay below.
    pub p50: f64,
    /// The value that 95 % of the sample stay below; from `p05` to here reaches the 90 % band.
    pub p95: f64,
}

impl Band {
    /// The band of some values; absent where there are fewer than two.
    pub(super) fn of(mut values: Vec<f64>, nominal: f64, first_order_sd: f64) -> Option<Self> {
        if values.len() < 2 {
            return None;
        }
        let count = values.len() as f64;
        let mean = values.iter().sum::<f64>() / count;
        let squares: f64 = values.iter().map(|value| (value - mean).powi(2)).sum();
        let [p05, p50, p95] = [0.05, 0.5, 0.95].map(|part| quantile(&mut values, part));
        Some(Self { nominal, mean, sd: (squares / (count - 1.0)).sqrt(), first_order_sd, p05, p50, p95 })
    }
}

/// The quantile of unordered values, between two of them by straight interpolation: value k of n, from 0, stands
/// for the part k/(n − 1).
fn quantile(values: &mut [f64], part: f64) -> f64 {
    let place = part * (values.len() - 1) as f64;
    // Between 0 and the last index, so the cast is exact.
    let below = place.floor() as usize;
    let (_, &mut low, above) = values.select_nth_unstable_by(below, f64::total_cmp);
    let high = above.iter().copied().min_by(f64::total_cmp).unwrap_or(low);
    low + (place - below as f64) * (high - low)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn quantiles_of_whole_numbers() {
        // 0 to 100 in a shuffled order: 37 and 101 have no common divisor.
        let values: Vec<f64> = (0..101).map(|k| f64::from(k * 37 % 101)).collect();
        let band = Band::of(values, 50.0, 1.0).unwrap();
        assert_eq!([band.p05, band.p50, band.p95, band.mean], [5.0, 50.0, 95.0, 50.0]);
        // Whole numbers 0 to n − 1 have the variance n(n + 1)/12 with n − 1 degrees of freedom.
        assert!((band.sd - (101.0_f64 * 102.0 / 12.0).sqrt()).abs() < 1e-12);
        assert_eq!(Band::of(vec![3.0, 1.0], 0.0, 0.0).unwrap().p50, 2.0);
        assert_eq!(Band::of(vec![3.0], 0.0, 0.0), None);
    }
}
