//! Every command that there is something to do with, for the list in which they are searched.

use std::path::PathBuf;

use crestline_plan::{EXAMPLES, Scale, Tolerances, kinds};
use crestline_sheets::Format;

use super::command::Command;
use super::desk::Desk;
use super::spread::Spread;
use super::strings::MOST_STRINGS;
use crate::fields::form::place_in_words;
use crate::view::{Group, Page, ThemeChoice, View};

/// A command with the words by which it is found.
#[derive(Debug, Clone, PartialEq)]
pub struct Offer {
    /// What is done.
    pub command: Command,
    /// Its name, which no other offer has.
    pub name: String,
}

/// What can be done now, in the order of the menus.
#[must_use]
pub fn offers(desk: &Desk, view: &View, recent: &[PathBuf]) -> Vec<Offer> {
    let mut all: Vec<Command> = vec![Command::Open, Command::Save, Command::SaveAs];
    all.extend([Format::Pdf, Format::Svg, Format::Dxf, Format::Csv].map(Command::Export));
    all.push(Command::ImportReadings);
    all.extend(recent.iter().cloned().map(Command::OpenFile));
    all.extend(kinds().iter().map(|kind| Command::NewFromKind(&kind.id)));
    all.extend(EXAMPLES.iter().map(|example| Command::NewFromExample(example.name)));
    all.extend(Page::ALL.map(Command::ShowPage));
    all.extend(changes(desk, view));
    all.extend((0..desk.plan.strings.len()).map(Command::ChooseString));
    all.extend(fields(desk, view).into_iter().map(Command::GoTo));
    all.extend(Group::ALL.map(Command::Fold));
    all.push(Command::ShowInputs(!view.inputs));
    all.push(Command::ShowCard(!view.card));
    all.push(Command::ShowLengthsIn(view.unit.other()));
    all.extend(ThemeChoice::ALL.map(Command::Theme));
    all.extend([Command::LargerText, Command::SmallerText, Command::UsualText, Command::ResetPlots]);
    if view.message.is_some() {
        all.push(Command::DismissMessage);
    }
    all.push(Command::Quit);
    all.into_iter().map(|command| Offer { name: name(&command, desk), command }).collect()
}

/// Steps back and forth, and what can be done with the chosen string and the tolerances.
fn changes(desk: &Desk, view: &View) -> Vec<Command> {
    let (string, count) = (view.string, desk.plan.strings.len());
    let possible = [
        (Command::Undo, desk.history().undo_name().is_some()),
        (Command::Redo, desk.history().redo_name().is_some()),
        (Command::DuplicateString(string), count < MOST_STRINGS),
        (Command::RemoveString(string), count > 1),
        (Command::MoveStringUp(string), string > 0),
        (Command::MoveStringDown(string), string + 1 < count),
        (Command::TakeTolerances, desk.plan.tolerances != Some(Tolerances::default())),
        (Command::LeaveOutTolerances, desk.plan.tolerances.is_some()),
    ];
    let spread = Spread::ALL.map(|of| (Command::Spread(of), count > 2));
    possible.into_iter().chain(spread).filter(|(_, can)| *can).map(|(command, _)| command).collect()
}

/// Paths of the fields that every plan has, and those of the chosen string.
fn fields(desk: &Desk, view: &View) -> Vec<String> {
    const SHARED: [&str; 15] = [
        "title",
        "instrument.frets",
        "instrument.relief_mm",
        "instrument.fret_height_mm",
        "reference_hz",
        "saddle.thickness_mm",
        "saddle.edge_margin_mm",
        "saddle.travel_mm[0]",
        "saddle.travel_mm[1]",
        "pressing.finger_fraction",
        "pressing.depth_mm",
        "supports.nut",
        "supports.saddle",
        "slip.head",
        "tolerances.limit_cents",
    ];
    const OF_STRING: [&str; 4] = ["name", "pitch", "core.diameter_mm", "action_mm.twelfth"];
    let scale = match desk.plan.instrument.scale {
        Scale::Single(_) => ["instrument.scale_mm"].as_slice(),
        Scale::Fanned(_) => &["instrument.scale_mm.treble", "instrument.scale_mm.bass"],
    };
    let shared = scale.iter().chain(&SHARED).map(|path| (*path).to_owned());
    // Over a zero fret nobody measures a gap at fret 1.
    let first = (!desk.plan.instrument.zero_fret).then_some("action_mm.first");
    let of_string = OF_STRING.into_iter().chain(first);
    let of_string = of_string.map(|path| format!("strings[{}].{path}", view.string));
    shared.chain(of_string).collect()
}

