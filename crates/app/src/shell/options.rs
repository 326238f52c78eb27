//! How the window opens: from the environment, so that pictures of it can be taken by a script.
//!
//! `CRESTLINE_PAGE` is a page's name in lower case with hyphens (`saddle`, `fretted-notes`), `CRESTLINE_THEME`
//! is `light`, `dark` or `system`, and `CRESTLINE_SIZE` is a size in points such as `1280x800`.
//! With `CRESTLINE_TIMING` set, the time to the first frame is told on standard error. What is not understood is passed over.

use crate::view::{Page, ThemeChoice, View};

/// Size of the window where nothing else is asked for, points.
const USUAL_SIZE: [f32; 2] = [1280.0, 800.0];
/// The smallest window that everything still fits in, points.
pub const LEAST_SIZE: [f32; 2] = [860.0, 560.0];

/// How the window opens.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Options {
    /// The page that it opens on.
    pub page: Page,
    /// Light or dark.
    pub theme: ThemeChoice,
    /// Its size in points.
    pub size: [f32; 2],
    /// Whether to tell the time to the first frame.
    pub timing: bool,
}

impl Options {
    /// Reads the options through `variable`, which looks a name up in the environment.
    pub fn read(variable: impl Fn(&str) -> Option<String>) -> Self {
        let page = variable("CRESTLINE_PAGE").and_then(|word| page(&word));
        let theme = variable("CRESTLINE_THEME").and_then(|word| theme(&word));
        let size = variable("CRESTLINE_SIZE").and_then(|word| size(&word));
        Self {
            page: page.unwrap_or(Page::Saddle),
            theme: theme.unwrap_or_default(),
            size: size.unwrap_or(USUAL_SIZE),
            timing: variable("CRESTLINE_TIMING").is_some(),
        }
    }

    /// The window's state as it opens.
    #[must_use]
    pub fn view(&self) -> View {
        View { page: self.page, theme: self.theme, ..View::new() }
    }
}

fn page(word: &str) -> Option<Page> {
    Page::ALL.into_iter().find(|page| page.name().to_lowercase().replace(' ', "-") == word)
}

fn theme(word: &str) -> Option<ThemeChoice> {
    match word {
        "light" => Some(ThemeChoice::Light),
        "dark" => Some(ThemeChoice::Dark),
        "system" => Some(ThemeChoice::System),
        _ => None,
    }
}

fn size(word: &str) -> Option<[f32; 2]> {
    let (width, height) = word.split_once('x')?;
    let size = [width.parse().ok()?, height.parse().ok()?];
    size.iter()
        .zip(LEAST_SIZE)
        .all(|(side, least): (&f32, f32)| (least..=16_384.0).contains(side))
        .then_some(size)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_understood_is_taken_and_the_rest_passed_over() {
        let given = Options::read(|name| match name {
            "CRESTLINE_PAGE" => Some("fretted-notes".into()),
            "CRESTLINE_THEME" => Some("dark".into()),
            "CRESTLINE_SIZE" => Some("1920x1080".into()),
            _ => None,
        });
        assert_eq!(
            given,
            Options {
                page: Page::FrettedNotes,
                theme: ThemeChoice::Dark,
                size: [1920.0, 1080.0],
                timing: false
            }
        );
        let odd = Options::read(|_| Some("NaNx5".into()));
        assert_eq!(
            odd,
            Options { page: Page::Saddle, theme: ThemeChoice::System, size: USUAL_SIZE, timing: true }
        );
    }
}
