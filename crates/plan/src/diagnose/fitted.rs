//! The instrument found, as a plan: from the old saddle to the new.

use crate::limits::{self, Range};
use crate::{AsBuilt, Checked, Diagnosis, Plan};

/// The plan with the instrument found in it: where crests and nut edges are, the stiffness of every string, its
/// heights, press depth and relief. Frets out of place are taken over where the plan can hold them (not on a fanned
/// neck). Its readings stay, so that it can be diagnosed again; what is found is held within what a plan allows.
#[must_use]
pub fn fitted_plan(checked: &Checked, diagnosis: &Diagnosis) -> Plan {
    let mut plan = checked.plan().clone();
    let found = &diagnosis.found;
    let each = |value: fn(&crate::FoundString) -> f64, range: &Range| {
        found.strings.iter().map(|string| kept(value(string), range)).collect()
    };
    plan.as_built = Some(AsBuilt {
        saddle_setback_mm: each(|string| string.saddle_setback_mm[0], &limits::AS_BUILT_SADDLE_MM),
        nut_setback_mm: each(|string| string.nut_setback_mm[0], &limits::AS_BUILT_NUT_MM),
    });
    for (string, found) in plan.strings.iter_mut().zip(&found.strings) {
        string.measured.axial_stiffness_n =
            Some(kept(found.axial_stiffness_n[0], &limits::AXIAL_STIFFNESS_N));
        string.measured.bending_stiffness_n_mm2 =
            Some(kept(found.bending_stiffness_n_mm2[0], &limits::BENDING_STIFFNESS_N_MM2));
        if string.action_mm.first.is_some() {
            string.action_mm.first = found.first_mm.map(|first| kept(first[0], &limits::ACTION_FIRST_MM));
        }
        string.action_mm.twelfth = kept(found.twelfth_mm[0], &limits::ACTION_TWELFTH_MM);
    }
    let deepest = Range { high: plan.instrument.fret_height_mm, ..limits::PRESS_DEPTH_MM };
    plan.pressing.depth_mm = kept(found.press_depth_mm[0], &deepest);
    plan.instrument.relief_mm = kept(found.relief_mm[0], &limits::RELIEF_MM);
    shift_frets(checked, diagnosis, &mut plan);
    plan
}

fn kept(value: f64, range: &Range) -> f64 {
    value.clamp(range.low, range.high)
}

fn shift_frets(checked: &Checked, diagnosis: &Diagnosis, plan: &mut Plan) {
    let crate::Scale::Single(scale_mm) = plan.instrument.scale else { return };
    if diagnosis.frets.is_empty() {
        return;
    }
    let Some(string) = checked.neck().strings.first() else { return };
    let along_string = string.line.scale_mm() / scale_mm;
    let mut positions_mm = plan
        .instrument
        .fret_positions_mm
        .clone()
        .unwrap_or_else(|| string.fret_mm.iter().map(|position| position / along_string).collect());
    for fret in &diagnosis.frets {
        if let Some(position_mm) = positions_mm.get_mut(fret.fret as usize - 1) {
            *position_mm += fret.shift_mm / along_string;
        }
    }
    plan.instrument.fret_positions_mm = Some(positions_mm);
}
