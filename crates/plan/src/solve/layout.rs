//! The plan view: string lines, crests, frets and the outlines to be cut.

use crestline_physics::neck::PlanPoint;

use super::Fitted;
use super::prepare::Prepared;
use super::report::point;
use crate::{Checked, Datum, Layout, Point, Saddle, SaddleStyle, StringLine};

/// Greatest share of the way to the next string that single pieces fill.
const PIECE_SHARE: f64 = 0.7;
/// Gap left between two pieces where they meet, mm.
const PIECE_GAP_MM: f64 = 0.5;

/// The plan view of a fitted plan.
pub(super) fn layout(checked: &Checked, prepared: &Prepared, fitted: &Fitted) -> Layout {
    let (plan, neck) = (checked.plan(), checked.neck());
    let strings: Vec<StringLine> =
        (0..prepared.strings.len()).map(|index| string_line(checked, prepared, fitted, index)).collect();
    let across = |end: fn(&StringLine) -> Point| [end(&strings[0]), end(&strings[strings.len() - 1])];
    Layout {
        nut_line: across(|string| string.nut),
        saddle_line: across(|string| string.saddle),
        frets: neck.frets.iter().map(|line| line.map(point)).collect(),
        datum_x_mm: match plan.sheet.datum {
            Datum::Nut => 0.0,
            Datum::TwelfthFret => neck.twelfth_fret_x_mm,
            Datum::SaddleLine => neck.saddle_line_x_mm,
        },
        blanks: blanks(&plan.saddle, &strings, fitted),
        strings,
    }
}

fn string_line(checked: &Checked, prepared: &Prepared, fitted: &Fitted, index: usize) -> StringLine {
    let plan = checked.plan();
    let line = prepared.strings[index].line;
    let crest = |setback_mm: f64| point(line.at(line.scale_mm() + setback_mm));
    let built = fitted.built.contacts[index];
    StringLine {
        nut: point(line.nut),
        saddle: point(line.saddle),
        nut_edge: point(line.at(built.nut_setback_mm)),
        ideal_crest: crest(fitted.ideal.contacts[index].saddle_setback_mm),
        crest: crest(built.saddle_setback_mm),
        travel: plan.saddle.travel_mm.map(crest),
        as_built: plan.as_built.as_ref().map(|as_built| crest(as_built.saddle_setback_mm[index])),
    }
}

fn blanks(saddle: &Saddle, strings: &[StringLine], fitted: &Fitted) -> Vec<[Point; 4]> {
    if saddle.style == SaddleStyle::Separate {
        return pieces(saddle, strings);
    }
    let margin_mm = saddle.end_margin_mm;
    // Where two pieces meet, each reaches half the way to the other.
    let lines = &fitted.built.lines;
    let gap = |index: usize| (strings[index].saddle.y - strings[index + 1].saddle.y).abs();
    let count = lines.len();
    let mut outlines = Vec::new();
    for (index, line) in lines.iter().enumerate() {
        let split = |after: usize| (0.5 * (gap(after) - PIECE_GAP_MM)).clamp(0.0, margin_mm);
        let boundary = fitted_split(line, strings, index);
        let at_treble = if index == 0 { margin_mm } else { split(boundary) };
        let at_bass = if index + 1 == count { margin_mm } else { split(boundary) };
        outlines.push(outline(*line, saddle.thickness_mm, [at_treble, at_bass]));
    }
    outlines
}

/// Index of the string on the treble side of the gap between the first and the second piece.
fn fitted_split(line: &[PlanPoint; 2], strings: &[StringLine], piece: usize) -> usize {
    let y = if piece == 0 { line[1].y_mm } else { line[0].y_mm };
    let nearest =
        |a: &usize, b: &usize| (strings[*a].crest.y - y).abs().total_cmp(&(strings[*b].crest.y - y).abs());
    let string = (0..strings.len()).min_by(nearest).unwrap_or(0);
    let treble = if piece == 0 { string } else { string.saturating_sub(1) };
    treble.min(strings.len().saturating_sub(2))
}

/// A rectangle of this thickness along a line, longer by the margins at its treble and bass end.
fn outline([treble, bass]: [PlanPoint; 2], thickness_mm: f64, margins_mm: [f64; 2]) -> [Point; 4] {
    let length = treble.distance_mm(bass);
    // Unit vector from bass to treble; a line for one string is square to the centre line.
    let (along_x, along_y) = if length > 0.0 {
        ((treble.x_mm - bass.x_mm) / length, (treble.y_mm - bass.y_mm) / length)
    } else {
        (0.0, 1.0)
    };
    let corner = |end: PlanPoint, along: f64, across: f64| Point {
        x: end.x_mm + along * along_x + across * along_y,
        y: end.y_mm + along * along_y - across * along_x,
    };
    let half = 0.5 * thickness_mm;
    let [at_treble, at_bass] = margins_mm;
    [
        corner(treble, at_treble, -half),
        corner(treble, at_treble, half),
        corner(bass, -at_bass, half),
        corner(bass, -at_bass, -half),
    ]
}

/// One piece a string, its crest in the middle, square to the centre line.
fn pieces(saddle: &Saddle, strings: &[StringLine]) -> Vec<[Point; 4]> {
    let neighbours = strings
        .windows(2)
        .map(|pair| (pair[0].saddle.y - pair[1].saddle.y).abs())
        .fold(f64::INFINITY, f64::min);
    let half = saddle.end_margin_mm.min(0.5 * PIECE_SHARE * neighbours);
    let piece = |string: &StringLine| {
        let at = PlanPoint::new(string.crest.x, string.crest.y);
        outline([at, at], saddle.thickness_mm, [half, half])
    };
    strings.iter().map(piece).collect()
}
