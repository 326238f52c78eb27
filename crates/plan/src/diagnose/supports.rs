//! How firmly nut, frets and saddle hold the strings, fitted across the strings of an instrument with measured crests.

use crestline_physics::diagnose::{Estimate, FoundFixities, Priors, fit_fixities};
use serde::Serialize;

use super::{cases, not_found, some_fretted};
use crate::{Checked, Fault, Notice, Plan, Severity, Supports};

/// Prior standard deviation of every fixity: that of a value anywhere from 0, pinned, to 1, clamped, is 1/√12.
const FIXITY_SD: f64 = 0.29;
/// Share of its prior standard deviation below which the readings have decided a value: three quarters of its variance
/// are gone by then.
const DECIDED: f64 = 0.5;

/// How firmly the supports hold.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SupportsFit {
    /// Always `crestline-supports`.
    pub format: &'static str,
    /// Version of the report.
    pub version: u64,
    /// The three fixities: nut, fret, saddle.
    pub supports: Vec<FixityReport>,
    /// Sums of them: those that the readings decide before the one that they cannot.
    pub combinations: Vec<FixityReport>,
    /// What the user should know about the result.
    pub notices: Vec<Notice>,
}

/// A fixity or a sum of fixities.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct FixityReport {
    /// What it is, such as `nut` or `2 fret + saddle - nut`.
    pub name: &'static str,
    /// Why it matters, in words; empty for a single fixity.
    pub meaning: &'static str,
    /// What the plan says.
    pub planned: f64,
    /// The most probable value.
    pub value: f64,
    /// Its standard deviation.
    pub sd: f64,
    /// Its standard deviation before anything was read.
    pub prior_sd: f64,
    /// Whether the readings decide it.
    pub decided: bool,
}

/// Name, meaning, and how often nut, fret and saddle count in it.
type Sum = (&'static str, &'static str, [f64; 3]);

const SINGLE: [Sum; 3] =
    [("nut", "", [1.0, 0.0, 0.0]), ("fret", "", [0.0, 1.0, 0.0]), ("saddle", "", [0.0, 0.0, 1.0])];
const COMBINED: [Sum; 4] = [
    ("2 fret + saddle - nut", "bending lengths that a setback makes up at the octave", [-1.0, 2.0, 1.0]),
    ("fret + saddle", "errors that grow along the neck, as the crest's do", [0.0, 1.0, 1.0]),
    ("fret - nut", "errors that are the same at every fret, as the nut edge's are", [-1.0, 1.0, 0.0]),
    ("nut + fret - saddle", "to first order no fretted note depends on it", [1.0, 1.0, -1.0]),
];

/// Fits the fixities that all strings share to the readings of an instrument whose crests and nut edges were measured:
/// the most probable ones, with everything else that a diagnosis looks for free beside them.
///
/// What readings decide are two sums of the three, see [`SupportsFit::combinations`]; [`Plan::with_supports`] takes the
/// result over, and the setbacks that follow from it rest on those two alone.
///
/// # Errors
/// `as_built` where the plan does not say where the crests are, for then a firmer end and a nearer crest are the
/// same; otherwise as [`diagnose`](super::diagnose).
pub fn fit_supports(checked: &Checked, priors: &Priors) -> Result<SupportsFit, Vec<Fault>> {
    let plan = checked.plan();
    let mut faults = some_fretted(plan).err().unwrap_or_default();
    if plan.as_built.is_none() {
        let allowed = "measured places of crests and nut edges: without them a firmer end cannot be told from a crest \
                       that stands nearer";
        faults.push(Fault::new("as_built", "nothing", allowed));
    }
    if !faults.is_empty() {
        return Err(faults);
    }
    let cases = cases::cases(checked)?;
    let found = fit_fixities(&cases.strings, priors, FIXITY_SD).map_err(not_found)?;
    let planned = [plan.supports.nut, plan.supports.fret, plan.supports.saddle];
    let report = |sums: &[Sum]| -> Vec<FixityReport> {
        sums.iter().map(|sum| fixity_report(&found, planned, *sum)).collect()
    };
    let (supports, combinations) = (report(&SINGLE), report(&COMBINED));
    let notices = notices(&found, &combinations);
    Ok(SupportsFit { format: "crestline-supports", version: 1, supports, combinations, notices })
}

fn fixity_report(found: &FoundFixities, planned: [f64; 3], (name, meaning, times): Sum) -> FixityReport {
    let Estimate { value, sd } = found.sum(times);
    let prior_sd = FIXITY_SD * times.iter().map(|times| times * times).sum::<f64>().sqrt();
    FixityReport {
        name,
        meaning,
        planned: std::iter::zip(times, planned).map(|(times, planned)| times * planned).sum(),
        value,
        sd,
        prior_sd,
        decided: sd < DECIDED * prior_sd,
    }
}

fn notices(found: &FoundFixities, combinations: &[FixityReport]) -> Vec<Notice> {
    let mut notices = Vec::new();
    let mut say = |severity, path: String, text: String| notices.push(Notice { severity, path, text });
    for (index, _) in found.suspects.iter().enumerate().filter(|(_, suspect)| **suspect) {
        let text = format!("string {} is explained by no setup and hardly counted", index + 1);
        say(Severity::Warning, format!("strings[{index}]"), text);
    }
    if combinations.iter().all(|sum| !sum.decided) {
        let text = "the readings decide none of the fixities: more strings, of different thickness, or closer measured \
                    crests would";
        say(Severity::Warning, "readings".to_owned(), text.to_owned());
    }
    let ends = [found.fixities.nut, found.fixities.fret, found.fixities.saddle];
    for ((name, ..), _) in SINGLE.iter().zip(ends).filter(|(_, end)| *end <= 0.0 || *end >= 1.0) {
        let text = format!("the fixity of the {name} ended at its limit; something else may hide in it");
        say(Severity::Note, format!("supports.{name}"), text);
    }
    if !found.settled {
        let text = "the search did not quite come to rest; the figures are the best that it reached";
        say(Severity::Warning, "readings".to_owned(), text.to_owned());
    }
    notices
}

impl Plan {
    /// This plan with the fixities that were fitted in its `supports`. Where the readings decide only sums of them
    /// the single values lie as near to the plan's own as those sums let them.
    #[must_use]
    pub fn with_supports(&self, fit: &SupportsFit) -> Self {
        let mut plan = self.clone();
        if let [nut, fret, saddle] = &fit.supports[..] {
            plan.supports = Supports { nut: nut.value, fret: fret.value, saddle: saddle.value };
        }
        plan
    }
}
