//! The drawing model: sheets of shapes on layers, in millimetres, y up.

use crate::{Dimension, Point, Rect, Text};

/// A drawing of one or more sheets that share their layers.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Drawing {
    /// What the drawing is called in the properties of the files.
    pub title: String,
    /// The layers, in the order in which they are painted.
    pub layers: Vec<Layer>,
    /// The sheets in order.
    pub sheets: Vec<Sheet>,
}

impl Drawing {
    /// A drawing without layers and sheets.
    #[must_use]
    pub fn new(title: impl Into<String>) -> Self {
        Self { title: title.into(), ..Self::default() }
    }

    /// Adds a layer. Names should be capital letters, digits and underscores, as every CAD program takes them.
    pub fn add_layer(&mut self, name: &'static str, colour: Colour) -> LayerId {
        self.layers.push(Layer { name, colour });
        LayerId(self.layers.len() - 1)
    }

    /// The layer of an item; `None` if the item comes from another drawing.
    #[must_use]
    pub fn layer(&self, id: LayerId) -> Option<&Layer> {
        self.layers.get(id.0)
    }
}

/// A layer's number in its drawing.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct LayerId(pub usize);

/// A layer: things that are shown, hidden or machined together.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Layer {
    /// Its name in every output.
    pub name: &'static str,
    /// The colour of everything on it.
    pub colour: Colour,
}

/// The colours of layers. All print well in black and white.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Colour {
    /// Black; a CAD program with a dark ground shows it white.
    Black,
    /// Middle grey.
    Grey,
    /// Dark red.
    Red,
    /// Dark blue.
    Blue,
    /// Dark green.
    Green,
    /// Violet.
    Violet,
}

impl Colour {
    /// Red, green and blue, 0 to 255.
    #[must_use]
    pub const fn rgb(self) -> [u8; 3] {
        match self {
            Self::Black => [0, 0, 0],
            Self::Grey => [110, 110, 110],
            Self::Red => [176, 16, 16],
            Self::Blue => [16, 64, 160],
            Self::Green => [0, 100, 50],
            Self::Violet => [110, 30, 130],
        }
    }

    /// The number of the nearest colour in the DXF colour table.
    #[must_use]
    pub const fn dxf_number(self) -> u8 {
        match self {
            Self::Black => 7,
            Self::Grey => 8,
            Self::Red => 1,
            Self::Blue => 5,
            Self::Green => 3,
            Self::Violet => 6,
        }
    }
}

/// One sheet of paper, or one stretch of a drawing without paper.
#[derive(Debug, Clone, PartialEq)]
pub struct Sheet {
    /// What it shows.
    pub name: String,
    /// The part of the plane that the sheet covers; its size is the page size.
    pub area: Rect,
    /// What is on it, painted in this order.
    pub items: Vec<Item>,
}

impl Sheet {
    /// An empty sheet with its origin in the lower left corner, mm.
    #[must_use]
    pub fn new(name: impl Into<String>, width_mm: f64, height_mm: f64) -> Self {
        Self { name: name.into(), area: Rect::new(0.0, 0.0, width_mm, height_mm), items: vec![] }
    }

    /// Adds a shape.
    pub fn add(&mut self, layer: LayerId, pen: Pen, shape: Shape) {
        self.items.push(Item { layer, pen, shape });
    }
}

/// A shape with its layer and pen.
#[derive(Debug, Clone, PartialEq)]
pub struct Item {
    /// The layer it belongs to.
    pub layer: LayerId,
    /// The pen its lines are drawn with.
    pub pen: Pen,
    /// What it is.
    pub shape: Shape,
}

/// The kinds of things on a sheet.
#[derive(Debug, Clone, PartialEq)]
pub enum Shape {
    /// A straight line.
    Line(Point, Point),
    /// Straight lines through points.
    Polyline {
        /// The corners.
        points: Vec<Point>,
        /// Whether the last corner joins the first.
        closed: bool,
    },
    /// Part of a circle, anticlockwise from the start to the end.
    Arc {
        /// Centre.
        centre: Point,
        /// Radius, mm.
        radius_mm: f64,
        /// Start, degrees anticlockwise from x.
        start_deg: f64,
        /// End, degrees anticlockwise from x.
        end_deg: f64,
    },
    /// A circle.
    Circle {
        /// Centre.
        centre: Point,
        /// Radius, mm.
        radius_mm: f64,
    },
    /// A marked place: a cross on paper, a point for a machine.
    Point(Point),
    /// A filled convex polygon, such as an arrow.
    Fill(Vec<Point>),
    /// A line of text.
    Text(Text),
    /// A measured dimension.
    Dimension(Dimension),
}

/// How a line is drawn.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Pen {
    /// Line width.
    pub width: Width,
    /// Unbroken, dashed or chained.
    pub style: LineStyle,
}

impl Pen {
    /// An unbroken line of a width.
    #[must_use]
    pub const fn solid(width: Width) -> Self {
        Self { width, style: LineStyle::Solid }
    }

    /// A line of a width and a style.
    #[must_use]
    pub const fn new(width: Width, style: LineStyle) -> Self {
        Self { width, style }
    }
}

/// The line widths of ISO 128-2.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Width {
    /// 0.13 mm
    W013,
    /// 0.18 mm
    W018,
    /// 0.25 mm
    W025,
    /// 0.35 mm
    W035,
    /// 0.5 mm
    W050,
    /// 0.7 mm
    W070,
}

impl Width {
    /// The width, mm.
    #[must_use]
    pub const fn mm(self) -> f64 {
        match self {
            Self::W013 => 0.13,
            Self::W018 => 0.18,
            Self::W025 => 0.25,
            Self::W035 => 0.35,
            Self::W050 => 0.5,
            Self::W070 => 0.7,
        }
    }
}

/// The line styles of ISO 128-2 that are used here.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum LineStyle {
    /// Outlines, dimensions.
    Solid,
    /// Hidden edges.
    Dashed,
    /// Centre lines: long dash and dot.
    Chain,
}

impl LineStyle {
    /// Lengths of dash, gap, dash, gap … for a line width, mm; empty for an unbroken line.
    /// ISO 128-2: dash 12 d, long dash 24 d, gap 3 d, dot 0.5 d (from memory).
    #[must_use]
    pub fn pattern_mm(self, width: Width) -> Vec<f64> {
        let d = width.mm();
        match self {
            Self::Solid => vec![],
            Self::Dashed => vec![12.0 * d, 3.0 * d],
            Self::Chain => vec![24.0 * d, 3.0 * d, 0.5 * d, 3.0 * d],
        }
    }
}

/// The nominal lettering heights of ISO 3098, mm.
pub mod lettering {
    /// Dimensions, tables.
    pub const SMALL_MM: f64 = 2.5;
    /// Titles of views.
    pub const MIDDLE_MM: f64 = 3.5;
    /// Title of a sheet.
    pub const LARGE_MM: f64 = 5.0;
}
