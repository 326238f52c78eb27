//! Setbacks of the example plans against published ones and against the practice of the trade: checks of order and
//! size, not of decimals, because nobody published all that the model needs to know.

use crestline_plan::{ContactReport, NutStyle, Plan, Report, SaddleStyle, check, example, read, solve};

use super::{By, INCH_MM, assert_apart, assert_between, origin};

checks![
    a_classical_guitar_with_nut_and_saddle_filed_string_by_string,
    a_steel_string_guitar_lies_in_the_bands_of_the_trade,
    straight_saddles_stand_about_where_they_are_put,
    pieces_of_an_electric_guitar_lie_in_their_usual_travel,
    the_crown_of_the_octave_stands_halfway,
    a_thicker_core_wants_more_setback,
    the_examples_are_set_up_as_is_usual,
];

fn plan(name: &str) -> Plan {
    read(example(name).expect("the example is there").text).expect("an example is a plan")
}

fn report(plan: &Plan) -> Report {
    solve(&check(plan).expect("a legal plan")).expect("a plan that can be solved").report
}

fn ideal_setbacks_mm(plan: &Plan) -> Vec<f64> {
    report(plan).strings.iter().map(|string| string.ideal.saddle_setback_mm).collect()
}

/// Compares with a band, as agreeing inside it and as disagreeing outside; never farther outside than allowed.
#[track_caller]
fn in_or_near(ours: f64, band: [f64; 2], allowed: f64, what: &str, why: &str) {
    if band[0] <= ours && ours <= band[1] {
        assert_between(ours, band, allowed, what);
    } else {
        assert_apart(ours, band, allowed, what, why);
    }
}

/// G. Byers, "Classical guitar intonation", American Lutherie 47 (1996), second-hand, millimetres by context, strings 1 to 6.
/// The string data are not at hand, so the figures hold in order and size: within about a millimetre taken together, and
/// rising over the three plain strings. (Farthest off is the sixth string's saddle.)
#[test]
fn a_classical_guitar_with_nut_and_saddle_filed_string_by_string() {
    const OTHER_STRINGS_RMS_MM: f64 = 1.0;
    const ONE_STRING_MM: f64 = 1.6; // one string of six may lie farther off than all of them together
    origin(
        "G. Byers, \"Classical guitar intonation\", American Lutherie 47 (1996), millimetres by context",
        By::SecondHand,
    );
    let nut_forward = [0.3, 0.7, 1.0, 0.5, 0.5, 0.5];
    let saddle_back = [1.3, 2.1, 3.1, 1.5, 1.7, 2.9];
    let mut plan = plan("classical_nylon");
    plan.nut.style = NutStyle::Shaped;
    plan.saddle.style = SaddleStyle::Separate;
    let free = report(&plan);
    let why =
        "strings, action and fitted frets of the source are not at hand; ours is the set of the example plan";
    let compare = |report: &Report, published: [f64; 6], found: fn(&ContactReport) -> f64, name: &str| {
        let mut squares = 0.0;
        for (string, published) in report.strings.iter().zip(published) {
            let ours = found(&string.ideal);
            let what = format!("string {}, {name}, mm", string.string);
            in_or_near(ours, [published; 2], ONE_STRING_MM, &what, why);
            squares += (ours - published).powi(2) / 6.0;
        }
        assert!(squares.sqrt() < OTHER_STRINGS_RMS_MM, "{name}: root mean square {}", squares.sqrt());
    };
    compare(&free, nut_forward, |ideal| ideal.nut_setback_mm, "nut forward, nut and saddle free");
    compare(&free, saddle_back, |ideal| ideal.saddle_setback_mm, "saddle back, nut and saddle free");
    let [first, second, third] = [0, 1, 2].map(|index: usize| free.strings[index].ideal.saddle_setback_mm);
    assert!(first < second && second < third, "the plain strings rise: {first}, {second}, {third}");
    let fixed = with_nut_forward(&plan, nut_forward);
    compare(&fixed, saddle_back, |ideal| ideal.saddle_setback_mm, "saddle back, nut as published");
}

