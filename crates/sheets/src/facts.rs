//! What all views draw from: the plan and its solution side by side, in the drawing's points.

use crestline_drawing::{Point, pt};
use crestline_plan::{BuiltReport, Datum, Plan, SaddleStyle, Solution};

use crate::SheetOptions;

/// A plan, its solution and the options, with what the views share worked out once.
pub(crate) struct Facts<'a> {
    pub plan: &'a Plan,
    pub solution: &'a Solution,
    pub options: &'a SheetOptions,
    /// x of the datum in the plan frame, mm.
    pub datum_x_mm: f64,
    pub strings: Vec<StringFacts>,
    pub slots: Vec<Slot>,
    /// The nominal lines from treble to bass.
    pub nut_line: [Point; 2],
    pub saddle_line: [Point; 2],
}

/// One string.
pub(crate) struct StringFacts {
    pub number: u32,
    pub name: String,
    /// Outside diameter, mm.
    pub gauge_mm: f64,
    pub wound: bool,
    /// Where it crosses the nominal nut line.
    pub nut: Point,
    /// The edge of the nut as built.
    pub nut_edge: Point,
    /// Where it crosses the nominal saddle line.
    pub saddle: Point,
    /// The crest as built.
    pub crest: Point,
    pub ideal_setback_mm: f64,
    /// Half-width of its 90 % band, where the plan has tolerances.
    pub plus_minus_mm: Option<f64>,
    pub built: BuiltReport,
    /// Error left at fret 12, cents.
    pub octave_cents: Option<f64>,
}

/// A slot or a piece: its outline and the ends of its centre line.
pub(crate) struct Slot {
    pub name: String,
    pub corners: [Point; 4],
    pub treble_end: Point,
    pub bass_end: Point,
    pub width_mm: f64,
}

impl<'a> Facts<'a> {
    pub fn new(plan: &'a Plan, solution: &'a Solution, options: &'a SheetOptions) -> Self {
        let strings = strings(plan, solution);
        let datum_x_mm = datum_x_mm(solution, options.datum);
        let line = |line: &[crestline_plan::Point; 2]| line.map(point);
        let (nut_line, saddle_line) = (line(&solution.layout.nut_line), line(&solution.layout.saddle_line));
        Self {
            plan,
            solution,
            options,
            datum_x_mm,
            strings,
            slots: slots(plan, solution),
            nut_line,
            saddle_line,
        }
    }

    /// A length as the options want it written.
    pub fn text(&self, length_mm: f64) -> String {
        self.options.units.text(length_mm)
    }

    /// x from the datum as written.
    pub fn x_text(&self, x_mm: f64) -> String {
        self.text(x_mm - self.datum_x_mm)
    }

    /// The datum in words.
    pub fn datum_words(&self) -> &'static str {
        match self.options.datum {
            Datum::Nut => "nominal nut line",
            Datum::TwelfthFret => "crown of fret 12",
            Datum::SaddleLine => "nominal saddle line",
        }
    }

    /// The datum in few words, for figures and headings.
    pub fn datum_short(&self) -> &'static str {
        match self.options.datum {
            Datum::Nut => "the nut line",
            Datum::TwelfthFret => "fret 12",
            Datum::SaddleLine => "the saddle line",
        }
    }

    /// Whether it is known how sure the setbacks are.
    pub fn has_bands(&self) -> bool {
        self.strings.iter().any(|string| string.plus_minus_mm.is_some())
    }

    /// Whether any nut edge has been moved.
    pub fn nut_is_compensated(&self) -> bool {
        self.strings.iter().any(|s| s.built.nut_setback_mm != 0.0)
    }
}

impl StringFacts {
    /// Number and name, or the number alone where the name is no more than that.
    pub fn label(&self) -> String {
        let number = self.number.to_string();
        if self.name == number || self.name.trim().is_empty() {
            number
        } else {
            format!("{number}  {}", self.name)
        }
    }

    /// Direction along the string, away from the nut.
    pub fn along(&self) -> Point {
        self.saddle.minus(self.nut).unit()
    }
}

impl Slot {
    /// Length of the centre line, mm.
    pub fn length_mm(&self) -> f64 {
        self.treble_end.distance(self.bass_end)
    }

    /// Angle from the square to the centre line; positive where the bass end lies farther from the nut.
    pub fn slant_degrees(&self) -> f64 {
        let along = self.treble_end.minus(self.bass_end);
        (-along.x).atan2(along.y).to_degrees()
    }
}

