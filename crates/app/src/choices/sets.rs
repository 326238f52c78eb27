//! What the common saddle leaves of the errors of every set of strings.

use crestline_plan::{SetReport, SetStringReport};
use eframe::egui::{Grid, Label, RichText, ScrollArea, Ui, WidgetInfo, accesskit};

use crate::fields::parse;
use crate::results::figures::{fixed, newtons};
use crate::theme::Palette;

/// The part of the page; nothing where the plan names no alternatives.
pub fn show(ui: &mut Ui, palette: &Palette, sets: &[SetReport]) {
    let Some(first) = sets.first() else { return };
    ui.label(RichText::new("What the common saddle leaves of each set's errors, cents").heading());
    let words = "Root mean square / largest error with saddle and nut as built, over the frets of the fit. Where the \
                 pointer rests on a string: what it would keep with setbacks of its own.";
    ui.add(Label::new(RichText::new(words).small().color(palette.quiet)).wrap());
    ScrollArea::horizontal().id_salt("sets").auto_shrink([false, true]).show(ui, |ui| {
        Grid::new("sets").striped(true).spacing([12.0, 3.0]).show(ui, |ui| {
            let heads = ["Set", "Weight", "Pull, N", "All strings"].map(str::to_owned);
            let strings = first.strings.iter().map(|string| format!("String {}", string.string));
            for head in heads.into_iter().chain(strings) {
                ui.label(RichText::new(head).small().color(palette.quiet));
            }
            ui.end_row();
            for (index, set) in sets.iter().enumerate() {
                row(ui, set, index == 0);
                ui.end_row();
            }
        });
    });
}

fn row(ui: &mut Ui, set: &SetReport, is_own: bool) {
    let name = if is_own { "The plan's own strings" } else { &set.name };
    let response = ui.label(RichText::new(name).strong());
    let words = in_words(name, set);
    response.widget_info(|| WidgetInfo::labeled(accesskit::Role::RowHeader, true, &words));
    ui.label(parse::shown(set.weight));
    ui.label(newtons(set.total_tension_n));
    ui.label(RichText::new(pair(set.rms_cents, set.max_cents)).strong());
    for string in &set.strings {
        let ideal = &string.ideal;
        let alone = format!("With setbacks of its own: {}", pair(ideal.rms_cents, ideal.max_cents));
        let built = &string.built;
        ui.label(pair(built.rms_cents, built.max_cents)).on_hover_text(alone);
    }
}

fn pair(rms_cents: f64, max_cents: f64) -> String {
    format!("{} / {}", fixed(rms_cents, 2), fixed(max_cents, 1))
}

fn in_words(name: &str, set: &SetReport) -> String {
    let string = |string: &SetStringReport| {
        let (built, ideal) = (&string.built, &string.ideal);
        format!(
            " String {}: {}, largest {}, with setbacks of its own {}.",
            string.string,
            fixed(built.rms_cents, 2),
            fixed(built.max_cents, 1),
            fixed(ideal.rms_cents, 2),
        )
    };
    let strings: String = set.strings.iter().map(string).collect();
    format!(
        "{name}: weight {}, root mean square {} cents, largest {}.{strings}",
        parse::shown(set.weight),
        fixed(set.rms_cents, 2),
        fixed(set.max_cents, 1),
    )
}
