//! The fields for the tolerances: what each is, where the plan has it, and what it means.

use crestline_plan::{OwnTolerance, Plan, StringTolerance, Tolerances};
use eframe::egui::{Grid, RichText, ScrollArea, Ui};

use crate::fields::form::Form;
use crate::fields::number::{self, Spec};
use crate::fields::row::{faults, unit};
use crate::theme::size;

/// What a standard deviation is counted in.
#[derive(Clone, Copy, PartialEq)]
pub enum Measure {
    /// A length, in the unit of the window.
    Length,
    /// A share of the value.
    Share,
    /// A part of a range from 0 to 1.
    Part,
    /// Cents.
    Cents,
}

impl Measure {
    fn sign(self, form: &Form) -> &'static str {
        match self {
            Self::Length => form.unit.sign(),
            Self::Share => "of it",
            Self::Part => "of 1",
            Self::Cents => "cents",
        }
    }
}

/// A standard deviation that all strings share.
struct Shared {
    path: &'static str,
    name: &'static str,
    measure: Measure,
    step: f64,
    help: &'static str,
    of: fn(&mut Tolerances) -> &mut f64,
}

/// A standard deviation of a kind of string.
pub struct OfKind {
    key: &'static str,
    /// What it is of.
    pub name: &'static str,
    /// What it is counted in.
    pub measure: Measure,
    step: f64,
    help: &'static str,
    of: fn(&mut StringTolerance) -> &mut f64,
    /// A string's own.
    pub own: fn(&OwnTolerance) -> Option<f64>,
}

const SHARED: [Shared; 13] = [
    Shared {
        path: "reference_cents",
        name: "Pitch of A4",
        measure: Measure::Cents,
        step: 0.5,
        help: "How far the pitch to which the instrument is tuned may lie from the plan's.",
        of: |t| &mut t.reference_cents,
    },
    Shared {
        path: "neck.relief_mm",
        name: "Relief",
        measure: Measure::Length,
        step: 0.01,
        help: "How far the relief may differ from the plan's.",
        of: |t| &mut t.neck.relief_mm,
    },
    Shared {
        path: "neck.scale_mm",
        name: "Scale",
        measure: Measure::Length,
        step: 0.05,
        help: "How far the scale that the frets are laid out to may differ from the plan's.",
        of: |t| &mut t.neck.scale_mm,
    },
    Shared {
        path: "neck.fret_mm",
        name: "Place of a fret",
        measure: Measure::Length,
        step: 0.01,
        help: "How far each crown may lie from its place, every fret by itself.",
        of: |t| &mut t.neck.fret_mm,
    },
    Shared {
        path: "pressing.finger_fraction",
        name: "Place of the finger",
        measure: Measure::Part,
        step: 0.01,
        help: "How far the finger's place may differ, as a part of the space between two frets.",
        of: |t| &mut t.pressing.finger_fraction,
    },
    Shared {
        path: "pressing.depth_fraction",
        name: "Press depth",
        measure: Measure::Share,
        step: 0.05,
        help: "How far the press depth may differ, as a share of it.",
        of: |t| &mut t.pressing.depth_fraction,
    },
    Shared {
        path: "supports.nut",
        name: "Fixity at the nut",
        measure: Measure::Part,
        step: 0.01,
        help: "How far the nut's fixity, 0 to 1, may differ.",
        of: |t| &mut t.supports.nut,
    },
    Shared {
        path: "supports.fret",
        name: "Fixity at the fret",
        measure: Measure::Part,
        step: 0.01,
        help: "How far the frets' fixity, 0 to 1, may differ.",
        of: |t| &mut t.supports.fret,
    },
    Shared {
        path: "supports.saddle",
        name: "Fixity at the saddle",
        measure: Measure::Part,
        step: 0.01,
        help: "How far the saddle's fixity, 0 to 1, may differ.",
        of: |t| &mut t.supports.saddle,
    },
    Shared {
        path: "slip.head",
        name: "Slip over the nut",
        measure: Measure::Part,
        step: 0.05,
        help: "How far the slip over the nut, 0 to 1, may differ.",
        of: |t| &mut t.slip.head,
    },
    Shared {
        path: "slip.tail",
        name: "Slip over the saddle",
        measure: Measure::Part,
        step: 0.05,
        help: "How far the slip over the saddle, 0 to 1, may differ.",
        of: |t| &mut t.slip.tail,
    },
    Shared {
        path: "making.crest_mm",
        name: "Crest as made",
        measure: Measure::Length,
        step: 0.01,
        help: "How far a crest comes to stand from its line: your own hand.",
        of: |t| &mut t.making.crest_mm,
    },
    Shared {
        path: "making.nut_edge_mm",
        name: "Nut edge as made",
        measure: Measure::Length,
        step: 0.01,
        help: "How far a nut edge comes to stand from its line: your own hand.",
        of: |t| &mut t.making.nut_edge_mm,
    },
];

