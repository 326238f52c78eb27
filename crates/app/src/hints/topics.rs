//! One table of what there is to say about the plan's quantities.
//!
//! Allowed ranges are those that the plan is checked against. Usual ranges are common practice of the trade, from a
//! soprano ukulele to a bass; they are there to catch a slip, not to judge an instrument.

use crestline_plan::limits::{self, Range};

use super::Sketch;
use super::spreads::{READING, SPREADS};
use crate::units::LengthUnit;

/// What there is to say about a quantity.
#[derive(Debug, Clone, Copy)]
pub struct Topic {
    /// The end of its path in the plan.
    pub(super) path: &'static str,
    /// One sentence on how it is measured or found.
    pub how: &'static str,
    /// What is usual.
    pub usual: Option<Range>,
    /// What is allowed.
    pub allowed: Option<Range>,
    /// A sketch of what is measured.
    pub sketch: Option<Sketch>,
}

const fn topic_of(path: &'static str, how: &'static str, usual: Option<Range>, allowed: Range) -> Topic {
    Topic { path, how, usual, allowed: Some(allowed), sketch: None }
}

impl Topic {
    const fn sketched(self, sketch: Sketch) -> Self {
        Self { sketch: Some(sketch), ..self }
    }

    /// The ranges in words, lengths in this unit: `Usual: 0.8 to 5 mm. Allowed: 0 to 25 mm.`
    #[must_use]
    pub fn ranges(&self, unit: LengthUnit) -> String {
        let said =
            |word: &str, range: Option<Range>| range.map(|range| format!("{word}: {}.", words(range, unit)));
        let both = [said("Usual", self.usual), said("Allowed", self.allowed)];
        both.into_iter().flatten().collect::<Vec<_>>().join(" ")
    }
}

fn words(range: Range, unit: LengthUnit) -> String {
    if range.unit == "mm" { unit.range(range.low, range.high) } else { range.words() }
}

/// The topic of the field at a path, if there is one.
#[must_use]
pub fn topic(path: &str) -> Option<&'static Topic> {
    if path == READING.path {
        return Some(&READING);
    }
    // A standard deviation is another quantity than the one that it is of.
    let is_spread = ["tolerances.", "priors."].iter().any(|head| path.starts_with(head));
    let table = if is_spread { SPREADS } else { TOPICS };
    table.iter().find(|topic| {
        path.strip_suffix(topic.path).is_some_and(|before| before.is_empty() || before.ends_with('.'))
    })
}

pub(super) const MM: &str = "mm";

pub(super) const fn usual(low: f64, high: f64, unit: &'static str) -> Option<Range> {
    Some(Range::new(low, high, unit))
}

const SCALE_HOW: &str = "Measure from the nut's front edge to the crown of fret 12 and double it; do not measure to a saddle, which is set back.";
const SPREAD_HOW: &str =
    "Lay a rule across and measure from the centre of one outer string to the centre of the other.";
const TRAVEL_HOW: &str = "Measure how far a crest can stand before and behind the nominal line on this bridge; a minus is toward the nut.";

