//! The page `Sheets`: the drawing as it will print, painted from the same model that the files are written from.

pub mod page;
pub mod paint;
pub mod preview;
