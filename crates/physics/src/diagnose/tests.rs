//! Shapes of errors that the trade and the textbooks know, and readings that mislead.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use super::{Cause, Diagnosed, Measurement, Priors, Sounded, StringCase, diagnose};
use crate::fretting::{Fixities, NutHeight, Pressing, StringSetup, Tail};
use crate::neck::fret_fraction;
use crate::{Contacts, FrettedString, StringProperties};

/// The frets that are read.
const FRETS: [usize; 9] = [0, 1, 2, 4, 6, 8, 9, 11, 13];

/// Axial stiffness (N), unit mass (kg/m) and pitch (Hz) of a light steel set: plain wire of 0.305 and 0.406 mm, then
/// wound strings on cores of 0.33 to 0.44 mm (206 GPa; masses for about 75 to 100 N, common practice).
const SET: [(f64, f64, f64); 6] = [
    (15_000.0, 5.7e-4, 329.6),
    (26_700.0, 1.02e-3, 246.9),
    (19_400.0, 2.0e-3, 196.0),
    (25_900.0, 3.6e-3, 146.8),
    (29_500.0, 6.4e-3, 110.0),
    (35_200.0, 1.04e-2, 82.4),
];

/// Six steel strings on a 650 mm scale.
fn setup(string: usize) -> StringSetup {
    StringSetup {
        properties: StringProperties {
            unit_mass_kg_per_m: SET[string].1,
            axial_stiffness_n: SET[string].0,
            bending_stiffness_n_mm2: 60.0,
        },
        frequency_hz: SET[string].2,
        scale_mm: 650.0,
        fret_mm: (1..=20).map(|fret| 650.0 * fret_fraction(f64::from(fret))).collect(),
        relief_mm: 0.15,
        nut_height: NutHeight::GapAtFirst(0.4),
        gap_at_twelfth_mm: 2.0,
        pressing: Pressing { finger_fraction: 0.33, depth_mm: 0.1 },
        fixities: Fixities { nut: 0.5, fret: 0.5, saddle: 0.5 },
        head: Tail { slip: 0.0, length_mm: 100.0 },
        tail: Tail { slip: 0.0, length_mm: 20.0 },
        target_octaves: (1..=20).map(|fret| f64::from(fret) / 12.0).collect(),
    }
}

/// The crest that makes fret 12 true: near enough to right.
fn right(setup: &StringSetup) -> Contacts {
    let ready = FrettedString::new(setup.clone()).unwrap();
    let octave = |mm| {
        let contacts = Contacts { saddle_setback_mm: mm, nut_setback_mm: 0.0 };
        ready.errors_cents(contacts, &[11]).unwrap()[0]
    };
    let setback_mm = (0..8).fold(0.0, |mm, _| mm - octave(mm) / ((octave(mm + 0.01) - octave(mm)) / 0.01));
    Contacts { saddle_setback_mm: setback_mm, nut_setback_mm: 0.0 }
}

/// Readings of a right instrument with `extra` cents more at every fret, the open string in tune.
fn read(strings: usize, extra: impl Fn(usize, usize) -> f64) -> Vec<StringCase> {
    (0..strings)
        .map(|string| {
            let setup = setup(string);
            let right = right(&setup);
            let ready = FrettedString::new(setup.clone()).unwrap();
            let errors = ready.errors_cents(right, &FRETS).unwrap();
            let mut readings = vec![
                Measurement { sounded: Sounded::Open, cents: 0.0 },
                Measurement { sounded: Sounded::Open, cents: 0.0 },
            ];
            for (&fret, error) in FRETS.iter().zip(errors) {
                let cents = error + extra(string, fret);
                readings.push(Measurement { sounded: Sounded::Fretted(fret), cents });
            }
            StringCase { setup, contacts: right, is_measured: false, right, readings }
        })
        .collect()
}

fn found(strings: &[StringCase]) -> Diagnosed {
    diagnose(strings, &Priors::default()).unwrap()
}

fn largest_cause(found: &Diagnosed, string: usize) -> Cause {
    let causes = &found.strings[string].causes;
    causes.iter().max_by(|a, b| a.cents.total_cmp(&b.cents)).unwrap().cause
}

