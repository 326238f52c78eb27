//! The modes of stiff strings against exact equations and published forms.

use std::f64::consts::PI;

use crestline_physics::mode::{Ends, SpeakingString, bending_length_mm, inharmonicity, mode_ratio};
use crestline_physics::section::{Core, CoreShape, Overrides, string_properties};

use super::{By, INCH_MM, assert_between, assert_near, cents, origin};

checks![
    exact_modes_are_reached,
    a_clamped_string_is_two_clamped_halves,
    turning_a_string_round_changes_nothing,
    fletchers_forms_hold_to_their_order,
    morses_expansion_holds_to_its_order,
    the_expansion_for_unlike_ends_holds_to_its_order,
    youngs_constant_comes_out,
    middle_c_of_a_piano,
    three_strings_of_a_piano,
    a_stopped_bass_string_loses_its_harmonics_as_published,
    feynmans_first_order_term,
    a_clamped_end_takes_one_bending_length_off,
    a_plain_third_is_sharp_at_the_octave_by_its_stiffness_alone,
];

const PINNED: Ends = Ends { first: 0.0, second: 0.0 };
const CLAMPED_PINNED: Ends = Ends { first: 1.0, second: 0.0 };
const CLAMPED: Ends = Ends { first: 1.0, second: 1.0 };

/// Cents above the flexible string.
fn above_flexible(mode: u32, epsilon: f64, ends: Ends) -> f64 {
    cents(mode_ratio(mode, epsilon, ends).expect("a legal string"))
}

/// ε, mode, and the cents above the flexible string for pinned, clamped–pinned and clamped–clamped ends.
/// Computed from the characteristic equations: pinned √(1 + π²n²ε²); clamped–pinned a² − b² = 1/ε²,
/// a·tan b = b·tanh a, f/f₀ = abε/π; clamped–clamped 2ab(1 − cosh a·cos b) + (a² − b²)·sinh a·sin b = 0.
const EXACT_MODES: [(f64, u32, f64, f64, f64); 8] = [
    (0.001, 1, 0.00854325543579, 1.74064632954, 3.47448407175),
    (0.001, 2, 0.034172515846, 1.76628407992, 3.50013020865),
    (0.002, 1, 0.034172515846, 3.50013020865, 6.97304007798),
    (0.005, 1, 0.213556094531, 8.89178390351, 17.6137068536),
    (0.01, 1, 0.853908441855, 18.2560510734, 35.8344675456),
    (0.01, 2, 3.41059122168, 20.8205598102, 38.4056842231),
    (0.02, 1, 3.41059122168, 38.4056842231, 74.115450477),
    (0.02, 2, 13.5624708078, 48.6113399334, 84.3555973524),
];

/// What the computation is asked to reach; the values above are given to 1e-9 cent or better.
const EXACT_CENTS: f64 = 1e-9;

#[test]
fn exact_modes_are_reached() {
    origin(
        "Characteristic equations of pinned, clamped–pinned and clamped–clamped stiff strings",
        By::Computed,
    );
    for (epsilon, mode, pinned, clamped_pinned, clamped) in EXACT_MODES {
        for (ends, words, expected) in [
            (PINNED, "pinned", pinned),
            (CLAMPED_PINNED, "clamped–pinned", clamped_pinned),
            (CLAMPED, "clamped–clamped", clamped),
        ] {
            let what = format!("mode {mode}, ε {epsilon}, {words}, cents above the flexible string");
            assert_near(above_flexible(mode, epsilon, ends), expected, EXACT_CENTS, &what);
        }
    }
}

/// Identity: the second mode of a clamped string of ε is the first of a clamped–pinned one of 2ε, because a node in the
/// middle is a pinned end. Computed.
#[test]
fn a_clamped_string_is_two_clamped_halves() {
    origin(
        "Identity of the second clamped–clamped mode and the first clamped–pinned one of half the length",
        By::Computed,
    );
    for epsilon in [0.001, 0.003, 0.01, 0.02] {
        let half = above_flexible(1, 2.0 * epsilon, CLAMPED_PINNED);
        let what = format!("mode 2, ε {epsilon}, clamped–clamped, cents above the flexible string");
        assert_near(above_flexible(2, epsilon, CLAMPED), half, EXACT_CENTS, &what);
    }
}

