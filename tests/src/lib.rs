//! Tests of the whole program against sources outside it, one room a subject.
//!
//! There is nothing here for other crates to use: the rooms are compiled for `cargo test` only.

#![cfg_attr(test, allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, clippy::print_stdout))]

#[cfg(test)]
mod command_line;
#[cfg(test)]
mod instruments;
#[cfg(test)]
mod limits;
#[cfg(test)]
mod places;
#[cfg(test)]
mod program;
#[cfg(test)]
mod published;
#[cfg(test)]
mod reference;
#[cfg(test)]
mod spread;
#[cfg(test)]
mod supports;
#[cfg(test)]
mod tidy;
