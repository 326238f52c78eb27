//! A tempered target is met: the fretted note stands off equal temperament by what the plan asks for.
#![allow(clippy::unwrap_used, missing_docs)]

mod common;

use common::fixed;
use crestline_plan::{
    AsBuilt, FitRule, NutStyle, Pitch, Plan, SaddleStyle, Targets, check, example, note_frequency_hz, read,
    solve,
};
use proptest::prelude::*;

/// Notes of the steel-string six with their pitch class counted from C, string 1 first.
const OPEN: [(&str, usize); 6] = [("E4", 4), ("B3", 11), ("G3", 7), ("D3", 2), ("A2", 9), ("E2", 4)];
/// What a crest 1e-8 mm from its optimum may leave, cents.
const MET_CENTS: f64 = 1e-5;

/// The steel-string six with separate pieces, fitted at one fret.
fn plan(fret: u32) -> Plan {
    let mut plan = read(example("steel_six").unwrap().text).unwrap();
    (plan.saddle.style, plan.nut.style) = (SaddleStyle::Separate, NutStyle::Plain);
    (plan.fit.rule, plan.fit.frets) = (FitRule::LeastSquares, [fret, fret]);
    plan.saddle.travel_mm = [-10.0, 30.0];
    for (string, (note, _)) in plan.strings.iter_mut().zip(OPEN) {
        string.pitch = Pitch::Note(note.to_owned());
    }
    plan
}

fn targets() -> impl Strategy<Value = Targets> {
    let cents = || -6.0..6.0_f64;
    (proptest::collection::vec(cents(), 6), [(); 12].map(|()| cents()))
        .prop_map(|(open_cents, pitch_class_cents)| Targets { open_cents, pitch_class_cents })
}

#[test]
fn offsets_of_zero_change_nothing() {
    let mut tempered = plan(12);
    tempered.fit.frets = [1, 12];
    let equal = solve(&check(&tempered).unwrap()).unwrap();
    tempered.targets = Some(Targets { open_cents: vec![0.0; 6], pitch_class_cents: [0.0; 12] });
    assert_eq!(solve(&check(&tempered).unwrap()).unwrap(), equal);
}

proptest! {
    #![proptest_config(fixed(32))]

    #[test]
    fn one_fretted_note_meets_its_target(fret in 9..=16_u32, targets in targets()) {
        let mut tempered = plan(fret);
        tempered.targets = Some(targets.clone());
        let solution = solve(&check(&tempered).unwrap()).unwrap();
        // The same instrument with the crests found, measured against equal temperament: open strings at the pitch
        // wanted, and no targets.
        let mut measured = plan(fret);
        for ((string, (note, _)), open_cents) in measured.strings.iter_mut().zip(OPEN).zip(&targets.open_cents) {
            let equal_hz = note_frequency_hz(note, 440.0).unwrap();
            string.pitch = Pitch::FrequencyHz(equal_hz * (open_cents / 1200.0).exp2());
        }
        let setbacks = solution.report.strings.iter().map(|string| string.built.saddle_setback_mm);
        measured.as_built =
            Some(AsBuilt { saddle_setback_mm: setbacks.collect(), nut_setback_mm: vec![0.0; 6] });
        let found = solve(&check(&measured).unwrap()).unwrap();
        for (index, string) in found.report.strings.iter().enumerate() {
            let setback_mm = solution.report.strings[index].built.saddle_setback_mm;
            prop_assert!((-9.99..29.99).contains(&setback_mm), "at its limit: {setback_mm}");
            let note = &string.frets[fret as usize - 1];
            // 0 cents against the fretted note in equal temperament is −o against the open string's.
            let class = (OPEN[index].1 + fret as usize) % 12;
            let wanted_cents = targets.pitch_class_cents[class] - targets.open_cents[index];
            let found_cents = note.as_built_cents.unwrap();
            prop_assert!((found_cents - wanted_cents).abs() < MET_CENTS, "{found_cents} and {wanted_cents}");
            let octaves = (string.frequency_hz / note_frequency_hz(OPEN[index].0, 440.0).unwrap()).log2();
            prop_assert!((1200.0 * octaves - targets.open_cents[index]).abs() < 1e-9);
        }
    }
}
