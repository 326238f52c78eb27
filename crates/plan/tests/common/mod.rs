//! Legal plans of every kind, drawn at random over the whole of the allowed ranges.
#![allow(dead_code)] // Each test program uses its part of this.

use crestline_plan::limits::{self, Range};
use crestline_plan::{
    Across, Action, Afterlength, Alternative, AsBuilt, Core, CoreShape, Datum, Fan, Fit, FitRule, Instrument,
    Measured, Nut, NutStyle, OtherStrings, OwnTolerance, Paper, Pitch, Plan, PlanString, Pressing, Reading,
    ReadingKind, Saddle, SaddleStyle, Scale, Sheet, Slip, Spread, Supports, Targets, Tolerances, Units, Word,
    check, read, read_draft, write,
};
use proptest::collection::vec;
use proptest::option;
use proptest::prelude::*;
use proptest::test_runner::RngSeed;

/// The same cases on every run and machine: a failure here is one anywhere.
pub fn fixed(cases: u32) -> ProptestConfig {
    ProptestConfig {
        cases,
        rng_seed: RngSeed::Fixed(1),
        failure_persistence: None,
        ..ProptestConfig::default()
    }
}

/// Any value of a range, its ends now and then.
fn within(range: Range) -> BoxedStrategy<f64> {
    prop_oneof![8 => range.low..=range.high, 1 => Just(range.low), 1 => Just(range.high)].boxed()
}

/// Any value of a range of positive values, evenly over its orders of magnitude.
fn over_orders(range: Range) -> BoxedStrategy<f64> {
    (range.low.ln()..range.high.ln()).prop_map(move |log| log.exp().clamp(range.low, range.high)).boxed()
}

fn word<T: Word + std::fmt::Debug + Sync>() -> impl Strategy<Value = T> {
    proptest::sample::select(T::ALL)
}

fn text() -> BoxedStrategy<String> {
    prop_oneof![Just(String::new()), "\\PC{0,12}", any::<String>()].boxed()
}

fn pitch() -> BoxedStrategy<Pitch> {
    let notes = ("[A-G][#b]?", 1..6_u8).prop_map(|(name, octave)| Pitch::Note(format!("{name}{octave}")));
    prop_oneof![notes, over_orders(limits::FREQUENCY_HZ).prop_map(Pitch::FrequencyHz)].boxed()
}

fn core() -> BoxedStrategy<Core> {
    let values = (
        over_orders(Range { low: 0.05, high: 4.0, unit: "mm" }),
        over_orders(limits::YOUNGS_MODULUS_GPA),
        over_orders(limits::DENSITY_KG_M3),
        option::of(over_orders(limits::TENSILE_MPA)),
    );
    (word::<CoreShape>(), values, text())
        .prop_map(|(shape, (diameter_mm, modulus, density, tensile_mpa), material)| {
            let (youngs_modulus_gpa, density_kg_m3) = (modulus, density);
            Core { shape, diameter_mm, youngs_modulus_gpa, density_kg_m3, tensile_mpa, material }
        })
        .boxed()
}

fn measured() -> BoxedStrategy<Measured> {
    (
        option::of(over_orders(limits::UNIT_MASS_KG_PER_M)),
        option::of(over_orders(limits::AXIAL_STIFFNESS_N)),
        option::of(over_orders(Range { low: 1e-3, high: 1e6, unit: "N·mm²" })),
    )
        .prop_map(|(unit_mass_kg_per_m, axial_stiffness_n, bending_stiffness_n_mm2)| Measured {
            unit_mass_kg_per_m,
            axial_stiffness_n,
            bending_stiffness_n_mm2,
        })
        .boxed()
}

fn string(zero_fret: bool) -> BoxedStrategy<PlanString> {
    let wrap = option::of((0.01..4.0, over_orders(limits::DENSITY_KG_M3), text()));
    let action = (0.1..3.0, 0.5..6.0);
    let lengths = (within(limits::AFTERLENGTH_MM), within(limits::AFTERLENGTH_MM));
    (text(), pitch(), core(), wrap, measured(), action, lengths)
        .prop_map(move |(name, pitch, core, wrap, measured, (first, twelfth), (head, tail))| {
            let wrap = wrap.map(|(over_mm, density_kg_m3, material)| crestline_plan::Wrap {
                outside_mm: core.diameter_mm * 2.0 / 3.0_f64.sqrt() + over_mm,
                density_kg_m3,
                material,
            });
            let action_mm = Action { first: (!zero_fret).then_some(first), twelfth };
            let afterlength_mm = Afterlength { head, tail };
            PlanString { name, pitch, core, wrap, measured, action_mm, afterlength_mm }
        })
        .boxed()
}

