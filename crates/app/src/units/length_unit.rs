//! The unit in which the window shows lengths.

use eframe::egui::{Context, Id};

use super::figures::{decimal, exact_decimal, fraction};
use super::{MM_PER_INCH, without_dust};
use crate::results::figures::fixed;

/// The unit of all lengths in the window.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum LengthUnit {
    /// Millimetres.
    #[default]
    Millimetres,
    /// Inches.
    Inches,
}

/// How a field writes a length in inches.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Fineness {
    /// As a decimal.
    #[default]
    Decimals,
    /// As a fraction where the length is an exact number of 64ths, as scales and spacings are named; else as a decimal.
    Fractions,
}

impl LengthUnit {
    /// Both units in the order of the switch.
    pub const ALL: [Self; 2] = [Self::Millimetres, Self::Inches];

    /// The unit that the window is set to, for what draws; millimetres where nothing has been set.
    #[must_use]
    pub fn of(ctx: &Context) -> Self {
        ctx.data(|data| data.get_temp(Self::place())).unwrap_or_default()
    }

    /// Makes this the unit for what draws from now on.
    pub fn set(self, ctx: &Context) {
        ctx.data_mut(|data| data.insert_temp(Self::place(), self));
    }

    fn place() -> Id {
        Id::unique("unit of lengths")
    }

    /// The sign behind a number.
    #[must_use]
    pub const fn sign(self) -> &'static str {
        match self {
            Self::Millimetres => "mm",
            Self::Inches => "in",
        }
    }

    /// The word for menus.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::Millimetres => "Millimetres",
            Self::Inches => "Inches",
        }
    }

    /// The word in settings that outlive the window.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Millimetres => "mm",
            Self::Inches => "inch",
        }
    }

    /// The unit of a word.
    #[must_use]
    pub fn of_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|unit| unit.word() == word)
    }

    /// The other one.
    #[must_use]
    pub const fn other(self) -> Self {
        match self {
            Self::Millimetres => Self::Inches,
            Self::Inches => Self::Millimetres,
        }
    }

    /// Millimetres in one of this unit.
    #[must_use]
    pub const fn in_mm(self) -> f64 {
        match self {
            Self::Millimetres => 1.0,
            Self::Inches => MM_PER_INCH,
        }
    }

    /// The number of this unit in a length.
    #[must_use]
    pub fn from_mm(self, length_mm: f64) -> f64 {
        match self {
            Self::Millimetres => length_mm,
            Self::Inches => without_dust(length_mm / MM_PER_INCH),
        }
    }

    /// The length of so many of this unit, mm.
    #[must_use]
    pub fn to_mm(self, number: f64) -> f64 {
        match self {
            Self::Millimetres => number,
            Self::Inches => without_dust(number * MM_PER_INCH),
        }
    }

    /// A length as a figure without its sign: to 0.01 mm or 0.001 in, a true minus, no negative zero.
    #[must_use]
    pub fn figure(self, length_mm: f64) -> String {
        match self {
            Self::Millimetres => fixed(length_mm, 2),
            Self::Inches => fixed(self.from_mm(length_mm), 3),
        }
    }

    /// A string's gauge as a figure without its sign: to 0.001 mm or 0.0001 in.
    #[must_use]
    pub fn gauge(self, diameter_mm: f64) -> String {
        match self {
            Self::Millimetres => fixed(diameter_mm, 3),
            Self::Inches => fixed(self.from_mm(diameter_mm), 4),
        }
    }

    /// A length as a figure with its sign, such as `2.34 mm`.
    #[must_use]
    pub fn words(self, length_mm: f64) -> String {
        format!("{} {}", self.figure(length_mm), self.sign())
    }

    /// Words with the sign behind a comma, such as `Relief, mm`, for names and heads of columns.
    #[must_use]
    pub fn named(self, words: &str) -> String {
        format!("{words}, {}", self.sign())
    }

    /// A length as a field shows it: every digit that it has in millimetres; in inches to 0.0001 in, or the fraction
    /// where `fineness` asks for one. What is shown is read back within half of [`LengthUnit::shown_to_mm`].
    #[must_use]
    pub fn shown(self, length_mm: f64, fineness: Fineness) -> String {
        match (self, fineness) {
            (Self::Millimetres, _) => exact_decimal(length_mm),
            (Self::Inches, Fineness::Fractions) => {
                let inches = self.from_mm(length_mm);
                fraction(inches).unwrap_or_else(|| decimal(inches))
            }
            (Self::Inches, Fineness::Decimals) => decimal(self.from_mm(length_mm)),
        }
    }

    /// How finely [`LengthUnit::shown`] shows a length, mm; nothing is lost in millimetres.
    #[must_use]
    pub const fn shown_to_mm(self) -> f64 {
        match self {
            Self::Millimetres => 0.0,
            Self::Inches => 1e-4 * MM_PER_INCH,
        }
    }

    /// A range of lengths in words, such as `200 to 1500 mm`.
    #[must_use]
    pub fn range(self, low_mm: f64, high_mm: f64) -> String {
        let text = |length_mm| self.shown(length_mm, Fineness::Decimals);
        format!("{} to {} {}", text(low_mm), text(high_mm), self.sign())
    }

    /// The step of an arrow key in this unit where it is `step_mm` in millimetres: in inches the nearest of 1, 2 or 5
    /// times a power of ten, but at least 0.001 in.
    #[must_use]
    pub fn step(self, step_mm: f64) -> f64 {
        const LEAST_INCHES: f64 = 0.0005;
        match self {
            Self::Millimetres => step_mm,
            Self::Inches => round_step(step_mm / MM_PER_INCH).max(LEAST_INCHES),
        }
    }
}

