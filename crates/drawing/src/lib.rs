//! A drawing in millimetres and three ways to write it: SVG, PDF and DXF.
//!
//! A [`Drawing`] holds [`Layer`]s and [`Sheet`]s; a sheet holds [`Shape`]s, each on a layer and with a [`Pen`].
//! x goes to the right and y up, everything is in millimetres and nothing is ever scaled. [`Sheet::primitives`]
//! takes a sheet apart into strokes, arcs, filled polygons and lines of text: that is what the writers write
//! and what a window paints, so that all of them show the same drawing.
//!
//! Line widths follow ISO 128-2, lettering heights ISO 3098, dimensions ISO 129-1. The writers are pure:
//! the same drawing gives the same bytes on every run and machine. Nothing here knows about instruments,
//! files or clocks.
//!
//! ```
//! use crestline_drawing::{Colour, Drawing, Pen, Shape, Sheet, Width, pt, svg};
//!
//! let mut drawing = Drawing::new("A line");
//! let layer = drawing.add_layer("OUTLINE", Colour::Black);
//! let mut sheet = Sheet::new("Line", 210.0, 297.0);
//! sheet.add(layer, Pen::solid(Width::W050), Shape::Line(pt(20.0, 20.0), pt(120.0, 20.0)));
//! drawing.sheets.push(sheet);
//! let bytes = svg(&drawing);
//! assert!(bytes.starts_with(b"<?xml"));
//! ```

mod dimension;
mod dxf;
mod dxf_dimension;
mod dxf_tags;
mod flatten;
mod font;
mod geometry;
mod model;
mod number;
mod pdf;
mod pdf_font;
mod svg;
mod text;

pub use dimension::{Dimension, Measure};
pub use dxf::dxf;
pub use flatten::{Mark, POINT_MARK_MM, Primitive};
pub use font::{FONT, FONT_FAMILY, SUBSTITUTE, font_size_mm};
pub use geometry::{Point, Rect, pt};
pub use model::{Colour, Drawing, Item, Layer, LayerId, LineStyle, Pen, Shape, Sheet, Width, lettering};
pub use pdf::pdf;
pub use svg::{svg, svg_sheet};
pub use text::{Anchor, Text, TextRun, clean, fit, width_mm, wrap};
