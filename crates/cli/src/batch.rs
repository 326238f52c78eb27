//! Many plans solved by one command: in parallel, in the order of the arguments, each for itself.

use std::path::Path;

use crestline_plan::{Fault, Report};
use rayon::iter::{IntoParallelIterator, ParallelIterator};
use serde::Serialize;

use crate::arguments::{Solve, is_standard};
use crate::commands::{shown_name, solved_text, text_of};
use crate::failure::STATUS_FAILED;
use crate::text::safe;
use crate::{Failure, Streams, files, print, solve_table};

/// How many plans are worked on before their results are written. It keeps the memory of a long list bounded, and
/// is large beside the number of processors, so that they seldom wait for one another.
const PLANS_AT_ONCE: usize = 128;

/// One line of the results: a plan's report, or why there is none.
#[derive(Serialize)]
struct Line<'a> {
    /// The plan's file as it was named, or "standard input".
    plan: &'a str,
    #[serde(skip_serializing_if = "Option::is_none")]
    report: Option<&'a Report>,
    #[serde(skip_serializing_if = "Option::is_none")]
    faults: Option<Vec<FaultLine<'a>>>,
    #[serde(skip_serializing_if = "Option::is_none")]
    error: Option<String>,
}

#[derive(Serialize)]
struct FaultLine<'a> {
    path: &'a str,
    found: &'a str,
    allowed: &'a str,
}

/// A plan to solve: a file still to be read, or standard input, which only one can read.
enum Source<'a> {
    File(&'a Path),
    Input(Result<String, Failure>),
}

/// What came of one plan: what to print, and the failure where there was one.
struct Solved {
    printed: String,
    failure: Option<Failure>,
}

/// Solves every plan and prints each result as soon as those before it are printed.
///
/// # Errors
/// Where standard output fails, at once; where plans failed, at the end, with their number.
pub(crate) fn solve(options: &Solve, streams: &mut Streams<'_>) -> Result<(), Failure> {
    if options.plans.iter().filter(|path| is_standard(path)).count() > 1 {
        return Err(Failure::Argument("`-` can stand only once among the plans".to_owned()));
    }
    let (mut failed, mut status) = (0, 0);
    for batch in options.plans.chunks(PLANS_AT_ONCE) {
        let sources: Vec<Source<'_>> = batch.iter().map(|path| source(path, streams)).collect();
        let solved: Vec<Solved> = sources.into_par_iter().map(|source| solve_one(source, options)).collect();
        for plan in solved {
            print::result(streams, plan.printed.as_bytes())?;
            if let Some(failure) = plan.failure {
                print::message(streams.messages, &format!("crestline: {failure}"));
                failed += 1;
                status = if status == STATUS_FAILED { status } else { failure.status() };
            }
        }
    }
    match failed {
        0 => Ok(()),
        _ => Err(Failure::Plans { failed, all: options.plans.len(), status }),
    }
}

fn source<'a>(path: &'a Path, streams: &mut Streams<'_>) -> Source<'a> {
    if is_standard(path) { Source::Input(text_of(path, streams)) } else { Source::File(path) }
}

fn solve_one(source: Source<'_>, options: &Solve) -> Solved {
    let (path, text) = match source {
        Source::File(path) => (path, files::read_plan_text(path)),
        Source::Input(text) => (Path::new("-"), text),
    };
    let name = shown_name(path);
    let printed = text.and_then(|text| solved_text(path, &text)).and_then(|(checked, solution)| {
        if options.as_json() {
            line(&Line { plan: &name, report: Some(&solution.report), faults: None, error: None })
        } else {
            Ok(format!("{}\n\n{}\n", safe(&name), solve_table::asked(options, checked.plan(), &solution)))
        }
    });
    match printed {
        Ok(printed) => Solved { printed, failure: None },
        Err(failure) if options.as_json() => {
            Solved { printed: failed_line(&name, &failure), failure: Some(failure) }
        }
        Err(failure) => Solved { printed: String::new(), failure: Some(failure) },
    }
}

fn failed_line(name: &str, failure: &Failure) -> String {
    let line_of = |faults, error| line(&Line { plan: name, report: None, faults, error }).unwrap_or_default();
    match failure {
        Failure::Faults { faults, .. } => line_of(Some(faults.iter().map(fault_line).collect()), None),
        other => line_of(None, Some(other.to_string())),
    }
}

fn fault_line(fault: &Fault) -> FaultLine<'_> {
    FaultLine { path: &fault.path, found: &fault.found, allowed: &fault.allowed }
}

fn line(line: &Line<'_>) -> Result<String, Failure> {
    let text = serde_json::to_string(line).map_err(|error| Failure::Output(error.to_string()))?;
    Ok(text + "\n")
}
