//! The plan as the physics sees it: every string made ready on its neck, with its notes before any setback.

use crestline_physics::fit::{self, FitCase, FitOptions, FitString, NutShape, SaddleShape};
use crestline_physics::fretting::{Fixities, NutHeight, Pressing, StringSetup, Tail};
use crestline_physics::section::{self, Core, Overrides, Wrap, string_properties};
use crestline_physics::{Contacts, FrettedString, Note, OpenString, PhysicsError, neck::PlanLine};

use crate::uncertainty::samples;
use crate::{
    Checked, CoreShape, Fault, FitRule, NutStyle, Plan, PlanString, SaddleStyle, Targets,
    limits::number_words,
};

/// A plan made ready.
pub(crate) struct Prepared {
    /// The plan's own strings, string 1 first.
    pub strings: Vec<PreparedString>,
    /// What they count against the alternatives.
    pub weight: f64,
    /// The other sets that the saddle must suit.
    pub alternatives: Vec<PreparedSet>,
}

/// An alternative made ready.
pub(crate) struct PreparedSet {
    pub weight: f64,
    pub strings: Vec<PreparedString>,
}

/// A string made ready.
pub(crate) struct PreparedString {
    pub string: FrettedString,
    pub line: PlanLine,
    /// The open string and its notes with no setback.
    pub open: OpenString,
    pub notes: Vec<Note>,
    /// Indices of the frets of the fit whose note does not buzz.
    pub frets: Vec<usize>,
    /// Whether its note at fret 12 sounds from fret 12.
    pub twelfth_sounds: bool,
    pub breaking_load_n: Option<f64>,
    /// For the rule `robust`: what the string may be as well, with the frets of the fit that do not buzz on it.
    pub samples: Vec<(FrettedString, Vec<usize>)>,
}

impl Prepared {
    /// A place's string in every set, the plan's own first, each with the weight of its set.
    pub fn cases(&self, index: usize) -> impl Iterator<Item = (f64, &PreparedString)> {
        let others = self.alternatives.iter().map(move |set| (set.weight, &set.strings[index]));
        std::iter::once((self.weight, &self.strings[index])).chain(others)
    }

    /// Whether a note of any set counts at this place.
    pub fn counts(&self, index: usize) -> bool {
        self.cases(index).any(|(_, string)| !string.frets.is_empty())
    }

    /// The strings for the fit in all sets; those whose notes all buzz keep their place without being fitted.
    pub fn fit_strings(&self) -> Vec<FitString<'_>> {
        let cases = |index: usize| {
            let cases = self.cases(index);
            cases.flat_map(|(weight, own)| own.fit_cases(weight)).collect()
        };
        let places = self.strings.iter().enumerate();
        places.map(|(index, string)| FitString { line: string.line, cases: cases(index) }).collect()
    }
}

impl PreparedString {
    /// The string for a fit by itself, whatever else the saddle must suit.
    pub fn alone(&self) -> FitString<'_> {
        FitString { line: self.line, cases: self.fit_cases(1.0) }
    }

    /// The string as the fit sees it: as the plan has it, or in its samples, which share its weight.
    fn fit_cases(&self, weight: f64) -> Vec<FitCase<'_>> {
        if self.samples.is_empty() {
            return vec![FitCase { string: &self.string, frets: self.frets.clone(), weight }];
        }
        let weight = weight / self.samples.len() as f64;
        self.samples.iter().map(|(string, frets)| FitCase { string, frets: frets.clone(), weight }).collect()
    }

    /// Tension over breaking load; absent where the tensile strength is not given.
    pub fn breaking_fraction(&self) -> Option<f64> {
        self.breaking_load_n.map(|load_n| self.open.tension_n / load_n)
    }
}

