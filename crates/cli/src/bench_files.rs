//! The files for the bench: the drawing and the schedule.

use std::ffi::OsStr;
use std::path::Path;

use crestline_plan::Plan;
use crestline_sheets::{Format, SheetOptions, export};

use crate::arguments::{Frame, Schedule, Sheet, drawing_format, is_standard};
use crate::commands::solved;
use crate::{Failure, Streams, files, print};

/// `sheet`: everything is worked out before the old file is touched.
pub(crate) fn sheet(options: &Sheet, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let plan_path = &options.plan.plan;
    let format = options.format.map_or_else(|| format_of(&options.output), Ok)?;
    refuse_own_plan(plan_path, &options.output)?;
    let (checked, solution) = solved(plan_path, streams)?;
    let mut chosen = framed(checked.plan(), &options.frame);
    chosen.paper = options.paper.unwrap_or(chosen.paper);
    chosen.date.clone_from(&options.date);
    print::notices(streams, &solution.report.notices);
    print::result_to(streams, &options.output, &export(format, checked.plan(), &solution, &chosen))
}

/// `schedule`
pub(crate) fn schedule(options: &Schedule, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let plan_path = &options.plan.plan;
    refuse_own_plan(plan_path, &options.output)?;
    let (checked, solution) = solved(plan_path, streams)?;
    let chosen = framed(checked.plan(), &options.frame);
    print::notices(streams, &solution.report.notices);
    print::result_to(streams, &options.output, &export(Format::Csv, checked.plan(), &solution, &chosen))
}

/// The plan's own options, with what the arguments say instead.
fn framed(plan: &Plan, frame: &Frame) -> SheetOptions {
    let own = SheetOptions::for_plan(plan);
    SheetOptions { units: frame.units.unwrap_or(own.units), datum: frame.datum.unwrap_or(own.datum), ..own }
}

/// The kind of drawing by the ending of a file's name.
fn format_of(output: &Path) -> Result<Format, Failure> {
    let ending = output.extension().and_then(OsStr::to_str).unwrap_or_default();
    drawing_format(ending).map_err(|_| {
        let advice = if is_standard(output) {
            "for standard output, name the kind with --format svg, pdf or dxf".to_owned()
        } else if ending.eq_ignore_ascii_case(Format::Csv.ending()) {
            "a drawing ends in .svg, .pdf or .dxf; the command `schedule` writes CSV".to_owned()
        } else {
            "a drawing ends in .svg, .pdf or .dxf; or name the kind with --format".to_owned()
        };
        Failure::Argument(format!("--output {}: {advice}", output.display()))
    })
}

/// A result must not take the place of the plan that it is made from.
fn refuse_own_plan(plan: &Path, output: &Path) -> Result<(), Failure> {
    if !is_standard(plan) && !is_standard(output) && files::is_same_file(plan, output) {
        return Err(Failure::Argument(format!("--output {} is the plan itself", output.display())));
    }
    Ok(())
}
