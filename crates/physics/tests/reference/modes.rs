//! Modes of stiff strings against a table worked out in many digits from the boundary determinant
//! (`tests/reference/modes.py`, which shares no code with this crate).

use crestline_physics::PhysicsError;
use crestline_physics::mode::{
    Ends, SpeakingString, bending_length_mm, closed_form_ratio, inharmonicity, mode_ratio,
};

const TABLE: &str = include_str!("../../../../tests/reference/modes.csv");
/// The root is found to 1e-15 of itself; a slack bar's determinant loses two or three digits more.
const RELATIVE: f64 = 2e-13;
/// The tension goes with the square of the frequency, and stiff ends take a large part of it.
const TENSION_RELATIVE: f64 = 1e-11;

/// (mode, ε, ends, ratio)
fn table() -> Vec<(u32, f64, Ends, f64)> {
    let rows = TABLE.lines().skip(1).map(|line| {
        let cells: Vec<f64> = line.split(',').map(|cell| cell.parse().unwrap()).collect();
        (cells[0] as u32, cells[1], Ends { first: cells[2], second: cells[3] }, cells[4])
    });
    rows.collect()
}

#[test]
fn modes_are_those_of_the_determinant_in_many_digits() {
    let table = table();
    assert_eq!(table.len(), 9 * 7 * 4);
    for (mode, epsilon, ends, wanted) in table {
        for ends in [ends, Ends { first: ends.second, second: ends.first }] {
            let found = mode_ratio(mode, epsilon, ends).unwrap();
            assert!(
                (found / wanted - 1.0).abs() < RELATIVE,
                "{mode} {epsilon} {ends:?}: {found} for {wanted}"
            );
        }
    }
}

#[test]
fn the_tension_is_that_at_which_the_first_mode_is_in_tune() {
    let (length_mm, tension_n, unit_mass_kg_per_m) = (640.0, 70.0, 1.3e-3_f64);
    let flexible_hz = (tension_n / unit_mass_kg_per_m).sqrt() / (2e-3 * length_mm);
    let firsts: Vec<_> = table().into_iter().filter(|row| row.0 == 1 && row.1 <= 3.0).collect();
    assert_eq!(firsts.len(), 8 * 7);
    for (_, epsilon, ends, ratio) in firsts {
        let string = SpeakingString {
            length_mm,
            unit_mass_kg_per_m,
            bending_stiffness_n_mm2: tension_n * (epsilon * length_mm).powi(2),
            ends,
        };
        let frequency = string.frequency_hz(tension_n).unwrap();
        assert!(
            (frequency / (ratio * flexible_hz) - 1.0).abs() < RELATIVE,
            "{epsilon} {ends:?}: {frequency}"
        );
        let (found_n, found_ratio) = string.tension_for(ratio * flexible_hz).unwrap();
        assert!((found_n / tension_n - 1.0).abs() < TENSION_RELATIVE, "{epsilon} {ends:?}: {found_n} N");
        assert!(
            (found_ratio / ratio - 1.0).abs() < TENSION_RELATIVE,
            "{epsilon} {ends:?}: ratio {found_ratio}"
        );
    }
}

#[test]
fn hardly_stiff_strings_are_shortened_by_their_ends_alone() {
    // Below ε = 1e-4 the closed form is exact but for terms of the order of ε².
    for epsilon in [0.0, 1e-12, 9e-11, 1.1e-10, 1e-8, 1e-6, 1e-5] {
        for (first, second) in [(0.0, 0.0), (0.0, 0.4), (0.7, 0.5), (1.0, 1.0)] {
            let found = mode_ratio(1, epsilon, Ends { first, second }).unwrap();
            let allowed = 20.0 * epsilon * epsilon + 4.0 * f64::EPSILON;
            assert!(
                (found - 1.0 - (first + second) * epsilon).abs() < allowed,
                "{epsilon} {first} {second}: {found}"
            );
        }
    }
}

#[test]
fn the_closed_form_is_near_the_exact_mode() {
    let few = table().into_iter().filter(|row| row.0 == 1 && row.1 < 0.01);
    for (_, epsilon, ends, ratio) in few {
        let apart_cents = 1200.0 * (closed_form_ratio(epsilon, ends) / ratio).log2();
        assert!(apart_cents.abs() < 0.01, "{epsilon} {ends:?}: {apart_cents}");
    }
}

