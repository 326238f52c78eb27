//! The solve report: its keys, its numbers, and the table for people.

use serde_json::{Map, Value};

use super::{crestline, example, example_names};

/// The widest line of a table.
const PAGE_WIDTH: usize = 100;

const REPORT: &[&str] = &["format", "version", "strings", "saddle", "total_tension_n", "notices"];
const STRING: &[&str] = &[
    "string",
    "name",
    "frequency_hz",
    "scale_mm",
    "unit_mass_kg_per_m",
    "axial_stiffness_n",
    "bending_stiffness_n_mm2",
    "tension_n",
    "strain",
    "breaking_fraction",
    "bending_length_mm",
    "inharmonicity",
    "ideal",
    "built",
    "frets",
];
const IDEAL: &[&str] = &["saddle_setback_mm", "nut_setback_mm", "rms_cents", "max_cents"];
const BUILT: &[&str] =
    &["saddle_setback_mm", "nut_setback_mm", "rms_cents", "max_cents", "crest_mm", "slot_offset_mm"];
const FRET: &[&str] = &[
    "fret",
    "position_mm",
    "none_cents",
    "ideal_cents",
    "built_cents",
    "as_built_cents",
    "length_cents",
    "tension_cents",
    "mass_cents",
    "stiffness_cents",
    "finger_force_n",
    "touches_fret",
];
const MAY_BE_NULL: &[&str] = &["breaking_fraction", "slot_offset_mm", "as_built_cents", "touches_fret"];

fn report(name: &str) -> Value {
    let ran = crestline(&["solve", "--json", "-"], example(name));
    assert_eq!(ran.status, 0, "{name}: {}", ran.err);
    assert!(ran.out.ends_with("}\n"), "one object and a line end");
    serde_json::from_str(&ran.out).expect("one JSON object and nothing else")
}

fn keys(value: &Value) -> Vec<&str> {
    object(value).keys().map(String::as_str).collect()
}

/// The keys, with one more before another.
fn with<'a>(keys: &[&'a str], more: Option<(&str, &'a str)>) -> Vec<&'a str> {
    let mut keys = keys.to_vec();
    if let Some((before, key)) = more {
        let place = keys.iter().position(|other| *other == before).expect("a key of the list");
        keys.insert(place, key);
    }
    keys
}

fn object(value: &Value) -> &Map<String, Value> {
    value.as_object().expect("an object")
}

fn list<'a>(value: &'a Value, key: &str) -> &'a Vec<Value> {
    value[key].as_array().expect("a list")
}

#[test]
fn the_keys_stand_as_the_format_says_and_in_its_order() {
    for name in example_names() {
        let plan: Value = serde_json::from_str(example(name)).unwrap();
        let report = report(name);
        // Two keys stand only where the plan gives reason for them.
        let sets = plan.get("alternatives").is_some();
        assert_eq!(keys(&report), with(REPORT, sets.then_some(("notices", "alternatives"))));
        let bands = plan.get("tolerances").is_some();
        let of_string = with(STRING, bands.then_some(("built", "plus_minus_mm")));
        assert_eq!(
            (report["format"].as_str(), report["version"].as_u64()),
            (Some("crestline-report"), Some(1))
        );
        for string in list(&report, "strings") {
            assert_eq!(keys(string), of_string);
            assert_eq!(keys(&string["ideal"]), IDEAL);
            assert_eq!(keys(&string["built"]), BUILT);
            assert_eq!(keys(&string["built"]["crest_mm"]), ["x", "y", "z"]);
            assert!(list(string, "frets").iter().all(|fret| keys(fret) == FRET));
        }
        assert_eq!(keys(&report["saddle"]), ["lines", "fits"]);
        for line in list(&report["saddle"], "lines") {
            assert_eq!(keys(line), ["treble", "bass", "slant_degrees"]);
            assert_eq!((keys(&line["treble"]), keys(&line["bass"])), (vec!["x", "y"], vec!["x", "y"]));
        }
        for notice in list(&report, "notices") {
            assert_eq!(keys(notice), ["severity", "path", "text"]);
            assert!(["note", "warning"].contains(&notice["severity"].as_str().unwrap()));
        }
    }
}