#[test]
fn turning_a_string_round_changes_nothing() {
    for (epsilon, mode, ..) in EXACT_MODES {
        let turned = above_flexible(mode, epsilon, Ends { first: 0.0, second: 1.0 });
        let off = turned - above_flexible(mode, epsilon, CLAMPED_PINNED);
        assert!(off.abs() <= EXACT_CENTS, "clamped at the other end: {off} cents off");
    }
}

/// The published forms are right to second order in ε. The third-order term of clamped ends is (8 + π²n²)ε³,
/// at most 48ε³ for the first two modes; fifth parts more leave room for the orders above.
fn third_order_cents(epsilon: f64) -> f64 {
    60.0 * epsilon.powi(3) * 1200.0 / 2f64.ln()
}

/// What a form misses at ε, and at half of it; a form that is right to second order misses an eighth.
fn assert_second_order(form: impl Fn(f64, f64) -> f64, ends: Ends) {
    const HALVING: std::ops::Range<f64> = 6.5..9.5; // 2³ = 8 but for the orders above
    for mode in [1, 2] {
        let missed =
            |epsilon: f64| above_flexible(mode, epsilon, ends) - cents(form(f64::from(mode), epsilon));
        let (whole, half) = (missed(0.004), missed(0.002));
        let published = cents(form(f64::from(mode), 0.004));
        let what = format!("mode {mode}, ε 0.004, published form, cents above the flexible string");
        assert_near(above_flexible(mode, 0.004, ends), published, third_order_cents(0.004), &what);
        assert!(HALVING.contains(&(whole / half)), "mode {mode} misses {whole}, then {half}");
    }
}

/// H. Fletcher, "Normal vibration frequencies of a stiff piano string", J. Acoust. Soc. Am. 36, 203 (1964):
/// n·f₀·√(1 + Bn²), clamped that times 1 + (2/π)√B + (4/π²)B with B = π²ε². Memory (sure), confirmed by computation.
#[test]
fn fletchers_forms_hold_to_their_order() {
    origin(
        "H. Fletcher, \"Normal vibration frequencies of a stiff piano string\", J. Acoust. Soc. Am. 36, 203 (1964)",
        By::Memory("sure"),
    );
    for (mode, epsilon) in [(1, 0.001), (2, 0.01), (9, 0.02)] {
        let form = (1.0 + (PI * epsilon * f64::from(mode)).powi(2)).sqrt();
        let what = format!("mode {mode}, ε {epsilon}, pinned, exact form, cents above the flexible string");
        assert_near(above_flexible(mode, epsilon, PINNED), cents(form), EXACT_CENTS, &what);
    }
    let clamped = |mode: f64, epsilon: f64| {
        let coefficient = (PI * epsilon).powi(2);
        (1.0 + coefficient * mode * mode).sqrt()
            * (1.0 + 2.0 / PI * coefficient.sqrt() + 4.0 / (PI * PI) * coefficient)
    };
    assert_second_order(clamped, CLAMPED);
}

/// P. M. Morse, Vibration and Sound, clamped: 1 + 2ε + (4 + π²n²/2)ε². Memory (sure), confirmed by computation.
#[test]
fn morses_expansion_holds_to_its_order() {
    origin("P. M. Morse, Vibration and Sound, chapter IV, clamped ends", By::Memory("sure"));
    let form =
        |n: f64, epsilon: f64| 1.0 + 2.0 * epsilon + (4.0 + 0.5 * (PI * n).powi(2)) * epsilon * epsilon;
    assert_second_order(form, CLAMPED);
}

/// Clamped–pinned: 1 + ε + (1 + π²n²/2)ε². Such ends as in M. B. Anderson and R. G. Beausoleil,
/// J. Acoust. Soc. Am. 156, 683 (2024), abstract read; the formula computed.
#[test]
fn the_expansion_for_unlike_ends_holds_to_its_order() {
    origin(
        "Clamped–pinned ends as in M. B. Anderson and R. G. Beausoleil, J. Acoust. Soc. Am. 156, 683 (2024), abstract \
         read; the expansion",
        By::Computed,
    );
    let form = |n: f64, epsilon: f64| 1.0 + epsilon + (1.0 + 0.5 * (PI * n).powi(2)) * epsilon * epsilon;
    assert_second_order(form, CLAMPED_PINNED);
}

