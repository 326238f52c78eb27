//! How the unknowns of a fit place crests and nut edges: one number a crest, lines across the strings, or crests
//! within a blank along a line.

use std::ops::Range;

use crate::Contacts;
use crate::neck::{PlanLine, PlanPoint};

/// How crests are placed.
#[derive(Debug, Clone, PartialEq)]
pub(crate) enum Crests {
    /// Known setbacks, one a string.
    Fixed(Vec<f64>),
    /// Each at its own setback.
    Free,
    /// On straight lines, each serving some strings.
    Lines(Vec<LineGroup>),
    /// Each at its own setback, but within a distance of one straight line.
    Blank { line: LineGroup, half_width_mm: f64 },
}

/// Strings whose crests one line serves. Its unknowns are its x at the y of the outer crests; a line for one
/// string alone has one unknown and keeps the slope given.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct LineGroup {
    pub strings: Range<usize>,
    y_mm: [f64; 2],
    slope: f64,
}

/// How nut edges are placed.
#[derive(Debug, Clone, PartialEq)]
pub(crate) enum NutEdges {
    /// Known setbacks, one a string.
    Fixed(Vec<f64>),
    /// The same unknown setback for all.
    Common,
    /// One unknown setback a string.
    PerString,
}

/// The unknowns of one fit over some strings.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Unknowns {
    pub lines: Vec<PlanLine>,
    pub crests: Crests,
    pub nut: NutEdges,
    pub saddle_travel_mm: [f64; 2],
    pub nut_travel_mm: [f64; 2],
}

impl LineGroup {
    pub fn new(lines: &[PlanLine], strings: Range<usize>) -> Self {
        let y = |string: usize| lines[string].saddle.y_mm;
        let y_mm = [y(strings.start), y(strings.end - 1)];
        let (first, last) = (lines[0].saddle, lines[lines.len() - 1].saddle);
        let rise = first.y_mm - last.y_mm;
        let slope = if rise == 0.0 { 0.0 } else { (first.x_mm - last.x_mm) / rise };
        Self { strings, y_mm, slope }
    }

    fn unknowns(&self) -> usize {
        if self.strings.len() == 1 { 1 } else { 2 }
    }

    /// Two points of the line.
    pub fn points(&self, unknowns: &[f64]) -> [PlanPoint; 2] {
        let start = PlanPoint::new(unknowns[0], self.y_mm[0]);
        match unknowns.get(1) {
            Some(&x_mm) => [start, PlanPoint::new(x_mm, self.y_mm[1])],
            None => [start, PlanPoint::new(unknowns[0] - self.slope, self.y_mm[0] - 1.0)],
        }
    }

    /// Unknowns of the least-squares line through crests.
    pub fn through(&self, crests: &[PlanPoint]) -> Vec<f64> {
        let count = crests.len() as f64;
        let mean = |value: fn(&PlanPoint) -> f64| crests.iter().map(value).sum::<f64>() / count;
        let (x, y) = (mean(|crest| crest.x_mm), mean(|crest| crest.y_mm));
        if self.unknowns() == 1 {
            return vec![x];
        }
        let across = crests.iter().map(|crest| (crest.y_mm - y).powi(2)).sum::<f64>();
        let slope = crests.iter().map(|crest| (crest.x_mm - x) * (crest.y_mm - y)).sum::<f64>() / across;
        self.y_mm.iter().map(|end| x + slope * (end - y)).collect()
    }
}

impl Unknowns {
    pub fn count(&self) -> usize {
        self.crest_count() + self.nut_count()
    }

    fn crest_count(&self) -> usize {
        match &self.crests {
            Crests::Fixed(_) => 0,
            Crests::Free => self.lines.len(),
            Crests::Lines(groups) => groups.iter().map(LineGroup::unknowns).sum(),
            Crests::Blank { line, .. } => self.lines.len() + line.unknowns(),
        }
    }

    fn nut_count(&self) -> usize {
        match &self.nut {
            NutEdges::Fixed(_) => 0,
            NutEdges::Common => 1,
            NutEdges::PerString => self.lines.len(),
        }
    }

    /// Whether nut edges are unknown.
    pub fn nut_moves(&self) -> bool {
        self.nut_count() > 0
    }

    /// Unknowns that come near given contacts, within the travel.
    pub fn near(&self, contacts: &[Contacts]) -> Vec<f64> {
        let limited = |value: f64, travel: [f64; 2]| value.clamp(travel[0], travel[1]);
        let setbacks: Vec<f64> =
            contacts.iter().map(|c| limited(c.saddle_setback_mm, self.saddle_travel_mm)).collect();
        let crests: Vec<PlanPoint> = std::iter::zip(&self.lines, &setbacks)
            .map(|(line, setback)| line.at(line.scale_mm() + setback))
            .collect();
        let mut unknowns = match &self.crests {
            Crests::Fixed(_) => Vec::new(),
            Crests::Free => setbacks,
            Crests::Lines(groups) => {
                groups.iter().flat_map(|group| group.through(&crests[group.strings.clone()])).collect()
            }
            Crests::Blank { line, .. } => [setbacks, line.through(&crests)].concat(),
        };
        let nut = contacts.iter().map(|c| limited(c.nut_setback_mm, self.nut_travel_mm));
        match &self.nut {
            NutEdges::Fixed(_) => {}
            NutEdges::Common => unknowns.push(nut.sum::<f64>() / contacts.len() as f64),
            NutEdges::PerString => unknowns.extend(nut),
        }
        unknowns
    }

