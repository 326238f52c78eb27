//! The crate against the independent computation of `tests/reference`, which shares no code with it.
#![allow(clippy::unwrap_used, missing_docs)]

mod modes;
mod read;
mod whole_strings;