/// The report of a plan whose nut edges stand forward by given lengths: one string at a time, for which the nut's
/// travel is narrowed to its place.
fn with_nut_forward(plan: &Plan, nut_forward_mm: [f64; 6]) -> Report {
    const NARROW_MM: f64 = 1e-3; // a travel needs some width; a micrometre moves no crest by a hundredth
    let mut whole = report(plan);
    for (index, forward_mm) in nut_forward_mm.into_iter().enumerate() {
        let mut held = plan.clone();
        held.nut.travel_mm = [forward_mm - NARROW_MM / 2.0, forward_mm + NARROW_MM / 2.0];
        whole.strings[index] = report(&held).strings.swap_remove(index);
        let found_mm = whole.strings[index].ideal.nut_setback_mm;
        assert!((found_mm - forward_mm).abs() <= NARROW_MM, "the nut edge stands at {found_mm}");
    }
    whole
}

/// Setbacks of a steel-string acoustic of 25.5 in, mm, strings 1 to 6 with a wound third: common practice.
#[test]
fn a_steel_string_guitar_lies_in_the_bands_of_the_trade() {
    const OUTSIDE_MM: f64 = 0.5; // the bands are from memory of many guitars, none strung exactly like the plan
    origin("Setbacks of a steel-string acoustic guitar, 25.5 in", By::CommonPractice);
    let bands = [[2.0, 2.5], [3.0, 3.5], [2.0, 2.5], [3.0, 3.0], [3.5, 4.0], [4.5, 5.0]];
    let why = "the band is of many guitars; a quarter of a millimetre is 0.7 cent at the octave";
    for (number, (found, band)) in ideal_setbacks_mm(&plan("steel_six")).into_iter().zip(bands).enumerate() {
        in_or_near(found, band, OUTSIDE_MM, &format!("string {}, mm", number + 1), why);
    }
}

/// Setback in the middle of a straight saddle, mm: about 3.8 steel-string, 2.0 classical, 3.2 tenor ukulele; common practice.
#[test]
fn straight_saddles_stand_about_where_they_are_put() {
    const ABOUT_MM: f64 = 1.0; // the spread between makers
    origin("Setback in the middle of a straight saddle, \"about\"", By::CommonPractice);
    let why = "a rule of thumb for any strings and action; ours is one set, fitted over frets 1 to 12";
    for (name, usual_mm) in [("steel_six", 3.8), ("classical_nylon", 2.0), ("tenor_ukulele", 3.2)] {
        let mut plan = plan(name);
        plan.saddle.style = SaddleStyle::Straight;
        let built: Vec<_> =
            report(&plan).strings.iter().map(|string| string.built.saddle_setback_mm).collect();
        let middle_mm = built.iter().sum::<f64>() / built.len() as f64;
        in_or_near(middle_mm, [usual_mm; 2], ABOUT_MM, &format!("{}, mm", name.replace('_', " ")), why);
    }
}

/// An electric guitar's pieces stand 1 to 5 mm back; common practice. The plan is an eight-string whose first six strings
/// are those of a guitar.
#[test]
fn pieces_of_an_electric_guitar_lie_in_their_usual_travel() {
    origin("Setbacks of an electric guitar's pieces", By::CommonPractice);
    for (index, found) in ideal_setbacks_mm(&plan("fanned_eight"))[..6].iter().enumerate() {
        assert_between(*found, [1.0, 5.0], 0.0, &format!("string {} of the eight, mm", index + 1));
    }
}

