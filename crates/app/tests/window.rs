//! The window by role and label, without a display.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod common;

use common::{Opened, field, open, order, plan, says, steel_six, type_into};
use crestline_plan::{EXAMPLES, Pitch, Scale, read, write};
use crestline_sheets::Format;
use crestline_window::edit::command::Command;
use crestline_window::shell::ask::{Question, Reply};
use crestline_window::shell::obey::take_reply;
use crestline_window::shell::picker::Purpose;
use crestline_window::view::{Group, Page};
use eframe::egui::accesskit::Role;
use eframe::egui::{Key, Modifiers, Vec2};
use egui_kittest::kittest::{NodeT, Queryable};

fn answer(opened: &mut Opened, reply: Reply) {
    let ctx = opened.ctx.clone();
    opened.state_mut().question = None;
    take_reply(opened.state_mut(), &ctx, reply);
    opened.run();
}

fn setback(opened: &Opened, string: usize) -> f64 {
    opened.state().desk.outcome().unwrap().solution.report.strings[string].built.saddle_setback_mm
}

#[test]
fn every_example_opens_on_every_page_with_all_widgets_named_and_comes_to_rest() {
    for example in EXAMPLES {
        let mut opened = open(read(example.text).unwrap(), None);
        for page in Page::ALL {
            order(&mut opened, Command::ShowPage(page));
            opened.check_accessibility();
        }
        assert!(opened.state().desk.faults().is_empty(), "{}", example.name);
    }
}

#[test]
fn every_widget_has_a_name_with_all_groups_open_and_for_every_string() {
    let mut opened = open(steel_six(), None);
    opened.state_mut().view.folded.clear();
    for string in 0..6 {
        order(&mut opened, Command::ChooseString(string));
        opened.check_accessibility();
    }
}

/// 640 points are a window of 1280 pixels with text at twice its size.
#[test]
fn the_switch_of_units_stays_in_the_bar_whatever_the_width() {
    let mut opened = open(steel_six(), None);
    for width in (640..=1600).step_by(80) {
        let width = width as f32;
        for page in [Page::Saddle, Page::FrettedNotes] {
            opened.set_size(Vec2::new(width, 400.0));
            order(&mut opened, Command::ShowPage(page));
            let switch = opened.get_by_label("Unit of lengths: millimetres").rect();
            let tabs = opened.query_all_by(|node| node.role() == Role::Tab);
            let behind = tabs.map(|tab| tab.rect().right()).fold(0.0, f32::max);
            assert!(
                switch.right() <= width && switch.left() >= behind,
                "{width}: {switch:?}, tabs to {behind}"
            );
        }
    }
}

#[test]
fn results_follow_typing() {
    let mut opened = open(steel_six(), None);
    let before = setback(&opened, 0);
    type_into(&mut opened, "String 1: action over fret 12, mm", "2,9");
    assert_eq!(plan(&opened).strings[0].action_mm.twelfth, 2.9);
    assert!(setback(&opened, 0) > before, "more action needs more setback");
}

#[test]
fn a_wrong_number_marks_its_field_and_keeps_the_last_good_result() {
    let mut opened = open(steel_six(), None);
    let before = setback(&opened, 5);
    type_into(&mut opened, "Scale, mm", "64x");
    assert_eq!(field(&opened, "Scale, mm").value().as_deref(), Some("64x"), "the text stays as typed");
    assert_eq!(setback(&opened, 5), before);
    assert!(field(&opened, "Scale, mm").accesskit_node().data().invalid().is_some());
    assert_eq!(says(&opened, "Shown is the last good result"), 1);
    assert!(says(&opened, "“64x” is not a length") >= 2, "at the field and in the list");
    assert_eq!(plan(&opened), &steel_six(), "no half-typed number stays in the plan");
    assert_eq!(opened.state().desk.history().undo_name(), None, "and nothing is there to undo");

    type_into(&mut opened, "Scale, mm", "650");
    assert_eq!(says(&opened, "Shown is the last good result"), 0);
    assert_eq!(plan(&opened).instrument.scale, Scale::Single(650.0));
}

