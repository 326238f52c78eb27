//! Texts that mean harm, and everything that can be asked of a legal plan: no fault is overlooked, nothing panics or
//! runs for ever, and no number that is not finite comes out.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, missing_docs)]

mod common;

use std::collections::BTreeSet;

use common::{fixed, legal_plan, likely_plan, reads_or_says_why};
use crestline_plan::{
    EXAMPLES, Fault, Plan, Step, bench_layout, check, diagnose, read, readings_from_csv, solve,
    suggested_frets, workshop, write,
};
use proptest::prelude::*;
use proptest::sample::{Index, select};
use serde_json::{Value, json};

/// Keys of results whose value may be absent.
const MAY_BE_NULL: &[&str] = &[
    "drop_to_next_mm",
    "slot_offset_mm",
    "octave_crest_cents_per_tenth_mm",
    "octave_nut_cents_per_tenth_mm",
    "saddle_moves_mm",
    "first_mm",
];

/// The values of a plan that hold no others, each by its JSON pointer and by the path that a fault of it has.
fn leaves(value: &Value, pointer: &str, path: &str, found: &mut Vec<(String, String)>) {
    match value {
        Value::Object(entries) => {
            for (key, inner) in entries {
                let dot = if path.is_empty() { "" } else { "." };
                leaves(inner, &format!("{pointer}/{key}"), &format!("{path}{dot}{key}"), found);
            }
        }
        Value::Array(items) => {
            for (index, inner) in items.iter().enumerate() {
                leaves(inner, &format!("{pointer}/{index}"), &format!("{path}[{index}]"), found);
            }
        }
        _ => found.push((pointer.to_owned(), path.to_owned())),
    }
}

/// A value that is wrong in the place of `old`, whatever the field.
fn wrong(old: &Value, choice: usize) -> Value {
    let any_type = [json!([1]), json!({"odd": 1})];
    match old {
        Value::Number(_) => {
            let odd = [
                json!(true),
                json!("7"),
                json!(1e300),
                json!(-1e300),
                any_type[0].clone(),
                any_type[1].clone(),
            ];
            odd[choice % odd.len()].clone()
        }
        Value::String(_) => [json!(7), json!(false), any_type[0].clone()][choice % 3].clone(),
        Value::Bool(_) => [json!(1), json!("true"), any_type[1].clone()][choice % 3].clone(),
        _ => json!({"odd": [choice]}),
    }
}

/// Asserts that each path is that of a fault, or stands in the pair or list that a fault names.
fn all_found(faults: &[Fault], spoilt: &BTreeSet<String>) {
    for path in spoilt {
        let list = path.rfind('[').map(|at| &path[..at]);
        let found = faults.iter().any(|fault| fault.path == *path || Some(fault.path.as_str()) == list);
        assert!(found, "{path} was spoilt, and the faults are {faults:#?}");
    }
    assert!(faults.len() >= spoilt.len(), "{} faults for {}", faults.len(), spoilt.len());
}

/// What one edit puts in the place of a value, as text: numbers that no field holds, text that is no text, and depth.
fn odd_text() -> impl Strategy<Value = String> {
    let numbers = select(
        &[
            "1e999",
            "-1e999",
            "-0",
            "1e-400",
            "5e-324",
            "1.7976931348623157e308",
            "00",
            "0x10",
            "NaN",
            "Infinity",
            "-",
            "1e",
            "1_000",
            "½",
            "9007199254740993",
            ".5",
            "+1",
            "1e+0000000000000001",
        ][..],
    );
    let texts = select(
        &[
            r#""\ud800""#,
            r#""\udc00\ud800""#,
            r#""\u0000""#,
            "\"\u{202e}\u{feff}\"",
            r#""\x41""#,
            "\"\u{7}\"",
            "\"\t\n\"",
            r#""\"#,
            "'B3'",
            "\"𝄞♯\"",
            "\"e\u{301}\u{301}\u{301}\"",
        ][..],
    );
    let depth = select(&[1_usize, 2, 126, 127, 128, 129, 4000][..]);
    prop_oneof![
        4 => numbers.prop_map(str::to_owned),
        4 => texts.prop_map(str::to_owned),
        1 => (depth.clone(), any::<bool>()).prop_map(|(depth, closed)| {
            "[".repeat(depth) + &"]".repeat(if closed { depth } else { 0 })
        }),
        1 => (depth, any::<bool>()).prop_map(|(depth, closed)| {
            "{\"a\":".repeat(depth) + "1" + &"}".repeat(if closed { depth } else { 0 })
        }),
        1 => (1..2000_usize).prop_map(|count| "9".repeat(count)),
        1 => (1..20_000_usize).prop_map(|count| format!("\"{}\"", "x".repeat(count))),
    ]
}

/// Where the values of a text written by `write` stand: from behind ": " to the end of the line or its comma.
fn values(text: &str) -> Vec<std::ops::Range<usize>> {
    let starts = text.match_indices("\": ").map(|(at, sign)| at + sign.len());
    let end = |start: usize| start + text[start..].find([',', '\n', '}']).unwrap_or(text.len() - start);
    starts.map(|start| start..end(start)).collect()
}

/// An edit of a plan's text: replace a value, write a member twice, or take a stretch away.
#[derive(Debug, Clone)]
enum Edit {
    Replace(Index, String),
    Twice(Index),
    Drop(Index, usize),
}