fn scale() -> BoxedStrategy<Scale> {
    let fan =
        (over_orders(limits::SCALE_MM), -0.06..0.06, 0.0..24.0).prop_map(|(treble, wider, square_fret)| {
            let bass = limits::SCALE_MM.high.min(limits::SCALE_MM.low.max(treble * (1.0 + wider)));
            Scale::Fanned(Fan { bass, treble, square_fret })
        });
    prop_oneof![2 => over_orders(limits::SCALE_MM).prop_map(Scale::Single), 1 => fan].boxed()
}

/// Strings from 1.5 to 5 % of the shorter scale apart at the nut, on the fanned necks in particular wide enough for
/// lines of a sane slant.
fn instrument(strings: usize) -> BoxedStrategy<Instrument> {
    let heights = (within(Range { low: 0.0, high: 0.5, unit: "mm" }), 0.5..3.0_f64);
    let spread = (0.02..0.04_f64, 1.0..1.6_f64, any::<bool>(), -1.0..1.0_f64);
    (scale(), 12..=36_u32, any::<bool>(), any::<bool>(), heights, spread)
        .prop_map(
            move |(
                scale,
                frets,
                zero_fret,
                measure,
                (relief_mm, fret_height_mm),
                (gap, widening, by_place, shift),
            )| {
                let (shorter_mm, positions) = match scale {
                    Scale::Single(scale_mm) => {
                        let place = |fret| scale_mm * (1.0 - (-f64::from(fret) / 12.0).exp2()) + shift * 0.05;
                        (scale_mm, measure.then(|| (1..=frets).map(place).collect()))
                    }
                    Scale::Fanned(fan) => (fan.bass.min(fan.treble), None),
                };
                let nut = (gap * shorter_mm * (strings - 1) as f64).min(150.0);
                let spread = Spread { nut, saddle: nut * widening };
                let across = |width: f64| -> Vec<f64> {
                    let middle = (strings - 1) as f64 / 2.0;
                    (0..strings)
                        .map(|n| width * (middle - n as f64) / middle.max(1.0) / 2.0 + shift)
                        .collect()
                };
                let across_mm =
                    by_place.then(|| Across { nut: across(spread.nut), saddle: across(spread.saddle) });
                Instrument {
                    scale,
                    frets,
                    fret_positions_mm: positions,
                    zero_fret,
                    relief_mm,
                    spread_mm: (!by_place).then_some(spread),
                    across_mm,
                    fret_height_mm,
                }
            },
        )
        .boxed()
}

fn travel(range: Range) -> BoxedStrategy<[f64; 2]> {
    let middle = (range.low + range.high) / 3.0;
    (range.low..middle, middle..range.high).prop_map(|(low, high)| [low, high]).boxed()
}

fn saddle(strings: usize) -> BoxedStrategy<Saddle> {
    let blank = (within(limits::BLANK_THICKNESS_MM), 0.0..0.49, within(limits::END_MARGIN_MM));
    (word::<SaddleStyle>(), blank, 1..=15_u32, travel(limits::SADDLE_TRAVEL_MM))
        .prop_map(move |(style, (thickness_mm, margin, end_margin_mm), split, travel_mm)| {
            let edge_margin_mm = margin * thickness_mm;
            let last = u32::try_from(strings - 1).unwrap_or(0);
            let style =
                if last == 0 && style == SaddleStyle::TwoPiece { SaddleStyle::Straight } else { style };
            let split_after = (last > 0).then(|| split.min(last));
            Saddle { style, thickness_mm, edge_margin_mm, end_margin_mm, split_after, travel_mm }
        })
        .boxed()
}

fn reading(strings: usize, frets: u32) -> BoxedStrategy<Reading> {
    let last = u32::try_from(strings).unwrap_or(1);
    (1..=last, 1..=frets, word::<ReadingKind>(), within(limits::READING_CENTS))
        .prop_map(|(string, fret, kind, cents)| {
            let fret = match kind {
                ReadingKind::Fretted => fret,
                ReadingKind::Open => 0,
                ReadingKind::OctaveHarmonic => 12,
            };
            Reading { string, fret, kind, cents }
        })
        .boxed()
}

