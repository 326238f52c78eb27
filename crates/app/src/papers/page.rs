//! The page: what to draw and where to write it above, the sheet below.

use crestline_plan::Units;
use crestline_sheets::Format;
use eframe::egui::{
    Align, Button, DragValue, Frame, Key, Layout, Margin, Modifiers, RichText, ScrollArea, Sense, Stroke,
    TextEdit, Ui, Vec2, WidgetInfo, accesskit::Role,
};

use super::paint::{self, Paper};
use super::preview::{DATE_LENGTH, Magnification, Preview};
use crate::edit::command::Command;
use crate::edit::desk::Outcome;
use crate::theme::{Palette, size};

/// Room left around a sheet that is shown whole, points.
const ROUND_ABOUT: f32 = 12.0;
/// The least room in which the sheet stands below its buttons without being scrolled to, points.
const LEAST_ROOM: Vec2 = Vec2::new(500.0, 420.0);
/// Height of the part with the sheet where it is scrolled to, points.
const SCROLLED_SHEET: f32 = 340.0;

/// The page.
pub fn show(
    ui: &mut Ui,
    palette: &'static Palette,
    outcome: &Outcome,
    preview: &mut Preview,
) -> Vec<Command> {
    let mut commands = Vec::new();
    let frame = Frame::new()
        .fill(palette.sheet)
        .stroke(Stroke::new(size::EDGE, palette.edge))
        .inner_margin(Margin::symmetric(8, 6));
    frame.show(ui, |ui| {
        ui.set_min_size(ui.available_size());
        let room = ui.available_size();
        if room.x >= LEAST_ROOM.x && room.y >= LEAST_ROOM.y {
            head(ui, outcome, preview, &mut commands);
            sheet(ui, palette, outcome, preview);
            return;
        }
        // The sheet keeps its height and is scrolled to.
        ScrollArea::vertical().id_salt("page").auto_shrink([false, false]).show(ui, |ui| {
            head(ui, outcome, preview, &mut commands);
            let part = Vec2::new(ui.available_width(), SCROLLED_SHEET);
            ui.allocate_ui(part, |ui| sheet(ui, palette, outcome, preview));
        });
    });
    commands
}

/// Everything above the sheet.
fn head(ui: &mut Ui, outcome: &Outcome, preview: &mut Preview, commands: &mut Vec<Command>) {
    ui.label(RichText::new("Sheets as they print").heading());
    writing(ui, commands);
    parts(ui, outcome, preview);
    looking(ui, outcome, preview);
    ui.add_space(size::GAP);
}

/// Buttons that write files.
fn writing(ui: &mut Ui, commands: &mut Vec<Command>) {
    ui.horizontal_wrapped(|ui| {
        for format in [Format::Pdf, Format::Svg, Format::Dxf, Format::Csv] {
            let command = Command::Export(format);
            if ui.button(command.name()).on_hover_text(meaning(format)).clicked() {
                commands.push(command);
            }
        }
    });
}

fn meaning(format: Format) -> &'static str {
    match format {
        Format::Pdf => "All sheets, a page a sheet, to print without scaling.",
        Format::Svg => "All sheets one below the other, in millimetres.",
        Format::Dxf => {
            "The plan view alone for a machine or CAD: origin at the datum, crests and slot on layers of their own."
        }
        Format::Csv => "The schedule, a row a string.",
    }
}

/// What is drawn. Paper, units and datum are the plan's and stand among its fields.
fn parts(ui: &mut Ui, outcome: &Outcome, preview: &mut Preview) {
    ui.horizontal_wrapped(|ui| {
        let contents = &mut preview.contents;
        ui.label("Draw");
        ui.checkbox(&mut contents.plan_view, "plan view");
        ui.checkbox(&mut contents.nut_view, "nut view").on_hover_text("Drawn where the nut is compensated.");
        ui.checkbox(&mut contents.profile, "profile 5:1");
        ui.checkbox(&mut contents.tables, "tables");
        ui.checkbox(&mut contents.template, "template");
        ui.checkbox(&mut contents.cautions, "cautions");
        if outcome.plan.sheet.units == Units::Inch {
            ui.checkbox(&mut preview.fractions, "inches as fractions");
        }
        ui.add_space(size::GAP);
        let label = ui.label("Date");
        let field = TextEdit::singleline(&mut preview.date)
            .char_limit(DATE_LENGTH)
            .desired_width(110.0)
            .hint_text("left out");
        ui.add(field).labelled_by(label.id);
    });
}

