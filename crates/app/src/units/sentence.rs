//! Lengths inside sentences: faults and notices of the plan speak in millimetres, the window in its own unit.

use crestline_plan::Fault;

use super::{Fineness, LengthUnit};

/// A fault in words, without its path, its lengths in `unit`.
#[must_use]
pub fn fault_words(fault: &Fault, unit: LengthUnit) -> String {
    let allowed = in_unit(&fault.allowed, unit);
    let is_length = fault.allowed.ends_with(" mm");
    let found = match fault.found.parse::<f64>() {
        Ok(found_mm) if is_length && unit != LengthUnit::Millimetres => {
            format!("{} {}", unit.shown(found_mm, Fineness::Decimals), unit.sign())
        }
        _ => in_unit(&fault.found, unit),
    };
    format!("{found}; allowed: {allowed}")
}

/// The text with every length that it names in millimetres, such as `2.3 mm` or `0.05 to 10 mm`, in `unit`.
#[must_use]
pub fn in_unit(text: &str, unit: LengthUnit) -> String {
    if unit == LengthUnit::Millimetres {
        return text.to_owned();
    }
    let mut words: Vec<String> = text.split(' ').map(str::to_owned).collect();
    for at in 1..words.len() {
        let Some(after) = words[at].strip_prefix("mm").filter(|rest| rest.chars().all(is_stop)) else {
            continue;
        };
        let sign = format!("{}{after}", unit.sign());
        let Some(last) = converted(&words[at - 1], unit) else { continue };
        words[at] = sign;
        words[at - 1] = last;
        let is_range = at >= 3 && matches!(words[at - 2].as_str(), "to" | "and" | "or" | "×");
        if let Some(first) = is_range.then(|| converted(&words[at - 3], unit)).flatten() {
            words[at - 3] = first;
        }
    }
    words.join(" ")
}

/// Whether the character may stand right behind a unit.
fn is_stop(c: char) -> bool {
    matches!(c, '.' | ',' | ';' | ':' | ')' | '?')
}

/// A number in millimetres, perhaps behind a bracket, in `unit`.
fn converted(word: &str, unit: LengthUnit) -> Option<String> {
    let number = word.trim_start_matches('(');
    let bracket = &word[..word.len() - number.len()];
    let length_mm: f64 = number.replace('−', "-").parse().ok()?;
    let shown = unit.shown(length_mm, Fineness::Decimals);
    let shown = match number.chars().next() {
        Some('−') => shown.replace('-', "−"),
        Some('+') => format!("+{shown}"),
        _ => shown,
    };
    length_mm.is_finite().then(|| format!("{bracket}{shown}"))
}

#[cfg(test)]
mod tests {
    use super::*;

    const INCH: LengthUnit = LengthUnit::Inches;

    #[test]
    fn faults_name_the_range_in_the_unit_of_the_window() {
        let fault = Fault::new("instrument.scale_mm", "64", "200 to 1500 mm");
        assert_eq!(fault_words(&fault, LengthUnit::Millimetres), "64; allowed: 200 to 1500 mm");
        assert_eq!(fault_words(&fault, INCH), "2.5197 in; allowed: 7.874 to 59.0551 in");
        let other = Fault::new("instrument.frets", "8", "12 to 36");
        assert_eq!(fault_words(&other, INCH), "8; allowed: 12 to 36");
    }

    #[test]
    fn sentences_keep_all_but_their_lengths() {
        assert_eq!(
            in_unit("the crest stands −2.54 mm off (25.4 mm), 3 N", INCH),
            "the crest stands −0.1 in off (1 in), 3 N"
        );
        assert_eq!(in_unit("30 N·mm² and mm", INCH), "30 N·mm² and mm");
        assert_eq!(
            in_unit("string 1 +2.54 mm, string 2 1 mm.", INCH),
            "string 1 +0.1 in, string 2 0.0394 in."
        );
        assert_eq!(in_unit("from 1 to 2 mm", INCH), "from 0.0394 to 0.0787 in");
        assert_eq!(in_unit("", INCH), "");
    }
}
