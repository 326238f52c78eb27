//! What the window shows and how: nothing of it is saved with the plan.

use std::collections::BTreeSet;

use eframe::egui::Key;

use crate::bands::state::Trust;
use crate::choices::study::Study;
use crate::fields::draft::Drafts;
use crate::hints::card::About;
use crate::papers::preview::Preview;
use crate::repair::state::Repair;
use crate::results::camera::Camera;
use crate::results::error_plot::ErrorChoice;
use crate::units::LengthUnit;

/// The pages of the window.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Page {
    /// The plan's inputs beside the saddle that comes of them.
    Saddle,
    /// The errors of every fretted note as a table.
    FrettedNotes,
    /// Every way to make saddle and nut, and figures for setting out.
    Compare,
    /// How far the setbacks can be trusted, and what to measure next.
    HowSure,
    /// The drawing as it prints, and its files.
    Sheets,
    /// Tuner readings, and what they say of the instrument.
    Diagnosis,
    /// What the program computes, its limits and its sources.
    Help,
}

impl Page {
    /// All pages in the order of their tabs.
    pub const ALL: [Self; 7] = [
        Self::Saddle,
        Self::FrettedNotes,
        Self::Compare,
        Self::HowSure,
        Self::Sheets,
        Self::Diagnosis,
        Self::Help,
    ];

    /// The pages that have a tab; Help stands in a menu.
    pub const TABS: [Self; 6] =
        [Self::Saddle, Self::FrettedNotes, Self::Compare, Self::HowSure, Self::Sheets, Self::Diagnosis];

    /// The word on its tab.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::Saddle => "Saddle",
            Self::FrettedNotes => "Fretted notes",
            Self::Compare => "Compare",
            Self::HowSure => "How sure",
            Self::Sheets => "Sheets",
            Self::Diagnosis => "Diagnosis",
            Self::Help => "Help",
        }
    }

    /// One sentence on what it is for.
    #[must_use]
    pub fn meaning(self) -> &'static str {
        match self {
            Self::Saddle => "Where each string's crest must stand so that the fretted notes are in tune.",
            Self::FrettedNotes => "How far each fretted note is off, on every string and at every fret.",
            Self::Compare => "What each way of making saddle and nut can reach, and figures for setting out.",
            Self::HowSure => "How far the setbacks can be trusted, and what to measure to trust them more.",
            Self::Sheets => {
                "The drawing as it prints, at full size. Measure the check line of a print before you cut."
            }
            Self::Diagnosis => "What tuner readings say about an instrument that exists.",
            Self::Help => "What the program computes, how far it can be trusted, and where it comes from.",
        }
    }

    /// The digit of its key, by its place among the tabs.
    #[must_use]
    pub fn digit(self) -> Option<Key> {
        const DIGITS: [Key; 7] =
            [Key::Num1, Key::Num2, Key::Num3, Key::Num4, Key::Num5, Key::Num6, Key::Num7];
        let place = Self::ALL.into_iter().position(|page| page == self)?;
        DIGITS.get(place).copied()
    }
}

/// The groups of fields beside the results.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Group {
    /// Title and notes.
    About,
    /// Neck, frets and spacing.
    Instrument,
    /// The strings.
    Strings,
    /// Other sets of strings and tunings that the saddle must suit.
    Alternatives,
    /// Pressing, supports and slip.
    Pressing,
    /// The saddle.
    Saddle,
    /// The nut.
    Nut,
    /// The fit.
    Fit,
    /// The drawing.
    Sheet,
}

impl Group {
    /// All groups.
    pub const ALL: [Self; 9] = [
        Self::About,
        Self::Instrument,
        Self::Strings,
        Self::Alternatives,
        Self::Pressing,
        Self::Saddle,
        Self::Nut,
        Self::Fit,
        Self::Sheet,
    ];

    /// The words on its heading.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::About => "Plan",
            Self::Instrument => "Instrument and neck",
            Self::Strings => "Strings",
            Self::Alternatives => "Other strings and tunings",
            Self::Pressing => "Pressing and supports",
            Self::Saddle => "Saddle",
            Self::Nut => "Nut",
            Self::Fit => "Fit",
            Self::Sheet => "Drawing",
        }
    }

    /// The group that shows the field with this path.
    #[must_use]
    pub fn of_path(path: &str) -> Self {
        let head = path.split(['.', '[']).next().unwrap_or_default();
        match head {
            "instrument" => Self::Instrument,
            "strings" | "reference_hz" => Self::Strings,
            "alternatives" | "strings_weight" => Self::Alternatives,
            "pressing" | "supports" | "slip" => Self::Pressing,
            "saddle" | "as_built" => Self::Saddle,
            "nut" => Self::Nut,
            "fit" | "targets" => Self::Fit,
            "sheet" => Self::Sheet,
            _ => Self::About,
        }
    }
}

/// Light, dark, or as the system has it.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum ThemeChoice {
    /// As the system has it; light where it does not say.
    #[default]
    System,
    /// Dark on light.
    Light,
    /// Light on dark.
    Dark,
}

