//! Figures for the workshop: setbacks rounded to what a maker sets out with, what the rounding costs, and how much
//! a slip of the hand costs on each string.
//!
//! What is rounded is what a maker sets out, each as a multiple of the step:
//!
//! * **separate**: the setback of every crest;
//! * **straight** and **two-piece**: the setbacks of each line at its two outer strings. The line through the
//!   rounded ends crosses the strings between where it crosses them, so their setbacks are no multiples;
//! * **shaped**: the setbacks of the slot's centre line at the outer strings, then every crest's offset from that
//!   centre line, square to it. The slot is cut first and the crests are filed in it, so an offset is measured from
//!   the slot as it was set out: the rounding of the slot is made good and only that of the offset remains. An offset
//!   never reaches into the margin at the blank's edge;
//! * the **nut**: its one setback, or that of every string; a plain nut has nothing to round.
//!
//! A value within its travel is rounded to the nearest multiple within it, and stands unrounded where there is none.
//!
//! Where the plan names alternatives, errors are those of all sets together, weighted as in the fit; what a slip costs is
//! said of the plan's own strings.

mod rounding;
mod sensitivity;

use crestline_physics::{Contacts, Note};
use serde::{Serialize, Serializer};

use crate::solve::{Prepared, fault, left_over_of, prepare};
use crate::{Checked, ContactReport, Fault, Solution, Word};
use rounding::Rounded;

/// Steps in which a maker sets out.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Step {
    /// 0.05 mm, a vernier calliper's.
    Mm005,
    /// 0.1 mm.
    Mm01,
    /// 0.25 mm.
    Mm025,
    /// 0.5 mm, a good rule's.
    Mm05,
    /// 1/64 in.
    Inch64,
    /// 1/32 in.
    Inch32,
}

impl Step {
    /// The step in millimetres.
    #[must_use]
    pub const fn mm(self) -> f64 {
        match self {
            Self::Mm005 => 0.05,
            Self::Mm01 => 0.1,
            Self::Mm025 => 0.25,
            Self::Mm05 => 0.5,
            Self::Inch64 => 25.4 / 64.0,
            Self::Inch32 => 25.4 / 32.0,
        }
    }
}

impl Serialize for Step {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_str(self.word())
    }
}

/// The figures for the workshop.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Workshop {
    /// Always `crestline-workshop`.
    pub format: &'static str,
    /// Version of these figures.
    pub version: u64,
    /// The step, as a word such as `0.1 mm`.
    pub step: Step,
    /// The step, mm.
    pub step_mm: f64,
    /// One entry a string, string 1 first.
    pub strings: Vec<WorkshopString>,
    /// The lines to be set out, rounded; none for separate pieces.
    pub lines: Vec<WorkshopLine>,
    /// Root mean square of the errors before rounding, over all strings and the frets of the fit, cents.
    pub built_rms_cents: f64,
    /// The same after rounding, cents.
    pub rounded_rms_cents: f64,
    /// What rounding adds to the root mean square, cents. It may fall below zero where the fit made something else
    /// small, or where another fret's share was made small by chance.
    pub rms_change_cents: f64,
    /// Largest absolute error before rounding, cents.
    pub built_max_cents: f64,
    /// Largest absolute error after rounding, cents.
    pub rounded_max_cents: f64,
    /// Largest change of a note of the fit by rounding, absolute, cents.
    pub largest_change_cents: f64,
}

/// One string's figures for the workshop.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct WorkshopString {
    /// String number, 1 first.
    pub string: u32,
    /// Its name.
    pub name: String,
    /// Setbacks and errors as built, before rounding.
    pub built: ContactReport,
    /// Setbacks that come of the rounded values, and their errors.
    pub rounded: ContactReport,
    /// Rounded offset of the crest from the centre line of the rounded slot, square to it and positive away from
    /// the nut, mm; for a shaped saddle only.
    pub slot_offset_mm: Option<f64>,
    /// What rounding adds to this string's root mean square, cents.
    pub rms_change_cents: f64,
    /// Largest change of a note of the fit by rounding, absolute, cents.
    pub largest_change_cents: f64,
    /// What a slip costs.
    pub sensitivity: Sensitivity,
}

/// How errors answer to the contacts, at the setbacks as built: first derivatives by central differences on the
/// model, for a tenth of a millimetre.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Sensitivity {
    /// Change of the fretted errors when the crest moves along the string, root mean square over the frets of the
    /// fit; 0 where none sounds. Cents per 0.1 mm.
    pub crest_cents_per_tenth_mm: f64,
    /// The same for the nut edge.
    pub nut_cents_per_tenth_mm: f64,
    /// Change of the error at fret 12 when the crest moves away from the nut; absent where that note buzzes.
    pub octave_crest_cents_per_tenth_mm: Option<f64>,
    /// Change of the error at fret 12 when the nut edge moves toward the bridge; absent where that note buzzes.
    pub octave_nut_cents_per_tenth_mm: Option<f64>,
}

