//! The page `Fretted notes`: every note's figure, strings by frets.

use crestline_plan::{FretReport, StringReport};
use eframe::egui::{
    Align2, Color32, FontId, Frame, Margin, Panel, Rect, Response, RichText, ScrollArea, Sense, Stroke,
    StrokeKind, Ui, Vec2, WidgetInfo, accesskit, pos2,
};

use super::error_plot::{self, Shown};
use super::figures::{cents, fixed, newtons};
use super::marks;
use crate::bands::on_plots::OnPlots;
use crate::edit::command::Command;
use crate::edit::desk::Outcome;
use crate::theme::{Palette, size};
use crate::view::{NoteFigure, View};

/// Least and greatest width of a string's column.
const COLUMN: [f32; 2] = [50.0, 132.0];
/// Width of a string's column where the curves stand beside the table.
const COLUMN_BESIDE: f32 = 92.0;
/// The least room that the curves are worth.
const CURVES: f32 = 420.0;
/// Space on the right of a figure.
const PAD: f32 = 9.0;
/// Width of the column of fret numbers.
const FIRST: f32 = 92.0;
/// Least and greatest height of a row.
const ROW: [f32; 2] = [20.0, 36.0];
/// Height of the heads.
const HEAD: f32 = 42.0;
/// Errors below this are small to the ear, cents; from this on the ground of a cell deepens.
const SMALL_CENTS: f64 = 2.0;
/// Errors from this on have the deepest ground, cents.
const LARGE_CENTS: f64 = 10.0;

/// The page.
pub fn show(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, view: &mut View) -> Vec<Command> {
    let mut commands = Vec::new();
    let edge = Stroke::new(size::EDGE, palette.edge);
    Frame::new().fill(palette.sheet).stroke(edge).inner_margin(Margin::symmetric(12, 8)).show(ui, |ui| {
        choices(ui, palette, outcome, view);
        let needed = FIRST + 16.0 + outcome.plan.strings.len() as f32 * COLUMN_BESIDE;
        if ui.available_width() > needed + CURVES {
            let left = ui.available_width() - needed;
            Panel::right("curves")
                .exact_size(left)
                .resizable(false)
                .show_separator_line(false)
                .frame(Frame::new())
                .show(ui, |ui| {
                    let bands = OnPlots::of(ui.ctx(), outcome, &mut view.trust);
                    let shown = Shown { outcome, bands: bands.as_ref(), chosen: view.string };
                    error_plot::choices(ui, palette, &shown, &mut view.errors, &mut view.trust.on_plots);
                    let room = ui.available_height();
                    error_plot::show(ui, palette, &shown, &mut view.errors, room);
                });
        }
        ScrollArea::both().auto_shrink([false, false]).show(ui, |ui| {
            commands.extend(grid(ui, palette, outcome, view));
        });
    });
    commands
}

fn choices(ui: &mut Ui, palette: &Palette, outcome: &Outcome, view: &mut View) {
    ui.horizontal_wrapped(|ui| {
        ui.label(RichText::new("Every fretted note").heading());
        ui.add_space(size::WIDE_GAP);
        for figure in NoteFigure::ALL {
            if figure != NoteFigure::AsItIs || outcome.plan.as_built.is_some() {
                ui.selectable_value(&mut view.note_figure, figure, figure.name());
            }
        }
    });
    ui.label(RichText::new(view.note_figure.meaning()).small().color(palette.quiet));
}

/// Where the cells are.
struct Grid<'a> {
    palette: &'a Palette,
    figure: NoteFigure,
    chosen: usize,
    column: f32,
    row: f32,
}

fn grid(ui: &mut Ui, palette: &Palette, outcome: &Outcome, view: &View) -> Vec<Command> {
    let strings = &outcome.solution.report.strings;
    let frets = outcome.plan.instrument.frets as usize;
    let room = (ui.available_size() - Vec2::new(FIRST + 8.0, HEAD + 8.0))
        / Vec2::new(strings.len() as f32, frets as f32 + 2.0);
    let grid = Grid {
        palette,
        figure: view.note_figure,
        chosen: view.string,
        column: room.x.clamp(COLUMN[0], COLUMN[1]),
        row: room.y.clamp(ROW[0], ROW[1]),
    };
    ui.spacing_mut().item_spacing = Vec2::ZERO;
    let commands = heads(ui, &grid, outcome);
    let fit = outcome.plan.fit.frets;
    for fret in 0..frets {
        let number = (fret + 1).to_string();
        let notes: Vec<Option<&FretReport>> = strings.iter().map(|string| string.frets.get(fret)).collect();
        let in_fit = u32::try_from(fret + 1).is_ok_and(|fret| (fit[0]..=fit[1]).contains(&fret));
        row(ui, &grid, &number, in_fit, &notes);
    }
    if let Some(foot) = grid.figure.summary() {
        summary(ui, &grid, strings, foot);
    }
    commands
}

