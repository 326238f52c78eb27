//! The page `How sure`, bands on the plots and other sets of strings, by role and label, without a display.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod common;

use std::time::Duration;

use common::{Opened, field, open, order, plan, says, steel_six, type_into};
use crestline_plan::{OtherStrings, Pitch, Plan, Tolerances, check, example, read, uncertainty};
use crestline_window::edit::command::Command;
use crestline_window::view::{Group, Page};
use eframe::egui::accesskit::Role;
use egui_kittest::kittest::{NodeT, Queryable};

/// Turns of waiting after which work beside the window counts as lost; each takes a fiftieth of a second or longer.
const TURNS: usize = 6000;
/// Instruments of a sample that a test waits for.
const FEW: u32 = 256;
/// So many that a sample is still being drawn when the test looks again.
const MANY: u32 = 32_768;

/// The example with tolerances and other tunings, with a sample of this size.
fn tunings(samples: u32) -> Plan {
    let mut plan = read(example("steel_six_tunings").unwrap().text).unwrap();
    plan.tolerances.as_mut().unwrap().samples = samples;
    plan
}

fn show(plan: Plan, page: Page) -> Opened {
    let mut opened = open(plan, None);
    order(&mut opened, Command::ShowPage(page));
    opened
}

/// Waits until `is_so`.
fn wait(opened: &mut Opened, is_so: impl Fn(&Opened) -> bool) {
    for _ in 0..TURNS {
        opened.run();
        if is_so(opened) {
            opened.run();
            return;
        }
        std::thread::sleep(Duration::from_millis(20));
    }
    panic!("it never came");
}

/// The window on the page with everything worked out.
fn on_page(plan: Plan) -> Opened {
    let mut opened = show(plan, Page::HowSure);
    wait(&mut opened, |opened| opened.state().view.trust.sampling.shares().is_some());
    opened
}

/// Clicks by name and not by place: results that come in the meantime may move the page under a pointer.
fn click(opened: &mut Opened, label: &str) {
    opened.get_by_label(label).click_accesskit();
    opened.run();
}

#[test]
fn the_page_says_how_sure_the_setbacks_are_and_everything_on_it_has_a_name() {
    let plan = tunings(FEW);
    // What the library says by itself of the same plan.
    let expected =
        uncertainty(&check(&plan).unwrap(), &mut |_| std::ops::ControlFlow::Continue(())).unwrap().unwrap();
    let mut opened = on_page(plan);
    let sentence = "Chance that every note stays within 5 cents: ";
    assert_eq!(says(&opened, sentence), 1);
    for string in &expected.strings {
        let band = string.saddle_setback_mm.unwrap();
        let row = format!(
            "String {} {}, Ideal setback {:.2}, 90 % from {:.2}, to {:.2}, ± sd sample {:.3}, ± sd first order {:.3}",
            string.string, string.name, band.nominal, band.p05, band.p95, band.sd, band.first_order_sd
        );
        assert_eq!(says(&opened, &row), 1, "{row}");
    }
    assert_eq!(says(&opened, "Bands of the ideal setbacks. String 1: ideal"), 1);
    assert!(opened.get_all_by_role(Role::ListItem).count() >= 2, "what to measure next");
    assert!(says(&opened, "of the variance goes once it is known") >= 2);
    opened.check_accessibility();
    click(&mut opened, "Tolerances");
    opened.check_accessibility();
    assert_eq!(says(&opened, "String 5: core diameter 0.003 mm."), 1);
    // Room for 0.0005, the finest default in inches, at some nine points a figure: nothing of a value is cut off.
    const ROOM: f32 = 54.0;
    let fields: Vec<_> = opened.get_all_by_role(Role::TextInput).collect();
    let mut narrow = fields.iter().filter(|field| {
        let label = field.accesskit_node().label().unwrap_or_default();
        label.starts_with("Standard deviation") && field.rect().width() < ROOM
    });
    assert!(narrow.next().is_none(), "a field cuts its value off");
}

