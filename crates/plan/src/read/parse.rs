//! JSON text to a [`Node`], hostile text included.
//!
//! serde_json does the parsing, with its own limit on nesting (128). Two things are added: a record of where the
//! parser stands, so that a fault can name its field, and numbers that no `f64` holds, which would otherwise stop
//! the reading at the first of them.

use std::cell::RefCell;
use std::fmt;

use serde::de::{DeserializeSeed, Deserializer, MapAccess, SeqAccess, Visitor};

use super::node::{Node, Step, path_words};
use crate::Fault;

/// Largest text that is looked at. A plan with the most strings, frets and readings allowed has a tenth of it.
const LARGEST_TEXT_BYTES: usize = 4 * 1024 * 1024;
/// How many numbers beyond `f64` are passed over before the text is given up as broken.
const MOST_TOO_LARGE: usize = 20;
/// What takes the place of such a number; every one of them is at least a character longer.
const PLACEHOLDER: &str = "null";

/// Parses a text.
pub(super) fn parse(text: &str) -> Result<Node, Fault> {
    if text.len() > LARGEST_TEXT_BYTES {
        let found = format!("{} bytes of text", text.len());
        return Err(Fault::new("", found, format!("a plan of at most {LARGEST_TEXT_BYTES} bytes")));
    }
    // Some editors put a byte order mark in front of UTF-8.
    let mut text = text.strip_prefix('\u{feff}').unwrap_or(text).to_owned();
    let mut too_large: Vec<(Vec<Step>, String)> = vec![];
    loop {
        let trail = RefCell::new(vec![]);
        match parse_once(&text, &trail) {
            Ok(mut root) => {
                for (steps, written) in too_large {
                    if let Some(place) = root.at(&steps) {
                        *place = Node::TooLarge(written);
                    }
                }
                return Ok(root);
            }
            Err(error) => match take_large_number(&mut text, &error) {
                Some(written) if too_large.len() < MOST_TOO_LARGE => {
                    too_large.push((trail.into_inner(), written))
                }
                _ => return Err(syntax_fault(&error, &trail.into_inner())),
            },
        }
    }
}

fn parse_once(text: &str, trail: &RefCell<Vec<Step>>) -> Result<Node, serde_json::Error> {
    let mut deserializer = serde_json::Deserializer::from_str(text);
    let root = NodeSeed { trail }.deserialize(&mut deserializer)?;
    deserializer.end()?;
    Ok(root)
}

fn syntax_fault(error: &serde_json::Error, trail: &[Step]) -> Fault {
    let (line, column) = (error.line(), error.column());
    let words = error.to_string();
    let reason = words.split(" at line ").next().unwrap_or_default();
    let found = format!("text that is not JSON at line {line}, column {column}: {reason}");
    Fault::new(path_words(trail), found, "a plan in JSON")
}

/// Where `error` says that a number is out of range, takes that number out of the text and hands it back.
fn take_large_number(text: &mut String, error: &serde_json::Error) -> Option<String> {
    if !error.to_string().starts_with("number out of range") {
        return None;
    }
    let line_start = match error.line() {
        0 | 1 => 0,
        line => text.match_indices('\n').nth(line - 2)?.0 + 1,
    };
    let bytes = text.as_bytes();
    let of_number = |at: &usize| bytes.get(*at).is_some_and(|b| b.is_ascii_digit() || b"+-.eE".contains(b));
    // The parser stops somewhere inside the number or just behind it.
    let stopped = (line_start + error.column()).min(bytes.len());
    let inside = (line_start..=stopped).rev().find(of_number)?;
    let start = (line_start..=inside).rev().take_while(of_number).last()?;
    let end = (inside..bytes.len()).take_while(of_number).last()? + 1;
    let written = text.get(start..end)?.to_owned();
    if written.len() < PLACEHOLDER.len() {
        return None;
    }
    text.replace_range(start..end, &format!("{PLACEHOLDER:<width$}", width = written.len()));
    Some(written)
}

/// Builds a [`Node`]; `trail` holds the way to the value being read, and stays where it was when reading fails.
#[derive(Clone, Copy)]
struct NodeSeed<'t> {
    trail: &'t RefCell<Vec<Step>>,
}

impl NodeSeed<'_> {
    fn enter(self, step: Step) -> Self {
        self.trail.borrow_mut().push(step);
        self
    }

    fn leave(self) {
        self.trail.borrow_mut().pop();
    }
}

impl<'de> DeserializeSeed<'de> for NodeSeed<'_> {
    type Value = Node;

    fn deserialize<D: Deserializer<'de>>(self, deserializer: D) -> Result<Node, D::Error> {
        deserializer.deserialize_any(self)
    }
}

