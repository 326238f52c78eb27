//! The one place where commands are carried out.

use std::path::{Path, PathBuf};

use crestline_plan::{Kind, Tolerances, example, read_draft};
use crestline_sheets::{Format, export};
use eframe::egui::{Context, ViewportCommand};

use super::ask::{Question, Reply};
use super::disk;
use super::files::{self, with_ending};
use super::finder::Finder;
use super::path_box::PathBox;
use super::picker::{Answer, Picker, Purpose};
use super::readings;
use super::recover;
use super::window::Window;
use crate::edit::catalogue::offers;
use crate::edit::command::Command;
use crate::edit::history::Edit;
use crate::edit::strings;
use crate::keep::autosave::whole;
use crate::keep::watch::Watch;
use crate::repair::place::Place;
use crate::theme;
use crate::view::{Group, Page};

/// The least and greatest scale of all text.
const ZOOM: [f32; 2] = [0.8, 2.0];
/// One step of it.
const ZOOM_STEP: f32 = 0.1;

/// Does what a command says.
pub fn obey(window: &mut Window, ctx: &Context, command: Command) {
    match command {
        Command::NewFromExample(_)
        | Command::NewFromKind(_)
        | Command::Open
        | Command::OpenFile(_)
        | Command::Quit
            if window.desk.is_changed() =>
        {
            window.question = Some(Question::Unsaved(command));
        }
        Command::NewFromExample(name) => new_from_example(window, name),
        Command::NewFromKind(id) => new_from_kind(window, id),
        Command::Open => pick(window, ctx, Purpose::Open),
        Command::OpenFile(path) => open(window, &path),
        Command::Save => save(window, ctx),
        Command::SaveAs => pick(window, ctx, Purpose::Save),
        Command::Export(format) => ask_for_drawing(window, ctx, format),
        Command::ImportReadings => pick(window, ctx, Purpose::Readings),
        Command::ImportReadingsFrom(path) => readings::import(window, &path),
        Command::Quit => ctx.send_viewport_cmd(ViewportCommand::Close),
        Command::Undo => step(window, true),
        Command::Redo => step(window, false),
        Command::Theme(choice) => {
            window.view.theme = choice;
            theme::choose(ctx, choice);
        }
        Command::LargerText => zoom(ctx, ZOOM_STEP),
        Command::SmallerText => zoom(ctx, -ZOOM_STEP),
        Command::TypePath => {
            if let Some(picker) = window.picker.take() {
                ask_in_window(window, picker.purpose);
            }
        }
        Command::UsualText => ctx.set_zoom_factor(1.0),
        Command::FindCommand => {
            let offers = offers(&window.desk, &window.view, window.recent.plans());
            window.question = Some(Question::Find(Finder::new(offers)));
        }
        other => arrange(window, other),
    }
}

/// Commands that change strings or the view only.
fn arrange(window: &mut Window, command: Command) {
    let view = &mut window.view;
    match command {
        Command::DuplicateString(index) => {
            change_strings(window, index + 1, "Add string", |plan| strings::duplicate(plan, index));
        }
        Command::RemoveString(index) => {
            change_strings(window, index, "Remove string", |plan| strings::remove(plan, index));
        }
        Command::MoveStringUp(index) if index > 0 => {
            change_strings(window, index - 1, "Move string", |plan| strings::swap(plan, index - 1, index));
        }
        Command::MoveStringDown(index) => {
            change_strings(window, index + 1, "Move string", |plan| strings::swap(plan, index, index + 1));
        }
        Command::TakeStyle(saddle, nut, split_after) => {
            let plan = &mut window.desk.plan;
            (plan.saddle.style, plan.nut.style) = (saddle, nut);
            plan.saddle.split_after = split_after.or(plan.saddle.split_after);
            window.desk.settle(&Edit::whole("Take saddle and nut"));
        }
        Command::TakeTolerances => set_tolerances(window, "Take tolerances", Some(Tolerances::default())),
        Command::LeaveOutTolerances => set_tolerances(window, "Leave out tolerances", None),
        Command::FillReadings(filling) => readings::fill(window, &filling),
        Command::TakeFitted => readings::take_fitted(window),
        Command::ChooseString(index) => view.string = index,
        Command::ShowPage(page) => view.page = page,
        Command::ShowInputs(shown) => view.inputs = shown,
        Command::ShowCard(shown) => view.card = shown,
        Command::Spread(of) => {
            let string = view.string;
            change_strings(window, string, &format!("Spread {}", of.name()), |plan| of.spread(plan));
        }
        Command::ShowLengthsIn(unit) => {
            view.unit = unit;
            view.drafts.clear();
        }
        Command::Fold(group) => view.fold(group),
        Command::GoTo(path) => go_to(window, path),
        Command::ResetPlots => {
            view.saddle_camera.reset();
            view.nut_camera.reset();
            view.errors.looking = None;
        }
        Command::DismissMessage => view.message = None,
        _ => {}
    }
}

