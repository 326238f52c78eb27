//! Blocks placed on sheets in their order, one below the other, in two columns where the paper is wide.
//! Nothing is ever shrunk.

use crestline_drawing::{Rect, pt};

use crate::block::Block;
use crate::tile::tiles;

/// Space between blocks and between columns, mm.
const ROW_GAP_MM: f64 = 7.0;
const COLUMN_GAP_MM: f64 = 12.0;
/// A column must hold the widest table.
const LEAST_COLUMN_MM: f64 = 166.0;
/// Height of a heading with its gap, mm.
const HEADING_MM: f64 = 8.0;
/// A hair of slack, since sums of lengths are rounded.
const SLACK_MM: f64 = 1e-6;

/// Width of a column of an area, mm: half of it where two fit.
pub(crate) fn column_width_mm(area: Rect) -> f64 {
    let half_mm = (area.width() - COLUMN_GAP_MM) / 2.0;
    if half_mm >= LEAST_COLUMN_MM { half_mm } else { area.width() }
}

/// The blocks of every sheet in their places within an area.
pub(crate) fn pack(blocks: Vec<Block>, area: Rect) -> Vec<Vec<Block>> {
    let mut packer = Packer::new(area);
    let groups = group_heights(&blocks);
    for (block, group_mm) in blocks.into_iter().zip(groups) {
        if block.alone {
            packer.new_page();
        }
        let bounds = block.bounds();
        let room_mm = if bounds.width() <= packer.column_mm { packer.column_mm } else { area.width() };
        let whole = block.clone().with_heading(bounds, room_mm);
        let size = whole.bounds();
        if size.width() <= area.width() && size.height() <= area.height() {
            packer.keep_together(group_mm);
            packer.place(whole, size);
        } else {
            for tile in tiles(&block, area.width(), area.height()) {
                let size = tile.bounds();
                packer.new_page();
                packer.place(tile, size);
            }
            packer.new_page();
        }
    }
    packer.pages.retain(|page| !page.is_empty());
    packer.pages
}

/// For the first block of several with one name (nameless ones go with those before them) the height of all
/// of them one below the other; 0 for the others.
fn group_heights(blocks: &[Block]) -> Vec<f64> {
    let mut heights: Vec<f64> = vec![];
    let mut first: Option<usize> = None;
    for (index, block) in blocks.iter().enumerate() {
        let height_mm = block.bounds().height() + if block.title.is_empty() { 0.0 } else { HEADING_MM };
        heights.push(0.0);
        match first {
            Some(start) if block.name.is_empty() || block.name == blocks[start].name => {
                heights[start] += ROW_GAP_MM + height_mm;
            }
            _ => {
                first = Some(index);
                heights[index] = height_mm;
            }
        }
    }
    heights
}

struct Packer {
    area: Rect,
    column_mm: f64,
    pages: Vec<Vec<Block>>,
    /// Where the columns of this sheet begin, below what took the whole width.
    top: f64,
    /// Upper left corner of the free part of the column.
    x: f64,
    y: f64,
    /// The lowest place used on this sheet.
    lowest: f64,
}

impl Packer {
    fn new(area: Rect) -> Self {
        let (x, y) = (area.min.x, area.max.y);
        Self { area, column_mm: column_width_mm(area), pages: vec![vec![]], top: y, x, y, lowest: y }
    }

    fn new_page(&mut self) {
        if self.pages.last().is_some_and(|page| !page.is_empty()) {
            self.pages.push(vec![]);
        }
        self.start_columns(self.area.max.y);
    }

    fn start_columns(&mut self, top: f64) {
        (self.top, self.x, self.y, self.lowest) = (top, self.area.min.x, top, top);
    }

    /// Goes to the next column, or to the next sheet.
    fn next_column(&mut self) {
        let x = self.x + self.column_mm + COLUMN_GAP_MM;
        if x + self.column_mm <= self.area.max.x + SLACK_MM {
            (self.x, self.y) = (x, self.top);
        } else {
            self.new_page();
        }
    }

    fn room_mm(&self) -> f64 {
        self.y - self.area.min.y + SLACK_MM
    }

    /// Goes on where a group is not torn apart, if there is such a place.
    fn keep_together(&mut self, group_mm: f64) {
        if group_mm > self.room_mm() && group_mm <= self.area.height() {
            self.next_column();
            if group_mm > self.room_mm() {
                self.new_page();
            }
        }
    }

    fn place(&mut self, block: Block, size: Rect) {
        let wide = size.width() > self.column_mm + SLACK_MM;
        if wide {
            // It takes the whole width, below everything so far.
            self.start_columns(if self.lowest < self.top { self.lowest } else { self.top });
        }
        if size.height() > self.room_mm() && !wide {
            self.next_column();
        }
        if size.height() > self.room_mm() {
            self.new_page();
        }
        let step = pt(self.x, self.y).minus(pt(size.min.x, size.max.y));
        self.y -= size.height() + ROW_GAP_MM;
        self.lowest = self.lowest.min(self.y);
        if wide {
            self.start_columns(self.y);
        }
        if let Some(page) = self.pages.last_mut() {
            page.push(block.moved(step));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::block::THIN;
    use crate::layers::TABLE;

    fn block(name: &str, width_mm: f64, height_mm: f64) -> Block {
        let mut block = Block::new(name, "");
        block.line(TABLE, THIN, pt(0.0, 0.0), pt(width_mm, height_mm));
        block
    }

    fn places(pages: &[Vec<Block>]) -> Vec<Vec<(f64, f64)>> {
        let corner = |b: &Block| (b.bounds().min.x, b.bounds().max.y);
        pages.iter().map(|page| page.iter().map(corner).collect()).collect()
    }

    #[test]
    fn narrow_paper_has_one_column() {
        let pages = pack(
            vec![block("a", 100.0, 60.0), block("b", 100.0, 30.0), block("c", 10.0, 10.0)],
            Rect::new(0.0, 0.0, 170.0, 100.0),
        );
        assert_eq!(places(&pages), vec![vec![(0.0, 100.0), (0.0, 33.0)], vec![(0.0, 100.0)]]);
    }

    #[test]
    fn wide_paper_has_two_columns_below_what_takes_both() {
        let blocks = vec![
            block("w", 300.0, 20.0),
            block("a", 100.0, 60.0),
            block("b", 100.0, 60.0),
            block("c", 100.0, 60.0),
        ];
        let pages = pack(blocks, Rect::new(0.0, 0.0, 360.0, 100.0));
        assert_eq!(places(&pages), vec![vec![(0.0, 100.0), (0.0, 73.0), (186.0, 73.0)], vec![(0.0, 100.0)]]);
    }

    #[test]
    fn a_group_stays_together() {
        let pages = pack(
            vec![block("a", 10.0, 50.0), block("b", 10.0, 30.0), block("b", 10.0, 30.0)],
            Rect::new(0.0, 0.0, 170.0, 100.0),
        );
        assert_eq!(pages.iter().map(Vec::len).collect::<Vec<_>>(), [1, 2]);
    }
}
