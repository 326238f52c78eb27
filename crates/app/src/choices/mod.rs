//! The page `Compare`: every way to make saddle and nut side by side, and the figures for setting out.

pub mod page;
pub mod sets;
pub mod setting_out;
pub mod string_plot;
pub mod study;
pub mod styles;
