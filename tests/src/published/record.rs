//! What the checks compare, kept as they compare it: the page of published values is made of this.

use std::cell::RefCell;

/// How a value was come by.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum By {
    /// Read in the source itself.
    Read,
    /// Read in the source's abstract.
    AbstractRead,
    /// Read in a text that quotes the source.
    SecondHand,
    /// Remembered and not looked up; with how surely.
    Memory(&'static str),
    /// From a definition or an exact equation, with 30-digit arithmetic.
    Computed,
    /// A fact of the trade without a source.
    CommonPractice,
}

impl By {
    /// The words of the page.
    pub fn words(self) -> String {
        match self {
            Self::Read => "read".to_owned(),
            Self::AbstractRead => "abstract read".to_owned(),
            Self::SecondHand => "second-hand".to_owned(),
            Self::Memory(how) => format!("memory ({how})"),
            Self::Computed => "computed".to_owned(),
            Self::CommonPractice => "common practice".to_owned(),
        }
    }
}

/// A published value, or the ends of a published band, beside ours.
#[derive(Debug, Clone)]
pub struct Row {
    /// What it is, with its unit.
    pub what: String,
    /// Lowest and highest published value; twice the same where one value is published.
    pub published: [f64; 2],
    /// Ours.
    pub ours: f64,
    /// How far ours may lie outside.
    pub allowed: f64,
    /// Why the two disagree, where they do.
    pub disagrees: Option<String>,
}

impl Row {
    /// How far ours lies above the published band (positive), below it (negative) or within (zero).
    pub fn off(&self) -> f64 {
        self.ours - self.ours.clamp(self.published[0], self.published[1])
    }
}

/// A source and what was compared with it.
#[derive(Debug, Clone)]
pub struct Compared {
    /// Author, title, place and year, or what else the values come from.
    pub source: &'static str,
    /// How the values were come by.
    pub by: By,
    /// The values.
    pub rows: Vec<Row>,
}

thread_local! {
    static RECORD: RefCell<Vec<Compared>> = const { RefCell::new(Vec::new()) };
}

/// Hands over what was recorded on this thread, and begins anew.
pub fn take() -> Vec<Compared> {
    RECORD.take()
}

/// Says where the values compared from here on come from.
pub fn origin(source: &'static str, by: By) {
    RECORD.with_borrow_mut(|record| record.push(Compared { source, by, rows: Vec::new() }));
}

#[track_caller]
fn record(row: Row) {
    RECORD.with_borrow_mut(|record| {
        let compared = record.last_mut().expect("a check names the origin of its values first");
        compared.rows.push(row);
    });
}

/// Fails where ours is farther from the published value than allowed, with all three in the message.
#[track_caller]
pub fn assert_near(ours: f64, published: f64, allowed: f64, what: &str) {
    assert_between(ours, [published; 2], allowed, what);
}

/// Fails where ours lies farther outside the published band than allowed.
#[track_caller]
pub fn assert_between(ours: f64, published: [f64; 2], allowed: f64, what: &str) {
    let row = Row { what: what.to_owned(), published, ours, allowed, disagrees: None };
    assert!(
        row.off().abs() <= allowed,
        "{what}: found {ours}, expected {published:?} within {allowed}, off by {}",
        row.off()
    );
    record(row);
}

/// For values that disagree: fails where ours lies within the published band after all, so that the page must say so
/// no longer, or farther outside than allowed.
#[track_caller]
pub fn assert_apart(ours: f64, published: [f64; 2], allowed: f64, what: &str, why: &str) {
    let row = Row { what: what.to_owned(), published, ours, allowed, disagrees: Some(why.to_owned()) };
    let off = row.off().abs();
    assert!(off > 0.0, "{what}: found {ours}, which agrees with {published:?} and should be listed so");
    assert!(off <= allowed, "{what}: found {ours}, expected within {allowed} of {published:?}");
    record(row);
}
