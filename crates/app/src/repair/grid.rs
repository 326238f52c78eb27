//! The grid of readings: strings by frets, made for fast typing.

use std::cell::Cell;

use crestline_plan::limits::USUAL_READING_CENTS;
use crestline_plan::{Plan, Reading};
use eframe::egui::{
    Align2, FontId, RichText, ScrollArea, Sense, Stroke, StrokeKind, Ui, Vec2, WidgetInfo, accesskit, pos2,
};

use super::block::{self, Filling};
use super::place::{Place, Shown, Sounded};
use super::resting;
use super::state::Repair;
use super::steer::{self, Field};
use crate::edit::command::Command;
use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::hints::card::About;
use crate::results::figures::{cents, fixed};
use crate::results::marks;
use crate::theme::size;

/// Least and greatest width of a column.
const COLUMN: [f32; 2] = [57.0, 96.0];
/// Width of the strings' names.
const NAME: f32 = 78.0;
/// Height of the heads and of a row.
const HEAD: f32 = 36.0;
const ROW: f32 = 24.0;
/// Gap between cells.
const GAP: f32 = 3.0;
/// The most readings that are asked about in words; more are counted.
const ASKED: usize = 4;

/// The grid with what is asked about below it.
pub fn show(ui: &mut Ui, form: &mut Form, plan: &mut Plan, repair: &mut Repair, chosen: usize) {
    let columns = repair.columns.of(plan, repair.inquiry.suggested());
    let field = Field { columns: &columns, strings: plan.strings.len() };
    steer(ui, form, plan, field, repair);
    let room = (ui.available_width() - NAME) / columns.len() as f32 - GAP;
    let shown = Shown::of(&plan.readings);
    let grid = Grid {
        width: room.clamp(COLUMN[0], COLUMN[1]),
        columns: &columns,
        chosen,
        shown,
        height: Cell::new(0.0),
    };
    ScrollArea::horizontal().id_salt("readings").auto_shrink([false, true]).show(ui, |ui| {
        ui.spacing_mut().item_spacing = Vec2::splat(GAP);
        grid.heads(ui, form, repair.inquiry.suggested());
        for string in 0..plan.strings.len() {
            ui.horizontal(|ui| grid.row(ui, form, plan, repair, string));
        }
        // Room for the bar, which would stand over the last row.
        ui.add_space(6.0);
    });
    questions(ui, form, plan);
}

/// Does what keys and pastes want in the cell that has the focus.
fn steer(ui: &Ui, form: &mut Form, plan: &Plan, field: Field<'_>, repair: &mut Repair) {
    if let Some(place) = repair.going_to.take() {
        ui.memory_mut(|memory| memory.request_focus(id(place)));
    }
    let Some(focused) = ui.memory(|memory| memory.focused()) else { return };
    let rows = 0..plan.strings.len();
    let all = rows.flat_map(|string| field.columns.iter().map(move |&sounded| Place { string, sounded }));
    let Some(place) = all.into_iter().find(|place| id(*place) == focused) else { return };
    if let Some(next) = steer::steps(ui, field, place, focused) {
        ui.memory_mut(|memory| memory.request_focus(id(next)));
        repair.entered = Some(id(next));
    }
    if let Some(text) = steer::pasted(ui, block::is_block) {
        let filling = block::lay(&text, place, field.columns, field.strings);
        form.commands.push(Command::FillReadings(filling));
    }
}

fn id(place: Place) -> eframe::egui::Id {
    spec(place).id()
}

/// The field of a cell.
fn spec(place: Place) -> Spec<'static> {
    Spec::new(place.path(), place.name(), 0.0, "").place("grid")
}

/// Where the cells are.
struct Grid<'a> {
    width: f32,
    columns: &'a [Sounded],
    chosen: usize,
    shown: Shown,
    /// Height of a cell, once one has been shown.
    height: Cell<f32>,
}

