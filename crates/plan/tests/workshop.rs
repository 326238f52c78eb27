//! Rounding and sensitivity: what is set out lies on the step, and its cost is what the model gives.
#![allow(clippy::unwrap_used, clippy::panic, missing_docs)]

mod common;

use common::{fixed, likely_plan};
use crestline_plan::{
    Checked, NutStyle, Plan, SaddleStyle, Solution, Step, Word, Workshop, check, example, read, solve,
    workshop,
};
use proptest::prelude::*;

/// Rounding of a value that is a multiple of the step, as a share of it.
const ROUNDING: f64 = 1e-9;

fn steel_six(saddle: SaddleStyle, nut: NutStyle) -> Plan {
    let mut plan = read(example("steel_six").unwrap().text).unwrap();
    (plan.saddle.style, plan.nut.style) = (saddle, nut);
    plan.saddle.split_after = Some(2);
    plan
}

fn worked_out(plan: &Plan, step: Step) -> (Checked, Solution, Workshop) {
    let checked = check(plan).unwrap();
    let solution = solve(&checked).unwrap();
    let workshop = workshop(&checked, &solution, step).unwrap();
    (checked, solution, workshop)
}

#[track_caller]
fn assert_multiple(value_mm: f64, step: Step) {
    let steps = value_mm / step.mm();
    assert!((steps - steps.round()).abs() < ROUNDING, "{value_mm} is no multiple of {} mm", step.mm());
}

#[test]
fn what_is_set_out_lies_on_the_step_in_every_style() {
    for &saddle in SaddleStyle::ALL {
        for &nut in NutStyle::ALL {
            for &step in Step::ALL {
                let (_, solution, workshop) = worked_out(&steel_six(saddle, nut), step);
                assert_eq!(workshop.lines.len(), solution.report.saddle.lines.len());
                for line in &workshop.lines {
                    assert_multiple(line.treble_setback_mm, step);
                    assert_multiple(line.bass_setback_mm, step);
                    for (string, setback_mm) in [
                        (line.treble_string, line.treble_setback_mm),
                        (line.bass_string, line.bass_setback_mm),
                    ] {
                        let own = &workshop.strings[string as usize - 1];
                        if saddle != SaddleStyle::Shaped {
                            assert!((own.rounded.saddle_setback_mm - setback_mm).abs() < 1e-9);
                        }
                    }
                }
                for string in &workshop.strings {
                    assert_multiple(string.rounded.nut_setback_mm, step);
                    let moved = (string.rounded.saddle_setback_mm - string.built.saddle_setback_mm).abs();
                    match saddle {
                        SaddleStyle::Separate => assert_multiple(string.rounded.saddle_setback_mm, step),
                        SaddleStyle::Shaped => assert_multiple(string.slot_offset_mm.unwrap(), step),
                        SaddleStyle::Straight | SaddleStyle::TwoPiece => {}
                    }
                    // Between the ends of a line no crest moves further than they do.
                    assert!(moved <= 0.5 * step.mm() * 1.01 || saddle == SaddleStyle::Shaped, "{moved}");
                }
            }
        }
    }
}

#[test]
fn a_shaped_saddles_crests_stay_in_the_blank_and_near_the_fit() {
    let mut plan = steel_six(SaddleStyle::Shaped, NutStyle::Plain);
    (plan.saddle.thickness_mm, plan.saddle.edge_margin_mm) = (3.2, 0.4);
    for &step in Step::ALL {
        let (_, _, workshop) = worked_out(&plan, step);
        for string in &workshop.strings {
            let offset_mm = string.slot_offset_mm.unwrap();
            assert!(offset_mm.abs() <= 1.2 + 1e-9);
            let moved = (string.rounded.saddle_setback_mm - string.built.saddle_setback_mm).abs();
            // Half a step, or a whole one where the margin turns an offset back toward the centre line.
            assert!(moved <= 1.01 * step.mm(), "{moved} {step:?}");
            assert!(moved <= 0.51 * step.mm() || offset_mm.abs() + step.mm() > 1.2, "{moved} {step:?}");
        }
    }
}