/// A point of the plan frame as a point of the drawing.
pub(crate) fn point(p: crestline_plan::Point) -> Point {
    pt(p.x, p.y)
}

fn strings(plan: &Plan, solution: &Solution) -> Vec<StringFacts> {
    let reports = solution.report.strings.iter().zip(&solution.layout.strings).zip(&plan.strings);
    reports
        .map(|((report, line), string)| StringFacts {
            number: report.string,
            name: report.name.clone(),
            gauge_mm: string.wrap.as_ref().map_or(string.core.diameter_mm, |wrap| wrap.outside_mm),
            wound: string.wrap.is_some(),
            nut: point(line.nut),
            nut_edge: point(line.nut_edge),
            saddle: point(line.saddle),
            crest: point(line.crest),
            ideal_setback_mm: report.ideal.saddle_setback_mm,
            plus_minus_mm: report.plus_minus_mm,
            built: report.built,
            octave_cents: report.frets.iter().find(|fret| fret.fret == 12).map(|fret| fret.built_cents),
        })
        .collect()
}

fn slots(plan: &Plan, solution: &Solution) -> Vec<Slot> {
    let count = solution.layout.blanks.len();
    let outlines = solution.layout.blanks.iter().enumerate();
    outlines.map(|(index, corners)| slot(slot_name(plan, index, count), corners.map(point))).collect()
}

fn slot_name(plan: &Plan, index: usize, count: usize) -> String {
    let number = index + 1;
    match plan.saddle.style {
        SaddleStyle::Separate => format!("Piece {number}"),
        _ if count == 1 => "Slot".to_owned(),
        _ => format!("Slot {number}"),
    }
}

/// The ends are the pair of opposite edges whose middles lie farther apart across the neck.
fn slot(name: String, corners: [Point; 4]) -> Slot {
    let [a, b, c, d] = corners;
    let pairs = [((a, b), (c, d)), ((b, c), (d, a))];
    let apart = |pair: &((Point, Point), (Point, Point))| {
        (pair.0.0.middle(pair.0.1).y - pair.1.0.middle(pair.1.1).y).abs()
    };
    let ends = if apart(&pairs[0]) >= apart(&pairs[1]) { pairs[0] } else { pairs[1] };
    let width_mm = ends.0.0.distance(ends.0.1).midpoint(ends.1.0.distance(ends.1.1));
    let (one, two) = (ends.0.0.middle(ends.0.1), ends.1.0.middle(ends.1.1));
    let (treble_end, bass_end) = if one.y >= two.y { (one, two) } else { (two, one) };
    Slot { name, corners, treble_end, bass_end, width_mm }
}

/// Where the datum lies on the centre line.
fn datum_x_mm(solution: &Solution, datum: Datum) -> f64 {
    let line = match datum {
        Datum::Nut => return 0.0,
        Datum::TwelfthFret => solution.layout.frets.get(11),
        Datum::SaddleLine => Some(&solution.layout.saddle_line),
    };
    line.map_or(0.0, |line| crossing_x_mm(line.map(point)))
}

/// x at which a line through two points crosses the centre line; the middle for a line along it.
pub(crate) fn crossing_x_mm([a, b]: [Point; 2]) -> f64 {
    let rise = b.y - a.y;
    if rise == 0.0 { a.x.midpoint(b.x) } else { a.x - a.y * (b.x - a.x) / rise }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_slots_ends_do_not_depend_on_where_its_outline_starts() {
        let corners = [pt(100.0, 30.0), pt(103.0, 30.2), pt(106.0, -30.0), pt(103.0, -30.2)];
        for turn in 0..4 {
            let mut turned = corners;
            turned.rotate_left(turn);
            let slot = slot(String::new(), turned);
            assert!(slot.treble_end.distance(pt(101.5, 30.1)) < 1e-12);
            assert!(slot.bass_end.distance(pt(104.5, -30.1)) < 1e-12);
            // tan⁻¹(3/60.2) = 2.85291 degrees, by hand.
            assert!((slot.slant_degrees() - 2.85291).abs() < 1e-5);
        }
    }

    #[test]
    fn the_centre_line_is_crossed_where_the_line_crosses_it() {
        assert!((crossing_x_mm([pt(10.0, 5.0), pt(20.0, -5.0)]) - 15.0).abs() < 1e-12);
        assert!((crossing_x_mm([pt(10.0, 15.0), pt(12.0, 5.0)]) - 13.0).abs() < 1e-12);
    }
}
