//! How the tables write numbers: lengths to 0.01 mm, cents and tensions to one decimal.

/// A number with a fixed count of decimals; a rounded zero carries no sign.
pub(crate) fn fixed(value: f64, decimals: usize) -> String {
    let shown = format!("{value:.decimals$}");
    let is_zero = shown.bytes().all(|b| matches!(b, b'-' | b'0' | b'.'));
    match shown.strip_prefix('-') {
        Some(unsigned) if is_zero => unsigned.to_owned(),
        _ => shown,
    }
}

/// A length in millimetres, to 0.01 mm.
pub(crate) fn length(mm: f64) -> String {
    fixed(mm, 2)
}

/// A size of error in cents, to 0.1 cent.
pub(crate) fn cents(value: f64) -> String {
    fixed(value, 1)
}

/// A move in millimetres with its sign, to 0.01 mm.
pub(crate) fn signed_length(mm: f64) -> String {
    with_plus(length(mm))
}

/// An error in cents with its sign, to 0.1 cent: positive is sharp.
pub(crate) fn signed_cents(value: f64) -> String {
    with_plus(cents(value))
}

/// The number with a plus where it is positive after rounding.
fn with_plus(shown: String) -> String {
    let is_zero = shown.bytes().all(|b| matches!(b, b'0' | b'.'));
    if shown.starts_with('-') || is_zero { shown } else { format!("+{shown}") }
}

/// A force in newtons, to 0.1 N.
pub(crate) fn force(newtons: f64) -> String {
    fixed(newtons, 1)
}

/// A fraction as a percentage to whole numbers.
pub(crate) fn percent(fraction: f64) -> String {
    fixed(fraction * 100.0, 0)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_rounded_zero_has_no_sign() {
        assert_eq!(length(-0.004), "0.00");
        assert_eq!(length(-0.006), "-0.01");
        assert_eq!(signed_cents(-0.04), "0.0");
        assert_eq!(signed_cents(0.04), "0.0");
        assert_eq!(percent(-0.001), "0");
    }

    #[test]
    fn errors_carry_their_sign() {
        assert_eq!(signed_cents(1.25), "+1.2");
        assert_eq!(signed_cents(-12.34), "-12.3");
        assert_eq!(force(72.524), "72.5");
        assert_eq!(percent(0.618), "62");
    }
}
