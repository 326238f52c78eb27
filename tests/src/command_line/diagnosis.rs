//! The diagnosis: its keys, its words, and where the readings come from.

use serde_json::{Value, json};

use super::{crestline, example};

/// Readings of the second string as of one whose crest stands too near the nut: they rise as 2^(n/12) − 1.
const SHARP: &str = "string,fret,kind,cents\n2,0,open,0.0\n2,2,fretted,3.1\n2,5,fretted,5.4\n2,9,fretted,8.5\n2,12,fretted,12.4\n";

fn plan_with_readings() -> String {
    let mut plan: Value = serde_json::from_str(example("steel_six")).unwrap();
    plan["readings"] = json!([
        {"string": 2, "fret": 2, "kind": "fretted", "cents": 3.1},
        {"string": 2, "fret": 5, "kind": "fretted", "cents": 5.4},
        {"string": 2, "fret": 9, "kind": "fretted", "cents": 8.5},
        {"string": 2, "fret": 12, "kind": "fretted", "cents": 12.4},
    ]);
    plan.to_string()
}

fn keys(value: &Value) -> Vec<&str> {
    value.as_object().expect("an object").keys().map(String::as_str).collect()
}

#[test]
fn the_keys_stand_as_the_format_says_and_in_its_order() {
    let ran = crestline(&["diagnose", "--json", "-"], &plan_with_readings());
    assert_eq!(ran.status, 0, "{}", ran.err);
    let found: Value = serde_json::from_str(&ran.out).unwrap();
    assert_eq!(keys(&found), ["format", "version", "strings", "frets", "remedies", "notices"]);
    assert_eq!((&found["format"], &found["version"]), (&json!("crestline-diagnosis"), &json!(1)));
    let string = &found["strings"][0];
    let wanted = [
        "string",
        "readings",
        "rms_before_cents",
        "saddle_only",
        "saddle_and_nut",
        "causes",
        "residual_cents",
        "suspect_string",
    ];
    assert_eq!(keys(string), wanted);
    assert_eq!(keys(&string["saddle_only"]), ["saddle_move_mm", "sd_mm", "rms_after_cents"]);
    let both = ["saddle_move_mm", "saddle_sd_mm", "nut_move_mm", "nut_sd_mm", "rms_after_cents"];
    assert_eq!(keys(&string["saddle_and_nut"]), both);
    assert_eq!(keys(&string["causes"][0]), ["cause", "cents"]);
    assert_eq!(keys(&found["remedies"][0]), ["text", "kind", "rms_after_cents", "saddle_moves_mm"]);
    assert_eq!((&string["string"], &string["readings"]), (&json!(2), &json!(4)));
}

#[test]
fn the_words_fit_the_page_and_name_string_move_and_caution() {
    let ran = crestline(&["diagnose", "-"], &plan_with_readings());
    assert_eq!((ran.status, ran.err.as_str()), (0, ""));
    assert!(ran.out.lines().all(|line| line.chars().count() <= 100), "{}", ran.out);
    for words in ["1. ", "String 2 (B3)", "Caution", "Saddle"] {
        assert!(ran.out.contains(words), "{words:?} stands in\n{}", ran.out);
    }
}

#[test]
fn readings_come_from_another_file_where_one_is_named() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("readings.csv");
    std::fs::write(&path, SHARP).unwrap();
    let path = path.to_str().unwrap();
    let ran = crestline(&["diagnose", "--json", "--readings", path, "-"], example("steel_six"));
    assert_eq!(ran.status, 0, "{}", ran.err);
    let found: Value = serde_json::from_str(&ran.out).unwrap();
    assert!(found["strings"][0]["saddle_only"]["saddle_move_mm"].as_f64().unwrap() > 1.0, "{found}");
    std::fs::write(path, "1,12,fretted,sharp\n2,99,fretted,1.0\n").unwrap();
    let ran = crestline(&["diagnose", "--readings", path, "-"], example("steel_six"));
    assert_eq!((ran.status, ran.out.as_str()), (2, ""));
    assert!(ran.err.contains("line 1, cents"), "{}", ran.err);
}

#[test]
fn what_cannot_be_diagnosed_is_refused_by_its_field() {
    let ran = crestline(&["diagnose", "-"], example("steel_six"));
    assert_eq!((ran.status, ran.out.as_str()), (2, ""));
    assert!(ran.err.contains("readings"), "{}", ran.err);
    let ran = crestline(&["diagnose", "-", "--readings", "-"], example("steel_six"));
    assert_eq!(ran.status, 2);
    assert!(ran.err.contains("--readings"), "{}", ran.err);
}
