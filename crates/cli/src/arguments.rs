//! The arguments, as clap reads them.

use std::path::{Path, PathBuf};

use clap::{Args, Parser, Subcommand};

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
    #[command(flatten)]
    pub plan: PlanArgument,
    /// Print the whole report as JSON.
    #[arg(long)]
    pub json: bool,
    /// Print the error of every fretted note too.
    #[arg(long, conflicts_with = "json")]
    pub frets: bool,
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

/// Whether a path stands for a standard stream.
pub(crate) fn is_standard(path: &Path) -> bool {
    path == Path::new("-")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_arguments_are_declared_without_contradiction() {
        <Arguments as clap::CommandFactory>::command().debug_assert();
    }
}
