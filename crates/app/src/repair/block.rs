//! A block of cells from a spreadsheet.

use crestline_plan::limits::READING_CENTS;

use super::place::{Place, Sounded};
use crate::fields::parse;

/// Cents as they are typed in a cell; none for an empty one.
///
/// # Errors
/// Words that say what is wrong and what is allowed.
pub fn cents(text: &str) -> Result<Option<f64>, String> {
    let text = text.trim();
    if text.is_empty() {
        return Ok(None);
    }
    let cents = parse::number(text)?;
    if READING_CENTS.contains(cents) {
        Ok(Some(cents))
    } else {
        Err(format!("{text}; allowed: {}", READING_CENTS.words()))
    }
}

/// What a pasted block does to the grid.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Filling {
    /// Cells with what goes into them; none empties a cell.
    pub cells: Vec<(Place, Option<f64>)>,
    /// Cells of the block that are no readings, as they stand there.
    pub refused: Vec<String>,
    /// Cells of the block that reach beyond the grid.
    pub outside: usize,
}

impl Filling {
    /// What was passed over, in words; none where everything fits.
    #[must_use]
    pub fn remark(&self) -> Option<String> {
        let mut parts = Vec::new();
        if let Some(first) = self.refused.first() {
            parts.push(format!("{} no readings, such as {first}", self.refused.len()));
        }
        if self.outside > 0 {
            parts.push(format!("{} beyond the grid", self.outside));
        }
        (!parts.is_empty()).then(|| format!("Cells passed over: {}.", parts.join("; ")))
    }
}

/// Lays a pasted block on the grid from the cell `at` on.
#[must_use]
pub fn lay(text: &str, at: Place, columns: &[Sounded], strings: usize) -> Filling {
    let mut filling = Filling::default();
    let Some(first) = columns.iter().position(|column| *column == at.sounded) else { return filling };
    for (down, row) in rows(text).into_iter().enumerate() {
        for (right, cell) in row.into_iter().enumerate() {
            let string = at.string + down;
            let Some(&sounded) = columns.get(first + right).filter(|_| string < strings) else {
                filling.outside += usize::from(!cell.trim().is_empty());
                continue;
            };
            match cents(&cell) {
                Ok(value) => filling.cells.push((Place { string, sounded }, value)),
                Err(words) => filling.refused.push(words),
            }
        }
    }
    filling
}

/// Whether pasted text is more than one cell.
#[must_use]
pub fn is_block(text: &str) -> bool {
    let rows = rows(text);
    rows.len() > 1 || rows.iter().any(|row| row.len() > 1)
}

/// What parts the cells of a line.
#[derive(Debug, Clone, Copy, PartialEq)]
enum Parting {
    Sign(char),
    Blanks,
}

/// The cells of a block, line by line.
fn rows(text: &str) -> Vec<Vec<String>> {
    let text = text.trim_end_matches(['\r', '\n']);
    let parting = parting(text);
    let cells = |line: &str| -> Vec<String> {
        match parting {
            Parting::Sign(sign) => line.split(sign).map(|cell| cell.trim().to_owned()).collect(),
            Parting::Blanks => match line.trim() {
                "" => vec![String::new()],
                some => some.split_whitespace().map(str::to_owned).collect(),
            },
        }
    };
    text.lines().map(cells).collect()
}

/// Tabs part cells before semicolons do, and these before commas. A comma is a decimal sign where tabs or
/// semicolons part the cells, and where no line has two commas, a comma with a blank, or a point beside it.
fn parting(text: &str) -> Parting {
    if let Some(sign) = ['\t', ';'].into_iter().find(|sign| text.contains(*sign)) {
        return Parting::Sign(sign);
    }
    let parts = |line: &str| {
        line.matches(',').count() > 1 || line.contains(", ") || (line.contains(',') && line.contains('.'))
    };
    if text.lines().any(parts) { Parting::Sign(',') } else { Parting::Blanks }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn cells(text: &str) -> Vec<Vec<String>> {
        rows(text)
    }

    #[test]
    fn tabs_semicolons_commas_and_blanks_part_cells() {
        for text in ["1.5\t2\n-3\t4\n", "1.5;2\r\n-3;4", "1.5, 2\n-3, 4", "1.5 2\n-3 4", "1.5,2\n-3,4"] {
            assert_eq!(cells(text), [["1.5", "2"], ["-3", "4"]], "{text:?}");
        }
    }

    #[test]
    fn a_comma_may_be_a_decimal_sign() {
        assert_eq!(cells("1,5\t2,5"), [["1,5", "2,5"]]);
        assert_eq!(cells("1,5\n2,5"), [["1,5"], ["2,5"]]);
        assert_eq!(cells("1,5;2"), [["1,5", "2"]]);
        assert_eq!(cells("1,2,3"), [["1", "2", "3"]]);
        assert!(!is_block("1,5") && is_block("1\t2") && is_block("1\n2"));
        assert_eq!(cents(" −6,5 "), Ok(Some(-6.5)));
    }

    #[test]
    fn a_block_fills_from_its_cell_and_says_what_it_leaves() {
        let columns = [Sounded::Open, Sounded::Fretted(5), Sounded::Fretted(12)];
        let at = Place { string: 1, sounded: Sounded::Fretted(5) };
        let filling = lay("1\t2\t3\n\tsharp\n5\t6", at, &columns, 3);
        let place = |string, fret| Place { string, sounded: Sounded::Fretted(fret) };
        let expected = [(place(1, 5), Some(1.0)), (place(1, 12), Some(2.0)), (place(2, 5), None)];
        assert_eq!(filling.cells, expected);
        assert_eq!((filling.refused.len(), filling.outside), (1, 3));
        let remark = filling.remark().unwrap_or_default();
        assert!(remark.contains("1 no readings") && remark.contains("3 beyond the grid"), "{remark}");
    }

    #[test]
    fn cents_beyond_what_a_plan_holds_are_refused() {
        assert!(cents("1201").is_err() && cents("x").is_err());
        assert_eq!((cents("-1200"), cents("")), (Ok(Some(-1200.0)), Ok(None)));
    }
}
