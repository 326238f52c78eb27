//! Lines of text: cleaned, measured and cut to their box.

use crate::font::{SUBSTITUTE, advance_em, font_size_mm, glyph, ink_em};
use crate::{Point, Rect, pt};

/// A line of text.
#[derive(Debug, Clone, PartialEq)]
pub struct Text {
    /// Where its anchor stands: on the baseline, or half a capital above it.
    pub at: Point,
    /// Height of capitals (ISO 3098), mm.
    pub height_mm: f64,
    /// Direction of the baseline, degrees anticlockwise from x.
    pub angle_deg: f64,
    /// Which part of the line stands at `at`.
    pub anchor: Anchor,
    /// The words as given; they are cleaned and cut when they are drawn.
    pub content: String,
    /// Longest allowed line, mm; what is longer ends in an ellipsis.
    pub max_width_mm: Option<f64>,
}

impl Text {
    /// A level line of text that starts at a point on its baseline.
    #[must_use]
    pub fn new(at: Point, height_mm: f64, content: impl Into<String>) -> Self {
        let content = content.into();
        Self { at, height_mm, angle_deg: 0.0, anchor: Anchor::Start, content, max_width_mm: None }
    }

    /// The same text held by another part.
    #[must_use]
    pub fn anchored(self, anchor: Anchor) -> Self {
        Self { anchor, ..self }
    }

    /// The same text turned.
    #[must_use]
    pub fn turned(self, angle_deg: f64) -> Self {
        Self { angle_deg, ..self }
    }

    /// The same text, no longer than a width, mm.
    #[must_use]
    pub fn within(self, max_width_mm: f64) -> Self {
        Self { max_width_mm: Some(max_width_mm), ..self }
    }

    /// The text as it is drawn: cleaned, cut and placed.
    #[must_use]
    pub fn run(&self) -> TextRun {
        let clean = clean(&self.content);
        let content = match self.max_width_mm {
            Some(width_mm) => fit(&clean, self.height_mm, width_mm),
            None => clean,
        };
        let width_mm = width_mm(&content, self.height_mm);
        let along = Point::direction(self.angle_deg);
        let (back_mm, down_mm) = match self.anchor {
            Anchor::Start => (0.0, 0.0),
            Anchor::Middle => (width_mm / 2.0, 0.0),
            Anchor::End => (width_mm, 0.0),
            Anchor::Centre => (width_mm / 2.0, self.height_mm / 2.0),
        };
        let start = self.at.toward(along, -back_mm).toward(along.left(), -down_mm);
        TextRun {
            start,
            at: self.at,
            anchor: self.anchor,
            height_mm: self.height_mm,
            angle_deg: self.angle_deg,
            width_mm,
            content,
        }
    }
}

/// Which part of a line of text stands at its point.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Anchor {
    /// The start of the baseline.
    Start,
    /// The middle of the baseline.
    Middle,
    /// The end of the baseline.
    End,
    /// The middle of the line, half a capital above the baseline.
    Centre,
}

/// A line of text ready to be drawn: nothing in it needs cleaning or cutting.
#[derive(Debug, Clone, PartialEq)]
pub struct TextRun {
    /// Start of the baseline.
    pub start: Point,
    /// The anchor's point.
    pub at: Point,
    /// Which part stands at `at`.
    pub anchor: Anchor,
    /// Height of capitals, mm.
    pub height_mm: f64,
    /// Direction of the baseline, degrees anticlockwise from x.
    pub angle_deg: f64,
    /// Length by the font's advance widths, mm.
    pub width_mm: f64,
    /// The words.
    pub content: String,
}

impl TextRun {
    /// Size of the em, mm.
    #[must_use]
    pub fn font_size_mm(&self) -> f64 {
        font_size_mm(self.height_mm)
    }

    /// The corners of the box around advance widths and ink, anticlockwise from the lower start.
    #[must_use]
    pub fn corners(&self) -> [Point; 4] {
        let size = self.font_size_mm();
        let (low, high) = self
            .content
            .chars()
            .map(ink_em)
            .fold((0.0_f64, 0.0_f64), |(low, high), ink| (low.min(ink.0), high.max(ink.1)));
        let along = Point::direction(self.angle_deg);
        let place = |x: f64, y: f64| self.start.toward(along, x).toward(along.left(), y);
        [(0.0, low), (self.width_mm, low), (self.width_mm, high), (0.0, high)]
            .map(|(x, y)| place(x, y * size))
    }

    /// The level box around [`Self::corners`].
    #[must_use]
    pub fn bounds(&self) -> Rect {
        Rect::around(self.corners()).unwrap_or(Rect { min: pt(0.0, 0.0), max: pt(0.0, 0.0) })
    }
}

