//! No text of any sheet lies on another, on a line or outside the frame, for all examples, papers, units and
//! datums, and for plans at the limits of what is legal.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod cases;

use cases::{cases, options_for};
use crestline_drawing::{Mark, Point, Rect, Sheet, TextRun, pt};
use crestline_sheets::{machine, sheets};

/// Boxes that share no more than this are side by side; sums of lengths are rounded.
const TOUCH_MM: f64 = 1e-6;
/// How far a text's box shrinks before a line through it counts: a line may touch the box around the ink.
const LINE_TOUCH_MM: f64 = 0.2;
/// Texts and lines of a sheet.
struct Parts {
    texts: Vec<(TextRun, [Point; 4], Rect)>,
    lines: Vec<[Point; 2]>,
}

impl Parts {
    fn of(sheet: &Sheet) -> Self {
        let mut parts = Self { texts: vec![], lines: vec![] };
        for primitive in sheet.primitives() {
            match primitive.mark {
                Mark::Text(run) if run.content.trim().is_empty() => {}
                Mark::Text(run) => {
                    let (corners, bounds) = (run.corners(), run.bounds());
                    parts.texts.push((run, corners, bounds));
                }
                other => parts.lines.extend(other.outline(0.01).windows(2).map(|w| [w[0], w[1]])),
            }
        }
        parts
    }

    fn overlaps(&self) -> Vec<String> {
        let mut found = vec![];
        for (i, (a, a_corners, a_box)) in self.texts.iter().enumerate() {
            for (b, b_corners, b_box) in &self.texts[i + 1..] {
                let near = a_box.min.x < b_box.max.x && b_box.min.x < a_box.max.x;
                if near && overlap(a_corners, b_corners) {
                    found
                        .push(format!("{:?} at {:?} lies on {:?} at {:?}", a.content, a.at, b.content, b.at));
                }
            }
        }
        found
    }

    fn crossings(&self) -> Vec<String> {
        let crossed =
            |bounds: Rect| self.lines.iter().any(|line| passes(*line, bounds.grown(-LINE_TOUCH_MM)));
        let texts = self.texts.iter().filter(|(_, _, bounds)| crossed(*bounds));
        texts.map(|(run, ..)| format!("a line through {:?} at {:?}", run.content, run.at)).collect()
    }

    fn outside(&self, frame: Rect) -> Vec<String> {
        let boxes = self.texts.iter().map(|(.., bounds)| *bounds);
        let all = boxes.chain(self.lines.iter().map(|line| Rect::around(*line).unwrap()));
        let out = all.filter(|b| !(frame.contains(b.min) && frame.contains(b.max)));
        out.map(|b| format!("outside the frame: {b:?}")).collect()
    }

    fn cut(&self) -> Vec<String> {
        let cut = self.texts.iter().filter(|(run, ..)| run.content.contains('…'));
        cut.map(|(run, ..)| format!("cut: {:?}", run.content)).collect()
    }
}

/// Whether two convex boxes overlap, by the separating axis theorem.
fn overlap(a: &[Point; 4], b: &[Point; 4]) -> bool {
    let sides = [a, b].into_iter().flat_map(|c| [c[1].minus(c[0]).unit(), c[3].minus(c[0]).unit()]);
    let reach = |corners: &[Point; 4], axis: Point| {
        corners.iter().map(|p| p.dot(axis)).fold((f64::MAX, f64::MIN), |(l, h), v| (l.min(v), h.max(v)))
    };
    sides.into_iter().all(|axis| {
        let ((a_low, a_high), (b_low, b_high)) = (reach(a, axis), reach(b, axis));
        a_high - b_low > TOUCH_MM && b_high - a_low > TOUCH_MM
    })
}

/// Whether a line passes through the inside of a level box: it does unless an axis parts them.
fn passes([from, to]: [Point; 2], bounds: Rect) -> bool {
    let normal = to.minus(from).left().unit();
    let sides = bounds.corners().map(|corner| corner.minus(from).dot(normal));
    let parted = |low: f64, high: f64, a: f64, b: f64| a.max(b) <= low || a.min(b) >= high;
    bounds.width() > 0.0
        && bounds.height() > 0.0
        && !parted(bounds.min.x, bounds.max.x, from.x, to.x)
        && !parted(bounds.min.y, bounds.max.y, from.y, to.y)
        && sides.iter().any(|side| *side < 0.0)
        && sides.iter().any(|side| *side > 0.0)
}

/// The frame is 20 mm from the left edge and 10 mm from the others (ISO 5457).
fn frame(sheet: &Sheet) -> Rect {
    let Rect { min, max } = sheet.area;
    Rect { min: min.plus(pt(20.0, 10.0)), max: max.minus(pt(10.0, 10.0)) }.grown(TOUCH_MM)
}

#[test]
fn texts_keep_apart_whole_and_inside_the_frame() {
    let mut seen = 0;
    let mut faults: Vec<String> = vec![];
    for case in cases() {
        for options in options_for(&case) {
            let paper = sheets(&case.plan, &case.solution, &options);
            let table = machine(&case.plan, &case.solution, &options);
            for (sheet, on_paper) in
                paper.sheets.iter().map(|s| (s, true)).chain(table.sheets.iter().map(|s| (s, false)))
            {
                let parts = Parts::of(sheet);
                seen += parts.texts.len();
                let mut found = [parts.overlaps(), parts.crossings()].concat();
                if on_paper {
                    found.extend(parts.outside(frame(sheet)));
                }
                // Only the user's own words may be cut, and those of the examples are short enough.
                if case.name != "hostile" {
                    found.extend(parts.cut());
                }
                let place =
                    format!("{} {:?} {:?} {:?}", case.name, options.paper, options.units, options.datum);
                faults.extend(found.into_iter().map(|fault| format!("{place}, {}: {fault}", sheet.name)));
            }
        }
    }
    assert!(seen > 10_000, "{seen} texts");
    let some: Vec<&String> = faults.iter().step_by(1 + faults.len() / 30).collect();
    assert!(faults.is_empty(), "{} faults, such as {some:#?}", faults.len());
}

#[test]
fn overlaps_and_crossings_are_seen_where_there_are_some() {
    let run = |x: f64, angle: f64| {
        crestline_drawing::Text::new(pt(x, 0.0), 2.5, "HHHH").turned(angle).run().corners()
    };
    assert!(overlap(&run(0.0, 0.0), &run(3.0, 0.0)));
    assert!(overlap(&run(0.0, 0.0), &run(3.0, 90.0)));
    assert!(!overlap(&run(0.0, 0.0), &run(20.0, 0.0)));
    assert!(!overlap(&run(0.0, 45.0), &run(6.0, 45.0)));
    let bounds = Rect::new(0.0, 0.0, 10.0, 2.0);
    for (line, expected) in [
        ([pt(-5.0, 1.0), pt(15.0, 1.0)], true),
        ([pt(4.0, -1.0), pt(6.0, 3.0)], true),
        ([pt(4.0, 1.0), pt(5.0, 1.0)], true),
        ([pt(-5.0, 2.0), pt(15.0, 2.0)], false),
        ([pt(-3.0, 1.0), pt(1.0, 5.0)], false),
        ([pt(11.0, 1.0), pt(15.0, 1.0)], false),
    ] {
        assert_eq!(passes(line, bounds), expected, "{line:?}");
    }
}
