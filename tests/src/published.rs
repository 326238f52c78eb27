//! Values from papers, standards, handbooks and the trade.
//!
//! Beside each value stands where it is from and how it was come by, see [`record::By`]. The checks write what they
//! compare into a record, and `page` makes the page `crates/physics/doc/published.md` of it.

/// The checks of a room with their names, in the order of its file.
macro_rules! checks {
    ($($name:ident),* $(,)?) => {
        pub const CHECKS: &[(&str, fn())] = &[$((stringify!($name), $name as fn())),*];
    };
}

mod drawings;
mod frets_and_stretch;
mod hearing;
mod materials;
mod page;
mod record;
mod stiff_strings;
mod tension_and_mass;
mod trade;

use record::{By, assert_apart, assert_between, assert_near, origin};

/// A file of checks.
struct Room {
    title: &'static str,
    source: &'static str,
    checks: &'static [(&'static str, fn())],
}

/// All rooms, in the order of the page.
const ROOMS: &[Room] = &[
    Room {
        title: "Stiff strings",
        source: include_str!("published/stiff_strings.rs"),
        checks: stiff_strings::CHECKS,
    },
    Room {
        title: "Pitch, tension and mass",
        source: include_str!("published/tension_and_mass.rs"),
        checks: tension_and_mass::CHECKS,
    },
    Room {
        title: "Frets and stretch",
        source: include_str!("published/frets_and_stretch.rs"),
        checks: frets_and_stretch::CHECKS,
    },
    Room { title: "Materials", source: include_str!("published/materials.rs"), checks: materials::CHECKS },
    Room {
        title: "Hearing and measuring",
        source: include_str!("published/hearing.rs"),
        checks: hearing::CHECKS,
    },
    Room { title: "The trade", source: include_str!("published/trade.rs"), checks: trade::CHECKS },
    Room {
        title: "Drawings and files",
        source: include_str!("published/drawings.rs"),
        checks: drawings::CHECKS,
    },
];

/// An inch in millimetres, by definition.
const INCH_MM: f64 = 25.4;
/// A pound-force in newtons, by definition.
const POUND_N: f64 = 4.448_221_615_260_5;
/// A thousand pounds-force on a square inch in megapascals, by definition.
const KSI_MPA: f64 = 6.894_757_293_168;

/// A ratio of frequencies as an interval in cents.
fn cents(ratio: f64) -> f64 {
    1200.0 * ratio.log2()
}
