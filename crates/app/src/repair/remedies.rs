//! The jobs that help, ranked; the pointer or the focus on one shows its effect in the plot.

use crestline_plan::{Remedy, RemedyKind};
use eframe::egui::{
    Align2, FontId, RichText, Sense, Stroke, StrokeKind, TextStyle, TextWrapMode, Ui, Vec2, WidgetInfo,
    WidgetText, accesskit, pos2,
};

use crate::theme::{Palette, size};
use crate::units::{LengthUnit, in_unit};

/// Space round a remedy's words, and width of its number.
const PAD: f32 = 6.0;
const NUMBER: f32 = 24.0;

/// The list; says which remedy the pointer or else the focus is on.
pub fn show(ui: &mut Ui, palette: &Palette, remedies: &[Remedy]) -> Option<usize> {
    ui.label(RichText::new("What helps, most for its work first").heading());
    let words = "The pointer or the focus on a job shows the errors after it in the plot.";
    ui.label(RichText::new(words).small().color(palette.quiet));
    let (mut hovered, mut focused) = (None, None);
    for (index, remedy) in remedies.iter().enumerate() {
        let response = one(ui, palette, index, remedy, remedies.len());
        if response.hovered() {
            hovered = Some(index);
        }
        if response.has_focus() {
            focused = Some(index);
        }
        if response.clicked() {
            response.request_focus();
        }
    }
    hovered.or(focused)
}

fn one(
    ui: &mut Ui,
    palette: &Palette,
    index: usize,
    remedy: &Remedy,
    count: usize,
) -> eframe::egui::Response {
    let number = format!("{}.", index + 1);
    let width = ui.available_width();
    let words = in_unit(&remedy.text, LengthUnit::of(ui.ctx()));
    let text = WidgetText::from(RichText::new(&words).color(palette.ink));
    let room = width - NUMBER - 2.0 * PAD;
    let galley = text.into_galley(ui, Some(TextWrapMode::Wrap), room, TextStyle::Body);
    let (rect, response) =
        ui.allocate_exact_size(Vec2::new(width, galley.size().y + 2.0 * PAD), Sense::click());
    let words = format!("{number} {words}");
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::ListItem, true, &words));
    response.ctx.accesskit_node_builder(response.id, |node| {
        node.set_position_in_set(index);
        node.set_size_of_set(count);
        node.set_description(kind_words(remedy.kind).to_owned());
    });
    if response.hovered() || response.has_focus() {
        ui.painter().rect_filled(rect, size::CORNER, palette.accent_ground);
        ui.painter().rect_stroke(rect, size::CORNER, Stroke::new(1.4, palette.accent), StrokeKind::Inside);
    } else {
        ui.painter().rect_stroke(rect, size::CORNER, Stroke::new(1.0, palette.edge), StrokeKind::Inside);
    }
    let at = pos2(rect.left() + PAD, rect.top() + PAD);
    ui.painter().text(at, Align2::LEFT_TOP, number, FontId::proportional(size::TEXT), palette.quiet);
    ui.painter().galley(at + Vec2::new(NUMBER, 0.0), galley, palette.ink);
    response
}

fn kind_words(kind: RemedyKind) -> &'static str {
    match kind {
        RemedyKind::Nothing => "Nothing to do",
        RemedyKind::ReplaceString => "New strings",
        RemedyKind::FileNutSlots => "Work on the nut slots",
        RemedyKind::LowerAction | RemedyKind::RaiseAction => "Work on the action",
        RemedyKind::SetRelief => "Work on the relief",
        RemedyKind::ReshapeSaddle | RemedyKind::MoveSaddle => "Work on the saddle",
        RemedyKind::ShortenNutEnd | RemedyKind::MoveNutEdge => "Work on saddle and nut",
        RemedyKind::CorrectFret => "Work on a fret",
    }
}
