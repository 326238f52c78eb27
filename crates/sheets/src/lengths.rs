//! Lengths and cents as they are written on sheets.

/// Units of written lengths.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum LengthUnits {
    /// Millimetres to 0.01.
    Millimetres,
    /// Inches to 0.001.
    InchDecimal,
    /// Inches to the nearest 64th, as a reduced fraction.
    InchFraction,
}

const MM_PER_INCH: f64 = 25.4;
/// The true minus sign, as wide as a plus.
const MINUS: char = '−';

impl LengthUnits {
    /// A length as written on a sheet, without a unit (ISO 129-1: the title block names the unit).
    #[must_use]
    pub fn text(self, length_mm: f64) -> String {
        match self {
            Self::Millimetres => decimals(length_mm, 2),
            Self::InchDecimal => decimals(length_mm / MM_PER_INCH, 3),
            Self::InchFraction => fraction(length_mm / MM_PER_INCH),
        }
    }

    /// The diameter of a string: to 0.01 mm, or to 0.001 in because nobody names a gauge in 64ths.
    #[must_use]
    pub fn gauge(self, diameter_mm: f64) -> String {
        match self {
            Self::Millimetres => decimals(diameter_mm, 2),
            Self::InchDecimal | Self::InchFraction => decimals(diameter_mm / MM_PER_INCH, 3),
        }
    }

    /// The unit's sign.
    #[must_use]
    pub const fn sign(self) -> &'static str {
        match self {
            Self::Millimetres => "mm",
            Self::InchDecimal | Self::InchFraction => "in",
        }
    }

    /// The unit in words, for the title block.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Millimetres => "millimetres",
            Self::InchDecimal => "inches",
            Self::InchFraction => "inches, 1/64",
        }
    }
}

/// A number with fixed decimals, a true minus sign and no negative zero.
pub(crate) fn decimals(value: f64, count: usize) -> String {
    let text = format!("{:.count$}", value.abs());
    let zero = text.chars().all(|c| c == '0' || c == '.');
    if value < 0.0 && !zero { format!("{MINUS}{text}") } else { text }
}

/// Cents to 0.1 with their sign.
pub(crate) fn cents(value: f64) -> String {
    let text = decimals(value, 1);
    if value > 0.0 && text != "0.0" { format!("+{text}") } else { text }
}

/// Inches as a whole number and a fraction to the nearest 64th.
fn fraction(inches: f64) -> String {
    let parts = (inches.abs() * 64.0).round();
    if parts == 0.0 {
        return "0".to_owned();
    }
    let sign = if inches < 0.0 { MINUS.to_string() } else { String::new() };
    let whole = (parts / 64.0).floor();
    let (mut over, mut under) = (parts - whole * 64.0, 64.0);
    while over > 0.0 && over % 2.0 == 0.0 {
        over /= 2.0;
        under /= 2.0;
    }
    match (whole > 0.0, over > 0.0) {
        (true, true) => format!("{sign}{whole} {over}/{under}"),
        (true, false) => format!("{sign}{whole}"),
        _ => format!("{sign}{over}/{under}"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn millimetres_and_inches() {
        assert_eq!(LengthUnits::Millimetres.text(2.345), "2.35");
        assert_eq!(LengthUnits::Millimetres.text(-0.004), "0.00");
        assert_eq!(LengthUnits::Millimetres.text(-1.5), "−1.50");
        assert_eq!(LengthUnits::InchDecimal.text(647.7), "25.500");
        assert_eq!(LengthUnits::InchFraction.text(647.7), "25 1/2");
        assert_eq!(LengthUnits::InchFraction.text(25.4), "1");
        assert_eq!(LengthUnits::InchFraction.text(-25.4 * 3.0 / 64.0), "−3/64");
        assert_eq!(LengthUnits::InchFraction.text(0.19), "0");
        assert_eq!(LengthUnits::InchFraction.text(25.4 * 0.999), "1");
        assert_eq!(LengthUnits::InchFraction.gauge(1.0668), "0.042");
    }

    #[test]
    fn cents_have_their_sign() {
        assert_eq!([cents(0.25), cents(-0.31), cents(0.04), cents(-0.04)], ["+0.2", "−0.3", "0.0", "0.0"]);
    }
}
