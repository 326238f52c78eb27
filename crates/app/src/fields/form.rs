//! What every panel of fields works with: faults and drafts to show, edits and commands to hand back.

use crestline_plan::Fault;
use eframe::egui::{Frame, Id, Response, Stroke, Ui};

use super::draft::{Draft, Drafts};
use crate::edit::command::Command;
use crate::edit::history::Edit;
use crate::hints::card::About;
use crate::theme::{Palette, size};
use crate::units::{LengthUnit, fault_words};

/// The surroundings of the fields during one frame.
pub struct Form<'a> {
    /// What is wrong with the plan.
    pub faults: &'a [Fault],
    /// What is being typed.
    pub drafts: &'a mut Drafts,
    /// The path of the field to go to, until it has been found.
    pub going_to: &'a mut Option<String>,
    /// The unit of lengths.
    pub unit: LengthUnit,
    /// Colours.
    pub palette: &'static Palette,
    /// The change made in this frame.
    pub edit: Option<Edit>,
    /// The field that has the focus.
    pub about: Option<About>,
    /// Whether a field has been left in this frame.
    pub left: bool,
    /// What buttons ask for.
    pub commands: Vec<Command>,
}

impl<'a> Form<'a> {
    /// The surroundings at the beginning of a frame.
    pub fn new(
        faults: &'a [Fault],
        drafts: &'a mut Drafts,
        going_to: &'a mut Option<String>,
        palette: &'static Palette,
        unit: LengthUnit,
    ) -> Self {
        Self {
            faults,
            drafts,
            going_to,
            unit,
            palette,
            edit: None,
            about: None,
            left: false,
            commands: Vec::new(),
        }
    }

    /// Notes that a panel has changed the plan at once.
    pub fn edited(&mut self, name: impl Into<String>) {
        self.edit = Some(Edit::whole(name));
    }

    /// What is wrong with the field at `path`: what was typed, or what the plan's check found there or in
    /// what the field is a part of.
    #[must_use]
    pub fn error(&self, path: &str) -> Option<String> {
        let typed = self.drafts.get(path).and_then(|draft| draft.error.clone());
        typed.or_else(|| {
            self.faults
                .iter()
                .find(|fault| belongs(&fault.path, path))
                .map(|fault| fault_words(fault, self.unit))
        })
    }

    /// Everything that is wrong at `path` and inside it, in words.
    #[must_use]
    pub fn errors_inside(&self, path: &str) -> Vec<String> {
        let typed =
            self.drafts.errors().filter(|(typed, _)| inside(typed, path)).map(|(_, error)| error.to_owned());
        typed
            .chain(
                self.faults
                    .iter()
                    .filter(|fault| inside(&fault.path, path))
                    .map(|fault| fault_words(fault, self.unit)),
            )
            .collect()
    }

    /// What is wrong at exactly `path`, in words.
    #[must_use]
    pub fn errors_at(&self, path: &str) -> Vec<String> {
        self.faults
            .iter()
            .filter(|fault| fault.path == path)
            .map(|fault| fault_words(fault, self.unit))
            .collect()
    }

    /// The frame of the field `id`, which shows whether it is wrong or has the focus.
    pub fn frame(&self, ui: &Ui, id: Id, wrong: bool) -> Frame {
        let palette = self.palette;
        let focused = ui.memory(|memory| memory.has_focus(id));
        let edge = match (wrong, focused) {
            (true, _) => Stroke::new(size::STRONG_EDGE, palette.fault),
            (false, true) => Stroke::new(size::STRONG_EDGE, palette.accent),
            (false, false) => Stroke::new(size::EDGE, palette.edge),
        };
        let fill = if wrong { palette.fault_ground } else { palette.field };
        Frame::new().fill(fill).stroke(edge).corner_radius(size::CORNER).inner_margin(size::FIELD_MARGIN)
    }

    /// Moves the focus to a field that is to be gone to.
    pub fn arrive(&mut self, ui: &Ui, path: &str, response: &Response) {
        let here = self.going_to.as_deref().is_some_and(|to| belongs(to, path));
        if here {
            *self.going_to = None;
            response.request_focus();
            ui.scroll_to_rect(response.rect.expand(24.0), None);
        }
    }

    /// Keeps the text of a field that is being typed in, and the change that it made.
    pub fn typed(&mut self, path: &str, name: &str, gesture: Id, draft: Draft) {
        self.edit = Some(Edit { name: name.to_owned(), gesture: Some(gesture) });
        self.drafts.keep(path, draft);
    }
}

/// Whether a fault at `fault_path` is the field `path` itself or inside it.
fn inside(fault_path: &str, path: &str) -> bool {
    fault_path.strip_prefix(path).is_some_and(|rest| rest.is_empty() || rest.starts_with(['.', '[']))
}

/// Whether a fault at `fault_path` marks the field `path`: it is inside it, or it is the pair, list or group
/// that the field is a direct part of. A fault of a whole list entry, such as a string, marks no field of it.
fn belongs(fault_path: &str, path: &str) -> bool {
    let part = path.strip_prefix(fault_path).is_some_and(|rest| {
        let is_entry = rest.starts_with('[');
        let is_member = rest.starts_with('.') && !fault_path.ends_with(']');
        (is_entry || is_member) && rest.matches(['[', '.']).count() == 1
    });
    inside(fault_path, path) || part
}

/// A path in words: `strings[2].core.diameter_mm` becomes `String 3, core diameter`.
#[must_use]
pub fn place_in_words(path: &str) -> String {
    let mut words: Vec<String> = Vec::new();
    for part in path.split('.') {
        let (name, index) =
            part.split_once('[').map_or((part, None), |(name, rest)| (name, rest.strip_suffix(']')));
        let plain = plain_name(name);
        let number = index.and_then(|index| index.parse::<usize>().ok());
        match (name, number) {
            ("strings", Some(index)) => words.push(format!("string {}", index + 1)),
            (_, Some(index)) => words.push(format!("{plain} {}", index + 1)),
            _ => words.push(plain),
        }
    }
    let mut text = words.join(", ");
    if let Some(first) = text.get(..1).map(str::to_uppercase) {
        text.replace_range(..1, &first);
    }
    text
}

/// A key of the plan file without its unit and underscores.
fn plain_name(key: &str) -> String {
    const UNITS: [&str; 9] = ["_kg_per_m", "_n_mm2", "_kg_m3", "_cents", "_mpa", "_gpa", "_mm", "_hz", "_n"];
    let bare = UNITS.iter().find_map(|unit| key.strip_suffix(unit)).unwrap_or(key);
    bare.replace('_', " ")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn faults_find_their_field() {
        assert!(belongs("strings[2].pitch.note", "strings[2].pitch"));
        assert!(belongs("saddle.travel_mm", "saddle.travel_mm[1]"));
        assert!(belongs("saddle.travel_mm[1]", "saddle.travel_mm"));
        assert!(!belongs("saddle.travel_mm[1]", "saddle.travel_mm[0]"));
        assert!(belongs("strings[2].action_mm", "strings[2].action_mm.first"));
        assert!(!belongs("strings[2]", "strings[2].pitch"));
        assert!(!belongs("strings", "strings[2].pitch"));
        assert!(!belongs("fit.frets", "fit.frets_more"));
    }

    #[test]
    fn paths_become_words() {
        assert_eq!(place_in_words("strings[2].core.diameter_mm"), "String 3, core, diameter");
        assert_eq!(place_in_words("instrument.scale_mm"), "Instrument, scale");
        assert_eq!(place_in_words(""), "");
    }
}
