//! The bands of the ideal setbacks, a bar a string, with the setback as built beside them.

use crestline_plan::{Band, StringReport, StringUncertainty, Uncertainty};
use eframe::egui::{Color32, FontId, RichText, Ui, Vec2b, WidgetInfo, accesskit};
use egui_plot::{AxisHints, GridMark, Line, LineStyle, Plot, PlotBounds, PlotPoints, PlotUi, Points};

use crate::results::figures::fixed;
use crate::theme::{Palette, marker, size};
use crate::units::LengthUnit;

/// Height of a string's line, and of the axis below, points.
const LINE: f32 = 26.0;
const AXIS: f32 = 34.0;
/// Half the height of the marks at the ends of a band and of the setback as built, in lines.
const END: f64 = 0.2;
const BUILT: f64 = 0.38;
/// Room on either side as a part of the whole.
const AIR: f64 = 0.06;

/// The plot; `built` are the figures of the same plan, where they are.
pub fn show(
    ui: &mut Ui,
    palette: &'static Palette,
    uncertainty: &Uncertainty,
    built: Option<&[StringReport]>,
) {
    let unit = LengthUnit::of(ui.ctx());
    ui.label(RichText::new(unit.named("Bands of the ideal setbacks")).heading());
    let legend =
        "● with the plan's figures   ━ one standard deviation   ├─┤ 90 % of the instruments   ┆ as built";
    ui.label(RichText::new(legend).small().color(palette.quiet));
    let strings = &uncertainty.strings;
    let built_mm =
        |index: usize| built.and_then(|built| built.get(index)).map(|own| own.built.saddle_setback_mm);
    let bounds = bounds(strings, &built_mm, unit);
    let shown = plot(palette, strings.len()).show(ui, |plot| {
        plot.set_plot_bounds(bounds);
        for (index, string) in strings.iter().enumerate() {
            let Some(band) = string.saddle_setback_mm else { continue };
            draw(plot, palette, index, &band, built_mm(index), unit);
        }
    });
    let words: Vec<String> =
        (0..strings.len()).filter_map(|i| in_words(&strings[i], built_mm(i), unit)).collect();
    let under = shown.response.hover_pos().map(|at| -shown.transform.value_from_position(at).y.round());
    let under = under.filter(|line| *line >= 1.0).and_then(|line| words.get(line as usize - 1));
    let response = match under {
        Some(line) => shown.response.on_hover_text_at_pointer(line.as_str()),
        None => shown.response,
    };
    let all = format!("Bands of the ideal setbacks. {}", words.join(" "));
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, &all));
}

fn plot<'a>(palette: &'static Palette, strings: usize) -> Plot<'a> {
    let hints = |axis: AxisHints<'a>| {
        axis.tick_label_color(palette.quiet).tick_label_font(FontId::proportional(size::SMALL))
    };
    let x = hints(AxisHints::new_x()).formatter(|mark, _| {
        let decimals = (-mark.step_size.log10()).ceil().clamp(0.0, 4.0) as usize;
        fixed(mark.value, decimals)
    });
    let y = hints(AxisHints::new_y()).formatter(|mark, _| format!("string {:.0}", -mark.value));
    Plot::new("bands of the setbacks")
        .height(LINE * strings as f32 + AXIS)
        .custom_x_axes(vec![x])
        .custom_y_axes(vec![y])
        .allow_drag(false)
        .allow_zoom(false)
        .allow_scroll(false)
        .allow_boxed_zoom(false)
        .allow_double_click_reset(false)
        .allow_axis_zoom_drag(false)
        .show_crosshair(false)
        .show_grid(Vec2b::new(true, false))
        .grid_color(palette.edge.gamma_multiply(0.55))
        .label_formatter(|_| None)
        .y_grid_spacer(move |_| {
            (1..=strings).map(|string| GridMark { value: -(string as f64), step_size: 1.0 }).collect()
        })
}

/// All bands and setbacks as built, with air to either side.
fn bounds(
    strings: &[StringUncertainty],
    built_mm: &impl Fn(usize) -> Option<f64>,
    unit: LengthUnit,
) -> PlotBounds {
    let bands = strings.iter().filter_map(|string| string.saddle_setback_mm);
    let ends = bands.flat_map(|band| [band.p05, band.p95, band.nominal]);
    let all = ends.chain((0..strings.len()).filter_map(built_mm)).map(|mm| unit.from_mm(mm));
    let (low, high) =
        all.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), v| (low.min(v), high.max(v)));
    // A band of nothing still wants a scale: a tenth of a millimetre.
    let (low, high) =
        if high > low { (low, high) } else { (low - unit.from_mm(0.1), low + unit.from_mm(0.1)) };
    let (low, high) = if low.is_finite() && high.is_finite() { (low, high) } else { (0.0, 1.0) };
    let air = AIR * (high - low);
    PlotBounds::from_min_max([low - air, -(strings.len() as f64) - 0.6], [high + air, -0.4])
}

fn draw(
    plot: &mut PlotUi<'_>,
    palette: &Palette,
    index: usize,
    band: &Band,
    built_mm: Option<f64>,
    unit: LengthUnit,
) {
    let y = -(index as f64 + 1.0);
    let colour = palette.string(index);
    let at = |mm: f64| unit.from_mm(mm);
    let mut line = |ends: [[f64; 2]; 2], width: f32, colour: Color32, style: LineStyle| {
        let points: PlotPoints<'_> = ends.to_vec().into();
        plot.line(Line::new("", points).width(width).color(colour).style(style).allow_hover(false));
    };
    let [low, high] = [at(band.p05), at(band.p95)];
    line([[low, y], [high, y]], 1.6, colour, LineStyle::Solid);
    for end in [low, high] {
        line([[end, y - END], [end, y + END]], 1.6, colour, LineStyle::Solid);
    }
    let [below, above] = [at(band.mean - band.sd), at(band.mean + band.sd)];
    line([[below, y], [above, y]], 5.0, colour, LineStyle::Solid);
    if let Some(built) = built_mm.map(at) {
        let style = LineStyle::Dashed { length: 4.0 };
        line([[built, y - BUILT], [built, y + BUILT]], 2.0, palette.ink, style);
    }
    let nominal: PlotPoints<'_> = vec![[at(band.nominal), y]].into();
    plot.points(
        Points::new("", nominal)
            .shape(marker(index))
            .color(palette.ink)
            .filled(true)
            .radius(4.5)
            .allow_hover(false),
    );
}

fn in_words(string: &StringUncertainty, built_mm: Option<f64>, unit: LengthUnit) -> Option<String> {
    let band = string.saddle_setback_mm?;
    let built = built_mm.map_or_else(String::new, |mm| format!("; as built {}", unit.words(mm)));
    Some(format!(
        "String {}: ideal {}, 90 % from {} to {}{built}.",
        string.string,
        unit.words(band.nominal),
        unit.figure(band.p05),
        unit.words(band.p95),
    ))
}
