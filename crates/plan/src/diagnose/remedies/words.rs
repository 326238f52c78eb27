//! Amounts in words.

/// `string 3`, `strings 1, 2 and 4`.
pub(crate) fn strings_words(strings: &[u32]) -> String {
    let numbers: Vec<String> = strings.iter().map(u32::to_string).collect();
    match numbers.as_slice() {
        [] => "no string".to_owned(),
        [one] => format!("string {one}"),
        [before @ .., last] => format!("strings {} and {last}", before.join(", ")),
    }
}

/// `string 2: +0.35 mm, string 3: −0.10 mm`; amounts one a string named.
pub(super) fn amounts_words(strings: &[u32], amounts_mm: &[f64], signed: bool) -> String {
    let amount = |mm: f64| if signed { signed_mm(mm) } else { format!("{:.2} mm", mm.abs()) };
    let parts: Vec<String> = strings
        .iter()
        .zip(amounts_mm)
        .map(|(string, &mm)| format!("string {string} {}", amount(mm)))
        .collect();
    parts.join(", ")
}

/// `+0.35 mm` or `−0.35 mm`.
pub(super) fn signed_mm(mm: f64) -> String {
    let sign = if mm < 0.0 { '−' } else { '+' };
    format!("{sign}{:.2} mm", mm.abs())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lists_read_as_people_write_them() {
        assert_eq!(strings_words(&[3]), "string 3");
        assert_eq!(strings_words(&[1, 2, 4]), "strings 1, 2 and 4");
        assert_eq!(amounts_words(&[2, 3], &[0.351, -0.1], true), "string 2 +0.35 mm, string 3 −0.10 mm");
        assert_eq!(amounts_words(&[5], &[-0.25], false), "string 5 0.25 mm");
    }
}
