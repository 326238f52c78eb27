//! The lean search against the full one, and the sample against first order.
#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

use crestline_physics::fit::{FitOptions, FitString, NutShape, SaddleShape, ideal_setbacks};
use crestline_physics::neck::{PlanLine, PlanPoint};

use super::*;
use crate::{
    FitRule, NeckTolerance, NutStyle, Plan, PressingTolerance, Slip, StringTolerance, Supports, Tolerances,
    check, example, read,
};

fn plan(name: &str) -> Plan {
    let mut plan = read(example(name).unwrap().text).unwrap();
    plan.tolerances = Some(Tolerances { samples: 512, ..Tolerances::default() });
    plan
}

/// Largest difference of the lean search's contacts from the full one's over some draws, saddle and nut, mm.
fn largest_difference_mm(plan: &Plan, nut: NutShape) -> [f64; 2] {
    let checked = check(plan).unwrap();
    let models = fitted_models(&checked).unwrap();
    let mut largest = [0.0_f64; 2];
    for (place, model) in models.strings.iter().enumerate() {
        let options = FitOptions {
            rule: model.fit.rule,
            saddle: SaddleShape::Separate,
            nut,
            saddle_travel_mm: model.fit.saddle_travel_mm,
            nut_travel_mm: model.fit.nut_travel_mm,
        };
        let end = |x_mm| PlanPoint::new(x_mm, 0.0);
        let line = PlanLine { nut: end(0.0), saddle: end(model.figures.setup.scale_mm) };
        for index in 0..100 {
            let draw = draw::draw(index, 3, place, models.strings.len(), model.figures.setup.fret_mm.len());
            let string = model.figures.string(&draw, &models.tolerances).unwrap();
            let whole =
                ideal_setbacks(&[FitString::single(&string, line, model.fit.frets.clone())], &options);
            let (whole, lean) =
                (whole.unwrap().contacts[0], model.ideal_of(&draw, &models.tolerances).unwrap());
            largest[0] = largest[0].max((whole.saddle_setback_mm - lean.saddle_setback_mm).abs());
            largest[1] = largest[1].max((whole.nut_setback_mm - lean.nut_setback_mm).abs());
        }
    }
    largest
}

#[test]
fn the_lean_search_finds_what_the_full_one_finds() {
    // A tenth of the last digit in which setbacks are given.
    const SAME_MM: f64 = 1e-3;
    for name in ["steel_six", "classical_nylon", "bass_four"] {
        for (rule, style, nut) in [
            (FitRule::LeastSquares, NutStyle::Plain, NutShape::Plain),
            (FitRule::LeastSquares, NutStyle::Shaped, NutShape::Shaped),
            (FitRule::Twelfth, NutStyle::Plain, NutShape::Plain),
            (FitRule::Twelfth, NutStyle::Shaped, NutShape::Shaped),
            (FitRule::Minimax, NutStyle::Plain, NutShape::Plain),
        ] {
            let mut plan = plan(name);
            (plan.fit.rule, plan.nut.style) = (rule, style);
            // The true octave is asked for whatever other frets are named.
            plan.fit.frets = if rule == FitRule::Twelfth { [1, 10] } else { plan.fit.frets };
            let [saddle_mm, nut_mm] = largest_difference_mm(&plan, nut);
            println!("{name} {rule:?} {style:?}: {saddle_mm:.1e} {nut_mm:.1e} mm");
            assert!(
                saddle_mm < SAME_MM && nut_mm < SAME_MM,
                "{name} {rule:?} {style:?}: {saddle_mm} {nut_mm}"
            );
        }
    }
}

/// Every standard deviation times a factor.
fn scaled(factor: f64) -> Tolerances {
    let usual = Tolerances::default();
    let string = |of: StringTolerance| StringTolerance {
        core_diameter_mm: of.core_diameter_mm * factor,
        modulus_fraction: of.modulus_fraction * factor,
        mass_fraction: of.mass_fraction * factor,
        measured_mass_fraction: of.measured_mass_fraction * factor,
        measured_stiffness_fraction: of.measured_stiffness_fraction * factor,
        pitch_cents: of.pitch_cents * factor,
        action_first_mm: of.action_first_mm * factor,
        action_twelfth_mm: of.action_twelfth_mm * factor,
    };
    Tolerances {
        samples: 2048,
        reference_cents: usual.reference_cents * factor,
        neck: NeckTolerance {
            relief_mm: usual.neck.relief_mm * factor,
            scale_mm: usual.neck.scale_mm * factor,
            fret_mm: usual.neck.fret_mm * factor,
        },
        pressing: PressingTolerance {
            finger_fraction: usual.pressing.finger_fraction * factor,
            depth_fraction: usual.pressing.depth_fraction * factor,
        },
        supports: Supports { nut: 0.05 * factor, fret: 0.05 * factor, saddle: 0.05 * factor },
        // Slips are 0 in the plan, where they are held: no straight way leads there.
        slip: Slip { head: 0.0, tail: 0.0 },
        plain: string(usual.plain),
        wound: string(usual.wound),
        polymer: string(usual.polymer),
        ..usual
    }
}

