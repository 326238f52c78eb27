//! The program `crestline`: a window, or a command where the arguments name one.

use std::io::{self, Write};
use std::process::ExitCode;

use crestline_cli::{Outcome, STATUS_FAILED, Streams};

fn main() -> ExitCode {
    match command_line() {
        Outcome::Finished(status) => ExitCode::from(status),
        Outcome::Window(path) => window(path),
    }
}

/// Does the command that the arguments name. The streams are free again before a window opens.
fn command_line() -> Outcome {
    let mut streams = Streams {
        input: &mut io::stdin().lock(),
        output: &mut io::stdout().lock(),
        messages: &mut io::stderr().lock(),
    };
    crestline_cli::run(std::env::args_os(), &mut streams)
}

fn window(path: Option<std::path::PathBuf>) -> ExitCode {
    match crestline_window::shell::launch::launch(path) {
        Ok(()) => ExitCode::SUCCESS,
        Err(words) => {
            // Nobody is left to be told where even this fails.
            let _ = writeln!(io::stderr(), "crestline: {words}");
            ExitCode::from(STATUS_FAILED)
        }
    }
}
