//! Tables of aligned columns for a terminal.

use crate::text::width;

/// Spaces between two columns.
const GAP: usize = 2;

/// Where a column's text stands.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Align {
    /// At the left, for words.
    Left,
    /// At the right, for numbers of equal decimals.
    Right,
}

/// One column: two lines of heading and its alignment.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Column {
    /// The heading's two lines; the second holds the unit or the qualifier.
    pub head: [&'static str; 2],
    /// Where its text stands.
    pub align: Align,
}

impl Column {
    /// A column of words.
    pub(crate) fn words(first: &'static str, second: &'static str) -> Self {
        Self { head: [first, second], align: Align::Left }
    }

    /// A column of numbers.
    pub(crate) fn numbers(first: &'static str, second: &'static str) -> Self {
        Self { head: [first, second], align: Align::Right }
    }
}

/// The table as lines, each ended: the heading's two lines, then the rows. Rows are as long as `columns`.
pub(crate) fn rendered(columns: &[Column], rows: &[Vec<String>]) -> String {
    let widths: Vec<usize> =
        columns.iter().enumerate().map(|(i, column)| column_width(column, rows, i)).collect();
    let heads =
        [0, 1].map(|line| columns.iter().map(|column| column.head[line].to_owned()).collect::<Vec<_>>());
    let mut shown = String::new();
    for row in heads.iter().chain(rows) {
        shown.push_str(&line(columns, &widths, row));
        shown.push('\n');
    }
    shown
}

fn column_width(column: &Column, rows: &[Vec<String>], index: usize) -> usize {
    let heads = column.head.iter().map(|head| width(head));
    let cells = rows.iter().filter_map(|row| row.get(index)).map(|cell| width(cell));
    heads.chain(cells).max().unwrap_or(0)
}

fn line(columns: &[Column], widths: &[usize], cells: &[String]) -> String {
    let gap = " ".repeat(GAP);
    let padded = columns.iter().zip(widths).zip(cells).map(|((column, &full), cell)| {
        let room = " ".repeat(full.saturating_sub(width(cell)));
        match column.align {
            Align::Left => format!("{cell}{room}"),
            Align::Right => format!("{room}{cell}"),
        }
    });
    padded.collect::<Vec<_>>().join(&gap).trim_end().to_owned()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn words_stand_left_and_numbers_right_under_their_headings() {
        let columns =
            [Column::numbers("No.", ""), Column::words("Name", ""), Column::numbers("Tension", "N")];
        let row = |cells: [&str; 3]| cells.map(str::to_owned).to_vec();
        let shown = rendered(&columns, &[row(["1", "é", "72.5"]), row(["12", "long", "104.2"])]);
        let expected = "No.  Name  Tension\n                 N\n  1  é        72.5\n 12  long    104.2\n";
        assert_eq!(shown, expected);
    }
}
