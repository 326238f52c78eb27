//! What each assumption is worth on one string: the errors with it against those without.

use crestline_physics::fretting::{Fixities, NutHeight, Pressing, Tail};
use crestline_physics::mode::{Ends, bending_length_mm, closed_form_ratio};
use crestline_physics::neck::fret_fraction;
use crestline_physics::{Contacts, FrettedString, Note, OpenString, StringSetup};

use super::strings::RealString;

/// Frets of the study.
pub const FRETS: usize = 24;
/// Frets over which crests are fitted.
const FITTED: usize = 12;

/// A string that runs on over all its supports.
pub const RUNS_ON: Fixities = Fixities { nut: 0.5, fret: 0.5, saddle: 0.5 };

/// A way to compute a string's errors: supports, bending stiffness, and what is added to each note's error.
pub struct Model {
    pub fixities: Fixities,
    pub bending_stiffness_n_mm2: f64,
    pub added_cents: fn(&Sounding<'_>) -> f64,
}

/// A fretted note with what it was computed from.
pub struct Sounding<'a> {
    pub model: &'a Model,
    pub open: &'a OpenString,
    pub note: &'a Note,
    /// Number of the fret.
    pub fret: usize,
}

/// The model of the program, with supports of choice.
pub fn program(string: &RealString, fixities: Fixities) -> Model {
    Model {
        fixities,
        bending_stiffness_n_mm2: string.properties.bending_stiffness_n_mm2,
        added_cents: |_| 0.0,
    }
}

/// What the closed form of the first mode gives in place of the exact one.
pub fn closed_form_cents(sounding: &Sounding<'_>) -> f64 {
    let Sounding { model, open, note, fret } = sounding;
    let tension_n = open.tension_n * 2f64.powf(note.tension_cents / 600.0);
    let wanted = 2f64.powf(*fret as f64 / 12.0);
    let length_mm = open.length_mm / (wanted * 2f64.powf(note.length_cents / 1200.0));
    let ratio = |tension_n, length_mm, first| {
        let epsilon = bending_length_mm(model.bending_stiffness_n_mm2, tension_n) / length_mm;
        closed_form_ratio(epsilon, Ends { first, second: model.fixities.saddle })
    };
    let fretted = ratio(tension_n, length_mm, model.fixities.fret);
    let opened = ratio(open.tension_n, open.length_mm, model.fixities.nut);
    1200.0 * (fretted / opened).log2() - note.stiffness_cents
}

/// What is missing where the string's mass per length is taken to stay the same.
pub fn constant_mass_cents(sounding: &Sounding<'_>) -> f64 {
    -sounding.note.mass_cents
}

/// Steel on a low action, polymers on a high one: heights in the middle of common practice.
fn fretted(string: &RealString, model: &Model) -> FrettedString {
    let (gap_at_first_mm, gap_at_twelfth_mm) = if string.is_polymer { (0.6, 3.3) } else { (0.45, 2.0) };
    let mut properties = string.properties;
    properties.bending_stiffness_n_mm2 = model.bending_stiffness_n_mm2;
    FrettedString::new(StringSetup {
        properties,
        frequency_hz: string.frequency_hz,
        scale_mm: string.scale_mm,
        fret_mm: (1..=FRETS).map(|fret| string.scale_mm * fret_fraction(fret as f64)).collect(),
        relief_mm: 0.15,
        nut_height: NutHeight::GapAtFirst(gap_at_first_mm),
        gap_at_twelfth_mm,
        pressing: Pressing { finger_fraction: 0.33, depth_mm: 0.1 },
        fixities: model.fixities,
        head: Tail::default(),
        tail: Tail::default(),
        target_octaves: (1..=FRETS).map(|fret| fret as f64 / 12.0).collect(),
    })
    .expect("a legal string")
}

/// Errors at every fret where crest and nut edge stand set back by this much, mm.
fn errors_cents(
    string: &FrettedString,
    model: &Model,
    [saddle_setback_mm, nut_setback_mm]: [f64; 2],
) -> Vec<f64> {
    let contacts = Contacts { saddle_setback_mm, nut_setback_mm };
    let open = string.open(contacts).expect("a legal string");
    let notes = string.notes(contacts).expect("a legal string");
    let notes = notes.iter().enumerate();
    notes
        .map(|(index, note)| {
            let sounding = Sounding { model, open: &open, note, fret: index + 1 };
            note.error_cents + (model.added_cents)(&sounding)
        })
        .collect()
}

/// What may be moved to make the errors small.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Moved {
    Crest,
    CrestAndNut,
}

/// The setbacks of the least squares over the fitted frets, mm: Gauss's steps with measured slopes.
fn best_setbacks_mm(string: &FrettedString, model: &Model, moved: Moved) -> [f64; 2] {
    const STEP_MM: f64 = 0.01;
    let mut setbacks_mm = [0.0; 2];
    // The errors are all but straight in the setbacks: the second step is already below a micrometre.
    for _ in 0..5 {
        let [crest_mm, nut_mm] = setbacks_mm;
        let here = errors_cents(string, model, setbacks_mm);
        let slopes = [[crest_mm + STEP_MM, nut_mm], [crest_mm, nut_mm + STEP_MM]].map(|there_mm| {
            let there = errors_cents(string, model, there_mm);
            here.iter().zip(there).map(|(here, there)| (there - here) / STEP_MM).collect::<Vec<_>>()
        });
        let product = |a: &[f64], b: &[f64]| a.iter().zip(b).take(FITTED).map(|(a, b)| a * b).sum::<f64>();
        let [crest, nut] = &slopes;
        let (cc, cn, nn) = (product(crest, crest), product(crest, nut), product(nut, nut));
        let (c, n) = (product(crest, &here), product(nut, &here));
        let step = match moved {
            Moved::Crest => [c / cc, 0.0],
            Moved::CrestAndNut => {
                let determinant = cc * nn - cn * cn;
                [(c * nn - n * cn) / determinant, (n * cc - c * cn) / determinant]
            }
        };
        setbacks_mm = [crest_mm - step[0], nut_mm - step[1]];
    }
    setbacks_mm
}

/// What one model says more than another of the same string.
pub struct Difference {
    /// At every fret with no setback, cents.
    pub cents: Vec<f64>,
    /// Of the best setback of the crest alone, mm.
    pub setback_mm: f64,
    /// The largest over the fitted frets that is left once each has its own best crest, cents.
    pub left_cents: f64,
    /// The same once each has its own best crest and nut edge.
    pub left_with_nut_cents: f64,
}

/// `with` less `without`.
pub fn difference(string: &RealString, with: &Model, without: &Model) -> Difference {
    let (more, less) = (fretted(string, with), fretted(string, without));
    let apart = |a: [f64; 2], b: [f64; 2]| -> Vec<f64> {
        let (a, b) = (errors_cents(&more, with, a), errors_cents(&less, without, b));
        a.iter().zip(b).map(|(a, b)| a - b).collect()
    };
    let best = |moved| (best_setbacks_mm(&more, with, moved), best_setbacks_mm(&less, without, moved));
    let left = |moved| {
        let (ours, theirs) = best(moved);
        apart(ours, theirs)[..FITTED].iter().fold(0.0, |most: f64, cents| most.max(cents.abs()))
    };
    let (ours, theirs) = best(Moved::Crest);
    Difference {
        cents: apart([0.0; 2], [0.0; 2]),
        setback_mm: ours[0] - theirs[0],
        left_cents: left(Moved::Crest),
        left_with_nut_cents: left(Moved::CrestAndNut),
    }
}
