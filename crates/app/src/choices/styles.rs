//! Every pair of saddle and nut style in a table, its errors beside it as bars, and a button that takes it.

use crestline_plan::{Comparison, ComparisonRow, NutStyle, SaddleStyle};
use eframe::egui::{Button, Grid, RichText, Sense, Stroke, Ui, Vec2, WidgetInfo, accesskit, pos2};

use crate::edit::command::Command;
use crate::edit::desk::Outcome;
use crate::results::figures::fixed;
use crate::results::table;
use crate::theme::{Palette, size};

/// Length of the longest bar, points.
const BAR: f32 = 150.0;
/// The saddle styles from the least work to the most.
pub const IN_ORDER: [SaddleStyle; 4] =
    [SaddleStyle::Straight, SaddleStyle::TwoPiece, SaddleStyle::Shaped, SaddleStyle::Separate];
/// Height of a row.
const ROW: f32 = 22.0;

/// The part of the page.
pub fn show(
    ui: &mut Ui,
    palette: &Palette,
    outcome: &Outcome,
    comparison: &Comparison,
    working: bool,
) -> Vec<Command> {
    ui.label(RichText::new("What each way to make it leaves of the errors").heading());
    let words = "All strings and the frets of the fit. Differences of a cent or two are hard to hear: \
                 weigh them against the work.";
    ui.label(RichText::new(words).small().color(palette.quiet));
    ui.label(
        RichText::new(if working { "Working out …" } else { "▬ root mean square   ╾ largest error" })
            .small()
            .color(palette.quiet),
    );
    table::sideways(ui, "styles", 0.0, |ui| rows(ui, palette, outcome, comparison))
}

fn rows(ui: &mut Ui, palette: &Palette, outcome: &Outcome, comparison: &Comparison) -> Vec<Command> {
    let mut commands = Vec::new();
    let most = comparison.rows.iter().map(|row| row.max_cents).fold(1.0, f64::max);
    Grid::new("styles").striped(true).min_row_height(ROW).spacing([12.0, 3.0]).show(ui, |ui| {
        for head in ["Saddle", "Nut", "RMS\ncents", "Worst\ncents", "string,\nfret", "", "Fits", ""] {
            ui.label(RichText::new(head).small().color(palette.quiet));
        }
        ui.end_row();
        let of_style = |style| comparison.rows.iter().filter(move |row| row.saddle == style);
        for row in IN_ORDER.into_iter().flat_map(of_style) {
            let taken = is_taken(outcome, row);
            ui.label(emphasis(saddle_words(row), taken)).on_hover_text(saddle_work(row.saddle));
            ui.label(emphasis(nut_words(row.nut).to_owned(), taken)).on_hover_text(nut_work(row.nut));
            ui.label(fixed(row.rms_cents, 2));
            ui.label(fixed(row.max_cents, 1));
            ui.label(format!("{}, {}", row.worst_string, row.worst_fret));
            bar(ui, palette, row, most);
            if row.fits {
                ui.label("yes");
            } else {
                let help =
                    "The best that fits is compared; the ideal crests want a thicker blank or more travel.";
                ui.label(RichText::new("no").color(palette.caution).strong()).on_hover_text(help);
            }
            commands.extend(take(ui, row, taken));
            ui.end_row();
        }
    });
    commands
}

fn emphasis(words: String, taken: bool) -> RichText {
    let text = RichText::new(words);
    if taken { text.strong() } else { text }
}

fn is_taken(outcome: &Outcome, row: &ComparisonRow) -> bool {
    let plan = &outcome.plan;
    plan.saddle.style == row.saddle
        && plan.nut.style == row.nut
        && (row.saddle != SaddleStyle::TwoPiece || plan.saddle.split_after == row.split_after)
}

fn take(ui: &mut Ui, row: &ComparisonRow, taken: bool) -> Option<Command> {
    let words = if taken { "In the plan" } else { "Take" };
    let response = ui.add_enabled(!taken, Button::new(words));
    let name = format!("Take {} with nut {}", saddle_words(row), nut_words(row.nut));
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Button, !taken, &name));
    let style = Command::TakeStyle(row.saddle, row.nut, row.split_after);
    response.clicked().then_some(style)
}

/// Root mean square as a bar, the largest error as a line that goes on from it.
fn bar(ui: &mut Ui, palette: &Palette, row: &ComparisonRow, most: f64) {
    let (rect, response) = ui.allocate_exact_size(Vec2::new(BAR, ROW - 6.0), Sense::hover());
    let length = |cents: f64| BAR * (cents / most).clamp(0.0, 1.0) as f32;
    let words = format!(
        "root mean square {} cents, largest {} cents",
        fixed(row.rms_cents, 2),
        fixed(row.max_cents, 1)
    );
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, &words));
    let middle = rect.center().y;
    let largest = rect.left() + length(row.max_cents);
    ui.painter().hline(rect.left()..=largest, middle, Stroke::new(size::STRONG_EDGE, palette.quiet));
    ui.painter().vline(largest, middle - 4.0..=middle + 4.0, Stroke::new(size::STRONG_EDGE, palette.quiet));
    let end = pos2(rect.left() + length(row.rms_cents), rect.bottom() - 2.0);
    let whole = eframe::egui::Rect::from_min_max(pos2(rect.left(), rect.top() + 2.0), end);
    ui.painter().rect_filled(whole, 1.0, palette.accent);
    response.on_hover_text(words);
}

/// The style in words.
pub fn saddle_words(row: &ComparisonRow) -> String {
    match (row.saddle, row.split_after) {
        (SaddleStyle::Straight, _) => "Straight".to_owned(),
        (SaddleStyle::Shaped, _) => "Shaped".to_owned(),
        (SaddleStyle::Separate, _) => "Separate".to_owned(),
        (SaddleStyle::TwoPiece, Some(after)) => format!("Two-piece, split after {after}"),
        (SaddleStyle::TwoPiece, None) => "Two-piece".to_owned(),
    }
}

fn saddle_work(style: SaddleStyle) -> &'static str {
    match style {
        SaddleStyle::Straight => "Work: one slanted slot, one straight crest.",
        SaddleStyle::Shaped => "Work: one slot, a thick blank, the crest filed string by string.",
        SaddleStyle::TwoPiece => "Work: two slots, each with a straight crest.",
        SaddleStyle::Separate => "Work: a piece for each string, set on its own.",
    }
}

fn nut_words(style: NutStyle) -> &'static str {
    match style {
        NutStyle::Plain => "plain",
        NutStyle::Common => "common",
        NutStyle::Shaped => "shaped",
    }
}

fn nut_work(style: NutStyle) -> &'static str {
    match style {
        NutStyle::Plain => "Work: none at the nut.",
        NutStyle::Common => "Work: the fingerboard's end shortened for all strings.",
        NutStyle::Shaped => "Work: the nut's edge filed string by string.",
    }
}
