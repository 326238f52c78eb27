//! Opening the window, and plain words where it cannot be opened.

use std::any::Any;
use std::panic::{self, AssertUnwindSafe};
use std::path::{Path, PathBuf};
use std::process::Command;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};
use std::time::Instant;

use crestline_plan::{EXAMPLES, Plan, read_draft};
use eframe::egui::{Context, Theme, ViewportBuilder};
use eframe::{NativeOptions, Renderer};

use super::files;
use super::options::{LEAST_SIZE, Options, PaintedBy};
use super::timing::Timing;
use super::window::Window;
use crate::painter;

/// What to say where there is no window.
const INSTEAD: &str = "Without a window, the command line does the same work: see `crestline --help`, \
                       for instance `crestline solve PLAN`.";

/// Why there is no window.
enum Trouble {
    /// There is nothing to draw with but the processor.
    NoOpenGl,
    /// Something else, in words for the user.
    Other(String),
}

/// Opens the window on a plan file, or on the first example. Where there is no OpenGL the program starts itself
/// again and paints by the processor.
///
/// # Errors
/// Words for the user: the plan cannot be opened, or the window cannot.
pub fn launch(path: Option<PathBuf>) -> Result<(), String> {
    let began = Instant::now();
    let plan = first_plan(path.as_deref())?;
    display_is_there()?;
    let options = Options::read(|name| std::env::var(name).ok());
    let start = Start { plan, path, options, began };
    let outcome = match start.options.painter {
        PaintedBy::OpenGl => with_opengl(start),
        PaintedBy::Processor | PaintedBy::ProcessorInstead => with_processor(start),
    };
    match outcome {
        Ok(()) => Ok(()),
        Err(Trouble::NoOpenGl) => again(),
        Err(Trouble::Other(reason)) => Err(cannot_open(&reason)),
    }
}

fn cannot_open(reason: &str) -> String {
    format!("the window cannot be opened: {reason}\n{INSTEAD}")
}

/// Starts the program once more with the same arguments, to paint by the processor: a process can hold one
/// connection to the display's events only, and has spent it on OpenGL.
fn again() -> Result<(), String> {
    let failed = |error: std::io::Error| {
        cannot_open(&format!("there is no OpenGL, and the program cannot start itself again: {error}"))
    };
    let mut command = Command::new(std::env::current_exe().map_err(failed)?);
    command.args(std::env::args_os().skip(1)).env("CRESTLINE_PAINTER", "processor-instead");
    #[cfg(unix)]
    return Err(failed(std::os::unix::process::CommandExt::exec(&mut command)));
    #[cfg(not(unix))]
    match command.status().map_err(failed)?.success() {
        true => Ok(()),
        // It has said itself what was wrong.
        false => Err("the window was ended".to_owned()),
    }
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

/// What a window begins with.
struct Start {
    plan: Plan,
    path: Option<PathBuf>,
    options: Options,
    began: Instant,
}

impl Start {
    fn window(self, ctx: &Context) -> Window {
        ctx.options_mut(|o| o.fallback_theme = Theme::Light);
        let mut window = Window::new(ctx, self.plan, self.path, &self.options);
        window.timing = self.options.timing.then(|| Timing::new(self.began));
        if self.options.painter == PaintedBy::ProcessorInstead {
            window.view.say("There is no OpenGL here; the processor paints the window. Everything works, a little slower.");
        }
        window
    }
}

fn with_opengl(start: Start) -> Result<(), Trouble> {
    let viewport = viewport(&start.options);
    let native = NativeOptions {
        renderer: Renderer::Glow,
        viewport,
        persist_window: false,
        system_font_fallback: false,
        ..NativeOptions::default()
    };
    let open = |mark: Arc<AtomicBool>| {
        let make: eframe::AppCreator<'_> = Box::new(move |creation| {
            mark.store(true, Ordering::Relaxed);
            Ok(Box::new(start.window(&creation.egui_ctx)))
        });
        eframe::run_native("crestline", native, make).map_err(|error| trouble(&error))
    };
    guarded(open)
}

fn with_processor(start: Start) -> Result<(), Trouble> {
    let viewport = viewport(&start.options);
    let open = |mark: Arc<AtomicBool>| {
        let make = Box::new(move |ctx: &Context| {
            mark.store(true, Ordering::Relaxed);
            Box::new(start.window(ctx)) as Box<dyn painter::window::Show>
        });
        painter::window::run(viewport, make).map_err(|reason| Trouble::Other(format!("{reason}.")))
    };
    guarded(open)
}

/// Runs a window. A panic before its first frame comes from a library of the system that is missing; one
/// after it is a fault of ours and is passed on.
fn guarded(open: impl FnOnce(Arc<AtomicBool>) -> Result<(), Trouble>) -> Result<(), Trouble> {
    let opened = Arc::new(AtomicBool::new(false));
    let mark = Arc::clone(&opened);
    let hook = panic::take_hook();
    let quiet = Arc::clone(&opened);
    panic::set_hook(Box::new(move |info| {
        if quiet.load(Ordering::Relaxed) {
            hook(info);
        }
    }));
    match panic::catch_unwind(AssertUnwindSafe(|| open(mark))) {
        Ok(result) => result,
        Err(cause) if opened.load(Ordering::Relaxed) => panic::resume_unwind(cause),
        Err(cause) => Err(Trouble::Other(missing_library(cause.as_ref()))),
    }
}

fn viewport(options: &Options) -> ViewportBuilder {
    ViewportBuilder::default()
        .with_title("Crestline")
        .with_app_id("crestline")
        .with_inner_size(options.size)
        .with_min_inner_size(LEAST_SIZE)
        .with_drag_and_drop(true)
}

/// What went wrong, without the inside of the libraries.
fn trouble(error: &eframe::Error) -> Trouble {
    match error {
        eframe::Error::Winit(_) | eframe::Error::WinitEventLoop(_) => {
            let name = |variable: &str| std::env::var(variable).ok().filter(|value| !value.is_empty());
            let display = name("WAYLAND_DISPLAY").or_else(|| name("DISPLAY"));
            Trouble::Other(format!("the display {} does not answer.", display.unwrap_or_default()))
        }
        eframe::Error::Glutin(_) | eframe::Error::NoGlutinConfigs(..) | eframe::Error::OpenGL(_) => {
            Trouble::NoOpenGl
        }
        other => Trouble::Other(format!("{other}.")),
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
