//! The drawing or the schedule as the bytes of a file.

use crestline_drawing::{dxf, pdf, svg};
use crestline_plan::{Plan, Solution};

use crate::{SheetOptions, machine, schedule_csv, sheets};

/// The kinds of files that leave the program.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Format {
    /// The paper drawing, all sheets one below the other.
    Svg,
    /// The paper drawing, a page a sheet.
    Pdf,
    /// The drawing for a machine or a CAD program.
    Dxf,
    /// The schedule.
    Csv,
}

impl Format {
    /// All formats.
    pub const ALL: [Self; 4] = [Self::Svg, Self::Pdf, Self::Dxf, Self::Csv];

    /// The ending of the file's name, without a dot.
    #[must_use]
    pub const fn ending(self) -> &'static str {
        match self {
            Self::Svg => "svg",
            Self::Pdf => "pdf",
            Self::Dxf => "dxf",
            Self::Csv => "csv",
        }
    }

    /// The format of a file's ending, whatever its case; `None` for any other ending.
    #[must_use]
    pub fn of_ending(ending: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|format| format.ending().eq_ignore_ascii_case(ending))
    }
}

/// A solved plan as the bytes of a file of a format. The same input gives the same bytes.
#[must_use]
pub fn export(format: Format, plan: &Plan, solution: &Solution, options: &SheetOptions) -> Vec<u8> {
    match format {
        Format::Svg => svg(&sheets(plan, solution, options)),
        Format::Pdf => pdf(&sheets(plan, solution, options)),
        Format::Dxf => dxf(&machine(plan, solution, options)),
        Format::Csv => schedule_csv(plan, solution, options).into_bytes(),
    }
}
