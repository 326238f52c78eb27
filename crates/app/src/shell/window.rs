//! The window: one frame after the other.

use std::collections::VecDeque;
use std::path::PathBuf;

use crestline_plan::Plan;
use eframe::egui::{
    CentralPanel, Color32, Context, Event, Frame, Label, Margin, Panel, RichText, Ui, ViewportCommand,
};

use super::ask::{self, Question};
use super::obey;
use super::options::Options;
use super::picker::Picker;
use super::readings::READINGS_ENDING;
use super::timing::Timing;
use super::{bar, disk, foot, recover};
use crate::bands::page as bands_page;
use crate::choices;
use crate::edit::command::Command;
use crate::edit::desk::Desk;
use crate::edit::history::Edit;
use crate::fields::form::Form;
use crate::help;
use crate::hints::card::{self, About};
use crate::inputs::{self, Surroundings};
use crate::keep::autosave::Autosave;
use crate::keep::found::Found;
use crate::keep::layout::Layout;
use crate::keep::recent::Recent;
use crate::keep::watch::Watch;
use crate::repair::page as repair_page;
use crate::results::{layout_page, notes_page, notices};
use crate::theme::{self, Palette};
use crate::view::{Page, View};
use crate::{painter, papers};

/// Width of the inputs: as they open, at least, and at most.
const INPUTS: [f32; 3] = [392.0, 360.0, 620.0];

/// The program's window.
pub struct Window {
    /// The plan document and the last good result.
    pub desk: Desk,
    /// What the window shows and how.
    pub view: View,
    /// A question that stands in front of it.
    pub question: Option<Question>,
    /// A file dialog that is open.
    pub picker: Option<Picker>,
    /// What to do once the plan has been saved.
    pub after_saving: Option<Command>,
    /// Whether the window may close although the plan has changes.
    pub may_close: bool,
    /// The keeping of unsaved work.
    pub autosave: Autosave,
    /// Work of earlier windows that is still to be asked about.
    pub found: VecDeque<Found>,
    /// The plans that were open lately.
    pub recent: Recent,
    /// The plan's file, as it was last seen.
    pub watch: Option<Watch>,
    /// The folder for what outlives the window.
    pub state: Option<PathBuf>,
    /// What is told to those who measure the window, where they ask for it.
    pub timing: Option<Timing>,
    inputs_width: Option<f32>,
    context: Context,
    title: String,
}

impl Window {
    /// The window on a plan.
    #[must_use]
    pub fn new(ctx: &Context, plan: Plan, path: Option<PathBuf>, options: &Options) -> Self {
        theme::install(ctx);
        theme::choose(ctx, options.theme);
        ctx.set_zoom_factor(options.zoom);
        let wake = ctx.clone();
        let mut window = Self {
            desk: Desk::new(plan, path),
            view: options.view(),
            question: None,
            picker: None,
            after_saving: None,
            may_close: false,
            autosave: Autosave::new(options.state.clone(), move || wake.request_repaint()),
            found: VecDeque::new(),
            recent: Recent::read(options.state.as_deref()),
            watch: None,
            state: options.state.clone(),
            timing: None,
            inputs_width: options.inputs_width,
            context: ctx.clone(),
            title: String::new(),
        };
        recover::look_around(&mut window);
        window.watch_file();
        window
    }

    /// Watches the plan's file from now on, and puts it on the list of recent ones.
    pub fn watch_file(&mut self) {
        self.watch = self.desk.path().map(Watch::new);
        if let Some(path) = self.desk.path() {
            self.recent.add(path);
        }
    }

    /// Takes the plan's file as it is now for seen.
    pub fn take_file_as_seen(&mut self) {
        if let Some(watch) = &mut self.watch {
            watch.accept();
        }
    }

    /// One frame: show everything, then do what was asked for.
    pub fn frame(&mut self, ui: &mut Ui) {
        let ctx = ui.ctx().clone();
        let palette = Palette::of(ctx.theme());
        self.view.unit.set(&ctx);
        let mut commands = self.keys(&ctx);
        commands.extend(dropped(&ctx));
        commands.extend(bar::show(ui, palette, &self.desk, &self.view, self.recent.plans()));
        commands.extend(foot::show(ui, palette, self.view.message.as_ref()));
        if let Some(picker) = &self.picker {
            commands.extend(foot::waiting(ui, palette, picker.purpose.title()));
        }
        if self.view.inputs {
            commands.extend(self.inputs(ui, palette));
        }
        commands.extend(self.results(ui, palette));
        self.ask(&ctx, palette);
        if !commands.is_empty() {
            // What the commands change is shown by the next frame.
            ctx.request_repaint();
        }
        for command in commands {
            obey::obey(self, &ctx, command);
        }
        obey::take_answer(self, &ctx);
        self.keep(&ctx);
        self.guard_closing(&ctx);
        self.follow_title(&ctx);
        if let Some(timing) = &mut self.timing {
            timing.frame(&ctx, self.desk.steps());
        }
    }

