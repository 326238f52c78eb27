//! Checks of the keys `alternatives` and `strings_weight`.

use super::checker::Checker;
use super::{Checked, look_through, notices};
use crate::fault::quoted;
use crate::{Alternative, Notice, OtherStrings, Plan, limits};

/// Checks every alternative as the plan would be checked with its strings; gives those that are legal.
pub(super) fn alternatives(checker: &mut Checker, plan: &Plan) -> Vec<Checked> {
    checker.range("strings_weight", plan.strings_weight, &limits::ALTERNATIVE_WEIGHT);
    let count = plan.alternatives.len();
    if count > limits::ALTERNATIVES {
        let found = format!("{count} alternatives");
        checker.fault("alternatives", found, format_args!("at most {}", limits::ALTERNATIVES));
        return vec![];
    }
    (0..count).filter_map(|index| one(checker, plan, index)).collect()
}

fn one(checker: &mut Checker, plan: &Plan, index: usize) -> Option<Checked> {
    let alternative = &plan.alternatives[index];
    let path = format!("alternatives[{index}]");
    checker.range(format_args!("{path}.weight"), alternative.weight, &limits::ALTERNATIVE_WEIGHT);
    name(checker, plan, index);
    number_of_strings(checker, plan, &path, alternative);
    let unread: Vec<String> = checker.unread().iter().filter_map(|path| inside(index, path)).collect();
    let own_plan = plan.with_alternative(alternative);
    let mut own = Checker::new(&unread);
    let sound = look_through(&own_plan, &mut own);
    for fault in own.into_faults() {
        let of_pitches = matches!(alternative.other, OtherStrings::Pitches(_));
        // What else is wrong with a string of the plan's own is said there.
        if of_pitches && !fault.path.contains("].pitch") {
            continue;
        }
        if let Some(path) = alternative.outer_path(index, &fault.path) {
            checker.fault(path, fault.found, fault.allowed);
        }
    }
    let found = sound?;
    let notices = own_notices(&own_plan, alternative, index);
    Some(Checked { plan: own_plan, notices, ..found })
}

/// The place in the alternative's own plan of a place that holds a stand-in.
fn inside(index: usize, path: &str) -> Option<String> {
    if path.starts_with("alternatives") {
        return Alternative::inner_path(index, path);
    }
    Some(path.to_owned())
}

fn name(checker: &mut Checker, plan: &Plan, index: usize) {
    let own = plan.alternatives[index].name.trim();
    let path = format!("alternatives[{index}].name");
    let before = plan.alternatives[..index].iter().position(|other| other.name.trim() == own);
    if own.is_empty() {
        checker.fault(path, quoted(own), "a name");
    } else if let Some(before) = before {
        let allowed = format!("another name than that of alternatives[{before}]");
        checker.fault(path, quoted(own), allowed);
    }
}

fn number_of_strings(checker: &mut Checker, plan: &Plan, path: &str, alternative: &Alternative) {
    let (key, found) = match &alternative.other {
        OtherStrings::Strings(strings) => ("strings", strings.len()),
        OtherStrings::Pitches(pitches) => ("pitches", pitches.len()),
    };
    let strings = plan.strings.len();
    if checker.sound_itself("strings") && found != strings {
        let allowed = format!("{strings}, one a string of the plan");
        checker.fault(format_args!("{path}.{key}"), format_args!("{found} {key}"), allowed);
    }
}

