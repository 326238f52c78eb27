//! Opening the window, and plain words where it cannot be opened.

use std::any::Any;
use std::panic::{self, AssertUnwindSafe};
use std::path::{Path, PathBuf};
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};
use std::time::Instant;

use crestline_plan::{EXAMPLES, Plan, read_draft};
use eframe::egui::{Theme, ViewportBuilder};
use eframe::{NativeOptions, Renderer};

use super::files;
use super::options::{LEAST_SIZE, Options};
use super::window::Window;

/// What to say where there is no window.
const INSTEAD: &str = "Without a window, the command line does the same work: see `crestline --help`, \
                       for instance `crestline solve PLAN`.";

/// Opens the window on a plan file, or on the first example.
///
/// # Errors
/// Words for the user: the plan cannot be opened, or the window cannot.
pub fn launch(path: Option<PathBuf>) -> Result<(), String> {
    let began = Instant::now();
    let plan = first_plan(path.as_deref())?;
    display_is_there()?;
    let options = Options::read(|name| std::env::var(name).ok());
    run(plan, path, options, began)
        .map_err(|reason| format!("the window cannot be opened: {reason}\n{INSTEAD}"))
}

fn first_plan(path: Option<&Path>) -> Result<Plan, String> {
    if let Some(path) = path {
        return files::open(path);
    }
    let example = EXAMPLES.first().ok_or("there is no example to open the window on")?;
    read_draft(example.text)
        .map_err(|faults| faults.iter().map(ToString::to_string).collect::<Vec<_>>().join("; "))
}

/// Looks for a display before anything else is tried, because what follows says it in fewer words.
#[cfg(target_os = "linux")]
fn display_is_there() -> Result<(), String> {
    let is_set = |name: &str| std::env::var_os(name).is_some_and(|value| !value.is_empty());
    if is_set("WAYLAND_DISPLAY") || is_set("WAYLAND_SOCKET") || is_set("DISPLAY") {
        return Ok(());
    }
    Err(format!("there is no display to open a window on.\n{INSTEAD}"))
}

#[cfg(not(target_os = "linux"))]
fn display_is_there() -> Result<(), String> {
    Ok(())
}

/// Runs the window. A panic before its first frame comes from a library of the system that is missing; one
/// after it is a fault of ours and is passed on.
fn run(plan: Plan, path: Option<PathBuf>, options: Options, began: Instant) -> Result<(), String> {
    let opened = Arc::new(AtomicBool::new(false));
    let mark = Arc::clone(&opened);
    let hook = panic::take_hook();
    let quiet = Arc::clone(&opened);
    panic::set_hook(Box::new(move |info| {
        if quiet.load(Ordering::Relaxed) {
            hook(info);
        }
    }));
    let result = panic::catch_unwind(AssertUnwindSafe(|| {
        eframe::run_native(
            "crestline",
            native(&options),
            Box::new(move |creation| {
                mark.store(true, Ordering::Relaxed);
                creation.egui_ctx.options_mut(|o| o.fallback_theme = Theme::Light);
                let mut window = Window::new(&creation.egui_ctx, plan, path, &options);
                window.tell_first_frame = options.timing.then_some(began);
                Ok(Box::new(window))
            }),
        )
    }));
    match result {
        Ok(result) => result.map_err(|error| words(&error)),
        Err(cause) if opened.load(Ordering::Relaxed) => panic::resume_unwind(cause),
        Err(cause) => Err(missing_library(cause.as_ref())),
    }
}

fn native(options: &Options) -> NativeOptions {
    NativeOptions {
        renderer: Renderer::Glow,
        viewport: ViewportBuilder::default()
            .with_title("Crestline")
            .with_app_id("crestline")
            .with_inner_size(options.size)
            .with_min_inner_size(LEAST_SIZE)
            .with_drag_and_drop(true),
        persist_window: false,
        system_font_fallback: false,
        ..NativeOptions::default()
    }
}

/// What went wrong, without the inside of the libraries.
fn words(error: &eframe::Error) -> String {
    match error {
        eframe::Error::Winit(_) | eframe::Error::WinitEventLoop(_) => {
            let name = |variable: &str| std::env::var(variable).ok().filter(|value| !value.is_empty());
            let display = name("WAYLAND_DISPLAY").or_else(|| name("DISPLAY"));
            format!("the display {} does not answer.", display.unwrap_or_default())
        }
        eframe::Error::Glutin(_) | eframe::Error::NoGlutinConfigs(..) | eframe::Error::OpenGL(_) => {
            "there is no OpenGL to draw with; a software driver, such as Mesa's, is enough.".to_owned()
        }
        other => format!("{other}."),
    }
}

/// A library of the system that panicked while the window was being made.
fn missing_library(cause: &(dyn Any + Send)) -> String {
    let said =
        cause.downcast_ref::<String>().map(String::as_str).or_else(|| cause.downcast_ref::<&str>().copied());
    let said = said.map_or_else(String::new, |said| format!(" ({said})"));
    format!(
        "a library of the system is missing or does not work{said}. Most often it is libxkbcommon-x11, in the package \
         libxkbcommon-x11-0 on Debian."
    )
}
