//! Tests of the whole program against sources outside it, one room a subject.
//!
//! There is nothing here for other crates to use: the rooms are compiled for `cargo test` only.

#[cfg(test)]
mod places;
#[cfg(test)]
mod tidy;
