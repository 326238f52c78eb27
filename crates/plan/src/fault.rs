//! What is wrong with a plan, said so that its user can mend it.

use std::fmt;

/// One fault of a plan: where it is, what was found and what is allowed.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Fault {
    /// Path of the field, such as `strings[2].core.diameter_mm`; empty for the whole file.
    pub path: String,
    /// What was found, in words.
    pub found: String,
    /// What is allowed, in words.
    pub allowed: String,
}

impl Fault {
    /// A fault of the field at `path`.
    pub fn new(path: impl Into<String>, found: impl Into<String>, allowed: impl Into<String>) -> Self {
        Self { path: path.into(), found: found.into(), allowed: allowed.into() }
    }
}

impl fmt::Display for Fault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        if !self.path.is_empty() {
            write!(f, "{}: ", self.path)?;
        }
        write!(f, "found {}; allowed: {}", self.found, self.allowed)
    }
}

/// A text in quotes, cut to a length that a message can bear, control characters escaped.
pub(crate) fn quoted(text: &str) -> String {
    const LONGEST: usize = 60;
    let short: String = text.chars().take(LONGEST).collect();
    let more = if short.len() < text.len() { "…" } else { "" };
    format!("{:?}", format!("{short}{more}"))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_fault_reads_as_a_line() {
        let fault = Fault::new("strings[2].core.diameter_mm", "-1", "0.05 to 10 mm");
        assert_eq!(fault.to_string(), "strings[2].core.diameter_mm: found -1; allowed: 0.05 to 10 mm");
        assert_eq!(Fault::new("", "7 bytes", "fewer").to_string(), "found 7 bytes; allowed: fewer");
    }

    #[test]
    fn quoted_text_is_short_and_cannot_steer_a_terminal() {
        assert_eq!(quoted("Ä\u{1b}[2J\n\u{202e}"), "\"Ä\\u{1b}[2J\\n\\u{202e}\"");
        assert_eq!(quoted(&"x".repeat(1_000_000)).chars().count(), 63);
    }
}
