//! Whole necks against the independent computation of `tests/reference`: sections, places of frets, open strings, the
//! parts of every note's error, and setbacks of every rule and style, each at the functions of this crate.
//!
//! Every seventh of its plans is read here, enough for all rules, styles and necks; the tests of the whole read them all.

use crestline_physics::fit::{FitRule, FitString, NutShape, SaddleShape, built_setbacks, ideal_setbacks};
use crestline_physics::mode::{bending_length_mm, inharmonicity};
use crestline_physics::near::NearFit;
use crestline_physics::{Contacts, Note};
use serde_json::Value;

use super::read::{Instrument, number, numbers, results};

/// The results hold twelve digits.
const RELATIVE: f64 = 1e-9;
/// The results hold seven decimals of lengths, cents and forces.
const ROUNDED: f64 = 2e-7;
/// A cut saddle is laid out to 0.1 mm and 0.01 mm is printed: a tenth of that again.
const SETBACK_MM: f64 = 1e-3;
/// Cents are printed to 0.1: a hundredth of that.
const ERROR_CENTS: f64 = 1e-3;

fn near(found: f64, wanted: f64, allowed: f64, what: &str) {
    assert!((found - wanted).abs() <= allowed, "{what}: {found} for {wanted}");
}

fn alike(found: f64, wanted: f64, what: &str) {
    near(found, wanted, RELATIVE * wanted.abs(), what);
}

#[test]
fn open_strings_and_notes_are_those_of_the_reference() {
    let mut buzzing = 0;
    for (plan, result) in results() {
        let instrument = Instrument::new(&plan, &result);
        for (index, wanted) in result["strings"].as_array().unwrap().iter().enumerate() {
            let name = format!("{} string {}", result["plan"], index + 1);
            let string = &instrument.strings[index];
            let (setup, open) = (string.setup(), string.open(Contacts::default()).unwrap());
            let properties = setup.properties;
            alike(setup.scale_mm, number(&wanted["scale_mm"]), &name);
            alike(properties.unit_mass_kg_per_m, number(&wanted["unit_mass_kg_per_m"]), &name);
            alike(properties.axial_stiffness_n, number(&wanted["axial_stiffness_n"]), &name);
            alike(properties.bending_stiffness_n_mm2, number(&wanted["bending_stiffness_n_mm2"]), &name);
            alike(open.tension_n, number(&wanted["tension_n"]), &name);
            alike(open.strain, number(&wanted["strain"]), &name);
            let bending_mm = bending_length_mm(properties.bending_stiffness_n_mm2, open.tension_n);
            alike(bending_mm, number(&wanted["bending_length_mm"]), &name);
            let partials = inharmonicity(properties.bending_stiffness_n_mm2, open.tension_n, open.length_mm);
            alike(partials, number(&wanted["inharmonicity"]), &name);
            for (found, wanted) in setup.fret_mm.iter().zip(numbers(&wanted["frets"]["position_mm"])) {
                near(*found, wanted, ROUNDED, &name);
            }
            buzzing += same_notes(&string.notes(Contacts::default()).unwrap(), &wanted["frets"], &name);
        }
    }
    assert!(buzzing > 20, "only {buzzing} notes sound from a higher fret");
}