#[test]
fn strings_and_frets_are_counted_as_in_the_plan() {
    for name in example_names() {
        let plan: Value = serde_json::from_str(example(name)).unwrap();
        let report = report(name);
        let (strings, wanted) = (list(&report, "strings"), list(&plan, "strings"));
        assert_eq!(strings.len(), wanted.len(), "{name}");
        for (number, (string, wanted)) in std::iter::zip(strings, wanted).enumerate() {
            assert_eq!(string["string"], number + 1);
            assert_eq!(string["name"], wanted["name"]);
            let frets: Vec<_> =
                list(string, "frets").iter().map(|fret| fret["fret"].as_u64().unwrap()).collect();
            assert_eq!(frets, (1..=plan["instrument"]["frets"].as_u64().unwrap()).collect::<Vec<_>>());
        }
    }
}

/// JSON has no infinity: serde writes one as null. So a null may stand only where the format allows it.
#[test]
fn every_number_is_finite() {
    fn look(path: &str, key: &str, value: &Value) {
        match value {
            Value::Null => assert!(MAY_BE_NULL.contains(&key), "{path} is null"),
            Value::Array(items) => items.iter().for_each(|item| look(path, key, item)),
            Value::Object(fields) => {
                fields.iter().for_each(|(key, value)| look(&format!("{path}.{key}"), key, value));
            }
            _ => {}
        }
    }
    for name in example_names() {
        look(name, "", &report(name));
    }
}

#[test]
fn the_four_parts_add_up_to_the_error_without_setback() {
    const EXACT_CENTS: f64 = 1e-9; // what the split is asked to reach
    for name in example_names() {
        for string in list(&report(name), "strings") {
            for fret in list(string, "frets") {
                let part = |key: &str| fret[key].as_f64().unwrap();
                let sum = ["length_cents", "tension_cents", "mass_cents", "stiffness_cents"]
                    .map(part)
                    .iter()
                    .sum::<f64>();
                assert!((sum - part("none_cents")).abs() <= EXACT_CENTS, "{name}: {fret}");
            }
        }
    }
}

#[test]
fn notices_go_to_standard_error_beside_the_json() {
    // A string close to its breaking load must be warned of.
    let mut plan: Value = serde_json::from_str(example("steel_six")).unwrap();
    plan["strings"][0]["core"]["tensile_mpa"] = 1500.0.into();
    let ran = crestline(&["solve", "--json", "-"], &plan.to_string());
    assert_eq!(ran.status, 0, "{}", ran.err);
    let report: Value = serde_json::from_str(&ran.out).unwrap();
    let notices = list(&report, "notices");
    assert_eq!(ran.err.lines().count(), notices.len(), "{}", ran.err);
    assert!(ran.err.contains("warning: strings[0]"), "{}", ran.err);
}

#[test]
fn the_table_fits_the_page_and_holds_every_string() {
    for name in example_names() {
        let ran = crestline(&["solve", "--frets", "-"], example(name));
        assert_eq!((ran.status, ran.err.as_str()), (0, ""), "{name}");
        let report = report(name);
        for string in list(&report, "strings") {
            let setback = format!("{:.2}", string["built"]["saddle_setback_mm"].as_f64().unwrap());
            let number = string["string"].to_string();
            let row = ran.out.lines().find(|line| line.split_whitespace().next() == Some(&number));
            let row = row.unwrap_or_else(|| panic!("{name} has a row for string {number}"));
            assert!(row.split_whitespace().any(|cell| cell == setback), "{row} holds {setback}");
        }
        for line in ran.out.lines() {
            assert!(line.chars().count() <= PAGE_WIDTH, "{name}: {line}");
        }
        assert!(
            ran.out.contains("strings under tension can break and bridges can lift"),
            "the cautions stand there"
        );
    }
}

#[test]
fn the_same_plan_gives_the_same_bytes() {
    for arguments in [&["solve", "-"][..], &["solve", "--json", "-"], &["compare", "--json", "-"]] {
        let [first, second] = [(); 2].map(|()| crestline(arguments, example("fanned_eight")));
        assert_eq!((first.status, first.out == second.out), (0, true), "{arguments:?}: {}", first.err);
    }
}
