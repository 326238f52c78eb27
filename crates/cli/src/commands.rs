//! What each command does.

use std::ffi::OsString;
use std::path::{Path, PathBuf};

use clap::Parser;
use clap::error::ErrorKind;
use crestline_plan::{Checked, EXAMPLES, Solution};

use crate::arguments::{Arguments, Bench, Command, Compare, Example, Rounding, Solve, is_standard};
use crate::failure::{STATUS_DONE, STATUS_REFUSED};
use crate::text::safe;
use crate::{
    Failure, Streams, batch, bench_files, bench_table, diagnosing, files, print, solve_table, styles,
    uncertainty, workshop_table,
};

/// What the arguments ask for.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Outcome {
    /// A window, on this plan file or on the example that the window opens with.
    Window(Option<PathBuf>),
    /// Nothing more: the command is done, with this exit status.
    Finished(u8),
}

/// Reads the arguments, of which the first is the program's name, and does the command among them.
///
/// Nothing is printed but through `streams`, and nothing fails but by the exit status.
pub fn run<I>(arguments: I, streams: &mut Streams<'_>) -> Outcome
where
    I: IntoIterator,
    I::Item: Into<OsString> + Clone,
{
    let arguments = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => arguments,
        Err(error) => return Outcome::Finished(explained(&error, streams)),
    };
    let done = match arguments.command {
        Some(command) => dispatched(&command, streams),
        None => match window_plan(arguments.plan) {
            Ok(plan) => return Outcome::Window(plan),
            Err(failure) => Err(failure),
        },
    };
    Outcome::Finished(done.map_or_else(|failure| reported(&failure, streams), |()| STATUS_DONE))
}

/// Prints what the argument reader says: help and version are results, the rest is refused.
fn explained(error: &clap::Error, streams: &mut Streams<'_>) -> u8 {
    let text = error.render().to_string();
    if matches!(error.kind(), ErrorKind::DisplayHelp | ErrorKind::DisplayVersion) {
        let printed = print::result(streams, text.as_bytes());
        return printed.map_or_else(|failure| reported(&failure, streams), |()| STATUS_DONE);
    }
    print::message(streams.messages, text.trim_end());
    STATUS_REFUSED
}

/// Says what went wrong and gives the exit status; a reader that has gone needs no words.
fn reported(failure: &Failure, streams: &mut Streams<'_>) -> u8 {
    if !matches!(failure, Failure::ReaderGone) {
        print::message(streams.messages, &format!("crestline: {failure}"));
    }
    failure.status()
}

/// The plan for the window. The window cannot save to a stream and so does not open one; and a bare word that is no
/// file is more likely a command misspelt.
fn window_plan(plan: Option<PathBuf>) -> Result<Option<PathBuf>, Failure> {
    let Some(path) = plan else { return Ok(None) };
    if is_standard(&path) {
        let words = "the window opens a plan file; a command such as `solve -` reads standard input";
        return Err(Failure::Argument(words.to_owned()));
    }
    let is_bare_word = path.components().count() == 1 && path.extension().is_none();
    if is_bare_word && !path.exists() {
        let word = safe(&path.display().to_string());
        return Err(Failure::Argument(format!(
            "{word} is neither a command nor a file; see crestline --help"
        )));
    }
    Ok(Some(path))
}

fn dispatched(command: &Command, streams: &mut Streams<'_>) -> Result<(), Failure> {
    match command {
        Command::Solve(options) => solve(options, streams),
        Command::Check(options) => check(&options.plan, streams),
        Command::Example(options) => example(options, streams),
        Command::Compare(options) => compare(options, streams),
        Command::Diagnose(options) => diagnosing::diagnose(options, streams),
        Command::Supports(options) => diagnosing::supports(options, streams),
        Command::Bench(options) => bench(options, streams),
        Command::Workshop(options) => workshop(options, streams),
        Command::Uncertainty(options) => uncertainty::uncertainty(options, streams),
        Command::Sheet(options) => bench_files::sheet(options, streams),
        Command::Schedule(options) => bench_files::schedule(options, streams),
    }
}

