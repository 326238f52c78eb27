//! Where a plan view is looked at from: the whole of it, or a place and scale of the user's choice.

use eframe::egui::{EventFilter, Key, Modifiers, Rect, Response, Ui, Vec2};
use egui_plot::{PlotBounds, PlotTransform};

/// How much one step of the zoom buttons and keys changes the scale.
const ZOOM_STEP: f64 = 1.25;
/// How far one press of an arrow key pans, as a share of the view.
const PAN_STEP: f64 = 0.1;
/// Room for a figure with two decimals, points.
const ROOM_FOR_FIGURES: f32 = 44.0;
/// Points of the wheel for one natural step of the scale.
const WHEEL_POINTS: f64 = 200.0;
/// The largest and smallest scale, millimetres a point.
const SCALE_MM: [f64; 2] = [0.002, 4.0];

/// A view with the same scale along and across.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Camera {
    chosen: Option<Look>,
    asked_steps: i32,
}

#[derive(Debug, Clone, Copy, PartialEq)]
struct Look {
    centre_mm: [f64; 2],
    mm_per_point: f64,
}

impl Camera {
    /// Shows the whole again.
    pub fn reset(&mut self) {
        self.chosen = None;
    }

    /// Whether the whole is shown.
    #[must_use]
    pub fn shows_whole(&self) -> bool {
        self.chosen.is_none()
    }

    /// The bounds for a plot of this size on screen; `whole` is what must be in view.
    #[must_use]
    pub fn bounds(&self, rect: Rect, whole: &PlotBounds) -> PlotBounds {
        let look = self.chosen.unwrap_or_else(|| fit(rect, whole));
        let half = |points: f32| 0.5 * f64::from(points.max(1.0)) * look.mm_per_point;
        let [x, y] = look.centre_mm;
        let (dx, dy) = (half(rect.width()), half(rect.height()));
        PlotBounds::from_min_max([x - dx, y - dy], [x + dx, y + dy])
    }

    /// Zooms in by some steps when the plot is next shown, or out where they are negative.
    pub fn zoom_later(&mut self, steps: i32) {
        self.asked_steps += steps;
    }

    fn zoom(&mut self, steps: i32, rect: Rect, whole: &PlotBounds) {
        let mut look = self.chosen.unwrap_or_else(|| fit(rect, whole));
        look.mm_per_point = (look.mm_per_point * ZOOM_STEP.powi(-steps)).clamp(SCALE_MM[0], SCALE_MM[1]);
        self.chosen = Some(look);
    }

    /// Follows what the pointer and the keys did to the plot.
    pub fn follow(&mut self, ui: &Ui, response: &Response, transform: &PlotTransform, whole: &PlotBounds) {
        let rect = response.rect;
        let asked = std::mem::take(&mut self.asked_steps);
        if asked != 0 {
            self.zoom(asked, rect, whole);
            ui.ctx().request_repaint();
        }
        let scrolled = response.contains_pointer() && ui.input(|i| i.zoom_delta() != 1.0);
        if response.dragged() || scrolled {
            self.chosen = Some(look_of(transform));
        }
        let wheel = ui.input(|i| if i.modifiers.any() { 0.0 } else { f64::from(i.smooth_scroll_delta.y) });
        if let (true, Some(at)) = (response.contains_pointer() && wheel != 0.0, response.hover_pos()) {
            let mut transform = *transform;
            transform.zoom(Vec2::splat((wheel / WHEEL_POINTS).exp() as f32), at);
            self.chosen = Some(look_of(&transform));
            // The page around the plot is not to scroll as well.
            ui.input_mut(|i| i.smooth_scroll_delta = Vec2::ZERO);
        }
        if response.double_clicked() {
            self.reset();
        }
        if response.has_focus() {
            self.keys(ui, response, rect, whole);
        }
    }

    fn keys(&mut self, ui: &Ui, response: &Response, rect: Rect, whole: &PlotBounds) {
        let filter = EventFilter { horizontal_arrows: true, vertical_arrows: true, ..EventFilter::default() };
        ui.memory_mut(|memory| memory.set_focus_lock_filter(response.id, filter));
        let count = |key| ui.input_mut(|i| i.count_and_consume_key(Modifiers::NONE, key)) as f64;
        let right = count(Key::ArrowRight) - count(Key::ArrowLeft);
        let up = count(Key::ArrowUp) - count(Key::ArrowDown);
        let nearer = count(Key::Plus) + count(Key::Equals) - count(Key::Minus);
        if nearer != 0.0 {
            self.zoom(nearer as i32, rect, whole);
        }
        if right != 0.0 || up != 0.0 {
            let mut look = self.chosen.unwrap_or_else(|| fit(rect, whole));
            look.centre_mm[0] += right * PAN_STEP * f64::from(rect.width()) * look.mm_per_point;
            look.centre_mm[1] += up * PAN_STEP * f64::from(rect.height()) * look.mm_per_point;
            self.chosen = Some(look);
        }
    }
}

/// The look that has all of `whole` in a plot of this size, with room on the right for the figures beside it.
fn fit(rect: Rect, whole: &PlotBounds) -> Look {
    let (min, max) = (whole.min(), whole.max());
    let room = ROOM_FOR_FIGURES.min(0.4 * rect.width());
    let scale = |extent: f64, points: f32| extent / f64::from(points.max(1.0));
    let needed = scale(max[0] - min[0], rect.width() - room).max(scale(max[1] - min[1], rect.height()));
    let mm_per_point = needed.clamp(SCALE_MM[0], SCALE_MM[1]);
    let right = 0.5 * f64::from(room) * mm_per_point;
    Look { centre_mm: [0.5 * (min[0] + max[0]) + right, 0.5 * (min[1] + max[1])], mm_per_point }
}

fn look_of(transform: &PlotTransform) -> Look {
    let bounds = transform.bounds();
    let (min, max) = (bounds.min(), bounds.max());
    let mm_per_point = (max[0] - min[0]) / f64::from(transform.frame().width().max(1.0));
    Look {
        centre_mm: [0.5 * (min[0] + max[0]), 0.5 * (min[1] + max[1])],
        mm_per_point: mm_per_point.clamp(SCALE_MM[0], SCALE_MM[1]),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use eframe::egui::Pos2;

    #[test]
    fn the_scale_is_the_same_both_ways_and_the_whole_is_inside() {
        let rect = Rect::from_min_size(Pos2::ZERO, Vec2::new(300.0, 500.0));
        let whole = PlotBounds::from_min_max([640.0, -30.0], [655.0, 30.0]);
        let bounds = Camera::default().bounds(rect, &whole);
        let (along, across) = (bounds.width() / 300.0, bounds.height() / 500.0);
        assert!((along - across).abs() < 1e-12);
        assert!(bounds.min()[0] <= 640.0 && bounds.max()[0] >= 655.0);
        assert!(bounds.min()[1] <= -30.0 && bounds.max()[1] >= 30.0);
    }
}
