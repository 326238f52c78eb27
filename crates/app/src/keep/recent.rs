//! The plans that were open lately.

use std::path::{Path, PathBuf};

use serde_json::{Value, json};

use super::place;

/// So many are remembered.
pub const MOST: usize = 10;
const FILE: &str = "recent.json";

/// The list, the latest first, in the state folder where there is one.
#[derive(Debug, Default)]
pub struct Recent {
    folder: Option<PathBuf>,
    plans: Vec<PathBuf>,
}

impl Recent {
    /// Reads the list; a file that is missing or broken is an empty list.
    #[must_use]
    pub fn read(folder: Option<&Path>) -> Self {
        let plans = folder.and_then(|folder| place::text(&folder.join(FILE))).map(|text| parse(&text));
        Self { folder: folder.map(Path::to_owned), plans: plans.unwrap_or_default() }
    }

    /// The plans, the latest first. Some may not exist any more.
    #[must_use]
    pub fn plans(&self) -> &[PathBuf] {
        &self.plans
    }

    /// Puts a plan first. What other windows have put there meanwhile stays.
    pub fn add(&mut self, path: &Path) {
        let path = super::autosave::whole(path);
        if let Some(folder) = self.folder.clone() {
            *self = Self::read(Some(&folder));
        }
        self.plans.retain(|plan| *plan != path);
        self.plans.insert(0, path);
        self.plans.truncate(MOST);
        self.write();
    }

    /// Takes a plan off, because it is not there any more.
    pub fn remove(&mut self, path: &Path) {
        self.plans.retain(|plan| plan != path);
        self.write();
    }

    /// A list that cannot be written is forgotten with the window; that is no reason to bother anyone.
    fn write(&self) {
        let Some(folder) = &self.folder else { return };
        let plans: Vec<_> = self.plans.iter().filter_map(|path| path.to_str()).collect();
        let text = format!("{:#}\n", json!({ "plans": plans }));
        let _ = place::write(&folder.join(FILE), &text);
    }
}

fn parse(text: &str) -> Vec<PathBuf> {
    let whole: Value = serde_json::from_str(text).unwrap_or_default();
    let list = whole.get("plans").and_then(Value::as_array).cloned().unwrap_or_default();
    let paths = list.iter().filter_map(Value::as_str).map(PathBuf::from);
    paths.filter(|path| path.is_absolute()).take(MOST).collect()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn the_latest_stands_first_once_and_the_list_comes_back() {
        let folder = tempfile::tempdir().unwrap();
        let mut recent = Recent::read(Some(folder.path()));
        let mut other = Recent::read(Some(folder.path()));
        for name in ["/a", "/b", "/a"] {
            recent.add(Path::new(name));
        }
        other.add(Path::new("/c"));
        let wanted = ["/c", "/a", "/b"].map(PathBuf::from);
        assert_eq!(Recent::read(Some(folder.path())).plans(), wanted, "also with what another window added");
        for number in 0..30 {
            recent.add(&PathBuf::from(format!("/{number}")));
        }
        assert_eq!(recent.plans().len(), MOST);
        recent.remove(Path::new("/29"));
        assert_eq!(Recent::read(Some(folder.path())).plans()[0], PathBuf::from("/28"));
    }

    #[test]
    fn a_broken_list_is_an_empty_one() {
        let folder = tempfile::tempdir().unwrap();
        for text in ["", "{", "[1]", "{\"plans\": 3}", "{\"plans\": [1, null, \"relative\"]}"] {
            std::fs::write(folder.path().join(FILE), text).unwrap();
            assert!(Recent::read(Some(folder.path())).plans().is_empty(), "{text}");
        }
        std::fs::write(folder.path().join(FILE), [0xff, 0xfe]).unwrap();
        assert!(Recent::read(Some(folder.path())).plans().is_empty());
    }
}