#[test]
fn the_octave_answers_to_the_crest_as_a_flexible_string_would() {
    // A string that neither stretches nor is stiff: the error at fret 12 is 1200·log2(L/(2·(L − S_12))) with L the
    // speaking length, so a crest farther by 0.1 mm changes it by 1200/ln 2·0.1·(1/L − 1/(L − S_12)), by hand. A real
    // string's tension and stiffness change that by some hundredths.
    const SHARE: f64 = 0.05;
    let (_, solution, workshop) = worked_out(&steel_six(SaddleStyle::Separate, NutStyle::Plain), Step::Mm01);
    for (report, string) in solution.report.strings.iter().zip(&workshop.strings) {
        let length_mm = report.scale_mm + report.built.saddle_setback_mm;
        let above_mm = length_mm - report.frets[11].position_mm;
        let expected = 1200.0 / std::f64::consts::LN_2 * 0.1 * (1.0 / length_mm - 1.0 / above_mm);
        let found = string.sensitivity.octave_crest_cents_per_tenth_mm.unwrap();
        assert!((found / expected - 1.0).abs() < SHARE, "{found} and {expected}");
        // A nut edge nearer the bridge shortens the open string alone: −1200/ln 2·0.1/L.
        let expected = -1200.0 / std::f64::consts::LN_2 * 0.1 / length_mm;
        let found = string.sensitivity.octave_nut_cents_per_tenth_mm.unwrap();
        assert!((found / expected - 1.0).abs() < SHARE, "{found} and {expected}");
        // High frets answer most to the crest, so the mean over frets 1 to 12 lies below the octave's.
        let crest = string.sensitivity.crest_cents_per_tenth_mm;
        assert!(crest < string.sensitivity.octave_crest_cents_per_tenth_mm.unwrap().abs() && crest > 0.0);
    }
}

#[test]
fn a_setback_on_the_step_costs_nothing_and_a_solution_of_another_plan_is_refused() {
    let mut plan = steel_six(SaddleStyle::Separate, NutStyle::Plain);
    // All crests are held at a limit that is a multiple of the step, to the accuracy of the search.
    plan.saddle.travel_mm = [8.0, 15.0];
    let (_, solution, workshop_of_it) = worked_out(&plan, Step::Mm05);
    for string in &workshop_of_it.strings {
        assert!((string.built.saddle_setback_mm - 8.0).abs() < 1e-5);
    }
    assert!(workshop_of_it.largest_change_cents < 1e-5 && workshop_of_it.rms_change_cents.abs() < 1e-5);
    let other = check(&steel_six(SaddleStyle::Straight, NutStyle::Plain)).unwrap();
    assert_eq!(workshop(&other, &solution, Step::Mm05).unwrap_err()[0].path, "strings");
}

proptest! {
    #![proptest_config(fixed(24))]

    #[test]
    fn rounding_costs_what_the_sensitivity_says(plan in likely_plan()) {
        // Half of the finest step moves a contact by 0.025 mm; derivatives change by little on so short a way, most
        // on the shortest strings.
        const CURVATURE: f64 = 0.05;
        let (_, _, workshop) = worked_out(&plan, Step::Mm005);
        prop_assert!(serde_json::to_value(&workshop).is_ok());
        for string in &workshop.strings {
            let tenths = |of: fn(&crestline_plan::ContactReport) -> f64| {
                (of(&string.rounded) - of(&string.built)).abs() * 10.0
            };
            let by_crest = tenths(|report| report.saddle_setback_mm) * string.sensitivity.crest_cents_per_tenth_mm;
            let by_nut = tenths(|report| report.nut_setback_mm) * string.sensitivity.nut_cents_per_tenth_mm;
            // The root mean square of a sum is at most the sum of theirs.
            let most = (by_crest + by_nut) * (1.0 + CURVATURE) + 1e-6;
            prop_assert!(string.rms_change_cents.abs() <= most, "{} {most}", string.rms_change_cents);
        }
    }
}
