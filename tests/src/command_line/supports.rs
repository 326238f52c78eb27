//! Fitting how firmly the supports hold: the table, JSON, the plan written, and refusals.

use serde_json::{Value, json};

use super::{crestline, example};
use crate::places::{files_under, text_of, top};

/// A synthetic instrument with readings and measured crests, see `tests/reference/README.md`.
fn instrument() -> Value {
    let path = files_under(&top().join("tests/reference/supports"), "json").remove(0);
    let records: Vec<Value> = serde_json::from_str(&text_of(&path)).expect("a list of instruments");
    records[0]["plan"].clone()
}

#[test]
fn the_table_fits_the_page_and_the_json_has_its_keys() {
    let plan = instrument().to_string();
    let ran = crestline(&["supports", "-"], &plan);
    assert_eq!((ran.status, ran.err.as_str()), (0, ""));
    assert!(ran.out.lines().all(|line| line.chars().count() <= 100), "{}", ran.out);
    for words in ["Decided", "2 fret + saddle - nut", "nut + fret - saddle"] {
        assert!(ran.out.contains(words), "{words:?} stands in\n{}", ran.out);
    }
    let ran = crestline(&["supports", "--json", "-"], &plan);
    assert_eq!(ran.status, 0, "{}", ran.err);
    let found: Value = serde_json::from_str(&ran.out).unwrap();
    assert_eq!((&found["format"], &found["version"]), (&json!("crestline-supports"), &json!(1)));
    assert_eq!(found["supports"].as_array().map(Vec::len), Some(3));
    let sum = &found["combinations"][0];
    let keys: Vec<_> = sum.as_object().unwrap().keys().map(String::as_str).collect();
    assert_eq!(keys, ["name", "meaning", "planned", "value", "sd", "prior_sd", "decided"]);
    // Fret, saddle and nut at one half each: 2 · 0.5 + 0.5 − 0.5.
    assert_eq!(sum["planned"], json!(1.0));
}

#[test]
fn the_plan_written_holds_what_was_found_and_nothing_else_new() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("fitted.json");
    let path = path.to_str().unwrap();
    let plan = instrument().to_string();
    let ran = crestline(&["supports", "-", "-o", path], &plan);
    assert_eq!((ran.status, ran.out.as_str()), (0, ""), "{}", ran.err);
    let found: Value = serde_json::from_str(&crestline(&["supports", "--json", "-"], &plan).out).unwrap();
    let mut written: Value = serde_json::from_str(&std::fs::read_to_string(path).unwrap()).unwrap();
    for fixity in found["supports"].as_array().unwrap() {
        let name = fixity["name"].as_str().unwrap();
        assert_eq!(written["supports"][name].as_f64(), fixity["value"].as_f64(), "{name}");
    }
    written["supports"] = json!({"nut": 0.5, "fret": 0.5, "saddle": 0.5});
    let same = |value: &Value| crestline_plan::read(&value.to_string()).unwrap();
    assert_eq!(same(&written), same(&instrument()));
}

#[test]
fn without_readings_or_measured_crests_it_is_refused_by_the_field() {
    let ran = crestline(&["supports", "-"], example("classical_nylon"));
    assert_eq!((ran.status, ran.out.as_str()), (2, ""));
    assert!(ran.err.contains("readings: ") && ran.err.contains("as_built: "), "{}", ran.err);
    let mut plan = instrument();
    plan["as_built"] = Value::Null;
    let ran = crestline(&["supports", "-"], &plan.to_string());
    assert_eq!(ran.status, 2);
    assert!(ran.err.contains("as_built: found nothing") && !ran.err.contains("readings: "), "{}", ran.err);
}
