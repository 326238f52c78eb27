//! What leaves the program for the bench: the dimensioned paper drawing, the drawing for a machine table,
//! and the schedule, all from a solved plan.
//!
//! * [`sheets`]: views in true size on paper, with a check line to measure before cutting;
//! * [`machine`]: the plan view with its origin at the datum, layer by layer ready to drill and cut;
//! * [`schedule_csv`]: one row a string;
//! * [`export`]: any of them as the bytes of a file.
//!
//! Everything is a pure function of the plan, its solution and the [`SheetOptions`]; nothing reads a clock
//! or a file. x runs away from the nut and y toward string 1 in every view, as in the plan frame.

mod block;
mod cautions;
mod export;
mod facts;
mod furniture;
mod layers;
mod legend;
mod lengths;
mod machine;
mod nut_view;
mod options;
mod pack;
mod paper;
mod plan_dimensions;
mod plan_view;
mod profile;
mod schedule;
mod spread;
mod table;
mod tables;
mod template;
mod tile;

pub use export::{Format, export};
pub use lengths::LengthUnits;
pub use machine::machine;
pub use options::{Contents, SheetOptions};
pub use paper::sheets;
pub use schedule::schedule_csv;
