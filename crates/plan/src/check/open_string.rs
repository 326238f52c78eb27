//! The open string over the crowns: a plan in which it lies on a fret cannot sound.

use crestline_physics::fretting::crowns;
use crestline_physics::neck::Neck;
use crestline_physics::path::SidePoint;

use super::checker::Checker;
use crate::{Plan, PlanString, limits};

/// Checks that every open string clears every fret, and that its nut slot lies above the fingerboard.
pub(super) fn clearances(checker: &mut Checker, plan: &Plan, neck: &Neck) {
    for (index, string) in plan.strings.iter().enumerate() {
        let path = format!("strings[{index}].action_mm");
        let needed = [&path, "instrument.relief_mm", "instrument.zero_fret", "instrument.fret_height_mm"];
        let fret_mm = neck.strings.get(index).map(|string| &string.fret_mm);
        if let Some(fret_mm) = fret_mm
            && checker.sound(&needed)
        {
            clearance(checker, &path, plan, string, fret_mm);
        }
    }
}

fn clearance(checker: &mut Checker, path: &str, plan: &Plan, string: &PlanString, fret_mm: &[f64]) {
    let crowns = crowns(fret_mm, plan.instrument.relief_mm);
    let Some(line) = OpenLine::new(string, &crowns) else { return };
    let gaps_mm = crowns.iter().map(|crown| line.height_mm(crown.s_mm) - crown.z_mm);
    let touched: Vec<(usize, f64)> = (1..).zip(gaps_mm).filter(|(_, gap_mm)| *gap_mm <= 0.0).collect();
    if !touched.is_empty() {
        return checker.fault(path, touched_words(&touched), "an open string above the crown of every fret");
    }
    let nut_mm = line.height_mm(0.0);
    if nut_mm < -plan.instrument.fret_height_mm {
        let found =
            format!("an open string that would leave the nut {:.2} mm below the fret crowns", -nut_mm);
        let allowed = format!(
            "a nut slot above the fingerboard, at most the fret height of {} mm below the crowns: more action over \
             fret 1 or less over fret 12",
            plan.instrument.fret_height_mm
        );
        checker.fault(path, found, allowed);
    }
}

/// What is said of an open string that touches these frets with these gaps, none of them positive.
fn touched_words(touched: &[(usize, f64)]) -> String {
    let first = touched.first().map_or(0, |(fret, _)| *fret);
    let others = match touched.len() {
        0 | 1 => String::new(),
        2 => " and one other".to_owned(),
        more => format!(" and {} others", more - 1),
    };
    let deepest = touched.iter().min_by(|one, other| one.1.total_cmp(&other.1));
    let depth = match deepest {
        Some((fret, gap_mm)) if *gap_mm < 0.0 => format!(", {:.2} mm too low at fret {fret}", -gap_mm),
        _ => String::new(),
    };
    format!("an open string that lies on fret {first}{others}{depth}")
}

/// The underside of the open string.
struct OpenLine {
    s_mm: f64,
    z_mm: f64,
    slope: f64,
}

impl OpenLine {
    /// Through the gaps over fret 1, or the zero fret, and fret 12.
    fn new(string: &PlanString, crowns: &[SidePoint]) -> Option<Self> {
        let twelfth = crowns.get(11)?;
        let (s_12, z_12) = (twelfth.s_mm, twelfth.z_mm + string.action_mm.twelfth);
        let (s_mm, z_mm) = match string.action_mm.first {
            Some(gap_mm) => crowns.first().map(|crown| (crown.s_mm, crown.z_mm + gap_mm))?,
            None => (0.0, 0.0),
        };
        Some(Self { s_mm, z_mm, slope: (z_12 - z_mm) / (s_12 - s_mm) })
    }

    fn height_mm(&self, s_mm: f64) -> f64 {
        self.z_mm + self.slope * (s_mm - self.s_mm)
    }
}

impl Plan {
    /// Distance of the finger from the nominal nut line when it presses fret 1 of a string whose fret 1 lies at
    /// `first_fret_mm`, mm.
    pub(super) fn finger_at_first_mm(&self, first_fret_mm: f64) -> f64 {
        first_fret_mm * (1.0 - self.pressing.finger_fraction)
    }

    /// The furthest that a nut edge may stand from the nominal nut line on such a string, mm.
    pub(super) fn furthest_nut_mm(&self, first_fret_mm: f64) -> f64 {
        self.finger_at_first_mm(first_fret_mm) - limits::NUT_TO_FINGER_MM
    }
}
