//! The page `Saddle`: plan view, errors and their parts, schedule and notices.

use crestline_plan::estimate_notes;
use eframe::egui::{
    Align, Button, Frame, Label, Layout, Margin, Panel, RichText, ScrollArea, Stroke, Ui, Vec2,
};

use super::error_plot::Shown;
use super::{error_plot, layout_plot, notices, nut_plot, schedule, split_plot, table};
use crate::bands::on_plots::OnPlots;
use crate::edit::command::Command;
use crate::edit::desk::Outcome;
use crate::theme::{Palette, size};
use crate::units::LengthUnit;
use crate::view::View;

/// Height of the notices below the schedule.
const NOTICES: f32 = 46.0;

/// The least room in which the parts of the page stand side by side, points.
const SIDE_BY_SIDE: Vec2 = Vec2::new(700.0, 470.0);
/// Heights of the plan view and of the curves where the parts stand one below the other.
const STACKED: [f32; 2] = [380.0, 460.0];

/// The page: its parts side by side where there is room, else one below the other.
pub fn show(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, view: &mut View) -> Vec<Command> {
    let room = ui.available_size();
    if room.x < SIDE_BY_SIDE.x || room.y < SIDE_BY_SIDE.y {
        return stacked(ui, palette, outcome, view);
    }
    let mut commands = Vec::new();
    let rows = outcome.plan.strings.len().min(8);
    let table_height = table::HEAD + rows as f32 * table::ROW + 44.0 + NOTICES;
    Panel::bottom(("schedule", rows))
        .resizable(true)
        .default_size(table_height)
        .min_size(120.0)
        .show_separator_line(false)
        .frame(sheet(palette))
        .show(ui, |ui| {
            ScrollArea::vertical().auto_shrink([false, false]).show(ui, |ui| {
                commands.extend(bottom(ui, palette, outcome, view));
            });
        });
    let width = (0.36 * ui.available_width()).clamp(260.0, 620.0);
    Panel::left("plan view")
        .resizable(true)
        .default_size(width)
        .min_size(220.0)
        .show_separator_line(false)
        .frame(sheet(palette))
        .show(ui, |ui| commands.extend(plan_view(ui, palette, outcome, view)));
    sheet(palette).show(ui, |ui| curves(ui, palette, outcome, view));
    commands
}

fn stacked(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, view: &mut View) -> Vec<Command> {
    let mut commands = Vec::new();
    ScrollArea::vertical().auto_shrink([false, false]).show(ui, |ui| {
        let width = ui.available_width();
        let part = |ui: &mut Ui, height: f32, contents: &mut dyn FnMut(&mut Ui)| {
            ui.allocate_ui(Vec2::new(width, height), |ui| {
                sheet(palette).show(ui, |ui| {
                    ui.set_min_size(ui.available_size());
                    contents(ui);
                });
            });
        };
        part(ui, STACKED[0], &mut |ui| commands.extend(plan_view(ui, palette, outcome, view)));
        part(ui, STACKED[1], &mut |ui| curves(ui, palette, outcome, view));
        sheet(palette).show(ui, |ui| commands.extend(bottom(ui, palette, outcome, view)));
    });
    commands
}

/// The frame of a part of the page.
fn sheet(palette: &Palette) -> Frame {
    Frame::new()
        .fill(palette.sheet)
        .stroke(Stroke::new(size::EDGE, palette.edge))
        .inner_margin(Margin::symmetric(8, 6))
}

fn title(ui: &mut Ui, text: &str) {
    ui.label(RichText::new(text).heading());
}

fn plan_view(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, view: &mut View) -> Vec<Command> {
    let mut commands = Vec::new();
    ui.horizontal(|ui| {
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            let whole = view.saddle_camera.shows_whole() && view.nut_camera.shows_whole();
            let button = Button::new(RichText::new("Show all").small());
            let response = ui.add_enabled(!whole, button).on_hover_text("Show the whole layout again");
            if response.clicked() {
                commands.push(Command::ResetPlots);
            }
            for (sign, name, steps) in [("+", "Zoom in", 1), ("−", "Zoom out", -1)] {
                let button = Button::new(RichText::new(sign).small()).min_size(Vec2::new(22.0, 0.0));
                let response = ui.add(button).on_hover_text(name);
                response.ctx.accesskit_node_builder(response.id, |node| node.set_label(name));
                if response.clicked() {
                    view.saddle_camera.zoom_later(steps);
                }
            }
            // Last, so that it ends before the buttons where there is little room.
            ui.with_layout(Layout::left_to_right(Align::Center), |ui| {
                ui.add(Label::new(RichText::new("Saddle in plan").heading()).truncate());
            });
        });
    });
    let setbacks = LengthUnit::of(ui.ctx()).named("setbacks");
    let has_bands = view.trust.on_plots && outcome.plan.tolerances.is_some();
    let bands = if has_bands { "├┤ 90 % of ideal   " } else { "" };
    let words = format!("╌ nominal   ○ ideal   {bands}● crest   {setbacks}");
    ui.label(RichText::new(words).small().color(palette.quiet));
    if layout_plot::nut_is_moved(&outcome.solution.layout) {
        let width = 0.4 * ui.available_width();
        let panel = Panel::left("nut end")
            .resizable(true)
            .default_size(width)
            .min_size(90.0)
            .show_separator_line(false);
        panel.frame(Frame::new()).show(ui, |ui| {
            nut_plot::show(ui, palette, outcome, view.string, &mut view.nut_camera);
        });
    }
    let bands = OnPlots::of(ui.ctx(), outcome, &mut view.trust);
    let shown = Shown { outcome, bands: bands.as_ref(), chosen: view.string };
    layout_plot::show(ui, palette, &shown, &mut view.saddle_camera);
    commands
}

fn curves(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, view: &mut View) {
    let split = (0.38 * ui.available_height()).max(110.0);
    title(ui, "Errors of the fretted notes");
    let bands = OnPlots::of(ui.ctx(), outcome, &mut view.trust);
    let shown = Shown { outcome, bands: bands.as_ref(), chosen: view.string };
    error_plot::choices(ui, palette, &shown, &mut view.errors, &mut view.trust.on_plots);
    let room = (ui.available_height() - split - 66.0).max(90.0);
    error_plot::show(ui, palette, &shown, &mut view.errors, room);
    title(ui, "Where the error comes from");
    split_plot::legend(ui, palette, view.string);
    split_plot::show(ui, palette, outcome, view.string, ui.available_height().max(80.0));
}

/// The schedule, which scrolls sideways where it is too narrow, and what is to be said below it.
fn bottom(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, view: &View) -> Vec<Command> {
    let mut commands = Vec::new();
    let clicked = table::sideways(ui, "schedule", schedule::LEAST_WIDTH, |ui| {
        schedule::show(ui, palette, outcome, view.string)
    });
    commands.extend(clicked.map(Command::ChooseString));
    schedule::foot(ui, palette, outcome);
    let mut said = outcome.solution.report.notices.clone();
    said.extend(estimate_notes(&outcome.plan));
    commands.extend(notices::show(ui, palette, &said));
    commands
}
