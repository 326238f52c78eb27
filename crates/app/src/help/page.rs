//! The page itself.

use eframe::egui::{Frame, Label, Margin, RichText, ScrollArea, Ui};

use super::text::{SECTIONS, SOURCES, Section};
use crate::theme::{Palette, size};
use crate::view::Page;

/// The widest that a line of text can be read comfortably, points.
const LINE: f32 = 760.0;

/// Shows the page.
pub fn show(ui: &mut Ui, palette: &Palette) {
    let margin = Margin::symmetric(14, 10);
    Frame::new().fill(palette.sheet).inner_margin(margin).show(ui, |ui| {
        ScrollArea::vertical().auto_shrink([false, false]).show(ui, |ui| {
            ui.set_max_width(LINE.min(ui.available_width()));
            ui.label(RichText::new(Page::Help.meaning()).color(palette.quiet));
            for section in &SECTIONS {
                part(ui, palette, section);
            }
            sources(ui, palette);
            pages(ui, palette);
        });
    });
}

fn heading(ui: &mut Ui, text: &str) {
    ui.add_space(size::WIDE_GAP);
    ui.label(RichText::new(text).heading().strong());
}

fn part(ui: &mut Ui, palette: &Palette, section: &Section) {
    heading(ui, section.heading);
    let colour = if section.is_caution { palette.caution } else { palette.ink };
    for paragraph in section.paragraphs {
        ui.add(Label::new(RichText::new(*paragraph).color(colour)).wrap());
    }
}

fn sources(ui: &mut Ui, palette: &Palette) {
    heading(ui, "Sources");
    for source in &SOURCES {
        ui.add(Label::new(source.work).wrap());
        let used_for = format!("for {}", source.used_for);
        ui.add(Label::new(RichText::new(used_for).small().color(palette.quiet)).wrap());
    }
}

fn pages(ui: &mut Ui, palette: &Palette) {
    heading(ui, "The pages");
    for page in Page::ALL.into_iter().filter(|page| *page != Page::Help) {
        ui.add(Label::new(page.name()).wrap());
        ui.add(Label::new(RichText::new(page.meaning()).small().color(palette.quiet)).wrap());
    }
}
