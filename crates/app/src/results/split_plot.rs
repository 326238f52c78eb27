//! Where the error of the chosen string comes from: length, tension, mass and stiffness as stacked bars.

use crestline_plan::{FretReport, StringReport};
use eframe::egui::{RichText, Sense, Stroke, Ui, Vec2, WidgetInfo, accesskit};
use egui_plot::{Bar, BarChart, Line, PlotBounds, PlotPoints, PlotUi, Points};

use super::error_plot::{frame, fret_plot};
use super::figures;
use super::hover;
use crate::edit::desk::Outcome;
use crate::theme::Palette;

/// A part of a note's error, cents.
type Part = fn(&FretReport) -> f64;

/// The four parts in the order in which they are stacked.
const PARTS: [(&str, Part); 4] = [
    ("length", |fret| fret.length_cents),
    ("tension", |fret| fret.tension_cents),
    ("mass", |fret| fret.mass_cents),
    ("stiffness", |fret| fret.stiffness_cents),
];
/// Width of a bar in frets.
const BAR: f64 = 0.66;

/// The names of the parts with their colours, above the plot.
pub fn legend(ui: &mut Ui, palette: &Palette, chosen: usize) {
    ui.horizontal_wrapped(|ui| {
        ui.label(
            RichText::new(format!("String {}, no setback:", chosen + 1))
                .color(palette.string(chosen))
                .strong(),
        );
        for ((name, _), colour) in PARTS.iter().zip(palette.parts) {
            let (rect, _) = ui.allocate_exact_size(Vec2::splat(11.0), Sense::hover());
            ui.painter().rect_filled(rect, 2.0, colour);
            ui.label(*name);
        }
        ui.label(RichText::new("● sum").color(palette.ink));
    });
}

/// The plot, as high as given.
pub fn show(ui: &mut Ui, palette: &'static Palette, outcome: &Outcome, chosen: usize, height: f32) {
    let Some(string) = outcome.solution.report.strings.get(chosen) else { return };
    let bounds = whole(string, outcome.plan.instrument.frets);
    let plot = fret_plot("parts of the error", palette).height(height).allow_drag(false).allow_zoom(false);
    let shown = plot.show(ui, |plot| {
        plot.set_plot_bounds(bounds);
        frame(plot, palette, outcome.plan.fit.frets, &bounds);
        bars(plot, palette, string);
        sum(plot, palette, string);
    });
    let response = hover::parts(shown.response, &shown.transform, palette, string);
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, in_words(string)));
}

/// Positive parts are stacked upward from zero and negative ones downward.
fn bars(plot: &mut PlotUi<'_>, palette: &Palette, string: &StringReport) {
    for (index, (_, of)) in PARTS.iter().enumerate() {
        let bar = |fret: &FretReport| {
            let value = of(fret);
            let below = PARTS[..index].iter().map(|(_, of)| of(fret));
            let base: f64 = below.filter(|other| (*other < 0.0) == (value < 0.0)).sum();
            Bar::new(f64::from(fret.fret), value)
                .base_offset(base)
                .width(BAR)
                .fill(palette.parts[index])
                .stroke(Stroke::new(0.6, palette.sheet))
        };
        let all = string.frets.iter().map(bar).collect();
        plot.bar_chart(BarChart::new("", all).color(palette.parts[index]).allow_hover(false));
    }
}

fn sum(plot: &mut PlotUi<'_>, palette: &Palette, string: &StringReport) {
    let points: Vec<[f64; 2]> =
        string.frets.iter().map(|fret| [f64::from(fret.fret), fret.none_cents]).collect();
    let line: PlotPoints<'_> = points.clone().into();
    plot.line(Line::new("", line).color(palette.ink).width(1.0).allow_hover(false));
    let marks: PlotPoints<'_> = points.into();
    plot.points(Points::new("", marks).color(palette.ink).radius(2.6).allow_hover(false));
}

fn whole(string: &StringReport, frets: u32) -> PlotBounds {
    let ends = string.frets.iter().map(|fret| {
        let parts = PARTS.map(|(_, of)| of(fret));
        let side = |up: bool| parts.iter().filter(|v| (**v > 0.0) == up).sum::<f64>();
        (side(false), side(true))
    });
    let (low, high) = ends.fold((0.0_f64, 1.0_f64), |(low, high), (down, up)| (low.min(down), high.max(up)));
    let air = 0.06 * (high - low);
    PlotBounds::from_min_max([0.4, low - air], [f64::from(frets) + 0.6, high + air])
}

fn in_words(string: &StringReport) -> String {
    let fret = |f: &FretReport| {
        let parts: Vec<String> =
            PARTS.iter().map(|(name, of)| format!("{name} {}", figures::cents(of(f)))).collect();
        format!(" Fret {}: {}.", f.fret, parts.join(", "))
    };
    let frets: String = string.frets.iter().map(fret).collect();
    format!("Parts of the error of string {} in cents with no setback.{frets}", string.string)
}
