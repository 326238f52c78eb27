//! From setbacks as built to what comes of setting them out in steps.

use std::ops::Range;

use crestline_physics::Contacts;
use crestline_physics::fit::offset_mm;
use crestline_physics::neck::{PlanLine, PlanPoint};

use super::{Step, WorkshopLine};
use crate::{Checked, Fault, NutStyle, Plan, SaddleStyle, Solution};

/// Rounding of lengths that are meant to be equal, mm.
const HAIR_MM: f64 = 1e-6;

/// What comes of rounding.
pub(super) struct Rounded {
    /// One a string.
    pub contacts: Vec<Contacts>,
    /// For a shaped saddle the offset of every crest from the rounded slot.
    pub slot_offset_mm: Vec<Option<f64>>,
    pub lines: Vec<WorkshopLine>,
}

/// Rounds what a maker sets out.
///
/// # Errors
/// A fault where the solution does not belong to the plan.
pub(super) fn round(checked: &Checked, solution: &Solution, step: Step) -> Result<Rounded, Vec<Fault>> {
    let plan = checked.plan();
    let (reports, lines) = (&solution.report.strings, &solution.report.saddle.lines);
    let pieces = pieces(plan);
    if reports.len() != plan.strings.len() || lines.len() != pieces.len() {
        let found = format!("a solution of {} strings and {} saddle lines", reports.len(), lines.len());
        return Err(vec![Fault::new("strings", found, "the solution of this plan")]);
    }
    let nut_mm = |value_mm: f64| match plan.nut.style {
        NutStyle::Plain => value_mm,
        NutStyle::Common | NutStyle::Shaped => nearest(value_mm, plan.nut.travel_mm, step),
    };
    let contacts = reports.iter().map(|report| Contacts {
        saddle_setback_mm: nearest(report.built.saddle_setback_mm, plan.saddle.travel_mm, step),
        nut_setback_mm: nut_mm(report.built.nut_setback_mm),
    });
    let mut rounded = Rounded {
        contacts: contacts.collect(),
        slot_offset_mm: vec![None; reports.len()],
        lines: Vec::new(),
    };
    for (piece, line) in pieces.into_iter().zip(lines) {
        let outer = [(piece.start, line.treble), (piece.end - 1, line.bass)];
        let set = outer.map(|(index, end)| {
            let string = checked.neck().strings[index].line;
            let built_mm = string.nut.distance_mm(PlanPoint::new(end.x, end.y)) - string.scale_mm();
            (index, nearest(built_mm, plan.saddle.travel_mm, step))
        });
        rounded.lines.push(WorkshopLine {
            treble_string: set[0].0 as u32 + 1,
            bass_string: set[1].0 as u32 + 1,
            treble_setback_mm: set[0].1,
            bass_setback_mm: set[1].1,
        });
        place_crests(checked, solution, step, set, &mut rounded);
    }
    Ok(rounded)
}

/// The strings that each line of the style serves; none for separate pieces.
fn pieces(plan: &Plan) -> Vec<Range<usize>> {
    let count = plan.strings.len();
    match plan.saddle.style {
        SaddleStyle::Separate => Vec::new(),
        SaddleStyle::Shaped | SaddleStyle::Straight => std::iter::once(0..count).collect(),
        SaddleStyle::TwoPiece => {
            let split = plan.saddle.split_after.map_or(1, |strings| strings as usize);
            vec![0..split, split..count]
        }
    }
}

/// Places the crests on the line through these setbacks at these outer strings, or off it as a shaped saddle's are.
fn place_crests(
    checked: &Checked,
    solution: &Solution,
    step: Step,
    set: [(usize, f64); 2],
    rounded: &mut Rounded,
) {
    let plan = checked.plan();
    let shaped = plan.saddle.style == SaddleStyle::Shaped;
    let [(first, setback_mm), (last, _)] = set;
    if first == last {
        // One string's line is a point, and its crest lies on it.
        rounded.contacts[first].saddle_setback_mm = setback_mm;
        rounded.slot_offset_mm[first] = shaped.then_some(0.0);
        return;
    }
    let string = |index: usize| checked.neck().strings[index].line;
    let ends = set.map(|(index, setback_mm)| string(index).at(string(index).scale_mm() + setback_mm));
    for index in first..=last {
        let line = string(index);
        let built_mm = line.scale_mm() + solution.report.strings[index].built.saddle_setback_mm;
        let place_mm = if shaped {
            let offset = within_blank(offset_mm(ends, line.at(built_mm)), plan, step);
            rounded.slot_offset_mm[index] = Some(offset);
            at_offset_mm(line, ends, offset)
        } else {
            line.crossing_mm(ends[0], ends[1])
        };
        rounded.contacts[index].saddle_setback_mm = place_mm.unwrap_or(built_mm) - line.scale_mm();
    }
}

/// Where along a string its crest stands off the line by `offset`: the offset grows evenly along the string.
fn at_offset_mm(line: PlanLine, set: [PlanPoint; 2], offset: f64) -> Option<f64> {
    let (nut, saddle) = (offset_mm(set, line.nut), offset_mm(set, line.saddle));
    let fraction = (offset - nut) / (saddle - nut);
    fraction.is_finite().then(|| fraction * line.scale_mm())
}

/// An offset rounded to the nearest multiple of the step that keeps the margin at the blank's edges.
fn within_blank(offset: f64, plan: &Plan, step: Step) -> f64 {
    let half_mm = 0.5 * plan.saddle.thickness_mm - plan.saddle.edge_margin_mm;
    let most = (half_mm / step.mm() + HAIR_MM).floor();
    (offset / step.mm()).round().clamp(-most, most) * step.mm() + 0.0
}

/// A value rounded to the nearest multiple of the step; where it lies within its travel, to the nearest one there, or
/// left alone where there is none.
fn nearest(value_mm: f64, [low, high]: [f64; 2], step: Step) -> f64 {
    let multiple = (value_mm / step.mm()).round();
    let (least, most) = ((low / step.mm() - HAIR_MM).ceil(), (high / step.mm() + HAIR_MM).floor());
    let within = value_mm >= low - HAIR_MM && value_mm <= high + HAIR_MM;
    let multiple = if !within {
        multiple
    } else if least <= most {
        multiple.clamp(least, most)
    } else {
        return value_mm;
    };
    // A rounded zero has no sign.
    multiple * step.mm() + 0.0
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn values_go_to_the_nearest_multiple_within_their_travel() {
        let wide = [-5.0, 15.0];
        assert_eq!(nearest(1.26, wide, Step::Mm05), 1.5);
        assert_eq!(nearest(1.24, wide, Step::Mm05), 1.0);
        assert_eq!(nearest(-0.1, wide, Step::Mm05).to_bits(), 0.0_f64.to_bits());
        // 4/64 in is 1.5875 mm.
        assert!((nearest(1.6, wide, Step::Inch64) - 1.5875).abs() < 1e-12);
        // The nearest multiple lies beyond the travel.
        assert_eq!(nearest(0.3, [0.0, 0.4], Step::Mm05), 0.0);
        // No multiple lies within.
        assert_eq!(nearest(0.3, [0.2, 0.4], Step::Mm05), 0.3);
        // What lies beyond its travel already is not drawn into it.
        assert_eq!(nearest(3.1, [0.0, 1.0], Step::Mm05), 3.0);
        assert!((nearest(0.3, [0.0, 0.3], Step::Mm01) - 0.3).abs() < 1e-12);
    }
}