#[test]
fn a_right_instrument_is_left_alone() {
    let found = found(&read(6, |_, _| 0.0));
    assert!(found.settled && found.frets.is_empty());
    for string in &found.strings {
        assert!(!string.is_suspect);
        let saddle = string.saddle.unwrap();
        assert!(saddle.saddle_mm.abs() < 2.0 * saddle.sd_mm, "{saddle:?}");
        assert!(string.residual_rms_cents < 0.1, "{}", string.residual_rms_cents);
    }
}

#[test]
fn an_error_that_grows_as_the_speaking_length_shortens_is_the_saddle() {
    // A crest x mm too near makes a note of length L/2^(n/12) sharp by 1731·x·(2^(n/12) − 1)/L cents
    // (1731 = 1200/ln 2): the classic shape of a saddle in the wrong place.
    let near_mm = 2.5;
    let grows = |fret: usize| 1731.23 * near_mm / 650.0 * (((fret + 1) as f64 / 12.0).exp2() - 1.0);
    let found = found(&read(6, |_, fret| grows(fret)));
    for (index, string) in found.strings.iter().enumerate() {
        assert_eq!(largest_cause(&found, index), Cause::Saddle);
        let saddle = string.saddle.unwrap();
        assert!((saddle.saddle_mm - near_mm).abs() < 2.0 * saddle.sd_mm, "{saddle:?}");
        assert!(saddle.rms_after_cents < 1.0);
    }
}

#[test]
fn a_constant_error_is_the_nut_edge() {
    // A nut edge x mm too near the bridge makes every fretted note flat by 1731·x/L, one too far makes it sharp. On
    // all strings at once a firm hand would make them sharp too, so sharp is looked at on one string.
    let off_mm = 1.0;
    let constant = 1731.23 * off_mm / 650.0;
    let flat = found(&read(6, |_, _| -constant));
    let sharp = found(&read(6, |string, _| if string == 3 { constant } else { 0.0 }));
    for (found, string, wanted_mm) in [(&flat, 0, -off_mm), (&flat, 4, -off_mm), (&sharp, 3, off_mm)] {
        assert_eq!(largest_cause(found, string), Cause::Nut, "{:?}", found.strings[string].causes);
        let both = found.strings[string].saddle_and_nut.unwrap();
        // What the readings were before is right at fret 12 only, with a nut edge of its own that is best.
        let right = found_right_nut_mm(string);
        assert!((both.nut_mm - right - wanted_mm).abs() < 2.0 * both.nut_sd_mm, "{both:?} {right}");
    }
}

/// The nut move that is best for the right instrument, by the least squares over the frets read.
fn found_right_nut_mm(string: usize) -> f64 {
    found(&read(6, |_, _| 0.0)).strings[string].saddle_and_nut.unwrap().nut_mm
}

#[test]
fn an_error_that_falls_away_after_the_first_frets_is_the_nut_slot() {
    // Told from a nut edge by the first frets alone, so it takes a tuner that reads to a third of a cent.
    let priors = Priors { reading_cents: 0.3, ..Priors::default() };
    let strings =
        read(6, |string, fret| if string == 1 { sharp_by_height_cents(string, fret, 0.7) } else { 0.0 });
    let found = diagnose(&strings, &priors).unwrap();
    assert_eq!(largest_cause(&found, 1), Cause::NutSlot, "{:?}", found.strings[1].causes);
    assert!(found.strings[1].is_slot_high);
    assert!(found.strings.iter().filter(|string| string.is_slot_high).count() == 1);
}

/// A string lifted by x over fret 1 is longer by ((h + x)² − h²)/(2S) when pressed at the distance S, and sharp by
/// 866·EA/T of that over L (866 = 600/ln 2): the classic estimate by two right triangles.
fn sharp_by_height_cents(string: usize, fret: usize, lift_mm: f64) -> f64 {
    let height_mm = 0.4;
    let (axial_n, mass, frequency_hz) = SET[string];
    let tension_n = mass * (2.0 * 0.65 * frequency_hz).powi(2);
    let reach_mm = 650.0 * fret_fraction((fret + 1) as f64);
    let longer_mm =
        ((height_mm + lift_mm) * (height_mm + lift_mm) - height_mm * height_mm) / (2.0 * reach_mm);
    865.6 * axial_n / tension_n * longer_mm / 650.0
}

