//! The layers of the drawings. The first six are those of the machine drawing.

use crestline_drawing::{Colour, Drawing, LayerId};

pub(crate) const NOMINAL: LayerId = LayerId(0);
pub(crate) const STRING: LayerId = LayerId(1);
pub(crate) const SLOT: LayerId = LayerId(2);
pub(crate) const DIMENSION: LayerId = LayerId(3);
pub(crate) const TEXT: LayerId = LayerId(4);
pub(crate) const CREST: LayerId = LayerId(5);
pub(crate) const PROFILE: LayerId = LayerId(6);
pub(crate) const TABLE: LayerId = LayerId(7);
pub(crate) const TEMPLATE: LayerId = LayerId(8);
pub(crate) const REGISTER: LayerId = LayerId(9);
pub(crate) const CHECK: LayerId = LayerId(10);
pub(crate) const FRAME: LayerId = LayerId(11);
pub(crate) const NUT: LayerId = LayerId(12);

/// Names and colours in the order of the numbers above.
const LAYERS: [(&str, Colour); 13] = [
    ("NOMINAL", Colour::Green),
    ("STRING", Colour::Grey),
    ("SLOT", Colour::Black),
    ("DIMENSION", Colour::Blue),
    ("TEXT", Colour::Black),
    ("CREST", Colour::Red),
    ("PROFILE", Colour::Black),
    ("TABLE", Colour::Black),
    ("TEMPLATE", Colour::Black),
    ("REGISTER", Colour::Violet),
    ("CHECK", Colour::Black),
    ("FRAME", Colour::Black),
    ("NUT", Colour::Black),
];

/// How many layers the machine drawing has.
const MACHINE_LAYERS: usize = 6;

/// An empty drawing with the layers of the paper drawing.
pub(crate) fn paper_drawing(title: &str) -> Drawing {
    with_layers(title, LAYERS.len())
}

/// An empty drawing with the layers of the machine drawing.
pub(crate) fn machine_drawing(title: &str) -> Drawing {
    with_layers(title, MACHINE_LAYERS)
}

fn with_layers(title: &str, count: usize) -> Drawing {
    let mut drawing = Drawing::new(title);
    for (name, colour) in LAYERS.into_iter().take(count) {
        drawing.add_layer(name, colour);
    }
    drawing
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_stand_under_their_numbers() {
        let drawing = paper_drawing("");
        let name = |id| drawing.layer(id).map(|layer| layer.name);
        for (id, expected) in [(NOMINAL, "NOMINAL"), (CREST, "CREST"), (SLOT, "SLOT"), (TEXT, "TEXT")] {
            assert_eq!(name(id), Some(expected));
        }
        assert_eq!((name(REGISTER), name(NUT)), (Some("REGISTER"), Some("NUT")));
        assert_eq!(machine_drawing("").layers.len(), 6);
    }
}
