//! How the window was arranged when it was last closed.

use std::path::Path;

use serde_json::{Value, json};

use super::place;
use crate::shell::options::{Options, size_is_sensible};
use crate::units::LengthUnit;
use crate::view::{Page, ThemeChoice};

const FILE: &str = "layout.json";

/// What is remembered of the arrangement; what was never set is none.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Layout {
    /// The page that was shown.
    pub page: Option<Page>,
    /// Light or dark.
    pub theme: Option<ThemeChoice>,
    /// The unit of lengths.
    pub unit: Option<LengthUnit>,
    /// Scale of all text, 0.8 to 2.
    pub zoom: Option<f32>,
    /// Whether the inputs were shown.
    pub inputs: Option<bool>,
    /// Width of the inputs, points.
    pub inputs_width: Option<f32>,
    /// Size of the window, points at zoom 1.
    pub size: Option<[f32; 2]>,
}

impl Layout {
    /// Reads it; what is missing or broken is left out.
    #[must_use]
    pub fn read(folder: &Path) -> Self {
        let whole = place::text(&folder.join(FILE)).and_then(|text| serde_json::from_str(&text).ok());
        let whole: Value = whole.unwrap_or_default();
        let word = |key: &str| whole.get(key).and_then(Value::as_str);
        let number = |value: Option<&Value>| value.and_then(Value::as_f64).map(|number| number as f32);
        let size = match (number(whole.pointer("/size/0")), number(whole.pointer("/size/1"))) {
            (Some(width), Some(height)) => Some([width, height]).filter(size_is_sensible),
            _ => None,
        };
        Self {
            page: word("page").and_then(Options::page_named),
            theme: word("theme").and_then(Options::theme_named),
            unit: word("unit").and_then(LengthUnit::of_word),
            zoom: number(whole.get("zoom")).filter(|zoom| (0.8..=2.0).contains(zoom)),
            inputs: whole.get("inputs").and_then(Value::as_bool),
            inputs_width: number(whole.get("inputs_width")).filter(|width| (100.0..=2000.0).contains(width)),
            size,
        }
    }

    /// Writes it. One that cannot be written is forgotten; that is no reason to bother anyone.
    pub fn write(&self, folder: &Path) {
        let whole = json!({
            "page": self.page.map(Options::page_word),
            "theme": self.theme.map(Options::theme_word),
            "unit": self.unit.map(LengthUnit::word),
            "zoom": self.zoom,
            "inputs": self.inputs,
            "inputs_width": self.inputs_width,
            "size": self.size,
        });
        let _ = place::write(&folder.join(FILE), &format!("{whole:#}\n"));
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn it_comes_back_as_it_was() {
        let folder = tempfile::tempdir().unwrap();
        let layout = Layout {
            page: Some(Page::Sheets),
            theme: Some(ThemeChoice::Dark),
            unit: Some(LengthUnit::Inches),
            zoom: Some(1.25),
            inputs: Some(false),
            inputs_width: Some(500.0),
            size: Some([1400.0, 900.0]),
        };
        layout.write(folder.path());
        assert_eq!(Layout::read(folder.path()), layout);
        assert_eq!(Layout::read(&folder.path().join("none")), Layout::default());
    }

    #[test]
    fn what_is_broken_is_left_out() {
        let folder = tempfile::tempdir().unwrap();
        for text in ["", "{", "3", r#"{"page": "moon", "zoom": 40, "size": [1, 1], "inputs": "yes"}"#] {
            std::fs::write(folder.path().join(FILE), text).unwrap();
            assert_eq!(Layout::read(folder.path()), Layout::default(), "{text}");
        }
        let text = r#"{"page": "compare", "zoom": "large", "size": [1, null], "inputs_width": 1e300}"#;
        std::fs::write(folder.path().join(FILE), text).unwrap();
        assert_eq!(Layout::read(folder.path()), Layout { page: Some(Page::Compare), ..Layout::default() });
    }
}
