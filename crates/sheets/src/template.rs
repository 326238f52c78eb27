//! The template to cut out and glue on: outlines and lines to align, without dimensions.

use crestline_drawing::{Anchor, pt};

use crate::block::{Block, CHAIN, DASHED, small};
use crate::facts::{Facts, crossing_x_mm};
use crate::layers::{NOMINAL, TEMPLATE};
use crate::plan_view::{LABEL_STEP_MM, draw_saddle, saddle_core};

/// Margin of the template around the saddle, mm.
const MARGIN_MM: f64 = 14.0;
/// More margin on the side of the nut, for the strings' numbers, mm.
const LEFT_MM: f64 = 10.0;

/// The template with its cutting line, on a sheet of its own.
pub(crate) fn template(facts: &Facts<'_>) -> Block {
    let mut block = Block::new("Template", "Cutting template, 1:1");
    block.scale = Some("1:1");
    block.alone = true;
    let mut area = saddle_core(facts).grown(MARGIN_MM);
    area.min.x -= LEFT_MM;
    // Both lines run to the cutting line, so that they can be laid on lines drawn on the instrument.
    block.line(NOMINAL, CHAIN, pt(area.min.x, 0.0), pt(area.max.x, 0.0));
    draw_saddle(&mut block, facts, area.min.x + LEFT_MM, MARGIN_MM);
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
    block.text(small(pt(area.min.x + 3.0, area.max.y - 5.5), Anchor::Start, "← nut"));
    // The outer strings' numbers tell which way up it lies; on the centre line they would hide it.
    let outer = facts.strings.first().into_iter().chain(facts.strings.last());
    let mut last_y = f64::MAX;
    for string in outer.filter(|s| s.crest.y.abs() > 2.0) {
        if (string.crest.y - last_y).abs() > LABEL_STEP_MM {
            let at = pt(area.min.x + LEFT_MM - 1.5, string.crest.y - 1.25);
            block.text(small(at, Anchor::End, string.number.to_string()));
            last_y = string.crest.y;
        }
    }
    block
}
