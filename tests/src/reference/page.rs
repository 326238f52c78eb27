//! The page of documentation that tells how far plans lie from the reference.
//!
//! The figures on the page are upper bounds, up to a few times what was measured, so that another machine's last digits
//! do not change it. A bound on the page stands as long as what is measured does not exceed it and is no less
//! than a tenth of it; otherwise the page is out of date.

use std::collections::BTreeMap;
use std::fs;

use super::coverage::Coverage;
use super::tally::Figures;
use crate::places::{assert_page, top};

const PAGE: &str = "crates/physics/doc/reference.md";

/// A bound written anew is this many times what was measured, and then rounded up to one digit.
const ROOM: f64 = 2.0;
/// How far below its bound a figure may lie.
const STALE: f64 = 10.0;
/// Smaller figures are rounding, and may be anything down to zero.
const ROUNDING: f64 = 1e-15;

const HEAD: &str = "# Whole plans against an independent computation

`tests/reference` computes whole plans in Python, with other methods and no code in common (its README says how), and
keeps its results. `cargo test -p crestline-tests reference:: -- --show-output` solves the same plans, compares every number and prints the
measured differences. This page is held by the same test: every measured figure is at most the one given here and at least a tenth of it,
so that the page neither flatters nor grows old. To write it anew: `CRESTLINE_WRITE=1 cargo test -p crestline-tests reference::`.

Plans are random legal ones from a fixed seed: six families of instruments, one to eight strings, 12 to 29 frets, with and without
relief, slip, targets and measured values.
";

const FIGURES: &str = "
## Differences

| what | count | median below | 99 % below | largest below | allowed |
| --- | ---: | ---: | ---: | ---: | ---: |
";

const AFTER: &str = "
Lengths and cents of the results are kept to 1e-7, which is what the first rows show. Ideal setbacks are determined by the errors alone; built ones of
several strings together hang on a flat optimum, and both sides stop within a fraction of a micrometre of it. Where the smallest largest error leaves
crests open, only that error is compared. Setbacks are cut to a tenth of a millimetre and cents are read to a tenth, a hundred times what is allowed here.

## Plans

The columns split the plans of each row once by kind of neck and once by supports; a zero fret comes on top. Every rule, saddle and nut occurs with every kind of
supports, and every kind of neck with every two of the others; a test holds that too. \"Runs on\" is ½, ½, ½ at nut, fret and saddle, \"clamped saddle\" 0, 0, 1.

";

/// The bounds of the page as it is kept, by the name of what is compared.
fn kept() -> BTreeMap<String, Vec<String>> {
    let text = fs::read_to_string(top().join(PAGE)).unwrap_or_default();
    let (_, table) = text.split_once("## Differences").unwrap_or_default();
    let rows = table.lines().filter_map(|line| line.strip_prefix("| ")?.strip_suffix(" |"));
    let cells = rows.map(|row| row.split(" | ").map(str::to_owned).collect::<Vec<_>>());
    cells.filter(|cells| cells.len() == 6).map(|cells| (cells[0].clone(), cells[2..5].to_vec())).collect()
}

/// The bound of the page where it still stands, or a new one; never more than what is allowed.
fn bound(measured: f64, kept: Option<&String>, limit: f64) -> String {
    if let Some(text) = kept
        && let Ok(bound) = text.parse::<f64>()
        && measured <= bound
        && bound <= (STALE * measured).max(ROUNDING).min(limit)
    {
        return text.clone();
    }
    let wanted = (ROOM * measured).max(ROUNDING);
    let unit = 10f64.powf(wanted.log10().floor());
    format!("{:.0e}", ((wanted / unit).ceil() * unit).min(limit))
}

/// Compares the page with the figures of this run.
pub fn assert_reference_page(figures: &[Figures], coverage: &Coverage) {
    let kept = kept();
    let mut text = format!("{HEAD}{FIGURES}");
    for row in figures {
        let bounds = kept.get(row.name);
        let mut cells = vec![row.name.to_owned(), row.count.to_string()];
        for (index, measured) in row.measured.iter().enumerate() {
            cells.push(bound(*measured, bounds.and_then(|bounds| bounds.get(index)), row.limit));
        }
        cells.push(format!("{:e}", row.limit));
        text.push_str(&format!("| {} |\n", cells.join(" | ")));
    }
    text.push_str(AFTER);
    text.push_str(&coverage.table());
    assert_page(PAGE, &text);
}

#[test]
fn a_bound_stands_from_once_to_ten_times_what_was_measured() {
    let kept = |text: &str| Some(text.to_owned());
    assert_eq!(bound(2.0e-5, kept("2e-5").as_ref(), 1.0), "2e-5");
    assert_eq!(bound(2.1e-6, kept("2e-5").as_ref(), 1.0), "2e-5");
    assert_eq!(bound(2.1e-5, kept("2e-5").as_ref(), 1.0), "5e-5");
    assert_eq!(bound(1.9e-6, kept("2e-5").as_ref(), 1.0), "4e-6");
    assert_eq!(bound(0.0, kept("1e-15").as_ref(), 1.0), "1e-15");
    assert_eq!(bound(0.0, None, 1.0), "1e-15");
    assert_eq!(bound(4.9e-3, None, 1.0), "1e-2");
    assert_eq!(bound(8e-4, kept("2e-3").as_ref(), 1e-3), "1e-3");
}
