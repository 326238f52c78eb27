//! The jobs that may help an instrument.

use crestline_physics::PhysicsError;
use crestline_physics::diagnose::{Cause, DiagnosedString, Estimate};

use super::saddle::{nut_and_saddle, saddle};
use super::words::{amounts_words, strings_words};
use super::{Bench, Job, SURE};
use crate::RemedyKind;

/// Work in units of filing one nut slot, as a repairer would put it (common practice).
mod work {
    pub const REPLACE_STRING: f64 = 1.0;
    pub const SLOT: f64 = 1.0;
    pub const RELIEF: f64 = 1.0;
    pub const ACTION: f64 = 2.0;
    pub const FRET: f64 = 8.0;
}

/// Slots are filed, and actions set, no finer than this, mm.
const HEIGHT_STEP_MM: f64 = 0.03;
/// A high slot is worth filing where it makes this much of a string's errors, root mean square over its frets, cents:
/// some one and a half cents at fret 1.
const SLOT_HEARD_CENTS: f64 = 0.6;
/// Relief is set no finer than this, mm.
const RELIEF_STEP_MM: f64 = 0.03;

/// Every job that the findings call for.
pub(super) fn jobs(bench: &Bench) -> Result<Vec<Job>, PhysicsError> {
    let mut jobs = Vec::new();
    jobs.extend(replace_strings(bench)?);
    jobs.extend(file_slots(bench)?);
    jobs.extend(set_action(bench, RemedyKind::LowerAction, |mm| mm > 0.0)?);
    jobs.extend(set_action(bench, RemedyKind::RaiseAction, |mm| mm < 0.0)?);
    jobs.extend(set_relief(bench)?);
    jobs.extend(saddle(bench)?);
    jobs.extend(nut_and_saddle(bench)?);
    jobs.extend(correct_frets(bench)?);
    Ok(jobs)
}

/// Numbers of the strings for which something holds.
fn strings_where(bench: &Bench, holds: impl Fn(&DiagnosedString) -> bool) -> Vec<usize> {
    (0..bench.strings()).filter(|&string| holds(&bench.found.strings[string])).collect()
}

fn numbers(strings: &[usize]) -> Vec<u32> {
    strings.iter().map(|&string| string as u32 + 1).collect()
}

/// Errors of all strings where some are changed.
fn with_changed(
    bench: &Bench,
    strings: &[usize],
    change: impl Fn(usize) -> Result<Vec<f64>, PhysicsError>,
) -> Result<Vec<Vec<f64>>, PhysicsError> {
    let mut errors = bench.now.clone();
    for &string in strings {
        errors[string] = change(string)?;
    }
    Ok(errors)
}

/// What a cause explains on a string, cents.
fn share_cents(string: &DiagnosedString, cause: Cause) -> f64 {
    string.causes.iter().find(|share| share.cause == cause).map_or(0.0, |share| share.cents)
}

/// Whether an amount is beyond its doubt and beyond what can be set.
fn counts(amount: Estimate, step_mm: f64) -> bool {
    amount.value.abs() > SURE * amount.sd && amount.value.abs() > step_mm
}

fn replace_strings(bench: &Bench) -> Result<Option<Job>, PhysicsError> {
    let strings = strings_where(bench, |string| string.is_suspect);
    if strings.is_empty() {
        return Ok(None);
    }
    let errors_cents = with_changed(bench, &strings, |string| {
        let new = bench.cases.strings[string].setup.properties;
        bench.model_after(string, |setup, _| setup.properties = new)
    })?;
    let named = strings_words(&numbers(&strings));
    let text = format!(
        "Replace {named} first and read again: no setup explains its readings, so that nothing else should be \
         judged by them."
    );
    let work = work::REPLACE_STRING * strings.len() as f64;
    Ok(Some(Job {
        kind: RemedyKind::ReplaceString,
        text,
        work,
        strings: numbers(&strings),
        saddle_moves_mm: None,
        errors_cents,
    }))
}

