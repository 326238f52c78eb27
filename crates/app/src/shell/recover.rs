//! Work that was left behind: the question whether to take it up, and what is done.

use eframe::egui::{RichText, Ui};

use super::ask::{Question, Reply, first_focus, heading, strong_button};
use super::obey;
use super::window::Window;
use crate::edit::history::Edit;
use crate::keep::found::{Found, look};
use crate::theme::Palette;

/// What the user wants.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Choice {
    /// Put it on the desk.
    TakeUp,
    /// Leave it where it is, for another day.
    Leave,
    /// Throw it away.
    ThrowAway,
}

/// Looks for work left behind: of the plan on the desk, or of any where the window opens without a plan file.
pub fn look_around(window: &mut Window) {
    let found = look(window.desk.path(), window.state.as_deref(), window.recent.plans());
    window.found.extend(found);
}

/// Asks about the next one, unless another question stands there or the plan on the desk has changes.
pub fn ask_next(window: &mut Window) {
    if window.question.is_none() && window.picker.is_none() && !window.desk.is_changed() {
        window.question = window.found.pop_front().map(|found| Question::Recovery(Box::new(found)));
    }
}

/// Shows the question.
pub fn show(ui: &mut Ui, palette: &Palette, found: &Found) -> Option<Reply> {
    heading(ui, "Work that was not saved");
    for line in found.lines() {
        ui.label(line);
    }
    ui.label(RichText::new("Taking it up changes no file until you save.").small().color(palette.quiet));
    ui.add_space(8.0);
    let mut reply = None;
    ui.horizontal(|ui| {
        let take = ui.add(strong_button(palette, "Take it up"));
        first_focus(ui, &take);
        if take.clicked() {
            reply = Some(Reply::Recovery(Choice::TakeUp));
        }
        if ui.button("Leave it for later").clicked() {
            reply = Some(Reply::Recovery(Choice::Leave));
        }
        if ui.button("Throw it away").clicked() {
            reply = Some(Reply::Recovery(Choice::ThrowAway));
        }
    });
    reply
}

/// Does what was answered.
pub fn take(window: &mut Window, found: Found, choice: Choice) {
    match choice {
        Choice::Leave => {}
        Choice::ThrowAway => found.remove(),
        Choice::TakeUp => take_up(window, found),
    }
}

fn take_up(window: &mut Window, found: Found) {
    let plan = found.kept.plan.clone();
    let path = found.kept.plan_file.clone();
    match (&found.on_disk, &path) {
        (Some(on_disk), Some(_)) => {
            window.desk.replace(on_disk.clone(), path);
            window.desk.plan = plan;
            window.desk.settle(&Edit::whole("Take up unsaved work"));
        }
        _ => {
            window.desk.replace(plan, path);
            window.desk.has_on_disk(None);
        }
    }
    obey::fresh(window);
    window.watch_file();
    window.autosave.adopt(found);
    window.view.say("Taken up. Save the plan to keep it.");
}
