//! Setbacks: where crests and nut edges must stand so that the errors of the fretted notes are small.
//!
//! [`ideal_setbacks`] finds, for every string, the ideal contacts (each string by itself, with the nut as it will be
//! made), [`built_setbacks`] the built ones (as the saddle's style allows). Least squares is a constrained Gauss–Newton search, the
//! smallest largest error a sequence of linear programmes; where several places share the smallest largest error,
//! the one with the least squares is taken. The saddle's optimum is searched within the travel limits.
//!
//! A string may have several weighted cases ([`FitCase`]) that share its crest and nut edge: other sets of strings, other
//! tunings, or samples of an uncertain string. Squares are then weighted sums over the cases, the largest error is
//! that of all cases, and what is said of a string's ideal contacts is said of all its cases together.

mod quadratic;
mod search;
mod strings;
mod strip;
mod unknowns;

pub use strings::{FitCase, FitString};
pub use strip::{ChebyshevLine, chebyshev_line};
pub use unknowns::offset_mm;

use std::ops::Range;

use crate::error::within;
use crate::neck::{PlanLine, PlanPoint};
use crate::{Contacts, PhysicsError};
use search::{Found, Objective, Search};
use unknowns::{Crests, LineGroup, NutEdges, Unknowns};

/// Index of fret 12.
const TWELFTH: usize = 11;

/// What is made small.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum FitRule {
    /// The sum of squared errors.
    LeastSquares,
    /// The error at fret 12; on a line, or over several cases, the sum of its squares.
    Twelfth,
    /// The largest error.
    Minimax,
}

/// How the saddle is made.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum SaddleShape {
    /// One crest a string, each free.
    Separate,
    /// One crest a string, each within this distance of one straight line.
    Shaped {
        /// Half the usable width of the blank's top, t/2 − m, mm.
        half_width_mm: f64,
    },
    /// All crests on one straight line.
    Straight,
    /// Two straight lines.
    TwoPiece {
        /// Number of strings on the first.
        split_after: usize,
    },
}

/// How the nut is made.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum NutShape {
    /// On the nominal nut line.
    Plain,
    /// One setback for all strings.
    Common,
    /// One setback a string.
    Shaped,
}

/// What a fit is to do.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FitOptions {
    /// What is made small.
    pub rule: FitRule,
    /// The saddle.
    pub saddle: SaddleShape,
    /// The nut.
    pub nut: NutShape,
    /// Least and greatest saddle setback, mm.
    pub saddle_travel_mm: [f64; 2],
    /// Least and greatest nut setback, mm.
    pub nut_travel_mm: [f64; 2],
}

/// Contacts found, and how far the search came.
#[derive(Debug, Clone, PartialEq)]
pub struct Setbacks {
    /// One a string.
    pub contacts: Vec<Contacts>,
    /// Lines of the style, each from its outer string on the treble side to that on the bass side.
    pub lines: Vec<[PlanPoint; 2]>,
    /// Whether every crest fits its blank and its travel.
    pub fits: bool,
    /// Half the width that the ideal crests would need along their Chebyshev line, mm; for a shaped saddle only.
    pub needed_half_width_mm: Option<f64>,
    /// Whether the search came to rest.
    pub settled: bool,
    /// Length of its last step, mm.
    pub last_step_mm: f64,
}

/// The contacts of each string by itself, with the nut as it is to be made.
///
/// With a common nut it is the one setback of the joint optimum of all strings with free crests; with the rule
/// `Twelfth` the nut keeps its least-squares value and the crest then makes the octave true.
///
/// # Errors
/// [`PhysicsError`] where a string cannot be worked out, or travel limits are not in order.
pub fn ideal_setbacks(strings: &[FitString], options: &FitOptions) -> Result<Setbacks, PhysicsError> {
    check(strings, options)?;
    let nut = nut_setbacks(strings, options, |_| Crests::Free, &at_rest(strings, options))?;
    let start = &nut.contacts;
    let mut result = Gathered::new(strings.len());
    for string in 0..strings.len() {
        let part = string..string + 1;
        result.add(part.clone(), fit_part(strings, options, &nut, part, Crests::Free, start)?);
    }
    Ok(result.finish(options))
}

/// The contacts that the saddle's style allows, from the ideal ones.
///
/// # Errors
/// As [`ideal_setbacks`].
pub fn built_setbacks(
    strings: &[FitString],
    options: &FitOptions,
    ideal: &Setbacks,
) -> Result<Setbacks, PhysicsError> {
    check(strings, options)?;
    let lines: Vec<PlanLine> = strings.iter().map(|string| string.line).collect();
    match options.saddle {
        SaddleShape::Separate => Ok(Setbacks { lines: Vec::new(), ..ideal.clone() }),
        SaddleShape::Straight => on_lines(strings, options, ideal, std::slice::from_ref(&(0..strings.len()))),
        SaddleShape::TwoPiece { split_after } => {
            on_lines(strings, options, ideal, &[0..split_after, split_after..strings.len()])
        }
        SaddleShape::Shaped { half_width_mm } => in_blank(strings, options, ideal, &lines, half_width_mm),
    }
}

