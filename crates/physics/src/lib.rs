//! Physics of a fretted string: why fretted notes go sharp, and where nut edge and saddle crest must stand.
//!
//! A string pressed to a fret is stretched and, being stiff, sounds as if it were shorter. This crate works out
//! both from the string's section ([`section`]), the neck in plan ([`neck`]), the taut path over the crowns
//! ([`path`]), the exact first mode of a stiff string ([`mode`]) and the pressed string as a whole
//! ([`fretting`]), and finds the setbacks that make the errors small ([`fit`]); from tuner readings it goes the other way, to what an
//! instrument most probably is ([`diagnose`]).
//!
//! It is not a plan, a file or a window: plain numbers in, plain numbers out, no clock, no thread, no printing.
//! Lengths are millimetres, forces newtons, moduli gigapascals, bending stiffness N·mm², unit mass kg/m,
//! frequencies hertz, errors cents. In plan x runs from the nut toward the bridge and y toward string 1; along a
//! string s runs from the nominal nut line, z is up.

pub mod diagnose;
pub mod error;
pub mod fit;
pub mod fretting;
pub mod mode;
pub mod near;
pub mod neck;
pub mod path;
mod root;
pub mod section;

pub use error::PhysicsError;
pub use fretting::{Contacts, FrettedString, Note, OpenString, StringSetup};
pub use section::StringProperties;
