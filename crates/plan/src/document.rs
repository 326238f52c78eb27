//! The plan as plain data, key for key what the file holds.
//!
//! A [`Plan`] may be wrong while someone is editing it. [`crate::check`] turns it into a
//! [`crate::Checked`] plan or lists every fault. Lengths are millimetres unless a name says otherwise.

use serde::Serialize;

use crate::alternative::is_usual_weight;
use crate::{Alternative, Tolerances};

/// The value of the key `format` in every plan file.
pub const FORMAT: &str = "crestline-plan";
/// The newest plan version this program reads, and the one it writes.
pub const VERSION: u64 = 1;

/// A whole plan: the instrument, its strings, and the saddle and nut wanted for it.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Plan {
    /// Free text, a name for the plan.
    pub title: String,
    /// Free text, where the figures come from and what the maker wants to remember.
    pub notes: String,
    /// Neck, frets and string spacing.
    pub instrument: Instrument,
    /// How a finger presses a string.
    pub pressing: Pressing,
    /// How firmly nut, fret and saddle hold a string against turning.
    pub supports: Supports,
    /// How far the string slips over nut and saddle while it is pressed.
    pub slip: Slip,
    /// One to sixteen strings, string 1 (treble) first.
    pub strings: Vec<PlanString>,
    /// What the errors of these strings count against those of the alternatives, 0.01 to 100.
    #[serde(skip_serializing_if = "is_usual_weight")]
    pub strings_weight: f64,
    /// Other sets of strings and other tunings that the saddle must suit too.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub alternatives: Vec<Alternative>,
    /// Pitch of A4 in hertz, against which notes are read.
    pub reference_hz: f64,
    /// What the setbacks are to make small, and over which frets.
    pub fit: Fit,
    /// Wanted offsets from equal temperament, if the plan tempers its notes.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub targets: Option<Targets>,
    /// The saddle to be made.
    pub saddle: Saddle,
    /// The nut to be made.
    pub nut: Nut,
    /// Where crests and nut edges of an existing instrument are.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub as_built: Option<AsBuilt>,
    /// Tuner readings of an existing instrument.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub readings: Vec<Reading>,
    /// Paper, units and datum of the drawing.
    pub sheet: Sheet,
    /// How far the plan's figures can be trusted, if that is to be followed through.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub tolerances: Option<Tolerances>,
}

/// Neck, frets and string spacing.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Instrument {
    /// One scale, or the outer strings' scales of a fanned neck.
    #[serde(rename = "scale_mm")]
    pub scale: Scale,
    /// Number of frets, 12 to 36.
    pub frets: u32,
    /// Measured fret positions along the centre line from the nominal nut line, one a fret.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub fret_positions_mm: Option<Vec<f64>>,
    /// Whether a zero fret sets the string's height at the nut.
    pub zero_fret: bool,
    /// Greatest dip of the fret crowns below the line through the first and the last, mm.
    pub relief_mm: f64,
    /// Centre distance of the outer strings; may be absent where `across_mm` is given.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub spread_mm: Option<Spread>,
    /// The y of every string at nut and saddle, string 1 first.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub across_mm: Option<Across>,
    /// Height of the fret crowns above the fingerboard, mm; the press depth cannot exceed it.
    pub fret_height_mm: f64,
}

/// One scale for all strings, or a fanned neck.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(untagged)]
pub enum Scale {
    /// The same nominal scale along the centre line for all strings, mm.
    Single(f64),
    /// A fanned neck.
    Fanned(Fan),
}

/// The scales of a fanned neck, along the outer strings' plan lines.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Fan {
    /// Scale of the outer string on the bass side, mm.
    pub bass: f64,
    /// Scale of the outer string on the treble side (string 1), mm.
    pub treble: f64,
    /// The fret number, which may be fractional, that lies square to the centre line.
    pub square_fret: f64,
}

/// Centre distance of the outer strings at the nominal nut and saddle lines, mm.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Spread {
    /// At the nominal nut line.
    pub nut: f64,
    /// At the nominal saddle line.
    pub saddle: f64,
}

/// The y of every string at the nominal nut and saddle lines, mm, string 1 first.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Across {
    /// At the nominal nut line.
    pub nut: Vec<f64>,
    /// At the nominal saddle line.
    pub saddle: Vec<f64>,
}

/// How a finger presses a string.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Pressing {
    /// Distance of the finger behind the fret as a fraction of the fret's space, 0.05 to 0.95.
    pub finger_fraction: f64,
    /// How far the finger pushes the string below the crown of the fret, mm.
    pub depth_mm: f64,
}

