//! Every fault that a plan can have, each by a plan that has it.
#![allow(clippy::unwrap_used, clippy::panic)]

use super::*;
use crate::{
    Action, AsBuilt, Core, CoreShape, Fan, Instrument, NutStyle, Pitch, PlanString, Reading, ReadingKind,
    Saddle, SaddleStyle, Scale, Severity, Spread, Targets, Wrap,
};

/// A legal steel-string plan of six strings.
fn plan() -> Plan {
    let instrument = Instrument::ordinary(650.0, 20, Spread { nut: 36.0, saddle: 55.0 });
    let string = |number, note: &str, diameter_mm| {
        let action = Action { first: Some(0.4), twelfth: 2.0 };
        PlanString::new(number, Pitch::Note(note.to_owned()), Core::steel(diameter_mm), action)
    };
    let strings = [("E4", 0.3), ("B3", 0.4), ("G3", 0.43), ("D3", 0.6), ("A2", 0.8), ("E2", 1.1)];
    Plan::new(instrument, std::iter::zip(1.., strings).map(|(n, (note, d))| string(n, note, d)).collect())
}

fn zero_fret_plan() -> Plan {
    let mut plan = plan();
    plan.instrument.zero_fret = true;
    plan.strings.iter_mut().for_each(|string| string.action_mm.first = None);
    plan
}

fn fanned_plan(bass: f64, treble: f64, square_fret: f64) -> Plan {
    let mut plan = plan();
    plan.instrument.scale = Scale::Fanned(Fan { bass, treble, square_fret });
    plan
}

fn faults(plan: &Plan) -> Vec<Fault> {
    check(plan).err().unwrap_or_default()
}

/// Asserts that a changed plan has one fault, at `path`, with these words in it.
#[track_caller]
fn one_fault(plan: &Plan, path: &str, words: &[&str]) {
    let faults = faults(plan);
    let [fault] = &faults[..] else { panic!("expected one fault at {path}, found {faults:#?}") };
    assert_eq!(fault.path, path, "{fault}");
    for word in words {
        assert!(fault.to_string().contains(word), "{word:?} is not in: {fault}");
    }
}

#[track_caller]
fn one_fault_after(change: impl FnOnce(&mut Plan), path: &str, words: &[&str]) {
    let mut plan = plan();
    change(&mut plan);
    one_fault(&plan, path, words);
}

#[test]
fn the_plans_that_these_tests_start_from_are_legal() {
    for plan in [plan(), zero_fret_plan(), fanned_plan(690.0, 650.0, 7.0)] {
        assert_eq!(faults(&plan), []);
        assert_eq!(check(&plan).unwrap().notices(), []);
    }
    let string = |zero_fret| vec![PlanString::starting(1, zero_fret)];
    let alone = Plan::new(Instrument::ordinary(330.0, 12, Spread { nut: 0.0, saddle: 0.0 }), string(false));
    assert_eq!(faults(&alone), []);
    let checked = check(&alone).unwrap();
    assert_eq!(checked.neck().strings.len(), 1);
    assert!((checked.frequencies_hz()[0] - 329.627556913).abs() < 1e-9);
}

#[test]
fn necks_from_a_soprano_ukulele_to_a_long_bass_and_beyond_are_allowed() {
    for scale_mm in [200.0, 330.0, 900.0, 1500.0] {
        let mut plan = plan();
        plan.instrument.scale = Scale::Single(scale_mm);
        assert_eq!(faults(&plan), [], "{scale_mm}");
    }
}

