//! Parts that several sketches share.

use super::pen::Pen;

/// Height of the fingerboard's face in the side views.
pub const BOARD: f32 = 66.0;
/// Height of a crown above it.
pub const CROWN: f32 = 10.0;

/// A fingerboard from the side.
pub fn board(pen: &Pen, from: f32, to: f32) {
    pen.body(&[[from, BOARD], [to, BOARD], [to, 82.0], [from, 82.0]], pen.palette.blank);
}

/// A fret from the side, its crown up.
pub fn fret(pen: &Pen, x: f32) {
    let half = 5.0;
    let top = BOARD - CROWN;
    let crown: Vec<[f32; 2]> = (0..=8)
        .map(|i| {
            let angle = std::f32::consts::PI * i as f32 / 8.0;
            [x - half * angle.cos(), BOARD - (BOARD - top) * angle.sin()]
        })
        .collect();
    pen.body(&crown, pen.palette.edge);
}

/// A nut from the side, its front edge at `x`.
pub fn nut(pen: &Pen, x: f32, top: f32) {
    pen.body(&[[x - 12.0, top + 5.0], [x, top], [x, 82.0], [x - 12.0, 82.0]], pen.palette.field);
}

/// A saddle from the side, its crest in the middle of its top at `x`.
pub fn saddle(pen: &Pen, x: f32, top: f32, half: f32) {
    pen.body(
        &[[x - half, top + 4.0], [x, top], [x + half, top + 4.0], [x + half, 82.0], [x - half, 82.0]],
        pen.palette.field,
    );
}
