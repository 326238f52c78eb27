//! Plan view of the saddle region in true size: nominal line, centre line, strings, slots and crests.

use crestline_drawing::{Anchor, Point, Rect, Shape, pt};

use crate::block::{Block, CHAIN, MEDIUM, THICK, THIN, small};
use crate::facts::Facts;
use crate::layers::{CREST, NOMINAL, SLOT, STRING};
use crate::plan_dimensions::dimension_saddle;
use crate::spread::spread;

/// Length of string shown before the saddle, mm.
const STRING_SHOWN_MM: f64 = 22.0;
/// How far the nominal line runs beyond the outer strings, mm.
const NOMINAL_PAST_MM: f64 = 5.0;
/// Longest name beside a string, mm.
const NAME_MM: f64 = 26.0;
/// Least distance of the baselines of labels in a column, mm: text of 2.5 mm with its descenders.
pub(crate) const LABEL_STEP_MM: f64 = 3.8;

/// The plan view with its dimensions.
pub(crate) fn plan_view(facts: &Facts<'_>) -> Block {
    let mut block = Block::new("Plan view", "Plan view of the saddle, 1:1");
    block.scale = Some("1:1");
    let core = saddle_core(facts);
    let left_mm = core.min.x - STRING_SHOWN_MM;
    block.line(NOMINAL, CHAIN, pt(left_mm, 0.0), pt(core.max.x + NOMINAL_PAST_MM, 0.0));
    draw_saddle(&mut block, facts, left_mm, NOMINAL_PAST_MM);
    name_strings(&mut block, facts, left_mm);
    dimension_saddle(&mut block, facts, core, left_mm);
    block
}

/// The box around nominal line, slots and crests.
pub(crate) fn saddle_core(facts: &Facts<'_>) -> Rect {
    let corners = facts.slots.iter().flat_map(|slot| slot.corners);
    let crests = facts.strings.iter().flat_map(|s| [s.crest, s.saddle]);
    Rect::around(corners.chain(crests).chain(facts.saddle_line)).unwrap_or(Rect::new(0.0, 0.0, 1.0, 1.0))
}

/// The nominal line, run on beyond the outer strings, strings from the left edge to their crests, slots and crests.
pub(crate) fn draw_saddle(block: &mut Block, facts: &Facts<'_>, left_mm: f64, past_mm: f64) {
    let (from, to) = longer(facts.saddle_line, past_mm);
    block.line(NOMINAL, CHAIN, from, to);
    for string in &facts.strings {
        let from = at_x(string.nut_edge, string.crest, left_mm);
        block.line(STRING, THIN, from, string.crest);
    }
    for slot in &facts.slots {
        block.outline(SLOT, THICK, &slot.corners);
    }
    for string in &facts.strings {
        block.add(CREST, MEDIUM, Shape::Point(string.crest));
    }
}

/// A line made longer at both ends.
pub(crate) fn longer([a, b]: [Point; 2], by_mm: f64) -> (Point, Point) {
    // A single string has a nominal line without length; it is then drawn square to the centre line.
    let along = if a.distance(b) > 0.0 { b.minus(a).unit() } else { pt(0.0, -1.0) };
    (a.toward(along, -by_mm), b.toward(along, by_mm))
}

/// The point of a line where it passes an x; its first point for a line that does not run along x.
fn at_x(from: Point, to: Point, x_mm: f64) -> Point {
    let run = to.x - from.x;
    if run == 0.0 { from } else { pt(x_mm, from.y + (to.y - from.y) * (x_mm - from.x) / run) }
}

/// Number and name of every string at the left edge, with a leader where they had to move apart.
fn name_strings(block: &mut Block, facts: &Facts<'_>, left_mm: f64) {
    const LEADER_MM: f64 = 4.0;
    let starts: Vec<Point> = facts.strings.iter().map(|s| at_x(s.nut_edge, s.crest, left_mm)).collect();
    let places = spread(&starts.iter().map(|p| p.y).collect::<Vec<_>>(), LABEL_STEP_MM);
    for ((string, start), y) in facts.strings.iter().zip(starts).zip(places) {
        let end = pt(left_mm - LEADER_MM, y);
        block.line(STRING, THIN, start.toward(pt(-1.0, 0.0), 0.5), end);
        let at = pt(end.x - 1.0, y - 1.25);
        block.text(small(at, Anchor::End, string.label()).within(NAME_MM));
    }
}