#[test]
fn a_nut_too_high_as_a_whole_is_no_fret_out_of_place() {
    // All strings sharp at fret 1, which a fret too near the bridge would be too; but the next frets are sharp as well.
    let found = found(&read(6, |string, fret| sharp_by_height_cents(string, fret, 0.7)));
    assert!(found.frets.is_empty(), "{:?}", found.frets);
    let high = found.strings.iter().filter(|string| string.is_slot_high).count();
    assert!(2 * high > found.strings.len(), "{high}");
}

#[test]
fn an_error_at_one_fret_of_all_strings_is_that_fret() {
    // A fret x mm too near the nut makes its note flat by 1731·x/L_n.
    let shift_mm = -0.7;
    let speaking_mm = 650.0 * (-7.0_f64 / 12.0).exp2();
    let flat = 1731.23 * shift_mm / speaking_mm;
    let found = found(&read(6, |_, fret| if fret == 6 { flat } else { 0.0 }));
    assert_eq!(found.frets.len(), 1, "{:?}", found.frets);
    let fret = found.frets[0];
    assert_eq!(fret.index, 6);
    assert!((fret.shift_mm - shift_mm).abs() < 2.0 * fret.sd_mm, "{fret:?}");
}

#[test]
fn one_wrong_reading_does_not_pull_the_answer() {
    let wrong =
        |size: f64| found(&read(6, move |string, fret| if (string, fret) == (1, 11) { size } else { 0.0 }));
    let (without, with) = (wrong(0.0), wrong(25.0));
    let (a, b) = (without.strings[1].saddle.unwrap(), with.strings[1].saddle.unwrap());
    assert!((a.saddle_mm - b.saddle_mm).abs() < a.sd_mm, "{a:?} {b:?}");
    assert!(!with.strings[1].is_suspect && with.frets.is_empty());
}

#[test]
fn a_dead_string_is_found_and_its_neighbours_are_not() {
    let jumps = [9.0, -7.0, 12.0, -10.0, 6.0, -12.0, 11.0, -8.0, 7.0];
    let place = |fret| FRETS.iter().position(|&read| read == fret).unwrap();
    let found = found(&read(6, |string, fret| if string == 3 { jumps[place(fret)] } else { 0.0 }));
    let suspects: Vec<bool> = found.strings.iter().map(|string| string.is_suspect).collect();
    assert_eq!(suspects, [false, false, false, true, false, false]);
    assert!(found.frets.is_empty(), "{:?}", found.frets);
}

#[test]
fn unknowns_that_trade_still_give_a_sure_move() {
    let found = found(&read(6, |_, _| 0.0));
    for string in &found.strings {
        let (saddle, crest) = (string.saddle.unwrap(), string.crest_mm);
        assert!(saddle.sd_mm < crest.sd, "{saddle:?} {crest:?}");
        assert!(string.trades.nut_tuning > 0.5, "{:?}", string.trades);
    }
}

#[test]
fn few_or_odd_readings_still_give_finite_answers() {
    let mut one = read(1, |_, _| 0.0);
    one[0].readings.truncate(1);
    assert!(found(&one).strings[0].saddle.is_none());
    let mut single = read(2, |_, _| 0.0);
    single[0].readings.drain(..2);
    single[0].readings.truncate(1);
    single[1].readings.clear();
    let contradicting = Measurement { cents: 60.0, ..single[0].readings[0] };
    single[0].readings.push(contradicting);
    single[0].readings.push(Measurement { sounded: Sounded::OctaveHarmonic, cents: -900.0 });
    let odd = found(&single);
    let both = odd.strings[0].saddle_and_nut.unwrap();
    assert!(both.saddle_mm.is_finite() && both.nut_sd_mm.is_finite());
    single[0].readings[0].cents = f64::NAN;
    assert!(diagnose(&single, &Priors::default()).is_err());
    assert!(diagnose(&[], &Priors::default()).is_err());
}
