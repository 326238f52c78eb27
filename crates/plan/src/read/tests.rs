//! Faults of a text, each by a text that has it, and the values that a text may leave out.
#![allow(clippy::unwrap_used, clippy::panic)]

use serde_json::{Value, json};

use super::*;
use crate::{
    Afterlength, Alternative, CoreShape, Datum, FitRule, Measured, NutStyle, OtherStrings, Pitch,
    ReadingKind, SaddleStyle, Scale, Tolerances, Units, check, example, write,
};

/// The shortest legal plan: two strings and no key that may be left out.
fn short() -> Value {
    let string = |note: &str| {
        json!({
            "pitch": {"note": note},
            "core": {"shape": "round", "diameter_mm": 0.4, "youngs_modulus_gpa": 200, "density_kg_m3": 7850},
            "action_mm": {"first": 0.4, "twelfth": 2}
        })
    };
    json!({
        "format": "crestline-plan",
        "version": 1,
        "instrument": {"scale_mm": 650, "frets": 20, "spread_mm": {"nut": 20, "saddle": 30}},
        "strings": [string("B3"), string("G3")],
        "saddle": {"style": "separate"}
    })
}

/// The short plan's text with the value at a JSON pointer changed.
fn changed(pointer: &str, value: Value) -> String {
    let mut plan = short();
    let (parent, key) = pointer.rsplit_once('/').unwrap();
    match plan.pointer_mut(parent).unwrap() {
        Value::Object(entries) => drop(entries.insert(key.to_owned(), value)),
        Value::Array(items) => items[key.parse::<usize>().unwrap()] = value,
        other => panic!("{other} has no items"),
    }
    plan.to_string()
}

#[track_caller]
fn one_fault(text: &str, path: &str, found: &str, allowed: &str) {
    let faults = read(text).unwrap_err();
    let [fault] = &faults[..] else { panic!("expected one fault at {path}, found {faults:#?}") };
    assert_eq!(fault.path, path, "{fault}");
    assert_eq!(fault.found, found, "{fault}");
    assert!(fault.allowed.contains(allowed), "{allowed:?} is not allowed by: {fault}");
}

#[test]
fn what_is_left_out_takes_the_values_of_the_format() {
    let plan = read(&short().to_string()).unwrap();
    assert_eq!((plan.title.as_str(), plan.notes.as_str()), ("", ""));
    let instrument = &plan.instrument;
    assert_eq!((instrument.zero_fret, instrument.relief_mm, instrument.fret_height_mm), (false, 0.0, 1.1));
    assert_eq!((&instrument.fret_positions_mm, &instrument.across_mm), (&None, &None));
    assert_eq!((plan.pressing.finger_fraction, plan.pressing.depth_mm), (0.33, 0.1));
    assert_eq!((plan.supports.nut, plan.supports.fret, plan.supports.saddle), (0.5, 0.5, 0.5));
    assert_eq!((plan.slip.head, plan.slip.tail), (0.0, 0.0));
    assert_eq!(plan.strings.iter().map(|string| string.name.as_str()).collect::<Vec<_>>(), ["1", "2"]);
    let string = &plan.strings[0];
    assert_eq!((&string.wrap, string.core.tensile_mpa, string.core.material.as_str()), (&None, None, ""));
    assert_eq!((string.measured, string.afterlength_mm), (Measured::default(), Afterlength::default()));
    assert_eq!(string.afterlength_mm, Afterlength { head: 0.0, tail: 0.0 });
    assert_eq!(plan.reference_hz, 440.0);
    assert_eq!((plan.fit.rule, plan.fit.frets), (FitRule::LeastSquares, [1, 12]));
    let saddle = &plan.saddle;
    assert_eq!((saddle.thickness_mm, saddle.edge_margin_mm, saddle.split_after), (3.0, 0.4, None));
    assert_eq!(saddle.end_margin_mm, 4.0);
    assert_eq!(
        (saddle.travel_mm, plan.nut.travel_mm, plan.nut.style),
        ([-5.0, 15.0], [0.0, 3.0], NutStyle::Plain)
    );
    assert_eq!((&plan.as_built, &plan.targets, plan.readings.len()), (&None, &None, 0));
    assert_eq!(
        (plan.sheet.paper, plan.sheet.units, plan.sheet.datum),
        (crate::Paper::A4, Units::Mm, Datum::Nut)
    );
}

