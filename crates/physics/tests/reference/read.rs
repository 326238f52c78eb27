//! Plans of the reference and its results, as this crate takes them.

use std::path::{Path, PathBuf};

use crestline_physics::fit::{FitOptions, FitRule, FitString, NutShape, SaddleShape};
use crestline_physics::fretting::{Fixities, NutHeight, Pressing, StringSetup, Tail};
use crestline_physics::neck::{Neck, NeckScale, NeckShape, equal_spacing_mm, lay_out};
use crestline_physics::section::{Core, CoreShape, Overrides, Wrap, string_properties};
use crestline_physics::{Contacts, FrettedString, StringProperties};
use serde_json::Value;

/// Of so many plans one is read.
const EVERY: usize = 7;

/// Plans with their results.
pub fn results() -> Vec<(Value, Value)> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../tests/reference");
    let mut paths: Vec<PathBuf> =
        std::fs::read_dir(folder.join("results")).unwrap().map(|file| file.unwrap().path()).collect();
    paths.sort();
    let read =
        |path: &Path| -> Value { serde_json::from_str(&std::fs::read_to_string(path).unwrap()).unwrap() };
    let some: Vec<_> = paths.iter().step_by(EVERY).map(|path| read(path)).collect();
    assert!(some.len() > 40, "only {} results", some.len());
    some.into_iter().map(|result| (read(&folder.join(result["plan"].as_str().unwrap())), result)).collect()
}

pub fn number(value: &Value) -> f64 {
    value.as_f64().unwrap_or(f64::NAN)
}

pub fn numbers(value: &Value) -> Vec<f64> {
    value.as_array().map_or(Vec::new(), |list| list.iter().map(number).collect())
}

/// A number, or what counts where it is not given.
fn or(value: &Value, otherwise: f64) -> f64 {
    value.as_f64().unwrap_or(otherwise)
}

fn pair(value: &Value, otherwise: [f64; 2]) -> [f64; 2] {
    value.as_array().map_or(otherwise, |list| [number(&list[0]), number(&list[1])])
}

/// A neck with its strings made ready.
pub struct Instrument {
    neck: Neck,
    pub strings: Vec<FrettedString>,
}

impl Instrument {
    pub fn new(plan: &Value, result: &Value) -> Self {
        let neck = lay_out(&shape(plan)).unwrap();
        let entries = plan["strings"].as_array().unwrap();
        let string = |index: usize| {
            let frequency_hz = number(&result["strings"][index]["frequency_hz"]);
            FrettedString::new(setup(plan, &entries[index], &neck, index, frequency_hz)).unwrap()
        };
        let strings = (0..entries.len()).map(string).collect();
        Self { neck, strings }
    }

    pub fn options(&self, plan: &Value) -> FitOptions {
        let saddle = &plan["saddle"];
        FitOptions {
            rule: match plan["fit"]["rule"].as_str() {
                Some("minimax") => FitRule::Minimax,
                Some("twelfth") => FitRule::Twelfth,
                _ => FitRule::LeastSquares,
            },
            saddle: match saddle["style"].as_str().unwrap() {
                "separate" => SaddleShape::Separate,
                "straight" => SaddleShape::Straight,
                "two_piece" => {
                    SaddleShape::TwoPiece { split_after: saddle["split_after"].as_u64().unwrap() as usize }
                }
                _ => SaddleShape::Shaped {
                    half_width_mm: 0.5 * or(&saddle["thickness_mm"], 3.0)
                        - or(&saddle["edge_margin_mm"], 0.4),
                },
            },
            nut: match plan["nut"]["style"].as_str() {
                Some("common") => NutShape::Common,
                Some("shaped") => NutShape::Shaped,
                _ => NutShape::Plain,
            },
            saddle_travel_mm: pair(&saddle["travel_mm"], [-5.0, 15.0]),
            nut_travel_mm: pair(&plan["nut"]["travel_mm"], [0.0, 3.0]),
        }
    }

    /// The strings with the frets that count: those of the fit whose note does not buzz without setbacks.
    pub fn fit_strings(&self, plan: &Value, rule: FitRule) -> Vec<FitString<'_>> {
        let [first, last] = pair(&plan["fit"]["frets"], [1.0, 12.0]).map(|fret| fret as usize);
        let places = self.strings.iter().zip(&self.neck.strings);
        let fitted = places.map(|(string, on_neck)| {
            let notes = string.notes(Contacts::default()).unwrap();
            let sounds = |fret: &usize| notes[*fret].touches_fret.is_none();
            let octave = rule != FitRule::Twelfth || sounds(&11);
            let frets = (first - 1..last).filter(|fret| octave && sounds(fret)).collect();
            FitString::single(string, on_neck.line, frets)
        });
        fitted.collect()
    }
}

