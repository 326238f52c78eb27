//! How setbacks and errors spread, against independent draws of whole plans, see `tests/reference/spread.py`. How far the
//! two lie apart is printed by `cargo test -p crestline-tests spread:: -- --show-output`.

use std::ops::ControlFlow;

use crestline_plan::{Band, check, read, uncertainty};
use serde_json::Value;

use crate::places::{files_under, text_of, top};

/// The independent draws have standard errors, which stand beside them. There are some 240 pairs of mean and deviation;
/// one sound figure in 16000 lies more than four standard errors away.
const STANDARD_ERRORS: f64 = 4.0;
/// What the sample itself may be off, as a part of the standard deviation: its 8192 draws are even, and even
/// independent ones would be off by 1.1 %.
const SAMPLE: f64 = 0.011;

/// How far apart a band and an independent mean and deviation are, in standard errors.
fn distances(band: &Band, [mean, sd, mean_error, sd_error]: [f64; 4]) -> [f64; 2] {
    let own = SAMPLE * band.sd;
    [(band.mean - mean).abs() / (mean_error + own), (band.sd - sd).abs() / (sd_error + own)]
}

fn number(value: &Value) -> f64 {
    value.as_f64().expect("a number")
}

#[test]
fn bands_agree_with_independent_draws() {
    let mut pairs = 0;
    for path in files_under(&top().join("tests/reference/spread"), "json") {
        let table: Value = serde_json::from_str(&text_of(&path)).expect("a table");
        let plan = read(&table["plan"].to_string()).unwrap_or_else(|faults| panic!("{faults:?}"));
        let checked = check(&plan).unwrap_or_else(|faults| panic!("{faults:?}"));
        let found = uncertainty(&checked, &mut |_| ControlFlow::Continue(())).unwrap().unwrap();
        assert_eq!(found.left_out, 0);
        let mut largest = [0.0_f64; 2];
        let mut hold = |words: String, band: &Band, expected: [f64; 4]| {
            let apart = distances(band, expected);
            for (largest, apart) in largest.iter_mut().zip(apart) {
                *largest = largest.max(apart);
                assert!(apart <= STANDARD_ERRORS, "{words}: {band:?} for {expected:?}");
            }
            pairs += 1;
        };
        for (string, found) in found.strings.iter().enumerate() {
            let entry = &table["setback_mm"][string];
            let expected = ["mean", "sd", "mean_error", "sd_error"].map(|key| number(&entry[key]));
            let band = found.saddle_setback_mm.as_ref().expect("a setback");
            hold(format!("setback of string {}", string + 1), band, expected);
            for (place, fret) in found.frets.iter().enumerate() {
                let entry = &table["error_cents"][string][place];
                let expected = [0, 1, 2, 3].map(|column| number(&entry[column]));
                let band = fret.error_cents.as_ref().expect("a note that sounds");
                hold(format!("string {}, fret {}", string + 1, place + 1), band, expected);
            }
        }
        println!(
            "{}: means within {:.1}, deviations within {:.1} standard errors",
            path.display(),
            largest[0],
            largest[1]
        );
    }
    assert!(pairs > 200, "only {pairs} figures were compared");
}
