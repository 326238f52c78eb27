//! Two sides of a page.

use eframe::egui::Ui;

use crate::theme::size;

/// The sides of a page.
#[derive(Clone, Copy, PartialEq)]
pub enum Side {
    /// The left one.
    Left,
    /// The right one.
    Right,
}

/// Two columns of the same width with a gap between.
pub fn columns(ui: &mut Ui, mut contents: impl FnMut(&mut Ui, Side)) {
    const BETWEEN: f32 = 2.0 * size::WIDE_GAP;
    let width = 0.5 * (ui.available_width() - BETWEEN);
    ui.horizontal_top(|ui| {
        ui.spacing_mut().item_spacing.x = BETWEEN;
        for side in [Side::Left, Side::Right] {
            ui.vertical(|ui| {
                ui.set_width(width);
                ui.spacing_mut().item_spacing.x = size::GAP;
                contents(ui, side);
            });
        }
    });
}
