//! Profile of the saddle's top across its thickness, string by string, five times enlarged.

use crestline_drawing::{Anchor, Dimension, Measure, Point, lettering, pt, wrap};

use crate::block::{Block, CHAIN, THICK, THIN, small};
use crate::facts::{Facts, StringFacts};
use crate::layers::PROFILE;

/// The enlargement.
const SCALE: f64 = 5.0;
/// Fall of the top on both sides of the crest; a picture only, and said so on the sheet.
const FLANK_DEG: f64 = 15.0;
/// Depth of blank shown below the lowest edge of the top, mm on paper.
const BODY_MM: f64 = 8.0;
/// Height of the dimension line over the crest, mm on paper.
const LINE_MM: f64 = 6.0;
/// Least width of one string's picture, mm on paper.
const CELL_MM: f64 = 34.0;
/// Space between pictures, mm on paper.
const GAP_MM: f64 = 6.0;

/// The profiles of all strings, a block a row no wider than a width, and what to know about them.
pub(crate) fn profile(facts: &Facts<'_>, width_mm: f64) -> Vec<Block> {
    let thickness_mm = SCALE * facts.plan.saddle.thickness_mm;
    let cell_mm = CELL_MM.max(thickness_mm + 12.0) + GAP_MM;
    // At least one and at most sixteen.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let columns = (((width_mm + GAP_MM) / cell_mm).floor().clamp(1.0, 16.0)) as usize;
    let rows = facts.strings.chunks(columns).enumerate().map(|(index, row)| {
        let title =
            if index == 0 { "Profile of the saddle top at each string, 5:1, nut to the left" } else { "" };
        let mut block = Block::new("Profile", title);
        block.scale = Some("5:1");
        let mut x_mm = 0.0;
        for string in row {
            cell(&mut block, facts, string, pt(x_mm + (cell_mm - GAP_MM) / 2.0, 0.0), cell_mm - GAP_MM);
            x_mm += cell_mm;
        }
        block
    });
    rows.chain([notes(width_mm)]).collect()
}

fn notes(width_mm: f64) -> Block {
    let mut block = Block::new("", "");
    let words = format!(
        "The flanks are drawn falling at {FLANK_DEG}° and may be shaped freely; the place and height of the crest count. \
         Heights are above the plane of the first and last fret's crowns; offsets are from the middle of the thickness."
    );
    for (line, row) in wrap(&words, lettering::SMALL_MM, width_mm).into_iter().zip(0..) {
        block.text(small(pt(0.0, -4.2 * f64::from(row)), Anchor::Start, line));
    }
    block
}

/// One string's picture with its crest at the height of `top`, the slot's centre line at its x.
fn cell(block: &mut Block, facts: &Facts<'_>, string: &StringFacts, top: Point, width_mm: f64) {
    let half_mm = SCALE * facts.plan.saddle.thickness_mm / 2.0;
    let offset_mm = string.built.slot_offset_mm.unwrap_or(0.0);
    let crest = pt(top.x + SCALE * offset_mm, top.y);
    let fall = FLANK_DEG.to_radians().tan();
    let edge = |x: f64| pt(x, crest.y - fall * (crest.x - x).abs());
    let (front, back) = (edge(top.x - half_mm), edge(top.x + half_mm));
    let bottom_mm = front.y.min(back.y) - BODY_MM;
    let (front_foot, back_foot) = (pt(front.x, bottom_mm), pt(back.x, bottom_mm));
    for pair in [front_foot, front, crest, back, back_foot].windows(2) {
        block.line(PROFILE, THICK, pair[0], pair[1]);
    }
    block.line(PROFILE, THIN, front_foot, back_foot);
    block.line(PROFILE, CHAIN, pt(top.x, bottom_mm - 1.5), pt(top.x, top.y + 2.0));
    if offset_mm.abs() >= 0.005 {
        let from = pt(top.x, top.y + 2.0);
        let measure =
            Measure::Linear { from, to: crest, direction_deg: 0.0, line_at: pt(0.0, top.y + LINE_MM) };
        // The figure stands over the middle, where it has room whichever way the crest lies.
        block.dimension(Dimension::new(measure, ""));
        block.text(small(pt(top.x, top.y + LINE_MM + 2.4), Anchor::Middle, facts.text(offset_mm)));
    }
    let line = |y: f64, words: String| small(pt(top.x, y), Anchor::Middle, words).within(width_mm);
    block.text(line(bottom_mm - 6.0, string.label()));
    block.text(line(bottom_mm - 10.2, format!("height {}", facts.text(string.built.crest_mm.z))));
}
