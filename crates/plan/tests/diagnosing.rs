//! Diagnoses of the example instruments from readings made with the solver, and of bad input.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use crestline_plan::{
    AsBuilt, Diagnosis, Plan, Priors, Reading, ReadingKind, RemedyKind, check, diagnose, example,
    fitted_plan, read, readings_from_csv, solve, suggested_frets,
};

const FRETS: [u32; 9] = [1, 2, 3, 5, 7, 9, 10, 12, 14];

fn plan(name: &str) -> Plan {
    read(example(name).unwrap().text).unwrap()
}

/// The plan with the readings that its instrument would give with the crests `off_mm` beyond the ideal ones.
fn read_with(name: &str, off_mm: f64) -> Plan {
    let mut plan = plan(name);
    plan.readings.clear();
    plan.as_built = None;
    let ideal = solve(&check(&plan).unwrap()).unwrap();
    let mut as_found = plan.clone();
    as_found.as_built = Some(AsBuilt {
        saddle_setback_mm: ideal.report.strings.iter().map(|s| s.ideal.saddle_setback_mm + off_mm).collect(),
        nut_setback_mm: ideal.report.strings.iter().map(|s| s.ideal.nut_setback_mm).collect(),
    });
    let sounds = solve(&check(&as_found).unwrap()).unwrap();
    for string in &sounds.report.strings {
        plan.readings.push(Reading { string: string.string, fret: 0, kind: ReadingKind::Open, cents: 0.0 });
        for fret in FRETS {
            let cents = string.frets[fret as usize - 1].as_built_cents.unwrap();
            plan.readings.push(Reading { string: string.string, fret, kind: ReadingKind::Fretted, cents });
        }
    }
    plan
}

fn diagnosed(plan: &Plan) -> Diagnosis {
    diagnose(&check(plan).unwrap(), &Priors::default()).unwrap()
}

#[test]
fn every_example_with_its_saddle_out_gets_it_back() {
    for name in ["steel_six", "classical_nylon", "bass_four", "mandolin", "tenor_ukulele", "fanned_eight"] {
        let diagnosis = diagnosed(&read_with(name, -2.0));
        assert!(diagnosis.frets.is_empty(), "{name}: {:?}", diagnosis.frets);
        let (plan, readings) = (plan(name), FRETS.len() as u32 + 1);
        assert_eq!(diagnosis.strings.len(), plan.strings.len());
        for string in &diagnosis.strings {
            let cure = &string.saddle_only;
            assert_eq!(string.readings, readings);
            // The ideal of the plan is over frets 1 to 12, the move over the frets read: they differ by less.
            assert!((cure.saddle_move_mm - 2.0).abs() < 2.0 * cure.sd_mm + 0.1, "{name}: {string:?}");
            assert!(!string.suspect_string, "{name}");
        }
        let remedy = &diagnosis.remedies[0];
        let moves = [
            RemedyKind::MoveSaddle,
            RemedyKind::ReshapeSaddle,
            RemedyKind::MoveNutEdge,
            RemedyKind::ShortenNutEnd,
        ];
        assert!(moves.contains(&remedy.kind), "{name}: {:?}", diagnosis.remedies);
        assert!(remedy.saddle_moves_mm.as_ref().is_some_and(|moves| moves.len() == plan.strings.len()));
    }
}

#[test]
fn a_sound_instrument_needs_nothing() {
    let diagnosis = diagnosed(&read_with("fanned_eight", 0.0));
    assert_eq!(diagnosis.remedies.len(), 1, "{:?}", diagnosis.remedies);
    assert_eq!(diagnosis.remedies[0].kind, RemedyKind::Nothing);
}

