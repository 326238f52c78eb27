//! Synthetic instruments with a hidden truth, made by an independent program in Python (see
//! `tests/reference/README.md`), against what their readings are diagnosed to be.
//!
//! The rates are printed as a table by `cargo test -p crestline-tests diagnosis:: -- --show-output`.

mod instruments;
mod rates;

use crestline_plan::RemedyKind;

use instruments::{Fault, Tried, all};
use rates::Rate;

/// The fewest instruments that must be there.
const FEWEST: usize = 200;
/// Share of strings whose true move lies within two stated standard deviations: 95 % if all were normal and the
/// priors those of the instruments; less than 90 % would be too sure, more than 99 % of no use.
const WITHIN_TWO_SD: [f64; 2] = [0.90, 0.99];
/// Share of dead strings to be found; they are false by 5 to 12 cents at every fret.
const DEAD_FOUND: f64 = 0.95;
/// Share of frets out of place to be found. The least of them, 1.5 cents, is three standard deviations of the mean of
/// four readings of 1 cent each, so that by chance some cannot be told from the noise; of the plain ones few may be
/// missed.
const FRETS_FOUND: f64 = 0.80;
const PLAIN_FRETS_FOUND: f64 = 0.95;
const PLAIN_FRET_CENTS: f64 = 2.5;
/// The same of high slots. A slot is heard at the first frets alone, beside a nut edge and a tuning that are not known
/// and take up half of it: 3 cents at fret 1 leave little more than the noise.
const SLOTS_FOUND: f64 = 0.70;
const PLAIN_SLOTS_FOUND: f64 = 0.90;
const PLAIN_SLOT_CENTS: f64 = 6.0;
/// Share of sound instruments for which a job is named, and of instruments of all kinds for which a string or a fret
/// that is well is named.
const FALSE_ALARMS: f64 = 0.05;

#[test]
fn faults_are_found_and_sound_instruments_left_alone() {
    let tried = all();
    assert!(tried.len() >= FEWEST, "only {} instruments are there", tried.len());
    let mut rates = vec![
        moves("saddle alone", &tried, |string| vec![string.saddle_only_in_sd()]),
        moves("saddle with nut", &tried, |string| vec![string.with_nut_in_sd()[0]]),
        moves("nut with saddle", &tried, |string| vec![string.with_nut_in_sd()[1]]),
    ];
    rates.extend(found(&tried));
    rates.extend(alarms(&tried));
    println!("{} instruments\n{}", tried.len(), rates::table(&rates));
    println!("{}", rates::by_kind(&tried));
    let complaints: Vec<String> = rates.iter().filter_map(Rate::complaint).collect();
    assert!(complaints.is_empty(), "{}", complaints.join("\n"));
}

/// How many moves lie within two of their standard deviations of the true one; dead strings are to be replaced first.
fn moves(what: &'static str, tried: &[Tried], in_sd: impl Fn(&instruments::StringTried) -> Vec<f64>) -> Rate {
    let mut rate = Rate::between(what, WITHIN_TWO_SD);
    for string in tried.iter().flat_map(|one| one.strings.iter()).filter(|string| !string.is_dead) {
        for off in in_sd(string) {
            rate.count(off.abs() <= 2.0);
        }
    }
    rate
}

fn found(tried: &[Tried]) -> [Rate; 5] {
    let mut dead = Rate::at_least("dead string found", DEAD_FOUND);
    let mut frets = Rate::at_least("right fret found", FRETS_FOUND);
    let mut plain_frets = Rate::at_least("right fret found, 2.5 cents or more", PLAIN_FRETS_FOUND);
    let mut slots = Rate::at_least("high slot found", SLOTS_FOUND);
    let mut plain_slots = Rate::at_least("high slot found, 6 cents or more", PLAIN_SLOTS_FOUND);
    for one in tried {
        for string in one.strings.iter().filter(|string| string.is_dead) {
            dead.count(string.found.suspect_string);
        }
        if let Some(Fault { number, cents }) = one.bad_fret {
            let is_found = one.diagnosis.frets.iter().any(|found| found.fret == number);
            frets.count(is_found);
            if cents.abs() >= PLAIN_FRET_CENTS {
                plain_frets.count(is_found);
            }
        }
        for slot in &one.high_slots {
            let is_found = one.slots_named().contains(&slot.number);
            slots.count(is_found);
            if slot.cents >= PLAIN_SLOT_CENTS {
                plain_slots.count(is_found);
            }
        }
    }
    [dead, frets, plain_frets, slots, plain_slots]
}

fn alarms(tried: &[Tried]) -> [Rate; 4] {
    let mut sound = Rate::at_most("sound instrument: a job named", FALSE_ALARMS);
    let mut strings = Rate::at_most("good string called dead (strings)", FALSE_ALARMS);
    let mut frets = Rate::at_most("good fret named (instruments)", FALSE_ALARMS);
    let mut slots = Rate::at_most("good slot named (strings)", FALSE_ALARMS);
    for one in tried {
        let is_left_alone = one.diagnosis.remedies.iter().all(|remedy| remedy.kind == RemedyKind::Nothing);
        if one.kind == "sound" {
            sound.count(!is_left_alone);
        }
        for string in one.strings.iter().filter(|string| !string.is_dead) {
            strings.count(string.found.suspect_string);
            let is_high = one.high_slots.iter().any(|slot| slot.number == string.found.string);
            if one.kind != "mixture" && !is_high {
                slots.count(one.slots_named().contains(&string.found.string));
            }
        }
        // The frets of a mixture are all rough: none of them is good.
        if one.kind != "mixture" {
            let bad = one.bad_fret.map(|fret| fret.number);
            frets.count(one.diagnosis.frets.iter().any(|found| Some(found.fret) != bad));
        }
    }
    [sound, strings, frets, slots]
}
