//! Properties of every plan: what is written is read back, and no text brings the program down.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, missing_docs)]

mod common;

use common::{fixed, legal_plan, reads_or_says_why};
use crestline_plan::{EXAMPLES, Plan, check, read, read_draft, write};
use proptest::prelude::*;
use serde_json::{Value, json};

/// Pointers to every value inside `value`, its own first.
fn pointers(value: &Value, here: &str, found: &mut Vec<String>) {
    found.push(here.to_owned());
    match value {
        Value::Object(entries) => {
            for (key, inner) in entries {
                pointers(inner, &format!("{here}/{}", key.replace('~', "~0").replace('/', "~1")), found);
            }
        }
        Value::Array(items) => {
            for (index, inner) in items.iter().enumerate() {
                pointers(inner, &format!("{here}/{index}"), found);
            }
        }
        _ => {}
    }
}

fn odd_value() -> impl Strategy<Value = Value> {
    prop_oneof![
        Just(Value::Null),
        any::<bool>().prop_map(Value::from),
        any::<f64>().prop_map(|number| json!(number)),
        prop_oneof![Just(-1.0), Just(0.0), Just(0.5), Just(13.0), Just(1e300)].prop_map(Value::from),
        any::<String>().prop_map(Value::from),
        Just(json!([])),
        Just(json!({})),
        Just(json!([[[]]])),
        Just(json!({"bass": 1, "nut": [], "note": "B3"})),
    ]
}

/// An example with some of its values replaced, its keys taken away or doubled.
fn mutated() -> impl Strategy<Value = String> {
    let change = (any::<prop::sample::Index>(), odd_value(), 0..4_u8);
    (0..EXAMPLES.len(), prop::collection::vec(change, 1..6)).prop_map(|(example, changes)| {
        let mut value: Value = serde_json::from_str(EXAMPLES[example].text).unwrap();
        if example % 2 == 0 {
            let pitches = vec![json!({"note": "D3"}); value["strings"].as_array().map_or(0, Vec::len)];
            value["alternatives"] =
                json!([{"name": "a", "strings": value["strings"].clone()}, {"name": "b", "pitches": pitches}]);
        }
        for (place, odd, how) in changes {
            let mut all = vec![];
            pointers(&value, "", &mut all);
            let pointer = place.get(&all);
            let target = value.pointer_mut(pointer).unwrap();
            match (how, target) {
                (0, Value::Object(entries)) => drop(entries.insert("odd".to_owned(), odd)),
                (1, Value::Object(entries)) if !entries.is_empty() => {
                    let key = entries.keys().nth(place.index(entries.len())).unwrap().clone();
                    entries.remove(&key);
                }
                (0 | 1, Value::Array(items)) => items.push(odd),
                (2, Value::Array(items)) => items.clear(),
                (_, target) => *target = odd,
            }
        }
        value.to_string()
    })
}

fn strings_rise_in_order(plan: &Plan) {
    let checked = check(plan).unwrap();
    for string in &checked.neck().strings {
        let mut places = vec![0.0];
        places.extend(&string.fret_mm);
        places.push(string.line.scale_mm());
        assert!(places.windows(2).all(|pair| pair[0] < pair[1]), "{places:?}");
    }
    assert_eq!(checked.frequencies_hz().len(), plan.strings.len());
}

proptest! {
    #![proptest_config(fixed(128))]

    #[test]
    fn legal_plans_survive_writing_and_reading(plan in legal_plan()) {
        let text = write(&plan);
        prop_assert_eq!(&read(&text).unwrap(), &plan);
        prop_assert_eq!(&read_draft(&text).unwrap(), &plan);
        // The same text again: nothing is lost or added on the way.
        prop_assert_eq!(write(&read(&text).unwrap()), text);
    }

    #[test]
    fn legal_necks_have_their_frets_in_order(plan in legal_plan()) {
        strings_rise_in_order(&plan);
    }

    #[test]
    fn mutated_plans_are_read_or_refused_with_reasons(text in mutated()) {
        reads_or_says_why(&text);
    }

    #[test]
    fn torn_and_spoilt_texts_are_refused_with_reasons(
        example in 0..EXAMPLES.len(), cut in any::<prop::sample::Index>(), junk in "[\\[\\]{}\",:0-9eE.+\\-a-z \n]{0,8}"
    ) {
        let text = EXAMPLES[example].text;
        let cut = (0..=cut.index(text.len())).rev().find(|at| text.is_char_boundary(*at)).unwrap();
        reads_or_says_why(&text[..cut]);
        reads_or_says_why(&format!("{}{junk}{}", &text[..cut], &text[cut..]));
    }

    #[test]
    fn any_text_is_refused_or_read(text in any::<String>()) {
        reads_or_says_why(&text);
    }
}
