//! Keeps a copy of unsaved work, so that it survives whatever ends the program.
//!
//! A thread of its own writes, because a slow disk must not stop the window. It writes the newest state only
//! and rests in between. The copy goes when the plan is saved or its changes are given up.

use std::path::{Path, PathBuf};
use std::sync::mpsc::{Receiver, RecvTimeoutError, Sender, channel};
use std::thread::{self, JoinHandle};
use std::time::{Duration, Instant};

use crestline_plan::Plan;

use super::found::Found;
use super::slot::{Shelf, Slot};
use crate::edit::desk::Desk;

/// The least time between two copies: at most this much work is lost, and a disk is not kept busy.
const REST: Duration = Duration::from_millis(300);

/// What the window tells the thread.
enum Order {
    /// Keep this state of the plan.
    Keep(Box<Work>),
    /// The plan is saved, or its changes are given up.
    Forget,
    /// Work that was left behind is on the desk now: its old copy can go once the new one is written.
    Adopt(Box<Found>),
}

struct Work {
    plan: Plan,
    plan_file: Option<PathBuf>,
}

/// The keeping of unsaved work.
#[derive(Debug)]
pub struct Autosave {
    orders: Option<Sender<Order>>,
    thread: Option<JoinHandle<()>>,
    trouble: Receiver<String>,
    seen: u64,
    keeps: bool,
}

impl Autosave {
    /// Begins. `state` is the user's state folder; `wake` is called when there is trouble to tell.
    pub fn new(state: Option<PathBuf>, wake: impl Fn() + Send + 'static) -> Self {
        let (orders, list) = channel();
        let (tell, trouble) = channel();
        let work = move || {
            let tell = move |words| {
                // The window may have gone by then; nobody needs the words any more.
                let _ = tell.send(words);
                wake();
            };
            serve(&list, Keeper { state, slot: None, adopted: Vec::new(), has_told: false }, &tell);
        };
        let thread = thread::Builder::new().name("autosave".into()).spawn(work).ok();
        Self { orders: Some(orders), thread, trouble, seen: 0, keeps: false }
    }

    /// Keeps what has changed on the desk since the last call; gives words where that has failed.
    pub fn follow(&mut self, desk: &Desk) -> Option<String> {
        if desk.revision() != self.seen {
            self.seen = desk.revision();
            if desk.is_changed() {
                let plan_file = desk.path().map(whole);
                self.order(Order::Keep(Box::new(Work { plan: desk.plan.clone(), plan_file })));
                self.keeps = true;
            } else {
                self.forget();
            }
        }
        self.trouble.try_recv().ok()
    }

    /// Takes over work that was left behind and is on the desk now.
    pub fn adopt(&mut self, found: Found) {
        self.keeps = true;
        self.order(Order::Adopt(Box::new(found)));
    }

    /// Takes the copy away, because the work is saved or given up.
    pub fn forget(&mut self) {
        if std::mem::take(&mut self.keeps) {
            self.order(Order::Forget);
        }
    }

    fn order(&self, order: Order) {
        if let Some(orders) = &self.orders {
            // A thread that could not be started keeps nothing; saving works all the same.
            let _ = orders.send(order);
        }
    }
}

impl Drop for Autosave {
    /// Waits until the last state has been written.
    fn drop(&mut self) {
        self.orders = None;
        if let Some(thread) = self.thread.take() {
            let _ = thread.join();
        }
    }
}

/// The path from the root, so that it means the same file later.
#[must_use]
pub fn whole(path: &Path) -> PathBuf {
    std::path::absolute(path).unwrap_or_else(|_| path.to_owned())
}

