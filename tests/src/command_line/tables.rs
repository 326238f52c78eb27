//! The tables for people: every one fits the page, whatever the style, and stands on standard output alone.

use proptest::prelude::*;
use serde_json::{Value, json};

use super::{crestline, example, example_names};

/// The widest line of a table.
const PAGE_WIDTH: usize = 100;

const TABLES: [&[&str]; 5] =
    [&["solve", "-"], &["solve", "--frets", "-"], &["compare", "-"], &["bench", "-"], &["workshop", "-"]];

#[track_caller]
fn assert_fits(text: &str) {
    for line in text.lines() {
        assert!(line.chars().count() <= PAGE_WIDTH, "{line}");
        assert!(!line.ends_with(' '), "nothing trails: {line:?}");
    }
    for word in ["NaN", "inf", "-0.00 ", "-0.0 "] {
        assert!(!text.contains(word), "{word:?} stands in\n{text}");
    }
}

#[test]
fn every_table_of_every_example_fits_the_page() {
    for name in example_names() {
        for arguments in TABLES {
            let ran = crestline(arguments, example(name));
            assert_eq!(ran.status, 0, "{name} {arguments:?}: {}", ran.err);
            assert_fits(&ran.out);
        }
    }
}

#[test]
fn every_table_of_every_style_fits_the_page() {
    for saddle in ["separate", "shaped", "straight", "two_piece"] {
        for nut in ["plain", "common", "shaped"] {
            let mut plan: Value = serde_json::from_str(example("steel_six")).unwrap();
            plan["saddle"]["style"] = json!(saddle);
            if saddle == "two_piece" {
                plan["saddle"]["split_after"] = json!(2);
            }
            plan["nut"] = json!({"style": nut});
            plan["strings"][0]["name"] = json!("a name that is much too long for its column");
            for arguments in TABLES {
                let ran = crestline(arguments, &plan.to_string());
                assert_eq!(ran.status, 0, "{saddle} {nut} {arguments:?}: {}", ran.err);
                assert_fits(&ran.out);
            }
        }
    }
}

#[test]
fn several_sets_of_strings_have_a_table_each() {
    let mut plan: Value = serde_json::from_str(example("steel_six")).unwrap();
    let long = "a set with a name that is much too long for any heading of a table on a page of this width";
    plan["alternatives"] = json!([
        {"name": long, "strings": plan["strings"].clone()},
        {"name": "dropped sixth", "weight": 0.5, "pitches": [null, null, null, null, null, {"note": "D2"}]}
    ]);
    plan["nut"] = json!({"style": "shaped"});
    for arguments in TABLES {
        let ran = crestline(arguments, &plan.to_string());
        assert_eq!(ran.status, 0, "{arguments:?}: {}", ran.err);
        assert_fits(&ran.out);
    }
    let solved = crestline(&["solve", "-"], &plan.to_string()).out;
    assert!(solved.contains("dropped sixth, weight 0.5"), "{solved}");
    // D2 is 73.42 Hz in equal temperament on A4 = 440 Hz (ISO 16:1975, computed).
    let row = solved.lines().find(|line| line.contains("73.42"));
    assert!(row.is_some_and(|row| row.trim_start().starts_with("6  E2")), "{solved}");
    let frets = crestline(&["solve", "--frets", "-"], &plan.to_string()).out;
    assert!(frets.contains("dropped sixth: string 6, E2"), "{frets}");
    let compared = crestline(&["compare", "-"], &plan.to_string()).out;
    assert!(compared.contains("of all sets, weighted"), "{compared}");
}

#[test]
fn bench_and_workshop_give_json_of_their_own_kind() {
    for (command, format) in [("bench", "crestline-bench"), ("workshop", "crestline-workshop")] {
        for name in example_names() {
            let ran = crestline(&[command, "--json", "-"], example(name));
            assert_eq!(ran.status, 0, "{name}: {}", ran.err);
            let found: Value = serde_json::from_str(&ran.out).unwrap();
            assert_eq!(found["format"], format);
            let strings = crestline_plan::read(example(name)).unwrap().strings.len();
            assert_eq!(found["strings"].as_array().map(Vec::len), Some(strings));
        }
    }
}

#[test]
fn rounded_setbacks_are_whole_steps() {
    let mut plan: Value = serde_json::from_str(example("steel_six")).unwrap();
    plan["saddle"]["style"] = json!("separate");
    for (step, step_mm) in
        [("0.5mm", 0.5), ("0.25 mm", 0.25), ("1/64in", 25.4 / 64.0), ("1/32 in", 25.4 / 32.0)]
    {
        let ran = crestline(&["workshop", "--json", "--step", step, "-"], &plan.to_string());
        assert_eq!(ran.status, 0, "{step}: {}", ran.err);
        let found: Value = serde_json::from_str(&ran.out).unwrap();
        for string in found["strings"].as_array().unwrap() {
            let steps = string["rounded"]["saddle_setback_mm"].as_f64().unwrap() / step_mm;
            // Doubles carry sixteen digits; a setback is some tens of steps.
            assert!((steps - steps.round()).abs() < 1e-9, "{step}: {steps} steps");
        }
    }
    assert_eq!(crestline(&["workshop", "--step", "1mm", "-"], "").status, 2);
}

#[test]
fn the_datum_moves_every_x_alike() {
    let crests = |datum: &str| -> Vec<f64> {
        let ran = crestline(&["bench", "--json", "--datum", datum, "-"], example("steel_six"));
        let found: Value = serde_json::from_str(&ran.out).unwrap();
        found["strings"]
            .as_array()
            .unwrap()
            .iter()
            .map(|string| string["crest_mm"]["x"].as_f64().unwrap())
            .collect()
    };
    // 647.7 mm, and half of it at fret 12, by the definition of equal temperament.
    let nut = crests("nut");
    for (datum, moved_mm) in [("twelfth_fret", 323.85), ("saddle_line", 647.7)] {
        for (from_datum, from_nut) in crests(datum).iter().zip(&nut) {
            assert!((from_nut - from_datum - moved_mm).abs() < 1e-9, "{datum}");
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 300, failure_persistence: None, ..ProptestConfig::default() })]

    /// A plan with a few bytes changed is solved or refused; nothing else happens to it.
    #[test]
    fn a_spoilt_plan_is_refused_or_solved(changes in proptest::collection::vec((any::<prop::sample::Index>(), any::<char>()), 1..4)) {
        let mut text: Vec<char> = example("tenor_ukulele").chars().collect();
        for (place, put) in changes {
            let place = place.index(text.len());
            text[place] = put;
        }
        let text: String = text.into_iter().collect();
        let ran = crestline(&["solve", "--json", "-"], &text);
        match ran.status {
            0 => prop_assert!(serde_json::from_str::<Value>(&ran.out).is_ok()),
            2 => prop_assert!(ran.out.is_empty() && ran.err.contains("fault")),
            other => prop_assert!(false, "status {other}: {}", ran.err),
        }
    }
}
