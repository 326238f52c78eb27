//! The questions that the window asks: whether to keep changes, whether to replace a file, and for a path.

use std::path::PathBuf;

use eframe::egui::{Button, Context, Id, Key, Modal, Modifiers, RichText, Ui};

use super::finder::Finder;
use super::path_box::PathBox;
use super::picker::Purpose;
use super::{disk, recover};
use crate::edit::command::Command;
use crate::edit::desk::Desk;
use crate::keep::found::Found;
use crate::theme::Palette;

/// A question that stands in front of the window.
#[derive(Debug)]
pub enum Question {
    /// The plan has changes: keep them before doing this?
    Unsaved(Command),
    /// The file exists: replace it?
    Replace(Purpose, PathBuf),
    /// Which file?
    Path(PathBox),
    /// Another program has changed the plan's file: which is to stand?
    Disk(Box<disk::Changed>),
    /// Which command?
    Find(Finder),
    /// Work was left behind: take it up?
    Recovery(Box<Found>),
}

/// What the user answered.
#[derive(Debug, PartialEq)]
pub enum Reply {
    /// Save, and then do it.
    SaveThen(Command),
    /// Do it without saving.
    Without(Command),
    /// Use this file, whether or not it exists.
    Use(Purpose, PathBuf),
    /// Use this file, and ask if it exists.
    Propose(Purpose, PathBuf),
    /// What to do about a file that another program has changed.
    Disk(disk::Choice),
    /// Do this.
    Do(Command),
    /// What to do about work left behind.
    Recovery(recover::Choice),
    /// Nothing.
    Cancel,
}

/// Shows the question; gives the answer once there is one.
pub fn show(ctx: &Context, palette: &Palette, question: &mut Question, desk: &Desk) -> Option<Reply> {
    let modal = Modal::new(Id::unique("question")).show(ctx, |ui| {
        ui.set_width(460.0);
        match question {
            Question::Unsaved(next) => unsaved(ui, palette, next, &desk.file_name()),
            Question::Replace(purpose, path) => replace(ui, palette, *purpose, path),
            Question::Path(path_box) => path_box.show(ui, palette),
            Question::Disk(changed) => disk::show(ui, palette, changed, &desk.plan),
            Question::Find(finder) => finder.show(ui, palette),
            Question::Recovery(found) => recover::show(ui, palette, found),
        }
    });
    if modal.inner.is_none() && modal.should_close() {
        return Some(Reply::Cancel);
    }
    modal.inner
}

/// The words that a question begins with.
pub fn heading(ui: &mut Ui, text: &str) {
    ui.label(RichText::new(text).heading().strong());
    ui.add_space(4.0);
}

fn unsaved(ui: &mut Ui, palette: &Palette, next: &Command, plan_name: &str) -> Option<Reply> {
    heading(ui, "The plan has changes that are not saved");
    ui.label(format!("{plan_name}: save them first?"));
    ui.add_space(8.0);
    let mut reply = None;
    ui.horizontal(|ui| {
        let save = ui.add(strong_button(palette, "Save"));
        first_focus(ui, &save);
        if save.clicked() {
            reply = Some(Reply::SaveThen(next.clone()));
        }
        if ui.button("Do not save").clicked() {
            reply = Some(Reply::Without(next.clone()));
        }
        if ui.button("Cancel").clicked() {
            reply = Some(Reply::Cancel);
        }
    });
    reply
}

fn replace(ui: &mut Ui, palette: &Palette, purpose: Purpose, path: &std::path::Path) -> Option<Reply> {
    heading(ui, "The file exists");
    ui.label(format!("{}\nReplace it? What it holds now will be lost.", path.display()));
    ui.add_space(8.0);
    let mut reply = None;
    ui.horizontal(|ui| {
        if ui.add(strong_button(palette, "Replace")).clicked() {
            reply = Some(Reply::Use(purpose, path.to_owned()));
        }
        let cancel = ui.button("Cancel");
        first_focus(ui, &cancel);
        if cancel.clicked() {
            reply = Some(Reply::Cancel);
        }
    });
    reply
}

/// The button that a question is about.
pub fn strong_button<'a>(palette: &Palette, text: &'a str) -> Button<'a> {
    Button::new(RichText::new(text).strong()).fill(palette.accent_ground)
}

/// Gives the focus to a widget if nothing in the question has it.
pub fn first_focus(ui: &Ui, response: &eframe::egui::Response) {
    let key = Id::unique("question focus");
    let given = ui.data(|data| data.get_temp::<bool>(key)).unwrap_or(false);
    if !given {
        response.request_focus();
        ui.data_mut(|data| data.insert_temp(key, true));
    }
}

/// Lets the next question give the focus anew.
pub fn forget_focus(ctx: &Context) {
    ctx.data_mut(|data| data.remove::<bool>(Id::unique("question focus")));
}

/// Whether Enter was pressed in a text field that had the focus.
pub fn entered(ui: &Ui, response: &eframe::egui::Response) -> bool {
    response.lost_focus() && ui.input_mut(|input| input.consume_key(Modifiers::NONE, Key::Enter))
}
