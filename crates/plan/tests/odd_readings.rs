//! Readings that say little, too much, or what cannot be: an answer with its notice, or a refusal with its path.
#![allow(clippy::unwrap_used, clippy::panic, missing_docs)]

use crestline_plan::{
    AsBuilt, Diagnosis, Fault, Plan, Priors, Reading, ReadingKind, check, diagnose, example, fit_supports,
    fitted_plan, read, solve,
};

const FRETS: [u32; 8] = [1, 2, 3, 5, 7, 9, 12, 14];
/// How far the crests of the instrument read stand too near the nut, mm.
const NEAR_MM: f64 = 2.0;

fn reading(string: u32, fret: u32, cents: f64) -> Reading {
    Reading { string, fret, kind: ReadingKind::Fretted, cents }
}

fn plan(readings: Vec<Reading>) -> Plan {
    let mut plan = read(example("steel_six").unwrap().text).unwrap();
    (plan.readings, plan.as_built) = (readings, None);
    plan
}

/// The plan with crests where an instrument has them whose saddle stands too near the nut.
fn with_near_crests() -> Plan {
    let mut plan = plan(vec![]);
    let ideal = solve(&check(&plan).unwrap()).unwrap().report;
    plan.as_built = Some(AsBuilt {
        saddle_setback_mm: ideal
            .strings
            .iter()
            .map(|string| string.ideal.saddle_setback_mm - NEAR_MM)
            .collect(),
        nut_setback_mm: vec![0.0; 6],
    });
    plan
}

/// What that instrument reads on one string.
fn readings_of(string: u32) -> Vec<Reading> {
    let sounds = solve(&check(&with_near_crests()).unwrap()).unwrap().report;
    let frets = &sounds.strings[string as usize - 1].frets;
    let cents = |fret: u32| frets[fret as usize - 1].as_built_cents.unwrap();
    FRETS.iter().map(|&fret| reading(string, fret, cents(fret))).collect()
}

/// Diagnoses it, and asserts that the answer is made of finite numbers and that the instrument found is a legal plan.
fn answered(plan: &Plan) -> Diagnosis {
    let checked = check(plan).unwrap();
    let diagnosis = diagnose(&checked, &Priors::default()).unwrap();
    let text = serde_json::to_string(&diagnosis).unwrap();
    // JSON writes a number that is not finite as null; only these may be absent.
    assert_eq!(text.matches("null").count(), text.matches("\"saddle_moves_mm\":null").count(), "{text}");
    assert!(!diagnosis.remedies.is_empty());
    assert!(check(&fitted_plan(&checked, &diagnosis)).is_ok());
    diagnosis
}

fn refused(plan: &Plan) -> Fault {
    let faults = check(plan).and_then(|checked| diagnose(&checked, &Priors::default())).unwrap_err();
    let [fault] = &faults[..] else { panic!("{faults:?}") };
    fault.clone()
}

fn says(diagnosis: &Diagnosis, words: &str) -> bool {
    diagnosis.notices.iter().any(|notice| notice.text.contains(words))
}

#[test]
fn nothing_to_go_by_is_refused() {
    assert_eq!(refused(&plan(vec![])).path, "readings");
    let kinds = [(ReadingKind::Open, 0), (ReadingKind::OctaveHarmonic, 12)];
    let unfretted = kinds.map(|(kind, fret)| Reading { string: 1, fret, kind, cents: 2.0 });
    let fault = refused(&plan(unfretted.to_vec()));
    assert_eq!(fault.path, "readings");
    assert!(fault.found.contains("2 readings, none of them of a fretted note"), "{fault}");
}

#[test]
fn one_reading_is_answered_with_what_it_can_say() {
    let diagnosis = answered(&plan(vec![reading(3, 12, 10.0)]));
    assert_eq!(diagnosis.strings.len(), 1);
    assert!(says(&diagnosis, "string 3 has 1 fretted reading"), "{:?}", diagnosis.notices);
    // Ten cents at the octave are some 4 mm of crest (1200/ln 2/650 = 2.66 cents a millimetre), or partly the nut edge.
    let cure = &diagnosis.strings[0].saddle_only;
    assert!(cure.saddle_move_mm > 1.0 && cure.saddle_move_mm < 5.0 && cure.sd_mm > 0.1, "{cure:?}");
}

