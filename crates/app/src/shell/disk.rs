//! When another program has changed the plan's file: the question, and what is done.

use std::path::PathBuf;

use crestline_plan::Plan;
use eframe::egui::{Context, RichText, Ui};

use super::ask::{Question, Reply, first_focus, heading, strong_button};
use super::window::Window;
use super::{files, obey};
use crate::edit::command::Command;
use crate::edit::history::Edit;
use crate::keep::difference;
use crate::keep::watch::Change;
use crate::theme::Palette;

/// The plan's file holds something else than what was read or written here.
#[derive(Debug)]
pub struct Changed {
    path: PathBuf,
    /// What it holds now, or why that cannot be opened.
    now: Result<Plan, String>,
    /// Where it was noticed while saving: what to do once it is saved.
    saving: Option<Option<Command>>,
}

/// What the user wants.
#[derive(Debug, PartialEq)]
pub enum Choice {
    /// Keep the plan in the window, and leave the file as it is.
    KeepMine,
    /// Put the file's plan on the desk; the one in the window can be had back by undo.
    Load(Box<Plan>),
    /// Save over the file, and then do this.
    SaveOver(Option<Command>),
}

/// Looks whether the plan's file has been changed, and asks or says so; true where the user must answer first.
pub fn look(window: &mut Window, saving: Option<Option<Command>>) -> bool {
    let Some(path) = window.desk.path().map(std::path::Path::to_owned) else { return false };
    match window.watch.as_mut().and_then(crate::keep::watch::Watch::change) {
        None => false,
        Some(Change::Gone) => {
            window.take_file_as_seen();
            window.desk.has_on_disk(None);
            if saving.is_none() {
                let words = format!("{} is not there any more. Saving writes it anew.", path.display());
                window.view.complain(words);
            }
            false
        }
        Some(Change::Differs) => {
            let now = files::open(&path);
            if now.as_ref() == Ok(&window.desk.plan) {
                window.take_file_as_seen();
                window.desk.has_on_disk(now.ok());
                return false;
            }
            window.question = Some(Question::Disk(Box::new(Changed { path, now, saving })));
            true
        }
    }
}

/// Shows the question.
pub fn show(ui: &mut Ui, palette: &Palette, changed: &Changed, mine: &Plan) -> Option<Reply> {
    heading(ui, "Another program has changed the file");
    ui.label(changed.path.display().to_string());
    match &changed.now {
        Ok(now) => {
            ui.label("In the file → in the window:");
            for line in difference::lines(now, mine) {
                ui.label(RichText::new(line).small());
            }
        }
        Err(words) => {
            ui.label(RichText::new(words).color(palette.fault));
        }
    }
    ui.add_space(8.0);
    ui.horizontal_wrapped(|ui| buttons(ui, palette, changed)).inner
}

fn buttons(ui: &mut Ui, palette: &Palette, changed: &Changed) -> Option<Reply> {
    let mut reply = None;
    let mut offer = |ui: &mut Ui, is_first: bool, words: &str, choice: &dyn Fn() -> Reply| {
        let button = if is_first { ui.add(strong_button(palette, words)) } else { ui.button(words) };
        if is_first {
            first_focus(ui, &button);
        }
        if button.clicked() {
            reply = Some(choice());
        }
    };
    // The first one loses nothing.
    match &changed.saving {
        None => offer(ui, true, "Keep mine", &|| Reply::Disk(Choice::KeepMine)),
        Some(_) => offer(ui, true, "Do not save now", &|| Reply::Cancel),
    }
    if let Ok(now) = &changed.now {
        let load = || Reply::Disk(Choice::Load(Box::new(now.clone())));
        offer(ui, false, "Load the file's (undo brings mine back)", &load);
    }
    if let Some(next) = &changed.saving {
        offer(ui, false, "Save mine over it", &|| Reply::Disk(Choice::SaveOver(next.clone())));
    }
    reply
}

/// Does what was answered.
pub fn take(window: &mut Window, ctx: &Context, choice: Choice) {
    match choice {
        Choice::KeepMine => {
            window.take_file_as_seen();
            window.desk.has_on_disk(window.desk.path().and_then(|path| files::open(path).ok()));
        }
        Choice::Load(plan) => {
            window.take_file_as_seen();
            window.desk.has_on_disk(Some((*plan).clone()));
            window.desk.plan = *plan;
            window.desk.settle(&Edit::whole("Load the changed file"));
            obey::forget_what_was_typed(window);
            window.view.say("Loaded what the file holds now; undo brings the plan before back.");
        }
        Choice::SaveOver(next) => {
            window.take_file_as_seen();
            obey::save_then(window, ctx, next);
        }
    }
}
