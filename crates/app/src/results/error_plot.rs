//! The error of every fretted note as curves.

use crestline_plan::{FretReport, StringReport};
use eframe::egui::{Checkbox, Color32, RichText, Ui, Vec2, Vec2b, WidgetInfo, accesskit};
use egui_plot::{FilledArea, HLine, Line, LineStyle, Plot, PlotBounds, PlotPoints, PlotUi, Points, Span};

use super::axes::{Along, with_axes};
use super::figures;
use super::hover;
use crate::bands::on_plots::{Ends, OnPlots};
use crate::edit::desk::Outcome;
use crate::theme::{Palette, marker, size};

/// The least height of the plot's scale, cents to either side.
const LEAST_CENTS: f64 = 3.0;

/// What the plot is of.
pub struct Shown<'a> {
    /// The plan and what comes of it.
    pub outcome: &'a Outcome,
    /// How far it can be trusted, where that is to be shown.
    pub bands: Option<&'a OnPlots>,
    /// The chosen string, 0 first.
    pub chosen: usize,
}

/// Which errors are shown.
#[derive(Debug, Clone, PartialEq)]
pub struct ErrorChoice {
    /// With no setback.
    pub none: bool,
    /// With the ideal setbacks.
    pub ideal: bool,
    /// With the built setbacks.
    pub built: bool,
    /// Of the existing instrument.
    pub as_built: bool,
    /// The other strings, with the built setbacks, beside the chosen one.
    pub others: bool,
    /// The part of the plot that the user chose to see.
    pub looking: Option<PlotBounds>,
}

impl Default for ErrorChoice {
    fn default() -> Self {
        Self { none: true, ideal: true, built: true, as_built: true, others: true, looking: None }
    }
}

/// A kind of error: its line, and where the report has it.
struct Kind {
    style: LineStyle,
    of: fn(&FretReport) -> Option<f64>,
}

const NONE: Kind = Kind { style: LineStyle::Dotted { spacing: 6.0 }, of: |fret| Some(fret.none_cents) };
const IDEAL: Kind = Kind { style: LineStyle::Dashed { length: 9.0 }, of: |fret| Some(fret.ideal_cents) };
const BUILT: Kind = Kind { style: LineStyle::Solid, of: |fret| Some(fret.built_cents) };
const AS_IT_IS: Kind = Kind { style: LineStyle::Dashed { length: 3.0 }, of: |fret| fret.as_built_cents };

/// The choices above the plot; `on_plots` says whether it shows bands, where the plan has tolerances.
pub fn choices(
    ui: &mut Ui,
    palette: &Palette,
    shown: &Shown<'_>,
    choice: &mut ErrorChoice,
    on_plots: &mut bool,
) {
    let (outcome, chosen) = (shown.outcome, shown.chosen);
    ui.horizontal_wrapped(|ui| {
        ui.label(RichText::new(format!("String {}:", chosen + 1)).color(palette.string(chosen)).strong());
        ui.add(Checkbox::new(&mut choice.none, "no setback ····"));
        ui.add(Checkbox::new(&mut choice.ideal, "ideal ╌╌"));
        ui.add(Checkbox::new(&mut choice.built, "built ──"));
        if outcome.plan.as_built.is_some() {
            ui.add(Checkbox::new(&mut choice.as_built, "now ┄┄"));
        }
        if outcome.plan.tolerances.is_some() {
            let help = "Between its edges lie nine of ten instruments that the tolerances allow for, and in plan nine \
                        of ten ideal crests.";
            ui.add(Checkbox::new(on_plots, "90 % bands ▒")).on_hover_text(help);
        }
        ui.add_space(size::GAP);
        ui.add(Checkbox::new(&mut choice.others, "other strings"));
    });
}

/// The plot, as high as given.
pub fn show(
    ui: &mut Ui,
    palette: &'static Palette,
    shown: &Shown<'_>,
    choice: &mut ErrorChoice,
    height: f32,
) {
    let (outcome, chosen) = (shown.outcome, shown.chosen);
    let strings = &outcome.solution.report.strings;
    let curves = curves(strings, chosen, choice);
    let band = if choice.built { band(shown) } else { Vec::new() };
    let whole = whole(outcome, &curves, &band);
    let bounds = choice.looking.unwrap_or(whole);
    let plot = fret_plot("errors of the fretted notes", palette).height(height);
    let painted = plot.show(ui, |plot| {
        plot.set_plot_bounds(bounds);
        frame(plot, palette, outcome.plan.fit.frets, &bounds);
        area(plot, palette.string(chosen), &band);
        for curve in &curves {
            draw(plot, palette, curve);
        }
    });
    let response =
        hover::errors(painted.response, &painted.transform, palette, strings.get(chosen), shown.bands);
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, in_words(shown)));
    let zoomed = response.contains_pointer() && ui.input(|i| i.zoom_delta() != 1.0);
    if response.dragged() || zoomed {
        choice.looking = Some(*painted.transform.bounds());
    }
    if response.double_clicked() {
        choice.looking = None;
    }
}

/// A plot over the frets.
pub fn fret_plot<'a>(name: &'static str, palette: &'static Palette) -> Plot<'a> {
    let plot = Plot::new(name)
        .allow_scroll(false)
        .allow_boxed_zoom(false)
        .allow_double_click_reset(false)
        .allow_axis_zoom_drag(false)
        .show_crosshair(false)
        .show_grid(Vec2b::new(false, true))
        .min_size(Vec2::new(120.0, 80.0))
        .label_formatter(|_| None);
    with_axes(plot, palette, Along::Frets, ["", "cents"])
}

