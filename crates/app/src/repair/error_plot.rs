//! Measured against predicted errors, with the band of what the readings leave open and the effect of a remedy.

use crestline_plan::{Diagnosis, Plan, Remedy};
use eframe::egui::{Color32, Response, RichText, Ui, WidgetInfo, accesskit};
use egui_plot::{FilledArea, Line, LineStyle, PlotBounds, PlotPoints, PlotUi, Points};

use super::notes::{Note, StringNotes, notes};
use crate::results::error_plot::{frame, fret_plot};
use crate::results::figures::{cents, fixed};
use crate::results::hover;
use crate::theme::{Palette, marker, size};
use crate::units::{LengthUnit, in_unit};

/// The least height of the plot's scale, cents to either side.
const LEAST_CENTS: f64 = 4.0;
/// Half the height of a band in standard deviations.
const BAND: f64 = 2.0;

/// What the plot shows.
pub struct Shown<'a> {
    /// The plan that was diagnosed.
    pub plan: &'a Plan,
    /// What was found.
    pub diagnosis: &'a Diagnosis,
    /// The chosen string, 0 first.
    pub chosen: usize,
    /// The remedy whose effect is shown.
    pub remedy: Option<&'a Remedy>,
}

/// Which strings, and what the marks mean.
pub fn choices(ui: &mut Ui, palette: &Palette, shown: &Shown<'_>, all: &mut bool) -> Option<usize> {
    let mut chosen = None;
    ui.horizontal_wrapped(|ui| {
        let choice = |ui: &mut Ui, is_chosen: bool, text: RichText, name: String| {
            let response = ui.selectable_label(is_chosen, text);
            response
                .widget_info(|| WidgetInfo::selected(accesskit::Role::RadioButton, true, is_chosen, &name));
            response.clicked()
        };
        ui.label("String");
        for string in 0..shown.plan.strings.len() {
            let is_chosen = !*all && string == shown.chosen;
            let text = RichText::new((string + 1).to_string()).color(palette.string(string)).strong();
            if choice(ui, is_chosen, text, format!("Plot string {}", string + 1)) {
                *all = false;
                chosen = Some(string);
            }
        }
        if choice(ui, *all, RichText::new("all"), "Plot all strings".to_owned()) {
            *all = true;
        }
    });
    let words = "● read   ╌╌ found   ▒ ±2 standard deviations   ── after the job";
    ui.label(RichText::new(words).small().color(palette.quiet));
    chosen
}

/// The plot, as high as given.
pub fn show(ui: &mut Ui, palette: &'static Palette, shown: &Shown<'_>, all: bool, height: f32) {
    let strings = notes(shown.diagnosis, shown.remedy);
    let drawn: Vec<&StringNotes> =
        strings.iter().filter(|notes| all || notes.string == shown.chosen).collect();
    if drawn.is_empty() {
        let words = format!("String {} has no fretted reading.", shown.chosen + 1);
        ui.label(RichText::new(words).color(palette.quiet));
        return;
    }
    let bounds = bounds(shown.plan, &drawn);
    let plot = fret_plot("measured and predicted errors", palette).height(height);
    let plot = plot.allow_drag(false).allow_zoom(false);
    let painted = plot.show(ui, |plot| {
        plot.set_plot_bounds(bounds);
        frame(plot, palette, shown.plan.fit.frets, &bounds);
        for notes in &drawn {
            draw(plot, palette, notes, !all);
        }
    });
    if let Some(words) = far_words(&drawn) {
        ui.label(RichText::new(words).small().color(palette.caution));
    }
    let frets = shown.plan.instrument.frets as usize;
    let fret = hover::fret(&painted.response, &painted.transform, frets);
    let response = tip(painted.response, palette, &drawn, fret);
    let name = words(&drawn, shown.remedy, LengthUnit::of(ui.ctx()));
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::Image, true, &name));
}

