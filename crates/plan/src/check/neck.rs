//! Checks of the key `instrument`.

use crestline_physics::neck::{Neck, NeckScale, NeckShape, equal_spacing_mm};

use super::checker::Checker;
use crate::limits::{self, number_words, quantity_words};
use crate::{Across, Fan, Instrument, Scale};

pub(super) fn instrument(checker: &mut Checker, instrument: &Instrument, strings: usize) {
    scale(checker, &instrument.scale, strings);
    checker.range("instrument.frets", f64::from(instrument.frets), &limits::FRETS);
    if let Some(positions) = &instrument.fret_positions_mm {
        fret_positions(checker, instrument, positions);
    }
    checker.range("instrument.relief_mm", instrument.relief_mm, &limits::RELIEF_MM);
    spacing(checker, instrument, strings);
    checker.range("instrument.fret_height_mm", instrument.fret_height_mm, &limits::FRET_HEIGHT_MM);
}

fn scale(checker: &mut Checker, scale: &Scale, strings: usize) {
    let fan = match scale {
        Scale::Single(scale_mm) => return checker.range("instrument.scale_mm", *scale_mm, &limits::SCALE_MM),
        Scale::Fanned(fan) => fan,
    };
    checker.range("instrument.scale_mm.bass", fan.bass, &limits::SCALE_MM);
    checker.range("instrument.scale_mm.treble", fan.treble, &limits::SCALE_MM);
    checker.range("instrument.scale_mm.square_fret", fan.square_fret, &limits::SQUARE_FRET);
    if strings == 1 {
        checker.fault(
            "instrument.scale_mm",
            "a fanned neck with one string",
            "one number for a single string",
        );
    }
    let difference = (fan.bass - fan.treble).abs();
    if difference > limits::SCALE_DIFFERENCE_MM {
        let allowed = format!(
            "outer scales within {} of each other",
            quantity_words(limits::SCALE_DIFFERENCE_MM, "mm")
        );
        checker.fault("instrument.scale_mm", format!("a difference of {difference} mm"), allowed);
    }
}

fn fret_positions(checker: &mut Checker, instrument: &Instrument, positions_mm: &[f64]) {
    const PATH: &str = "instrument.fret_positions_mm";
    let Scale::Single(scale_mm) = instrument.scale else {
        return checker.fault(PATH, "fret positions on a fanned neck", "fret positions with one scale only");
    };
    let frets = instrument.frets;
    if checker.sound(&["instrument.frets"]) && positions_mm.len() as u64 != u64::from(frets) {
        let found = format!("{} positions", positions_mm.len());
        checker.fault(PATH, found, format!("one position a fret, {frets} of them"));
    }
    for (index, &position_mm) in positions_mm.iter().enumerate() {
        checker.range(format_args!("{PATH}[{index}]"), position_mm, &limits::FRET_POSITION_MM);
    }
    for (index, pair) in positions_mm.windows(2).enumerate() {
        if pair[1] - pair[0] < limits::FRET_GAP_MM {
            let path = format!("{PATH}[{}]", index + 1);
            let found =
                format!("{} behind {} of fret {}", number_words(pair[1]), number_words(pair[0]), index + 1);
            checker.fault(path, found, format!("rising positions at least {} mm apart", limits::FRET_GAP_MM));
        }
    }
    if let Some(&last) = positions_mm.last()
        && last > scale_mm - limits::LAST_FRET_TO_CREST_MM
    {
        let path = format!("{PATH}[{}]", positions_mm.len() - 1);
        let most = number_words(scale_mm - limits::LAST_FRET_TO_CREST_MM);
        checker.fault(path, number_words(last), format!("frets before the saddle line, at most {most} mm"));
    }
}

fn spacing(checker: &mut Checker, instrument: &Instrument, strings: usize) {
    if let Some(spread) = &instrument.spread_mm {
        for (end, value) in [("nut", spread.nut), ("saddle", spread.saddle)] {
            checker.range(format_args!("instrument.spread_mm.{end}"), value, &limits::SPREAD_MM);
        }
    }
    match (&instrument.across_mm, &instrument.spread_mm) {
        (Some(across), _) => places(checker, across, strings),
        (None, Some(spread)) if strings > 1 => {
            let least = limits::STRING_GAP_MM * (strings - 1) as f64;
            for (end, value) in [("nut", spread.nut), ("saddle", spread.saddle)] {
                if value >= limits::SPREAD_MM.low && value < least {
                    let allowed = format!(
                        "at least {least} mm for {strings} strings, which are {} mm apart then",
                        limits::STRING_GAP_MM
                    );
                    checker.fault(format_args!("instrument.spread_mm.{end}"), number_words(value), allowed);
                }
            }
        }
        (None, Some(_)) => {}
        (None, None) if strings == 1 => {}
        (None, None) => checker.fault(
            "instrument.spread_mm",
            "nothing",
            "centre distances of the outer strings, or across_mm with every string's place",
        ),
    }
}

