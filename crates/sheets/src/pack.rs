//! Blocks placed on sheets in their order, from the top left, in rows. Nothing is ever shrunk.

use crestline_drawing::{Rect, pt};

use crate::block::Block;
use crate::tile::tiles;

/// Space between rows and between blocks of a row, mm.
const ROW_GAP_MM: f64 = 7.0;
const COLUMN_GAP_MM: f64 = 12.0;

/// The blocks of every sheet in their places within an area.
pub(crate) fn pack(blocks: Vec<Block>, area: Rect) -> Vec<Vec<Block>> {
    let mut packer = Packer { area, pages: vec![], x: area.min.x, y: area.max.y, row_mm: 0.0 };
    let groups = group_heights(&blocks);
    for (block, group_mm) in blocks.into_iter().zip(groups) {
        packer.keep_together(group_mm);
        let bounds = block.bounds();
        let whole = block.clone().with_heading(bounds, area.width());
        let size = whole.bounds();
        if size.width() <= area.width() && size.height() <= area.height() {
            packer.place(whole, size);
        } else {
            for tile in tiles(&block, area.width(), area.height()) {
                let size = tile.bounds();
                packer.new_page();
                packer.place(tile, size);
            }
            packer.pages.push(vec![]);
            packer.full();
        }
    }
    packer.pages.retain(|page| !page.is_empty());
    packer.pages
}

/// For the first block of several with one name (nameless ones go with those before them) the height of all
/// of them one below the other; 0 for the others.
fn group_heights(blocks: &[Block]) -> Vec<f64> {
    const HEADING_MM: f64 = 8.0;
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
    pages: Vec<Vec<Block>>,
    /// Upper left corner of the free part of the row.
    x: f64,
    y: f64,
    row_mm: f64,
}

impl Packer {
    fn place(&mut self, block: Block, size: Rect) {
        if self.pages.is_empty() || (block.alone && self.pages.last().is_some_and(|page| !page.is_empty())) {
            self.new_page();
        }
        if !self.fits(size) {
            self.new_row();
        }
        if !self.fits(size) {
            self.new_page();
        }
        let step = pt(self.x, self.y).minus(pt(size.min.x, size.max.y));
        self.x += size.width() + COLUMN_GAP_MM;
        self.row_mm = self.row_mm.max(size.height());
        if let Some(page) = self.pages.last_mut() {
            page.push(block.moved(step));
        }
    }

    fn fits(&self, size: Rect) -> bool {
        // A hair of slack, since sums of lengths are rounded.
        const SLACK_MM: f64 = 1e-6;
        self.x + size.width() <= self.area.max.x + SLACK_MM
            && self.y - size.height() >= self.area.min.y - SLACK_MM
    }

    /// Starts a sheet where that keeps a group from being torn apart.
    fn keep_together(&mut self, group_mm: f64) {
        let below = self.y - if self.row_mm > 0.0 { self.row_mm + ROW_GAP_MM } else { 0.0 };
        let torn = group_mm > below - self.area.min.y && group_mm > self.y - self.area.min.y;
        if torn && group_mm <= self.area.height() && self.pages.last().is_some_and(|page| !page.is_empty()) {
            self.new_page();
        }
    }

    fn new_row(&mut self) {
        self.y -= self.row_mm + ROW_GAP_MM;
        (self.x, self.row_mm) = (self.area.min.x, 0.0);
    }

    fn new_page(&mut self) {
        self.pages.push(vec![]);
        (self.x, self.y, self.row_mm) = (self.area.min.x, self.area.max.y, 0.0);
    }

    /// Nothing more goes on this sheet.
    fn full(&mut self) {
        self.y = self.area.min.y;
    }
}
