//! Where the spread comes from: a bar an input, for the whole saddle or for one string.

use crestline_plan::{Share, Shares};
use eframe::egui::{Align2, FontId, Rect, RichText, Sense, Stroke, Ui, Vec2, WidgetInfo, accesskit, pos2};

use crate::results::figures::fixed;
use crate::results::notices::sentence;
use crate::theme::{Palette, size};

/// Height of a row and of the bar in it.
const ROW: f32 = 21.0;
const BAR: f32 = 11.0;
/// Width of the inputs' names, and of the figures behind the bars.
const NAME: f32 = 136.0;
const FIGURE: f32 = 46.0;
/// The smallest total part of the variance that is shown.
const WORTH_SHOWING: f64 = 0.005;

/// The bars; `of_one` says whether they are the chosen string's.
pub fn show(ui: &mut Ui, palette: &Palette, shares: &Shares, chosen: usize, of_one: &mut bool) {
    ui.label(RichText::new("Where the spread comes from").heading());
    ui.horizontal_wrapped(|ui| {
        for (one, words) in [(false, "whole saddle".to_owned()), (true, format!("string {}", chosen + 1))] {
            let is_chosen = *of_one == one;
            let response = ui.selectable_label(is_chosen, &words);
            let name = format!("Spread of the {words}");
            let name = name.replace("the string", "string");
            response
                .widget_info(|| WidgetInfo::selected(accesskit::Role::RadioButton, true, is_chosen, &name));
            if response.clicked() {
                *of_one = one;
            }
        }
        let words = "▬ goes once it is known   ╾ with what it does together with others";
        ui.label(RichText::new(words).small().color(palette.quiet));
    });
    let own = shares.strings.get(chosen).filter(|_| *of_one);
    let list = own.map_or(&shares.whole, |own| &own.shares);
    ui.spacing_mut().item_spacing.y = 0.0;
    for share in list.iter().filter(|share| share.total.max(share.known()) >= WORTH_SHOWING) {
        row(ui, palette, share);
    }
}

fn row(ui: &mut Ui, palette: &Palette, share: &Share) {
    let (rect, response) = ui.allocate_exact_size(Vec2::new(ui.available_width(), ROW), Sense::hover());
    let middle = rect.center().y;
    let text = |x, words: String| {
        let font = FontId::proportional(size::TEXT - 0.5);
        ui.painter().text(pos2(x, middle), Align2::LEFT_CENTER, words, font, palette.ink);
    };
    text(rect.left(), sentence(share.input.name()));
    let room = (rect.width() - NAME - FIGURE).max(1.0);
    let left = rect.left() + NAME;
    let end = |part: f64| left + room * part.clamp(0.0, 1.0) as f32;
    let (known, total) = (end(share.known()), end(share.total.max(share.known())));
    let stroke = Stroke::new(size::STRONG_EDGE, palette.quiet);
    ui.painter().hline(left..=total, middle, stroke);
    ui.painter().vline(total, middle - 4.0..=middle + 4.0, stroke);
    let bar = Rect::from_x_y_ranges(left..=known, middle - 0.5 * BAR..=middle + 0.5 * BAR);
    ui.painter().rect_filled(bar, 1.0, palette.accent);
    text(total + 6.0, format!("{} %", fixed(100.0 * share.known(), 0)));
    let words = format!(
        "{}: {} % of the variance goes once it is known, {} % is left where all others are known",
        sentence(share.input.name()),
        fixed(100.0 * share.known(), 0),
        fixed(100.0 * share.total.clamp(0.0, 1.0), 0),
    );
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, &words));
    response.on_hover_text(words);
}
