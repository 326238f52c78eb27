//! Fret positions, the effect of a setback, and the stretch of a pressed string.

use crestline_physics::fretting::{Fixities, NutHeight, Pressing, Tail};
use crestline_physics::neck::{NeckScale, NeckShape, fret_fraction, lay_out};
use crestline_physics::path::{SidePoint, taut_path};
use crestline_physics::{Contacts, FrettedString, StringProperties, StringSetup};

use super::{By, INCH_MM, assert_near, cents, origin};

checks![
    frets_stand_in_equal_temperament,
    a_millimetre_of_setback_lowers_the_octave,
    a_neck_by_the_rule_of_eighteen_is_flat_at_the_octave,
    pressing_stretches_a_string_as_the_triangle_says,
];

/// Positions on the centre line, from the frets of a string that lies on it.
fn positions_mm(scale_mm: f64, measured: Option<Vec<f64>>) -> Vec<f64> {
    let shape = NeckShape {
        scale: NeckScale::Single { scale_mm, fret_positions_mm: measured },
        frets: 20,
        nut_y_mm: vec![0.0],
        saddle_y_mm: vec![0.0],
    };
    lay_out(&shape).expect("a legal neck").strings[0].fret_mm.clone()
}

/// Equal temperament, computed: the divisor 17.8171537451 and positions of frets 1, 5, 7, 12 and 19.
#[test]
fn frets_stand_in_equal_temperament() {
    origin("Equal temperament", By::Computed);
    assert_near(1.0 / fret_fraction(1.0), 17.817_153_745_1, 1e-9, "divisor");
    let metric = [(1, 36.481_696_8), (5, 163.0502), (7, 216.177_047), (12, 325.0), (19, 433.088_524)];
    let found = positions_mm(650.0, None);
    for (fret, expected) in metric {
        // To the last digit of the shortest.
        assert_near(found[fret - 1], expected, 0.00005, &format!("fret {fret} of 650 mm, mm"));
    }
    let inches = [(1, 1.431_205), (5, 6.396_585), (7, 8.480_792), (12, 12.75), (19, 16.9904)];
    let found = positions_mm(25.5 * INCH_MM, None);
    for (fret, expected) in inches {
        assert_near(found[fret - 1] / INCH_MM, expected, 0.00005, &format!("fret {fret} of 25.5 in, in"));
    }
}

/// A string so thin and so near the frets that only its lengths count.
fn bare_string(scale_mm: f64, fret_mm: Vec<f64>) -> FrettedString {
    const NEAR_MM: f64 = 1e-6;
    let octaves = (1..=fret_mm.len()).map(|fret| fret as f64 / 12.0).collect();
    FrettedString::new(StringSetup {
        properties: StringProperties {
            unit_mass_kg_per_m: 4e-4,
            axial_stiffness_n: 1e4,
            bending_stiffness_n_mm2: 0.0,
        },
        frequency_hz: 329.6,
        scale_mm,
        fret_mm,
        relief_mm: 0.0,
        nut_height: NutHeight::GapAtFirst(NEAR_MM),
        gap_at_twelfth_mm: NEAR_MM,
        pressing: Pressing { finger_fraction: 0.33, depth_mm: 0.0 },
        fixities: Fixities { nut: 0.0, fret: 0.0, saddle: 0.0 },
        head: Tail::default(),
        tail: Tail::default(),
        target_octaves: octaves,
    })
    .expect("a legal string")
}

fn octave_error_cents(string: &FrettedString, saddle_setback_mm: f64) -> f64 {
    let contacts = Contacts { saddle_setback_mm, nut_setback_mm: 0.0 };
    string.notes(contacts).expect("a legal string")[11].error_cents
}

/// One millimetre of saddle setback lowers the twelfth fret's note against the open string by this many cents
/// (computed, ideal string).
#[test]
fn a_millimetre_of_setback_lowers_the_octave() {
    origin("Ideal string, one millimetre of saddle setback", By::Computed);
    // The string stands 1e-6 mm above the crowns, and stretches by far less than the digits given.
    const LAST_DIGIT_CENTS: f64 = 1e-7;
    for (scale_mm, lowered) in
        [(650.0, 2.657_305_3), (647.7, 2.666_719_6), (864.0, 2.000_270_6), (330.0, 5.222_429_4)]
    {
        let string = bare_string(scale_mm, positions_mm(scale_mm, None));
        let found = octave_error_cents(&string, 0.0) - octave_error_cents(&string, 1.0);
        assert_near(found, lowered, LAST_DIGIT_CENTS, &format!("octave of {scale_mm} mm, cents lower"));
    }
}

/// A neck laid out with the divisor 18 puts fret 12 of 650 mm at 322.636 mm (computed), so that its octave is flat.
#[test]
fn a_neck_by_the_rule_of_eighteen_is_flat_at_the_octave() {
    origin("A neck laid out with the divisor 18", By::Computed);
    let mut left_mm = 650.0;
    let mut measured = Vec::new();
    for _ in 0..20 {
        left_mm -= left_mm / 18.0;
        measured.push(650.0 - left_mm);
    }
    let placed = positions_mm(650.0, Some(measured));
    assert_near(placed[11], 322.636, 0.0005, "fret 12 of 650 mm, mm");
    let flat = octave_error_cents(&bare_string(650.0, placed), 0.0);
    // From the position given to 0.0005 mm, half its last digit, at 5.3 cents a millimetre.
    assert_near(flat, cents(650.0 / (650.0 - 322.636) / 2.0), 0.003, "octave of the ideal string, cents");
}

/// Stretch of a string from (0, 0.5) over a fret at (x, 0) to (650, 4.0) mm, computed.
#[test]
fn pressing_stretches_a_string_as_the_triangle_says() {
    origin("Stretch from (0, 0.5) over a fret at (x, 0) to (650, 4.0) mm", By::Computed);
    const LAST_DIGIT_MM: f64 = 1e-9;
    let (nut, crest) = (SidePoint { s_mm: 0.0, z_mm: 0.5 }, SidePoint { s_mm: 650.0, z_mm: 4.0 });
    let stretch = |fret: f64| {
        let crown = SidePoint { s_mm: 650.0 * fret_fraction(fret), z_mm: 0.0 };
        let excess = |a, b| taut_path(a, &[], b).excess_mm;
        excess(nut, crown) + excess(crown, crest) - excess(nut, crest)
    };
    for (fret, expected) in [
        (1.0, 0.007_042_613),
        (3.0, 0.006_421_879),
        (5.0, 0.007_772_146),
        (12.0, 0.015_576_059),
        (19.0, 0.027_743_886),
    ] {
        assert_near(stretch(fret), expected, LAST_DIGIT_MM, &format!("fret {fret}, mm"));
    }
    assert!(stretch(1.0) > stretch(3.0), "the first fret stretches more than the third");
}
