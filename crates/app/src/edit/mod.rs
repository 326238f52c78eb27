//! The work at hand: the plan, its history, and what comes of it.

pub mod catalogue;
pub mod command;
pub mod desk;
pub mod history;
pub mod spread;
pub mod strings;
