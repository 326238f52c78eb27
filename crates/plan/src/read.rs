//! From a file's text to a [`Plan`], with every fault of the text found.

mod alternatives;
mod instrument;
mod making;
mod migrate;
mod node;
mod parse;
mod spot;
mod strings;
mod tolerances;

use crate::{FORMAT, Fault, Plan, VERSION, check, defaults, limits};
use node::Node;
use spot::{Log, Spot};

/// Keys of a plan file in the order in which they are written.
const KEYS: &[&str] = &[
    "format",
    "version",
    "title",
    "notes",
    "instrument",
    "pressing",
    "supports",
    "slip",
    "strings",
    "strings_weight",
    "alternatives",
    "reference_hz",
    "fit",
    "targets",
    "saddle",
    "nut",
    "as_built",
    "readings",
    "sheet",
    "tolerances",
];

/// Reads a plan from its text: JSON in the form of version 1, or of an older version, which is brought up to date.
///
/// # Errors
/// All faults of the text: broken JSON (with line and column), a newer version (by name), unknown, repeated and
/// missing keys, wrong types, and every fault that [`crate::check`] finds.
pub fn read(text: &str) -> Result<Plan, Vec<Fault>> {
    let (plan, log) = read_with_log(text)?;
    let ranges = check::faults_beside(&plan, &log.unread());
    let faults = log.into_faults(ranges);
    if faults.is_empty() { Ok(plan) } else { Err(faults) }
}

/// Reads a plan that may still be wrong, as a window opens one that was saved in the middle of editing: values out
/// of range are kept for [`crate::check`] to name.
///
/// # Errors
/// All faults of the text's structure, as [`read`], but not values out of range.
pub fn read_draft(text: &str) -> Result<Plan, Vec<Fault>> {
    let (plan, log) = read_with_log(text)?;
    let faults = log.into_faults(vec![]);
    if faults.is_empty() { Ok(plan) } else { Err(faults) }
}

fn read_with_log(text: &str) -> Result<(Plan, Log), Vec<Fault>> {
    let mut root = parse::parse(text).map_err(|fault| vec![fault])?;
    if let Node::Object(entries) = &mut root {
        migrate::bring_up_to_date(entries).map_err(|fault| vec![fault])?;
    }
    let log = Log::default();
    let plan = plan(&Spot::root(&root, &log));
    Ok((plan, log))
}

fn plan(root: &Spot) -> Plan {
    let fields = root.object(KEYS);
    format_and_version(&fields.get("format"), &fields.get("version"));
    Plan {
        title: fields.get("title").text_or(""),
        notes: fields.get("notes").text_or(""),
        instrument: instrument::instrument(&fields.get("instrument")),
        pressing: fields.get("pressing").if_given(making::pressing).unwrap_or_default(),
        supports: fields.get("supports").if_given(making::supports).unwrap_or_default(),
        slip: fields.get("slip").if_given(making::slip).unwrap_or_default(),
        strings: fields.get("strings").list("a list of strings", strings::string),
        strings_weight: fields
            .get("strings_weight")
            .number_or(&limits::ALTERNATIVE_WEIGHT, defaults::ALTERNATIVE_WEIGHT),
        alternatives: fields
            .get("alternatives")
            .if_given(|spot| spot.list("a list of alternatives", |spot, _| alternatives::alternative(spot)))
            .unwrap_or_default(),
        reference_hz: fields.get("reference_hz").number_or(&limits::REFERENCE_HZ, defaults::REFERENCE_HZ),
        fit: fields.get("fit").if_given(making::fit).unwrap_or_default(),
        targets: fields.get("targets").optional(making::targets),
        saddle: making::saddle(&fields.get("saddle")),
        nut: fields.get("nut").if_given(making::nut).unwrap_or_default(),
        as_built: fields.get("as_built").optional(making::as_built),
        readings: fields
            .get("readings")
            .if_given(|spot| spot.list("a list of readings", |spot, _| making::reading(spot)))
            .unwrap_or_default(),
        sheet: fields.get("sheet").if_given(making::sheet).unwrap_or_default(),
        tolerances: fields.get("tolerances").optional(tolerances::tolerances),
    }
}

fn format_and_version(format: &Spot, version: &Spot) {
    let allowed = format!("\"{FORMAT}\"");
    if let Some(found) = format.text_of(&allowed)
        && found != FORMAT
    {
        format.wrong(&allowed);
    }
    // A newer version has been refused and an older one brought up to date by now.
    version.exactly(VERSION as f64, &migrate::version_words());
}

#[cfg(test)]
mod tests;
