//! One recovery file: a plan that is not saved yet, with the file that it belongs to.
//!
//! A window holds a lock on its recovery file from before the file gets its name until the window ends,
//! however it ends; so another window can tell work that is being done from work that was left behind, and
//! never takes the former. The file is replaced whole or not at all, as a plan is.

use std::fs::{self, File, TryLockError};
use std::io::{self, Write};
use std::path::{Path, PathBuf};

use crestline_plan::Plan;
use serde_json::{Value, json};
use tempfile::{Builder, NamedTempFile};

const FORMAT: &str = "crestline-recovery";
const VERSION: u64 = 1;
const ENDING: &str = ".recovery";
/// So many windows may keep work of one plan in one folder.
const MOST_SLOTS: u32 = 64;

/// Where a plan's recovery files stand: beside its file, or in the state folder.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Shelf {
    folder: PathBuf,
    stem: String,
}

impl Shelf {
    /// Beside a plan file, hidden, under the plan's name.
    #[must_use]
    pub fn beside(plan_file: &Path) -> Option<Self> {
        let name = plan_file.file_name()?.to_string_lossy();
        let folder = plan_file.parent()?.to_owned();
        Some(Self { folder, stem: format!(".{name}.crestline-") })
    }

    /// In the state folder: for plans without a file, and for those beside which nothing can be written.
    #[must_use]
    pub fn in_state(folder: &Path) -> Self {
        Self { folder: folder.join("recovery"), stem: "plan-".to_owned() }
    }

    fn path(&self, number: u32) -> PathBuf {
        self.folder.join(format!("{}{number}{ENDING}", self.stem))
    }

    /// The recovery files that stand here, of whatever window.
    #[must_use]
    pub fn files(&self) -> Vec<PathBuf> {
        let Ok(entries) = fs::read_dir(&self.folder) else { return Vec::new() };
        let is_ours = |path: &PathBuf| {
            let name = path.file_name().map(|name| name.to_string_lossy().into_owned()).unwrap_or_default();
            let number = name.strip_prefix(&self.stem).and_then(|rest| rest.strip_suffix(ENDING));
            number.is_some_and(|number| number.parse::<u32>().is_ok())
        };
        let mut files: Vec<PathBuf> = entries.flatten().map(|entry| entry.path()).filter(is_ours).collect();
        files.sort();
        files
    }
}

/// A recovery file that this window has written and holds.
#[derive(Debug)]
pub struct Slot {
    path: PathBuf,
    /// Held for its lock alone, which goes with it.
    _held: File,
}

impl Slot {
    /// Writes a plan to a recovery file that nobody else uses.
    ///
    /// # Errors
    /// What the system said: no such folder, no room, a folder that may only be read.
    pub fn new(shelf: &Shelf, plan: &Plan, plan_file: Option<&Path>) -> io::Result<Self> {
        let mut new = written(&shelf.folder, plan, plan_file)?;
        for number in 1..=MOST_SLOTS {
            let path = shelf.path(number);
            match new.persist_noclobber(&path) {
                Ok(held) => return Ok(Self { path, _held: held }),
                Err(error) if error.error.kind() == io::ErrorKind::AlreadyExists => new = error.file,
                Err(error) => return Err(error.error),
            }
        }
        Err(io::Error::other("too many recovery files stand there already"))
    }

    /// Puts another state of the plan in its place.
    ///
    /// # Errors
    /// What the system said; the state before is then still there.
    pub fn rewrite(&mut self, plan: &Plan, plan_file: Option<&Path>) -> io::Result<()> {
        let folder = self.path.parent().unwrap_or(Path::new("."));
        let new = written(folder, plan, plan_file)?;
        self._held = new.persist(&self.path).map_err(|error| error.error)?;
        Ok(())
    }

    /// Takes the file away, because the work is saved or not wanted.
    pub fn remove(self) {
        // One that cannot be removed is found again, and offered, the next time.
        let _ = fs::remove_file(&self.path);
    }

    /// Where it stands.
    #[must_use]
    pub fn path(&self) -> &Path {
        &self.path
    }
}

/// A temporary file with the plan in it, on the disk and locked.
fn written(folder: &Path, plan: &Plan, plan_file: Option<&Path>) -> io::Result<NamedTempFile> {
    let mut new = Builder::new().prefix(".crestline-").suffix(".tmp").tempfile_in(folder)?;
    new.write_all(content(plan, plan_file).as_bytes())?;
    new.as_file().sync_data()?;
    match new.as_file().try_lock() {
        // Some network folders know no locks; the work is kept there all the same.
        Ok(()) | Err(TryLockError::Error(_)) => Ok(new),
        Err(TryLockError::WouldBlock) => Err(io::Error::other("the new file is locked by another program")),
    }
}

fn content(plan: &Plan, plan_file: Option<&Path>) -> String {
    let plan: Value = serde_json::from_str(&crestline_plan::write(plan)).unwrap_or_default();
    let plan_file = plan_file.map(|path| path.to_string_lossy());
    let whole = json!({ "format": FORMAT, "version": VERSION, "plan_file": plan_file, "plan": plan });
    format!("{whole:#}\n")
}

