//! A move with its standard deviation, as the page shows it.

use crate::units::LengthUnit;

/// A move with its sign and its standard deviation, without the unit.
#[must_use]
pub fn moved(unit: LengthUnit, move_mm: f64, sd_mm: f64) -> String {
    let size = unit.figure(move_mm);
    let sign = if move_mm > 0.0 && size != unit.figure(0.0) { "+" } else { "" };
    format!("{sign}{size} ± {}", unit.figure(sd_mm))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_move_has_its_sign_and_nothing_has_none() {
        const MM: LengthUnit = LengthUnit::Millimetres;
        assert_eq!(moved(MM, 1.2, 0.3), "+1.20 ± 0.30");
        assert_eq!(moved(MM, -1.2, 0.3), "−1.20 ± 0.30");
        assert_eq!(moved(MM, 0.001, 0.3), "0.00 ± 0.30");
        assert_eq!(moved(LengthUnit::Inches, 2.54, 0.254), "+0.100 ± 0.010");
    }
}
