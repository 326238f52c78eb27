//! What makes setbacks grow, what each style can at best reach, and that nothing depends on the side from which the
//! strings are counted.
#![allow(clippy::unwrap_used, missing_docs)]

mod common;

use common::{fixed, likely_plan};
use crestline_plan::{
    Across, ComparisonRow, FitRule, NutStyle, Plan, SaddleStyle, Scale, Slip, Solution, Supports, check,
    compare, solve,
};
use proptest::prelude::*;

/// Nearer to a limit than this an optimum may be the limit's, mm.
const AWAY_MM: f64 = 1e-3;

/// A likely plan whose ideal setbacks are each string's own: separate pieces, plain nut, least squares over all
/// frets up to the twelfth, equal temperament, wide travel. Its strings run on over their supports and are gripped
/// there: where long free ends take up the stretch, what counts is that a steeper string is a longer one, and higher
/// action may take less setback.
fn own_optimum() -> impl Strategy<Value = Plan> {
    likely_plan().prop_map(|mut plan| {
        (plan.saddle.style, plan.nut.style, plan.fit.rule) =
            (SaddleStyle::Separate, NutStyle::Plain, FitRule::LeastSquares);
        plan.fit.frets = [1, 12];
        plan.saddle.travel_mm = [-5.0, 30.0];
        (plan.targets, plan.supports, plan.slip) = (None, Supports::default(), Slip::default());
        plan
    })
}

fn solved(plan: &Plan) -> Option<Solution> {
    check(plan).ok().map(|checked| solve(&checked).unwrap())
}

/// Whether no note buzzes, so that all frets are in every fit, and no optimum is a limit's.
fn clear(solution: &Solution, plan: &Plan) -> bool {
    let [low, high] = plan.saddle.travel_mm;
    solution.report.strings.iter().all(|string| {
        let ideal_mm = string.ideal.saddle_setback_mm;
        ideal_mm > low + AWAY_MM
            && ideal_mm < high - AWAY_MM
            && string.frets.iter().all(|fret| fret.touches_fret.is_none())
    })
}

/// Asserts that a change gives every string more ideal setback.
fn more_setback(plan: &Plan, change: impl FnOnce(&mut Plan)) -> Result<(), TestCaseError> {
    let mut changed = plan.clone();
    change(&mut changed);
    let (Some(before), Some(after)) = (solved(plan), solved(&changed)) else {
        return Err(TestCaseError::reject("the changed plan is not legal"));
    };
    prop_assume!(clear(&before, plan) && clear(&after, &changed));
    for (one, other) in before.report.strings.iter().zip(&after.report.strings) {
        let [one_mm, other_mm] = [one, other].map(|string| string.ideal.saddle_setback_mm);
        prop_assert!(other_mm > one_mm, "string {}: {one_mm} mm, then {other_mm} mm", one.string);
    }
    Ok(())
}

/// The plan seen in a mirror along its centre line: strings in reverse, left and right changed over.
fn mirrored(plan: &Plan) -> Plan {
    let (strings, checked) = (plan.strings.len(), check(plan).unwrap());
    let turned = |y_mm: fn(&crestline_plan::StringLine) -> f64| -> Vec<f64> {
        solve(&checked).unwrap().layout.strings.iter().rev().map(|string| -y_mm(string)).collect()
    };
    let mut mirror = plan.clone();
    mirror.instrument.across_mm =
        Some(Across { nut: turned(|string| string.nut.y), saddle: turned(|string| string.saddle.y) });
    mirror.instrument.spread_mm = None;
    if let Scale::Fanned(fan) = &mut mirror.instrument.scale {
        std::mem::swap(&mut fan.bass, &mut fan.treble);
    }
    mirror.strings.reverse();
    if let Some(targets) = &mut mirror.targets {
        targets.open_cents.reverse();
    }
    for own in mirror.tolerances.iter_mut().flat_map(|tolerances| &mut tolerances.strings) {
        own.string = strings as u32 + 1 - own.string;
    }
    mirror.saddle.split_after = plan.saddle.split_after.map(|first| strings as u32 - first);
    (mirror.as_built, mirror.readings) = (None, vec![]);
    mirror
}

/// Rows of a comparison by saddle style for one nut style.
fn by_style<'r>(
    rows: &'r [ComparisonRow],
    nut: NutStyle,
) -> impl Fn(SaddleStyle) -> Option<&'r ComparisonRow> {
    move |style| rows.iter().find(|row| row.saddle == style && row.nut == nut)
}