#[test]
fn every_single_value_is_held_against_its_range() {
    let nan = f64::NAN;
    type Set = fn(&mut Plan, f64);
    let cases: [(Set, &str, [f64; 3]); 27] = [
        (|p, v| p.instrument.scale = Scale::Single(v), "instrument.scale_mm", [199.0, 1501.0, nan]),
        (|p, v| p.instrument.relief_mm = v, "instrument.relief_mm", [-0.1, 3.1, nan]),
        (|p, v| p.instrument.fret_height_mm = v, "instrument.fret_height_mm", [0.05, 3.1, nan]),
        (
            |p, v| p.instrument.spread_mm = Some(Spread { nut: v, saddle: 50.0 }),
            "instrument.spread_mm.nut",
            [-1.0, 301.0, nan],
        ),
        (
            |p, v| p.instrument.spread_mm = Some(Spread { nut: 40.0, saddle: v }),
            "instrument.spread_mm.saddle",
            [-1.0, 301.0, nan],
        ),
        (|p, v| p.pressing.finger_fraction = v, "pressing.finger_fraction", [0.04, 0.96, nan]),
        (|p, v| p.pressing.depth_mm = v, "pressing.depth_mm", [-0.1, 3.1, nan]),
        (|p, v| p.supports.nut = v, "supports.nut", [-0.1, 1.1, nan]),
        (|p, v| p.supports.fret = v, "supports.fret", [-0.1, 1.1, nan]),
        (|p, v| p.supports.saddle = v, "supports.saddle", [-0.1, 1.1, nan]),
        (|p, v| p.slip.head = v, "slip.head", [-0.1, 1.1, nan]),
        (|p, v| p.slip.tail = v, "slip.tail", [-0.1, 1.1, f64::INFINITY]),
        (|p, v| p.reference_hz = v, "reference_hz", [219.0, 881.0, nan]),
        (
            |p, v| p.strings[1].pitch = Pitch::FrequencyHz(v),
            "strings[1].pitch.frequency_hz",
            [9.0, 5001.0, nan],
        ),
        (|p, v| p.strings[1].core.diameter_mm = v, "strings[1].core.diameter_mm", [0.0, 10.1, nan]),
        (
            |p, v| p.strings[1].core.youngs_modulus_gpa = v,
            "strings[1].core.youngs_modulus_gpa",
            [0.0, 1001.0, nan],
        ),
        (|p, v| p.strings[1].core.density_kg_m3 = v, "strings[1].core.density_kg_m3", [7.85, 25001.0, nan]),
        (|p, v| p.strings[1].core.tensile_mpa = Some(v), "strings[1].core.tensile_mpa", [0.0, 1e5, nan]),
        (
            |p, v| p.strings[1].measured.unit_mass_kg_per_m = Some(v),
            "strings[1].measured.unit_mass_kg_per_m",
            [0.0, 1.0, nan],
        ),
        (
            |p, v| p.strings[1].measured.axial_stiffness_n = Some(v),
            "strings[1].measured.axial_stiffness_n",
            [0.0, 1e9, nan],
        ),
        (
            |p, v| p.strings[1].measured.bending_stiffness_n_mm2 = Some(v),
            "strings[1].measured.bending_stiffness_n_mm2",
            [-1.0, 1e9, nan],
        ),
        (|p, v| p.strings[1].action_mm.twelfth = v, "strings[1].action_mm.twelfth", [-0.1, 25.1, nan]),
        (|p, v| p.strings[1].action_mm.first = Some(v), "strings[1].action_mm.first", [-0.1, 10.1, nan]),
        (|p, v| p.strings[1].afterlength_mm.head = v, "strings[1].afterlength_mm.head", [-1.0, 2001.0, nan]),
        (|p, v| p.strings[1].afterlength_mm.tail = v, "strings[1].afterlength_mm.tail", [-1.0, 2001.0, nan]),
        (|p, v| p.saddle.thickness_mm = v, "saddle.thickness_mm", [0.4, 31.0, nan]),
        (|p, v| p.saddle.end_margin_mm = v, "saddle.end_margin_mm", [0.4, 31.0, nan]),
    ];
    for (set, path, values) in cases {
        for value in values {
            let mut plan = plan();
            set(&mut plan, value);
            one_fault(&plan, path, &["allowed: ", " to "]);
        }
    }
}

