//! The key `alternatives`.

use super::spot::Spot;
use super::strings;
use crate::{Alternative, OtherStrings, defaults, limits};

/// Reads the alternative at `spot`.
pub(super) fn alternative(spot: &Spot) -> Alternative {
    let fields = spot.object(&["name", "weight", "strings", "pitches"]);
    let other = match (fields.has("strings"), fields.has("pitches")) {
        (true, false) => {
            OtherStrings::Strings(fields.get("strings").list("a list of strings", strings::string))
        }
        (false, true) => {
            let pitches = fields.get("pitches");
            OtherStrings::Pitches(
                pitches.list("a list of pitches or null", |spot, _| spot.optional(strings::pitch)),
            )
        }
        (both, _) => {
            if spot.is_object() {
                let found = if both { "both strings and pitches" } else { "neither strings nor pitches" };
                spot.odd(found, "one of strings and pitches");
            }
            OtherStrings::Pitches(vec![])
        }
    };
    Alternative {
        name: fields.get("name").text_of("a name").unwrap_or_default().to_owned(),
        weight: fields.get("weight").number_or(&limits::ALTERNATIVE_WEIGHT, defaults::ALTERNATIVE_WEIGHT),
        other,
    }
}