/// End fixities, 0 (pinned) to 1 (clamped).
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Supports {
    /// At the nut.
    pub nut: f64,
    /// At the fret.
    pub fret: f64,
    /// At the saddle crest.
    pub saddle: f64,
}

/// Slip at the ends, 0 (gripped) to 1 (frictionless).
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Slip {
    /// Over the nut, toward the head.
    pub head: f64,
    /// Over the saddle, toward the tail.
    pub tail: f64,
}

/// One string.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct PlanString {
    /// Its name; its number where the file gives none.
    pub name: String,
    /// The pitch of the open string.
    pub pitch: Pitch,
    /// The core, which carries the tension.
    pub core: Core,
    /// The wrap, if it is a wound string.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub wrap: Option<Wrap>,
    /// Measured values, each of which overrides the computed one.
    #[serde(skip_serializing_if = "Measured::is_empty")]
    pub measured: Measured,
    /// Height of the open string over the frets.
    pub action_mm: Action,
    /// Length of string behind nut and saddle.
    pub afterlength_mm: Afterlength,
}

/// Pitch of an open string: a note name or a frequency.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Pitch {
    /// Scientific pitch notation with `#` or `b`, such as `B3` or `F#2`.
    Note(String),
    /// Hertz.
    FrequencyHz(f64),
}

/// Cross-section of a core.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum CoreShape {
    /// Round wire; the diameter is its diameter.
    Round,
    /// Hexagonal wire; the diameter is measured across flats.
    Hex,
}

/// The core of a string, or the whole of a plain one.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Core {
    /// Round or hexagonal.
    pub shape: CoreShape,
    /// Diameter, across flats for a hexagonal core, mm.
    pub diameter_mm: f64,
    /// Young's modulus at playing stress, GPa.
    pub youngs_modulus_gpa: f64,
    /// Density, kg/m³.
    pub density_kg_m3: f64,
    /// Tensile strength, MPa; without it no breaking fraction is given.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub tensile_mpa: Option<f64>,
    /// What it is made of, in words.
    pub material: String,
}

/// The wrap of a wound string.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Wrap {
    /// Outside diameter of the wound string, mm.
    pub outside_mm: f64,
    /// Density of the wrap wire, kg/m³.
    pub density_kg_m3: f64,
    /// What it is made of, in words.
    pub material: String,
}

/// Measured string properties; each one given overrides the computed value.
#[derive(Debug, Clone, Copy, PartialEq, Default, Serialize)]
pub struct Measured {
    /// Mass per length as strung at pitch, kg/m.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub unit_mass_kg_per_m: Option<f64>,
    /// Tangent axial stiffness at pitch, N.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub axial_stiffness_n: Option<f64>,
    /// Bending stiffness, N·mm².
    #[serde(skip_serializing_if = "Option::is_none")]
    pub bending_stiffness_n_mm2: Option<f64>,
}

impl Measured {
    /// Whether nothing is measured.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        *self == Self::default()
    }
}

/// Gap between a fret's crown and the underside of the open string, mm.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Action {
    /// Over fret 1; absent on a neck with a zero fret.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub first: Option<f64>,
    /// Over fret 12.
    pub twelfth: f64,
}

/// Length of string behind nut and saddle up to its anchors, mm.
#[derive(Debug, Clone, Copy, PartialEq, Default, Serialize)]
pub struct Afterlength {
    /// Behind the nut.
    pub head: f64,
    /// Behind the saddle.
    pub tail: f64,
}

/// What the setbacks are to make small, and over which frets.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Fit {
    /// The rule.
    pub rule: FitRule,
    /// First and last fret of the fit.
    pub frets: [u32; 2],
}

/// What a fit makes small.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum FitRule {
    /// The sum of squared errors.
    LeastSquares,
    /// The error at fret 12, which becomes zero.
    Twelfth,
    /// The largest error.
    Minimax,
    /// The expected sum of squared errors over what the plan's tolerances (the usual ones where it has none) say that
    /// strings, neck and player may be.
    Robust,
}

