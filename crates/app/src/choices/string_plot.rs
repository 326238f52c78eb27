//! What every saddle style leaves on each string, with the plan's nut, as bars side by side.

use crestline_plan::{Comparison, ComparisonRow, NutStyle};
use eframe::egui::{RichText, Sense, Stroke, Ui, Vec2, WidgetInfo, accesskit};
use egui_plot::{Bar, BarChart, Plot, PlotBounds};

use super::styles::{IN_ORDER, saddle_words};
use crate::results::figures::fixed;
use crate::theme::Palette;

/// Height of the plot, points.
const HEIGHT: f32 = 210.0;
/// Share of a string's place that its bars fill.
const FILLED: f64 = 0.8;

/// The part of the page.
pub fn show(ui: &mut Ui, palette: &Palette, comparison: &Comparison, nut: NutStyle) {
    let rows: Vec<&ComparisonRow> = IN_ORDER
        .iter()
        .filter_map(|style| comparison.rows.iter().find(|row| row.saddle == *style && row.nut == nut))
        .collect();
    ui.label(RichText::new("Root mean square on each string, nut as in the plan, cents").heading());
    ui.horizontal_wrapped(|ui| {
        for (row, colour) in rows.iter().zip(palette.parts) {
            let (rect, _) = ui.allocate_exact_size(Vec2::splat(11.0), Sense::hover());
            ui.painter().rect_filled(rect, 2.0, colour);
            ui.label(saddle_words(row));
        }
    });
    let strings = rows.first().map_or(0, |row| row.string_rms_cents.len());
    let most =
        rows.iter().flat_map(|row| &row.string_rms_cents).fold(0.5_f64, |most, cents| most.max(*cents));
    let plot = Plot::new("errors of each string")
        .height(HEIGHT)
        .show_x(false)
        .show_y(false)
        .allow_drag(false)
        .allow_zoom(false)
        .allow_scroll(false)
        .allow_boxed_zoom(false)
        .show_grid([false, true])
        .x_grid_spacer(move |_| (1..=strings).map(tick).collect())
        .x_axis_formatter(|mark, _| format!("string {:.0}", mark.value));
    let shown = plot.show(ui, |plot| {
        plot.set_plot_bounds(PlotBounds::from_min_max([0.4, 0.0], [strings as f64 + 0.6, 1.08 * most]));
        let width = FILLED / rows.len().max(1) as f64;
        for (place, (row, colour)) in rows.iter().zip(palette.parts).enumerate() {
            let offset = (place as f64 + 0.5) * width - 0.5 * FILLED;
            let bar = |(string, cents): (usize, &f64)| {
                let stroke = Stroke::new(0.6, palette.sheet);
                Bar::new(string as f64 + 1.0 + offset, *cents).width(width).fill(colour).stroke(stroke)
            };
            let bars = row.string_rms_cents.iter().enumerate().map(bar).collect();
            plot.bar_chart(BarChart::new("", bars).color(colour).allow_hover(false));
        }
    });
    let words: String = rows.iter().map(|row| in_words(row)).collect();
    shown.response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, &words));
}

fn tick(string: usize) -> egui_plot::GridMark {
    egui_plot::GridMark { value: string as f64, step_size: 1.0 }
}

fn in_words(row: &ComparisonRow) -> String {
    let strings = row.string_rms_cents.iter().enumerate();
    let each: Vec<String> =
        strings.map(|(string, cents)| format!("string {} {}", string + 1, fixed(*cents, 2))).collect();
    format!("{}: {}. ", saddle_words(row), each.join(", "))
}
