//! From a checked plan with readings to its [`Diagnosis`].
//!
//! [`cases`] hands plan and readings to the physics, which finds the most probable instrument; [`report`] puts it in
//! the report's terms, [`remedies`] works out which jobs help, [`notices`] says what else should be known.

mod cases;
mod fitted;
mod import;
mod notices;
pub(crate) mod remedies;
mod report;
mod suggest;
mod supports;

use crestline_physics::PhysicsError;
use crestline_physics::diagnose::Priors;

use crate::{Checked, Diagnosis, Fault, Plan, ReadingKind};
pub use fitted::fitted_plan;
pub use import::readings_from_csv;
pub use suggest::suggested_frets;
pub use supports::{FixityReport, SupportsFit, fit_supports};

/// Finds what is probably wrong with the instrument that the plan's readings were taken on, and what cures it.
///
/// ```
/// use crestline_plan::{Priors, Reading, ReadingKind, check, diagnose, example, read};
///
/// let mut plan = read(example("steel_six").map_or("", |example| example.text))?;
/// let fretted = |fret, cents| Reading { string: 2, fret, kind: ReadingKind::Fretted, cents };
/// plan.readings = vec![fretted(2, 3.0), fretted(5, 5.0), fretted(9, 8.5), fretted(12, 12.0)];
/// let diagnosis = diagnose(&check(&plan)?, &Priors::default())?;
/// assert!(diagnosis.strings[0].saddle_only.saddle_move_mm > 1.0);
/// plan.readings.clear();
/// let faults = diagnose(&check(&plan)?, &Priors::default()).err().unwrap_or_default();
/// assert_eq!(faults[0].path, "readings");
/// # Ok::<(), Vec<crestline_plan::Fault>>(())
/// ```
///
/// # Errors
/// `readings` where the plan has no fretted reading; as [`crate::solve`]; `priors` where they are out of range.
pub fn diagnose(checked: &Checked, priors: &Priors) -> Result<Diagnosis, Vec<Fault>> {
    some_fretted(checked.plan())?;
    let cases = cases::cases(checked)?;
    let found = crestline_physics::diagnose::diagnose(&cases.strings, priors).map_err(not_found)?;
    let strings = report::strings(checked, &cases, &found);
    let remedies = remedies::remedies(checked, &cases, &found)?;
    let notices = notices::notices(checked, priors, &cases, &found);
    Ok(Diagnosis {
        format: "crestline-diagnosis",
        version: 1,
        strings,
        frets: report::frets(&found),
        remedies,
        notices,
        found: report::instrument(checked, &cases, &found),
    })
}

/// Refuses a plan without fretted readings.
fn some_fretted(plan: &Plan) -> Result<(), Vec<Fault>> {
    if plan.readings.iter().any(|reading| reading.kind == ReadingKind::Fretted) {
        return Ok(());
    }
    let found = match plan.readings.len() {
        0 => "no readings".to_owned(),
        some => format!("{some} readings, none of them of a fretted note"),
    };
    Err(vec![Fault::new("readings", found, "at least one fretted reading; ten frets a string are many")])
}

/// The fault of a plan whose instrument cannot be found.
fn not_found(error: PhysicsError) -> Vec<Fault> {
    vec![Fault::new(
        "readings",
        error.to_string(),
        "readings and priors for which the instrument can be worked out",
    )]
}
