//! The DXF writer: the R12 form (AC1009), which every CAD and CAM program reads.
//!
//! Coordinates are millimetres (`$INSUNITS` 4). Each dimension is a DIMENSION entity that measures itself,
//! with a block that holds its picture. R12 knows points, lines, polylines, arcs, circles, solids and text.

use crate::dxf_dimension::push_dimension;
use crate::dxf_tags::{Tags, text_value};
use crate::flatten::{Mark, sweep_deg};
use crate::{Anchor, Dimension, Drawing, Item, LineStyle, Pen, Point, Rect, Shape, TextRun, pt};

/// Space between sheets laid side by side, mm.
const SHEET_GAP_MM: f64 = 20.0;

/// A drawing as a DXF file; several sheets are laid side by side.
#[must_use]
pub fn dxf(drawing: &Drawing) -> Vec<u8> {
    let placed = placed(drawing);
    let mut tags = Tags::default();
    tags.text(999, "Millimetres");
    push_header(&mut tags, &placed);
    crate::dxf_tags::push_tables(&mut tags, drawing);
    push_section(&mut tags, "BLOCKS", |tags| {
        for (number, (layer, dimension)) in dimensions(drawing, &placed).enumerate() {
            push_block(tags, layer, &block_name(number), &dimension);
        }
    });
    push_section(&mut tags, "ENTITIES", |tags| {
        let mut number = 0;
        for (item, shift) in &placed {
            let Some(layer) = drawing.layer(item.layer) else { continue };
            let writer = EntityWriter { layer: layer.name, pen: item.pen, shift: *shift };
            if let Shape::Dimension(dimension) = &item.shape {
                let moved = moved(dimension, *shift);
                push_dimension(tags, layer.name, &block_name(number), &moved);
                number += 1;
            } else {
                writer.push_shape(tags, &item.shape);
            }
        }
    });
    tags.text(0, "EOF");
    tags.finish()
}

/// Every item that can be painted, with the step that moves its sheet to its place.
fn placed(drawing: &Drawing) -> Vec<(&Item, Point)> {
    let mut left_mm = 0.0;
    let mut found = vec![];
    for (index, sheet) in drawing.sheets.iter().enumerate() {
        let shift = pt(if index == 0 { 0.0 } else { left_mm - sheet.area.min.x }, 0.0);
        left_mm = sheet.area.max.x + shift.x + SHEET_GAP_MM;
        let known = |item: &&Item| drawing.layer(item.layer).is_some() && !item.primitives().is_empty();
        found.extend(sheet.items.iter().filter(known).map(|item| (item, shift)));
    }
    found
}

