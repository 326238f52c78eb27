//! The layout by datum, against plain geometry.
#![allow(clippy::unwrap_used, missing_docs)]

mod common;

use common::{fixed, likely_plan};
use crestline_plan::{
    BenchLayout, Datum, Plan, Point, SaddleStyle, Solution, bench_layout, bench_layout_from, check,
    datum_x_mm, example, read, solve,
};
use proptest::prelude::*;

/// Rounding of sums of lengths of some hundred millimetres.
const ROUNDING_MM: f64 = 1e-9;

fn steel_six(style: SaddleStyle) -> Plan {
    let mut plan = read(example("steel_six").unwrap().text).unwrap();
    plan.saddle.style = style;
    plan.saddle.split_after = Some(2);
    plan
}

fn laid_out(plan: &Plan) -> (Solution, BenchLayout) {
    let checked = check(plan).unwrap();
    let solution = solve(&checked).unwrap();
    let bench = bench_layout(&checked, &solution);
    (solution, bench)
}

fn distance_mm(a: Point, b: Point) -> f64 {
    (a.x - b.x).hypot(a.y - b.y)
}

/// Distance of a point from the line through two others, positive where it lies farther from the nut, from the area
/// of the triangle.
fn beyond_mm(point: Point, [treble, bass]: [Point; 2]) -> f64 {
    let area = (bass.x - treble.x) * (point.y - treble.y) - (bass.y - treble.y) * (point.x - treble.x);
    area / distance_mm(treble, bass)
}

#[test]
fn the_blank_reaches_beyond_the_outer_crests_by_the_end_margin() {
    for margin_mm in [0.5, 4.0, 7.25] {
        let mut plan = steel_six(SaddleStyle::Straight);
        plan.saddle.end_margin_mm = margin_mm;
        let (solution, bench) = laid_out(&plan);
        let line = solution.report.saddle.lines[0];
        let [piece] = &bench.pieces[..] else { unreachable!("one blank") };
        let expected_mm = distance_mm(line.treble, line.bass) + 2.0 * margin_mm;
        assert!((piece.length_mm - expected_mm).abs() < ROUNDING_MM, "{} {expected_mm}", piece.length_mm);
        assert!((piece.slant_degrees - line.slant_degrees).abs() < 1e-9);
        let outer = &bench.strings[0].crest_mm;
        let to_end_mm = distance_mm(Point { x: outer.x, y: outer.y }, piece.treble_end_mm);
        assert!((to_end_mm - margin_mm).abs() < ROUNDING_MM);
    }
}

#[test]
fn two_pieces_part_between_their_strings_and_single_pieces_stay_clear_of_each_other() {
    let (_, bench) = laid_out(&steel_six(SaddleStyle::TwoPiece));
    let served: Vec<_> = bench.pieces.iter().map(|piece| (piece.first_string, piece.last_string)).collect();
    assert_eq!(served, [(1, 2), (3, 6)]);
    assert_eq!(bench.strings.iter().map(|string| string.piece).collect::<Vec<_>>(), [1, 1, 2, 2, 2, 2]);
    assert!(bench.pieces[0].bass_end_mm.y > bench.pieces[1].treble_end_mm.y);
    let mut plan = steel_six(SaddleStyle::Separate);
    plan.saddle.end_margin_mm = 30.0;
    let (_, bench) = laid_out(&plan);
    for pair in bench.pieces.windows(2) {
        assert!(pair[0].bass_end_mm.y > pair[1].treble_end_mm.y);
    }
    for string in &bench.strings {
        assert!((string.break_fraction - 0.5).abs() < ROUNDING_MM, "a single crest stands in the middle");
    }
}

