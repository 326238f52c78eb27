//! How the setbacks suit every set of strings.

use crestline_physics::fit::{FitOptions, FitString, ideal_setbacks};
use crestline_physics::{Contacts, Note};

use super::prepare::{Prepared, PreparedString, fault};
use super::report::{Squares, contact_report};
use super::{Fitted, no_setbacks};
use crate::{Alternative, Checked, Fault, Plan, SetFretReport, SetReport, SetStringReport};

/// What the plan's own strings are called where it has no title.
const OWN_NAME: &str = "as planned";

/// One entry a set, the plan's own strings first; none where the plan names no alternatives.
pub(super) fn alternatives(
    checked: &Checked,
    prepared: &Prepared,
    fitted: &Fitted,
    options: &FitOptions,
) -> Result<Vec<SetReport>, Vec<Fault>> {
    if prepared.alternatives.is_empty() {
        return Ok(Vec::new());
    }
    let plan = checked.plan();
    let title = plan.title.trim();
    let name = if title.is_empty() { OWN_NAME } else { title };
    let built = &fitted.built.contacts;
    let mut sets = vec![set_report(plan, &prepared.strings, built, options)?];
    (sets[0].name, sets[0].weight) = (name.to_owned(), prepared.weight);
    for (index, (own, set)) in checked.alternatives().iter().zip(&prepared.alternatives).enumerate() {
        let alternative = &plan.alternatives[index];
        let report = set_report(own.plan(), &set.strings, built, options).map_err(|faults| {
            faults.into_iter().map(|fault| outside(alternative, index, fault)).collect::<Vec<_>>()
        })?;
        sets.push(SetReport { name: alternative.name.trim().to_owned(), weight: set.weight, ..report });
    }
    Ok(sets)
}

fn outside(alternative: &Alternative, index: usize, fault: Fault) -> Fault {
    Fault { path: alternative.outer_path(index, &fault.path).unwrap_or(fault.path), ..fault }
}

/// The report of a set, but for its name and weight.
fn set_report(
    plan: &Plan,
    strings: &[PreparedString],
    built: &[Contacts],
    options: &FitOptions,
) -> Result<SetReport, Vec<Fault>> {
    let alone: Vec<FitString> = strings.iter().map(PreparedString::alone).collect();
    let ideal = ideal_setbacks(&alone, options).map_err(no_setbacks)?.contacts;
    let mut all = Squares::default();
    let mut reports = Vec::with_capacity(strings.len());
    for (index, own) in strings.iter().enumerate() {
        let notes_at = |at| own.string.notes(at).map_err(|error| vec![fault(index, &error)]);
        let (at_ideal, at_built) = (notes_at(ideal[index])?, notes_at(built[index])?);
        own.frets.iter().for_each(|&fret| all.add(1.0, at_built[fret].error_cents));
        reports.push(SetStringReport {
            string: index as u32 + 1,
            name: plan.strings[index].name.clone(),
            frequency_hz: own.string.setup().frequency_hz,
            tension_n: own.open.tension_n,
            breaking_fraction: own.breaking_fraction(),
            ideal: contact_report(own, ideal[index], &at_ideal),
            built: contact_report(own, built[index], &at_built),
            frets: fret_reports(own, &at_ideal, &at_built),
        });
    }
    Ok(SetReport {
        name: String::new(),
        weight: 1.0,
        total_tension_n: reports.iter().map(|string| string.tension_n).sum(),
        rms_cents: all.root_mean(),
        max_cents: reports.iter().map(|string| string.built.max_cents).fold(0.0, f64::max),
        strings: reports,
    })
}

fn fret_reports(own: &PreparedString, at_ideal: &[Note], at_built: &[Note]) -> Vec<SetFretReport> {
    let errors = own.notes.iter().zip(at_ideal).zip(at_built).enumerate();
    errors
        .map(|(fret, ((none, ideal), built))| SetFretReport {
            fret: fret as u32 + 1,
            none_cents: none.error_cents,
            ideal_cents: ideal.error_cents,
            built_cents: built.error_cents,
            touches_fret: none.touches_fret.map(|fret| fret as u32),
        })
        .collect()
}
