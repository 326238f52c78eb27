//! Whether strings and parts of an error can be told apart by people who see fewer colours.
//!
//! The three kinds of dichromacy are simulated by the matrices of G. M. Machado, M. M. Oliveira and
//! L. A. F. Fernandes, A physiologically-based model for simulation of color vision deficiency, IEEE Trans.
//! Vis. Comput. Graph. 15 (2009) 1291, severity 1 (from memory; each row sums to 1, so that white stays white,
//! which a test holds). Differences are those of CIELAB 1976.

use eframe::egui::Color32;

use super::{DARK, LIGHT, marker};

/// The least difference of two colours that stand beside each other in one plot. About 2.3 is just noticeable
/// side by side on large fields (M. Mahy, L. Van Eycken and A. Oosterlinck, Color Res. Appl. 19 (1994) 105, from
/// memory); thin lines want some four times that.
const LEAST_DIFFERENCE: f64 = 10.0;

type Matrix = [[f64; 3]; 3];

const SIGHTS: [(&str, Matrix); 4] = [
    ("all colours", [[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]]),
    (
        "without long-wave cones",
        [[0.152286, 1.052583, -0.204868], [0.114503, 0.786281, 0.099216], [-0.003882, -0.048116, 1.051998]],
    ),
    (
        "without middle-wave cones",
        [[0.367322, 0.860646, -0.227968], [0.280085, 0.672501, 0.047413], [-0.011820, 0.042940, 0.968881]],
    ),
    (
        "without short-wave cones",
        [[1.255528, -0.076749, -0.178779], [-0.078411, 0.930809, 0.147602], [0.004733, 0.691367, 0.303900]],
    ),
];

fn times(matrix: &Matrix, v: [f64; 3]) -> [f64; 3] {
    matrix.map(|row| row.iter().zip(v).map(|(a, b)| a * b).sum())
}

/// Linear light of the sRGB curve (IEC 61966-2-1).
fn linear(byte: u8) -> f64 {
    let c = f64::from(byte) / 255.0;
    if c <= 0.04045 { c / 12.92 } else { ((c + 0.055) / 1.055).powf(2.4) }
}

/// CIELAB 1976 with the white of sRGB, D65.
fn lab(light: [f64; 3]) -> [f64; 3] {
    const XYZ: Matrix = [
        [0.4124564, 0.3575761, 0.1804375],
        [0.2126729, 0.7151522, 0.0721750],
        [0.0193339, 0.1191920, 0.9503041],
    ];
    const WHITE: [f64; 3] = [0.95047, 1.0, 1.08883];
    let curve = |t: f64| {
        let knee = 6.0_f64 / 29.0;
        if t > knee.powi(3) { t.cbrt() } else { t / (3.0 * knee * knee) + 4.0 / 29.0 }
    };
    let xyz = times(&XYZ, light);
    let [x, y, z] = std::array::from_fn(|n| curve(xyz[n] / WHITE[n]));
    [116.0 * y - 16.0, 500.0 * (x - y), 200.0 * (y - z)]
}

fn difference(sight: &Matrix, a: Color32, b: Color32) -> f64 {
    let seen = |colour: Color32| {
        let light = [colour.r(), colour.g(), colour.b()].map(linear);
        lab(times(sight, light).map(|c| c.clamp(0.0, 1.0)))
    };
    let (a, b) = (seen(a), seen(b));
    (0..3).map(|n| (a[n] - b[n]).powi(2)).sum::<f64>().sqrt()
}

#[test]
fn white_stays_white_and_the_difference_to_black_is_the_whole_scale() {
    for (name, sight) in &SIGHTS {
        let whole = difference(sight, Color32::WHITE, Color32::BLACK);
        // The scale of lightness goes from 0 to 100; the matrices have six decimals.
        assert!((whole - 100.0).abs() < 0.01, "{name}: {whole}");
    }
    // A pair that is known to be confused without middle-wave cones, and not with them.
    let (red, green) = (Color32::from_rgb(163, 0, 0), Color32::from_rgb(95, 95, 0));
    assert!(difference(&SIGHTS[0].1, red, green) > 40.0);
    assert!(difference(&SIGHTS[2].1, red, green) < difference(&SIGHTS[0].1, red, green) / 2.0);
}

#[test]
fn neighbouring_strings_are_told_apart_by_colour() {
    for palette in [LIGHT, DARK] {
        for (name, sight) in &SIGHTS {
            for index in 1..palette.strings.len() {
                let apart = difference(sight, palette.string(index - 1), palette.string(index));
                assert!(apart >= LEAST_DIFFERENCE, "{name}: strings {index} and the next are {apart} apart");
            }
        }
    }
}

#[test]
fn strings_whose_colours_look_alike_have_different_marks() {
    let mut alike = 0;
    for palette in [LIGHT, DARK] {
        for (name, sight) in &SIGHTS {
            for (a, b) in (0..16usize).flat_map(|a| (0..a).map(move |b| (a, b))) {
                if difference(sight, palette.string(a), palette.string(b)) < LEAST_DIFFERENCE {
                    alike += 1;
                    assert!(marker(a) != marker(b), "{name}: strings {} and {}", a + 1, b + 1);
                }
            }
        }
    }
    assert!(alike > 0, "eight hues are too many for two kinds of cones");
}

#[test]
fn the_parts_of_an_error_are_told_apart_by_colour() {
    for palette in [LIGHT, DARK] {
        for (name, sight) in &SIGHTS {
            for (a, b) in (0..4).flat_map(|a| (0..a).map(move |b| (a, b))) {
                let apart = difference(sight, palette.parts[a], palette.parts[b]);
                assert!(apart >= LEAST_DIFFERENCE, "{name}: parts {a} and {b} are {apart} apart");
            }
        }
    }
}
