//! Paper, lines, lettering and file formats against the standards of drawings.

use crestline_drawing::{Item, Point, Shape, Width, lettering};
use crestline_plan::{Paper, Plan, Solution, Units, check, example, read, solve};
use crestline_sheets::{Format, SheetOptions, export, sheets};

use super::{By, INCH_MM, assert_between, assert_near, origin};

checks![
    papers_have_their_sizes,
    frames_keep_their_margins,
    lines_have_the_widths_of_the_standard,
    letters_have_the_heights_of_the_standard,
    a_title_block_fits_the_standard,
    millimetres_stand_without_a_sign_on_dimensions,
    files_say_their_units,
];

fn solved(paper: Paper) -> (Plan, Solution) {
    let mut plan = read(example("steel_six").expect("the example is there").text).expect("a plan");
    plan.sheet.paper = paper;
    let solution = solve(&check(&plan).expect("a legal plan")).expect("it can be solved");
    (plan, solution)
}

/// The items of the first sheet, and its width and height in mm.
fn first_sheet(paper: Paper) -> (Vec<Item>, f64, f64) {
    let (plan, solution) = solved(paper);
    let mut drawing = sheets(&plan, &solution, &SheetOptions::for_plan(&plan));
    let sheet = drawing.sheets.swap_remove(0);
    (sheet.items, sheet.area.width(), sheet.area.height())
}

fn exported(format: Format) -> Vec<u8> {
    let (plan, solution) = solved(Paper::A4);
    export(format, &plan, &solution, &SheetOptions::for_plan(&plan))
}

/// The text of a file of ours; what is not UTF-8 (packed parts of a PDF) does not matter here.
fn exported_text(format: Format) -> String {
    String::from_utf8_lossy(&exported(format)).into_owned()
}

/// ISO 216: A4 210 × 297, A3 297 × 420 mm; memory (sure). Letter is 8.5 × 11 in by definition.
#[test]
fn papers_have_their_sizes() {
    origin("ISO 216, sheet sizes", By::Memory("sure"));
    for (paper, name, [short, long]) in [(Paper::A4, "A4", [210.0, 297.0]), (Paper::A3, "A3", [297.0, 420.0])]
    {
        let (_, width_mm, height_mm) = first_sheet(paper);
        assert_near(width_mm.min(height_mm), short, 0.0, &format!("{name}, short side, mm"));
        assert_near(width_mm.max(height_mm), long, 0.0, &format!("{name}, long side, mm"));
    }
    origin("Letter paper, 8.5 by 11 in", By::Computed);
    const ROUNDING_MM: f64 = 1e-9;
    let (_, width_mm, height_mm) = first_sheet(Paper::Letter);
    assert_near(width_mm / INCH_MM, 8.5, ROUNDING_MM, "letter, short side, in");
    assert_near(height_mm / INCH_MM, 11.0, ROUNDING_MM, "letter, long side, in");
}

/// The closed outlines of a sheet.
fn outlines(items: &[Item]) -> Vec<&[Point]> {
    let closed = |item| match item {
        &Item { shape: Shape::Polyline { ref points, closed: true }, .. } => Some(points.as_slice()),
        _ => None,
    };
    items.iter().filter_map(closed).collect()
}

/// Left, lower, right and upper end of an outline.
fn extent(points: &[Point]) -> [f64; 4] {
    points.iter().fold([f64::MAX, f64::MAX, f64::MIN, f64::MIN], |[left, low, right, high], point| {
        [left.min(point.x), low.min(point.y), right.max(point.x), high.max(point.y)]
    })
}

/// The outer frame of a sheet: of its outlines the one that encloses the most.
fn frame(items: &[Item]) -> [f64; 4] {
    let area = |[left, low, right, high]: &[f64; 4]| (right - left) * (high - low);
    let extents = outlines(items).into_iter().map(extent);
    extents.max_by(|a, b| area(a).total_cmp(&area(b))).expect("a sheet has a frame")
}

/// ISO 5457: margins of 20 mm on the left, 10 mm elsewhere; second-hand.
#[test]
fn frames_keep_their_margins() {
    const ROUNDING_MM: f64 = 1e-9;
    origin("ISO 5457, margins", By::SecondHand);
    for (paper, name) in [(Paper::A4, "A4"), (Paper::A3, "A3")] {
        let (items, width_mm, height_mm) = first_sheet(paper);
        let [left, low, right, high] = frame(&items);
        for (side, found, expected) in [
            ("left", left, 20.0),
            ("lower", low, 10.0),
            ("right", width_mm - right, 10.0),
            ("upper", height_mm - high, 10.0),
        ] {
            assert_near(found, expected, ROUNDING_MM, &format!("{name}, {side} margin, mm"));
        }
    }
}

/// ISO 128-2: widths 0.13 0.18 0.25 0.35 0.5 0.7 mm, thick to thin 2:1; memory (sure).
#[test]
fn lines_have_the_widths_of_the_standard() {
    origin("ISO 128-2, line widths", By::Memory("sure"));
    let widths = [Width::W013, Width::W018, Width::W025, Width::W035, Width::W050, Width::W070];
    for (width, expected) in widths.into_iter().zip([0.13, 0.18, 0.25, 0.35, 0.5, 0.7]) {
        assert_near(width.mm(), expected, 0.0, &format!("line of {expected} mm, mm"));
    }
    // The series is rounded to hundredths: 0.35 to 0.18 is 1.94, 0.25 to 0.13 is 1.92.
    const ROUNDED: f64 = 0.1;
    let (items, ..) = first_sheet(Paper::A4);
    let mut used: Vec<_> = items.iter().map(|item| item.pen.width).collect();
    used.sort();
    used.dedup();
    let (thin, thick) = (used[0].mm(), used[used.len() - 2].mm());
    assert!(used.len() >= 3, "thin and thick lines and the frame's: {used:?}");
    assert_near(thick / thin, 2.0, ROUNDED, "thick over thin lines of a sheet (the frame is thicker still)");
}

