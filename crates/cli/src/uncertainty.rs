//! The command `uncertainty`.

use std::io::IsTerminal;
use std::ops::ControlFlow;

use crestline_plan::{Checked, Progress, Uncertainty, UncertaintyReport};

use crate::arguments::Spread;
use crate::commands::{checked, refused};
use crate::{Failure, Streams, print, uncertainty_table};

pub(crate) fn uncertainty(options: &Spread, streams: &mut Streams<'_>) -> Result<(), Failure> {
    let path = &options.plan.plan;
    let checked = checked(path, streams)?;
    if checked.plan().tolerances.is_none() {
        print::message(streams.messages, "crestline: the plan has no tolerances; the usual ones are taken");
    }
    let checked = with_options(checked, options)?;
    let refused = |faults| refused(path, faults);
    let Some(sample) = sample(&checked, streams).map_err(refused)? else { return Ok(()) };
    let shares = crestline_plan::shares(&checked).map_err(refused)?;
    let report = UncertaintyReport::new(sample, shares);
    if options.json {
        return print::json(streams, &report);
    }
    print::result(streams, uncertainty_table::text(checked.plan(), &report).as_bytes())
}

/// The plan with the options in place of what its tolerances say; the usual tolerances where it has none.
fn with_options(checked: Checked, options: &Spread) -> Result<Checked, Failure> {
    let mut plan = checked.plan().clone();
    let mut tolerances = plan.tolerances.take().unwrap_or_default();
    tolerances.samples = options.samples.unwrap_or(tolerances.samples);
    tolerances.seed = options.seed.unwrap_or(tolerances.seed);
    tolerances.limit_cents = options.limit.unwrap_or(tolerances.limit_cents);
    plan.tolerances = Some(tolerances);
    crestline_plan::check(&plan).map_err(|faults| refused(&options.plan.plan, faults))
}

/// Draws the sample and says how far it is, where someone is looking.
fn sample(
    checked: &Checked,
    streams: &mut Streams<'_>,
) -> Result<Option<Uncertainty>, Vec<crestline_plan::Fault>> {
    let watched = std::io::stderr().is_terminal();
    let result = crestline_plan::uncertainty(checked, &mut |progress| {
        if let Progress::Worked { done, of } = progress
            && watched
        {
            // A terminal that has gone is no reason to stop.
            let _ = write!(streams.messages, "\r{done} of {of} instruments");
            let _ = streams.messages.flush();
        }
        ControlFlow::Continue(())
    });
    if watched {
        let _ = write!(streams.messages, "\r\x1b[K");
    }
    result
}
