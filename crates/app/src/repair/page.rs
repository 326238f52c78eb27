//! The page: the answer in a sentence, readings, plot and remedies side by side, and what is behind them.

use std::sync::Arc;

use crestline_plan::{Diagnosis, Notice, Plan};
use eframe::egui::{Button, ComboBox, Frame, Label, Margin, RichText, ScrollArea, Stroke, Ui};

use super::error_plot::{self, Shown};
use super::place::{Place, Sounded};
use super::state::Repair;
use super::{answers, causes, empty, grid, headline, priors, remedies};
use crate::edit::command::Command;
use crate::edit::desk::Outcome;
use crate::fields::form::Form;
use crate::results::notices;
use crate::results::sides::{Side, columns};
use crate::theme::{Palette, size};

/// Room in which readings stand beside what comes of them, points.
const SIDE_BY_SIDE: f32 = 1230.0;
/// Room for the scroll bar, which floats over what it scrolls.
const BAR: f32 = 8.0;
/// Room in which plot and remedies stand side by side.
const PLOT_BESIDE: f32 = 640.0;

/// The page. The grid edits `plan`; the diagnosis is that of the last plan without faults.
pub fn show(
    ui: &mut Ui,
    form: &mut Form,
    plan: &mut Plan,
    outcome: &Outcome,
    string: usize,
    repair: &mut Repair,
) {
    let palette = form.palette;
    let frame = Frame::new()
        .fill(palette.sheet)
        .stroke(Stroke::new(size::EDGE, palette.edge))
        .inner_margin(Margin::symmetric(10, 8));
    frame.show(ui, |ui| {
        ui.set_min_size(ui.available_size());
        repair.inquiry.follow(ui.ctx(), &outcome.plan, &repair.priors);
        let room = ui.available_height();
        ScrollArea::vertical().auto_shrink([false, false]).show(ui, |ui| {
            ui.set_max_width(ui.available_width() - BAR);
            let found = Found::of(repair, string);
            if ui.available_width() >= SIDE_BY_SIDE {
                columns(ui, |ui, side| match (side, &found) {
                    (Side::Left, found) => {
                        readings(ui, form, plan, string, repair);
                        let Some(found) = found else { return };
                        ui.add_space(size::WIDE_GAP);
                        found.answers(ui, form);
                        ui.add_space(size::WIDE_GAP);
                        found.notices(ui, form);
                    }
                    (Side::Right, Some(found)) => {
                        found.effects(ui, form, repair, room);
                        ui.add_space(size::WIDE_GAP);
                        found.causes(ui, form);
                    }
                    (Side::Right, None) => {}
                });
            } else {
                readings(ui, form, plan, string, repair);
                let Some(found) = found else { return };
                ui.add_space(size::WIDE_GAP);
                found.effects(ui, form, repair, room);
                ui.add_space(size::WIDE_GAP);
                found.answers(ui, form);
                ui.add_space(size::WIDE_GAP);
                found.causes(ui, form);
                ui.add_space(size::WIDE_GAP);
                found.notices(ui, form);
            }
        });
    });
}

/// The part with the grid: what to measure or what was found, the grid, and what is held probable.
fn readings(ui: &mut Ui, form: &mut Form, plan: &mut Plan, string: usize, repair: &mut Repair) {
    headline::show(ui, form.palette, &mut repair.inquiry, plan.readings.is_empty());
    ui.add_space(size::GAP);
    tools(ui, form, plan, repair);
    grid::show(ui, form, plan, repair, string);
    if !matches!(repair.inquiry.answer(), Some(Ok(_))) {
        // Below the grid, which stays where it is when the first reading has been typed.
        ui.add_space(size::GAP);
        empty::show(ui, form.palette);
    }
    ui.add_space(size::GAP);
    let Repair { priors, shows_priors, .. } = repair;
    priors::show(ui, form, priors, shows_priors);
}

/// The buttons above the grid.
fn tools(ui: &mut Ui, form: &mut Form, plan: &Plan, repair: &mut Repair) {
    ui.horizontal_wrapped(|ui| {
        ui.label(RichText::new("Readings").heading());
        ui.add_space(size::GAP);
        if ui.button(Command::ImportReadings.name()).clicked() {
            form.commands.push(Command::ImportReadings);
        }
        ui.checkbox(&mut repair.columns.all, "all frets");
        if !repair.columns.all {
            add_fret(ui, plan, repair);
        }
        let fits = repair.inquiry.diagnosis_of(plan, &repair.priors).is_some();
        let help = "Crests, nut edges, stiffness, heights, press depth and relief as found go into the plan. The page \
                    Saddle then lays out the new saddle for the instrument as it is. Readings stay.";
        let take = ui.add_enabled(fits, Button::new(Command::TakeFitted.name())).on_hover_text(help);
        if take.clicked() {
            form.commands.push(Command::TakeFitted);
        }
    });
}