#[test]
fn all_on_one_string_finds_that_strings_move_and_leaves_the_others_out() {
    let diagnosis = answered(&plan(readings_of(2)));
    let [string] = &diagnosis.strings[..] else { panic!("{:?}", diagnosis.strings) };
    let cure = &string.saddle_only;
    assert_eq!(string.string, 2);
    assert!((cure.saddle_move_mm - NEAR_MM).abs() < 2.0 * cure.sd_mm, "{cure:?}");
    // From one string no fret can be told from a slip of reading, and no string from its neighbours.
    assert!(diagnosis.frets.is_empty() && !string.suspect_string);
    assert!(says(&diagnosis, "string 1 has no fretted reading"), "{:?}", diagnosis.notices);
}

#[test]
fn contradicting_readings_are_named_and_make_the_answer_no_surer() {
    let readings = readings_of(2);
    let sure = answered(&plan(readings.clone())).strings[0].saddle_only.sd_mm;
    let against = readings.iter().map(|one| Reading { cents: one.cents - 40.0, ..*one });
    let torn = answered(&plan(readings.iter().copied().chain(against).collect()));
    assert!(says(&torn, "was read before"), "{:?}", torn.notices);
    let string = &torn.strings[0];
    // Two readings of a note 40 cents apart leave 20 cents at least, root mean square, whatever explains them.
    assert!(string.residual_cents >= 20.0 - 1e-6, "{}", string.residual_cents);
    assert!(string.saddle_only.sd_mm > 0.5 * sure, "{} {sure}", string.saddle_only.sd_mm);
}

#[test]
fn the_wildest_readings_that_a_plan_may_hold_are_answered() {
    for sign in [1.0, -1.0] {
        let wild = (1..=6).flat_map(|string| {
            FRETS.map(|fret| {
                reading(string, fret, if (string + fret) % 2 == 0 { 1200.0 } else { -1200.0 } * sign)
            })
        });
        let diagnosis = answered(&plan(wild.collect()));
        assert!(says(&diagnosis, "is it right?"), "{:?}", diagnosis.notices.first());
    }
}

#[test]
fn a_kind_that_does_not_fit_its_fret_is_refused_by_the_readings_path() {
    for (kind, fret) in [(ReadingKind::Open, 3), (ReadingKind::Fretted, 0), (ReadingKind::OctaveHarmonic, 7)]
    {
        let odd = Reading { string: 2, fret, kind, cents: 1.0 };
        let fault = refused(&plan(vec![reading(1, 5, 2.0), odd]));
        assert_eq!((fault.path.as_str(), fault.found), ("readings[1].fret", fret.to_string()));
    }
    assert_eq!(refused(&plan(vec![reading(7, 5, 2.0)])).path, "readings[0].string");
    assert_eq!(refused(&plan(vec![reading(1, 40, 2.0)])).path, "readings[0].fret");
    assert_eq!(refused(&plan(vec![reading(1, 5, f64::NAN)])).path, "readings[0].cents");
}

#[test]
fn fixities_want_measured_crests_and_more_than_one_reading() {
    let faults = fit_supports(&check(&plan(vec![])).unwrap(), &Priors::default()).unwrap_err();
    let paths: Vec<&str> = faults.iter().map(|fault| fault.path.as_str()).collect();
    assert_eq!(paths, ["readings", "as_built"]);
    let mut measured = with_near_crests();
    measured.readings = vec![reading(1, 12, 3.0)];
    let fit = fit_supports(&check(&measured).unwrap(), &Priors::default()).unwrap();
    assert!(fit.supports.iter().chain(&fit.combinations).all(|fixity| !fixity.decided), "{fit:?}");
    assert!(fit.notices.iter().any(|notice| notice.text.contains("decide none of the fixities")), "{fit:?}");
    let kept = measured.with_supports(&fit);
    assert!(check(&kept).is_ok());
    assert_ne!(kept.supports, measured.supports);
}
