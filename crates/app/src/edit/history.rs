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
    /// Notes an edit that made `now` of `before`; true where it begins a step. A gesture that ends where it began
    /// leaves no step.
    pub fn record(&mut self, before: &Plan, now: &Plan, edit: &Edit) -> bool {
        self.undone.clear();
        let goes_on = edit.gesture.is_some() && edit.gesture == self.open;
        self.open = edit.gesture;
        if goes_on {
            if self.done.last().is_some_and(|step| step.plan == *now) {
                self.done.pop();
                self.open = None;
            }
            return false;
        }
        self.done.push(Step { name: edit.name.clone(), plan: before.clone() });
        if self.done.len() > KEPT {
            self.done.remove(0);
        }
        true
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

    fn typed(field: &str) -> Edit {
        Edit { name: field.to_owned(), gesture: Some(Id::unique(field)) }
    }

    #[test]
    fn one_gesture_is_one_step() {
        let mut history = History::default();
        history.record(&plan(0.1), &plan(0.2), &typed("relief"));
        history.record(&plan(0.2), &plan(0.3), &typed("relief"));
        assert_eq!(history.undo(&plan(0.3)), Some(plan(0.1)));
        assert_eq!(history.undo(&plan(0.1)), None);
        assert_eq!(history.redo(&plan(0.1)), Some(plan(0.3)));
    }

    #[test]
    fn a_field_that_was_left_begins_a_new_step() {
        let mut history = History::default();
        history.record(&plan(0.1), &plan(0.2), &typed("relief"));
        history.close_gesture();
        history.record(&plan(0.2), &plan(0.3), &typed("relief"));
        assert_eq!(history.undo(&plan(0.3)), Some(plan(0.2)));
    }

    #[test]
    fn a_gesture_that_ends_where_it_began_leaves_no_step() {
        let mut history = History::default();
        history.record(&plan(0.1), &plan(0.2), &typed("relief"));
        history.record(&plan(0.2), &plan(0.1), &typed("relief"));
        assert_eq!(history.undo_name(), None);
        history.record(&plan(0.1), &plan(0.5), &typed("relief"));
        assert_eq!(history.undo(&plan(0.5)), Some(plan(0.1)));
    }

    #[test]
    fn a_new_change_after_undo_ends_what_could_be_redone() {
        let mut history = History::default();
        history.record(&plan(0.1), &plan(0.2), &Edit::whole("a"));
        assert_eq!(history.undo(&plan(0.2)), Some(plan(0.1)));
        history.record(&plan(0.1), &plan(0.3), &Edit::whole("b"));
        assert_eq!(history.redo_name(), None);
        assert_eq!(history.undo_name(), Some("b"));
    }

    #[test]
    fn the_oldest_steps_are_let_go() {
        let mut history = History::default();
        for i in 0..KEPT + 5 {
            history.record(&plan(i as f64), &plan(i as f64 + 1.0), &Edit::whole("step"));
        }
        let mut now = plan((KEPT + 5) as f64);
        let mut steps = 0;
        while let Some(before) = history.undo(&now) {
            now = before;
            steps += 1;
        }
        assert_eq!(steps, KEPT);
        assert_eq!(now.instrument.relief_mm, 5.0);
    }
}