fn file_slots(bench: &Bench) -> Result<Option<Job>, PhysicsError> {
    let is_high = |string: &DiagnosedString| {
        let is_heard = share_cents(string, Cause::NutSlot) >= SLOT_HEARD_CENTS;
        !string.is_suspect && string.is_slot_high && is_heard
    };
    let strings = strings_where(bench, is_high);
    if strings.is_empty() {
        return Ok(None);
    }
    let errors_cents = with_changed(bench, &strings, |string| {
        let right = bench.cases.strings[string].setup.nut_height;
        bench.after(string, |setup, _| setup.nut_height = right)
    })?;
    let amounts: Vec<f64> =
        strings.iter().map(|&string| bench.found.strings[string].slot_higher_mm.value).collect();
    let named = numbers(&strings);
    let text =
        format!("File nut slots, heights over fret 1 down by: {}.", amounts_words(&named, &amounts, false));
    let work = work::SLOT * strings.len() as f64;
    Ok(Some(Job {
        kind: RemedyKind::FileNutSlots,
        text,
        work,
        strings: named,
        saddle_moves_mm: None,
        errors_cents,
    }))
}

fn set_action(
    bench: &Bench,
    kind: RemedyKind,
    wanted: impl Fn(f64) -> bool,
) -> Result<Option<Job>, PhysicsError> {
    let is_off = |string: &DiagnosedString| {
        let off = string.action_higher_mm;
        !string.is_suspect && wanted(off.value) && counts(off, HEIGHT_STEP_MM)
    };
    let strings = strings_where(bench, is_off);
    if strings.is_empty() {
        return Ok(None);
    }
    let errors_cents = with_changed(bench, &strings, |string| {
        let right = bench.cases.strings[string].setup.gap_at_twelfth_mm;
        bench.after(string, |setup, _| setup.gap_at_twelfth_mm = right)
    })?;
    let amounts: Vec<f64> =
        strings.iter().map(|&string| bench.found.strings[string].action_higher_mm.value).collect();
    let named = numbers(&strings);
    let verb = if kind == RemedyKind::LowerAction { "Lower" } else { "Raise" };
    let text = format!("{verb} the action over fret 12 by: {}.", amounts_words(&named, &amounts, false));
    Ok(Some(Job { kind, text, work: work::ACTION, strings: named, saddle_moves_mm: None, errors_cents }))
}

fn set_relief(bench: &Bench) -> Result<Option<Job>, PhysicsError> {
    let now = bench.found.relief_mm;
    let right_mm = bench.checked.plan().instrument.relief_mm;
    let off = Estimate { value: now.value - right_mm, sd: now.sd };
    if !counts(off, RELIEF_STEP_MM) {
        return Ok(None);
    }
    let all: Vec<usize> = (0..bench.strings()).collect();
    let errors_cents =
        with_changed(bench, &all, |string| bench.after(string, |setup, _| setup.relief_mm = right_mm))?;
    let text = format!("Set the relief from about {:.2} mm to {right_mm:.2} mm.", now.value);
    Ok(Some(Job {
        kind: RemedyKind::SetRelief,
        text,
        work: work::RELIEF,
        strings: numbers(&all),
        saddle_moves_mm: None,
        errors_cents,
    }))
}

fn correct_frets(bench: &Bench) -> Result<Vec<Job>, PhysicsError> {
    let all: Vec<usize> = (0..bench.strings()).collect();
    bench
        .found
        .frets
        .iter()
        .map(|fret| {
            let errors_cents = with_changed(bench, &all, |string| {
                let right_mm = bench.cases.strings[string].setup.fret_mm[fret.index];
                bench.after(string, |setup, _| setup.fret_mm[fret.index] = right_mm)
            })?;
            let toward = if fret.shift_mm > 0.0 { "nut" } else { "bridge" };
            let text = format!(
                "Move the crown of fret {} by {:.2} mm toward the {toward} (file its crown there, or set it anew).",
                fret.index + 1,
                fret.shift_mm.abs()
            );
            Ok(Job {
                kind: RemedyKind::CorrectFret,
                text,
                work: work::FRET,
                strings: numbers(&all),
                saddle_moves_mm: None,
                errors_cents,
            })
        })
        .collect()
}