fn places(checker: &mut Checker, across: &Across, strings: usize) {
    for (end, places_mm) in [("nut", &across.nut), ("saddle", &across.saddle)] {
        let path = format!("instrument.across_mm.{end}");
        if checker.sound_itself("strings") && places_mm.len() != strings {
            let found = format!("{} places", places_mm.len());
            checker.fault(&path, found, format!("one place a string, {strings} of them"));
        }
        for (index, &place_mm) in places_mm.iter().enumerate() {
            checker.range(format_args!("{path}[{index}]"), place_mm, &limits::ACROSS_MM);
        }
        for (index, pair) in places_mm.windows(2).enumerate() {
            if pair[0] - pair[1] < limits::STRING_GAP_MM {
                let found = format!(
                    "{} after {} of string {}",
                    number_words(pair[1]),
                    number_words(pair[0]),
                    index + 1
                );
                let allowed = format!(
                    "places that fall from string 1, the largest, by at least {} mm a string",
                    limits::STRING_GAP_MM
                );
                checker.fault(format_args!("{path}[{}]", index + 1), found, allowed);
            }
        }
    }
}

/// Lays the neck out where everything that it needs is sound.
pub(super) fn lay_out(checker: &mut Checker, instrument: &Instrument, strings: usize) -> Option<Neck> {
    let needed = [
        "instrument.scale_mm",
        "instrument.frets",
        "instrument.fret_positions_mm",
        "instrument.spread_mm",
        "instrument.across_mm",
    ];
    if !checker.sound(&needed) || !limits::STRINGS.contains(strings as f64) {
        return None;
    }
    let shape = shape(instrument, strings);
    if let Some(slope) = steepest(instrument, &shape)
        && slope > limits::SIDEWAYS_FRACTION
    {
        let path =
            if instrument.across_mm.is_some() { "instrument.across_mm" } else { "instrument.spread_mm" };
        let found = format!("a string that runs sideways by {slope:.2} of its scale");
        checker.fault(path, found, format!("at most {} of the scale", limits::SIDEWAYS_FRACTION));
        return None;
    }
    let neck = match crestline_physics::neck::lay_out(&shape) {
        Ok(neck) => neck,
        Err(error) => {
            checker.fault("instrument", error, "a neck whose strings and frets cross");
            return None;
        }
    };
    let fan_is_sane = match &instrument.scale {
        Scale::Fanned(fan) => fan_slant(checker, &neck, fan),
        Scale::Single(_) => true,
    };
    fan_is_sane.then_some(neck)
}

/// What the physics lays a neck out from.
fn shape(instrument: &Instrument, strings: usize) -> NeckShape {
    let scale = match instrument.scale {
        Scale::Single(scale_mm) => {
            NeckScale::Single { scale_mm, fret_positions_mm: instrument.fret_positions_mm.clone() }
        }
        Scale::Fanned(fan) => {
            NeckScale::Fanned { bass_mm: fan.bass, treble_mm: fan.treble, square_fret: fan.square_fret }
        }
    };
    let across = instrument.across(strings);
    // Within 12 to 36 by the checks before.
    let frets = instrument.frets as usize;
    NeckShape { scale, frets, nut_y_mm: across.nut, saddle_y_mm: across.saddle }
}

/// Greatest sideways run of a string from nut to saddle as a fraction of the shorter scale.
fn steepest(instrument: &Instrument, shape: &NeckShape) -> Option<f64> {
    let scale_mm = match instrument.scale {
        Scale::Single(scale_mm) => scale_mm,
        Scale::Fanned(fan) => fan.bass.min(fan.treble),
    };
    std::iter::zip(&shape.nut_y_mm, &shape.saddle_y_mm)
        .map(|(nut, saddle)| (saddle - nut).abs() / scale_mm)
        .reduce(f64::max)
}

fn fan_slant(checker: &mut Checker, neck: &Neck, fan: &Fan) -> bool {
    let (Some(treble), Some(bass)) = (neck.strings.first(), neck.strings.last()) else { return true };
    let ends = [("nut", treble.line.nut, bass.line.nut), ("saddle", treble.line.saddle, bass.line.saddle)];
    let mut sane = true;
    for (name, treble, bass) in ends {
        let slant = (bass.x_mm - treble.x_mm).atan2(treble.y_mm - bass.y_mm).to_degrees();
        if slant.abs() > limits::FAN_SLANT_DEGREES {
            let found =
                format!("a {name} line that slants by {:.1}° (fret {} square)", slant.abs(), fan.square_fret);
            let allowed = format!("a slant of at most {}°", limits::FAN_SLANT_DEGREES);
            checker.fault("instrument.scale_mm", found, allowed);
            sane = false;
        }
    }
    sane
}

impl Instrument {
    /// The y of every string at the nominal nut and saddle lines, mm, string 1 first: as given by `across_mm`, else
    /// spaced equally over `spread_mm`; a single string without either lies on the centre line.
    #[must_use]
    pub fn across(&self, strings: usize) -> Across {
        match (&self.across_mm, &self.spread_mm) {
            (Some(across), _) => across.clone(),
            (None, Some(spread)) => Across {
                nut: equal_spacing_mm(strings, spread.nut),
                saddle: equal_spacing_mm(strings, spread.saddle),
            },
            (None, None) => Across { nut: vec![0.0; strings], saddle: vec![0.0; strings] },
        }
    }
}
