//! The figures of the report.

use crestline_physics::fit::offset_mm;
use crestline_physics::mode::{bending_length_mm, inharmonicity};
use crestline_physics::neck::PlanPoint;
use crestline_physics::{Contacts, Note};

use super::Fitted;
use super::prepare::{Prepared, PreparedString, fault};
use crate::{
    BuiltReport, Checked, ContactReport, Fault, FretReport, Point, Point3, Report, SaddleLine, SaddleReport,
    SaddleStyle, StringReport,
};

/// A report without notices.
pub(super) fn report(checked: &Checked, prepared: &Prepared, fitted: &Fitted) -> Result<Report, Vec<Fault>> {
    let strings: Vec<StringReport> = (0..prepared.strings.len())
        .map(|index| string_report(checked, prepared, fitted, index).map_err(|fault| vec![fault]))
        .collect::<Result<_, _>>()?;
    Ok(Report {
        format: "crestline-report",
        version: 1,
        total_tension_n: strings.iter().map(|string| string.tension_n).sum(),
        strings,
        saddle: SaddleReport {
            lines: fitted.built.lines.iter().map(saddle_line).collect(),
            fits: fitted.built.fits,
        },
        alternatives: Vec::new(),
        notices: Vec::new(),
    })
}

fn string_report(
    checked: &Checked,
    prepared: &Prepared,
    fitted: &Fitted,
    index: usize,
) -> Result<StringReport, Fault> {
    let plan = checked.plan();
    let own = &prepared.strings[index];
    let notes_at = |contacts: Contacts| own.string.notes(contacts).map_err(|error| fault(index, &error));
    let (ideal, built) = (fitted.ideal.contacts[index], fitted.built.contacts[index]);
    let (ideal_notes, built_notes) = (notes_at(ideal)?, notes_at(built)?);
    let as_built = plan.as_built.as_ref().map(|as_built| Contacts {
        saddle_setback_mm: as_built.saddle_setback_mm[index],
        nut_setback_mm: as_built.nut_setback_mm[index],
    });
    let as_built_notes = as_built.map(notes_at).transpose()?;
    let frets = (0..own.notes.len())
        .map(|fret| {
            let none = &own.notes[fret];
            FretReport {
                fret: fret as u32 + 1,
                position_mm: own.string.setup().fret_mm[fret],
                none_cents: none.error_cents,
                ideal_cents: ideal_notes[fret].error_cents,
                built_cents: built_notes[fret].error_cents,
                as_built_cents: as_built_notes.as_ref().map(|notes| notes[fret].error_cents),
                length_cents: none.length_cents,
                tension_cents: none.tension_cents,
                mass_cents: none.mass_cents,
                stiffness_cents: none.stiffness_cents,
                finger_force_n: none.finger_force_n,
                touches_fret: none.touches_fret.map(|fret| fret as u32),
            }
        })
        .collect();
    let properties = own.string.setup().properties;
    let stiffness = properties.bending_stiffness_n_mm2;
    Ok(StringReport {
        string: index as u32 + 1,
        name: plan.strings[index].name.clone(),
        frequency_hz: own.string.setup().frequency_hz,
        scale_mm: own.string.setup().scale_mm,
        unit_mass_kg_per_m: properties.unit_mass_kg_per_m,
        axial_stiffness_n: properties.axial_stiffness_n,
        bending_stiffness_n_mm2: stiffness,
        tension_n: own.open.tension_n,
        strain: own.open.strain,
        breaking_fraction: own.breaking_fraction(),
        bending_length_mm: bending_length_mm(stiffness, own.open.tension_n),
        inharmonicity: inharmonicity(stiffness, own.open.tension_n, own.open.length_mm),
        ideal: contact_report(own, ideal, &ideal_notes),
        plus_minus_mm: None,
        built: built_report(plan.saddle.style, own, fitted, index, &built_notes),
        frets,
    })
}

fn built_report(
    style: SaddleStyle,
    own: &PreparedString,
    fitted: &Fitted,
    index: usize,
    notes: &[Note],
) -> BuiltReport {
    let contacts = fitted.built.contacts[index];
    let position_mm = own.line.scale_mm() + contacts.saddle_setback_mm;
    let crest = own.line.at(position_mm);
    let slot_offset_mm = match style {
        SaddleStyle::Separate => None,
        SaddleStyle::Shaped => fitted.built.lines.first().map(|line| offset_from(*line, crest)),
        // The crest is the line.
        SaddleStyle::Straight | SaddleStyle::TwoPiece => Some(0.0),
    };
    let (rms_cents, max_cents) = left_over(own, notes);
    BuiltReport {
        saddle_setback_mm: contacts.saddle_setback_mm,
        nut_setback_mm: contacts.nut_setback_mm,
        rms_cents,
        max_cents,
        crest_mm: Point3 { x: crest.x_mm, y: crest.y_mm, z: own.string.open_height_mm(position_mm) },
        slot_offset_mm,
    }
}

pub(super) fn contact_report(own: &PreparedString, at: Contacts, notes: &[Note]) -> ContactReport {
    let (rms_cents, max_cents) = left_over(own, notes);
    ContactReport {
        saddle_setback_mm: at.saddle_setback_mm,
        nut_setback_mm: at.nut_setback_mm,
        rms_cents,
        max_cents,
    }
}

/// Offset from the line; a line for one string is as short as a point and has its crest on it.
fn offset_from(line: [PlanPoint; 2], crest: PlanPoint) -> f64 {
    if line[0] == line[1] { 0.0 } else { offset_mm(line, crest) }
}

/// Root mean square and largest error over the frets of the fit; both 0 where none sounds.
fn left_over(string: &PreparedString, notes: &[Note]) -> (f64, f64) {
    left_over_of([(1.0, string, notes)])
}

/// Root mean square, weighted, and largest error over the frets of the fit of one string in several sets, each with
/// its weight and its notes.
pub(crate) fn left_over_of<'a>(
    cases: impl IntoIterator<Item = (f64, &'a PreparedString, &'a [Note])>,
) -> (f64, f64) {
    let (mut squares, mut largest) = (Squares::default(), 0.0);
    for (weight, string, notes) in cases {
        for &fret in &string.frets {
            squares.add(weight, notes[fret].error_cents);
            largest = f64::max(largest, notes[fret].error_cents.abs());
        }
    }
    (squares.root_mean(), largest)
}

/// A weighted sum of squares.
#[derive(Debug, Clone, Copy, Default)]
pub(crate) struct Squares {
    sum: f64,
    weights: f64,
}

impl Squares {
    pub fn add(&mut self, weight: f64, error: f64) {
        self.sum += weight * (error * error);
        self.weights += weight;
    }

    pub fn join(&mut self, other: Self) {
        self.sum += other.sum;
        self.weights += other.weights;
    }

    /// The root of their weighted mean; 0 where there is none.
    pub fn root_mean(self) -> f64 {
        if self.weights > 0.0 { (self.sum / self.weights).sqrt() } else { 0.0 }
    }
}

fn saddle_line(&[treble, bass]: &[PlanPoint; 2]) -> SaddleLine {
    let slant = (bass.x_mm - treble.x_mm).atan2(treble.y_mm - bass.y_mm).to_degrees();
    SaddleLine { treble: point(treble), bass: point(bass), slant_degrees: slant }
}

pub(super) fn point(at: PlanPoint) -> Point {
    Point { x: at.x_mm, y: at.y_mm }
}
