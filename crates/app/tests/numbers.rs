//! Lengths, pitches, starting a plan, and help on fields, by role and label without a display.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod common;

use common::{Opened, field, open, order, plan, says, steel_six, type_into};
use crestline_plan::{Pitch, Scale, kinds};
use crestline_window::edit::command::Command;
use crestline_window::edit::spread::Spread;
use crestline_window::units::LengthUnit;
use crestline_window::view::{Group, Page};
use eframe::egui::accesskit::Role;
use eframe::egui::{Key, Modifiers};
use egui_kittest::kittest::{NodeT, Queryable};

fn press(opened: &mut Opened, modifiers: Modifiers, key: Key) {
    opened.key_press_modifiers(modifiers, key);
    opened.run();
}

fn shown(opened: &Opened, name: &str) -> String {
    field(opened, name).value().unwrap_or_default()
}

#[test]
fn one_key_shows_every_length_in_inches_and_changes_nothing() {
    let mut opened = open(steel_six(), None);
    assert_eq!(shown(&opened, "Scale, mm"), "647.7");
    press(&mut opened, Modifiers::COMMAND, Key::M);
    assert_eq!(opened.state().view.unit, LengthUnit::Inches);
    assert_eq!(shown(&opened, "Scale, in"), "25 1/2");
    assert_eq!(shown(&opened, "String 1: core diameter, in"), "0.012");
    assert_eq!(opened.query_all_by_label_contains(", mm").count(), 0, "no field is named in millimetres");
    assert!(says(&opened, "Ideal setback, in") > 0, "the schedule too");
    for page in Page::ALL {
        order(&mut opened, Command::ShowPage(page));
        opened.check_accessibility();
    }
    press(&mut opened, Modifiers::COMMAND, Key::M);
    assert_eq!(shown(&opened, "Scale, mm"), "647.7");
    assert_eq!(plan(&opened), &steel_six());
    assert!(!opened.state().desk.is_changed());
}

#[test]
fn a_length_is_taken_in_any_unit_whatever_the_windows() {
    let mut opened = open(steel_six(), None);
    for (text, scale_mm) in [("25in", 635.0), ("24 3/4\"", 628.65), ("650,5 mm", 650.5), ("640", 640.0)] {
        type_into(&mut opened, "Scale, mm", text);
        assert_eq!(plan(&opened).instrument.scale, Scale::Single(scale_mm), "{text}");
    }
    type_into(&mut opened, "String 1: action over fret 12, mm", "3/32");
    assert_eq!(plan(&opened).strings[0].action_mm.twelfth, 2.38125);
    order(&mut opened, Command::ShowLengthsIn(LengthUnit::Inches));
    type_into(&mut opened, "String 1: core diameter, in", "13 thou");
    assert_eq!(plan(&opened).strings[0].core.diameter_mm, 0.3302);
    type_into(&mut opened, "Relief, in", "0.2mm");
    assert_eq!(plan(&opened).instrument.relief_mm, 0.2);
    type_into(&mut opened, "Relief, in", "0.01");
    assert_eq!(plan(&opened).instrument.relief_mm, 0.254);
}

#[test]
fn typing_back_what_stood_there_gives_the_whole_old_value_back() {
    let mut odd = steel_six();
    odd.strings[0].action_mm.twelfth = 1.777_777;
    let mut opened = open(odd.clone(), None);
    order(&mut opened, Command::ShowLengthsIn(LengthUnit::Inches));
    let name = "String 1: action over fret 12, in";
    assert_eq!(shown(&opened, name), "0.07", "less is shown than the plan holds");
    type_into(&mut opened, name, "0.08");
    type_into(&mut opened, name, "0.07");
    assert_eq!(plan(&opened), &odd);
    assert!(!opened.state().desk.is_changed());
}

#[test]
fn a_length_out_of_range_names_the_range_in_the_windows_unit() {
    let mut opened = open(steel_six(), None);
    order(&mut opened, Command::ShowLengthsIn(LengthUnit::Inches));
    type_into(&mut opened, "Scale, in", "2.5");
    assert!(says(&opened, "2.5 in; allowed: 7.874 to 59.0551 in") >= 2, "at the field and in the list");
    type_into(&mut opened, "Scale, in", "2 feet");
    assert!(says(&opened, "is in feet; write it in inches or millimetres") >= 2);
}

#[test]
fn arrow_keys_step_in_the_windows_unit_shift_by_more_and_alt_by_less() {
    let mut opened = open(steel_six(), None);
    field(&opened, "Relief, mm").focus();
    opened.run();
    press(&mut opened, Modifiers::SHIFT, Key::ArrowUp);
    assert_eq!(plan(&opened).instrument.relief_mm, 0.65, "ten steps of 0.05");
    press(&mut opened, Modifiers::ALT, Key::ArrowDown);
    assert_eq!(plan(&opened).instrument.relief_mm, 0.645, "a tenth of a step");
    order(&mut opened, Command::ShowLengthsIn(LengthUnit::Inches));
    type_into(&mut opened, "Relief, in", "0.010");
    press(&mut opened, Modifiers::NONE, Key::ArrowUp);
    assert_eq!(shown(&opened, "Relief, in"), "0.012");
}

