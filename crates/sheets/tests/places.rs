//! What the drawings say against the solution: places, figures, layers, and pixels of the SVG.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod cases;

use cases::{Case, all_options, cases, examples, options_for};
use crestline_drawing::{Drawing, FONT, Item, Measure, Point, Shape, pt, svg_sheet};
use crestline_plan::{Datum, Units};
use crestline_sheets::{Contents, SheetOptions, machine, sheets};
use resvg::{tiny_skia, usvg};

/// Rounding of sums of lengths.
const EXACT_MM: f64 = 1e-9;

fn on_layer<'d>(drawing: &'d Drawing, name: &str) -> Vec<&'d Item> {
    let index = drawing.layers.iter().position(|layer| layer.name == name).expect("the layer exists");
    drawing.sheets.iter().flat_map(|s| &s.items).filter(|item| item.layer.0 == index).collect()
}

/// Crests as the solution has them, from the datum.
fn crests(case: &Case, datum_x_mm: f64) -> Vec<Point> {
    case.solution
        .report
        .strings
        .iter()
        .map(|s| pt(s.built.crest_mm.x - datum_x_mm, s.built.crest_mm.y))
        .collect()
}

#[test]
fn machine_layers_hold_crests_and_slots_and_nothing_else() {
    for case in cases() {
        let options = SheetOptions::for_plan(&case.plan);
        let drawing = machine(&case.plan, &case.solution, &options);
        let names: Vec<_> = drawing.layers.iter().map(|layer| layer.name).collect();
        for name in ["CREST", "SLOT", "STRING", "NOMINAL", "DIMENSION", "TEXT"] {
            assert!(names.contains(&name), "{name}");
        }
        assert_eq!(names.len(), 6);
        let points: Vec<Point> = on_layer(&drawing, "CREST")
            .into_iter()
            .map(|item| if let Shape::Point(at) = item.shape { at } else { panic!("{item:?}") })
            .collect();
        // The layout's datum is worked out apart from the sheets'.
        let expected = crests(&case, case.solution.layout.datum_x_mm);
        assert_eq!(points.len(), expected.len());
        for (found, expected) in points.iter().zip(expected) {
            assert!(found.distance(expected) < EXACT_MM, "{}: {found:?} {expected:?}", case.name);
        }
        let slots = on_layer(&drawing, "SLOT");
        assert_eq!(slots.len(), case.solution.layout.blanks.len());
        assert!(slots.iter().all(
            |item| matches!(&item.shape, Shape::Polyline { points, closed: true } if points.len() == 4)
        ));
    }
}

#[test]
fn every_setback_is_a_dimension_that_measures_it() {
    for case in cases() {
        for options in options_for(&case).into_iter().step_by(13) {
            for drawing in
                [machine(&case.plan, &case.solution, &options), sheets(&case.plan, &case.solution, &options)]
            {
                let values: Vec<f64> = drawing
                    .sheets
                    .iter()
                    .flat_map(|s| &s.items)
                    .filter_map(|item| if let Shape::Dimension(d) = &item.shape { Some(d) } else { None })
                    .filter(|d| matches!(d.measure, Measure::Linear { .. }))
                    .map(|d| d.value())
                    .collect();
                // A dimension that a seam cuts is drawn as lines.
                if drawing.sheets.len() > 6 {
                    continue;
                }
                for string in &case.solution.report.strings {
                    let wanted = string.built.saddle_setback_mm.abs();
                    assert!(values.iter().any(|v| (v - wanted).abs() < EXACT_MM), "{}: {wanted}", case.name);
                }
            }
        }
    }
}

#[test]
fn the_datum_is_where_the_solution_puts_it() {
    for mut case in examples() {
        for datum in [Datum::Nut, Datum::TwelfthFret, Datum::SaddleLine] {
            case.plan.sheet.datum = datum;
            let solved = cases::solved(&case.name, case.plan.clone());
            let options = SheetOptions { datum, ..SheetOptions::for_plan(&solved.plan) };
            let drawing = machine(&solved.plan, &solved.solution, &options);
            let first = on_layer(&drawing, "CREST")[0];
            let expected = crests(&solved, solved.solution.layout.datum_x_mm)[0];
            assert!(
                matches!(first.shape, Shape::Point(at) if at.distance(expected) < EXACT_MM),
                "{}",
                case.name
            );
        }
    }
}

#[test]
fn the_check_line_is_a_hundred_millimetres_on_every_sheet() {
    for case in examples() {
        // One of every nine has another paper.
        for options in all_options(&case.plan).into_iter().step_by(9) {
            let drawing = sheets(&case.plan, &case.solution, &options);
            let index = drawing.layers.iter().position(|layer| layer.name == "CHECK").unwrap();
            for sheet in &drawing.sheets {
                let lengths: Vec<f64> = sheet
                    .items
                    .iter()
                    .filter(|item| item.layer.0 == index)
                    .filter_map(
                        |item| if let Shape::Line(a, b) = item.shape { Some(a.distance(b)) } else { None },
                    )
                    .collect();
                let count = |mm: f64| lengths.iter().filter(|l| (**l - mm).abs() < EXACT_MM).count();
                assert_eq!((count(100.0), count(101.6)), (2, 1), "{lengths:?}");
            }
        }
    }
}

