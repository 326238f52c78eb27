//! Reading a length in any of the ways in which people write one.

use super::{LengthUnit, MM_PER_INCH, without_dust};
use crate::fields::parse::{self, shorten};

/// Millimetres in each unit that may stand behind a number. Longer words stand before their own beginnings' ends:
/// `mm` is found before a bare `m`, `inch` before `in`.
const UNITS: [(&str, f64); 13] = [
    ("millimetres", 1.0),
    ("millimeters", 1.0),
    ("mm", 1.0),
    ("cm", 10.0),
    ("inches", MM_PER_INCH),
    ("inch", MM_PER_INCH),
    ("in.", MM_PER_INCH),
    ("in", MM_PER_INCH),
    ("\"", MM_PER_INCH),
    ("″", MM_PER_INCH),
    ("''", MM_PER_INCH),
    ("thou", MM_PER_INCH / 1000.0),
    ("m", 1000.0),
];

/// Reads a length, mm. A bare number is in `unit`; a fraction without a unit is in inches, because nobody measures
/// millimetres in 32nds. A comma is a decimal sign, and any kind of blank may stand before the unit.
///
/// # Errors
/// Words that say how a length may be written.
pub fn read(text: &str, unit: LengthUnit) -> Result<f64, String> {
    let plain = plain(text);
    if plain.is_empty() {
        return Err("a length is wanted here".to_owned());
    }
    if plain.ends_with("ft") || plain.ends_with("feet") || (plain.ends_with('\'') && !plain.ends_with("''")) {
        return Err(format!("“{}” is in feet; write it in inches or millimetres", shorten(text.trim())));
    }
    let (body, named) = split_unit(&plain);
    let (number, is_fraction) = number(body).ok_or_else(|| refused(text))?;
    let mm_each = named.unwrap_or(if is_fraction { MM_PER_INCH } else { unit.in_mm() });
    let length_mm = if mm_each == 1.0 { number } else { without_dust(number * mm_each) };
    if length_mm.is_finite() { Ok(length_mm) } else { Err(refused(text)) }
}

/// Reads lengths parted by blanks, semicolons or lines, mm. A comma is a decimal sign here too, unless a blank
/// follows it; a unit may stand behind its number with a blank between.
///
/// # Errors
/// The first entry that is not a length.
pub fn list(text: &str, unit: LengthUnit) -> Result<Vec<f64>, String> {
    let mut entries: Vec<String> = Vec::new();
    let text = text.replace(", ", " ");
    for part in text.split(|c: char| c.is_whitespace() || c == ';').filter(|part| !part.is_empty()) {
        let is_unit = UNITS.iter().any(|(word, _)| part.eq_ignore_ascii_case(word));
        match entries.last_mut() {
            Some(before) if is_unit => before.push_str(part),
            _ => entries.push(part.to_owned()),
        }
    }
    entries.iter().map(|entry| read(entry, unit)).collect()
}

fn refused(text: &str) -> String {
    format!(
        "“{}” is not a length; write it as 12.5, 0.8 mm, 25.5in, 25 1/2\" or 12 thou",
        shorten(text.trim())
    )
}

/// The text in lower case with plain blanks, signs and fractions.
fn plain(text: &str) -> String {
    let mut plain = String::new();
    let letters: Vec<char> = text.trim().chars().collect();
    for (i, letter) in letters.iter().enumerate() {
        match letter {
            ',' => plain.push('.'),
            '−' | '–' => plain.push('-'),
            '⁄' | '∕' => plain.push('/'),
            '”' | '“' => plain.push('"'),
            '’' | '′' => plain.push('\''),
            '½' => plain.push_str(" 1/2"),
            '¼' => plain.push_str(" 1/4"),
            '¾' => plain.push_str(" 3/4"),
            '⅛' => plain.push_str(" 1/8"),
            '⅜' => plain.push_str(" 3/8"),
            '⅝' => plain.push_str(" 5/8"),
            '⅞' => plain.push_str(" 7/8"),
            thin if is_thin(*thin) && groups_thousands(&letters, i) => {}
            blank if blank.is_whitespace() || is_thin(*blank) => plain.push(' '),
            other => plain.extend(other.to_lowercase()),
        }
    }
    plain.trim().to_owned()
}

/// Whether this is one of the narrow or unbroken blanks that group digits.
fn is_thin(c: char) -> bool {
    matches!(c, '\u{2009}' | '\u{202f}' | '\u{a0}' | '\u{2007}' | '\u{2008}' | '\u{200a}')
}

/// Whether the blank at `i` parts thousands: a digit before it, exactly three behind it.
fn groups_thousands(letters: &[char], i: usize) -> bool {
    let digit = |at: usize| letters.get(at).is_some_and(char::is_ascii_digit);
    let before = i.checked_sub(1).is_some_and(digit);
    let goes_on = letters.get(i + 4).is_some_and(|c| c.is_ascii_digit() || matches!(c, '/' | '⁄'));
    before && (1..=3).all(|k| digit(i + k)) && !goes_on
}

/// The number's text, and the millimetres in its unit where it names one.
fn split_unit(plain: &str) -> (&str, Option<f64>) {
    let found = UNITS.iter().find_map(|(word, mm)| Some((plain.strip_suffix(word)?, *mm)));
    found.map_or((plain, None), |(body, mm)| (body.trim_end(), Some(mm)))
}

