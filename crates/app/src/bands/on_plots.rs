//! The bands that the plots of the page `Saddle` show.

use crestline_plan::{Band, FretUncertainty};
use eframe::egui::Context;

use super::state::Trust;
use crate::edit::desk::Outcome;

/// A 90 % band: the ends between which nine of ten instruments lie.
pub type Ends = [f64; 2];

/// The bands of a plan's strings, string 1 first.
#[derive(Debug, Clone, PartialEq)]
pub struct OnPlots {
    strings: Vec<StringBands>,
}

#[derive(Debug, Clone, PartialEq)]
struct StringBands {
    setback_mm: Option<Ends>,
    /// One a fret; none before the sample is there, and where a note buzzes.
    errors_cents: Vec<Option<Ends>>,
}

impl OnPlots {
    /// The bands of a plan that has tolerances, where they are to be shown: those of the sample as soon as it says
    /// anything, and for the setbacks those to first order until then.
    pub fn of(ctx: &Context, outcome: &Outcome, trust: &mut Trust) -> Option<Self> {
        if !trust.on_plots || outcome.plan.tolerances.is_none() {
            return None;
        }
        trust.sampling.follow(ctx, &outcome.plan, false);
        let found = trust.sampling.found().filter(|found| found.is_of(&outcome.plan));
        let strings = outcome.solution.report.strings.iter().enumerate().map(|(index, string)| {
            let sampled = found.and_then(|found| found.uncertainty.strings.get(index));
            let ideal_mm = string.ideal.saddle_setback_mm;
            let to_first_order = string.plus_minus_mm.map(|half_mm| [ideal_mm - half_mm, ideal_mm + half_mm]);
            // The sample is of the plan's own strings; an ideal shared with other sets lies elsewhere, as surely known.
            let about_ideal =
                |band: Band| [band.p05, band.p95].map(|end_mm| end_mm - band.nominal + ideal_mm);
            let band = sampled.and_then(|sampled| sampled.saddle_setback_mm);
            let error = |fret: &FretUncertainty| fret.error_cents.map(|band| [band.p05, band.p95]);
            StringBands {
                setback_mm: band.map(about_ideal).or(to_first_order),
                errors_cents: sampled.map_or_else(Vec::new, |s| s.frets.iter().map(error).collect()),
            }
        });
        Some(Self { strings: strings.collect() })
    }

    /// The band of a string's ideal saddle setback, mm; the string is counted from 0.
    #[must_use]
    pub fn setback_mm(&self, string: usize) -> Option<Ends> {
        self.strings.get(string)?.setback_mm
    }

    /// The band of the error as built at a fret, cents; string and fret are counted from 0.
    #[must_use]
    pub fn error_cents(&self, string: usize, fret: usize) -> Option<Ends> {
        self.strings.get(string)?.errors_cents.get(fret).copied().flatten()
    }
}