/// ISO 3098: lettering 2.5 3.5 5 mm (and 1.8, its smallest); memory (sure).
#[test]
fn letters_have_the_heights_of_the_standard() {
    origin("ISO 3098, heights of lettering", By::Memory("sure"));
    for (found, expected) in
        [(lettering::SMALL_MM, 2.5), (lettering::MIDDLE_MM, 3.5), (lettering::LARGE_MM, 5.0)]
    {
        assert_near(found, expected, 0.0, &format!("letters of {expected} mm, mm"));
    }
    let (items, ..) = first_sheet(Paper::A4);
    let mut seen = 0;
    for item in &items {
        if let Shape::Text(text) = &item.shape {
            assert!([1.8, 2.5, 3.5, 5.0].contains(&text.height_mm), "{} mm", text.height_mm);
            seen += 1;
        }
    }
    assert!(seen > 20, "texts of the sheet were looked at");
}

/// ISO 7200: a title block of 180 mm, with title, date and sheet; memory (sure).
#[test]
fn a_title_block_fits_the_standard() {
    origin("ISO 7200, title block", By::Memory("sure"));
    let (items, ..) = first_sheet(Paper::A3);
    let [_, low, right, _] = frame(&items);
    let in_corner =
        outlines(&items).into_iter().map(extent).filter(|found| found[1] == low && found[2] == right);
    let widths: Vec<_> = in_corner.map(|[left, _, right, _]| right - left).collect();
    let smallest = widths.iter().copied().fold(f64::MAX, f64::min);
    assert_near(smallest, 180.0, 1e-9, "title block in the lower right corner of A3, width, mm");
    for field in ["Title", "Date", "Sheet", "Drawn by"] {
        let stands = |item: &Item| matches!(&item.shape, Shape::Text(text) if text.content == field);
        assert!(items.iter().any(stands), "the title block has a field {field}");
    }
}

/// ISO 129-1: lengths in millimetres stand without a unit; memory (sure).
#[test]
fn millimetres_stand_without_a_sign_on_dimensions() {
    let (plan, _) = solved(Paper::A4);
    assert_eq!(plan.sheet.units, Units::Mm);
    let (items, ..) = first_sheet(Paper::A4);
    let mut seen = 0;
    for item in &items {
        if let Shape::Dimension(dimension) = &item.shape {
            let text = &dimension.label;
            assert!(!text.contains("mm") && text.bytes().any(|byte| byte.is_ascii_digit()), "{text}");
            seen += 1;
        }
    }
    assert!(seen > 5, "dimensions of the sheet were looked at");
}

/// The value after a group code and a name in a DXF file.
fn dxf_variable<'a>(text: &'a str, name: &str) -> &'a str {
    let mut lines = text.lines().skip_while(|line| line.trim() != name);
    lines.nth(2).expect("a variable has a group code and a value").trim()
}

/// DXF: $INSUNITS 4 is millimetres (read). SVG: 96 px to the inch (read), so that a width in mm is a width on paper. PDF: 1/72 in,
/// A4 595.2756 × 841.8898 pt (computed).
#[test]
fn files_say_their_units() {
    let dxf = exported_text(Format::Dxf);
    origin("DXF reference, header variables", By::Read);
    let units: f64 = dxf_variable(&dxf, "$INSUNITS").parse().expect("a number");
    assert_near(units, 4.0, 0.0, "$INSUNITS, 4 for millimetres");
    origin("SVG, 96 px to the inch", By::Read);
    let svg = exported(Format::Svg);
    let tree = resvg::usvg::Tree::from_data(&svg, &resvg::usvg::Options { dpi: 96.0, ..Default::default() });
    let width_px = f64::from(tree.expect("an SVG file").size().width());
    const SINGLE_PRECISION_PX: f64 = 1e-3; // the reader keeps sizes in single precision
    assert_near(width_px, 210.0 / INCH_MM * 96.0, SINGLE_PRECISION_PX, "A4, width read back, px");
    origin("PDF, 1/72 in a unit", By::Computed);
    let pdf = exported_text(Format::Pdf);
    let (_, after) = pdf.split_once("/MediaBox [").expect("a page has its size");
    let sizes: Vec<f64> = after
        .split(']')
        .next()
        .unwrap_or("")
        .split_whitespace()
        .map(|n| n.parse().expect("a number"))
        .collect();
    // Half a unit of the last digit computed.
    for (found, expected, side) in [(sizes[2], 595.2756, "width"), (sizes[3], 841.8898, "height")] {
        assert_near(found, expected, 0.000_05, &format!("A4, {side} of the page, pt"));
    }
    let [width, height] = [sizes[2], sizes[3]].map(|points| points / 72.0 * INCH_MM);
    assert_between(width / height, [210.0 / 297.0; 2], 1e-6, "A4, width over height of the page");
}