/// The dimensions in the order in which their blocks are numbered.
fn dimensions<'a>(
    drawing: &'a Drawing,
    placed: &'a [(&Item, Point)],
) -> impl Iterator<Item = (&'static str, Dimension)> + 'a {
    placed.iter().filter_map(|(item, shift)| match &item.shape {
        Shape::Dimension(dimension) => Some((drawing.layer(item.layer)?.name, moved(dimension, *shift))),
        _ => None,
    })
}

/// Anonymous dimension blocks are called *D and a number.
fn block_name(number: usize) -> String {
    format!("*D{number}")
}

fn moved(dimension: &Dimension, shift: Point) -> Dimension {
    dimension.clone().moved(shift)
}

fn push_section(tags: &mut Tags, name: &str, fill: impl FnOnce(&mut Tags)) {
    tags.text(0, "SECTION");
    tags.text(2, name);
    fill(tags);
    tags.text(0, "ENDSEC");
}

fn push_header(tags: &mut Tags, placed: &[(&Item, Point)]) {
    let boxes = placed.iter().flat_map(|(item, shift)| {
        item.primitives().into_iter().filter_map(|p| p.mark.bounds().map(|b| b.moved(*shift)))
    });
    let extents = boxes.reduce(Rect::joined).unwrap_or(Rect::new(0.0, 0.0, 1.0, 1.0));
    push_section(tags, "HEADER", |tags| {
        tags.variable("$ACADVER");
        tags.text(1, "AC1009");
        tags.variable("$INSUNITS");
        tags.integer(70, 4);
        tags.variable("$MEASUREMENT");
        tags.integer(70, 1);
        tags.variable("$INSBASE");
        tags.point3(10, pt(0.0, 0.0));
        tags.variable("$EXTMIN");
        tags.point3(10, extents.min);
        tags.variable("$EXTMAX");
        tags.point3(10, extents.max);
        tags.variable("$LIMMIN");
        tags.point(10, extents.min);
        tags.variable("$LIMMAX");
        tags.point(10, extents.max);
        tags.variable("$LTSCALE");
        tags.real(40, 1.0);
        // Points are shown as crosses of 2 mm.
        tags.variable("$PDMODE");
        tags.integer(70, 2);
        tags.variable("$PDSIZE");
        tags.real(40, 2.0 * crate::POINT_MARK_MM);
    });
}

/// The picture of a dimension: the same lines, arrows and figure that paper shows.
fn push_block(tags: &mut Tags, layer: &'static str, name: &str, dimension: &Dimension) {
    tags.text(0, "BLOCK");
    tags.text(8, layer);
    tags.text(2, name);
    tags.integer(70, 1);
    tags.point3(10, pt(0.0, 0.0));
    tags.text(3, name);
    let writer = EntityWriter { layer, pen: Pen::solid(crate::Width::W018), shift: pt(0.0, 0.0) };
    for mark in dimension.marks() {
        writer.push_mark(tags, &mark);
    }
    tags.text(0, "ENDBLK");
    tags.text(8, layer);
}

/// Writes entities of one layer and pen.
struct EntityWriter {
    layer: &'static str,
    pen: Pen,
    shift: Point,
}

impl EntityWriter {
    fn start(&self, tags: &mut Tags, kind: &str) {
        tags.text(0, kind);
        tags.text(8, self.layer);
        match self.pen.style {
            LineStyle::Solid => {}
            LineStyle::Dashed => tags.text(6, "DASHED"),
            LineStyle::Chain => tags.text(6, "CHAIN"),
        }
    }

    fn push_shape(&self, tags: &mut Tags, shape: &Shape) {
        match shape {
            Shape::Point(at) => {
                self.start(tags, "POINT");
                tags.point3(10, at.plus(self.shift));
            }
            Shape::Circle { centre, radius_mm } => {
                self.start(tags, "CIRCLE");
                tags.point3(10, centre.plus(self.shift));
                tags.real(40, *radius_mm);
            }
            Shape::Arc { centre, radius_mm, start_deg, end_deg } => {
                let sweep = sweep_deg(*start_deg, *end_deg);
                self.push_arc(tags, *centre, *radius_mm, *start_deg, sweep);
            }
            other => other.marks().iter().for_each(|mark| self.push_mark(tags, mark)),
        }
    }

    fn push_mark(&self, tags: &mut Tags, mark: &Mark) {
        match mark {
            Mark::Stroke { points, closed } => self.push_stroke(tags, points, *closed),
            Mark::Arc { centre, radius_mm, start_deg, sweep_deg } => {
                self.push_arc(tags, *centre, *radius_mm, *start_deg, *sweep_deg);
            }
            Mark::Fill(points) => self.push_fill(tags, points),
            Mark::Text(run) => self.push_text(tags, run),
        }
    }

    fn push_stroke(&self, tags: &mut Tags, points: &[Point], closed: bool) {
        if let ([from, to], false) = (points, closed) {
            self.start(tags, "LINE");
            tags.point3(10, from.plus(self.shift));
            tags.point3(11, to.plus(self.shift));
            return;
        }
        self.start(tags, "POLYLINE");
        tags.integer(66, 1);
        tags.point3(10, pt(0.0, 0.0));
        tags.integer(70, i32::from(closed));
        for p in points {
            tags.text(0, "VERTEX");
            tags.text(8, self.layer);
            tags.point3(10, p.plus(self.shift));
        }
        tags.text(0, "SEQEND");
        tags.text(8, self.layer);
    }

    fn push_arc(&self, tags: &mut Tags, centre: Point, radius_mm: f64, start_deg: f64, sweep_deg: f64) {
        let whole = sweep_deg >= 360.0;
        self.start(tags, if whole { "CIRCLE" } else { "ARC" });
        tags.point3(10, centre.plus(self.shift));
        tags.real(40, radius_mm);
        if !whole {
            tags.real(50, start_deg.rem_euclid(360.0));
            tags.real(51, (start_deg + sweep_deg).rem_euclid(360.0));
        }
    }

    /// A convex polygon as a fan of triangles.
    fn push_fill(&self, tags: &mut Tags, points: &[Point]) {
        let Some((first, rest)) = points.split_first() else { return };
        for pair in rest.windows(2) {
            self.start(tags, "SOLID");
            // A triangle repeats its third corner.
            for (code, p) in [(10, *first), (11, pair[0]), (12, pair[1]), (13, pair[1])] {
                tags.point3(code, p.plus(self.shift));
            }
        }
    }

    fn push_text(&self, tags: &mut Tags, run: &TextRun) {
        if run.content.trim().is_empty() {
            return;
        }
        tags.text(0, "TEXT");
        tags.text(8, self.layer);
        tags.point3(10, run.start.plus(self.shift));
        tags.real(40, run.height_mm);
        tags.raw(1, &text_value(&run.content));
        if run.angle_deg != 0.0 {
            tags.real(50, run.angle_deg.rem_euclid(360.0));
        }
        tags.text(7, crate::dxf_tags::TEXT_STYLE);
        // A reader with a font of other widths keeps the anchor in its place.
        let (across, up) = match run.anchor {
            Anchor::Start => return,
            Anchor::Middle => (1, 0),
            Anchor::End => (2, 0),
            Anchor::Centre => (1, 2),
        };
        tags.integer(72, across);
        tags.point3(11, run.at.plus(self.shift));
        if up != 0 {
            tags.integer(73, up);
        }
    }
}
