//! In which fields two plans differ, for questions about which of them to keep.

use crestline_plan::Plan;
use serde_json::Value;

use crate::fields::form::place_in_words;

/// So many fields are named; the rest is counted.
const MOST_NAMED: usize = 4;
/// The longest text of a value, in letters.
const LONGEST_VALUE: usize = 24;

/// The fields in which `other` differs from `one`, a line each: field, value in `one`, value in `other`.
/// Empty where they are the same.
#[must_use]
pub fn lines(one: &Plan, other: &Plan) -> Vec<String> {
    let value = |plan| serde_json::from_str::<Value>(&crestline_plan::write(plan)).unwrap_or_default();
    let mut all = Vec::new();
    collect("", &value(one), &value(other), &mut all);
    let more = all.len().saturating_sub(MOST_NAMED);
    all.truncate(MOST_NAMED);
    if more > 0 {
        all.push(format!("and {more} more"));
    }
    all
}

fn collect(path: &str, one: &Value, other: &Value, all: &mut Vec<String>) {
    match (one, other) {
        (Value::Object(a), Value::Object(b)) => {
            let keys = a.keys().chain(b.keys().filter(|key| !a.contains_key(*key)));
            for key in keys {
                let below = if path.is_empty() { key.clone() } else { format!("{path}.{key}") };
                let at = |map: &serde_json::Map<String, Value>| map.get(key).cloned().unwrap_or_default();
                collect(&below, &at(a), &at(b), all);
            }
        }
        (Value::Array(a), Value::Array(b)) if a.len() == b.len() => {
            for (index, (a, b)) in a.iter().zip(b).enumerate() {
                collect(&format!("{path}[{index}]"), a, b, all);
            }
        }
        (one, other) if one != other => {
            all.push(format!("{}: {} → {}", place_in_words(path), short(one), short(other)))
        }
        _ => {}
    }
}

fn short(value: &Value) -> String {
    match value {
        Value::Null => "nothing".to_owned(),
        Value::Array(list) => format!("{} of them", list.len()),
        Value::Object(_) => "given".to_owned(),
        Value::String(text) if text.chars().count() > LONGEST_VALUE => {
            format!("“{}…”", text.chars().take(LONGEST_VALUE).collect::<String>())
        }
        Value::String(text) => format!("“{text}”"),
        other => other.to_string(),
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crestline_plan::{example, read};

    #[test]
    fn what_differs_is_named_and_the_rest_counted() {
        let one = read(example("steel_six").unwrap().text).unwrap();
        assert!(lines(&one, &one).is_empty());
        let mut other = one.clone();
        other.instrument.relief_mm = 0.5;
        assert_eq!(lines(&one, &other), ["Instrument, relief: 0.15 → 0.5"]);
        for string in &mut other.strings {
            string.action_mm.twelfth = 3.25;
        }
        let named = lines(&one, &other);
        assert_eq!(named.len(), MOST_NAMED + 1);
        assert_eq!(named.last().map(String::as_str), Some("and 3 more"), "seven fields in all");
        other.strings.pop();
        assert!(lines(&one, &other).contains(&"Strings: 6 of them → 5 of them".to_owned()));
    }
}
