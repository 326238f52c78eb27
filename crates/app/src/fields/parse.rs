//! Numbers as people write them.

/// Reads a finite decimal number; a comma counts as a decimal sign, a true minus sign as a minus.
///
/// # Errors
/// Words that say what to type instead.
pub fn number(text: &str) -> Result<f64, String> {
    let trimmed = text.trim();
    if trimmed.is_empty() {
        return Err("a number is wanted here".to_owned());
    }
    let plain: String = trimmed
        .chars()
        .map(|c| match c {
            ',' => '.',
            '−' => '-',
            other => other,
        })
        .collect();
    let looks_decimal = plain.chars().all(|c| c.is_ascii_digit() || matches!(c, '.' | '-' | '+' | 'e' | 'E'));
    match plain.parse::<f64>() {
        Ok(value) if value.is_finite() && looks_decimal => Ok(value),
        _ => Err(format!("“{}” is not a number; write it as 12.5 or 12,5", shorten(trimmed))),
    }
}

/// Reads a whole number that is not negative.
///
/// # Errors
/// Words that say what to type instead.
pub fn whole(text: &str) -> Result<u32, String> {
    let trimmed = text.trim();
    trimmed.parse().map_err(|_| format!("“{}” is not a whole number", shorten(trimmed)))
}

/// Reads a list of numbers parted by blanks, semicolons or lines. A comma is a decimal sign here too,
/// unless a blank follows it.
///
/// # Errors
/// The first entry that is not a number.
pub fn list(text: &str) -> Result<Vec<f64>, String> {
    text.replace(", ", " ")
        .split(|c: char| c.is_whitespace() || c == ';')
        .filter(|part| !part.is_empty())
        .map(number)
        .collect()
}

/// A number as it is shown in a field: the shortest text that reads back as the same number.
#[must_use]
pub fn shown(value: f64) -> String {
    format!("{value}")
}

/// The numbers of a list as they are shown in a field.
#[must_use]
pub fn shown_list(values: &[f64]) -> String {
    values.iter().map(|value| shown(*value)).collect::<Vec<_>>().join("  ")
}

/// The first twenty characters, so that a message stays a message.
pub fn shorten(text: &str) -> String {
    const MOST: usize = 20;
    if text.chars().count() <= MOST {
        return text.to_owned();
    }
    text.chars().take(MOST).chain(['…']).collect()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn a_comma_is_a_decimal_sign() {
        assert_eq!(number("647,7").unwrap(), 647.7);
        assert_eq!(number(" 647.7 ").unwrap(), 647.7);
        assert_eq!(number("−1.5").unwrap(), -1.5);
    }

    #[test]
    fn what_is_not_a_finite_decimal_is_refused() {
        for text in ["", "  ", "6x", "inf", "nan", "1e999", "1.2.3", "--1", "1 2"] {
            assert!(number(text).is_err(), "{text}");
        }
    }

    #[test]
    fn lists_are_parted_by_blanks_semicolons_and_lines() {
        assert_eq!(list("1.5 2,5\n3;4").unwrap(), [1.5, 2.5, 3.0, 4.0]);
        assert_eq!(list("1, 2, 3").unwrap(), [1.0, 2.0, 3.0]);
        assert!(list("1 two").is_err());
    }
}
