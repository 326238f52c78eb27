//! The writers against readers that are not ours, and against their own earlier output.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod sample;

use crestline_drawing::{FONT, dxf, pdf, svg, svg_sheet};
use resvg::{tiny_skia, usvg};

/// 254 dots an inch are ten a millimetre.
const DOTS_PER_MM: f32 = 10.0;

fn rendered(svg: &[u8]) -> tiny_skia::Pixmap {
    let mut options = usvg::Options::default();
    options.fontdb_mut().load_font_data(FONT.to_vec());
    let tree = usvg::Tree::from_data(svg, &options).expect("well-formed SVG");
    // The reader turns mm into 96ths of an inch.
    let scale = DOTS_PER_MM * 25.4 / 96.0;
    let dots = |length: f32| (length * scale).round() as u32;
    let mut picture = tiny_skia::Pixmap::new(dots(tree.size().width()), dots(tree.size().height())).unwrap();
    picture.fill(tiny_skia::Color::WHITE);
    resvg::render(&tree, tiny_skia::Transform::from_scale(scale, scale), &mut picture.as_mut());
    picture
}

fn is_dark(picture: &tiny_skia::Pixmap, x_mm: f32, y_up_mm: f32) -> bool {
    let dots = |mm: f32| (mm * DOTS_PER_MM) as u32;
    picture.pixel(dots(x_mm), dots(297.0 - y_up_mm)).unwrap().red() < 128
}

#[test]
fn svg_is_drawn_where_it_should_be() {
    let picture = rendered(&svg_sheet(&sample::drawing(), 0).unwrap());
    assert_eq!((picture.width(), picture.height()), (2100, 2970));
    // The line of 100 mm with round ends of 0.25 mm.
    for (x_mm, dark) in [(19.6, false), (20.1, true), (70.0, true), (119.9, true), (120.4, false)] {
        assert_eq!(is_dark(&picture, x_mm, 20.0), dark, "{x_mm}");
    }
    for (angle_deg, dark) in [(0.0_f32, true), (-55.0, true), (55.0, true), (70.0, false), (180.0, false)] {
        let (sin, cos) = angle_deg.to_radians().sin_cos();
        assert_eq!(is_dark(&picture, 150.0 + 20.0 * cos, 215.0 + 20.0 * sin), dark, "{angle_deg}");
    }
}

#[test]
fn text_is_drawn_inside_its_measured_box() {
    let drawing = sample::drawing();
    let picture = rendered(&svg_sheet(&drawing, 0).unwrap());
    let run = drawing.sheets[0]
        .primitives()
        .into_iter()
        .find_map(|p| match p.mark {
            crestline_drawing::Mark::Text(run) if run.start.y == 270.0 => Some(run),
            _ => None,
        })
        .unwrap();
    let bounds = run.bounds().grown(0.1);
    let dark: Vec<(f64, f64)> = (2600..2760)
        .flat_map(|y| (0..2100).map(move |x| (f64::from(x) / 10.0 + 0.05, f64::from(y) / 10.0 + 0.05)))
        .filter(|(x, y)| is_dark(&picture, *x as f32, *y as f32))
        .collect();
    assert!(dark.len() > 1000);
    assert!(dark.iter().all(|(x, y)| bounds.contains(crestline_drawing::pt(*x, *y))), "{bounds:?}");
    let right = dark.iter().map(|(x, _)| *x).fold(0.0, f64::max);
    assert!(bounds.max.x - right < 1.0, "the ink ends where the advance widths say: {right} of {bounds:?}");
}

#[test]
fn the_same_drawing_gives_the_same_bytes() {
    for write in [svg, pdf, dxf] {
        assert_eq!(write(&sample::drawing()), write(&sample::drawing()));
    }
}

#[test]
fn pdf_holds_a_small_part_of_the_font() {
    let bytes = pdf(&sample::drawing());
    assert!(bytes.len() < FONT.len() / 10, "{}", bytes.len());
}

#[test]
fn svg_is_as_it_was() {
    insta::assert_snapshot!(String::from_utf8(svg(&sample::drawing())).unwrap());
}

#[test]
fn dxf_is_as_it_was() {
    let text = String::from_utf8(dxf(&sample::drawing())).unwrap();
    assert!(text.is_ascii());
    insta::assert_snapshot!(text);
}

#[test]
fn an_empty_drawing_is_still_a_file() {
    let empty = crestline_drawing::Drawing::new("");
    for write in [svg, pdf, dxf] {
        assert!(!write(&empty).is_empty());
    }
}

proptest::proptest! {
    /// Any text at all leaves every file readable.
    #[test]
    fn no_text_spoils_a_file(content in proptest::collection::vec(proptest::char::any(), 0..80)) {
        use crestline_drawing::{Colour, Dimension, Drawing, Measure, Pen, Shape, Sheet, Text, Width, pt};
        let content: String = content.into_iter().collect();
        let mut drawing = Drawing::new(content.clone());
        let layer = drawing.add_layer("TEXT", Colour::Black);
        let mut sheet = Sheet::new(content.clone(), 100.0, 100.0);
        let pen = Pen::solid(Width::W025);
        sheet.add(layer, pen, Shape::Text(Text::new(pt(1.0, 1.0), 2.5, content.clone())));
        let measure = Measure::Aligned { from: pt(0.0, 0.0), to: pt(50.0, 0.0), offset_mm: 5.0 };
        sheet.add(layer, pen, Shape::Dimension(Dimension::new(measure, content)));
        drawing.sheets.push(sheet);
        usvg::Tree::from_data(&svg(&drawing), &usvg::Options::default()).expect("well-formed SVG");
        let text = String::from_utf8(dxf(&drawing)).unwrap();
        proptest::prop_assert!(text.is_ascii());
        proptest::prop_assert_eq!(text.lines().count() % 2, 0);
        proptest::prop_assert!(text.lines().step_by(2).all(|code| code.trim().parse::<u32>().is_ok()));
        proptest::prop_assert!(pdf(&drawing).ends_with(b"%%EOF"));
    }
}