fn touch() -> BoxedStrategy<(Pressing, Supports, Slip)> {
    let fixities = [(); 3].map(|()| within(limits::FIXITY));
    let slips = [(); 2].map(|()| within(limits::SLIP));
    (0.05..0.9, 0.0..0.5, fixities, slips)
        .prop_map(|(finger_fraction, depth_mm, [nut, fret, saddle], [head, tail])| {
            (Pressing { finger_fraction, depth_mm }, Supports { nut, fret, saddle }, Slip { head, tail })
        })
        .boxed()
}

/// Tolerances with some figures changed, and a string that has its own.
fn tolerances(strings: usize) -> BoxedStrategy<Tolerances> {
    let last = u32::try_from(strings).unwrap_or(1);
    let shares = [(); 4].map(|()| within(limits::tolerance::FRACTION));
    let counts = (any::<u32>(), 64..=32_768_u32, within(limits::tolerance::LIMIT_CENTS));
    (counts, shares, 1..=last, option::of(within(limits::tolerance::ACTION_MM)))
        .prop_map(|((seed, samples, limit_cents), [plain, wound, nut, tail], string, action_first_mm)| {
            let own = OwnTolerance { string, action_first_mm, ..OwnTolerance::default() };
            let mut tolerances = Tolerances { seed, samples, limit_cents, ..Tolerances::default() };
            (tolerances.plain.mass_fraction, tolerances.wound.modulus_fraction) = (plain, wound);
            (tolerances.supports.nut, tolerances.slip.tail) = (nut, tail);
            tolerances.strings.push(own);
            tolerances
        })
        .boxed()
}

type Rest = (Fit, Nut, Option<Targets>, Option<AsBuilt>, Vec<Reading>, (Sheet, Option<Tolerances>));

fn rest(strings: usize, frets: u32) -> BoxedStrategy<Rest> {
    let fit = (word::<FitRule>(), 1..=frets, 1..=frets)
        .prop_map(|(rule, one, other)| Fit { rule, frets: [one.min(other), one.max(other)] });
    let nut = (word::<NutStyle>(), travel(Range { low: -5.0, high: 2.0, unit: "mm" }))
        .prop_map(|(style, travel_mm)| Nut { style, travel_mm });
    let cents = || within(limits::TARGET_CENTS);
    let targets = (vec(cents(), strings), [(); 12].map(|()| cents()))
        .prop_map(|(open_cents, pitch_class_cents)| Targets { open_cents, pitch_class_cents });
    let built = (vec(-5.0..30.0, strings), vec(-5.0..0.5, strings))
        .prop_map(|(saddle_setback_mm, nut_setback_mm)| AsBuilt { saddle_setback_mm, nut_setback_mm });
    let sheet = (word::<Paper>(), word::<Units>(), word::<Datum>()).prop_map(|(paper, units, datum)| Sheet {
        paper,
        units,
        datum,
    });
    let last = (sheet, option::of(tolerances(strings)));
    (fit, nut, option::of(targets), option::of(built), vec(reading(strings, frets), 0..5), last).boxed()
}

/// None to two other sets or tunings, none as often as some.
fn alternatives(strings: usize, zero_fret: bool) -> BoxedStrategy<Vec<Alternative>> {
    let other = prop_oneof![
        vec(string(zero_fret), strings).prop_map(OtherStrings::Strings),
        vec(option::of(pitch()), strings).prop_map(OtherStrings::Pitches),
    ];
    let some = vec((over_orders(limits::ALTERNATIVE_WEIGHT), other), 1..3).prop_map(|others| {
        let alternative =
            |(number, (weight, other))| Alternative { name: format!("set {number}"), weight, other };
        others.into_iter().enumerate().map(alternative).collect()
    });
    prop_oneof![Just(vec![]), some].boxed()
}