fn on_lines(
    strings: &[FitString],
    options: &FitOptions,
    ideal: &Setbacks,
    groups: &[Range<usize>],
) -> Result<Setbacks, PhysicsError> {
    let crests = |lines: &[PlanLine]| {
        Crests::Lines(groups.iter().map(|group| LineGroup::new(lines, group.clone())).collect())
    };
    let nut = nut_setbacks(strings, options, crests, &ideal.contacts)?;
    let mut result = Gathered::new(strings.len());
    for group in groups {
        let lines: Vec<PlanLine> = strings[group.clone()].iter().map(|string| string.line).collect();
        let own = Crests::Lines(vec![LineGroup::new(&lines, 0..lines.len())]);
        result.add(group.clone(), fit_part(strings, options, &nut, group.clone(), own, &ideal.contacts)?);
    }
    Ok(result.finish(options))
}

fn in_blank(
    strings: &[FitString],
    options: &FitOptions,
    ideal: &Setbacks,
    lines: &[PlanLine],
    half_width_mm: f64,
) -> Result<Setbacks, PhysicsError> {
    /// Rounding of the distances.
    const HAIR_MM: f64 = 1e-9;
    let crests: Vec<PlanPoint> = std::iter::zip(lines, &ideal.contacts)
        .map(|(line, contact)| line.at(line.scale_mm() + contact.saddle_setback_mm))
        .collect();
    let counted: Vec<PlanPoint> = std::iter::zip(strings, &crests)
        .filter(|(string, _)| string.counts())
        .map(|(_, crest)| *crest)
        .collect();
    let narrowest = chebyshev_line(if counted.is_empty() { &crests } else { &counted });
    let needed = narrowest.map(|line| line.half_width_mm);
    if let Some(line) = narrowest.filter(|line| line.half_width_mm <= half_width_mm + HAIR_MM) {
        let cut = |string: &PlanLine| {
            string
                .crossing_mm(line.ends[0], line.ends[1])
                .map_or(line.ends[0], |position| string.at(position))
        };
        let outer = [cut(&lines[0]), cut(&lines[lines.len() - 1])];
        return Ok(Setbacks { lines: vec![outer], needed_half_width_mm: needed, ..ideal.clone() });
    }
    let all = 0..strings.len();
    let blank =
        |lines: &[PlanLine]| Crests::Blank { line: LineGroup::new(lines, 0..lines.len()), half_width_mm };
    let nut = nut_setbacks(strings, options, blank, &ideal.contacts)?;
    let mut result = Gathered::new(strings.len());
    result.add(all.clone(), fit_part(strings, options, &nut, all, blank(lines), &ideal.contacts)?);
    Ok(Setbacks { fits: false, needed_half_width_mm: needed, ..result.finish(options) })
}

/// Nut setbacks that are settled before crests are fitted in parts, with contacts to start from.
struct NutPlan {
    /// Known setbacks; absent where every string's nut edge is fitted together with its crest.
    fixed_mm: Option<Vec<f64>>,
    contacts: Vec<Contacts>,
}

fn nut_setbacks(
    strings: &[FitString],
    options: &FitOptions,
    crests: impl Fn(&[PlanLine]) -> Crests,
    start: &[Contacts],
) -> Result<NutPlan, PhysicsError> {
    let twelfth = options.rule == FitRule::Twelfth;
    let edges = match options.nut {
        NutShape::Plain => {
            return Ok(NutPlan { fixed_mm: Some(vec![0.0; strings.len()]), contacts: start.to_vec() });
        }
        NutShape::Shaped if !twelfth => return Ok(NutPlan { fixed_mm: None, contacts: start.to_vec() }),
        NutShape::Shaped => NutEdges::PerString,
        NutShape::Common => NutEdges::Common,
    };
    let lines: Vec<PlanLine> = strings.iter().map(|string| string.line).collect();
    let unknowns = Unknowns {
        crests: crests(&lines),
        lines,
        nut: edges,
        saddle_travel_mm: options.saddle_travel_mm,
        nut_travel_mm: options.nut_travel_mm,
    };
    let found = Search::new(strings, &unknowns).run(objective(options.rule), start)?;
    let fixed = found.contacts.iter().map(|contact| contact.nut_setback_mm).collect();
    Ok(NutPlan { fixed_mm: Some(fixed), contacts: found.contacts })
}