impl ThemeChoice {
    /// All choices in the order of the menu.
    pub const ALL: [Self; 3] = [Self::System, Self::Light, Self::Dark];

    /// The words in the menu.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::System => "Colours as the system has them",
            Self::Light => "Light colours",
            Self::Dark => "Dark colours",
        }
    }
}

/// What the table of the fretted notes shows.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum NoteFigure {
    /// Errors with the built setbacks.
    Built,
    /// Errors with the ideal setbacks.
    Ideal,
    /// Errors with no setback.
    None,
    /// Errors of the existing instrument.
    AsItIs,
    /// Force of the finger.
    Force,
}

impl NoteFigure {
    /// All of them in the order of the buttons.
    pub const ALL: [Self; 5] = [Self::Built, Self::Ideal, Self::None, Self::AsItIs, Self::Force];

    /// The word on the button.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::Built => "Built",
            Self::Ideal => "Ideal",
            Self::None => "No setback",
            Self::AsItIs => "As it is now",
            Self::Force => "Finger force",
        }
    }

    /// One sentence on it.
    #[must_use]
    pub fn meaning(self) -> &'static str {
        match self {
            Self::Built => "Error in cents with the saddle and nut as they will be made. Plus is sharp.",
            Self::Ideal => "Error in cents with the best setback of each string alone. Plus is sharp.",
            Self::None => "Error in cents with crest and nut edge on the nominal lines. Plus is sharp.",
            Self::AsItIs => "Error in cents of the existing instrument. Plus is sharp.",
            Self::Force => "Force in newtons of the finger that holds the string down, with no setback.",
        }
    }
}

/// A line at the foot of the window about what has just been done.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Message {
    /// The words.
    pub text: String,
    /// Whether something went wrong.
    pub is_error: bool,
}

/// The state of the window.
#[derive(Debug)]
pub struct View {
    /// The page that is shown.
    pub page: Page,
    /// Light or dark.
    pub theme: ThemeChoice,
    /// The unit of all lengths in the window; the drawing has its own.
    pub unit: LengthUnit,
    /// Whether the inputs are shown.
    pub inputs: bool,
    /// Whether the card about the field with the focus is shown below the inputs.
    pub card: bool,
    /// The field that it is about.
    pub about: Option<About>,
    /// The chosen string, 0 first.
    pub string: usize,
    /// The groups that are folded away.
    pub folded: BTreeSet<Group>,
    /// What is being typed in fields, and what is wrong with it.
    pub drafts: Drafts,
    /// The path of a field that the next frame should go to.
    pub going_to: Option<String>,
    /// What the error curves show.
    pub errors: ErrorChoice,
    /// What the table of the fretted notes shows.
    pub note_figure: NoteFigure,
    /// Where the saddle layout is looked at from.
    pub saddle_camera: Camera,
    /// Where the nut end is looked at from.
    pub nut_camera: Camera,
    /// The comparison and the figures for setting out.
    pub study: Study,
    /// What is shown of the sheets.
    pub preview: Preview,
    /// How sure the setbacks are.
    pub trust: Trust,
    /// Readings and diagnosis.
    pub repair: Repair,
    /// What has just been done.
    pub message: Option<Message>,
}

impl View {
    /// The window as it opens.
    #[must_use]
    pub fn new() -> Self {
        Self {
            page: Page::Saddle,
            theme: ThemeChoice::default(),
            unit: LengthUnit::default(),
            inputs: true,
            card: true,
            about: None,
            string: 0,
            folded: BTreeSet::from([
                Group::About,
                Group::Alternatives,
                Group::Pressing,
                Group::Nut,
                Group::Fit,
                Group::Sheet,
            ]),
            drafts: Drafts::default(),
            going_to: None,
            errors: ErrorChoice::default(),
            note_figure: NoteFigure::Built,
            saddle_camera: Camera::default(),
            nut_camera: Camera::default(),
            study: Study::default(),
            preview: Preview::default(),
            trust: Trust::default(),
            repair: Repair::default(),
            message: None,
        }
    }

    /// Folds a group away, or opens it.
    pub fn fold(&mut self, group: Group) {
        if !self.folded.remove(&group) {
            self.folded.insert(group);
        }
    }

    /// Says something at the foot of the window.
    pub fn say(&mut self, text: impl Into<String>) {
        self.message = Some(Message { text: text.into(), is_error: false });
    }

    /// Says what went wrong behind what stands at the foot of the window already.
    pub fn complain_too(&mut self, text: String) {
        let before = self.message.take().map(|message| format!("{}  ·  ", message.text)).unwrap_or_default();
        self.complain(before + &text);
    }

    /// Says at the foot of the window what went wrong.
    pub fn complain(&mut self, text: impl Into<String>) {
        self.message = Some(Message { text: text.into(), is_error: true });
    }
}

impl Default for View {
    fn default() -> Self {
        Self::new()
    }
}
