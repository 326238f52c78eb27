//! The strings of a checked plan as models whose figures are uncertain.

use crestline_physics::fit::{self, FitOptions};

use crestline_physics::near::NearFit;
use crestline_physics::{PhysicsError, StringSetup};
use rayon::prelude::*;

use super::first_order::FirstOrder;
use super::model::{Figures, StringModel};
use crate::solve::{Fitted, Prepared, overrides, physics_core, wrap};
use crate::{Checked, Fault, NutStyle, Tolerances};

/// Every string of a plan with what one standard deviation of each figure does to it.
pub(crate) struct Models {
    pub tolerances: Tolerances,
    pub(super) strings: Vec<StringModel>,
    pub(super) first_order: Vec<FirstOrder>,
}

impl Models {
    /// Models of a plan that was prepared and fitted already. Without tolerances in the plan, the usual ones.
    ///
    /// # Errors
    /// A fault where one standard deviation of a figure leaves what can be built.
    pub fn new(
        checked: &Checked,
        prepared: &Prepared,
        fitted: &Fitted,
        options: &FitOptions,
    ) -> Result<Self, Vec<Fault>> {
        let tolerances = checked.plan().tolerances.clone().unwrap_or_default();
        let made: Vec<Result<_, PhysicsError>> = (0..prepared.strings.len())
            .into_par_iter()
            .map(|index| {
                let mut model = model(checked, prepared, fitted, options, index, &tolerances);
                let still = prepared.strings[index].string.clone();
                model.ideal = model.fit.contacts(&still, model.ideal)?;
                let first_order = FirstOrder::of(&model, &tolerances)?;
                model.slopes.clone_from(&first_order.ideal);
                Ok((model, first_order))
            })
            .collect();
        let (mut strings, mut first_order, mut faults) = (Vec::new(), Vec::new(), Vec::new());
        for (index, made) in made.into_iter().enumerate() {
            match made {
                Ok((model, order)) => {
                    strings.push(model);
                    first_order.push(order);
                }
                Err(error) => faults.push(too_wide(index, &error)),
            }
        }
        if faults.is_empty() { Ok(Self { tolerances, strings, first_order }) } else { Err(faults) }
    }

    /// Standard deviation to first order of every string's ideal saddle setback, mm.
    pub fn saddle_sds_mm(&self) -> Vec<f64> {
        self.first_order.iter().map(FirstOrder::saddle_sd_mm).collect()
    }
}

/// The fault of a plan whose tolerances take string `index` out of what can be built.
pub(super) fn too_wide(index: usize, error: &PhysicsError) -> Fault {
    Fault::new(
        "tolerances",
        format!("standard deviations with which string {} cannot be worked out: {error}", index + 1),
        "smaller ones, or figures farther from what cannot be built",
    )
}

fn model(
    checked: &Checked,
    prepared: &Prepared,
    fitted: &Fitted,
    options: &FitOptions,
    index: usize,
    tolerances: &Tolerances,
) -> StringModel {
    let (plan, own) = (checked.plan(), &prepared.strings[index]);
    StringModel {
        figures: figures(checked, index, own.string.setup(), tolerances),
        fit: NearFit {
            rule: options.rule,
            frets: own.frets.clone(),
            nut_moves: plan.nut.style == NutStyle::Shaped && options.rule != fit::FitRule::Minimax,
            saddle_travel_mm: options.saddle_travel_mm,
            nut_travel_mm: options.nut_travel_mm,
        },
        built: fitted.built.contacts[index],
        ideal: fitted.ideal.contacts[index],
        slopes: Vec::new(),
    }
}

/// The figures of the string with this index.
pub(super) fn figures(
    checked: &Checked,
    index: usize,
    setup: &StringSetup,
    tolerances: &Tolerances,
) -> Figures {
    let plan = checked.plan();
    let entry = &plan.strings[index];
    Figures {
        core: physics_core(entry),
        wrap: wrap(entry),
        measured: overrides(entry),
        setup: setup.clone(),
        fret_height_mm: plan.instrument.fret_height_mm,
        sd: tolerances.of_string(plan, index),
    }
}
