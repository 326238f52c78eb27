//! What is allowed and what is usual, one table for the checks and for the window.
//!
//! The allowed ranges reach well past a soprano ukulele (330 mm) on one side and a 900 mm bass on the other;
//! they keep typing errors and absurd units out. The usual ranges raise a notice only; they are common practice.

/// A closed range of a quantity with its unit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Range {
    /// Least value allowed.
    pub low: f64,
    /// Greatest value allowed.
    pub high: f64,
    /// Unit as written behind a number; empty for a pure number.
    pub unit: &'static str,
}

impl Range {
    /// A range from `low` to `high` in `unit`.
    #[must_use]
    pub const fn new(low: f64, high: f64, unit: &'static str) -> Self {
        Self { low, high, unit }
    }

    /// Whether `value` is a number within the range, its ends included.
    #[must_use]
    pub fn contains(&self, value: f64) -> bool {
        value >= self.low && value <= self.high
    }

    /// The range in words, such as `200 to 1500 mm`.
    #[must_use]
    pub fn words(&self) -> String {
        with_unit(format!("{} to {}", number_words(self.low), number_words(self.high)), self.unit)
    }
}

/// A number as a message shows it: as short as it can be without losing anything.
#[must_use]
pub fn number_words(value: f64) -> String {
    let size = value.abs();
    if value.is_nan() {
        "no number".to_owned()
    } else if size != 0.0 && !(1e-4..1e9).contains(&size) {
        format!("{value:e}")
    } else {
        format!("{value}")
    }
}

/// A number with its unit, such as `0.4 mm`.
#[must_use]
pub fn quantity_words(value: f64, unit: &str) -> String {
    with_unit(number_words(value), unit)
}

fn with_unit(words: String, unit: &str) -> String {
    if unit.is_empty() { words } else { format!("{words} {unit}") }
}

/// Nominal scale.
pub const SCALE_MM: Range = Range::new(200.0, 1500.0, "mm");
/// Greatest difference of the outer scales of a fanned neck, mm.
pub const SCALE_DIFFERENCE_MM: f64 = 200.0;
/// The fret that lies square on a fanned neck; beyond these every line is nearly square to nothing.
pub const SQUARE_FRET: Range = Range::new(0.0, 60.0, "");
/// Greatest angle of a fanned nut or saddle line from the square to the centre line.
pub const FAN_SLANT_DEGREES: f64 = 60.0;
/// Number of frets; fret 12 is needed for the action.
pub const FRETS: Range = Range::new(12.0, 36.0, "");
/// Measured position of a fret.
pub const FRET_POSITION_MM: Range = Range::new(1.0, 1500.0, "mm");
/// Least distance of neighbouring frets, mm.
pub const FRET_GAP_MM: f64 = 0.5;
/// Least distance of a saddle crest from the last fret, mm: the shortest string that may still sound.
pub const LAST_FRET_TO_CREST_MM: f64 = 5.0;
/// Relief of the neck.
pub const RELIEF_MM: Range = Range::new(0.0, 3.0, "mm");
/// Centre distance of the outer strings.
pub const SPREAD_MM: Range = Range::new(0.0, 300.0, "mm");
/// Place of a string across the neck.
pub const ACROSS_MM: Range = Range::new(-200.0, 200.0, "mm");
/// Least distance of neighbouring strings' centres, mm.
pub const STRING_GAP_MM: f64 = 0.5;
/// Greatest sideways run of a string from nut to saddle as a fraction of the scale.
pub const SIDEWAYS_FRACTION: f64 = 0.3;
/// Height of a fret's crown above the fingerboard.
pub const FRET_HEIGHT_MM: Range = Range::new(0.1, 3.0, "mm");

/// Distance of the finger behind the fret as a fraction of the fret's space.
pub const FINGER_FRACTION: Range = Range::new(0.05, 0.95, "");
/// Press depth below the crown; the fret height bounds it too.
pub const PRESS_DEPTH_MM: Range = Range::new(0.0, 3.0, "mm");
/// Fixity of a support, 0 pinned and 1 clamped.
pub const FIXITY: Range = Range::new(0.0, 1.0, "");
/// Slip over nut or saddle, 0 gripped and 1 frictionless.
pub const SLIP: Range = Range::new(0.0, 1.0, "");

/// Number of strings.
pub const STRINGS: Range = Range::new(1.0, 16.0, "");
/// Pitch of an open string.
pub const FREQUENCY_HZ: Range = Range::new(10.0, 5000.0, "Hz");
/// Pitch of A4.
pub const REFERENCE_HZ: Range = Range::new(220.0, 880.0, "Hz");
/// Diameter of a core, or of a plain string.
pub const CORE_DIAMETER_MM: Range = Range::new(0.05, 10.0, "mm");
/// Outside diameter of a wound string; it must exceed its core too.
pub const OUTSIDE_MM: Range = Range::new(0.05, 15.0, "mm");
/// Young's modulus at playing stress, from rubber to beyond tungsten.
pub const YOUNGS_MODULUS_GPA: Range = Range::new(0.001, 1000.0, "GPa");
/// Density, from loose silk to beyond osmium.
pub const DENSITY_KG_M3: Range = Range::new(300.0, 25_000.0, "kg/m³");
/// Tensile strength.
pub const TENSILE_MPA: Range = Range::new(1.0, 10_000.0, "MPa");
/// Measured mass per length.
pub const UNIT_MASS_KG_PER_M: Range = Range::new(1e-6, 0.5, "kg/m");
/// Measured tangent axial stiffness.
pub const AXIAL_STIFFNESS_N: Range = Range::new(1.0, 1e8, "N");
/// Measured bending stiffness; 0 is a perfectly limp string.
pub const BENDING_STIFFNESS_N_MM2: Range = Range::new(0.0, 1e8, "N·mm²");
/// Gap under the open string over fret 1.
pub const ACTION_FIRST_MM: Range = Range::new(0.0, 10.0, "mm");
/// Gap under the open string over fret 12.
pub const ACTION_TWELFTH_MM: Range = Range::new(0.0, 25.0, "mm");
/// Length of string behind nut or saddle.
pub const AFTERLENGTH_MM: Range = Range::new(0.0, 2000.0, "mm");

