//! The window around the pages, tried without a display.

mod commands;
mod keeping;
mod pictures;

use std::path::{Path, PathBuf};

use crestline_plan::{Plan, example, read, write};
use egui_kittest::Harness;

use super::obey::obey;
use super::options::Options;
use super::window::Window;
use crate::edit::command::Command;
use crate::edit::history::Edit;

/// Frames in which the window must come to rest after each thing that is done to it.
const FRAMES: u64 = 12;

/// A window without a display.
type Opened = Harness<'static, Window>;

fn steel_six() -> Plan {
    read(example("steel_six").unwrap().text).unwrap()
}

/// A folder with a saved plan.
fn saved() -> (tempfile::TempDir, PathBuf) {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("a.json");
    std::fs::write(&path, write(&steel_six())).unwrap();
    (folder, path)
}

/// A window on a plan, with a state folder or none.
fn open(plan: Plan, path: Option<&Path>, state: Option<&Path>) -> Opened {
    let state = state.and_then(Path::to_str).map(str::to_owned);
    let options = Options::read(|name| state.clone().filter(|_| name == crate::keep::place::VARIABLE));
    let path = path.map(Path::to_owned);
    let builder = Harness::builder().with_size([1280.0, 800.0]).with_max_steps(FRAMES);
    let mut opened =
        builder.build_eframe(move |creation| Window::new(&creation.egui_ctx, plan, path, &options));
    opened.run();
    opened
}

fn order(opened: &mut Opened, command: Command) {
    let ctx = opened.ctx.clone();
    obey(opened.state_mut(), &ctx, command);
    opened.run();
}

fn change_relief(opened: &mut Opened, relief_mm: f64) {
    let desk = &mut opened.state_mut().desk;
    desk.plan.instrument.relief_mm = relief_mm;
    desk.settle(&Edit::whole("Relief"));
    opened.run();
}