/// A decimal, a fraction, or whole and fraction with a blank or a hyphen between; and whether it is a fraction.
fn number(body: &str) -> Option<(f64, bool)> {
    let Some((upper, under)) = body.split_once('/') else {
        return Some((parse::number(body).ok()?, false));
    };
    let (sign, upper) = upper.strip_prefix('-').map_or((1.0, upper), |rest| (-1.0, rest));
    let (whole, over) = upper.trim_end().rsplit_once([' ', '-']).unwrap_or(("0", upper));
    let (whole, over, under) = (count(whole)?, count(over)?, count(under)?);
    (under > 0.0).then(|| (sign * (whole + over / under), true))
}

/// A whole number of at most nine digits.
fn count(text: &str) -> Option<f64> {
    let digits = text.trim();
    let sound = !digits.is_empty() && digits.len() <= 9 && digits.bytes().all(|b| b.is_ascii_digit());
    if sound { digits.parse().ok() } else { None }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use proptest::prelude::*;

    use super::super::Fineness;
    use super::*;

    const MM: LengthUnit = LengthUnit::Millimetres;
    const INCH: LengthUnit = LengthUnit::Inches;

    /// Lengths by hand from 25.4 mm to the inch.
    #[test]
    fn a_length_is_read_in_the_ways_of_the_trade_whatever_the_unit() {
        for (text, expected_mm) in [
            ("647.7 mm", 647.7),
            ("647,7mm", 647.7),
            ("25.5in", 647.7),
            ("25 1/2\"", 647.7),
            ("25-1/2 in", 647.7),
            ("25½\"", 647.7),
            ("25½ in.", 647.7),
            ("25 1⁄2", 647.7),
            ("3/32", 2.38125),
            ("3/32\"", 2.38125),
            ("-1/64", -0.396875),
            ("0.8 mm", 0.8),
            ("0.8\u{202f}mm", 0.8),
            ("12 thou", 0.3048),
            ("12THOU", 0.3048),
            ("64.77 cm", 647.7),
            ("1\u{2009}500 mm", 1500.0),
            ("25\u{2009}1/2", 647.7),
            ("1/2 mm", 0.5),
        ] {
            for unit in LengthUnit::ALL {
                assert_eq!(read(text, unit), Ok(expected_mm), "{text} in {unit:?}");
            }
        }
    }

    #[test]
    fn a_bare_number_is_in_the_unit_of_the_window() {
        assert_eq!(read("25.5", INCH), Ok(647.7));
        assert_eq!(read(" 25,5 ", MM), Ok(25.5));
        assert_eq!(read("−1.5", MM), Ok(-1.5));
        assert_eq!(read("0.012", INCH), Ok(0.3048));
    }

    #[test]
    fn what_is_no_length_is_refused_with_the_ways_to_write_one() {
        for text in
            ["x", "1/0", "/", "1/", "1 2", "3//4", "1/2/3", "mm", "\"", "1e999", "inf mm", "1.5/2", "2 -1/2/"]
        {
            for unit in LengthUnit::ALL {
                let error = read(text, unit).unwrap_err();
                assert!(error.contains("25 1/2\""), "{text}: {error}");
            }
        }
        assert!(read("", MM).is_err());
        assert!(
            read("2'", MM).unwrap_err().contains("feet") && read("2 ft", INCH).unwrap_err().contains("feet")
        );
    }

    #[test]
    fn lists_hold_lengths_with_units() {
        assert_eq!(list("1.5 2,5\n3;4", MM).unwrap(), [1.5, 2.5, 3.0, 4.0]);
        assert_eq!(list("1, 2, 3", MM).unwrap(), [1.0, 2.0, 3.0]);
        assert_eq!(list("1 mm 1in 12 thou 3/32", MM).unwrap(), [1.0, 25.4, 0.3048, 2.38125]);
        assert_eq!(list("1 0.5", INCH).unwrap(), [25.4, 12.7]);
        assert!(list("1 two", MM).is_err());
    }

    proptest! {
        #[test]
        fn no_text_is_too_odd_to_be_refused(text in ".{0,40}", inch in any::<bool>()) {
            let unit = if inch { INCH } else { MM };
            if let Ok(length_mm) = read(&text, unit) {
                prop_assert!(length_mm.is_finite());
            }
            let _ = list(&text, unit);
        }

        #[test]
        fn texts_of_figures_and_signs_never_break_it(text in "[0-9 ./,'\"inmthou½−-]{0,16}") {
            if let Ok(length_mm) = read(&text, INCH) {
                prop_assert!(length_mm.is_finite());
            }
        }

        #[test]
        fn what_is_shown_reads_back(length_mm in -2000.0f64..2000.0) {
            for unit in LengthUnit::ALL {
                for fineness in [Fineness::Decimals, Fineness::Fractions] {
                    let shown = unit.shown(length_mm, fineness);
                    let apart = (read(&shown, unit).unwrap() - length_mm).abs();
                    // Half of what is shown, and the dust of twelve significant digits.
                    prop_assert!(apart <= 0.5 * unit.shown_to_mm() + 1e-8, "{shown} in {unit:?}");
                }
            }
        }

        #[test]
        fn exact_fractions_come_back_as_they_were(parts in 0u32..6400) {
            let length_mm = f64::from(parts) * MM_PER_INCH / 64.0;
            let shown = INCH.shown(length_mm, Fineness::Fractions);
            prop_assert!((read(&shown, INCH).unwrap() - length_mm).abs() < 1e-8, "{}", shown);
            prop_assert!(!shown.contains('.'), "{}", shown);
        }
    }
}
