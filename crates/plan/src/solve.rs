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

use crate::uncertainty::{HALF_BAND, Models};
use crate::{Checked, Fault, Notice, Report, Severity, Solution};
pub(crate) use prepare::{
    Prepared, PreparedString, core as physics_core, fault, fit_options, overrides, prepare, prepare_own, wrap,
};
pub(crate) use report::{Squares, left_over_of};

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
    let options = fit_options(plan, plan.saddle.style, plan.nut.style);
    let fitted = fit(&prepared, &options)?;
    let mut report = report::report(checked, &prepared, &fitted)?;
    report.alternatives = alternatives::alternatives(checked, &prepared, &fitted, &options)?;
    report.notices = notices::notices(checked, &prepared, &fitted, &report);
    if plan.tolerances.is_some() {
        bands(checked, &prepared, &fitted, &options, &mut report);
    }
    let layout = layout::layout(checked, &prepared, &fitted);
    Ok(Solution { report, layout })
}

/// Says in a report how sure its ideal setbacks are, to first order; the setbacks stand without it too.
fn bands(checked: &Checked, prepared: &Prepared, fitted: &Fitted, options: &FitOptions, report: &mut Report) {
    match Models::new(checked, prepared, fitted, options) {
        Ok(models) => {
            for (string, sd_mm) in report.strings.iter_mut().zip(models.saddle_sds_mm()) {
                string.plus_minus_mm = Some(HALF_BAND * sd_mm);
            }
        }
        Err(faults) => report.notices.extend(faults.into_iter().map(|fault| Notice {
            severity: Severity::Warning,
            path: fault.path,
            text: format!("no bands are given: {}", fault.found),
        })),
    }
}

/// The strings of a plan with their tolerances, as built by its styles.
///
/// # Errors
/// As [`solve`], and where one standard deviation of a figure leaves what can be built.
pub(crate) fn fitted_models(checked: &Checked) -> Result<Models, Vec<Fault>> {
    let prepared = prepare(checked)?;
    let plan = checked.plan();
    let options = fit_options(plan, plan.saddle.style, plan.nut.style);
    let fitted = fit(&prepared, &options)?;
    Models::new(checked, &prepared, &fitted, &options)
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
