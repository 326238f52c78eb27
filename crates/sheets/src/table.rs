//! Tables: cells in rows with rules between.

use crestline_drawing::{Anchor, lettering, pt};

use crate::block::{Block, MEDIUM, THIN, small};
use crate::layers::TABLE;

/// Height of a line of text in a table, mm.
const LINE_MM: f64 = 4.4;
/// Space between a cell's edge and its text, mm.
const PAD_MM: f64 = 1.0;

/// A table in the making.
pub(crate) struct Table {
    /// Heading of every column in up to three lines, and its width in mm.
    pub columns: Vec<Column>,
    pub rows: Vec<Vec<String>>,
}

/// A column.
pub(crate) struct Column {
    pub heading: [&'static str; 2],
    /// The unit in the third line of the heading.
    pub unit: &'static str,
    pub width_mm: f64,
    /// Whether it holds numbers, which stand at the right.
    pub number: bool,
}

impl Table {
    /// Width of all columns, mm.
    pub fn width_mm(&self) -> f64 {
        self.columns.iter().map(|c| c.width_mm).sum()
    }

    /// Draws the table with its upper left corner at the origin.
    pub fn draw(&self, block: &mut Block) {
        let width_mm = self.width_mm();
        let head_mm = 3.0 * LINE_MM + PAD_MM;
        self.draw_heading(block);
        block.line(TABLE, MEDIUM, pt(0.0, 0.0), pt(width_mm, 0.0));
        block.line(TABLE, MEDIUM, pt(0.0, -head_mm), pt(width_mm, -head_mm));
        let row_mm = LINE_MM + PAD_MM;
        let mut y_mm = -head_mm;
        for row in &self.rows {
            self.draw_row(block, row, y_mm - row_mm + PAD_MM + 0.5);
            y_mm -= row_mm;
            block.line(TABLE, THIN, pt(0.0, y_mm), pt(width_mm, y_mm));
        }
        let mut x_mm = 0.0;
        block.line(TABLE, MEDIUM, pt(0.0, 0.0), pt(0.0, y_mm));
        for column in &self.columns {
            x_mm += column.width_mm;
            let last = (x_mm - width_mm).abs() < 1e-9;
            block.line(TABLE, if last { MEDIUM } else { THIN }, pt(x_mm, 0.0), pt(x_mm, y_mm));
        }
        block.line(TABLE, MEDIUM, pt(0.0, y_mm), pt(width_mm, y_mm));
    }

    fn draw_heading(&self, block: &mut Block) {
        let mut x_mm = 0.0;
        for column in &self.columns {
            let lines = [column.heading[0], column.heading[1], column.unit];
            for (line, down) in lines.into_iter().zip([1.0, 2.0, 3.0]) {
                if !line.is_empty() {
                    cell(block, column, x_mm, -down * LINE_MM + 0.6, line);
                }
            }
            x_mm += column.width_mm;
        }
    }

    fn draw_row(&self, block: &mut Block, row: &[String], baseline_mm: f64) {
        let mut x_mm = 0.0;
        for (column, words) in self.columns.iter().zip(row) {
            cell(block, column, x_mm, baseline_mm, words);
            x_mm += column.width_mm;
        }
    }
}

fn cell(block: &mut Block, column: &Column, left_mm: f64, baseline_mm: f64, words: &str) {
    let (x, anchor) = if column.number {
        (left_mm + column.width_mm - PAD_MM, Anchor::End)
    } else {
        (left_mm + PAD_MM, Anchor::Start)
    };
    let text = small(pt(x, baseline_mm), anchor, words).within(column.width_mm - 2.0 * PAD_MM);
    debug_assert!((text.height_mm - lettering::SMALL_MM).abs() < 1e-12);
    block.add(TABLE, THIN, crestline_drawing::Shape::Text(text));
}
