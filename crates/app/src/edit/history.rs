//! Undo and redo: whole plans, one for each finished gesture.

use crestline_plan::Plan;
use eframe::egui::Id;

/// How many steps back are kept; a plan is a few kilobytes.
const KEPT: usize = 200;

/// A change that has just been made to the plan, with its name for the Edit menu.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Edit {
    /// What was done, such as `Scale` or `Remove string`.
    pub name: String,
    /// The field it was typed in; changes of one field that follow each other are one gesture.
    pub gesture: Option<Id>,
}

impl Edit {
    /// An edit that is finished at once.
    pub fn whole(name: impl Into<String>) -> Self {
        Self { name: name.into(), gesture: None }
    }
}

/// One step: its name, and the plan on the other side of it.
#[derive(Debug, Clone)]
struct Step {
    name: String,
    plan: Plan,
}

/// The steps done and undone.
#[derive(Debug, Default)]
pub struct History {
    done: Vec<Step>,
    undone: Vec<Step>,
    open: Option<Id>,
}

impl History {
    /// Notes an edit that made `now` of `before`. A gesture that ends where it began leaves no step.
    pub fn record(&mut self, before: &Plan, now: &Plan, edit: &Edit) {
        self.undone.clear();
        let goes_on = edit.gesture.is_some() && edit.gesture == self.open;
        self.open = edit.gesture;
        if goes_on {
            if self.done.last().is_some_and(|step| step.plan == *now) {
                self.done.pop();
                self.open = None;
            }
            return;
        }
        self.done.push(Step { name: edit.name.clone(), plan: before.clone() });
        if self.done.len() > KEPT {
            self.done.remove(0);
        }
    }

    /// Ends the gesture that is going on, so that the next change is a step of its own.
    pub fn close_gesture(&mut self) {
        self.open = None;
    }

    /// Steps back from `now`, if there is a step.
    pub fn undo(&mut self, now: &Plan) -> Option<Plan> {
        self.open = None;
        shift(&mut self.done, &mut self.undone, now)
    }

    /// Steps forward again from `now`, if there is a step.
    pub fn redo(&mut self, now: &Plan) -> Option<Plan> {
        self.open = None;
        shift(&mut self.undone, &mut self.done, now)
    }

    /// Name of the step that undo would take back.
    #[must_use]
    pub fn undo_name(&self) -> Option<&str> {
        self.done.last().map(|step| step.name.as_str())
    }

    /// Name of the step that redo would bring back.
    #[must_use]
    pub fn redo_name(&self) -> Option<&str> {
        self.undone.last().map(|step| step.name.as_str())
    }
}

fn shift(from: &mut Vec<Step>, to: &mut Vec<Step>, now: &Plan) -> Option<Plan> {
    let step = from.pop()?;
    to.push(Step { name: step.name, plan: now.clone() });
    Some(step.plan)
}