#[test]
fn every_key_of_the_format_is_read() {
    let mut full = short();
    full["title"] = json!("a");
    full["notes"] = json!("b");
    full["instrument"] = json!({
        "scale_mm": {"bass": 690, "treble": 650, "square_fret": 6.5}, "frets": 22, "fret_positions_mm": null,
        "zero_fret": true, "relief_mm": 0.2, "spread_mm": {"nut": 20, "saddle": 30},
        "across_mm": {"nut": [12, -8], "saddle": [15, -15]}, "fret_height_mm": 1.2
    });
    full["pressing"] = json!({"finger_fraction": 0.4, "depth_mm": 0.2});
    full["supports"] = json!({"nut": 0, "fret": 0.25, "saddle": 1});
    full["slip"] = json!({"head": 0.1, "tail": 0.2});
    full["strings"][0] = json!({
        "name": "high", "pitch": {"frequency_hz": 247.5},
        "core": {"shape": "hex", "diameter_mm": 0.4, "youngs_modulus_gpa": 206, "density_kg_m3": 7800,
                 "tensile_mpa": 2400, "material": "c"},
        "wrap": {"outside_mm": 0.9, "density_kg_m3": 8800, "material": "d"},
        "measured": {"unit_mass_kg_per_m": 0.004, "axial_stiffness_n": 2e4, "bending_stiffness_n_mm2": 300},
        "action_mm": {"twelfth": 2.1}, "afterlength_mm": {"head": 100, "tail": 20}
    });
    full["strings"][1]["action_mm"] = json!({"first": null, "twelfth": 2.1});
    full["strings_weight"] = json!(2.5);
    full["alternatives"] = json!([
        {"name": "e", "weight": 0.5, "strings": full["strings"].clone()},
        {"name": "f", "pitches": [null, {"note": "D2"}]}
    ]);
    full["reference_hz"] = json!(442);
    full["fit"] = json!({"rule": "minimax", "frets": [2, 14]});
    full["targets"] = json!({"open_cents": [1, -1], "pitch_class_cents": [0,1,2,3,4,5,6,7,8,9,10,11]});
    full["saddle"] = json!({"style": "two_piece", "thickness_mm": 4, "edge_margin_mm": 0.5, "end_margin_mm": 5.5, "split_after": 1, "travel_mm": [-1, 9]});
    full["nut"] = json!({"style": "shaped", "travel_mm": [0, 2]});
    full["as_built"] = json!({"saddle_setback_mm": [1, 2], "nut_setback_mm": [0.1, 0.2]});
    full["readings"] = json!([{"string": 2, "fret": 12, "kind": "octave_harmonic", "cents": -1.5}]);
    full["sheet"] = json!({"paper": "letter", "units": "inch", "datum": "twelfth_fret"});
    let one = |number: f64| {
        json!({
            "core_diameter_mm": number, "modulus_fraction": number, "mass_fraction": number,
            "measured_mass_fraction": number, "measured_stiffness_fraction": number, "pitch_cents": 1,
            "action_first_mm": number, "action_twelfth_mm": number
        })
    };
    full["tolerances"] = json!({
        "seed": 4294967295_u32, "samples": 1000, "limit_cents": 3, "reference_cents": 1,
        "neck": {"relief_mm": 0.01, "scale_mm": 0.3, "fret_mm": 0.02},
        "pressing": {"finger_fraction": 0.2, "depth_fraction": 0.3},
        "supports": {"nut": 0.01, "fret": 0.02, "saddle": 0.03}, "slip": {"head": 0.04, "tail": 0.05},
        "making": {"crest_mm": 0.2, "nut_edge_mm": 0.3},
        "plain": one(0.01), "wound": one(0.02), "polymer": one(0.03), "strings": [one(0.04)]
    });
    full["tolerances"]["strings"][0]["string"] = json!(2);
    let plan = read(&full.to_string()).unwrap();

    let Scale::Fanned(fan) = plan.instrument.scale else { panic!("{:?}", plan.instrument.scale) };
    assert_eq!((fan.bass, fan.treble, fan.square_fret), (690.0, 650.0, 6.5));
    assert_eq!(plan.strings[0].pitch, Pitch::FrequencyHz(247.5));
    assert_eq!(plan.strings[0].core.shape, CoreShape::Hex);
    assert_eq!(plan.saddle.style, SaddleStyle::TwoPiece);
    assert_eq!(plan.targets.as_ref().unwrap().pitch_class_cents[11], 11.0);
    assert_eq!(plan.alternatives[0].other, OtherStrings::Strings(plan.strings.clone()));
    let tuning = [None, Some(Pitch::Note("D2".to_owned()))];
    assert_eq!(plan.alternatives[1], Alternative::new("f", OtherStrings::Pitches(tuning.to_vec())));
    assert_eq!(plan.readings[0].kind, ReadingKind::OctaveHarmonic);
    // What is written holds every key and value of what was read, but for keys that say "nothing".
    let written: Value = serde_json::from_str(&write(&plan)).unwrap();
    full["instrument"].as_object_mut().unwrap().remove("fret_positions_mm");
    full["strings"][1]["action_mm"] = json!({"twelfth": 2.1});
    full["alternatives"][0]["strings"][1]["action_mm"] = json!({"twelfth": 2.1});
    assert_held(&full, &written, "");
}