/// A plain round wire.
fn wire(diameter_mm: f64, youngs_modulus_gpa: f64, density_kg_m3: f64) -> Core {
    Core { shape: CoreShape::Round, diameter_mm, youngs_modulus_gpa, density_kg_m3 }
}

/// Unit mass in kg/m and bending stiffness in N·mm² of a plain wire.
fn plain(core: &Core) -> (f64, f64) {
    let properties = string_properties(core, None, &Overrides::default()).expect("a legal wire");
    (properties.unit_mass_kg_per_m, properties.bending_stiffness_n_mm2)
}

fn flexible(length_mm: f64, unit_mass_kg_per_m: f64) -> SpeakingString {
    SpeakingString { length_mm, unit_mass_kg_per_m, bending_stiffness_n_mm2: 0.0, ends: PINNED }
}

/// R. W. Young, "Inharmonicity of plain wire piano strings", J. Acoust. Soc. Am. 24, 267 (1952), abstract read:
/// 3.4e13·n²d²/(f²L⁴) cents (cm, Hz) where E/ρ = 25.5e10 cm²/s²; the constant computed, 3.40397e13.
#[test]
fn youngs_constant_comes_out() {
    origin(
        "R. W. Young, \"Inharmonicity of plain wire piano strings\", J. Acoust. Soc. Am. 24, 267 (1952)",
        By::AbstractRead,
    );
    let core = wire(1.0, 25.5e6 * 7850.0 * 1e-9, 7850.0);
    let (unit_mass, stiffness) = plain(&core);
    let (length_mm, frequency_hz) = (620.0, 262.0);
    let (tension_n, _) = flexible(length_mm, unit_mass).tension_for(frequency_hz).expect("a legal pitch");
    // The first-order part of 1200·log₂√(1 + Bn²), per n².
    let per_square = 600.0 / 2f64.ln() * inharmonicity(stiffness, tension_n, length_mm);
    let (diameter_cm, length_cm) = (core.diameter_mm / 10.0, length_mm / 10.0);
    let constant = per_square * frequency_hz.powi(2) * length_cm.powi(4) / diameter_cm.powi(2);
    // Half a unit of the last digit published, then of the last computed.
    assert_near(constant, 3.4e13, 0.05e13, "constant, cents·Hz²·cm²");
    origin("The same constant", By::Computed);
    assert_near(constant, 3.40397e13, 0.000005e13, "constant, cents·Hz²·cm²");
}

/// A. Chaigne and A. Askenfelt, J. Acoust. Soc. Am. 95 (1994), C4: L 0.62 m, mass 3.93 g, T 670 N,
/// EI/(TL²) 3.82e-5; second-hand. Computed from these: f₀ 262.189 Hz, B 3.7702e-4. At the second mode of such a
/// string Young found about 1.2 cents on six pianos (abstract read).
#[test]
fn middle_c_of_a_piano() {
    const SPREAD_OF_PIANOS_CENTS: f64 = 0.3; // "about 1.2" of six instruments; this is a seventh
    origin(
        "From the C4 of A. Chaigne and A. Askenfelt, J. Acoust. Soc. Am. 95 (1994), second-hand; the figures",
        By::Computed,
    );
    let (length_mm, tension_n, ratio) = (620.0, 670.0, 3.82e-5);
    let string = flexible(length_mm, 3.93e-3 / 0.62);
    assert_near(
        string.frequency_hz(tension_n).expect("a legal string"),
        262.189,
        0.0005,
        "flexible string at 670 N, Hz",
    );
    let coefficient = inharmonicity(ratio * tension_n * length_mm * length_mm, tension_n, length_mm);
    assert_near(coefficient, 3.7702e-4, 0.00005e-4, "inharmonicity B");
    origin("R. W. Young (1952), middle C of six pianos, about 1.2 cents", By::AbstractRead);
    let second = above_flexible(2, ratio.sqrt(), PINNED);
    assert_near(second, 1.2, SPREAD_OF_PIANOS_CENTS, "second mode, cents above the flexible string");
}

