//! A string on its neck: the open note, and every fretted one with the reasons for its error.

use crate::error::within;
use crate::mode::{Ends, SpeakingString};
use crate::path::{SidePoint, taut_path};
use crate::{PhysicsError, StringProperties};

/// How a finger presses a string to a fret.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Pressing {
    /// Distance of the finger behind the fret as a fraction p of the fret's space.
    pub finger_fraction: f64,
    /// Depth h of the string at the finger below the crown, mm.
    pub depth_mm: f64,
}

/// Fixities of the three kinds of support, each 0 (pinned) to 1 (clamped).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Fixities {
    /// At the nut.
    pub nut: f64,
    /// At the fret.
    pub fret: f64,
    /// At the saddle crest.
    pub saddle: f64,
}

/// Slip over an end and the length of string behind it.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Tail {
    /// From 0, gripped, to 1, frictionless.
    pub slip: f64,
    /// Length between the support and the anchor, mm.
    pub length_mm: f64,
}

/// Height of the open string, measured as gaps over crowns.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum NutHeight {
    /// Gap over fret 1 with the string open, mm.
    GapAtFirst(f64),
    /// A zero fret, its crown at s = 0 as high as the others.
    ZeroFret,
}

/// Everything that is needed to work a string out.
#[derive(Debug, Clone, PartialEq)]
pub struct StringSetup {
    /// Unit mass and stiffnesses.
    pub properties: StringProperties,
    /// Pitch of the open string, Hz.
    pub frequency_hz: f64,
    /// Distance of the nominal lines along the string, mm.
    pub scale_mm: f64,
    /// Arc positions of the crowns, fret 1 first, mm.
    pub fret_mm: Vec<f64>,
    /// Greatest dip r of the crowns, mm.
    pub relief_mm: f64,
    /// What sets the string's height at its nut end.
    pub nut_height: NutHeight,
    /// Gap over fret 12 with the string open, mm.
    pub gap_at_twelfth_mm: f64,
    /// The finger.
    pub pressing: Pressing,
    /// The supports.
    pub fixities: Fixities,
    /// Behind the nut.
    pub head: Tail,
    /// Behind the saddle.
    pub tail: Tail,
    /// Wanted interval of every fret above the open string, octaves (log₂ r_n), fret 1 first.
    pub target_octaves: Vec<f64>,
}

/// Where the speaking string ends.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Contacts {
    /// Setback δs of the crest beyond the nominal saddle line, along the string away from the nut, mm.
    pub saddle_setback_mm: f64,
    /// Setback δn of the nut edge beyond the nominal nut line toward the bridge, mm.
    pub nut_setback_mm: f64,
}

/// A string made ready: crowns with heights and the line of the open string.
#[derive(Debug, Clone, PartialEq)]
pub struct FrettedString {
    setup: StringSetup,
    crowns: Vec<SidePoint>,
    /// Two points of the open string's underside.
    line: [SidePoint; 2],
}

/// The open string with its contacts.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct OpenString {
    /// Nut contact.
    pub nut: SidePoint,
    /// Crest.
    pub crest: SidePoint,
    /// Speaking length, mm.
    pub length_mm: f64,
    /// Tension at which the first mode is at pitch, N.
    pub tension_n: f64,
    /// Strain at that tension.
    pub strain: f64,
    /// First mode over that of the flexible string.
    pub ratio: f64,
}

/// A fretted note and the parts of its error; the four parts add up to the error.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Note {
    /// Error against the wanted interval above the open string, cents; positive is sharp.
    pub error_cents: f64,
    /// 1200·log₂(L₀/(L_n·r_n)).
    pub length_cents: f64,
    /// 600·log₂(T_n/T₀).
    pub tension_cents: f64,
    /// 600·log₂(μ₀/μ_n).
    pub mass_cents: f64,
    /// 1200·log₂(Q_n/Q₀).
    pub stiffness_cents: f64,
    /// Static vertical force of the finger, without bending, N.
    pub finger_force_n: f64,
    /// The crown from which the string sounds, where that is a higher fret's: the note buzzes.
    pub touches_fret: Option<usize>,
}

