//! One string as its draws see it: nominal figures, standard deviations, and what comes of a draw.
//!
//! Figures that must stay positive (diameter, modulus, mass, stiffness, actions, press depth) are lognormal with the
//! plan's value as their median. The others are normal and held at the ends of what the model allows: relief and
//! slips that are 0 in the plan are 0 in half of the sample.

use crestline_physics::fretting::NutHeight;
use crestline_physics::near::NearFit;
use crestline_physics::section::{Core, Overrides, Wrap, string_properties};
use crestline_physics::{Contacts, FrettedString, PhysicsError, StringProperties, StringSetup};

use super::axes::{FRETS, own, shared};
use crate::limits::{FINGER_FRACTION, FIXITY, RELIEF_MM, Range, SLIP};
use crate::{StringTolerance, Tolerances};

/// The figures of a string and how uncertain its own ones are.
#[derive(Debug, Clone)]
pub(super) struct Figures {
    pub core: Core,
    pub wrap: Option<Wrap>,
    pub measured: Overrides,
    /// As the plan has it.
    pub setup: StringSetup,
    pub fret_height_mm: f64,
    pub sd: StringTolerance,
}

/// A string whose figures are uncertain, with its contacts.
#[derive(Debug, Clone)]
pub(super) struct StringModel {
    pub figures: Figures,
    /// What a string's ideal setbacks are and where they may lie.
    pub fit: NearFit,
    /// Its contacts as built.
    pub built: Contacts,
    /// Its ideal contacts with the plan's figures.
    pub ideal: Contacts,
    /// Change of the ideal contacts for one standard deviation of each axis; empty until it is known.
    pub slopes: Vec<Contacts>,
}

/// What comes of a draw.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Worked {
    pub ideal: Contacts,
    /// Errors of every fretted note with the built contacts, cents; absent where the note buzzes.
    pub errors: Vec<Option<f64>>,
}

impl StringModel {
    /// Number of axes.
    pub fn axes(&self) -> usize {
        FRETS + self.figures.setup.fret_mm.len()
    }

    /// Ideal contacts and errors as built for a draw.
    ///
    /// # Errors
    /// [`PhysicsError`] where the draw leaves what can be built.
    pub fn work(&self, draw: &[f64], tolerances: &Tolerances) -> Result<Worked, PhysicsError> {
        let string = self.figures.string(draw, tolerances)?;
        let ideal = self.fit.contacts(&string, self.expected(draw))?;
        let built = Contacts {
            saddle_setback_mm: self.built.saddle_setback_mm + tolerances.making.crest_mm * draw[own::CREST],
            nut_setback_mm: self.built.nut_setback_mm + tolerances.making.nut_edge_mm * draw[own::NUT_EDGE],
        };
        let note = |note: crestline_physics::Note| note.touches_fret.is_none().then_some(note.error_cents);
        let errors = string.notes(built)?.into_iter().map(note).collect();
        Ok(Worked { ideal, errors })
    }

    /// The ideal contacts of a draw.
    ///
    /// # Errors
    /// As [`work`](Self::work).
    pub fn ideal_of(&self, draw: &[f64], tolerances: &Tolerances) -> Result<Contacts, PhysicsError> {
        self.fit.contacts(&self.figures.string(draw, tolerances)?, self.expected(draw))
    }

    /// Where the ideal contacts of a draw are expected to first order.
    fn expected(&self, draw: &[f64]) -> Contacts {
        let mut at = self.ideal;
        for (slope, by) in std::iter::zip(&self.slopes, draw) {
            at.saddle_setback_mm += by * slope.saddle_setback_mm;
            at.nut_setback_mm += by * slope.nut_setback_mm;
        }
        let ([low, high], [nut_low, nut_high]) = (self.fit.saddle_travel_mm, self.fit.nut_travel_mm);
        at.saddle_setback_mm = at.saddle_setback_mm.clamp(low, high);
        if self.fit.nut_moves {
            at.nut_setback_mm = at.nut_setback_mm.clamp(nut_low, nut_high);
        }
        at
    }
}

