//! What every sheet has: frame (ISO 5457), title block (after ISO 7200) and check lines.

use crestline_drawing::{Anchor, Pen, Rect, Shape, Text, Width, lettering, pt, wrap};
use crestline_plan::Paper;

use crate::block::{Block, MEDIUM, THIN, small};
use crate::layers::{CHECK, FRAME};

/// Filing margin at the left and margin at the other edges (ISO 5457), mm.
const LEFT_MARGIN_MM: f64 = 20.0;
const MARGIN_MM: f64 = 10.0;
/// Width of the title block (ISO 7200), mm; on upright paper it takes the frame's whole width.
const TITLE_WIDTH_MM: f64 = 180.0;
const TITLE_HEIGHT_MM: f64 = 26.0;
/// Height of the strip with the check lines, and width of the column with the upright one, mm.
const CHECK_HEIGHT_MM: f64 = 16.0;
const CHECK_COLUMN_MM: f64 = 10.0;
/// The least height of captions in the title block (the smallest of ISO 3098), mm.
const CAPTION_MM: f64 = 1.8;

const FRAME_PEN: Pen = Pen::solid(Width::W070);

/// Where things stand on a paper.
pub(crate) struct Page {
    pub width_mm: f64,
    pub height_mm: f64,
    pub frame: Rect,
    title: Rect,
    check: Rect,
    /// Where views may stand.
    pub content: Rect,
}

/// The texts of a title block.
pub(crate) struct TitleBlock {
    pub title: String,
    pub contents: String,
    pub scale: String,
    pub units: String,
    pub datum: String,
    pub date: String,
    pub sheet: String,
    pub paper: &'static str,
}

/// Width and height of a paper, mm (ISO 216; letter is 8.5 by 11 in). A3 lies on its side.
pub(crate) const fn paper_size_mm(paper: Paper) -> (f64, f64) {
    match paper {
        Paper::A4 => (210.0, 297.0),
        Paper::A3 => (420.0, 297.0),
        Paper::Letter => (215.9, 279.4),
    }
}

/// The paper's name in the title block.
pub(crate) const fn paper_name(paper: Paper) -> &'static str {
    match paper {
        Paper::A4 => "A4",
        Paper::A3 => "A3",
        Paper::Letter => "Letter",
    }
}

impl Page {
    pub fn new(paper: Paper) -> Self {
        let (width_mm, height_mm) = paper_size_mm(paper);
        let frame =
            Rect { min: pt(LEFT_MARGIN_MM, MARGIN_MM), max: pt(width_mm - MARGIN_MM, height_mm - MARGIN_MM) };
        let wide = frame.width() > 2.0 * TITLE_WIDTH_MM;
        let title_width_mm = if wide { TITLE_WIDTH_MM } else { frame.width() };
        let title = Rect::new(frame.max.x - title_width_mm, frame.min.y, title_width_mm, TITLE_HEIGHT_MM);
        let check = if wide {
            Rect::new(frame.min.x, frame.min.y, frame.width() - title_width_mm, TITLE_HEIGHT_MM)
        } else {
            Rect::new(frame.min.x, title.max.y, frame.width(), CHECK_HEIGHT_MM)
        };
        let content = Rect {
            min: pt(frame.min.x + CHECK_COLUMN_MM, check.max.y.max(title.max.y) + 4.0),
            max: pt(frame.max.x - 3.0, frame.max.y - 4.0),
        };
        Self { width_mm, height_mm, frame, title, check, content }
    }

    /// Frame, title block and check lines.
    pub fn furniture(&self, texts: &TitleBlock) -> Block {
        let mut block = Block::new("", "");
        block.outline(FRAME, FRAME_PEN, &self.frame.corners());
        self.title_block(&mut block, texts);
        self.check_lines(&mut block);
        block
    }

