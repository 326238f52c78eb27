//! What is fitted: strings, each in one case or in several that share its contacts.

use crate::error::within;
use crate::neck::PlanLine;
use crate::{FrettedString, PhysicsError};

/// Most cases that one string may have.
const CASES: f64 = 1e5;
/// Least and greatest weight of a case.
const WEIGHT: [f64; 2] = [1e-9, 1e9];

/// A string to be fitted.
#[derive(Debug, Clone, PartialEq)]
pub struct FitString<'a> {
    /// Its line in plan.
    pub line: PlanLine,
    /// What the one crest and nut edge must suit: a single case, or several, such as another set of strings, another tuning,
    /// or samples of a string that is not known exactly.
    pub cases: Vec<FitCase<'a>>,
}

/// One string in one of the states that its crest and nut edge must suit. Its errors count from its own open string,
/// which is at its own pitch.
#[derive(Debug, Clone, PartialEq)]
pub struct FitCase<'a> {
    /// The string.
    pub string: &'a FrettedString,
    /// Indices of the frets that count (fret 1 is 0); empty where every note buzzes, and then the case is left alone.
    pub frets: Vec<usize>,
    /// What its squared errors count against those of other cases, 1e-9 to 1e9. The largest error knows no weights.
    pub weight: f64,
}

impl<'a> FitString<'a> {
    /// A string in a single case.
    #[must_use]
    pub fn single(string: &'a FrettedString, line: PlanLine, frets: Vec<usize>) -> Self {
        Self { line, cases: vec![FitCase { string, frets, weight: 1.0 }] }
    }

    /// Whether a note of any case counts.
    #[must_use]
    pub fn counts(&self) -> bool {
        self.counted().next().is_some()
    }

    /// The cases with notes that count.
    pub(crate) fn counted(&self) -> impl Iterator<Item = &FitCase<'a>> {
        self.cases.iter().filter(|case| !case.frets.is_empty())
    }

    pub(crate) fn check(&self) -> Result<(), PhysicsError> {
        within("number of cases of a string", self.cases.len() as f64, 1.0, CASES)?;
        for case in &self.cases {
            within("weight of a case", case.weight, WEIGHT[0], WEIGHT[1])?;
            let frets = case.string.crowns().len() as f64;
            for &fret in &case.frets {
                within("fret of the fit", fret as f64 + 1.0, 1.0, frets)?;
            }
        }
        Ok(())
    }
}
