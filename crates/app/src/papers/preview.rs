//! What is shown of the sheets: which one, how large, and the drawing itself, laid out anew only when it changes.

use crestline_drawing::{Drawing, Primitive};
use crestline_plan::{Plan, Units};
use crestline_sheets::{Contents, LengthUnits, SheetOptions, sheets};

use crate::edit::desk::Outcome;

/// Longest text of the date.
pub const DATE_LENGTH: usize = 40;
/// Points to the millimetre on a screen that says nothing else: 96 points to the inch.
const POINTS_PER_MM: f32 = 96.0 / 25.4;
/// The largest and smallest magnification of a sheet.
const MAGNIFICATION: [f32; 2] = [0.1, 8.0];
/// One step of the zoom.
const STEP: f32 = 1.25;

/// How large a sheet is shown.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub enum Magnification {
    /// The whole sheet.
    #[default]
    Whole,
    /// So many times its true size.
    Times(f32),
}

/// The drawing with what it was laid out from.
#[derive(Debug)]
struct LaidOut {
    plan: Plan,
    options: SheetOptions,
    drawing: Drawing,
    primitives: Vec<Vec<Primitive>>,
}

/// The state of the page.
#[derive(Debug)]
pub struct Preview {
    /// The sheet that is shown, 0 first.
    pub sheet: usize,
    /// How large.
    pub magnification: Magnification,
    /// How many times its true size it was last shown.
    pub shown: f32,
    /// What 100 mm of a sheet at its true size measure on this screen, mm.
    pub measured_mm: f64,
    /// The date for the title block; none where it is empty.
    pub date: String,
    /// Inches as fractions.
    pub fractions: bool,
    /// The parts to draw.
    pub contents: Contents,
    laid_out: Option<LaidOut>,
}

impl Default for Preview {
    fn default() -> Self {
        Self {
            sheet: 0,
            magnification: Magnification::default(),
            shown: 1.0,
            measured_mm: 100.0,
            date: String::new(),
            fractions: false,
            contents: Contents::default(),
            laid_out: None,
        }
    }
}

impl Preview {
    /// The options of the drawing: the plan's own paper, units and datum, and what is chosen on the page.
    #[must_use]
    pub fn options(&self, plan: &Plan) -> SheetOptions {
        let mut options = SheetOptions::for_plan(plan);
        if plan.sheet.units == Units::Inch && self.fractions {
            options.units = LengthUnits::InchFraction;
        }
        let date = self.date.trim();
        options.date = (!date.is_empty()).then(|| date.to_owned());
        options.contents = self.contents;
        options
    }

    /// The drawing of a result, and the marks of every sheet.
    pub fn drawing(&mut self, outcome: &Outcome) -> (&Drawing, &[Vec<Primitive>]) {
        let options = self.options(&outcome.plan);
        let laid_out = match self.laid_out.take() {
            Some(old) if old.plan == outcome.plan && old.options == options => old,
            _ => {
                let drawing = sheets(&outcome.plan, &outcome.solution, &options);
                let primitives = drawing.sheets.iter().map(|sheet| sheet.primitives()).collect();
                LaidOut { plan: outcome.plan.clone(), options, drawing, primitives }
            }
        };
        self.sheet = self.sheet.min(laid_out.drawing.sheets.len().saturating_sub(1));
        let laid_out = self.laid_out.insert(laid_out);
        (&laid_out.drawing, &laid_out.primitives)
    }

    /// Points to the millimetre at true size on this screen, as far as it is known.
    #[must_use]
    pub fn true_size(&self) -> f32 {
        POINTS_PER_MM * (100.0 / self.measured_mm.clamp(20.0, 500.0)) as f32
    }

    /// Makes the sheet larger by some steps than it is now, or smaller where they are negative.
    pub fn zoom(&mut self, steps: i32) {
        let [least, most] = MAGNIFICATION;
        self.magnification = Magnification::Times((self.shown * STEP.powi(steps)).clamp(least, most));
    }
}
