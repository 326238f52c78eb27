//! Plan view of a compensated nut in true size: nominal line, built edge, setback of every string.

use crestline_drawing::{Anchor, Dimension, Measure, Point, clean, lettering, pt, width_mm};

use crate::block::{Block, CHAIN, THICK, THIN, small};
use crate::facts::{Facts, StringFacts};
use crate::layers::{NOMINAL, NUT, STRING};
use crate::plan_view::{LABEL_STEP_MM, longer};
use crate::spread::spread;

/// Length of string shown on the side of the frets, mm.
const STRING_SHOWN_MM: f64 = 12.0;
/// From the edge to the column of setbacks, mm.
const LABEL_COLUMN_MM: f64 = 10.0;
/// Longest name beside a string, mm.
const NAME_MM: f64 = 26.0;

/// The nut's plan view; `None` where every edge stands on the nominal line.
pub(crate) fn nut_view(facts: &Facts<'_>) -> Option<Block> {
    if !facts.nut_is_compensated() {
        return None;
    }
    let mut block = Block::new("Nut", "Plan view of the nut, 1:1");
    block.scale = Some("1:1");
    let edges: Vec<Point> = facts.strings.iter().map(|s| s.nut_edge).collect();
    let xs = || edges.iter().chain(&facts.nut_line).map(|p| p.x);
    let (left_mm, right_mm) = (xs().fold(f64::MAX, f64::min), xs().fold(f64::MIN, f64::max));
    let (from, to) = longer(facts.nut_line, 4.0);
    block.line(NOMINAL, CHAIN, from, to);
    block.line(NOMINAL, CHAIN, pt(left_mm - 6.0, 0.0), pt(right_mm + 5.0, 0.0));
    for pair in edges.windows(2) {
        block.line(NUT, THICK, pair[0], pair[1]);
    }
    for string in &facts.strings {
        let along = string.along();
        block.line(STRING, THIN, string.nut_edge, string.nut_edge.toward(along, STRING_SHOWN_MM));
    }
    label_strings(&mut block, facts, left_mm, right_mm + STRING_SHOWN_MM);
    Some(block)
}

/// Names on the side of the head, setbacks on the side of the frets.
fn label_strings(block: &mut Block, facts: &Facts<'_>, left_mm: f64, right_mm: f64) {
    let places = spread(&facts.strings.iter().map(|s| s.nut_edge.y).collect::<Vec<_>>(), LABEL_STEP_MM);
    let column_mm = right_mm + LABEL_COLUMN_MM;
    for (string, y) in facts.strings.iter().zip(places) {
        let end = pt(left_mm - 8.0, y);
        block.line(STRING, THIN, pt(left_mm - 4.0, string.nut_edge.y), end);
        block.text(small(pt(end.x - 1.0, y - 1.25), Anchor::End, string.label()).within(NAME_MM));
        let label = facts.text(string.built.nut_setback_mm);
        let at = pt(column_mm + width_mm(&clean(&label), lettering::SMALL_MM) / 2.0, y);
        block.dimension(Dimension::new(nut_measure(string), label).labelled_at(at));
    }
}

/// From the nominal nut line to the built edge, along the string.
pub(crate) fn nut_measure(string: &StringFacts) -> Measure {
    let (from, to) = (string.nut, string.nut_edge);
    Measure::Linear { from, to, direction_deg: string.along().angle_deg(), line_at: from }
}