/// Most alternatives to the plan's own strings.
pub const ALTERNATIVES: usize = 12;
/// Weight of a set of strings against another: less counts for nothing, and more leaves nothing to the others.
pub const ALTERNATIVE_WEIGHT: Range = Range::new(0.01, 100.0, "");

/// Target offset from equal temperament.
pub const TARGET_CENTS: Range = Range::new(-50.0, 50.0, "cents");
/// Thickness of a saddle blank.
pub const BLANK_THICKNESS_MM: Range = Range::new(0.5, 30.0, "mm");
/// Margin kept at each edge of the blank's top; it must stay below half the thickness too.
pub const EDGE_MARGIN_MM: Range = Range::new(0.0, 15.0, "mm");
/// How far a blank reaches beyond its outer strings; none would leave a single string's piece without width.
pub const END_MARGIN_MM: Range = Range::new(0.5, 30.0, "mm");
/// Travel of a saddle crest.
pub const SADDLE_TRAVEL_MM: Range = Range::new(-10.0, 30.0, "mm");
/// Travel of a nut edge.
pub const NUT_TRAVEL_MM: Range = Range::new(-5.0, 10.0, "mm");
/// Setback of a crest on an existing instrument.
pub const AS_BUILT_SADDLE_MM: Range = Range::new(-30.0, 50.0, "mm");
/// Setback of a nut edge on an existing instrument.
pub const AS_BUILT_NUT_MM: Range = Range::new(-10.0, 20.0, "mm");
/// Least distance of a nut edge from the finger that presses fret 1, mm.
pub const NUT_TO_FINGER_MM: f64 = 0.2;
/// Cents of a tuner reading.
pub const READING_CENTS: Range = Range::new(-1200.0, 1200.0, "cents");
/// Most readings in a plan: every note of the largest legal plan three times.
pub const READINGS: usize = 2000;

/// What the standard deviations of a plan may be. Beyond these the model's figures would leave what can be built.
pub mod tolerance {
    use super::Range;

    /// Number of instruments in a sample.
    pub const SAMPLES: Range = Range::new(64.0, 32_768.0, "");
    /// How far from true a note may be.
    pub const LIMIT_CENTS: Range = Range::new(0.1, 100.0, "cents");
    /// Diameter of a core.
    pub const CORE_DIAMETER_MM: Range = Range::new(0.0, 0.2, "mm");
    /// Shares of stiffness and mass.
    pub const FRACTION: Range = Range::new(0.0, 0.5, "");
    /// Pitch of a string, or of A4.
    pub const PITCH_CENTS: Range = Range::new(0.0, 50.0, "cents");
    /// Gaps over fret 1 and fret 12.
    pub const ACTION_MM: Range = Range::new(0.0, 1.0, "mm");
    /// Relief.
    pub const RELIEF_MM: Range = Range::new(0.0, 0.5, "mm");
    /// Scale.
    pub const SCALE_MM: Range = Range::new(0.0, 5.0, "mm");
    /// Place of a fret.
    pub const FRET_MM: Range = Range::new(0.0, 0.3, "mm");
    /// Place of the finger as a part of the fret's space.
    pub const FINGER: Range = Range::new(0.0, 0.5, "");
    /// Share of the press depth; 1 means a third to three times as deep.
    pub const DEPTH_FRACTION: Range = Range::new(0.0, 1.0, "");
    /// Fixities and slips, which go from 0 to 1.
    pub const SUPPORT: Range = Range::new(0.0, 0.5, "");
    /// Crests and nut edges.
    pub const MAKING_MM: Range = Range::new(0.0, 1.0, "mm");
}

/// Usual action over fret 1 (common practice; steel string 0.33 to 0.58 mm, nylon somewhat more).
pub const USUAL_ACTION_FIRST_MM: Range = Range::new(0.15, 1.2, "mm");
/// Usual action over fret 12 (common practice; 1.6 mm mandolin to 4.0 mm nylon, bass a little more).
pub const USUAL_ACTION_TWELFTH_MM: Range = Range::new(0.8, 5.0, "mm");
/// Usual relief (common practice; up to 0.3 mm).
pub const USUAL_RELIEF_MM: Range = Range::new(0.0, 0.6, "mm");
/// Usual tuner readings; anything beyond is asked about.
pub const USUAL_READING_CENTS: Range = Range::new(-100.0, 100.0, "cents");
/// How far repeated readings of one note may lie apart before they contradict each other, cents.
pub const READING_SPREAD_CENTS: f64 = 5.0;
/// How far a measured fret may lie from its equal-tempered place before it is asked about, mm.
pub const USUAL_FRET_SHIFT_MM: f64 = 1.5;

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ends_belong_to_a_range_and_no_number_does_not() {
        assert!(SCALE_MM.contains(200.0) && SCALE_MM.contains(1500.0));
        assert!(
            !SCALE_MM.contains(199.999) && !SCALE_MM.contains(f64::NAN) && !SCALE_MM.contains(f64::INFINITY)
        );
    }

    #[test]
    fn words_name_both_ends_and_the_unit() {
        assert_eq!(SCALE_MM.words(), "200 to 1500 mm");
        assert_eq!(FIXITY.words(), "0 to 1");
        assert_eq!(UNIT_MASS_KG_PER_M.words(), "1e-6 to 0.5 kg/m");
    }
}
