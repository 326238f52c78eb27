//! The card about a field: in a tip where the pointer rests, and at the foot of the inputs for the field with the focus.

use eframe::egui::{Frame, Margin, Panel, RichText, ScrollArea, Sense, Stroke, Ui, Vec2};

use super::pen::BOX;
use super::topics::{Topic, topic};
use crate::theme::{Palette, size};
use crate::units::LengthUnit;

/// Width of the text of a tip, points.
const TIP_WIDTH: f32 = 320.0;
/// Height of the card at the foot of the inputs, points.
const FOOT_HEIGHT: f32 = 112.0;
/// Size of a sketch against its own box.
const SKETCH: f32 = 0.9;
/// The least height of the inputs that leaves room for the card, points.
const LEAST_INPUTS: f32 = 420.0;

/// The field that the card is about.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct About {
    /// Path of its value.
    pub path: String,
    /// Its name with the unit.
    pub name: String,
    /// What it is.
    pub what: String,
}

/// What a field is, how it is measured and its ranges, in one text for screen readers.
#[must_use]
pub fn in_words(path: &str, what: &str, unit: LengthUnit) -> String {
    let topic = topic(path);
    let how = topic.map_or("", |topic| topic.how);
    let ranges = topic.map(|topic| topic.ranges(unit)).unwrap_or_default();
    [what, how, &ranges].iter().filter(|part| !part.is_empty()).copied().collect::<Vec<_>>().join(" ")
}

/// A tip: what is wrong, then the card.
pub fn tip(ui: &mut Ui, palette: &Palette, about: &About, error: Option<&str>, unit: LengthUnit) {
    ui.set_max_width(TIP_WIDTH);
    if let Some(error) = error {
        ui.label(RichText::new(error).color(palette.fault));
    }
    let topic = topic(&about.path);
    texts(ui, palette, about, topic, unit);
    if let Some(topic) = topic {
        sketch(ui, palette, topic);
    }
}

/// The card at the foot of the inputs. Where the inputs are low it is left out, so that the fields keep their room.
pub fn foot(ui: &mut Ui, palette: &Palette, about: Option<&About>, unit: LengthUnit) {
    if ui.available_height() < LEAST_INPUTS {
        return;
    }
    let frame = Frame::new()
        .fill(palette.sheet)
        .stroke(Stroke::new(size::EDGE, palette.edge))
        .corner_radius(size::CORNER)
        .inner_margin(Margin::symmetric(8, 5));
    Panel::bottom("about the field")
        .resizable(false)
        .show_separator_line(false)
        .exact_size(FOOT_HEIGHT)
        .frame(frame)
        .show(ui, |ui| match about {
            None => {
                let words = "Go to a field to see here what it is, how it is measured and what is usual. Shift+F1 puts this card away.";
                ui.label(RichText::new(words).small().color(palette.quiet));
            }
            Some(about) => beside(ui, palette, about, unit),
        });
}

/// Texts on the left, the sketch on the right.
fn beside(ui: &mut Ui, palette: &Palette, about: &About, unit: LengthUnit) {
    let topic = topic(&about.path);
    let has_sketch = topic.is_some_and(|topic| topic.sketch.is_some());
    ui.horizontal_top(|ui| {
        let room = ui.available_width() - if has_sketch { SKETCH * BOX.x + size::GAP } else { 0.0 };
        ui.allocate_ui(Vec2::new(room, ui.available_height()), |ui| {
            ui.vertical(|ui| {
                ui.set_width(room);
                ScrollArea::vertical().id_salt("about").show(ui, |ui| texts(ui, palette, about, topic, unit));
            });
        });
        if let Some(topic) = topic {
            sketch(ui, palette, topic);
        }
    });
}

fn texts(ui: &mut Ui, palette: &Palette, about: &About, topic: Option<&Topic>, unit: LengthUnit) {
    ui.spacing_mut().item_spacing.y = 2.0;
    ui.label(RichText::new(&about.name).strong());
    if let Some(topic) = topic {
        ui.label(RichText::new(topic.ranges(unit)).small().color(palette.quiet));
        ui.label(RichText::new(topic.how).small());
    }
    if !about.what.is_empty() {
        ui.label(RichText::new(&about.what).small());
    }
}

fn sketch(ui: &mut Ui, palette: &Palette, topic: &Topic) {
    let Some(sketch) = topic.sketch else { return };
    let (rect, _) = ui.allocate_exact_size(BOX * SKETCH, Sense::empty());
    ui.painter().rect_filled(rect, size::CORNER, palette.field);
    sketch.draw(ui.painter(), rect, palette);
}
