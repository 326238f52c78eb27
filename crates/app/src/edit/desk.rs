//! The desk: the plan being worked on, where it is kept, and the last good result.

use std::path::{Path, PathBuf};

use crestline_plan::{Fault, Plan, Solution, check, solve};

use super::history::{Edit, History};

/// A solution together with the plan that it was solved from.
#[derive(Debug, Clone)]
pub struct Outcome {
    /// The plan.
    pub plan: Plan,
    /// What comes of it.
    pub solution: Solution,
}

/// The plan being worked on.
///
/// Panels write to [`Desk::plan`] and say so; [`Desk::settle`] then notes the step for undo and solves
/// the plan. Nothing is solved while nothing changes.
#[derive(Debug)]
pub struct Desk {
    /// The plan as it stands in the fields; it may be wrong while someone is editing it.
    pub plan: Plan,
    path: Option<PathBuf>,
    on_disk: Option<Plan>,
    settled: Plan,
    history: History,
    faults: Vec<Fault>,
    outcome: Option<Outcome>,
    changed: bool,
    revision: u64,
    steps: u64,
}

impl Desk {
    /// A desk with a plan that came from `path`, or from nowhere.
    #[must_use]
    pub fn new(plan: Plan, path: Option<PathBuf>) -> Self {
        let mut desk = Self {
            settled: plan.clone(),
            on_disk: Some(plan.clone()),
            plan,
            path,
            history: History::default(),
            faults: Vec::new(),
            outcome: None,
            changed: false,
            revision: 0,
            steps: 0,
        };
        desk.solve();
        desk
    }

    /// Puts another plan on the desk; its history starts anew.
    pub fn replace(&mut self, plan: Plan, path: Option<PathBuf>) {
        let revision = self.revision + 1;
        *self = Self { revision, steps: self.steps, ..Self::new(plan, path) };
    }

    /// The plan to edit, beside its faults and the last good result.
    pub fn parts(&mut self) -> (&mut Plan, &[Fault], Option<&Outcome>) {
        (&mut self.plan, &self.faults, self.outcome.as_ref())
    }

    /// Notes a change of the plan and solves it.
    pub fn settle(&mut self, edit: &Edit) {
        if self.plan == self.settled {
            return;
        }
        let is_new = self.history.record(&self.settled, &self.plan, edit);
        self.steps += u64::from(is_new);
        self.follow();
    }

    /// Ends the gesture that is going on, so that the next change is a step of its own.
    pub fn close_gesture(&mut self) {
        self.history.close_gesture();
    }

    /// Takes the last step back; false if there is none.
    pub fn undo(&mut self) -> bool {
        let plan = self.history.undo(&self.plan);
        self.take(plan)
    }

    /// Brings the last undone step back; false if there is none.
    pub fn redo(&mut self) -> bool {
        let plan = self.history.redo(&self.plan);
        self.take(plan)
    }

    fn take(&mut self, plan: Option<Plan>) -> bool {
        let Some(plan) = plan else { return false };
        self.plan = plan;
        self.steps += 1;
        self.follow();
        true
    }

    fn follow(&mut self) {
        self.settled = self.plan.clone();
        self.changed = self.on_disk.as_ref() != Some(&self.plan);
        self.revision += 1;
        self.solve();
    }

    fn solve(&mut self) {
        let solved = check(&self.plan).and_then(|checked| solve(&checked));
        match solved {
            Ok(solution) => {
                self.outcome = Some(Outcome { plan: self.plan.clone(), solution });
                self.faults.clear();
            }
            Err(faults) => self.faults = faults,
        }
    }

    /// Remembers that the plan now stands in the file at `path`.
    pub fn saved_as(&mut self, path: PathBuf) {
        self.path = Some(path);
        self.has_on_disk(Some(self.plan.clone()));
    }

    /// Remembers what the plan's file holds: another plan than was thought, or none at all.
    pub fn has_on_disk(&mut self, plan: Option<Plan>) {
        self.on_disk = plan;
        self.changed = self.on_disk.as_ref() != Some(&self.plan);
        self.revision += 1;
    }

    /// A number that grows with every change of the plan, of its file, or of what the file holds.
    #[must_use]
    pub fn revision(&self) -> u64 {
        self.revision
    }

    /// How many steps have been made, taken back or done again since the window opened.
    #[must_use]
    pub fn steps(&self) -> u64 {
        self.steps
    }

    /// The file that the plan is kept in.
    #[must_use]
    pub fn path(&self) -> Option<&Path> {
        self.path.as_deref()
    }

    /// Whether the plan differs from its file.
    #[must_use]
    pub fn is_changed(&self) -> bool {
        self.changed
    }

    /// What is wrong with the plan.
    #[must_use]
    pub fn faults(&self) -> &[Fault] {
        &self.faults
    }

    /// The last good result.
    #[must_use]
    pub fn outcome(&self) -> Option<&Outcome> {
        self.outcome.as_ref()
    }

    /// The steps that can be undone and redone.
    #[must_use]
    pub fn history(&self) -> &History {
        &self.history
    }

    /// The file's name, or a word for a plan without one.
    #[must_use]
    pub fn file_name(&self) -> String {
        let name = self.path.as_deref().and_then(Path::file_name);
        name.map_or_else(|| "not yet saved".to_owned(), |name| name.to_string_lossy().into_owned())
    }
}
