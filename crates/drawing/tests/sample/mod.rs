//! A drawing with one of everything, and text that means harm.

use crestline_drawing::{
    Anchor, Colour, Dimension, Drawing, LineStyle, Measure, Pen, Shape, Sheet, Text, Width, pt,
};

/// Text that markup, DXF and spreadsheets would take for more than text.
pub const HOSTILE: &str = "<b>&\"'</b> %%c %%u ^J \\P\\U+0041 {x} é♭弦 שלום \u{202E}\u{0}\n]]>";

/// Two sheets: lines of 100 mm, every shape, every kind of dimension.
pub fn drawing() -> Drawing {
    let mut drawing = Drawing::new(HOSTILE);
    let outline = drawing.add_layer("OUTLINE", Colour::Black);
    let dimension = drawing.add_layer("DIMENSION", Colour::Blue);
    let text = drawing.add_layer("TEXT", Colour::Black);
    let thick = Pen::solid(Width::W050);
    let thin = Pen::solid(Width::W018);
    let mut sheet = Sheet::new("Shapes & <more>", 210.0, 297.0);
    sheet.add(outline, thick, Shape::Line(pt(20.0, 20.0), pt(120.0, 20.0)));
    let points = vec![pt(20.0, 200.0), pt(80.0, 200.0), pt(80.0, 230.0), pt(20.0, 230.0)];
    sheet.add(outline, thick, Shape::Polyline { points, closed: true });
    sheet.add(
        outline,
        Pen::new(Width::W025, LineStyle::Chain),
        Shape::Line(pt(20.0, 215.0), pt(120.0, 215.0)),
    );
    sheet.add(
        outline,
        Pen::new(Width::W025, LineStyle::Dashed),
        Shape::Circle { centre: pt(150.0, 215.0), radius_mm: 15.0 },
    );
    sheet.add(
        outline,
        thick,
        Shape::Arc { centre: pt(150.0, 215.0), radius_mm: 20.0, start_deg: 300.0, end_deg: 60.0 },
    );
    sheet.add(outline, thin, Shape::Point(pt(150.0, 215.0)));
    sheet.add(outline, thin, Shape::Fill(vec![pt(20.0, 240.0), pt(30.0, 240.0), pt(25.0, 250.0)]));
    sheet.add(text, thin, Shape::Text(Text::new(pt(20.0, 270.0), 3.5, HOSTILE).within(150.0)));
    sheet.add(
        text,
        thin,
        Shape::Text(Text::new(pt(200.0, 50.0), 5.0, "Turned ⌀").turned(90.0).anchored(Anchor::Middle)),
    );
    let linear = |from, to, direction_deg, line_at| Measure::Linear { from, to, direction_deg, line_at };
    for measure in [
        linear(pt(20.0, 20.0), pt(120.0, 20.0), 0.0, pt(0.0, 30.0)),
        linear(pt(20.0, 20.0), pt(22.5, 60.0), 0.0, pt(0.0, 70.0)),
        linear(pt(80.0, 200.0), pt(80.0, 230.0), 90.0, pt(95.0, 0.0)),
        Measure::Aligned { from: pt(20.0, 100.0), to: pt(60.0, 130.0), offset_mm: 8.0 },
        Measure::Angular { vertex: pt(20.0, 140.0), start_deg: 10.0, end_deg: 55.0, radius_mm: 30.0 },
        Measure::Angular { vertex: pt(90.0, 140.0), start_deg: 0.0, end_deg: 4.0, radius_mm: 30.0 },
    ] {
        let shape = Dimension::new(measure, "");
        let label = format!("{:.2}", shape.value());
        sheet.add(dimension, thin, Shape::Dimension(Dimension { label, ..shape }));
    }
    let elsewhere = Dimension::new(linear(pt(130.0, 100.0), pt(132.0, 100.0), 0.0, pt(130.0, 100.0)), "2.00");
    sheet.add(dimension, thin, Shape::Dimension(elsewhere.labelled_at(pt(160.0, 110.0))));
    drawing.sheets.push(sheet);
    let mut second = Sheet::new("Second", 297.0, 210.0);
    second.add(outline, thick, Shape::Line(pt(20.0, 20.0), pt(20.0, 120.0)));
    drawing.sheets.push(second);
    drawing
}
