//! One bracketed root finder for the crate.

use crate::PhysicsError;

/// Steps after which a root that has not settled is given up; bisection alone needs about 60.
const MAX_STEPS: usize = 120;

/// Root of a continuous function that changes sign once in `[low, high]`, by secant steps from `start`
/// that fall back on bisection when they leave the bracket or shrink it too slowly.
///
/// `rising` tells whether the function rises through the root. The answer is within `tolerance` (absolute)
/// or as near as floating point allows.
///
/// # Errors
/// [`PhysicsError::NotSettled`] where the steps run out, which a function that obeys the contract never meets.
pub(crate) fn bracketed(
    what: &'static str,
    [mut low, mut high]: [f64; 2],
    start: f64,
    rising: bool,
    tolerance: f64,
    mut function: impl FnMut(f64) -> Result<f64, PhysicsError>,
) -> Result<f64, PhysicsError> {
    let mut previous: Option<(f64, f64)> = None;
    let mut x = start.clamp(low, high);
    let mut step = high - low;
    for _ in 0..MAX_STEPS {
        let value = function(x)?;
        if value == 0.0 {
            return Ok(x);
        }
        if (value > 0.0) == rising {
            high = x;
        } else {
            low = x;
        }
        let secant = previous.map_or_else(
            // The first step only has to give a second point near by.
            || x + if (value > 0.0) == rising { -1.0 } else { 1.0 } * (1e-4 * (high - low)).max(tolerance),
            |(x_before, value_before)| x - value * (x - x_before) / (value - value_before),
        );
        let next = if secant > low && secant < high && (secant - x).abs() <= 0.5 * step.abs().max(tolerance) {
            secant
        } else {
            0.5 * (low + high)
        };
        let change = next - x;
        previous = Some((x, value));
        x = next;
        if change.abs() <= tolerance || high - low <= tolerance {
            return Ok(x);
        }
        step = if previous.is_some() { change } else { step };
        if next == low || next == high {
            return Ok(next);
        }
    }
    Err(PhysicsError::NotSettled { what, iterations: MAX_STEPS, reached: step })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn finds_roots_of_steep_flat_and_ordinary_functions() {
        let cube = bracketed("x", [-1.0, 3.0], 2.9, true, 1e-15, |x| Ok(x.powi(3))).unwrap();
        assert!(cube.abs() < 1e-4, "{cube}");
        let cosine = bracketed("x", [0.0, 3.0], 0.1, false, 1e-15, |x| Ok(x.cos())).unwrap();
        assert!((cosine - std::f64::consts::FRAC_PI_2).abs() < 1e-15);
        let steep = bracketed("x", [0.0, 1.0], 0.5, true, 1e-15, |x| Ok((1e3 * (x - 0.3)).tanh())).unwrap();
        assert!((steep - 0.3).abs() < 1e-14);
    }

    #[test]
    fn smooth_functions_take_few_steps() {
        // Bisection alone would take 49 evaluations from a bracket of 10 to 2e-14; the secant rule's order of 1.6 needs
        // some ten from a start a few units off.
        const EVALUATIONS: usize = 14;
        type Function = fn(f64) -> f64;
        let functions: [(Function, bool, f64); 4] = [
            (|x| x.exp() - 2.0, true, 2.0_f64.ln()),
            (|x| 2.0 - x.exp(), false, 2.0_f64.ln()),
            (|x| (x - 1.5).atan(), true, 1.5),
            (|x| x * x * x + x - 10.0, true, 2.0),
        ];
        for (number, (function, rising, root)) in functions.into_iter().enumerate() {
            for start in [0.3, 1.2, 2.9] {
                let mut evaluations = 0;
                let found = bracketed("x", [-5.0, 5.0], start, rising, 2e-14, |x| {
                    evaluations += 1;
                    Ok(function(x))
                });
                let found = found.unwrap();
                assert!((found - root).abs() < 4e-14, "{number} from {start}: {found}");
                assert!(evaluations <= EVALUATIONS, "{number} from {start}: {evaluations} evaluations");
            }
        }
    }

    #[test]
    fn a_root_at_the_start_or_at_an_end_is_found() {
        let at =
            |low: f64, high: f64, start: f64| bracketed("x", [low, high], start, true, 1e-15, Ok).unwrap();
        assert_eq!(at(-1.0, 1.0, 0.0), 0.0);
        assert!(at(0.0, 1.0, 0.7).abs() < 1e-14 && at(-1.0, 0.0, -0.7).abs() < 1e-14);
    }
}