    /// Contacts of every string for these unknowns; a line beside a string gives a setback that is not finite.
    pub fn contacts(&self, unknowns: &[f64]) -> Vec<Contacts> {
        let (crest_part, nut_part) = unknowns.split_at(self.crest_count());
        let mut contacts = vec![Contacts::default(); self.lines.len()];
        let mut place = |setbacks: &[f64]| {
            for (contact, setback) in contacts.iter_mut().zip(setbacks) {
                contact.saddle_setback_mm = *setback;
            }
        };
        match &self.crests {
            Crests::Fixed(setbacks) => place(setbacks),
            Crests::Free | Crests::Blank { .. } => place(crest_part),
            Crests::Lines(groups) => {
                for (group, points) in self.line_points(groups, crest_part) {
                    for string in group.strings.clone() {
                        let line = &self.lines[string];
                        let crossing = line.crossing_mm(points[0], points[1]).unwrap_or(f64::NAN);
                        contacts[string].saddle_setback_mm = crossing - line.scale_mm();
                    }
                }
            }
        }
        for (string, contact) in contacts.iter_mut().enumerate() {
            contact.nut_setback_mm = match &self.nut {
                NutEdges::Fixed(setbacks) => setbacks[string],
                NutEdges::Common => nut_part[0],
                NutEdges::PerString => nut_part[string],
            };
        }
        contacts
    }

    /// The lines for these unknowns, each cut at its outer strings, treble end first.
    pub fn lines_at(&self, unknowns: &[f64]) -> Vec<[PlanPoint; 2]> {
        let crest_part = &unknowns[..self.crest_count()];
        let cut = |group: &LineGroup, [a, b]: [PlanPoint; 2]| {
            [group.strings.start, group.strings.end - 1].map(|string| {
                let line = &self.lines[string];
                line.crossing_mm(a, b).map_or(a, |position| line.at(position))
            })
        };
        match &self.crests {
            Crests::Fixed(_) | Crests::Free => Vec::new(),
            Crests::Lines(groups) => {
                self.line_points(groups, crest_part).map(|(group, points)| cut(group, points)).collect()
            }
            Crests::Blank { line, .. } => {
                vec![cut(line, line.points(&crest_part[self.lines.len()..]))]
            }
        }
    }

    fn line_points<'a>(
        &self,
        groups: &'a [LineGroup],
        mut part: &'a [f64],
    ) -> impl Iterator<Item = (&'a LineGroup, [PlanPoint; 2])> {
        groups.iter().map(move |group| {
            let (own, rest) = part.split_at(group.unknowns());
            part = rest;
            (group, group.points(own))
        })
    }

    /// Values that must not be positive: how far contacts lie outside their travel and crests outside the blank.
    pub fn excesses_mm(&self, unknowns: &[f64]) -> Vec<f64> {
        let contacts = self.contacts(unknowns);
        let mut excesses = Vec::with_capacity(4 * contacts.len());
        let mut hold = |value: f64, [low, high]: [f64; 2]| excesses.extend([low - value, value - high]);
        for contact in &contacts {
            hold(contact.saddle_setback_mm, self.saddle_travel_mm);
        }
        match &self.nut {
            NutEdges::Fixed(_) => {}
            NutEdges::Common => hold(contacts[0].nut_setback_mm, self.nut_travel_mm),
            NutEdges::PerString => {
                contacts.iter().for_each(|contact| hold(contact.nut_setback_mm, self.nut_travel_mm));
            }
        }
        if let Crests::Blank { line, half_width_mm } = &self.crests {
            let [a, b] = line.points(&unknowns[self.lines.len()..self.crest_count()]);
            for (line, contact) in std::iter::zip(&self.lines, &contacts) {
                let crest = line.at(line.scale_mm() + contact.saddle_setback_mm);
                hold(offset_mm([a, b], crest), [-half_width_mm, *half_width_mm]);
            }
        }
        excesses
    }
}

/// Distance of a point from the line through `treble` and `bass`, mm; positive on the side away from the nut.
#[must_use]
pub fn offset_mm([treble, bass]: [PlanPoint; 2], point: PlanPoint) -> f64 {
    let (run_x, run_y) = (bass.x_mm - treble.x_mm, bass.y_mm - treble.y_mm);
    let cross = run_x * (point.y_mm - treble.y_mm) - run_y * (point.x_mm - treble.x_mm);
    cross / run_x.hypot(run_y)
}