#[test]
fn a_value_out_of_range_says_what_is_allowed_where_it_stands() {
    let mut opened = open(steel_six(), None);
    let before = setback(&opened, 0);
    type_into(&mut opened, "Scale, mm", "64");
    assert_eq!(setback(&opened, 0), before);
    assert!(says(&opened, "allowed: 200 to 1500 mm") >= 2, "at the field and in the list");
    assert_eq!(says(&opened, "Shown is the last good result"), 1);
}

#[test]
fn arrow_keys_step_a_number_and_typing_in_one_field_is_one_step_to_undo() {
    let mut opened = open(steel_six(), None);
    field(&opened, "Relief, mm").focus();
    opened.run();
    for _ in 0..2 {
        opened.key_press(Key::ArrowUp);
        opened.run();
    }
    assert_eq!(plan(&opened).instrument.relief_mm, 0.25, "0.15 and two steps of 0.05");
    assert_eq!(opened.state().desk.history().undo_name(), Some("Relief, mm"));
    type_into(&mut opened, "Fret height, mm", "1.3");
    order(&mut opened, Command::Undo);
    assert_eq!(plan(&opened).instrument.relief_mm, 0.25);
    order(&mut opened, Command::Undo);
    assert_eq!(plan(&opened), &steel_six());
    assert!(!opened.state().desk.is_changed());
    order(&mut opened, Command::Redo);
    assert_eq!(plan(&opened).instrument.relief_mm, 0.25);
}

#[test]
fn a_pitch_is_a_note_or_a_frequency() {
    let mut opened = open(steel_six(), None);
    type_into(&mut opened, "String 1: pitch", "330");
    assert_eq!(plan(&opened).strings[0].pitch, Pitch::FrequencyHz(330.0));
    type_into(&mut opened, "String 1: pitch", "Eb4");
    assert_eq!(plan(&opened).strings[0].pitch, Pitch::Note("Eb4".into()));
    type_into(&mut opened, "String 1: pitch", "H9x");
    assert!(opened.state().desk.faults().iter().any(|fault| fault.path.starts_with("strings[0].pitch")));
}

#[test]
fn strings_are_added_moved_and_removed_by_their_buttons() {
    let mut opened = open(steel_six(), None);
    let pitches = |opened: &Opened| plan(opened).strings.iter().map(|s| s.pitch.clone()).collect::<Vec<_>>();
    let before = pitches(&opened);
    opened.get_by_label("Add a copy of string 1 behind it").click();
    opened.run();
    assert_eq!(plan(&opened).strings.len(), 7);
    assert_eq!(opened.state().view.string, 1, "the copy is chosen");
    opened.get_by_label("Move string 2 down").scroll_to_me();
    opened.run();
    opened.get_by_label("Move string 2 down").click();
    opened.run();
    assert_eq!(plan(&opened).strings[1].pitch, Pitch::Note("B3".into()));
    opened.get_by_label("Remove string 3").scroll_to_me();
    opened.run();
    opened.get_by_label("Remove string 3").click();
    opened.run();
    assert_eq!(pitches(&opened), before);
    for _ in 0..3 {
        order(&mut opened, Command::Undo);
    }
    assert_eq!(plan(&opened), &steel_six());
}

#[test]
fn a_choice_is_one_step_and_gives_another_saddle() {
    let mut opened = open(steel_six(), None);
    order(&mut opened, Command::GoTo("saddle.style".into()));
    opened.get_by_label("Saddle style: Separate").click();
    opened.run();
    for string in &opened.state().desk.outcome().unwrap().solution.report.strings {
        let apart_mm = string.built.saddle_setback_mm - string.ideal.saddle_setback_mm;
        // Both come from one search with a tolerance far below this.
        assert!(apart_mm.abs() < 1e-6, "separate pieces stand where they should");
    }
    assert_eq!(opened.state().desk.history().undo_name(), Some("Saddle style"));
}

