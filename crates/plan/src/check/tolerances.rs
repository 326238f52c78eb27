//! Checks of the key `tolerances`.

use super::checker::Checker;
use crate::limits::{Range, tolerance as most};
use crate::{OwnTolerance, Plan, StringTolerance, Tolerances};

pub(super) fn tolerances(checker: &mut Checker, plan: &Plan) {
    let Some(tolerances) = &plan.tolerances else { return };
    for (path, value, range) in shared(tolerances) {
        checker.range(format_args!("tolerances.{path}"), value, range);
    }
    for (kind, of_kind) in
        [("plain", &tolerances.plain), ("wound", &tolerances.wound), ("polymer", &tolerances.polymer)]
    {
        one_string(checker, &format!("tolerances.{kind}"), of_kind);
    }
    let strings = plan.strings.len();
    for (index, own) in tolerances.strings.iter().enumerate() {
        let path = format!("tolerances.strings[{index}]");
        one_string(checker, &path, &own.over(&tolerances.plain));
        let number = format!("{path}.string");
        if checker.sound_itself("strings") && (own.string == 0 || own.string as usize > strings) {
            checker.fault(&number, own.string, format_args!("1 to {strings}"));
        }
        let again = |other: &OwnTolerance| other.string == own.string;
        if tolerances.strings[..index].iter().any(again) {
            checker.fault(number, format_args!("string {} again", own.string), "every string once at most");
        }
    }
}

fn shared(tolerances: &Tolerances) -> [(&'static str, f64, &'static Range); 15] {
    let Tolerances { neck, pressing, supports, slip, making, .. } = tolerances;
    [
        ("samples", f64::from(tolerances.samples), &most::SAMPLES),
        ("limit_cents", tolerances.limit_cents, &most::LIMIT_CENTS),
        ("reference_cents", tolerances.reference_cents, &most::PITCH_CENTS),
        ("neck.relief_mm", neck.relief_mm, &most::RELIEF_MM),
        ("neck.scale_mm", neck.scale_mm, &most::SCALE_MM),
        ("neck.fret_mm", neck.fret_mm, &most::FRET_MM),
        ("pressing.finger_fraction", pressing.finger_fraction, &most::FINGER),
        ("pressing.depth_fraction", pressing.depth_fraction, &most::DEPTH_FRACTION),
        ("supports.nut", supports.nut, &most::SUPPORT),
        ("supports.fret", supports.fret, &most::SUPPORT),
        ("supports.saddle", supports.saddle, &most::SUPPORT),
        ("slip.head", slip.head, &most::SUPPORT),
        ("slip.tail", slip.tail, &most::SUPPORT),
        ("making.crest_mm", making.crest_mm, &most::MAKING_MM),
        ("making.nut_edge_mm", making.nut_edge_mm, &most::MAKING_MM),
    ]
}

fn one_string(checker: &mut Checker, path: &str, of_string: &StringTolerance) {
    for (key, value, range) in [
        ("core_diameter_mm", of_string.core_diameter_mm, &most::CORE_DIAMETER_MM),
        ("modulus_fraction", of_string.modulus_fraction, &most::FRACTION),
        ("mass_fraction", of_string.mass_fraction, &most::FRACTION),
        ("measured_mass_fraction", of_string.measured_mass_fraction, &most::FRACTION),
        ("measured_stiffness_fraction", of_string.measured_stiffness_fraction, &most::FRACTION),
        ("pitch_cents", of_string.pitch_cents, &most::PITCH_CENTS),
        ("action_first_mm", of_string.action_first_mm, &most::ACTION_MM),
        ("action_twelfth_mm", of_string.action_twelfth_mm, &most::ACTION_MM),
    ] {
        checker.range(format_args!("{path}.{key}"), value, range);
    }
}