fn heads(ui: &mut Ui, grid: &Grid, outcome: &Outcome) -> Vec<Command> {
    let mut commands = Vec::new();
    ui.horizontal(|ui| {
        let (rect, _) = ui.allocate_exact_size(Vec2::new(FIRST, HEAD), Sense::hover());
        let at = pos2(rect.left() + 34.0, rect.bottom() - 4.0);
        marks::head(ui.painter(), at, Align2::CENTER_BOTTOM, "Fret", grid.palette.quiet);
        for (index, string) in outcome.solution.report.strings.iter().enumerate() {
            if head(ui, grid, index, string).clicked() {
                commands.push(Command::ChooseString(index));
            }
        }
    });
    commands
}

/// Marker, number and name of a string; it chooses the string.
fn head(ui: &mut Ui, grid: &Grid, index: usize, string: &StringReport) -> Response {
    let palette = grid.palette;
    let (rect, response) = ui.allocate_exact_size(Vec2::new(grid.column, HEAD), Sense::click());
    let is_chosen = index == grid.chosen;
    let name = format!("Choose string {}", string.string);
    response.widget_info(|| WidgetInfo::selected(accesskit::Role::RadioButton, true, is_chosen, &name));
    if is_chosen {
        ui.painter().rect_filled(rect.shrink(1.0), 3.0, palette.accent_ground);
    }
    if response.has_focus() || response.hovered() {
        ui.painter().rect_stroke(rect.shrink(1.0), 3.0, Stroke::new(1.0, palette.accent), StrokeKind::Inside);
    }
    let right = rect.right() - PAD;
    marks::paint(ui.painter(), pos2(rect.left() + 13.0, rect.top() + 13.0), index, palette, 4.5);
    let number = FontId::proportional(size::TEXT);
    ui.painter().text(
        pos2(right, rect.top() + 13.0),
        Align2::RIGHT_CENTER,
        string.string.to_string(),
        number,
        palette.ink,
    );
    if string.name != string.string.to_string() {
        let at = pos2(right, rect.bottom() - 12.0);
        let width = grid.column - PAD - 4.0;
        let name = marks::Elided { text: &string.name, size: size::SMALL, colour: palette.quiet, width };
        name.paint(ui.painter(), at, Align2::RIGHT_CENTER);
    }
    response
}

fn row(ui: &mut Ui, grid: &Grid, number: &str, in_fit: bool, notes: &[Option<&FretReport>]) {
    ui.horizontal(|ui| {
        let response = first(ui, grid, number, if in_fit { "in the fit" } else { "" });
        let mut words = format!("Fret {number}.");
        for (index, note) in notes.iter().enumerate() {
            let Some(note) = note else { continue };
            let text = grid.figure.text(note);
            words.push_str(&format!(" String {}: {text}.", index + 1));
            cell(ui, grid, note, &text, index == grid.chosen);
        }
        response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Row, true, &words));
    });
}

/// The first cell of a row: what the row is, and a small remark.
fn first(ui: &mut Ui, grid: &Grid, words: &str, remark: &str) -> Response {
    let (rect, response) = ui.allocate_exact_size(Vec2::new(FIRST, grid.row), Sense::hover());
    let middle = rect.center().y;
    let (at, anchor) = if remark.is_empty() && words.len() > 2 {
        (pos2(rect.left() + 4.0, middle), Align2::LEFT_CENTER)
    } else {
        (pos2(rect.left() + 34.0, middle), Align2::CENTER_CENTER)
    };
    ui.painter().text(at, anchor, words, FontId::proportional(size::TEXT), grid.palette.quiet);
    if !remark.is_empty() {
        let bar =
            Rect::from_min_max(pos2(rect.left() + 8.0, rect.top()), pos2(rect.left() + 11.0, rect.bottom()));
        ui.painter().rect_filled(bar, 0.0, grid.palette.accent);
        return response.on_hover_text(format!("Fret {words} is {remark}"));
    }
    response
}

