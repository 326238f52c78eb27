//! A place in the file while it is read: the value there, if there is one, and its path for faults.
//!
//! Every reader returns a value whatever happens: where none can be had, a fault is logged, the place is
//! remembered as unread, and a stand-in comes back that the checks pass over.

use std::cell::{Cell, RefCell};

use super::node::{Node, key_path};
use crate::fault::quoted;
use crate::limits::{Range, number_words};
use crate::{Fault, Word};

/// Most faults that are listed one by one.
const MOST_FAULTS: usize = 1000;
/// Most items of a list that are looked at; no list of a plan may have as many.
const LONGEST_LIST: usize = 4096;

/// The faults found so far, and the places that could not be read.
#[derive(Debug, Default)]
pub(super) struct Log {
    faults: RefCell<Vec<Fault>>,
    unread: RefCell<Vec<String>>,
    further: Cell<usize>,
}

impl Log {
    fn note(&self, fault: Fault) {
        let mut faults = self.faults.borrow_mut();
        if faults.len() < MOST_FAULTS {
            faults.push(fault);
        } else {
            self.further.set(self.further.get() + 1);
        }
    }

    fn note_unread(&self, path: &str) {
        let mut unread = self.unread.borrow_mut();
        if unread.len() < MOST_FAULTS {
            unread.push(path.to_owned());
        }
    }

    /// The paths of places that hold a stand-in.
    pub(super) fn unread(&self) -> Vec<String> {
        self.unread.borrow().clone()
    }

    /// All faults, followed by `more`.
    pub(super) fn into_faults(self, more: Vec<Fault>) -> Vec<Fault> {
        for fault in more {
            self.note(fault);
        }
        let mut faults = self.faults.into_inner();
        if self.further.get() > 0 {
            let found = format!("{} further faults, which are not listed", self.further.get());
            faults.push(Fault::new("", found, "none"));
        }
        faults
    }
}

#[derive(Clone, Copy)]
enum Found<'n> {
    Here(&'n Node),
    Missing,
    /// Inside something that could not be read and has its fault already.
    Passed,
}

/// A place in the file.
pub(super) struct Spot<'n> {
    path: String,
    found: Found<'n>,
    log: &'n Log,
}

impl<'n> Spot<'n> {
    pub(super) fn root(node: &'n Node, log: &'n Log) -> Self {
        Self { path: String::new(), found: Found::Here(node), log }
    }

    /// Logs that something else than `allowed` is here.
    pub(super) fn wrong(&self, allowed: &str) {
        match self.found {
            Found::Passed => {}
            Found::Missing => self.odd("nothing", allowed),
            Found::Here(node) => self.odd(&node_words(node), allowed),
        }
    }

    /// Logs that this place cannot be read, in the words given.
    pub(super) fn odd(&self, found: &str, allowed: &str) {
        self.log.note(Fault::new(&self.path, found, allowed));
        self.log.note_unread(&self.path);
    }

    /// What `pick` makes of the value, or a fault and `stand_in`.
    fn pick<T>(&self, allowed: &str, stand_in: T, pick: impl FnOnce(&'n Node) -> Option<T>) -> T {
        if let Found::Here(node) = self.found
            && let Some(value) = pick(node)
        {
            return value;
        }
        self.wrong(allowed);
        stand_in
    }

    /// What `read` makes of the place, where the file has something there.
    pub(super) fn if_given<T>(&self, read: impl FnOnce(&Self) -> T) -> Option<T> {
        matches!(self.found, Found::Here(_)).then(|| read(self))
    }

    /// As [`if_given`](Self::if_given), where `null` stands for nothing too.
    pub(super) fn optional<T>(&self, read: impl FnOnce(&Self) -> T) -> Option<T> {
        if let Found::Here(Node::Null) = self.found { None } else { self.if_given(read) }
    }

    pub(super) fn number(&self, range: &Range) -> f64 {
        match self.found {
            Found::Here(Node::Number(value)) => *value,
            _ => self.number_else(&format!("a number, {}", range.words())),
        }
    }

    /// A number, where something else may stand here too.
    pub(super) fn number_else(&self, allowed: &str) -> f64 {
        self.pick(allowed, f64::NAN, |node| if let Node::Number(value) = node { Some(*value) } else { None })
    }

    pub(super) fn number_or(&self, range: &Range, otherwise: f64) -> f64 {
        self.if_given(|spot| spot.number(range)).unwrap_or(otherwise)
    }

    pub(super) fn number_if_any(&self, range: &Range) -> Option<f64> {
        self.optional(|spot| spot.number(range))
    }

    /// A whole number that is not negative.
    pub(super) fn count(&self, allowed: &str) -> u32 {
        self.pick(allowed, 0, |node| match node {
            Node::Number(value) if value.fract() == 0.0 && (0.0..=f64::from(u32::MAX)).contains(value) => {
                // Whole and within range by the guard, so the cast is exact.
                Some(*value as u32)
            }
            _ => None,
        })
    }

    /// Nothing but this number.
    pub(super) fn exactly(&self, value: f64, allowed: &str) {
        self.pick(allowed, (), |node| {
            if let Node::Number(found) = node { (*found == value).then_some(()) } else { None }
        });
    }

    pub(super) fn flag_or(&self, otherwise: bool) -> bool {
        let flag = |spot: &Self| {
            spot.pick("true or false", otherwise, |node| {
                if let Node::Flag(flag) = node { Some(*flag) } else { None }
            })
        };
        self.if_given(flag).unwrap_or(otherwise)
    }

    /// The text here, or a fault.
    pub(super) fn text_of(&self, allowed: &str) -> Option<&'n str> {
        self.pick(
            allowed,
            None,
            |node| if let Node::Text(text) = node { Some(Some(text.as_str())) } else { None },
        )
    }

