//! Whole plans against an independent computation in Python, see `tests/reference/README.md`.
//!
//! The plans are random legal ones of every style and rule. What is compared, with the median, the 99 % point and
//! the largest difference, is printed as a table by `cargo test -p crestline-tests reference:: -- --show-output`.

mod compared;
mod coverage;
mod page;
mod sets;
mod tally;

use serde_json::Value;

use crate::places::{files_under, text_of, top};
use compared::Compared;
use coverage::Coverage;
use page::assert_reference_page;

/// A cut saddle is laid out to a tenth of a millimetre, and a hundredth is printed: a tenth of that again.
const LENGTH_MM: f64 = 0.001;
/// Cents are printed to a tenth, and a strobe tuner shows a tenth: a hundredth of that.
const ERROR_CENTS: f64 = 0.001;
/// The results hold twelve digits of what is computed directly.
const RELATIVE: f64 = 1e-9;
/// Finger forces are printed to a tenth of a newton: a hundredth of that.
const FORCE_N: f64 = 0.001;

/// The fewest plans that must be there, so that an empty folder does not pass.
const FEWEST_PLANS: usize = 300;

fn json(path: &std::path::Path) -> Value {
    serde_json::from_str(&text_of(path)).unwrap_or_else(|error| panic!("{}: {error}", path.display()))
}

#[test]
fn plans_come_out_as_computed_independently() {
    let folder = top().join("tests/reference");
    let results = files_under(&folder.join("results"), "json");
    assert!(results.len() >= FEWEST_PLANS, "only {} results are there", results.len());
    let mut compared = Compared::new();
    let (mut coverage, mut refused) = (Coverage::default(), Vec::new());
    for path in &results {
        let expected = json(path);
        let plan_path = folder.join(expected["plan"].as_str().expect("a result names its plan"));
        let name = plan_path.file_stem().and_then(|stem| stem.to_str()).unwrap_or_default();
        coverage.add(&json(&plan_path));
        match report(&text_of(&plan_path)) {
            Ok(found) => compared.plan(name, &found, &expected),
            Err(faults) => refused.push(format!("plan {name} is refused: {}", faults.join("; "))),
        }
    }
    let figures = compared.figures();
    println!("{} plans: count, median, 99 %, largest, allowed", results.len());
    for row in &figures {
        println!("{}", row.row());
    }
    let complaints: Vec<_> =
        refused.into_iter().chain(compared.complaints()).chain(coverage.missing()).collect();
    assert!(complaints.is_empty(), "{}", complaints.join("\n"));
    assert_reference_page(&figures, &coverage);
}

/// The report of a plan as JSON, or its faults.
fn report(text: &str) -> Result<Value, Vec<String>> {
    let solution = crestline_plan::read(text)
        .and_then(|plan| crestline_plan::check(&plan))
        .and_then(|checked| crestline_plan::solve(&checked));
    let solution = solution.map_err(|faults| faults.iter().map(ToString::to_string).collect::<Vec<_>>())?;
    Ok(serde_json::to_value(&solution.report).expect("a report can be written"))
}
