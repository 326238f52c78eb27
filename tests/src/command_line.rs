//! The command line in one process: exit statuses, streams, messages and files.

mod batch;
mod bench_files;
mod diagnosis;
mod example_files;
mod faults;
mod report;
mod status;
mod supports;
mod tables;
mod uncertainty;

use std::io::{self, Write};

use crestline_cli::{Outcome, Streams, run};

/// What a command left behind.
struct Ran {
    status: u8,
    out: String,
    err: String,
}

/// Runs a command with some standard input; a window is no command and fails the test.
#[track_caller]
fn crestline(arguments: &[&str], input: &str) -> Ran {
    let (mut out, mut err) = (Vec::new(), Vec::new());
    let status = finished(arguments, input, &mut out, &mut err);
    let text = |bytes| String::from_utf8(bytes).expect("the program writes UTF-8");
    Ran { status, out: text(out), err: text(err) }
}

#[track_caller]
fn finished(arguments: &[&str], input: &str, out: &mut dyn Write, err: &mut dyn Write) -> u8 {
    let mut input = input.as_bytes();
    let arguments = std::iter::once("crestline").chain(arguments.iter().copied());
    match run(arguments, &mut Streams { input: &mut input, output: out, messages: err }) {
        Outcome::Finished(status) => status,
        Outcome::Window(plan) => panic!("a window was asked for, on {plan:?}"),
    }
}

/// A stream on which every write fails in one way.
struct Failing(io::ErrorKind);

impl Write for Failing {
    fn write(&mut self, _: &[u8]) -> io::Result<usize> {
        Err(self.0.into())
    }

    fn flush(&mut self) -> io::Result<()> {
        Err(self.0.into())
    }
}

/// The text of an example plan.
fn example(name: &str) -> &'static str {
    crestline_plan::example(name).unwrap_or_else(|| panic!("no example {name}")).text
}

/// The names of all examples.
fn example_names() -> Vec<&'static str> {
    let names: Vec<_> = crestline_plan::EXAMPLES.iter().map(|example| example.name).collect();
    assert!(names.len() >= 6, "the examples were found");
    names
}
