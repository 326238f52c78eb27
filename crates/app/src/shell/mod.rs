//! The window around the pages: bars, questions, files, and the one place where commands are carried out.

pub mod ask;
pub mod bar;
pub mod disk;
pub mod files;
pub mod finder;
pub mod foot;
pub mod launch;
pub mod obey;
pub mod options;
pub mod path_box;
pub mod picker;
pub mod readings;
pub mod recover;
pub mod timing;
pub mod window;

#[cfg(test)]
#[allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]
mod trials;
