//! What is being typed in a field, and what is wrong with it.

use std::collections::BTreeMap;

/// The text of a field that cannot be shown from the plan alone.
#[derive(Debug, Clone, PartialEq)]
pub struct Draft {
    /// The text as typed.
    pub text: String,
    /// The text that stood there before; the plan keeps its value while what is typed cannot be read.
    pub start: String,
    /// The lengths that `start` shows, mm, where the field is for lengths: its text may show less than the plan holds.
    pub start_mm: Option<Vec<f64>>,
    /// What is wrong with it, where it could not be taken into the plan.
    pub error: Option<String>,
}

/// The drafts by path of their field.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Drafts(BTreeMap<String, Draft>);

impl Drafts {
    /// The draft of a field.
    #[must_use]
    pub fn get(&self, path: &str) -> Option<&Draft> {
        self.0.get(path)
    }

    /// Keeps what is typed in a field.
    pub fn keep(&mut self, path: &str, draft: Draft) {
        self.0.insert(path.to_owned(), draft);
    }

    /// Keeps the lengths with which the typing in a field began.
    pub fn keep_start_mm(&mut self, path: &str, start_mm: Vec<f64>) {
        if let Some(draft) = self.0.get_mut(path) {
            draft.start_mm = Some(start_mm);
        }
    }

    /// Forgets what was typed in a field.
    pub fn forget(&mut self, path: &str) {
        self.0.remove(path);
    }

    /// Forgets everything, because the plan has been changed from elsewhere.
    pub fn clear(&mut self) {
        self.0.clear();
    }

    /// The fields whose text could not be taken into the plan: path and what is wrong.
    pub fn errors(&self) -> impl Iterator<Item = (&str, &str)> {
        self.0.iter().filter_map(|(path, draft)| Some((path.as_str(), draft.error.as_deref()?)))
    }
}