#[test]
fn every_tolerance_says_how_it_is_found_and_what_is_usual() {
    let mut opened = on_page(tunings(FEW));
    click(&mut opened, "Tolerances");
    let fields: Vec<_> = opened.get_all_by_role(Role::TextInput).collect();
    let mut told = 0;
    for field in &fields {
        let label = field.accesskit_node().label().unwrap_or_default();
        if !label.starts_with("Standard deviation") {
            continue;
        }
        let words = field.accesskit_node().description().unwrap_or_default();
        assert!(words.contains("Usual: ") && words.contains("Allowed: 0 to "), "{label}: {words}");
        told += 1;
    }
    // 13 that all strings share, and 8 of each of three kinds of string.
    assert_eq!(told, 13 + 3 * 8);
    // The card is about the field with the focus; the plan's own relief has another range.
    field(&opened, "Standard deviation: Relief, mm").focus();
    opened.run();
    assert_eq!(says(&opened, "Usual: 0.02 to 0.1 mm. Allowed: 0 to 0.5 mm."), 1);
}

#[test]
fn the_list_of_what_to_measure_is_ranked_by_its_gain() {
    let opened = on_page(tunings(FEW));
    let gains: Vec<f64> = opened
        .get_all_by_role(Role::ListItem)
        .map(|node| {
            let words = node.accesskit_node().label().unwrap();
            let after = words.split_once("makes the setbacks ").unwrap().1;
            after.split(' ').next().unwrap().parse().unwrap()
        })
        .collect();
    assert!(gains.len() >= 2 && gains[0] > 0.0, "{gains:?}");
    assert!(gains.is_sorted_by(|a, b| a >= b), "{gains:?}");
}

#[test]
fn a_large_sample_sharpens_while_it_is_drawn_and_can_be_stopped() {
    let mut opened = show(tunings(MANY), Page::HowSure);
    wait(&mut opened, |opened| opened.state().view.trust.sampling.found().is_some());
    assert_eq!(opened.get_all_by_role(Role::ProgressIndicator).count(), 1);
    click(&mut opened, "Stop");
    assert!(!opened.state().view.trust.sampling.is_working());
    assert_eq!(opened.query_all_by_role(Role::ProgressIndicator).count(), 0);
    assert_eq!(says(&opened, "rests on the instruments drawn until then"), 1);
    let drawn = opened.state().view.trust.sampling.found().unwrap().uncertainty.samples;
    assert!((FEW..MANY).contains(&drawn), "{drawn}");
    opened.check_accessibility();
    click(&mut opened, "Work it out");
    assert!(opened.state().view.trust.sampling.is_working());
    // A changed plan ends what is going on, and is worked out anew.
    type_into(&mut opened, "Number of instruments", &FEW.to_string());
    wait(&mut opened, |opened| {
        let found = opened.state().view.trust.sampling.found();
        found.is_some_and(|found| found.is_whole && found.is_of(plan(opened)))
    });
    assert_eq!(opened.state().view.trust.sampling.found().unwrap().uncertainty.samples, FEW);
}

#[test]
fn tolerances_come_into_the_plan_and_leave_it_as_steps() {
    let mut opened = show(steel_six(), Page::HowSure);
    assert_eq!(says(&opened, "none in the plan"), 1);
    click(&mut opened, "Take the usual tolerances into the plan");
    assert_eq!(plan(&opened).tolerances, Some(Tolerances::default()));
    assert_eq!(opened.state().desk.history().undo_name(), Some("Take tolerances"));
    click(&mut opened, "Leave the tolerances out of the plan");
    assert_eq!(plan(&opened), &steel_six());
    order(&mut opened, Command::Undo);
    order(&mut opened, Command::Undo);
    assert_eq!(plan(&opened), &steel_six());
    assert_eq!(opened.state().desk.history().undo_name(), None);
}

#[test]
fn a_changed_tolerance_brings_the_others_along_as_one_step() {
    let mut opened = show(steel_six(), Page::HowSure);
    click(&mut opened, "Tolerances");
    type_into(&mut opened, "Standard deviation, wound strings: Core diameter, mm", "0.002");
    let mut expected = Tolerances::default();
    expected.wound.core_diameter_mm = 0.002;
    assert_eq!(plan(&opened).tolerances.as_ref(), Some(&expected));
    order(&mut opened, Command::ShowLengthsIn(crestline_window::units::LengthUnit::Inches));
    type_into(&mut opened, "Standard deviation: Relief, in", "0.001");
    // An inch is 25.4 mm by definition.
    assert_eq!(plan(&opened).tolerances.as_ref().unwrap().neck.relief_mm, 0.0254);
    type_into(&mut opened, "Limit, cents", "3");
    assert_eq!(plan(&opened).tolerances.as_ref().unwrap().limit_cents, 3.0);
    for _ in 0..3 {
        order(&mut opened, Command::Undo);
    }
    assert_eq!(plan(&opened), &steel_six());
}

