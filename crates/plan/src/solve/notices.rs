//! What the user should know about a result.

use std::fmt::Write;

use crestline_physics::Contacts;
use crestline_physics::fit::Setbacks;

use super::Fitted;
use super::prepare::{Prepared, PreparedString};
use crate::{
    Alternative, Checked, FitRule, Notice, NutStyle, OtherStrings, Plan, Report, SaddleStyle, Severity,
};

/// Share of the breaking load above which a note, and above which a warning is due.
const NOTE_FRACTION: f64 = 0.60;
const WARN_FRACTION: f64 = 0.75;
/// How near a limit an optimum counts as lying at it, mm.
const AT_LIMIT_MM: f64 = 1e-6;
/// Finger force above which the press depth is hardly a human one, N: a firm press is some 10 N (common practice).
const FIRM_PRESS_N: f64 = 20.0;

/// All notices: those of the plan itself, then those of its strings, then those of the fit.
pub(super) fn notices(
    checked: &Checked,
    prepared: &Prepared,
    fitted: &Fitted,
    report: &Report,
) -> Vec<Notice> {
    let plan = checked.plan();
    let mut notices = checked.notices().to_vec();
    for (index, string) in prepared.strings.iter().enumerate() {
        buzzes(plan, index, string, &mut notices);
        silence(plan, index, string, prepared.counts(index), &mut notices);
        tension(plan, index, string, &mut notices);
        finger_force(plan, index, string, &mut notices);
    }
    for (index, (own, set)) in checked.alternatives().iter().zip(&prepared.alternatives).enumerate() {
        notices.extend(of_alternative(&plan.alternatives[index], index, own.plan(), &set.strings, prepared));
    }
    limits(plan, prepared, fitted, &mut notices);
    blank(plan, fitted, &mut notices);
    for (words, setbacks) in [("ideal", &fitted.ideal), ("built", &fitted.built)] {
        if !setbacks.settled {
            let why = edge(plan, prepared, setbacks).unwrap_or_default();
            let text = format!(
                "the search for the {words} setbacks stopped before it came to rest: its last step was {:.4} mm{why}",
                setbacks.last_step_mm
            );
            notices.push(warning("fit", text));
        }
    }
    debug_assert!(report.total_tension_n.is_finite());
    notices
}

/// What is to be known of another set of strings; of another tuning, whose heights are the plan's own strings', only
/// its tensions and forces.
fn of_alternative(
    alternative: &Alternative,
    place: usize,
    plan: &Plan,
    strings: &[PreparedString],
    prepared: &Prepared,
) -> Vec<Notice> {
    let mut notices = Vec::new();
    for (index, string) in strings.iter().enumerate() {
        if let OtherStrings::Strings(_) = alternative.other {
            buzzes(plan, index, string, &mut notices);
            silence(plan, index, string, prepared.counts(index), &mut notices);
        }
        let moved = match &alternative.other {
            OtherStrings::Strings(_) => true,
            OtherStrings::Pitches(pitches) => pitches.get(index).is_some_and(Option::is_some),
        };
        if moved {
            tension(plan, index, string, &mut notices);
            finger_force(plan, index, string, &mut notices);
        }
    }
    let name = alternative.name.trim();
    let outside = |notice: Notice| Notice {
        path: alternative.outer_path(place, &notice.path).unwrap_or(notice.path),
        text: format!("{name}: {}", notice.text),
        ..notice
    };
    notices.into_iter().map(outside).collect()
}

fn note(path: impl Into<String>, text: impl Into<String>) -> Notice {
    Notice { severity: Severity::Note, path: path.into(), text: text.into() }
}

fn warning(path: impl Into<String>, text: impl Into<String>) -> Notice {
    Notice { severity: Severity::Warning, path: path.into(), text: text.into() }
}

/// `string 2 (B)`, or `string 2` where its name is its number.
fn called(plan: &Plan, index: usize) -> String {
    let number = (index + 1).to_string();
    let name = &plan.strings[index].name;
    if *name == number { format!("string {number}") } else { format!("string {number} ({name})") }
}

/// Says so where a search stopped because a note of the fit buzzes a little further on: there its error leaps.
fn edge(plan: &Plan, prepared: &Prepared, setbacks: &Setbacks) -> Option<String> {
    /// How far to look beyond the last step, mm.
    const FURTHER_MM: f64 = 0.01;
    let reach_mm = setbacks.last_step_mm + FURTHER_MM;
    let places = setbacks.contacts.iter().enumerate();
    let strings = places.flat_map(|(index, at)| prepared.cases(index).map(move |(_, own)| (index, own, at)));
    for (index, string, at) in strings {
        for (saddle_mm, nut_mm) in [(reach_mm, 0.0), (-reach_mm, 0.0), (0.0, reach_mm), (0.0, -reach_mm)] {
            let beyond = Contacts {
                saddle_setback_mm: at.saddle_setback_mm + saddle_mm,
                nut_setback_mm: at.nut_setback_mm + nut_mm,
            };
            let Ok(notes) = string.string.notes(beyond) else { continue };
            if let Some(&fret) = string.frets.iter().find(|&&fret| notes[fret].touches_fret.is_some()) {
                let whose = called(plan, index);
                return Some(format!(
                    "; a little further on {whose} buzzes where it is pressed at fret {}",
                    fret + 1
                ));
            }
        }
    }
    None
}