/// The standard deviations of a kind of string.
pub const OF_KIND: [OfKind; 8] = [
    OfKind {
        key: "core_diameter_mm",
        name: "Core diameter",
        measure: Measure::Length,
        step: 0.001,
        help: "How far the core's diameter may differ from the plan's.",
        of: |t| &mut t.core_diameter_mm,
        own: |own| own.core_diameter_mm,
    },
    OfKind {
        key: "modulus_fraction",
        name: "Modulus",
        measure: Measure::Share,
        step: 0.01,
        help: "How far the modulus at pitch may differ, as a share of it.",
        of: |t| &mut t.modulus_fraction,
        own: |own| own.modulus_fraction,
    },
    OfKind {
        key: "mass_fraction",
        name: "Unit mass, computed",
        measure: Measure::Share,
        step: 0.005,
        help: "How far the computed mass per length may differ, beside what the core's diameter brings, as a share of it.",
        of: |t| &mut t.mass_fraction,
        own: |own| own.mass_fraction,
    },
    OfKind {
        key: "measured_mass_fraction",
        name: "Unit mass, measured",
        measure: Measure::Share,
        step: 0.005,
        help: "The same where the plan has a measured mass per length.",
        of: |t| &mut t.measured_mass_fraction,
        own: |own| own.measured_mass_fraction,
    },
    OfKind {
        key: "measured_stiffness_fraction",
        name: "Stiffness, measured",
        measure: Measure::Share,
        step: 0.01,
        help: "How far a measured axial or bending stiffness may differ, as a share of it.",
        of: |t| &mut t.measured_stiffness_fraction,
        own: |own| own.measured_stiffness_fraction,
    },
    OfKind {
        key: "pitch_cents",
        name: "Pitch",
        measure: Measure::Cents,
        step: 0.5,
        help: "How far the open string may be out of tune while it is played.",
        of: |t| &mut t.pitch_cents,
        own: |own| own.pitch_cents,
    },
    OfKind {
        key: "action_first_mm",
        name: "Action over fret 1",
        measure: Measure::Length,
        step: 0.01,
        help: "How far the gap over fret 1 may differ from the plan's.",
        of: |t| &mut t.action_first_mm,
        own: |own| own.action_first_mm,
    },
    OfKind {
        key: "action_twelfth_mm",
        name: "Action over fret 12",
        measure: Measure::Length,
        step: 0.01,
        help: "How far the gap over fret 12 may differ from the plan's.",
        of: |t| &mut t.action_twelfth_mm,
        own: |own| own.action_twelfth_mm,
    },
];

/// Where the plan has the standard deviations of a kind.
type Kind = fn(&mut Tolerances) -> &mut StringTolerance;

/// The kinds of string: key, head of the column, and words.
const KINDS: [(&str, &str, &str, Kind); 3] = [
    ("plain", "plain", "plain strings", |t| &mut t.plain),
    ("wound", "wound", "wound strings", |t| &mut t.wound),
    ("polymer", "polymer", "polymer strings", |t| &mut t.polymer),
];

/// Lets fields edit the plan's tolerances, or the usual ones where it has none: they come into the plan as soon as one
/// of them is changed.
pub fn edit(plan: &mut Plan, fields: impl FnOnce(&mut Tolerances)) {
    let before = plan.tolerances.clone().unwrap_or_default();
    let mut tolerances = before.clone();
    fields(&mut tolerances);
    if tolerances != before {
        plan.tolerances = Some(tolerances);
    }
}

/// The limit for the chance, and how the sample is drawn.
pub fn sample(ui: &mut Ui, form: &mut Form, plan: &mut Plan) {
    edit(plan, |tolerances| {
        if ui.available_width() >= IN_A_ROW {
            ui.horizontal(|ui| {
                limit(ui, form, tolerances);
                ui.add_space(size::GAP);
                draws(ui, form, tolerances);
                ui.add_space(size::GAP);
                seed(ui, form, tolerances);
            });
        } else {
            ui.horizontal(|ui| limit(ui, form, tolerances));
            ui.horizontal(|ui| draws(ui, form, tolerances));
            ui.horizontal(|ui| seed(ui, form, tolerances));
        }
    });
    faults(ui, form, &["tolerances.limit_cents", "tolerances.samples", "tolerances.seed"]);
}

