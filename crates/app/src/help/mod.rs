//! The page on the model: what is computed, how far it can be trusted, and where it comes from.

pub mod page;
pub mod text;
