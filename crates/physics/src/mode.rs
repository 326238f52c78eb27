//! Modes of a stiff string between two supports that resist turning.
//!
//! Euler–Bernoulli beam under tension, EI·y'''' − T·y'' = μω²·y on 0…L, y = 0 at both ends and a rotational
//! spring K = κ/(1 − κ)·√(T·EI) at each: κ = 0 is pinned, κ = 1 clamped, κ = ½ a string that runs on over a
//! frictionless support. Sources: P. M. Morse, Vibration and Sound, ch. IV; H. Fletcher, J. Acoust. Soc. Am. 36
//! (1964) 203; N. H. Fletcher and T. D. Rossing, The Physics of Musical Instruments, ch. 2.

use std::f64::consts::PI;

use crate::error::within;
use crate::{PhysicsError, root};

/// Below this ratio of bending length to length the stiffness is a first-order correction to within 1e-20.
const FLEXIBLE: f64 = 1e-10;
/// Where α exceeds this, the ends know nothing of each other: e^(−α) is below 1e-19.
const FAR_ENDS: f64 = 45.0;
/// Step at which the phase iteration, which gains at least two digits a step, has settled, radians.
const PHASE_STEP_RAD: f64 = 1e-13;
/// Root tolerance in radians; relative 1e-15 of the first root.
const TOLERANCE_RAD: f64 = 3e-15;

/// Fixities κ at the two ends of a speaking length, each 0 (pinned) to 1 (clamped).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ends {
    /// At one end.
    pub first: f64,
    /// At the other.
    pub second: f64,
}

/// Frequency of mode `mode` over that of the flexible string, n/(2L)·√(T/μ).
///
/// `epsilon` is √(EI/T)/L, bending length over length. With α² − β² = 1/ε² the shape is a sum of
/// sin βx, cos βx, sinh αx and cosh αx (x over L), and the ratio is αβε/(nπ); β is the root of the determinant
/// of the two end conditions, found to a relative 1e-15.
///
/// # Errors
/// [`PhysicsError::OutOfRange`] for a mode of 0 or above 64, an ε outside 0…1e3 or a fixity outside 0…1.
pub fn mode_ratio(mode: u32, epsilon: f64, ends: Ends) -> Result<f64, PhysicsError> {
    within("mode number", f64::from(mode), 1.0, 64.0)?;
    within("bending length over length", epsilon, 0.0, 1e3)?;
    within("fixity", ends.first, 0.0, 1.0)?;
    within("fixity", ends.second, 0.0, 1.0)?;
    let turns = f64::from(mode) * PI;
    let both = ends.first + ends.second;
    if epsilon < FLEXIBLE {
        return Ok(1.0 + both * epsilon);
    }
    if both == 0.0 {
        return Ok((1.0 + (turns * epsilon).powi(2)).sqrt());
    }
    if epsilon * FAR_ENDS < 1.0 {
        let alpha = |beta: f64| (beta * beta + 1.0 / (epsilon * epsilon)).sqrt();
        let start = turns / (1.0 - both * epsilon);
        if let Some(beta) = far_ends_root(turns, start, ends, alpha, |_| epsilon, 1.0) {
            return Ok(beta * (1.0 + (beta * epsilon).powi(2)).sqrt() / turns);
        }
    }
    // The root lies between those of pinned and of clamped ends; a clamped bar's is at most 0.018 above (n + ½)π.
    let bracket = [turns - 1e-6, turns + 0.5 * PI + 0.02];
    let start = turns / (1.0 - both * epsilon).max(0.5);
    // Between pinned ends the determinant goes as −sin β.
    let rising = !mode.is_multiple_of(2);
    let determinant = |beta| Ok(end_determinant(beta, epsilon, ends));
    let beta = root::bracketed("mode", bracket, start, rising, TOLERANCE_RAD, determinant)?;
    Ok(beta * (1.0 + (beta * epsilon).powi(2)).sqrt() / turns)
}