    /// Keeps unsaved work, and looks after the plan's file when the user comes back to the window.
    fn keep(&mut self, ctx: &Context) {
        if let Some(trouble) = self.autosave.follow(&self.desk) {
            self.view.complain_too(trouble);
        }
        let comes_back =
            ctx.input(|input| input.events.iter().any(|event| matches!(event, Event::WindowFocused(true))));
        if comes_back && self.question.is_none() {
            disk::look(self, None);
        }
        let asked = self.question.is_some();
        recover::ask_next(self);
        if comes_back || self.question.is_some() != asked {
            ctx.request_repaint();
        }
    }

    /// Commands called by keys; none while a question stands in front.
    fn keys(&self, ctx: &Context) -> Vec<Command> {
        if self.question.is_some() {
            return Vec::new();
        }
        let pressed = |shortcut| ctx.input_mut(|input| input.consume_shortcut(&shortcut));
        let called = |command: &Command| {
            command.shortcut().is_some_and(pressed) || command.spare_shortcut().is_some_and(pressed)
        };
        let inputs = Command::ShowInputs(!self.view.inputs);
        let unit = Command::ShowLengthsIn(self.view.unit.other());
        // Its key is that of the page on the model with one modifier more, so it is looked for first.
        let card = Command::ShowCard(!self.view.card);
        [card].into_iter().chain(Command::with_keys()).chain([inputs, unit]).filter(called).collect()
    }

    fn inputs(&mut self, ui: &mut Ui, palette: &'static Palette) -> Vec<Command> {
        let [usual, least, most] = INPUTS;
        let width = self.inputs_width.unwrap_or(usual).clamp(least, most);
        let frame =
            Frame::new().fill(palette.ground).inner_margin(Margin { left: 8, right: 4, top: 8, bottom: 8 });
        let panel =
            Panel::left("inputs").resizable(true).default_size(width).size_range(least..=most).frame(frame);
        let shown = panel.show(ui, |ui| {
            if self.view.card {
                card::foot(ui, palette, self.view.about.as_ref(), self.view.unit);
            }
            self.form(ui, palette)
        });
        self.inputs_width = Some(shown.response.rect.width());
        shown.inner
    }

    /// The fields; what they changed is settled at once, so that results follow typing.
    fn form(&mut self, ui: &mut Ui, palette: &'static Palette) -> Vec<Command> {
        let (plan, faults, outcome) = self.desk.parts();
        let report = outcome.and_then(|outcome| outcome.solution.report.strings.get(self.view.string));
        let around = Surroundings { string: self.view.string, folded: &self.view.folded, report };
        let mut form =
            Form::new(faults, &mut self.view.drafts, &mut self.view.going_to, palette, self.view.unit);
        inputs::show(ui, &mut form, plan, &around);
        let Form { edit, left, commands, about, .. } = form;
        self.tell_about(ui.ctx(), about);
        // A path that no field has shown by now has none, but for those of fields on a page.
        self.view.going_to.take_if(|path| !path.starts_with("tolerances"));
        self.settle(ui.ctx(), edit, left);
        commands
    }

    /// The page of readings, which has fields of its own.
    fn diagnosis(&mut self, ui: &mut Ui, palette: &'static Palette) -> Vec<Command> {
        let (plan, faults, outcome) = self.desk.parts();
        let Some(outcome) = outcome else { return Vec::new() };
        let View { drafts, going_to, string, repair, unit, .. } = &mut self.view;
        let mut form = Form::new(faults, drafts, going_to, palette, *unit);
        repair_page::show(ui, &mut form, plan, outcome, *string, repair);
        let Form { edit, left, commands, about, .. } = form;
        self.tell_about(ui.ctx(), about);
        self.settle(ui.ctx(), edit, left);
        commands
    }

    /// The page with the tolerances, which are mended there even before there is a result.
    fn how_sure(&mut self, ui: &mut Ui, palette: &'static Palette) -> Vec<Command> {
        let (plan, faults, outcome) = self.desk.parts();
        let View { drafts, going_to, string, trust, unit, .. } = &mut self.view;
        let mut form = Form::new(faults, drafts, going_to, palette, *unit);
        bands_page::show(ui, &mut form, plan, outcome, *string, trust);
        let Form { edit, left, commands, about, .. } = form;
        self.tell_about(ui.ctx(), about);
        self.view.going_to = None;
        self.settle(ui.ctx(), edit, left);
        commands
    }

    /// Takes the field with the focus for the one that the card is about.
    fn tell_about(&mut self, ctx: &Context, about: Option<About>) {
        if about.is_some() && about != self.view.about {
            self.view.about = about;
            ctx.request_repaint();
        }
    }

    /// Notes what fields have changed.
    fn settle(&mut self, ctx: &Context, edit: Option<Edit>, left: bool) {
        if let Some(edit) = edit {
            self.desk.settle(&edit);
            ctx.request_repaint();
        }
        if left {
            self.desk.close_gesture();
        }
    }

