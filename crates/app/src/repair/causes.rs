//! What each cause explains of every string's errors, as stacked bars.

use crestline_plan::{Cause, CauseReport, Diagnosis, StringDiagnosis};
use eframe::egui::{
    Align2, FontId, Rect, RichText, Sense, Stroke, StrokeKind, Ui, Vec2, WidgetInfo, accesskit, pos2,
};

use crate::results::figures::fixed;
use crate::results::marks;
use crate::theme::{Palette, size};

/// Height of a row and of the bar in it.
const ROW: f32 = 24.0;
const BAR: f32 = 17.0;
/// Width of the strings' numbers, and of the sums behind the bars.
const NAME: f32 = 44.0;
const SUM: f32 = 52.0;
/// The smallest share that is drawn and named, cents.
const WORTH_NAMING_CENTS: f64 = 0.1;

/// All causes with the letters that stand on their bars, in the order of the bars.
const CAUSES: [(Cause, &str); 8] = [
    (Cause::Saddle, "S"),
    (Cause::Nut, "N"),
    (Cause::NutSlot, "H"),
    (Cause::Action, "A"),
    (Cause::Pressing, "P"),
    (Cause::Stiffness, "E"),
    (Cause::Frets, "F"),
    (Cause::Relief, "R"),
];

/// The bars with their legend.
pub fn show(ui: &mut Ui, palette: &Palette, diagnosis: &Diagnosis) {
    ui.label(RichText::new("What the errors come from, cents").heading());
    let words = "Root mean square of each cause's share over the frets read. Shares of opposite sign cancel in part, \
                 so a bar may be longer than the error.";
    ui.label(RichText::new(words).small().color(palette.quiet));
    legend(ui, palette, diagnosis);
    let sum = |string: &StringDiagnosis| shares(string).map(|share| share.cents).sum::<f64>();
    let most = diagnosis.strings.iter().map(sum).fold(1.0, f64::max);
    ui.spacing_mut().item_spacing.y = 0.0;
    for string in &diagnosis.strings {
        row(ui, palette, string, most);
    }
}

/// The shares that are worth naming, in the order of the bars.
fn shares(string: &StringDiagnosis) -> impl Iterator<Item = CauseReport> {
    let of = |cause: Cause| string.causes.iter().find(|share| share.cause == cause).copied();
    CAUSES
        .into_iter()
        .filter_map(move |(cause, _)| of(cause))
        .filter(|share| share.cents >= WORTH_NAMING_CENTS)
}

fn place(cause: Cause) -> usize {
    CAUSES.iter().position(|(known, _)| *known == cause).unwrap_or_default()
}

fn legend(ui: &mut Ui, palette: &Palette, diagnosis: &Diagnosis) {
    let is_seen = |cause: Cause| diagnosis.strings.iter().flat_map(shares).any(|share| share.cause == cause);
    ui.horizontal_wrapped(|ui| {
        for (cause, letter) in CAUSES.into_iter().filter(|(cause, _)| is_seen(*cause)) {
            let (rect, _) = ui.allocate_exact_size(Vec2::new(17.0, 15.0), Sense::hover());
            segment(ui, palette, rect, cause, letter);
            ui.label(RichText::new(cause.words()).small());
        }
    });
}

fn segment(ui: &Ui, palette: &Palette, rect: Rect, cause: Cause, letter: &str) {
    ui.painter().rect_filled(rect, 1.0, palette.causes[place(cause)]);
    ui.painter().rect_stroke(rect, 1.0, Stroke::new(1.0, palette.sheet), StrokeKind::Inside);
    const LETTER: f32 = 12.0;
    if rect.width() >= LETTER {
        let font = FontId::proportional(size::SMALL);
        ui.painter().text(rect.center(), Align2::CENTER_CENTER, letter, font, palette.sheet);
    }
}

fn row(ui: &mut Ui, palette: &Palette, string: &StringDiagnosis, most: f64) {
    let (rect, response) = ui.allocate_exact_size(Vec2::new(ui.available_width(), ROW), Sense::hover());
    let middle = rect.center().y;
    let index = string.string as usize - 1;
    marks::paint(ui.painter(), pos2(rect.left() + 11.0, middle), index, palette, 4.5);
    let text = |at, anchor, words: String| {
        ui.painter().text(at, anchor, words, FontId::proportional(size::TEXT), palette.ink);
    };
    text(pos2(rect.left() + 22.0, middle), Align2::LEFT_CENTER, string.string.to_string());
    let room = f64::from((rect.width() - NAME - SUM).max(1.0));
    let mut x = rect.left() + NAME;
    for share in shares(string) {
        let width = (share.cents / most * room) as f32;
        let bar = Rect::from_x_y_ranges(x..=x + width, middle - 0.5 * BAR..=middle + 0.5 * BAR);
        segment(ui, palette, bar, share.cause, CAUSES[place(share.cause)].1);
        x += width;
    }
    let sum: f64 = shares(string).map(|share| share.cents).sum();
    text(pos2(x + 6.0, middle), Align2::LEFT_CENTER, fixed(sum, 1));
    let words = words(string);
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, &words));
    response.on_hover_text(words);
}

/// The causes of a string, the greatest first.
fn words(string: &StringDiagnosis) -> String {
    let mut shares: Vec<CauseReport> = shares(string).collect();
    shares.sort_by(|a, b| b.cents.total_cmp(&a.cents));
    let named: Vec<String> =
        shares.iter().map(|share| format!("{} {}", share.cause.words(), fixed(share.cents, 1))).collect();
    let named = if named.is_empty() { "nothing worth naming".to_owned() } else { named.join(", ") };
    format!("Causes of string {}, cents: {named}", string.string)
}