#[test]
fn a_tolerance_out_of_range_is_marked_and_its_fault_leads_to_its_field() {
    let mut opened = show(steel_six(), Page::HowSure);
    click(&mut opened, "Tolerances");
    let name = "Standard deviation: Press depth, of it";
    type_into(&mut opened, name, "2");
    assert!(field(&opened, name).accesskit_node().data().invalid().is_some());
    assert!(says(&opened, "allowed: 0 to 1") >= 1);
    order(&mut opened, Command::ShowPage(Page::Saddle));
    click(&mut opened, "Tolerances, pressing, depth fraction: 2; allowed: 0 to 1. Go to the field");
    opened.run();
    assert_eq!(opened.state().view.page, Page::HowSure);
    assert!(field(&opened, name).is_focused());
}

#[test]
fn bands_stand_on_the_plots_and_can_be_hidden() {
    let mut opened = show(tunings(FEW), Page::Saddle);
    assert_eq!(says(&opened, "Saddle in plan. String 1: setback"), 1);
    let with_band = |opened: &Opened| {
        let node = opened.get_by_label_contains("Saddle in plan. String 1: setback");
        node.accesskit_node().label().unwrap().matches("(90 % from").count()
    };
    assert_eq!(with_band(&opened), 6, "to first order at once");
    let errors = |opened: &Opened| {
        let node = opened.get_by_label_contains("Errors of the fretted notes of string 1");
        node.accesskit_node().label().unwrap().matches("(90 % from").count()
    };
    wait(&mut opened, |opened| errors(opened) == 20);
    click(&mut opened, "90 % bands ▒");
    assert_eq!((with_band(&opened), errors(&opened)), (0, 0));
    let opened = show(steel_six(), Page::Saddle);
    assert_eq!(says(&opened, "90 % bands"), 0, "nothing to show without tolerances");
}

#[test]
fn a_change_of_tuning_is_added_named_pitched_and_removed() {
    let mut opened = open(steel_six(), None);
    opened.state_mut().view.folded.remove(&Group::Alternatives);
    opened.run();
    click(&mut opened, "Add a change of tuning");
    type_into(&mut opened, "Other set 1: name", "Dropped sixth");
    type_into(&mut opened, "Other set 1: pitch of string 6", "D2");
    type_into(&mut opened, "Other set 1: weight", "0.5");
    opened.check_accessibility();
    let alternative = &plan(&opened).alternatives[0];
    assert_eq!((alternative.name.as_str(), alternative.weight), ("Dropped sixth", 0.5));
    let OtherStrings::Pitches(pitches) = &alternative.other else { panic!("a tuning") };
    assert_eq!(pitches[5], Some(Pitch::Note("D2".into())));
    assert!(pitches[..5].iter().all(Option::is_none));
    order(&mut opened, Command::ShowPage(Page::Compare));
    wait(&mut opened, |opened| says(opened, "Dropped sixth: weight 0.5, root mean square") == 1);
    opened.check_accessibility();
    type_into(&mut opened, "Other set 1: pitch of string 6", "H9");
    assert!(says(&opened, "Alternatives 1, pitches 6") >= 1, "what is no note is told");
    order(&mut opened, Command::Undo);
    click(&mut opened, "Remove Dropped sixth");
    assert_eq!(plan(&opened), &steel_six());
    order(&mut opened, Command::Undo);
    assert_eq!(plan(&opened).alternatives.len(), 1);
}

#[test]
fn a_whole_other_set_is_shown_and_can_be_removed() {
    let mut plan_with_set = steel_six();
    let strings = OtherStrings::Strings(plan_with_set.strings.clone());
    plan_with_set.alternatives = vec![crestline_plan::Alternative::new("Heavier", strings)];
    let mut opened = open(plan_with_set, None);
    opened.state_mut().view.folded.remove(&Group::Alternatives);
    opened.run();
    assert_eq!(says(&opened, "A whole set of strings; it is changed in the plan file."), 1);
    click(&mut opened, "Remove Heavier");
    assert_eq!(plan(&opened), &steel_six());
}
