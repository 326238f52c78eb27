//! Everything that can be done by menu, button or key, in one list.

use std::path::PathBuf;

use crestline_plan::{Kind, NutStyle, SaddleStyle};
use crestline_sheets::Format;
use eframe::egui::{Key, KeyboardShortcut, Modifiers};

use super::spread::Spread;
use crate::repair::block::Filling;
use crate::units::LengthUnit;
use crate::view::{Group, Page, ThemeChoice};

/// Something to do. Menus, buttons and keys make commands; `shell::obey` carries them out.
#[derive(Debug, Clone, PartialEq)]
pub enum Command {
    /// Start from the example plan of this name.
    NewFromExample(&'static str),
    /// Ask for a plan file and open it.
    Open,
    /// Open this plan file.
    OpenFile(PathBuf),
    /// Save to the plan's file.
    Save,
    /// Ask for a file and save to it.
    SaveAs,
    /// Ask for a file and write the drawing or the schedule to it.
    Export(Format),
    /// Ask for a file with readings and take them.
    ImportReadings,
    /// Take the readings of this file in place of those that there are.
    ImportReadingsFrom(PathBuf),
    /// Put a pasted block into the readings.
    FillReadings(Filling),
    /// Take the instrument that the diagnosis found into the plan.
    TakeFitted,
    /// Take the usual tolerances into the plan.
    TakeTolerances,
    /// Leave the tolerances out of the plan.
    LeaveOutTolerances,
    /// Type the path in the window instead of waiting for a file dialog.
    TypePath,
    /// Close the window.
    Quit,
    /// Take the last step back.
    Undo,
    /// Bring the last undone step back.
    Redo,
    /// Copy the string (0 first) and put the copy behind it.
    DuplicateString(usize),
    /// Remove the string (0 first).
    RemoveString(usize),
    /// Exchange the string (0 first) with the one before it.
    MoveStringUp(usize),
    /// Exchange the string (0 first) with the one behind it.
    MoveStringDown(usize),
    /// Choose the string (0 first) for the detail editor and the plots.
    ChooseString(usize),
    /// Make saddle and nut of these styles, a two-piece saddle split after this string.
    TakeStyle(SaddleStyle, NutStyle, Option<u32>),
    /// Show a page.
    ShowPage(Page),
    /// Show the inputs, or hide them to give the results the whole window.
    ShowInputs(bool),
    /// Open or fold a group of fields.
    Fold(Group),
    /// Go to the field with this path.
    GoTo(String),
    /// Light, dark, or as the system has it.
    Theme(ThemeChoice),
    /// Show the card about the field with the focus, or put it away.
    ShowCard(bool),
    /// Start from the kind of instrument of this key.
    NewFromKind(&'static str),
    /// Spread the outer strings' values over the strings between.
    Spread(Spread),
    /// Show all lengths in this unit.
    ShowLengthsIn(LengthUnit),
    /// Larger text.
    LargerText,
    /// Smaller text.
    SmallerText,
    /// Text at its usual size.
    UsualText,
    /// Show the whole layout again.
    ResetPlots,
    /// Put the last message away.
    DismissMessage,
    /// Search the commands by their names.
    FindCommand,
}

impl Command {
    /// The words for menus and lists.
    #[must_use]
    pub fn name(&self) -> String {
        match self {
            Self::NewFromExample(name) => format!("New from example: {name}"),
            Self::Open => "Open…".into(),
            Self::OpenFile(path) => format!("Open {}", path.display()),
            Self::Save => "Save".into(),
            Self::SaveAs => "Save as…".into(),
            Self::Export(Format::Pdf) => "Write PDF…".into(),
            Self::Export(Format::Svg) => "Write SVG…".into(),
            Self::Export(Format::Dxf) => "Write DXF for a machine…".into(),
            Self::Export(Format::Csv) => "Write schedule CSV…".into(),
            Self::ImportReadings => "Import readings…".into(),
            Self::ImportReadingsFrom(path) => format!("Import readings from {}", path.display()),
            Self::FillReadings(_) => "Paste readings".into(),
            Self::TakeFitted => "Take the fitted instrument into the plan".into(),
            Self::TakeTolerances => "Take the usual tolerances into the plan".into(),
            Self::LeaveOutTolerances => "Leave the tolerances out of the plan".into(),
            Self::TypePath => "Type the path here instead".into(),
            Self::Quit => "Quit".into(),
            Self::Undo => "Undo".into(),
            Self::Redo => "Redo".into(),
            Self::DuplicateString(_) => "Add a copy of the string".into(),
            Self::RemoveString(_) => "Remove the string".into(),
            Self::MoveStringUp(_) => "Move the string up".into(),
            Self::MoveStringDown(_) => "Move the string down".into(),
            Self::ChooseString(index) => format!("Choose string {}", index + 1),
            Self::TakeStyle(..) => "Take this saddle and nut into the plan".into(),
            Self::ShowPage(page) => page.name().into(),
            Self::ShowInputs(true) => "Show the inputs".into(),
            Self::ShowInputs(false) => "Hide the inputs".into(),
            Self::Fold(group) => group.name().into(),
            Self::GoTo(path) => format!("Go to {path}"),
            Self::Theme(choice) => choice.name().into(),
            Self::ShowCard(true) => "Show help on fields".into(),
            Self::ShowCard(false) => "Hide help on fields".into(),
            Self::NewFromKind(id) => {
                let name = Kind::of(id).map_or(*id, |kind| kind.name.as_str());
                format!("New plan: {name}")
            }
            Self::Spread(of) => format!("Spread between the outer strings: {}", of.name()),
            Self::ShowLengthsIn(unit) => format!("Lengths in {}", unit.name().to_lowercase()),
            Self::LargerText => "Larger text".into(),
            Self::SmallerText => "Smaller text".into(),
            Self::UsualText => "Usual text size".into(),
            Self::ResetPlots => "Show the whole layout".into(),
            Self::DismissMessage => "Put the message away".into(),
            Self::FindCommand => "Find a command…".into(),
        }
    }

    /// The key that calls it.
    #[must_use]
    pub fn shortcut(&self) -> Option<KeyboardShortcut> {
        let (modifiers, key) = match self {
            Self::Open => (Modifiers::COMMAND, Key::O),
            Self::Save => (Modifiers::COMMAND, Key::S),
            Self::SaveAs => (Modifiers::COMMAND.plus(Modifiers::SHIFT), Key::S),
            Self::Export(Format::Pdf) => (Modifiers::COMMAND, Key::E),
            Self::Quit => (Modifiers::COMMAND, Key::Q),
            Self::Undo => (Modifiers::COMMAND, Key::Z),
            Self::Redo => (Modifiers::COMMAND.plus(Modifiers::SHIFT), Key::Z),
            Self::ShowInputs(_) => (Modifiers::COMMAND, Key::I),
            Self::LargerText => (Modifiers::COMMAND, Key::Plus),
            Self::SmallerText => (Modifiers::COMMAND, Key::Minus),
            Self::UsualText => (Modifiers::COMMAND, Key::Num0),
            Self::ResetPlots => (Modifiers::COMMAND, Key::R),
            Self::ShowLengthsIn(_) => (Modifiers::COMMAND, Key::M),
            Self::FindCommand => (Modifiers::COMMAND, Key::K),
            Self::ShowPage(Page::Help) => (Modifiers::NONE, Key::F1),
            Self::ShowPage(page) => (Modifiers::COMMAND, page.digit()?),
            Self::ShowCard(_) => (Modifiers::SHIFT, Key::F1),
            _ => return None,
        };
        Some(KeyboardShortcut::new(modifiers, key))
    }

    /// A second key that calls it, where hands expect one.
    #[must_use]
    pub fn spare_shortcut(&self) -> Option<KeyboardShortcut> {
        let (modifiers, key) = match self {
            Self::LargerText => (Modifiers::COMMAND, Key::Equals),
            Self::Redo => (Modifiers::COMMAND, Key::Y),
            Self::FindCommand => (Modifiers::NONE, Key::F2),
            _ => return None,
        };
        Some(KeyboardShortcut::new(modifiers, key))
    }

    /// The commands that keys call. The more particular combination stands before the plainer one,
    /// because a key pressed with more modifiers also matches fewer.
    #[must_use]
    pub fn with_keys() -> Vec<Self> {
        let mut all = vec![
            Self::SaveAs,
            Self::Redo,
            Self::Open,
            Self::Save,
            Self::Export(Format::Pdf),
            Self::Quit,
            Self::Undo,
            Self::LargerText,
            Self::SmallerText,
            Self::UsualText,
            Self::ResetPlots,
            Self::FindCommand,
        ];
        all.extend(Page::ALL.map(Self::ShowPage));
        all
    }
}
