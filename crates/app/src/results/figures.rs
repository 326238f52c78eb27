//! Figures as they are shown: cents to 0.1, tensions to 0.1 N. Lengths are written by [`crate::units`].

/// A number with so many decimals, a true minus sign, and no negative zero.
#[must_use]
pub fn fixed(value: f64, decimals: usize) -> String {
    let text = format!("{value:.decimals$}");
    match text.strip_prefix('-') {
        Some(rest) if rest.chars().all(|c| matches!(c, '0' | '.')) => rest.to_owned(),
        Some(rest) => format!("−{rest}"),
        None => text,
    }
}

/// An interval in cents, with a plus sign where it is sharp.
#[must_use]
pub fn cents(value: f64) -> String {
    let text = fixed(value, 1);
    if text.starts_with('−') || text == "0.0" { text } else { format!("+{text}") }
}

/// A force in newtons.
#[must_use]
pub fn newtons(value: f64) -> String {
    fixed(value, 1)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn zero_has_no_sign_and_minus_is_a_minus() {
        assert_eq!(fixed(-0.001, 2), "0.00");
        assert_eq!(fixed(-1.255, 2), "−1.25");
        assert_eq!(cents(0.04), "0.0");
        assert_eq!(cents(2.13), "+2.1");
        assert_eq!(cents(-2.13), "−2.1");
    }
}