    fn title_block(&self, block: &mut Block, texts: &TitleBlock) {
        let Rect { min, max } = self.title;
        block.outline(FRAME, FRAME_PEN, &self.title.corners());
        let right = max.x - 64.0;
        let middle = max.x - 32.0;
        let rows = [max.y, max.y - 10.0, max.y - 18.0, min.y];
        for y in &rows[1..3] {
            block.line(FRAME, MEDIUM, pt(min.x, *y), pt(max.x, *y));
        }
        for x in [right, middle] {
            block.line(FRAME, MEDIUM, pt(x, min.y), pt(x, max.y));
        }
        let wide_mm = right - min.x;
        let mut field = |x: f64, top: f64, width_mm: f64, caption: &str, height_mm: f64, words: &str| {
            let at = |down: f64| pt(x + 1.5, top - down);
            let caption = Text::new(at(CAPTION_MM + 1.0), CAPTION_MM, caption).within(width_mm - 3.0);
            let words = Text::new(at(CAPTION_MM + 2.2 + height_mm), height_mm, words).within(width_mm - 3.0);
            for text in [caption, words] {
                block.add(FRAME, THIN, Shape::Text(text));
            }
        };
        let (middle_mm, small_mm) = (lettering::MIDDLE_MM, lettering::SMALL_MM);
        field(min.x, rows[0], wide_mm, "Title", middle_mm, &texts.title);
        field(min.x, rows[1], wide_mm, "Content", small_mm, &texts.contents);
        field(min.x, rows[2], wide_mm, "Datum of x, on the centre line", small_mm, &texts.datum);
        field(right, rows[0], 32.0, "Sheet", middle_mm, &texts.sheet);
        field(middle, rows[0], 32.0, "Paper", middle_mm, texts.paper);
        field(right, rows[1], 32.0, "Scale", small_mm, &texts.scale);
        field(middle, rows[1], 32.0, "Dimensions in", small_mm, &texts.units);
        field(right, rows[2], 32.0, "Date", small_mm, &texts.date);
        field(middle, rows[2], 32.0, "Drawn by", small_mm, "Crestline");
    }

    /// A line of 100 mm and one of 4 in along the sheet, one of 100 mm up the sheet: printers can be off
    /// in one direction only.
    fn check_lines(&self, block: &mut Block) {
        const INCHES_MM: f64 = 101.6;
        let Rect { min, max } = self.check;
        block.line(FRAME, MEDIUM, pt(min.x, max.y), pt(max.x, max.y));
        let left = min.x + 4.0;
        for (y, length_mm, words) in [(max.y - 6.5, 100.0, "100 mm"), (max.y - 13.0, INCHES_MM, "4 in")] {
            let (from, to) = (pt(left, y), pt(left + length_mm, y));
            block.line(CHECK, MEDIUM, from, to);
            for end in [from, to] {
                block.line(CHECK, MEDIUM, pt(end.x, y - 1.5), pt(end.x, y + 1.5));
            }
            let text = small(pt(left + length_mm / 2.0, y + 0.9), Anchor::Middle, words);
            block.add(CHECK, THIN, Shape::Text(text));
        }
        let words = "Measure the check lines before cutting. If one is off, print again at full size (100%), not fitted to the page.";
        let text_left = left + INCHES_MM + 5.0;
        for (line, row) in wrap(words, lettering::SMALL_MM, max.x - text_left - 2.0).into_iter().zip(0..) {
            let at = pt(text_left, max.y - 4.4 - 4.0 * f64::from(row));
            block.add(CHECK, THIN, Shape::Text(small(at, Anchor::Start, line)));
        }
        let (x, low) = (self.frame.min.x + 6.0, self.content.min.y);
        block.line(CHECK, MEDIUM, pt(x, low), pt(x, low + 100.0));
        for y in [low, low + 100.0] {
            block.line(CHECK, MEDIUM, pt(x - 1.5, y), pt(x + 1.5, y));
        }
        let text = small(pt(x - 0.9, low + 50.0), Anchor::Middle, "100 mm").turned(90.0);
        block.add(CHECK, THIN, Shape::Text(text));
    }
}