#[test]
fn tolerances_take_their_defaults_key_by_key() {
    let read_with = |tolerances: Value| read(&changed("/tolerances", tolerances)).unwrap().tolerances;
    assert_eq!(read_with(Value::Null), None);
    assert_eq!(read_with(json!({})), Some(Tolerances::default()));
    let part = read_with(json!({"wound": {"core_diameter_mm": 0.002}, "neck": {"relief_mm": 0.02}})).unwrap();
    let mut expected = Tolerances::default();
    (expected.wound.core_diameter_mm, expected.neck.relief_mm) = (0.002, 0.02);
    assert_eq!(part, expected);
}

#[test]
fn odd_tolerances_are_named() {
    let odd = |tolerances: Value, path: &str, found: &str, allowed: &str| {
        one_fault(&changed("/tolerances", tolerances), path, found, allowed);
    };
    odd(json!({"samples": 10}), "tolerances.samples", "10", "64 to 32768");
    odd(json!({"seed": -1}), "tolerances.seed", "-1", "0 to 4294967295");
    odd(
        json!({"plain": {"mass": 0.1}}),
        "tolerances.plain.mass",
        "a key that is not known here",
        "mass_fraction",
    );
    odd(json!({"wound": {"modulus_fraction": 0.6}}), "tolerances.wound.modulus_fraction", "0.6", "0 to 0.5");
    odd(json!({"strings": [{"string": 3}]}), "tolerances.strings[0].string", "3", "1 to 2");
    odd(
        json!({"strings": [{"string": 1}, {"string": 1}]}),
        "tolerances.strings[1].string",
        "string 1 again",
        "once",
    );
    odd(json!({"making": {"crest_mm": -0.1}}), "tolerances.making.crest_mm", "-0.1", "0 to 1 mm");
}

/// Asserts that `part` is in `whole`: objects by their keys, lists by their items, numbers by their value.
fn assert_held(part: &Value, whole: &Value, path: &str) {
    match (part, whole) {
        (Value::Object(part), Value::Object(whole)) => {
            for (key, value) in part {
                assert_held(value, whole.get(key).unwrap_or(&Value::Null), &format!("{path}.{key}"));
            }
        }
        (Value::Array(part), Value::Array(whole)) if part.len() == whole.len() => {
            std::iter::zip(part, whole).for_each(|(part, whole)| assert_held(part, whole, path));
        }
        (Value::Number(part), Value::Number(whole)) => assert_eq!(part.as_f64(), whole.as_f64(), "{path}"),
        _ => assert_eq!(part, whole, "{path}"),
    }
}