/// β for ends so far apart that the end shapes do not overlap: each end shifts the phase of the sine by φ with
/// tan φ = κβ/((1 − κ)ε(α² + β²) + κα), and β = nπ + φ_a + φ_b. `power` is the power of β that φ goes with.
/// Newton's steps with that slope; `None` where they do not settle.
fn far_ends_root(
    turns: f64,
    start: f64,
    ends: Ends,
    alpha: impl Fn(f64) -> f64,
    epsilon: impl Fn(f64) -> f64,
    power: f64,
) -> Option<f64> {
    let mut beta = start;
    for _ in 0..20 {
        let (alpha, epsilon) = (alpha(beta), epsilon(beta));
        let curvature = epsilon * (alpha * alpha + beta * beta);
        let phase = |fixity: f64| (fixity * beta / ((1.0 - fixity) * curvature + fixity * alpha)).atan();
        let phases = if ends.first == ends.second {
            2.0 * phase(ends.first)
        } else {
            phase(ends.first) + phase(ends.second)
        };
        let step = (turns + phases - beta) / (1.0 - power * phases / beta);
        beta += step;
        if step.abs() < PHASE_STEP_RAD {
            return Some(beta);
        }
    }
    None
}

/// Determinant of the two end conditions EI·y'' = ±K·y' on the two shapes that vanish at both ends,
/// u = sin βx − sin β·sinh αx/sinh α and v = cos βx − sinh α(1 − x)/sinh α − cos β·sinh αx/sinh α.
/// Divided by (α² + β²)/ε so that it stays of order one.
fn end_determinant(beta: f64, epsilon: f64, ends: Ends) -> f64 {
    let alpha = (beta * beta + 1.0 / (epsilon * epsilon)).sqrt();
    let (sine, cosine) = beta.sin_cos();
    let (near, far) =
        if alpha > FAR_ENDS { (0.0, alpha) } else { (alpha / alpha.sinh(), alpha / alpha.tanh()) };
    let curvature = alpha * alpha + beta * beta;
    let u_slope = [beta - sine * near, beta * cosine - sine * far];
    let v_slope = [far - cosine * near, near - beta * sine - cosine * far];
    // Multiplied by ε the spring condition is (1 − κ)ε·curvature = κ·slope, both of order 1/ε at most.
    let (soft_a, soft_b) = ((1.0 - ends.first) * epsilon, (1.0 - ends.second) * epsilon);
    let first_u = -ends.first * u_slope[0];
    let first_v = -soft_a * curvature - ends.first * v_slope[0];
    let second_u = -soft_b * curvature * sine + ends.second * u_slope[1];
    let second_v = -soft_b * curvature * cosine + ends.second * v_slope[1];
    (first_u * second_v - first_v * second_u) / curvature
}

/// The closed form: Q ≈ √(1 + (πε)²)/(1 − (κ_a + κ_b)ε), each end taking κ bending lengths off the length.
/// Within 0.01 cent of the exact mode for ε < 0.01.
#[must_use]
pub fn closed_form_ratio(epsilon: f64, ends: Ends) -> f64 {
    (1.0 + (PI * epsilon).powi(2)).sqrt() / (1.0 - (ends.first + ends.second) * epsilon)
}

/// Bending length √(EI/T), mm.
#[must_use]
pub fn bending_length_mm(bending_stiffness_n_mm2: f64, tension_n: f64) -> f64 {
    (bending_stiffness_n_mm2 / tension_n).sqrt()
}

/// Inharmonicity coefficient of a pinned string, B = π²EI/(T·L²); partial n is n·f₁·√((1 + Bn²)/(1 + B)).
/// Source: H. Fletcher, J. Acoust. Soc. Am. 36 (1964) 203.
#[must_use]
pub fn inharmonicity(bending_stiffness_n_mm2: f64, tension_n: f64, length_mm: f64) -> f64 {
    PI * PI * bending_stiffness_n_mm2 / (tension_n * length_mm * length_mm)
}

/// A speaking length at rest: what the first mode depends on besides the tension.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SpeakingString {
    /// Length between the supports, mm.
    pub length_mm: f64,
    /// Mass per length, kg/m.
    pub unit_mass_kg_per_m: f64,
    /// Bending stiffness, N·mm².
    pub bending_stiffness_n_mm2: f64,
    /// Fixities of the supports.
    pub ends: Ends,
}

