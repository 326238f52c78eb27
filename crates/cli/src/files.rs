//! Plan files in, result files out: whole or not at all. The window uses the same functions.

mod read;
mod replace;

pub use read::{LARGEST_PLAN_BYTES, plan_text, read_plan_text};
pub use replace::{is_same_file, replace};
