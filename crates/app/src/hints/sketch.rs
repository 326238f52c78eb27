//! The sketches: what is measured, drawn small.

use eframe::egui::{Painter, Rect};

use super::parts::{BOARD, CROWN, board, fret, nut, saddle};
use super::pen::Pen;
use crate::theme::Palette;

/// A sketch of what is measured.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Sketch {
    /// From the nut line to the nominal saddle line.
    Scale,
    /// Dip of the crowns below a straightedge.
    Relief,
    /// Crown above the board.
    FretHeight,
    /// Outer strings at the nut.
    SpreadNut,
    /// Outer strings at the saddle.
    SpreadSaddle,
    /// Core of a wound string.
    Core,
    /// Outside of a wound string.
    Outside,
    /// Gap over fret 1.
    ActionFirst,
    /// Gap over fret 12.
    ActionTwelfth,
    /// String behind the nut.
    Head,
    /// String behind the saddle.
    Tail,
    /// Finger behind the fret.
    Finger,
    /// String below the crown.
    PressDepth,
    /// Thickness of the blank.
    Blank,
    /// What is left at the blank's edge.
    Margin,
    /// Crest behind the nominal line.
    Setback,
    /// Nut edge before the nominal line.
    NutSetback,
}

impl Sketch {
    /// Draws it.
    pub fn draw(self, painter: &Painter, rect: Rect, palette: &Palette) {
        let pen = &Pen::new(painter, rect, palette);
        match self {
            Self::Scale => scale(pen),
            Self::Relief => relief(pen),
            Self::FretHeight => fret_height(pen),
            Self::SpreadNut => spread(pen, true),
            Self::SpreadSaddle => spread(pen, false),
            Self::Core => section(pen, true),
            Self::Outside => section(pen, false),
            Self::ActionFirst => action(pen, true),
            Self::ActionTwelfth => action(pen, false),
            Self::Head => head(pen),
            Self::Tail => tail(pen),
            Self::Finger => finger(pen),
            Self::PressDepth => press_depth(pen),
            Self::Blank => blank(pen, false),
            Self::Margin => blank(pen, true),
            Self::Setback => setback(pen),
            Self::NutSetback => nut_setback(pen),
        }
    }
}

fn scale(pen: &Pen) {
    board(pen, 12.0, 100.0);
    nut(pen, 14.0, 46.0);
    fret(pen, 76.0);
    saddle(pen, 144.0, 40.0, 4.0);
    pen.line([14.0, 46.0], [144.0, 40.0], 1.5);
    pen.word([76.0, 50.0], "12");
    pen.broken([14.0, 6.0], [14.0, 46.0]);
    pen.broken([76.0, 24.0], [76.0, 42.0]);
    pen.broken([138.0, 6.0], [138.0, 82.0]);
    pen.measure([14.0, 12.0], [138.0, 12.0]);
    pen.word([45.0, 28.0], "half");
    pen.word([107.0, 28.0], "half");
}

fn relief(pen: &Pen) {
    let place = |i: usize| 12.0 + 17.0 * i as f32;
    let dip = |x: f32| 20.0 * (1.0 - ((x - 80.0) / 68.0).powi(2));
    let points: Vec<[f32; 2]> = (0..=16).map(|i| 12.0 + 8.5 * i as f32).map(|x| [x, 52.0 + dip(x)]).collect();
    pen.curve(&points, 2.0);
    for i in 0..9 {
        pen.disc([place(i), 49.0 + dip(place(i))], 3.0, pen.palette.edge);
    }
    pen.body(&[[4.0, 34.0], [156.0, 34.0], [156.0, 46.0], [4.0, 46.0]], pen.palette.field);
    pen.word([38.0, 40.0], "straightedge");
    pen.measure([80.0, 46.0], [80.0, 66.0]);
}

fn fret_height(pen: &Pen) {
    board(pen, 20.0, 140.0);
    fret(pen, 80.0);
    pen.broken([80.0, BOARD - CROWN], [122.0, BOARD - CROWN]);
    pen.measure([116.0, BOARD - CROWN], [116.0, BOARD]);
}

fn spread(pen: &Pen, at_nut: bool) {
    pen.line([24.0, 14.0], [24.0, 76.0], 2.0);
    pen.line([138.0, 4.0], [138.0, 86.0], 2.0);
    for (near, far) in [(26.0, 16.0), (38.0, 36.0), (51.0, 55.0), (63.0, 75.0)] {
        pen.line([24.0, near], [138.0, far], 1.2);
    }
    pen.word([44.0, 82.0], "nut");
    pen.word([112.0, 84.0], "saddle");
    if at_nut {
        pen.measure([14.0, 26.0], [14.0, 63.0]);
    } else {
        pen.measure([150.0, 16.0], [150.0, 75.0]);
    }
}

fn section(pen: &Pen, core: bool) {
    let centre = [66.0, 45.0];
    for i in 0..16 {
        let angle = std::f32::consts::TAU * i as f32 / 16.0;
        pen.disc([66.0 + 29.0 * angle.cos(), 45.0 + 29.0 * angle.sin()], 5.6, pen.palette.blank);
    }
    pen.disc(centre, 23.0, pen.palette.edge);
    let (half, x) = if core { (23.0, 124.0) } else { (34.6, 124.0) };
    pen.broken([66.0, 45.0 - half], [x + 6.0, 45.0 - half]);
    pen.broken([66.0, 45.0 + half], [x + 6.0, 45.0 + half]);
    pen.measure([x, 45.0 - half], [x, 45.0 + half]);
}

