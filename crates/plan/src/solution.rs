//! What solving a plan gives: the report (as printed by the command line) and the plan-view layout
//! that windows and drawings share. Millimetres, newtons, hertz, cents and degrees.

use serde::Serialize;

use crate::{NutStyle, SaddleStyle};

/// A solved plan.
#[derive(Debug, Clone, PartialEq)]
pub struct Solution {
    /// The figures, as the command line prints them.
    pub report: Report,
    /// The plan view: lines and outlines in the plan frame.
    pub layout: Layout,
}

/// The solve report, key for key as it is printed in JSON.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Report {
    /// Always `crestline-report`.
    pub format: &'static str,
    /// Version of the report.
    pub version: u64,
    /// One entry a string, string 1 first.
    pub strings: Vec<StringReport>,
    /// The saddle's lines.
    pub saddle: SaddleReport,
    /// Pull of all strings together, N.
    pub total_tension_n: f64,
    /// How the setbacks suit every set of strings, the plan's own first; absent where the plan names no alternatives.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub alternatives: Vec<SetReport>,
    /// What the user should know about the result.
    pub notices: Vec<Notice>,
}

/// One string's figures.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct StringReport {
    /// String number, 1 first.
    pub string: u32,
    /// Its name.
    pub name: String,
    /// Pitch of the open string, Hz.
    pub frequency_hz: f64,
    /// Distance of nominal nut and saddle lines along this string, mm.
    pub scale_mm: f64,
    /// Mass per length, kg/m.
    pub unit_mass_kg_per_m: f64,
    /// Tangent axial stiffness, N.
    pub axial_stiffness_n: f64,
    /// Bending stiffness, N·mm².
    pub bending_stiffness_n_mm2: f64,
    /// Tension of the open string with no setback, N.
    pub tension_n: f64,
    /// Strain of the open string.
    pub strain: f64,
    /// Tension over breaking load; absent where the tensile strength is not given.
    pub breaking_fraction: Option<f64>,
    /// √(EI/T), mm.
    pub bending_length_mm: f64,
    /// Inharmonicity coefficient of the pinned open string.
    pub inharmonicity: f64,
    /// The best contacts for this string alone; with alternatives those that suit its place in all sets together. The errors
    /// are the plan's own string's.
    pub ideal: ContactReport,
    /// Half-width of the 90 % band of the ideal saddle setback to first order, mm: 1.645 standard deviations. Only
    /// where the plan has tolerances.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub plus_minus_mm: Option<f64>,
    /// The contacts that the saddle style gives.
    pub built: BuiltReport,
    /// One entry a fret, fret 1 first.
    pub frets: Vec<FretReport>,
}

/// How the setbacks as built suit one set of strings.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SetReport {
    /// Its name: the title of the plan, or that of the alternative.
    pub name: String,
    /// What it counts against the others.
    pub weight: f64,
    /// Pull of all its strings together, N.
    pub total_tension_n: f64,
    /// Root mean square of its errors as built over all strings and the frets of the fit, cents.
    pub rms_cents: f64,
    /// Largest absolute one, cents.
    pub max_cents: f64,
    /// One entry a string, string 1 first.
    pub strings: Vec<SetStringReport>,
}

/// One string of a set.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SetStringReport {
    /// String number, 1 first.
    pub string: u32,
    /// Its name.
    pub name: String,
    /// Pitch of the open string, Hz.
    pub frequency_hz: f64,
    /// Tension of the open string with no setback, N.
    pub tension_n: f64,
    /// Tension over breaking load; absent where the tensile strength is not given.
    pub breaking_fraction: Option<f64>,
    /// The best contacts for this string of this set alone.
    pub ideal: ContactReport,
    /// The contacts as built, which all sets share, and what they leave of this string's errors.
    pub built: ContactReport,
    /// One entry a fret, fret 1 first.
    pub frets: Vec<SetFretReport>,
}

/// One fretted note of a set.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SetFretReport {
    /// Fret number.
    pub fret: u32,
    /// Error with no setback at all, cents.
    pub none_cents: f64,
    /// Error with this string's own ideal setbacks, cents.
    pub ideal_cents: f64,
    /// Error with the built setbacks, cents.
    pub built_cents: f64,
    /// The fret that the sounding part of the string touches with no setback, if it buzzes.
    pub touches_fret: Option<u32>,
}

/// Setbacks and what is left of the errors.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ContactReport {
    /// Setback of the crest, away from the nut, mm.
    pub saddle_setback_mm: f64,
    /// Setback of the nut edge, toward the bridge, mm.
    pub nut_setback_mm: f64,
    /// Root mean square of the errors over the frets of the fit, cents.
    pub rms_cents: f64,
    /// Largest absolute error over the frets of the fit, cents.
    pub max_cents: f64,
}

/// Setbacks as built, with the place of the crest.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct BuiltReport {
    /// Setback of the crest, away from the nut, mm.
    pub saddle_setback_mm: f64,
    /// Setback of the nut edge, toward the bridge, mm.
    pub nut_setback_mm: f64,
    /// Root mean square of the errors over the frets of the fit, cents.
    pub rms_cents: f64,
    /// Largest absolute error over the frets of the fit, cents.
    pub max_cents: f64,
    /// The crest in the plan frame, z above the plane of the crowns of the first and last fret.
    pub crest_mm: Point3,
    /// Distance of the crest from the slot's centre line, positive away from the nut; absent for separate pieces.
    pub slot_offset_mm: Option<f64>,
}

