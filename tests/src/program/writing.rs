//! All commands that write, where writing fails: a full disk, a folder that may only be read, a reader that has gone, a
//! kill in the middle. What was there before stays whole.
#![cfg(target_os = "linux")]

use std::ffi::OsStr;
use std::fs::{self, File};
use std::os::unix::ffi::OsStrExt;
use std::os::unix::fs::PermissionsExt;
use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};
use std::time::Instant;

use super::{assert_quiet_end, example, plan_in, program};

/// Readings of a steel six whose saddle is out, for `diagnose`.
const READINGS: &str = "1,12,fretted,4.0\n1,7,fretted,2.5\n2,12,fretted,5.5\n6,12,fretted,7.0\n";

/// Commands that print their result; PLAN, MEASURED (with contacts as built) and READINGS stand for files.
const PRINTING: [&[&str]; 22] = [
    &["solve", "PLAN"],
    &["solve", "PLAN", "--frets"],
    &["solve", "PLAN", "--json"],
    &["solve", "PLAN", "PLAN", "--lines"],
    &["check", "PLAN"],
    &["compare", "PLAN"],
    &["compare", "PLAN", "--json"],
    &["diagnose", "PLAN", "--readings", "READINGS"],
    &["diagnose", "PLAN", "--readings", "READINGS", "--json"],
    &["supports", "MEASURED", "--readings", "READINGS"],
    &["supports", "MEASURED", "--readings", "READINGS", "--json"],
    &["bench", "PLAN"],
    &["bench", "PLAN", "--json"],
    &["workshop", "PLAN"],
    &["workshop", "PLAN", "--json"],
    &["uncertainty", "PLAN", "--samples", "64"],
    &["uncertainty", "PLAN", "--samples", "64", "--json"],
    &["sheet", "PLAN", "-o", "-", "--format", "svg"],
    &["sheet", "PLAN", "-o", "-", "--format", "pdf"],
    &["schedule", "PLAN"],
    &["example"],
    &["example", "steel_six"],
];

/// Commands that write a file, with the ending of its name.
const WRITING: [(&[&str], &str); 6] = [
    (&["sheet", "PLAN"], "svg"),
    (&["sheet", "PLAN"], "pdf"),
    (&["sheet", "PLAN"], "dxf"),
    (&["schedule", "PLAN"], "csv"),
    (&["example", "fanned_eight"], "json"),
    (&["supports", "MEASURED", "--readings", "READINGS"], "json"),
];

/// A folder with plans and a table of readings.
struct Desk {
    folder: tempfile::TempDir,
    plan: PathBuf,
    measured: PathBuf,
    readings: PathBuf,
}

impl Desk {
    fn new() -> Self {
        let folder = tempfile::tempdir().unwrap();
        let (plan, readings) = (plan_in(folder.path()), folder.path().join("readings.csv"));
        fs::write(&readings, READINGS).unwrap();
        let measured = folder.path().join("measured.json");
        let mut built: serde_json::Value = serde_json::from_str(example("steel_six")).unwrap();
        built["as_built"] = serde_json::json!({ "saddle_setback_mm": [1.0, 1.5, 0.5, 1.0, 1.5, 2.0], "nut_setback_mm": vec![0.0; 6] });
        fs::write(&measured, built.to_string()).unwrap();
        Self { folder, plan, measured, readings }
    }

    fn arguments<'a>(&'a self, words: &[&'a str]) -> Vec<&'a OsStr> {
        let file = |word: &&'a str| match *word {
            "PLAN" => self.plan.as_os_str(),
            "MEASURED" => self.measured.as_os_str(),
            "READINGS" => self.readings.as_os_str(),
            word => OsStr::new(word),
        };
        words.iter().map(file).collect()
    }

    /// The command with its output file, not yet run.
    fn writing(&self, words: &[&str], output: &Path) -> Command {
        let mut command = program();
        command.args(self.arguments(words)).arg("-o").arg(output).stdout(Stdio::null());
        command
    }
}

fn said(output: &Output) -> String {
    String::from_utf8_lossy(&output.stderr).into_owned()
}

/// The names in a folder.
fn names(folder: &Path) -> Vec<PathBuf> {
    let mut names: Vec<_> = fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path()).collect();
    names.sort();
    names
}

#[test]
fn every_command_that_prints_says_that_the_disk_is_full() {
    let desk = Desk::new();
    for words in PRINTING {
        let full = File::options().write(true).open("/dev/full").unwrap();
        let ended = program().args(desk.arguments(words)).stdout(full).output().unwrap();
        assert_quiet_end(&ended, 1);
        assert!(said(&ended).contains("standard output"), "{words:?}: {}", said(&ended));
    }
}

