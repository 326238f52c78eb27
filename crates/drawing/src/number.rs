//! The one way in which numbers become text in every writer.

use std::fmt::Write;

/// Appends a number with at most `decimals` decimals, without trailing zeros and never as `-0`.
/// A number that is not finite is written as 0: writers must produce a readable file whatever they get.
pub(crate) fn push(out: &mut String, value: f64, decimals: usize) {
    let value = if value.is_finite() { value } else { 0.0 };
    let start = out.len();
    // Writing to a String cannot fail.
    let _ = write!(out, "{value:.decimals$}");
    if decimals > 0 {
        let kept = out.trim_end_matches('0').trim_end_matches('.').len();
        out.truncate(kept.max(start + 1));
    }
    if &out[start..] == "-0" {
        out.replace_range(start.., "0");
    }
}

#[cfg(test)]
mod tests {
    use super::push;

    fn text(value: f64, decimals: usize) -> String {
        let mut out = String::from("1");
        push(&mut out, value, decimals);
        out[1..].to_owned()
    }

    #[test]
    fn numbers_are_short_and_plain() {
        assert_eq!(text(1.5, 4), "1.5");
        assert_eq!(text(-0.000_01, 4), "0");
        assert_eq!(text(100.0, 0), "100");
        assert_eq!(text(100.0, 3), "100");
        assert_eq!(text(0.0, 3), "0");
        assert_eq!(text(-2.345_678, 3), "-2.346");
        assert_eq!(text(f64::NAN, 3), "0");
        assert_eq!(text(1e9, 2), "1000000000");
    }
}
