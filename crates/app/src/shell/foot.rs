//! The lines at the foot: what has just been done or gone wrong, and what is waited for.

use eframe::egui::{Button, Frame, Label, Margin, Panel, RichText, Ui};

use crate::edit::command::Command;
use crate::theme::Palette;
use crate::view::Message;

/// A line about a file dialog that is open; a dialog that never comes is no dead end.
pub fn waiting(ui: &mut Ui, palette: &Palette, title: &str) -> Vec<Command> {
    let mut commands = Vec::new();
    let frame = Frame::new().fill(palette.caution_ground).inner_margin(Margin::symmetric(10, 4));
    Panel::bottom("waiting").frame(frame).resizable(false).show(ui, |ui| {
        ui.horizontal(|ui| {
            ui.label(RichText::new(format!("{title}: a file dialog is open.")).color(palette.ink));
            if ui.button(Command::TypePath.name()).clicked() {
                commands.push(Command::TypePath);
            }
        });
    });
    commands
}

/// The line; it takes no room while there is nothing to say.
pub fn show(ui: &mut Ui, palette: &Palette, message: Option<&Message>) -> Vec<Command> {
    let Some(message) = message else { return Vec::new() };
    let mut commands = Vec::new();
    let (sign, colour, fill) = if message.is_error {
        ("▲", palette.fault, palette.fault_ground)
    } else {
        ("✔", palette.ink, palette.accent_ground)
    };
    let frame = Frame::new().fill(fill).inner_margin(Margin::symmetric(10, 4));
    Panel::bottom("foot").frame(frame).resizable(false).show(ui, |ui| {
        ui.horizontal(|ui| {
            let close = ui.add(Button::new("✕").small()).on_hover_text("Put the message away");
            close.ctx.accesskit_node_builder(close.id, |node| node.set_label("Put the message away"));
            if close.clicked() {
                commands.push(Command::DismissMessage);
            }
            ui.add(Label::new(RichText::new(format!("{sign} {}", message.text)).color(colour)).wrap());
        });
    });
    commands
}
