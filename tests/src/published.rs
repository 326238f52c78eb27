//! Values from papers, standards, handbooks and the trade.
//!
//! Beside each value stands where it is from and how it was come by: *read* in the source, *second-hand* in a
//! text that quotes the source, from *memory* (with how surely), *computed* from a definition or an exact
//! equation with 30-digit arithmetic, or *common practice* of the trade.

mod frets_and_stretch;
mod materials;
mod stiff_strings;
mod tension_and_mass;
mod trade;

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

/// Fails where a value is farther from the expected one than allowed, with all three in the message.
#[track_caller]
fn assert_near(found: f64, expected: f64, tolerance: f64, what: &str) {
    let off = (found - expected).abs();
    assert!(off <= tolerance, "{what}: found {found}, expected {expected} within {tolerance}");
}