#[test]
fn a_datum_moves_x_alone_and_is_where_it_says() {
    let plan = steel_six(SaddleStyle::Shaped);
    let solution = solve(&check(&plan).unwrap()).unwrap();
    let from = |datum| bench_layout_from(&plan, &solution, datum);
    let nut = from(Datum::Nut);
    // Fret 12 halves the scale.
    let crestline_plan::Scale::Single(scale_mm) = plan.instrument.scale else { unreachable!("one scale") };
    for (datum, expected_mm) in
        [(Datum::Nut, 0.0), (Datum::TwelfthFret, scale_mm / 2.0), (Datum::SaddleLine, scale_mm)]
    {
        let bench = from(datum);
        assert!((bench.datum_x_mm - expected_mm).abs() < ROUNDING_MM, "{} {expected_mm}", bench.datum_x_mm);
        for (one, other) in nut.strings.iter().zip(&bench.strings) {
            assert!((one.crest_mm.x - expected_mm - other.crest_mm.x).abs() < ROUNDING_MM);
            assert!((one.nut_edge_mm.x - expected_mm - other.nut_edge_mm.x).abs() < ROUNDING_MM);
            assert_eq!((one.crest_mm.y, one.crest_mm.z), (other.crest_mm.y, other.crest_mm.z));
            assert!((one.break_from_front_mm - other.break_from_front_mm).abs() < ROUNDING_MM);
        }
        for (one, other) in nut.pieces.iter().zip(&bench.pieces) {
            for (one, other) in one.corners_mm.iter().zip(&other.corners_mm) {
                assert!((one.x - expected_mm - other.x).abs() < ROUNDING_MM && one.y == other.y);
            }
        }
    }
}

#[test]
fn on_a_level_neck_crests_rise_with_the_line_through_the_actions() {
    // Without relief the crowns lie in a plane: a crest at s stands at a_1 + (a_12 − a_1)(s − S_1)/(S_12 − S_1).
    let mut plan = steel_six(SaddleStyle::Straight);
    plan.instrument.relief_mm = 0.0;
    let (solution, bench) = laid_out(&plan);
    let mut heights_mm = vec![];
    for ((string, report), entry) in bench.strings.iter().zip(&solution.report.strings).zip(&plan.strings) {
        let (first, twelfth) = (entry.action_mm.first.unwrap(), entry.action_mm.twelfth);
        let [s_1, s_12] = [0, 11].map(|fret| report.frets[fret].position_mm);
        let s = report.scale_mm + report.built.saddle_setback_mm;
        heights_mm.push(first + (twelfth - first) * (s - s_1) / (s_12 - s_1));
        assert!((string.crest_mm.z - heights_mm[heights_mm.len() - 1]).abs() < ROUNDING_MM);
    }
    for (index, string) in bench.strings.iter().enumerate() {
        let expected = heights_mm.get(index + 1).map(|next| heights_mm[index] - next);
        assert_eq!(string.drop_to_next_mm.is_some(), expected.is_some());
        let difference = string.drop_to_next_mm.unwrap_or(0.0) - expected.unwrap_or(0.0);
        assert!(difference.abs() < ROUNDING_MM);
    }
}

proptest! {
    #![proptest_config(fixed(48))]

    #[test]
    fn crests_break_where_they_lie_between_the_faces(plan in likely_plan()) {
        let (solution, bench) = laid_out(&plan);
        prop_assert!((bench.datum_x_mm - solution.layout.datum_x_mm).abs() < ROUNDING_MM);
        prop_assert!((datum_x_mm(&solution.layout, plan.sheet.datum) - bench.datum_x_mm).abs() < ROUNDING_MM);
        prop_assert_eq!(bench.strings.len(), plan.strings.len());
        for (index, string) in bench.strings.iter().enumerate() {
            prop_assert_eq!(string.string as usize, index + 1);
            let piece = &bench.pieces[string.piece as usize - 1];
            prop_assert!(piece.first_string <= string.string && string.string <= piece.last_string);
            let crest = Point { x: string.crest_mm.x, y: string.crest_mm.y };
            let [front_treble, back_treble, back_bass, front_bass] = piece.corners_mm;
            let from_front_mm = beyond_mm(crest, [front_treble, front_bass]);
            let to_back_mm = -beyond_mm(crest, [back_treble, back_bass]);
            // Sums over a blank of some hundred millimetres.
            prop_assert!((string.break_from_front_mm - from_front_mm).abs() < 1e-7);
            prop_assert!((from_front_mm + to_back_mm - plan.saddle.thickness_mm).abs() < 1e-7);
            prop_assert!((string.break_fraction * plan.saddle.thickness_mm - from_front_mm).abs() < 1e-7);
            // As the report says it, which knows the slot's line and not the outline.
            let reported_mm = solution.report.strings[index].built.slot_offset_mm.unwrap_or(0.0);
            prop_assert!((string.break_from_centre_mm - reported_mm).abs() < 1e-6, "{string:?} {reported_mm}");
            if plan.saddle.style == SaddleStyle::Shaped {
                let margin_mm = plan.saddle.edge_margin_mm - 1e-4;
                prop_assert!(from_front_mm > margin_mm && to_back_mm > margin_mm);
            }
        }
    }
}
