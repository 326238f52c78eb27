//! What of a report is compared with the reference, and within what.

use serde_json::Value;

use super::tally::{Figures, Tally};
use super::{ERROR_CENTS, FORCE_N, LENGTH_MM, RELATIVE};

/// The differences of all plans, kind by kind.
pub struct Compared {
    relative: Tally,
    positions: Tally,
    none: Tally,
    parts: Tally,
    force: Tally,
    ideal_setbacks: Tally,
    ideal_errors: Tally,
    built_setbacks: Tally,
    built_errors: Tally,
    crests: Tally,
    as_built: Tally,
    lines: Tally,
    slants: Tally,
    joint_largest: Tally,
    /// Differences of what is yes or no, or a whole number.
    unequal: Vec<String>,
}

/// What a string holds whose value follows from its section and pitch alone, and the total pull.
const DIRECT: [&str; 9] = [
    "frequency_hz",
    "scale_mm",
    "unit_mass_kg_per_m",
    "axial_stiffness_n",
    "bending_stiffness_n_mm2",
    "tension_n",
    "strain",
    "bending_length_mm",
    "inharmonicity",
];

fn number(value: &Value) -> f64 {
    value.as_f64().unwrap_or(f64::NAN)
}

/// The distance of two numbers, none where both are absent.
pub(super) fn apart(found: &Value, expected: &Value) -> f64 {
    if found.is_null() && expected.is_null() { 0.0 } else { number(found) - number(expected) }
}

pub(super) fn relative(found: &Value, expected: &Value) -> f64 {
    apart(found, expected) / number(expected).abs().max(f64::MIN_POSITIVE)
}

pub(super) fn list(value: &Value) -> &[Value] {
    value.as_array().map_or(&[], Vec::as_slice)
}

impl Compared {
    /// Nothing compared yet.
    pub fn new() -> Self {
        Self {
            relative: Tally::new("section, pitch (relative)", RELATIVE),
            positions: Tally::new("fret positions, mm", LENGTH_MM),
            none: Tally::new("errors, no setback, cents", ERROR_CENTS),
            parts: Tally::new("their four parts, cents", ERROR_CENTS),
            force: Tally::new("finger forces, N", FORCE_N),
            ideal_setbacks: Tally::new("ideal setbacks, mm", LENGTH_MM),
            ideal_errors: Tally::new("errors, ideal, cents", ERROR_CENTS),
            built_setbacks: Tally::new("built setbacks, mm", LENGTH_MM),
            built_errors: Tally::new("errors, built, cents", ERROR_CENTS),
            crests: Tally::new("crests x, y, z, slot, mm", LENGTH_MM),
            as_built: Tally::new("errors as built, cents", ERROR_CENTS),
            lines: Tally::new("ends of saddle lines, mm", LENGTH_MM),
            slants: Tally::new("slant over a line's length, mm", LENGTH_MM),
            joint_largest: Tally::new("largest of a minimax, cents", ERROR_CENTS),
            unequal: Vec::new(),
        }
    }

    /// Compares one plan's report.
    pub fn plan(&mut self, name: &str, found: &Value, expected: &Value) {
        let (strings, wanted) = (list(&found["strings"]), list(&expected["strings"]));
        self.equal(name, "number of strings", &strings.len().into(), &wanted.len().into());
        let is_settled = expected["settled"]["built"].as_bool().unwrap_or(true)
            && wanted.iter().all(|wanted| is_settled(wanted, "built"));
        for (string, wanted) in std::iter::zip(strings, wanted) {
            let place = format!("plan {name}, string {}", wanted["string"]);
            self.string(&place, string, wanted);
            // The slot's line lies by all crests together, and so is settled where they all are.
            if is_settled {
                let [found, wanted] = [string, wanted].map(|string| &string["built"]["slot_offset_mm"]);
                self.crests.add(apart(found, wanted), format!("{place}, slot"));
            }
        }
        self.relative.add(
            relative(&found["total_tension_n"], &expected["total_tension_n"]),
            format!("plan {name}, total_tension_n"),
        );
        self.equal(name, "fits", &found["saddle"]["fits"], &expected["saddle"]["fits"]);
        // Where a joint minimax leaves crests open, the largest error of all is still one number.
        for contacts in ["ideal", "built"] {
            let largest = |strings: &[Value]| {
                strings.iter().map(|string| number(&string[contacts]["max_cents"])).fold(0.0, f64::max)
            };
            self.joint_largest.add(largest(strings) - largest(wanted), format!("plan {name}, {contacts}"));
        }
        if is_settled {
            self.saddle_lines(name, &found["saddle"]["lines"], &expected["saddle"]["lines"]);
        }
    }

