//! What is held probable before anything is read: standard deviations that can be changed.

use crestline_plan::Priors;
use eframe::egui::{Button, Grid, Label, RichText, Ui};

use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::parse;
use crate::fields::row::fault_line;

/// Stands for the window's unit of lengths.
const LENGTH: &str = "mm";

/// Room in which two fields stand side by side, points.
const TWO_ABREAST: f32 = 620.0;

/// One of them.
struct Prior {
    key: &'static str,
    name: &'static str,
    unit: &'static str,
    step: f64,
    help: &'static str,
    of: fn(&mut Priors) -> &mut f64,
}

const PRIORS: [Prior; 12] = [
    Prior {
        key: "crest_mm",
        name: "Crest, not measured",
        unit: LENGTH,
        step: 0.1,
        help: "How far a crest may lie from where its string wants it, where the plan does not say where it is.",
        of: |priors| &mut priors.crest_mm,
    },
    Prior {
        key: "measured_crest_mm",
        name: "Crest, measured",
        unit: LENGTH,
        step: 0.05,
        help: "How far a crest may lie from where the plan says that it is.",
        of: |priors| &mut priors.measured_crest_mm,
    },
    Prior {
        key: "nut_mm",
        name: "Nut edge",
        unit: LENGTH,
        step: 0.05,
        help: "How far a nut edge may lie from its place.",
        of: |priors| &mut priors.nut_mm,
    },
    Prior {
        key: "slot_mm",
        name: "Height over fret 1",
        unit: LENGTH,
        step: 0.01,
        help: "How far the string's height over fret 1 may differ from the plan's.",
        of: |priors| &mut priors.slot_mm,
    },
    Prior {
        key: "action_mm",
        name: "Action at fret 12",
        unit: LENGTH,
        step: 0.05,
        help: "How far the action may differ from the plan's.",
        of: |priors| &mut priors.action_mm,
    },
    Prior {
        key: "relief_mm",
        name: "Relief",
        unit: LENGTH,
        step: 0.01,
        help: "How far the relief may differ from the plan's.",
        of: |priors| &mut priors.relief_mm,
    },
    Prior {
        key: "fret_mm",
        name: "Place of a fret",
        unit: LENGTH,
        step: 0.01,
        help: "How far a fret may lie from its place.",
        of: |priors| &mut priors.fret_mm,
    },
    Prior {
        key: "press_factor",
        name: "Press depth, times or by",
        unit: "",
        step: 0.1,
        help: "By what factor the press depth may be more or less than the plan's.",
        of: |priors| &mut priors.press_factor,
    },
    Prior {
        key: "axial_fraction",
        name: "Axial stiffness",
        unit: "of 1",
        step: 0.01,
        help: "How far a string's axial stiffness may differ from the computed one, as a fraction of it.",
        of: |priors| &mut priors.axial_fraction,
    },
    Prior {
        key: "bending_fraction",
        name: "Bending stiffness",
        unit: "of 1",
        step: 0.01,
        help: "How far a string's bending stiffness may differ from the computed one, as a fraction of it. It stands \
               for the end fixities too.",
        of: |priors| &mut priors.bending_fraction,
    },
    Prior {
        key: "tuning_cents",
        name: "Tuning of open strings",
        unit: "cents",
        step: 0.5,
        help: "How exactly the open strings were tuned before the others were read.",
        of: |priors| &mut priors.tuning_cents,
    },
    Prior {
        key: "reading_cents",
        name: "Noise of a reading",
        unit: "cents",
        step: 0.1,
        help: "How far readings of the same note differ from each other.",
        of: |priors| &mut priors.reading_cents,
    },
];

/// The group: its heading folds it away.
pub fn show(ui: &mut Ui, form: &mut Form, priors: &mut Priors, is_open: &mut bool) {
    let usual = *priors == Priors::default();
    ui.horizontal_wrapped(|ui| {
        let sign = if *is_open { "▾" } else { "▸" };
        let name = "What is held probable before reading";
        let response = ui.add(Button::new(RichText::new(format!("{sign}  {name}")).strong()));
        let open = *is_open;
        response.ctx.accesskit_node_builder(response.id, |node| {
            node.set_label(name);
            node.set_expanded(open);
        });
        if response.clicked() {
            *is_open = !*is_open;
        }
        let restore = ui.add_enabled(!usual, Button::new("Restore the usual values"));
        if restore.clicked() {
            *priors = Priors::default();
            for prior in PRIORS {
                form.drafts.forget(&path(&prior));
            }
        }
        let state = if usual { "as usual" } else { "changed" };
        ui.label(RichText::new(state).small().color(form.palette.quiet));
    });
    if *is_open {
        fields(ui, form, priors);
    }
}

fn fields(ui: &mut Ui, form: &mut Form, priors: &mut Priors) {
    let words = "One standard deviation each. They belong to this sitting and are not saved with the plan.";
    ui.add(Label::new(RichText::new(words).small().color(form.palette.quiet)).wrap());
    let abreast = if ui.available_width() >= TWO_ABREAST { 2 } else { 1 };
    Grid::new("priors").spacing([10.0, 4.0]).show(ui, |ui| {
        for line in PRIORS.chunks(abreast) {
            for prior in line {
                field(ui, form, prior, priors);
            }
            ui.end_row();
        }
    });
    for prior in &PRIORS {
        if let Some(error) = form.error(&path(prior)) {
            fault_line(ui, form, &format!("{}: {error}", prior.name));
        }
    }
}

fn path(prior: &Prior) -> String {
    format!("priors.{}", prior.key)
}

fn field(ui: &mut Ui, form: &mut Form, prior: &Prior, priors: &mut Priors) {
    ui.label(prior.name);
    let named = format!("Standard deviation: {}", prior.name);
    let before = *priors;
    let check = |value: f64| {
        let mut tried = before;
        *(prior.of)(&mut tried) = value;
        tried.check().map_err(|error| error.to_string())
    };
    let value = (prior.of)(priors);
    let sign = if prior.unit == LENGTH {
        let spec = Spec::new(path(prior), named, prior.step, prior.help);
        number::length_if(ui, form, &spec, value, check);
        form.unit.sign()
    } else {
        let unit = if prior.unit.is_empty() { String::new() } else { format!(", {}", prior.unit) };
        let spec = Spec::new(path(prior), format!("{named}{unit}"), prior.step, prior.help);
        let read = |text: &str| {
            let value = parse::number(text)?;
            check(value).map(|()| value)
        };
        number::typed(ui, form, &spec, &parse::shown(*value), read, |new| *value = new);
        prior.unit
    };
    ui.label(RichText::new(sign).color(form.palette.quiet));
}
