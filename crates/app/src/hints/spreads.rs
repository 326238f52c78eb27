//! What there is to say about standard deviations: how each is found, and what is usual.
//!
//! Usual ranges are common practice and estimates, as the values are that a plan starts from; where a standard stands
//! behind one, the reason beside that value names it. One sentence of advice holds for all: read the same thing several
//! times, and take the scatter.

use crestline_plan::limits::{self, Range, tolerance};

use super::topics::{MM, Topic, usual};

const fn spread(path: &'static str, how: &'static str, usual: Option<Range>, allowed: Range) -> Topic {
    Topic { path, how, usual, allowed: Some(allowed), sketch: None }
}

/// A prior of the diagnosis: its own check knows what is allowed.
const fn prior(path: &'static str, how: &'static str, usual: Option<Range>) -> Topic {
    Topic { path, how, usual, allowed: None, sketch: None }
}

const SUPPORT_HOW: &str = "It cannot be measured with a rule: keep the usual value, or 0 where the fixity was fitted to readings of this instrument.";
const SLIP_HOW: &str =
    "Tune a string, press it hard several times and read it again: the more it wanders, the less is known.";
const MAKING_HOW: &str = "Measure some pieces that you have made against their lines, and take the scatter.";
const FRACTION: Range = tolerance::FRACTION;

/// Standard deviations: of the plan's tolerances by their whole paths, or for a kind of string by its end, and of what is
/// held probable before reading.
#[rustfmt::skip]
pub const SPREADS: &[Topic] = &[
    spread("tolerances.limit_cents", "Choose what you would still call in tune; trained ears notice 3 to 6 cents between notes that follow each other.", usual(2.0, 10.0, "cents"), tolerance::LIMIT_CENTS),
    spread("tolerances.samples", "Start with a few thousand; take more where the last digit of a band still moves.", usual(1000.0, 10_000.0, ""), tolerance::SAMPLES),
    spread("tolerances.reference_cents", "Look at the tuner's data sheet, and at how far a fork or another tuner reads from it.", usual(0.5, 4.0, "cents"), tolerance::PITCH_CENTS),
    spread("tolerances.neck.relief_mm", "Measure the relief several times with feeler gauges, on dry and damp days, and take the scatter.", usual(0.02, 0.1, MM), tolerance::RELIEF_MM),
    spread("tolerances.neck.scale_mm", "Halve the reading of the rule at fret 12: a rule read to 0.05 mm gives the scale to 0.1 mm.", usual(0.05, 0.3, MM), tolerance::SCALE_MM),
    spread("tolerances.neck.fret_mm", "Measure some crowns from the nut with one long rule, and take the scatter against their places.", usual(0.02, 0.1, MM), tolerance::FRET_MM),
    spread("tolerances.pressing.finger_fraction", "Watch where a player's fingertips land between two frets, and take the scatter.", usual(0.03, 0.15, ""), tolerance::FINGER),
    spread("tolerances.pressing.depth_fraction", "Read one fretted note pressed lightly and firmly: the wider apart, the larger this is.", usual(0.2, 0.6, ""), tolerance::DEPTH_FRACTION),
    spread("tolerances.supports.nut", SUPPORT_HOW, usual(0.02, 0.1, ""), tolerance::SUPPORT),
    spread("tolerances.supports.fret", SUPPORT_HOW, usual(0.02, 0.1, ""), tolerance::SUPPORT),
    spread("tolerances.supports.saddle", SUPPORT_HOW, usual(0.02, 0.1, ""), tolerance::SUPPORT),
    spread("tolerances.slip.head", SLIP_HOW, usual(0.0, 0.3, ""), tolerance::SUPPORT),
    spread("tolerances.slip.tail", SLIP_HOW, usual(0.0, 0.3, ""), tolerance::SUPPORT),
    spread("tolerances.making.crest_mm", MAKING_HOW, usual(0.05, 0.2, MM), tolerance::MAKING_MM),
    spread("tolerances.making.nut_edge_mm", MAKING_HOW, usual(0.05, 0.2, MM), tolerance::MAKING_MM),
    spread("core_diameter_mm", "Measure the bare core at several places with a micrometer; where it was not measured, keep the usual value of its kind.", usual(0.002, 0.02, MM), tolerance::CORE_DIAMETER_MM),
    spread("modulus_fraction", "Compare handbooks for steel; for polymers compare what different sources say of the modulus at pitch.", usual(0.02, 0.3, ""), FRACTION),
    spread("measured_mass_fraction", "Divide the smallest step of the scale by what the weighed length weighs.", usual(0.002, 0.02, ""), FRACTION),
    spread("measured_stiffness_fraction", "Repeat the measurement, and divide the scatter by the mean.", usual(0.02, 0.1, ""), FRACTION),
    spread("mass_fraction", "Weigh some strings of the kind, and see how far they lie from what is computed for them.", usual(0.003, 0.05, ""), FRACTION),
    spread("pitch_cents", "Read the open string before and after playing: the drift counts, not the tuner alone.", usual(1.0, 5.0, "cents"), tolerance::PITCH_CENTS),
    spread("action_first_mm", "It is about half the step between two feeler gauges.", usual(0.02, 0.05, MM), tolerance::ACTION_MM),
    spread("action_twelfth_mm", "It is how far two readings of the rule at fret 12 differ.", usual(0.05, 0.2, MM), tolerance::ACTION_MM),
    prior("priors.crest_mm", "Judge by eye how far from right the old saddle may stand.", usual(1.0, 4.0, MM)),
    prior("priors.measured_crest_mm", "It is how well you measured the crests from the nominal line.", usual(0.1, 0.5, MM)),
    prior("priors.nut_mm", "Look whether the nut was moved or the fingerboard's end trimmed; if so, take more.", usual(0.2, 1.0, MM)),
    prior("priors.slot_mm", "Where you measured the height over fret 1, it is how well; else how far slots may be from right.", usual(0.03, 0.2, MM)),
    prior("priors.action_mm", "It is how well you read the rule at fret 12.", usual(0.05, 0.3, MM)),
    prior("priors.relief_mm", "It is how well you measured the relief; necks also move with the weather.", usual(0.03, 0.2, MM)),
    prior("priors.fret_mm", "Take the usual value for sawn slots, more where frets were replaced by hand.", usual(0.03, 0.15, MM)),
    prior("priors.press_factor", "1.6 lets the finger press 1.6 times deeper or shallower than the plan says.", usual(1.3, 2.0, "")),
    prior("priors.axial_fraction", "Less where the strings were measured, more where their make is not known.", usual(0.05, 0.3, "")),
    prior("priors.bending_fraction", "Less where the strings were measured, more where their make is not known.", usual(0.05, 0.3, "")),
    prior("priors.tuning_cents", "It is how close to true the open strings were when the others were read; read them too, and it counts for little.", usual(1.0, 5.0, "cents")),
    prior("priors.reading_cents", "Read one note five times, plucked and pressed anew, and take the scatter.", usual(0.5, 3.0, "cents")),
];

/// A cell of the readings.
pub const READING: Topic = Topic {
    path: "readings",
    how: "Tune the open string first. Press as a player does, pluck softly, wait a second, and read the tuner; plus is sharp. \
          Read it again where two readings of a note differ by more than a cent or two.",
    usual: Some(limits::USUAL_READING_CENTS),
    allowed: Some(limits::READING_CENTS),
    sketch: None,
};