/// A column of the results, and what it holds of a note.
type Part = (&'static str, fn(&Note) -> f64);

/// How many of them sound from a higher fret.
fn same_notes(notes: &[Note], frets: &Value, name: &str) -> usize {
    let parts: [Part; 6] = [
        ("none_cents", |note| note.error_cents),
        ("length_cents", |note| note.length_cents),
        ("tension_cents", |note| note.tension_cents),
        ("mass_cents", |note| note.mass_cents),
        ("stiffness_cents", |note| note.stiffness_cents),
        ("finger_force_n", |note| note.finger_force_n),
    ];
    for (key, part) in parts {
        let wanted = numbers(&frets[key]);
        assert_eq!(wanted.len(), notes.len(), "{name} {key}");
        for (fret, (note, wanted)) in notes.iter().zip(wanted).enumerate() {
            near(part(note), wanted, ROUNDED, &format!("{name} fret {} {key}", fret + 1));
        }
    }
    let touched = frets["touches_fret"].as_array();
    for (fret, note) in notes.iter().enumerate() {
        let wanted = touched.and_then(|column| column[fret].as_u64());
        assert_eq!(note.touches_fret, wanted.map(|fret| fret as usize), "{name} fret {}", fret + 1);
    }
    touched.map_or(0, |column| column.iter().filter(|fret| !fret.is_null()).count())
}

#[test]
fn setbacks_are_those_of_the_reference() {
    let mut seen = std::collections::BTreeSet::new();
    for (plan, result) in results() {
        let instrument = Instrument::new(&plan, &result);
        let options = instrument.options(&plan);
        seen.insert(format!("{:?}", options.rule));
        seen.insert(format!("{:?}", options.nut));
        seen.insert(format!("{:?}", options.saddle).split(' ').next().unwrap_or_default().to_owned());
        let strings = instrument.fit_strings(&plan, options.rule);
        let ideal = ideal_setbacks(&strings, &options).unwrap();
        let built = built_setbacks(&strings, &options, &ideal).unwrap();
        assert!(ideal.settled && built.settled, "{}", result["plan"]);
        for (key, found, settled) in [("ideal", &ideal, "ideal_settled"), ("built", &built, "built_settled")]
        {
            if result["settled"][key] == false {
                continue;
            }
            for (index, wanted) in result["strings"].as_array().unwrap().iter().enumerate() {
                let name = format!("{} string {} {key}", result["plan"], index + 1);
                let contacts = found.contacts[index];
                if wanted[settled] == true {
                    near(
                        contacts.saddle_setback_mm,
                        number(&wanted[key]["saddle_setback_mm"]),
                        SETBACK_MM,
                        &name,
                    );
                    near(contacts.nut_setback_mm, number(&wanted[key]["nut_setback_mm"]), SETBACK_MM, &name);
                    let column = numbers(&wanted["frets"][format!("{key}_cents")]);
                    let notes = instrument.strings[index].notes(contacts).unwrap();
                    for (note, wanted) in notes.iter().zip(column) {
                        near(note.error_cents, wanted, ERROR_CENTS, &name);
                    }
                }
            }
        }
        if result["settled"]["built"] == true {
            assert_eq!(built.fits, result["saddle"]["fits"].as_bool().unwrap(), "{}", result["plan"]);
            same_lines(&built.lines, &result);
        }
    }
    let every = "Common LeastSquares Minimax Plain Separate Shaped Straight Twelfth TwoPiece";
    let missing: Vec<_> = every.split(' ').filter(|kind| !seen.contains(*kind)).collect();
    assert!(missing.is_empty(), "no plan with {missing:?}, only {seen:?}");
}

fn same_lines(lines: &[[crestline_physics::neck::PlanPoint; 2]], result: &Value) {
    let wanted = result["saddle"]["lines"].as_array().unwrap();
    assert_eq!(lines.len(), wanted.len(), "{}", result["plan"]);
    for ([treble, bass], wanted) in lines.iter().zip(wanted) {
        for (end, key) in [(treble, "treble"), (bass, "bass")] {
            near(end.x_mm, number(&wanted[key]["x"]), SETBACK_MM, &result["plan"].to_string());
            near(end.y_mm, number(&wanted[key]["y"]), SETBACK_MM, &result["plan"].to_string());
        }
    }
}

#[test]
fn a_search_from_near_by_ends_at_the_same_setbacks() {
    let mut searched = 0;
    for (plan, result) in results() {
        let instrument = Instrument::new(&plan, &result);
        let options = instrument.options(&plan);
        // By itself a string's nut edge is on the nominal line or its own; `Minimax` keeps it where it is.
        if options.nut == NutShape::Common
            || (options.rule == FitRule::Minimax && options.nut == NutShape::Shaped)
        {
            continue;
        }
        let strings: Vec<FitString> = instrument.fit_strings(&plan, options.rule);
        for (index, wanted) in result["strings"].as_array().unwrap().iter().enumerate() {
            let (saddle, nut) =
                (number(&wanted["ideal"]["saddle_setback_mm"]), number(&wanted["ideal"]["nut_setback_mm"]));
            let counted = &strings[index].cases[0].frets;
            if wanted["ideal_settled"] == false {
                continue;
            }
            let name = format!("{} string {} near by", result["plan"], index + 1);
            let fit = NearFit {
                rule: options.rule,
                frets: counted.clone(),
                nut_moves: options.nut == NutShape::Shaped,
                saddle_travel_mm: options.saddle_travel_mm,
                nut_travel_mm: options.nut_travel_mm,
            };
            for by_mm in [-0.4, 0.15] {
                let nut_by_mm = if fit.nut_moves { 0.5 * by_mm } else { 0.0 };
                let [low, high] = options.nut_travel_mm;
                let start = Contacts {
                    saddle_setback_mm: saddle + by_mm,
                    nut_setback_mm: if fit.nut_moves { (nut + nut_by_mm).clamp(low, high) } else { nut },
                };
                // A note that buzzes at the start counts in one search and not in the other.
                let notes = instrument.strings[index].notes(start).unwrap();
                if counted.iter().any(|&fret| notes[fret].touches_fret.is_some()) {
                    continue;
                }
                let found = fit.contacts(&instrument.strings[index], start).unwrap();
                near(found.saddle_setback_mm, saddle, SETBACK_MM, &name);
                near(found.nut_setback_mm, nut, SETBACK_MM, &name);
                searched += 1;
            }
        }
    }
    assert!(searched > 100, "only {searched} searches");
}

#[test]
fn a_shaped_blank_that_is_wide_enough_changes_nothing() {
    let mut wide = 0;
    for (plan, result) in results() {
        let instrument = Instrument::new(&plan, &result);
        let options = instrument.options(&plan);
        let SaddleShape::Shaped { half_width_mm } = options.saddle else { continue };
        let strings = instrument.fit_strings(&plan, options.rule);
        let ideal = ideal_setbacks(&strings, &options).unwrap();
        let built = built_setbacks(&strings, &options, &ideal).unwrap();
        let needed_mm = built.needed_half_width_mm.unwrap();
        assert_eq!(built.fits, needed_mm <= half_width_mm, "{}", result["plan"]);
        if built.fits {
            assert_eq!(built.contacts, ideal.contacts, "{}", result["plan"]);
            wide += 1;
        }
    }
    assert!(wide > 2, "only {wide}");
}