/// Any legal plan.
pub fn legal_plan() -> BoxedStrategy<Plan> {
    let sized = prop_oneof![3 => 1..=8_usize, 1 => 9..=16_usize];
    let plan = sized.prop_flat_map(|strings| (Just(strings), instrument(strings))).prop_flat_map(
        |(strings, instrument)| {
            let (zero_fret, frets) = (instrument.zero_fret, instrument.frets);
            (
                (text(), text(), within(limits::REFERENCE_HZ)),
                Just(instrument),
                touch(),
                (vec(string(zero_fret), strings), alternatives(strings, zero_fret)),
                over_orders(limits::ALTERNATIVE_WEIGHT),
                saddle(strings),
                rest(strings, frets),
            )
        },
    );
    let plan = plan.prop_map(
        |((title, notes, reference_hz), instrument, touch, sets, strings_weight, saddle, rest)| {
            let (pressing, supports, slip) = touch;
            let (strings, alternatives) = sets;
            let (fit, nut, targets, as_built, readings, (sheet, tolerances)) = rest;
            Plan {
                title,
                notes,
                instrument,
                pressing,
                supports,
                slip,
                strings,
                strings_weight,
                alternatives,
                reference_hz,
                fit,
                targets,
                saddle,
                nut,
                as_built,
                readings,
                sheet,
                tolerances,
            }
        },
    );
    plan.prop_filter("some fans, frets and actions do not go together", |plan| check(plan).is_ok()).boxed()
}

/// A legal plan with strings that a maker could have put on: steel or polymer, plain or wound, of a section that
/// brings the pitch at 20 to 150 N; relief up to 0.3 mm, actions of 0.2 to 0.8 mm and 1.5 to 4 mm; no alternatives.
pub fn likely_plan() -> BoxedStrategy<Plan> {
    let string = (20.0..150.0_f64, any::<bool>(), any::<bool>(), 0.2..0.8, 1.5..4.0);
    let likely = (legal_plan(), vec(string, 16), 0.0..0.3, 0.0..0.2, 0.2..0.6).prop_map(
        |(mut plan, strings, relief_mm, depth_mm, finger_fraction)| {
            let scale_mm = match plan.instrument.scale {
                Scale::Single(scale_mm) => scale_mm,
                Scale::Fanned(fan) => fan.treble,
            };
            plan.instrument.relief_mm = relief_mm;
            plan.alternatives.clear();
            plan.pressing = Pressing { finger_fraction, depth_mm };
            for (string, (tension_n, steel, wound, first, twelfth)) in plan.strings.iter_mut().zip(strings) {
                // The open string of 650 mm at 330 Hz and its like at other scales.
                let frequency_hz = if wound { 110.0 } else { 330.0 } * 650.0 / scale_mm;
                let unit_mass = tension_n / (2.0 * scale_mm / 1000.0 * frequency_hz).powi(2);
                let (density, modulus) = if steel { (7850.0, 200.0) } else { (1200.0, 5.0) };
                let solid_mm = 2000.0 * (unit_mass / density / std::f64::consts::PI).sqrt();
                string.core = Core::steel(if wound { solid_mm * 0.4 } else { solid_mm });
                (string.core.density_kg_m3, string.core.youngs_modulus_gpa) = (density, modulus);
                (string.wrap, string.pitch) = (None, Pitch::FrequencyHz(frequency_hz));
                string.measured = Measured { unit_mass_kg_per_m: Some(unit_mass), ..Measured::default() };
                string.action_mm.first = string.action_mm.first.map(|_| first);
                string.action_mm.twelfth = twelfth;
            }
            plan
        },
    );
    likely.prop_filter("the parts go together", |plan| check(plan).is_ok()).boxed()
}

/// Checks what must hold of any text: a plan comes out whole, or faults with words do.
pub fn reads_or_says_why(text: &str) {
    match read(text) {
        Ok(plan) => {
            assert!(check(&plan).is_ok());
            assert_eq!(read(&write(&plan)), Ok(plan));
        }
        Err(faults) => {
            assert!(!faults.is_empty());
            assert!(
                faults.iter().all(|fault| !fault.found.is_empty() && !fault.allowed.is_empty()),
                "{faults:?}"
            );
            let mut seen = std::collections::BTreeSet::new();
            assert!(faults.iter().all(|fault| seen.insert(fault.to_string())), "said twice: {faults:#?}");
        }
    }
    if let Ok(draft) = read_draft(text) {
        match check(&draft) {
            Ok(checked) => assert_eq!(read(text).as_ref(), Ok(checked.plan())),
            Err(faults) => assert_eq!(read(text), Err(faults)),
        }
    }
}