fn add_fret(ui: &mut Ui, plan: &Plan, repair: &mut Repair) {
    let shown = repair.columns.of(plan, repair.inquiry.suggested());
    let combo = ComboBox::from_id_salt("add fret").selected_text("Add a fret").width(96.0);
    let response = combo.show_ui(ui, |ui| {
        for fret in (1..=plan.instrument.frets).filter(|fret| !shown.contains(&Sounded::Fretted(*fret))) {
            if ui.selectable_label(false, format!("fret {fret}")).clicked() {
                repair.columns.added.insert(fret);
            }
        }
    });
    response.response.ctx.accesskit_node_builder(response.response.id, |node| node.set_label("Add a fret"));
}

/// What there is to say about the plan that was diagnosed.
struct Found {
    plan: Plan,
    diagnosis: Arc<Diagnosis>,
    string: usize,
}

impl Found {
    fn of(repair: &Repair, string: usize) -> Option<Self> {
        let diagnosis = repair.inquiry.answer()?.as_ref().ok().map(Arc::clone)?;
        Some(Self { plan: repair.inquiry.answered_plan()?.clone(), diagnosis, string })
    }

    /// Plot and remedies, side by side where there is room.
    fn effects(&self, ui: &mut Ui, form: &mut Form, repair: &mut Repair, room: f32) {
        let before = repair.previewed;
        let remedies = &self.diagnosis.remedies;
        if ui.available_width() >= PLOT_BESIDE {
            columns(ui, |ui, side| match side {
                Side::Left => self.plot(ui, form, repair, room),
                Side::Right => repair.previewed = remedies::show(ui, form.palette, remedies),
            });
        } else {
            self.plot(ui, form, repair, room);
            ui.add_space(size::GAP);
            repair.previewed = remedies::show(ui, form.palette, remedies);
        }
        if repair.previewed != before {
            // The plot, which stands before the list, follows in the next frame.
            ui.ctx().request_repaint();
        }
    }

    fn plot(&self, ui: &mut Ui, form: &mut Form, repair: &mut Repair, room: f32) {
        let remedy = repair.previewed.and_then(|index| self.diagnosis.remedies.get(index));
        let shown = Shown { plan: &self.plan, diagnosis: &self.diagnosis, chosen: self.string, remedy };
        ui.label(RichText::new("Errors read and predicted").heading());
        let chosen = error_plot::choices(ui, form.palette, &shown, &mut repair.all_strings);
        form.commands.extend(chosen.map(Command::ChooseString));
        error_plot::show(ui, form.palette, &shown, repair.all_strings, error_plot::usual_height(room));
    }

    fn answers(&self, ui: &mut Ui, form: &mut Form) {
        form.commands.extend(answers::show(ui, form.palette, &self.plan, &self.diagnosis, self.string));
    }

    /// A notice that names the reading it is about.
    fn placed(&self, notice: &Notice) -> Notice {
        let about = Place::at_path(&notice.path, &self.plan.readings);
        let text =
            about.map_or_else(|| notice.text.clone(), |place| format!("{}: {}", place.name(), notice.text));
        Notice { text, ..notice.clone() }
    }

    fn causes(&self, ui: &mut Ui, form: &Form) {
        ui.scope(|ui| causes::show(ui, form.palette, &self.diagnosis));
    }

    fn notices(&self, ui: &mut Ui, form: &mut Form) {
        let placed: Vec<Notice> = self.diagnosis.notices.iter().map(|notice| self.placed(notice)).collect();
        form.commands.extend(notices::show(ui, form.palette, &placed));
        caution(ui, form.palette);
    }
}

fn caution(ui: &mut Ui, palette: &Palette) {
    let words = "Caution: slacken the strings before you file, move or lift anything. A diagnosis from readings can be \
                 wrong; look at the instrument first, and leave what you are not used to doing to a qualified repairer.";
    ui.add_space(size::GAP);
    ui.add(Label::new(RichText::new(words).small().color(palette.quiet)).wrap());
}
