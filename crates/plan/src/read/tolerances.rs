//! The key `tolerances`.

use super::spot::{Fields, Spot};
use crate::limits::tolerance as most;
use crate::{
    MakingTolerance, NeckTolerance, OwnTolerance, PressingTolerance, Slip, StringTolerance, Supports,
    Tolerances,
};

const KEYS: &[&str] = &[
    "seed",
    "samples",
    "limit_cents",
    "reference_cents",
    "neck",
    "pressing",
    "supports",
    "slip",
    "making",
    "plain",
    "wound",
    "polymer",
    "strings",
];

const STRING_KEYS: &[&str] = &[
    "core_diameter_mm",
    "modulus_fraction",
    "mass_fraction",
    "measured_mass_fraction",
    "measured_stiffness_fraction",
    "pitch_cents",
    "action_first_mm",
    "action_twelfth_mm",
];

const OWN_KEYS: &[&str] = &[
    "string",
    "core_diameter_mm",
    "modulus_fraction",
    "mass_fraction",
    "measured_mass_fraction",
    "measured_stiffness_fraction",
    "pitch_cents",
    "action_first_mm",
    "action_twelfth_mm",
];

pub(super) fn tolerances(spot: &Spot) -> Tolerances {
    let fields = spot.object(KEYS);
    let otherwise = Tolerances::default();
    let of_kind = |key: &str, otherwise: &StringTolerance| {
        let read = |spot: &Spot| own(&spot.object(STRING_KEYS)).over(otherwise);
        fields.get(key).if_given(read).unwrap_or(*otherwise)
    };
    Tolerances {
        seed: fields
            .get("seed")
            .if_given(|spot| spot.count("a whole number, 0 to 4294967295"))
            .unwrap_or(otherwise.seed),
        samples: fields
            .get("samples")
            .if_given(|spot| spot.count(&format!("a whole number, {}", most::SAMPLES.words())))
            .unwrap_or(otherwise.samples),
        limit_cents: fields.get("limit_cents").number_or(&most::LIMIT_CENTS, otherwise.limit_cents),
        reference_cents: fields
            .get("reference_cents")
            .number_or(&most::PITCH_CENTS, otherwise.reference_cents),
        neck: neck(&fields.get("neck"), otherwise.neck),
        pressing: pressing(&fields.get("pressing"), otherwise.pressing),
        supports: supports(&fields.get("supports"), otherwise.supports),
        slip: slip(&fields.get("slip"), otherwise.slip),
        making: making(&fields.get("making"), otherwise.making),
        plain: of_kind("plain", &otherwise.plain),
        wound: of_kind("wound", &otherwise.wound),
        polymer: of_kind("polymer", &otherwise.polymer),
        strings: fields
            .get("strings")
            .if_given(|spot| spot.list("a list of strings' own tolerances", |spot, _| of_string(spot)))
            .unwrap_or_default(),
    }
}

/// What `read` makes of an object, or `otherwise` where the file has none.
fn part<T>(spot: &Spot, keys: &'static [&'static str], otherwise: T, read: impl FnOnce(Fields) -> T) -> T {
    spot.if_given(|spot| read(spot.object(keys))).unwrap_or(otherwise)
}

fn neck(spot: &Spot, otherwise: NeckTolerance) -> NeckTolerance {
    part(spot, &["relief_mm", "scale_mm", "fret_mm"], otherwise, |fields| NeckTolerance {
        relief_mm: fields.get("relief_mm").number_or(&most::RELIEF_MM, otherwise.relief_mm),
        scale_mm: fields.get("scale_mm").number_or(&most::SCALE_MM, otherwise.scale_mm),
        fret_mm: fields.get("fret_mm").number_or(&most::FRET_MM, otherwise.fret_mm),
    })
}

fn pressing(spot: &Spot, otherwise: PressingTolerance) -> PressingTolerance {
    part(spot, &["finger_fraction", "depth_fraction"], otherwise, |fields| PressingTolerance {
        finger_fraction: fields.get("finger_fraction").number_or(&most::FINGER, otherwise.finger_fraction),
        depth_fraction: fields
            .get("depth_fraction")
            .number_or(&most::DEPTH_FRACTION, otherwise.depth_fraction),
    })
}

fn supports(spot: &Spot, otherwise: Supports) -> Supports {
    part(spot, &["nut", "fret", "saddle"], otherwise, |fields| Supports {
        nut: fields.get("nut").number_or(&most::SUPPORT, otherwise.nut),
        fret: fields.get("fret").number_or(&most::SUPPORT, otherwise.fret),
        saddle: fields.get("saddle").number_or(&most::SUPPORT, otherwise.saddle),
    })
}

fn slip(spot: &Spot, otherwise: Slip) -> Slip {
    part(spot, &["head", "tail"], otherwise, |fields| Slip {
        head: fields.get("head").number_or(&most::SUPPORT, otherwise.head),
        tail: fields.get("tail").number_or(&most::SUPPORT, otherwise.tail),
    })
}

fn making(spot: &Spot, otherwise: MakingTolerance) -> MakingTolerance {
    part(spot, &["crest_mm", "nut_edge_mm"], otherwise, |fields| MakingTolerance {
        crest_mm: fields.get("crest_mm").number_or(&most::MAKING_MM, otherwise.crest_mm),
        nut_edge_mm: fields.get("nut_edge_mm").number_or(&most::MAKING_MM, otherwise.nut_edge_mm),
    })
}

fn of_string(spot: &Spot) -> OwnTolerance {
    let fields = spot.object(OWN_KEYS);
    let string = fields.get("string").count("a string number, 1 to the number of strings");
    OwnTolerance { string, ..own(&fields) }
}

fn own(fields: &Fields) -> OwnTolerance {
    OwnTolerance {
        string: 0,
        core_diameter_mm: fields.get("core_diameter_mm").number_if_any(&most::CORE_DIAMETER_MM),
        modulus_fraction: fields.get("modulus_fraction").number_if_any(&most::FRACTION),
        mass_fraction: fields.get("mass_fraction").number_if_any(&most::FRACTION),
        measured_mass_fraction: fields.get("measured_mass_fraction").number_if_any(&most::FRACTION),
        measured_stiffness_fraction: fields.get("measured_stiffness_fraction").number_if_any(&most::FRACTION),
        pitch_cents: fields.get("pitch_cents").number_if_any(&most::PITCH_CENTS),
        action_first_mm: fields.get("action_first_mm").number_if_any(&most::ACTION_MM),
        action_twelfth_mm: fields.get("action_twelfth_mm").number_if_any(&most::ACTION_MM),
    }
}
