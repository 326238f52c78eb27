//! Checks of pressing, supports, slip, fit, targets, saddle, nut and what is built.

use crestline_physics::neck::Neck;

use super::checker::Checker;
use crate::limits::{self, Range, number_words, quantity_words};
use crate::{NutStyle, Plan, SaddleStyle};

pub(super) fn pressing_and_ends(checker: &mut Checker, plan: &Plan) {
    let (pressing, supports, slip) = (&plan.pressing, &plan.supports, &plan.slip);
    checker.range("pressing.finger_fraction", pressing.finger_fraction, &limits::FINGER_FRACTION);
    checker.range("pressing.depth_mm", pressing.depth_mm, &limits::PRESS_DEPTH_MM);
    for (key, value) in [("nut", supports.nut), ("fret", supports.fret), ("saddle", supports.saddle)] {
        checker.range(format_args!("supports.{key}"), value, &limits::FIXITY);
    }
    for (key, value) in [("head", slip.head), ("tail", slip.tail)] {
        checker.range(format_args!("slip.{key}"), value, &limits::SLIP);
    }
    let height_mm = plan.instrument.fret_height_mm;
    if limits::PRESS_DEPTH_MM.contains(pressing.depth_mm)
        && limits::FRET_HEIGHT_MM.contains(height_mm)
        && pressing.depth_mm > height_mm
    {
        let allowed = format!("0 to the fret height, {height_mm} mm");
        checker.fault("pressing.depth_mm", number_words(pressing.depth_mm), allowed);
    }
}

pub(super) fn fit(checker: &mut Checker, plan: &Plan) {
    let [first, last] = plan.fit.frets;
    let frets = plan.instrument.frets;
    if !checker.sound(&["instrument.frets"]) {
        return;
    }
    for (index, fret) in [first, last].into_iter().enumerate() {
        if !(1..=frets).contains(&fret) {
            checker.fault(format_args!("fit.frets[{index}]"), fret, format_args!("1 to {frets}"));
        }
    }
    if checker.sound(&["fit.frets"]) && first > last {
        checker.fault("fit.frets", format_args!("{first} before {last}"), "the lower fret first");
    }
}

pub(super) fn targets(checker: &mut Checker, plan: &Plan) {
    let Some(targets) = &plan.targets else { return };
    one_a_string(checker, "targets.open_cents", targets.open_cents.len(), plan.strings.len());
    for (key, values) in
        [("open_cents", &targets.open_cents[..]), ("pitch_class_cents", &targets.pitch_class_cents)]
    {
        for (index, &cents) in values.iter().enumerate() {
            checker.range(format_args!("targets.{key}[{index}]"), cents, &limits::TARGET_CENTS);
        }
    }
}

fn one_a_string(checker: &mut Checker, path: &str, found: usize, strings: usize) {
    if checker.sound_itself("strings") && found != strings {
        let allowed = format!("one value a string, {strings} of them");
        checker.fault(path, format_args!("{found} values"), allowed);
    }
}

pub(super) fn saddle(checker: &mut Checker, plan: &Plan) {
    let saddle = &plan.saddle;
    checker.range("saddle.thickness_mm", saddle.thickness_mm, &limits::BLANK_THICKNESS_MM);
    checker.range("saddle.edge_margin_mm", saddle.edge_margin_mm, &limits::EDGE_MARGIN_MM);
    checker.range("saddle.end_margin_mm", saddle.end_margin_mm, &limits::END_MARGIN_MM);
    let half_mm = saddle.thickness_mm / 2.0;
    if checker.sound(&["saddle.thickness_mm", "saddle.edge_margin_mm"]) && saddle.edge_margin_mm >= half_mm {
        let allowed = format!("less than half the blank's thickness, {half_mm} mm");
        checker.fault("saddle.edge_margin_mm", number_words(saddle.edge_margin_mm), allowed);
    }
    travel(checker, "saddle.travel_mm", saddle.travel_mm, &limits::SADDLE_TRAVEL_MM);
    split(checker, plan);
}

fn split(checker: &mut Checker, plan: &Plan) {
    const PATH: &str = "saddle.split_after";
    let strings = plan.strings.len();
    if !checker.sound_itself("strings") || !checker.sound(&[PATH]) {
        return;
    }
    let pieces = plan.saddle.style == SaddleStyle::TwoPiece;
    let allowed = match strings {
        1 => "nothing: a single string cannot be split".to_owned(),
        _ => format!("the last string of the first piece, 1 to {}", strings - 1),
    };
    match plan.saddle.split_after {
        Some(split) if split == 0 || split as usize >= strings => checker.fault(PATH, split, allowed),
        None if pieces && strings == 1 => {
            checker.fault(
                "saddle.style",
                "\"two_piece\" with one string",
                "another style for a single string",
            );
        }
        None if pieces && checker.sound(&["saddle.style"]) => checker.fault(PATH, "nothing", allowed),
        _ => {}
    }
}

