//! The keys beside instrument and strings: pressing, supports, slip, fit, targets, saddle, nut, what is built,
//! readings and sheet.

use super::spot::Spot;
use crate::{
    AsBuilt, Datum, Fit, FitRule, Nut, NutStyle, Paper, Pressing, Reading, ReadingKind, Saddle, SaddleStyle,
    Sheet, Slip, Supports, Targets, Units, defaults, limits,
};

const SADDLE_KEYS: &[&str] =
    &["style", "thickness_mm", "edge_margin_mm", "end_margin_mm", "split_after", "travel_mm"];

pub(super) fn pressing(spot: &Spot) -> Pressing {
    let fields = spot.object(&["finger_fraction", "depth_mm"]);
    Pressing {
        finger_fraction: fields.get("finger_fraction").number(&limits::FINGER_FRACTION),
        depth_mm: fields.get("depth_mm").number(&limits::PRESS_DEPTH_MM),
    }
}

pub(super) fn supports(spot: &Spot) -> Supports {
    let fields = spot.object(&["nut", "fret", "saddle"]);
    Supports {
        nut: fields.get("nut").number(&limits::FIXITY),
        fret: fields.get("fret").number(&limits::FIXITY),
        saddle: fields.get("saddle").number(&limits::FIXITY),
    }
}

pub(super) fn slip(spot: &Spot) -> Slip {
    let fields = spot.object(&["head", "tail"]);
    Slip { head: fields.get("head").number(&limits::SLIP), tail: fields.get("tail").number(&limits::SLIP) }
}

pub(super) fn fit(spot: &Spot) -> Fit {
    let fields = spot.object(&["rule", "frets"]);
    let rule = fields.get("rule").word(FitRule::LeastSquares);
    let frets = fields.get("frets").array("two fret numbers, the first and the last", 0, |spot| {
        spot.count("a fret number, 1 to the number of frets")
    });
    Fit { rule, frets }
}

pub(super) fn targets(spot: &Spot) -> Targets {
    let fields = spot.object(&["open_cents", "pitch_class_cents"]);
    let allowed = format!("twelve numbers, C first, {}", limits::TARGET_CENTS.words());
    Targets {
        open_cents: fields.get("open_cents").numbers(&limits::TARGET_CENTS),
        pitch_class_cents: fields
            .get("pitch_class_cents")
            .array(&allowed, f64::NAN, |spot| spot.number(&limits::TARGET_CENTS)),
    }
}

pub(super) fn saddle(spot: &Spot) -> Saddle {
    let fields = spot.object(SADDLE_KEYS);
    let otherwise = Saddle::of_style(SaddleStyle::Separate);
    Saddle {
        style: fields.get("style").word(otherwise.style),
        thickness_mm: fields
            .get("thickness_mm")
            .number_or(&limits::BLANK_THICKNESS_MM, otherwise.thickness_mm),
        edge_margin_mm: fields
            .get("edge_margin_mm")
            .number_or(&limits::EDGE_MARGIN_MM, otherwise.edge_margin_mm),
        end_margin_mm: fields.get("end_margin_mm").number_or(&limits::END_MARGIN_MM, otherwise.end_margin_mm),
        split_after: fields
            .get("split_after")
            .optional(|spot| spot.count("a string number, 1 to one less than the number of strings")),
        travel_mm: travel(&fields.get("travel_mm"), &limits::SADDLE_TRAVEL_MM, otherwise.travel_mm),
    }
}

pub(super) fn nut(spot: &Spot) -> Nut {
    let fields = spot.object(&["style", "travel_mm"]);
    Nut {
        style: fields.get("style").word(NutStyle::Plain),
        travel_mm: travel(&fields.get("travel_mm"), &limits::NUT_TRAVEL_MM, defaults::NUT_TRAVEL_MM),
    }
}

fn travel(spot: &Spot, range: &limits::Range, otherwise: [f64; 2]) -> [f64; 2] {
    spot.if_given(|spot| spot.ends(range)).unwrap_or(otherwise)
}

pub(super) fn as_built(spot: &Spot) -> AsBuilt {
    let fields = spot.object(&["saddle_setback_mm", "nut_setback_mm"]);
    AsBuilt {
        saddle_setback_mm: fields.get("saddle_setback_mm").numbers(&limits::AS_BUILT_SADDLE_MM),
        nut_setback_mm: fields.get("nut_setback_mm").numbers(&limits::AS_BUILT_NUT_MM),
    }
}

pub(super) fn reading(spot: &Spot) -> Reading {
    let fields = spot.object(&["string", "fret", "kind", "cents"]);
    Reading {
        string: fields.get("string").count("a string number, 1 to the number of strings"),
        fret: fields.get("fret").count("a fret number, 0 to the number of frets"),
        kind: fields.get("kind").word(ReadingKind::Fretted),
        cents: fields.get("cents").number(&limits::READING_CENTS),
    }
}

pub(super) fn sheet(spot: &Spot) -> Sheet {
    let fields = spot.object(&["paper", "units", "datum"]);
    Sheet {
        paper: fields.get("paper").word(Paper::A4),
        units: fields.get("units").word(Units::Mm),
        datum: fields.get("datum").word(Datum::Nut),
    }
}
