//! A saddle that must suit several sets of strings: nothing changes where they are alike, weights pull, and every figure
//! is that of the sets together.
#![allow(clippy::unwrap_used, clippy::panic, missing_docs)]

use crestline_plan::{
    Alternative, FitRule, NutStyle, OtherStrings, Pitch, Plan, SaddleStyle, Severity, Solution, Step, check,
    compare, example, read, solve, workshop,
};

/// Searches for the same place end this near to each other, mm: a search ends within some 1e-8 mm.
const SAME_MM: f64 = 1e-6;
/// Sums of the same errors in another order, cents.
const SAME_CENTS: f64 = 1e-9;

fn plan() -> Plan {
    read(example("steel_six").unwrap().text).unwrap()
}

fn solved(plan: &Plan) -> Solution {
    solve(&check(plan).unwrap()).unwrap()
}

fn tuning(notes: [Option<&str>; 6]) -> OtherStrings {
    OtherStrings::Pitches(notes.map(|note| note.map(|note| Pitch::Note(note.to_owned()))).to_vec())
}

/// All strings a tone lower.
fn lower() -> Alternative {
    Alternative::new("a tone lower", tuning(["D4", "A3", "F3", "C3", "G2", "D2"].map(Some)))
}

/// The same strings with cores a tenth thicker.
fn heavier(plan: &Plan) -> Alternative {
    let mut strings = plan.strings.clone();
    for string in &mut strings {
        string.core.diameter_mm *= 1.1;
        if let Some(wrap) = &mut string.wrap {
            wrap.outside_mm *= 1.1;
        }
    }
    Alternative::new("heavier", OtherStrings::Strings(strings))
}

#[test]
fn sets_that_are_alike_change_nothing() {
    for rule in [FitRule::LeastSquares, FitRule::Twelfth, FitRule::Minimax] {
        for style in [SaddleStyle::Separate, SaddleStyle::Shaped, SaddleStyle::Straight] {
            let mut plan = plan();
            (plan.fit.rule, plan.saddle.style, plan.nut.style) = (rule, style, NutStyle::Shaped);
            let alone = solved(&plan);
            assert!(alone.report.alternatives.is_empty());
            plan.alternatives = vec![
                Alternative::new("the same set", OtherStrings::Strings(plan.strings.clone())),
                Alternative { weight: 7.0, ..Alternative::new("the same pitches", tuning([None; 6])) },
            ];
            let all = solved(&plan);
            assert_eq!(all.report.alternatives.len(), 3);
            for (one, other) in alone.report.strings.iter().zip(&all.report.strings) {
                let crests = [one, other].map(|string| string.built.saddle_setback_mm);
                let edges = [one, other].map(|string| string.built.nut_setback_mm);
                assert!((crests[0] - crests[1]).abs() < SAME_MM, "{rule:?} {style:?} {crests:?}");
                assert!((edges[0] - edges[1]).abs() < SAME_MM, "{rule:?} {style:?} {edges:?}");
            }
        }
    }
}

#[test]
fn a_heavy_weight_pulls_the_crests_to_its_set() {
    let mut plan = plan();
    plan.saddle.style = SaddleStyle::Separate;
    let mut before = f64::NEG_INFINITY;
    for weight in [0.01, 0.3, 1.0, 3.0, 100.0] {
        plan.alternatives = vec![Alternative { weight, ..lower() }];
        let report = solved(&plan).report;
        let own = report.alternatives[0].strings[5].ideal.saddle_setback_mm;
        let others = report.alternatives[1].strings[5].ideal.saddle_setback_mm;
        let built = report.strings[5].built.saddle_setback_mm;
        assert!(own < others && own < built && built < others, "{own} {built} {others}");
        assert!(built > before, "weight {weight}: {before}, then {built}");
        before = built;
        // Only the ratio of the weights counts.
        (plan.strings_weight, plan.alternatives[0].weight) = (0.5, 0.5 * weight);
        if weight >= 0.02 {
            let again = solved(&plan).report.strings[5].built.saddle_setback_mm;
            assert!((again - built).abs() < SAME_MM, "{again} {built}");
        }
        plan.strings_weight = 1.0;
    }
}