#[test]
fn required_keys() {
    let required = [
        "format",
        "version",
        "instrument",
        "instrument.scale_mm",
        "instrument.frets",
        "instrument.spread_mm",
        "instrument.spread_mm.saddle",
        "strings",
        "strings[1].pitch",
        "strings[1].core",
        "strings[1].core.shape",
        "strings[1].core.diameter_mm",
        "strings[1].core.youngs_modulus_gpa",
        "strings[1].core.density_kg_m3",
        "strings[1].action_mm",
        "strings[1].action_mm.first",
        "strings[1].action_mm.twelfth",
        "saddle",
        "saddle.style",
    ];
    for path in required {
        let mut plan = short();
        let pointer = format!("/{}", path.replace('.', "/").replace("[1]", "/1"));
        let (parent, key) = pointer.rsplit_once('/').unwrap();
        plan.pointer_mut(parent).unwrap().as_object_mut().unwrap().remove(key).unwrap();
        one_fault(&plan.to_string(), path, "nothing", "");
    }
    let parts = [
        ("pressing", json!({"depth_mm": 0.1}), "pressing.finger_fraction"),
        ("supports", json!({"nut": 0.5, "fret": 0.5}), "supports.saddle"),
        ("slip", json!({"head": 0.5}), "slip.tail"),
        ("fit", json!({"rule": "minimax"}), "fit.frets"),
        ("nut", json!({"travel_mm": [0, 1]}), "nut.style"),
        ("sheet", json!({"paper": "a4", "units": "mm"}), "sheet.datum"),
        ("targets", json!({"open_cents": [0, 0]}), "targets.pitch_class_cents"),
        ("as_built", json!({"saddle_setback_mm": [0, 0]}), "as_built.nut_setback_mm"),
    ];
    for (key, part, path) in parts {
        one_fault(&changed(&format!("/{key}"), part), path, "nothing", "");
    }
}

#[test]
fn unknown_and_repeated_keys() {
    for (pointer, path) in [
        ("/extra", "extra"),
        ("/instrument/scale", "instrument.scale"),
        ("/strings/1/core/colour", "strings[1].core.colour"),
        ("/saddle/a b", "saddle.\"a b\""),
    ] {
        one_fault(&changed(pointer, json!(1)), path, "a key that is not known here", "the keys ");
    }
    let twice = short().to_string().replacen("\"frets\":20", "\"frets\":20,\"frets\":21", 1);
    one_fault(&twice, "instrument.frets", "the same key more than once", "each key once");
}