impl SpeakingString {
    /// Ratio Q of the first mode to the flexible string at this tension.
    ///
    /// # Errors
    /// As [`mode_ratio`].
    pub fn ratio(&self, tension_n: f64) -> Result<f64, PhysicsError> {
        let epsilon = bending_length_mm(self.bending_stiffness_n_mm2, tension_n) / self.length_mm;
        mode_ratio(1, epsilon, self.ends)
    }

    /// First mode, Hz: Q/(2L)·√(T/μ).
    ///
    /// # Errors
    /// As [`mode_ratio`].
    pub fn frequency_hz(&self, tension_n: f64) -> Result<f64, PhysicsError> {
        let flexible = (tension_n / self.unit_mass_kg_per_m).sqrt() / (2e-3 * self.length_mm);
        Ok(flexible * self.ratio(tension_n)?)
    }

    /// The tension at which the first mode has this frequency, and the ratio Q there.
    ///
    /// The frequency rises with tension, so there is one at most; it lies below the flexible string's μ(2Lf)².
    ///
    /// # Errors
    /// [`PhysicsError::TooStiff`] where even a millionth of the flexible string's tension sounds higher.
    pub fn tension_for(&self, frequency_hz: f64) -> Result<(f64, f64), PhysicsError> {
        const SLACK: f64 = 1e-6;
        let flexible_n = self.unit_mass_kg_per_m * (2e-3 * self.length_mm * frequency_hz).powi(2);
        within("tension in N", flexible_n, f64::MIN_POSITIVE, 1e9)?;
        if let Some(found) = self.far_ends_tension(flexible_n) {
            return Ok(found);
        }
        // Half the logarithm of the tension over the flexible string's, so that the slope is near one.
        let excess = |half_log: f64| Ok(half_log + self.ratio(flexible_n * (2.0 * half_log).exp())?.ln());
        let lowest = 0.5 * SLACK.ln();
        // Between pinned ends, the softest, T = T_flexible·(1 − π²ε²): nothing is left at ε = 1/π.
        let too_stiff = PhysicsError::TooStiff { frequency_hz };
        if PI * bending_length_mm(self.bending_stiffness_n_mm2, flexible_n) >= self.length_mm
            || lowest + self.ratio(flexible_n * SLACK)?.ln() >= 0.0
        {
            return Err(too_stiff);
        }
        let start = -self.ratio(flexible_n)?.ln();
        let half_log = root::bracketed("tension", [lowest, 1e-12], start, true, 1e-15, excess)?;
        let tension_n = flexible_n * (2.0 * half_log).exp();
        Ok((tension_n, self.ratio(tension_n)?))
    }

