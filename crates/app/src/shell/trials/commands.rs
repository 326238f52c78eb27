//! Every command by its name and by its key.

use crestline_plan::{example, read};
use eframe::egui::accesskit::Role;
use eframe::egui::{Key, Modifiers};
use egui_kittest::kittest::{NodeT, Queryable};

use super::{Opened, open, order, steel_six};
use crate::edit::catalogue::offers;
use crate::edit::command::Command;
use crate::view::Page;

fn find(opened: &mut Opened, text: &str) {
    opened.key_press_modifiers(Modifiers::COMMAND, Key::K);
    opened.run();
    opened.check_accessibility();
    let field = opened.get_by_role_and_label(Role::TextInput, "Part of the command's name");
    assert!(field.is_focused(), "what is typed goes into the search");
    field.type_text(text);
    opened.run();
}

fn press(opened: &mut Opened, key: Key) {
    opened.key_press(key);
    opened.run();
}

#[test]
fn a_command_is_found_by_part_of_its_name_and_done_without_a_mouse() {
    let mut opened = open(steel_six(), None, None);
    find(&mut opened, "page comp");
    press(&mut opened, Key::Enter);
    assert_eq!(opened.state().view.page, Page::Compare);
    assert!(opened.state().question.is_none());

    find(&mut opened, "choose string");
    press(&mut opened, Key::ArrowDown);
    press(&mut opened, Key::ArrowDown);
    press(&mut opened, Key::ArrowUp);
    press(&mut opened, Key::Enter);
    assert_eq!(opened.state().view.string, 1, "two down and one up is the second");

    find(&mut opened, "page sheets");
    press(&mut opened, Key::Escape);
    assert_eq!(opened.state().view.page, Page::Compare, "Escape does nothing");
    assert!(opened.state().question.is_none());

    find(&mut opened, "qqqq");
    assert_eq!(opened.query_all_by_label_contains("No command has this").count(), 1);
    press(&mut opened, Key::Enter);
    assert!(opened.state().question.is_some(), "Enter on nothing does nothing");
}

/// Whatever page is shown and however many groups are folded away.
#[test]
fn every_field_that_the_list_offers_is_gone_to() {
    for name in ["steel_six", "fanned_eight"] {
        let plan = read(example(name).unwrap().text).unwrap();
        let mut opened = open(plan, None, None);
        order(&mut opened, Command::ShowInputs(false));
        order(&mut opened, Command::ChooseString(2));
        let window = opened.state();
        let offered = offers(&window.desk, &window.view, &[]);
        let fields: Vec<_> =
            offered.into_iter().filter(|offer| matches!(offer.command, Command::GoTo(_))).collect();
        assert!(fields.len() > 15, "{}", fields.len());
        let mut reached = std::collections::BTreeSet::new();
        for offer in &fields {
            order(&mut opened, offer.command.clone());
            let focused = opened.query_all_by(|node| node.is_focused() && node.role() == Role::TextInput);
            let label = focused.filter_map(|node| node.accesskit_node().label()).next();
            assert!(reached.insert(label.clone()), "{}: {label:?} has the focus", offer.name);
        }
        assert!(!reached.contains(&None));
    }
}

#[test]
fn pages_have_keys_and_the_help_page_names_every_widget() {
    let mut opened = open(steel_six(), None, None);
    let digits = [Key::Num1, Key::Num2, Key::Num3, Key::Num4, Key::Num5, Key::Num6];
    for (key, page) in digits.into_iter().zip(Page::TABS) {
        opened.key_press_modifiers(Modifiers::COMMAND, key);
        opened.run();
        assert_eq!(opened.state().view.page, page);
        opened.check_accessibility();
    }
    press(&mut opened, Key::F1);
    assert_eq!(opened.state().view.page, Page::Help);
    opened.check_accessibility();
    assert_eq!(opened.query_all_by_label_contains("Strings under tension can break").count(), 1);
    press(&mut opened, Key::F2);
    assert_eq!(opened.query_all_by_label("Find a command").count(), 1);
}

/// Tab alone reaches the fields, the tabs of the pages and the menus, and what it reaches has the focus.
#[test]
fn tab_goes_round_the_whole_window() {
    let mut opened = open(steel_six(), None, None);
    let mut reached = std::collections::BTreeSet::new();
    for _ in 0..50 {
        opened.key_press(Key::Tab);
        opened.run_steps(2);
        let focused =
            opened.query_all_by(|node| node.is_focused()).filter_map(|node| node.accesskit_node().label());
        reached.extend(focused);
    }
    for name in ["File", "Compare", "Scale, mm", "String 1: pitch", "Relief, mm"] {
        assert!(reached.contains(name), "{name} is not reached by Tab; reached: {reached:?}");
    }
}
