//! The built program as a process of its own: pipes, full disks, odd arguments, and being killed.
#![cfg(unix)]

mod hostile;
mod writing;

use std::ffi::OsStr;
use std::fs;
use std::io::{Read, Write};
use std::os::unix::ffi::OsStrExt;
use std::path::{Path, PathBuf};
use std::process::{Child, Command, Output, Stdio};

/// The program beside the tests in the target folder; `cargo test --workspace` and `cargo build` put it there.
fn program() -> Command {
    let tests = std::env::current_exe().expect("a test knows its own file");
    let path = tests.ancestors().nth(2).expect("tests lie in target/debug/deps").join("crestline");
    assert!(path.exists(), "{} is missing: run `cargo build --bins` first", path.display());
    Command::new(path)
}

fn example(name: &str) -> &'static str {
    crestline_plan::example(name).unwrap_or_else(|| panic!("no example {name}")).text
}

fn plan_in(folder: &Path) -> PathBuf {
    let path = folder.join("plan.json");
    fs::write(&path, example("steel_six")).unwrap();
    path
}

fn started(arguments: &[&OsStr]) -> Child {
    let mut program = program();
    program.args(arguments).stdin(Stdio::piped()).stdout(Stdio::piped()).stderr(Stdio::piped());
    program.spawn().expect("the program starts")
}

/// Feeds a plan to a command and waits for its end. The command may end before it has read everything.
fn fed(mut child: Child, input: &str) -> Output {
    let mut stdin = child.stdin.take().expect("standard input is a pipe");
    let _ = stdin.write_all(input.as_bytes());
    drop(stdin);
    child.wait_with_output().expect("the program ends")
}

fn words(arguments: &[&'static str]) -> Vec<&'static OsStr> {
    arguments.iter().map(|&word| OsStr::new(word)).collect()
}

#[track_caller]
fn assert_quiet_end(output: &Output, status: i32) {
    let said = String::from_utf8_lossy(&output.stderr);
    assert_eq!(output.status.code(), Some(status), "{said}");
    assert!(!said.contains("panicked") && !said.contains("RUST_BACKTRACE"), "{said}");
}

#[test]
fn one_command_feeds_another() {
    let plan = fed(started(&words(&["example", "mandolin"])), "");
    assert_quiet_end(&plan, 0);
    let solved = fed(started(&words(&["solve", "--json", "-"])), &String::from_utf8(plan.stdout).unwrap());
    assert_quiet_end(&solved, 0);
    let report: serde_json::Value = serde_json::from_slice(&solved.stdout).unwrap();
    assert_eq!(report["strings"].as_array().map(Vec::len), Some(8));
}

#[test]
fn a_pipe_closed_before_the_first_byte_ends_it_quietly() {
    for arguments in [&["solve", "--json", "-"][..], &["sheet", "-", "-o", "-", "--format", "pdf"]] {
        let mut child = started(&words(arguments));
        drop(child.stdout.take());
        let ended = fed(child, example("bass_four"));
        assert_quiet_end(&ended, 1);
        assert!(
            !String::from_utf8_lossy(&ended.stderr).contains("pipe"),
            "a closed pipe is not worth a word"
        );
    }
}

#[test]
fn a_pipe_closed_in_the_middle_ends_it_quietly() {
    let mut child = started(&words(&["sheet", "-", "-o", "-", "--format", "svg"]));
    child.stdin.take().unwrap().write_all(example("fanned_eight").as_bytes()).unwrap();
    let mut stdout = child.stdout.take().unwrap();
    stdout.read_exact(&mut [0; 16]).expect("the drawing begins");
    drop(stdout);
    assert_quiet_end(&child.wait_with_output().unwrap(), 1);
}

#[test]
fn arguments_need_not_be_unicode() {
    let odd = OsStr::from_bytes(b"\xff\xfe.json");
    assert_quiet_end(&program().args([OsStr::new("solve"), odd]).output().unwrap(), 1);
    assert_quiet_end(&program().args([OsStr::new("example"), odd]).output().unwrap(), 2);
    let folder = tempfile::tempdir().unwrap();
    let output = folder.path().join(OsStr::from_bytes(b"\xff.json"));
    let ended = program().args(["example", "mandolin", "-o"]).arg(&output).output().unwrap();
    assert_quiet_end(&ended, 0);
    assert_eq!(fs::read_to_string(output).unwrap(), example("mandolin"));
}
