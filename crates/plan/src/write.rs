//! From a [`Plan`] to a file's text: JSON with the keys in the order of the format, indented, short lists and
//! objects on one line.

use serde::Serialize;
use serde_json::Value;

use crate::{FORMAT, Plan, VERSION};

/// Longest list or object that is kept on one line, in characters.
const LONGEST_LINE: usize = 100;

#[derive(Serialize)]
struct File<'p> {
    format: &'static str,
    version: u64,
    #[serde(flatten)]
    plan: &'p Plan,
}

/// The plan as the text of a file, indented, with a line end at its end. [`crate::read`] gives the same plan back,
/// digit for digit. A number that is not finite is written as `null`, which no reader takes for a number.
#[must_use]
pub fn write(plan: &Plan) -> String {
    let file = File { format: FORMAT, version: VERSION, plan };
    // Every type of a plan has text keys and plain values, which serde_json never refuses.
    let value = serde_json::to_value(file).unwrap_or_default();
    let mut text = String::new();
    block(&value, 0, &mut text);
    text.push('\n');
    text
}

fn block(value: &Value, depth: usize, text: &mut String) {
    if let Some(line) = one_line(value)
        && line.chars().count() <= LONGEST_LINE
        && depth > 0
    {
        text.push_str(&line);
        return;
    }
    match value {
        Value::Array(items) => {
            let items = items.iter().map(|item| (None, item));
            lines(('[', ']'), items, depth, text);
        }
        Value::Object(entries) => {
            let items = entries.iter().map(|(key, item)| (Some(key.as_str()), item));
            lines(('{', '}'), items, depth, text);
        }
        plain => text.push_str(&scalar(plain)),
    }
}

fn lines<'v>(
    (open, close): (char, char),
    items: impl Iterator<Item = (Option<&'v str>, &'v Value)>,
    depth: usize,
    text: &mut String,
) {
    text.push(open);
    for (place, (key, item)) in items.enumerate() {
        text.push_str(if place == 0 { "\n" } else { ",\n" });
        text.push_str(&"  ".repeat(depth + 1));
        if let Some(key) = key {
            text.push_str(&format!("{}: ", Value::from(key)));
        }
        block(item, depth + 1, text);
    }
    text.push('\n');
    text.push_str(&"  ".repeat(depth));
    text.push(close);
}

/// The value on one line, where it holds nothing but plain values and lists of them.
fn one_line(value: &Value) -> Option<String> {
    match value {
        Value::Array(items) => plain_list(items),
        Value::Object(entries) if entries.is_empty() => Some("{}".to_owned()),
        Value::Object(entries) => {
            let field = |(key, item): (&String, &Value)| {
                let item = match item {
                    Value::Array(items) => plain_list(items)?,
                    Value::Object(_) => return None,
                    plain => scalar(plain),
                };
                Some(format!("{}: {item}", Value::from(key.as_str())))
            };
            let fields: Option<Vec<String>> = entries.iter().map(field).collect();
            fields.map(|fields| format!("{{ {} }}", fields.join(", ")))
        }
        _ => None,
    }
}

fn plain_list(items: &[Value]) -> Option<String> {
    let plain = |item: &Value| (!item.is_array() && !item.is_object()).then(|| scalar(item));
    let items: Option<Vec<String>> = items.iter().map(plain).collect();
    items.map(|items| format!("[{}]", items.join(", ")))
}

/// A plain value; a whole number without the `.0` that serde_json puts behind it.
fn scalar(value: &Value) -> String {
    let text = value.to_string();
    match (value, text.strip_suffix(".0")) {
        (Value::Number(_), Some(whole)) if whole != "-0" => whole.to_owned(),
        _ => text,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{Instrument, PlanString, Spread, read_draft};

    fn plan() -> Plan {
        Plan::new(
            Instrument::ordinary(650.0, 20, Spread { nut: 0.0, saddle: 0.0 }),
            vec![PlanString::starting(1, false)],
        )
    }

    #[test]
    fn short_parts_stand_on_a_line_and_long_ones_do_not() {
        let text = write(&plan());
        assert!(
            text.contains("\n  \"fit\": { \"rule\": \"least_squares\", \"frets\": [1, 12] },\n"),
            "{text}"
        );
        assert!(text.contains("\n      \"core\": {\n        \"shape\": \"round\",\n"), "{text}");
        assert!(text.lines().all(|line| line.chars().count() < 130), "{text}");
    }

    #[test]
    fn numbers_keep_every_digit() {
        for value in [650.0, 0.1 + 0.2, 1e-7, 123_456_789.123_456_78, 5e-324, -0.0, 1e22] {
            let mut plan = plan();
            plan.instrument.relief_mm = value;
            let back = read_draft(&write(&plan)).map(|plan| plan.instrument.relief_mm.to_bits());
            assert_eq!(back, Ok(value.to_bits()), "{value}");
        }
    }

    #[test]
    fn a_number_that_is_none_cannot_be_read_as_one() {
        let mut plan = plan();
        plan.instrument.relief_mm = f64::NAN;
        assert!(write(&plan).contains("\"relief_mm\": null"));
        assert_eq!(read_draft(&write(&plan)).map_err(|faults| faults.len()), Err(1));
    }
}
