//! Text that came from a plan, made safe to print and to align.

use unicode_width::{UnicodeWidthChar, UnicodeWidthStr};

/// What stands for a character that must not reach a terminal.
const SUBSTITUTE: char = '\u{fffd}';

/// The widest line of a table or a paragraph, which fits most terminals and a printed page.
pub(crate) const PAGE_WIDTH: usize = 100;

/// The text with a visible substitute for every character that would move the cursor, break the line or
/// turn the writing direction.
pub(crate) fn safe(text: &str) -> String {
    text.chars().map(|c| if is_unsafe(c) { SUBSTITUTE } else { c }).collect()
}

fn is_unsafe(c: char) -> bool {
    let turns_direction =
        matches!(c, '\u{200e}' | '\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}');
    let breaks_line = matches!(c, '\u{2028}' | '\u{2029}');
    c.is_control() || turns_direction || breaks_line
}

/// The number of terminal columns that a text takes.
pub(crate) fn width(text: &str) -> usize {
    UnicodeWidthStr::width(text)
}

/// The text cut to at most `columns` terminal columns, with an ellipsis where something was cut.
pub(crate) fn clipped(text: &str, columns: usize) -> String {
    if width(text) <= columns {
        return text.to_owned();
    }
    let mut room = columns.saturating_sub(1);
    let mut kept = String::new();
    for c in text.chars() {
        let taken = c.width().unwrap_or(0);
        if taken > room {
            break;
        }
        room -= taken;
        kept.push(c);
    }
    kept.push('…');
    kept
}

/// The text broken at spaces into lines of at most `columns` terminal columns; a longer word stands alone.
fn wrapped(text: &str, columns: usize) -> Vec<String> {
    let mut lines = vec![String::new()];
    for word in text.split_whitespace() {
        let last = lines.last().map_or(0, |line| width(line));
        if last > 0 && last + 1 + width(word) > columns {
            lines.push(String::new());
        }
        if let Some(line) = lines.last_mut() {
            if !line.is_empty() {
                line.push(' ');
            }
            line.push_str(word);
        }
    }
    lines
}

/// Adds a paragraph, broken into lines of the page's width, the later ones indented.
pub(crate) fn push_paragraph(text: &mut String, paragraph: &str) {
    const INDENT: &str = "  ";
    for (number, line) in wrapped(paragraph, PAGE_WIDTH - INDENT.len()).iter().enumerate() {
        text.push_str(if number == 0 { "" } else { INDENT });
        text.push_str(line);
        text.push('\n');
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn control_and_direction_characters_become_visible() {
        assert_eq!(safe("a\u{1b}[31mb\tc\u{202e}d"), "a\u{fffd}[31mb\u{fffd}c\u{fffd}d");
        assert_eq!(safe("Ré ♯ 弦"), "Ré ♯ 弦");
    }

    #[test]
    fn clipping_counts_columns_not_bytes() {
        assert_eq!(clipped("abcdef", 6), "abcdef");
        assert_eq!(clipped("abcdefg", 6), "abcde…");
        assert_eq!(clipped("弦弦弦弦", 6), "弦弦…");
        assert!(width(&clipped("弦弦弦弦", 6)) <= 6);
    }

    #[test]
    fn wrapping_keeps_every_word_within_the_width() {
        let lines = wrapped("one two three four", 9);
        assert_eq!(lines, ["one two", "three", "four"]);
        assert_eq!(wrapped("unbreakable", 4), ["unbreakable"]);
        assert_eq!(wrapped("", 4), [""]);
    }
}
