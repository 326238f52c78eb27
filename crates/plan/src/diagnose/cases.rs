//! The plan and its readings as the physics sees them.

use crestline_physics::Contacts;
use crestline_physics::diagnose::{Measurement, Sounded, StringCase};
use crestline_physics::fit::{FitRule, ideal_setbacks};
use crestline_physics::neck::PlanLine;

use crate::solve::{fit_options, no_setbacks, prepare_own};
use crate::{Checked, Fault, Plan, Reading, ReadingKind, SaddleStyle};

/// Every string with its readings.
pub(super) struct Cases {
    pub strings: Vec<StringCase>,
    pub lines: Vec<PlanLine>,
    /// For every string the indices of its readings in the plan.
    pub readings: Vec<Vec<usize>>,
}

/// Makes the strings of a checked plan ready. Where the plan does not say where the crests are, they are expected
/// where its strings want them: a maker will have tried. Readings are of the plan's own strings, whatever alternatives it
/// names.
pub(super) fn cases(checked: &Checked) -> Result<Cases, Vec<Fault>> {
    let prepared = prepare_own(checked)?;
    let plan = checked.plan();
    let mut options = fit_options(plan, SaddleStyle::Separate, plan.nut.style);
    options.rule = FitRule::LeastSquares;
    let right = ideal_setbacks(&prepared.fit_strings(), &options).map_err(no_setbacks)?.contacts;
    let readings: Vec<Vec<usize>> = (0..plan.strings.len())
        .map(|string| {
            let own = |reading: &Reading| reading.string as usize == string + 1;
            (0..plan.readings.len()).filter(|&index| own(&plan.readings[index])).collect()
        })
        .collect();
    let strings = prepared
        .strings
        .iter()
        .enumerate()
        .map(|(string, ready)| StringCase {
            setup: ready.string.setup().clone(),
            contacts: expected(plan, string).unwrap_or(right[string]),
            is_measured: plan.as_built.is_some(),
            right: right[string],
            readings: readings[string].iter().map(|&index| measurement(&plan.readings[index])).collect(),
        })
        .collect();
    let lines = prepared.strings.iter().map(|ready| ready.line).collect();
    Ok(Cases { strings, lines, readings })
}

fn expected(plan: &Plan, string: usize) -> Option<Contacts> {
    let built = plan.as_built.as_ref()?;
    Some(Contacts {
        saddle_setback_mm: *built.saddle_setback_mm.get(string)?,
        nut_setback_mm: *built.nut_setback_mm.get(string)?,
    })
}

fn measurement(reading: &Reading) -> Measurement {
    let sounded = match reading.kind {
        ReadingKind::Open => Sounded::Open,
        ReadingKind::OctaveHarmonic => Sounded::OctaveHarmonic,
        ReadingKind::Fretted => Sounded::Fretted((reading.fret as usize).saturating_sub(1)),
    };
    Measurement { sounded, cents: reading.cents }
}
