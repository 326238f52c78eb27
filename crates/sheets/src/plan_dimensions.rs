//! The dimensions of the plan view: setbacks, ends of the slots, slant, spacing of the outer strings.

use crestline_drawing::{Anchor, Dimension, Measure, Point, Rect, Shape, clean, lettering, pt, width_mm};
use crestline_plan::Datum;

use crate::block::{Block, CHAIN, THIN, small};
use crate::facts::{Facts, Slot, StringFacts};
use crate::layers::{DIMENSION, NOMINAL};
use crate::plan_view::LABEL_STEP_MM;
use crate::spread::spread;

/// From the saddle to the column of setbacks: arrow, its tail and a leader, mm.
const LABEL_COLUMN_MM: f64 = 10.0;
/// Distance of parallel dimension lines, mm.
const LINE_STEP_MM: f64 = 7.0;
/// Distance of the first dimension line from the view, mm.
const FIRST_LINE_MM: f64 = 8.0;

/// Draws all dimensions around the core of the view.
pub(crate) fn dimension_saddle(block: &mut Block, facts: &Facts<'_>, core: Rect, left_mm: f64) {
    let labels = dimension_setbacks(block, facts, core.max.x + LABEL_COLUMN_MM);
    dimension_across(block, facts, labels.max.x);
    let (top_mm, bottom_mm) = dimension_slants(block, facts, core, labels);
    dimension_from_datum(block, facts, (top_mm, bottom_mm), left_mm - NAMES_MM);
}

/// Room of the strings' names, which the lines toward the datum use as well, mm.
const NAMES_MM: f64 = 24.0;

/// The setback of every string along the string, its figure in a column; gives the column's box.
pub(crate) fn dimension_setbacks(block: &mut Block, facts: &Facts<'_>, column_mm: f64) -> Rect {
    let places = spread(&facts.strings.iter().map(|s| s.crest.y).collect::<Vec<_>>(), LABEL_STEP_MM);
    let mut column = Rect::new(column_mm, 0.0, 0.0, 0.0);
    for (string, y) in facts.strings.iter().zip(places) {
        let label = facts.text(string.built.saddle_setback_mm);
        let label_mm = width_mm(&clean(&label), lettering::SMALL_MM);
        let at = pt(column_mm + label_mm / 2.0, y);
        block.dimension(Dimension::new(setback_measure(string), label).labelled_at(at));
        column = column.joined(Rect::new(column_mm, y - LABEL_STEP_MM / 2.0, label_mm, LABEL_STEP_MM));
    }
    column
}

/// From the nominal saddle line to the crest, along the string.
pub(crate) fn setback_measure(string: &StringFacts) -> Measure {
    let (from, to) = (string.saddle, string.crest);
    Measure::Linear { from, to, direction_deg: string.along().angle_deg(), line_at: from }
}

/// Across the neck: ends of the slots from the centre line, and the outer strings at the nominal line.
/// The extension lines start behind the column of setbacks, which they would otherwise cross.
pub(crate) fn dimension_across(block: &mut Block, facts: &Facts<'_>, after_mm: f64) {
    let start_mm = after_mm + 1.0;
    let mut line_mm = after_mm + FIRST_LINE_MM;
    for y in outer_ends(facts).map(|ends| [ends.0.y, ends.1.y]).into_iter().flatten() {
        if y.abs() > 0.01 {
            let measure = across(start_mm, 0.0, y, line_mm);
            block.dimension(Dimension::new(measure, facts.text(y.abs())));
        }
    }
    block.line(NOMINAL, CHAIN, pt(start_mm, 0.0), pt(line_mm + 2.0, 0.0));
    line_mm += LINE_STEP_MM;
    if let [first, .., last] = facts.strings.as_slice() {
        let (a, b) = (last.saddle.y, first.saddle.y);
        block.dimension(Dimension::new(across(start_mm, a, b, line_mm), facts.text(b - a)));
    }
}

fn across(x_mm: f64, from_y: f64, to_y: f64, line_mm: f64) -> Measure {
    let (from, to) = (pt(x_mm, from_y), pt(x_mm, to_y));
    Measure::Linear { from, to, direction_deg: 90.0, line_at: pt(line_mm, 0.0) }
}

/// The treble end of the first slot or piece and the bass end of the last.
pub(crate) fn outer_ends(facts: &Facts<'_>) -> Option<(Point, Point)> {
    Some((facts.slots.first()?.treble_end, facts.slots.last()?.bass_end))
}

/// The slots whose slant is of use: not that of single pieces, which the table of pieces gives.
fn slanted<'f>(facts: &'f Facts<'_>) -> impl Iterator<Item = (bool, &'f Slot)> {
    let slots = if facts.solution.report.saddle.lines.is_empty() { &[] } else { facts.slots.as_slice() };
    let count = slots.len();
    slots.iter().enumerate().map(move |(index, slot)| (index + 1 == count && count > 1, slot))
}