fn change_strings(
    window: &mut Window,
    choose: usize,
    name: &str,
    change: impl FnOnce(&mut crestline_plan::Plan),
) {
    change(&mut window.desk.plan);
    window.desk.settle(&Edit::whole(name));
    window.view.drafts.clear();
    choose_string(window, choose);
}

fn set_tolerances(window: &mut Window, name: &str, tolerances: Option<Tolerances>) {
    window.desk.plan.tolerances = tolerances;
    window.desk.settle(&Edit::whole(name));
    window.view.drafts.clear();
}

fn choose_string(window: &mut Window, index: usize) {
    window.view.string = index.min(window.desk.plan.strings.len().saturating_sub(1));
}

fn go_to(window: &mut Window, path: String) {
    if path.starts_with("readings") {
        go_to_reading(window, &path);
        return;
    }
    if path.starts_with("tolerances") {
        window.view.page = Page::HowSure;
        window.view.trust.shows_tolerances = true;
        window.view.going_to = Some(path);
        return;
    }
    window.view.folded.remove(&Group::of_path(&path));
    let index = path.strip_prefix("strings[").and_then(|rest| rest.split(']').next()?.parse().ok());
    if let Some(index) = index {
        choose_string(window, index);
    }
    window.view.inputs = true;
    window.view.going_to = Some(path);
}

/// Shows the readings, and goes to the cell of the one with this path.
fn go_to_reading(window: &mut Window, path: &str) {
    window.view.page = Page::Diagnosis;
    window.view.repair.going_to = Place::at_path(path, &window.desk.plan.readings);
}

fn step(window: &mut Window, back: bool) {
    let name = if back { window.desk.history().undo_name() } else { window.desk.history().redo_name() };
    let said = name.map(|name| format!("{}: {name}", if back { "Undone" } else { "Done again" }));
    let stepped = if back { window.desk.undo() } else { window.desk.redo() };
    forget_what_was_typed(window);
    if let (true, Some(said)) = (stepped, said) {
        window.view.say(said);
    }
}

fn zoom(ctx: &Context, by: f32) {
    ctx.set_zoom_factor((ctx.zoom_factor() + by).clamp(ZOOM[0], ZOOM[1]));
}

fn new_from_example(window: &mut Window, name: &str) {
    let Some(example) = example(name) else { return };
    match read_draft(example.text) {
        Ok(plan) => {
            window.desk.replace(plan, None);
            window.watch_file();
            fresh(window);
        }
        Err(faults) => {
            window.view.complain(faults.iter().map(ToString::to_string).collect::<Vec<_>>().join("; "))
        }
    }
}

fn new_from_kind(window: &mut Window, id: &str) {
    let Some(kind) = Kind::of(id) else { return };
    window.desk.replace(kind.plan(), None);
    window.watch_file();
    fresh(window);
    window
        .view
        .say(format!("New plan: {}. Its figures are common ones; enter what you have measured.", kind.name));
}

fn open(window: &mut Window, path: &Path) {
    // Looked at before it is read, so that no change in between goes unseen.
    let watch = Watch::new(path);
    match files::open(path) {
        Ok(plan) => {
            window.desk.replace(plan, Some(path.to_owned()));
            window.watch_file();
            window.watch = Some(watch);
            fresh(window);
            window.view.say(format!("Opened {}", path.display()));
            recover::look_around(window);
        }
        Err(words) => {
            if !path.exists() {
                window.recent.remove(&whole(path));
            }
            window.view.complain(words);
        }
    }
}

/// Forgets what belonged to the plan before.
pub fn fresh(window: &mut Window) {
    window.view.drafts.clear();
    window.view.string = 0;
    window.view.saddle_camera.reset();
    window.view.nut_camera.reset();
    window.view.errors.looking = None;
    window.view.trust.fresh();
    window.view.repair.fresh();
    window.view.message = None;
}

fn save(window: &mut Window, ctx: &Context) {
    match window.desk.path().map(Path::to_owned) {
        Some(_) if disk::look(window, Some(None)) => {}
        Some(path) => {
            save_to(window, path);
        }
        None => pick(window, ctx, Purpose::Save),
    }
}

/// Saves to the plan's file, and then does what waits for that.
pub fn save_then(window: &mut Window, ctx: &Context, next: Option<Command>) {
    let Some(path) = window.desk.path().map(Path::to_owned) else { return };
    if let (true, Some(next)) = (save_to(window, path), next) {
        obey(window, ctx, next);
    }
}

/// Forgets what was being typed, because the plan has been changed from elsewhere.
pub fn forget_what_was_typed(window: &mut Window) {
    window.view.drafts.clear();
    choose_string(window, window.view.string);
}

/// Saves the plan; false where that failed.
fn save_to(window: &mut Window, path: PathBuf) -> bool {
    match files::save(&path, &window.desk.plan) {
        Ok(()) => {
            let open_fields = window.view.drafts.errors().count();
            let remark = match (open_fields, window.desk.faults().len()) {
                (0, 0) => String::new(),
                (0, n) => format!(". It still has {n} to mend, and is saved as it is"),
                (n, _) => format!(". The file has the last good value of {n} marked fields"),
            };
            window.view.say(format!("Saved {}{remark}", path.display()));
            window.desk.saved_as(path);
            window.watch_file();
            true
        }
        Err(words) => {
            window.view.complain(format!(
                "{words}. The plan is unchanged in this window, and its unsaved changes are kept; it can be saved to \
                 another place."
            ));
            false
        }
    }
}