#[test]
fn every_command_that_prints_ends_quietly_when_its_reader_has_gone() {
    let desk = Desk::new();
    for words in PRINTING {
        // Gone before the program begins, so that no short output slips through.
        let (reader, writer) = std::io::pipe().unwrap();
        drop(reader);
        let ended = program().args(desk.arguments(words)).stdout(writer).output().unwrap();
        assert_quiet_end(&ended, 1);
        assert!(!said(&ended).contains("pipe"), "{words:?}: {}", said(&ended));
    }
}

/// A disk that takes no more than a block, by the limit on the size of files; the signal that comes with it is
/// passed over, so that writing fails as on a full disk.
#[test]
fn every_command_that_writes_keeps_the_old_file_when_the_disk_is_full() {
    let desk = Desk::new();
    for (words, ending) in WRITING {
        let target = desk.folder.path().join(format!("kept.{ending}"));
        fs::write(&target, "old").unwrap();
        let before = names(desk.folder.path());
        let writing = desk.writing(words, &target);
        let mut shell = Command::new("sh");
        shell.args(["-c", "trap '' XFSZ; ulimit -f 1; exec \"$0\" \"$@\""]);
        let ended = shell.arg(writing.get_program()).args(writing.get_args()).output().unwrap();
        assert_quiet_end(&ended, 1);
        assert!(said(&ended).contains("kept."), "{words:?}: {}", said(&ended));
        assert_eq!(fs::read(&target).unwrap(), b"old", "{words:?}");
        assert_eq!(names(desk.folder.path()), before, "{words:?}: nothing temporary is left");
    }
}

/// A folder in which nothing can be made: one without permission to write, or for a user who may do everything, the
/// system's own.
fn closed_folder(folder: &Path) -> PathBuf {
    let closed = folder.join("closed");
    fs::create_dir(&closed).unwrap();
    fs::set_permissions(&closed, fs::Permissions::from_mode(0o555)).unwrap();
    if File::create(closed.join("probe")).is_ok() { PathBuf::from("/proc") } else { closed }
}

#[test]
fn every_command_that_writes_says_that_a_folder_cannot_be_written_to() {
    let desk = Desk::new();
    let closed = closed_folder(desk.folder.path());
    for (words, ending) in WRITING {
        let target = closed.join(format!("new-drawing.{ending}"));
        let ended = desk.writing(words, &target).output().unwrap();
        assert_quiet_end(&ended, 1);
        assert!(said(&ended).contains("new-drawing."), "{words:?}: {}", said(&ended));
        assert!(!target.exists(), "{words:?}");
    }
}

#[test]
fn every_command_that_writes_leaves_a_file_that_may_only_be_read() {
    let desk = Desk::new();
    for (words, ending) in WRITING {
        let target = desk.folder.path().join(format!("locked.{ending}"));
        fs::write(&target, "old").unwrap();
        fs::set_permissions(&target, fs::Permissions::from_mode(0o444)).unwrap();
        let ended = desk.writing(words, &target).output().unwrap();
        assert_quiet_end(&ended, 1);
        assert_eq!(fs::read(&target).unwrap(), b"old", "{words:?}");
    }
}

/// Killed at many moments of its run, each command leaves the old file or the new one, and never a part; its plan
/// stays as it was.
#[test]
fn a_kill_of_any_command_that_writes_leaves_the_old_file_or_the_new_one() {
    const KILLS: u32 = 16;
    for (words, ending) in WRITING {
        let desk = Desk::new();
        let target = desk.folder.path().join(format!("drawing.{ending}"));
        let run = || {
            let mut command = desk.writing(words, &target);
            command.stderr(Stdio::null());
            command
        };
        let began = Instant::now();
        assert!(run().status().unwrap().success(), "{words:?}");
        let whole_run = began.elapsed();
        let new = fs::read(&target).unwrap();
        let mut kept = 0;
        for kill in 0..=KILLS {
            fs::write(&target, "old").unwrap();
            let mut child = run().spawn().unwrap();
            // From the start to somewhat past the usual end.
            std::thread::sleep(whole_run * kill * 6 / (5 * KILLS));
            child.kill().unwrap();
            child.wait().unwrap();
            let found = fs::read(&target).unwrap();
            kept += u32::from(found == b"old");
            assert!(found == b"old" || found == new, "{words:?}: {} of {} bytes", found.len(), new.len());
        }
        assert!(kept > 0, "{words:?}: the first kill comes before the end");
        assert_eq!(fs::read_to_string(&desk.plan).unwrap(), example("steel_six"), "{words:?}");
        let known = [&target, &desk.plan, &desk.measured, &desk.readings];
        for path in names(desk.folder.path()) {
            let name = path.file_name().unwrap_or_default();
            assert!(
                known.contains(&&path) || name.as_bytes().starts_with(b".crestline-"),
                "{path:?} was left"
            );
        }
    }
}
