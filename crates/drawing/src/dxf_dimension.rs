//! DIMENSION entities: the points that are measured, where the line stands, and the block with the picture.

use crate::dxf_tags::{DIMENSION_STYLE, Tags, figure_value};
use crate::flatten::Mark;
use crate::{Dimension, Measure, Point, pt};

/// Flag of a dimension whose figure has been placed.
const PLACED: i32 = 128;
/// Flag of a block that belongs to this dimension only.
const OWN_BLOCK: i32 = 32;

/// Writes a dimension whose picture is in a block.
pub(crate) fn push_dimension(tags: &mut Tags, layer: &str, block: &str, dimension: &Dimension) {
    tags.text(0, "DIMENSION");
    tags.text(8, layer);
    tags.text(2, block);
    let middle = figure_middle(dimension).unwrap_or(pt(0.0, 0.0));
    match dimension.measure {
        Measure::Angular { vertex, start_deg, end_deg, radius_mm } => {
            push_angular(tags, middle, dimension, Angle { vertex, start_deg, end_deg, radius_mm });
        }
        Measure::Linear { direction_deg, .. } => {
            push_straight(tags, middle, dimension, 0, Some(direction_deg))
        }
        Measure::Aligned { .. } => push_straight(tags, middle, dimension, 1, None),
    }
    tags.text(3, DIMENSION_STYLE);
}

fn figure_middle(dimension: &Dimension) -> Option<Point> {
    dimension.marks().iter().find_map(|mark| match mark {
        Mark::Text(run) => {
            let corners = run.corners();
            Some(corners[0].middle(corners[2]))
        }
        _ => None,
    })
}

fn push_straight(tags: &mut Tags, middle: Point, dimension: &Dimension, kind: i32, angle_deg: Option<f64>) {
    let Some(feet) = dimension.feet() else { return };
    tags.point3(10, feet.to_foot);
    tags.point3(11, middle);
    tags.integer(70, kind + OWN_BLOCK + PLACED);
    tags.raw(1, &figure_value(&dimension.label));
    tags.point3(13, feet.from);
    tags.point3(14, feet.to);
    if let Some(angle_deg) = angle_deg {
        tags.real(50, angle_deg.rem_euclid(360.0));
    }
}

struct Angle {
    vertex: Point,
    start_deg: f64,
    end_deg: f64,
    radius_mm: f64,
}

/// The form with three points (vertex 15, ends 13 and 14), which is measured anticlockwise.
fn push_angular(tags: &mut Tags, middle: Point, dimension: &Dimension, angle: Angle) {
    let Angle { vertex, start_deg, end_deg, radius_mm } = angle;
    let on_arc = |angle_deg: f64| vertex.toward(Point::direction(angle_deg), radius_mm);
    tags.point3(10, on_arc(start_deg + dimension.value() / 2.0));
    tags.point3(11, middle);
    tags.integer(70, 5 + OWN_BLOCK + PLACED);
    tags.raw(1, &figure_value(&dimension.label));
    tags.point3(13, on_arc(start_deg));
    tags.point3(14, on_arc(end_deg));
    tags.point3(15, vertex);
}
