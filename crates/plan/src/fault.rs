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