#[test]
fn many_faults_are_all_listed() {
    let mut plan = plan();
    plan.instrument.relief_mm = 9.0;
    plan.strings[0].core.diameter_mm = -1.0;
    plan.strings[5].pitch = Pitch::Note("H2".to_owned());
    plan.nut.travel_mm = [3.0, 0.0];
    plan.fit.frets = [0, 99];
    let paths: Vec<String> = faults(&plan).into_iter().map(|fault| fault.path).collect();
    let expected = [
        "instrument.relief_mm",
        "strings[0].core.diameter_mm",
        "strings[5].pitch.note",
        "fit.frets[0]",
        "fit.frets[1]",
        "nut.travel_mm",
    ];
    assert_eq!(paths, expected);
}

#[test]
fn numbers_of_frets_and_strings() {
    one_fault_after(|p| p.instrument.frets = 11, "instrument.frets", &["found 11", "12 to 36"]);
    one_fault_after(|p| p.instrument.frets = 37, "instrument.frets", &["found 37", "12 to 36"]);
    one_fault_after(|p| p.strings.clear(), "strings", &["0 strings", "1 to 16"]);
    let many = vec![PlanString::starting(1, false); 17];
    one_fault_after(|p| p.strings = many, "strings", &["17 strings", "1 to 16"]);
}

#[test]
fn measured_fret_positions() {
    const PATH: &str = "instrument.fret_positions_mm";
    let tempered =
        || -> Vec<f64> { (1..=20).map(|n| 650.0 * (1.0 - (-f64::from(n) / 12.0).exp2())).collect() };
    let with = |change: fn(&mut Vec<f64>)| {
        let mut positions = tempered();
        change(&mut positions);
        move |plan: &mut Plan| plan.instrument.fret_positions_mm = Some(positions)
    };
    one_fault_after(with(|x| x.truncate(19)), PATH, &["19 positions", "20 of them"]);
    one_fault_after(with(|x| x[6] = x[5]), &format!("{PATH}[6]"), &["fret 6", "rising"]);
    one_fault_after(
        with(|x| x[19] = 646.0),
        &format!("{PATH}[19]"),
        &["646", "before the saddle line", "645"],
    );
    one_fault_after(with(|x| x[19] = f64::NAN), &format!("{PATH}[19]"), &["no number"]);
    let near = with(|x| x[19] = 641.0);
    one_fault_after(near, "saddle.travel_mm[0]", &["-5", "at least -4", "behind the last fret"]);
    let mut fanned = fanned_plan(690.0, 650.0, 7.0);
    fanned.instrument.fret_positions_mm = Some(tempered());
    one_fault(&fanned, PATH, &["fanned neck"]);
}

#[test]
fn string_spacing() {
    one_fault_after(|p| p.instrument.spread_mm = None, "instrument.spread_mm", &["nothing", "across_mm"]);
    let spread = |nut, saddle| move |p: &mut Plan| p.instrument.spread_mm = Some(Spread { nut, saddle });
    one_fault_after(
        spread(2.0, 50.0),
        "instrument.spread_mm.nut",
        &["found 2", "at least 2.5 mm", "6 strings"],
    );
    one_fault_after(spread(5.0, 0.0), "instrument.spread_mm.saddle", &["found 0", "at least 2.5 mm"]);
    let narrow = |p: &mut Plan| {
        p.instrument.scale = Scale::Single(200.0);
        p.instrument.spread_mm = Some(Spread { nut: 10.0, saddle: 250.0 });
    };
    one_fault_after(narrow, "instrument.spread_mm", &["sideways by 0.60", "0.3"]);

    let even = [20.0, 12.0, 4.0, -4.0, -12.0, -20.0];
    let across = |change: fn(&mut crate::Across)| {
        let mut across = crate::Across { nut: even.to_vec(), saddle: even.to_vec() };
        change(&mut across);
        move |p: &mut Plan| (p.instrument.across_mm, p.instrument.spread_mm) = (Some(across), None)
    };
    let mut legal = plan();
    across(|_| {})(&mut legal);
    assert_eq!(faults(&legal), []);
    assert_eq!(check(&legal).unwrap().neck().strings[1].line.nut.y_mm, 12.0);
    one_fault_after(across(|a| a.nut.truncate(5)), "instrument.across_mm.nut", &["5 places", "6 of them"]);
    let touching = across(|a| a.saddle[1] = a.saddle[0]);
    one_fault_after(
        touching,
        "instrument.across_mm.saddle[1]",
        &["20 after 20 of string 1", "0.5 mm a string"],
    );
    one_fault_after(across(|a| a.nut[0] = 201.0), "instrument.across_mm.nut[0]", &["-200 to 200 mm"]);
}

