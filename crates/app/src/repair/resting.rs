//! A cell that nobody is at: it looks, is named and takes the focus as the field does that stands there once somebody is.
//!
//! A full grid has hundreds of cells, and a text field costs several times what its picture does.

use eframe::egui::{Align2, FontSelection, Rect, Response, Sense, Ui, WidgetInfo, vec2};

use crate::fields::form::Form;
use crate::fields::number::{self, Spec};

/// Where the cell stands, where nobody is at it: neither the pointer nor the focus, nor anything wrong or half-typed in it.
///
/// `height` is that of a field.
pub fn place(ui: &Ui, form: &Form, spec: &Spec, height: f32) -> Option<Rect> {
    let (id, rect) = (spec.id(), Rect::from_min_size(ui.cursor().min, vec2(spec.width, height)));
    let is_at = ui.memory(|memory| memory.has_focus(id) || memory.had_focus_last_frame(id))
        || ui.input(|input| input.pointer.latest_pos().is_some_and(|at| rect.contains(at)))
        || form.going_to.is_some()
        || form.drafts.get(&spec.path).is_some()
        || form.error(&spec.path).is_some();
    (!is_at && height > 0.0).then_some(rect)
}

/// The cell, showing `text`.
pub fn show(ui: &mut Ui, form: &Form, spec: &Spec, rect: Rect, text: &str) -> Response {
    let id = spec.id();
    let rect = Rect::from_min_size(ui.allocate_space(rect.size()).1.min, rect.size());
    let response = ui.interact(rect, id, Sense::click());
    // A finger comes without having pointed.
    if response.is_pointer_button_down_on() || response.clicked() {
        response.request_focus();
    }
    if ui.is_rect_visible(rect) {
        let frame = form.frame(ui, id, false);
        let inner = rect - frame.total_margin();
        ui.painter().add(frame.paint(inner));
        let font = FontSelection::Default.resolve(ui.style());
        let galley = ui.painter().layout_no_wrap(text.to_owned(), font, ui.visuals().text_color());
        let at =
            Align2([spec.align, eframe::egui::Align::Center]).align_size_within_rect(galley.size(), inner);
        ui.painter().galley(at.min, galley, ui.visuals().text_color());
    }
    response.widget_info(|| WidgetInfo::text_edit(true, text, text, ""));
    number::describe(&response, spec, None, form.unit);
    response
}
