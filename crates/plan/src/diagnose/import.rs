//! Readings from a table in CSV.

use csv::{ReaderBuilder, StringRecord, Trim};

use crate::fault::quoted;
use crate::limits::{self, number_words};
use crate::{Fault, Reading, ReadingKind, Word};

/// Most faults that are listed; a table with more is no table of readings, and is looked at no further.
const MOST_FAULTS: usize = 1000;

/// The columns, by name or, without a heading, in this order.
const COLUMNS: [&str; 4] = ["string", "fret", "kind", "cents"];

/// Readings from text in CSV with the columns string, fret, kind and cents. A first line with these names may put
/// them in another order. The kind is `fretted`, `open` or `octave_harmonic`; left empty it is fretted, or open for
/// fret 0. Commas, semicolons and tabs separate; empty lines and lines without cents are passed over.
///
/// ```
/// let text = "string,fret,kind,cents\n1,0,open,0.0\n1,12,fretted,6.5\n";
/// assert_eq!(crestline_plan::readings_from_csv(text)?.len(), 2);
/// let faults = crestline_plan::readings_from_csv("1,12,fretted,sharp").err().unwrap_or_default();
/// assert_eq!(faults[0].to_string(), "line 1, cents: found \"sharp\"; allowed: -1200 to 1200 cents");
/// # Ok::<(), Vec<crestline_plan::Fault>>(())
/// ```
///
/// # Errors
/// Every line that is no reading, by its number; from a thousand faults on the rest is not looked at.
pub fn readings_from_csv(text: &str) -> Result<Vec<Reading>, Vec<Fault>> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let mut reader = ReaderBuilder::new()
        .has_headers(false)
        .flexible(true)
        .trim(Trim::All)
        .delimiter(separator(text))
        .from_reader(text.as_bytes());
    let (mut readings, mut faults) = (Vec::new(), Vec::new());
    let mut order = [0, 1, 2, 3];
    let mut is_first = true;
    for (row, record) in reader.records().enumerate() {
        let record = match record {
            Ok(record) => record,
            Err(error) => {
                faults.push(Fault::new(format!("row {}", row + 1), error.to_string(), "text in CSV"));
                continue;
            }
        };
        let line = record.position().map_or(row as u64 + 1, csv::Position::line);
        if std::mem::take(&mut is_first)
            && let Some(found) = heading(&record)
        {
            order = found;
        } else if let Some(reading) = one(&record, order, line, &mut faults) {
            readings.push(reading);
        }
        if readings.len() > limits::READINGS {
            faults.push(Fault::new(
                format!("line {line}"),
                "one reading more",
                format!("at most {}", limits::READINGS),
            ));
            break;
        }
        if faults.len() >= MOST_FAULTS {
            let found = format!("{} faults; the lines after it were not looked at", faults.len());
            faults.push(Fault::new(format!("line {line}"), found, "a table of readings"));
            break;
        }
    }
    if readings.is_empty() && faults.is_empty() {
        faults.push(Fault::new("", "no readings", "lines with string, fret, kind and cents"));
    }
    if faults.is_empty() { Ok(readings) } else { Err(faults) }
}

/// The separator that the first line holds; a comma where it holds none.
fn separator(text: &str) -> u8 {
    let first = text.lines().find(|line| !line.trim().is_empty()).unwrap_or("");
    [b'\t', b';'].into_iter().find(|&sign| first.contains(char::from(sign))).unwrap_or(b',')
}

/// Where the columns stand, if the line names them.
fn heading(record: &StringRecord) -> Option<[usize; 4]> {
    let place = |name: &str| record.iter().position(|field| field.eq_ignore_ascii_case(name));
    let mut order = [0; 4];
    for (to, name) in order.iter_mut().zip(COLUMNS) {
        *to = place(name)?;
    }
    Some(order)
}

/// The reading of a line; none for a line without cents, or with faults.
fn one(record: &StringRecord, order: [usize; 4], line: u64, faults: &mut Vec<Fault>) -> Option<Reading> {
    let field = |which: usize| record.get(order[which]).unwrap_or("");
    if record.iter().all(str::is_empty) || (record.len() >= COLUMNS.len() && field(3).is_empty()) {
        return None;
    }
    let before = faults.len();
    let mut refuse = |which: usize, allowed: String| {
        let found = if field(which).is_empty() { "nothing".to_owned() } else { quoted(field(which)) };
        faults.push(Fault::new(format!("line {line}, {}", COLUMNS[which]), found, allowed));
    };
    let string = field(0).parse::<u32>().ok().filter(|&string| limits::STRINGS.contains(f64::from(string)));
    if string.is_none() {
        refuse(0, limits::STRINGS.words());
    }
    let fret = field(1).parse::<u32>().ok().filter(|&fret| f64::from(fret) <= limits::FRETS.high);
    if fret.is_none() {
        refuse(1, format!("0 to {}", number_words(limits::FRETS.high)));
    }
    let kind = match field(2) {
        "" if fret == Some(0) => Some(ReadingKind::Open),
        "" => Some(ReadingKind::Fretted),
        word => ReadingKind::from_word(&word.to_lowercase().replace(' ', "_")),
    };
    if kind.is_none() {
        refuse(2, ReadingKind::all_words());
    }
    let cents =
        field(3).replace('−', "-").parse::<f64>().ok().filter(|&cents| limits::READING_CENTS.contains(cents));
    if cents.is_none() {
        refuse(3, limits::READING_CENTS.words());
    }
    let (string, fret, kind, cents) = (string?, fret?, kind?, cents?);
    let fits = match kind {
        ReadingKind::Open => fret == 0,
        ReadingKind::OctaveHarmonic => fret == 12,
        ReadingKind::Fretted => fret > 0,
    };
    if !fits {
        refuse(
            1,
            "0 for an open string, 12 for its octave harmonic, 1 or more for a fretted note".to_owned(),
        );
    }
    (faults.len() == before).then_some(Reading { string, fret, kind, cents })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn headings_separators_and_gaps_are_understood() {
        let text = "cents;string;kind;fret\n-1.5;2;;0\n\n;3;fretted;5\n6.25;2;octave harmonic;12\n";
        let readings = readings_from_csv(text).unwrap();
        assert_eq!(readings.len(), 2);
        assert_eq!(readings[0], Reading { string: 2, fret: 0, kind: ReadingKind::Open, cents: -1.5 });
        assert_eq!(readings[1].kind, ReadingKind::OctaveHarmonic);
    }

    #[test]
    fn every_fault_names_its_line() {
        let faults = readings_from_csv("1,12,fretted,2\n0,5,fretted,1\n1,3,open,1\n2,1\n1,1,plucked,inf\n")
            .unwrap_err();
        let paths: Vec<&str> = faults.iter().map(|fault| fault.path.as_str()).collect();
        assert_eq!(
            paths,
            ["line 2, string", "line 3, fret", "line 4, cents", "line 5, kind", "line 5, cents"]
        );
        assert_eq!(readings_from_csv(" \n").unwrap_err()[0].found, "no readings");
    }

    #[test]
    fn a_table_full_of_faults_is_looked_at_no_further() {
        let faults = readings_from_csv(&"odd\n".repeat(100_000)).unwrap_err();
        // Four faults a line at most: the last line is still told whole.
        assert!((MOST_FAULTS..MOST_FAULTS + 5).contains(&faults.len()), "{}", faults.len());
        assert!(faults.last().unwrap().found.contains("not looked at"));
    }
}
