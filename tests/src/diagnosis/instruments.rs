//! The instruments of `tests/reference/instruments` with their truth and their diagnosis.

use crestline_plan::{Diagnosis, Priors, RemedyKind, StringDiagnosis, check, diagnose, read};
use serde_json::Value;

use crate::places::{files_under, text_of, top};

/// An instrument, its truth and what was found.
pub struct Tried {
    pub kind: String,
    pub bad_fret: Option<Fault>,
    pub high_slots: Vec<Fault>,
    pub strings: Vec<StringTried>,
    pub diagnosis: Diagnosis,
}

/// A fret or a string at fault, and by how many cents.
#[derive(Clone, Copy)]
pub struct Fault {
    pub number: u32,
    pub cents: f64,
}

/// A string, its true moves and what was found.
pub struct StringTried {
    pub is_dead: bool,
    pub found: StringDiagnosis,
    true_saddle_mm: f64,
    true_both_mm: [f64; 2],
}

impl StringTried {
    /// Saddle move found less the true one, in stated standard deviations.
    pub fn saddle_only_in_sd(&self) -> f64 {
        let found = &self.found.saddle_only;
        (found.saddle_move_mm - self.true_saddle_mm) / found.sd_mm
    }

    /// The same of saddle and nut together.
    pub fn with_nut_in_sd(&self) -> [f64; 2] {
        let (found, [saddle_mm, nut_mm]) = (&self.found.saddle_and_nut, self.true_both_mm);
        [
            (found.saddle_move_mm - saddle_mm) / found.saddle_sd_mm,
            (found.nut_move_mm - nut_mm) / found.nut_sd_mm,
        ]
    }
}

impl Tried {
    /// Strings whose slots are to be filed.
    pub fn slots_named(&self) -> Vec<u32> {
        let filing = self.diagnosis.remedies.iter().filter(|remedy| remedy.kind == RemedyKind::FileNutSlots);
        filing.flat_map(|remedy| remedy.strings.clone()).collect()
    }
}

/// Every instrument, diagnosed.
pub fn all() -> Vec<Tried> {
    let folder = top().join("tests/reference/instruments");
    let mut tried = Vec::new();
    for path in files_under(&folder, "json") {
        let entries: Vec<Value> =
            serde_json::from_str(&text_of(&path)).expect("a file of instruments is JSON");
        tried.extend(entries.iter().map(one));
    }
    tried
}

fn one(entry: &Value) -> Tried {
    let origin = entry["origin"].as_str().expect("an instrument says where it comes from");
    let found = read(&entry["plan"].to_string())
        .and_then(|plan| check(&plan))
        .and_then(|checked| diagnose(&checked, &Priors::default()));
    let diagnosis = found.unwrap_or_else(|faults| panic!("{origin}: {}", faults[0]));
    let truth = &entry["truth"];
    let number = |value: &Value| value.as_u64().map(|number| u32::try_from(number).expect("a small number"));
    let fault = |value: &Value, key: &str| {
        let cents = value["cents"].as_f64();
        number(&value[key]).map(|number| Fault { number, cents: cents.expect("a fault has its cents") })
    };
    let dead = number(&truth["dead_string"]["string"]);
    let slots = truth["high_slots"].as_array().expect("high slots are a list");
    let strings = truth["strings"].as_array().expect("strings are a list");
    assert_eq!(strings.len(), diagnosis.strings.len(), "{origin}");
    Tried {
        kind: truth["kind"].as_str().expect("a truth has a kind").to_owned(),
        bad_fret: fault(&truth["bad_fret"], "fret"),
        high_slots: slots.iter().filter_map(|slot| fault(slot, "string")).collect(),
        strings: std::iter::zip(strings, &diagnosis.strings)
            .map(|(truth, found)| string(truth, found, dead))
            .collect(),
        diagnosis,
    }
}

fn string(truth: &Value, found: &StringDiagnosis, dead: Option<u32>) -> StringTried {
    let move_mm = |cure: &str, key: &str| truth[cure][key].as_f64().expect("a move is a number");
    StringTried {
        is_dead: dead == Some(found.string),
        found: found.clone(),
        true_saddle_mm: move_mm("saddle_only", "saddle_move_mm"),
        true_both_mm: [move_mm("saddle_and_nut", "saddle_move_mm"), move_mm("saddle_and_nut", "nut_move_mm")],
    }
}