/// Makes every string of every set ready.
///
/// # Errors
/// Faults by path, one a string at most.
pub(crate) fn prepare(checked: &Checked) -> Result<Prepared, Vec<Fault>> {
    let mut prepared = prepare_own(checked)?;
    let mut faults = Vec::new();
    let plan = checked.plan();
    for (index, (alternative, own)) in plan.alternatives.iter().zip(checked.alternatives()).enumerate() {
        match prepare_own(own) {
            Ok(set) => {
                prepared.alternatives.push(PreparedSet { weight: alternative.weight, strings: set.strings })
            }
            Err(own) => faults.extend(own.into_iter().map(|fault| Fault {
                path: alternative.outer_path(index, &fault.path).unwrap_or(fault.path),
                ..fault
            })),
        }
    }
    if faults.is_empty() { Ok(prepared) } else { Err(faults) }
}

/// Makes the plan's own strings ready, without alternatives.
///
/// # Errors
/// As [`prepare`].
pub(crate) fn prepare_own(checked: &Checked) -> Result<Prepared, Vec<Fault>> {
    let mut faults = Vec::new();
    let mut strings = Vec::new();
    for index in 0..checked.plan().strings.len() {
        match prepare_string(checked, index) {
            Ok(string) => strings.push(string),
            Err(error) => faults.push(fault(index, &error)),
        }
    }
    let (weight, alternatives) = (checked.plan().strings_weight, Vec::new());
    if faults.is_empty() { Ok(Prepared { strings, weight, alternatives }) } else { Err(faults) }
}

fn prepare_string(checked: &Checked, index: usize) -> Result<PreparedString, PhysicsError> {
    let plan = checked.plan();
    let (entry, on_neck) = (&plan.strings[index], &checked.neck().strings[index]);
    let core = core(entry);
    let frequency_hz = checked.frequencies_hz()[index];
    let open_cents = plan.targets.as_ref().map_or(0.0, |targets| targets.open_cents[index]);
    let nut_height = match entry.action_mm.first {
        Some(gap_mm) if !plan.instrument.zero_fret => NutHeight::GapAtFirst(gap_mm),
        _ => NutHeight::ZeroFret,
    };
    let string = FrettedString::new(StringSetup {
        properties: properties(entry, &core)?,
        frequency_hz: frequency_hz * (open_cents / 1200.0).exp2(),
        scale_mm: on_neck.line.scale_mm(),
        fret_mm: on_neck.fret_mm.clone(),
        relief_mm: plan.instrument.relief_mm,
        nut_height,
        gap_at_twelfth_mm: entry.action_mm.twelfth,
        pressing: Pressing {
            finger_fraction: plan.pressing.finger_fraction,
            depth_mm: plan.pressing.depth_mm,
        },
        fixities: Fixities { nut: plan.supports.nut, fret: plan.supports.fret, saddle: plan.supports.saddle },
        head: Tail { slip: plan.slip.head, length_mm: entry.afterlength_mm.head },
        tail: Tail { slip: plan.slip.tail, length_mm: entry.afterlength_mm.tail },
        target_octaves: target_octaves(plan, index, frequency_hz),
    })?;
    let open = string.open(Contacts::default())?;
    let notes = string.notes(Contacts::default())?;
    let sounds = |fret: usize| notes[fret].touches_fret.is_none();
    let [first, last] = plan.fit.frets.map(|fret| fret as usize);
    let mut frets: Vec<usize> = (first.saturating_sub(1)..last).filter(|&fret| sounds(fret)).collect();
    let twelfth_sounds = sounds(11);
    if plan.fit.rule == FitRule::Twelfth && !twelfth_sounds {
        frets.clear();
    }
    let breaking_load_n = entry.core.tensile_mpa.map(|tensile_mpa| tensile_mpa * core.area_mm2());
    let samples = match plan.fit.rule {
        FitRule::Robust if !frets.is_empty() => samples(checked, index, &string, &frets),
        _ => Vec::new(),
    };
    Ok(PreparedString {
        line: on_neck.line,
        string,
        open,
        notes,
        frets,
        twelfth_sounds,
        breaking_load_n,
        samples,
    })
}

