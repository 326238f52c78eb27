//! What the user should know about the result, and what is wrong with the plan.

use crestline_plan::{Fault, Notice, Severity};
use eframe::egui::{Frame, Label, Margin, RichText, ScrollArea, Sense, Stroke, Ui, WidgetInfo, accesskit};

use crate::edit::command::Command;
use crate::fields::draft::Drafts;
use crate::fields::form::place_in_words;
use crate::theme::{Palette, size};
use crate::units::{LengthUnit, fault_words, in_unit};

/// The band that says that what is shown is the last good result, and why.
pub fn stale(
    ui: &mut Ui,
    palette: &Palette,
    faults: &[Fault],
    drafts: &Drafts,
    has_result: bool,
) -> Vec<Command> {
    let unit = LengthUnit::of(ui.ctx());
    let typed = drafts.errors().map(|(path, text)| (path.to_owned(), text.to_owned()));
    let checked = faults.iter().map(|fault| (fault.path.clone(), fault_words(fault, unit)));
    let lines: Vec<(String, String)> = typed.chain(checked).collect();
    if lines.is_empty() {
        return Vec::new();
    }
    let mut commands = Vec::new();
    let edge = Stroke::new(size::STRONG_EDGE, palette.fault);
    Frame::new()
        .fill(palette.fault_ground)
        .stroke(edge)
        .corner_radius(size::CORNER)
        .inner_margin(Margin::symmetric(10, 5))
        .show(ui, |ui| {
            ui.set_min_width(ui.available_width());
            let title = match (has_result, lines.len()) {
                (false, _) => "No result yet: mend these fields.".to_owned(),
                (true, 1) => "Shown is the last good result. One field is to be mended:".to_owned(),
                (true, n) => format!("Shown is the last good result. {n} fields are to be mended:"),
            };
            ui.label(RichText::new(title).strong().color(palette.fault));
            ScrollArea::vertical().id_salt("faults").max_height(66.0).show(ui, |ui| {
                for (path, text) in &lines {
                    let place = place_in_words(path);
                    let words = if place.is_empty() { text.clone() } else { format!("{place}: {text}") };
                    commands.extend(link(ui, palette, "▲", palette.fault, path, &words));
                }
            });
        });
    commands
}

/// The notices of a result, the graver first.
pub fn show(ui: &mut Ui, palette: &Palette, notices: &[Notice]) -> Vec<Command> {
    let unit = LengthUnit::of(ui.ctx());
    let mut sorted: Vec<&Notice> = notices.iter().collect();
    sorted.sort_by_key(|notice| std::cmp::Reverse(notice.severity));
    let mut commands = Vec::new();
    if sorted.is_empty() {
        ui.label(RichText::new("No notices.").small().color(palette.quiet));
    }
    for notice in sorted {
        let (sign, colour) = match notice.severity {
            Severity::Warning => ("▲", palette.caution),
            Severity::Note => ("●", palette.quiet),
        };
        commands.extend(link(
            ui,
            palette,
            sign,
            colour,
            &notice.path,
            &sentence(&in_unit(&notice.text, unit)),
        ));
    }
    commands
}

/// The text with a capital at its start.
#[must_use]
pub fn sentence(text: &str) -> String {
    let mut letters = text.chars();
    letters.next().map_or_else(String::new, |first| first.to_uppercase().chain(letters).collect())
}

/// One line, which goes to its field when it is clicked.
fn link(
    ui: &mut Ui,
    palette: &Palette,
    sign: &str,
    colour: eframe::egui::Color32,
    path: &str,
    words: &str,
) -> Option<Command> {
    let shown = RichText::new(format!("{sign} {words}")).small().color(if path.is_empty() {
        palette.ink
    } else {
        colour
    });
    if path.is_empty() {
        ui.add(Label::new(shown).wrap());
        return None;
    }
    let response = ui.add(Label::new(shown).wrap().sense(Sense::click())).on_hover_text("Go to the field");
    response.widget_info(|| {
        WidgetInfo::labeled(accesskit::Role::Link, true, format!("{words}. Go to the field"))
    });
    if response.has_focus() {
        ui.painter().rect_stroke(
            response.rect.expand(1.0),
            2.0,
            Stroke::new(1.0, palette.accent),
            eframe::egui::StrokeKind::Outside,
        );
    }
    response.clicked().then(|| Command::GoTo(path.to_owned()))
}