#[test]
fn strings_in_the_wrong_order_are_named_one_by_one() {
    let mut plan = plan();
    let places = vec![-20.0, -12.0, -4.0, 4.0, 12.0, 20.0];
    plan.instrument.across_mm = Some(crate::Across { nut: places.clone(), saddle: places });
    let faults = faults(&plan);
    assert_eq!(faults.len(), 10);
    assert!(faults.iter().all(|fault| fault.allowed.contains("fall from string 1")));
}

#[test]
fn fanned_necks() {
    one_fault(&fanned_plan(950.0, 700.0, 7.0), "instrument.scale_mm", &["250 mm", "within 200 mm"]);
    one_fault(&fanned_plan(690.0, 650.0, 61.0), "instrument.scale_mm.square_fret", &["61", "0 to 60"]);
    one_fault(&fanned_plan(150.0, 210.0, 7.0), "instrument.scale_mm.bass", &["150", "200 to 1500 mm"]);
    one_fault(&fanned_plan(780.0, 650.0, 12.0), "instrument.scale_mm", &["nut line", "12 square", "60°"]);
    let mut alone = fanned_plan(690.0, 650.0, 7.0);
    alone.strings.truncate(1);
    one_fault(&alone, "instrument.scale_mm", &["one string"]);
}

#[test]
fn pitches() {
    let note = |name: &'static str| move |p: &mut Plan| p.strings[2].pitch = Pitch::Note(name.to_owned());
    one_fault_after(note("H3"), "strings[2].pitch.note", &["\"H3\"", "C0 to B9", "Bb1"]);
    one_fault_after(note("B9"), "strings[2].pitch.note", &["15804.3 Hz", "10 to 5000 Hz"]);
    let both = |p: &mut Plan| {
        p.reference_hz = 1e6;
        p.strings[2].pitch = Pitch::Note("A4".to_owned());
    };
    one_fault_after(both, "reference_hz", &["1000000", "220 to 880 Hz"]);
}

#[test]
fn a_wrap_goes_around_its_core() {
    let wound = |outside_mm, shape| {
        move |p: &mut Plan| {
            p.strings[3].core.shape = shape;
            p.strings[3].wrap = Some(Wrap { outside_mm, density_kg_m3: 8800.0, material: String::new() });
        }
    };
    const PATH: &str = "strings[3].wrap.outside_mm";
    one_fault_after(wound(0.6, CoreShape::Round), PATH, &["0.6 mm", "thicker than the diameter", "0.6 mm"]);
    // Across the corners 2·0.6/√3 = 0.69282 mm.
    one_fault_after(wound(0.6928, CoreShape::Hex), PATH, &["0.6928 mm", "corners", "0.6928 mm"]);
    one_fault_after(wound(16.0, CoreShape::Hex), PATH, &["16", "0.05 to 15 mm"]);
    let mut legal = plan();
    wound(0.6929, CoreShape::Hex)(&mut legal);
    assert_eq!(faults(&legal), []);
}

#[test]
fn the_height_at_the_nut_comes_from_one_thing() {
    one_fault_after(
        |p| p.strings[4].action_mm.first = None,
        "strings[4].action_mm.first",
        &["nothing", "no zero fret"],
    );
    let mut plan = zero_fret_plan();
    plan.strings[4].action_mm.first = Some(0.4);
    one_fault(&plan, "strings[4].action_mm.first", &["0.4 mm", "the zero fret sets"]);
}

