//! The arguments, as clap reads them.

use std::path::{Path, PathBuf};

use clap::{Args, Parser, Subcommand};
use crestline_plan::{Datum, Paper, Step, Word};
use crestline_sheets::{Format, LengthUnits};

/// Works out where each string's saddle crest must stand so that fretted notes are in tune.
///
/// Without a command, opens the window on PLAN or on an example.
#[derive(Debug, Parser)]
#[command(
    name = "crestline",
    version,
    args_conflicts_with_subcommands = true,
    after_help = "`-` stands for standard input or output. Exit status: 0 done, 2 the plan or the arguments \
                  are refused, 1 anything else."
)]
pub(crate) struct Arguments {
    /// Plan file to open in the window.
    pub plan: Option<PathBuf>,
    /// What to do without a window.
    #[command(subcommand)]
    pub command: Option<Command>,
}

/// The whole command line as clap describes it, for the manual pages and the completions of shells.
#[must_use]
pub fn description() -> clap::Command {
    <Arguments as clap::CommandFactory>::command()
}

/// The commands.
#[derive(Debug, Subcommand)]
pub(crate) enum Command {
    /// Print setbacks, tensions and remaining errors.
    Solve(Solve),
    /// List every fault of a plan.
    Check(PlanArgument),
    /// Write an example plan; without a name, list the examples.
    Example(Example),
    /// Set every way to make saddle and nut side by side.
    Compare(Compare),
    /// Find from tuner readings what is wrong with an instrument, and what cures it.
    Diagnose(Diagnose),
    /// Fit how firmly nut, frets and saddle hold the strings, from readings and measured crests.
    Supports(Supports),
    /// Print where everything stands from the datum, and how each blank's top is shaped.
    Bench(Bench),
    /// Print setbacks rounded to a step, what that costs, and what a slip costs.
    Workshop(Rounding),
    /// Print how sure the setbacks are, and what to measure to be surer.
    Uncertainty(Spread),
    /// Write the dimensioned drawing at 1:1.
    Sheet(Sheet),
    /// Write the schedule for the jig as CSV.
    Schedule(Schedule),
}

/// The plan that a command works on.
#[derive(Debug, Args)]
pub(crate) struct PlanArgument {
    /// Plan file, or - for standard input.
    #[arg(value_name = "PLAN")]
    pub plan: PathBuf,
}

/// `solve`
#[derive(Debug, Args)]
pub(crate) struct Solve {
    /// Plan files, or - for standard input. Several are solved in parallel, and a faulty one does not stop the rest.
    #[arg(value_name = "PLAN", required = true)]
    pub plans: Vec<PathBuf>,
    /// Print the whole report as JSON; of several plans, one line each.
    #[arg(long)]
    pub json: bool,
    /// Print one line of JSON a plan, even of one plan.
    #[arg(long, conflicts_with = "json")]
    pub lines: bool,
    /// Print the error of every fretted note too.
    #[arg(long, conflicts_with_all = ["json", "lines"])]
    pub frets: bool,
}

impl Solve {
    /// Whether results are for programs.
    pub fn as_json(&self) -> bool {
        self.json || self.lines
    }
}

/// `example`
#[derive(Debug, Args)]
pub(crate) struct Example {
    /// Name of the example.
    pub name: Option<String>,
    /// File to write, or - for standard output.
    #[arg(short, long, value_name = "FILE", default_value = "-", requires = "name")]
    pub output: PathBuf,
}

/// `compare`
#[derive(Debug, Args)]
pub(crate) struct Compare {
    #[command(flatten)]
    pub plan: PlanArgument,
    /// Print the comparison as JSON.
    #[arg(long)]
    pub json: bool,
}

/// `diagnose`
#[derive(Debug, Args)]
pub(crate) struct Diagnose {
    #[command(flatten)]
    pub plan: PlanArgument,
    /// Take the readings from this CSV file (string, fret, kind, cents) in place of the plan's own.
    #[arg(long, value_name = "FILE")]
    pub readings: Option<PathBuf>,
    /// Print the diagnosis as JSON.
    #[arg(long)]
    pub json: bool,
}

/// `supports`
#[derive(Debug, Args)]
pub(crate) struct Supports {
    #[command(flatten)]
    pub plan: PlanArgument,
    /// Take the readings from this CSV file (string, fret, kind, cents) in place of the plan's own.
    #[arg(long, value_name = "FILE")]
    pub readings: Option<PathBuf>,
    /// Write the plan with the fixities found to this file, in place of printing the result.
    #[arg(short, long, value_name = "FILE", conflicts_with = "json")]
    pub output: Option<PathBuf>,
    /// Print the result as JSON.
    #[arg(long)]
    pub json: bool,
}

