//! The line at the foot: what has just been done or gone wrong.

use eframe::egui::{Button, Frame, Label, Margin, Panel, RichText, Ui};

use crate::edit::command::Command;
use crate::theme::Palette;
use crate::view::Message;

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