#[test]
fn a_field_with_the_focus_says_how_it_is_measured_and_what_is_usual() {
    let mut opened = open(steel_six(), None);
    field(&opened, "Relief, mm").focus();
    opened.run();
    assert_eq!(says(&opened, "feeler gauges"), 1);
    assert_eq!(says(&opened, "Usual: 0 to 0.3 mm. Allowed: 0 to 3 mm."), 1);
    let described = field(&opened, "Relief, mm").accesskit_node().data().description().unwrap().to_owned();
    assert!(described.contains("straightedge") && described.contains("Usual: 0 to 0.3 mm"), "{described}");
    press(&mut opened, Modifiers::SHIFT, Key::F1);
    assert_eq!(says(&opened, "feeler gauges"), 0, "the key puts the card away");
    press(&mut opened, Modifiers::SHIFT, Key::F1);
    assert_eq!(says(&opened, "feeler gauges"), 1);
}

#[test]
fn a_plan_starts_from_every_kind_in_one_step_and_can_be_solved() {
    let mut opened = open(steel_six(), None);
    for kind in kinds() {
        order(&mut opened, Command::NewFromKind(&kind.id));
        assert_eq!(plan(&opened), &kind.plan(), "{}", kind.id);
        assert!(opened.state().desk.faults().is_empty() && opened.state().desk.outcome().is_some());
        opened.check_accessibility();
    }
    type_into(&mut opened, "Relief, mm", "0.2");
    order(&mut opened, Command::NewFromKind("classical"));
    assert!(opened.state().question.is_some(), "changes are asked about first");
}

#[test]
fn a_string_is_made_from_the_table_by_one_choice_and_says_what_is_estimated() {
    let mut opened = open(steel_six(), None);
    order(&mut opened, Command::ChooseString(2));
    order(&mut opened, Command::GoTo("strings[2].name".into()));
    let wound =
        "String 3: made of wound, phosphor bronze (steel-cored, bronze-wound: acoustic guitar, mandolin)";
    assert_eq!(says(&opened, "Estimate: the core is the usual one for this gauge"), 1);
    opened.get_by_label(wound).scroll_to_me();
    opened.run();
    opened.get_by_label(wound).click();
    opened.run();
    opened.get_by_label("plain, music wire").click();
    opened.run();
    let string = &plan(&opened).strings[2];
    assert!(string.wrap.is_none());
    assert_eq!((string.core.diameter_mm, string.core.material.as_str()), (0.6096, "music wire"));
    assert_eq!(says(&opened, "Estimate: the core is the usual one"), 0);
    order(&mut opened, Command::Undo);
    assert_eq!(plan(&opened), &steel_six());
}

/// Cores of the table: 0.3302 mm for 0.6096 mm outside, 0.381 mm for 0.8128 mm.
#[test]
fn a_core_follows_the_gauge_that_is_typed_and_stays_when_it_was_measured() {
    let mut opened = open(steel_six(), None);
    type_into(&mut opened, "String 3: outside diameter, mm", "0.8128");
    assert_eq!(plan(&opened).strings[2].core.diameter_mm, 0.381);
    type_into(&mut opened, "String 3: core diameter, mm", "0.4");
    type_into(&mut opened, "String 3: outside diameter, mm", "0.6096");
    assert_eq!(plan(&opened).strings[2].core.diameter_mm, 0.4);
}

#[test]
fn outer_values_are_spread_in_one_step() {
    let mut opened = open(steel_six(), None);
    type_into(&mut opened, "String 1: action over fret 12, mm", "1.5");
    type_into(&mut opened, "String 6: action over fret 12, mm", "2.5");
    order(&mut opened, Command::Spread(Spread::ActionTwelfth));
    let heights: Vec<f64> = plan(&opened).strings.iter().map(|string| string.action_mm.twelfth).collect();
    assert_eq!(heights, [1.5, 1.7, 1.9, 2.1, 2.3, 2.5]);
    assert_eq!(opened.state().desk.history().undo_name(), Some("Spread action over fret 12"));
}

#[test]
fn every_field_in_every_group_has_a_name_in_inches_too() {
    let mut opened = open(steel_six(), None);
    order(&mut opened, Command::ShowLengthsIn(LengthUnit::Inches));
    opened.state_mut().view.folded.clear();
    opened.run();
    opened.check_accessibility();
    assert!(opened.state().view.folded.is_empty() && Group::of_path("saddle.style") == Group::Saddle);
    let nameless = opened
        .get_all_by_role(Role::TextInput)
        .filter(|node| node.accesskit_node().data().label().is_none_or(str::is_empty));
    assert_eq!(nameless.count(), 0);
}

#[test]
fn a_flat_sign_and_a_frequency_with_its_unit_are_pitches() {
    let mut opened = open(steel_six(), None);
    type_into(&mut opened, "String 2: pitch", "B♭3");
    assert_eq!(plan(&opened).strings[1].pitch, Pitch::Note("Bb3".into()));
    type_into(&mut opened, "String 2: pitch", "246,94 Hz");
    assert_eq!(plan(&opened).strings[1].pitch, Pitch::FrequencyHz(246.94));
}