#[test]
fn an_open_string_on_a_fret_is_named_with_the_fret() {
    const PATH: &str = "strings[2].action_mm";
    let action =
        |first, twelfth| move |p: &mut Plan| p.strings[2].action_mm = Action { first: Some(first), twelfth };
    one_fault_after(action(0.0, 2.0), PATH, &["lies on fret 1; allowed"]);
    one_fault_after(action(0.4, 0.0), PATH, &["lies on fret 12 and 8 others, 0.17 mm too low at fret 20"]);
    // Gaps of 0.4 and 0 mm: 0.4·120.263/288.518 = 0.1667 mm below fret 20. Gaps of 0.4 and 0.3 mm, level frets: the line falls 0.1 mm over S_12 − S_1 = 288.518 mm and stands
    // 0.3 − 0.1·(445.263 − 325)/288.518 = 0.2583 mm over fret 20: it clears.
    let mut legal = plan();
    action(0.4, 0.3)(&mut legal);
    assert_eq!(faults(&legal), []);
    // 2.0 and 0.2 mm: 0.2 − 1.8·120.263/288.518 = −0.5503 mm at fret 20. The line meets the crowns' level
    // 0.2·288.518/1.8 = 32.06 mm beyond fret 12; fret 13 lies 18.2 mm beyond it, fret 14 35.5 mm.
    one_fault_after(action(2.0, 0.2), PATH, &["lies on fret 14 and 6 others, 0.55 mm too low at fret 20"]);
}

#[test]
fn relief_lowers_the_crowns_between() {
    // Relief 1 mm: crown 12 lies 4·u·(1 − u) = 0.8306 mm low, u = 288.518/408.781, so a gap of 0.8 mm there leaves
    // the line below the level of crown 1, on which it must not lie with a zero fret; 0.85 mm keeps it above.
    let gap = |twelfth| {
        let mut plan = zero_fret_plan();
        plan.instrument.relief_mm = 1.0;
        plan.strings[2].action_mm.twelfth = twelfth;
        plan
    };
    one_fault(
        &gap(0.8),
        "strings[2].action_mm",
        &["lies on fret 1 and one other, 0.04 mm too low at fret 20"],
    );
    assert_eq!(faults(&gap(0.85)), []);
}

#[test]
fn a_nut_slot_below_the_fingerboard_is_refused() {
    // 0.1 − 9.9·36.482/288.518 = −1.152 mm at the nut, below a fret height of 1.1 mm.
    let action = |twelfth| move |p: &mut Plan| p.strings[0].action_mm = Action { first: Some(0.1), twelfth };
    one_fault_after(action(10.0), "strings[0].action_mm", &["nut 1.15 mm below", "fret height of 1.1 mm"]);
    let mut legal = plan();
    action(9.5)(&mut legal);
    assert_eq!(faults(&legal), []);
}

#[test]
fn the_press_depth_is_at_most_the_fret_height() {
    one_fault_after(|p| p.pressing.depth_mm = 1.2, "pressing.depth_mm", &["1.2", "fret height, 1.1 mm"]);
}

#[test]
fn the_fit_stays_on_the_neck() {
    one_fault_after(|p| p.fit.frets = [0, 12], "fit.frets[0]", &["found 0", "1 to 20"]);
    one_fault_after(|p| p.fit.frets = [1, 21], "fit.frets[1]", &["found 21", "1 to 20"]);
    one_fault_after(|p| p.fit.frets = [12, 1], "fit.frets", &["12 before 1"]);
}

#[test]
fn targets_are_one_a_string() {
    let targets = |open: usize, cents| {
        move |p: &mut Plan| {
            p.targets = Some(Targets { open_cents: vec![0.0; open], pitch_class_cents: [cents; 12] });
        }
    };
    one_fault_after(targets(5, 0.0), "targets.open_cents", &["5 values", "6 of them"]);
    let mut plan = plan();
    targets(6, 51.0)(&mut plan);
    assert_eq!(faults(&plan).len(), 12);
    assert_eq!(faults(&plan)[11].path, "targets.pitch_class_cents[11]");
}