/// What stands in a recovery file.
#[derive(Debug, Clone, PartialEq)]
pub struct Kept {
    /// The file that the plan belongs to, where it has one.
    pub plan_file: Option<PathBuf>,
    /// The plan.
    pub plan: Plan,
}

/// Reads the text of a recovery file; none where it is not one.
#[must_use]
pub fn parse(text: &str) -> Option<Kept> {
    let whole: Value = serde_json::from_str(text).ok()?;
    if whole.get("format")?.as_str()? != FORMAT || whole.get("version")?.as_u64()? != VERSION {
        return None;
    }
    let plan_file = whole.get("plan_file").and_then(Value::as_str).map(PathBuf::from);
    let plan = crestline_plan::read_draft(&whole.get("plan")?.to_string()).ok()?;
    Some(Kept { plan_file, plan })
}

/// Holds a recovery file that was left behind, if no window works on it any more.
#[must_use]
pub fn take_hold(path: &Path) -> Option<File> {
    let file = File::open(path).ok()?;
    if let Err(TryLockError::WouldBlock) = file.try_lock() {
        return None;
    }
    // Its window may have put another file in its place in between, and holds that one.
    is_still_at(&file, path).then_some(file)
}

#[cfg(unix)]
fn is_still_at(file: &File, path: &Path) -> bool {
    use std::os::unix::fs::MetadataExt;
    let same = |a: &fs::Metadata, b: &fs::Metadata| (a.dev(), a.ino()) == (b.dev(), b.ino());
    matches!((file.metadata(), fs::metadata(path)), (Ok(a), Ok(b)) if same(&a, &b))
}

/// Elsewhere a locked file cannot be replaced under its name.
#[cfg(not(unix))]
fn is_still_at(_file: &File, path: &Path) -> bool {
    path.exists()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crestline_plan::{example, read};

    fn plan(relief_mm: f64) -> Plan {
        let mut plan = read(example("steel_six").unwrap().text).unwrap();
        plan.instrument.relief_mm = relief_mm;
        plan
    }

    fn read_slot(path: &Path) -> Kept {
        parse(&fs::read_to_string(path).unwrap()).unwrap()
    }

    #[test]
    fn a_plan_comes_back_as_it_was_even_a_wrong_one() {
        let folder = tempfile::tempdir().unwrap();
        let file = folder.path().join("a.json");
        let shelf = Shelf::beside(&file).unwrap();
        let slot = Slot::new(&shelf, &plan(-4.0), Some(&file)).unwrap();
        assert_eq!(read_slot(slot.path()), Kept { plan_file: Some(file), plan: plan(-4.0) });
    }

    #[test]
    fn two_windows_on_one_plan_keep_their_own_files() {
        let folder = tempfile::tempdir().unwrap();
        let shelf = Shelf::beside(&folder.path().join("a.json")).unwrap();
        let mut first = Slot::new(&shelf, &plan(0.1), None).unwrap();
        let mut second = Slot::new(&shelf, &plan(0.2), None).unwrap();
        assert_ne!(first.path(), second.path());
        first.rewrite(&plan(0.3), None).unwrap();
        second.rewrite(&plan(0.4), None).unwrap();
        assert_eq!(read_slot(first.path()).plan, plan(0.3));
        assert_eq!(read_slot(second.path()).plan, plan(0.4));
        first.remove();
        assert_eq!(shelf.files(), [second.path()]);
        assert_eq!(read_slot(second.path()).plan, plan(0.4));
    }

    #[test]
    fn a_file_is_held_as_long_as_its_window_lives_and_free_afterwards() {
        let folder = tempfile::tempdir().unwrap();
        let shelf = Shelf::in_state(folder.path());
        fs::create_dir(folder.path().join("recovery")).unwrap();
        let mut slot = Slot::new(&shelf, &plan(0.1), None).unwrap();
        let path = slot.path().to_owned();
        assert!(take_hold(&path).is_none());
        slot.rewrite(&plan(0.2), None).unwrap();
        assert!(take_hold(&path).is_none(), "also after it was put in place anew");
        drop(slot);
        let held = take_hold(&path).unwrap();
        assert!(take_hold(&path).is_none(), "and one window alone takes it over");
        drop(held);
    }

    #[test]
    fn other_files_are_no_recovery_files() {
        let folder = tempfile::tempdir().unwrap();
        for name in [".a.json.crestline-x.recovery", "a.json", ".b.json.crestline-1.recovery"] {
            fs::write(folder.path().join(name), "{}").unwrap();
        }
        let shelf = Shelf::beside(&folder.path().join("a.json")).unwrap();
        assert_eq!(shelf.files(), Vec::<PathBuf>::new());
        for text in ["", "[]", "{}", r#"{"format": "crestline-recovery", "version": 2, "plan": {}}"#] {
            assert_eq!(parse(text), None, "{text}");
        }
    }
}
