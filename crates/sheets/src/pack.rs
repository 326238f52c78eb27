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
    for block in blocks {
        let bounds = block.bounds();
        let whole = block.clone().with_heading(bounds, area.width().min(bounds.width().max(120.0)));
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