/// The name in the list, where no menu or heading says what the word is about.
fn name(command: &Command, desk: &Desk) -> String {
    let plain = command.name();
    let about = |what: Option<&str>| what.map_or_else(|| plain.clone(), |what| format!("{plain}: {what}"));
    match command {
        Command::Undo => about(desk.history().undo_name()),
        Command::Redo => about(desk.history().redo_name()),
        Command::ShowPage(page) => format!("Go to the page {}", page.name()),
        Command::GoTo(path) => format!("Go to the field: {}", place_in_words(path)),
        Command::Fold(group) => format!("Open or fold the group {}", group.name()),
        Command::NewFromExample(name) => format!("New from example: {}", name.replace('_', " ")),
        _ => plain,
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use std::collections::{BTreeMap, BTreeSet};

    use super::*;
    use crate::edit::history::Edit;
    use crate::units::LengthUnit;
    use crestline_plan::{NutStyle, SaddleStyle, example, read};

    /// Why a command is not in the list; none where it must be there.
    ///
    /// A new command does not compile here until somebody has thought about it.
    fn why_left_out(command: &Command) -> Option<&'static str> {
        match command {
            Command::TypePath => Some("its button stands beside what it is about"),
            Command::ImportReadingsFrom(_) => Some("comes of a file that was chosen or dropped"),
            Command::FillReadings(_) => Some("comes of what is pasted into the table"),
            Command::TakeFitted => Some("its button stands beside the instrument that was fitted"),
            Command::TakeStyle(..) => Some("its button stands in the row of the table that it takes"),
            Command::FindCommand => Some("it is the list"),
            Command::NewFromExample(_)
            | Command::NewFromKind(_)
            | Command::Spread(_)
            | Command::ShowCard(_)
            | Command::Open
            | Command::OpenFile(_)
            | Command::Save
            | Command::SaveAs
            | Command::Export(_)
            | Command::ImportReadings
            | Command::ShowLengthsIn(_)
            | Command::Quit
            | Command::Undo
            | Command::Redo
            | Command::DuplicateString(_)
            | Command::RemoveString(_)
            | Command::MoveStringUp(_)
            | Command::MoveStringDown(_)
            | Command::ChooseString(_)
            | Command::TakeTolerances
            | Command::LeaveOutTolerances
            | Command::ShowPage(_)
            | Command::ShowInputs(_)
            | Command::Fold(_)
            | Command::GoTo(_)
            | Command::Theme(_)
            | Command::LargerText
            | Command::SmallerText
            | Command::UsualText
            | Command::ResetPlots
            | Command::DismissMessage => None,
        }
    }

    fn one_of_each() -> Vec<Command> {
        vec![
            Command::NewFromExample("mandolin"),
            Command::NewFromKind("mandolin"),
            Command::Spread(Spread::ActionTwelfth),
            Command::ShowCard(false),
            Command::Open,
            Command::OpenFile(PathBuf::from("/a.json")),
            Command::Save,
            Command::SaveAs,
            Command::Export(Format::Pdf),
            Command::ImportReadings,
            Command::ImportReadingsFrom(PathBuf::from("/a.csv")),
            Command::TakeFitted,
            Command::ShowLengthsIn(LengthUnit::Inches),
            Command::TypePath,
            Command::Quit,
            Command::Undo,
            Command::Redo,
            Command::DuplicateString(1),
            Command::RemoveString(1),
            Command::MoveStringUp(1),
            Command::MoveStringDown(1),
            Command::ChooseString(3),
            Command::TakeTolerances,
            Command::LeaveOutTolerances,
            Command::TakeStyle(SaddleStyle::Straight, NutStyle::Plain, None),
            Command::ShowPage(Page::Compare),
            Command::ShowInputs(false),
            Command::Fold(Group::Nut),
            Command::GoTo("instrument.relief_mm".into()),
            Command::Theme(ThemeChoice::Dark),
            Command::LargerText,
            Command::SmallerText,
            Command::UsualText,
            Command::ResetPlots,
            Command::DismissMessage,
            Command::FindCommand,
        ]
    }

    /// A desk with steps both ways and tolerances of its own, and a view on its second string.
    fn busy() -> (Desk, View) {
        let mut desk = Desk::new(read(example("steel_six").unwrap().text).unwrap(), None);
        desk.plan.tolerances = Some(Tolerances { limit_cents: 3.0, ..Tolerances::default() });
        for relief_mm in [0.2, 0.3] {
            desk.plan.instrument.relief_mm = relief_mm;
            desk.settle(&Edit::whole("Relief"));
        }
        desk.undo();
        let mut view = View { string: 1, ..View::new() };
        view.say("Done");
        (desk, view)
    }

    #[test]
    fn every_command_is_in_the_list_or_has_a_reason() {
        let (desk, view) = busy();
        let list = offers(&desk, &view, &[PathBuf::from("/a.json")]);
        for command in one_of_each() {
            let is_listed = list.iter().any(|offer| offer.command == command);
            assert_eq!(is_listed, why_left_out(&command).is_none(), "{command:?}");
        }
    }

    #[test]
    fn no_two_offers_share_a_name_and_no_two_commands_a_key() {
        let (desk, view) = busy();
        let list = offers(&desk, &view, &[PathBuf::from("/a.json")]);
        let names: BTreeSet<_> = list.iter().map(|offer| &offer.name).collect();
        assert_eq!(names.len(), list.len());
        let mut keys = BTreeMap::new();
        for command in list.iter().map(|offer| &offer.command).chain([&Command::FindCommand]) {
            for key in command.shortcut().into_iter().chain(command.spare_shortcut()) {
                let other = keys.insert(format!("{key:?}"), command.clone());
                assert!(other.is_none(), "{key:?} calls {command:?} and {other:?}");
            }
        }
        assert!(keys.len() > 12, "keys were found");
    }

    #[test]
    fn every_key_is_listened_for() {
        let (desk, view) = busy();
        let heard = Command::with_keys();
        for command in offers(&desk, &view, &[]).into_iter().map(|offer| offer.command) {
            // One key goes both ways, and the window knows which of both is meant.
            let is_switch =
                matches!(command, Command::ShowInputs(_) | Command::ShowLengthsIn(_) | Command::ShowCard(_));
            assert!(command.shortcut().is_none() || is_switch || heard.contains(&command), "{command:?}");
        }
        assert!(heard.contains(&Command::FindCommand));
    }
}
