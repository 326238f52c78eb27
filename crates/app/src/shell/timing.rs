//! What is told on standard error to those who measure the window.

use std::io::Write;
use std::time::Instant;

use eframe::egui::Context;

/// After so many steps their number is told again.
const EVERY: u64 = 100;

/// Frames and steps since the window opened.
#[derive(Debug)]
pub struct Timing {
    began: Instant,
    frames: u64,
    told: u64,
}

impl Timing {
    /// Tells from now on; the first frame has been waited for since `began`.
    #[must_use]
    pub fn new(began: Instant) -> Self {
        Self { began, frames: 0, told: 0 }
    }

    /// Counts a frame. The time to the first is told at the beginning of the second, when the first has been painted;
    /// `steps` is how many there have been.
    pub fn frame(&mut self, ctx: &Context, steps: u64) {
        self.frames += 1;
        match self.frames {
            1 => ctx.request_repaint(),
            2 => tell(&format!("first frame after {:.3} s", self.began.elapsed().as_secs_f64())),
            _ => {}
        }
        if steps >= self.told + EVERY {
            self.told = steps - steps % EVERY;
            tell(&format!("{steps} steps in {} frames", self.frames));
        }
    }
}

fn tell(words: &str) {
    // Whoever asked for it has closed standard error where this fails.
    let _ = writeln!(std::io::stderr(), "{words}");
}
