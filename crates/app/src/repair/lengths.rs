//! Lengths as the page shows them, all through here.

use crate::results::figures::mm;

/// The unit behind the figures.
pub const UNIT: &str = "mm";

/// A length without its unit.
#[must_use]
pub fn length(length_mm: f64) -> String {
    mm(length_mm)
}

/// A length with its unit.
#[must_use]
pub fn with_unit(length_mm: f64) -> String {
    format!("{} {UNIT}", length(length_mm))
}

/// A move with its sign and its standard deviation.
#[must_use]
pub fn moved(move_mm: f64, sd_mm: f64) -> String {
    let size = length(move_mm);
    let sign = if move_mm > 0.0 && size != length(0.0) { "+" } else { "" };
    format!("{sign}{size} ± {}", length(sd_mm))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_move_has_its_sign_and_nothing_has_none() {
        assert_eq!(moved(1.2, 0.3), "+1.20 ± 0.30");
        assert_eq!(moved(-1.2, 0.3), "−1.20 ± 0.30");
        assert_eq!(moved(0.001, 0.3), "0.00 ± 0.30");
    }
}
