//! No text of any sheet lies on another or outside the frame, for all examples, papers and units,
//! and for plans at the limits of what is legal.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod cases;

use cases::{all_options, cases, options_for};
use crestline_drawing::{Drawing, Mark, Point, Rect, Sheet, TextRun};
use crestline_sheets::{machine, sheets};

/// Boxes that share no more than this are side by side; sums of lengths are rounded.
const TOUCH_MM: f64 = 1e-6;

fn texts(sheet: &Sheet) -> Vec<TextRun> {
    let of_text = |mark| if let Mark::Text(run) = mark { Some(run) } else { None };
    sheet
        .primitives()
        .into_iter()
        .filter_map(|p| of_text(p.mark))
        .filter(|run| !run.content.trim().is_empty())
        .collect()
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

fn overlaps(drawing: &Drawing) -> Vec<String> {
    let mut found = vec![];
    for sheet in &drawing.sheets {
        let runs: Vec<_> = texts(sheet).into_iter().map(|run| (run.corners(), run.bounds(), run)).collect();
        for (i, (a_corners, a_bounds, a)) in runs.iter().enumerate() {
            for (b_corners, b_bounds, b) in &runs[i + 1..] {
                let near = a_bounds.min.x < b_bounds.max.x && b_bounds.min.x < a_bounds.max.x;
                if near && overlap(a_corners, b_corners) {
                    found.push(format!(
                        "{}: {:?} at {:?} and {:?} at {:?}",
                        sheet.name, a.content, a.at, b.content, b.at
                    ));
                }
            }
        }
    }
    found
}

/// The frame is 20 mm from the left edge and 10 mm from the others (ISO 5457).
fn outside_the_frame(drawing: &Drawing) -> Vec<String> {
    let mut found = vec![];
    for sheet in &drawing.sheets {
        let Rect { min, max } = sheet.area;
        let frame =
            Rect::new(min.x + 20.0, min.y + 10.0, max.x - min.x - 30.0, max.y - min.y - 20.0).grown(1e-6);
        for primitive in sheet.primitives() {
            let bounds = primitive.mark.bounds().unwrap();
            if !(frame.contains(bounds.min) && frame.contains(bounds.max)) {
                found.push(format!("{}: {:?}", sheet.name, primitive.mark));
            }
        }
    }
    found
}

#[test]
fn texts_keep_apart_and_inside_the_frame() {
    let mut seen = 0;
    let mut faults = vec![];
    for case in cases() {
        for options in options_for(&case) {
            let drawing = sheets(&case.plan, &case.solution, &options);
            seen += drawing.sheets.iter().map(|sheet| texts(sheet).len()).sum::<usize>();
            for fault in overlaps(&drawing).into_iter().chain(outside_the_frame(&drawing)) {
                faults.push(format!(
                    "{} {:?} {:?} {:?}\n   {fault}",
                    case.name, options.paper, options.units, options.datum
                ));
            }
        }
    }
    assert!(seen > 10_000, "{seen} texts");
    assert!(
        faults.is_empty(),
        "{} faults, such as\n{}",
        faults.len(),
        faults[..faults.len().min(12)].join("\n")
    );
}

#[test]
fn the_machine_drawings_texts_keep_apart() {
    let mut faults = vec![];
    for case in cases() {
        for options in options_for(&case) {
            let found = overlaps(&machine(&case.plan, &case.solution, &options));
            faults.extend(found.into_iter().map(|fault| {
                format!(
                    "{} {:?} {:?} {:?}\n   {fault}",
                    case.name, options.paper, options.units, options.datum
                )
            }));
        }
    }
    assert!(
        faults.is_empty(),
        "{} faults, such as\n{}",
        faults.len(),
        faults[..faults.len().min(12)].join("\n")
    );
}

#[test]
fn overlap_is_seen_where_there_is_one() {
    let run = |x: f64, angle: f64| {
        crestline_drawing::Text::new(crestline_drawing::pt(x, 0.0), 2.5, "HHHH").turned(angle).run().corners()
    };
    assert!(overlap(&run(0.0, 0.0), &run(3.0, 0.0)));
    assert!(overlap(&run(0.0, 0.0), &run(3.0, 90.0)));
    assert!(!overlap(&run(0.0, 0.0), &run(20.0, 0.0)));
    assert!(!overlap(&run(0.0, 45.0), &run(6.0, 45.0)));
}

#[test]
fn nothing_of_the_examples_is_cut() {
    for case in cases::examples() {
        for options in all_options(&case.plan) {
            for sheet in sheets(&case.plan, &case.solution, &options).sheets {
                let cut: Vec<String> =
                    texts(&sheet).into_iter().map(|run| run.content).filter(|c| c.contains('…')).collect();
                assert!(
                    cut.is_empty(),
                    "{} {:?} {:?} {}: {cut:?}",
                    case.name,
                    options.paper,
                    options.units,
                    sheet.name
                );
            }
        }
    }
}

/// How far a text's box shrinks before a line through it counts as crossing: lines may touch.
const LINE_TOUCH_MM: f64 = 0.2;

/// Lines of the same sheet that run through a text.
fn crossings(drawing: &Drawing) -> Vec<String> {
    let mut found = vec![];
    for sheet in &drawing.sheets {
        let lines: Vec<[Point; 2]> = sheet
            .primitives()
            .iter()
            .filter(|p| !matches!(p.mark, Mark::Text(_)))
            .flat_map(|p| p.mark.outline(0.01).windows(2).map(|w| [w[0], w[1]]).collect::<Vec<_>>())
            .collect();
        for run in texts(sheet) {
            let b = run.bounds().grown(-LINE_TOUCH_MM);
            let through = |[a, c]: &[Point; 2]| {
                (0..=400).any(|i| b.contains(a.plus(c.minus(*a).times(f64::from(i) / 400.0))))
            };
            if lines.iter().any(|line| {
                let around = Rect::around(*line).unwrap();
                around.min.x < b.max.x
                    && b.min.x < around.max.x
                    && around.min.y < b.max.y
                    && b.min.y < around.max.y
                    && through(line)
            }) {
                found.push(format!("{}: {:?} at {:?}", sheet.name, run.content, run.at));
            }
        }
    }
    found
}

#[test]
fn no_line_runs_through_a_text() {
    let mut faults = vec![];
    for case in cases() {
        for options in options_for(&case) {
            for drawing in
                [sheets(&case.plan, &case.solution, &options), machine(&case.plan, &case.solution, &options)]
            {
                faults.extend(
                    crossings(&drawing)
                        .into_iter()
                        .map(|f| format!("{} {:?} {:?} {f}", case.name, options.paper, options.datum)),
                );
            }
        }
    }
    assert!(
        faults.is_empty(),
        "{} faults, such as\n{}",
        faults.len(),
        faults.iter().step_by(1 + faults.len() / 40).cloned().collect::<Vec<_>>().join("\n")
    );
}