#[test]
fn a_fault_leads_to_its_field() {
    let mut wrong = steel_six();
    wrong.strings[3].core.diameter_mm = -1.0;
    let mut opened = open(wrong, None);
    opened.state_mut().view.folded.insert(Group::Strings);
    opened.run();
    opened
        .get_by_role_and_label(
            Role::Link,
            "String 4, core, diameter: -1; allowed: 0.05 to 10 mm. Go to the field",
        )
        .click();
    opened.run();
    assert_eq!(opened.state().view.string, 3);
    assert!(!opened.state().view.folded.contains(&Group::Strings));
    assert!(opened.get_all_by_label("String 4: core diameter, mm").any(|node| node.is_focused()));
}

#[test]
fn a_plan_is_saved_by_its_key_and_reads_back_the_same() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("plan.json");
    std::fs::write(&path, write(&steel_six())).unwrap();
    let mut opened = open(steel_six(), Some(path.clone()));
    type_into(&mut opened, "Scale, mm", "645.5");
    assert!(opened.state().desk.is_changed());
    opened.key_press_modifiers(Modifiers::COMMAND, Key::S);
    opened.run();
    assert!(!opened.state().desk.is_changed());
    let saved = read(&std::fs::read_to_string(&path).unwrap()).unwrap();
    assert_eq!(&saved, plan(&opened));
    assert_eq!(says(&opened, "✔ Saved"), 1, "what was written is confirmed");
}

#[test]
fn keys_make_all_text_larger_within_limits_and_usual_again() {
    let mut opened = open(steel_six(), None);
    for (modifiers, key) in
        [(Modifiers::COMMAND, Key::Plus), (Modifiers::COMMAND | Modifiers::SHIFT, Key::Plus)]
    {
        let before = opened.ctx.zoom_factor();
        opened.key_press_modifiers(modifiers, key);
        opened.run();
        assert!(opened.ctx.zoom_factor() > before, "{modifiers:?}");
    }
    for _ in 0..20 {
        order(&mut opened, Command::LargerText);
    }
    assert_eq!(opened.ctx.zoom_factor(), 2.0);
    opened.key_press_modifiers(Modifiers::COMMAND, Key::Num0);
    opened.run();
    assert_eq!(opened.ctx.zoom_factor(), 1.0);
}

#[test]
fn a_drawing_is_written_and_an_existing_file_is_asked_about() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("saddle.svg");
    std::fs::write(&path, "old").unwrap();
    let mut opened = open(steel_six(), None);
    answer(&mut opened, Reply::Propose(Purpose::Write(Format::Svg), path.clone()));
    assert!(matches!(opened.state().question, Some(Question::Replace(..))));
    assert_eq!(std::fs::read_to_string(&path).unwrap(), "old");
    opened.get_by_label("Replace").click();
    opened.run();
    let drawing = std::fs::read_to_string(&path).unwrap();
    assert!(drawing.contains("<svg") && drawing.contains("mm"));
    assert_eq!(says(&opened, "Drawing written to"), 1);
}

#[test]
fn changes_are_asked_about_before_another_plan_comes() {
    let mut opened = open(steel_six(), None);
    type_into(&mut opened, "Scale, mm", "645.5");
    order(&mut opened, Command::NewFromExample("mandolin"));
    assert!(matches!(opened.state().question, Some(Question::Unsaved(_))));
    opened.get_by_label("Cancel").click();
    opened.run();
    assert_eq!(plan(&opened).strings.len(), 6);
    order(&mut opened, Command::NewFromExample("mandolin"));
    opened.get_by_label("Do not save").click();
    opened.run();
    assert_eq!(plan(&opened).strings.len(), 8);
    assert!(!opened.state().desk.is_changed());
}

#[test]
fn a_file_that_is_no_plan_leaves_the_plan_alone_and_says_so() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("other.json");
    std::fs::write(&path, "{\"format\": \"something else\"}").unwrap();
    let mut opened = open(steel_six(), None);
    order(&mut opened, Command::OpenFile(path));
    assert_eq!(plan(&opened), &steel_six());
    assert_eq!(says(&opened, "is not a plan that can be opened"), 1);
}
