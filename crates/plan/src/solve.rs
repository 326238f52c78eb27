//! From a checked plan to its [`Solution`].
//!
//! [`prepare`] hands the plan to the physics; [`fit`] finds the setbacks; the rest puts
//! figures, layout and notices together. [`crate::compare`] shares the first.

mod alternatives;
mod layout;
mod notices;
mod prepare;
mod report;

use crestline_physics::PhysicsError;
use crestline_physics::fit::{FitOptions, Setbacks, built_setbacks, ideal_setbacks};

use crate::{Checked, Fault, Solution};
pub(crate) use prepare::{
    Prepared, PreparedString, core as physics_core, fault, fit_options, prepare, prepare_own,
};
pub(crate) use report::{Squares, left_over_of};

/// Ideal and built setbacks for one pair of styles.
struct Fitted {
    ideal: Setbacks,
    built: Setbacks,
}

/// Solves a checked plan.
///
/// # Errors
/// A fault that only the computation can find, such as a pitch that the string's stiffness alone exceeds.
pub fn solve(checked: &Checked) -> Result<Solution, Vec<Fault>> {
    let prepared = prepare(checked)?;
    let plan = checked.plan();
    let options = fit_options(plan, plan.saddle.style, plan.nut.style);
    let fitted = fit(&prepared, &options)?;
    let mut report = report::report(checked, &prepared, &fitted)?;
    report.alternatives = alternatives::alternatives(checked, &prepared, &fitted, &options)?;
    report.notices = notices::notices(checked, &prepared, &fitted, &report);
    let layout = layout::layout(checked, &prepared, &fitted);
    Ok(Solution { report, layout })
}

/// Finds ideal and built setbacks.
fn fit(prepared: &Prepared, options: &FitOptions) -> Result<Fitted, Vec<Fault>> {
    let strings = prepared.fit_strings();
    let ideal = ideal_setbacks(&strings, options).map_err(no_setbacks)?;
    let built = built_setbacks(&strings, options, &ideal).map_err(no_setbacks)?;
    Ok(Fitted { ideal, built })
}

/// The fault of a plan whose setbacks cannot be worked out.
pub(crate) fn no_setbacks(error: PhysicsError) -> Vec<Fault> {
    vec![Fault::new("strings", error.to_string(), "figures for which the setbacks can be worked out")]
}