#[test]
fn wrong_types_and_words() {
    let cases = [
        ("/format", json!("crestline-report"), "format", "\"crestline-report\"", "\"crestline-plan\""),
        ("/format", json!(1), "format", "1", "\"crestline-plan\""),
        ("/version", json!("1"), "version", "\"1\"", "1"),
        ("/version", json!(0), "version", "0", "1"),
        ("/version", json!(0.5), "version", "0.5", "1"),
        ("/title", json!(7), "title", "7", "a text"),
        ("/title", json!(null), "title", "null", "a text"),
        ("/instrument", json!([]), "instrument", "a list of 0", "an object with the keys scale_mm, frets"),
        (
            "/instrument/scale_mm",
            json!("650"),
            "instrument.scale_mm",
            "\"650\"",
            "200 to 1500 mm, or an object",
        ),
        ("/instrument/scale_mm", json!(null), "instrument.scale_mm", "null", "200 to 1500 mm"),
        ("/instrument/frets", json!(12.5), "instrument.frets", "12.5", "a whole number, 12 to 36"),
        ("/instrument/frets", json!(-12), "instrument.frets", "-12", "a whole number, 12 to 36"),
        ("/instrument/frets", json!(1e300), "instrument.frets", "1e300", "12 to 36"),
        ("/instrument/frets", json!("20"), "instrument.frets", "\"20\"", "12 to 36"),
        ("/instrument/zero_fret", json!(1), "instrument.zero_fret", "1", "true or false"),
        ("/instrument/relief_mm", json!(null), "instrument.relief_mm", "null", "0 to 3 mm"),
        ("/strings", json!({}), "strings", "an object", "a list of strings"),
        ("/strings/1", json!("E2"), "strings[1]", "\"E2\"", "an object with the keys name, pitch"),
        ("/strings/1/name", json!(2), "strings[1].name", "2", "a text"),
        ("/strings/1/pitch", json!("E2"), "strings[1].pitch", "\"E2\"", "note, frequency_hz"),
        ("/strings/1/pitch", json!({}), "strings[1].pitch", "neither note nor frequency_hz", "one of"),
        (
            "/strings/1/pitch/frequency_hz",
            json!(98),
            "strings[1].pitch",
            "both note and frequency_hz",
            "one of",
        ),
        ("/strings/1/pitch/note", json!(40), "strings[1].pitch.note", "40", "a note name from C0 to B9"),
        (
            "/strings/1/core/shape",
            json!("Round"),
            "strings[1].core.shape",
            "\"Round\"",
            "\"round\" or \"hex\"",
        ),
        (
            "/strings/1/core/diameter_mm",
            json!([0.4]),
            "strings[1].core.diameter_mm",
            "a list of 1",
            "0.05 to 10 mm",
        ),
        ("/strings/1/wrap", json!(0.6), "strings[1].wrap", "0.6", "outside_mm, density_kg_m3"),
        (
            "/fit",
            json!({"rule": "best", "frets": [1, 12]}),
            "fit.rule",
            "\"best\"",
            "\"least_squares\" or \"twelfth\"",
        ),
        ("/fit", json!({"rule": "minimax", "frets": [1]}), "fit.frets", "a list of 1", "two fret numbers"),
        (
            "/fit",
            json!({"rule": "minimax", "frets": [1, 2, 3]}),
            "fit.frets",
            "a list of 3",
            "two fret numbers",
        ),
        ("/fit", json!({"rule": "minimax", "frets": [1.5, 9]}), "fit.frets[0]", "1.5", "a fret number"),
        ("/saddle/style", json!("slanted"), "saddle.style", "\"slanted\"", "\"straight\" or \"two_piece\""),
        (
            "/saddle/travel_mm",
            json!({"low": 0}),
            "saddle.travel_mm",
            "an object",
            "two numbers, -10 to 30 mm",
        ),
        ("/saddle/split_after", json!(1.5), "saddle.split_after", "1.5", "a string number"),
        (
            "/targets",
            json!({"open_cents": [0, 0], "pitch_class_cents": [0]}),
            "targets.pitch_class_cents",
            "a list of 1",
            "twelve",
        ),
        ("/strings_weight", json!("1"), "strings_weight", "\"1\"", "0.01 to 100"),
        ("/alternatives", json!(1), "alternatives", "1", "a list of alternatives"),
        ("/alternatives", json!([[]]), "alternatives[0]", "a list of 0", "name, weight, strings, pitches"),
        ("/alternatives", json!([{"name": "a"}]), "alternatives[0]", "neither strings nor pitches", "one of"),
        (
            "/alternatives",
            json!([{"name": "a", "strings": [], "pitches": []}]),
            "alternatives[0]",
            "both strings and pitches",
            "one of",
        ),
        ("/alternatives", json!([{"pitches": [null, null]}]), "alternatives[0].name", "nothing", "a name"),
        (
            "/alternatives",
            json!([{"name": "a", "pitches": [null, "D2"]}]),
            "alternatives[0].pitches[1]",
            "\"D2\"",
            "note, frequency_hz",
        ),
        (
            "/readings",
            json!([{"string": 1, "fret": 1, "kind": "plucked", "cents": 0}]),
            "readings[0].kind",
            "\"plucked\"",
            "\"open\"",
        ),
        (
            "/readings",
            json!([{"string": -1, "fret": 1, "kind": "open", "cents": 0}]),
            "readings[0].string",
            "-1",
            "a string number",
        ),
        ("/readings", json!(null), "readings", "null", "a list of readings"),
        (
            "/sheet",
            json!({"paper": "a5", "units": "mm", "datum": "nut"}),
            "sheet.paper",
            "\"a5\"",
            "\"a4\" or \"a3\" or \"letter\"",
        ),
    ];
    for (pointer, value, path, found, allowed) in cases {
        let mut text = changed(pointer, value);
        if path == "readings[0].string" {
            text = text.replace("\"fret\":1,\"kind\"", "\"fret\":0,\"kind\"");
        }
        one_fault(&text, path, found, allowed);
    }
}

#[test]
fn null_stands_for_nothing_where_nothing_may_be() {
    for pointer in [
        "/instrument/fret_positions_mm",
        "/instrument/across_mm",
        "/strings/0/wrap",
        "/strings/0/core/tensile_mpa",
        "/saddle/split_after",
        "/as_built",
        "/targets",
    ] {
        assert_eq!(read(&changed(pointer, Value::Null)), read(&short().to_string()), "{pointer}");
    }
}