/// `bench`
#[derive(Debug, Args)]
pub(crate) struct Bench {
    #[command(flatten)]
    pub plan: PlanArgument,
    /// Where x is measured from: nut, twelfth_fret or saddle_line. The plan's own where left out.
    #[arg(long, value_parser = word::<Datum>)]
    pub datum: Option<Datum>,
    /// Print the layout as JSON.
    #[arg(long)]
    pub json: bool,
}

/// `workshop`
#[derive(Debug, Args)]
pub(crate) struct Rounding {
    #[command(flatten)]
    pub plan: PlanArgument,
    /// Step to round to: 0.05mm, 0.1mm, 0.25mm, 0.5mm, 1/64in or 1/32in.
    #[arg(long, value_parser = step, default_value = "0.1mm")]
    pub step: Step,
    /// Print the figures as JSON.
    #[arg(long)]
    pub json: bool,
}

/// `uncertainty`
#[derive(Debug, Args)]
pub(crate) struct Spread {
    #[command(flatten)]
    pub plan: PlanArgument,
    /// Number of instruments in the sample, 64 to 32768. As the plan's tolerances say where left out.
    #[arg(long, value_name = "N")]
    pub samples: Option<u32>,
    /// Number from which the sample is drawn. As the plan's tolerances say where left out.
    #[arg(long, value_name = "S")]
    pub seed: Option<u32>,
    /// How far from true a note may be, for the chances. As the plan's tolerances say where left out.
    #[arg(long, value_name = "CENTS")]
    pub limit: Option<f64>,
    /// Print the whole report as JSON.
    #[arg(long)]
    pub json: bool,
}

/// `sheet`
#[derive(Debug, Args)]
pub(crate) struct Sheet {
    #[command(flatten)]
    pub plan: PlanArgument,
    /// File to write, ending in .svg, .pdf or .dxf, or - for standard output.
    #[arg(short, long, value_name = "FILE")]
    pub output: PathBuf,
    /// Kind of file where its name does not tell: svg, pdf or dxf.
    #[arg(long, value_parser = drawing_format)]
    pub format: Option<Format>,
    /// Paper: a4, a3 or letter. The plan's own where left out.
    #[arg(long, value_parser = word::<Paper>)]
    pub paper: Option<Paper>,
    #[command(flatten)]
    pub frame: Frame,
    /// Date for the title block, in your own words.
    #[arg(long, value_name = "TEXT")]
    pub date: Option<String>,
}

/// `schedule`
#[derive(Debug, Args)]
pub(crate) struct Schedule {
    #[command(flatten)]
    pub plan: PlanArgument,
    /// File to write, or - for standard output.
    #[arg(short, long, value_name = "FILE", default_value = "-")]
    pub output: PathBuf,
    #[command(flatten)]
    pub frame: Frame,
}

/// Units and datum of what is written.
#[derive(Debug, Args)]
pub(crate) struct Frame {
    /// Units: mm, inch or inch_fraction. The plan's own where left out.
    #[arg(long, value_parser = units)]
    pub units: Option<LengthUnits>,
    /// Where x is measured from: nut, twelfth_fret or saddle_line. The plan's own where left out.
    #[arg(long, value_parser = word::<Datum>)]
    pub datum: Option<Datum>,
}

fn word<T: Word>(text: &str) -> Result<T, String> {
    T::from_word(text).ok_or_else(|| format!("allowed: {}", T::all_words()))
}

/// A step by its word, with or without the space before the unit.
fn step(text: &str) -> Result<Step, String> {
    let bare = |word: &str| word.replace(' ', "");
    let found = Step::ALL.iter().find(|step| bare(step.word()) == bare(text));
    found.copied().ok_or_else(|| format!("allowed: {}", Step::all_words()))
}

fn units(text: &str) -> Result<LengthUnits, String> {
    match text {
        "mm" => Ok(LengthUnits::Millimetres),
        "inch" => Ok(LengthUnits::InchDecimal),
        "inch_fraction" => Ok(LengthUnits::InchFraction),
        _ => Err("allowed: mm, inch or inch_fraction".to_owned()),
    }
}

/// The kind of drawing that an ending stands for; a schedule is no drawing.
pub(crate) fn drawing_format(ending: &str) -> Result<Format, String> {
    match Format::of_ending(ending) {
        Some(format) if format != Format::Csv => Ok(format),
        _ => Err("allowed: svg, pdf or dxf".to_owned()),
    }
}

/// Whether a path stands for a standard stream.
pub(crate) fn is_standard(path: &Path) -> bool {
    path == Path::new("-")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_arguments_are_declared_without_contradiction() {
        description().debug_assert();
    }
}
