//! How the window opens: from the environment, so that pictures of it can be taken by a script.
//!
//! `CRESTLINE_PAGE` is a page's name in lower case with hyphens (`saddle`, `fretted-notes`), `CRESTLINE_THEME`
//! is `light`, `dark` or `system`, `CRESTLINE_UNITS` is `mm` or `inch`, and `CRESTLINE_SIZE` is a size in points such as
//! `1280x800`.
//! `CRESTLINE_STATE` is the folder that remembers what outlives the window, its last arrangement among it, which
//! stands behind the other variables.
//! `CRESTLINE_PAINTER` is `processor` to do without OpenGL.
//! With `CRESTLINE_TIMING` set, the time to the first frame and the steps done so far are told on standard error. What is not understood is passed over.

use std::path::PathBuf;

use crate::keep::layout::Layout;
use crate::keep::place::state_folder;
use crate::units::LengthUnit;
use crate::view::{Page, ThemeChoice, View};

/// Size of the window where nothing else is asked for, points.
const USUAL_SIZE: [f32; 2] = [1280.0, 800.0];
/// The smallest window that everything still fits in, points.
pub const LEAST_SIZE: [f32; 2] = [860.0, 560.0];

/// How the window opens.
#[derive(Debug, Clone, PartialEq)]
pub struct Options {
    /// The page that it opens on.
    pub page: Page,
    /// Light or dark.
    pub theme: ThemeChoice,
    /// The unit of lengths.
    pub unit: LengthUnit,
    /// Its size in points.
    pub size: [f32; 2],
    /// Scale of all text.
    pub zoom: f32,
    /// Whether the inputs are shown.
    pub inputs: bool,
    /// Width of the inputs in points, where it is not the usual one.
    pub inputs_width: Option<f32>,
    /// Whether to tell the time to the first frame.
    pub timing: bool,
    /// What paints the window.
    pub painter: PaintedBy,
    /// The folder for what outlives the window; without one nothing is remembered.
    pub state: Option<PathBuf>,
}

impl Options {
    /// Reads the options through `variable`, which looks a name up in the environment.
    pub fn read(variable: impl Fn(&str) -> Option<String>) -> Self {
        let page = variable("CRESTLINE_PAGE").and_then(|word| Self::page_named(&word));
        let theme = variable("CRESTLINE_THEME").and_then(|word| Self::theme_named(&word));
        let unit = variable("CRESTLINE_UNITS").and_then(|word| LengthUnit::of_word(&word));
        let size = variable("CRESTLINE_SIZE").and_then(|word| size(&word));
        let state = state_folder(&variable);
        let last = state.as_deref().map(Layout::read).unwrap_or_default();
        Self {
            page: page.or(last.page).unwrap_or(Page::Saddle),
            theme: theme.or(last.theme).unwrap_or_default(),
            unit: unit.or(last.unit).unwrap_or_default(),
            size: size.or(last.size).unwrap_or(USUAL_SIZE),
            zoom: last.zoom.unwrap_or(1.0),
            inputs: last.inputs.unwrap_or(true),
            inputs_width: last.inputs_width,
            timing: variable("CRESTLINE_TIMING").is_some(),
            painter: painter(variable("CRESTLINE_PAINTER").as_deref()),
            state,
        }
    }

    /// The window's state as it opens.
    #[must_use]
    pub fn view(&self) -> View {
        View { page: self.page, theme: self.theme, unit: self.unit, inputs: self.inputs, ..View::new() }
    }

    /// The word for a page.
    #[must_use]
    pub fn page_word(page: Page) -> String {
        page.name().to_lowercase().replace(' ', "-")
    }

    /// The page of a word.
    #[must_use]
    pub fn page_named(word: &str) -> Option<Page> {
        Page::ALL.into_iter().find(|page| Self::page_word(*page) == word)
    }

    /// The word for a choice of colours.
    #[must_use]
    pub fn theme_word(theme: ThemeChoice) -> &'static str {
        match theme {
            ThemeChoice::Light => "light",
            ThemeChoice::Dark => "dark",
            ThemeChoice::System => "system",
        }
    }

    /// The choice of colours of a word.
    #[must_use]
    pub fn theme_named(word: &str) -> Option<ThemeChoice> {
        ThemeChoice::ALL.into_iter().find(|theme| Self::theme_word(*theme) == word)
    }
}

/// Whether a window can have this size in points.
#[must_use]
pub fn size_is_sensible(size: &[f32; 2]) -> bool {
    size.iter().zip(LEAST_SIZE).all(|(side, least)| (least..=16_384.0).contains(side))
}

/// What paints the window.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum PaintedBy {
    /// OpenGL, by a graphics card or in software.
    OpenGl,
    /// The processor, because somebody wants it.
    Processor,
    /// The processor, because there was no OpenGL: this is said once.
    ProcessorInstead,
}

fn painter(word: Option<&str>) -> PaintedBy {
    match word {
        Some("processor") => PaintedBy::Processor,
        Some("processor-instead") => PaintedBy::ProcessorInstead,
        _ => PaintedBy::OpenGl,
    }
}

fn size(word: &str) -> Option<[f32; 2]> {
    let (width, height) = word.split_once('x')?;
    Some([width.parse().ok()?, height.parse().ok()?]).filter(size_is_sensible)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn what_is_understood_is_taken_and_the_rest_passed_over() {
        let given = Options::read(|name| match name {
            "CRESTLINE_PAGE" => Some("fretted-notes".into()),
            "CRESTLINE_THEME" => Some("dark".into()),
            "CRESTLINE_UNITS" => Some("inch".into()),
            "CRESTLINE_SIZE" => Some("1920x1080".into()),
            _ => None,
        });
        let usual = Options {
            page: Page::Saddle,
            theme: ThemeChoice::System,
            unit: LengthUnit::Millimetres,
            size: USUAL_SIZE,
            zoom: 1.0,
            inputs: true,
            inputs_width: None,
            timing: false,
            painter: PaintedBy::OpenGl,
            state: None,
        };
        let wanted = Options {
            page: Page::FrettedNotes,
            theme: ThemeChoice::Dark,
            unit: LengthUnit::Inches,
            size: [1920.0, 1080.0],
            ..usual.clone()
        };
        assert_eq!(given, wanted);
        let odd = Options::read(|_| Some("NaNx5".into()));
        assert_eq!(odd, Options { timing: true, ..usual });
    }

    #[test]
    fn the_last_arrangement_is_taken_where_the_environment_says_nothing() {
        let folder = tempfile::tempdir().unwrap();
        let last = Layout {
            page: Some(Page::Compare),
            theme: Some(ThemeChoice::Dark),
            zoom: Some(1.5),
            ..Layout::default()
        };
        last.write(folder.path());
        let options = Options::read(|name| match name {
            "CRESTLINE_STATE" => folder.path().to_str().map(str::to_owned),
            "CRESTLINE_THEME" => Some("light".into()),
            _ => None,
        });
        assert_eq!((options.page, options.theme, options.zoom), (Page::Compare, ThemeChoice::Light, 1.5));
    }
}
