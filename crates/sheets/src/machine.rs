//! The drawing for a machine table or a CAD program.

use crestline_drawing::{
    Anchor, Dimension, Drawing, Measure, Point, Rect, Shape, Sheet, Text, clean, lettering, pt, width_mm,
};
use crestline_plan::{Datum, Plan, Solution};

use crate::SheetOptions;
use crate::block::{Block, CHAIN, MEDIUM, THICK, THIN, small};
use crate::facts::{Facts, point};
use crate::layers::{CREST, NOMINAL, SLOT, STRING, TEXT, machine_drawing};
use crate::nut_view::nut_measure;
use crate::plan_dimensions::{dimension_across, dimension_setbacks, dimension_slants, outer_ends};
use crate::plan_view::{LABEL_STEP_MM, longer, saddle_core};
use crate::spread::spread;

/// Distance of parallel dimension lines, mm.
const LINE_STEP_MM: f64 = 7.0;

/// The plan view of the whole instrument with its origin at the datum on the centre line, x away from the nut,
/// y toward string 1, in millimetres. Layers: `CREST`, a point a string and nothing else; `SLOT`, closed outlines
/// and nothing else; `STRING`; `NOMINAL`; `DIMENSION`; `TEXT`.
#[must_use]
pub fn machine(plan: &Plan, solution: &Solution, options: &SheetOptions) -> Drawing {
    let facts = Facts::new(plan, solution, options);
    let mut block = Block::default();
    draw_lines(&mut block, &facts);
    let core = saddle_core(&facts);
    let labels = dimension_setbacks(&mut block, &facts, core.max.x + 10.0);
    dimension_across(&mut block, &facts, labels.max.x);
    let heights = dimension_slants(&mut block, &facts, core, labels);
    let top_mm = dimension_from_datum(&mut block, &facts, heights);
    label_nut(&mut block, &facts);
    write_texts(&mut block, &facts, core, top_mm);
    let block = block.moved(pt(-facts.datum_x_mm, 0.0));
    let area = block.bounds().grown(10.0);
    let mut drawing = machine_drawing(&plan.title);
    drawing.sheets.push(Sheet { name: "Machine".to_owned(), area, items: block.items });
    drawing
}

fn draw_lines(block: &mut Block, facts: &Facts<'_>) {
    let left_mm = facts.nut_line[0].x.min(facts.nut_line[1].x).min(facts.datum_x_mm) - 6.0;
    let right_mm = saddle_core(facts).max.x + 10.0;
    block.line(NOMINAL, CHAIN, pt(left_mm, 0.0), pt(right_mm, 0.0));
    let twelfth = facts.solution.layout.frets.get(11).filter(|_| facts.options.datum == Datum::TwelfthFret);
    for line in [facts.nut_line, facts.saddle_line].into_iter().chain(twelfth.map(|line| line.map(point))) {
        let (from, to) = longer(line, 3.0);
        block.line(NOMINAL, CHAIN, from, to);
    }
    for string in &facts.strings {
        block.line(STRING, THIN, string.nut_edge, string.crest);
    }
    for slot in &facts.slots {
        block.outline(SLOT, THICK, &slot.corners);
    }
    for string in &facts.strings {
        block.add(CREST, MEDIUM, Shape::Point(string.crest));
    }
}

/// Slot ends and the nominal saddle line's ends from the datum, each a dimension that measures itself;
/// gives the height above which nothing is drawn yet.
fn dimension_from_datum(block: &mut Block, facts: &Facts<'_>, (top_mm, bottom_mm): (f64, f64)) -> f64 {
    let [nominal_top, nominal_bottom] = facts.saddle_line;
    let ends = outer_ends(facts);
    let above = ends.map(|e| e.0).into_iter().chain([nominal_top]);
    let below = ends.map(|e| e.1).into_iter().chain([nominal_bottom]);
    let mut sides = [
        (above.collect::<Vec<_>>(), top_mm + 4.0, LINE_STEP_MM),
        (below.collect(), bottom_mm - 7.0, -LINE_STEP_MM),
    ];
    for (features, line_mm, step_mm) in &mut sides {
        // The datum's extension line starts where the view ends.
        let start_mm = *line_mm - step_mm.signum();
        for feature in features {
            if (feature.x - facts.datum_x_mm).abs() < 0.005 {
                continue;
            }
            let datum = pt(facts.datum_x_mm, start_mm);
            let measure =
                Measure::Linear { from: datum, to: *feature, direction_deg: 0.0, line_at: pt(0.0, *line_mm) };
            block.dimension(Dimension::new(measure, facts.x_text(feature.x)));
            *line_mm += *step_mm;
        }
    }
    sides[0].1
}

/// Setback of every nut edge that has been moved, and the names of the strings, beyond the nut.
fn label_nut(block: &mut Block, facts: &Facts<'_>) {
    const NAME_MM: f64 = 30.0;
    const COLUMN_MM: f64 = 13.0;
    let nut_mm = facts.strings.iter().flat_map(|s| [s.nut.x, s.nut_edge.x]).fold(0.0, f64::min);
    let places = spread(&facts.strings.iter().map(|s| s.nut_edge.y).collect::<Vec<_>>(), LABEL_STEP_MM);
    for (string, y) in facts.strings.iter().zip(places) {
        let label = facts.text(string.built.nut_setback_mm);
        let label_mm = width_mm(&clean(&label), lettering::SMALL_MM);
        let at = pt(nut_mm - COLUMN_MM - label_mm / 2.0, y);
        let end = pt(nut_mm - COLUMN_MM - 14.0, y);
        if string.built.nut_setback_mm == 0.0 {
            block.line(TEXT, THIN, pt(nut_mm - 7.0, string.nut_edge.y), pt(nut_mm - COLUMN_MM, y));
            block.line(TEXT, THIN, pt(nut_mm - COLUMN_MM, y), end);
        } else {
            block.dimension(Dimension::new(nut_measure(string), label).labelled_at(at));
        }
        block.text(small(pt(end.x - 1.0, y - 1.25), Anchor::End, string.label()).within(NAME_MM));
    }
}

/// What the drawing is, above the saddle.
fn write_texts(block: &mut Block, facts: &Facts<'_>, core: Rect, top_mm: f64) {
    let title = if facts.plan.title.trim().is_empty() { "Saddle" } else { facts.plan.title.as_str() };
    let words = format!(
        "Coordinates in millimetres. Origin: {} on the centre line. x away from the nut, y toward string 1. Figures in {}.",
        facts.datum_words(),
        facts.options.units.words()
    );
    let left_mm = core.min.x - 60.0;
    let lines: [(Point, f64, &str); 2] = [
        (pt(left_mm, top_mm + 12.0), lettering::LARGE_MM, title),
        (pt(left_mm, top_mm + 5.0), lettering::SMALL_MM, &words),
    ];
    for (at, height_mm, content) in lines {
        block.add(TEXT, THIN, Shape::Text(Text::new(at, height_mm, content).within(240.0)));
    }
}
