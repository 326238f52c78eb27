//! Work that a window left behind when it ended before the plan was saved.

use std::fs::{self, File};
use std::path::{Path, PathBuf};
use std::time::{Duration, SystemTime};

use crestline_plan::Plan;

use super::autosave::whole;
use super::difference;
use super::place;
use super::slot::{self, Kept, Shelf};
use crate::shell::files;

/// A recovery file of a window that is gone, held so that no other window takes it.
#[derive(Debug)]
pub struct Found {
    /// What it holds.
    pub kept: Kept,
    /// The plan's file as it is on the disk now, where there is one that can be opened.
    pub on_disk: Option<Plan>,
    file: PathBuf,
    _held: File,
}

/// Looks for work that was left behind: of the plan file `plan_file`, or, where the window opens without one,
/// of plans never saved and of the `recent` ones.
#[must_use]
pub fn look(plan_file: Option<&Path>, state: Option<&Path>, recent: &[PathBuf]) -> Vec<Found> {
    let plans: Vec<PathBuf> = plan_file.map_or_else(|| recent.to_vec(), |path| vec![whole(path)]);
    let mut all = Vec::new();
    for plan in &plans {
        let files = Shelf::beside(plan).map(|shelf| shelf.files()).unwrap_or_default();
        all.extend(files.into_iter().filter_map(|file| held(file, Some(plan))));
    }
    let in_state = state.map(|folder| Shelf::in_state(folder).files()).unwrap_or_default();
    let wanted = |found: &Found| {
        plan_file.is_none() || found.kept.plan_file.as_deref() == plans.first().map(PathBuf::as_path)
    };
    all.extend(in_state.into_iter().filter_map(|file| held(file, None)).filter(wanted));
    all
}

/// Holds a file, if it is one and nobody works on it; one that says nothing new goes.
fn held(file: PathBuf, beside: Option<&Path>) -> Option<Found> {
    let held = slot::take_hold(&file)?;
    let mut kept = slot::parse(&place::text(&file)?)?;
    if let Some(plan_file) = beside {
        // Where it stands counts: the folder may have been moved since.
        kept.plan_file = Some(plan_file.to_owned());
    }
    let on_disk = kept.plan_file.as_deref().and_then(|path| files::open(path).ok());
    let found = Found { kept, on_disk, file, _held: held };
    if found.on_disk.as_ref() == Some(&found.kept.plan) {
        found.remove();
        return None;
    }
    Some(found)
}

impl Found {
    /// Takes the file away.
    pub fn remove(self) {
        // One that cannot be removed is found again the next time.
        let _ = fs::remove_file(&self.file);
    }

    /// What it is, in words for a question, a paragraph each.
    #[must_use]
    pub fn lines(&self) -> Vec<String> {
        let title = &self.kept.plan.title;
        let name = if title.is_empty() { "a plan without a title" } else { title };
        let Some(plan_file) = &self.kept.plan_file else {
            return vec![
                format!("The program ended while {name} was not saved in any file."),
                format!("Its last changes are {} old.", span(age(&self.file))),
            ];
        };
        let mut lines =
            vec![format!("The program ended before the last changes to {} were saved.", plan_file.display())];
        match &self.on_disk {
            None => lines.push("The file itself is missing or cannot be opened.".to_owned()),
            Some(on_disk) => {
                lines.push(newer(modified(&self.file), modified(plan_file)));
                lines.push("In the file → in the copy:".to_owned());
                lines.extend(difference::lines(on_disk, &self.kept.plan));
            }
        }
        lines
    }
}

fn modified(path: &Path) -> Option<SystemTime> {
    fs::metadata(path).and_then(|data| data.modified()).ok()
}

fn age(path: &Path) -> Duration {
    modified(path).and_then(|time| time.elapsed().ok()).unwrap_or_default()
}

fn newer(copy: Option<SystemTime>, file: Option<SystemTime>) -> String {
    let (Some(copy), Some(file)) = (copy, file) else {
        return "Which of them is newer is not known.".to_owned();
    };
    match copy.duration_since(file) {
        Ok(by) => format!("A copy was kept that is {} newer than the file.", span(by)),
        Err(error) => {
            format!("A copy was kept, but the file has been saved since, {} later.", span(error.duration()))
        }
    }
}

/// A length of time in the largest unit that it fills.
fn span(time: Duration) -> String {
    let minutes = time.as_secs() / 60;
    let (count, unit) = match minutes {
        0 => return "less than a minute".to_owned(),
        1..60 => (minutes, "minute"),
        60..1440 => (minutes / 60, "hour"),
        _ => (minutes / 1440, "day"),
    };
    format!("{count} {unit}{}", if count == 1 { "" } else { "s" })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crestline_plan::{example, read, write};

    #[test]
    fn times_are_told_in_the_unit_they_fill() {
        for (seconds, words) in
            [(59, "less than a minute"), (60, "1 minute"), (7_199, "1 hour"), (86_400 * 3, "3 days")]
        {
            assert_eq!(span(Duration::from_secs(seconds)), words);
        }
    }

    #[test]
    fn which_is_newer_is_told_both_ways() {
        let now = SystemTime::now();
        let later = now + Duration::from_secs(600);
        assert!(newer(Some(later), Some(now)).contains("10 minutes newer"));
        assert!(newer(Some(now), Some(later)).contains("saved since, 10 minutes later"));
    }

    #[test]
    fn a_copy_that_says_nothing_new_goes_and_a_broken_one_is_passed_over() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("a.json");
        let plan = read(example("steel_six").unwrap().text).unwrap();
        fs::write(&path, write(&plan)).unwrap();
        let shelf = Shelf::beside(&path).unwrap();
        drop(slot::Slot::new(&shelf, &plan, Some(&path)).unwrap());
        let broken = folder.path().join(".a.json.crestline-9.recovery");
        fs::write(&broken, "{\"format\": \"crestline-rec").unwrap();
        assert!(look(Some(&path), None, &[]).is_empty());
        assert_eq!(shelf.files(), [broken], "what cannot be read is left for whoever can");
    }

    #[test]
    fn a_window_that_still_works_keeps_its_copy_to_itself() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("a.json");
        let mut plan = read(example("steel_six").unwrap().text).unwrap();
        fs::write(&path, write(&plan)).unwrap();
        plan.instrument.relief_mm = 0.5;
        let slot = slot::Slot::new(&Shelf::beside(&path).unwrap(), &plan, Some(&path)).unwrap();
        assert!(look(Some(&path), None, &[]).is_empty());
        assert!(slot.path().exists());
        drop(slot);
        assert_eq!(look(Some(&path), None, &[]).len(), 1);
    }
}
