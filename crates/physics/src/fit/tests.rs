//! Several cases for one crest: what is found cannot be bettered nearby, judged by sums over the cases taken here.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use super::*;
use crate::fretting::{Fixities, NutHeight, Pressing, StringSetup, Tail};
use crate::neck::fret_fraction;
use crate::{FrettedString, StringProperties};

/// Steps to all sides at which nothing better may be found, mm.
const STEPS_MM: [f64; 3] = [1e-3, 0.02, 0.3];
/// What a worth may gain by a step, as a share of it: the search ends within some 1e-6 mm of the best place, and the
/// worth is flat there for squares, or changes by some 4 cents a millimetre for the largest error.
const GAIN: f64 = 1e-6;
/// Agreement of two searches for the same place, mm: ten times the tolerance of a search.
const SAME_MM: f64 = 1e-7;

const STRINGS: usize = 3;
const WEIGHTS: [f64; 3] = [1.0, 0.5, 2.0];

/// A case of a string on a 650 mm scale: light steel, a set with stiffer cores, or the first one tuned a tone lower.
fn setup(string: usize, case: usize) -> StringSetup {
    let axial = [15_000.0, 26_700.0, 19_400.0][string];
    let bending = [80.0, 270.0, 140.0][string];
    let unit_mass = [5.7e-4, 1.02e-3, 2.0e-3][string];
    let pitch = [329.6, 246.9, 196.0][string];
    let stiffer = if case == 1 { 1.4 } else { 1.0 };
    let tone = if case == 2 { 2.0_f64.powf(-2.0 / 12.0) } else { 1.0 };
    StringSetup {
        properties: StringProperties {
            unit_mass_kg_per_m: unit_mass,
            axial_stiffness_n: axial * stiffer,
            bending_stiffness_n_mm2: bending * stiffer * stiffer,
        },
        frequency_hz: pitch * tone,
        scale_mm: 650.0,
        fret_mm: (1..=14).map(|fret| 650.0 * fret_fraction(f64::from(fret))).collect(),
        relief_mm: 0.1,
        nut_height: NutHeight::GapAtFirst(0.4),
        gap_at_twelfth_mm: 2.0,
        pressing: Pressing { finger_fraction: 0.33, depth_mm: 0.1 },
        fixities: Fixities { nut: 0.5, fret: 0.5, saddle: 0.5 },
        head: Tail::default(),
        tail: Tail::default(),
        target_octaves: (1..=14).map(|fret| f64::from(fret) / 12.0).collect(),
    }
}

/// All strings in all cases, string by string.
fn ready() -> Vec<Vec<FrettedString>> {
    let case = |string, case| FrettedString::new(setup(string, case)).unwrap();
    (0..STRINGS).map(|string| (0..WEIGHTS.len()).map(|index| case(string, index)).collect()).collect()
}

fn line(string: usize) -> PlanLine {
    let y_mm = 10.0 - 10.0 * string as f64;
    PlanLine { nut: PlanPoint::new(0.0, y_mm), saddle: PlanPoint::new(650.0, y_mm) }
}

fn fitted<'a>(ready: &'a [Vec<FrettedString>], cases: &[usize]) -> Vec<FitString<'a>> {
    let case = |strings: &'a [FrettedString], case: usize| FitCase {
        string: &strings[case],
        frets: (0..12).collect(),
        weight: WEIGHTS[case],
    };
    ready
        .iter()
        .enumerate()
        .map(|(index, strings)| FitString {
            line: line(index),
            cases: cases.iter().map(|&index| case(strings, index)).collect(),
        })
        .collect()
}

fn options(rule: FitRule, saddle: SaddleShape, nut: NutShape) -> FitOptions {
    FitOptions { rule, saddle, nut, saddle_travel_mm: [-5.0, 15.0], nut_travel_mm: [-1.0, 3.0] }
}

fn solved(strings: &[FitString], options: &FitOptions) -> Setbacks {
    let ideal = ideal_setbacks(strings, options).unwrap();
    let built = built_setbacks(strings, options, &ideal).unwrap();
    assert!(ideal.settled && built.settled, "{options:?}");
    built
}

/// What the rule makes small, from the errors of every string in every case.
fn worth(rule: FitRule, ready: &[Vec<FrettedString>], contacts: &[Contacts]) -> f64 {
    let (mut squares, mut largest) = (0.0, 0.0_f64);
    for (strings, &at) in ready.iter().zip(contacts) {
        for (string, weight) in strings.iter().zip(WEIGHTS) {
            let notes = string.notes(at).unwrap();
            let frets = if rule == FitRule::Twelfth { 11..12 } else { 0..12 };
            for note in &notes[frets] {
                squares += weight * note.error_cents.powi(2);
                largest = largest.max(note.error_cents.abs());
            }
        }
    }
    if rule == FitRule::Minimax { largest } else { squares }
}

