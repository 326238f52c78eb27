//! The plan: what a maker enters, what is wrong with it, and what comes of it.
//!
//! [`read`] turns a file's text into a [`Plan`]; [`check`] turns a plan into a [`Checked`] one or lists
//! every fault; [`solve`] turns a checked plan into a [`Solution`]. Nothing here reads a file or a clock.

mod document;
mod fault;
mod solution;

pub use document::*;
pub use fault::Fault;
pub use solution::*;

use crestline_physics as _;

/// Reads a plan from its text.
///
/// # Errors
/// All faults of the text: unknown and missing keys, wrong types, and values out of range.
pub fn read(text: &str) -> Result<Plan, Vec<Fault>> {
    let _ = text;
    Err(vec![])
}

/// The plan as the text of a file, indented, with a line end at its end.
#[must_use]
pub fn write(plan: &Plan) -> String {
    let _ = plan;
    String::new()
}

/// A plan that is known to be legal; made by [`check`] only.
#[derive(Debug, Clone, PartialEq)]
pub struct Checked {
    plan: Plan,
}

impl Checked {
    /// The plan.
    #[must_use]
    pub fn plan(&self) -> &Plan {
        &self.plan
    }
}

/// Checks every value of a plan.
///
/// # Errors
/// All faults, each with its path and the allowed range.
pub fn check(plan: &Plan) -> Result<Checked, Vec<Fault>> {
    Ok(Checked { plan: plan.clone() })
}

/// Solves a checked plan.
///
/// # Errors
/// A fault that only the computation can find, such as a pitch that the string's stiffness alone exceeds.
pub fn solve(checked: &Checked) -> Result<Solution, Vec<Fault>> {
    let _ = checked;
    Err(vec![])
}

/// Works out every pair of saddle and nut style for a checked plan.
///
/// # Errors
/// As [`solve`].
pub fn compare(checked: &Checked) -> Result<Comparison, Vec<Fault>> {
    let _ = checked;
    Err(vec![])
}

/// An example plan that the program carries.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Example {
    /// The name used on the command line.
    pub name: &'static str,
    /// One line on what it is.
    pub summary: &'static str,
    /// The plan file's text.
    pub text: &'static str,
}

/// The example plans, the one the window opens on first.
pub const EXAMPLES: &[Example] = &[];