fn solve(options: &Solve, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let [plan] = options.plans.as_slice() else { return batch::solve(options, streams) };
    if options.lines {
        return batch::solve(options, streams);
    }
    let (checked, solution) = solved(plan, streams)?;
    if options.json {
        print::notices(streams, &solution.report.notices);
        return print::json(streams, &solution.report);
    }
    print::result(streams, solve_table::asked(options, checked.plan(), &solution).as_bytes())
}

/// A plan passes where it can be solved, for some faults show only in the computation.
fn check(path: &Path, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let (_, solution) = solved(path, streams)?;
    print::notices(streams, &solution.report.notices);
    print::result(streams, format!("{}: no fault\n", safe(&shown_name(path))).as_bytes())
}

fn example(options: &Example, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let Some(name) = &options.name else {
        return print::result(streams, example_list().as_bytes());
    };
    let found = EXAMPLES.iter().find(|example| example.name == name);
    let example = found.ok_or_else(|| {
        let name = safe(name);
        Failure::Argument(format!(
            "there is no example {name}; the examples are\n{}",
            example_list().trim_end()
        ))
    })?;
    print::result_to(streams, &options.output, example.text.as_bytes())
}

fn example_list() -> String {
    let longest = EXAMPLES.iter().map(|example| example.name.len()).max().unwrap_or(0);
    EXAMPLES.iter().map(|example| format!("{:longest$}  {}\n", example.name, example.summary)).collect()
}

fn compare(options: &Compare, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let path = &options.plan.plan;
    let checked = checked(path, streams)?;
    let comparison = crestline_plan::compare(&checked).map_err(|faults| refused(path, faults))?;
    if options.json {
        return print::json(streams, &comparison);
    }
    print::result(streams, styles::text(checked.plan(), &comparison).as_bytes())
}

fn bench(options: &Bench, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let (checked, solution) = solved(&options.plan.plan, streams)?;
    let plan = checked.plan();
    let layout =
        crestline_plan::bench_layout_from(plan, &solution, options.datum.unwrap_or(plan.sheet.datum));
    print::notices(streams, &solution.report.notices);
    if options.json {
        return print::json(streams, &layout);
    }
    print::result(streams, bench_table::text(&layout).as_bytes())
}

fn workshop(options: &Rounding, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let path = &options.plan.plan;
    let (checked, solution) = solved(path, streams)?;
    let workshop = crestline_plan::workshop(&checked, &solution, options.step)
        .map_err(|faults| refused(path, faults))?;
    print::notices(streams, &solution.report.notices);
    if options.json {
        return print::json(streams, &workshop);
    }
    print::result(streams, workshop_table::text(checked.plan(), &workshop).as_bytes())
}

/// Reads, checks and solves a plan.
pub(crate) fn solved(path: &Path, streams: &mut Streams<'_>) -> Result<(Checked, Solution), Failure> {
    solved_text(path, &text_of(path, streams)?)
}

/// Checks and solves the plan that a text holds; `path` is where it came from.
pub(crate) fn solved_text(path: &Path, text: &str) -> Result<(Checked, Solution), Failure> {
    let checked = checked_text(path, text)?;
    let solution = crestline_plan::solve(&checked).map_err(|faults| refused(path, faults))?;
    Ok((checked, solution))
}

/// Reads and checks a plan.
pub(crate) fn checked(path: &Path, streams: &mut Streams<'_>) -> Result<Checked, Failure> {
    checked_text(path, &text_of(path, streams)?)
}

fn checked_text(path: &Path, text: &str) -> Result<Checked, Failure> {
    let plan = crestline_plan::read(text).map_err(|faults| refused(path, faults))?;
    crestline_plan::check(&plan).map_err(|faults| refused(path, faults))
}

/// The text of a file, or of standard input for `-`.
pub(crate) fn text_of(path: &Path, streams: &mut Streams<'_>) -> Result<String, Failure> {
    if is_standard(path) {
        files::plan_text(&shown_name(path), streams.input)
    } else {
        files::read_plan_text(path)
    }
}

/// The failure of a plan that has faults.
pub(crate) fn refused(path: &Path, faults: Vec<crestline_plan::Fault>) -> Failure {
    Failure::Faults { name: shown_name(path), faults }
}

/// The plan's name in messages.
pub(crate) fn shown_name(path: &Path) -> String {
    if is_standard(path) { "standard input".to_owned() } else { path.display().to_string() }
}