    /// The tension for the frequency that a flexible string has at `flexible_n`, where the ends are far apart:
    /// αβ = ωL²√(μ/EI) is known, so β alone is looked for, and T = EI(α² − β²)/L². `None` where the ends are too near, or there is no stiffness.
    fn far_ends_tension(&self, flexible_n: f64) -> Option<(f64, f64)> {
        let epsilon = bending_length_mm(self.bending_stiffness_n_mm2, flexible_n) / self.length_mm;
        // The tension is lower than the flexible string's, so a little room is left.
        if !(FLEXIBLE..0.8 / FAR_ENDS).contains(&epsilon) {
            return None;
        }
        let both = self.ends.first + self.ends.second;
        // For the flexible string at this pitch, β = π and αβ = π/ε.
        let product = PI / epsilon;
        let inverse = |beta: f64| ((product / beta).powi(2) - beta * beta).sqrt().recip();
        let start = PI / (1.0 - both * epsilon);
        let beta = far_ends_root(PI, start, self.ends, |beta| product / beta, inverse, 2.0)?;
        let reached = inverse(beta);
        let tension_n = self.bending_stiffness_n_mm2 / (reached * self.length_mm).powi(2);
        (reached * FAR_ENDS < 1.0).then_some((tension_n, product * reached / PI))
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    fn cents(ratio: f64) -> f64 {
        1200.0 * ratio.log2()
    }

    #[test]
    fn clamped_second_mode_is_clamped_pinned_first_at_twice_epsilon() {
        // A clamped–clamped string's second mode has a node in its middle: two clamped–pinned halves.
        // At 0.015 one is worked out with far ends and the other without.
        for epsilon in [1e-4, 3e-3, 0.015, 0.05, 0.3, 2.0] {
            let whole = mode_ratio(2, epsilon, Ends { first: 1.0, second: 1.0 }).unwrap();
            let half = mode_ratio(1, 2.0 * epsilon, Ends { first: 1.0, second: 0.0 }).unwrap();
            assert!(cents(whole / half).abs() < 1e-10, "{epsilon}: {}", cents(whole / half));
        }
    }

    #[test]
    fn bars_without_tension_are_reached() {
        // βL of a clamped–clamped bar, from memory (sure): 4.730040745; at ε = 1e3 tension hardly matters.
        let ratio = mode_ratio(1, 1e3, Ends { first: 1.0, second: 1.0 }).unwrap();
        let beta = (ratio * PI / 1e3).sqrt();
        assert!((beta - 4.730_040_745).abs() < 1e-6, "{beta}");
    }

    #[test]
    fn closed_form_is_within_its_bound() {
        for (first, second) in [(0.0, 0.0), (0.5, 0.5), (0.0, 1.0), (1.0, 1.0)] {
            let ends = Ends { first, second };
            let difference = cents(mode_ratio(1, 0.0099, ends).unwrap() / closed_form_ratio(0.0099, ends));
            assert!(difference.abs() < 0.01, "{first} {second}: {difference}");
        }
    }

    #[test]
    fn tension_gives_the_pitch_back() {
        for stiffness in [0.0, 1e-3, 130.0, 4e4] {
            let string = SpeakingString {
                length_mm: 330.0,
                unit_mass_kg_per_m: 4e-4,
                bending_stiffness_n_mm2: stiffness,
                ends: Ends { first: 0.5, second: 0.7 },
            };
            let (tension_n, _) = string.tension_for(440.0).unwrap();
            assert!(cents(string.frequency_hz(tension_n).unwrap() / 440.0).abs() < 1e-10);
        }
    }

    #[test]
    fn usual_strings_take_few_steps() {
        // Newton's steps double the digits that are right: four from two right ones, or there is an error in the slope.
        const STEPS: usize = 4;
        for epsilon in [1e-4, 1e-3, 5e-3, 0.015] {
            for (first, second) in [(0.5, 0.5), (0.3, 0.7), (1.0, 1.0), (0.0, 1.0)] {
                let (ends, steps) = (Ends { first, second }, std::cell::Cell::new(0));
                let alpha = |beta: f64| {
                    steps.set(steps.get() + 1);
                    beta.hypot(1.0 / epsilon)
                };
                let start = PI / (1.0 - (first + second) * epsilon);
                assert!(far_ends_root(PI, start, ends, alpha, |_| epsilon, 1.0).is_some());
                assert!(steps.get() <= STEPS, "{epsilon} {ends:?}: {} steps", steps.get());
            }
        }
    }

    #[test]
    fn tensions_of_usual_strings_need_no_bracket() {
        for (epsilon, is_quick) in [(1e-11, false), (1e-9, true), (2e-3, true), (0.017, true), (0.018, false)]
        {
            let string = SpeakingString {
                length_mm: 600.0,
                unit_mass_kg_per_m: 1e-3,
                bending_stiffness_n_mm2: 80.0 * (600.0_f64 * epsilon).powi(2),
                ends: Ends { first: 0.5, second: 0.4 },
            };
            let found = string.far_ends_tension(80.0);
            assert_eq!(found.is_some(), is_quick, "{epsilon}");
            if let Some((tension_n, ratio)) = found {
                let flexible = (80.0 / tension_n).sqrt();
                assert!((string.ratio(tension_n).unwrap() / flexible - 1.0).abs() < 1e-13, "{epsilon}");
                assert!((ratio / flexible - 1.0).abs() < 1e-13, "{epsilon}");
            }
        }
    }

    #[test]
    fn a_bar_cannot_be_tuned_below_its_own_pitch() {
        let bar = SpeakingString {
            length_mm: 300.0,
            unit_mass_kg_per_m: 1e-3,
            bending_stiffness_n_mm2: 1e9,
            ends: Ends { first: 0.0, second: 0.0 },
        };
        assert_eq!(bar.tension_for(100.0), Err(PhysicsError::TooStiff { frequency_hz: 100.0 }));
    }
}
