//! The instrument found, in the report's terms.

use crestline_physics::diagnose::{self as physics, Diagnosed, DiagnosedString, Estimate};
use crestline_physics::fretting::NutHeight;

use super::cases::Cases;
use crate::{
    Cause, CauseReport, Checked, FoundInstrument, FoundNote, FoundString, FretDiagnosis, Reading,
    ReadingKind, Residual, SaddleCure, SaddleNutCure, StringDiagnosis,
};

/// One entry a string with fretted readings.
pub(super) fn strings(checked: &Checked, cases: &Cases, found: &Diagnosed) -> Vec<StringDiagnosis> {
    found
        .strings
        .iter()
        .enumerate()
        .filter_map(|(index, string)| {
            let (saddle, both) = (string.saddle?, string.saddle_and_nut?);
            Some(StringDiagnosis {
                string: index as u32 + 1,
                readings: cases.readings[index].len() as u32,
                rms_before_cents: rms(&net_fretted(checked, cases, index)),
                saddle_only: SaddleCure {
                    saddle_move_mm: saddle.saddle_mm,
                    sd_mm: saddle.sd_mm,
                    rms_after_cents: saddle.rms_after_cents,
                },
                saddle_and_nut: SaddleNutCure {
                    saddle_move_mm: both.saddle_mm,
                    saddle_sd_mm: both.saddle_sd_mm,
                    nut_move_mm: both.nut_mm,
                    nut_sd_mm: both.nut_sd_mm,
                    rms_after_cents: both.rms_after_cents,
                },
                causes: string.causes.iter().map(share).collect(),
                residual_cents: string.residual_rms_cents,
                suspect_string: string.is_suspect,
            })
        })
        .collect()
}

/// The readings of a string, in the plan's order.
pub(super) fn own_readings<'a>(
    checked: &'a Checked,
    cases: &'a Cases,
    string: usize,
) -> impl Iterator<Item = &'a Reading> {
    cases.readings[string].iter().map(|&index| &checked.plan().readings[index])
}

/// Mean of a string's open readings, cents; 0 where it was not read.
pub(super) fn open_cents(checked: &Checked, cases: &Cases, string: usize) -> f64 {
    let open: Vec<f64> = own_readings(checked, cases, string)
        .filter(|reading| reading.kind == ReadingKind::Open)
        .map(|reading| reading.cents)
        .collect();
    if open.is_empty() { 0.0 } else { open.iter().sum::<f64>() / open.len() as f64 }
}

/// Fretted readings against the open string as it was read, cents.
fn net_fretted(checked: &Checked, cases: &Cases, string: usize) -> Vec<f64> {
    let open = open_cents(checked, cases, string);
    own_readings(checked, cases, string)
        .filter(|reading| reading.kind == ReadingKind::Fretted)
        .map(|reading| reading.cents - open)
        .collect()
}

/// Root mean square; 0 for none.
pub(super) fn rms(values: &[f64]) -> f64 {
    let squares: f64 = values.iter().map(|value| value * value).sum();
    (squares / values.len().max(1) as f64).sqrt()
}

fn share(share: &physics::CauseShare) -> CauseReport {
    let cause = match share.cause {
        physics::Cause::Saddle => Cause::Saddle,
        physics::Cause::Nut => Cause::Nut,
        physics::Cause::NutSlot => Cause::NutSlot,
        physics::Cause::Action => Cause::Action,
        physics::Cause::Pressing => Cause::Pressing,
        physics::Cause::Stiffness => Cause::Stiffness,
        physics::Cause::Frets => Cause::Frets,
        physics::Cause::Relief => Cause::Relief,
    };
    CauseReport { cause, cents: share.cents }
}

/// The frets out of place.
pub(super) fn frets(found: &Diagnosed) -> Vec<FretDiagnosis> {
    let entry = |fret: &physics::MisplacedFret| FretDiagnosis {
        fret: fret.index as u32 + 1,
        shift_mm: fret.shift_mm,
        sd_mm: fret.sd_mm,
    };
    found.frets.iter().map(entry).collect()
}

/// The instrument found.
pub(super) fn instrument(checked: &Checked, cases: &Cases, found: &Diagnosed) -> FoundInstrument {
    FoundInstrument {
        strings: (0..found.strings.len())
            .map(|string| one(checked, cases, &found.strings[string], string))
            .collect(),
        press_depth_mm: pair(found.press_depth_mm),
        relief_mm: pair(found.relief_mm),
    }
}

fn pair(estimate: Estimate) -> [f64; 2] {
    [estimate.value, estimate.sd]
}

fn one(checked: &Checked, cases: &Cases, found: &DiagnosedString, string: usize) -> FoundString {
    let (expected, now) = (&cases.strings[string].setup.properties, &found.setup.properties);
    let first_mm = match found.setup.nut_height {
        NutHeight::GapAtFirst(gap_mm) => Some([gap_mm, found.slot_higher_mm.sd]),
        NutHeight::ZeroFret => None,
    };
    let left =
        cases.readings[string].iter().zip(own_readings(checked, cases, string)).zip(&found.residuals_cents);
    FoundString {
        saddle_setback_mm: pair(found.crest_mm),
        nut_setback_mm: pair(found.nut_mm),
        axial_stiffness_n: [now.axial_stiffness_n, expected.axial_stiffness_n * found.axial_ratio.sd],
        bending_stiffness_n_mm2: [
            now.bending_stiffness_n_mm2,
            expected.bending_stiffness_n_mm2 * found.bending_ratio.sd,
        ],
        first_mm,
        twelfth_mm: [found.setup.gap_at_twelfth_mm, found.action_higher_mm.sd],
        tuning_cents: pair(found.tuning_cents),
        slot_is_high: found.is_slot_high,
        notes: std::iter::zip(&found.frets, std::iter::zip(&found.errors_cents, &found.errors_sd_cents))
            .map(|(&fret, (&error_cents, &sd_cents))| FoundNote {
                fret: fret as u32 + 1,
                error_cents,
                sd_cents,
            })
            .collect(),
        residuals: left
            .map(|((&reading, read), &cents)| Residual { reading, fret: read.fret, kind: read.kind, cents })
            .collect(),
    }
}
