//! The system's file dialogs, off the window's thread.
//!
//! A dialog service that fails looks the same as a user who cancels, and one that hangs never answers.
//! So it is asked only where there is one, an answer that comes too fast for a hand counts as a failure, and
//! the window offers its own path field while it waits.

use std::future::Future;
use std::path::{Path, PathBuf};
use std::pin::Pin;
use std::sync::Arc;
use std::sync::mpsc::{Receiver, TryRecvError, channel};
use std::task::{Context, Poll, Wake, Waker};
use std::thread::{self, Thread};
use std::time::{Duration, Instant};

use crestline_sheets::Format;
use eframe::egui;

/// No hand closes a dialog this soon after it was asked for.
const FASTEST_HAND: Duration = Duration::from_millis(400);

/// What a path is wanted for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Purpose {
    /// To open a plan.
    Open,
    /// To save the plan.
    Save,
    /// To write the drawing or the schedule.
    Write(Format),
    /// To take readings from a table.
    Readings,
}

impl Purpose {
    /// The title of the dialog.
    #[must_use]
    pub fn title(self) -> &'static str {
        match self {
            Self::Open => "Open a plan",
            Self::Save => "Save the plan as",
            Self::Write(Format::Csv) => "Write the schedule to",
            Self::Write(_) => "Write the drawing to",
            Self::Readings => "Take readings from",
        }
    }

    /// The word for the button that does it.
    #[must_use]
    pub fn verb(self) -> &'static str {
        match self {
            Self::Open => "Open",
            Self::Save => "Save",
            Self::Write(_) => "Write",
            Self::Readings => "Take",
        }
    }

    /// The ending of the files that it is about.
    #[must_use]
    pub fn ending(self) -> &'static str {
        match self {
            Self::Open | Self::Save => super::files::PLAN_ENDING,
            Self::Write(format) => format.ending(),
            Self::Readings => super::readings::READINGS_ENDING,
        }
    }

    /// The ending that a new file gets.
    #[must_use]
    pub fn new_ending(self) -> &'static str {
        match self {
            Self::Save => super::files::NEW_PLAN_ENDING,
            other => other.ending(),
        }
    }

    /// Whether a file is written, not read.
    #[must_use]
    pub fn writes(self) -> bool {
        matches!(self, Self::Save | Self::Write(_))
    }
}

/// What came of a dialog.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Answer {
    /// A path.
    Path(PathBuf),
    /// The user closed the dialog.
    Cancelled,
    /// No dialog came up.
    NoService,
}

/// A dialog that is open.
#[derive(Debug)]
pub struct Picker {
    /// What it asks for.
    pub purpose: Purpose,
    answers: Receiver<Option<PathBuf>>,
    since: Instant,
}

impl Picker {
    /// Opens a dialog; none where no service could answer.
    #[must_use]
    pub fn open(ctx: &egui::Context, purpose: Purpose, suggested: &Path) -> Option<Self> {
        if !service_may_answer() {
            return None;
        }
        // The future is made on the window's thread, as some systems want it, and waited for on another.
        let future = ask(purpose, suggested);
        let (sender, answers) = channel();
        let ctx = ctx.clone();
        let waiting = move || {
            // The window may have gone by then; nobody needs the answer any more.
            let _ = sender.send(wait_for(future));
            ctx.request_repaint();
        };
        let thread = thread::Builder::new().name("file dialog".into()).spawn(waiting);
        thread.is_ok().then(|| Self { purpose, answers, since: Instant::now() })
    }

    /// The answer, once there is one.
    #[must_use]
    pub fn answer(&self) -> Option<Answer> {
        match self.answers.try_recv() {
            Ok(Some(path)) => Some(Answer::Path(path)),
            Ok(None) if self.since.elapsed() < FASTEST_HAND => Some(Answer::NoService),
            Ok(None) => Some(Answer::Cancelled),
            Err(TryRecvError::Disconnected) => Some(Answer::NoService),
            Err(TryRecvError::Empty) => None,
        }
    }
}

type Asking = Pin<Box<dyn Future<Output = Option<PathBuf>> + Send>>;

fn ask(purpose: Purpose, suggested: &Path) -> Asking {
    let mut dialog = rfd::AsyncFileDialog::new().set_title(purpose.title());
    dialog = match purpose {
        Purpose::Open | Purpose::Save => dialog.add_filter("Plans", &[super::files::PLAN_ENDING]),
        Purpose::Readings => dialog.add_filter("Readings", &[purpose.ending()]),
        Purpose::Write(format) => dialog.add_filter(format.ending().to_uppercase(), &[format.ending()]),
    };
    if let Some(folder) = suggested.parent().filter(|folder| folder.is_dir()) {
        dialog = dialog.set_directory(folder);
    }
    if let (Purpose::Save | Purpose::Write(_), Some(name)) = (purpose, suggested.file_name()) {
        dialog = dialog.set_file_name(name.to_string_lossy());
    }
    match purpose {
        Purpose::Open | Purpose::Readings => {
            let picked = dialog.pick_file();
            Box::pin(async { picked.await.map(|file| file.path().to_owned()) })
        }
        Purpose::Save | Purpose::Write(_) => {
            let picked = dialog.save_file();
            Box::pin(async { picked.await.map(|file| file.path().to_owned()) })
        }
    }
}

/// Whether there is anything that could show a dialog: a session bus with its portal, or the program `zenity`.
#[cfg(target_os = "linux")]
fn service_may_answer() -> bool {
    let is_set = |name: &str| std::env::var_os(name).is_some_and(|value| !value.is_empty());
    let runtime_bus =
        std::env::var_os("XDG_RUNTIME_DIR").is_some_and(|folder| Path::new(&folder).join("bus").exists());
    let zenity = std::env::var_os("PATH")
        .is_some_and(|paths| std::env::split_paths(&paths).any(|folder| folder.join("zenity").is_file()));
    is_set("DBUS_SESSION_BUS_ADDRESS") || runtime_bus || zenity
}

/// The other systems bring their dialogs along.
#[cfg(not(target_os = "linux"))]
fn service_may_answer() -> bool {
    true
}

/// Wakes the thread that waits for a future.
struct Unpark(Thread);

impl Wake for Unpark {
    fn wake(self: Arc<Self>) {
        self.0.unpark();
    }
}

/// Waits on this thread until the future is ready.
fn wait_for<T>(mut future: Pin<Box<dyn Future<Output = T> + Send>>) -> T {
    let waker = Waker::from(Arc::new(Unpark(thread::current())));
    let mut context = Context::from_waker(&waker);
    loop {
        match future.as_mut().poll(&mut context) {
            Poll::Ready(value) => return value,
            Poll::Pending => thread::park(),
        }
    }
}
