//! Everything that ends a command early, with its exit status.

use std::io;

use crestline_plan::Fault;

use crate::text::{clipped, safe};

/// Exit status of a command that did what it was asked.
pub const STATUS_DONE: u8 = 0;
/// Exit status where something other than the plan or the arguments went wrong, such as a full disk.
pub const STATUS_FAILED: u8 = 1;
/// Exit status where the plan or the arguments are refused.
pub const STATUS_REFUSED: u8 = 2;

/// The widest a part of a message may be; a hostile plan can hold a field of many megabytes.
const MESSAGE_WIDTH: usize = 400;

/// Why a command could not be done.
#[derive(Debug, thiserror::Error)]
pub enum Failure {
    /// The plan has faults.
    #[error("{}", fault_list(name, faults))]
    Faults {
        /// The plan's file name, or "standard input".
        name: String,
        /// Every fault found.
        faults: Vec<Fault>,
    },
    /// The input is not text that a plan could be in.
    #[error("{name}: {reason}")]
    NotAPlan {
        /// The plan's file name, or "standard input".
        name: String,
        /// What it is instead, and what to do.
        reason: String,
    },
    /// An argument that the argument reader lets through but the command refuses.
    #[error("{0}")]
    Argument(String),
    /// A file or standard input cannot be read.
    #[error("cannot read {name}: {source}")]
    Read {
        /// The file's name, or "standard input".
        name: String,
        /// What the system said.
        source: io::Error,
    },
    /// A file or standard output cannot be written.
    #[error("cannot write {name}: {source}")]
    Write {
        /// The file's name, or "standard output".
        name: String,
        /// What the system said.
        source: io::Error,
    },
    /// Some of many plans could not be solved; each has been spoken of already.
    #[error("{failed} of {all} plans could not be solved")]
    Plans {
        /// How many.
        failed: usize,
        /// Of how many.
        all: usize,
        /// The exit status: that of a refusal where all were refused.
        status: u8,
    },
    /// Whoever read the output has stopped reading; nothing is said about it.
    #[error("the reader of the output has gone")]
    ReaderGone,
    /// The result could not be put into its output form.
    #[error("cannot make the output: {0}")]
    Output(String),
}

impl Failure {
    /// The exit status that belongs to this failure.
    #[must_use]
    pub fn status(&self) -> u8 {
        match self {
            Self::Faults { .. } | Self::NotAPlan { .. } | Self::Argument(_) => STATUS_REFUSED,
            Self::Plans { status, .. } => *status,
            Self::Read { .. } | Self::Write { .. } | Self::ReaderGone | Self::Output(_) => STATUS_FAILED,
        }
    }

    /// A failure to write to standard output; a closed pipe is told apart, because it ends a command quietly.
    pub(crate) fn of_output(source: io::Error) -> Self {
        if source.kind() == io::ErrorKind::BrokenPipe {
            Self::ReaderGone
        } else {
            Self::Write { name: "standard output".into(), source }
        }
    }
}

/// The faults of a plan, one a line under a heading.
fn fault_list(name: &str, faults: &[Fault]) -> String {
    let count = match faults.len() {
        1 => "1 fault".to_owned(),
        more => format!("{more} faults"),
    };
    let mut lines = format!("{}: refused, {count}", safe(name));
    for fault in faults {
        lines.push_str("\n  ");
        lines.push_str(&fault_line(fault));
    }
    lines
}

/// One fault on one line, whatever its field held.
fn fault_line(fault: &Fault) -> String {
    let part = |text: &str| clipped(&safe(text), MESSAGE_WIDTH);
    Fault::new(part(&fault.path), part(&fault.found), part(&fault.allowed)).to_string()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_fault_has_its_own_line_with_its_path() {
        let faults = vec![
            Fault::new("strings[2].core.diameter_mm", "-1", "0.05 to 5 mm"),
            Fault::new("", "nothing", "a JSON object"),
        ];
        let shown = Failure::Faults { name: "a.json".into(), faults }.to_string();
        let lines: Vec<&str> = shown.lines().collect();
        assert_eq!(lines.len(), 3);
        assert!(lines[0].contains("a.json") && lines[0].contains("2 faults"));
        assert!(lines[1].contains("strings[2].core.diameter_mm: found -1; allowed: 0.05 to 5 mm"));
        assert!(lines[2].contains("found nothing"));
    }

    #[test]
    fn a_fault_cannot_forge_a_line_or_drive_the_terminal() {
        let faults = vec![Fault::new("a\nb\u{1b}[2J", "x".repeat(100_000), "less")];
        let shown = Failure::Faults { name: "p".into(), faults }.to_string();
        assert_eq!(shown.lines().count(), 2);
        assert!(!shown.contains('\u{1b}'));
        assert!(shown.len() < 3_000);
    }

    #[test]
    fn a_closed_pipe_is_told_apart_from_a_full_disk() {
        let gone = Failure::of_output(io::Error::from(io::ErrorKind::BrokenPipe));
        assert!(matches!(gone, Failure::ReaderGone));
        let full = Failure::of_output(io::Error::from(io::ErrorKind::StorageFull));
        assert!(matches!(full, Failure::Write { .. }));
        assert_eq!((gone.status(), full.status()), (STATUS_FAILED, STATUS_FAILED));
    }
}
