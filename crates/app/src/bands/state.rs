//! What the page shows and how; nothing of it is saved with the plan.

use super::sampling::Sampling;

/// The state of the page.
#[derive(Debug)]
pub struct Trust {
    /// The sample, worked out beside the window.
    pub sampling: Sampling,
    /// Whether the fields for the tolerances are shown.
    pub shows_tolerances: bool,
    /// Whether the shares are those of the chosen string alone, not of the whole saddle.
    pub of_one_string: bool,
    /// Whether the plots of the page `Saddle` show bands, where the plan has tolerances.
    pub on_plots: bool,
}

impl Default for Trust {
    fn default() -> Self {
        Self { sampling: Sampling::default(), shows_tolerances: false, of_one_string: false, on_plots: true }
    }
}

impl Trust {
    /// Forgets what belonged to the plan before.
    pub fn fresh(&mut self) {
        self.sampling.fresh();
    }
}
