//! Which faults a test can find, and whether those are found.
//!
//! The script that makes the instruments states for each fault what the best test of it expects, in standard deviations
//! (`expected_z`), from its own forward model: how the readings change with the fault, against noise and all that a
//! repairer cannot know. A test that calls a fault above a limit then finds it with the probability Phi(expected_z - limit).

use serde_json::Value;
use statrs::function::erf::{erfc, erfc_inv};

use super::{FOUND, Share};

/// How often a sound instrument may be taken for one with a misplaced fret, or with a high slot: the limit that the
/// diagnosis sets itself, so that both stay within 5 in 100.
const FALSE_ALARM: f64 = 0.02;
/// A fault is clear where a test at that limit finds it this often.
const CLEAR: f64 = 0.95;
/// The share of what the best test finds that must be found. Of Gaussian readings the diagnosis, which is made for heavier
/// tails, sees 0.89 of a statistic (the square root of the mean curvature of the t distribution's cost with 4 degrees of
/// freedom): of faults near the limit that is some nine in ten, and of sixty found three more or less are
/// chance, six being two standard deviations.
const OF_THE_BEST: f64 = 0.80;
/// Expected statistics at which the printed bands begin.
const BANDS: [f64; 6] = [0.0, 2.0, 3.0, 4.0, 5.0, f64::INFINITY];

/// What a standard normal number exceeds with this probability.
fn exceeded_by(probability: f64) -> f64 {
    std::f64::consts::SQRT_2 * erfc_inv(2.0 * probability)
}

/// Limit of one test out of so many, of a fault that goes one way or two: each gets an equal part of the false alarms.
pub(super) fn limit(tests: usize, ways: usize) -> f64 {
    exceeded_by(FALSE_ALARM / (tests * ways) as f64)
}

/// Faults of one kind, and which of them were found.
#[derive(Default)]
pub(super) struct Detection {
    clear: Share,
    slight: Share,
    /// Expected statistic of each fault, and whether it was found.
    faults: Vec<(f64, bool)>,
    /// How many the best test finds on average.
    foreseen: f64,
}

impl Detection {
    /// One fault of the truth.
    pub fn add(&mut self, fault: &Value, limit: f64, is_found: bool, place: String) {
        let expected_z = fault["expected_z"].as_f64().expect("an expected statistic");
        let chance = 0.5 * erfc((limit - expected_z) / std::f64::consts::SQRT_2);
        let share = if chance >= CLEAR { &mut self.clear } else { &mut self.slight };
        share.add(is_found, place);
        self.faults.push((expected_z, is_found));
        self.foreseen += chance;
    }

    /// Prints what was found. Nine in ten of the clear faults must be, and of all faults four for every five that the best
    /// test would find.
    pub fn hold(&self, what: &str) {
        self.clear.print(&format!("{what} found, clear ones"));
        self.slight.print(&format!("{what} found, slight ones"));
        for band in BANDS.windows(2) {
            let inside: Vec<bool> = self
                .faults
                .iter()
                .filter(|fault| (band[0]..band[1]).contains(&fault.0))
                .map(|fault| fault.1)
                .collect();
            let found = inside.iter().filter(|&&is_found| is_found).count();
            println!("{what} of {} to {} standard deviations: {found} of {}", band[0], band[1], inside.len());
        }
        let found = self.faults.iter().filter(|fault| fault.1).count();
        println!("{what}: {found} found, {:.1} by the best test", self.foreseen);
        assert!(self.clear.count() > 0, "no clear fault: {what}");
        assert!(self.clear.value() >= FOUND, "{what}, clear: {}", self.clear.value());
        assert!(found as f64 >= OF_THE_BEST * self.foreseen, "{what}: {found} of {}", self.foreseen);
    }
}
