//! What is drawn for one string: a standard normal number an axis, some its own, some shared by all strings.

use serde::Serialize;

/// Axes of a string's own.
pub(super) const OWN: usize = 10;
/// Axes that all strings share, without those of the frets.
pub(super) const SHARED: usize = 10;
/// Where the axes of the frets begin.
pub(super) const FRETS: usize = OWN + SHARED;

/// The string's own axes by place.
pub(super) mod own {
    pub const DIAMETER: usize = 0;
    pub const MODULUS: usize = 1;
    pub const MASS: usize = 2;
    pub const ACTION_FIRST: usize = 3;
    pub const ACTION_TWELFTH: usize = 4;
    pub const CREST: usize = 5;
    pub const NUT_EDGE: usize = 6;
    pub const PITCH: usize = 7;
    pub const AXIAL: usize = 8;
    pub const BENDING: usize = 9;
}

/// The shared axes by place, behind the own ones.
pub(super) mod shared {
    use super::OWN;
    pub const DEPTH: usize = OWN;
    pub const SADDLE_FIXITY: usize = OWN + 1;
    pub const FRET_FIXITY: usize = OWN + 2;
    pub const NUT_FIXITY: usize = OWN + 3;
    pub const SCALE: usize = OWN + 4;
    pub const RELIEF: usize = OWN + 5;
    pub const FINGER: usize = OWN + 6;
    pub const HEAD_SLIP: usize = OWN + 7;
    pub const TAIL_SLIP: usize = OWN + 8;
    pub const REFERENCE: usize = OWN + 9;
}

/// Whether an axis is of the maker's hand, which no ideal setback answers to.
pub(super) const fn is_making(axis: usize) -> bool {
    matches!(axis, own::CREST | own::NUT_EDGE)
}

/// What can be measured or looked after by itself: a group of axes.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Input {
    /// Diameter of the core.
    CoreDiameter,
    /// Young's modulus of the core.
    Modulus,
    /// Mass per length.
    Mass,
    /// Axial and bending stiffness, where the plan has measured ones.
    MeasuredStiffness,
    /// Gaps over fret 1 and fret 12.
    Action,
    /// Pitch of the open string and of A4.
    Pitch,
    /// Relief of the neck.
    Relief,
    /// The scale that the frets are laid out to.
    Scale,
    /// Place of each fret by itself.
    FretPlaces,
    /// How deep a finger presses.
    PressDepth,
    /// How far behind the fret it presses.
    FingerPlace,
    /// The three fixities.
    Supports,
    /// Slip over nut and saddle.
    Slip,
    /// Where the maker's crest comes to stand.
    Crest,
    /// Where the maker's nut edge comes to stand.
    NutEdge,
}

impl Input {
    /// Every input.
    pub const ALL: [Self; 15] = [
        Self::CoreDiameter,
        Self::Modulus,
        Self::Mass,
        Self::MeasuredStiffness,
        Self::Action,
        Self::Pitch,
        Self::Relief,
        Self::Scale,
        Self::FretPlaces,
        Self::PressDepth,
        Self::FingerPlace,
        Self::Supports,
        Self::Slip,
        Self::Crest,
        Self::NutEdge,
    ];

    /// The input that an axis belongs to.
    pub(super) const fn of_axis(axis: usize) -> Self {
        match axis {
            own::DIAMETER => Self::CoreDiameter,
            own::MODULUS => Self::Modulus,
            own::MASS => Self::Mass,
            own::ACTION_FIRST | own::ACTION_TWELFTH => Self::Action,
            own::CREST => Self::Crest,
            own::NUT_EDGE => Self::NutEdge,
            own::PITCH | shared::REFERENCE => Self::Pitch,
            own::AXIAL | own::BENDING => Self::MeasuredStiffness,
            shared::DEPTH => Self::PressDepth,
            shared::SADDLE_FIXITY | shared::FRET_FIXITY | shared::NUT_FIXITY => Self::Supports,
            shared::SCALE => Self::Scale,
            shared::RELIEF => Self::Relief,
            shared::FINGER => Self::FingerPlace,
            shared::HEAD_SLIP | shared::TAIL_SLIP => Self::Slip,
            _ => Self::FretPlaces,
        }
    }
}
