//! A JSON value as it stands in the text: key order and repeated keys are kept, so that both can be spoken of.

use crate::fault::quoted;

/// A JSON value.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Node {
    Null,
    Flag(bool),
    Number(f64),
    /// A number that no `f64` can hold, as it was written.
    TooLarge(String),
    Text(String),
    List(Vec<Node>),
    Object(Vec<(String, Node)>),
}

/// One step of the way from a file's root to a value.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Step {
    Key(String),
    Item(usize),
}

/// The way to a value in the form in which faults name it, such as `strings[2].core.diameter_mm`.
pub(super) fn path_words(steps: &[Step]) -> String {
    steps.iter().fold(String::new(), |path, step| match step {
        Step::Key(key) => key_path(&path, key),
        Step::Item(index) => format!("{path}[{index}]"),
    })
}

/// The path of a key of the object at `path`. A key that is not a plain word is quoted and cut.
pub(super) fn key_path(path: &str, key: &str) -> String {
    let plain =
        !key.is_empty() && key.chars().all(|c| c.is_ascii_alphanumeric() || c == '_') && key.len() <= 60;
    let key = if plain { key.to_owned() } else { quoted(key) };
    if path.is_empty() { key } else { format!("{path}.{key}") }
}

impl Node {
    /// The value at the end of `steps`, where there is one; of repeated keys the last.
    pub(super) fn at(&mut self, steps: &[Step]) -> Option<&mut Self> {
        let Some((step, rest)) = steps.split_first() else {
            return Some(self);
        };
        let next = match (self, step) {
            (Self::Object(entries), Step::Key(key)) => {
                entries.iter_mut().rev().find(|(name, _)| name == key).map(|(_, value)| value)
            }
            (Self::List(items), Step::Item(index)) => items.get_mut(*index),
            _ => None,
        };
        next.and_then(|value| value.at(rest))
    }
}