impl FrettedString {
    /// Makes a string ready.
    ///
    /// # Errors
    /// [`PhysicsError::OutOfRange`] for a value that is not finite or outside what the model can take.
    pub fn new(setup: StringSetup) -> Result<Self, PhysicsError> {
        check(&setup)?;
        let crowns = crowns(&setup.fret_mm, setup.relief_mm);
        let over = |crown: SidePoint, gap_mm| SidePoint { s_mm: crown.s_mm, z_mm: crown.z_mm + gap_mm };
        let near = match setup.nut_height {
            NutHeight::GapAtFirst(gap_mm) => over(crowns[0], gap_mm),
            NutHeight::ZeroFret => SidePoint { s_mm: 0.0, z_mm: 0.0 },
        };
        let line = [near, over(crowns[11], setup.gap_at_twelfth_mm)];
        Ok(Self { setup, crowns, line })
    }

    /// What it was made from.
    #[must_use]
    pub fn setup(&self) -> &StringSetup {
        &self.setup
    }

    /// The crowns, fret 1 first.
    #[must_use]
    pub fn crowns(&self) -> &[SidePoint] {
        &self.crowns
    }

    /// Height of the open string's underside at an arc position, mm.
    #[must_use]
    pub fn open_height_mm(&self, s_mm: f64) -> f64 {
        self.line[0].line_height_mm(self.line[1], s_mm)
    }

    /// The first fret that the open string lies on, if any.
    #[must_use]
    pub fn lies_on_fret(&self) -> Option<usize> {
        let touching = |crown: &SidePoint| self.open_height_mm(crown.s_mm) <= crown.z_mm;
        self.crowns.iter().position(touching).map(|index| index + 1)
    }

    /// The open string at pitch.
    ///
    /// # Errors
    /// [`PhysicsError::TooStiff`] where no tension gives the pitch; [`PhysicsError::OutOfRange`] where the contacts
    /// leave no room for a string.
    pub fn open(&self, contacts: Contacts) -> Result<OpenString, PhysicsError> {
        let setup = &self.setup;
        let first_finger = self.finger(0).s_mm;
        within("nut setback in mm", contacts.nut_setback_mm, -setup.scale_mm, first_finger - 1e-6)?;
        let last_crown = self.crowns[self.crowns.len() - 1].s_mm;
        let least = last_crown - setup.scale_mm + 1e-6;
        within("saddle setback in mm", contacts.saddle_setback_mm, least, setup.scale_mm)?;
        let on_line = |s_mm| SidePoint { s_mm, z_mm: self.open_height_mm(s_mm) };
        let nut = on_line(contacts.nut_setback_mm);
        let crest = on_line(setup.scale_mm + contacts.saddle_setback_mm);
        let length_mm = nut.distance_mm(crest);
        let (tension_n, ratio) =
            self.speaking(length_mm, setup.fixities.nut).tension_for(setup.frequency_hz)?;
        let strain = tension_n / setup.properties.axial_stiffness_n;
        Ok(OpenString { nut, crest, length_mm, tension_n, strain, ratio })
    }