fn draw(plot: &mut PlotUi<'_>, palette: &Palette, string: &StringNotes, is_alone: bool) {
    let colour: Color32 = palette.string(string.string);
    let line = |of: &dyn Fn(&Note) -> Option<f64>| -> PlotPoints<'static> {
        string.notes.iter().filter_map(|note| Some([f64::from(note.fret), of(note)?])).collect()
    };
    if is_alone {
        let frets: Vec<f64> = string.notes.iter().map(|note| f64::from(note.fret)).collect();
        let edge = |side: f64| -> Vec<f64> {
            string.notes.iter().map(|note| note.predicted_cents + side * BAND * note.sd_cents).collect()
        };
        let area = FilledArea::new("", &frets, &edge(-1.0), &edge(1.0));
        plot.add(area.fill_color(colour.gamma_multiply(0.22)).allow_hover(false));
    }
    let predicted = Line::new("", line(&|note| Some(note.predicted_cents))).color(colour).allow_hover(false);
    plot.line(predicted.width(1.4).style(LineStyle::Dashed { length: 7.0 }));
    let after = line(&|note| note.after_cents);
    plot.line(Line::new("", after).color(colour).width(2.6).allow_hover(false));
    let read: Vec<[f64; 2]> = string
        .notes
        .iter()
        .flat_map(|note| note.measured_cents.iter().map(|cents| [f64::from(note.fret), *cents]))
        .collect();
    let radius = if is_alone { 4.2 } else { 3.2 };
    plot.points(
        Points::new("", read).shape(marker(string.string)).color(colour).radius(radius).allow_hover(false),
    );
}

/// Whether a reading lies so far from what is found that it would flatten everything else.
fn is_far(note: &Note, cents: f64) -> bool {
    const FAR_CENTS: f64 = 40.0;
    (cents - note.predicted_cents).abs() > FAR_CENTS
}

/// Readings that the plot leaves out, in words.
fn far_words(strings: &[&StringNotes]) -> Option<String> {
    let far = |string: &StringNotes, note: &Note, value: &f64| {
        is_far(note, *value)
            .then(|| format!("string {}, fret {}: {}", string.string + 1, note.fret, cents(*value)))
    };
    let all: Vec<String> = strings
        .iter()
        .flat_map(|string| string.notes.iter().map(move |note| (string, note)))
        .flat_map(|(string, note)| {
            note.measured_cents.iter().filter_map(move |value| far(string, note, value))
        })
        .collect();
    (!all.is_empty()).then(|| format!("Read far beyond the plot: {}.", all.join("; ")))
}

/// Everything that is drawn with some air, and at least a few cents to either side.
fn bounds(plan: &Plan, strings: &[&StringNotes]) -> PlotBounds {
    let of = |note: &Note| {
        let band = BAND * note.sd_cents;
        let mut all = note.measured_cents.clone();
        all.retain(|cents| !is_far(note, *cents));
        all.extend([note.predicted_cents - band, note.predicted_cents + band]);
        all.extend(note.after_cents);
        all
    };
    let all = strings.iter().flat_map(|string| &string.notes).flat_map(of);
    let (low, high) = all.fold((-LEAST_CENTS, LEAST_CENTS), |(low, high), v| (low.min(v), high.max(v)));
    let last = strings.iter().flat_map(|string| &string.notes).map(|note| note.fret).max();
    let last = last.unwrap_or(plan.instrument.frets).max(12);
    let air = 0.06 * (high - low);
    PlotBounds::from_min_max([0.4, low - air], [f64::from(last) + 0.6, high + air])
}

/// The figures at the fret under the pointer, of one string only: of many they would fill the window.
fn tip(response: Response, palette: &Palette, strings: &[&StringNotes], fret: Option<usize>) -> Response {
    let [string] = strings else { return response };
    let note = string.notes.iter().find(|note| Some(note.fret as usize) == fret);
    let Some(note) = note else { return response };
    let mut lines: Vec<(&str, f64)> = note.measured_cents.iter().map(|cents| ("read", *cents)).collect();
    lines.push(("found", note.predicted_cents));
    lines.push(("standard deviation", note.sd_cents));
    lines.extend(note.after_cents.map(|after| ("after the job", after)));
    hover::tip(response, palette, &format!("String {}, fret {}, cents", string.string + 1, note.fret), &lines)
}

fn words(strings: &[&StringNotes], remedy: Option<&Remedy>, unit: LengthUnit) -> String {
    let mut text =
        "Errors of the fretted notes in cents, read and as the instrument found predicts them.".to_owned();
    if let Some(remedy) = remedy {
        text.push_str(&format!(" After this job: {}", in_unit(&remedy.text, unit)));
    }
    for string in strings {
        text.push_str(&format!(" String {}.", string.string + 1));
        for note in &string.notes {
            let read: Vec<String> = note.measured_cents.iter().map(|value| cents(*value)).collect();
            let after = note.after_cents.map(|value| format!(", then {}", cents(value))).unwrap_or_default();
            text.push_str(&format!(
                " Fret {}: read {}, found {} ± {}{after}.",
                note.fret,
                read.join(" and "),
                cents(note.predicted_cents),
                fixed(note.sd_cents, 1)
            ));
        }
    }
    text
}

/// Height of a plot in a page of this height, points.
#[must_use]
pub fn usual_height(room: f32) -> f32 {
    (0.36 * room).clamp(190.0, 420.0) - size::WIDE_GAP
}