/// The octave fret stands halfway between nut and nominal saddle line; common practice.
#[test]
fn the_crown_of_the_octave_stands_halfway() {
    const ROUNDING: f64 = 1e-12;
    origin("The octave fret stands halfway", By::CommonPractice);
    for name in ["steel_six", "classical_nylon", "tenor_ukulele"] {
        let string = &report(&plan(name)).strings[0];
        let share = string.frets[11].position_mm / string.scale_mm;
        super::assert_near(
            share,
            0.5,
            ROUNDING,
            &format!("{}, fret 12 over the scale", name.replace('_', " ")),
        );
    }
}

/// Steel strings need the saddle the farther from the nut the thicker the core; common practice.
#[test]
fn a_thicker_core_wants_more_setback() {
    let setback_mm = |diameter_mm: f64| {
        let mut plan = plan("steel_six");
        plan.strings[1].core.diameter_mm = diameter_mm;
        ideal_setbacks_mm(&plan)[1]
    };
    let by_core: Vec<_> = [0.33, 0.36, 0.41, 0.43, 0.46].into_iter().map(setback_mm).collect();
    assert!(by_core.is_sorted_by(|thinner, thicker| thinner < thicker), "{by_core:?}");
}

/// Heights over fret 12 in, bass and treble: steel .090 .070, nylon .156 .125, electric .078 .063, mandolin .075 .065; over fret 1
/// steel .023 .013; relief 0 to .012; blanks 3/32 or 1/8 in thick; outer strings 54 or 58.7 mm apart at a steel-string
/// saddle, 57 to 60 classical; crowns .043 to .055 in high. Common practice.
#[test]
fn the_examples_are_set_up_as_is_usual() {
    const HALF_A_THOUSANDTH_IN: f64 = 0.0005;
    origin("Usual heights, blanks and spreads", By::CommonPractice);
    for (name, bass_in, treble_in) in [
        ("steel_six", 0.090, 0.070),
        ("classical_nylon", 0.156, 0.125),
        ("fanned_eight", 0.078, 0.063),
        ("mandolin", 0.075, 0.065),
    ] {
        let plan = plan(name);
        let twelfth_in = |index: usize| plan.strings[index].action_mm.twelfth / INCH_MM;
        for (side, index, usual_in) in [("bass", plan.strings.len() - 1, bass_in), ("treble", 0, treble_in)] {
            let what = format!("{}, over fret 12, {side}, in", name.replace('_', " "));
            super::assert_near(twelfth_in(index), usual_in, HALF_A_THOUSANDTH_IN, &what);
        }
        let words = name.replace('_', " ");
        let relief_in = plan.instrument.relief_mm / INCH_MM;
        assert_between(relief_in, [0.0, 0.012], 0.0, &format!("{words}, relief, in"));
        let crown_in = plan.instrument.fret_height_mm / INCH_MM;
        let why = "our crowns are given in tenths of a millimetre, the band in thousandths of an inch";
        in_or_near(crown_in, [0.043, 0.055], 0.004, &format!("{words}, height of crowns, in"), why);
    }
    let steel = plan("steel_six");
    for (side, index, usual_in) in [("bass", 5, 0.023), ("treble", 0, 0.013)] {
        let found_in = steel.strings[index].action_mm.first.expect("no zero fret") / INCH_MM;
        super::assert_near(
            found_in,
            usual_in,
            HALF_A_THOUSANDTH_IN,
            &format!("steel six, over fret 1, {side}, in"),
        );
    }
    // The plans round blanks to a tenth of a millimetre and more coarsely where they were estimated.
    super::assert_near(steel.saddle.thickness_mm / INCH_MM, 0.125, 0.001, "steel six, blank, in");
    let spread_mm = |plan: &Plan| plan.instrument.spread_mm.map_or(0.0, |spread| spread.saddle);
    assert_between(spread_mm(&steel), [54.0, 58.7], 0.0, "steel six, outer strings at the saddle, mm");
    assert_between(
        spread_mm(&plan("classical_nylon")),
        [57.0, 60.0],
        0.0,
        "classical nylon, outer strings at the saddle, mm",
    );
}