fn cell(ui: &mut Ui, grid: &Grid, note: &FretReport, text: &str, is_chosen: bool) {
    let palette = grid.palette;
    let (rect, response) = ui.allocate_exact_size(Vec2::new(grid.column, grid.row), Sense::hover());
    let ground = grid.figure.cents(note).and_then(|cents| ground(palette, cents));
    figure(ui, grid, rect, text, ground, is_chosen);
    if let Some(touched) = note.touches_fret {
        let at = pos2(rect.left() + 8.0, rect.center().y);
        ui.painter().text(
            at,
            Align2::LEFT_CENTER,
            "▲",
            FontId::proportional(size::SMALL - 1.0),
            palette.fault,
        );
        response.on_hover_text(format!("Buzzes: the string touches fret {touched}"));
    }
}

fn figure(ui: &Ui, grid: &Grid, rect: Rect, text: &str, ground: Option<Color32>, is_chosen: bool) {
    if let Some(ground) = ground {
        ui.painter().rect_filled(rect.shrink(1.0), 2.0, ground);
    }
    if is_chosen {
        let edge = Stroke::new(1.2, grid.palette.accent);
        ui.painter().vline(rect.left() + 1.0, rect.y_range(), edge);
        ui.painter().vline(rect.right() - 1.0, rect.y_range(), edge);
    }
    let at = pos2(rect.right() - PAD, rect.center().y);
    ui.painter().text(at, Align2::RIGHT_CENTER, text, FontId::proportional(size::TEXT), grid.palette.ink);
}

/// A figure of a whole string.
type StringFigure = fn(&StringReport) -> f64;

/// Root mean square and largest error of every string over the frets of the fit.
fn summary(ui: &mut Ui, grid: &Grid, strings: &[StringReport], figures: [StringFigure; 2]) {
    let top = ui.cursor().top() + 2.0;
    let right = ui.cursor().left() + FIRST + grid.column * strings.len() as f32;
    ui.painter().hline(ui.cursor().left()..=right, top, Stroke::new(1.0, grid.palette.edge));
    ui.add_space(4.0);
    for (name, of) in ["RMS of fit", "Worst of fit"].into_iter().zip(figures) {
        ui.horizontal(|ui| {
            let response = first(ui, grid, name, "");
            let mut words = format!("{name}, cents.");
            for (index, string) in strings.iter().enumerate() {
                let (rect, _) = ui.allocate_exact_size(Vec2::new(grid.column, grid.row), Sense::hover());
                let text = fixed(of(string), 1);
                words.push_str(&format!(" String {}: {text}.", index + 1));
                figure(ui, grid, rect, &text, None, index == grid.chosen);
            }
            response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Row, true, &words));
        });
    }
}

/// The ground of a cell: none for small errors, deeper for large ones, one hue for sharp and one for flat.
fn ground(palette: &Palette, cents: f64) -> Option<Color32> {
    let share = ((cents.abs() - SMALL_CENTS) / (LARGE_CENTS - SMALL_CENTS)).clamp(0.0, 1.0) as f32;
    (cents.abs() >= SMALL_CENTS).then(|| palette.error_ground(cents > 0.0, share))
}

impl NoteFigure {
    /// The figure as text.
    fn text(self, report: &FretReport) -> String {
        match self {
            Self::Force => newtons(report.finger_force_n),
            _ => self.cents(report).map(cents).unwrap_or_default(),
        }
    }

    fn cents(self, report: &FretReport) -> Option<f64> {
        match self {
            Self::Built => Some(report.built_cents),
            Self::Ideal => Some(report.ideal_cents),
            Self::None => Some(report.none_cents),
            Self::AsItIs => report.as_built_cents,
            Self::Force => None,
        }
    }

    /// Root mean square and largest error of a string, where the report has them for this figure.
    fn summary(self) -> Option<[StringFigure; 2]> {
        match self {
            Self::Built => Some([|s| s.built.rms_cents, |s| s.built.max_cents]),
            Self::Ideal => Some([|s| s.ideal.rms_cents, |s| s.ideal.max_cents]),
            Self::None | Self::AsItIs | Self::Force => None,
        }
    }
}