const TOPICS: &[Topic] = &[
    topic_of("instrument.scale_mm", SCALE_HOW, usual(330.0, 890.0, MM), limits::SCALE_MM).sketched(Sketch::Scale),
    topic_of("scale_mm.treble", SCALE_HOW, usual(330.0, 890.0, MM), limits::SCALE_MM).sketched(Sketch::Scale),
    topic_of("scale_mm.bass", SCALE_HOW, usual(330.0, 890.0, MM), limits::SCALE_MM).sketched(Sketch::Scale),
    topic_of("scale_mm.square_fret", "Look for the fret that lies square to the neck's centre line.", usual(5.0, 9.0, ""), limits::SQUARE_FRET),
    topic_of("instrument.frets", "Count them, without a zero fret.", usual(12.0, 24.0, ""), limits::FRETS),
    topic_of("instrument.relief_mm", "Strings at pitch: lay a straightedge on the first and the last fret and find the widest gap with feeler gauges.", usual(0.0, 0.3, MM), limits::RELIEF_MM).sketched(Sketch::Relief),
    topic_of("instrument.fret_height_mm", "Measure from the fingerboard to the crown with a depth gauge or a caliper's tail.", usual(0.7, 1.5, MM), limits::FRET_HEIGHT_MM).sketched(Sketch::FretHeight),
    topic_of("instrument.fret_positions_mm", "Measure every crown from the nut line with one long rule, never from fret to fret.", None, limits::FRET_POSITION_MM),
    topic_of("spread_mm.nut", SPREAD_HOW, usual(24.0, 45.0, MM), limits::SPREAD_MM).sketched(Sketch::SpreadNut),
    topic_of("spread_mm.saddle", SPREAD_HOW, usual(38.0, 75.0, MM), limits::SPREAD_MM).sketched(Sketch::SpreadSaddle),
    topic_of("across_mm.nut", "Measure every string's centre from the centre line.", None, limits::ACROSS_MM).sketched(Sketch::SpreadNut),
    topic_of("across_mm.saddle", "Measure every string's centre from the centre line.", None, limits::ACROSS_MM).sketched(Sketch::SpreadSaddle),
    topic_of("core.diameter_mm", "Measure a plain string with a micrometer; of a wound one unwind an end, or cut one off, and measure the bare core, across flats if it is hexagonal.", usual(0.2, 1.1, MM), limits::CORE_DIAMETER_MM).sketched(Sketch::Core),
    topic_of("wrap.outside_mm", "Measure over the wrap with a micrometer, turning the string to find the widest place; it is the gauge on the packet.", usual(0.5, 3.4, MM), limits::OUTSIDE_MM).sketched(Sketch::Outside),
    topic_of("core.youngs_modulus_gpa", "Take it from a handbook for steel; for nylon and other polymers it is the stiffness to a small further stretch at pitch, several times the bulk figure.", usual(4.0, 210.0, "GPa"), limits::YOUNGS_MODULUS_GPA),
    topic_of("core.density_kg_m3", "Take it from a handbook, or weigh a known length of the bare core.", usual(1000.0, 7900.0, "kg/m³"), limits::DENSITY_KG_M3),
    topic_of("wrap.density_kg_m3", "Take it from a handbook, or weigh a known length of the whole string and enter that as measured.", usual(7850.0, 9000.0, "kg/m³"), limits::DENSITY_KG_M3),
    topic_of("core.tensile_mpa", "Take the least strength of the wire's standard for its diameter; breaking load over area.", usual(1500.0, 2800.0, "MPa"), limits::TENSILE_MPA),
    topic_of("action_mm.first", "String open and at pitch: slide feeler gauges between the crown of fret 1 and the string until one just touches.", Some(limits::USUAL_ACTION_FIRST_MM), limits::ACTION_FIRST_MM).sketched(Sketch::ActionFirst),
    topic_of("action_mm.twelfth", "String open and at pitch: stand a fine rule on fret 12 and read the underside of the string.", Some(limits::USUAL_ACTION_TWELFTH_MM), limits::ACTION_TWELFTH_MM).sketched(Sketch::ActionTwelfth),
    topic_of("afterlength_mm.head", "Measure along the string from the nut's front edge to where it meets its tuner's post.", usual(30.0, 180.0, MM), limits::AFTERLENGTH_MM).sketched(Sketch::Head),
    topic_of("afterlength_mm.tail", "Measure along the string from the saddle's crest to the pin, tie or tailpiece that holds it.", usual(5.0, 150.0, MM), limits::AFTERLENGTH_MM).sketched(Sketch::Tail),
    topic_of("measured.unit_mass_kg_per_m", "Weigh a metre of the string on a letter scale: grams per metre.", usual(0.2, 20.0, "g/m"), Range::new(0.001, 500.0, "g/m")),
    topic_of("measured.axial_stiffness_n", "Hang a small further weight on the string at pitch and measure how much longer a known length grows: force over strain.", usual(1000.0, 60_000.0, "N"), limits::AXIAL_STIFFNESS_N),
    topic_of("measured.bending_stiffness_n_mm2", "It follows from the string's inharmonicity, or from how far a short free end sags.", usual(10.0, 2000.0, "N·mm²"), limits::BENDING_STIFFNESS_N_MM2),
    topic_of("pressing.finger_fraction", "Measure from the pressed fret back to the middle of the fingertip, and divide by the space to the fret before.", usual(0.2, 0.6, ""), limits::FINGER_FRACTION).sketched(Sketch::Finger),
    topic_of("pressing.depth_mm", "Press as a player does, and judge how far the string goes below the line over the crown; it cannot pass the fingerboard.", usual(0.0, 0.4, MM), limits::PRESS_DEPTH_MM).sketched(Sketch::PressDepth),
    topic_of("supports.nut", "Leave it at ½ where the string runs on behind the nut.", usual(0.0, 1.0, ""), limits::FIXITY),
    topic_of("supports.fret", "Leave it at ½ where the string runs on behind the fret.", usual(0.0, 1.0, ""), limits::FIXITY),
    topic_of("supports.saddle", "Leave it at ½ where the string runs on behind the saddle; 1 where it is clamped there.", usual(0.0, 1.0, ""), limits::FIXITY),
    topic_of("slip.head", "Start with 0, gripped; a dry nut slot with a sharp bend grips, a lubricated or roller nut slips.", usual(0.0, 1.0, ""), limits::SLIP),
    topic_of("slip.tail", "Start with 0, gripped; a shallow break angle or rollers let the string slip.", usual(0.0, 1.0, ""), limits::SLIP),
    topic_of("saddle.thickness_mm", "Measure the blank, or the slot that takes it, along the strings.", usual(2.2, 6.5, MM), limits::BLANK_THICKNESS_MM).sketched(Sketch::Blank),
    topic_of("saddle.edge_margin_mm", "Choose what must stay before and behind a crest so that the edge does not crumble.", usual(0.2, 0.6, MM), limits::EDGE_MARGIN_MM).sketched(Sketch::Margin),
    topic_of("saddle.travel_mm[0]", TRAVEL_HOW, usual(-5.0, 0.0, MM), limits::SADDLE_TRAVEL_MM).sketched(Sketch::Setback),
    topic_of("saddle.travel_mm[1]", TRAVEL_HOW, usual(5.0, 15.0, MM), limits::SADDLE_TRAVEL_MM).sketched(Sketch::Setback),
    topic_of("nut.travel_mm[0]", "Keep 0 where the nut's edge cannot go behind the nominal line.", usual(0.0, 0.0, MM), limits::NUT_TRAVEL_MM).sketched(Sketch::NutSetback),
    topic_of("nut.travel_mm[1]", "Choose how far the fingerboard's end may be cut back or the nut reach over it.", usual(0.5, 3.0, MM), limits::NUT_TRAVEL_MM).sketched(Sketch::NutSetback),
    topic_of("as_built.saddle_setback_mm", "Twice the way from the nut to fret 12 is the nominal line: measure every crest from there.", usual(0.0, 6.0, MM), limits::AS_BUILT_SADDLE_MM).sketched(Sketch::Setback),
    topic_of("as_built.nut_setback_mm", "Measure how far every nut edge stands before the nominal nut line.", usual(0.0, 2.0, MM), limits::AS_BUILT_NUT_MM).sketched(Sketch::NutSetback),
    topic_of("reference_hz", "Take the tuner's setting for A4.", usual(430.0, 446.0, "Hz"), limits::REFERENCE_HZ),
];

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn fields_find_their_topic_by_path() {
        assert_eq!(topic("strings[11].action_mm.twelfth").unwrap().sketch, Some(Sketch::ActionTwelfth));
        assert_eq!(topic("instrument.relief_mm").unwrap().sketch, Some(Sketch::Relief));
        assert!(topic("title").is_none());
        for (path, usual) in [("priors.relief_mm", 0.2), ("tolerances.neck.relief_mm", 0.1)] {
            let topic = topic(path).unwrap();
            assert!(
                topic.usual.unwrap().high <= usual && topic.sketch.is_none(),
                "{path} is another quantity"
            );
        }
        assert_eq!(topic("tolerances.wound.measured_mass_fraction").unwrap().path, "measured_mass_fraction");
        assert_eq!(topic("tolerances.slip.head").unwrap().path, "tolerances.slip.head");
    }

    #[test]
    fn usual_ranges_lie_within_the_allowed_ones() {
        for topic in TOPICS.iter().chain(SPREADS) {
            let (Some(usual), Some(allowed)) = (topic.usual, topic.allowed) else { continue };
            assert_eq!(usual.unit, allowed.unit, "{}", topic.path);
            assert!(
                allowed.low <= usual.low && usual.low <= usual.high && usual.high <= allowed.high,
                "{}",
                topic.path
            );
        }
    }

    #[test]
    fn ranges_are_in_the_unit_of_the_window() {
        let relief = topic("instrument.relief_mm").unwrap();
        assert_eq!(relief.ranges(LengthUnit::Millimetres), "Usual: 0 to 0.3 mm. Allowed: 0 to 3 mm.");
        assert_eq!(relief.ranges(LengthUnit::Inches), "Usual: 0 to 0.0118 in. Allowed: 0 to 0.1181 in.");
        assert_eq!(
            topic("instrument.frets").unwrap().ranges(LengthUnit::Inches),
            "Usual: 12 to 24. Allowed: 12 to 36."
        );
    }
}
