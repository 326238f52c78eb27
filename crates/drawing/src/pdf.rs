//! The PDF writer: a page a sheet in true size, an optional-content group a layer, the font embedded
//! as a subset, and the request not to scale when printing (ISO 32000-1, sections 8.11, 9.7 and 12.2).

use pdf_writer::types::{LineCapStyle, LineJoinStyle};
use pdf_writer::{Content, Finish, Name, Pdf, Rect as PdfRect, Ref, Str, TextStr};

use crate::flatten::{Mark, Primitive};
use crate::pdf_font::{PdfFont, reserve};
use crate::{Drawing, LayerId, Pen, Point, Sheet, TextRun};

/// PDF's unit is 1/72 of an inch.
const POINTS_PER_MM: f64 = 72.0 / 25.4;

const CATALOG: Ref = Ref::new(1);
const PAGES: Ref = Ref::new(2);
const INFO: Ref = Ref::new(3);
/// Font objects follow from here.
const FIRST_FONT: i32 = 4;
const FONT_NAME: Name = Name(b"F1");

/// All sheets of a drawing, a page each.
#[must_use]
pub fn pdf(drawing: &Drawing) -> Vec<u8> {
    let sheets: Vec<Vec<Primitive>> = drawing.sheets.iter().map(Sheet::primitives).collect();
    let font = PdfFont::for_text(sheets.iter().flatten().filter_map(|p| match &p.mark {
        Mark::Text(run) => Some(run.content.as_str()),
        _ => None,
    }));
    let refs = Refs::new(drawing.layers.len(), drawing.sheets.len());
    let mut pdf = Pdf::new();
    write_catalog(&mut pdf, drawing, &refs);
    font.write(&mut pdf, FIRST_FONT);
    for (index, layer) in drawing.layers.iter().enumerate() {
        let mut group = pdf.indirect(refs.layer(index)).dict();
        group.pair(Name(b"Type"), Name(b"OCG")).pair(Name(b"Name"), TextStr(layer.name));
    }
    for (index, (sheet, primitives)) in drawing.sheets.iter().zip(&sheets).enumerate() {
        write_page(&mut pdf, sheet, &refs, index);
        let content = content(drawing, sheet, primitives, &font);
        pdf.stream(refs.content(index), &content);
    }
    pdf.finish()
}

/// The numbers of the objects, fixed by the counts of layers and sheets.
struct Refs {
    layers: usize,
    sheets: usize,
}

impl Refs {
    fn new(layers: usize, sheets: usize) -> Self {
        Self { layers, sheets }
    }

    fn nth(index: usize) -> Ref {
        let first = i64::from(reserve(FIRST_FONT));
        let number = i64::try_from(index).unwrap_or(i64::MAX).saturating_add(first);
        Ref::new(i32::try_from(number).unwrap_or(i32::MAX))
    }

    fn layer(&self, index: usize) -> Ref {
        Self::nth(index)
    }

    fn page(&self, index: usize) -> Ref {
        Self::nth(self.layers + index)
    }

    fn content(&self, index: usize) -> Ref {
        Self::nth(self.layers + self.sheets + index)
    }
}

fn write_catalog(pdf: &mut Pdf, drawing: &Drawing, refs: &Refs) {
    let mut catalog = pdf.catalog(CATALOG);
    catalog.pages(PAGES).lang(TextStr("en-GB"));
    let mut preferences = catalog.viewer_preferences();
    preferences.display_doc_title(true);
    // A template is of use in true size only; without this many viewers shrink to the printable area.
    preferences.pair(Name(b"PrintScaling"), Name(b"None"));
    preferences.finish();
    let layers = || (0..refs.layers).map(|index| refs.layer(index));
    let mut optional = catalog.insert(Name(b"OCProperties")).dict();
    optional.insert(Name(b"OCGs")).array().items(layers());
    let mut default = optional.insert(Name(b"D")).dict();
    default.insert(Name(b"Order")).array().items(layers());
    default.insert(Name(b"ON")).array().items(layers());
    default.finish();
    optional.finish();
    catalog.finish();
    let title = crate::clean(&drawing.title);
    pdf.document_info(INFO).title(TextStr(&title)).producer(TextStr("Crestline"));
    let count = i32::try_from(refs.sheets).unwrap_or(i32::MAX);
    pdf.pages(PAGES).kids((0..refs.sheets).map(|index| refs.page(index))).count(count);
}

fn write_page(pdf: &mut Pdf, sheet: &Sheet, refs: &Refs, index: usize) {
    let mut page = pdf.page(refs.page(index));
    let size = [sheet.area.width(), sheet.area.height()].map(|mm| real(mm * POINTS_PER_MM));
    page.media_box(PdfRect::new(0.0, 0.0, size[0], size[1]));
    page.parent(PAGES).contents(refs.content(index));
    let mut resources = page.resources();
    resources.fonts().pair(FONT_NAME, Ref::new(FIRST_FONT));
    let mut properties = resources.insert(Name(b"Properties")).dict();
    for layer in 0..refs.layers {
        properties.pair(Name(layer_name(layer).as_bytes()), refs.layer(layer));
    }
}