fn serve(orders: &Receiver<Order>, mut keeper: Keeper, tell: &dyn Fn(String)) {
    let mut waiting: Option<Box<Work>> = None;
    let mut last: Option<Instant> = None;
    loop {
        let rest = last.map_or(Duration::ZERO, |last| REST.saturating_sub(last.elapsed()));
        let next = match waiting {
            None => orders.recv().map_err(|_| RecvTimeoutError::Disconnected),
            Some(_) => orders.recv_timeout(rest),
        };
        match next {
            Ok(Order::Keep(work)) => waiting = Some(work),
            Ok(Order::Adopt(found)) => keeper.adopted.push(*found),
            Ok(Order::Forget) => {
                waiting = None;
                keeper.forget();
            }
            Err(reason) => {
                if let Some(work) = waiting.take() {
                    keeper.keep(&work, tell);
                    last = Some(Instant::now());
                }
                if reason == RecvTimeoutError::Disconnected {
                    return;
                }
            }
        }
    }
}

/// What the thread holds.
struct Keeper {
    state: Option<PathBuf>,
    slot: Option<(Slot, Option<PathBuf>)>,
    adopted: Vec<Found>,
    has_told: bool,
}

impl Keeper {
    fn keep(&mut self, work: &Work, tell: &dyn Fn(String)) {
        match self.write(work) {
            Ok(()) => {
                self.adopted.drain(..).for_each(Found::remove);
                self.has_told = false;
            }
            Err(reason) if !self.has_told => {
                self.has_told = true;
                tell(format!(
                    "No copy of the unsaved changes can be kept ({reason}); they would be lost if the program were \
                     ended. Save the plan, if need be to another place."
                ));
            }
            Err(_) => {}
        }
    }

    fn write(&mut self, work: &Work) -> Result<(), String> {
        let plan_file = work.plan_file.as_deref();
        if let Some((slot, of)) = &mut self.slot
            && of.as_deref() == plan_file
            && slot.rewrite(&work.plan, plan_file).is_ok()
        {
            return Ok(());
        }
        let old = self.slot.take();
        match self.anew(work) {
            Ok(slot) => {
                self.slot = Some((slot, work.plan_file.clone()));
                if let Some((slot, _)) = old {
                    slot.remove();
                }
                Ok(())
            }
            Err(reason) => {
                // An older state is better than none.
                self.slot = old;
                Err(reason)
            }
        }
    }

    /// Beside the plan, or in the state folder.
    fn anew(&self, work: &Work) -> Result<Slot, String> {
        let plan_file = work.plan_file.as_deref();
        let mut reason = "the system names no folder for it".to_owned();
        let beside = plan_file.and_then(Shelf::beside);
        let state = self.state.as_deref().map(|folder| {
            // Where it cannot be made, the slot below says so.
            let _ = std::fs::create_dir_all(folder.join("recovery"));
            Shelf::in_state(folder)
        });
        for shelf in beside.into_iter().chain(state) {
            match Slot::new(&shelf, &work.plan, plan_file) {
                Ok(slot) => return Ok(slot),
                Err(error) => reason = error.to_string(),
            }
        }
        Err(reason)
    }