fn fit_part(
    strings: &[FitString],
    options: &FitOptions,
    nut: &NutPlan,
    part: Range<usize>,
    crests: Crests,
    start: &[Contacts],
) -> Result<(Found, Vec<[PlanPoint; 2]>), PhysicsError> {
    let mut own = strings[part.clone()].to_vec();
    if options.rule == FitRule::Twelfth {
        own.iter_mut()
            .flat_map(|string| &mut string.cases)
            .filter(|case| !case.frets.is_empty())
            .for_each(|case| case.frets = vec![TWELFTH]);
    }
    let unknowns = Unknowns {
        lines: own.iter().map(|string| string.line).collect(),
        crests,
        nut: match &nut.fixed_mm {
            Some(setbacks) => NutEdges::Fixed(setbacks[part.clone()].to_vec()),
            None => NutEdges::PerString,
        },
        saddle_travel_mm: options.saddle_travel_mm,
        nut_travel_mm: options.nut_travel_mm,
    };
    let search = Search::new(&own, &unknowns);
    let mut found = search.run(objective(options.rule), &start[part])?;
    let lines = unknowns.lines_at(&found.unknowns);
    if options.rule == FitRule::Minimax && unknowns.nut_moves() && unknowns.crests != Crests::Free {
        own_nut_edges(&own, &unknowns, &mut found)?;
    }
    Ok((found, lines))
}

/// Gives every nut edge its own smallest largest error where the crest stands: the joint one holds only the worst
/// strings fast.
fn own_nut_edges(strings: &[FitString], unknowns: &Unknowns, found: &mut Found) -> Result<(), PhysicsError> {
    for (index, string) in strings.iter().enumerate() {
        let contact = found.contacts[index];
        let own = Unknowns {
            lines: vec![string.line],
            crests: Crests::Fixed(vec![contact.saddle_setback_mm]),
            nut: NutEdges::PerString,
            saddle_travel_mm: [contact.saddle_setback_mm; 2],
            ..*unknowns
        };
        let search = Search::new(std::slice::from_ref(string), &own);
        let better = search.run(Objective::LargestError, &[contact])?;
        found.contacts[index] = better.contacts[0];
        found.settled &= better.settled;
    }
    Ok(())
}

fn objective(rule: FitRule) -> Objective {
    match rule {
        FitRule::LeastSquares | FitRule::Twelfth => Objective::SquaredErrors,
        FitRule::Minimax => Objective::LargestError,
    }
}

/// Results of parts, put together.
struct Gathered {
    contacts: Vec<Contacts>,
    lines: Vec<[PlanPoint; 2]>,
    settled: bool,
    last_step_mm: f64,
}

impl Gathered {
    fn new(strings: usize) -> Self {
        let contacts = vec![Contacts::default(); strings];
        Self { contacts, lines: Vec::new(), settled: true, last_step_mm: 0.0 }
    }

    fn add(&mut self, part: Range<usize>, (found, lines): (Found, Vec<[PlanPoint; 2]>)) {
        self.contacts[part].copy_from_slice(&found.contacts);
        self.lines.extend(lines);
        self.settled &= found.settled;
        self.last_step_mm = self.last_step_mm.max(found.last_step_mm);
    }

    fn finish(self, options: &FitOptions) -> Setbacks {
        /// Overstepping of a limit that a workshop would never see.
        const VISIBLE_MM: f64 = 1e-4;
        let outside = |value: f64, [low, high]: [f64; 2]| (low - value).max(value - high) > VISIBLE_MM;
        let outside = |contact: &Contacts| {
            outside(contact.saddle_setback_mm, options.saddle_travel_mm)
                || (options.nut != NutShape::Plain && outside(contact.nut_setback_mm, options.nut_travel_mm))
        };
        Setbacks {
            fits: !self.contacts.iter().any(outside),
            contacts: self.contacts,
            lines: self.lines,
            needed_half_width_mm: None,
            settled: self.settled,
            last_step_mm: self.last_step_mm,
        }
    }
}

/// No setback, or the nearest that the travel allows.
fn at_rest(strings: &[FitString], options: &FitOptions) -> Vec<Contacts> {
    let [low, high] = options.saddle_travel_mm;
    vec![Contacts { saddle_setback_mm: 0f64.clamp(low, high), nut_setback_mm: 0.0 }; strings.len()]
}

fn check(strings: &[FitString], options: &FitOptions) -> Result<(), PhysicsError> {
    within("number of strings", strings.len() as f64, 1.0, 64.0)?;
    let [low, high] = options.saddle_travel_mm;
    within("least saddle setback in mm", low, -1e3, high)?;
    within("greatest saddle setback in mm", high, low, 1e3)?;
    let [low, high] = options.nut_travel_mm;
    within("least nut setback in mm", low, -1e3, high)?;
    within("greatest nut setback in mm", high, low, 1e3)?;
    if let SaddleShape::TwoPiece { split_after } = options.saddle {
        within("strings on the first piece", split_after as f64, 1.0, strings.len() as f64 - 1.0)?;
    }
    if let SaddleShape::Shaped { half_width_mm } = options.saddle {
        within("usable half width of the blank in mm", half_width_mm, 0.0, 1e3)?;
    }
    strings.iter().try_for_each(FitString::check)
}

#[cfg(test)]
mod tests;