/// J. Chabassier, A. Chaigne and P. Joly, J. Acoust. Soc. Am. 134, 648 (2013), second-hand: length m, diameter mm,
/// (effective) density kg/m³, tension N, frequency listed, and the flexible string's computed, Hz.
#[test]
fn three_strings_of_a_piano() {
    // The list rounds its inputs to three or four digits, and 555.6 includes more than the flexible string.
    const LISTED_RELATIVE: f64 = 0.002;
    let strings = [
        ("F3", 0.960, 1.049, 7850.0, 766.0, 175.01, 175.008),
        ("C#5", 0.326, 0.928, 7850.0, 695.0, 555.6, 554.903),
        ("C2", 1.602, 1.051, 23919.0, 915.0, 65.56, 65.539),
    ];
    let found_hz = |length_m: f64, diameter_mm, density, tension_n| {
        let (unit_mass, _) = plain(&wire(diameter_mm, 202.0, density));
        flexible(length_m * 1e3, unit_mass).frequency_hz(tension_n).expect("a legal string")
    };
    origin(
        "J. Chabassier, A. Chaigne and P. Joly, J. Acoust. Soc. Am. 134, 648 (2013), frequencies listed",
        By::SecondHand,
    );
    for (name, length_m, diameter_mm, density, tension_n, listed_hz, _) in strings {
        let found = found_hz(length_m, diameter_mm, density, tension_n);
        assert_near(found, listed_hz, LISTED_RELATIVE * listed_hz, &format!("{name}, Hz"));
    }
    origin("The same strings without stiffness", By::Computed);
    for (name, length_m, diameter_mm, density, tension_n, _, computed_hz) in strings {
        // Half a unit of the last digit.
        let found = found_hz(length_m, diameter_mm, density, tension_n);
        assert_near(found, computed_hz, 0.0005, &format!("{name}, flexible, Hz"));
    }
}

/// J. A. Kemp, "On inharmonicity in bass guitar strings", SN Applied Sciences 2:636 (2020), abstract read: the lowest
/// string of a five-string bass reaches about 100 cents at partial 10 stopped at fret 12, and at partial 6 stopped at fret 21.
#[test]
fn a_stopped_bass_string_loses_its_harmonics_as_published() {
    const ABOUT_100_CENTS: f64 = 5.0; // partials are whole numbers: the next one up would be 130 cents
    origin(
        "J. A. Kemp, \"On inharmonicity in bass guitar strings\", SN Applied Sciences 2:636 (2020), lowest string of five",
        By::AbstractRead,
    );
    let hundred_cents = 2f64.powf(1.0 / 6.0) - 1.0;
    let epsilon_at_12 = (hundred_cents / 100.0).sqrt() / PI;
    let at_12 = above_flexible(10, epsilon_at_12, PINNED);
    assert!((at_12 - 100.0).abs() <= EXACT_CENTS, "the string is the published one: {at_12} cents");
    let at = |fret: f64| inharmonicity(1e4, 150.0, 864.0 * 2f64.powf(-fret / 12.0));
    let growth = at(21.0) / at(12.0);
    let at_21 = above_flexible(6, epsilon_at_12 * growth.sqrt(), PINNED);
    assert_near(
        at_21,
        100.0,
        ABOUT_100_CENTS,
        "partial 6 at fret 21 where partial 10 at fret 12 is 100 cents up, cents",
    );
    origin("The same string: B goes with 1/L² at equal tension", By::Computed);
    // Half a unit of the last digit.
    assert_near(growth, 2.83, 0.005, "B at fret 21 over B at fret 12");
    origin("The same string: what the two partials of 100 cents ask of B", By::Computed);
    // From 100 cents given for both partials to "about": a cent of either is a per cent of B.
    assert_between(growth, [2.78, 2.78], 0.02 * 2.78, "B at fret 21 over B at fret 12");
}

