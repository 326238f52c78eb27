//! The three standard streams, as values that a test can replace.

use std::io::{Read, Write};

/// Where a command reads its standard input and writes its results and messages.
pub struct Streams<'a> {
    /// Standard input; read only where a plan is given as `-`.
    pub input: &'a mut dyn Read,
    /// Standard output; holds the result of a command and nothing else.
    pub output: &'a mut dyn Write,
    /// Standard error; holds faults, notices and failures.
    pub messages: &'a mut dyn Write,
}
