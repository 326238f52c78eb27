//! The page `Diagnosis`: tuner readings in a grid, what they come from, and what cures the instrument.

pub mod answers;
pub mod block;
pub mod causes;
pub mod empty;
pub mod error_plot;
pub mod grid;
pub mod headline;
pub mod inquiry;
pub mod lengths;
pub mod notes;
pub mod page;
pub mod place;
pub mod priors;
pub mod remedies;
pub mod resting;
pub mod state;
pub mod steer;