/// R. P. Feynman's letter of 1961, Physics Today 62(12), 46 (2009), read: to first order the stiffness of a wire raises
/// its pitch by 1 + (π/2)(E·A²·μ/T²)·f².
#[test]
fn feynmans_first_order_term() {
    origin("R. P. Feynman's letter of 1961, Physics Today 62(12), 46 (2009)", By::Read);
    let core = wire(1.0, 200.0, 7850.0);
    let (unit_mass, stiffness) = plain(&core);
    let (length_mm, tension_n) = (650.0, 700.0);
    let frequency_hz = flexible(length_mm, unit_mass).frequency_hz(tension_n).expect("a legal string");
    let (modulus_pa, area_m2) = (core.youngs_modulus_gpa * 1e9, core.area_mm2() * 1e-6);
    let raised =
        PI / 2.0 * modulus_pa * area_m2.powi(2) * unit_mass / tension_n.powi(2) * frequency_hz.powi(2);
    let epsilon = bending_length_mm(stiffness, tension_n) / length_mm;
    let found = mode_ratio(1, epsilon, PINNED).expect("a legal string") - 1.0;
    // √(1 + 2x) = 1 + x − x²/2 + …
    assert_near(
        found,
        raised,
        0.51 * raised * raised,
        "rise of the pitch of a steel wire of 1 mm, 650 mm, 700 N, as a fraction",
    );
}

/// Plain steel, 647.7 mm, 200 GPa, 7850 kg/m³, as flexible strings at pitch; computed: gauge in, pitch Hz,
/// tension N, and the length that one clamped end takes off, mm.
#[test]
fn a_clamped_end_takes_one_bending_length_off() {
    const NOMINAL_MM: f64 = 647.7;
    origin("Plain steel wires of 200 GPa and 7850 kg/m³ on 647.7 mm, flexible, at pitch", By::Computed);
    for (gauge_in, frequency_hz, tension_n, length_mm) in [
        (0.010, 329.627_556_913, 72.5240, 0.7506),
        (0.016, 246.941_650_628, 104.199, 1.6032),
        (0.017, 195.997_717_991, 74.1028, 2.1461),
    ] {
        let (unit_mass, stiffness) = plain(&wire(gauge_in * INCH_MM, 200.0, 7850.0));
        let (found_n, _) = flexible(NOMINAL_MM, unit_mass).tension_for(frequency_hz).expect("a legal pitch");
        let what = |figure: &str| format!("{gauge_in:.3} in at {frequency_hz:.2} Hz, {figure}");
        // Half a unit of the sixth digit; then of the last one.
        assert_near(found_n, tension_n, 5e-6 * tension_n, &what("tension, N"));
        let found_mm = bending_length_mm(stiffness, found_n);
        assert_near(found_mm, length_mm, 0.00005, &what("bending length, mm"));
        let epsilon = found_mm / NOMINAL_MM;
        // To first order in ε; the second-order terms are (4 + π²/2)ε², some tenths of a per cent of one end's share.
        let shortened = cents(NOMINAL_MM / (NOMINAL_MM - length_mm));
        let second_order = 1200.0 / 2f64.ln() * 9.0 * epsilon * epsilon;
        assert_near(
            above_flexible(1, epsilon, CLAMPED_PINNED),
            shortened,
            second_order,
            &what("one clamped end against a string shorter by it, cents"),
        );
    }
}

/// The last string above with a clamped saddle and a pinned fret; computed: 5.8397 cents open, 11.8866 at half the
/// length, so that the octave is 6.047 cents sharp.
#[test]
fn a_plain_third_is_sharp_at_the_octave_by_its_stiffness_alone() {
    origin("Characteristic equation for a plain third of .017 in, clamped saddle, pinned fret", By::Computed);
    let (unit_mass, stiffness) = plain(&wire(0.017 * INCH_MM, 200.0, 7850.0));
    let (tension_n, _) = flexible(647.7, unit_mass).tension_for(195.997_717_991).expect("a legal pitch");
    let bending_mm = bending_length_mm(stiffness, tension_n);
    let open = above_flexible(1, bending_mm / 647.7, CLAMPED_PINNED);
    let octave = above_flexible(1, bending_mm / 323.85, CLAMPED_PINNED);
    // Half a unit of the last digit.
    assert_near(open, 5.8397, 0.00005, "open, cents above the flexible string");
    assert_near(octave, 11.8866, 0.00005, "at half the length, cents above the flexible string");
    assert_near(octave - open, 6.047, 0.0005, "octave, cents sharp");
}
