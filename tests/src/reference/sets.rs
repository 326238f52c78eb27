//! Plans whose saddle must suit several sets of strings.

use serde_json::Value;

use super::compared::{Compared, apart, contacts, list, relative};
use super::tally::Tally;
use super::{ERROR_CENTS, LENGTH_MM, RELATIVE};
use super::{json, report};
use crate::places::{files_under, text_of, top};

/// The fewest plans that must be there, so that an empty folder does not pass.
const FEWEST_PLANS: usize = 12;

/// The differences of every set of all plans.
struct Sets {
    direct: Tally,
    ideal_setbacks: Tally,
    ideal_errors: Tally,
    built_setbacks: Tally,
    built_errors: Tally,
    notes: Tally,
    unequal: Vec<String>,
}

impl Sets {
    fn new() -> Self {
        Self {
            direct: Tally::new("sets: pitch and tension (relative)", RELATIVE),
            ideal_setbacks: Tally::new("sets: setbacks alone, mm", LENGTH_MM),
            ideal_errors: Tally::new("sets: errors alone, cents", ERROR_CENTS),
            built_setbacks: Tally::new("sets: built setbacks, mm", LENGTH_MM),
            built_errors: Tally::new("sets: errors built, cents", ERROR_CENTS),
            notes: Tally::new("sets: errors per fret, cents", ERROR_CENTS),
            unequal: Vec::new(),
        }
    }

    fn plan(&mut self, name: &str, found: &Value, expected: &Value) {
        let (sets, wanted) = (list(&found["alternatives"]), list(&expected["alternatives"]));
        self.equal(name, &sets.len().into(), &wanted.len().into());
        for (set, wanted) in sets.iter().zip(wanted) {
            let place = format!("plan {name}, {}", wanted["name"]);
            self.equal(&place, &set["name"], &wanted["name"]);
            self.direct.add(relative(&set["weight"], &wanted["weight"]), place.clone());
            self.direct.add(relative(&set["total_tension_n"], &wanted["total_tension_n"]), place.clone());
            for key in ["rms_cents", "max_cents"] {
                self.built_errors.add(apart(&set[key], &wanted[key]), format!("{place}, {key}"));
            }
            self.equal(&place, &list(&set["strings"]).len().into(), &list(&wanted["strings"]).len().into());
            for (string, wanted) in list(&set["strings"]).iter().zip(list(&wanted["strings"])) {
                self.string(&format!("{place}, string {}", wanted["string"]), string, wanted);
            }
        }
    }

    fn string(&mut self, place: &str, found: &Value, wanted: &Value) {
        for key in ["frequency_hz", "tension_n"] {
            self.direct.add(relative(&found[key], &wanted[key]), format!("{place}, {key}"));
        }
        let loads = apart(&found["breaking_fraction"], &wanted["breaking_fraction"]);
        self.direct.add(loads, format!("{place}, load"));
        contacts(&mut self.ideal_setbacks, &mut self.ideal_errors, place, "ideal", found, wanted);
        contacts(&mut self.built_setbacks, &mut self.built_errors, place, "built", found, wanted);
        let columns = &wanted["frets"];
        self.equal(place, &list(&found["frets"]).len().into(), &list(&columns["none_cents"]).len().into());
        for (index, fret) in list(&found["frets"]).iter().enumerate() {
            for key in ["none_cents", "ideal_cents", "built_cents"] {
                self.notes.add(
                    apart(&fret[key], &columns[key][index]),
                    format!("{place}, fret {} {key}", index + 1),
                );
            }
            self.equal(place, &fret["touches_fret"], &columns["touches_fret"][index]);
        }
    }

    fn equal(&mut self, place: &str, found: &Value, wanted: &Value) {
        if found != wanted {
            self.unequal.push(format!("{place}: found {found}, expected {wanted}"));
        }
    }

    fn tallies(&mut self) -> [&mut Tally; 6] {
        [
            &mut self.direct,
            &mut self.ideal_setbacks,
            &mut self.ideal_errors,
            &mut self.built_setbacks,
            &mut self.built_errors,
            &mut self.notes,
        ]
    }
}

#[test]
fn plans_with_several_sets_come_out_as_computed_independently() {
    let folder = top().join("tests/reference");
    let results = files_under(&folder.join("sets/results"), "json");
    assert!(results.len() >= FEWEST_PLANS, "only {} results are there", results.len());
    let (mut compared, mut sets) = (Compared::new(), Sets::new());
    for path in &results {
        let expected = json(path);
        let plan_path = folder.join(expected["plan"].as_str().expect("a result names its plan"));
        let name = plan_path.file_stem().and_then(|stem| stem.to_str()).unwrap_or_default();
        let found = report(&text_of(&plan_path)).unwrap_or_else(|faults| panic!("plan {name}: {faults:?}"));
        compared.plan(name, &found, &expected);
        sets.plan(name, &found, &expected);
    }
    let mut figures = compared.figures();
    figures.extend(sets.tallies().map(|tally| {
        tally.sort();
        tally.figures()
    }));
    println!("{} plans with several sets: count, median, 99 %, largest, allowed", results.len());
    for row in &figures {
        println!("{}", row.row());
    }
    let mut complaints = compared.complaints();
    complaints.extend(sets.tallies().iter().filter_map(|tally| tally.complaint()));
    complaints.append(&mut sets.unequal);
    assert!(complaints.is_empty(), "{}", complaints.join("\n"));
}