#[test]
fn saddle_and_nut() {
    one_fault_after(|p| p.saddle.edge_margin_mm = 1.5, "saddle.edge_margin_mm", &["1.5", "half", "1.5 mm"]);
    one_fault_after(|p| p.saddle.edge_margin_mm = -0.1, "saddle.edge_margin_mm", &["0 to 15 mm"]);
    one_fault_after(|p| p.saddle.travel_mm = [-11.0, 15.0], "saddle.travel_mm[0]", &["-10 to 30 mm"]);
    one_fault_after(|p| p.saddle.travel_mm = [0.0, f64::NAN], "saddle.travel_mm[1]", &["-10 to 30 mm"]);
    one_fault_after(
        |p| p.saddle.travel_mm = [5.0, 5.0],
        "saddle.travel_mm",
        &["5 before 5", "lower end first"],
    );
    one_fault_after(|p| p.nut.travel_mm = [-6.0, 3.0], "nut.travel_mm[0]", &["-5 to 10 mm"]);
    one_fault_after(|p| p.nut.travel_mm = [3.0, 1.0], "nut.travel_mm", &["3 before 1"]);
}

#[test]
fn a_two_piece_saddle_is_split_between_strings() {
    const PATH: &str = "saddle.split_after";
    let split =
        |style, split_after| move |p: &mut Plan| p.saddle = Saddle { split_after, ..Saddle::of_style(style) };
    one_fault_after(split(SaddleStyle::TwoPiece, None), PATH, &["nothing", "1 to 5"]);
    one_fault_after(split(SaddleStyle::TwoPiece, Some(0)), PATH, &["found 0", "1 to 5"]);
    one_fault_after(split(SaddleStyle::TwoPiece, Some(6)), PATH, &["found 6", "1 to 5"]);
    one_fault_after(split(SaddleStyle::Straight, Some(6)), PATH, &["found 6"]);
    let mut alone = plan();
    alone.strings.truncate(1);
    split(SaddleStyle::TwoPiece, None)(&mut alone);
    one_fault(&alone, "saddle.style", &["one string"]);
}

#[test]
fn a_nut_edge_stays_in_front_of_the_finger() {
    // Fret 1 at 36.482·330/650 = 18.52 mm; a finger at 0.8 of the space presses 3.70 mm from the nut line.
    let short = |p: &mut Plan| {
        p.instrument.scale = Scale::Single(330.0);
        p.pressing.finger_fraction = 0.8;
        p.nut.travel_mm = [0.0, 4.0];
    };
    let mut legal = plan();
    short(&mut legal);
    assert_eq!(faults(&legal), [], "a plain nut does not move");
    let moved = |p: &mut Plan| {
        short(p);
        p.nut.style = NutStyle::Shaped;
    };
    one_fault_after(moved, "nut.travel_mm[1]", &["found 4", "at most 3.5 mm", "finger at fret 1"]);
    let built = |p: &mut Plan| {
        short(p);
        let (mut nut, saddle) = (vec![0.0; 6], vec![2.0; 6]);
        nut[3] = 3.6;
        p.as_built = Some(AsBuilt { saddle_setback_mm: saddle, nut_setback_mm: nut });
    };
    one_fault_after(built, "as_built.nut_setback_mm[3]", &["3.6", "at most 3.5 mm"]);
}

#[test]
fn what_is_built_is_one_value_a_string() {
    let built = |saddle: Vec<f64>, nut: Vec<f64>| {
        move |p: &mut Plan| p.as_built = Some(AsBuilt { saddle_setback_mm: saddle, nut_setback_mm: nut })
    };
    let zero = || vec![0.0; 6];
    one_fault_after(built(vec![0.0; 5], zero()), "as_built.saddle_setback_mm", &["5 values", "6 of them"]);
    one_fault_after(built(zero(), vec![0.0; 7]), "as_built.nut_setback_mm", &["7 values"]);
    one_fault_after(
        built(zero(), vec![0.0, 0.0, 0.0, -11.0, 0.0, 0.0]),
        "as_built.nut_setback_mm[3]",
        &["-10 to 20 mm"],
    );
    let far = built(vec![0.0, 51.0, 0.0, 0.0, 0.0, 0.0], zero());
    one_fault_after(far, "as_built.saddle_setback_mm[1]", &["-30 to 50 mm"]);
    let on_a_fret = |p: &mut Plan| {
        p.instrument.scale = Scale::Single(200.0);
        p.instrument.frets = 36;
        built(vec![0.0, 0.0, 0.0, -21.0, 0.0, 0.0], zero())(p);
    };
    // 200/8 = 25 mm from fret 36 to the saddle line; 5 mm of it must be left.
    one_fault_after(on_a_fret, "as_built.saddle_setback_mm[3]", &["-21", "behind the last fret"]);
}

