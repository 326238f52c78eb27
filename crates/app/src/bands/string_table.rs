//! The setbacks with their bands and the chances, a line a string.

use std::borrow::Cow;

use crestline_plan::{Band, StringUncertainty, Uncertainty};
use eframe::egui::{RichText, Ui};

use super::headline::per_cent;
use crate::fields::parse;
use crate::results::figures::fixed;
use crate::results::table::{self, Cell, Column, Row};
use crate::theme::Palette;
use crate::units::LengthUnit;

/// The least width in which the figures stand apart, points.
const LEAST_WIDTH: f32 = 590.0;

/// The table; says which string has been clicked.
pub fn show(ui: &mut Ui, palette: &Palette, uncertainty: &Uncertainty, chosen: usize) -> Option<usize> {
    let unit = LengthUnit::of(ui.ctx());
    ui.label(RichText::new("Ideal setbacks with their bands").heading());
    let words = format!(
        "{}. Nine of ten instruments lie from the lower to the upper end. sd: standard deviation of the sample, and to \
         first order as a check of it.",
        unit.named("Setbacks of the crest")
    );
    ui.label(RichText::new(words).small().color(palette.quiet));
    let has_nut = uncertainty.strings.iter().any(|string| string.nut_setback_mm.is_some());
    let columns = columns(uncertainty, has_nut);
    let rows: Vec<Row> =
        uncertainty.strings.iter().map(|string| row(&columns, string, has_nut, unit)).collect();
    table::sideways(ui, "bands", LEAST_WIDTH, |ui| table::show(ui, palette, &columns, &rows, chosen))
}

fn columns(uncertainty: &Uncertainty, has_nut: bool) -> Vec<Column> {
    let column = |head: Cow<'static, str>| Column::figures(head, 1.0);
    let mut columns = vec![
        Column::words("String", 1.1),
        column("Ideal\nsetback".into()),
        column("90 % from".into()),
        column("to".into()),
        column("± sd\nsample".into()),
        column("± sd first\norder".into()),
    ];
    if has_nut {
        columns.extend([column("Ideal nut\nsetback".into()), column("± sd\nsample".into())]);
    }
    let limit = parse::shown(uncertainty.limit_cents);
    columns.push(Column::figures(format!("Within {limit}\ncents, %"), 1.1));
    columns.push(Column::figures("at the fit's\nfrets, %", 1.1));
    columns
}

fn row(columns: &[Column], string: &StringUncertainty, has_nut: bool, unit: LengthUnit) -> Row {
    let figure = |band: Option<Band>, of: fn(&Band) -> f64| {
        band.as_ref().map_or_else(|| "—".to_owned(), |band| unit.figure(of(band)))
    };
    let fine = |band: Option<Band>, of: fn(&Band) -> f64| {
        band.as_ref().map_or_else(|| "—".to_owned(), |band| spread(of(band), unit))
    };
    let (saddle, nut) = (string.saddle_setback_mm, string.nut_setback_mm);
    let number = string.string.to_string();
    let mut texts = vec![
        if string.name == number || string.name.is_empty() {
            number
        } else {
            format!("{number} {}", string.name)
        },
        figure(saddle, |band| band.nominal),
        figure(saddle, |band| band.p05),
        figure(saddle, |band| band.p95),
        fine(saddle, |band| band.sd),
        fine(saddle, |band| band.first_order_sd),
    ];
    if has_nut {
        texts.extend([figure(nut, |band| band.nominal), fine(nut, |band| band.sd)]);
    }
    texts.extend([per_cent(string.chance_within), per_cent(string.chance_within_fit)]);
    let said =
        columns.iter().zip(&texts).map(|(column, text)| format!("{} {text}", column.head.replace('\n', " ")));
    let words = said.collect::<Vec<_>>().join(", ");
    Row { cells: texts.into_iter().map(Cell::plain).collect(), words }
}

/// A standard deviation, a digit finer than lengths are shown.
fn spread(sd_mm: f64, unit: LengthUnit) -> String {
    match unit {
        LengthUnit::Millimetres => fixed(sd_mm, 3),
        LengthUnit::Inches => fixed(unit.from_mm(sd_mm), 4),
    }
}
