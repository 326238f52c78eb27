//! The commands that go from readings back to an instrument.

use std::path::Path;

use crestline_plan::{Checked, Priors};

use crate::arguments::{Diagnose, Supports, is_standard};
use crate::commands::{checked, refused, text_of};
use crate::{Failure, Streams, diagnosis_table, print, supports_table};

/// `diagnose`
pub(crate) fn diagnose(options: &Diagnose, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let path = &options.plan.plan;
    let checked = with_readings(path, options.readings.as_deref(), streams)?;
    let diagnosis =
        crestline_plan::diagnose(&checked, &Priors::default()).map_err(|faults| refused(path, faults))?;
    if options.json {
        print::notices(streams, &diagnosis.notices);
        return print::json(streams, &diagnosis);
    }
    print::result(streams, diagnosis_table::text(checked.plan(), &diagnosis).as_bytes())
}

/// `supports`
pub(crate) fn supports(options: &Supports, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let path = &options.plan.plan;
    let checked = with_readings(path, options.readings.as_deref(), streams)?;
    let fit =
        crestline_plan::fit_supports(&checked, &Priors::default()).map_err(|faults| refused(path, faults))?;
    if let Some(output) = &options.output {
        print::notices(streams, &fit.notices);
        let plan = crestline_plan::write(&checked.plan().with_supports(&fit));
        return print::result_to(streams, output, plan.as_bytes());
    }
    if options.json {
        print::notices(streams, &fit.notices);
        return print::json(streams, &fit);
    }
    print::result(streams, supports_table::text(&fit).as_bytes())
}

/// The plan, with the readings of another file in place of its own where one is named.
fn with_readings(
    plan: &Path,
    readings: Option<&Path>,
    streams: &mut Streams<'_>,
) -> Result<Checked, Failure> {
    let checked = checked(plan, streams)?;
    let Some(path) = readings else { return Ok(checked) };
    if is_standard(path) && is_standard(plan) {
        return Err(Failure::Argument(
            "--readings: plan and readings cannot both be on standard input".to_owned(),
        ));
    }
    let mut plan = checked.plan().clone();
    plan.readings = crestline_plan::readings_from_csv(&text_of(path, streams)?)
        .map_err(|faults| refused(path, faults))?;
    crestline_plan::check(&plan).map_err(|faults| refused(path, faults))
}