    pub(super) fn text_or(&self, otherwise: &str) -> String {
        self.if_given(|spot| spot.text_of("a text")).flatten().unwrap_or(otherwise).to_owned()
    }

    /// One of the words of a choice; `stand_in` where it is none.
    pub(super) fn word<T: Word>(&self, stand_in: T) -> T {
        self.pick(&T::all_words(), stand_in, |node| match node {
            Node::Text(word) => T::from_word(word),
            _ => None,
        })
    }

    /// A list, each item read with its index.
    pub(super) fn list<T>(&self, allowed: &str, read: impl Fn(&Self, usize) -> T) -> Vec<T> {
        let items =
            self.pick(
                allowed,
                &[][..],
                |node| if let Node::List(items) = node { Some(&items[..]) } else { None },
            );
        if items.len() > LONGEST_LIST {
            self.wrong(&format!("{allowed} with fewer than {LONGEST_LIST} items"));
        }
        let item = |(index, node): (usize, &'n Node)| {
            let path = format!("{}[{index}]", self.path);
            read(&Spot { path, found: Found::Here(node), log: self.log }, index)
        };
        items.iter().take(LONGEST_LIST).enumerate().map(item).collect()
    }

    /// A list of numbers.
    pub(super) fn numbers(&self, range: &Range) -> Vec<f64> {
        self.list(&format!("a list of numbers, {}", range.words()), |spot, _| spot.number(range))
    }

    /// Exactly `N` values.
    pub(super) fn array<T: Copy, const N: usize>(
        &self,
        allowed: &str,
        stand_in: T,
        read: impl Fn(&Self) -> T,
    ) -> [T; N] {
        let is_list = matches!(self.found, Found::Here(Node::List(items)) if items.len() == N);
        if !is_list {
            self.wrong(allowed);
            return [stand_in; N];
        }
        let items = self.list(allowed, |spot, _| read(spot));
        std::array::from_fn(|index| items.get(index).copied().unwrap_or(stand_in))
    }

    /// The two ends of a range.
    pub(super) fn ends(&self, range: &Range) -> [f64; 2] {
        self.array(&format!("two numbers, {}", range.words()), f64::NAN, |spot| spot.number(range))
    }

    /// Whether the value here is an object.
    pub(super) fn is_object(&self) -> bool {
        matches!(self.found, Found::Here(Node::Object(_)))
    }

    /// The fields of an object that may have these keys.
    pub(super) fn object(&self, keys: &'static [&'static str]) -> Fields<'n> {
        let entries = if let Found::Here(Node::Object(entries)) = self.found {
            Some(&entries[..])
        } else {
            self.wrong(&format!("an object with the keys {}", keys.join(", ")));
            None
        };
        let fields = Fields { path: self.path.clone(), entries, log: self.log };
        fields.note_odd_keys(keys);
        fields
    }
}

/// The fields of an object.
pub(super) struct Fields<'n> {
    path: String,
    /// Absent where there is no object; its fields have no faults of their own then.
    entries: Option<&'n [(String, Node)]>,
    log: &'n Log,
}

impl<'n> Fields<'n> {
    pub(super) fn get(&self, key: &str) -> Spot<'n> {
        let found = match self.entries {
            None => Found::Passed,
            Some(entries) => {
                let entry = entries.iter().find(|(name, _)| name == key);
                entry.map_or(Found::Missing, |(_, value)| Found::Here(value))
            }
        };
        Spot { path: key_path(&self.path, key), found, log: self.log }
    }

    pub(super) fn has(&self, key: &str) -> bool {
        self.entries.is_some_and(|entries| entries.iter().any(|(name, _)| name == key))
    }

    fn note_odd_keys(&self, keys: &[&str]) {
        let mut seen = vec![0_usize; keys.len()];
        for (name, _) in self.entries.unwrap_or_default() {
            let path = || key_path(&self.path, name);
            match keys.iter().position(|key| key == name) {
                None => {
                    let allowed = format!("the keys {}", keys.join(", "));
                    self.log.note(Fault::new(path(), "a key that is not known here", allowed));
                }
                Some(place) => {
                    seen[place] += 1;
                    if seen[place] == 2 {
                        self.log.note(Fault::new(path(), "the same key more than once", "each key once"));
                    }
                }
            }
        }
    }
}

fn node_words(node: &Node) -> String {
    match node {
        Node::Null => "null".to_owned(),
        Node::Flag(flag) => flag.to_string(),
        Node::Number(value) => number_words(*value),
        Node::TooLarge(written) => quoted(written).trim_matches('"').to_owned(),
        Node::Text(text) => quoted(text),
        Node::List(items) => format!("a list of {}", items.len()),
        Node::Object(_) => "an object".to_owned(),
    }
}
