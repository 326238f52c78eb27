//! The bar at the top: menus, pages, and the plan's name.

use std::path::{Path, PathBuf};

use crestline_plan::{EXAMPLES, kinds};
use crestline_sheets::Format;
use eframe::egui::{
    Button, CornerRadius, Frame, Margin, MenuBar, Panel, RichText, Stroke, TextStyle, Ui, Vec2, accesskit,
};

use crate::edit::command::Command;
use crate::edit::desk::Desk;
use crate::theme::{Palette, size};
use crate::units::LengthUnit;
use crate::view::{Page, ThemeChoice, View};

/// Usual width of a tab, points.
const TAB: f32 = 76.0;
/// Room for the switch of units behind the tabs.
const UNIT: f32 = 40.0;

/// The bar.
pub fn show(ui: &mut Ui, palette: &Palette, desk: &Desk, view: &View, recent: &[PathBuf]) -> Vec<Command> {
    let mut commands = Vec::new();
    let frame = Frame::new().fill(palette.band).inner_margin(Margin::symmetric(10, 4));
    Panel::top("bar").frame(frame).resizable(false).show(ui, |ui| {
        MenuBar::new().ui(ui, |ui| {
            ui.label(RichText::new("Crestline").heading().strong().color(palette.accent));
            ui.add_space(size::GAP);
            file_menu(ui, recent, &mut commands);
            edit_menu(ui, desk, view, &mut commands);
            view_menu(ui, view, &mut commands);
            help_menu(ui, &mut commands);
            ui.add_space(size::WIDE_GAP);
            pages(ui, palette, view, &mut commands);
            unit(ui, palette, view, &mut commands);
            name(ui, palette, desk);
        });
    });
    commands
}

fn file_menu(ui: &mut Ui, recent: &[PathBuf], commands: &mut Vec<Command>) {
    ui.menu_button("File", |ui| {
        ui.menu_button("New plan", |ui| {
            for kind in kinds() {
                let words = format!("{}: {}", kind.title(), kind.tuning());
                if ui.button(words).clicked() {
                    commands.push(Command::NewFromKind(&kind.id));
                }
            }
        });
        ui.menu_button("New from example", |ui| {
            for example in EXAMPLES {
                let words = format!("{}: {}", example.name.replace('_', " "), example.summary);
                if ui.button(words).clicked() {
                    commands.push(Command::NewFromExample(example.name));
                }
            }
        });
        item(ui, commands, Command::Open, true);
        ui.add_enabled_ui(!recent.is_empty(), |ui| {
            ui.menu_button("Open a recent plan", |ui| recent_plans(ui, recent, commands));
        });
        ui.separator();
        item(ui, commands, Command::Save, true);
        item(ui, commands, Command::SaveAs, true);
        ui.separator();
        for format in [Format::Pdf, Format::Svg, Format::Dxf, Format::Csv] {
            item(ui, commands, Command::Export(format), true);
        }
        ui.separator();
        item(ui, commands, Command::Quit, true);
    });
}

fn recent_plans(ui: &mut Ui, recent: &[PathBuf], commands: &mut Vec<Command>) {
    for path in recent {
        let part = |part: Option<&Path>| part.map(|part| part.display().to_string()).unwrap_or_default();
        let words = format!("{}  in  {}", part(path.file_name().map(Path::new)), part(path.parent()));
        entry(ui, commands, Command::OpenFile(path.clone()), words, true);
    }
}

fn edit_menu(ui: &mut Ui, desk: &Desk, view: &View, commands: &mut Vec<Command>) {
    ui.menu_button("Edit", |ui| {
        let history = desk.history();
        named_item(ui, commands, Command::Undo, history.undo_name());
        named_item(ui, commands, Command::Redo, history.redo_name());
        ui.separator();
        let (string, count) = (view.string, desk.plan.strings.len());
        let most = crate::edit::strings::MOST_STRINGS;
        item(ui, commands, Command::DuplicateString(string), count < most);
        item(ui, commands, Command::RemoveString(string), count > 1);
        item(ui, commands, Command::MoveStringUp(string), string > 0);
        item(ui, commands, Command::MoveStringDown(string), string + 1 < count);
    });
}

fn view_menu(ui: &mut Ui, view: &View, commands: &mut Vec<Command>) {
    ui.menu_button("View", |ui| {
        for choice in ThemeChoice::ALL {
            if ui.radio(view.theme == choice, choice.name()).clicked() {
                commands.push(Command::Theme(choice));
            }
        }
        item(ui, commands, Command::ShowCard(!view.card), true);
        ui.separator();
        for unit in LengthUnit::ALL {
            let command = Command::ShowLengthsIn(unit);
            if ui.radio(view.unit == unit, command.name()).clicked() {
                commands.push(command);
            }
        }
        ui.separator();
        item(ui, commands, Command::ShowInputs(!view.inputs), true);
        ui.separator();
        item(ui, commands, Command::LargerText, true);
        item(ui, commands, Command::SmallerText, true);
        item(ui, commands, Command::UsualText, true);
        ui.separator();
        item(ui, commands, Command::ResetPlots, true);
    });
}