#[test]
fn numbers_that_no_program_holds_are_named_like_others() {
    let text = changed("/instrument/relief_mm", json!("here")).replace("\"here\"", "1e999");
    one_fault(&text, "instrument.relief_mm", "1e999", "a number, 0 to 3 mm");
    let text = text.replace("\"diameter_mm\":0.4", "\"diameter_mm\":-2e308");
    let paths: Vec<String> = read(&text).unwrap_err().into_iter().map(|fault| fault.path).collect();
    assert_eq!(paths, ["instrument.relief_mm", "strings[0].core.diameter_mm", "strings[1].core.diameter_mm"]);
}

#[test]
fn faults_of_structure_and_of_range_are_listed_together() {
    let mut plan = short();
    plan["tilte"] = json!("x");
    plan["instrument"]["frets"] = json!("many");
    plan["instrument"]["relief_mm"] = json!(4);
    plan["strings"][0]["core"] = json!(null);
    plan["strings"][1]["core"]["diameter_mm"] = json!(40);
    plan["strings"][1]["action_mm"]["twelfth"] = json!(-1);
    plan["fit"] = json!({"rule": "minimax", "frets": [99, 1]});
    plan["readings"] = json!([{"string": 3, "fret": 1, "kind": "fretted", "cents": 0}]);
    let mut paths: Vec<String> =
        read(&plan.to_string()).unwrap_err().into_iter().map(|fault| fault.path).collect();
    paths.sort();
    // The frets of the fit cannot be judged where the number of frets is not known.
    let expected = [
        "instrument.frets",
        "instrument.relief_mm",
        "readings[0].string",
        "strings[0].core",
        "strings[1].action_mm.twelfth",
        "strings[1].core.diameter_mm",
        "tilte",
    ];
    assert_eq!(paths, expected);
}

#[test]
fn a_draft_keeps_values_out_of_range() {
    let text = changed("/instrument/relief_mm", json!(9));
    one_fault(&text, "instrument.relief_mm", "9", "0 to 3 mm");
    let draft = read_draft(&text).unwrap();
    assert_eq!(draft.instrument.relief_mm, 9.0);
    assert_eq!(check(&draft).unwrap_err().len(), 1);
    assert_eq!(read_draft(&write(&draft)), Ok(draft));
    assert!(read_draft(&changed("/instrument/relief_mm", json!("9"))).is_err());
}

#[test]
fn a_newer_version_is_refused_by_name_and_nothing_else_is_said() {
    let mut plan = short();
    plan["version"] = json!(3);
    plan["novelty"] = json!({});
    one_fault(&plan.to_string(), "version", "version 3, which is newer than this program reads (1)", "1");
}

#[test]
fn what_is_no_object_is_no_plan() {
    for text in ["[]", "null", "7", "\"crestline-plan\""] {
        let faults = read(text).unwrap_err();
        assert_eq!(faults.len(), 1, "{faults:?}");
        assert!(faults[0].allowed.contains("an object with the keys format, version"), "{}", faults[0]);
    }
}

#[test]
fn a_flood_of_faults_is_cut_and_counted() {
    let keys: Vec<String> = (0..5000).map(|number| format!("\"k{number}\":0")).collect();
    let text = short().to_string().replacen('{', &format!("{{{},", keys.join(",")), 1);
    let faults = read(&text).unwrap_err();
    assert_eq!(faults.len(), 1001);
    assert_eq!(faults[1000].found, "4000 further faults, which are not listed");
    assert!(read(&changed("/strings", json!(vec![0; 100_000]))).is_err());
}

#[test]
fn a_written_plan_reads_like_the_format() {
    let text = write(&read(example("steel_six").unwrap().text).unwrap());
    assert!(
        text.starts_with("{\n  \"format\": \"crestline-plan\",\n  \"version\": 1,\n  \"title\": "),
        "{text}"
    );
    assert!(text.ends_with("\n}\n"));
    let keys: Vec<&str> = text
        .lines()
        .filter_map(|line| line.strip_prefix("  \"").and_then(|rest| rest.split('"').next()))
        .collect();
    let mut places = keys.iter().map(|key| KEYS.iter().position(|known| known == key).unwrap());
    assert!(places.clone().is_sorted() && places.next() == Some(0), "{keys:?}");
    assert!(text.contains("\n      \"pitch\": { \"note\": \"E4\" },\n"), "{text}");
}
