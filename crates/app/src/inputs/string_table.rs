//! The strings as a compact table.

use crestline_plan::{Plan, PlanString};
use eframe::egui::{Align2, Button, FontId, RichText, Sense, Stroke, Ui, Vec2, WidgetInfo, accesskit};

use crate::edit::command::Command;
use crate::edit::spread::Spread;
use crate::edit::strings::MOST_STRINGS;
use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::pitch;
use crate::fields::row::{fault_line, row, unit};
use crate::results::marks;
use crate::theme::size;
use crate::units::fault_words;

const NUMBER_WIDTH: f32 = 44.0;
const HEADS: [&str; 5] = ["Pitch", "Core ⌀", "Outside ⌀", "Action\nfret 1", "Action\nfret 12"];

/// The table, and the buttons that change its rows.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan, chosen: usize) {
    let gap = 4.0;
    let width = ((ui.available_width() - NUMBER_WIDTH - 5.0 * gap) / 5.0).floor();
    ui.spacing_mut().item_spacing.x = gap;
    heads(ui, form, width);
    let zero_fret = plan.instrument.zero_fret;
    for (index, string) in plan.strings.iter_mut().enumerate() {
        let line = Line { index, is_chosen: chosen == index, zero_fret, width };
        ui.horizontal(|ui| line.show(ui, form, string));
    }
    ui.horizontal_wrapped(|ui| {
        buttons(ui, form, chosen, plan.strings.len());
        spread(ui, form);
    });
    ui.spacing_mut().item_spacing.x = size::GAP;
    other_faults(ui, form, chosen);
    row(ui, "Reference pitch, A4", |ui| {
        let spec = Spec::new(
            "reference_hz",
            "Reference pitch A4, Hz",
            1.0,
            "The pitch of A4 against which notes are read.",
        );
        number::number(ui, form, &spec, &mut plan.reference_hz);
        unit(ui, form, "Hz");
    });
}

fn heads(ui: &mut Ui, form: &Form, width: f32) {
    ui.horizontal(|ui| {
        ui.add_space(NUMBER_WIDTH + ui.spacing().item_spacing.x);
        for head in HEADS {
            let (rect, _) = ui.allocate_exact_size(Vec2::new(width, 30.0), Sense::hover());
            marks::head(ui.painter(), rect.center_bottom(), Align2::CENTER_BOTTOM, head, form.palette.quiet);
        }
    });
}

/// A line of the table.
struct Line {
    index: usize,
    is_chosen: bool,
    zero_fret: bool,
    width: f32,
}

impl Line {
    fn show(&self, ui: &mut Ui, form: &mut Form, string: &mut PlanString) {
        let (index, width) = (self.index, self.width);
        chooser(ui, form, index, self.is_chosen);
        let cell = |field: &str, name: &str, step: f64| {
            let path = format!("strings[{index}].{field}");
            Spec::new(path, format!("String {}: {name}", index + 1), step, "").width(width).place("table")
        };
        pitch::pitch(ui, form, &cell("pitch", "pitch", 0.0).words(), &mut string.pitch);
        let core = cell("core.diameter_mm", "core diameter", 0.01);
        number::length(ui, form, &core, &mut string.core.diameter_mm);
        match &mut string.wrap {
            Some(wrap) => {
                let outside = cell("wrap.outside_mm", "outside diameter", 0.01);
                number::length(ui, form, &outside, &mut wrap.outside_mm);
            }
            None => blank(ui, form, width, "plain"),
        }
        match &mut string.action_mm.first {
            Some(first) if !self.zero_fret => {
                number::length(ui, form, &cell("action_mm.first", "action over fret 1", 0.05), first);
            }
            _ => blank(ui, form, width, "—"),
        }
        let twelfth = cell("action_mm.twelfth", "action over fret 12", 0.05);
        number::length(ui, form, &twelfth, &mut string.action_mm.twelfth);
    }
}

