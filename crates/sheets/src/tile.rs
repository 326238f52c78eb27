//! A view larger than a sheet, cut into overlapping parts with registration marks on both sides of each seam.

use crestline_drawing::{Anchor, Item, Mark, Pen, Point, Rect, Shape, Text, Width, pt};

use crate::block::{Block, DASHED, small};
use crate::layers::REGISTER;

/// Overlap of neighbouring parts, mm: wider than the longest level text, higher than the longest upright one.
const OVERLAP_X_MM: f64 = 50.0;
const OVERLAP_Y_MM: f64 = 22.0;
/// Room around a part for its registration marks, mm.
const MARK_ROOM_MM: f64 = 10.0;
/// Height kept for the heading, mm.
const HEADING_MM: f64 = 9.0;

/// The parts of a block, each no larger than a width and a height with its marks and heading.
pub(crate) fn tiles(block: &Block, width_mm: f64, height_mm: f64) -> Vec<Block> {
    let whole = block.bounds().grown(1.0);
    let xs = spans(whole.min.x, whole.max.x, width_mm - 2.0 * MARK_ROOM_MM, OVERLAP_X_MM);
    let ys = spans(whole.min.y, whole.max.y, height_mm - 2.0 * MARK_ROOM_MM - HEADING_MM, OVERLAP_Y_MM);
    let count = xs.len() * ys.len();
    let mut parts = vec![];
    // From the top left, row by row, as the sheets are laid out on the bench.
    for (row, (low, high)) in ys.iter().rev().enumerate() {
        for (column, (left, right)) in xs.iter().enumerate() {
            let window = Rect { min: pt(*left, *low), max: pt(*right, *high) };
            let number = parts.len() + 1;
            let mut part = Block {
                name: format!("{}, part {number} of {count}", block.name),
                title: format!("{}, part {number} of {count}: join at the marks", block.title),
                items: block.items.iter().flat_map(|item| clipped(item, window)).collect(),
                ..block.clone()
            };
            part.outline(REGISTER, DASHED, &window.corners());
            let seams = Seams { xs: &xs, ys: &ys, row, column };
            seams.mark(&mut part, window);
            let bounds = part.bounds();
            parts.push(part.with_heading(bounds, bounds.width()));
        }
    }
    parts
}

/// Stretches no longer than `length` that cover a range, evenly spaced, overlapping by at least `overlap`.
fn spans(from: f64, to: f64, length: f64, overlap: f64) -> Vec<(f64, f64)> {
    if to - from <= length {
        return vec![(from, to)];
    }
    let steps = ((to - from - length) / (length - overlap)).ceil().clamp(1.0, 50.0);
    let step = (to - from - length) / steps;
    // The count lies between 1 and 50.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let last = steps as u32;
    (0..=last).map(|i| from + step * f64::from(i)).map(|start| (start, start + length)).collect()
}

/// The seams around one part.
struct Seams<'a> {
    xs: &'a [(f64, f64)],
    ys: &'a [(f64, f64)],
    row: usize,
    column: usize,
}

impl Seams<'_> {
    /// Two marks at every seam, beside the window, at the same places of the view on both parts.
    fn mark(&self, part: &mut Block, window: Rect) {
        let beside_mm = MARK_ROOM_MM / 2.0;
        let row_from_bottom = self.ys.len() - 1 - self.row;
        let (column, row) = (self.column, self.row);
        let mut upright = |lower: usize, name: String| {
            let y = self.ys[lower].1.midpoint(self.ys[lower + 1].0);
            registration(part, pt(window.min.x - beside_mm, y), &format!("{name}a"));
            registration(part, pt(window.max.x + beside_mm, y), &format!("{name}b"));
        };
        if row > 0 {
            upright(row_from_bottom, format!("H{row}{}", column + 1));
        }
        if row_from_bottom > 0 {
            upright(row_from_bottom - 1, format!("H{}{}", row + 1, column + 1));
        }
        let mut level = |first: usize, name: String| {
            let x = self.xs[first].1.midpoint(self.xs[first + 1].0);
            registration_below(part, pt(x, window.min.y - beside_mm), &format!("{name}a"));
            registration(part, pt(x, window.max.y + beside_mm), &format!("{name}b"));
        };
        if column > 0 {
            level(column - 1, format!("V{}{column}", row + 1));
        }
        if column + 1 < self.xs.len() {
            level(column, format!("V{}{}", row + 1, column + 1));
        }
    }
}

/// A cross in a circle with its name above it.
fn registration(part: &mut Block, at: Point, name: &str) {
    named_mark(part, at, name, 2.9);
}

/// A cross in a circle with its name below it, away from the window.
fn registration_below(part: &mut Block, at: Point, name: &str) {
    named_mark(part, at, name, -5.0);
}

