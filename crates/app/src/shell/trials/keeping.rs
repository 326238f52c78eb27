//! Work is not lost: copies of it, files that others change, disks that take nothing.

use std::fs;
use std::path::Path;
use std::time::{Duration, SystemTime};

use crestline_plan::{Plan, read, write};
use eframe::egui::Event;
use egui_kittest::kittest::Queryable;

use super::{Opened, change_relief, open, order, saved, steel_six};
use crate::edit::command::Command;
use crate::shell::ask::Question;

/// What another program writes: a plan with another relief, at another time.
fn written_elsewhere(path: &Path, relief_mm: f64) -> Plan {
    let mut plan = steel_six();
    plan.instrument.relief_mm = relief_mm;
    fs::write(path, write(&plan)).unwrap();
    let later = SystemTime::now() + Duration::from_secs(5);
    fs::File::options().write(true).open(path).unwrap().set_modified(later).unwrap();
    plan
}

fn come_back(opened: &mut Opened) {
    opened.event(Event::WindowFocused(true));
    opened.run();
}

fn press(opened: &mut Opened, button: &str) {
    opened.get_by_label(button).click();
    opened.run();
}

fn relief(opened: &Opened) -> f64 {
    opened.state().desk.plan.instrument.relief_mm
}

fn says(opened: &Opened, words: &str) -> usize {
    opened.query_all_by_label_contains(words).count()
}

fn relief_in(path: &Path) -> f64 {
    read(&fs::read_to_string(path).unwrap()).unwrap().instrument.relief_mm
}

/// A window that ended with changes, without a word.
fn abandoned(path: Option<&Path>, state: &Path) {
    let mut opened = open(steel_six(), path, Some(state));
    change_relief(&mut opened, 0.4);
    drop(opened);
}

#[test]
fn work_left_behind_is_offered_once_and_taken_up_as_one_step() {
    let (folder, path) = saved();
    let state = tempfile::tempdir().unwrap();
    abandoned(Some(&path), state.path());
    let mut opened = open(steel_six(), Some(&path), Some(state.path()));
    assert_eq!(says(&opened, "Work that was not saved"), 1);
    assert_eq!(says(&opened, "newer than the file"), 1);
    assert_eq!(says(&opened, "Instrument, relief: 0.15 → 0.4"), 1);
    opened.check_accessibility();
    press(&mut opened, "Take it up");
    assert_eq!(relief(&opened), 0.4);
    assert!(opened.state().desk.is_changed());
    assert_eq!(relief_in(&path), 0.15, "no file is changed");
    order(&mut opened, Command::Undo);
    assert_eq!(relief(&opened), 0.15, "the file's plan can be had back");
    order(&mut opened, Command::Redo);
    order(&mut opened, Command::Save);
    assert_eq!(relief_in(&path), 0.4);
    drop(opened);
    assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 1, "the plan alone is left");
    let opened = open(steel_six(), Some(&path), Some(state.path()));
    assert!(opened.state().question.is_none(), "offered once");
}

#[test]
fn work_left_behind_can_wait_or_be_thrown_away() {
    let (_folder, path) = saved();
    let state = tempfile::tempdir().unwrap();
    abandoned(Some(&path), state.path());
    let mut opened = open(steel_six(), Some(&path), Some(state.path()));
    press(&mut opened, "Leave it for later");
    assert_eq!(relief(&opened), 0.15);
    assert!(opened.state().question.is_none());
    drop(opened);
    let mut opened = open(steel_six(), Some(&path), Some(state.path()));
    press(&mut opened, "Throw it away");
    drop(opened);
    let opened = open(steel_six(), Some(&path), Some(state.path()));
    assert!(opened.state().question.is_none());
}

#[test]
fn a_plan_that_was_in_no_file_comes_back_and_so_does_one_that_is_opened_later() {
    let (_folder, path) = saved();
    let state = tempfile::tempdir().unwrap();
    abandoned(None, state.path());
    let mut opened = open(steel_six(), None, Some(state.path()));
    press(&mut opened, "Take it up");
    assert_eq!((relief(&opened), opened.state().desk.path()), (0.4, None));
    assert!(opened.state().desk.is_changed());
    drop(opened);

    abandoned(Some(&path), state.path());
    let mut opened = open(steel_six(), Some(&path.with_file_name("other.json")), Some(state.path()));
    assert!(opened.state().question.is_none());
    order(&mut opened, Command::OpenFile(path.clone()));
    assert!(matches!(opened.state().question, Some(Question::Recovery(_))));
}

#[test]
fn another_plan_takes_the_place_of_changes_that_are_given_up() {
    for command in [Command::NewFromKind("mandolin"), Command::NewFromExample("mandolin")] {
        let (_folder, path) = saved();
        let mut opened = open(steel_six(), Some(&path), None);
        change_relief(&mut opened, 0.4);
        order(&mut opened, command.clone());
        press(&mut opened, "Do not save");
        assert!(opened.state().question.is_none(), "{command:?} asks again");
        let desk = &opened.state().desk;
        assert_eq!((desk.path(), desk.is_changed()), (None, false));
        assert_eq!(desk.plan.strings.len(), 8, "four pairs");
        // The file of the plan before is another's business now.
        written_elsewhere(&path, 0.3);
        come_back(&mut opened);
        assert!(opened.state().question.is_none());
    }
}