/// Which sheet, and how large.
fn looking(ui: &mut Ui, outcome: &Outcome, preview: &mut Preview) {
    let count = preview.drawing(outcome).0.sheets.len().max(1);
    ui.horizontal_wrapped(|ui| {
        let first = preview.sheet == 0;
        if named(ui, "◀", "Sheet before", !first) {
            preview.sheet -= 1;
        }
        ui.label(format!("Sheet {} of {count}", preview.sheet + 1));
        if named(ui, "▶", "Next sheet", preview.sheet + 1 < count) {
            preview.sheet += 1;
        }
        ui.separator();
        if ui.selectable_label(preview.magnification == Magnification::Whole, "Whole sheet").clicked() {
            preview.magnification = Magnification::Whole;
        }
        let is_true = preview.magnification == Magnification::Times(1.0);
        if ui.selectable_label(is_true, "True size").clicked() {
            preview.magnification = Magnification::Times(1.0);
        }
        if named(ui, "−", "Smaller", true) {
            preview.zoom(-1);
        }
        if named(ui, "+", "Larger", true) {
            preview.zoom(1);
        }
        if is_true {
            let label = ui.label("100 mm of the check line measure on this screen");
            ui.add(DragValue::new(&mut preview.measured_mm).range(20.0..=500.0).speed(0.1).suffix(" mm"))
                .labelled_by(label.id)
                .on_hover_text("Hold a rule to the screen: what you enter makes this view true.");
        }
    });
}

fn named(ui: &mut Ui, sign: &str, name: &str, enabled: bool) -> bool {
    let response =
        ui.add_enabled(enabled, Button::new(sign).min_size(Vec2::new(24.0, 0.0))).on_hover_text(name);
    response.widget_info(|| WidgetInfo::labeled(Role::Button, enabled, name));
    response.clicked()
}

fn sheet(ui: &mut Ui, palette: &Palette, outcome: &Outcome, preview: &mut Preview) {
    let room = ui.available_size();
    let (true_size, magnification, index) = (preview.true_size(), preview.magnification, preview.sheet);
    let (drawing, primitives) = preview.drawing(outcome);
    let (Some(sheet), Some(marks)) = (drawing.sheets.get(index), primitives.get(index)) else {
        ui.label(RichText::new("Nothing is chosen to be drawn.").color(palette.quiet));
        return;
    };
    let (name, area) = (sheet.name.clone(), sheet.area);
    let times = match magnification {
        Magnification::Whole => whole(paint::size(area, true_size), room),
        Magnification::Times(times) => times,
    };
    let scale = times * true_size;
    let mut turned = 0;
    Frame::new().fill(palette.ground).show(ui, |ui| {
        ScrollArea::both().auto_shrink([false, false]).show(ui, |ui| {
            ui.with_layout(Layout::top_down(Align::Center), |ui| {
                ui.add_space(0.5 * ROUND_ABOUT);
                let (rect, response) = ui.allocate_exact_size(paint::size(area, scale), Sense::click());
                let words = format!("Sheet {}: {name}", index + 1);
                response.widget_info(|| WidgetInfo::labeled(Role::Image, true, &words));
                paint::paint(ui.painter(), &Paper::at(rect.min, area, scale), drawing, marks);
                if response.clicked() {
                    response.request_focus();
                }
                if response.has_focus() {
                    ui.painter().rect_stroke(
                        rect,
                        0.0,
                        Stroke::new(size::STRONG_EDGE, palette.accent),
                        eframe::egui::StrokeKind::Outside,
                    );
                    let pressed = |key| ui.input_mut(|input| input.consume_key(Modifiers::NONE, key));
                    turned = i32::from(pressed(Key::PageDown)) - i32::from(pressed(Key::PageUp));
                }
                ui.add_space(0.5 * ROUND_ABOUT);
            });
        });
    });
    preview.shown = times;
    preview.sheet = preview.sheet.saturating_add_signed(turned as isize);
}

/// The magnification at which a sheet of this size fits the room.
fn whole(size: Vec2, room: Vec2) -> f32 {
    let margin = 2.0 * ROUND_ABOUT;
    ((room.x - margin) / size.x).min((room.y - margin) / size.y).max(0.05)
}
