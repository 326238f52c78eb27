//! Setbacks of the example plans against published ones and against the practice of the trade: checks of order and
//! size, not of decimals, because nobody published all that the model needs to know.

use crestline_plan::{ContactReport, NutStyle, Plan, Report, SaddleStyle, check, example, read, solve};

use super::assert_near;

fn plan(name: &str) -> Plan {
    read(example(name).expect("the example is there").text).expect("an example is a plan")
}

fn report(plan: &Plan) -> Report {
    solve(&check(plan).expect("a legal plan")).expect("a plan that can be solved").report
}

fn ideal_setbacks_mm(plan: &Plan) -> Vec<f64> {
    report(plan).strings.iter().map(|string| string.ideal.saddle_setback_mm).collect()
}

/// G. Byers, "Classical guitar intonation", American Lutherie 47 (1996), second-hand, millimetres by context, strings 1 to 6.
/// His string data are not at hand, so the figures hold in order and size: within about a millimetre taken together, and
/// rising over the three plain strings. (Farthest off is the sixth string's saddle, 1.1 mm.)
#[test]
fn a_classical_guitar_with_nut_and_saddle_filed_string_by_string() {
    const OTHER_STRINGS_RMS_MM: f64 = 1.0;
    let nut_forward = [0.3, 0.7, 1.0, 0.5, 0.5, 0.5];
    let saddle_back = [1.3, 2.1, 3.1, 1.5, 1.7, 2.9];
    let mut plan = plan("classical_nylon");
    plan.nut.style = NutStyle::Shaped;
    plan.saddle.style = SaddleStyle::Separate;
    let report = report(&plan);
    let root_mean_square = |published: [f64; 6], found: fn(&ContactReport) -> f64| {
        let off =
            report.strings.iter().zip(published).map(|(string, published)| found(&string.ideal) - published);
        (off.map(|off| off * off).sum::<f64>() / 6.0).sqrt()
    };
    let nut_off = root_mean_square(nut_forward, |ideal| ideal.nut_setback_mm);
    let saddle_off = root_mean_square(saddle_back, |ideal| ideal.saddle_setback_mm);
    assert!(nut_off < OTHER_STRINGS_RMS_MM && saddle_off < OTHER_STRINGS_RMS_MM, "{nut_off} {saddle_off}");
    let [first, second, third] = [0, 1, 2].map(|index: usize| report.strings[index].ideal.saddle_setback_mm);
    assert!(first < second && second < third, "the plain strings rise: {first}, {second}, {third}");
}

/// Setbacks of a steel-string acoustic of 25.5 in, mm, strings 1 to 6 with a wound third: common practice.
#[test]
fn a_steel_string_guitar_lies_in_the_bands_of_the_trade() {
    const OUTSIDE_MM: f64 = 0.5; // the bands are from memory of many guitars, none strung exactly like the plan
    let bands = [[2.0, 2.5], [3.0, 3.5], [2.0, 2.5], [3.0, 3.0], [3.5, 4.0], [4.5, 5.0]];
    for (number, (found, [low, high])) in
        ideal_setbacks_mm(&plan("steel_six")).into_iter().zip(bands).enumerate()
    {
        let inside = low - OUTSIDE_MM..=high + OUTSIDE_MM;
        assert!(inside.contains(&found), "string {}: {found} mm, usual {low} to {high}", number + 1);
    }
}

/// Setback in the middle of a straight saddle, mm: about 3.8 steel-string, 2.0 classical, 3.2 tenor ukulele; common practice.
#[test]
fn straight_saddles_stand_about_where_they_are_put() {
    const ABOUT_MM: f64 = 1.0; // the spread between makers
    for (name, usual_mm) in [("steel_six", 3.8), ("classical_nylon", 2.0), ("tenor_ukulele", 3.2)] {
        let mut plan = plan(name);
        plan.saddle.style = SaddleStyle::Straight;
        let built: Vec<_> =
            report(&plan).strings.iter().map(|string| string.built.saddle_setback_mm).collect();
        let middle_mm = built.iter().sum::<f64>() / built.len() as f64;
        assert_near(middle_mm, usual_mm, ABOUT_MM, name);
    }
}

/// An electric guitar's pieces stand 1 to 5 mm back; common practice. The plan is an eight-string whose first six strings
/// are those of a guitar.
#[test]
fn pieces_of_an_electric_guitar_lie_in_their_usual_travel() {
    for found in &ideal_setbacks_mm(&plan("fanned_eight"))[..6] {
        assert!((1.0..=5.0).contains(found), "{found} mm");
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