/// Wanted offsets from equal temperament, so that a tempered tuning can be compensated for. Key `targets` of the
/// file; where it is left out every note is wanted in equal temperament on the plan's `reference_hz`.
///
/// With f the pitch that the plan names for an open string and o its offset in `open_cents`, the string is tuned to
/// f·2^(o/1200): tension, and with it the setbacks, follow from that. Its note at fret n is wanted at the ratio
/// 2^(n/12 + (p − o)/1200) above the open string, p being the offset in `pitch_class_cents` of the fretted note's
/// pitch class. So a fretted note is wanted p cents from equal temperament, whatever the offset of the open string
/// that it is played on, and every error in a report is counted from there.
///
/// The pitch class of an open string is that of the equal-tempered note nearest to f; every fret is a semitone
/// higher. The open note's own pitch class does not apply to the open string: only `open_cents` does.
///
/// ```
/// use crestline_plan::{Fault, Plan, Targets, check, example, read, solve};
///
/// /// Errors of the B string at frets 1 (C) and 12 (B) with no setback, cents.
/// fn errors(plan: &Plan) -> Result<[f64; 2], Vec<Fault>> {
///     let solution = solve(&check(plan)?)?;
///     Ok([0, 11].map(|fret| solution.report.strings[1].frets[fret].none_cents))
/// }
///
/// let mut plan = read(example("steel_six").map_or("", |example| example.text))?;
/// let equal = errors(&plan)?;
/// // Thirds of the chords on C, F and G (the notes E, A and B) 4 cents low.
/// let mut pitch_class_cents = [0.0; 12];
/// for class in [4, 9, 11] {
///     pitch_class_cents[class] = -4.0;
/// }
/// plan.targets = Some(Targets { open_cents: vec![0.0; plan.strings.len()], pitch_class_cents });
/// let tempered = errors(&plan)?;
/// // C is as sharp as before; B is sharper against its lower target.
/// assert!((tempered[0] - equal[0]).abs() < 1e-9);
/// assert!((tempered[1] - equal[1] - 4.0).abs() < 1e-9);
/// # Ok::<(), Vec<Fault>>(())
/// ```
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Targets {
    /// Offset of every open string from the pitch that the plan names for it, cents, string 1 first, −50 to 50.
    pub open_cents: Vec<f64>,
    /// Offset of fretted notes by their pitch class, cents: C first, then C sharp and so on to B, −50 to 50.
    pub pitch_class_cents: [f64; 12],
}

/// The saddle to be made.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Saddle {
    /// How it is made.
    pub style: SaddleStyle,
    /// Thickness of the blank, mm.
    pub thickness_mm: f64,
    /// Margin kept at each edge of the blank's top, mm.
    pub edge_margin_mm: f64,
    /// How far the blank reaches beyond its outer strings, along its centre line, 0.5 to 30 mm. A piece for a single
    /// string reaches as far to both sides, but stays clear of its neighbours.
    pub end_margin_mm: f64,
    /// Strings 1 to this one lie on the first piece of a two-piece saddle.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub split_after: Option<u32>,
    /// Least and greatest setback of a crest, mm.
    pub travel_mm: [f64; 2],
}

/// Ways to make a saddle.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum SaddleStyle {
    /// A piece a string, each set on its own.
    Separate,
    /// A straight thick blank with the crest filed string by string on its top.
    Shaped,
    /// One straight crest.
    Straight,
    /// Two straight crests.
    TwoPiece,
}

/// The nut to be made.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Nut {
    /// How it is made.
    pub style: NutStyle,
    /// Least and greatest nut setback, mm.
    pub travel_mm: [f64; 2],
}

/// Ways to make a nut.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum NutStyle {
    /// Left on the nominal nut line.
    Plain,
    /// Moved forward by the same amount for all strings (a shortened fingerboard).
    Common,
    /// Filed string by string.
    Shaped,
}

/// Where crests and nut edges of an existing instrument are, mm, string 1 first.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct AsBuilt {
    /// Setback of every crest.
    pub saddle_setback_mm: Vec<f64>,
    /// Setback of every nut edge.
    pub nut_setback_mm: Vec<f64>,
}

/// One tuner reading.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Reading {
    /// String number, 1 first.
    pub string: u32,
    /// Fret number; 0 for the open string, 12 for its octave harmonic.
    pub fret: u32,
    /// What was sounded.
    pub kind: ReadingKind,
    /// Cents against the note that the fret should give; an octave harmonic against the open string's octave.
    pub cents: f64,
}

/// What was sounded for a reading.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum ReadingKind {
    /// The string pressed to a fret.
    Fretted,
    /// The open string.
    Open,
    /// The octave harmonic of the open string.
    OctaveHarmonic,
}

/// Paper, units and datum of the drawing.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Sheet {
    /// Paper size.
    pub paper: Paper,
    /// Units of the written dimensions.
    pub units: Units,
    /// Where x is measured from.
    pub datum: Datum,
}

/// Paper sizes.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Paper {
    /// 210 × 297 mm.
    A4,
    /// 297 × 420 mm.
    A3,
    /// 8.5 × 11 in.
    Letter,
}

/// Units of written dimensions.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Units {
    /// Millimetres.
    Mm,
    /// Inches.
    Inch,
}

/// Where x is measured from on the bench, always on the centre line.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Datum {
    /// The nominal nut line.
    Nut,
    /// The crown of fret 12.
    TwelfthFret,
    /// The nominal saddle line.
    SaddleLine,
}