#[test]
fn small_tolerances_spread_as_first_order_says() {
    // The standard error of a standard deviation from 2048 independent draws is 1/√4096, 1.6 %; these draws are
    // even, and the differences are central, so that what is left of the curvature goes with the square.
    const OFF: f64 = 0.016;
    let mut plan = plan("steel_six");
    plan.tolerances = Some(Tolerances {
        making: crate::MakingTolerance { crest_mm: 0.01, nut_edge_mm: 0.01 },
        ..scaled(0.1)
    });
    let found = uncertainty(&check(&plan).unwrap(), &mut |_| ControlFlow::Continue(())).unwrap().unwrap();
    for string in &found.strings {
        let bands = string.frets.iter().filter_map(|fret| fret.error_cents).chain(string.saddle_setback_mm);
        let mut seen = 0;
        for band in bands {
            assert!((band.sd / band.first_order_sd - 1.0).abs() < OFF, "string {}: {band:?}", string.string);
            assert!((band.mean - band.nominal).abs() < 0.05 * band.sd, "string {}: {band:?}", string.string);
            seen += 1;
        }
        assert!(seen > 20);
    }
}

#[test]
fn a_sample_does_not_depend_on_the_threads_and_can_be_ended() {
    let checked = check(&plan("mandolin")).unwrap();
    let on = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        pool.install(|| uncertainty(&checked, &mut |_| ControlFlow::Continue(())).unwrap().unwrap())
    };
    let one = on(1);
    assert_eq!(one, on(3));
    assert_eq!(one.samples, 512);
    let mut heard = Vec::new();
    let ended = uncertainty(&checked, &mut |progress| match progress {
        Progress::Worked { done, of } => {
            heard.push((done, of));
            ControlFlow::Continue(())
        }
        Progress::Sharper(sofar) => {
            assert_eq!(sofar.samples, 256);
            ControlFlow::Break(())
        }
    });
    assert_eq!((ended, heard), (Ok(None), vec![(256, 512)]));
}

#[test]
fn shares_are_parts_of_one_whole_and_name_what_matters() {
    // Two standard errors of a sampled index.
    const OFF: f64 = 0.06;
    let mut small = plan("steel_six");
    small.tolerances = Some(scaled(0.2));
    let found = shares(&check(&small).unwrap()).unwrap();
    for shares in found.strings.iter().map(|own| &own.shares).chain([&found.whole]) {
        let sum = |of: fn(&Share) -> f64| shares.iter().map(of).sum::<f64>();
        assert!((sum(|share| share.linear) - 1.0).abs() < 1e-3, "{shares:?}");
        assert!((sum(|share| share.first_order) - 1.0).abs() < 3.0 * OFF, "{shares:?}");
        for share in shares {
            assert!((share.linear - share.first_order).abs() < OFF && share.total > -OFF, "{share:?}");
            assert!(share.total > share.first_order - OFF, "{share:?}");
        }
    }
    // With one input uncertain alone, all comes from it, and nothing is left once it is known.
    let mut alone = plan("steel_six");
    let mut only = scaled(0.0);
    only.pressing.depth_fraction = 0.3;
    alone.tolerances = Some(only);
    let found = shares(&check(&alone).unwrap()).unwrap();
    let [share] = found.whole[..] else { panic!("{:?}", found.whole) };
    assert_eq!(share.input, Input::PressDepth);
    assert!((share.gain_mm / found.plus_minus_mm - 1.0).abs() < 1e-6, "{share:?}");
    assert_eq!(measure_next(&found)[0].input, Input::PressDepth);
}

#[test]
fn a_robust_setback_leaves_less_on_average_than_any_other() {
    // Expected squares of a string with crest at x over many draws, by themselves a check of the few that the fit uses.
    let mut plan = plan("steel_six");
    plan.saddle.style = crate::SaddleStyle::Separate;
    let solved = |plan: &Plan| crate::solve(&check(plan).unwrap()).unwrap().report;
    let plain = solved(&plan);
    plan.fit.rule = FitRule::Robust;
    let robust = solved(&plan);
    let checked = check(&plan).unwrap();
    let models = fitted_models(&checked).unwrap();
    let mut moved = 0;
    for (index, model) in models.strings.iter().enumerate() {
        let own = crestline_physics::FrettedString::new(model.figures.setup.clone()).unwrap();
        let drawn = robust::drawn(&checked, index, &own, &model.fit.frets, 1024);
        assert_eq!(drawn.len(), 1024);
        let expected = |saddle_setback_mm: f64| {
            let at = crestline_physics::Contacts { saddle_setback_mm, ..model.built };
            let squares = |(string, frets): &(crestline_physics::FrettedString, Vec<usize>)| -> f64 {
                string.errors_cents(at, frets).unwrap().iter().map(|error| error * error).sum()
            };
            drawn.iter().map(squares).sum::<f64>() / 1024.0
        };
        let setback_mm = robust.strings[index].built.saddle_setback_mm;
        let usual_mm = plain.strings[index].built.saddle_setback_mm;
        let left = expected(setback_mm);
        for away_mm in [-0.3, -0.1, 0.1, 0.3] {
            assert!(expected(setback_mm + away_mm) > left, "string {}", index + 1);
        }
        println!(
            "string {}: {usual_mm:.3} and {setback_mm:.3} mm, {:.2} and {left:.2} cents²",
            index + 1,
            expected(usual_mm)
        );
        moved += u32::from((setback_mm - usual_mm).abs() > 0.01 && left < expected(usual_mm));
    }
    assert!(moved >= 3, "the rule makes a difference");
    // Where nothing is uncertain it is the rule of least squares.
    plan.tolerances = Some(scaled(0.0));
    for (robust, plain) in solved(&plan).strings.iter().zip(&plain.strings) {
        // The search settles at 1e-8 mm.
        assert!((robust.built.saddle_setback_mm - plain.built.saddle_setback_mm).abs() < 1e-6);
    }
}