/// The ground of a plot over the frets: the frets of the fit, and the zero line.
pub fn frame(plot: &mut PlotUi<'_>, palette: &Palette, fit: [u32; 2], bounds: &PlotBounds) {
    let range = f64::from(fit[0]) - 0.5..=f64::from(fit[1]) + 0.5;
    plot.span(Span::new("", range).fill(palette.accent_ground.gamma_multiply(0.35)).border_width(0.0));
    for octave in [12.0, 24.0] {
        if bounds.max()[0] > octave {
            plot.vline(egui_plot::VLine::new("", octave).color(palette.edge).width(1.0).allow_hover(false));
        }
    }
    plot.hline(HLine::new("", 0.0).color(palette.quiet).width(1.2).allow_hover(false));
}

/// One curve to draw.
struct Curve {
    string: usize,
    points: Vec<[f64; 2]>,
    style: LineStyle,
    is_chosen: bool,
}

fn curves(strings: &[StringReport], chosen: usize, choice: &ErrorChoice) -> Vec<Curve> {
    let mut curves = Vec::new();
    if choice.others {
        let others = strings.iter().enumerate().filter(|(index, _)| *index != chosen);
        curves.extend(others.map(|(index, string)| curve(index, string, &BUILT, false)));
    }
    let kinds =
        [(choice.none, NONE), (choice.ideal, IDEAL), (choice.as_built, AS_IT_IS), (choice.built, BUILT)];
    if let Some(string) = strings.get(chosen) {
        let wanted = kinds.iter().filter(|(wanted, _)| *wanted);
        curves.extend(wanted.map(|(_, kind)| curve(chosen, string, kind, true)));
    }
    curves.retain(|curve| !curve.points.is_empty());
    curves
}

fn curve(index: usize, string: &StringReport, kind: &Kind, is_chosen: bool) -> Curve {
    let point = |fret: &FretReport| (kind.of)(fret).map(|cents| [f64::from(fret.fret), cents]);
    Curve {
        string: index,
        points: string.frets.iter().filter_map(point).collect(),
        style: kind.style,
        is_chosen,
    }
}

fn draw(plot: &mut PlotUi<'_>, palette: &Palette, curve: &Curve) {
    let colour: Color32 = palette.string(curve.string);
    let (width, radius) = if curve.is_chosen { (2.4, 4.0) } else { (1.0, 2.8) };
    let line: PlotPoints<'_> = curve.points.clone().into();
    let width = if matches!(curve.style, LineStyle::Dotted { .. }) { 0.75 * width } else { width };
    plot.line(Line::new("", line).color(colour).width(width).style(curve.style).allow_hover(false));
    let solid = matches!(curve.style, LineStyle::Solid);
    let marks: PlotPoints<'_> = curve.points.clone().into();
    plot.points(
        Points::new("", marks)
            .allow_hover(false)
            .shape(marker(curve.string))
            .color(colour)
            .filled(solid)
            .radius(radius),
    );
}

/// The bands of the chosen string's errors as built: fret and ends.
fn band(shown: &Shown<'_>) -> Vec<(f64, Ends)> {
    let Some(bands) = shown.bands else { return Vec::new() };
    let Some(string) = shown.outcome.solution.report.strings.get(shown.chosen) else { return Vec::new() };
    let of = |(index, fret): (usize, &FretReport)| {
        Some((f64::from(fret.fret), bands.error_cents(shown.chosen, index)?))
    };
    string.frets.iter().enumerate().filter_map(of).collect()
}

/// The bands as an area behind the curves; a note that buzzes parts it.
fn area(plot: &mut PlotUi<'_>, colour: Color32, band: &[(f64, Ends)]) {
    for piece in band.chunk_by(|a, b| b.0 - a.0 < 1.5) {
        let frets: Vec<f64> = piece.iter().map(|(fret, _)| *fret).collect();
        let edge = |side: usize| -> Vec<f64> { piece.iter().map(|(_, ends)| ends[side]).collect() };
        let area = FilledArea::new("", &frets, &edge(0), &edge(1));
        plot.add(area.fill_color(colour.gamma_multiply(0.22)).allow_hover(false));
    }
}

/// All curves and bands with some air, and at least a few cents to either side.
fn whole(outcome: &Outcome, curves: &[Curve], band: &[(f64, Ends)]) -> PlotBounds {
    let frets = f64::from(outcome.plan.instrument.frets);
    let cents = curves.iter().flat_map(|curve| curve.points.iter().map(|point| point[1]));
    let cents = cents.chain(band.iter().flat_map(|(_, ends)| *ends));
    let (low, high) = cents.fold((-LEAST_CENTS, LEAST_CENTS), |(low, high), v| (low.min(v), high.max(v)));
    let air = 0.06 * (high - low);
    PlotBounds::from_min_max([0.4, low - air], [frets + 0.6, high + air])
}

fn in_words(shown: &Shown<'_>) -> String {
    let string = shown.outcome.solution.report.strings.get(shown.chosen);
    let Some(string) = string else { return "Errors of the fretted notes.".to_owned() };
    let fret = |(index, f): (usize, &FretReport)| {
        let band = shown.bands.and_then(|bands| bands.error_cents(shown.chosen, index));
        let band = band.map_or_else(String::new, |[low, high]| {
            format!(" (90 % from {} to {})", figures::cents(low), figures::cents(high))
        });
        format!(
            " Fret {}: {}{band}, without setback {}.",
            f.fret,
            figures::cents(f.built_cents),
            figures::cents(f.none_cents)
        )
    };
    let frets: String = string.frets.iter().enumerate().map(fret).collect();
    format!(
        "Errors of the fretted notes of string {} in cents with the built setbacks.{frets}",
        string.string
    )
}