    /// The note at a fret, `index` 0 for fret 1, on an open string of these contacts.
    ///
    /// # Errors
    /// As [`mode_ratio`](crate::mode::mode_ratio); [`PhysicsError::OutOfRange`] for a fret that is not there.
    pub fn note(&self, open: &OpenString, index: usize) -> Result<Note, PhysicsError> {
        within("fret", index as f64 + 1.0, 1.0, self.crowns.len() as f64)?;
        let setup = &self.setup;
        let (crown, finger) = (self.crowns[index], self.finger(index));
        let behind = self.crowns[..index].partition_point(|crown| crown.s_mm <= open.nut.s_mm);
        let left = taut_path(open.nut, &self.crowns[behind..index], finger);
        let right = taut_path(crown, &self.crowns[index + 1..], open.crest);
        let longer_mm =
            left.excess_mm + finger.excess_mm(crown) + right.excess_mm - open.nut.excess_mm(open.crest);
        let stretched_mm =
            open.length_mm + setup.head.slip * setup.head.length_mm + setup.tail.slip * setup.tail.length_mm;
        let strain = open.strain + (1.0 + open.strain) * longer_mm / stretched_mm;
        let tension_n = setup.properties.axial_stiffness_n * strain;
        let thinner = (1.0 + open.strain) / (1.0 + strain);
        let length_mm = right.last_support.distance_mm(open.crest);
        // The ratio knows no mass; that of the stretched string is in `mass_cents`.
        let ratio = self.speaking(length_mm, setup.fixities.fret).ratio(tension_n)?;
        let rise = |from: SidePoint| (from.z_mm - finger.z_mm) / finger.distance_mm(from);
        let length_cents = 1200.0 * ((open.length_mm / length_mm).log2() - setup.target_octaves[index]);
        let tension_cents = 600.0 * (tension_n / open.tension_n).log2();
        let mass_cents = -600.0 * thinner.log2();
        let stiffness_cents = 1200.0 * (ratio / open.ratio).log2();
        Ok(Note {
            error_cents: length_cents + tension_cents + mass_cents + stiffness_cents,
            length_cents,
            tension_cents,
            mass_cents,
            stiffness_cents,
            finger_force_n: tension_n * (rise(left.last_support) + rise(crown)),
            touches_fret: right.last_crown.map(|above| index + above + 2),
        })
    }

    /// All notes, fret 1 first, with these contacts.
    ///
    /// # Errors
    /// As [`Self::open`] and [`Self::note`].
    pub fn notes(&self, contacts: Contacts) -> Result<Vec<Note>, PhysicsError> {
        let open = self.open(contacts)?;
        (0..self.crowns.len()).map(|index| self.note(&open, index)).collect()
    }

    /// Errors in cents at the frets with these indices.
    ///
    /// # Errors
    /// As [`Self::open`] and [`Self::note`].
    pub fn errors_cents(&self, contacts: Contacts, indices: &[usize]) -> Result<Vec<f64>, PhysicsError> {
        let open = self.open(contacts)?;
        indices.iter().map(|&index| Ok(self.note(&open, index)?.error_cents)).collect()
    }

    /// Where the finger holds the string for a fret.
    fn finger(&self, index: usize) -> SidePoint {
        let crown = self.crowns[index];
        let behind_mm = if index == 0 { 0.0 } else { self.crowns[index - 1].s_mm };
        SidePoint {
            s_mm: crown.s_mm - self.setup.pressing.finger_fraction * (crown.s_mm - behind_mm),
            z_mm: crown.z_mm - self.setup.pressing.depth_mm,
        }
    }

    /// A speaking length of this string as it is strung, whose nearer end is held so.
    fn speaking(&self, length_mm: f64, near_fixity: f64) -> SpeakingString {
        SpeakingString {
            length_mm,
            unit_mass_kg_per_m: self.setup.properties.unit_mass_kg_per_m,
            bending_stiffness_n_mm2: self.setup.properties.bending_stiffness_n_mm2,
            ends: Ends { first: near_fixity, second: self.setup.fixities.saddle },
        }
    }
}

/// Crowns with their heights z = −4·r·u·(1 − u), u = (S_n − S_1)/(S_N − S_1) from 0 at the first to 1 at the last, r
/// the relief: a parabola, whose greatest dip below the line through the outer crowns is r. Millimetres; no crown
/// for no position.
#[must_use]
pub fn crowns(fret_mm: &[f64], relief_mm: f64) -> Vec<SidePoint> {
    let (Some(&first), Some(&last)) = (fret_mm.first(), fret_mm.last()) else { return Vec::new() };
    let height = |s_mm: f64| {
        let along = (s_mm - first) / (last - first);
        -4.0 * relief_mm * along * (1.0 - along)
    };
    fret_mm.iter().map(|&s_mm| SidePoint { s_mm, z_mm: height(s_mm) }).collect()
}