fn edit() -> impl Strategy<Value = Edit> {
    prop_oneof![
        4 => (any::<Index>(), odd_text()).prop_map(|(place, text)| Edit::Replace(place, text)),
        2 => any::<Index>().prop_map(Edit::Twice),
        1 => (any::<Index>(), 1..40_usize).prop_map(|(place, count)| Edit::Drop(place, count)),
    ]
}

fn edited(mut text: String, edits: &[Edit]) -> String {
    for edit in edits {
        let values = values(&text);
        if values.is_empty() {
            break;
        }
        match edit {
            Edit::Replace(place, odd) => text.replace_range(place.get(&values).clone(), odd),
            Edit::Twice(place) => {
                let value = place.get(&values).clone();
                let start = text[..value.start].rfind(['{', ',', '\n']).map_or(0, |at| at + 1);
                let member = text[start..value.end].to_owned();
                text.insert_str(start, &format!("{member}, "));
            }
            Edit::Drop(place, count) => {
                let start = place.get(&values).start;
                let end = (start + count..).find(|at| text.is_char_boundary((*at).min(text.len()))).unwrap();
                text.replace_range(start..end.min(text.len()), "");
            }
        }
    }
    text
}

/// Asserts that no number of a result is anything but finite; in JSON such a number is `null`.
fn assert_no_new_null(result: &Value, may_be_null: &[&str]) {
    let mut places = vec![];
    leaves(result, "", "", &mut places);
    for (pointer, path) in places {
        let key = pointer.rsplit('/').find(|part| part.parse::<usize>().is_err()).unwrap_or_default();
        let is_null = result.pointer(&pointer).is_some_and(Value::is_null);
        assert!(!is_null || may_be_null.contains(&key), "{path} is not finite");
    }
}

/// Everything but the solve report that a plan is asked for.
fn asked_for_everything(plan: &Plan) {
    let checked = check(plan).unwrap();
    if let Ok(solution) = solve(&checked) {
        let layout = bench_layout(&checked, &solution);
        assert_no_new_null(&serde_json::to_value(&layout).unwrap(), MAY_BE_NULL);
        if let Ok(figures) = workshop(&checked, &solution, Step::Mm01) {
            assert_no_new_null(&serde_json::to_value(&figures).unwrap(), MAY_BE_NULL);
        }
    }
    if let Ok(frets) = suggested_frets(&checked) {
        assert!(frets.iter().all(|fret| (1..=plan.instrument.frets).contains(fret)));
    }
    match diagnose(&checked, &Default::default()) {
        Ok(diagnosis) => assert_no_new_null(&serde_json::to_value(&diagnosis).unwrap(), MAY_BE_NULL),
        Err(faults) => assert!(!faults.is_empty() && faults.iter().all(|fault| !fault.allowed.is_empty())),
    }
}

proptest! {
    #![proptest_config(fixed(192))]

    #[test]
    fn every_field_that_is_spoilt_is_named(plan in legal_plan(), places in prop::collection::vec((any::<Index>(), 0..6_usize), 1..8)) {
        let mut value: Value = serde_json::from_str(&write(&plan)).unwrap();
        let mut all = vec![];
        leaves(&value, "", "", &mut all);
        // Another format or version is refused by name alone, whatever else is wrong.
        all.retain(|(_, path)| path != "format" && path != "version");
        let mut spoilt = BTreeSet::new();
        for (place, choice) in places {
            let (pointer, path) = place.get(&all);
            if spoilt.insert(path.clone()) {
                let target = value.pointer_mut(pointer).unwrap();
                *target = wrong(target, choice);
            }
        }
        all_found(&read(&value.to_string()).unwrap_err(), &spoilt);
    }

    #[test]
    fn edited_texts_are_read_or_refused_with_reasons(
        example in 0..EXAMPLES.len(), edits in prop::collection::vec(edit(), 1..5)
    ) {
        let text = write(&read(EXAMPLES[example].text).unwrap());
        reads_or_says_why(&edited(text, &edits));
    }

    #[test]
    fn tables_of_readings_are_read_or_refused_with_reasons(
        rows in prop::collection::vec("(-|1|2|17|\"|string|\u{feff}|x)?[,;\t]?(0|12|37|fret|1e9)?[,;\t]?(open|fretted|octave harmonic|kind)?[,;\t]?(6.5|−3|1e999|nan|cents|\"\"|\"a\nb\")?[,;\t]?", 0..12),
        ending in select(&["\n", "\r\n", "\r", "\n\n"][..]),
    ) {
        match readings_from_csv(&rows.join(ending)) {
            Ok(readings) => prop_assert!(!readings.is_empty() && readings.iter().all(|reading| reading.cents.is_finite())),
            Err(faults) => prop_assert!(!faults.is_empty() && faults.iter().all(|fault| !fault.allowed.is_empty())),
        }
    }
}

proptest! {
    // Diagnoses of sixteen strings take seconds without optimisation.
    #![proptest_config(fixed(12))]

    #[test]
    fn legal_plans_give_finite_answers_to_everything(plan in legal_plan()) {
        asked_for_everything(&plan);
    }

    #[test]
    fn plans_that_a_maker_could_have_give_finite_answers_to_everything(plan in likely_plan()) {
        asked_for_everything(&plan);
    }
}

#[test]
fn a_null_that_stands_for_no_number_is_seen() {
    let result = json!({"strings": [{"crest_mm": null, "slot_mm": null}]});
    assert_no_new_null(&result, &["crest_mm", "slot_mm"]);
    assert!(std::panic::catch_unwind(|| assert_no_new_null(&result, &["slot_mm"])).is_err());
}
