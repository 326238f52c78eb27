//! The values that a plan takes where its file gives none, and plain starting points for new parts of a plan.

use crate::{
    Action, Core, CoreShape, Datum, Fit, FitRule, Instrument, Measured, Nut, NutStyle, Paper, Pitch, Plan,
    PlanString, Pressing, Saddle, SaddleStyle, Scale, Sheet, Slip, Spread, Supports, Units,
};

/// Height of the fret crowns above the fingerboard, mm: the lowest common fret wire.
pub const FRET_HEIGHT_MM: f64 = 1.1;
/// Pitch of A4, Hz (ISO 16:1975).
pub const REFERENCE_HZ: f64 = 440.0;
/// Relief, mm.
pub const RELIEF_MM: f64 = 0.0;
/// Thickness of a saddle blank, mm.
pub const BLANK_THICKNESS_MM: f64 = 3.0;
/// Margin kept at each edge of the blank's top, mm.
pub const EDGE_MARGIN_MM: f64 = 0.4;
/// How far a blank reaches beyond its outer strings, mm (common practice: 3 to 5).
pub const END_MARGIN_MM: f64 = 4.0;
/// Travel of a saddle crest, mm.
pub const SADDLE_TRAVEL_MM: [f64; 2] = [-5.0, 15.0];
/// Travel of a nut edge, mm.
pub const NUT_TRAVEL_MM: [f64; 2] = [0.0, 3.0];
/// What the errors of a set of strings count against those of another.
pub const ALTERNATIVE_WEIGHT: f64 = 1.0;
/// First and last fret of the fit.
pub const FIT_FRETS: [u32; 2] = [1, 12];

impl Default for Pressing {
    fn default() -> Self {
        Self { finger_fraction: 0.33, depth_mm: 0.1 }
    }
}

impl Default for Supports {
    /// A string that runs on over every support.
    fn default() -> Self {
        Self { nut: 0.5, fret: 0.5, saddle: 0.5 }
    }
}

impl Default for Slip {
    /// Gripped at both ends.
    fn default() -> Self {
        Self { head: 0.0, tail: 0.0 }
    }
}

impl Default for Fit {
    fn default() -> Self {
        Self { rule: FitRule::LeastSquares, frets: FIT_FRETS }
    }
}

impl Default for Nut {
    fn default() -> Self {
        Self { style: NutStyle::Plain, travel_mm: NUT_TRAVEL_MM }
    }
}

impl Default for Sheet {
    fn default() -> Self {
        Self { paper: Paper::A4, units: Units::Mm, datum: Datum::Nut }
    }
}

impl Saddle {
    /// A saddle of a style with everything else as where the file says nothing. A two-piece saddle still needs
    /// its [`split_after`](Self::split_after).
    #[must_use]
    pub const fn of_style(style: SaddleStyle) -> Self {
        Self {
            style,
            thickness_mm: BLANK_THICKNESS_MM,
            edge_margin_mm: EDGE_MARGIN_MM,
            end_margin_mm: END_MARGIN_MM,
            split_after: None,
            travel_mm: SADDLE_TRAVEL_MM,
        }
    }
}

impl Instrument {
    /// An ordinary neck of one scale, with everything else as where the file says nothing.
    #[must_use]
    pub const fn ordinary(scale_mm: f64, frets: u32, spread: Spread) -> Self {
        Self {
            scale: Scale::Single(scale_mm),
            frets,
            fret_positions_mm: None,
            zero_fret: false,
            relief_mm: RELIEF_MM,
            spread_mm: Some(spread),
            across_mm: None,
            fret_height_mm: FRET_HEIGHT_MM,
        }
    }
}

impl Core {
    /// Plain steel music wire. Modulus and density: middle of the handbook ranges for music wire, 190 to 207 GPa
    /// and 7800 to 7850 kg/m³. Tensile strength: 201 ksi·in^0.145 / d^0.145, the least value of ASTM A228 wire by
    /// Shigley's Mechanical Engineering Design, table 10-4 (from memory; within 2 % of that standard's minima for
    /// 0.25 to 0.8 mm).
    #[must_use]
    pub fn steel(diameter_mm: f64) -> Self {
        let ksi = 201.0 / (diameter_mm / 25.4).powf(0.145);
        Self {
            shape: CoreShape::Round,
            diameter_mm,
            youngs_modulus_gpa: 200.0,
            density_kg_m3: 7850.0,
            tensile_mpa: Some((ksi * 6.894_757).round()),
            material: "music wire".to_owned(),
        }
    }
}

impl PlanString {
    /// A string named after its number, without a wrap, measured values or lengths behind nut and saddle.
    #[must_use]
    pub fn new(number: usize, pitch: Pitch, core: Core, action_mm: Action) -> Self {
        Self {
            name: number.to_string(),
            pitch,
            core,
            wrap: None,
            measured: Measured::default(),
            action_mm,
            afterlength_mm: crate::Afterlength::default(),
        }
    }

    /// A string to start from: plain steel of 0.30 mm (.012 in) at E4 with a steel-string guitar's action.
    #[must_use]
    pub fn starting(number: usize, zero_fret: bool) -> Self {
        let first = if zero_fret { None } else { Some(0.4) };
        Self::new(number, Pitch::Note("E4".to_owned()), Core::steel(0.30), Action { first, twelfth: 2.0 })
    }
}

impl Plan {
    /// A plan of these strings on this neck with a saddle of separate pieces, and everything else as where the
    /// file says nothing.
    #[must_use]
    pub fn new(instrument: Instrument, strings: Vec<PlanString>) -> Self {
        Self {
            title: String::new(),
            notes: String::new(),
            instrument,
            pressing: Pressing::default(),
            supports: Supports::default(),
            slip: Slip::default(),
            strings,
            strings_weight: ALTERNATIVE_WEIGHT,
            alternatives: vec![],
            reference_hz: REFERENCE_HZ,
            fit: Fit::default(),
            targets: None,
            saddle: Saddle::of_style(SaddleStyle::Separate),
            nut: Nut::default(),
            as_built: None,
            readings: vec![],
            sheet: Sheet::default(),
            tolerances: None,
        }
    }
}