impl<'de> Visitor<'de> for NodeSeed<'_> {
    type Value = Node;

    fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str("a JSON value")
    }

    fn visit_unit<E>(self) -> Result<Node, E> {
        Ok(Node::Null)
    }

    fn visit_bool<E>(self, value: bool) -> Result<Node, E> {
        Ok(Node::Flag(value))
    }

    // Whole numbers beyond 2^53 lose digits here; no field of a plan reaches so far.
    fn visit_u64<E>(self, value: u64) -> Result<Node, E> {
        Ok(Node::Number(value as f64))
    }

    fn visit_i64<E>(self, value: i64) -> Result<Node, E> {
        Ok(Node::Number(value as f64))
    }

    fn visit_f64<E>(self, value: f64) -> Result<Node, E> {
        Ok(Node::Number(value))
    }

    fn visit_str<E>(self, value: &str) -> Result<Node, E> {
        Ok(Node::Text(value.to_owned()))
    }

    fn visit_seq<A: SeqAccess<'de>>(self, mut seq: A) -> Result<Node, A::Error> {
        let mut items = vec![];
        while let Some(item) = seq.next_element_seed(self.enter(Step::Item(items.len())))? {
            self.leave();
            items.push(item);
        }
        self.leave();
        Ok(Node::List(items))
    }

    fn visit_map<A: MapAccess<'de>>(self, mut map: A) -> Result<Node, A::Error> {
        let mut entries = vec![];
        while let Some(key) = map.next_key::<String>()? {
            let value = map.next_value_seed(self.enter(Step::Key(key.clone())))?;
            self.leave();
            entries.push((key, value));
        }
        Ok(Node::Object(entries))
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, clippy::panic)]
    use super::*;
    use std::time::{Duration, Instant};

    #[test]
    fn broken_text_is_placed_by_line_column_and_field() {
        let fault = parse("{\n  \"strings\": [ {\"core\": {\"diameter_mm\": 0.3,, }} ]\n}").unwrap_err();
        assert_eq!(fault.path, "strings[0].core");
        assert!(fault.found.contains("line 2, column 45"), "{fault}");
    }

    #[test]
    fn order_and_repeated_keys_are_kept() {
        let root = parse(r#"{"b": 1, "a": [null, true], "b": "x"}"#).unwrap();
        let Node::Object(entries) = root else { panic!("{root:?}") };
        let keys: Vec<&str> = entries.iter().map(|(key, _)| key.as_str()).collect();
        assert_eq!(keys, ["b", "a", "b"]);
        assert_eq!(entries[1].1, Node::List(vec![Node::Null, Node::Flag(true)]));
    }

    #[test]
    fn numbers_beyond_f64_are_kept_as_they_were_written() {
        let digits = "9".repeat(400);
        let text = format!("[1,\n {{\"x\": 1e999 }}, -2.5e+400,{digits}\n,1e-999, 1e99999999999]");
        let large = |written: &str| Node::TooLarge(written.to_owned());
        let expected = vec![
            Node::Number(1.0),
            Node::Object(vec![("x".to_owned(), large("1e999"))]),
            large("-2.5e+400"),
            large(&digits),
            Node::Number(0.0),
            large("1e99999999999"),
        ];
        assert_eq!(parse(&text).unwrap(), Node::List(expected));
    }

    #[test]
    fn very_many_of_them_end_the_reading() {
        let fault = parse(&format!("[{}1]", "1e999,".repeat(MOST_TOO_LARGE + 1))).unwrap_err();
        assert_eq!(fault.path, format!("[{MOST_TOO_LARGE}]"));
        assert!(fault.found.contains("number out of range"), "{fault}");
    }

    #[test]
    fn hostile_texts_are_refused_at_once() {
        // Generous for a slow machine without optimisation; reading them through would take far longer.
        const QUICKLY: Duration = Duration::from_secs(1);
        let large = "[0,".repeat(100_000_000 / 3);
        let deep = "[".repeat(100_000);
        let deep_objects = "{\"a\":".repeat(100_000);
        for text in [large, deep, deep_objects] {
            let start = Instant::now();
            assert!(parse(&text).is_err());
            assert!(start.elapsed() < QUICKLY);
        }
    }

    #[test]
    fn a_byte_order_mark_is_passed_over() {
        assert_eq!(parse("\u{feff}[]").unwrap(), Node::List(vec![]));
        assert!(parse("").is_err() && parse("  ").is_err() && parse("{} {}").is_err());
    }
}
