//! The template to cut out and glue on: outlines and lines to align, without dimensions.

use crestline_drawing::{Anchor, Shape, pt};

use crate::block::{Block, DASHED, THIN, small};
use crate::facts::{Facts, crossing_x_mm};
use crate::layers::{TEMPLATE, TEXT};
use crate::plan_view::{draw_saddle, saddle_core};

/// Margin of the template around the saddle, mm.
const MARGIN_MM: f64 = 14.0;

/// The template with its cutting line, on a sheet of its own.
pub(crate) fn template(facts: &Facts<'_>) -> Block {
    let mut block = Block::new("Template", "Cutting template, 1:1");
    block.scale = Some("1:1");
    block.alone = true;
    let area = saddle_core(facts).grown(MARGIN_MM);
    draw_saddle(&mut block, facts, area.min.x, area.max.x);
    let corners = area.corners();
    block.outline(TEMPLATE, DASHED, &corners);
    let words = [
        "Cut along the dashed line.".to_owned(),
        "Align the chain lines with the centre line and the nominal saddle line,".to_owned(),
        format!(
            "which crosses the centre line {} {} from the nominal nut line.",
            facts.text(crossing_x_mm(facts.saddle_line)),
            facts.options.units.sign()
        ),
        "Check a second time against the instrument before cutting.".to_owned(),
    ];
    for (line, row) in words.into_iter().zip(0..) {
        let at = pt(area.min.x, area.min.y - 6.0 - 4.4 * f64::from(row));
        block.text(small(at, Anchor::Start, line));
    }
    let up = small(pt(area.min.x + 3.0, area.max.y - 5.5), Anchor::Start, "← nut    treble side up");
    block.add(TEXT, THIN, Shape::Text(up));
    block
}
