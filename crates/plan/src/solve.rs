//! From a checked plan to its [`Solution`].
//!
//! [`prepare`] hands the plan to the physics; [`built`] finds the setbacks for a pair of styles; the rest puts
//! figures, layout and notices together. [`crate::compare`] shares the first two.

mod layout;
mod notices;
mod prepare;
mod report;

use crestline_physics::fit::{Setbacks, built_setbacks, ideal_setbacks};

use crate::{Checked, Fault, Solution};
pub(crate) use prepare::{Prepared, fault, fit_options, prepare};

/// Ideal and built setbacks for one pair of styles.
pub(crate) struct Fitted {
    pub ideal: Setbacks,
    pub built: Setbacks,
}

/// Solves a checked plan.
///
/// # Errors
/// A fault that only the computation can find, such as a pitch that the string's stiffness alone exceeds.
pub fn solve(checked: &Checked) -> Result<Solution, Vec<Fault>> {
    let prepared = prepare(checked)?;
    let plan = checked.plan();
    let fitted = fit(&prepared, &fit_options(plan, plan.saddle.style, plan.nut.style))?;
    let mut report = report::report(checked, &prepared, &fitted)?;
    report.notices = notices::notices(checked, &prepared, &fitted, &report);
    let layout = layout::layout(checked, &prepared, &fitted);
    Ok(Solution { report, layout })
}

/// Finds ideal and built setbacks.
pub(crate) fn fit(
    prepared: &Prepared,
    options: &crestline_physics::fit::FitOptions,
) -> Result<Fitted, Vec<Fault>> {
    let strings = prepared.fit_strings();
    let fault = |error: crestline_physics::PhysicsError| {
        vec![Fault::new("strings", error.to_string(), "figures for which the setbacks can be worked out")]
    };
    let ideal = ideal_setbacks(&strings, options).map_err(fault)?;
    let built = built_setbacks(&strings, options, &ideal).map_err(fault)?;
    Ok(Fitted { ideal, built })
}
