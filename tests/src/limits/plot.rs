//! A plain plot of curves with their names at the right, as a drawing.

use crestline_drawing::{
    Anchor, Colour, Drawing, LayerId, LineStyle, Pen, Point, Rect, Shape, Sheet, Text, Width, lettering, pt,
    svg, wrap,
};

const WIDTH_MM: f64 = 205.0;
const HEIGHT_MM: f64 = 110.0;
/// The field of the curves; names stand to its right.
const FIELD: (f64, f64, f64, f64) = (20.0, 18.0, 108.0, 78.0);
const COLOURS: [(&str, Colour); 5] = [
    ("BLACK", Colour::Black),
    ("RED", Colour::Red),
    ("BLUE", Colour::Blue),
    ("GREEN", Colour::Green),
    ("VIOLET", Colour::Violet),
];
/// Least distance between two names, mm.
const NAME_STEP_MM: f64 = 3.6;

/// A curve through points (x, y).
pub struct Curve {
    /// Written at its right end; curves without a name belong to the one before and take its colour.
    pub name: String,
    pub points: Vec<[f64; 2]>,
}

/// What is plotted.
pub struct Plot {
    pub title: &'static str,
    pub x: &'static str,
    pub y: &'static str,
    /// Values written along x.
    pub x_marks: Vec<f64>,
    pub curves: Vec<Curve>,
}

/// The field's two axes.
struct Axes {
    x: [f64; 2],
    y: [f64; 2],
    area: Rect,
}

impl Axes {
    fn at(&self, [x, y]: [f64; 2]) -> Point {
        let share = |value: f64, [low, high]: [f64; 2]| (value - low) / (high - low);
        let Rect { min, max } = self.area;
        pt(min.x + share(x, self.x) * (max.x - min.x), min.y + share(y, self.y) * (max.y - min.y))
    }
}

/// A step of 1, 2 or 5 times a power of ten that divides a span into four to ten parts.
fn step(span: f64) -> f64 {
    let power = 10f64.powf((span / 4.0).log10().floor());
    let share = span / 4.0 / power;
    power
        * if share >= 5.0 {
            5.0
        } else if share >= 2.0 {
            2.0
        } else {
            1.0
        }
}

fn range(values: impl Iterator<Item = f64>) -> [f64; 2] {
    values.fold([0.0, 0.0], |[low, high], value| [low.min(value), high.max(value)])
}

impl Plot {
    /// The plot as an SVG file.
    pub fn svg(&self) -> String {
        let mut drawing = Drawing::new(self.title);
        let text = drawing.add_layer("TEXT", Colour::Black);
        let grid = drawing.add_layer("GRID", Colour::Grey);
        let colours = COLOURS.map(|(name, colour)| drawing.add_layer(name, colour));
        let mut sheet = Sheet::new(self.title, WIDTH_MM, HEIGHT_MM);
        let points = || self.curves.iter().flat_map(|curve| &curve.points);
        let low_high = range(points().map(|point| point[1]));
        let step = step(low_high[1] - low_high[0]);
        let y = [(low_high[0] / step).floor() * step, (low_high[1] / step).ceil() * step];
        let x = [self.x_marks[0], self.x_marks[self.x_marks.len() - 1]];
        let axes = Axes { x, y, area: Rect::new(FIELD.0, FIELD.1, FIELD.2, FIELD.3) };
        self.push_axes(&mut sheet, [text, grid], &axes, step);
        self.push_curves(&mut sheet, colours, &axes);
        drawing.sheets.push(sheet);
        String::from_utf8(svg(&drawing)).expect("an SVG file is text")
    }

    fn push_axes(&self, sheet: &mut Sheet, [text, grid]: [LayerId; 2], axes: &Axes, step: f64) {
        let Rect { min, max } = axes.area;
        let thin = Pen::solid(Width::W013);
        let small = |at, anchor, words: &str| Text { anchor, ..Text::new(at, lettering::SMALL_MM, words) };
        let decimals = usize::try_from(-(step.log10().floor() as i32)).unwrap_or(0);
        let marks = ((axes.y[1] - axes.y[0]) / step).round() as i32;
        for mark in 0..=marks {
            let value = axes.y[0] + f64::from(mark) * step;
            let y = axes.at([axes.x[0], value]).y;
            sheet.add(grid, thin, Shape::Line(pt(min.x, y), pt(max.x, y)));
            let words = format!("{value:.decimals$}").replace('-', "−");
            sheet.add(text, thin, Shape::Text(small(pt(min.x - 1.5, y - 1.25), Anchor::End, &words)));
        }
        for value in &self.x_marks {
            let x = axes.at([*value, axes.y[0]]).x;
            sheet.add(grid, thin, Shape::Line(pt(x, min.y), pt(x, max.y)));
            sheet.add(text, thin, Shape::Text(small(pt(x, min.y - 4.5), Anchor::Middle, &value.to_string())));
        }
        let middle = (min.x + max.x) / 2.0;
        sheet.add(text, thin, Shape::Text(small(pt(middle, min.y - 10.0), Anchor::Middle, self.x)));
        sheet.add(text, thin, Shape::Text(small(pt(min.x - 12.0, max.y + 3.0), Anchor::Start, self.y)));
        let title = Text::new(pt(min.x - 12.0, max.y + 8.0), lettering::MIDDLE_MM, self.title);
        sheet.add(text, thin, Shape::Text(title));
    }

    /// Curves in the colours in turn, broken from the second turn on, each with its name where the first of its
    /// lines ends.
    fn push_curves(&self, sheet: &mut Sheet, colours: [LayerId; 5], axes: &Axes) {
        let mut number = None;
        let mut names: Vec<(f64, LayerId, &str)> = Vec::new();
        for curve in &self.curves {
            if !curve.name.is_empty() {
                number = Some(number.map_or(0, |number| number + 1));
            }
            let index = number.unwrap_or(0);
            let style =
                if (index / colours.len()).is_multiple_of(2) { LineStyle::Solid } else { LineStyle::Dashed };
            let layer = colours[index % colours.len()];
            let points: Vec<_> = curve.points.iter().map(|point| axes.at(*point)).collect();
            if let (Some(last), false) = (points.last(), curve.name.is_empty()) {
                names.push((last.y, layer, &curve.name));
            }
            let shape = Shape::Polyline { points, closed: false };
            sheet.add(layer, Pen::new(Width::W025, style), shape);
        }
        names.sort_by(|a, b| b.0.total_cmp(&a.0));
        let x = axes.area.max.x + 2.0;
        let mut below = f64::MAX;
        for (y, layer, name) in names {
            let y = y.min(below);
            let line = wrap(name, lettering::SMALL_MM, WIDTH_MM - x).swap_remove(0);
            let text = Text::new(pt(x, y - 1.25), lettering::SMALL_MM, line);
            sheet.add(layer, Pen::solid(Width::W013), Shape::Text(text));
            below = y - NAME_STEP_MM;
        }
    }
}

#[test]
fn steps_divide_a_span_into_a_handful_of_parts() {
    for span in [0.013, 0.4, 1.0, 2.4, 9.9, 57.0] {
        let parts = span / step(span);
        assert!((3.9..=10.1).contains(&parts), "{span} in {parts} parts");
    }
}
