//! Axes of the plots: round steps, figures that stay readable, and a quiet grid.

use eframe::egui::{FontId, Rangef};
use egui_plot::{AxisHints, GridInput, GridMark, Plot};

use super::figures;
use crate::theme::{Palette, size};
use crate::units::LengthUnit;

/// Least distance of grid lines in points that the plot works with.
const GRID_POINTS: f32 = 8.0;
/// Least distance of figures along x and y, points.
const FIGURE_POINTS: [f64; 2] = [46.0, 32.0];
/// The most marks on an axis, whatever the bounds.
const MOST_MARKS: i64 = 200;

/// How the figures along x are counted.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Along {
    /// As lengths, counted from this one in round steps of this unit; then the figures along y are lengths too.
    From(f64, LengthUnit),
    /// By frets.
    Frets,
}

/// Gives a plot its axes; `words` stand beside the y axis.
pub fn with_axes<'a>(
    plot: Plot<'a>,
    palette: &'static Palette,
    along: Along,
    words: [&'static str; 2],
) -> Plot<'a> {
    let (origin, each) = match along {
        Along::From(origin, unit) => (origin, unit.in_mm()),
        Along::Frets => (0.0, 1.0),
    };
    let figure = move |value: f64, step: f64| figures::fixed(value / each, decimals(step / each));
    let shown = move |mark: GridMark| figure(mark.value - origin, mark.step_size);
    let x = hints(AxisHints::new_x(), palette, words[0]).formatter(move |mark, _| shown(mark));
    let y = hints(AxisHints::new_y(), palette, words[1])
        .formatter(move |mark, _| figure(mark.value, mark.step_size));
    plot.custom_x_axes(vec![x])
        .custom_y_axes(vec![y])
        .grid_spacing(Rangef::new(GRID_POINTS, 300.0))
        .grid_color(palette.edge.gamma_multiply(0.55))
        .grid_fade(0.0)
        .x_grid_spacer(move |input| match along {
            Along::From(origin, _) => round_steps(input, FIGURE_POINTS[0], origin, each),
            Along::Frets => frets(input),
        })
        .y_grid_spacer(move |input| round_steps(input, FIGURE_POINTS[1], 0.0, each))
}

fn hints<'a>(axis: AxisHints<'a>, palette: &Palette, words: &'static str) -> AxisHints<'a> {
    axis.label(words)
        .label_spacing(Rangef::new(1.0, 2.0))
        .tick_label_color(palette.quiet)
        .tick_label_font(FontId::proportional(size::SMALL))
}

/// Decimals for figures in this step.
fn decimals(step: f64) -> usize {
    (0..6).find(|decimals| (step * 10f64.powi(*decimals)).fract().abs() < 1e-6).unwrap_or(5) as usize
}

/// Marks in steps of 1, 2 or 5 times a power of ten of a unit, counted from `origin`; `each` is the unit.
fn round_steps(input: GridInput, points: f64, origin: f64, each: f64) -> Vec<GridMark> {
    let step = round_up(input.base_step_size / f64::from(GRID_POINTS) * points / each) * each;
    marks(input.bounds, step, origin)
}

/// A mark a fret, or every second, third or further one where they would crowd.
fn frets(input: GridInput) -> Vec<GridMark> {
    let least = input.base_step_size / f64::from(GRID_POINTS) * 0.45 * FIGURE_POINTS[0];
    let step = [1.0, 2.0, 3.0, 4.0, 6.0].into_iter().find(|step| *step >= least).unwrap_or(12.0);
    marks(input.bounds, step, 0.0)
}

fn marks((low, high): (f64, f64), step: f64, origin: f64) -> Vec<GridMark> {
    let first = ((low - origin) / step).ceil() as i64;
    let last = ((high - origin) / step).floor() as i64;
    let last = last.min(first.saturating_add(MOST_MARKS));
    (first..=last).map(|i| GridMark { value: origin + i as f64 * step, step_size: step }).collect()
}

/// The next of 1, 2, 5, 10, … times a power of ten that is not less than `least`.
fn round_up(least: f64) -> f64 {
    if !(least.is_finite() && least > 0.0) {
        return 1.0;
    }
    let power = 10f64.powf(least.log10().floor());
    let factor = [1.0, 2.0, 5.0].into_iter().find(|factor| factor * power >= least);
    factor.unwrap_or(10.0) * power
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn steps_are_round_and_not_too_small() {
        assert_eq!(round_up(0.7), 1.0);
        assert_eq!(round_up(1.1), 2.0);
        assert_eq!(round_up(34.0), 50.0);
        assert_eq!(round_up(60.0), 100.0);
        assert_eq!(round_up(f64::NAN), 1.0);
    }

    #[test]
    fn marks_count_from_the_origin() {
        let values: Vec<f64> = marks((320.0, 335.0), 5.0, 323.85).iter().map(|mark| mark.value).collect();
        assert_eq!(values, [323.85, 328.85, 333.85]);
    }

    #[test]
    fn decimals_follow_the_step() {
        assert_eq!([decimals(10.0), decimals(1.0), decimals(0.5), decimals(0.02)], [0, 0, 1, 2]);
    }
}
