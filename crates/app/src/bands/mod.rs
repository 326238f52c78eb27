//! The page `How sure`: how far the setbacks and the errors of a plan can be trusted, and what to measure to trust
//! them more.

pub mod band_plot;
pub mod fields;
pub mod headline;
pub mod next;
pub mod on_plots;
pub mod page;
pub mod sampling;
pub mod share_bars;
pub mod state;
pub mod string_table;
pub mod tolerances;
mod work;