/// The nearest of 1, 2 or 5 times a power of ten, by ratio; zero stays zero.
fn round_step(step: f64) -> f64 {
    if !(step.is_finite() && step > 0.0) {
        return 0.0;
    }
    let power = step.log10().floor() as i32;
    let rounds = [1.0, 2.0, 5.0, 10.0].map(|factor| without_dust(factor * 10f64.powi(power)));
    let far = |round: &f64| (round / step).ln().abs();
    rounds.into_iter().min_by(|a, b| far(a).total_cmp(&far(b))).unwrap_or(step)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn results_have_their_decimals_in_either_unit() {
        assert_eq!(LengthUnit::Millimetres.words(-1.256), "−1.26 mm");
        assert_eq!(LengthUnit::Inches.words(2.54), "0.100 in");
        assert_eq!(LengthUnit::Inches.figure(-0.001), "0.000");
        assert_eq!(LengthUnit::Inches.gauge(0.3048), "0.0120");
        assert_eq!(LengthUnit::Inches.named("Relief"), "Relief, in");
    }

    #[test]
    fn fields_show_inches_to_a_ten_thousandth_and_millimetres_whole() {
        let inches = |length_mm| LengthUnit::Inches.shown(length_mm, Fineness::Decimals);
        assert_eq!(inches(647.7), "25.5");
        assert_eq!(inches(0.3048), "0.012");
        assert_eq!(inches(1.78), "0.0701");
        assert_eq!(inches(0.0), "0");
        assert_eq!(LengthUnit::Millimetres.shown(0.123_456_789, Fineness::Decimals), "0.123456789");
    }

    #[test]
    fn exact_64ths_are_fractions_where_the_trade_names_them_so() {
        let inches = |length_mm| LengthUnit::Inches.shown(length_mm, Fineness::Fractions);
        assert_eq!(inches(647.7), "25 1/2");
        assert_eq!(inches(352.425), "13 7/8");
        assert_eq!(inches(2.381_25), "3/32");
        assert_eq!(inches(25.4), "1");
        assert_eq!(inches(648.0), "25.5118");
        assert_eq!(inches(-0.396_875), "-1/64");
    }

    #[test]
    fn steps_are_round_in_either_unit() {
        assert_eq!(LengthUnit::Millimetres.step(0.05), 0.05);
        assert_eq!([0.05, 0.5, 5.0].map(|mm| LengthUnit::Inches.step(mm)), [0.002, 0.02, 0.2]);
        assert_eq!(LengthUnit::Inches.step(0.01), 0.0005);
    }
}