fn layer_name(index: usize) -> String {
    format!("L{index}")
}

fn content(drawing: &Drawing, sheet: &Sheet, primitives: &[Primitive], font: &PdfFont) -> Vec<u8> {
    let mut content = Content::new();
    let k = POINTS_PER_MM;
    let shift = sheet.area.min.times(-k);
    content.transform([real(k), 0.0, 0.0, real(k), real(shift.x), real(shift.y)]);
    content.set_line_cap(LineCapStyle::RoundCap).set_line_join(LineJoinStyle::RoundJoin);
    for (index, layer) in drawing.layers.iter().enumerate() {
        let mut of_layer = primitives.iter().filter(|p| p.layer == LayerId(index)).peekable();
        if of_layer.peek().is_none() {
            continue;
        }
        let name = layer_name(index);
        content.begin_marked_content_with_properties(Name(b"OC")).properties_named(Name(name.as_bytes()));
        let [r, g, b] = layer.colour.rgb().map(|part| f32::from(part) / 255.0);
        content.set_stroke_rgb(r, g, b).set_fill_rgb(r, g, b);
        for primitive in of_layer {
            push_primitive(&mut content, primitive, font);
        }
        content.end_marked_content();
    }
    content.finish().to_vec()
}

fn push_primitive(content: &mut Content, primitive: &Primitive, font: &PdfFont) {
    match &primitive.mark {
        Mark::Stroke { points, closed } => {
            push_pen(content, primitive.pen);
            push_path(content, points);
            if *closed {
                content.close_and_stroke()
            } else {
                content.stroke()
            };
        }
        Mark::Arc { centre, radius_mm, start_deg, sweep_deg } => {
            push_pen(content, primitive.pen);
            push_arc(content, *centre, *radius_mm, *start_deg, *sweep_deg);
            content.stroke();
        }
        Mark::Fill(points) => {
            push_path(content, points);
            content.close_path().fill_nonzero();
        }
        Mark::Text(run) => push_text(content, run, font),
    }
}

fn push_pen(content: &mut Content, pen: Pen) {
    let pattern = pen.style.pattern_mm(pen.width);
    // Round ends would fill the gaps of a dashed line.
    let cap = if pattern.is_empty() { LineCapStyle::RoundCap } else { LineCapStyle::ButtCap };
    content.set_line_width(real(pen.width.mm())).set_line_cap(cap);
    content.set_dash_pattern(pattern.into_iter().map(real), 0.0);
}

fn push_path(content: &mut Content, points: &[Point]) {
    for (i, p) in points.iter().enumerate() {
        if i == 0 {
            content.move_to(real(p.x), real(p.y))
        } else {
            content.line_to(real(p.x), real(p.y))
        };
    }
}

/// An arc as cubic curves of at most a quarter circle, each within 0.03 % of the radius
/// (control points at 4/3·tan(a/4) of the radius along the tangents).
fn push_arc(content: &mut Content, centre: Point, radius_mm: f64, start_deg: f64, sweep_deg: f64) {
    let parts = (sweep_deg / 90.0).ceil().max(1.0);
    let part_deg = sweep_deg / parts;
    let handle_mm = radius_mm * 4.0 / 3.0 * (part_deg.to_radians() / 4.0).tan();
    let on_circle = |angle_deg: f64| centre.toward(Point::direction(angle_deg), radius_mm);
    let tangent = |angle_deg: f64| Point::direction(angle_deg).left();
    let mut angle_deg = start_deg;
    push_path(content, &[on_circle(angle_deg)]);
    while angle_deg < start_deg + sweep_deg - part_deg / 2.0 {
        let next_deg = angle_deg + part_deg;
        let a = on_circle(angle_deg).toward(tangent(angle_deg), handle_mm);
        let b = on_circle(next_deg).toward(tangent(next_deg), -handle_mm);
        let end = on_circle(next_deg);
        content.cubic_to(real(a.x), real(a.y), real(b.x), real(b.y), real(end.x), real(end.y));
        angle_deg = next_deg;
    }
}

fn push_text(content: &mut Content, run: &TextRun, font: &PdfFont) {
    if run.content.trim().is_empty() {
        return;
    }
    let along = Point::direction(run.angle_deg);
    let matrix = [along.x, along.y, -along.y, along.x, run.start.x, run.start.y].map(real);
    content.begin_text().set_font(FONT_NAME, real(run.font_size_mm())).set_text_matrix(matrix);
    content.show(Str(&font.encode(&run.content))).end_text();
}

/// PDF numbers are single precision here: 2e-5 mm on an A3 sheet.
#[allow(clippy::cast_possible_truncation)]
fn real(value: f64) -> f32 {
    if value.is_finite() { value as f32 } else { 0.0 }
}