fn travel(checker: &mut Checker, path: &str, [low, high]: [f64; 2], range: &Range) {
    checker.range(format_args!("{path}[0]"), low, range);
    checker.range(format_args!("{path}[1]"), high, range);
    if checker.sound(&[path]) && low >= high {
        let found = format!("{} before {}", number_words(low), number_words(high));
        checker.fault(path, found, format_args!("the lower end first, within {}", range.words()));
    }
}

pub(super) fn nut(checker: &mut Checker, plan: &Plan) {
    travel(checker, "nut.travel_mm", plan.nut.travel_mm, &limits::NUT_TRAVEL_MM);
}

pub(super) fn as_built(checker: &mut Checker, plan: &Plan) {
    let Some(built) = &plan.as_built else { return };
    for (key, values_mm, range) in [
        ("saddle_setback_mm", &built.saddle_setback_mm, &limits::AS_BUILT_SADDLE_MM),
        ("nut_setback_mm", &built.nut_setback_mm, &limits::AS_BUILT_NUT_MM),
    ] {
        let path = format!("as_built.{key}");
        one_a_string(checker, &path, values_mm.len(), plan.strings.len());
        for (index, &value_mm) in values_mm.iter().enumerate() {
            checker.range(format_args!("{path}[{index}]"), value_mm, range);
        }
    }
}

/// Checks that nut edges stay in front of the finger at fret 1, and crests behind the last fret.
pub(super) fn contacts(checker: &mut Checker, plan: &Plan, neck: &Neck) {
    let room = Room::of(plan, neck);
    if checker.sound(&["pressing.finger_fraction"]) {
        nut_before_finger(checker, plan, &room);
    }
    let behind = |most_mm: f64| {
        format!(
            "at least {} mm, so that the crest stays behind the last fret",
            number_words((most_mm * 100.0).ceil() / 100.0)
        )
    };
    let least_mm = room.least_saddle_mm.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    if checker.sound(&["saddle.travel_mm"]) && plan.saddle.travel_mm[0] < least_mm {
        checker.fault("saddle.travel_mm[0]", number_words(plan.saddle.travel_mm[0]), behind(least_mm));
    }
    let built = plan.as_built.iter().flat_map(|built| &built.saddle_setback_mm);
    for (index, (&value_mm, &least_mm)) in std::iter::zip(built, &room.least_saddle_mm).enumerate() {
        let path = format!("as_built.saddle_setback_mm[{index}]");
        if checker.sound(&[&path]) && value_mm < least_mm {
            checker.fault(path, number_words(value_mm), behind(least_mm));
        }
    }
}

fn nut_before_finger(checker: &mut Checker, plan: &Plan, room: &Room) {
    let before = |most_mm: f64| {
        let most = quantity_words((most_mm * 100.0).floor() / 100.0, "mm");
        format!("at most {most}, so that the nut stays in front of the finger at fret 1")
    };
    let most_mm = room.most_nut_mm.iter().copied().fold(f64::INFINITY, f64::min);
    let moves = plan.nut.style != NutStyle::Plain;
    if moves && checker.sound(&["nut"]) && plan.nut.travel_mm[1] > most_mm {
        checker.fault("nut.travel_mm[1]", number_words(plan.nut.travel_mm[1]), before(most_mm));
    }
    let built = plan.as_built.iter().flat_map(|built| &built.nut_setback_mm);
    for (index, (&value_mm, &most_mm)) in std::iter::zip(built, &room.most_nut_mm).enumerate() {
        let path = format!("as_built.nut_setback_mm[{index}]");
        if checker.sound(&[&path]) && value_mm > most_mm.max(0.0) {
            checker.fault(path, number_words(value_mm), before(most_mm.max(0.0)));
        }
    }
}

/// Where crest and nut edge of every string may stand at all.
struct Room {
    least_saddle_mm: Vec<f64>,
    most_nut_mm: Vec<f64>,
}

impl Room {
    fn of(plan: &Plan, neck: &Neck) -> Self {
        let last = |fret_mm: &[f64]| fret_mm.last().copied().unwrap_or_default();
        let first = |fret_mm: &[f64]| fret_mm.first().copied().unwrap_or_default();
        Self {
            least_saddle_mm: neck
                .strings
                .iter()
                .map(|string| last(&string.fret_mm) + limits::LAST_FRET_TO_CREST_MM - string.line.scale_mm())
                .collect(),
            most_nut_mm: neck
                .strings
                .iter()
                .map(|string| plan.furthest_nut_mm(first(&string.fret_mm)))
                .collect(),
        }
    }
}
