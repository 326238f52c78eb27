//! Every legal plan is solved and compared, or refused with the field that is the cause; nothing that is not finite
//! comes out.
#![allow(clippy::unwrap_used, clippy::panic, missing_docs)]

mod common;

use common::{fixed, legal_plan, likely_plan};
use crestline_plan::{Checked, Fault, Point, Solution, check, compare, solve};
use proptest::prelude::*;
use serde_json::Value;

/// Keys whose value may be absent.
const MAY_BE_NULL: [&str; 5] =
    ["breaking_fraction", "as_built_cents", "touches_fret", "slot_offset_mm", "split_after"];

/// A number that is not finite is `null` in JSON.
fn assert_finite(value: &Value, key: &str, path: &str) {
    match value {
        Value::Null => assert!(MAY_BE_NULL.contains(&key), "{path} is not finite"),
        Value::Object(entries) => {
            entries.iter().for_each(|(key, inner)| assert_finite(inner, key, &format!("{path}.{key}")));
        }
        Value::Array(items) => {
            items
                .iter()
                .enumerate()
                .for_each(|(n, inner)| assert_finite(inner, key, &format!("{path}[{n}]")));
        }
        _ => {}
    }
}

/// The only reason for which a legal plan is not solved: a string so stiff that no tension gives its pitch.
fn assert_slack(faults: &[Fault]) {
    assert!(!faults.is_empty());
    for fault in faults {
        let set = fault.path.strip_prefix("alternatives[").and_then(|rest| rest.split_once("]."));
        let path = set.map_or(fault.path.as_str(), |(_, path)| path);
        let of_a_pitch = (path.starts_with("strings[") && path.ends_with("].pitch"))
            || (set.is_some() && path.starts_with("pitches[") && path.ends_with(']'));
        assert!(of_a_pitch && fault.found.contains("even when slack"), "{fault}");
        assert!(!fault.allowed.is_empty(), "{fault:?}");
    }
}

/// Asserts that both searches of a solution came to rest.
fn assert_at_rest(solution: &Solution) {
    let early = solution.report.notices.iter().find(|notice| notice.text.contains("came to rest"));
    assert_eq!(early, None);
}

fn solves_finitely(checked: &Checked) {
    let solution = match solve(checked) {
        Ok(solution) => solution,
        Err(faults) => return assert_slack(&faults),
    };
    assert_finite(&serde_json::to_value(&solution.report).unwrap(), "", "report");
    let layout = &solution.layout;
    let points = layout.strings.iter().flat_map(|string| {
        [
            string.nut,
            string.saddle,
            string.nut_edge,
            string.ideal_crest,
            string.crest,
            string.travel[0],
            string.travel[1],
        ]
    });
    let finite = |point: Point| point.x.is_finite() && point.y.is_finite();
    assert!(points.chain(layout.frets.iter().flatten().copied()).all(finite), "{layout:?}");
    assert!(
        layout.blanks.iter().flatten().copied().all(finite) && layout.datum_x_mm.is_finite(),
        "{layout:?}"
    );
}

proptest! {
    #![proptest_config(fixed(60))]

    #[test]
    fn legal_plans_are_solved_or_refused_with_reasons(plan in legal_plan()) {
        solves_finitely(&check(&plan).unwrap());
    }

    #[test]
    fn plans_that_a_maker_could_have_are_solved(plan in likely_plan()) {
        let checked = check(&plan).unwrap();
        prop_assert!(solve(&checked).is_ok(), "{:?}", solve(&checked).err());
        assert_at_rest(&solve(&checked).unwrap());
        solves_finitely(&checked);
    }
}

proptest! {
    // A comparison is a dozen solutions.
    #![proptest_config(fixed(12))]

    #[test]
    fn legal_plans_are_compared_or_refused_with_reasons(plan in legal_plan()) {
        match compare(&check(&plan).unwrap()) {
            Ok(comparison) => assert_finite(&serde_json::to_value(&comparison).unwrap(), "", "comparison"),
            Err(faults) => assert_slack(&faults),
        }
    }

    #[test]
    fn plans_that_a_maker_could_have_are_compared(plan in likely_plan()) {
        let comparison = compare(&check(&plan).unwrap()).unwrap();
        prop_assert!(comparison.rows.len() >= 9);
        assert_finite(&serde_json::to_value(&comparison).unwrap(), "", "comparison");
    }
}