impl Figures {
    /// The string of a draw.
    ///
    /// # Errors
    /// As [`FrettedString::new`].
    pub fn string(&self, draw: &[f64], tolerances: &Tolerances) -> Result<FrettedString, PhysicsError> {
        let mut setup = self.setup.clone();
        setup.properties = self.properties(draw)?;
        let cents =
            self.sd.pitch_cents * draw[own::PITCH] + tolerances.reference_cents * draw[shared::REFERENCE];
        setup.frequency_hz *= (cents / 1200.0).exp2();
        let neck = &tolerances.neck;
        let longer = 1.0 + neck.scale_mm / setup.scale_mm * draw[shared::SCALE];
        for (position_mm, by) in setup.fret_mm.iter_mut().zip(&draw[FRETS..]) {
            *position_mm = *position_mm * longer + neck.fret_mm * by;
        }
        setup.relief_mm = held(setup.relief_mm + neck.relief_mm * draw[shared::RELIEF], &RELIEF_MM);
        if let NutHeight::GapAtFirst(gap_mm) = &mut setup.nut_height {
            *gap_mm = positive(*gap_mm, self.sd.action_first_mm, draw[own::ACTION_FIRST]);
        }
        setup.gap_at_twelfth_mm =
            positive(setup.gap_at_twelfth_mm, self.sd.action_twelfth_mm, draw[own::ACTION_TWELFTH]);
        let finger = &mut setup.pressing;
        finger.finger_fraction = held(
            finger.finger_fraction + tolerances.pressing.finger_fraction * draw[shared::FINGER],
            &FINGER_FRACTION,
        );
        finger.depth_mm = (finger.depth_mm
            * (tolerances.pressing.depth_fraction * draw[shared::DEPTH]).exp())
        .min(self.fret_height_mm);
        let (fixities, supports) = (&mut setup.fixities, &tolerances.supports);
        fixities.nut = held(fixities.nut + supports.nut * draw[shared::NUT_FIXITY], &FIXITY);
        fixities.fret = held(fixities.fret + supports.fret * draw[shared::FRET_FIXITY], &FIXITY);
        fixities.saddle = held(fixities.saddle + supports.saddle * draw[shared::SADDLE_FIXITY], &FIXITY);
        setup.head.slip = held(setup.head.slip + tolerances.slip.head * draw[shared::HEAD_SLIP], &SLIP);
        setup.tail.slip = held(setup.tail.slip + tolerances.slip.tail * draw[shared::TAIL_SLIP], &SLIP);
        FrettedString::new(setup)
    }

    /// Mass and stiffnesses of a draw. What was measured does not follow the section.
    fn properties(&self, draw: &[f64]) -> Result<StringProperties, PhysicsError> {
        let factor = |share: f64, axis: usize| (share * draw[axis]).exp();
        let core = Core {
            diameter_mm: positive(self.core.diameter_mm, self.sd.core_diameter_mm, draw[own::DIAMETER]),
            youngs_modulus_gpa: self.core.youngs_modulus_gpa * factor(self.sd.modulus_fraction, own::MODULUS),
            ..self.core
        };
        let share = self.sd.measured_stiffness_fraction;
        let measured = Overrides {
            axial_stiffness_n: self.measured.axial_stiffness_n.map(|value| value * factor(share, own::AXIAL)),
            bending_stiffness_n_mm2: self
                .measured
                .bending_stiffness_n_mm2
                .map(|value| value * factor(share, own::BENDING)),
            ..self.measured
        };
        let mut properties = string_properties(&core, self.wrap.as_ref(), &measured)?;
        let share = match self.measured.unit_mass_kg_per_m {
            Some(_) => self.sd.measured_mass_fraction,
            None => self.sd.mass_fraction,
        };
        properties.unit_mass_kg_per_m *= factor(share, own::MASS);
        Ok(properties)
    }
}

/// A lognormal value: the median, its standard deviation and a standard normal number.
fn positive(median: f64, sd: f64, by: f64) -> f64 {
    if median > 0.0 { median * (sd / median * by).exp() } else { median }
}

fn held(value: f64, range: &Range) -> f64 {
    value.clamp(range.low, range.high)
}
