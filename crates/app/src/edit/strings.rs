//! Adding, removing and moving strings: the lists that run beside `strings` move along with it.

use crestline_plan::{OtherStrings, Plan, PlanString, SaddleStyle};

/// The most strings that a plan holds.
pub const MOST_STRINGS: usize = 16;

/// Puts a copy of string `index` behind it.
pub fn duplicate(plan: &mut Plan, index: usize) {
    let Some(string) = plan.strings.get(index).cloned() else { return };
    insert(plan, index + 1, string);
}

/// Puts `string` at `index` and makes room in the lists beside it.
fn insert(plan: &mut Plan, index: usize, string: PlanString) {
    if plan.strings.len() >= MOST_STRINGS {
        return;
    }
    for alternative in &mut plan.alternatives {
        match &mut alternative.other {
            OtherStrings::Strings(strings) => strings.insert(index.min(strings.len()), string.clone()),
            OtherStrings::Pitches(pitches) => pitches.insert(index.min(pitches.len()), None),
        }
    }
    plan.strings.insert(index, string);
    for_lists(plan, |list| list.insert(index.min(list.len()), between(list, index)));
    for number in numbers(plan) {
        if *number as usize > index {
            *number += 1;
        }
    }
    renumber(plan);
}

/// A value for a new entry at `index`: half-way between its neighbours, or one more step past the end.
fn between(list: &[f64], index: usize) -> f64 {
    let at = |i: usize| list.get(i).copied();
    let before = index.checked_sub(1).and_then(at);
    match (before, at(index)) {
        (Some(a), Some(b)) => 0.5 * (a + b),
        (Some(last), None) => index.checked_sub(2).and_then(at).map_or(last, |a| 2.0 * last - a),
        (None, only) => only.unwrap_or_default(),
    }
}

/// Takes string `index` out; the last string stays.
pub fn remove(plan: &mut Plan, index: usize) {
    if plan.strings.len() < 2 || index >= plan.strings.len() {
        return;
    }
    plan.strings.remove(index);
    for alternative in &mut plan.alternatives {
        match &mut alternative.other {
            OtherStrings::Strings(strings) if index < strings.len() => drop(strings.remove(index)),
            OtherStrings::Pitches(pitches) if index < pitches.len() => drop(pitches.remove(index)),
            _ => {}
        }
    }
    for_lists(plan, |list| {
        if index < list.len() {
            list.remove(index);
        }
    });
    plan.readings.retain(|reading| reading.string as usize != index + 1);
    if let Some(tolerances) = &mut plan.tolerances {
        tolerances.strings.retain(|own| own.string as usize != index + 1);
    }
    for number in numbers(plan) {
        if *number as usize > index + 1 {
            *number -= 1;
        }
    }
    renumber(plan);
}

/// Exchanges the strings `a` and `b`; their places across the neck stay.
pub fn swap(plan: &mut Plan, a: usize, b: usize) {
    if a.max(b) >= plan.strings.len() {
        return;
    }
    plan.strings.swap(a, b);
    for alternative in &mut plan.alternatives {
        match &mut alternative.other {
            OtherStrings::Strings(strings) if a.max(b) < strings.len() => strings.swap(a, b),
            OtherStrings::Pitches(pitches) if a.max(b) < pitches.len() => pitches.swap(a, b),
            _ => {}
        }
    }
    for own in numbers(plan) {
        let index = (*own as usize).wrapping_sub(1);
        if index == a {
            *own = number(b);
        } else if index == b {
            *own = number(a);
        }
    }
    if let Some(targets) = &mut plan.targets
        && a.max(b) < targets.open_cents.len()
    {
        targets.open_cents.swap(a, b);
    }
    renumber(plan);
}

/// Names that are mere numbers follow the order; a split stays inside the strings.
fn renumber(plan: &mut Plan) {
    let sets = plan.alternatives.iter_mut().filter_map(|alternative| match &mut alternative.other {
        OtherStrings::Strings(strings) => Some(strings),
        OtherStrings::Pitches(_) => None,
    });
    let all = std::iter::once(&mut plan.strings).chain(sets);
    for (index, string) in all.flat_map(|strings| strings.iter_mut().enumerate()) {
        if string.name.parse::<u32>().is_ok() {
            string.name = (index + 1).to_string();
        }
    }
    let last = number(plan.strings.len().saturating_sub(2)).max(1);
    match plan.saddle.split_after {
        Some(after) if after > last => plan.saddle.split_after = Some(last),
        None if plan.saddle.style == SaddleStyle::TwoPiece => plan.saddle.split_after = Some(last),
        _ => {}
    }
}

fn number(index: usize) -> u32 {
    u32::try_from(index + 1).unwrap_or(u32::MAX)
}