fn check(setup: &StringSetup) -> Result<(), PhysicsError> {
    within("frequency in Hz", setup.frequency_hz, f64::MIN_POSITIVE, 1e5)?;
    within("scale in mm", setup.scale_mm, f64::MIN_POSITIVE, 1e5)?;
    within("number of frets", setup.fret_mm.len() as f64, 12.0, 99.0)?;
    let count = setup.fret_mm.len() as f64;
    within("number of wanted intervals", setup.target_octaves.len() as f64, count, count)?;
    let mut behind = 0.0;
    for &position in &setup.fret_mm {
        within("fret position in mm", position, behind + 1e-6, setup.scale_mm)?;
        behind = position;
    }
    within("relief in mm", setup.relief_mm, 0.0, 1e2)?;
    if let NutHeight::GapAtFirst(gap_mm) = setup.nut_height {
        within("gap over fret 1 in mm", gap_mm, 0.0, 1e2)?;
    }
    within("gap over fret 12 in mm", setup.gap_at_twelfth_mm, 0.0, 1e2)?;
    within("finger fraction", setup.pressing.finger_fraction, 1e-3, 1.0)?;
    within("press depth in mm", setup.pressing.depth_mm, 0.0, 1e2)?;
    for fixity in [setup.fixities.nut, setup.fixities.fret, setup.fixities.saddle] {
        within("fixity", fixity, 0.0, 1.0)?;
    }
    for tail in [setup.head, setup.tail] {
        within("slip", tail.slip, 0.0, 1.0)?;
        within("afterlength in mm", tail.length_mm, 0.0, 1e5)?;
    }
    for &octaves in &setup.target_octaves {
        within("wanted interval in octaves", octaves, 0.0, 16.0)?;
    }
    let properties = &setup.properties;
    within("unit mass in kg/m", properties.unit_mass_kg_per_m, f64::MIN_POSITIVE, 1e3)?;
    within("axial stiffness in N", properties.axial_stiffness_n, f64::MIN_POSITIVE, 1e12)?;
    within("bending stiffness in N mm²", properties.bending_stiffness_n_mm2, 0.0, 1e12)?;
    Ok(())
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use crate::neck::fret_fraction;

    /// A light string of 650 mm, level crowns, with these gaps over frets 1 and 12.
    fn string(first_mm: f64, twelfth_mm: f64) -> FrettedString {
        FrettedString::new(setup(first_mm, twelfth_mm)).unwrap()
    }

    fn setup(first_mm: f64, twelfth_mm: f64) -> StringSetup {
        StringSetup {
            properties: StringProperties {
                unit_mass_kg_per_m: 4e-4,
                axial_stiffness_n: 14_000.0,
                bending_stiffness_n_mm2: 70.0,
            },
            frequency_hz: 330.0,
            scale_mm: 650.0,
            fret_mm: (1..=20).map(|fret| 650.0 * fret_fraction(f64::from(fret))).collect(),
            relief_mm: 0.0,
            nut_height: NutHeight::GapAtFirst(first_mm),
            gap_at_twelfth_mm: twelfth_mm,
            pressing: Pressing { finger_fraction: 0.5, depth_mm: 0.1 },
            fixities: Fixities { nut: 0.5, fret: 0.5, saddle: 0.5 },
            head: Tail::default(),
            tail: Tail::default(),
            target_octaves: (1..=20).map(|fret| f64::from(fret) / 12.0).collect(),
        }
    }

    #[test]
    fn what_is_out_of_range_is_refused_by_name() {
        type Spoil = fn(&mut StringSetup);
        let spoils: [(&str, Spoil); 19] = [
            ("frequency in Hz", |setup| setup.frequency_hz = 0.0),
            ("scale in mm", |setup| setup.scale_mm = f64::NAN),
            ("number of frets", |setup| setup.fret_mm.truncate(11)),
            ("number of wanted intervals", |setup| setup.target_octaves.truncate(19)),
            ("fret position in mm", |setup| setup.fret_mm[0] = 0.0),
            ("fret position in mm", |setup| setup.fret_mm[5] = setup.fret_mm[4]),
            ("fret position in mm", |setup| setup.fret_mm[19] = 650.1),
            ("relief in mm", |setup| setup.relief_mm = -0.1),
            ("gap over fret 1 in mm", |setup| setup.nut_height = NutHeight::GapAtFirst(-0.1)),
            ("gap over fret 12 in mm", |setup| setup.gap_at_twelfth_mm = f64::INFINITY),
            ("finger fraction", |setup| setup.pressing.finger_fraction = 0.0),
            ("press depth in mm", |setup| setup.pressing.depth_mm = -0.1),
            ("fixity", |setup| setup.fixities.nut = 1.1),
            ("fixity", |setup| setup.fixities.saddle = -0.1),
            ("slip", |setup| setup.tail.slip = 1.1),
            ("afterlength in mm", |setup| setup.head.length_mm = -1.0),
            ("wanted interval in octaves", |setup| setup.target_octaves[3] = -0.1),
            ("unit mass in kg/m", |setup| setup.properties.unit_mass_kg_per_m = 0.0),
            ("axial stiffness in N", |setup| setup.properties.axial_stiffness_n = 0.0),
        ];
        for (wanted, spoil) in spoils {
            let mut setup = setup(0.4, 2.0);
            spoil(&mut setup);
            match FrettedString::new(setup) {
                Err(PhysicsError::OutOfRange { name, .. }) => assert_eq!(name, wanted),
                other => assert!(other.is_err(), "{wanted}: taken"),
            }
        }
    }

    #[test]
    fn the_first_fret_that_the_open_string_lies_on_is_named() {
        assert_eq!(string(0.4, 2.0).lies_on_fret(), None);
        assert_eq!(string(0.0, 2.0).lies_on_fret(), Some(1));
        // A line that falls from 0.5 mm over fret 1 to nothing over fret 12 lies below the crowns after it alone.
        assert_eq!(string(0.5, 0.0).lies_on_fret(), Some(12));
        // One that falls to nothing a little earlier would have to fall below them: 0.5 mm at fret 1, 0.01 at fret 12.
        let reached = |fret: i32| 650.0 * fret_fraction(f64::from(fret));
        let end_mm = reached(12) + 0.01 * (reached(12) - reached(1)) / 0.49;
        let expected = (13..=20).find(|&fret| reached(fret) >= end_mm).unwrap();
        assert_eq!(string(0.5, 0.01).lies_on_fret(), usize::try_from(expected).ok());
    }

    #[test]
    fn contacts_stay_clear_of_the_finger_and_of_the_last_fret() {
        let string = string(0.4, 2.0);
        let open = |nut_setback_mm, saddle_setback_mm| {
            string.open(Contacts { saddle_setback_mm, nut_setback_mm }).map(|open| open.length_mm)
        };
        let finger_mm = 0.5 * string.crowns()[0].s_mm;
        assert!(open(finger_mm - 1e-3, 0.0).is_ok() && open(finger_mm + 1e-7, 0.0).is_err());
        assert!(open(-649.0, 0.0).is_ok() && open(-651.0, 0.0).is_err());
        let last_mm = string.crowns()[19].s_mm - 650.0;
        assert!(open(0.0, last_mm + 1e-3).is_ok() && open(0.0, last_mm).is_err());
        assert!(open(0.0, 649.0).is_ok() && open(0.0, 651.0).is_err());
        // On a level line the speaking length is the distance of the contacts along it.
        let slope = 1.6 / (string.crowns()[11].s_mm - string.crowns()[0].s_mm);
        let along_mm = (650.0 + 2.0 - 0.5) * (1.0 + slope * slope).sqrt();
        assert!((open(0.5, 2.0).unwrap() - along_mm).abs() < 1e-9);
    }

    #[test]
    fn frets_that_are_not_there_are_refused() {
        let string = string(0.4, 2.0);
        let open = string.open(Contacts::default()).unwrap();
        assert!(string.note(&open, 19).is_ok() && string.note(&open, 20).is_err());
        assert_eq!(string.notes(Contacts::default()).unwrap().len(), 20);
    }
}
