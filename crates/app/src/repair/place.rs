//! A cell of the grid, and what the plan's readings say there.

use std::collections::BTreeMap;

use crestline_plan::{Reading, ReadingKind};

/// What is sounded in a column of the grid, in the order of the columns.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Sounded {
    /// The open string.
    Open,
    /// The octave harmonic of the open string.
    OctaveHarmonic,
    /// The string pressed to this fret.
    Fretted(u32),
}

impl Sounded {
    /// What a reading was taken of.
    #[must_use]
    pub fn of(reading: &Reading) -> Self {
        match reading.kind {
            ReadingKind::Open => Self::Open,
            ReadingKind::OctaveHarmonic => Self::OctaveHarmonic,
            ReadingKind::Fretted => Self::Fretted(reading.fret),
        }
    }

    /// In words, such as `fret 12`.
    #[must_use]
    pub fn words(self) -> String {
        match self {
            Self::Open => "open".to_owned(),
            Self::OctaveHarmonic => "octave harmonic".to_owned(),
            Self::Fretted(fret) => format!("fret {fret}"),
        }
    }

    fn kind_and_fret(self) -> (ReadingKind, u32) {
        /// Where the octave harmonic is touched.
        const OCTAVE: u32 = 12;
        match self {
            Self::Open => (ReadingKind::Open, 0),
            Self::OctaveHarmonic => (ReadingKind::OctaveHarmonic, OCTAVE),
            Self::Fretted(fret) => (ReadingKind::Fretted, fret),
        }
    }
}

/// A cell of the grid. Places are ordered as they are read: string by string.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Place {
    /// The string, 0 first.
    pub string: usize,
    /// What is sounded.
    pub sounded: Sounded,
}

impl Place {
    /// Where a reading stands.
    #[must_use]
    pub fn of(reading: &Reading) -> Self {
        let string = (reading.string as usize).saturating_sub(1);
        Self { string, sounded: Sounded::of(reading) }
    }

    /// The place of the reading that a path such as `readings[3].cents` is about.
    #[must_use]
    pub fn at_path(path: &str, readings: &[Reading]) -> Option<Self> {
        let index: usize = path.strip_prefix("readings[")?.split(']').next()?.parse().ok()?;
        readings.get(index).map(Self::of)
    }

    /// The name of its field and of the step that typing in it makes.
    #[must_use]
    pub fn name(self) -> String {
        format!("Reading of string {}, {}", self.string + 1, self.sounded.words())
    }

    /// The path that its field is known by. It is not the plan's path, whose index moves with every new reading.
    #[must_use]
    pub fn path(self) -> String {
        format!("readings.string_{}.{}", self.string + 1, self.sounded.words().replace(' ', "_"))
    }

    /// Puts one reading here in place of those that are, or takes them away.
    pub fn put(self, readings: &mut Vec<Reading>, cents: Option<f64>) {
        let at = readings.iter().position(|reading| Self::of(reading) == self);
        let behind = readings.iter().position(|reading| Self::of(reading) > self);
        readings.retain(|reading| Self::of(reading) != self);
        let Some(cents) = cents else { return };
        let (kind, fret) = self.sounded.kind_and_fret();
        let reading = Reading { string: self.string as u32 + 1, fret, kind, cents };
        let at = at.or(behind).unwrap_or(readings.len());
        readings.insert(at.min(readings.len()), reading);
    }
}

/// What all cells show, looked up once for a whole grid.
#[derive(Debug, Default)]
pub struct Shown(BTreeMap<Place, (f64, usize)>);

impl Shown {
    /// Of a plan's readings.
    #[must_use]
    pub fn of(readings: &[Reading]) -> Self {
        let mut shown = BTreeMap::new();
        for reading in readings {
            let (sum, count) = shown.entry(Place::of(reading)).or_insert((0.0, 0));
            *sum += reading.cents;
            *count += 1;
        }
        Self(shown)
    }

    /// The reading taken at a place, or the mean of several, cents; and how many there are.
    #[must_use]
    pub fn at(&self, place: Place) -> (Option<f64>, usize) {
        self.0.get(&place).map_or((None, 0), |(sum, count)| (Some(sum / *count as f64), *count))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn fretted(string: usize, fret: u32) -> Place {
        Place { string, sounded: Sounded::Fretted(fret) }
    }

    #[test]
    fn readings_are_put_in_order_replaced_and_taken_away() {
        let open = Place { string: 1, sounded: Sounded::Open };
        let mut readings = Vec::new();
        fretted(1, 5).put(&mut readings, Some(2.0));
        fretted(0, 12).put(&mut readings, Some(6.5));
        open.put(&mut readings, Some(-1.0));
        let places: Vec<_> = readings.iter().map(Place::of).collect();
        assert_eq!(places, [fretted(0, 12), open, fretted(1, 5)]);
        fretted(0, 12).put(&mut readings, Some(7.0));
        assert_eq!(Shown::of(&readings).at(fretted(0, 12)).0, Some(7.0));
        fretted(0, 12).put(&mut readings, None);
        assert_eq!((readings.len(), Shown::of(&readings).at(fretted(0, 12)).0), (2, None));
    }

    #[test]
    fn a_note_read_twice_shows_the_mean_and_is_replaced_as_one() {
        let one = |cents| Reading { string: 1, fret: 3, kind: ReadingKind::Fretted, cents };
        let mut readings = vec![one(2.0), one(5.0)];
        assert_eq!(Shown::of(&readings).at(fretted(0, 3)), (Some(3.5), 2));
        assert_eq!(Shown::of(&readings).at(fretted(0, 4)), (None, 0));
        fretted(0, 3).put(&mut readings, Some(4.0));
        assert_eq!(readings, [one(4.0)]);
    }
}
