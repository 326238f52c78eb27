//! What stands under the pointer in a plot, in words.

use crestline_plan::StringReport;
use eframe::egui::{Response, RichText, Ui};
use egui_plot::{PlotPoint, PlotTransform};

use super::figures::cents;
use crate::bands::on_plots::OnPlots;
use crate::edit::desk::Outcome;
use crate::theme::Palette;
use crate::units::LengthUnit;

/// The place under the pointer, if it is over the plot.
fn place(response: &Response, transform: &PlotTransform) -> Option<PlotPoint> {
    response.hover_pos().map(|at| transform.value_from_position(at))
}

/// The fret under the pointer, if there is one.
pub fn fret(response: &Response, transform: &PlotTransform, frets: usize) -> Option<usize> {
    let x = place(response, transform)?.x.round();
    (x >= 1.0 && x <= frets as f64).then_some(x as usize)
}

/// The errors of the chosen string at the fret under the pointer, with their band where there is one.
pub fn errors(
    response: Response,
    transform: &PlotTransform,
    palette: &Palette,
    string: Option<&StringReport>,
    bands: Option<&OnPlots>,
) -> Response {
    let note = string.and_then(|s| s.frets.get(fret(&response, transform, s.frets.len())? - 1));
    let (Some(string), Some(note)) = (string, note) else { return response };
    let mut lines =
        vec![("no setback", note.none_cents), ("ideal", note.ideal_cents), ("built", note.built_cents)];
    lines.extend(note.as_built_cents.map(|now| ("as it is now", now)));
    let band = bands.and_then(|b| b.error_cents(string.string as usize - 1, note.fret as usize - 1));
    if let Some([low, high]) = band {
        lines.extend([("built, 90 % from", low), ("to", high)]);
    }
    tip(response, palette, &format!("String {}, fret {}, cents", string.string, note.fret), &lines)
}

/// The parts of the error of the chosen string at the fret under the pointer.
pub fn parts(
    response: Response,
    transform: &PlotTransform,
    palette: &Palette,
    string: &StringReport,
) -> Response {
    let note = fret(&response, transform, string.frets.len()).and_then(|fret| string.frets.get(fret - 1));
    let Some(note) = note else { return response };
    let lines = [
        ("length", note.length_cents),
        ("tension", note.tension_cents),
        ("mass", note.mass_cents),
        ("stiffness", note.stiffness_cents),
        ("sum", note.none_cents),
    ];
    tip(response, palette, &format!("String {}, fret {}, cents", string.string, note.fret), &lines)
}

/// Shows lines of names and cents under a title where the pointer is.
pub fn tip(response: Response, palette: &Palette, title: &str, lines: &[(&str, f64)]) -> Response {
    response.on_hover_ui_at_pointer(|ui| {
        ui.label(RichText::new(title).strong());
        for (name, value) in lines {
            pair(ui, palette, name, &cents(*value));
        }
    })
}

/// The crest of the string nearest the pointer.
pub fn crest(
    response: Response,
    transform: &PlotTransform,
    palette: &Palette,
    outcome: &Outcome,
) -> Response {
    let Some(at) = place(&response, transform) else { return response };
    let layout = &outcome.solution.layout;
    let apart =
        |index: usize| layout.strings.get(index).map_or(f64::INFINITY, |line| (line.crest.y - at.y).abs());
    let strings = &outcome.solution.report.strings;
    let nearest = (0..strings.len()).min_by(|a, b| apart(*a).total_cmp(&apart(*b)));
    let Some(string) = nearest.and_then(|index| strings.get(index)) else { return response };
    let built = &string.built;
    response.on_hover_ui_at_pointer(|ui| {
        let unit = LengthUnit::of(ui.ctx());
        let figure = |length_mm| unit.figure(length_mm);
        let title = unit.named(&format!("String {}", string.string));
        ui.label(RichText::new(title).strong());
        pair(ui, palette, "built setback", &figure(built.saddle_setback_mm));
        pair(ui, palette, "ideal setback", &figure(string.ideal.saddle_setback_mm));
        pair(ui, palette, "crest from the datum", &figure(built.crest_mm.x - layout.datum_x_mm));
        pair(ui, palette, "crest across", &figure(built.crest_mm.y));
        pair(ui, palette, "crest height", &figure(built.crest_mm.z));
        if let Some(offset) = built.slot_offset_mm {
            pair(ui, palette, "from the slot's centre line", &figure(offset));
        }
    })
}

fn pair(ui: &mut Ui, palette: &Palette, name: &str, value: &str) {
    ui.horizontal(|ui| {
        ui.label(RichText::new(name).color(palette.quiet));
        ui.label(value);
    });
}
