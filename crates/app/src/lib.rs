//! The window of Crestline: the plan's inputs on one side, the saddle that comes of them on the other.
//!
//! Three states in three structs: [`edit::desk::Desk`] holds the plan document and the last good solution,
//! [`view::View`] what the window shows and how. Panels write to the plan and hand back
//! [`edit::history::Edit`]s, or ask for [`edit::command::Command`]s, which [`shell::obey`] carries out in one place.
//! Nothing is computed here: every figure comes from `crestline_plan`.

pub mod bands;
pub mod choices;
pub mod edit;
pub mod fields;
pub mod help;
pub mod hints;
pub mod inputs;
pub mod keep;
pub mod painter;
pub mod papers;
pub mod repair;
pub mod results;
pub mod shell;
pub mod theme;
pub mod units;
pub mod view;
