//! The window's own fields: they keep what is typed while it is wrong, mark themselves where they stand,
//! and say what is allowed.

pub mod choice;
pub mod draft;
pub mod form;
pub mod number;
pub mod parse;
pub mod pitch;
pub mod row;
pub mod text;
