//! Jobs that help, each by itself on the instrument found, and the order to think of them in.

use crestline_physics::Contacts;
use crestline_physics::FrettedString;
use crestline_physics::PhysicsError;
use crestline_physics::diagnose::Diagnosed;

use super::cases::Cases;
use super::report::{open_cents, own_readings, rms};
use super::{not_found, remedies::jobs::jobs};
use crate::{Checked, Fault, ReadingKind, Remedy, RemedyKind};

mod jobs;
mod saddle;
pub(crate) mod words;

/// Errors within this are not worth a job, cents: less than most ears tell in a single note (common practice).
const GOOD_CENTS: f64 = 2.0;
/// A job must lower the root mean square of at least one string by this to be named, cents.
const LEAST_GAIN_CENTS: f64 = 0.25;
/// Standard deviations by which an error must lie beyond that before it is believed: of fifty notes one or two look
/// worse than they are by as much.
const DOUBT: f64 = 1.5;
/// An amount counts where it is this many standard deviations from nothing.
const SURE: f64 = 2.0;

/// The instrument found, on which jobs are tried.
pub(super) struct Bench<'a> {
    pub checked: &'a Checked,
    pub cases: &'a Cases,
    pub found: &'a Diagnosed,
    /// For every string its errors at the frets that were read, cents: those of the model, and of a suspect string
    /// those that were read.
    pub now: Vec<Vec<f64>>,
}

/// A job before it is tried.
pub(super) struct Job {
    pub kind: RemedyKind,
    pub text: String,
    /// How much work it is, in units of filing one nut slot.
    pub work: f64,
    pub strings: Vec<u32>,
    pub saddle_moves_mm: Option<Vec<f64>>,
    pub errors_cents: Vec<Vec<f64>>,
}

/// The remedies for what was found, what helps most for its work first.
pub(super) fn remedies(
    checked: &Checked,
    cases: &Cases,
    found: &Diagnosed,
) -> Result<Vec<Remedy>, Vec<Fault>> {
    let bench = Bench::new(checked, cases, found);
    let before = rms(&bench.now.concat());
    let is_good = found.strings.iter().all(|string| {
        let surely_off = |(error, sd): (&f64, &f64)| error.abs() - DOUBT * sd > GOOD_CENTS;
        !std::iter::zip(&string.errors_cents, &string.errors_sd_cents).any(surely_off)
    });
    let mut tried: Vec<(f64, Remedy)> = jobs(&bench)
        .map_err(not_found)?
        .into_iter()
        .filter(|job| !is_good || matches!(job.kind, RemedyKind::ReplaceString | RemedyKind::FileNutSlots))
        .map(|job| {
            let after = rms(&job.errors_cents.concat());
            let worth = (before - after) / job.work;
            (if job.kind == RemedyKind::ReplaceString { f64::INFINITY } else { worth }, job.done(after))
        })
        .filter(|(worth, remedy)| {
            worth.is_infinite() || gain_on_any_string(&bench, remedy) >= LEAST_GAIN_CENTS
        })
        .collect();
    tried.sort_by(|a, b| b.0.total_cmp(&a.0));
    if tried.is_empty() {
        let is_plainly_good = bench.now.iter().flatten().all(|error| error.abs() <= GOOD_CENTS);
        let reason = match (is_plainly_good, is_good) {
            (true, _) => "all within 2 cents",
            (_, true) => "all within 2 cents as far as the readings can tell; read again what looks worse",
            _ => "no single job would bring any string down by more than a quarter of a cent",
        };
        return Ok(vec![nothing(&bench, before, reason)]);
    }
    Ok(tried.into_iter().map(|(_, remedy)| remedy).collect())
}

/// The most that a job lowers the root mean square of a string, cents.
fn gain_on_any_string(bench: &Bench, remedy: &Remedy) -> f64 {
    let gains = std::iter::zip(&bench.now, &remedy.errors_cents).map(|(now, then)| rms(now) - rms(then));
    gains.fold(0.0, f64::max)
}

fn nothing(bench: &Bench, rms_after_cents: f64, reason: &str) -> Remedy {
    Remedy {
        text: format!("Nothing worth doing: {reason}."),
        kind: RemedyKind::Nothing,
        rms_after_cents,
        saddle_moves_mm: None,
        strings: Vec::new(),
        errors_cents: bench.now.clone(),
    }
}

impl Job {
    fn done(self, rms_after_cents: f64) -> Remedy {
        let Self { kind, text, strings, saddle_moves_mm, errors_cents, .. } = self;
        let text = format!("{text} Root mean square of all strings then: {rms_after_cents:.1} cents.");
        Remedy { text, kind, rms_after_cents, saddle_moves_mm, strings, errors_cents }
    }
}

impl<'a> Bench<'a> {
    fn new(checked: &'a Checked, cases: &'a Cases, found: &'a Diagnosed) -> Self {
        let now = found
            .strings
            .iter()
            .enumerate()
            .map(|(string, entry)| {
                if entry.is_suspect {
                    read_errors(checked, cases, found, string)
                } else {
                    entry.errors_cents.clone()
                }
            })
            .collect();
        Self { checked, cases, found, now }
    }

    /// Errors of a string after a change of the string found and its contacts. A suspect string stays as it is, for
    /// no change explains it.
    pub fn after(
        &self,
        string: usize,
        change: impl FnOnce(&mut crestline_physics::StringSetup, &mut Contacts),
    ) -> Result<Vec<f64>, PhysicsError> {
        let entry = &self.found.strings[string];
        if entry.is_suspect {
            return Ok(self.now[string].clone());
        }
        self.model_after(string, change)
    }

    /// As [`Self::after`], for a suspect string too.
    pub fn model_after(
        &self,
        string: usize,
        change: impl FnOnce(&mut crestline_physics::StringSetup, &mut Contacts),
    ) -> Result<Vec<f64>, PhysicsError> {
        let entry = &self.found.strings[string];
        let (mut setup, mut contacts) = (entry.setup.clone(), entry.contacts);
        change(&mut setup, &mut contacts);
        FrettedString::new(setup)?.errors_cents(contacts, &entry.frets)
    }

    /// The name of a string in words, such as `string 3`.
    pub fn strings(&self) -> usize {
        self.found.strings.len()
    }
}

/// What was read of a string against its open string, one value a fret.
fn read_errors(checked: &Checked, cases: &Cases, found: &Diagnosed, string: usize) -> Vec<f64> {
    let open = open_cents(checked, cases, string);
    let mean = |&fret: &usize| {
        let same: Vec<f64> = own_readings(checked, cases, string)
            .filter(|reading| reading.kind == ReadingKind::Fretted && reading.fret as usize == fret + 1)
            .map(|reading| reading.cents - open)
            .collect();
        same.iter().sum::<f64>() / same.len().max(1) as f64
    };
    found.strings[string].frets.iter().map(mean).collect()
}
