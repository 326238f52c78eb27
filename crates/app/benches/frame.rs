//! The frame's own work on every page with the largest legal plan: what the window and egui do between the events and
//! the shapes, and then what turns the shapes into triangles. Painting is the driver's.
//!
//! Frames are steady ones: what is worked out beside the window has come in.
#![allow(clippy::unwrap_used, missing_docs)]

use std::thread::sleep;
use std::time::Duration;

use crestline_plan::{
    Alternative, OtherStrings, Pitch, Plan, Reading, ReadingKind, Tolerances, check, example, read,
};
use crestline_window::shell::options::Options;
use crestline_window::shell::window::Window;
use crestline_window::view::Page;
use criterion::{Criterion, criterion_group, criterion_main};
use eframe::egui::{Context, FullOutput, Pos2, RawInput, Rect, Vec2};

/// The most of everything that a plan may have; the table of the readings is full.
const STRINGS: usize = 16;
const FRETS: u32 = 36;
const ALTERNATIVES: usize = 12;

/// Size of the window, points.
const SIZE: Vec2 = Vec2::new(1920.0, 1080.0);

fn largest() -> Plan {
    let mut plan = read(example("steel_six").unwrap().text).unwrap();
    plan.strings = plan.strings.iter().cycle().take(STRINGS).cloned().collect();
    plan.instrument.frets = FRETS;
    plan.fit.frets = [1, FRETS];
    plan.tolerances = Some(Tolerances::default());
    plan.alternatives = (0..ALTERNATIVES)
        .map(|index| {
            let mut pitches = vec![None; STRINGS];
            pitches[index] = Some(Pitch::Note("A3".to_owned()));
            Alternative::new(&format!("tuning {index}"), OtherStrings::Pitches(pitches))
        })
        .collect();
    let one = |string, kind, fret| Reading { string, fret, kind, cents: 0.2 * f64::from(fret) };
    plan.readings = (1..=STRINGS as u32)
        .flat_map(|string| {
            let open = one(string, ReadingKind::Open, 0);
            let frets = (1..=FRETS).map(move |fret| one(string, ReadingKind::Fretted, fret));
            [open, one(string, ReadingKind::OctaveHarmonic, 12)].into_iter().chain(frets)
        })
        .collect();
    check(&plan).unwrap();
    plan
}

/// The window without a display.
struct Opened {
    ctx: Context,
    window: Window,
    time_s: f64,
}

impl Opened {
    /// The window as it opens, or with all groups of the inputs unfolded.
    fn on(plan: &Plan, page: Page, unfolded: bool) -> Self {
        let ctx = Context::default();
        let mut window = Window::new(&ctx, plan.clone(), None, &Options::read(|_| None));
        window.view.page = page;
        if unfolded {
            window.view.folded.clear();
            window.view.trust.shows_tolerances = true;
            window.view.repair.shows_priors = true;
        }
        let mut opened = Self { ctx, window, time_s: 0.0 };
        opened.come_to_rest(page);
        opened
    }

    fn frame(&mut self) -> FullOutput {
        self.time_s += 1.0 / 60.0;
        let screen_rect = Some(Rect::from_min_size(Pos2::ZERO, SIZE));
        let input = RawInput { screen_rect, time: Some(self.time_s), focused: true, ..RawInput::default() };
        let mut output = self.ctx.run_ui(input, |ui| self.window.frame(ui));
        // Nothing is painted, so nobody wants the letters.
        output.textures_delta.clear();
        output
    }

    fn is_done(&self, page: Page) -> bool {
        let view = &self.window.view;
        match page {
            Page::Compare => !view.study.is_working(),
            Page::Saddle | Page::FrettedNotes => !view.trust.sampling.is_working(),
            Page::HowSure => view.trust.sampling.shares().is_some(),
            Page::Diagnosis => !view.repair.inquiry.is_working(),
            Page::Sheets | Page::Help => true,
        }
    }

    /// Frames until the work beside the window is done, and as many more as sizes need to settle.
    fn come_to_rest(&mut self, page: Page) {
        const SETTLING: usize = 8;
        self.frame();
        while !self.is_done(page) {
            sleep(Duration::from_millis(50));
            self.frame();
        }
        (0..SETTLING).for_each(|_| drop(self.frame()));
    }
}

fn frames(criterion: &mut Criterion) {
    let plan = largest();
    for (page, unfolded) in Page::ALL.into_iter().flat_map(|page| [(page, false), (page, true)]) {
        let mut opened = Opened::on(&plan, page, unfolded);
        let state = if unfolded { "all unfolded" } else { "as it opens" };
        let mut group = criterion.benchmark_group(format!("frame, {}, {state}", page.name()));
        group.bench_function("window and layout", |bench| bench.iter(|| opened.frame()));
        let shapes = opened.frame().shapes;
        group.bench_function("tessellation", |bench| {
            bench.iter_batched(
                || shapes.clone(),
                |shapes| opened.ctx.tessellate(shapes, 1.0),
                criterion::BatchSize::SmallInput,
            );
        });
        group.finish();
    }
}

criterion_group!(benches, frames);
criterion_main!(benches);