fn shape(plan: &Value) -> NeckShape {
    let neck = &plan["instrument"];
    let count = plan["strings"].as_array().unwrap().len();
    let y_mm = |end: &str| match neck["across_mm"].is_object() {
        true => numbers(&neck["across_mm"][end]),
        false => equal_spacing_mm(count, number(&neck["spread_mm"][end])),
    };
    let scale = &neck["scale_mm"];
    NeckShape {
        scale: match scale.as_f64() {
            Some(scale_mm) => NeckScale::Single {
                scale_mm,
                fret_positions_mm: neck["fret_positions_mm"]
                    .is_array()
                    .then(|| numbers(&neck["fret_positions_mm"])),
            },
            None => NeckScale::Fanned {
                bass_mm: number(&scale["bass"]),
                treble_mm: number(&scale["treble"]),
                square_fret: number(&scale["square_fret"]),
            },
        },
        frets: neck["frets"].as_u64().unwrap() as usize,
        nut_y_mm: y_mm("nut"),
        saddle_y_mm: y_mm("saddle"),
    }
}

fn properties(entry: &Value) -> StringProperties {
    let (core, measured) = (&entry["core"], &entry["measured"]);
    let core = Core {
        shape: if core["shape"] == "hex" { CoreShape::Hex } else { CoreShape::Round },
        diameter_mm: number(&core["diameter_mm"]),
        youngs_modulus_gpa: number(&core["youngs_modulus_gpa"]),
        density_kg_m3: number(&core["density_kg_m3"]),
    };
    let wrap = entry["wrap"].as_object().map(|wrap| Wrap {
        outside_mm: number(&wrap["outside_mm"]),
        density_kg_m3: number(&wrap["density_kg_m3"]),
    });
    let measured = Overrides {
        unit_mass_kg_per_m: measured["unit_mass_kg_per_m"].as_f64(),
        axial_stiffness_n: measured["axial_stiffness_n"].as_f64(),
        bending_stiffness_n_mm2: measured["bending_stiffness_n_mm2"].as_f64(),
    };
    string_properties(&core, wrap.as_ref(), &measured).unwrap()
}

fn setup(plan: &Value, entry: &Value, neck: &Neck, index: usize, frequency_hz: f64) -> StringSetup {
    let (on_neck, supports) = (&neck.strings[index], &plan["supports"]);
    let tail = |end: &str| Tail {
        slip: or(&plan["slip"][end], 0.0),
        length_mm: or(&entry["afterlength_mm"][end], 0.0),
    };
    let fixity = |end: &str| or(&supports[end], 0.5);
    StringSetup {
        properties: properties(entry),
        frequency_hz,
        scale_mm: on_neck.line.scale_mm(),
        fret_mm: on_neck.fret_mm.clone(),
        relief_mm: or(&plan["instrument"]["relief_mm"], 0.0),
        nut_height: match plan["instrument"]["zero_fret"] == true {
            true => NutHeight::ZeroFret,
            false => NutHeight::GapAtFirst(number(&entry["action_mm"]["first"])),
        },
        gap_at_twelfth_mm: number(&entry["action_mm"]["twelfth"]),
        pressing: Pressing {
            finger_fraction: or(&plan["pressing"]["finger_fraction"], 0.33),
            depth_mm: or(&plan["pressing"]["depth_mm"], 0.1),
        },
        fixities: Fixities { nut: fixity("nut"), fret: fixity("fret"), saddle: fixity("saddle") },
        head: tail("head"),
        tail: tail("tail"),
        target_octaves: wanted_octaves(plan, index, on_neck.fret_mm.len(), frequency_hz),
    }
}

/// Equal temperament, or the plan's offsets of pitch classes (C first) against the open string's.
fn wanted_octaves(plan: &Value, index: usize, frets: usize, frequency_hz: f64) -> Vec<f64> {
    let targets = &plan["targets"];
    let opened = or(&targets["open_cents"][index], 0.0);
    let key = 69.0 + 12.0 * (frequency_hz / or(&plan["reference_hz"], 440.0)).log2() - opened / 100.0;
    let offset = |fret: usize| or(&targets["pitch_class_cents"][(key.round() as usize + fret) % 12], 0.0);
    (1..=frets).map(|fret| fret as f64 / 12.0 + (offset(fret) - opened) / 1200.0).collect()
}
