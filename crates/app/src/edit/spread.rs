//! Values of the outer strings, spread in equal steps over the strings between.

use crestline_plan::{Plan, PlanString};

/// What is spread.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Spread {
    /// Action over fret 1.
    ActionFirst,
    /// Action over fret 12.
    ActionTwelfth,
    /// Core diameters.
    Core,
    /// Outside diameters of the wound strings, between the outermost wound ones.
    Outside,
    /// Lengths behind the nut.
    Head,
    /// Lengths behind the saddle.
    Tail,
}

impl Spread {
    /// All of them in the order of the menu.
    pub const ALL: [Self; 6] =
        [Self::ActionFirst, Self::ActionTwelfth, Self::Core, Self::Outside, Self::Head, Self::Tail];

    /// What it is, in words.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::ActionFirst => "action over fret 1",
            Self::ActionTwelfth => "action over fret 12",
            Self::Core => "core diameter",
            Self::Outside => "outside diameter",
            Self::Head => "length behind the nut",
            Self::Tail => "length behind the saddle",
        }
    }

    /// The value of a string, where it has one.
    fn of(self, string: &mut PlanString) -> Option<&mut f64> {
        match self {
            Self::ActionFirst => string.action_mm.first.as_mut(),
            Self::ActionTwelfth => Some(&mut string.action_mm.twelfth),
            Self::Core => Some(&mut string.core.diameter_mm),
            Self::Outside => string.wrap.as_mut().map(|wrap| &mut wrap.outside_mm),
            Self::Head => Some(&mut string.afterlength_mm.head),
            Self::Tail => Some(&mut string.afterlength_mm.tail),
        }
    }

    /// Spreads it: the first and the last string that have the value keep theirs.
    pub fn spread(self, plan: &mut Plan) {
        let mut values: Vec<&mut f64> =
            plan.strings.iter_mut().filter_map(|string| self.of(string)).collect();
        let (Some(first), Some(last)) = (values.first().map(|v| **v), values.last().map(|v| **v)) else {
            return;
        };
        let steps = values.len().saturating_sub(1);
        for (i, value) in values.iter_mut().enumerate() {
            if i > 0 && i < steps {
                **value = to_a_thousandth(first + (last - first) * i as f64 / steps as f64);
            }
        }
    }
}

/// The length to 0.001 mm, as finely as a builder measures.
fn to_a_thousandth(length_mm: f64) -> f64 {
    (length_mm * 1000.0).round() / 1000.0
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crestline_plan::{example, read};

    #[test]
    fn outer_strings_keep_their_values_and_those_between_get_equal_steps() {
        let mut plan = read(example("steel_six").unwrap().text).unwrap();
        plan.strings[0].action_mm.twelfth = 1.5;
        plan.strings[5].action_mm.twelfth = 2.5;
        Spread::ActionTwelfth.spread(&mut plan);
        let heights: Vec<f64> = plan.strings.iter().map(|string| string.action_mm.twelfth).collect();
        assert_eq!(heights, [1.5, 1.7, 1.9, 2.1, 2.3, 2.5]);
    }

    #[test]
    fn only_wound_strings_share_outside_diameters() {
        let mut plan = read(example("steel_six").unwrap().text).unwrap();
        plan.strings[2].wrap.as_mut().unwrap().outside_mm = 0.6;
        plan.strings[5].wrap.as_mut().unwrap().outside_mm = 1.2;
        let plain = plan.strings[0].clone();
        Spread::Outside.spread(&mut plan);
        let outside = |i: usize| plan.strings[i].wrap.as_ref().unwrap().outside_mm;
        assert_eq!([outside(2), outside(3), outside(4), outside(5)], [0.6, 0.8, 1.0, 1.2]);
        assert_eq!(plan.strings[0], plain);
    }
}
