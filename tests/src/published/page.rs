//! The page that lists every published value beside ours, made anew from the checks and compared with the one that is kept.

use std::fmt::Write;

use super::record::{Compared, Row, take};
use crate::places::assert_page;

const PAGE: &str = "crates/physics/doc/published.md";

const HEAD: &str = "# Published values beside ours

Every value from outside the project that a test holds the program against, written by the same checks
(`tests/src/published`). A value within what is allowed passes; the reason of each allowance stands beside the check.
Where a band is published, the difference is counted from its nearer end, and 0 is inside.

How a value was come by: *read* in the source; *abstract read*; *second-hand*, in a text that quotes the source; from
*memory*, with how surely; *computed* from a definition or an exact equation with 30-digit arithmetic; *common practice*
of the trade, without a source. A value from memory or common practice is a check of plausibility and never the only check of a thing.

To write the page anew: `CRESTLINE_WRITE=1 cargo test -p crestline-tests published::page`.
";

const DISAGREEMENTS: &str = "
## Where they disagree

The tests hold these too: each must lie outside what is published, or it is no longer listed here, and no farther
outside than allowed. Nothing in the program was adjusted to bring them nearer.
";

/// The whole page, from running every check in order.
fn page() -> String {
    let mut rooms = Vec::new();
    for room in super::ROOMS {
        drop(take());
        let mut compared = Vec::new();
        for (_, check) in room.checks {
            check();
            compared.append(&mut take());
        }
        compared.retain(|one| !one.rows.is_empty());
        rooms.push((room.title, compared));
    }
    let mut text = HEAD.to_owned();
    push_disagreements(&mut text, rooms.iter().flat_map(|(_, compared)| compared));
    for (title, compared) in &rooms {
        let _ = write!(text, "\n## {title}\n");
        for one in compared {
            push_source(&mut text, one);
        }
    }
    text
}

fn push_disagreements<'a>(text: &mut String, all: impl Iterator<Item = &'a Compared>) {
    text.push_str(DISAGREEMENTS);
    text.push_str("\n| value | published | ours | difference | allowed | origin | why |\n");
    text.push_str("| --- | ---: | ---: | ---: | ---: | --- | --- |\n");
    for one in all {
        for row in &one.rows {
            let Some(why) = &row.disagrees else { continue };
            let origin = format!("{}; {}", one.source, one.by.words());
            let _ = writeln!(text, "| {} | {} | {origin} | {why} |", row.what, figures(row).join(" | "));
        }
    }
}

fn push_source(text: &mut String, one: &Compared) {
    let _ = write!(text, "\n{}: **{}**\n\n", one.source, one.by.words());
    text.push_str(
        "| value | published | ours | difference | allowed |\n| --- | ---: | ---: | ---: | ---: |\n",
    );
    for row in &one.rows {
        let mark = if row.disagrees.is_some() { " (disagrees)" } else { "" };
        let _ = writeln!(text, "| {}{mark} | {} |", row.what, figures(row).join(" | "));
    }
}

/// Published, ours, difference and allowed as text. One unit of the last place is a tenth of the first digit of what
/// is allowed, or four digits of ours where nothing is: fine enough to see, and too coarse for rounding to show. Where much is
/// allowed of an ordinary number it is shown to hundredths.
fn figures(row: &Row) -> [String; 4] {
    let place = match row.allowed {
        allowed if allowed >= 0.1 && row.ours.abs() < 100.0 => -2,
        allowed if allowed > 0.0 => exponent(allowed) - 1,
        _ => exponent(row.ours) - 3,
    };
    let [low, high] = row.published;
    let published = match (low, high) {
        _ if low == high => shortest(low, place),
        (_, f64::INFINITY) => format!("over {}", shortest(low, place)),
        _ => format!("{} to {}", shortest(low, place), shortest(high, place)),
    };
    let off = row.off();
    let difference = match rounded(off, place) {
        zero if zero == "0" => zero,
        text if off > 0.0 => format!("+{text}"),
        text => text,
    };
    // What is allowed has a digit more where it is small: half a unit of a last place is often allowed.
    [
        published,
        rounded(row.ours, place),
        difference,
        shortest(row.allowed, place.min(exponent(row.allowed) - 1)),
    ]
}

/// The decimal exponent of a number's first digit; 0 for 0.
fn exponent(value: f64) -> i32 {
    if value == 0.0 { 0 } else { value.abs().log10().floor() as i32 }
}

/// A number to a decimal place (−2: hundredths), as a power of ten where it would be long; 0 where nothing is left.
fn rounded(value: f64, place: i32) -> String {
    let decimals = |from: i32| usize::try_from(from - place).unwrap_or(0);
    let exponent = exponent(value);
    let text = if value.abs() < 0.5 * 10f64.powi(place) {
        "0".to_owned()
    } else if (-4..6).contains(&exponent) {
        format!("{value:.*}", decimals(0))
    } else {
        format!("{value:.*e}", decimals(exponent))
    };
    if let Some(size) = text.strip_prefix('-') { format!("−{size}") } else { text }
}

/// As [`rounded`], without zeros at the end of the decimals.
fn shortest(value: f64, place: i32) -> String {
    let text = rounded(value, place);
    let (digits, power) = text.split_at(text.find('e').unwrap_or(text.len()));
    if digits.contains('.') {
        format!("{}{power}", digits.trim_end_matches('0').trim_end_matches('.'))
    } else {
        text
    }
}

#[test]
fn the_page_says_what_the_checks_find() {
    assert_page(PAGE, &page());
}

/// The names of a room's tests in its source.
fn tests_in(source: &str) -> Vec<&str> {
    let after = source.split("#[test]").skip(1);
    after.filter_map(|rest| rest.split_once("fn ")?.1.split('(').next()).collect()
}

#[test]
fn no_check_is_left_out_of_the_page() {
    for room in super::ROOMS {
        let listed: Vec<_> = room.checks.iter().map(|(name, _)| *name).collect();
        assert!(!listed.is_empty(), "{} has checks", room.title);
        assert_eq!(tests_in(room.source), listed, "{}: tests in the file, and in its list", room.title);
    }
}

#[test]
fn figures_are_rounded_as_the_allowance_says() {
    assert_eq!(rounded(0.123_456, -3), "0.123");
    assert_eq!(rounded(34_039_700_000_000.0, 7), "3.403970e13");
    assert_eq!(shortest(0.000_01, -6), "1e-5");
    assert_eq!(shortest(0.5, -2), "0.5");
    assert_eq!(shortest(100.0, 0), "100");
    let row = Row { what: String::new(), published: [2.0, 2.5], ours: 1.786, allowed: 0.5, disagrees: None };
    assert_eq!(figures(&row), ["2 to 2.5", "1.79", "−0.21", "0.5"]);
    let exact = Row { published: [0.25; 2], ours: 0.25 + 1e-13, allowed: 1e-9, ..row };
    assert_eq!(figures(&exact), ["0.25", "0.2500000000", "0", "1e-9"]);
}
