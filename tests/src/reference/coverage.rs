//! How many plans of each kind the reference holds.

use std::collections::BTreeMap;
use std::fmt::Write;

use serde_json::{Value, json};

const RULES: [&str; 3] = ["least_squares", "twelfth", "minimax"];
const SADDLES: [&str; 4] = ["separate", "shaped", "straight", "two_piece"];
const NUTS: [&str; 3] = ["plain", "common", "shaped"];
const NECKS: [&str; 3] = ["one scale", "measured", "fanned"];
/// The presets with their fixities of nut, fret and saddle, and all others.
const SUPPORTS: [(&str, Option<[f64; 3]>); 5] = [
    ("runs on", Some([0.5, 0.5, 0.5])),
    ("pinned", Some([0.0, 0.0, 0.0])),
    ("clamped", Some([1.0, 1.0, 1.0])),
    ("clamped saddle", Some([0.0, 0.0, 1.0])),
    ("others", None),
];

/// The kinds of a plan: rule, saddle, nut, neck, supports.
type Kinds = [&'static str; 5];

/// Counts of plans by their kinds, and of those with a zero fret.
#[derive(Default)]
pub struct Coverage {
    plans: BTreeMap<Kinds, u32>,
    zero_frets: BTreeMap<Kinds, u32>,
}

/// The name in a list that a plan's word is.
fn among(names: &[&'static str], word: &Value, otherwise: &'static str) -> &'static str {
    let word = word.as_str().unwrap_or(otherwise);
    names.iter().find(|name| **name == word).unwrap_or_else(|| panic!("{word} is none of {names:?}"))
}

fn neck(instrument: &Value) -> &'static str {
    if instrument["scale_mm"].is_object() {
        "fanned"
    } else if instrument["fret_positions_mm"].is_array() {
        "measured"
    } else {
        "one scale"
    }
}

fn supports(given: &Value) -> &'static str {
    let default = json!({"nut": 0.5, "fret": 0.5, "saddle": 0.5});
    let given = if given.is_null() { &default } else { given };
    let fixities = ["nut", "fret", "saddle"].map(|end| given[end].as_f64().expect("a fixity"));
    let preset = SUPPORTS.iter().find(|(_, preset)| preset.is_none_or(|preset| preset == fixities));
    preset.map_or("others", |(name, _)| name)
}

impl Coverage {
    /// Counts a plan.
    pub fn add(&mut self, plan: &Value) {
        let kinds = [
            among(&RULES, &plan["fit"]["rule"], RULES[0]),
            among(&SADDLES, &plan["saddle"]["style"], ""),
            among(&NUTS, &plan["nut"]["style"], NUTS[0]),
            neck(&plan["instrument"]),
            supports(&plan["supports"]),
        ];
        *self.plans.entry(kinds).or_default() += 1;
        if plan["instrument"]["zero_fret"] == true {
            *self.zero_frets.entry(kinds).or_default() += 1;
        }
    }

    /// How many plans are of these kinds; an empty word stands for any.
    fn count(&self, wanted: Kinds) -> u32 {
        count(&self.plans, wanted)
    }

    /// Combinations that no plan has: rule, saddle and nut with every kind of supports, and every kind of neck with
    /// every two of the other kinds.
    pub fn missing(&self) -> Vec<String> {
        let supports = SUPPORTS.map(|(name, _)| name);
        let mut wanted: Vec<Kinds> = Vec::new();
        let any = &[""][..];
        let kinds = |rules: &[&'static str],
                     saddles: &[&'static str],
                     nuts: &[&'static str],
                     necks: &[&'static str],
                     supports: &[&'static str]| {
            let mut all = Vec::new();
            for rule in rules {
                for saddle in saddles {
                    for nut in nuts {
                        for neck in necks {
                            all.extend(
                                supports.iter().map(|support| [*rule, *saddle, *nut, *neck, *support]),
                            );
                        }
                    }
                }
            }
            all
        };
        wanted.extend(kinds(&RULES, &SADDLES, &NUTS, any, &supports));
        wanted.extend(kinds(&RULES, &SADDLES, any, &NECKS, any));
        wanted.extend(kinds(&RULES, any, &NUTS, &NECKS, any));
        wanted.extend(kinds(&RULES, any, any, &NECKS, &supports));
        wanted.extend(kinds(any, &SADDLES, &NUTS, &NECKS, any));
        wanted.extend(kinds(any, &SADDLES, any, &NECKS, &supports));
        wanted.extend(kinds(any, any, &NUTS, &NECKS, &supports));
        let missing = wanted.into_iter().filter(|kinds| self.count(*kinds) == 0);
        missing.map(|kinds| format!("no plan is {}", kinds.join(" "))).collect()
    }

    /// A table of rule, saddle and nut against neck and supports.
    pub fn table(&self) -> String {
        let supports = SUPPORTS.map(|(name, _)| name);
        let mut text = String::from("| rule | saddle | nut | plans |");
        for name in NECKS.iter().chain(&["zero fret"]).chain(&supports) {
            let _ = write!(text, " {name} |");
        }
        text.push_str("\n| --- | --- | --- |");
        text.push_str(&" ---: |".repeat(2 + NECKS.len() + supports.len()));
        text.push('\n');
        for rule in RULES {
            for saddle in SADDLES {
                for nut in NUTS {
                    let row = [rule, saddle, nut, "", ""];
                    let _ =
                        write!(text, "| {} | {} | {nut} | {} |", words(rule), words(saddle), self.count(row));
                    for neck in NECKS {
                        let _ = write!(text, " {} |", self.count([rule, saddle, nut, neck, ""]));
                    }
                    let _ = write!(text, " {} |", count(&self.zero_frets, row));
                    for support in supports {
                        let _ = write!(text, " {} |", self.count([rule, saddle, nut, "", support]));
                    }
                    text.push('\n');
                }
            }
        }
        let sum = |kinds| self.count(kinds);
        let _ = write!(text, "| all | | | {} |", sum(["", "", "", "", ""]));
        for neck in NECKS {
            let _ = write!(text, " {} |", sum(["", "", "", neck, ""]));
        }
        let _ = write!(text, " {} |", count(&self.zero_frets, ["", "", "", "", ""]));
        for support in supports {
            let _ = write!(text, " {} |", sum(["", "", "", "", support]));
        }
        text.push('\n');
        text
    }
}

fn words(name: &str) -> String {
    name.replace('_', " ")
}

/// Sum over the kinds that match; an empty word matches any.
fn count(of: &BTreeMap<Kinds, u32>, wanted: Kinds) -> u32 {
    let matching = of.iter().filter(|(kinds, _)| {
        kinds.iter().zip(wanted).all(|(kind, wanted)| wanted.is_empty() || *kind == wanted)
    });
    matching.map(|(_, plans)| plans).sum()
}

#[test]
fn a_plan_is_counted_once_under_its_kinds() {
    let mut coverage = Coverage::default();
    coverage.add(&json!({
        "instrument": {"scale_mm": {"bass": 1, "treble": 1}, "zero_fret": true},
        "saddle": {"style": "shaped"}, "supports": {"nut": 0, "fret": 0, "saddle": 1}
    }));
    assert_eq!(coverage.count(["", "", "", "", ""]), 1);
    assert_eq!(coverage.count(["least_squares", "shaped", "plain", "fanned", "clamped saddle"]), 1);
    assert_eq!(coverage.count(["", "", "shaped", "", ""]), 0);
    assert!(coverage.missing().contains(&"no plan is minimax straight common  pinned".to_owned()));
}