#[test]
fn unwanted_parts_are_left_out() {
    let case = &examples()[0];
    let none = Contents {
        plan_view: false,
        nut_view: false,
        profile: false,
        tables: false,
        template: false,
        cautions: false,
    };
    let options = SheetOptions { contents: none, ..SheetOptions::for_plan(&case.plan) };
    let empty = sheets(&case.plan, &case.solution, &options);
    assert_eq!((empty.sheets.len(), on_layer(&empty, "SLOT").len()), (1, 0));
    let one = SheetOptions { contents: Contents { template: true, ..none }, ..options };
    let template = sheets(&case.plan, &case.solution, &one);
    assert_eq!(template.sheets.len(), 1);
    assert!(!on_layer(&template, "SLOT").is_empty() && on_layer(&template, "DIMENSION").is_empty());
}

#[test]
fn inches_and_papers_come_from_the_plan() {
    let mut plan = cases::example("steel_six");
    plan.sheet.units = Units::Inch;
    assert_eq!(SheetOptions::for_plan(&plan).units, crestline_sheets::LengthUnits::InchDecimal);
}

#[test]
fn a_view_over_several_sheets_loses_no_figure_and_no_crest() {
    let case = cases::widest();
    for options in all_options(&case.plan) {
        let only = Contents {
            plan_view: true,
            nut_view: false,
            profile: false,
            tables: false,
            template: false,
            cautions: false,
        };
        let whole = SheetOptions { contents: only, ..options };
        let drawing = sheets(&case.plan, &case.solution, &whole);
        let words: Vec<String> = drawing
            .sheets
            .iter()
            .flat_map(crestline_drawing::Sheet::primitives)
            .filter_map(|p| {
                if let crestline_drawing::Mark::Text(run) = p.mark { Some(run.content) } else { None }
            })
            .collect();
        for string in &case.solution.report.strings {
            let figure = whole.units.text(string.built.saddle_setback_mm);
            let name = format!("{}  {}", string.string, string.name);
            let (has_figure, has_name) = (words.contains(&figure), words.contains(&name));
            assert!(has_figure && has_name, "{:?} {:?}: {figure} {name}", whole.paper, whole.units);
        }
        let parts = drawing.sheets.iter().filter(|sheet| sheet.name.contains("part")).count();
        assert!(parts > 1, "{:?}: {parts} parts", whole.paper);
        assert!(on_layer(&drawing, "CREST").len() >= case.solution.report.strings.len());
    }
}

/// 254 dots an inch are ten a millimetre.
const DOTS_PER_MM: f32 = 10.0;
/// A crest's arms are 0.25 mm wide: their middle is known to half a dot, and pixels are counted whole.
const PIXEL_MM: f64 = 0.1;

#[test]
fn crests_are_drawn_where_the_solution_says() {
    for case in examples() {
        let options = SheetOptions::for_plan(&case.plan);
        let drawing = sheets(&case.plan, &case.solution, &options);
        let picture = rendered(&svg_sheet(&drawing, 0).unwrap());
        let expected = crests(&case, 0.0);
        let found = red_crosses(&picture, expected.len());
        assert_eq!(found.len(), expected.len(), "{}: {found:?}", case.name);
        // Red marks from the top down are the strings from 1 on; where the view stands is free, so compare steps.
        for (f, e) in found.iter().zip(&expected) {
            let (step, wanted) = (f.minus(found[0]), e.minus(expected[0]));
            assert!(step.distance(wanted) <= 2.0 * PIXEL_MM, "{}: {step:?} {wanted:?}", case.name);
        }
    }
}

fn rendered(svg: &[u8]) -> tiny_skia::Pixmap {
    let mut options = usvg::Options::default();
    options.fontdb_mut().load_font_data(FONT.to_vec());
    let tree = usvg::Tree::from_data(svg, &options).expect("well-formed SVG");
    let scale = DOTS_PER_MM * 25.4 / 96.0;
    let dots = |length: f32| (length * scale).round() as u32;
    let mut picture = tiny_skia::Pixmap::new(dots(tree.size().width()), dots(tree.size().height())).unwrap();
    picture.fill(tiny_skia::Color::WHITE);
    resvg::render(&tree, tiny_skia::Transform::from_scale(scale, scale), &mut picture.as_mut());
    picture
}

/// Centres of the red crosses from the top down, mm with y up: where red reaches a millimetre to all four sides.
fn red_crosses(picture: &tiny_skia::Pixmap, most: usize) -> Vec<Point> {
    let red = |x: i64, y: i64| {
        let (Ok(x), Ok(y)) = (u32::try_from(x), u32::try_from(y)) else { return false };
        picture.pixel(x, y).is_some_and(|p| p.red() > 150 && p.green() < 60 && p.blue() < 60)
    };
    let mut centres: Vec<(Point, f64)> = vec![];
    for y in 0..i64::from(picture.height()) {
        for x in 0..i64::from(picture.width()) {
            if red(x, y) && [(9, 0), (-9, 0), (0, 9), (0, -9)].iter().all(|(dx, dy)| red(x + dx, y + dy)) {
                let at = pt(x as f64 / 10.0, -(y as f64) / 10.0);
                match centres.iter_mut().find(|(p, n)| p.times(1.0 / *n).distance(at) < 0.6) {
                    Some((sum, n)) => (*sum, *n) = (sum.plus(at), *n + 1.0),
                    None => centres.push((at, 1.0)),
                }
            }
        }
    }
    assert!(centres.len() >= most, "{} crosses of {most}", centres.len());
    centres.into_iter().map(|(sum, n)| sum.times(1.0 / n)).collect()
}