/// Asserts that moves of crests and nut edges, each given for one step, gain nothing either way.
fn cannot_be_bettered(rule: FitRule, at: &[Contacts], moves: &[Vec<[f64; 2]>]) {
    let ready = ready();
    let best = worth(rule, &ready, at);
    for step_mm in STEPS_MM {
        for step in moves.iter().flat_map(|step| [(step, step_mm), (step, -step_mm)]) {
            let moved: Vec<Contacts> = std::iter::zip(at, step.0)
                .map(|(at, [crest, nut])| Contacts {
                    saddle_setback_mm: at.saddle_setback_mm + crest * step.1,
                    nut_setback_mm: at.nut_setback_mm + nut * step.1,
                })
                .collect();
            let other = worth(rule, &ready, &moved);
            assert!(other >= best * (1.0 - GAIN), "{rule:?} {step:?}: {best}, then {other}");
        }
    }
}

/// Both ends of a straight line, together and one alone.
fn line_moves() -> Vec<Vec<[f64; 2]>> {
    [[1.0, 1.0], [1.0, 0.0], [0.0, 1.0], [1.0, -1.0]]
        .map(|[treble, bass]: [f64; 2]| vec![[treble, 0.0], [0.5 * (treble + bass), 0.0], [bass, 0.0]])
        .to_vec()
}

fn one_alone(string: usize, step: [f64; 2]) -> Vec<[f64; 2]> {
    (0..STRINGS).map(|index| if index == string { step } else { [0.0; 2] }).collect()
}

#[test]
fn a_straight_crest_suits_all_cases_together() {
    let ready = ready();
    for rule in [FitRule::LeastSquares, FitRule::Twelfth, FitRule::Minimax] {
        let strings = fitted(&ready, &[0, 1, 2]);
        let built = solved(&strings, &options(rule, SaddleShape::Straight, NutShape::Plain));
        cannot_be_bettered(rule, &built.contacts, &line_moves());
    }
}

#[test]
fn separate_crests_and_shaped_nut_edges_suit_all_cases_together() {
    let ready = ready();
    let strings = fitted(&ready, &[0, 1, 2]);
    let built = solved(&strings, &options(FitRule::LeastSquares, SaddleShape::Separate, NutShape::Shaped));
    let moves: Vec<_> = (0..STRINGS)
        .flat_map(|string| {
            [[1.0, 0.0], [0.0, 1.0], [1.0, 1.0], [1.0, -1.0]].map(|step| one_alone(string, step))
        })
        .collect();
    cannot_be_bettered(FitRule::LeastSquares, &built.contacts, &moves);
}

#[test]
fn a_common_nut_edge_suits_all_cases_together() {
    let ready = ready();
    let strings = fitted(&ready, &[0, 1, 2]);
    let built = solved(&strings, &options(FitRule::LeastSquares, SaddleShape::Straight, NutShape::Common));
    let mut moves = line_moves();
    moves.push(vec![[0.0, 1.0]; STRINGS]);
    moves.push(vec![[1.0, 1.0]; STRINGS]);
    cannot_be_bettered(FitRule::LeastSquares, &built.contacts, &moves);
}

#[test]
fn a_blank_too_thin_holds_the_crests_that_suit_all_cases() {
    let ready = ready();
    let strings = fitted(&ready, &[0, 1, 2]);
    let shaped = SaddleShape::Shaped { half_width_mm: 0.05 };
    let built = solved(&strings, &options(FitRule::LeastSquares, shaped, NutShape::Plain));
    assert!(!built.fits);
    // The blank itself may be moved along, tilted, or turned about an outer string's crest.
    cannot_be_bettered(FitRule::LeastSquares, &built.contacts, &line_moves());
}

#[test]
fn weights_count_as_often_as_they_say_and_no_common_factor_matters() {
    let ready = ready();
    let straight = options(FitRule::LeastSquares, SaddleShape::Straight, NutShape::Plain);
    let mut weighted = fitted(&ready, &[0, 1]);
    weighted.iter_mut().for_each(|string| (string.cases[0].weight, string.cases[1].weight) = (3e-4, 1e-4));
    let mut repeated = fitted(&ready, &[0, 0, 0, 1]);
    repeated.iter_mut().flat_map(|string| &mut string.cases).for_each(|case| case.weight = 1.0);
    let one = solved(&weighted, &straight);
    let other = solved(&repeated, &straight);
    for (one, other) in one.contacts.iter().zip(&other.contacts) {
        assert!((one.saddle_setback_mm - other.saddle_setback_mm).abs() < SAME_MM);
    }
}

#[test]
fn a_case_without_a_note_is_left_alone_and_wrong_weights_are_refused() {
    let ready = ready();
    let straight = options(FitRule::Minimax, SaddleShape::Straight, NutShape::Plain);
    let mut strings = fitted(&ready, &[0, 1]);
    strings.iter_mut().for_each(|string| string.cases[1].frets.clear());
    assert_eq!(solved(&strings, &straight), solved(&fitted(&ready, &[0]), &straight));
    for weight in [0.0, -1.0, f64::NAN, f64::INFINITY] {
        strings[1].cases[0].weight = weight;
        let error = ideal_setbacks(&strings, &straight).unwrap_err();
        assert!(error.to_string().starts_with("weight of a case"), "{error}");
    }
    strings[1].cases.clear();
    assert!(ideal_setbacks(&strings, &straight).is_err());
}
