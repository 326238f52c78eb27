//! The table of string materials, usual cores and common sets, and strings made from it.
//!
//! A string is entered as a gauge, plain or wound, and a material: [`StringMake::string`] fills in the rest, and
//! everything stays editable. [`estimates`] says which figures of a plan still rest on the table.

mod estimates;
mod make;
mod table;

pub use estimates::{Estimate, estimate_notes, estimates};
pub use make::StringMake;
pub use table::{Construction, Material, Modulus, SetString, StringSet, StringTable, string_table};
