//! The work in a thread of its own: a sample, or its shares.

use std::ops::ControlFlow;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};
use std::sync::mpsc::{Receiver, Sender, channel};
use std::thread;
use std::time::Duration;

use crestline_plan::{Fault, Plan, Progress, Shares, Uncertainty, check, shares, uncertainty};
use eframe::egui::Context;

/// How long the window rests before it is woken to show how far the work has come.
const BETWEEN_LOOKS: Duration = Duration::from_millis(100);

/// What is to be worked out.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Step {
    /// The sample.
    Sample,
    /// The shares of its inputs.
    Shares,
}

/// What the work sends to the window.
pub enum News {
    /// So many instruments of the sample are done, of so many.
    Worked(u32, u32),
    /// An answer that will be sharper yet.
    Sharper(Uncertainty),
    /// The whole sample.
    Sampled(Result<Uncertainty, Vec<Fault>>),
    /// The shares.
    Shared(Result<Shares, Vec<Fault>>),
}

/// Work that is going on.
#[derive(Debug)]
pub struct Work {
    /// The plan that it is about.
    pub plan: Plan,
    /// What is being worked out.
    pub step: Step,
    /// What has been found.
    pub news: Receiver<News>,
    /// Instruments done and wanted.
    pub done_of: [u32; 2],
    stop: Arc<AtomicBool>,
}

impl Work {
    /// Begins it; none where the system gives no thread.
    pub fn begin(ctx: &Context, plan: Plan, step: Step) -> Option<Self> {
        let (sender, news) = channel();
        let stop = Arc::new(AtomicBool::new(false));
        let (theirs, asked, ctx) = (Arc::clone(&stop), plan.clone(), ctx.clone());
        let work = move || {
            match step {
                Step::Sample => sample(&asked, &sender, &theirs, &ctx),
                Step::Shares => {
                    let found = check(&asked).and_then(|checked| shares(&checked));
                    // Nobody needs it any more where the window has gone.
                    let _ = sender.send(News::Shared(found));
                }
            }
            // The window is to find the end of the work when it wakes.
            drop(sender);
            ctx.request_repaint();
        };
        thread::Builder::new().name("uncertainty".into()).spawn(work).ok()?;
        Some(Self { plan, step, news, done_of: [0, 0], stop })
    }

    /// Asks it to end; it does so before the next instruments.
    pub fn stop(&self) {
        self.stop.store(true, Ordering::Relaxed);
    }
}

/// Works the sample out and sends on what it says while it grows.
fn sample(plan: &Plan, news: &Sender<News>, stop: &AtomicBool, ctx: &Context) {
    let mut watch = |progress: Progress<'_>| {
        let what = match progress {
            Progress::Worked { done, of } => News::Worked(done, of),
            Progress::Sharper(found) => News::Sharper(found.clone()),
        };
        if stop.load(Ordering::Relaxed) || news.send(what).is_err() {
            return ControlFlow::Break(());
        }
        // The earliest wish counts, so the window looks no oftener than this.
        ctx.request_repaint_after(BETWEEN_LOOKS);
        ControlFlow::Continue(())
    };
    let found = check(plan).and_then(|checked| uncertainty(&checked, &mut watch));
    if let Some(whole) = found.transpose() {
        // Nobody needs it any more where the window has gone.
        let _ = news.send(News::Sampled(whole));
    }
}