    fn results(&mut self, ui: &mut Ui, palette: &'static Palette) -> Vec<Command> {
        let frame =
            Frame::new().fill(palette.ground).inner_margin(Margin { left: 4, right: 8, top: 8, bottom: 8 });
        let mut commands = Vec::new();
        CentralPanel::default().frame(frame).show(ui, |ui| {
            if self.view.page == Page::Help {
                help::page::show(ui, palette);
                return;
            }
            ui.add(Label::new(RichText::new(self.view.page.meaning()).small().color(palette.quiet)).wrap());
            let outcome = self.desk.outcome();
            commands.extend(notices::stale(
                ui,
                palette,
                self.desk.faults(),
                &self.view.drafts,
                outcome.is_some(),
            ));
            if self.view.page == Page::HowSure {
                commands.extend(self.how_sure(ui, palette));
                return;
            }
            let Some(outcome) = outcome else {
                ui.label(
                    RichText::new("The saddle appears here as soon as the plan can be solved.")
                        .color(palette.quiet),
                );
                return;
            };
            if self.view.page == Page::Diagnosis {
                commands.extend(self.diagnosis(ui, palette));
                return;
            }
            let view = &mut self.view;
            commands.extend(match view.page {
                Page::Saddle => layout_page::show(ui, palette, outcome, view),
                Page::FrettedNotes => notes_page::show(ui, palette, outcome, view),
                Page::Compare => choices::page::show(ui, palette, outcome, view.string, &mut view.study),
                Page::Sheets => papers::page::show(ui, palette, outcome, &mut view.preview),
                Page::HowSure | Page::Diagnosis | Page::Help => Vec::new(),
            });
        });
        commands
    }

    fn ask(&mut self, ctx: &Context, palette: &Palette) {
        let Some(question) = &mut self.question else { return };
        if let Some(reply) = ask::show(ctx, palette, question, &self.desk) {
            let question = self.question.take();
            ask::forget_focus(ctx);
            match (question, reply) {
                (Some(Question::Recovery(found)), ask::Reply::Recovery(choice)) => {
                    recover::take(self, *found, choice);
                }
                (_, reply) => obey::take_reply(self, ctx, reply),
            }
            ctx.request_repaint();
        }
    }

    /// Asks before the window closes with changes.
    fn guard_closing(&mut self, ctx: &Context) {
        let closing = ctx.input(|input| input.viewport().close_requested());
        if closing && self.desk.is_changed() && !self.may_close {
            ctx.send_viewport_cmd(ViewportCommand::CancelClose);
            self.question = Some(Question::Unsaved(Command::Quit));
        }
    }

    /// Remembers the arrangement for the next window.
    fn remember(&self) {
        let (Some(folder), ctx) = (&self.state, &self.context) else { return };
        let zoom = ctx.zoom_factor();
        let layout = Layout {
            page: Some(self.view.page),
            theme: Some(self.view.theme),
            unit: Some(self.view.unit),
            zoom: Some(zoom),
            inputs: Some(self.view.inputs),
            inputs_width: self.inputs_width,
            size: ctx.input(|input| input.viewport().inner_rect).map(|rect| (rect.size() * zoom).into()),
        };
        layout.write(folder);
    }

    fn follow_title(&mut self, ctx: &Context) {
        let mark = if self.desk.is_changed() { "● " } else { "" };
        let title = format!("{mark}{} – Crestline", self.desk.file_name());
        if title != self.title {
            ctx.send_viewport_cmd(ViewportCommand::Title(title.clone()));
            self.title = title;
        }
    }
}

/// The first file that has been dropped on the window: a table of readings, or else a plan.
fn dropped(ctx: &Context) -> Option<Command> {
    let path = ctx.input(|input| input.raw.dropped_files.first().map(|file| file.path().to_owned()));
    let is_table =
        |path: &PathBuf| path.extension().is_some_and(|ending| ending.eq_ignore_ascii_case(READINGS_ENDING));
    path.map(|path| if is_table(&path) { Command::ImportReadingsFrom(path) } else { Command::OpenFile(path) })
}

impl eframe::App for Window {
    fn ui(&mut self, ui: &mut Ui, _frame: &mut eframe::Frame) {
        self.frame(ui);
    }

    fn on_exit(&mut self, _gl: Option<&eframe::glow::Context>) {
        self.remember();
    }

    fn clear_color(&self, visuals: &eframe::egui::Visuals) -> [f32; 4] {
        visuals.panel_fill.to_normalized_gamma_f32()
    }
}

impl painter::window::Show for Window {
    fn frame(&mut self, ui: &mut Ui) {
        Self::frame(self, ui);
    }

    fn ground(&self, ctx: &Context) -> Color32 {
        Palette::of(ctx.theme()).ground
    }

    fn leave(&mut self) {
        self.remember();
    }
}