#[test]
fn bending_length_and_inharmonicity_are_their_definitions() {
    // Worked by hand: √(80 N·mm²/50 N) = 1.264911064 mm; π²·80/(50·650²) = 3.737609e-5.
    assert!((bending_length_mm(80.0, 50.0) - 1.264_911_064).abs() < 1e-9);
    assert!(
        (inharmonicity(80.0, 50.0, 650.0) / (std::f64::consts::PI.powi(2) * 1.6 / 422_500.0) - 1.0).abs()
            < 1e-15
    );
}

#[test]
fn what_is_out_of_range_is_refused_by_name() {
    let ends = Ends { first: 0.5, second: 0.5 };
    let refused =
        |mode, epsilon, ends| matches!(mode_ratio(mode, epsilon, ends), Err(PhysicsError::OutOfRange { .. }));
    assert!(refused(0, 0.01, ends) && refused(65, 0.01, ends));
    assert!(refused(1, -1e-9, ends) && refused(1, 1001.0, ends) && refused(1, f64::NAN, ends));
    for fixity in [-0.01, 1.01, f64::NAN] {
        assert!(
            refused(1, 0.01, Ends { first: fixity, ..ends })
                && refused(1, 0.01, Ends { second: fixity, ..ends })
        );
    }
    assert!(mode_ratio(64, 1e3, ends).is_ok() && mode_ratio(1, 0.0, ends).is_ok());
}

#[test]
fn a_bar_that_sounds_higher_when_slack_has_no_tension() {
    // A pinned bar of ε = 1/π at the flexible string's tension is in tune with no tension at all.
    let string = |stiffness| SpeakingString {
        length_mm: 300.0,
        unit_mass_kg_per_m: 1e-3,
        bending_stiffness_n_mm2: stiffness,
        ends: Ends { first: 0.0, second: 0.0 },
    };
    let flexible_n = 1e-3 * (0.6_f64 * 100.0).powi(2);
    let limit = flexible_n * (300.0 / std::f64::consts::PI).powi(2);
    assert_eq!(string(1.001 * limit).tension_for(100.0), Err(PhysicsError::TooStiff { frequency_hz: 100.0 }));
    let (tension_n, _) = string(0.5 * limit).tension_for(100.0).unwrap();
    assert!((tension_n / flexible_n - 0.5).abs() < 1e-9, "{tension_n}: pinned, T = T_flexible·(1 − π²ε²)");
}

#[test]
fn a_clamped_bar_is_refused_below_its_own_pitch_and_tuned_above_it() {
    // A bar's own pitch is β²/(2πL²)·√(EI/μ), βL = 4.730040745 clamped at both ends and 3.926602312 pinned at one
    // (from memory, sure; the table's ε = 150 has the same within 1e-5).
    for (ends, beta) in [
        (Ends { first: 1.0, second: 1.0 }, 4.730_040_745_f64),
        (Ends { first: 0.0, second: 1.0 }, 3.926_602_312),
    ] {
        let bar =
            SpeakingString { length_mm: 300.0, unit_mass_kg_per_m: 1e-3, bending_stiffness_n_mm2: 1e6, ends };
        let own_hz = beta.powi(2) / (2.0 * std::f64::consts::PI * 0.3_f64.powi(2)) * (1.0_f64 / 1e-3).sqrt();
        let low_hz = 0.999 * own_hz;
        assert_eq!(bar.tension_for(low_hz), Err(PhysicsError::TooStiff { frequency_hz: low_hz }), "{ends:?}");
        let (tension_n, ratio) = bar.tension_for(1.01 * own_hz).unwrap();
        let back_hz = bar.frequency_hz(tension_n).unwrap();
        assert!((back_hz / (1.01 * own_hz) - 1.0).abs() < RELATIVE, "{ends:?}: {back_hz} Hz");
        assert!((bar.ratio(tension_n).unwrap() / ratio - 1.0).abs() < RELATIVE, "{ends:?}: {ratio}");
    }
}