/// A point in the plan frame with its height.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Point3 {
    /// Along the centre line from the nominal nut line toward the bridge.
    pub x: f64,
    /// Across, positive toward string 1.
    pub y: f64,
    /// Height.
    pub z: f64,
}

/// A point in the plan frame.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Point {
    /// Along the centre line from the nominal nut line toward the bridge.
    pub x: f64,
    /// Across, positive toward string 1.
    pub y: f64,
}

/// One fretted note.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct FretReport {
    /// Fret number.
    pub fret: u32,
    /// Place of the crown along this string from the nominal nut line, mm.
    pub position_mm: f64,
    /// Error with no setback at all, cents.
    pub none_cents: f64,
    /// Error with the ideal setbacks, cents.
    pub ideal_cents: f64,
    /// Error with the built setbacks, cents.
    pub built_cents: f64,
    /// Error of the existing instrument, cents.
    pub as_built_cents: Option<f64>,
    /// Part of `none_cents` that comes from the length.
    pub length_cents: f64,
    /// Part of `none_cents` that comes from the tension.
    pub tension_cents: f64,
    /// Part of `none_cents` that comes from the unit mass.
    pub mass_cents: f64,
    /// Part of `none_cents` that comes from the bending stiffness.
    pub stiffness_cents: f64,
    /// Force of the finger with no setback, N.
    pub finger_force_n: f64,
    /// The fret that the sounding part of the string touches, if it buzzes.
    pub touches_fret: Option<u32>,
}

/// The saddle's straight lines.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SaddleReport {
    /// The lines of the saddle's style (the slot's centre line for a shaped one, none for separate pieces).
    pub lines: Vec<SaddleLine>,
    /// Whether every crest fits the blank and the travel.
    pub fits: bool,
}

/// A straight line across the strings, cut at the outer strings it serves.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SaddleLine {
    /// Its end on the treble side.
    pub treble: Point,
    /// Its end on the bass side.
    pub bass: Point,
    /// Angle from the square to the centre line; positive where the bass end lies farther from the nut.
    pub slant_degrees: f64,
}

/// How much a notice matters.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Severity {
    /// Good to know.
    Note,
    /// Wants action.
    Warning,
}

/// Something the user should know.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Notice {
    /// How much it matters.
    pub severity: Severity,
    /// Path of the field it concerns, such as `strings[2].core.diameter_mm`; may be empty.
    pub path: String,
    /// The words.
    pub text: String,
}

/// The plan view in the plan frame, for plots and drawings.
#[derive(Debug, Clone, PartialEq)]
pub struct Layout {
    /// One entry a string, string 1 first.
    pub strings: Vec<StringLine>,
    /// The nominal nut line, from its treble end to its bass end.
    pub nut_line: [Point; 2],
    /// The nominal saddle line, from its treble end to its bass end.
    pub saddle_line: [Point; 2],
    /// The fret lines, fret 1 first, each from treble to bass, cut at the outer strings.
    pub frets: Vec<[Point; 2]>,
    /// Place of the chosen datum on the centre line (y = 0), x in mm.
    pub datum_x_mm: f64,
    /// Outlines to be cut or glued: the slot, both slots, or a piece a string; closed, four corners each.
    pub blanks: Vec<[Point; 4]>,
}

/// One string in plan.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StringLine {
    /// Where it crosses the nominal nut line.
    pub nut: Point,
    /// Where it crosses the nominal saddle line.
    pub saddle: Point,
    /// The edge of the nut as built.
    pub nut_edge: Point,
    /// The ideal crest.
    pub ideal_crest: Point,
    /// The crest as built.
    pub crest: Point,
    /// The crest at the least and at the greatest travel.
    pub travel: [Point; 2],
    /// The crest of the existing instrument, if its place is known.
    pub as_built: Option<Point>,
}

/// Every way to make saddle and nut for one plan, side by side.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Comparison {
    /// Always `crestline-comparison`.
    pub format: &'static str,
    /// Version of the comparison.
    pub version: u64,
    /// One row a pair of saddle and nut style.
    pub rows: Vec<ComparisonRow>,
}

/// What one pair of styles leaves of the errors.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ComparisonRow {
    /// The saddle's style.
    pub saddle: SaddleStyle,
    /// The nut's style.
    pub nut: NutStyle,
    /// Strings on the first piece of a two-piece saddle.
    pub split_after: Option<u32>,
    /// Root mean square over all strings and the frets of the fit, cents; with alternatives the weighted one over all sets.
    pub rms_cents: f64,
    /// Largest absolute error over all strings of all sets and the frets of the fit, cents.
    pub max_cents: f64,
    /// The alternative with the largest error, 1 first; absent for the plan's own strings.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub worst_alternative: Option<u32>,
    /// The string with the largest error.
    pub worst_string: u32,
    /// The fret with the largest error.
    pub worst_fret: u32,
    /// Whether every crest fits the blank and the travel.
    pub fits: bool,
    /// Root mean square of every string, cents; with alternatives the weighted one over all sets.
    pub string_rms_cents: Vec<f64>,
    /// Crest setback of every string, mm.
    pub saddle_setback_mm: Vec<f64>,
    /// Nut setback of every string, mm.
    pub nut_setback_mm: Vec<f64>,
}
