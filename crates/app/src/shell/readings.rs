//! Commands on the readings: from a file, from a pasted block, and the instrument found taken into the plan.

use std::path::Path;

use crestline_cli::files::read_plan_text;
use crestline_plan::{Fault, Plan, Reading, check, fitted_plan, readings_from_csv};

use super::window::Window;
use crate::edit::history::Edit;
use crate::repair::block::Filling;
use crate::repair::grid::pasted_words;
use crate::view::Page;

/// Ending of files with readings.
pub const READINGS_ENDING: &str = "csv";

/// Puts a pasted block into the plan.
pub fn fill(window: &mut Window, filling: &Filling) {
    for (place, cents) in &filling.cells {
        place.put(&mut window.desk.plan.readings, *cents);
    }
    window.desk.settle(&Edit::whole("Paste readings"));
    window.view.drafts.clear();
    window.view.say(pasted_words(filling));
}

/// Takes the readings of a file in place of those that the plan has.
pub fn import(window: &mut Window, path: &Path) {
    match read(path, &window.desk.plan) {
        Ok(readings) => {
            let (count, before) = (readings.len(), window.desk.plan.readings.len());
            window.desk.plan.readings = readings;
            window.desk.settle(&Edit::whole("Import readings"));
            window.view.drafts.clear();
            window.view.page = Page::Diagnosis;
            let instead = if before > 0 { format!(" in place of {before}") } else { String::new() };
            window.view.say(format!("{count} readings taken from {}{instead}", path.display()));
        }
        Err(words) => window.view.complain(words),
    }
}

/// The readings of a file, if they fit the plan.
fn read(path: &Path, plan: &Plan) -> Result<Vec<Reading>, String> {
    let text = read_plan_text(path).map_err(|failure| failure.to_string())?;
    let refused = |faults: &[Fault]| {
        let first = faults.first().map(ToString::to_string).unwrap_or_default();
        let more = if faults.len() > 1 { format!(" (and {} more)", faults.len() - 1) } else { String::new() };
        format!("No readings were taken from {}. {first}{more}", path.display())
    };
    let readings = readings_from_csv(&text).map_err(|faults| refused(&faults))?;
    let tried = Plan { readings, ..plan.clone() };
    let mut faults = check(&tried).err().unwrap_or_default();
    faults.retain(|fault| fault.path.starts_with("readings"));
    if faults.is_empty() { Ok(tried.readings) } else { Err(refused(&faults)) }
}

/// Takes the instrument found into the plan, from which the new saddle is then laid out.
pub fn take_fitted(window: &mut Window) {
    let repair = &window.view.repair;
    let diagnosis = repair.inquiry.diagnosis_of(&window.desk.plan, &repair.priors);
    let (Some(diagnosis), Ok(checked)) = (diagnosis, check(&window.desk.plan)) else {
        window.view.complain(
            "The instrument is not taken into the plan before the diagnosis of these readings is there.",
        );
        return;
    };
    window.desk.plan = fitted_plan(&checked, &diagnosis);
    window.desk.settle(&Edit::whole("Take the fitted instrument"));
    window.view.drafts.clear();
    window.view.say("The instrument as found is in the plan. The page Saddle lays out its new saddle.");
}