fn limit(ui: &mut Ui, form: &mut Form, tolerances: &mut Tolerances) {
    ui.label("Limit");
    let help = "How far from true a note may be and still count as in tune.";
    let limit = Spec::new("tolerances.limit_cents", "Limit, cents", 0.5, help).width(NARROW);
    number::number(ui, form, &limit, &mut tolerances.limit_cents);
    unit(ui, form, "cents");
}

fn draws(ui: &mut Ui, form: &mut Form, tolerances: &mut Tolerances) {
    ui.label("Instruments");
    let help = "How many instruments are drawn: four times as many halve the sample's own scatter.";
    let samples = Spec::new("tolerances.samples", "Number of instruments", 64.0, help).width(NARROW);
    number::whole(ui, form, &samples, &mut tolerances.samples);
}

fn seed(ui: &mut Ui, form: &mut Form, tolerances: &mut Tolerances) {
    ui.label("Seed");
    let help = "The same seed draws the same instruments on every machine.";
    let seed = Spec::new("tolerances.seed", "Seed of the draws", 1.0, help).width(NARROW);
    number::whole(ui, form, &seed, &mut tolerances.seed);
}

/// Room in which the three fields of the sample stand in one row, points.
const IN_A_ROW: f32 = 430.0;
/// Width of a field in a table.
const NARROW: f32 = 60.0;
/// Least width of a column: a field, which would else be cut to what a table gives it, and its margins.
const COLUMN: f32 = NARROW + 10.0;
/// Room in which two shared fields stand side by side, points.
const TWO_ABREAST: f32 = 560.0;

/// The standard deviations that all strings share.
pub fn shared(ui: &mut Ui, form: &mut Form, tolerances: &mut Tolerances) {
    let abreast = if ui.available_width() >= TWO_ABREAST { 2 } else { 1 };
    Grid::new("shared tolerances").min_col_width(COLUMN).spacing([10.0, 4.0]).show(ui, |ui| {
        for line in SHARED.chunks(abreast) {
            for shared in line {
                ui.label(shared.name);
                let path = format!("tolerances.{}", shared.path);
                let name = format!("Standard deviation: {}", shared.name);
                let spec = Spec::new(path, name, shared.step, shared.help).width(NARROW);
                field(ui, form, spec, shared.measure, (shared.of)(tolerances));
                unit(ui, form, shared.measure.sign(form));
            }
            ui.end_row();
        }
    });
    for shared in &SHARED {
        faults(ui, form, &[&format!("tolerances.{}", shared.path)]);
    }
}

/// The standard deviations of the kinds of string.
pub fn of_kinds(ui: &mut Ui, form: &mut Form, tolerances: &mut Tolerances) {
    ScrollArea::horizontal().id_salt("kinds of string").auto_shrink([false, true]).show(ui, |ui| {
        Grid::new("tolerances of strings").min_col_width(COLUMN).spacing([10.0, 4.0]).show(ui, |ui| {
            ui.label("");
            for (_, head, ..) in KINDS {
                ui.label(RichText::new(head).small().color(form.palette.quiet));
            }
            ui.end_row();
            for row in &OF_KIND {
                ui.label(row.name);
                for (key, _, words, kind) in KINDS {
                    let path = format!("tolerances.{key}.{}", row.key);
                    let name = format!("Standard deviation, {words}: {}", row.name);
                    let spec = Spec::new(path, name, row.step, row.help).width(NARROW);
                    field(ui, form, spec, row.measure, (row.of)(kind(tolerances)));
                }
                unit(ui, form, row.measure.sign(form));
                ui.end_row();
            }
        });
    });
    for (key, ..) in KINDS {
        faults(ui, form, &[&format!("tolerances.{key}")]);
    }
}

/// A field; lengths are in the unit of the window, and every other measure stands in the name.
fn field(ui: &mut Ui, form: &mut Form, spec: Spec, measure: Measure, value: &mut f64) {
    if measure == Measure::Length {
        number::length(ui, form, &spec, value);
    } else {
        let name = format!("{}, {}", spec.name, measure.sign(form));
        number::number(ui, form, &Spec { name, ..spec }, value);
    }
}