/// Length of a line by the font's advance widths, mm.
#[must_use]
pub fn width_mm(content: &str, height_mm: f64) -> f64 {
    content.chars().map(advance_em).sum::<f64>() * font_size_mm(height_mm)
}

/// Text in which every character can be shown as it stands: line breaks, tabs and other controls become
/// a space, marks without a width that only steer layout are left out, and what the font lacks or what
/// would need shaping from right to left becomes [`SUBSTITUTE`].
#[must_use]
pub fn clean(content: &str) -> String {
    content.chars().filter_map(shown).collect()
}

fn shown(character: char) -> Option<char> {
    match character {
        _ if character.is_control() || character == '\u{2028}' || character == '\u{2029}' => Some(' '),
        '\u{AD}' | '\u{200B}'..='\u{200F}' | '\u{202A}'..='\u{202E}' | '\u{2060}'..='\u{206F}' => None,
        '\u{FEFF}' | '\u{FE00}'..='\u{FE0F}' | '\u{FFF9}'..='\u{FFFB}' => None,
        ' '..='~' => Some(character),
        _ if runs_right_to_left(character) || glyph(character).is_none() => Some(SUBSTITUTE),
        _ => Some(character),
    }
}

/// The blocks whose letters run from right to left (Unicode, bidirectional classes R and AL).
fn runs_right_to_left(character: char) -> bool {
    matches!(character, '\u{590}'..='\u{8FF}' | '\u{FB1D}'..='\u{FDFF}' | '\u{FE70}'..='\u{FEFE}'
        | '\u{10800}'..='\u{10FFF}' | '\u{1E800}'..='\u{1EFFF}')
}

/// Cuts a clean line so that it is no longer than a width, with an ellipsis where something is missing.
/// A width in which not even the ellipsis fits gives an empty line.
#[must_use]
pub fn fit(content: &str, height_mm: f64, max_width_mm: f64) -> String {
    const ELLIPSIS: char = '…';
    let size = font_size_mm(height_mm);
    if width_mm(content, height_mm) <= max_width_mm {
        return content.to_owned();
    }
    let mut left_mm = max_width_mm - advance_em(ELLIPSIS) * size;
    if left_mm < 0.0 {
        return String::new();
    }
    let mut cut = String::new();
    for character in content.chars() {
        left_mm -= advance_em(character) * size;
        if left_mm < 0.0 {
            break;
        }
        cut.push(character);
    }
    let mut cut = cut.trim_end().to_owned();
    cut.push(ELLIPSIS);
    cut
}

/// Breaks a text at its spaces into lines no longer than a width; a longer word is cut.
#[must_use]
pub fn wrap(content: &str, height_mm: f64, max_width_mm: f64) -> Vec<String> {
    let mut lines: Vec<String> = vec![];
    for word in clean(content).split_whitespace() {
        let longer = lines.last().map(|line| format!("{line} {word}"));
        match (longer, lines.last_mut()) {
            (Some(longer), Some(line)) if width_mm(&longer, height_mm) <= max_width_mm => *line = longer,
            _ => lines.push(fit(word, height_mm, max_width_mm)),
        }
    }
    lines
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    #[test]
    fn a_width_is_the_sum_of_the_fonts_advances() {
        // Advance widths of DejaVu Sans 2.37 in 2048ths of the em, read with fontTools: a 1255, … 2048.
        let expected = (1255.0 + 2048.0) / 1493.0 * 3.5;
        assert!((width_mm("a…", 3.5) - expected).abs() < 1e-9);
    }

    #[test]
    fn controls_and_unknown_characters_become_harmless() {
        assert_eq!(clean("a\nb\tc\u{0}d"), "a b c d");
        assert_eq!(clean("a\u{202E}b\u{FEFF}"), "ab");
        assert_eq!(clean("שלום 弦"), "□□□□ □");
        assert_eq!(clean("žluťoučký Ω ♯"), "žluťoučký Ω ♯");
    }

    #[test]
    fn wrapped_lines_hold_all_words() {
        let lines = wrap("the quick brown fox jumps over the lazy dog", 2.5, 30.0);
        assert!(lines.len() > 1 && lines.iter().all(|line| width_mm(line, 2.5) <= 30.0));
        assert_eq!(lines.join(" "), "the quick brown fox jumps over the lazy dog");
    }

    proptest! {
        #[test]
        fn a_cut_line_fits_and_starts_as_it_did(content in ".{0,60}", width in 0.0..80.0_f64) {
            let clean = clean(&content);
            let cut = fit(&clean, 2.5, width);
            prop_assert!(width_mm(&cut, 2.5) <= width);
            prop_assert!(cut == clean || cut.is_empty() || clean.starts_with(cut.trim_end_matches('…')));
            prop_assert!(!cut.chars().any(char::is_control));
        }
    }
}
