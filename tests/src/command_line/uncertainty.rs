//! How sure the setbacks are: the report's keys, its words, and options that are refused.

use serde_json::{Value, json};

use super::{crestline, example};

fn keys(value: &Value) -> Vec<&str> {
    value.as_object().expect("an object").keys().map(String::as_str).collect()
}

#[test]
fn the_keys_stand_as_the_format_says_and_the_seed_decides() {
    let run = |seed: &str| {
        let ran = crestline(
            &["uncertainty", "--json", "--samples", "128", "--seed", seed, "-"],
            example("mandolin"),
        );
        assert_eq!(ran.status, 0, "{}", ran.err);
        ran.out
    };
    let text = run("5");
    assert_eq!(text, run("5"));
    let found: Value = serde_json::from_str(&text).unwrap();
    let top = [
        "format",
        "version",
        "samples",
        "left_out",
        "seed",
        "limit_cents",
        "chance_within",
        "chance_within_fit",
        "strings",
        "shares",
        "measure_next",
    ];
    assert_eq!(keys(&found), top);
    assert_eq!((&found["format"], &found["version"]), (&json!("crestline-uncertainty"), &json!(1)));
    assert_eq!((&found["samples"], &found["seed"]), (&json!(128), &json!(5)));
    let string = &found["strings"][7];
    let of_string = [
        "string",
        "name",
        "saddle_setback_mm",
        "nut_setback_mm",
        "chance_within",
        "chance_within_fit",
        "frets",
    ];
    assert_eq!(keys(string), of_string);
    let band = ["nominal", "mean", "sd", "first_order_sd", "p05", "p50", "p95"];
    assert_eq!(keys(&string["saddle_setback_mm"]), band);
    assert_eq!(keys(&string["frets"][11]), ["fret", "sounds", "error_cents"]);
    assert_eq!(keys(&string["frets"][11]["error_cents"]), band);
    assert_eq!(keys(&found["shares"]), ["plus_minus_mm", "whole", "strings"]);
    let share = ["input", "linear", "first_order", "total", "gain_mm"];
    assert_eq!(keys(&found["shares"]["strings"][7]["shares"][0]), share);
    let next = ["input", "share", "plus_minus_mm", "then_plus_minus_mm", "gain_mm", "text"];
    assert_eq!(keys(&found["measure_next"][0]), next);
    assert_ne!(text, run("6"));
}

#[test]
fn the_words_fit_the_page_and_name_bands_chances_and_what_to_measure() {
    let ran = crestline(&["uncertainty", "--samples", "256", "--limit", "4", "-"], example("steel_six"));
    assert_eq!(ran.status, 0, "{}", ran.err);
    assert!(ran.err.contains("no tolerances"), "{}", ran.err);
    println!("{}", ran.out);
    assert!(ran.out.lines().all(|line| line.chars().count() <= 100), "{}", ran.out);
    for words in ["256 instruments", "±4.0 cents", "Chance %", "What to measure next", "1. ±"] {
        assert!(ran.out.contains(words), "{words:?} stands in\n{}", ran.out);
    }
}

#[test]
fn options_out_of_range_are_refused_by_name() {
    for (option, value, path) in
        [("--samples", "63", "tolerances.samples"), ("--limit", "0", "tolerances.limit_cents")]
    {
        let ran = crestline(&["uncertainty", option, value, "-"], example("steel_six"));
        assert_eq!((ran.status, ran.out.as_str()), (2, ""));
        assert!(ran.err.contains(path), "{}", ran.err);
    }
}

#[test]
fn a_report_has_bands_where_the_plan_has_tolerances() {
    let mut plan: Value = serde_json::from_str(example("steel_six")).unwrap();
    let report = |plan: &Value| -> Value {
        serde_json::from_str(&crestline(&["solve", "--json", "-"], &plan.to_string()).out).unwrap()
    };
    assert_eq!(report(&plan)["strings"][0].get("plus_minus_mm"), None);
    plan["tolerances"] = json!({});
    for string in report(&plan)["strings"].as_array().unwrap() {
        // Some tenths of a millimetre: a crest filed to 0.01 mm is not known to 0.01 mm (common practice).
        assert!((0.05..1.0).contains(&string["plus_minus_mm"].as_f64().unwrap()), "{string}");
    }
}
