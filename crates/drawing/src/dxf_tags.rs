//! Pairs of group code and value, text in the form R12 understands, and the tables.

use crate::number::push;
use crate::{Drawing, LineStyle, Point, Width};

/// Decimals of coordinates: a nanometre, far below what a reader may round to.
const DECIMALS: usize = 6;
/// The name of the one text style.
pub(crate) const TEXT_STYLE: &str = "STANDARD";
/// The name of the one dimension style.
pub(crate) const DIMENSION_STYLE: &str = "STANDARD";
/// The longest text that every R12 reader takes.
const LONGEST_TEXT: usize = 255;

/// A file in the making.
#[derive(Default)]
pub(crate) struct Tags {
    out: String,
}

impl Tags {
    /// A value of the program's own, known to be plain ASCII.
    pub(crate) fn text(&mut self, code: i32, value: &str) {
        self.raw(code, value);
    }

    /// A value already in DXF's form.
    pub(crate) fn raw(&mut self, code: i32, value: &str) {
        self.out.push_str(&format!("{code:>3}\n{value}\n"));
    }

    pub(crate) fn integer(&mut self, code: i32, value: i32) {
        self.out.push_str(&format!("{code:>3}\n{value}\n"));
    }

    pub(crate) fn real(&mut self, code: i32, value: f64) {
        self.out.push_str(&format!("{code:>3}\n"));
        let start = self.out.len();
        push(&mut self.out, value, DECIMALS);
        if !self.out[start..].contains('.') {
            self.out.push_str(".0");
        }
        self.out.push('\n');
    }

    pub(crate) fn point(&mut self, code: i32, p: Point) {
        self.real(code, p.x);
        self.real(code + 10, p.y);
    }

    pub(crate) fn point3(&mut self, code: i32, p: Point) {
        self.point(code, p);
        self.real(code + 20, 0.0);
    }

    pub(crate) fn variable(&mut self, name: &str) {
        self.text(9, name);
    }

    pub(crate) fn finish(self) -> Vec<u8> {
        self.out.into_bytes()
    }
}

/// Clean text as the value of a TEXT entity: other than ASCII as `\U+hhhh`, and nothing that R12 or a later
/// reader would take for a code (`%%c`, `^J`, `\P`).
pub(crate) fn text_value(clean: &str) -> String {
    let mut out = String::new();
    let mut last = ' ';
    for character in clean.chars() {
        let form = match character {
            // Two percent signs start a code; a space keeps them apart.
            '%' if last == '%' => " %".to_owned(),
            // A caret and a space mean a caret.
            '^' => "^ ".to_owned(),
            '\\' => unicode('\\'),
            // R12's own codes, and plain signs where they say the same, reach more readers than \U+ does.
            '°' => "%%d".to_owned(),
            '±' => "%%p".to_owned(),
            '⌀' | 'Ø' => "%%c".to_owned(),
            '−' | '–' => "-".to_owned(),
            ' '..='~' => character.to_string(),
            _ => unicode(character),
        };
        if out.len() + form.len() > LONGEST_TEXT {
            break;
        }
        out.push_str(&form);
        last = character;
    }
    out
}

/// A dimension's figure: as a text, and without the braces and backslashes that format paragraphs there.
pub(crate) fn figure_value(label: &str) -> String {
    let plain = |c: char| match c {
        '\\' => '/',
        '{' => '(',
        '}' => ')',
        // Alone they would ask the reader for its own figure.
        '<' | '>' => '-',
        _ => c,
    };
    text_value(&crate::clean(label).chars().map(plain).collect::<String>())
}

/// Four hexadecimal digits are all that the form holds; what lies beyond is shown by a substitute.
fn unicode(character: char) -> String {
    let code = u32::from(character);
    format!("\\U+{:04X}", if code > 0xFFFF { u32::from(crate::SUBSTITUTE) } else { code })
}