    /// Compares a string but for its place in the slot.
    fn string(&mut self, place: &str, found: &Value, wanted: &Value) {
        for key in DIRECT {
            self.relative.add(relative(&found[key], &wanted[key]), format!("{place}, {key}"));
        }
        self.relative.add(
            apart(&found["breaking_fraction"], &wanted["breaking_fraction"]),
            format!("{place}, breaking_fraction"),
        );
        let (ideal_settled, built_settled) = (is_settled(wanted, "ideal"), is_settled(wanted, "built"));
        if ideal_settled {
            contacts(&mut self.ideal_setbacks, &mut self.ideal_errors, place, "ideal", found, wanted);
        }
        if built_settled {
            contacts(&mut self.built_setbacks, &mut self.built_errors, place, "built", found, wanted);
            let (found, wanted) = (&found["built"], &wanted["built"]);
            for axis in ["x", "y", "z"] {
                let difference = apart(&found["crest_mm"][axis], &wanted["crest_mm"][axis]);
                self.crests.add(difference, format!("{place}, crest {axis}"));
            }
        }
        self.frets(place, found, wanted, [ideal_settled, built_settled]);
    }

    /// Compares the frets, which the reference keeps in columns; one that is null throughout is left out there.
    fn frets(&mut self, place: &str, found: &Value, wanted: &Value, [ideal, built]: [bool; 2]) {
        let columns = &wanted["frets"];
        self.equal(
            place,
            "frets",
            &list(&found["frets"]).len().into(),
            &list(&columns["none_cents"]).len().into(),
        );
        for (index, fret) in list(&found["frets"]).iter().enumerate() {
            let at = format!("{place}, fret {}", index + 1);
            let wanted = |key: &str| columns[key].get(index).unwrap_or(&Value::Null);
            let difference = |key: &str| apart(&fret[key], wanted(key));
            self.positions.add(difference("position_mm"), at.clone());
            self.none.add(difference("none_cents"), at.clone());
            for part in ["length_cents", "tension_cents", "mass_cents", "stiffness_cents"] {
                self.parts.add(difference(part), format!("{at}, {part}"));
            }
            self.force.add(difference("finger_force_n"), at.clone());
            if ideal {
                self.ideal_errors.add(difference("ideal_cents"), at.clone());
            }
            if built {
                self.built_errors.add(difference("built_cents"), at.clone());
            }
            self.as_built.add(difference("as_built_cents"), at.clone());
            self.equal(&at, "touches_fret", &fret["touches_fret"], wanted("touches_fret"));
        }
    }

    fn saddle_lines(&mut self, name: &str, found: &Value, wanted: &Value) {
        self.equal(name, "number of lines", &list(found).len().into(), &list(wanted).len().into());
        for (number_of_line, (line, wanted)) in std::iter::zip(list(found), list(wanted)).enumerate() {
            let place = format!("plan {name}, line {}", number_of_line + 1);
            for (end, axis) in [("treble", "x"), ("treble", "y"), ("bass", "x"), ("bass", "y")] {
                self.lines.add(apart(&line[end][axis], &wanted[end][axis]), format!("{place}, {end} {axis}"));
            }
            let along = |axis: &str| number(&wanted["bass"][axis]) - number(&wanted["treble"][axis]);
            let turned = apart(&line["slant_degrees"], &wanted["slant_degrees"]).to_radians();
            self.slants.add(turned * along("x").hypot(along("y")), place);
        }
    }

    fn equal(&mut self, place: &str, what: &str, found: &Value, wanted: &Value) {
        if found != wanted {
            self.unequal.push(format!("{place}: {what} is {found}, expected {wanted}"));
        }
    }

    fn tallies(&mut self) -> [&mut Tally; 14] {
        [
            &mut self.relative,
            &mut self.positions,
            &mut self.none,
            &mut self.parts,
            &mut self.force,
            &mut self.ideal_setbacks,
            &mut self.ideal_errors,
            &mut self.built_setbacks,
            &mut self.built_errors,
            &mut self.crests,
            &mut self.as_built,
            &mut self.lines,
            &mut self.slants,
            &mut self.joint_largest,
        ]
    }

    /// The differences, kind by kind.
    pub fn figures(&mut self) -> Vec<Figures> {
        let figures = self.tallies().map(|tally| {
            tally.sort();
            tally.figures()
        });
        figures.into()
    }

    /// What lies beyond what is allowed.
    pub fn complaints(mut self) -> Vec<String> {
        let mut complaints: Vec<_> = self.tallies().iter().filter_map(|tally| tally.complaint()).collect();
        complaints.append(&mut self.unequal);
        complaints
    }
}

fn is_settled(wanted: &Value, contacts: &str) -> bool {
    wanted[format!("{contacts}_settled")].as_bool().unwrap_or(true)
}

pub(super) fn contacts(
    setbacks: &mut Tally,
    errors: &mut Tally,
    place: &str,
    kind: &str,
    found: &Value,
    wanted: &Value,
) {
    let (found, wanted) = (&found[kind], &wanted[kind]);
    for key in ["saddle_setback_mm", "nut_setback_mm"] {
        setbacks.add(apart(&found[key], &wanted[key]), format!("{place}, {kind} {key}"));
    }
    for key in ["rms_cents", "max_cents"] {
        errors.add(apart(&found[key], &wanted[key]), format!("{place}, {kind} {key}"));
    }
}
