//! The SVG writer: a page with its size in millimetres and one user unit a millimetre.

use crate::flatten::{Mark, Primitive};
use crate::font::FONT_FAMILY;
use crate::number::push;
use crate::{Drawing, Layer, LayerId, Pen, Point, Rect, Sheet, TextRun};

/// Decimals of coordinates: a tenth of a micrometre.
const DECIMALS: usize = 4;

/// All sheets of a drawing, one below the other, each in true size.
#[must_use]
pub fn svg(drawing: &Drawing) -> Vec<u8> {
    page(drawing, &drawing.sheets)
}

/// One sheet of a drawing, counted from 0; `None` if there is no such sheet.
#[must_use]
pub fn svg_sheet(drawing: &Drawing, index: usize) -> Option<Vec<u8>> {
    drawing.sheets.get(index).map(|sheet| page(drawing, std::slice::from_ref(sheet)))
}

fn page(drawing: &Drawing, sheets: &[Sheet]) -> Vec<u8> {
    let width_mm = sheets.iter().map(|s| s.area.width()).fold(0.0, f64::max);
    let height_mm: f64 = sheets.iter().map(|s| s.area.height()).sum();
    let mut out = String::from("<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n");
    out.push_str("<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"");
    push(&mut out, width_mm, DECIMALS);
    out.push_str("mm\" height=\"");
    push(&mut out, height_mm, DECIMALS);
    out.push_str("mm\" viewBox=\"0 0 ");
    push_pair(&mut out, width_mm, height_mm);
    out.push_str("\" fill=\"none\" stroke-linecap=\"round\" stroke-linejoin=\"round\" font-family=\"");
    out.push_str(FONT_FAMILY);
    out.push_str(", sans-serif\" font-kerning=\"none\" font-variant-ligatures=\"none\">\n<title>");
    push_escaped(&mut out, &crate::clean(&drawing.title));
    out.push_str("</title>\n");
    let mut top_mm = 0.0;
    for (index, sheet) in sheets.iter().enumerate() {
        push_sheet(&mut out, &drawing.layers, sheet, index, top_mm);
        top_mm += sheet.area.height();
    }
    out.push_str("</svg>\n");
    out.into_bytes()
}

fn push_sheet(out: &mut String, layers: &[Layer], sheet: &Sheet, index: usize, top_mm: f64) {
    let number = index + 1;
    out.push_str(&format!("<g id=\"sheet-{number}\">\n<title>"));
    push_escaped(out, &crate::clean(&sheet.name));
    out.push_str("</title>\n<rect fill=\"#ffffff\" x=\"0\" y=\"");
    push(out, top_mm, DECIMALS);
    push_value(out, "width", sheet.area.width());
    push_value(out, "height", sheet.area.height());
    out.push_str("\"/>\n");
    let frame = Frame { area: sheet.area, top_mm };
    let primitives = sheet.primitives();
    for (layer_index, layer) in layers.iter().enumerate() {
        let mut of_layer = primitives.iter().filter(|p| p.layer == LayerId(layer_index)).peekable();
        if of_layer.peek().is_none() {
            continue;
        }
        let [r, g, b] = layer.colour.rgb();
        let id = layer.name;
        out.push_str(&format!("<g id=\"sheet-{number}-{id}\" stroke=\"#{r:02x}{g:02x}{b:02x}\">\n"));
        for primitive in of_layer {
            push_primitive(out, &frame, primitive, [r, g, b]);
        }
        out.push_str("</g>\n");
    }
    out.push_str("</g>\n");
}

/// From a sheet's coordinates to the page's, y down.
struct Frame {
    area: Rect,
    top_mm: f64,
}

impl Frame {
    fn push(&self, out: &mut String, p: Point) {
        push_pair(out, p.x - self.area.min.x, self.area.max.y - p.y + self.top_mm);
    }
}

fn push_primitive(out: &mut String, frame: &Frame, primitive: &Primitive, [r, g, b]: [u8; 3]) {
    match &primitive.mark {
        Mark::Stroke { points, closed } => {
            push_path(out, frame, points, *closed);
            push_pen(out, primitive.pen);
        }
        Mark::Arc { centre, radius_mm, start_deg, sweep_deg } => {
            push_arc(out, frame, *centre, *radius_mm, (*start_deg, *sweep_deg));
            push_pen(out, primitive.pen);
        }
        Mark::Fill(points) => {
            push_path(out, frame, points, true);
            out.push_str(&format!("\" stroke=\"none\" fill=\"#{r:02x}{g:02x}{b:02x}"));
        }
        Mark::Text(run) => return push_text(out, frame, run, [r, g, b]),
    }
    out.push_str("\"/>\n");
}

fn push_path(out: &mut String, frame: &Frame, points: &[Point], closed: bool) {
    out.push_str("<path d=\"");
    for (i, p) in points.iter().enumerate() {
        out.push_str(if i == 0 { "M" } else { " L" });
        frame.push(out, *p);
    }
    if closed {
        out.push('Z');
    }
}

fn push_arc(out: &mut String, frame: &Frame, centre: Point, radius_mm: f64, (start, sweep): (f64, f64)) {
    // In two halves, because one elliptical arc cannot be a whole circle.
    out.push_str("<path d=\"M");
    frame.push(out, centre.toward(Point::direction(start), radius_mm));
    for part in [0.5, 1.0] {
        out.push_str(" A");
        push_pair(out, radius_mm, radius_mm);
        out.push_str(" 0 0 0 ");
        frame.push(out, centre.toward(Point::direction(start + part * sweep), radius_mm));
    }
}

fn push_pen(out: &mut String, pen: Pen) {
    push_value(out, "stroke-width", pen.width.mm());
    let pattern = pen.style.pattern_mm(pen.width);
    if !pattern.is_empty() {
        out.push_str("\" stroke-linecap=\"butt\" stroke-dasharray=\"");
        for (i, length_mm) in pattern.into_iter().enumerate() {
            out.push_str(if i == 0 { "" } else { " " });
            push(out, length_mm, DECIMALS);
        }
    }
}

fn push_text(out: &mut String, frame: &Frame, run: &TextRun, [r, g, b]: [u8; 3]) {
    if run.content.trim().is_empty() {
        return;
    }
    out.push_str("<text transform=\"translate(");
    frame.push(out, run.start);
    if run.angle_deg != 0.0 {
        out.push_str(") rotate(");
        push(out, -run.angle_deg, DECIMALS);
    }
    out.push(')');
    push_value(out, "font-size", run.font_size_mm());
    // A viewer without the font still keeps the text in its box.
    push_value(out, "textLength", run.width_mm);
    out.push_str("\" lengthAdjust=\"spacingAndGlyphs\" xml:space=\"preserve\" stroke=\"none");
    out.push_str(&format!("\" fill=\"#{r:02x}{g:02x}{b:02x}\">"));
    push_escaped(out, &run.content);
    out.push_str("</text>\n");
}

fn push_value(out: &mut String, name: &str, value: f64) {
    out.push_str("\" ");
    out.push_str(name);
    out.push_str("=\"");
    push(out, value, DECIMALS);
}

fn push_pair(out: &mut String, x: f64, y: f64) {
    push(out, x, DECIMALS);
    out.push(' ');
    push(out, y, DECIMALS);
}

/// Text as XML character data.
fn push_escaped(out: &mut String, text: &str) {
    for character in text.chars() {
        match character {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\'' => out.push_str("&#39;"),
            _ => out.push(character),
        }
    }
}