#[test]
fn every_set_is_reported_as_a_plan_of_its_own_but_for_its_built_crests() {
    let mut plan = plan();
    plan.saddle.style = SaddleStyle::Straight;
    plan.alternatives = vec![lower(), heavier(&plan)];
    let report = solved(&plan).report;
    let names: Vec<&str> = report.alternatives.iter().map(|set| set.name.as_str()).collect();
    assert_eq!(names, [plan.title.as_str(), "a tone lower", "heavier"]);
    for (set, alternative) in report.alternatives[1..].iter().zip(&plan.alternatives) {
        let alone = solved(&plan.with_alternative(alternative)).report;
        assert_eq!(set.total_tension_n, alone.total_tension_n);
        for ((string, alone), own) in set.strings.iter().zip(&alone.strings).zip(&report.strings) {
            assert_eq!(
                (string.tension_n, string.breaking_fraction),
                (alone.tension_n, alone.breaking_fraction)
            );
            assert_eq!(string.ideal, alone.ideal);
            assert_eq!(string.built.saddle_setback_mm, own.built.saddle_setback_mm);
            let none = |index: usize| (string.frets[index].none_cents, alone.frets[index].none_cents);
            assert!((0..alone.frets.len()).map(none).all(|(one, other)| one == other));
            // What is left is the root of the mean square of the errors listed (frets 1 to 12 of the fit).
            let squares: f64 = string.frets[..12].iter().map(|fret| fret.built_cents.powi(2)).sum();
            assert!((string.built.rms_cents - (squares / 12.0).sqrt()).abs() < SAME_CENTS);
        }
    }
    // A joint line leaves each set more than a line of its own would.
    for (set, alternative) in report.alternatives[1..].iter().zip(&plan.alternatives) {
        let alone = compare(&check(&plan.with_alternative(alternative)).unwrap()).unwrap();
        let line =
            alone.rows.iter().find(|row| row.saddle == SaddleStyle::Straight && row.nut == plan.nut.style);
        assert!(set.rms_cents > line.unwrap().rms_cents, "{}", set.name);
    }
}

#[test]
fn comparison_and_workshop_judge_all_sets_together() {
    let mut plan = plan();
    (plan.saddle.style, plan.nut.style) = (SaddleStyle::Straight, NutStyle::Plain);
    plan.alternatives = vec![Alternative { weight: 2.0, ..lower() }];
    let checked = check(&plan).unwrap();
    let solution = solve(&checked).unwrap();
    let sets = &solution.report.alternatives;
    // All frets of the fit sound in both sets, so each set's mean square counts by its weight alone.
    let together = ((sets[0].rms_cents.powi(2) + 2.0 * sets[1].rms_cents.powi(2)) / 3.0).sqrt();
    let largest = sets[0].max_cents.max(sets[1].max_cents);
    let comparison = compare(&checked).unwrap();
    let row =
        comparison.rows.iter().find(|row| row.saddle == SaddleStyle::Straight && row.nut == NutStyle::Plain);
    let row = row.unwrap();
    assert!((row.rms_cents - together).abs() < SAME_CENTS, "{} {together}", row.rms_cents);
    assert!((row.max_cents - largest).abs() < SAME_CENTS);
    assert_eq!(row.worst_alternative.is_some(), sets[1].max_cents > sets[0].max_cents);
    let figures = workshop(&checked, &solution, Step::Mm05).unwrap();
    assert!((figures.built_rms_cents - together).abs() < SAME_CENTS);
    assert!((figures.built_max_cents - largest).abs() < SAME_CENTS);
}

#[test]
fn notices_name_the_set_and_its_place_in_the_plan() {
    let mut plan = plan();
    // A fourth higher breaks plain steel strings on this scale.
    plan.alternatives = vec![Alternative::new("high", tuning([Some("A4"), None, None, None, None, None]))];
    let report = solved(&plan).report;
    let found: Vec<_> =
        report.notices.iter().filter(|notice| notice.path.starts_with("alternatives")).collect();
    let [notice] = &found[..] else { panic!("{found:?}") };
    assert_eq!((notice.severity, notice.path.as_str()), (Severity::Warning, "alternatives[0].pitches[0]"));
    assert!(notice.text.starts_with("high: string 1"), "{}", notice.text);
}

#[test]
fn a_pitch_beyond_a_strings_stiffness_is_refused_under_its_own_path() {
    let mut plan = plan();
    // Slack and pinned a string sounds (π/2L²)·√(EI/μ): some 37 Hz here, above B0 and far below B3.
    plan.strings[1].measured.bending_stiffness_n_mm2 = Some(1e5);
    plan.alternatives = vec![Alternative::new("slack", tuning([None, Some("B0"), None, None, None, None]))];
    let faults = solve(&check(&plan).unwrap()).map(drop).unwrap_err();
    let paths: Vec<&str> = faults.iter().map(|fault| fault.path.as_str()).collect();
    assert_eq!(paths, ["alternatives[0].pitches[1]"], "{faults:?}");
}
