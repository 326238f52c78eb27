//! What the page shows and how; nothing of it is saved with the plan.

use std::collections::BTreeSet;

use crestline_plan::{Plan, Priors};
use eframe::egui::Id;

use super::inquiry::Inquiry;
use super::place::{Place, Sounded};

/// The state of the page.
#[derive(Debug, Default)]
pub struct Repair {
    /// What is held probable before anything is read.
    pub priors: Priors,
    /// Whether the fields for that are shown.
    pub shows_priors: bool,
    /// Which columns the grid shows.
    pub columns: Columns,
    /// The cell that the next frame should go to.
    pub going_to: Option<Place>,
    /// A cell that has just been come into, and whose text is chosen as soon as no button is held.
    pub entered: Option<Id>,
    /// Whether the plot shows all strings, not the chosen one alone.
    pub all_strings: bool,
    /// The remedy whose effect the plot shows.
    pub previewed: Option<usize>,
    /// The diagnosis, worked out beside the window.
    pub inquiry: Inquiry,
}

/// Which frets the grid shows besides those that have readings.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Columns {
    /// All of them.
    pub all: bool,
    /// Those that the user asked for.
    pub added: BTreeSet<u32>,
}

impl Columns {
    /// The columns for a plan, with the frets that are suggested.
    #[must_use]
    pub fn of(&self, plan: &Plan, suggested: &[u32]) -> Vec<Sounded> {
        let frets = plan.instrument.frets;
        let wanted: BTreeSet<u32> = if self.all {
            (1..=frets).collect()
        } else {
            let read = plan.readings.iter().map(Sounded::of).filter_map(fret);
            read.chain(suggested.iter().copied()).chain(self.added.iter().copied()).collect()
        };
        let shown = wanted.into_iter().filter(|fret| (1..=frets).contains(fret));
        [Sounded::Open, Sounded::OctaveHarmonic].into_iter().chain(shown.map(Sounded::Fretted)).collect()
    }
}

fn fret(sounded: Sounded) -> Option<u32> {
    match sounded {
        Sounded::Fretted(fret) => Some(fret),
        Sounded::Open | Sounded::OctaveHarmonic => None,
    }
}

impl Repair {
    /// Forgets what belonged to the plan before; what is held probable stays as the user set it.
    pub fn fresh(&mut self) {
        let Self { priors, shows_priors, .. } = *self;
        *self = Self { priors, shows_priors, ..Self::default() };
    }
}
