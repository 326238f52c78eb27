//! The layout for the bench: where everything stands from the chosen datum, and how each blank's top is shaped.
//!
//! x runs from the datum along the centre line away from the nut, y across from the centre line toward string 1, z up
//! from the plane of the first and the last fret's crown. Slants are angles from the square to the centre line,
//! positive where the bass end lies farther from the nut.

use std::ops::RangeInclusive;

use crestline_physics::fit::offset_mm;
use crestline_physics::neck::PlanPoint;
use serde::Serialize;

use crate::{Checked, Datum, Layout, Plan, Point, Point3, SaddleStyle, Solution};

/// The layout by datum.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct BenchLayout {
    /// Always `crestline-bench`.
    pub format: &'static str,
    /// Version of the layout.
    pub version: u64,
    /// Where x is measured from.
    pub datum: Datum,
    /// Distance of the datum from the nominal nut line along the centre line, mm.
    pub datum_x_mm: f64,
    /// One entry a string, string 1 first.
    pub strings: Vec<BenchString>,
    /// The blanks: the saddle, both pieces, or a piece a string.
    pub pieces: Vec<BenchPiece>,
}

/// One string on the bench.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct BenchString {
    /// String number, 1 first.
    pub string: u32,
    /// Its name.
    pub name: String,
    /// Number of the blank that carries it, 1 first.
    pub piece: u32,
    /// The crest from the datum, with its height.
    pub crest_mm: Point3,
    /// The edge of the nut from the datum.
    pub nut_edge_mm: Point,
    /// How much lower the next string's crest stands than this one, mm; negative where it stands higher, absent for
    /// the last string.
    pub drop_to_next_mm: Option<f64>,
    /// Where the crest breaks over the top of the blank: distance from the blank's face on the nut's side, square to
    /// it, mm.
    pub break_from_front_mm: f64,
    /// The same from the blank's centre line, positive away from the nut, mm.
    pub break_from_centre_mm: f64,
    /// The same as a fraction of the blank's thickness: 0 at the face on the nut's side, 1 at the other.
    pub break_fraction: f64,
}

/// One blank on the bench.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct BenchPiece {
    /// Its number, 1 first.
    pub piece: u32,
    /// The first string that it carries.
    pub first_string: u32,
    /// The last string that it carries.
    pub last_string: u32,
    /// Treble end of its centre line, end margin included, from the datum.
    pub treble_end_mm: Point,
    /// Bass end of its centre line, end margin included, from the datum.
    pub bass_end_mm: Point,
    /// Corners of the outline from the datum: treble end on the nut's side, then round by the far side.
    pub corners_mm: [Point; 4],
    /// Length, end margins included, mm.
    pub length_mm: f64,
    /// Thickness, mm.
    pub thickness_mm: f64,
    /// Angle from the square to the centre line; positive where the bass end lies farther from the nut.
    pub slant_degrees: f64,
}

/// The layout of a solution of this plan, from the datum that the plan names.
#[must_use]
pub fn bench_layout(checked: &Checked, solution: &Solution) -> BenchLayout {
    bench_layout_from(checked.plan(), solution, checked.plan().sheet.datum)
}

/// The layout of a solution of this plan from any datum.
#[must_use]
pub fn bench_layout_from(plan: &Plan, solution: &Solution, datum: Datum) -> BenchLayout {
    let x_mm = datum_x_mm(&solution.layout, datum);
    let blanks = &solution.layout.blanks;
    let pieces: Vec<BenchPiece> =
        blanks.iter().enumerate().map(|(index, corners)| piece(plan, index, corners, x_mm)).collect();
    BenchLayout {
        format: "crestline-bench",
        version: 1,
        datum,
        datum_x_mm: x_mm,
        strings: pieces.iter().flat_map(|piece| strings(solution, piece, x_mm)).collect(),
        pieces,
    }
}

