//! The key `instrument`.

use super::spot::Spot;
use crate::{Across, Fan, Instrument, Scale, Spread, defaults, limits};

const KEYS: &[&str] = &[
    "scale_mm",
    "frets",
    "fret_positions_mm",
    "zero_fret",
    "relief_mm",
    "spread_mm",
    "across_mm",
    "fret_height_mm",
];

pub(super) fn instrument(spot: &Spot) -> Instrument {
    let fields = spot.object(KEYS);
    Instrument {
        scale: scale(&fields.get("scale_mm")),
        frets: fields.get("frets").count(&format!("a whole number, {}", limits::FRETS.words())),
        fret_positions_mm: fields
            .get("fret_positions_mm")
            .optional(|spot| spot.numbers(&limits::FRET_POSITION_MM)),
        zero_fret: fields.get("zero_fret").flag_or(false),
        relief_mm: fields.get("relief_mm").number_or(&limits::RELIEF_MM, defaults::RELIEF_MM),
        spread_mm: fields.get("spread_mm").optional(spread),
        across_mm: fields.get("across_mm").optional(across),
        fret_height_mm: fields
            .get("fret_height_mm")
            .number_or(&limits::FRET_HEIGHT_MM, defaults::FRET_HEIGHT_MM),
    }
}

fn scale(spot: &Spot) -> Scale {
    if spot.is_object() {
        let fields = spot.object(&["bass", "treble", "square_fret"]);
        return Scale::Fanned(Fan {
            bass: fields.get("bass").number(&limits::SCALE_MM),
            treble: fields.get("treble").number(&limits::SCALE_MM),
            square_fret: fields.get("square_fret").number(&limits::SQUARE_FRET),
        });
    }
    let allowed =
        format!("a number, {}, or an object with bass, treble and square_fret", limits::SCALE_MM.words());
    Scale::Single(spot.number_else(&allowed))
}

fn spread(spot: &Spot) -> Spread {
    let fields = spot.object(&["nut", "saddle"]);
    Spread {
        nut: fields.get("nut").number(&limits::SPREAD_MM),
        saddle: fields.get("saddle").number(&limits::SPREAD_MM),
    }
}

fn across(spot: &Spot) -> Across {
    let fields = spot.object(&["nut", "saddle"]);
    Across {
        nut: fields.get("nut").numbers(&limits::ACROSS_MM),
        saddle: fields.get("saddle").numbers(&limits::ACROSS_MM),
    }
}
