//! Exit statuses and what stands on which stream.

use std::io::ErrorKind;
use std::path::PathBuf;

use crestline_cli::{Outcome, Streams, run};

use super::{Failing, crestline, example, finished};

fn outcome(arguments: &[&str]) -> Outcome {
    let (mut out, mut err) = (Vec::new(), Vec::new());
    let mut streams = Streams { input: &mut std::io::empty(), output: &mut out, messages: &mut err };
    run(arguments, &mut streams)
}

#[test]
fn without_a_command_a_window_is_wanted() {
    assert_eq!(outcome(&["crestline"]), Outcome::Window(None));
    assert_eq!(outcome(&["crestline", "a plan.json"]), Outcome::Window(Some(PathBuf::from("a plan.json"))));
    assert_eq!(outcome(&["crestline", "./solve"]), Outcome::Window(Some(PathBuf::from("./solve"))));
    // Under the tests' own folder there is a file of this name, so it is a plan and no misspelt command.
    assert_eq!(outcome(&["crestline", "run"]), Outcome::Window(Some(PathBuf::from("run"))));
}

#[test]
fn help_and_version_are_results() {
    for arguments in [&["--help"][..], &["--version"], &["solve", "--help"], &["help", "check"]] {
        let ran = crestline(arguments, "");
        assert_eq!((ran.status, ran.err.as_str()), (0, ""), "{arguments:?}");
        assert!(!ran.out.is_empty());
    }
    let help = crestline(&["--help"], "").out;
    for command in
        ["solve", "check", "example", "compare", "diagnose", "bench", "workshop", "sheet", "schedule"]
    {
        assert!(help.contains(command), "the help names {command}");
    }
}

#[test]
fn refused_arguments_give_two_and_leave_the_output_empty() {
    for arguments in [
        &["solve"][..],
        &["solve", "--jason", "-"],
        &["solve", "--json", "--frets", "-"],
        &["solve", "--lines", "--frets", "-"],
        &["solve", "-", "-"],
        &["check"],
        &["a.json", "b.json"],
        &["example", "no_such_instrument"],
        &["example", "-o", "x.json"],
        &["-"],
        &["slove"],
    ] {
        let ran = crestline(arguments, "");
        assert_eq!(ran.status, 2, "{arguments:?}: {}", ran.err);
        assert_eq!(ran.out, "", "{arguments:?}");
        assert!(!ran.err.is_empty(), "{arguments:?}");
    }
}

#[test]
fn a_plan_that_is_not_there_gives_one_and_its_name() {
    let ran = crestline(&["solve", "/no/such/plan.json"], "");
    assert_eq!((ran.status, ran.out.as_str()), (1, ""));
    assert!(ran.err.contains("/no/such/plan.json"), "{}", ran.err);
    let folder = tempfile::tempdir().unwrap();
    assert_eq!(crestline(&["check", folder.path().to_str().unwrap()], "").status, 1);
}

#[test]
fn what_is_no_plan_gives_two_and_says_what_it_is() {
    for (input, word) in
        [("", "JSON"), ("not a plan", "JSON"), ("[]", "object"), ("{\"format\": 3}", "format")]
    {
        let ran = crestline(&["solve", "-"], input);
        assert_eq!((ran.status, ran.out.as_str()), (2, ""), "{input}");
        assert!(ran.err.contains(word) && ran.err.contains("standard input"), "{input}: {}", ran.err);
    }
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("utf16.json");
    std::fs::write(&path, b"\xff\xfe{\0}\0").unwrap();
    let ran = crestline(&["check", path.to_str().unwrap()], "");
    assert_eq!(ran.status, 2);
    assert!(ran.err.contains("UTF-16"), "{}", ran.err);
}

#[test]
fn a_byte_order_mark_does_no_harm() {
    let marked = format!("\u{feff}{}", example("steel_six"));
    assert_eq!(crestline(&["check", "-"], &marked).status, 0);
}

#[test]
fn a_reader_that_has_gone_ends_a_command_quietly() {
    let mut err = Vec::new();
    let mut gone = Failing(ErrorKind::BrokenPipe);
    let status = finished(&["solve", "--json", "-"], example("bass_four"), &mut gone, &mut err);
    assert_eq!(status, 1);
    let said = String::from_utf8(err).unwrap();
    assert!(said.lines().all(|line| line.contains("note") || line.contains("warning")), "{said}");
    assert_eq!(finished(&["--help"], "", &mut Failing(ErrorKind::BrokenPipe), &mut Vec::new()), 1);
}

#[test]
fn a_full_disk_is_said_and_gives_one() {
    let mut err = Vec::new();
    let status = finished(&["example", "bass_four"], "", &mut Failing(ErrorKind::StorageFull), &mut err);
    assert_eq!(status, 1);
    assert!(String::from_utf8(err).unwrap().contains("standard output"));
}

#[test]
fn silence_on_standard_error_is_no_failure() {
    let status = finished(&["check", "-"], "{}", &mut Vec::new(), &mut Failing(ErrorKind::BrokenPipe));
    assert_eq!(status, 2);
}
