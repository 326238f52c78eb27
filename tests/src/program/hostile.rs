//! Files that are no plans at all: very long and very deep ones are refused in bounded memory.
#![cfg(target_os = "linux")]

use std::fs::{self, File};
use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};

use super::{assert_quiet_end, example, program};

/// A hundred million bytes: more than any plan, and more than the memory that is given.
const LONG_BYTES: usize = 100_000_000;
/// Short enough to be read, 16 MiB being the limit.
const LONGEST_READ_BYTES: usize = 16_000_000;
const DEEP_LEVELS: usize = 100_000;
/// Address space for the program in KiB. A solve of the largest example needs about 30 MB of memory, and a debug build of the whole
/// program maps about as much again; the longest text that is read is 16 MiB. Less than the 100 MB of a file.
const MEMORY_KIB: usize = 250_000;

/// A thousand faults are listed one by one, with a line before and one after them.
const MOST_LINES: usize = 1010;

/// Runs a command of the program with no more address space than allowed.
fn in_bounded_memory(arguments: &[&Path]) -> Output {
    let program = program();
    let mut shell = Command::new("sh");
    shell.args(["-c", &format!("ulimit -v {MEMORY_KIB} && exec \"$0\" \"$@\"")]);
    // The name of the allocator's arenas: one a thread would take address space without using it.
    shell.env("MALLOC_ARENA_MAX", "1").arg(program.get_program()).args(arguments);
    shell.output().expect("a shell runs the program")
}

/// A file that is `piece` over and over, `bytes` long at least.
fn repeated(folder: &Path, name: &str, start: &str, piece: &str, bytes: usize) -> PathBuf {
    let path = folder.join(name);
    let mut file = File::create(&path).unwrap();
    file.write_all(start.as_bytes()).unwrap();
    let block = piece.repeat(100_000 / piece.len() + 1);
    let mut left = bytes;
    while left > 0 {
        let part = &block.as_bytes()[..block.len().min(left)];
        file.write_all(part).unwrap();
        left -= part.len();
    }
    path
}

#[test]
fn the_memory_given_is_enough_for_a_plan_and_too_little_for_a_long_file() {
    let folder = tempfile::tempdir().unwrap();
    let plan = folder.path().join("plan.json");
    fs::write(&plan, example("fanned_eight")).unwrap();
    let (solve, check) = (Path::new("solve"), Path::new("check"));
    assert_quiet_end(&in_bounded_memory(&[solve, &plan]), 0);
    assert_quiet_end(&in_bounded_memory(&[check, &plan]), 0);
    // So that the bound is one: with a third of it nothing runs.
    let mut shell = Command::new("sh");
    shell.args(["-c", &format!("ulimit -v {} && exec \"$0\" check \"$1\"", MEMORY_KIB / 10)]);
    let ended = shell.arg(program().get_program()).arg(&plan).output().unwrap();
    assert_ne!(ended.status.code(), Some(0));
}

#[test]
fn long_and_deep_files_are_refused_in_bounded_memory() {
    let folder = tempfile::tempdir().unwrap();
    let files = [
        repeated(folder.path(), "lists.json", "", "[0,", LONG_BYTES),
        repeated(folder.path(), "digits.json", "", "1234567890", LONG_BYTES),
        repeated(folder.path(), "string.json", "{\"title\": \"", "x", LONG_BYTES),
        repeated(folder.path(), "zeros.json", "", "\0", LONG_BYTES),
        repeated(folder.path(), "deep_lists.json", "", "[", DEEP_LEVELS),
        repeated(folder.path(), "deep_objects.json", "", "{\"a\":", DEEP_LEVELS * 5),
        repeated(
            folder.path(),
            "deep_in_plan.json",
            "{\"format\": \"crestline-plan\", \"strings\": ",
            "[",
            DEEP_LEVELS,
        ),
        // Below the length at which a text is not looked at, so that every value of it is.
        repeated(
            folder.path(),
            "many_values.json",
            "{\"format\": \"crestline-plan\", \"version\": 1, \"strings\": [0",
            ",0",
            4_000_000,
        ),
        repeated(
            folder.path(),
            "many_keys.json",
            "{\"format\": \"crestline-plan\", \"version\": 1, \"x\": 0",
            ", \"x\": 0",
            4_000_000,
        ),
    ];
    for path in &files {
        for command in ["check", "solve", "schedule"] {
            assert_quiet_end(&in_bounded_memory(&[Path::new(command), path]), 2);
        }
    }
}

#[test]
fn files_that_are_whole_but_far_too_large_are_refused_in_bounded_memory() {
    let folder = tempfile::tempdir().unwrap();
    let head = "{\"format\": \"crestline-plan\", \"version\": 1, \"strings\": [0";
    for (name, count) in [("values.json", 1_900_000), ("fewer.json", 100_000)] {
        let path = repeated(folder.path(), name, head, ",0", 2 * count);
        File::options().append(true).open(&path).unwrap().write_all(b"]}").unwrap();
        let ended = in_bounded_memory(&[Path::new("check"), &path]);
        assert_quiet_end(&ended, 2);
        let lines = ended.stderr.iter().filter(|byte| **byte == b'\n').count();
        assert!(lines < MOST_LINES, "{name}: {lines} lines of faults");
    }
}

#[test]
fn a_long_table_of_readings_is_refused_in_bounded_memory() {
    let folder = tempfile::tempdir().unwrap();
    let plan = folder.path().join("plan.json");
    fs::write(&plan, example("steel_six")).unwrap();
    for (name, piece) in [
        ("rows.csv", "1,12,fretted,6.5\n"),
        ("field.csv", "x"),
        ("quoted.csv", "\"a\n"),
        ("odd.csv", "odd\n"),
    ] {
        // One too long to be looked at, and one just short enough.
        for bytes in [LONG_BYTES, LONGEST_READ_BYTES] {
            let table = repeated(folder.path(), name, "", piece, bytes);
            let ended = in_bounded_memory(&[Path::new("diagnose"), &plan, Path::new("--readings"), &table]);
            assert_quiet_end(&ended, 2);
            let lines = ended.stderr.iter().filter(|byte| **byte == b'\n').count();
            assert!(lines < MOST_LINES, "{name}: {lines} lines of faults");
        }
    }
}
