//! Every fault of a plan is listed, by the path of its field, and no plan can misuse the terminal.

use serde_json::{Value, json};

use super::{crestline, example};

fn steel_six() -> Value {
    serde_json::from_str(example("steel_six")).expect("an example is JSON")
}

#[test]
fn all_faults_are_listed_and_not_only_the_first() {
    let mut plan = steel_six();
    plan["instrument"]["frets"] = json!(8);
    plan["instrument"]["relief_mm"] = json!("much");
    plan["strings"][2]["core"]["diameter_mm"] = json!(-1.0);
    plan["strings"][4]["pitch"] = json!({"note": "H2"});
    plan["saddle"]["colour"] = json!("white");
    plan.as_object_mut().unwrap().remove("format");
    let paths = [
        "instrument.frets",
        "instrument.relief_mm",
        "strings[2].core.diameter_mm",
        "strings[4].pitch",
        "saddle.colour",
        "format",
    ];
    for command in ["check", "solve", "compare"] {
        let ran = crestline(&[command, "-"], &plan.to_string());
        assert_eq!((ran.status, ran.out.as_str()), (2, ""), "{command}");
        for path in paths {
            let named = ran.err.lines().any(|line| line.trim_start().starts_with(path));
            assert!(named, "{command} names {path} in\n{}", ran.err);
        }
    }
}

#[test]
fn a_newer_version_is_refused_by_name() {
    let mut plan = steel_six();
    plan["version"] = json!(2);
    let ran = crestline(&["solve", "-"], &plan.to_string());
    assert_eq!(ran.status, 2);
    assert!(ran.err.contains("version") && ran.err.contains('2'), "{}", ran.err);
}

#[test]
fn hostile_text_reaches_neither_the_terminal_nor_the_layout() {
    let mut plan = steel_six();
    let hostile = "\u{1b}[2J\u{7}\nforged line\u{202e}";
    plan["title"] = json!(hostile);
    plan["strings"][0]["name"] = json!(hostile);
    plan["strings"][1]["name"] = json!("弦".repeat(60));
    let shown = crestline(&["solve", "--frets", "-"], &plan.to_string());
    plan[hostile] = json!(1);
    let refused = crestline(&["check", "-"], &plan.to_string());
    assert_eq!(refused.status, 2);
    for text in [&shown.out, &shown.err, &refused.out, &refused.err] {
        let bad = |c: char| c.is_control() && c != '\n' || c == '\u{202e}';
        assert!(!text.contains(bad), "{text:?}");
        assert!(!text.lines().any(|line| line.starts_with("forged")), "{text}");
    }
}

#[test]
fn a_sound_plan_passes_the_check() {
    for name in super::example_names() {
        let ran = crestline(&["check", "-"], example(name));
        assert_eq!((ran.status, ran.out.as_str()), (0, "standard input: no fault\n"), "{name}: {}", ran.err);
    }
}
