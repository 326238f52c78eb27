//! The sample of a plan and the shares of its inputs, worked out beside the window and only when the plan has changed.

use std::sync::Arc;
use std::sync::mpsc::TryRecvError;

use crestline_plan::{Fault, Plan, Shares, Uncertainty};
use eframe::egui::Context;

use super::work::{News, Step, Work};

/// What a sample says so far.
#[derive(Debug, Clone)]
pub struct Found {
    /// What it says.
    pub uncertainty: Arc<Uncertainty>,
    /// Whether the whole sample has been drawn.
    pub is_whole: bool,
    plan: Plan,
}

impl Found {
    /// Whether it is of this plan as it stands.
    #[must_use]
    pub fn is_of(&self, plan: &Plan) -> bool {
        self.plan == basis(plan)
    }

    /// The plan that it is about, without its texts, readings and existing saddle.
    #[must_use]
    pub fn plan(&self) -> &Plan {
        &self.plan
    }
}

/// The state of the work.
#[derive(Debug, Default)]
pub struct Sampling {
    work: Option<Work>,
    found: Option<Found>,
    shares: Option<(Plan, Arc<Shares>)>,
    refused: Option<(Plan, Vec<Fault>)>,
    stopped: Option<Plan>,
}

/// How far the work has come.
#[derive(Debug, Clone, PartialEq)]
pub struct Progress {
    /// The part that is done, 0 to 1.
    pub part: f32,
    /// The same in words.
    pub words: String,
}

impl Sampling {
    /// Takes what has been worked out and, where something else is to be worked out, begins that: the sample, and
    /// then, if they are wanted, the shares.
    pub fn follow(&mut self, ctx: &Context, plan: &Plan, wants_shares: bool) {
        self.take_news();
        let plan = basis(plan);
        if let Some(work) = &self.work {
            if work.plan != plan {
                work.stop();
            }
            return;
        }
        if self.stopped.as_ref().is_some_and(|stopped| *stopped != plan) {
            self.stopped = None;
        }
        let is_refused = self.refused.as_ref().is_some_and(|(refused, _)| *refused == plan);
        if is_refused || self.stopped.is_some() {
            return;
        }
        let is_sampled = self.found.as_ref().is_some_and(|found| found.is_whole && found.plan == plan);
        let is_shared = self.shares.as_ref().is_some_and(|(shared, _)| *shared == plan);
        match (is_sampled, is_shared) {
            (false, _) => self.work = Work::begin(ctx, plan, Step::Sample),
            (true, false) if wants_shares => self.work = Work::begin(ctx, plan, Step::Shares),
            _ => {}
        }
    }

    /// What the last sample says; while that of a changed plan has said nothing yet, that of the plan before.
    #[must_use]
    pub fn found(&self) -> Option<&Found> {
        self.found.as_ref()
    }

    /// The shares of the plan that [`found`](Self::found) is about.
    #[must_use]
    pub fn shares(&self) -> Option<&Arc<Shares>> {
        let (plan, shares) = self.shares.as_ref()?;
        self.found.as_ref().filter(|found| found.plan == *plan).map(|_| shares)
    }

    /// Why this plan cannot be sampled, if it cannot.
    #[must_use]
    pub fn faults(&self, plan: &Plan) -> &[Fault] {
        let refused = self.refused.as_ref().filter(|(refused, _)| *refused == basis(plan));
        refused.map_or(&[], |(_, faults)| faults)
    }

    /// Whether something is being worked out.
    #[must_use]
    pub fn is_working(&self) -> bool {
        self.work.is_some()
    }

    /// How far that has come; the shares are taken for a fifth of the whole.
    #[must_use]
    pub fn progress(&self) -> Option<Progress> {
        const SAMPLE: f32 = 0.8;
        let work = self.work.as_ref()?;
        let [done, of] = work.done_of;
        Some(match work.step {
            Step::Sample if of == 0 => Progress { part: 0.0, words: "Beginning …".to_owned() },
            Step::Sample => Progress {
                part: SAMPLE * done as f32 / of as f32,
                words: format!("{done} of {of} instruments"),
            },
            Step::Shares => Progress { part: SAMPLE, words: "What each input brings …".to_owned() },
        })
    }

    /// Stops the work for the plan that it is about; what has been found stays.
    pub fn stop(&mut self) {
        if let Some(work) = &self.work {
            work.stop();
            self.stopped = Some(work.plan.clone());
        }
        // Its last words come too late.
        self.work = None;
    }

    /// Whether the user stopped the work.
    #[must_use]
    pub fn was_stopped(&self) -> bool {
        self.stopped.is_some()
    }

    /// Works it out after all.
    pub fn resume(&mut self) {
        self.stopped = None;
    }

    /// Forgets everything and stops what is going on.
    pub fn fresh(&mut self) {
        self.stop();
        *self = Self::default();
    }

    fn take_news(&mut self) {
        while let Some(work) = &mut self.work {
            match work.news.try_recv() {
                Ok(News::Worked(done, of)) => work.done_of = [done, of],
                Ok(News::Sharper(uncertainty)) => {
                    self.found = Some(found(&work.plan, uncertainty, false));
                }
                Ok(News::Sampled(Ok(uncertainty))) => {
                    self.found = Some(found(&work.plan, uncertainty, true));
                    self.work = None;
                }
                Ok(News::Shared(Ok(shares))) => {
                    self.shares = Some((work.plan.clone(), Arc::new(shares)));
                    self.work = None;
                }
                Ok(News::Sampled(Err(faults)) | News::Shared(Err(faults))) => {
                    self.refused = Some((work.plan.clone(), faults));
                    self.work = None;
                }
                Err(TryRecvError::Disconnected) => self.work = None,
                Err(TryRecvError::Empty) => break,
            }
        }
    }
}

fn found(plan: &Plan, uncertainty: Uncertainty, is_whole: bool) -> Found {
    Found { uncertainty: Arc::new(uncertainty), is_whole, plan: plan.clone() }
}

/// What the sample depends on: the plan without its texts, its readings and the saddle that there is.
fn basis(plan: &Plan) -> Plan {
    Plan { title: String::new(), notes: String::new(), readings: Vec::new(), as_built: None, ..plan.clone() }
}
