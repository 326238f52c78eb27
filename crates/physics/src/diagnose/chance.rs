//! How far something must stand out before chance is ruled out.
//!
//! A test that calls a fault where its statistic, normal about 0 with a standard deviation of 1 when nothing is wrong,
//! exceeds a limit is wrong as often as the normal distribution says. Where several things are tested each gets an equal
//! part of the chance, so that any of them is called wrongly no more often than all together may be. Once one is found the
//! instrument is no sound one, and what counts is that few of the faults called are none: with k found the next one gets
//! k + 1 parts (Y. Benjamini and Y. Hochberg, J. R. Stat. Soc. B 57 (1995) 289).

/// How often chance alone may make one kind of fault, misplaced frets or high slots, of a sound instrument. A diagnosis
/// should leave 95 of 100 sound instruments alone; two kinds with 2 in 100 each stay within that, with room for remedies
/// that no limit here governs.
const FALSE_ALARM: f64 = 0.02;

/// Limit of the next test out of `tests` after `found` of them called a fault, which may go `ways` ways (1 or 2), in
/// standard deviations.
pub(super) fn limit(tests: usize, ways: usize, found: usize) -> f64 {
    exceeded_by(FALSE_ALARM * (found + 1) as f64 / (tests.max(1) * ways) as f64)
}

/// What a normal number with mean 0 and standard deviation 1 exceeds with this probability, 1e-12 to ½; off by less than
/// 4.5e-4 (M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions, 26.2.23).
fn exceeded_by(probability: f64) -> f64 {
    let t = (-2.0 * probability.clamp(1e-12, 0.5).ln()).sqrt();
    let above = 2.515_517 + t * (0.802_853 + t * 0.010_328);
    let below = 1.0 + t * (1.432_788 + t * (0.189_269 + t * 0.001_308));
    t - above / below
}

#[cfg(test)]
mod tests {
    use super::*;

    /// What Abramowitz and Stegun state for their approximation.
    const OFF: f64 = 4.5e-4;

    #[test]
    fn limits_are_those_of_the_normal_table() {
        // Upper quantiles of the normal distribution, six digits (any table; from memory).
        for (probability, quantile) in
            [(0.05, 1.644_854), (0.01, 2.326_348), (0.001, 3.090_232), (1e-6, 4.753_424)]
        {
            assert!((exceeded_by(probability) - quantile).abs() < OFF, "{probability}");
        }
    }

    #[test]
    fn more_tests_and_more_ways_ask_for_more() {
        assert!(limit(10, 1, 0) > limit(1, 1, 0) && limit(10, 2, 0) > limit(10, 1, 0));
        assert!((limit(5, 2, 0) - limit(10, 1, 0)).abs() < f64::EPSILON);
        assert!((limit(10, 1, 1) - limit(5, 1, 0)).abs() < f64::EPSILON);
    }
}