/// A line to be set out: the crest of a straight piece, or the centre line of a shaped saddle's slot.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct WorkshopLine {
    /// The string on its treble side.
    pub treble_string: u32,
    /// The string on its bass side.
    pub bass_string: u32,
    /// Its setback at the string on the treble side, mm.
    pub treble_setback_mm: f64,
    /// Its setback at the string on the bass side, mm.
    pub bass_setback_mm: f64,
}

/// Rounds a solution of this plan to a step, and works out what that and slips of the hand cost.
///
/// # Errors
/// As [`crate::solve`]; a fault at `strings` where the solution is that of a plan with another number of strings, or
/// another style of saddle.
pub fn workshop(checked: &Checked, solution: &Solution, step: Step) -> Result<Workshop, Vec<Fault>> {
    let prepared = prepare(checked)?;
    let rounded = rounding::round(checked, solution, step)?;
    let strings = (0..prepared.strings.len())
        .map(|index| one_string(&prepared, solution, index, &rounded))
        .collect::<Result<Vec<_>, Fault>>()
        .map_err(|fault| vec![fault])?;
    let built_rms_cents = pooled(&prepared, strings.iter().map(|string| string.built.rms_cents));
    let rounded_rms_cents = pooled(&prepared, strings.iter().map(|string| string.rounded.rms_cents));
    let largest = |of: fn(&WorkshopString) -> f64| strings.iter().map(of).fold(0.0, f64::max);
    Ok(Workshop {
        format: "crestline-workshop",
        version: 1,
        step,
        step_mm: step.mm(),
        lines: rounded.lines,
        built_rms_cents,
        rounded_rms_cents,
        rms_change_cents: rounded_rms_cents - built_rms_cents,
        built_max_cents: largest(|string| string.built.max_cents),
        rounded_max_cents: largest(|string| string.rounded.max_cents),
        largest_change_cents: largest(|string| string.largest_change_cents),
        strings,
    })
}

fn one_string(
    prepared: &Prepared,
    solution: &Solution,
    index: usize,
    rounded: &Rounded,
) -> Result<WorkshopString, Fault> {
    let report = &solution.report.strings[index];
    let built = Contacts {
        saddle_setback_mm: report.built.saddle_setback_mm,
        nut_setback_mm: report.built.nut_setback_mm,
    };
    let notes_at = |contacts| {
        let sets = prepared.cases(index).map(|(_, own)| own.string.notes(contacts));
        sets.collect::<Result<Vec<_>, _>>().map_err(|error| fault(index, &error))
    };
    let (before, after) = (notes_at(built)?, notes_at(rounded.contacts[index])?);
    let mut largest_change_cents = 0.0;
    for (set, (_, own)) in prepared.cases(index).enumerate() {
        for &fret in &own.frets {
            let change = after[set][fret].error_cents - before[set][fret].error_cents;
            largest_change_cents = f64::max(largest_change_cents, change.abs());
        }
    }
    let of_built = contact_report(prepared, index, built, &before);
    let of_rounded = contact_report(prepared, index, rounded.contacts[index], &after);
    let sensitivity = sensitivity::sensitivity(&prepared.strings[index], built);
    Ok(WorkshopString {
        string: report.string,
        name: report.name.clone(),
        built: of_built,
        rounded: of_rounded,
        slot_offset_mm: rounded.slot_offset_mm[index],
        rms_change_cents: of_rounded.rms_cents - of_built.rms_cents,
        largest_change_cents,
        sensitivity: sensitivity.map_err(|error| fault(index, &error))?,
    })
}

/// Root mean square over all strings from that of each, weighted by the frets of the fit that sound.
fn pooled(prepared: &Prepared, rms_cents: impl Iterator<Item = f64>) -> f64 {
    let (mut squares, mut count) = (0.0, 0.0);
    for (index, rms_cents) in rms_cents.enumerate() {
        let frets: f64 = prepared.cases(index).map(|(weight, own)| weight * own.frets.len() as f64).sum();
        squares += frets * rms_cents * rms_cents;
        count += frets;
    }
    if count > 0.0 { f64::sqrt(squares / count) } else { 0.0 }
}

fn contact_report(
    prepared: &Prepared,
    index: usize,
    contacts: Contacts,
    notes: &[Vec<Note>],
) -> ContactReport {
    let sets = prepared.cases(index).zip(notes);
    let (rms_cents, max_cents) =
        left_over_of(sets.map(|((weight, own), notes)| (weight, own, notes.as_slice())));
    ContactReport {
        saddle_setback_mm: contacts.saddle_setback_mm,
        nut_setback_mm: contacts.nut_setback_mm,
        rms_cents,
        max_cents,
    }
}