impl Grid<'_> {
    fn heads(&self, ui: &mut Ui, form: &Form, suggested: &[u32]) {
        ui.horizontal(|ui| {
            let (rect, _) = ui.allocate_exact_size(Vec2::new(NAME, HEAD), Sense::hover());
            let quiet = form.palette.quiet;
            marks::head(ui.painter(), rect.left_bottom(), Align2::LEFT_BOTTOM, "Cents at\nfret", quiet);
            for column in self.columns {
                let (rect, response) = ui.allocate_exact_size(Vec2::new(self.width, HEAD), Sense::hover());
                let is_suggested = matches!(column, Sounded::Fretted(fret) if suggested.contains(fret));
                let (over, under) = match column {
                    Sounded::Open => ("open", ""),
                    Sounded::OctaveHarmonic => ("octave", "harmonic"),
                    Sounded::Fretted(_) => ("", if is_suggested { "suggested" } else { "" }),
                };
                let over =
                    if let Sounded::Fretted(fret) = column { fret.to_string() } else { over.to_owned() };
                let painter = ui.painter();
                let ink = form.palette.ink;
                painter.text(
                    rect.center_top(),
                    Align2::CENTER_TOP,
                    over,
                    FontId::proportional(size::TEXT),
                    ink,
                );
                let at = pos2(rect.center().x, rect.bottom() - 2.0);
                let small = FontId::proportional(size::SMALL - 1.5);
                painter.text(at, Align2::CENTER_BOTTOM, under, small, quiet);
                if is_suggested {
                    painter.hline(rect.x_range(), rect.bottom(), Stroke::new(2.0, form.palette.accent));
                }
                let remark = if is_suggested { ", suggested" } else { "" };
                let words = format!("Column {}{remark}", column.words());
                response.widget_info(|| WidgetInfo::labeled(accesskit::Role::ColumnHeader, true, &words));
            }
        });
    }

    fn row(&self, ui: &mut Ui, form: &mut Form, plan: &mut Plan, repair: &mut Repair, string: usize) {
        self.name(ui, form, string, &plan.strings[string].name);
        for &sounded in self.columns {
            self.cell(ui, form, &mut plan.readings, repair, Place { string, sounded });
        }
    }

    /// Marker, number and name of a string; it chooses the string.
    fn name(&self, ui: &mut Ui, form: &mut Form, string: usize, name: &str) {
        let palette = form.palette;
        let (rect, response) = ui.allocate_exact_size(Vec2::new(NAME, ROW), Sense::click());
        let is_chosen = string == self.chosen;
        let words = format!("Choose string {}", string + 1);
        response.widget_info(|| WidgetInfo::selected(accesskit::Role::RadioButton, true, is_chosen, &words));
        if is_chosen {
            ui.painter().rect_filled(rect, 3.0, palette.accent_ground);
        }
        if response.has_focus() || response.hovered() {
            ui.painter().rect_stroke(rect, 3.0, Stroke::new(1.0, palette.accent), StrokeKind::Inside);
        }
        let middle = rect.center().y;
        marks::paint(ui.painter(), pos2(rect.left() + 11.0, middle), string, palette, 4.5);
        let number = (string + 1).to_string();
        let text = if name == number || name.is_empty() { number } else { format!("{number} {name}") };
        let width = rect.width() - 26.0;
        let elided = marks::Elided { text: &text, size: size::TEXT, colour: palette.ink, width };
        elided.paint(ui.painter(), pos2(rect.left() + 22.0, middle), Align2::LEFT_CENTER);
        if response.clicked() {
            form.commands.push(Command::ChooseString(string));
        }
    }

    fn cell(
        &self,
        ui: &mut Ui,
        form: &mut Form,
        readings: &mut Vec<Reading>,
        repair: &mut Repair,
        place: Place,
    ) {
        let (value, count) = self.shown.at(place);
        let is_odd = value.is_some_and(is_odd);
        let several = match count > 1 {
            true => format!("The mean of {count} readings; a new number takes the place of all of them"),
            false => String::new(),
        };
        let spec = Spec {
            help: match (count > 1, is_odd) {
                (true, _) => &several,
                (_, true) => "More than a semitone away: is it right?",
                _ => "",
            },
            width: self.width,
            ..spec(place)
        };
        let id = spec.id();
        let shown = shown(value, count);
        let text = form.drafts.get(&spec.path).map_or(shown.as_str(), |draft| draft.text.as_str()).to_owned();
        let response = match resting::place(ui, form, &spec, self.height.get()) {
            Some(rect) => resting::show(ui, form, &spec, rect, &text),
            None => number::typed(ui, form, &spec, &shown, block::cents, |cents| place.put(readings, cents)),
        };
        // The first cell of all is always the field itself, and the others are as high.
        self.height.set(response.rect.height());
        if response.has_focus() {
            // The keys ask how long the text is that they walk in.
            steer::note_length(ui.ctx(), id, &text);
            form.about =
                Some(About { path: "readings".into(), name: spec.name.clone(), what: spec.help.into() });
        }
        if response.gained_focus() {
            repair.entered = Some(id);
            response.scroll_to_me(None);
        }
        if repair.entered == Some(id) && response.has_focus() && !ui.input(|input| input.pointer.any_down()) {
            steer::choose_all(ui.ctx(), id, &text);
            repair.entered = None;
        }
        let sign = match (is_odd, count > 1) {
            (true, _) => "?",
            (_, true) => "×",
            _ => return,
        };
        let at = response.rect.left_center() + Vec2::new(5.0, 0.0);
        let font = FontId::proportional(size::TEXT);
        ui.painter().text(at, Align2::LEFT_CENTER, sign, font, form.palette.caution);
    }
}

/// A value in its cell; a mean is rounded as it was never typed.
fn shown(value: Option<f64>, count: usize) -> String {
    match value {
        None => String::new(),
        Some(value) if count > 1 => fixed(value, 2),
        Some(value) => crate::fields::parse::shown(value),
    }
}

fn is_odd(cents: f64) -> bool {
    !USUAL_READING_CENTS.contains(cents)
}

/// Readings that are hardly right, in words.
fn questions(ui: &mut Ui, form: &mut Form, plan: &Plan) {
    let odd: Vec<(usize, &Reading)> =
        plan.readings.iter().enumerate().filter(|(_, reading)| is_odd(reading.cents)).collect();
    for (index, reading) in odd.iter().take(ASKED) {
        let words = format!(
            "? {}: {} cents is more than a semitone away. Is it the right note?",
            Place::of(reading).name(),
            cents(reading.cents)
        );
        let text = RichText::new(&words).small().color(form.palette.caution);
        let response = ui.add(eframe::egui::Label::new(text).wrap().sense(Sense::click()));
        response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Link, true, &words));
        if response.clicked() {
            form.commands.push(Command::GoTo(format!("readings[{index}].cents")));
        }
    }
    if odd.len() > ASKED {
        let more = format!("? And {} more readings beyond ±100 cents.", odd.len() - ASKED);
        ui.label(RichText::new(more).small().color(form.palette.caution));
    }
}

/// What is said when a block has been pasted.
#[must_use]
pub fn pasted_words(filling: &Filling) -> String {
    let filled = filling.cells.iter().filter(|(_, cents)| cents.is_some()).count();
    let done = format!("{filled} readings pasted.");
    filling.remark().map_or(done.clone(), |remark| format!("{done} {remark}"))
}