fn action(pen: &Pen, first: bool) {
    board(pen, 20.0, 156.0);
    nut(pen, 22.0, 44.0);
    let places = [48.0, 76.0, 104.0, 134.0];
    for x in places {
        fret(pen, x);
    }
    pen.line([22.0, 44.0], [156.0, 20.0], 2.0);
    let string = |x: f32| 44.0 - 24.0 * (x - 22.0) / 134.0;
    let (x, name) = if first { (48.0, "1") } else { (134.0, "12") };
    pen.measure([x, string(x)], [x, BOARD - CROWN]);
    pen.word([x, 76.0], name);
}

fn head(pen: &Pen) {
    pen.body(&[[96.0, BOARD], [156.0, BOARD], [156.0, 82.0], [96.0, 82.0]], pen.palette.blank);
    pen.body(&[[8.0, 76.0], [84.0, 66.0], [84.0, 82.0], [8.0, 88.0]], pen.palette.blank);
    nut(pen, 96.0, 44.0);
    pen.line([96.0, 44.0], [156.0, 42.0], 2.0);
    pen.line([96.0, 44.0], [30.0, 58.0], 2.0);
    pen.body(&[[26.0, 44.0], [34.0, 44.0], [34.0, 78.0], [26.0, 78.0]], pen.palette.edge);
    pen.broken([96.0, 18.0], [96.0, 44.0]);
    pen.broken([30.0, 30.0], [30.0, 44.0]);
    pen.measure([96.0, 26.0], [30.0, 38.0]);
    pen.word([30.0, 22.0], "post");
}

fn tail(pen: &Pen) {
    pen.body(&[[6.0, 70.0], [156.0, 70.0], [156.0, 84.0], [6.0, 84.0]], pen.palette.blank);
    saddle(pen, 70.0, 36.0, 6.0);
    pen.line([6.0, 32.0], [70.0, 36.0], 2.0);
    pen.line([70.0, 36.0], [128.0, 70.0], 2.0);
    pen.disc([130.0, 67.0], 5.0, pen.palette.edge);
    pen.measure([76.0, 26.0], [134.0, 58.0]);
    pen.word([126.0, 34.0], "anchor");
}

fn finger(pen: &Pen) {
    board(pen, 8.0, 152.0);
    fret(pen, 36.0);
    fret(pen, 124.0);
    pen.curve(&[[8.0, 44.0], [36.0, 50.0], [92.0, 58.0], [124.0, 56.0], [152.0, 48.0]], 2.0);
    pen.disc([92.0, 42.0], 14.0, pen.palette.accent_ground);
    pen.broken([92.0, 8.0], [92.0, 56.0]);
    pen.broken([124.0, 8.0], [124.0, 56.0]);
    pen.broken([36.0, 8.0], [36.0, 50.0]);
    pen.measure([124.0, 16.0], [92.0, 16.0]);
    pen.word([62.0, 16.0], "of this");
}

fn press_depth(pen: &Pen) {
    board(pen, 8.0, 152.0);
    fret(pen, 110.0);
    pen.curve(&[[8.0, 50.0], [64.0, 64.0], [110.0, BOARD - CROWN], [152.0, 48.0]], 2.0);
    pen.disc([64.0, 48.0], 14.0, pen.palette.accent_ground);
    pen.broken([30.0, BOARD - CROWN], [110.0, BOARD - CROWN]);
    pen.measure([40.0, BOARD - CROWN], [40.0, 64.0]);
}

fn blank(pen: &Pen, margin: bool) {
    pen.body(&[[20.0, 62.0], [140.0, 62.0], [140.0, 86.0], [20.0, 86.0]], pen.palette.blank);
    pen.body(&[[58.0, 40.0], [64.0, 34.0], [102.0, 40.0], [102.0, 84.0], [58.0, 84.0]], pen.palette.field);
    pen.line([8.0, 30.0], [64.0, 34.0], 2.0);
    pen.line([64.0, 34.0], [150.0, 62.0], 2.0);
    if margin {
        pen.broken([58.0, 8.0], [58.0, 40.0]);
        pen.broken([64.0, 8.0], [64.0, 34.0]);
        pen.measure([58.0, 16.0], [64.0, 16.0]);
    } else {
        pen.broken([58.0, 8.0], [58.0, 40.0]);
        pen.broken([102.0, 8.0], [102.0, 40.0]);
        pen.measure([58.0, 16.0], [102.0, 16.0]);
    }
}

fn setback(pen: &Pen) {
    pen.body(&[[40.0, 62.0], [140.0, 62.0], [140.0, 86.0], [40.0, 86.0]], pen.palette.blank);
    saddle(pen, 96.0, 36.0, 10.0);
    pen.line([6.0, 32.0], [96.0, 36.0], 2.0);
    pen.line([96.0, 36.0], [146.0, 62.0], 2.0);
    pen.broken([64.0, 8.0], [64.0, 86.0]);
    pen.broken([96.0, 8.0], [96.0, 36.0]);
    pen.measure([64.0, 16.0], [96.0, 16.0]);
    pen.word([30.0, 16.0], "nominal");
    pen.word([122.0, 16.0], "crest");
}

fn nut_setback(pen: &Pen) {
    board(pen, 60.0, 156.0);
    nut(pen, 76.0, 46.0);
    fret(pen, 130.0);
    pen.line([76.0, 46.0], [156.0, 40.0], 2.0);
    pen.line([76.0, 46.0], [8.0, 66.0], 2.0);
    pen.broken([60.0, 8.0], [60.0, 82.0]);
    pen.broken([76.0, 8.0], [76.0, 46.0]);
    pen.measure([60.0, 16.0], [76.0, 16.0]);
    pen.word([30.0, 16.0], "nominal");
    pen.word([98.0, 16.0], "edge");
}
