//! Inches as decimals and fractions, in the text that a field shows and reads back.

/// The finest fraction of the trade's rules.
const FINEST: f64 = 64.0;
/// How far a number of 64ths may lie from a whole one and still be exact: well above the dust that twelve
/// significant digits leave on the longest scale, well below a micrometre.
const EXACT: f64 = 1e-6;

/// The shortest text that reads back as the same number.
pub fn exact_decimal(value: f64) -> String {
    format!("{value}")
}

/// The number to four decimals, without noughts at the end.
pub fn decimal(value: f64) -> String {
    let text = format!("{value:.4}");
    let short = text.trim_end_matches('0').trim_end_matches('.');
    if short == "-0" { "0".to_owned() } else { short.to_owned() }
}

/// Whole inches and a reduced fraction, where the number is an exact number of 64ths.
pub fn fraction(inches: f64) -> Option<String> {
    let parts = (inches.abs() * FINEST).round();
    // 2^53 is the largest number up to which every whole number is its own f64.
    if (inches.abs() * FINEST - parts).abs() > EXACT || parts > 9e15 {
        return None;
    }
    let (whole, mut over, mut under) = ((parts / FINEST).floor(), parts % FINEST, FINEST);
    while over > 0.0 && over % 2.0 == 0.0 {
        (over, under) = (over / 2.0, under / 2.0);
    }
    let sign = if inches < 0.0 && parts > 0.0 { "-" } else { "" };
    Some(match (whole > 0.0, over > 0.0) {
        (true, true) => format!("{sign}{whole} {over}/{under}"),
        (false, true) => format!("{sign}{over}/{under}"),
        _ => format!("{sign}{whole}"),
    })
}
