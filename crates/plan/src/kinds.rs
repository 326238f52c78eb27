//! Kinds of instrument to start a plan from: generic measures, a common set of strings, everything to be corrected.

use std::sync::LazyLock;

use serde::Deserialize;

use crate::materials::{SetString, StringMake, StringSet, string_table};
use crate::{
    Across, Action, Afterlength, Core, Instrument, Pitch, Plan, PlanString, Saddle, SaddleStyle, Spread,
    Units, note_frequency_hz,
};

/// The text of the list.
const TEXT: &str = include_str!("../../../assets/materials/kinds.json");

/// A kind of instrument. Pairs of values belong to the treble and the bass side; the strings between have values
/// between.
#[derive(Debug, Clone, Deserialize)]
pub struct Kind {
    /// Its key.
    pub id: String,
    /// Its name.
    pub name: String,
    /// Key of its set of strings.
    set: String,
    /// Nominal scale, mm.
    pub scale_mm: f64,
    /// Number of frets.
    pub frets: u32,
    relief_mm: f64,
    fret_height_mm: f64,
    spread_mm: Pair,
    /// Distance of the two strings of a course where strings come in pairs.
    course_gap_mm: Option<Pair>,
    action_first_mm: [f64; 2],
    action_twelfth_mm: [f64; 2],
    afterlength_mm: Afterlengths,
    saddle: KindSaddle,
    units: String,
}

#[derive(Debug, Clone, Copy, Deserialize)]
struct Pair {
    nut: f64,
    saddle: f64,
}

#[derive(Debug, Clone, Deserialize)]
struct Afterlengths {
    head: [f64; 2],
    tail: f64,
}

#[derive(Debug, Clone, Deserialize)]
struct KindSaddle {
    style: String,
    thickness_mm: f64,
    edge_margin_mm: f64,
}

#[derive(Debug, Deserialize, Default)]
struct Kinds {
    source: String,
    kinds: Vec<Kind>,
}

static KINDS: LazyLock<Kinds> = LazyLock::new(|| serde_json::from_str(TEXT).unwrap_or_default());

/// All kinds in the order of their menu. The list is part of the program, and a test reads it.
#[must_use]
pub fn kinds() -> &'static [Kind] {
    &KINDS.kinds
}

impl Kind {
    /// The kind of this key.
    #[must_use]
    pub fn of(id: &str) -> Option<&'static Self> {
        kinds().iter().find(|kind| kind.id == id)
    }

    /// Its set of strings.
    #[must_use]
    pub fn set(&self) -> Option<&'static StringSet> {
        string_table().set(&self.set)
    }

    /// The open strings, string 1 first, such as `E4 B3 G3 D3 A2 E2`.
    #[must_use]
    pub fn tuning(&self) -> String {
        let notes = self.set().map(|set| set.strings.iter().map(|string| string.note.as_str()).collect());
        notes.map(|notes: Vec<&str>| notes.join(" ")).unwrap_or_default()
    }

    /// Its name as a title.
    #[must_use]
    pub fn title(&self) -> String {
        capital(&self.name)
    }

    /// A plan of this kind.
    #[must_use]
    pub fn plan(&self) -> Plan {
        let strings = self.strings();
        let mut plan = Plan::new(self.instrument(strings.len()), strings);
        plan.title = self.title();
        let set = self.set().map_or("", |set| set.name.as_str());
        plan.notes = format!(
            "Started from the kind “{}” with the set “{set}”. {} Correct what you have measured.",
            self.name, KINDS.source
        );
        plan.saddle = Saddle {
            thickness_mm: self.saddle.thickness_mm,
            edge_margin_mm: self.saddle.edge_margin_mm,
            ..Saddle::of_style(if self.saddle.style == "separate" {
                SaddleStyle::Separate
            } else {
                SaddleStyle::Straight
            })
        };
        if self.units == "inch" {
            plan.sheet.units = Units::Inch;
        }
        plan
    }

    fn instrument(&self, count: usize) -> Instrument {
        let spread = Spread { nut: self.spread_mm.nut, saddle: self.spread_mm.saddle };
        let mut instrument = Instrument::ordinary(self.scale_mm, self.frets, spread);
        instrument.relief_mm = self.relief_mm;
        instrument.fret_height_mm = self.fret_height_mm;
        if let Some(gap) = self.course_gap_mm {
            instrument.spread_mm = None;
            instrument.across_mm = Some(Across {
                nut: pairs_mm(self.spread_mm.nut, gap.nut, count),
                saddle: pairs_mm(self.spread_mm.saddle, gap.saddle, count),
            });
        }
        instrument
    }

    fn strings(&self) -> Vec<PlanString> {
        let Some(set) = self.set() else { return Vec::new() };
        let each = if self.course_gap_mm.is_some() { 2 } else { 1 };
        let last = set.strings.len().saturating_sub(1).max(1) as f64;
        let courses = set.strings.iter().enumerate().flat_map(|(course, entry)| {
            let string = self.string(set, entry, course as f64 / last);
            (0..each).map(move |one| named(string.clone(), &entry.note, one, each))
        });
        courses.collect()
    }

    /// A string of the set, `across` of the way from the treble to the bass side.
    fn string(&self, set: &StringSet, entry: &SetString, across: f64) -> PlanString {
        let first = Some(between(self.action_first_mm, across));
        let action_mm = Action { first, twelfth: between(self.action_twelfth_mm, across) };
        let mut string =
            PlanString::new(1, Pitch::Note(entry.note.clone()), Core::steel(entry.gauge_mm), action_mm);
        let head = between(self.afterlength_mm.head, across);
        string.afterlength_mm = Afterlength { head, tail: self.afterlength_mm.tail };
        let frequency_hz = note_frequency_hz(&entry.note, crate::defaults::REFERENCE_HZ);
        if let (Some(make), Some(frequency_hz)) = (make(set, entry.wound), frequency_hz) {
            make.string(&mut string, entry.gauge_mm, self.scale_mm, frequency_hz);
        }
        string
    }
}