/// Line types, layers, the text style and the dimension style.
pub(crate) fn push_tables(tags: &mut Tags, drawing: &Drawing) {
    tags.text(0, "SECTION");
    tags.text(2, "TABLES");
    push_line_types(tags);
    table(tags, "LAYER", drawing.layers.len() + 1);
    push_layer(tags, "0", 7);
    for layer in &drawing.layers {
        push_layer(tags, layer.name, i32::from(layer.colour.dxf_number()));
    }
    tags.text(0, "ENDTAB");
    push_text_style(tags);
    push_dimension_style(tags);
    tags.text(0, "ENDSEC");
}

fn table(tags: &mut Tags, name: &str, count: usize) {
    tags.text(0, "TABLE");
    tags.text(2, name);
    tags.integer(70, i32::try_from(count).unwrap_or(i32::MAX));
}

fn push_line_types(tags: &mut Tags) {
    table(tags, "LTYPE", 3);
    let styles =
        [("CONTINUOUS", LineStyle::Solid), ("DASHED", LineStyle::Dashed), ("CHAIN", LineStyle::Chain)];
    for (name, style) in styles {
        let pattern = style.pattern_mm(Width::W025);
        tags.text(0, "LTYPE");
        tags.text(2, name);
        tags.integer(70, 0);
        tags.text(3, name);
        tags.integer(72, 65);
        tags.integer(73, i32::try_from(pattern.len()).unwrap_or(0));
        tags.real(40, pattern.iter().sum());
        for (i, length_mm) in pattern.into_iter().enumerate() {
            // Gaps are negative.
            tags.real(49, if i % 2 == 0 { length_mm } else { -length_mm });
        }
    }
    tags.text(0, "ENDTAB");
}

fn push_layer(tags: &mut Tags, name: &str, colour: i32) {
    tags.text(0, "LAYER");
    tags.text(2, name);
    tags.integer(70, 0);
    tags.integer(62, colour);
    tags.text(6, "CONTINUOUS");
}

fn push_text_style(tags: &mut Tags) {
    table(tags, "STYLE", 1);
    tags.text(0, "STYLE");
    tags.text(2, TEXT_STYLE);
    tags.integer(70, 0);
    tags.real(40, 0.0);
    tags.real(41, 1.0);
    tags.real(50, 0.0);
    tags.integer(71, 0);
    tags.real(42, 2.5);
    tags.text(3, "DejaVuSans.ttf");
    tags.text(4, "");
    tags.text(0, "ENDTAB");
}

fn push_dimension_style(tags: &mut Tags) {
    table(tags, "DIMSTYLE", 1);
    tags.text(0, "DIMSTYLE");
    tags.text(2, DIMENSION_STYLE);
    tags.integer(70, 0);
    // Size of arrows, extension lines' gap and overrun, height of figures, gap under figures.
    for (code, value) in [(40, 1.0), (41, 2.5), (42, 0.8), (44, 1.5), (140, 2.5), (147, 1.0)] {
        tags.real(code, value);
    }
    // Figure above the line.
    tags.integer(77, 1);
    tags.text(0, "ENDTAB");
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn text_cannot_smuggle_codes() {
        assert_eq!(text_value("50 %%c ^J \\P é"), "50 % %c ^ J \\U+005CP \\U+00E9");
        assert_eq!(text_value("%%%%"), "% % % %");
        assert_eq!(text_value("−2.5° ±1 ⌀3"), "-2.5%%d %%p1 %%c3");
        assert_eq!(text_value("\u{10300}"), "\\U+25A1");
        assert_eq!(figure_value("{\\fArial;<>}"), "(/fArial;--)");
        assert!(text_value(&"é".repeat(300)).len() <= LONGEST_TEXT);
    }

    #[test]
    fn reals_are_written_as_reals() {
        let mut tags = Tags::default();
        tags.real(10, 2.0);
        assert_eq!(tags.finish(), b" 10\n2.0\n");
    }
}