/// Where a datum lies on the centre line of a layout, mm from the nominal nut line.
#[must_use]
pub fn datum_x_mm(layout: &Layout, datum: Datum) -> f64 {
    match datum {
        Datum::Nut => 0.0,
        Datum::TwelfthFret => layout.frets.get(11).map_or(0.0, centre_crossing_x_mm),
        Datum::SaddleLine => centre_crossing_x_mm(&layout.saddle_line),
    }
}

/// x at which a line crosses the centre line; a single string's line, which is a point, is square to it.
fn centre_crossing_x_mm([treble, bass]: &[Point; 2]) -> f64 {
    let across = bass.y - treble.y;
    if across == 0.0 { treble.x } else { treble.x - treble.y * (bass.x - treble.x) / across }
}

/// Strings on the blank with this index, by number.
fn carried(plan: &Plan, index: usize) -> RangeInclusive<u32> {
    let (own, last) = (index as u32 + 1, plan.strings.len() as u32);
    match plan.saddle.style {
        SaddleStyle::Separate => own..=own,
        SaddleStyle::TwoPiece => {
            let split = plan.saddle.split_after.unwrap_or(1);
            if index == 0 { 1..=split } else { split + 1..=last }
        }
        SaddleStyle::Shaped | SaddleStyle::Straight => 1..=last,
    }
}

fn piece(plan: &Plan, index: usize, corners: &[Point; 4], datum_x_mm: f64) -> BenchPiece {
    let corners_mm = corners.map(|corner| from_datum(corner, datum_x_mm));
    let [front_treble, back_treble, back_bass, front_bass] = corners_mm;
    let (treble, bass) = (middle(front_treble, back_treble), middle(front_bass, back_bass));
    let strings = carried(plan, index);
    BenchPiece {
        piece: index as u32 + 1,
        first_string: *strings.start(),
        last_string: *strings.end(),
        treble_end_mm: treble,
        bass_end_mm: bass,
        corners_mm,
        length_mm: (treble.x - bass.x).hypot(treble.y - bass.y),
        thickness_mm: plan.saddle.thickness_mm,
        slant_degrees: (bass.x - treble.x).atan2(treble.y - bass.y).to_degrees(),
    }
}

/// The strings that a blank carries.
fn strings<'s>(
    solution: &'s Solution,
    piece: &'s BenchPiece,
    datum_x_mm: f64,
) -> impl Iterator<Item = BenchString> + 's {
    let reports = &solution.report.strings;
    let (first, last) = (piece.first_string.max(1) as usize, (piece.last_string as usize).min(reports.len()));
    (first - 1..last).map(move |index| {
        let (report, line) = (&reports[index], &solution.layout.strings[index]);
        let crest = report.built.crest_mm;
        let at = from_datum(line.crest, datum_x_mm);
        let centre = [piece.treble_end_mm, piece.bass_end_mm].map(plan_point);
        let break_from_centre_mm = offset_mm(centre, plan_point(at));
        let break_from_front_mm = break_from_centre_mm + 0.5 * piece.thickness_mm;
        BenchString {
            string: report.string,
            name: report.name.clone(),
            piece: piece.piece,
            crest_mm: Point3 { x: at.x, y: at.y, z: crest.z },
            nut_edge_mm: from_datum(line.nut_edge, datum_x_mm),
            drop_to_next_mm: reports.get(index + 1).map(|next| crest.z - next.built.crest_mm.z),
            break_from_front_mm,
            break_from_centre_mm,
            break_fraction: break_from_front_mm / piece.thickness_mm,
        }
    })
}

fn from_datum(point: Point, datum_x_mm: f64) -> Point {
    Point { x: point.x - datum_x_mm, y: point.y }
}

fn middle(a: Point, b: Point) -> Point {
    Point { x: a.x.midpoint(b.x), y: a.y.midpoint(b.y) }
}

fn plan_point(point: Point) -> PlanPoint {
    PlanPoint::new(point.x, point.y)
}
