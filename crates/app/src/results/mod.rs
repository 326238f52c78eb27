//! What comes of the plan: the saddle in plan, the errors of the fretted notes, and the schedule.

pub mod axes;
pub mod camera;
pub mod error_plot;
pub mod figures;
pub mod hover;
pub mod layout_page;
pub mod layout_plot;
pub mod marks;
pub mod notes_page;
pub mod notices;
pub mod nut_plot;
pub mod plan_items;
pub mod schedule;
pub mod sides;
pub mod split_plot;
pub mod table;
