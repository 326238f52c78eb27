//! Fields with a few choices, side by side.

use eframe::egui::{Button, Ui, accesskit};

use super::form::Form;

/// One choice: the value, its word, and what it means.
pub type Choice<T> = (T, &'static str, &'static str);

/// Buttons side by side, one of which is pressed in.
pub fn buttons<T: Copy + PartialEq>(
    ui: &mut Ui,
    form: &mut Form,
    path: &str,
    name: &str,
    choices: &[Choice<T>],
    value: &mut T,
) -> bool {
    let mut changed = false;
    let row = ui.horizontal_wrapped(|ui| {
        ui.spacing_mut().item_spacing.x = 3.0;
        for (choice, word, meaning) in choices {
            let chosen = *value == *choice;
            let response =
                ui.add(Button::selectable(chosen, *word).frame_when_inactive(true)).on_hover_text(*meaning);
            response.ctx.accesskit_node_builder(response.id, |node| {
                node.set_role(accesskit::Role::RadioButton);
                node.set_label(format!("{name}: {word}"));
                node.set_description((*meaning).to_owned());
            });
            form.arrive(ui, path, &response);
            if response.clicked() && !chosen {
                *value = *choice;
                changed = true;
            }
        }
    });
    let _ = row;
    if changed {
        form.edited(name);
    }
    changed
}

/// A box to tick.
pub fn tick(ui: &mut Ui, form: &mut Form, path: &str, name: &str, meaning: &str, value: &mut bool) -> bool {
    let response = ui.checkbox(value, name).on_hover_text(meaning);
    form.arrive(ui, path, &response);
    if response.changed() {
        form.edited(name);
    }
    response.changed()
}
