//! The list of faults while it grows.

use std::fmt::Display;

use crate::Fault;
use crate::limits::{Range, number_words};

/// Collects faults and knows which paths are sound so far.
pub(super) struct Checker<'u> {
    faults: Vec<Fault>,
    unread: &'u [String],
}

impl<'u> Checker<'u> {
    /// A checker for a plan that holds stand-ins at the paths `unread`.
    pub(super) fn new(unread: &'u [String]) -> Self {
        Self { faults: vec![], unread }
    }

    /// The places that hold a stand-in.
    pub(super) fn unread(&self) -> &'u [String] {
        self.unread
    }

    pub(super) fn into_faults(self) -> Vec<Fault> {
        self.faults
    }

    /// Adds a fault, unless the place is a stand-in or inside one.
    pub(super) fn fault(&mut self, path: impl Display, found: impl Display, allowed: impl Display) {
        let path = path.to_string();
        if !self.unread.iter().any(|unread| is_at_or_under(&path, unread)) {
            self.faults.push(Fault::new(path, found.to_string(), allowed.to_string()));
        }
    }

    /// Holds a value against its range.
    pub(super) fn range(&mut self, path: impl Display, value: f64, range: &Range) {
        if !range.contains(value) {
            self.fault(path, number_words(value), range.words());
        }
    }

    /// Holds a value, where there is one, against its range.
    pub(super) fn range_if_any(&mut self, path: impl Display, value: Option<f64>, range: &Range) {
        if let Some(value) = value {
            self.range(path, value, range);
        }
    }

    /// Whether nothing at these paths, under them or around them is at fault.
    pub(super) fn sound(&self, paths: &[&str]) -> bool {
        !self.bad().any(|bad| paths.iter().any(|path| is_at_or_under(bad, path) || is_at_or_under(path, bad)))
    }

    /// Whether nothing at a path or around it is at fault, whatever is under it: a list's length, say, is known.
    pub(super) fn sound_itself(&self, path: &str) -> bool {
        !self.bad().any(|bad| is_at_or_under(path, bad))
    }

    fn bad(&self) -> impl Iterator<Item = &str> {
        let faults = self.faults.iter().map(|fault| fault.path.as_str());
        faults.chain(self.unread.iter().map(String::as_str))
    }
}

/// Whether `path` is `root` or a field or item of it.
fn is_at_or_under(path: &str, root: &str) -> bool {
    path.strip_prefix(root)
        .is_some_and(|rest| root.is_empty() || rest.is_empty() || rest.starts_with(['.', '[']))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_path_holds_its_fields_and_items_only() {
        for (path, root, inside) in [
            ("strings[1].core", "strings[1]", true),
            ("strings[1]", "strings", true),
            ("strings[12]", "strings[1]", false),
            ("fit.frets", "fit", true),
            ("fitness", "fit", false),
            ("fit", "fit.frets", false),
            ("nut", "", true),
        ] {
            assert_eq!(is_at_or_under(path, root), inside, "{path} in {root}");
        }
    }

    #[test]
    fn stand_ins_have_no_faults_and_are_not_sound() {
        let unread = ["strings[1].core".to_owned()];
        let mut checker = Checker::new(&unread);
        checker.fault("strings[1].core.diameter_mm", "no number", "1 to 2");
        checker.range("nut.travel_mm[0]", f64::NAN, &crate::limits::NUT_TRAVEL_MM);
        assert!(!checker.sound(&["strings[1].core.shape"]) && !checker.sound(&["strings"]));
        assert!(!checker.sound(&["nut"]) && checker.sound(&["strings[0]", "nut.style"]));
        assert_eq!(checker.into_faults().len(), 1);
    }
}