fn ask_for_drawing(window: &mut Window, ctx: &Context, format: Format) {
    let is_current = window.desk.faults().is_empty() && window.view.drafts.errors().next().is_none();
    if is_current && window.desk.outcome().is_some() {
        pick(window, ctx, Purpose::Write(format));
    } else {
        window.view.complain("The drawing is not written while fields are to be mended.");
    }
}

/// Asks for a path: by the system's dialog, or in the window where there is none.
fn pick(window: &mut Window, ctx: &Context, purpose: Purpose) {
    let suggested = files::suggested(window.desk.path(), &window.desk.plan.title, purpose.new_ending());
    window.picker = Picker::open(ctx, purpose, &suggested);
    if window.picker.is_none() {
        ask_in_window(window, purpose);
    }
}

/// Takes the answer of a file dialog, once there is one.
pub fn take_answer(window: &mut Window, ctx: &Context) {
    let Some((purpose, answer)) = window.picker.as_ref().and_then(|p| Some((p.purpose, p.answer()?))) else {
        return;
    };
    window.picker = None;
    match answer {
        Answer::Path(path) => {
            // The dialog has asked about a file that exists, but not about one that gets its ending here.
            let whole = with_ending(path.clone(), purpose.new_ending());
            let reply =
                if whole == path { Reply::Use(purpose, path) } else { Reply::Propose(purpose, whole) };
            take_reply(window, ctx, reply);
        }
        Answer::Cancelled => window.after_saving = None,
        Answer::NoService => ask_in_window(window, purpose),
    }
}

/// Asks for a path by the window's own field.
fn ask_in_window(window: &mut Window, purpose: Purpose) {
    let suggested = files::suggested(window.desk.path(), &window.desk.plan.title, purpose.new_ending());
    window.question = Some(Question::Path(PathBox::new(purpose, &suggested)));
}

/// Does what was answered to a question.
pub fn take_reply(window: &mut Window, ctx: &Context, reply: Reply) {
    match reply {
        Reply::Cancel => window.after_saving = None,
        Reply::SaveThen(next) => match window.desk.path().map(Path::to_owned) {
            Some(_) if disk::look(window, Some(Some(next.clone()))) => {}
            Some(_) => save_then(window, ctx, Some(next)),
            None => {
                pick(window, ctx, Purpose::Save);
                window.after_saving = Some(next);
            }
        },
        Reply::Without(next) => without_saving(window, ctx, next),
        Reply::Do(command) => obey(window, ctx, command),
        Reply::Disk(choice) => disk::take(window, ctx, choice),
        // Its question holds what it is about; the window passes both on.
        Reply::Recovery(_) => {}
        Reply::Propose(purpose, path) if purpose.writes() && path.exists() => {
            window.question = Some(Question::Replace(purpose, path));
        }
        Reply::Propose(purpose, path) | Reply::Use(purpose, path) => use_path(window, ctx, purpose, path),
    }
}

fn without_saving(window: &mut Window, ctx: &Context, next: Command) {
    match next {
        Command::Quit => {
            window.may_close = true;
            window.autosave.forget();
            ctx.send_viewport_cmd(ViewportCommand::Close);
        }
        Command::NewFromExample(name) => new_from_example(window, name),
        Command::NewFromKind(id) => new_from_kind(window, id),
        Command::Open => pick(window, ctx, Purpose::Open),
        Command::OpenFile(path) => open(window, &path),
        other => obey(window, ctx, other),
    }
}

fn use_path(window: &mut Window, ctx: &Context, purpose: Purpose, path: PathBuf) {
    match purpose {
        Purpose::Open => open(window, &path),
        Purpose::Save => {
            let next = window.after_saving.take();
            if let (true, Some(next)) = (save_to(window, path), next) {
                obey(window, ctx, next);
            }
        }
        Purpose::Write(_) => write_drawing(window, &path),
        Purpose::Readings => readings::import(window, &path),
    }
}

/// Writes the drawing of the last good result in the format that the file's ending names.
fn write_drawing(window: &mut Window, path: &Path) {
    let Some(outcome) = window.desk.outcome() else { return };
    let ending = path.extension().map(|ending| ending.to_string_lossy().into_owned()).unwrap_or_default();
    let Some(format) = Format::of_ending(&ending) else {
        let known = Format::ALL.map(Format::ending).join(", ");
        window.view.complain(format!("A drawing cannot be written as .{ending}; endings that can: {known}"));
        return;
    };
    let options = window.view.preview.options(&outcome.plan);
    let bytes = export(format, &outcome.plan, &outcome.solution, &options);
    let what = if format == Format::Csv { "Schedule" } else { "Drawing" };
    match files::write(path, &bytes) {
        Ok(()) => window.view.say(format!("{what} written to {}", path.display())),
        Err(words) => window.view.complain(words),
    }
}