fn buzzes(plan: &Plan, index: usize, string: &PreparedString, notices: &mut Vec<Notice>) {
    let mut pairs = String::new();
    for (fret, note) in string.notes.iter().enumerate() {
        if let Some(above) = note.touches_fret {
            let comma = if pairs.is_empty() { "" } else { ", " };
            // Writing to a String cannot fail.
            let _ = write!(pairs, "{comma}{} (on {above})", fret + 1);
        }
    }
    if !pairs.is_empty() {
        let text = format!(
            "{} buzzes where it is pressed at fret {pairs}; such notes are left out of the fit",
            called(plan, index)
        );
        notices.push(warning(format!("strings[{index}].action_mm"), text));
    }
}

/// Says so where no note of a string counts, and whether others at its place do.
fn silence(plan: &Plan, index: usize, string: &PreparedString, others: bool, notices: &mut Vec<Notice>) {
    if string.frets.is_empty() {
        let why = if plan.fit.rule == FitRule::Twelfth && !string.twelfth_sounds {
            "its note at fret 12 buzzes"
        } else {
            "every note of the fit buzzes"
        };
        let whose = called(plan, index);
        let text = if others {
            format!("{whose} does not count in the fit: {why}")
        } else {
            format!("no setback is proposed for {whose}: {why}")
        };
        notices.push(warning(format!("strings[{index}].action_mm"), text));
    }
}

fn tension(plan: &Plan, index: usize, string: &PreparedString, notices: &mut Vec<Notice>) {
    let Some(load_n) = string.breaking_load_n else { return };
    let fraction = string.open.tension_n / load_n;
    if fraction <= NOTE_FRACTION {
        return;
    }
    let path = format!("strings[{index}].core.tensile_mpa");
    let pull = format!("{} pulls {:.1} N at pitch", called(plan, index), string.open.tension_n);
    let percent = 100.0 * fraction;
    notices.push(if fraction > 1.0 {
        warning(path, format!("{pull}, more than its breaking load of {load_n:.1} N: it would break"))
    } else if fraction > WARN_FRACTION {
        warning(path, format!("{pull}, {percent:.0} % of its breaking load: it may break while it is tuned"))
    } else {
        note(path, format!("{pull}, {percent:.0} % of its breaking load"))
    });
}

fn finger_force(plan: &Plan, index: usize, string: &PreparedString, notices: &mut Vec<Notice>) {
    let forces = string.notes.iter().map(|note| note.finger_force_n).enumerate();
    let Some((fret, force_n)) = forces.max_by(|a, b| a.1.total_cmp(&b.1)) else { return };
    if force_n > FIRM_PRESS_N {
        let text = format!(
            "pressing {} to fret {} this deep takes {force_n:.0} N, more than a finger gives",
            called(plan, index),
            fret + 1
        );
        notices.push(note("pressing.depth_mm", text));
    }
}

fn limits(plan: &Plan, prepared: &Prepared, fitted: &Fitted, notices: &mut Vec<Notice>) {
    let at = |value: f64, travel: [f64; 2]| travel.iter().any(|limit| (value - limit).abs() < AT_LIMIT_MM);
    for (words, setbacks) in [("ideal", &fitted.ideal), ("built", &fitted.built)] {
        let same = words == "built" && plan.saddle.style == SaddleStyle::Separate;
        for (index, contact) in setbacks.contacts.iter().enumerate() {
            if same || !prepared.counts(index) {
                continue;
            }
            let mut say = |path: &str, what: &str, value: f64| {
                let text =
                    format!("the {words} {what} of {} is at its limit, {value:.2} mm", called(plan, index));
                notices.push(note(path, text));
            };
            if at(contact.saddle_setback_mm, plan.saddle.travel_mm) {
                say("saddle.travel_mm", "saddle setback", contact.saddle_setback_mm);
            }
            if plan.nut.style != NutStyle::Plain && at(contact.nut_setback_mm, plan.nut.travel_mm) {
                say("nut.travel_mm", "nut setback", contact.nut_setback_mm);
            }
        }
    }
}

fn blank(plan: &Plan, fitted: &Fitted, notices: &mut Vec<Notice>) {
    if fitted.built.fits {
        return;
    }
    let saddle = &plan.saddle;
    match fitted.built.needed_half_width_mm {
        Some(half_width_mm) if saddle.style == SaddleStyle::Shaped => {
            // Rounded up, so that a blank of the thickness said is thick enough.
            let needed_mm = (100.0 * 2.0 * (half_width_mm + saddle.edge_margin_mm)).ceil() / 100.0;
            let text = format!(
                "the blank is {:.2} mm too thin for the ideal crests; {needed_mm:.2} mm would do. The crests shown \
                 are the best that fit",
                needed_mm - saddle.thickness_mm
            );
            notices.push(warning("saddle.thickness_mm", text));
        }
        _ => notices.push(warning(
            "saddle.travel_mm",
            "no saddle of this style keeps every crest within the travel; the nearest is shown",
        )),
    }
}