proptest! {
    #![proptest_config(fixed(32))]

    #[test]
    fn higher_action_takes_more_setback(plan in own_optimum(), higher_mm in 0.1..0.6_f64) {
        more_setback(&plan, |plan| {
            for string in &mut plan.strings {
                string.action_mm.twelfth += higher_mm;
                string.action_mm.first = string.action_mm.first.map(|first_mm| first_mm + higher_mm);
            }
        })?;
    }

    #[test]
    fn a_thicker_core_of_the_same_mass_takes_more_setback(plan in own_optimum(), by in 1.03..1.3_f64) {
        more_setback(&plan, |plan| plan.strings.iter_mut().for_each(|string| string.core.diameter_mm *= by))?;
    }

    #[test]
    fn a_thicker_plain_string_takes_more_setback(mut plan in own_optimum(), by in 1.03..1.15_f64) {
        // Strain and stretch stay the same, for mass and tension grow with the section; the bending length grows.
        plan.strings.iter_mut().for_each(|string| string.measured.unit_mass_kg_per_m = None);
        more_setback(&plan, |plan| plan.strings.iter_mut().for_each(|string| string.core.diameter_mm *= by))?;
    }

    #[test]
    fn a_deeper_press_takes_more_setback(plan in own_optimum(), deeper_mm in 0.02..0.2_f64) {
        more_setback(&plan, |plan| plan.pressing.depth_mm += deeper_mm)?;
    }

    #[test]
    fn a_shaped_saddle_in_a_thick_blank_is_as_good_as_separate_pieces(mut plan in likely_plan()) {
        // Setbacks within 20 mm of each other lie within 10 mm of a line.
        plan.saddle.travel_mm = [-5.0, 15.0];
        (plan.saddle.thickness_mm, plan.saddle.edge_margin_mm) = (30.0, 0.5);
        plan.saddle.style = SaddleStyle::Separate;
        let separate = solved(&plan).unwrap();
        plan.saddle.style = SaddleStyle::Shaped;
        let shaped = solved(&plan).unwrap();
        prop_assert!(shaped.report.saddle.fits);
        for (one, other) in separate.report.strings.iter().zip(&shaped.report.strings) {
            prop_assert_eq!(one.built.saddle_setback_mm, other.built.saddle_setback_mm);
            prop_assert_eq!(one.built.nut_setback_mm, other.built.nut_setback_mm);
        }
    }

    #[test]
    fn mirrored_strings_give_a_mirrored_saddle(mut plan in likely_plan()) {
        /// Searches end at steps of 1e-8 mm; on flat optima two of them end a little farther apart.
        const SAME_MM: f64 = 1e-4;
        (plan.as_built, plan.readings) = (None, vec![]);
        let mirror = mirrored(&plan);
        prop_assert!(check(&mirror).is_ok(), "{:?}", check(&mirror).err());
        let (one, other) = (solved(&plan).unwrap(), solved(&mirror).unwrap());
        for (one, other) in one.report.strings.iter().zip(other.report.strings.iter().rev()) {
            for (a, b) in [
                (one.ideal.saddle_setback_mm, other.ideal.saddle_setback_mm),
                (one.ideal.nut_setback_mm, other.ideal.nut_setback_mm),
                (one.built.saddle_setback_mm, other.built.saddle_setback_mm),
                (one.built.nut_setback_mm, other.built.nut_setback_mm),
                (one.built.crest_mm.x, other.built.crest_mm.x),
                (one.built.crest_mm.y, -other.built.crest_mm.y),
            ] {
                prop_assert!((a - b).abs() < SAME_MM, "{:?}\n{:?}", one.built, other.built);
            }
        }
        let (lines, mirrors) = (&one.report.saddle.lines, &other.report.saddle.lines);
        prop_assert_eq!(lines.len(), mirrors.len());
        for (line, mirror) in lines.iter().zip(mirrors.iter().rev()) {
            prop_assert!((line.treble.x - mirror.bass.x).abs() < SAME_MM, "{line:?} {mirror:?}");
            prop_assert!((line.treble.y + mirror.bass.y).abs() < SAME_MM, "{line:?} {mirror:?}");
            prop_assert!((line.bass.x - mirror.treble.x).abs() < SAME_MM, "{line:?} {mirror:?}");
        }
    }
}

proptest! {
    // A comparison is a dozen solutions.
    #![proptest_config(fixed(16))]

    #[test]
    fn a_freer_style_leaves_less_in_summed_squares(mut plan in likely_plan()) {
        /// What a search that ends 1e-8 mm from its optimum may miss, as a share.
        const SHARE: f64 = 1e-6;
        plan.fit.rule = FitRule::LeastSquares;
        let comparison = compare(&check(&plan).unwrap()).unwrap();
        for nut in [NutStyle::Plain, NutStyle::Common, NutStyle::Shaped] {
            let row = by_style(&comparison.rows, nut);
            let order = [
                [SaddleStyle::Separate, SaddleStyle::TwoPiece],
                [SaddleStyle::TwoPiece, SaddleStyle::Straight],
                [SaddleStyle::Separate, SaddleStyle::Shaped],
                [SaddleStyle::Shaped, SaddleStyle::Straight],
            ];
            for [freer, bound] in order {
                let (Some(freer), Some(bound)) = (row(freer), row(bound)) else { continue };
                // A line that cannot keep its crests within the travel oversteps it and may gain by that; a crest that
                // cannot keep within its blank only makes the shaped saddle's bound tighter.
                if bound.fits || bound.saddle == SaddleStyle::Shaped {
                    let (least, more) = (freer.rms_cents.powi(2), bound.rms_cents.powi(2));
                    prop_assert!(least <= more * (1.0 + SHARE) + 1e-9, "{freer:#?}\n{bound:#?}");
                }
            }
        }
    }
}
