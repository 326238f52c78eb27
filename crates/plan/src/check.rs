//! From a [`Plan`] that may be wrong to a [`Checked`] one, or to every fault with its path.
//!
//! Each value is held against its range in [`limits`](crate::limits) first. Conditions that need several values
//! are looked at only where all of them are sound, so that one slip of the pen is named once.

mod alternatives;
mod checker;
mod making;
mod neck;
mod notices;
mod open_string;
mod readings;
mod strings;
mod tolerances;

use crestline_physics::neck::Neck;

use crate::{Fault, Notice, Plan};
use checker::Checker;

/// A plan that is known to be legal; made by [`check`] only.
#[derive(Debug, Clone, PartialEq)]
pub struct Checked {
    plan: Plan,
    neck: Neck,
    frequencies_hz: Vec<f64>,
    notices: Vec<Notice>,
    alternatives: Vec<Checked>,
}

impl Checked {
    /// The plan.
    #[must_use]
    pub fn plan(&self) -> &Plan {
        &self.plan
    }

    /// The neck laid out in plan, with every string's scale and crown positions.
    #[must_use]
    pub fn neck(&self) -> &Neck {
        &self.neck
    }

    /// Pitch of every open string, string 1 first, Hz.
    #[must_use]
    pub fn frequencies_hz(&self) -> &[f64] {
        &self.frequencies_hz
    }

    /// What is allowed but unusual, and may be a slip.
    #[must_use]
    pub fn notices(&self) -> &[Notice] {
        &self.notices
    }

    /// The plan as it is with each of its alternatives for its own strings.
    #[must_use]
    pub fn alternatives(&self) -> &[Self] {
        &self.alternatives
    }
}

/// Checks every value of a plan.
///
/// # Errors
/// All faults, each with its path, what was found and what is allowed.
pub fn check(plan: &Plan) -> Result<Checked, Vec<Fault>> {
    let mut checker = Checker::new(&[]);
    let sound = look_through(plan, &mut checker);
    let faults = checker.into_faults();
    match sound {
        Some(checked) if faults.is_empty() => Ok(checked),
        _ => Err(faults),
    }
}

/// All faults of a plan but for those at or under the paths in `unread`, whose values are stand-ins.
pub(crate) fn faults_beside(plan: &Plan, unread: &[String]) -> Vec<Fault> {
    let mut checker = Checker::new(unread);
    look_through(plan, &mut checker);
    checker.into_faults()
}

/// Finds every fault; gives what a checked plan holds where its neck and pitches can be told.
fn look_through(plan: &Plan, checker: &mut Checker) -> Option<Checked> {
    making::pressing_and_ends(checker, plan);
    neck::instrument(checker, &plan.instrument, plan.strings.len());
    let frequencies_hz = strings::strings(checker, plan);
    let alternatives = alternatives::alternatives(checker, plan);
    making::fit(checker, plan);
    making::targets(checker, plan);
    making::saddle(checker, plan);
    making::nut(checker, plan);
    making::as_built(checker, plan);
    readings::readings(checker, plan);
    tolerances::tolerances(checker, plan);
    let neck = neck::lay_out(checker, &plan.instrument, plan.strings.len())?;
    open_string::clearances(checker, plan, &neck);
    making::contacts(checker, plan, &neck);
    let frequencies_hz = frequencies_hz?;
    let mut notices = notices::notices(plan);
    notices.extend(alternatives.iter().flat_map(|alternative| alternative.notices.clone()));
    Some(Checked { plan: plan.clone(), neck, frequencies_hz, notices, alternatives })
}

#[cfg(test)]
mod tests;
