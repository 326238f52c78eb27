//! What the tests of the window share.
#![allow(dead_code, clippy::unwrap_used)]

use std::path::PathBuf;

use crestline_plan::{Plan, example, read};
use crestline_window::edit::command::Command;
use crestline_window::shell::obey::obey;
use crestline_window::shell::options::Options;
use crestline_window::shell::window::Window;
use eframe::egui::accesskit::Role;
use eframe::egui::{Key, Modifiers};
use egui_kittest::kittest::Queryable;
use egui_kittest::{Harness, Node};

/// Frames in which the window must come to rest after each thing that is done to it.
pub const FRAMES: u64 = 12;

/// The window in a test.
pub type Opened = Harness<'static, Window>;

/// The example that the window opens on.
pub fn steel_six() -> Plan {
    read(example("steel_six").unwrap().text).unwrap()
}

/// The window on a plan, at rest.
pub fn open(plan: Plan, path: Option<PathBuf>) -> Opened {
    let builder = Harness::builder().with_size([1280.0, 800.0]).with_max_steps(FRAMES);
    let mut opened = builder
        .build_eframe(move |creation| Window::new(&creation.egui_ctx, plan, path, &Options::read(|_| None)));
    opened.run();
    opened
}

/// The field with this name: some stand both in the table and in the editor below, and the first is taken.
pub fn field<'a>(opened: &'a Opened, name: &'a str) -> Node<'a> {
    opened.get_all_by_role_and_label(Role::TextInput, name).next().unwrap()
}

/// Replaces the text of a field as a hand would.
pub fn type_into(opened: &mut Opened, name: &str, text: &str) {
    field(opened, name).focus();
    opened.run();
    opened.key_press_modifiers(Modifiers::COMMAND, Key::A);
    opened.run();
    field(opened, name).type_text(text);
    opened.run();
}

/// Does what a command says.
pub fn order(opened: &mut Opened, command: Command) {
    let ctx = opened.ctx.clone();
    obey(opened.state_mut(), &ctx, command);
    opened.run();
}

/// The plan on the desk.
pub fn plan(opened: &Opened) -> &Plan {
    &opened.state().desk.plan
}

/// How many things in the window say these words.
pub fn says(opened: &Opened, words: &str) -> usize {
    opened.query_all_by_label_contains(words).count()
}