/// The core of a string as the physics sees it.
pub(crate) fn core(entry: &PlanString) -> Core {
    Core {
        shape: match entry.core.shape {
            CoreShape::Round => section::CoreShape::Round,
            CoreShape::Hex => section::CoreShape::Hex,
        },
        diameter_mm: entry.core.diameter_mm,
        youngs_modulus_gpa: entry.core.youngs_modulus_gpa,
        density_kg_m3: entry.core.density_kg_m3,
    }
}

fn properties(entry: &PlanString, core: &Core) -> Result<section::StringProperties, PhysicsError> {
    string_properties(core, wrap(entry).as_ref(), &overrides(entry))
}

/// The wrap of a string as the physics sees it.
pub(crate) fn wrap(entry: &PlanString) -> Option<Wrap> {
    let wrap = entry.wrap.as_ref()?;
    Some(Wrap { outside_mm: wrap.outside_mm, density_kg_m3: wrap.density_kg_m3 })
}

/// What is measured of a string as the physics sees it.
pub(crate) fn overrides(entry: &PlanString) -> Overrides {
    let measured = &entry.measured;
    Overrides {
        unit_mass_kg_per_m: measured.unit_mass_kg_per_m,
        axial_stiffness_n: measured.axial_stiffness_n,
        bending_stiffness_n_mm2: measured.bending_stiffness_n_mm2,
    }
}

/// Wanted intervals above the open string in octaves: n/12, and with targets the difference of the offsets of the
/// fretted note's pitch class and of the open string.
fn target_octaves(plan: &Plan, index: usize, frequency_hz: f64) -> Vec<f64> {
    let offset = |targets: &Targets, fret: usize| {
        // A4 is pitch class 9, counted from C.
        let semitone = (12.0 * (frequency_hz / plan.reference_hz).log2()).round() as i64 + 9;
        let class = (semitone + fret as i64).rem_euclid(12) as usize;
        (targets.pitch_class_cents[class] - targets.open_cents[index]) / 1200.0
    };
    (1..=plan.instrument.frets as usize)
        .map(|fret| fret as f64 / 12.0 + plan.targets.as_ref().map_or(0.0, |targets| offset(targets, fret)))
        .collect()
}

/// What the fit is to do for a pair of styles with this plan's rule, blank and travel.
pub(crate) fn fit_options(plan: &Plan, saddle: SaddleStyle, nut: NutStyle) -> FitOptions {
    FitOptions {
        rule: match plan.fit.rule {
            FitRule::LeastSquares | FitRule::Robust => fit::FitRule::LeastSquares,
            FitRule::Twelfth => fit::FitRule::Twelfth,
            FitRule::Minimax => fit::FitRule::Minimax,
        },
        saddle: match saddle {
            SaddleStyle::Separate => SaddleShape::Separate,
            SaddleStyle::Shaped => {
                let half_width_mm = 0.5 * plan.saddle.thickness_mm - plan.saddle.edge_margin_mm;
                SaddleShape::Shaped { half_width_mm }
            }
            SaddleStyle::Straight => SaddleShape::Straight,
            SaddleStyle::TwoPiece => {
                SaddleShape::TwoPiece { split_after: plan.saddle.split_after.unwrap_or(1) as usize }
            }
        },
        nut: match nut {
            NutStyle::Plain => NutShape::Plain,
            NutStyle::Common => NutShape::Common,
            NutStyle::Shaped => NutShape::Shaped,
        },
        saddle_travel_mm: plan.saddle.travel_mm,
        nut_travel_mm: plan.nut.travel_mm,
    }
}

/// A fault of a string in the plan's words.
pub(crate) fn fault(index: usize, error: &PhysicsError) -> Fault {
    match *error {
        PhysicsError::TooStiff { frequency_hz } => Fault::new(
            format!("strings[{index}].pitch"),
            format!("{} Hz on a string that sounds higher even when slack", number_words(frequency_hz)),
            "a pitch that leaves the string in tension; a thinner core or a longer scale gives one",
        ),
        _ => Fault::new(
            format!("strings[{index}]"),
            error.to_string(),
            "figures for which the string can be worked out",
        ),
    }
}