/// The string numbers that stand in lists of their own: readings, and strings' own tolerances.
fn numbers(plan: &mut Plan) -> impl Iterator<Item = &mut u32> {
    let readings = plan.readings.iter_mut().map(|reading| &mut reading.string);
    let own = plan.tolerances.iter_mut().flat_map(|tolerances| &mut tolerances.strings);
    readings.chain(own.map(|own| &mut own.string))
}

/// The lists that hold one value a string.
fn for_lists(plan: &mut Plan, mut change: impl FnMut(&mut Vec<f64>)) {
    if let Some(across) = &mut plan.instrument.across_mm {
        change(&mut across.nut);
        change(&mut across.saddle);
    }
    if let Some(built) = &mut plan.as_built {
        change(&mut built.saddle_setback_mm);
        change(&mut built.nut_setback_mm);
    }
    if let Some(targets) = &mut plan.targets {
        change(&mut targets.open_cents);
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crestline_plan::{
        Alternative, AsBuilt, OwnTolerance, Reading, ReadingKind, Tolerances, check, example, read,
    };

    fn mandolin() -> Plan {
        let mut plan = read(example("mandolin").unwrap().text).unwrap();
        let setbacks: Vec<f64> = (1..=8).map(f64::from).collect();
        plan.as_built = Some(AsBuilt { nut_setback_mm: vec![0.0; 8], saddle_setback_mm: setbacks });
        let reading =
            |string| Reading { string, fret: 12, kind: ReadingKind::Fretted, cents: f64::from(string) };
        plan.readings = (1..=8).map(reading).collect();
        let own =
            |string| OwnTolerance { string, pitch_cents: Some(f64::from(string)), ..OwnTolerance::default() };
        plan.tolerances = Some(Tolerances { strings: (1..=8).map(own).collect(), ..Tolerances::default() });
        plan.alternatives = vec![
            Alternative::new("set", OtherStrings::Strings(plan.strings.clone())),
            Alternative::new("tuning", OtherStrings::Pitches(vec![None; 8])),
        ];
        plan
    }

    #[test]
    fn a_copy_finds_room_between_its_neighbours() {
        let mut plan = mandolin();
        duplicate(&mut plan, 2);
        assert_eq!(plan.strings.len(), 9);
        assert!(check(&plan).is_ok(), "the lists beside the strings have grown too");
        assert_eq!(plan.as_built.unwrap().saddle_setback_mm[3], 3.5);
        let numbers: Vec<u32> = plan.readings.iter().map(|reading| reading.string).collect();
        assert_eq!(numbers, [1, 2, 3, 5, 6, 7, 8, 9], "readings stay with their strings");
    }

    #[test]
    fn a_copy_of_the_last_string_goes_one_step_further() {
        let mut plan = mandolin();
        let across = plan.instrument.across_mm.clone().unwrap().saddle;
        duplicate(&mut plan, 7);
        let after = plan.instrument.across_mm.unwrap().saddle;
        assert!((after[8] - (2.0 * across[7] - across[6])).abs() < 1e-12);
    }

    #[test]
    fn a_removed_string_takes_what_belongs_to_it_along() {
        let mut plan = mandolin();
        remove(&mut plan, 4);
        assert_eq!(plan.strings.len(), 7);
        assert!(check(&plan).is_ok());
        assert_eq!(plan.as_built.unwrap().saddle_setback_mm, [1.0, 2.0, 3.0, 4.0, 6.0, 7.0, 8.0]);
        let left: Vec<(u32, f64)> =
            plan.readings.iter().map(|reading| (reading.string, reading.cents)).collect();
        assert_eq!(left[4], (5, 6.0));
        assert_eq!(left.len(), 7);
        let own = &plan.tolerances.unwrap().strings;
        assert_eq!((own.len(), own[4].string, own[4].pitch_cents), (7, 5, Some(6.0)));
    }

    #[test]
    fn the_last_string_stays_and_a_seventeenth_does_not_come() {
        let mut plan = mandolin();
        for _ in 0..20 {
            remove(&mut plan, 0);
        }
        assert_eq!(plan.strings.len(), 1);
        for _ in 0..20 {
            duplicate(&mut plan, 0);
        }
        assert_eq!(plan.strings.len(), MOST_STRINGS);
    }

    #[test]
    fn readings_follow_strings_that_change_places() {
        let mut plan = mandolin();
        swap(&mut plan, 0, 1);
        let first = plan.readings.iter().find(|reading| reading.string == 1).unwrap();
        assert_eq!(first.cents, 2.0);
        let own = &plan.tolerances.as_ref().unwrap().strings;
        assert_eq!((own[1].string, own[1].pitch_cents), (1, Some(2.0)));
        swap(&mut plan, 0, 1);
        assert_eq!(plan, mandolin());
    }
}