    fn forget(&mut self) {
        if let Some((slot, _)) = self.slot.take() {
            slot.remove();
        }
        self.adopted.drain(..).for_each(Found::remove);
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crate::edit::history::Edit;
    use crate::keep::found;
    use crestline_plan::{example, read, write};
    use std::fs;

    fn plan() -> Plan {
        read(example("steel_six").unwrap().text).unwrap()
    }

    fn change(desk: &mut Desk, relief_mm: f64) {
        desk.plan.instrument.relief_mm = relief_mm;
        desk.settle(&Edit::whole("Relief"));
    }

    /// A state folder, a folder with a saved plan, and the plan's path.
    fn saved() -> (tempfile::TempDir, tempfile::TempDir, PathBuf) {
        let (state, folder) = (tempfile::tempdir().unwrap(), tempfile::tempdir().unwrap());
        let path = folder.path().join("a.json");
        fs::write(&path, write(&plan())).unwrap();
        (state, folder, path)
    }

    fn begin(state: &Path) -> Autosave {
        Autosave::new(Some(state.to_owned()), || ())
    }

    #[test]
    fn work_that_was_not_saved_is_found_again_and_gone_once_it_is_saved() {
        let (state, folder, path) = saved();
        let mut desk = Desk::new(plan(), Some(path.clone()));
        let mut autosave = begin(state.path());
        change(&mut desk, 0.2);
        autosave.follow(&desk);
        change(&mut desk, 0.4);
        autosave.follow(&desk);
        // The window ends without a word.
        drop(autosave);
        let mut list = found::look(Some(&path), Some(state.path()), &[]);
        assert_eq!(list.len(), 1);
        let found = list.pop().unwrap();
        assert_eq!(found.kept.plan, desk.plan, "the newest state");
        assert!(found.lines().iter().any(|line| line.contains("relief: 0.15 → 0.4")), "{:?}", found.lines());

        let mut autosave = begin(state.path());
        autosave.adopt(found);
        autosave.follow(&desk);
        drop(autosave);
        assert_eq!(found::look(Some(&path), Some(state.path()), &[]).len(), 1, "kept under a new name only");

        let mut autosave = begin(state.path());
        autosave.follow(&desk);
        desk.saved_as(path.clone());
        autosave.follow(&desk);
        drop(autosave);
        fs::write(&path, write(&desk.plan)).unwrap();
        assert!(found::look(Some(&path), Some(state.path()), &[]).is_empty());
        assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 1, "the plan alone is left");
    }

    #[test]
    fn an_unsaved_plan_is_kept_in_the_state_folder_and_found_without_a_path() {
        let state = tempfile::tempdir().unwrap();
        let mut desk = Desk::new(plan(), None);
        let mut autosave = begin(state.path());
        change(&mut desk, 0.4);
        autosave.follow(&desk);
        drop(autosave);
        let found = found::look(None, Some(state.path()), &[]);
        assert_eq!(found.iter().map(|found| &found.kept.plan).collect::<Vec<_>>(), [&desk.plan]);
    }

    #[test]
    fn work_beside_a_recent_plan_is_found_when_the_window_opens_without_a_path() {
        let (state, _folder, path) = saved();
        let mut desk = Desk::new(plan(), Some(path.clone()));
        let mut autosave = begin(state.path());
        change(&mut desk, 0.4);
        autosave.follow(&desk);
        drop(autosave);
        assert!(found::look(None, Some(state.path()), &[]).is_empty());
        assert_eq!(found::look(None, Some(state.path()), std::slice::from_ref(&path)).len(), 1);
    }

    #[test]
    fn a_change_that_is_taken_back_leaves_no_copy() {
        let (state, folder, path) = saved();
        let mut desk = Desk::new(plan(), Some(path));
        let mut autosave = begin(state.path());
        change(&mut desk, 0.4);
        autosave.follow(&desk);
        desk.undo();
        autosave.follow(&desk);
        drop(autosave);
        assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 1);
    }

    #[test]
    fn where_nothing_can_be_written_it_is_told_once() {
        let folder = tempfile::tempdir().unwrap();
        // A file where a folder is wanted stops every user, also root.
        let blocked = folder.path().join("file");
        fs::write(&blocked, "").unwrap();
        let mut desk = Desk::new(plan(), Some(blocked.join("a.json")));
        let (heard, hears) = channel();
        let wake = move || {
            let _ = heard.send(());
        };
        let mut autosave = Autosave::new(Some(blocked.join("state")), wake);
        change(&mut desk, 0.2);
        let at_once = autosave.follow(&desk);
        hears.recv().unwrap();
        let words = at_once.or_else(|| autosave.follow(&desk)).unwrap();
        assert!(words.contains("No copy") && words.contains("Save the plan"), "{words}");
        change(&mut desk, 0.3);
        autosave.follow(&desk);
        autosave.orders = None;
        autosave.thread.take().unwrap().join().unwrap();
        assert_eq!(autosave.follow(&desk), None, "and not again");
    }
}