fn help_menu(ui: &mut Ui, commands: &mut Vec<Command>) {
    ui.menu_button("Help", |ui| {
        item(ui, commands, Command::FindCommand, true);
        let page = Command::ShowPage(Page::Help);
        entry(ui, commands, page, "The model, its limits and sources".to_owned(), true);
    });
}

fn named_item(ui: &mut Ui, commands: &mut Vec<Command>, command: Command, what: Option<&str>) {
    let words = what.map_or_else(|| command.name(), |what| format!("{}: {what}", command.name()));
    entry(ui, commands, command, words, what.is_some());
}

fn item(ui: &mut Ui, commands: &mut Vec<Command>, command: Command, enabled: bool) {
    let words = command.name();
    entry(ui, commands, command, words, enabled);
}

fn entry(ui: &mut Ui, commands: &mut Vec<Command>, command: Command, words: String, enabled: bool) {
    let mut button = Button::new(&words);
    if let Some(shortcut) = command.shortcut() {
        button = button.shortcut_text(ui.ctx().format_shortcut(&shortcut));
    }
    let response = ui.add_enabled(enabled, button);
    response.ctx.accesskit_node_builder(response.id, |node| node.set_label(words));
    if response.clicked() {
        commands.push(command);
        ui.close();
    }
}

/// The tabs; where they do not fit, a menu of the pages.
fn pages(ui: &mut Ui, palette: &Palette, view: &View, commands: &mut Vec<Command>) {
    let (room, count) = (ui.available_width() - UNIT, Page::TABS.len() as f32);
    let around = 2.0 * ui.spacing().button_padding.x + ui.spacing().item_spacing.x;
    let font = TextStyle::Button.resolve(ui.style());
    let text =
        |page: Page| ui.painter().layout_no_wrap(page.name().to_owned(), font.clone(), palette.ink).size().x;
    let least: f32 = Page::TABS.into_iter().map(|page| text(page) + around).sum();
    if least > room {
        ui.menu_button(format!("{} ▾", view.page.name()), |ui| {
            for page in Page::ALL {
                item(ui, commands, Command::ShowPage(page), true);
            }
        });
        return;
    }
    let usual: f32 = Page::TABS.into_iter().map(|page| (text(page) + around).max(TAB)).sum();
    let width = if usual + count * around > room { 0.0 } else { TAB };
    for page in Page::TABS {
        let is_shown = view.page == page;
        let colour = if is_shown { palette.ink } else { palette.quiet };
        let mut text = RichText::new(page.name()).color(colour);
        if is_shown {
            text = text.strong();
        }
        let fill = if is_shown { palette.sheet } else { palette.band };
        let button = Button::new(text)
            .fill(fill)
            .stroke(Stroke::NONE)
            .corner_radius(CornerRadius::same(3))
            .min_size(Vec2::new(width, 24.0));
        let response = ui.add(button).on_hover_text(page.meaning());
        response.ctx.accesskit_node_builder(response.id, |node| {
            node.set_role(accesskit::Role::Tab);
            node.set_label(page.name());
            node.set_selected(is_shown);
            node.set_description(page.meaning());
        });
        if is_shown {
            let line = response.rect.bottom() + 1.0;
            ui.painter().hline(response.rect.x_range(), line, Stroke::new(2.5, palette.accent));
        }
        if response.clicked() {
            commands.push(Command::ShowPage(page));
        }
    }
}

/// The unit of all lengths, as a switch.
fn unit(ui: &mut Ui, palette: &Palette, view: &View, commands: &mut Vec<Command>) {
    let command = Command::ShowLengthsIn(view.unit.other());
    let text = RichText::new(view.unit.sign()).color(palette.ink);
    let key = command.shortcut().map(|shortcut| ui.ctx().format_shortcut(&shortcut)).unwrap_or_default();
    let tip = format!(
        "All lengths in the window are in {}; {} ({key})",
        view.unit.name().to_lowercase(),
        command.name()
    );
    let edge = Stroke::new(size::EDGE, palette.edge);
    let button = Button::new(text).fill(palette.sheet).stroke(edge).min_size(Vec2::new(30.0, 22.0));
    let response = ui.add(button).on_hover_text(tip);
    response.ctx.accesskit_node_builder(response.id, |node| {
        node.set_label(format!("Unit of lengths: {}", view.unit.name().to_lowercase()));
    });
    if response.clicked() {
        commands.push(command);
    }
}

/// The plan's title, its file, and a mark where it has changes that are not saved; nothing where there is no room.
fn name(ui: &mut Ui, palette: &Palette, desk: &Desk) {
    const LEAST: f32 = 60.0;
    if ui.available_width() < LEAST {
        return;
    }
    let layout = eframe::egui::Layout::right_to_left(eframe::egui::Align::Center);
    ui.with_layout(layout, |ui| {
        let mark = if desk.is_changed() { "● unsaved changes" } else { "" };
        ui.label(RichText::new(mark).small().color(palette.caution));
        let title = if desk.plan.title.is_empty() { "Untitled plan" } else { &desk.plan.title };
        let words = format!("{title}  ·  {}", desk.file_name());
        ui.add(eframe::egui::Label::new(RichText::new(words).color(palette.ink)).truncate());
    });
}
