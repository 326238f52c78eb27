//! What the lines of the plan views mean.

use crestline_drawing::{Anchor, Pen, Shape, pt};

use crate::block::{Block, CHAIN, MEDIUM, THICK, THIN, small};
use crate::layers::{CREST, NOMINAL, SLOT, STRING};

/// Samples of the lines with their words, in one row.
pub(crate) fn legend() -> Block {
    let mut block = Block::new("", "");
    let samples: [(&str, Pen, _); 4] = [
        ("nominal saddle line, centre line", CHAIN, NOMINAL),
        ("string", THIN, STRING),
        ("slot or piece", THICK, SLOT),
        ("crest", MEDIUM, CREST),
    ];
    let mut x_mm = 0.0;
    for (words, pen, layer) in samples {
        if layer == CREST {
            block.add(layer, pen, Shape::Point(pt(x_mm + 4.0, 0.0)));
        } else {
            block.line(layer, pen, pt(x_mm, 0.0), pt(x_mm + 8.0, 0.0));
        }
        let text = small(pt(x_mm + 10.0, -1.25), Anchor::Start, words);
        x_mm += 16.0 + text.run().width_mm;
        block.text(text);
    }
    block
}
