//! What outlives the window: a copy of unsaved work, the plans that were open lately, and the layout.
//!
//! Nothing in here may stand between a user and the plan: a state file that is missing or broken counts as
//! empty, and one that cannot be written is told once.

pub mod autosave;
pub mod difference;
pub mod found;
pub mod layout;
pub mod place;
pub mod recent;
pub mod slot;
pub mod watch;
