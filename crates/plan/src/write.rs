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

/// The value on one line, where it holds nothing but plain values.
fn one_line(value: &Value) -> Option<String> {
    let plain = |item: &Value| !item.is_array() && !item.is_object();
    match value {
        Value::Array(items) if items.iter().all(plain) => {
            Some(format!("[{}]", items.iter().map(scalar).collect::<Vec<_>>().join(", ")))
        }
        Value::Object(entries) if entries.is_empty() => Some("{}".to_owned()),
        Value::Object(entries) if entries.values().all(plain) => {
            let fields =
                entries.iter().map(|(key, item)| format!("{}: {}", Value::from(key.as_str()), scalar(item)));
            Some(format!("{{ {} }}", fields.collect::<Vec<_>>().join(", ")))
        }
        _ => None,
    }
}

/// A plain value; a whole number without the `.0` that serde_json puts behind it.
fn scalar(value: &Value) -> String {
    let text = value.to_string();
    match (value, text.strip_suffix(".0")) {
        (Value::Number(_), Some(whole)) if whole != "-0" => whole.to_owned(),
        _ => text,
    }
}
