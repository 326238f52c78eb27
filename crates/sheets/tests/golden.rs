//! What is written against what was written before, and the same bytes on every run.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod cases;

use cases::{Case, examples, hostile};
use crestline_plan::{Datum, Paper};
use crestline_sheets::{Format, LengthUnits, SheetOptions, export};

fn written(format: Format, case: &Case, options: &SheetOptions) -> String {
    String::from_utf8(export(format, &case.plan, &case.solution, options)).unwrap()
}

fn case(name: &str) -> Case {
    examples().into_iter().find(|case| case.name == name).unwrap()
}

#[test]
fn the_same_plan_gives_the_same_bytes() {
    for case in examples() {
        let options = SheetOptions::for_plan(&case.plan);
        for format in Format::ALL {
            let once = export(format, &case.plan, &case.solution, &options);
            assert!(once == export(format, &case.plan, &case.solution, &options), "{} {format:?}", case.name);
        }
    }
}

#[test]
fn machine_drawings_are_as_they_were() {
    for name in ["steel_six", "fanned_eight"] {
        let case = case(name);
        let text = written(Format::Dxf, &case, &SheetOptions::for_plan(&case.plan));
        insta::assert_snapshot!(format!("{name}_dxf"), text);
    }
}

#[test]
fn the_paper_drawing_is_as_it_was() {
    let case = case("tenor_ukulele");
    insta::assert_snapshot!(
        "tenor_ukulele_svg",
        written(Format::Svg, &case, &SheetOptions::for_plan(&case.plan))
    );
}

#[test]
fn schedules_are_as_they_were() {
    let case = case("steel_six");
    let millimetres = SheetOptions::for_plan(&case.plan);
    insta::assert_snapshot!("steel_six_csv", written(Format::Csv, &case, &millimetres));
    let inches = SheetOptions {
        units: LengthUnits::InchFraction,
        datum: Datum::SaddleLine,
        paper: Paper::A3,
        ..millimetres
    };
    insta::assert_snapshot!("steel_six_inch_csv", written(Format::Csv, &case, &inches));
}

#[test]
fn tolerances_bring_a_plus_minus() {
    let case = cases::banded("steel_six");
    let options = SheetOptions::for_plan(&case.plan);
    let csv = written(Format::Csv, &case, &options);
    let mut reader = csv::Reader::from_reader(csv.as_bytes());
    assert_eq!(reader.headers().unwrap().iter().next_back(), Some("ideal_plus_minus_mm"));
    for (record, string) in reader.records().zip(&case.solution.report.strings) {
        let shown: f64 = record.unwrap()[12].parse().unwrap();
        // The table rounds to a thousandth.
        assert!((shown - string.plus_minus_mm.unwrap()).abs() <= 5.001e-4, "{shown}");
    }
    assert!(written(Format::Svg, &case, &options).contains(">±, nine<"));
    // Without tolerances nothing changes.
    let bare = self::case("steel_six");
    assert!(!written(Format::Svg, &bare, &options).contains(">±, nine<"));
}

#[test]
fn hostile_names_do_no_harm() {
    let case = hostile();
    let options = SheetOptions::for_plan(&case.plan);
    let csv = written(Format::Csv, &case, &options);
    for record in csv::Reader::from_reader(csv.as_bytes()).records() {
        let record = record.unwrap();
        assert_eq!(record.len(), 12);
        assert!(record[1].starts_with("'=cmd()"), "{record:?}");
    }
    assert!(!written(Format::Svg, &case, &options).contains("<b>"));
    let dxf = written(Format::Dxf, &case, &options);
    assert!(dxf.is_ascii() && !dxf.contains("%%c") && !dxf.contains("\\P"));
    assert!(dxf.lines().count().is_multiple_of(2), "pairs of code and value");
}

#[test]
fn endings_name_their_formats() {
    for format in Format::ALL {
        assert_eq!(Format::of_ending(&format.ending().to_uppercase()), Some(format));
    }
    assert_eq!(Format::of_ending("png"), None);
}
