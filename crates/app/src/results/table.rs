//! A table of figures: fixed columns, rows that can be chosen, and each row in words for screen readers.

use std::borrow::Cow;

use eframe::egui::{
    Align2, Color32, Rect, ScrollArea, Sense, Stroke, StrokeKind, Ui, Vec2, WidgetInfo, accesskit, pos2,
};

use super::marks;
use crate::theme::{Palette, size};

/// Height of a row.
pub const ROW: f32 = 22.0;
/// Height of the heads.
pub const HEAD: f32 = 34.0;
/// Space on either side of a cell's text.
const PAD: f32 = 7.0;

/// A column.
pub struct Column {
    /// Its head, one or two lines.
    pub head: Cow<'static, str>,
    /// Its share of the width.
    pub share: f32,
    /// Whether its text stands on the left, not the right.
    pub is_text: bool,
}

impl Column {
    /// A column of figures.
    pub fn figures(head: impl Into<Cow<'static, str>>, share: f32) -> Self {
        Self { head: head.into(), share, is_text: false }
    }

    /// A column of words.
    pub fn words(head: &'static str, share: f32) -> Self {
        Self { head: head.into(), share, is_text: true }
    }
}

/// A cell.
#[derive(Default)]
pub struct Cell {
    /// Its text.
    pub text: String,
    /// Its text's colour, where it is not ink.
    pub colour: Option<Color32>,
    /// Its ground.
    pub ground: Option<Color32>,
}

impl Cell {
    /// A plain cell.
    pub fn plain(text: impl Into<String>) -> Self {
        Self { text: text.into(), ..Self::default() }
    }
}

/// A row: its cells, and all of it in words.
pub struct Row {
    /// The cells; the first column shows the string's marker before its text.
    pub cells: Vec<Cell>,
    /// The row in words.
    pub words: String,
}

/// Contents that scroll sideways where there is less room than `least`, points.
pub fn sideways<R>(ui: &mut Ui, name: &str, least: f32, contents: impl FnOnce(&mut Ui) -> R) -> R {
    let area = ScrollArea::horizontal().id_salt(name).auto_shrink([false, true]);
    let shown = area.show(ui, |ui| {
        ui.set_min_width(least);
        contents(ui)
    });
    shown.inner
}

/// The table; says which row has been clicked.
pub fn show(
    ui: &mut Ui,
    palette: &Palette,
    columns: &[Column],
    rows: &[Row],
    chosen: usize,
) -> Option<usize> {
    let edges = edges(columns, ui.available_width());
    heads(ui, palette, columns, &edges);
    let mut clicked = None;
    for (index, row) in rows.iter().enumerate() {
        if line(ui, palette, columns, &edges, index, row, index == chosen) {
            clicked = Some(index);
        }
    }
    clicked
}

/// The left edges of the columns and the right edge of the last.
fn edges(columns: &[Column], width: f32) -> Vec<f32> {
    let total: f32 = columns.iter().map(|column| column.share).sum();
    let mut x = 0.0;
    let mut edges = vec![0.0];
    for column in columns {
        x += width * column.share / total.max(f32::MIN_POSITIVE);
        edges.push(x);
    }
    edges
}

fn heads(ui: &mut Ui, palette: &Palette, columns: &[Column], edges: &[f32]) {
    let (rect, _) = ui.allocate_exact_size(Vec2::new(ui.available_width(), HEAD), Sense::hover());
    for (column, side) in columns.iter().zip(edges.windows(2)) {
        let (x, anchor) = place(column, side, rect);
        marks::head(
            ui.painter(),
            pos2(x, rect.bottom() - 4.0),
            anchor_bottom(anchor),
            &column.head,
            palette.quiet,
        );
    }
    ui.painter().hline(rect.x_range(), rect.bottom(), Stroke::new(1.0, palette.edge));
}

fn line(
    ui: &mut Ui,
    palette: &Palette,
    columns: &[Column],
    edges: &[f32],
    index: usize,
    row: &Row,
    chosen: bool,
) -> bool {
    let spacing = ui.spacing().item_spacing.y;
    ui.spacing_mut().item_spacing.y = 0.0;
    let (rect, response) = ui.allocate_exact_size(Vec2::new(ui.available_width(), ROW), Sense::click());
    ui.spacing_mut().item_spacing.y = spacing;
    response.widget_info(|| WidgetInfo::selected(accesskit::Role::Row, true, chosen, &row.words));
    if chosen {
        ui.painter().rect_filled(rect, 0.0, palette.accent_ground);
    } else if index % 2 == 1 {
        ui.painter().rect_filled(rect, 0.0, palette.band.gamma_multiply(0.45));
    }
    if response.hovered() || response.has_focus() {
        ui.painter().rect_stroke(rect, 0.0, Stroke::new(1.0, palette.accent), StrokeKind::Inside);
    }
    for ((column, side), cell) in columns.iter().zip(edges.windows(2)).zip(&row.cells) {
        if let Some(ground) = cell.ground {
            let cell_rect =
                Rect::from_x_y_ranges(rect.left() + side[0]..=rect.left() + side[1], rect.y_range());
            ui.painter().rect_filled(cell_rect.shrink(1.0), 2.0, ground);
        }
        let (mut x, anchor) = place(column, side, rect);
        if side[0] == 0.0 {
            marks::paint(ui.painter(), pos2(rect.left() + 12.0, rect.center().y), index, palette, 4.5);
            x += 16.0;
        }
        let colour = cell.colour.unwrap_or(palette.ink);
        let width = if column.is_text { rect.left() + side[1] - x } else { side[1] - side[0] - 2.0 };
        let text = marks::Elided { text: &cell.text, size: size::TEXT - 0.5, colour, width };
        text.paint(ui.painter(), pos2(x, rect.center().y), anchor);
    }
    response.clicked()
}

fn place(column: &Column, side: &[f32], rect: Rect) -> (f32, Align2) {
    if column.is_text {
        (rect.left() + side[0] + PAD, Align2::LEFT_CENTER)
    } else {
        (rect.left() + side[1] - PAD, Align2::RIGHT_CENTER)
    }
}

fn anchor_bottom(anchor: Align2) -> Align2 {
    if anchor == Align2::LEFT_CENTER { Align2::LEFT_BOTTOM } else { Align2::RIGHT_BOTTOM }
}