#[test]
fn changes_that_are_given_up_leave_no_copy() {
    let (folder, path) = saved();
    let mut opened = open(steel_six(), Some(&path), None);
    change_relief(&mut opened, 0.4);
    order(&mut opened, Command::Quit);
    press(&mut opened, "Do not save");
    drop(opened);
    assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 1);
}

#[test]
fn a_file_that_another_program_changed_is_noticed_when_the_user_comes_back() {
    let (_folder, path) = saved();
    let mut opened = open(steel_six(), Some(&path), None);
    come_back(&mut opened);
    assert!(opened.state().question.is_none(), "nothing has changed");
    written_elsewhere(&path, 0.3);
    come_back(&mut opened);
    assert_eq!(says(&opened, "Instrument, relief: 0.3 → 0.15"), 1);
    opened.check_accessibility();
    press(&mut opened, "Keep mine");
    assert_eq!(relief(&opened), 0.15);
    assert!(opened.state().desk.is_changed(), "the file holds something else now");
    come_back(&mut opened);
    assert!(opened.state().question.is_none(), "asked once");

    written_elsewhere(&path, 0.35);
    come_back(&mut opened);
    press(&mut opened, "Load the file's (undo brings mine back)");
    assert_eq!(relief(&opened), 0.35);
    assert!(!opened.state().desk.is_changed());
    order(&mut opened, Command::Undo);
    assert_eq!(relief(&opened), 0.15);
}

#[test]
fn saving_over_another_programs_work_asks_first() {
    let (_folder, path) = saved();
    let mut opened = open(steel_six(), Some(&path), None);
    change_relief(&mut opened, 0.4);
    written_elsewhere(&path, 0.3);
    order(&mut opened, Command::Save);
    assert_eq!(relief_in(&path), 0.3);
    press(&mut opened, "Do not save now");
    assert_eq!(relief_in(&path), 0.3);
    order(&mut opened, Command::Save);
    press(&mut opened, "Save mine over it");
    assert_eq!(relief_in(&path), 0.4);
    assert!(!opened.state().desk.is_changed());
}

#[test]
fn a_file_that_has_gone_or_holds_the_same_plan_asks_nothing() {
    let (_folder, path) = saved();
    let mut opened = open(steel_six(), Some(&path), None);
    change_relief(&mut opened, 0.3);
    written_elsewhere(&path, 0.3);
    come_back(&mut opened);
    assert!(opened.state().question.is_none());
    assert!(!opened.state().desk.is_changed(), "the file holds what the window holds");
    fs::remove_file(&path).unwrap();
    come_back(&mut opened);
    assert_eq!(says(&opened, "is not there any more"), 1);
    assert!(opened.state().desk.is_changed());
    order(&mut opened, Command::Save);
    assert_eq!(relief_in(&path), 0.3);
}

/// Writing to `/dev/full` fails as on a disk without room (full(4)).
#[cfg(target_os = "linux")]
#[test]
fn a_full_disk_is_told_and_the_work_kept() {
    let state = tempfile::tempdir().unwrap();
    let mut opened = open(steel_six(), Some(Path::new("/dev/full")), Some(state.path()));
    change_relief(&mut opened, 0.4);
    order(&mut opened, Command::Save);
    assert_eq!(says(&opened, "No space left on device"), 1);
    assert_eq!(says(&opened, "The plan is unchanged in this window"), 1);
    assert!(opened.state().desk.is_changed());
    assert_eq!(relief(&opened), 0.4);
}

#[test]
fn a_file_that_may_only_be_read_is_told_and_the_work_kept() {
    let (_folder, path) = saved();
    let mut opened = open(steel_six(), Some(&path), None);
    change_relief(&mut opened, 0.4);
    let mut rights = fs::metadata(&path).unwrap().permissions();
    rights.set_readonly(true);
    fs::set_permissions(&path, rights).unwrap();
    order(&mut opened, Command::Save);
    assert_eq!(says(&opened, "the file may only be read"), 1);
    assert_eq!((relief(&opened), relief_in(&path)), (0.4, 0.15));
    assert!(opened.state().desk.is_changed());
}

#[test]
fn recent_plans_stand_in_the_menu_and_one_that_has_gone_is_taken_off() {
    let (_folder, path) = saved();
    let state = tempfile::tempdir().unwrap();
    drop(open(steel_six(), Some(&path), Some(state.path())));
    let mut opened = open(steel_six(), None, Some(state.path()));
    assert_eq!(opened.state().recent.plans(), std::slice::from_ref(&path));
    press(&mut opened, "File");
    press(&mut opened, "Open a recent plan");
    opened.get_by_label_contains("a.json").click();
    opened.run();
    assert_eq!(opened.state().desk.path(), Some(path.as_path()));
    fs::remove_file(&path).unwrap();
    order(&mut opened, Command::OpenFile(path));
    assert!(opened.state().recent.plans().is_empty());
}

#[test]
fn the_arrangement_comes_back() {
    let state = tempfile::tempdir().unwrap();
    let mut opened = open(steel_six(), None, Some(state.path()));
    order(&mut opened, Command::ShowPage(crate::view::Page::Compare));
    order(&mut opened, Command::ShowInputs(false));
    order(&mut opened, Command::LargerText);
    eframe::App::on_exit(opened.state_mut(), None);
    drop(opened);
    let opened = open(steel_six(), None, Some(state.path()));
    assert_eq!(opened.state().view.page, crate::view::Page::Compare);
    assert!(!opened.state().view.inputs);
    // One step of a tenth, stored in decimals.
    assert!((opened.ctx.zoom_factor() - 1.1).abs() < 1e-6);
}