#[test]
fn the_report_has_its_keys_in_their_order() {
    let value = serde_json::to_value(diagnosed(&read_with("steel_six", -2.0))).unwrap();
    let keys =
        |value: &serde_json::Value| value.as_object().unwrap().keys().cloned().collect::<Vec<_>>().join(" ");
    assert_eq!(keys(&value), "format version strings frets remedies notices");
    let string = &value["strings"][0];
    assert_eq!(
        keys(string),
        "string readings rms_before_cents saddle_only saddle_and_nut causes residual_cents suspect_string"
    );
    assert_eq!(keys(&string["saddle_only"]), "saddle_move_mm sd_mm rms_after_cents");
    assert_eq!(
        keys(&string["saddle_and_nut"]),
        "saddle_move_mm saddle_sd_mm nut_move_mm nut_sd_mm rms_after_cents"
    );
    let causes: Vec<_> =
        string["causes"].as_array().unwrap().iter().map(|share| share["cause"].clone()).collect();
    assert_eq!(causes, ["saddle", "nut", "nut_slot", "action", "pressing", "stiffness", "frets", "relief"]);
    assert_eq!(keys(&value["remedies"][0]), "text kind rms_after_cents saddle_moves_mm");
}

#[test]
fn the_instrument_found_is_a_legal_plan_that_sounds_as_read() {
    let measured = read_with("steel_six", -2.0);
    let checked = check(&measured).unwrap();
    let found = fitted_plan(&checked, &diagnosed(&measured));
    let solution = solve(&check(&found).unwrap()).unwrap();
    for reading in measured.readings.iter().filter(|reading| reading.kind == ReadingKind::Fretted) {
        let note = &solution.report.strings[reading.string as usize - 1].frets[reading.fret as usize - 1];
        // A fit to exact readings of 1 cent noise leaves a small part of that.
        assert!((note.as_built_cents.unwrap() - reading.cents).abs() < 0.5, "{reading:?} {note:?}");
    }
}

#[test]
fn bad_input_gets_an_answer_or_a_refusal_with_its_path() {
    let mut plan = plan("steel_six");
    let refused = |plan: &Plan| diagnose(&check(plan).unwrap(), &Priors::default()).unwrap_err()[0].clone();
    plan.readings.clear();
    assert_eq!((refused(&plan).path.as_str(), refused(&plan).found.as_str()), ("readings", "no readings"));
    plan.readings.push(Reading { string: 1, fret: 0, kind: ReadingKind::Open, cents: 1.0 });
    assert!(refused(&plan).found.contains("none of them of a fretted note"));
    // One reading, then contradicting ones, all on one string.
    plan.readings.push(Reading { string: 2, fret: 12, kind: ReadingKind::Fretted, cents: 12.0 });
    let one = diagnosed(&plan);
    assert_eq!(one.strings.len(), 1);
    assert!(one.strings[0].saddle_only.saddle_move_mm > 0.0);
    plan.readings.push(Reading { string: 2, fret: 12, kind: ReadingKind::Fretted, cents: -40.0 });
    let contradicting = diagnosed(&plan);
    let said = |wanted: &str| contradicting.notices.iter().any(|notice| notice.text.contains(wanted));
    assert!(said("was read before") && said("one string alone"), "{:?}", contradicting.notices);
    assert!(contradicting.strings[0].saddle_only.sd_mm.is_finite());
    plan.readings[1].kind = ReadingKind::Open;
    assert_eq!(check(&plan).unwrap_err()[0].path, "readings[1].fret");
    plan.readings[1].kind = ReadingKind::Fretted;
    let wild = Priors { crest_mm: f64::NAN, ..Priors::default() };
    assert!(diagnose(&check(&plan).unwrap(), &wild).is_err());
}

#[test]
fn few_frets_are_suggested() {
    for name in ["steel_six", "bass_four", "fanned_eight"] {
        let frets = suggested_frets(&check(&plan(name)).unwrap()).unwrap();
        assert!((5..=8).contains(&frets.len()), "{name}: {frets:?}");
        assert!(frets.contains(&12) && frets.is_sorted(), "{name}: {frets:?}");
    }
}

#[test]
fn a_table_of_readings_is_diagnosed() {
    let mut plan = plan("bass_four");
    plan.readings =
        readings_from_csv("string,fret,kind,cents\n1,0,open,0\n1,5,fretted,4\n1,12,,9\n").unwrap();
    assert_eq!(diagnosed(&plan).strings[0].readings, 3);
}