#[test]
fn readings_fit_their_kind() {
    let reading = |string, fret, kind, cents| {
        move |p: &mut Plan| p.readings = vec![Reading { string, fret, kind, cents }]
    };
    use ReadingKind::{Fretted, OctaveHarmonic, Open};
    one_fault_after(reading(0, 5, Fretted, 1.0), "readings[0].string", &["found 0", "1 to 6"]);
    one_fault_after(reading(7, 5, Fretted, 1.0), "readings[0].string", &["found 7", "1 to 6"]);
    one_fault_after(reading(1, 21, Fretted, 1.0), "readings[0].fret", &["found 21", "0 to 20"]);
    one_fault_after(reading(1, 0, Fretted, 1.0), "readings[0].fret", &["found 0", "1 or more"]);
    one_fault_after(reading(1, 1, Open, 1.0), "readings[0].fret", &["found 1", "0 for an open string"]);
    one_fault_after(reading(1, 11, OctaveHarmonic, 1.0), "readings[0].fret", &["found 11", "12 for"]);
    one_fault_after(reading(1, 3, Fretted, f64::NAN), "readings[0].cents", &["-1200 to 1200"]);
    let many =
        |p: &mut Plan| p.readings = vec![Reading { string: 1, fret: 1, kind: Fretted, cents: 0.0 }; 2001];
    one_fault_after(many, "readings", &["2001 readings", "at most 2000"]);
    for (fret, kind) in [(0, Open), (12, OctaveHarmonic), (1, Fretted), (20, Fretted)] {
        let mut legal = plan();
        reading(6, fret, kind, -3.0)(&mut legal);
        assert_eq!(faults(&legal), []);
    }
}

#[test]
fn what_is_unusual_is_noticed_and_not_refused() {
    let mut plan = plan();
    plan.instrument.relief_mm = 0.8;
    plan.strings[0].action_mm = Action { first: Some(2.0), twelfth: 1.9 };
    plan.strings[1].action_mm.twelfth = 7.0;
    let mut positions: Vec<f64> = (1..=20).map(|n| 650.0 * (1.0 - (-f64::from(n) / 12.0).exp2())).collect();
    positions[4] += 2.0;
    plan.instrument.fret_positions_mm = Some(positions);
    let kind = ReadingKind::Fretted;
    let reading = |cents| Reading { string: 1, fret: 3, kind, cents };
    plan.readings = vec![reading(4.0), reading(8.0), reading(140.0)];
    let checked = check(&plan).unwrap();
    let found: Vec<(&str, Severity)> =
        checked.notices().iter().map(|n| (n.path.as_str(), n.severity)).collect();
    let expected = [
        ("instrument.relief_mm", Severity::Note),
        ("instrument.fret_positions_mm[4]", Severity::Warning),
        ("strings[0].action_mm.first", Severity::Note),
        ("strings[0].action_mm", Severity::Warning),
        ("strings[1].action_mm.twelfth", Severity::Note),
        ("readings[2].cents", Severity::Warning),
        ("readings[2].cents", Severity::Warning),
    ];
    assert_eq!(found, expected);

    let mut moved = zero_fret_plan();
    moved.nut.style = NutStyle::Common;
    assert_eq!(check(&moved).unwrap().notices()[0].path, "nut.style");
    let fan = fanned_plan(650.0, 690.0, 7.0);
    assert_eq!(check(&fan).unwrap().notices()[0].path, "instrument.scale_mm");
}
