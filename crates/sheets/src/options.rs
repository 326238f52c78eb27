//! What the user chooses about the sheets.

use crestline_plan::{Datum, Paper, Plan, Units};

use crate::LengthUnits;

/// Paper, units, datum, date and contents of the sheets.
#[derive(Debug, Clone, PartialEq)]
pub struct SheetOptions {
    /// Paper size.
    pub paper: Paper,
    /// Units of written lengths.
    pub units: LengthUnits,
    /// Where x is measured from, on the centre line.
    pub datum: Datum,
    /// The date to be written in the title block, in the user's own words; left out if absent.
    pub date: Option<String>,
    /// Which parts to draw.
    pub contents: Contents,
}

impl SheetOptions {
    /// The options that a plan asks for: its paper, units and datum, no date, all parts.
    #[must_use]
    pub fn for_plan(plan: &Plan) -> Self {
        let units = match plan.sheet.units {
            Units::Mm => LengthUnits::Millimetres,
            Units::Inch => LengthUnits::InchDecimal,
        };
        let (paper, datum) = (plan.sheet.paper, plan.sheet.datum);
        Self { paper, units, datum, date: None, contents: Contents::default() }
    }
}

/// The parts of the paper drawing.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Contents {
    /// Plan view of the saddle region with its dimensions.
    pub plan_view: bool,
    /// Plan view of the nut region; drawn only where the nut is compensated.
    pub nut_view: bool,
    /// Profile of the saddle's top, string by string.
    pub profile: bool,
    /// Tables: the schedule and the slot's ends.
    pub tables: bool,
    /// Template to cut out and glue on.
    pub template: bool,
    /// Cautions and the solution's warnings.
    pub cautions: bool,
}

impl Default for Contents {
    fn default() -> Self {
        Self { plan_view: true, nut_view: true, profile: true, tables: true, template: true, cautions: true }
    }
}
