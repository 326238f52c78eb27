//! The command line: arguments, files and exit statuses. It opens no window.
//!
//! [`run`] reads the arguments. It either finishes a command and gives the exit status, or finds that a
//! window is wanted and leaves that to the program. Everything a command reads and writes goes through
//! [`Streams`] and the functions of [`files`], which the window uses for its own files too.
//!
//! Exit statuses: 0 done, 2 the plan or the arguments are refused, 1 anything else.
//!
//! ```
//! use crestline_cli::{Outcome, Streams, run};
//!
//! let (mut input, mut output, mut messages) = (std::io::empty(), Vec::new(), Vec::new());
//! let mut streams = Streams { input: &mut input, output: &mut output, messages: &mut messages };
//! assert_eq!(run(["crestline", "--version"], &mut streams), Outcome::Finished(0));
//! assert!(output.starts_with(b"crestline "));
//! ```

mod arguments;
mod batch;
mod bench_files;
mod bench_table;
mod commands;
mod diagnosing;
mod diagnosis_table;
mod failure;
pub mod files;
mod fret_errors;
mod numbers;
mod print;
mod sets_table;
mod solve_table;
mod streams;
mod styles;
mod supports_table;
mod table;
mod text;
mod uncertainty;
mod uncertainty_table;
mod workshop_table;

pub use arguments::description;
pub use commands::{Outcome, run};
pub use failure::{Failure, STATUS_DONE, STATUS_FAILED, STATUS_REFUSED};
pub use streams::Streams;
