//! What the window says about a field: what it is, how it is measured, its usual range, and a sketch of it.

pub mod card;
mod parts;
mod pen;
mod sketch;
mod spreads;
mod topics;

pub use sketch::Sketch;
pub use topics::{Topic, topic};