/// What is unusual about a set of strings of its own.
fn own_notices(own_plan: &Plan, alternative: &Alternative, index: usize) -> Vec<Notice> {
    if matches!(alternative.other, OtherStrings::Pitches(_)) {
        return vec![];
    }
    let outside =
        |notice: Notice| alternative.outer_path(index, &notice.path).map(|path| Notice { path, ..notice });
    notices::notices(own_plan).into_iter().filter_map(outside).collect()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, clippy::panic)]
    use super::*;
    use crate::{Pitch, check, example, read};

    fn note(name: &str) -> Option<Pitch> {
        Some(Pitch::Note(name.to_owned()))
    }

    /// Six strings, and beside them a copy of them and a lower tuning.
    fn plan() -> Plan {
        let mut plan = read(example("steel_six").unwrap().text).unwrap();
        let tuning = vec![None, None, None, None, None, note("D2")];
        plan.alternatives = vec![
            Alternative::new("copy", OtherStrings::Strings(plan.strings.clone())),
            Alternative::new("lower", OtherStrings::Pitches(tuning)),
        ];
        plan
    }

    fn set(plan: &mut Plan) -> &mut Vec<crate::PlanString> {
        let OtherStrings::Strings(strings) = &mut plan.alternatives[0].other else { panic!("a set") };
        strings
    }

    fn tuning(plan: &mut Plan) -> &mut Vec<Option<Pitch>> {
        let OtherStrings::Pitches(pitches) = &mut plan.alternatives[1].other else { panic!("a tuning") };
        pitches
    }

    #[track_caller]
    fn one_fault(change: impl FnOnce(&mut Plan), path: &str, allowed: &str) {
        let mut plan = plan();
        change(&mut plan);
        let faults = check(&plan).unwrap_err();
        let [fault] = &faults[..] else { panic!("{faults:#?}") };
        assert_eq!(fault.path, path, "{fault}");
        assert!(fault.allowed.contains(allowed), "{fault}");
    }

    #[test]
    fn every_fault_of_an_alternative_has_its_own_path() {
        one_fault(|plan| plan.strings_weight = 0.0, "strings_weight", "0.01 to 100");
        one_fault(|plan| plan.alternatives[1].weight = 101.0, "alternatives[1].weight", "0.01 to 100");
        one_fault(|plan| plan.alternatives[0].name = " ".to_owned(), "alternatives[0].name", "a name");
        one_fault(
            |plan| plan.alternatives[1].name = "copy".to_owned(),
            "alternatives[1].name",
            "another name than that of alternatives[0]",
        );
        one_fault(|plan| drop(set(plan).pop()), "alternatives[0].strings", "6, one a string");
        one_fault(|plan| tuning(plan).push(None), "alternatives[1].pitches", "6, one a string");
        one_fault(
            |plan| set(plan)[2].core.diameter_mm = -1.0,
            "alternatives[0].strings[2].core.diameter_mm",
            "0.05 to 10 mm",
        );
        one_fault(
            |plan| set(plan)[1].action_mm.twelfth = 0.01,
            "alternatives[0].strings[1].action_mm",
            "above the crown",
        );
        one_fault(|plan| tuning(plan)[2] = note("H2"), "alternatives[1].pitches[2].note", "note name");
        one_fault(
            |plan| tuning(plan)[0] = Some(Pitch::FrequencyHz(5.0)),
            "alternatives[1].pitches[0].frequency_hz",
            "10 to 5000 Hz",
        );
        let many = |plan: &mut Plan| {
            plan.alternatives = (0..13)
                .map(|number| Alternative::new(&number.to_string(), OtherStrings::Pitches(vec![None; 6])))
                .collect();
        };
        one_fault(many, "alternatives", "at most 12");
    }

    #[test]
    fn a_fault_of_the_plan_is_not_said_again_of_its_alternatives() {
        one_fault(|plan| plan.instrument.relief_mm = 4.0, "instrument.relief_mm", "0 to 3 mm");
        one_fault(
            |plan| plan.strings[5].core.diameter_mm = 0.0,
            "strings[5].core.diameter_mm",
            "0.05 to 10 mm",
        );
    }

    #[test]
    fn every_alternative_is_checked_as_a_plan_of_its_own() {
        let plan = plan();
        let checked = check(&plan).unwrap();
        let [copy, lower] = checked.alternatives() else { panic!("two alternatives") };
        assert_eq!(copy.frequencies_hz(), checked.frequencies_hz());
        // D2 on A4 = 440 Hz: 440·2^(−31/12) (ISO 16:1975 and equal temperament, computed).
        assert!((lower.frequencies_hz()[5] - 73.416_191_979_4).abs() < 1e-9);
        assert_eq!(lower.frequencies_hz()[..5], checked.frequencies_hz()[..5]);
        assert!(copy.alternatives().is_empty());
    }

    #[test]
    fn what_is_unusual_about_a_set_is_noticed_under_its_path() {
        let mut plan = plan();
        let before = check(&plan).unwrap().notices().len();
        set(&mut plan)[3].action_mm.twelfth = 6.0;
        let checked = check(&plan).unwrap();
        assert_eq!(checked.notices().len(), before + 1);
        assert_eq!(checked.notices()[before].path, "alternatives[0].strings[3].action_mm.twelfth");
    }
}