fn named_mark(part: &mut Block, at: Point, name: &str, baseline_mm: f64) {
    let pen = Pen::solid(Width::W025);
    part.add(REGISTER, pen, Shape::Circle { centre: at, radius_mm: 1.5 });
    for arm in [pt(2.5, 0.0), pt(0.0, 2.5)] {
        part.line(REGISTER, pen, at.minus(arm), at.plus(arm));
    }
    part.add(REGISTER, pen, Shape::Text(small(pt(at.x, at.y + baseline_mm), Anchor::Middle, name)));
}

/// What of an item lies within a window. Text and arrows are drawn whole or not at all; the overlap is
/// large enough that each is whole on some part.
fn clipped(item: &Item, window: Rect) -> Vec<Item> {
    let primitives = item.primitives();
    let inside =
        |mark: &Mark| mark.bounds().is_some_and(|b| window.contains(b.min) && window.contains(b.max));
    if primitives.iter().all(|p| inside(&p.mark)) {
        return vec![item.clone()];
    }
    let shapes = primitives.into_iter().flat_map(|p| match p.mark {
        Mark::Text(ref run) if inside(&p.mark) => {
            let text = Text::new(run.start, run.height_mm, run.content.clone()).turned(run.angle_deg);
            vec![Shape::Text(text)]
        }
        Mark::Fill(ref points) if inside(&p.mark) => vec![Shape::Fill(points.clone())],
        Mark::Text(_) | Mark::Fill(_) => vec![],
        Mark::Stroke { .. } | Mark::Arc { .. } => {
            let points = p.mark.outline(0.002);
            points
                .windows(2)
                .filter_map(|w| segment(w[0], w[1], window))
                .map(|(a, b)| Shape::Line(a, b))
                .collect()
        }
    });
    shapes.map(|shape| Item { shape, ..item.clone() }).collect()
}

/// The part of a line within a window (Liang and Barsky, ACM Trans. Graph. 3 (1984) 1).
fn segment(from: Point, to: Point, window: Rect) -> Option<(Point, Point)> {
    let step = to.minus(from);
    let (mut first, mut last) = (0.0_f64, 1.0_f64);
    let edges = [
        (-step.x, from.x - window.min.x),
        (step.x, window.max.x - from.x),
        (-step.y, from.y - window.min.y),
        (step.y, window.max.y - from.y),
    ];
    for (rate, room) in edges {
        if rate == 0.0 {
            if room < 0.0 {
                return None;
            }
        } else if rate < 0.0 {
            first = first.max(room / rate);
        } else {
            last = last.min(room / rate);
        }
    }
    (first < last).then(|| (from.toward(step, first), from.toward(step, last)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_are_cut_at_the_window() {
        let window = Rect::new(0.0, 0.0, 10.0, 10.0);
        assert_eq!(segment(pt(-5.0, 5.0), pt(15.0, 5.0), window), Some((pt(0.0, 5.0), pt(10.0, 5.0))));
        assert_eq!(segment(pt(1.0, 1.0), pt(2.0, 2.0), window), Some((pt(1.0, 1.0), pt(2.0, 2.0))));
        assert_eq!(segment(pt(-5.0, -1.0), pt(15.0, -1.0), window), None);
        assert_eq!(segment(pt(11.0, 0.0), pt(11.0, 5.0), window), None);
    }

    #[test]
    fn spans_cover_a_range_with_overlap() {
        let spans = spans(-10.0, 290.0, 100.0, 20.0);
        assert_eq!((spans[0].0, spans.last().map(|s| s.1)), (-10.0, Some(290.0)));
        assert!(spans.windows(2).all(|w| w[0].1 - w[1].0 >= 20.0 - 1e-9));
    }

    #[test]
    fn both_sides_of_a_seam_have_the_same_marks() {
        let mut block = Block::new("V", "View");
        block.line(crate::layers::SLOT, DASHED, pt(0.0, 0.0), pt(300.0, 500.0));
        let parts = tiles(&block, 170.0, 230.0);
        assert!(parts.len() >= 6);
        let mut places: Vec<(String, Point)> = vec![];
        for part in &parts {
            for pair in part.items.windows(3) {
                if let [Shape::Line(a, b), _, Shape::Text(t)] =
                    [&pair[0].shape, &pair[1].shape, &pair[2].shape]
                    && t.content.len() == 4
                {
                    places.push((t.content.clone(), a.middle(*b)));
                }
            }
            assert!(part.bounds().width() <= 170.0 && part.bounds().height() <= 230.0);
        }
        places.sort_by(|a, b| a.0.cmp(&b.0));
        assert!(places.len() >= 28, "{}", places.len());
        for pair in places.chunks(2) {
            assert_eq!(pair[0].0, pair[1].0);
            assert!(pair[0].1.distance(pair[1].1) < 1e-9, "{pair:?}");
        }
    }
}