fn make(set: &StringSet, wound: bool) -> Option<StringMake> {
    let table = string_table();
    if !wound {
        return table.material(&set.plain_material).map(StringMake::Plain);
    }
    let construction = table.construction(set.construction.as_deref()?)?;
    Some(StringMake::Wound(construction, table.material(set.wrap_material.as_deref()?)?))
}

/// The string under its note's name; the two of a pair are told apart.
fn named(mut string: PlanString, note: &str, one: usize, each: usize) -> PlanString {
    string.name = match (each, one) {
        (1, _) => note.to_owned(),
        (_, 0) => format!("{note} a"),
        _ => format!("{note} b"),
    };
    string
}

/// A value between those of the outer strings, to 0.01.
fn between([treble, bass]: [f64; 2], across: f64) -> f64 {
    ((treble + (bass - treble) * across) * 100.0).round() / 100.0
}

/// Places of strings in pairs whose outer strings are `width_mm` apart, the treble side first, to 0.001 mm.
fn pairs_mm(width_mm: f64, gap_mm: f64, count: usize) -> Vec<f64> {
    let gaps = (count / 2).saturating_sub(1).max(1) as f64;
    let pitch_mm = (width_mm - gap_mm) / gaps;
    let place_mm = |i: usize| 0.5 * width_mm - pitch_mm * (i / 2) as f64 - gap_mm * (i % 2) as f64;
    (0..count).map(|i| (place_mm(i) * 1000.0).round() / 1000.0).collect()
}

fn capital(text: &str) -> String {
    let mut letters = text.chars();
    letters.next().map_or_else(String::new, |first| first.to_uppercase().chain(letters).collect())
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crate::{check, read, solve, write};

    /// Tension of a single string of these instruments, N: common practice, from a soprano ukulele's to a steel guitar's
    /// or a bass's; a plausibility check.
    const TENSION_N: [f64; 2] = [15.0, 260.0];
    /// Share of the breaking load above which the program warns.
    const WARNED: f64 = 0.75;

    #[test]
    fn every_kind_is_a_legal_plan_without_notices_that_can_be_strung() {
        assert!(kinds().len() >= 12);
        for kind in kinds() {
            let plan = kind.plan();
            let checked = check(&plan).unwrap();
            assert_eq!(checked.notices(), [], "{}", kind.id);
            assert_eq!(read(&write(&plan)).unwrap(), plan, "{}", kind.id);
            for string in solve(&checked).unwrap().report.strings {
                assert!(
                    string.tension_n > TENSION_N[0] && string.tension_n < TENSION_N[1],
                    "{}: {}",
                    kind.id,
                    string.tension_n
                );
                assert!(
                    string.breaking_fraction.is_none_or(|share| share < WARNED),
                    "{}, string {}",
                    kind.id,
                    string.string
                );
            }
        }
    }

    /// Values worked out by hand from the list: 1.78 and 2.29 mm at the outer strings, six strings.
    #[test]
    fn outer_values_are_spread_over_the_strings_between() {
        let plan = Kind::of("steel_string").unwrap().plan();
        let twelfth: Vec<f64> = plan.strings.iter().map(|string| string.action_mm.twelfth).collect();
        assert_eq!(twelfth, [1.78, 1.88, 1.98, 2.09, 2.19, 2.29]);
        assert_eq!(Kind::of("steel_string").unwrap().tuning(), "E4 B3 G3 D3 A2 E2");
    }

    #[test]
    fn pairs_lie_as_in_the_mandolin_example() {
        let example = read(crate::example("mandolin").unwrap().text).unwrap().instrument.across_mm.unwrap();
        let plan = Kind::of("mandolin").unwrap().plan();
        assert_eq!(plan.instrument.across_mm.unwrap(), example);
        assert_eq!(plan.strings.len(), 8);
    }
}
