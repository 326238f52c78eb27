//! What the lines of the plan views mean.

use crestline_drawing::{Anchor, Pen, Shape, pt};

use crate::block::{Block, CHAIN, MEDIUM, THICK, THIN, small};
use crate::layers::TEXT;

/// Samples of the lines with their words, in one row.
pub(crate) fn legend() -> Block {
    let mut block = Block::new("", "");
    let samples: [(&str, Option<Pen>); 4] = [
        ("nominal saddle line, centre line", Some(CHAIN)),
        ("string", Some(THIN)),
        ("slot or piece", Some(THICK)),
        ("crest", None),
    ];
    let mut x_mm = 0.0;
    for (words, pen) in samples {
        // On the layer of texts, so that the layers of crests and slots hold nothing but those.
        match pen {
            Some(pen) => block.line(TEXT, pen, pt(x_mm, 0.0), pt(x_mm + 8.0, 0.0)),
            None => block.add(TEXT, MEDIUM, Shape::Point(pt(x_mm + 4.0, 0.0))),
        }
        let text = small(pt(x_mm + 10.0, -1.25), Anchor::Start, words);
        x_mm += 16.0 + text.run().width_mm;
        block.text(text);
    }
    block
}