/// The number of the string with its marker; it chooses the string.
fn chooser(ui: &mut Ui, form: &mut Form, index: usize, chosen: bool) {
    let (rect, response) = ui.allocate_exact_size(Vec2::new(NUMBER_WIDTH, 23.0), Sense::click());
    let palette = form.palette;
    let name = format!("Choose string {}", index + 1);
    response.widget_info(|| WidgetInfo::selected(accesskit::Role::RadioButton, true, chosen, &name));
    let fill = if chosen { palette.accent_ground } else { palette.sheet };
    let edge = match (chosen || response.hovered(), response.has_focus()) {
        (_, true) => Stroke::new(size::STRONG_EDGE, palette.accent),
        (true, _) => Stroke::new(size::EDGE, palette.accent),
        _ => Stroke::new(size::EDGE, palette.edge),
    };
    ui.painter().rect(rect.shrink(0.5), size::CORNER, fill, edge, eframe::egui::StrokeKind::Inside);
    let left = rect.left_center();
    marks::paint(ui.painter(), left + Vec2::new(12.0, 0.0), index, palette, 4.5);
    let font = FontId::proportional(size::TEXT);
    ui.painter().text(
        left + Vec2::new(31.0, 0.0),
        Align2::CENTER_CENTER,
        (index + 1).to_string(),
        font,
        palette.ink,
    );
    if response.on_hover_text("Choose this string for the editor below and for the plots").clicked() {
        form.commands.push(Command::ChooseString(index));
    }
}

fn blank(ui: &mut Ui, form: &Form, width: f32, text: &str) {
    let (rect, _) = ui.allocate_exact_size(Vec2::new(width, 23.0), Sense::hover());
    let font = FontId::proportional(size::SMALL);
    ui.painter().text(rect.center(), Align2::CENTER_CENTER, text, font, form.palette.quiet);
}

fn buttons(ui: &mut Ui, form: &mut Form, chosen: usize, count: usize) {
    let mut button = |text: &str, name: &str, enabled: bool, command: Command| {
        let response = ui.add_enabled(enabled, Button::new(RichText::new(text).small())).on_hover_text(name);
        response.ctx.accesskit_node_builder(response.id, |node| node.set_label(name));
        if response.clicked() {
            form.commands.push(command);
        }
    };
    let string = format!("string {}", chosen + 1);
    let copy = format!("Add a copy of {string} behind it");
    button("Add copy", &copy, count < MOST_STRINGS, Command::DuplicateString(chosen));
    button("Remove", &format!("Remove {string}"), count > 1, Command::RemoveString(chosen));
    button("Up", &format!("Move {string} up"), chosen > 0, Command::MoveStringUp(chosen));
    button("Down", &format!("Move {string} down"), chosen + 1 < count, Command::MoveStringDown(chosen));
}

/// A menu of what can be spread between the outer strings.
fn spread(ui: &mut Ui, form: &mut Form) {
    let help = "The outer strings keep their values, and those between get equal steps";
    let menu = ui.menu_button(RichText::new("Spread ▾").small(), |ui| {
        ui.label(RichText::new(format!("{help}.")).small().color(form.palette.quiet));
        for of in Spread::ALL {
            let command = Command::Spread(of);
            let response = ui.button(of.name());
            response.ctx.accesskit_node_builder(response.id, |node| node.set_label(command.name()));
            if response.clicked() {
                form.commands.push(command);
                ui.close();
            }
        }
    });
    let response = menu.response.on_hover_text(help);
    response
        .ctx
        .accesskit_node_builder(response.id, |node| node.set_label("Spread between the outer strings"));
}

/// Faults of the strings that the editor below does not show.
fn other_faults(ui: &mut Ui, form: &mut Form, chosen: usize) {
    let here = format!("strings[{chosen}]");
    let typed = form.drafts.errors().map(|(path, text)| (path.to_owned(), text.to_owned()));
    let checked = form.faults.iter().map(|fault| (fault.path.clone(), fault_words(fault, form.unit)));
    let lines: Vec<(String, String)> = typed
        .chain(checked)
        .filter(|(path, _)| path.starts_with("strings") && !path.starts_with(&here))
        .collect();
    for (path, text) in lines {
        fault_line(ui, form, &format!("{}: {text}", crate::fields::form::place_in_words(&path)));
    }
}
