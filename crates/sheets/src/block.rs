//! A block: one view or table in its own coordinates, to be placed on a sheet.

use crestline_drawing::{
    Anchor, Dimension, Item, LayerId, LineStyle, Pen, Point, Rect, Shape, Text, Width, lettering, pt,
};

use crate::layers;

pub(crate) const THIN: Pen = Pen::solid(Width::W018);
pub(crate) const MEDIUM: Pen = Pen::solid(Width::W025);
pub(crate) const THICK: Pen = Pen::solid(Width::W035);
pub(crate) const CHAIN: Pen = Pen::new(Width::W018, LineStyle::Chain);
pub(crate) const DASHED: Pen = Pen::new(Width::W018, LineStyle::Dashed);

/// Space between a view and its title, mm.
const TITLE_GAP_MM: f64 = 4.0;

/// A view or table with everything that belongs to it.
#[derive(Debug, Clone, Default, PartialEq)]
pub(crate) struct Block {
    /// Its name in the title block.
    pub name: String,
    /// The scale it is drawn to, if it is a view.
    pub scale: Option<&'static str>,
    /// Whether it starts a sheet of its own.
    pub alone: bool,
    /// The heading, put above it when it is placed.
    pub title: String,
    pub items: Vec<Item>,
}

impl Block {
    pub fn new(name: &str, title: impl Into<String>) -> Self {
        Self { name: name.to_owned(), title: title.into(), ..Self::default() }
    }

    pub fn add(&mut self, layer: LayerId, pen: Pen, shape: Shape) {
        self.items.push(Item { layer, pen, shape });
    }

    pub fn line(&mut self, layer: LayerId, pen: Pen, from: Point, to: Point) {
        self.add(layer, pen, Shape::Line(from, to));
    }

    pub fn outline(&mut self, layer: LayerId, pen: Pen, points: &[Point]) {
        self.add(layer, pen, Shape::Polyline { points: points.to_vec(), closed: true });
    }

    /// Text of the usual height, on the layer of texts.
    pub fn text(&mut self, text: Text) {
        self.add(layers::TEXT, THIN, Shape::Text(text));
    }

    pub fn dimension(&mut self, dimension: Dimension) {
        self.add(layers::DIMENSION, THIN, Shape::Dimension(dimension));
    }

    /// The level box around everything in it, without the title.
    pub fn bounds(&self) -> Rect {
        let boxes = self.items.iter().flat_map(Item::primitives).filter_map(|p| p.mark.bounds());
        boxes.reduce(Rect::joined).unwrap_or(Rect::new(0.0, 0.0, 0.0, 0.0))
    }

    /// The heading as an item of the block, above the view and at its left edge.
    pub fn with_heading(mut self, bounds: Rect, max_width_mm: f64) -> Self {
        if !self.title.is_empty() {
            let at = pt(bounds.min.x, bounds.max.y + TITLE_GAP_MM);
            let text = Text::new(at, lettering::MIDDLE_MM, std::mem::take(&mut self.title));
            self.text(text.within(max_width_mm));
        }
        self
    }

    /// Everything moved by a step.
    pub fn moved(mut self, step: Point) -> Self {
        for item in &mut self.items {
            item.shape = moved(&item.shape, step);
        }
        self
    }
}

/// Small text with its anchor.
pub(crate) fn small(at: Point, anchor: Anchor, content: impl Into<String>) -> Text {
    Text::new(at, lettering::SMALL_MM, content).anchored(anchor)
}

/// A shape moved by a step.
pub(crate) fn moved(shape: &Shape, step: Point) -> Shape {
    let all = |points: &[Point]| points.iter().map(|p| p.plus(step)).collect::<Vec<_>>();
    match shape {
        Shape::Line(from, to) => Shape::Line(from.plus(step), to.plus(step)),
        Shape::Polyline { points, closed } => Shape::Polyline { points: all(points), closed: *closed },
        Shape::Arc { centre, radius_mm, start_deg, end_deg } => Shape::Arc {
            centre: centre.plus(step),
            radius_mm: *radius_mm,
            start_deg: *start_deg,
            end_deg: *end_deg,
        },
        Shape::Circle { centre, radius_mm } => {
            Shape::Circle { centre: centre.plus(step), radius_mm: *radius_mm }
        }
        Shape::Point(at) => Shape::Point(at.plus(step)),
        Shape::Fill(points) => Shape::Fill(all(points)),
        Shape::Text(text) => Shape::Text(Text { at: text.at.plus(step), ..text.clone() }),
        Shape::Dimension(dimension) => Shape::Dimension(dimension.clone().moved(step)),
    }
}