/// The slant of every slot from the square, clear of the column of labels; gives the heights above and below
/// which nothing is drawn yet.
pub(crate) fn dimension_slants(block: &mut Block, facts: &Facts<'_>, core: Rect, labels: Rect) -> (f64, f64) {
    const PAST_MM: f64 = 4.0;
    // Beside the tail of an arrow that stands outside.
    const TAIL_MM: f64 = 7.0;
    let (mut top_mm, mut bottom_mm) =
        (labels.max.y.max(core.max.y + 5.0), labels.min.y.min(core.min.y - 5.0));
    for (downward, slot) in slanted(facts) {
        let slant = slot.slant_degrees();
        let label = format!("{}°", crate::lengths::decimals(slant.abs(), 2));
        let (vertex, square_deg, clear_mm) = if downward {
            (slot.treble_end, 270.0, slot.treble_end.y - labels.min.y)
        } else {
            (slot.bass_end, 90.0, labels.max.y - slot.bass_end.y)
        };
        let sign = if downward { -1.0 } else { 1.0 };
        let radius_mm = (slot.length_mm() + PAST_MM).max(clear_mm + 2.0);
        let (start_deg, end_deg) =
            if slant >= 0.0 { (square_deg, square_deg + slant) } else { (square_deg + slant, square_deg) };
        let label_mm = width_mm(&label, lettering::SMALL_MM);
        let foot = vertex.toward(Point::direction(square_deg + slant), radius_mm);
        let at = pt(vertex.x.max(foot.x) + TAIL_MM + label_mm / 2.0, vertex.y + sign * radius_mm);
        let measure = Measure::Angular { vertex, start_deg, end_deg, radius_mm };
        for angle_deg in [square_deg, square_deg + slant] {
            let way = Point::direction(angle_deg);
            block.line(
                DIMENSION,
                THIN,
                vertex.toward(way, slot.length_mm() + 0.8),
                vertex.toward(way, radius_mm + 1.5),
            );
        }
        if slant.abs() > 0.005 {
            block.dimension(Dimension::new(measure, label).labelled_at(at));
        }
        if downward {
            bottom_mm = bottom_mm.min(vertex.y - radius_mm)
        } else {
            top_mm = top_mm.max(vertex.y + radius_mm)
        }
    }
    (top_mm, bottom_mm)
}

/// x of the slots' ends and of the nominal line's ends from the datum, above and below the view.
fn dimension_from_datum(block: &mut Block, facts: &Facts<'_>, (top_mm, bottom_mm): (f64, f64), left_mm: f64) {
    let [nominal_top, nominal_bottom] = facts.saddle_line;
    let fanned = (nominal_top.x - nominal_bottom.x).abs() > 0.005;
    let ends = outer_ends(facts);
    let above = ends.map(|e| e.0).into_iter().chain([nominal_top]);
    let below = ends.map(|e| e.1).into_iter().chain(fanned.then_some(nominal_bottom));
    for (features, start_mm, step_mm) in [
        (above.collect::<Vec<_>>(), top_mm + 3.0, LINE_STEP_MM),
        (below.collect(), bottom_mm - 3.0 - 3.0, -LINE_STEP_MM),
    ] {
        let mut line_mm = start_mm;
        for feature in features {
            if (feature.x - facts.datum_x_mm).abs() < 0.005 {
                continue;
            }
            match facts.options.datum {
                Datum::SaddleLine => from_near_datum(block, facts, feature, (start_mm, line_mm)),
                Datum::Nut | Datum::TwelfthFret => from_far_datum(block, facts, feature, line_mm, left_mm),
            }
            line_mm += step_mm;
        }
    }
}

/// A dimension from a datum within the view. The datum's extension line starts where the view ends,
/// clear of what stands between.
fn from_near_datum(block: &mut Block, facts: &Facts<'_>, feature: Point, (start_mm, line_mm): (f64, f64)) {
    let datum = pt(facts.datum_x_mm, start_mm - (start_mm - feature.y).signum());
    let measure = Measure::Linear { from: datum, to: feature, direction_deg: 0.0, line_at: pt(0.0, line_mm) };
    block.dimension(Dimension::new(measure, facts.x_text(feature.x)));
}

/// A dimension whose other end lies off the sheet: its line is broken off toward the datum.
fn from_far_datum(block: &mut Block, facts: &Facts<'_>, feature: Point, line_mm: f64, left_mm: f64) {
    const BREAK_MM: f64 = 9.0;
    let words = format!("{} from {}", facts.x_text(feature.x), facts.datum_short());
    let words_mm = width_mm(&words, lettering::SMALL_MM);
    let tip = pt(feature.x, line_mm);
    let end = pt(left_mm.min(tip.x - BREAK_MM - words_mm - 4.0), line_mm);
    let away = if line_mm >= feature.y { 1.0 } else { -1.0 };
    block.line(DIMENSION, THIN, pt(feature.x, feature.y + away * 0.8), pt(feature.x, line_mm + away * 1.5));
    block.line(DIMENSION, THIN, end, tip);
    block.add(DIMENSION, THIN, arrow(tip, 1.0));
    block.add(DIMENSION, THIN, arrow(end, -1.0));
    // The break: two short slanting strokes.
    for x in [end.x + 6.0, end.x + 7.0] {
        block.line(DIMENSION, THIN, pt(x - 0.6, line_mm - 1.4), pt(x + 0.6, line_mm + 1.4));
    }
    let text = small(pt(end.x + BREAK_MM, line_mm + 1.0), Anchor::Start, words);
    block.add(DIMENSION, THIN, Shape::Text(text));
}

/// A filled arrow of 2.5 mm that points along x, to the right for a positive way.
fn arrow(tip: Point, way: f64) -> Shape {
    let (length_mm, half_mm) = (lettering::SMALL_MM, 0.33);
    let back_mm = tip.x - way * length_mm;
    Shape::Fill(vec![tip, pt(back_mm, tip.y + half_mm), pt(back_mm, tip.y - half_mm)])
}
