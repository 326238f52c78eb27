//! Drawings and schedules written by the command line. What stands in them is measured by readers from outside.

use std::fs;
use std::path::Path;

use super::{crestline, example, example_names};

/// How a file of each kind begins, by the format's own description.
const BEGINS: [(&str, &str); 3] = [("svg", "<"), ("pdf", "%PDF-"), ("dxf", "999")];

fn plan_in(folder: &Path, name: &str) -> String {
    let path = folder.join(format!("{name}.json"));
    fs::write(&path, example(name)).unwrap();
    path.to_str().unwrap().to_owned()
}

#[test]
fn every_example_is_drawn_in_every_kind_and_twice_alike() {
    let folder = tempfile::tempdir().unwrap();
    for name in example_names() {
        let plan = plan_in(folder.path(), name);
        for (ending, begins) in BEGINS {
            let path = folder.path().join(format!("{name}.{ending}"));
            let arguments = ["sheet", &plan, "-o", path.to_str().unwrap()];
            let ran = crestline(&arguments, "");
            assert_eq!((ran.status, ran.out.as_str()), (0, ""), "{name}: {}", ran.err);
            let first = fs::read(&path).unwrap();
            assert!(first.starts_with(begins.as_bytes()), "{name}.{ending}");
            crestline(&arguments, "");
            assert!(fs::read(&path).unwrap() == first, "{name}.{ending} is the same on every run");
        }
    }
}

#[test]
fn options_change_the_drawing_and_wrong_ones_are_refused() {
    let plan = example("steel_six");
    let drawn = |more: &[&str]| {
        let arguments = [&["sheet", "-", "-o", "-", "--format", "svg"], more].concat();
        let ran = crestline(&arguments, plan);
        assert_eq!(ran.status, 0, "{more:?}: {}", ran.err);
        ran.out
    };
    let own = drawn(&[]);
    for more in
        [["--paper", "a3"], ["--units", "inch_fraction"], ["--datum", "saddle_line"], ["--date", "May Day"]]
    {
        assert!(drawn(&more) != own, "{more:?} changes the drawing");
    }
    assert!(drawn(&["--date", "May Day"]).contains("May Day"));
    for more in [["--paper", "a5"], ["--units", "cm"], ["--datum", "bridge"], ["--format", "csv"]] {
        let ran = crestline(&[&["sheet", "-", "-o", "-"], &more[..]].concat(), plan);
        assert_eq!((ran.status, ran.out.as_str()), (2, ""), "{more:?}");
        assert!(ran.err.contains(more[0]) && ran.err.contains("allowed"), "{}", ran.err);
    }
}

#[test]
fn a_name_that_tells_no_kind_is_refused_with_what_would_do() {
    for (output, advice) in [("-", "--format"), ("drawing", ".svg"), ("a.png", ".svg"), ("a.csv", "schedule")]
    {
        let ran = crestline(&["sheet", "-", "-o", output], example("steel_six"));
        assert_eq!(ran.status, 2, "{output}");
        assert!(ran.err.contains("--output") && ran.err.contains(advice), "{}", ran.err);
    }
}

#[test]
fn a_result_never_takes_the_place_of_its_plan() {
    let folder = tempfile::tempdir().unwrap();
    let plan = plan_in(folder.path(), "mandolin");
    for arguments in
        [&["sheet", &plan, "--format", "svg", "-o", &plan][..], &["schedule", &plan, "-o", &plan]]
    {
        let ran = crestline(arguments, "");
        assert_eq!(ran.status, 2, "{}", ran.err);
        assert_eq!(fs::read_to_string(&plan).unwrap(), example("mandolin"));
    }
}

#[test]
fn a_refused_plan_leaves_the_old_drawing() {
    let folder = tempfile::tempdir().unwrap();
    let old = folder.path().join("old.svg");
    fs::write(&old, "old").unwrap();
    let ran = crestline(&["sheet", "-", "-o", old.to_str().unwrap()], "{}");
    assert_eq!(ran.status, 2);
    assert_eq!(fs::read_to_string(&old).unwrap(), "old");
}

#[test]
fn the_schedule_has_a_row_a_string_under_a_header_with_units() {
    for name in example_names() {
        let ran = crestline(&["schedule", "-"], example(name));
        assert_eq!(ran.status, 0, "{name}: {}", ran.err);
        let plan: serde_json::Value = serde_json::from_str(example(name)).unwrap();
        let lines: Vec<_> = ran.out.lines().collect();
        assert_eq!(lines.len(), 1 + plan["strings"].as_array().unwrap().len(), "{name}");
        let unit = if plan["sheet"]["units"] == "inch" { "_in" } else { "_mm" };
        assert!(lines[0].contains(&format!("built_setback{unit}")), "{name}: {}", lines[0]);
        let cells = |line: &str| line.split(',').count();
        assert!(
            lines.iter().all(|line| cells(line) == cells(lines[0])),
            "{name}: every row is as long as the header"
        );
    }
}

#[test]
fn a_name_is_never_run_by_a_spreadsheet() {
    let mut plan: serde_json::Value = serde_json::from_str(example("steel_six")).unwrap();
    plan["strings"][0]["name"] = "=HYPERLINK(\"x\")".into();
    let ran = crestline(&["schedule", "-"], &plan.to_string());
    assert_eq!(ran.status, 0, "{}", ran.err);
    assert!(!ran.out.contains(",=") && !ran.out.contains(",\"="), "{}", ran.out);
}
