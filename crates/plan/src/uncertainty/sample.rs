//! The sample while it grows: one column a quantity.

use rayon::prelude::*;

use super::band::Band;
use super::draw::draw;
use super::model::Worked;
use super::{FretUncertainty, Models, StringUncertainty, Uncertainty};

/// Values of the sample so far.
pub(super) struct Sample<'m> {
    models: &'m Models,
    names: Vec<String>,
    /// First and last fret of the fit.
    fit_frets: [u32; 2],
    columns: Vec<Columns>,
    drawn: u32,
    left_out: u32,
    within: Within,
}

/// One string's values.
struct Columns {
    saddle_mm: Vec<f64>,
    nut_mm: Vec<f64>,
    /// One column a fret; notes that buzz are missing.
    errors: Vec<Vec<f64>>,
    within: Within,
}

/// How many instruments have every note within the limit: of all frets, and of the fit's.
#[derive(Debug, Clone, Copy, Default)]
struct Within {
    all: u32,
    fit: u32,
}

impl<'m> Sample<'m> {
    pub fn new(models: &'m Models, names: Vec<String>, fit_frets: [u32; 2]) -> Self {
        let columns = |frets: usize| Columns {
            saddle_mm: Vec::new(),
            nut_mm: Vec::new(),
            errors: vec![Vec::new(); frets],
            within: Within::default(),
        };
        let columns = models.strings.iter().map(|model| columns(model.figures.setup.fret_mm.len())).collect();
        Self { models, names, fit_frets, columns, drawn: 0, left_out: 0, within: Within::default() }
    }

    pub fn drawn(&self) -> u32 {
        self.drawn
    }

    /// Works out the next `more` instruments. The draws go by their index, so it does not matter which thread works
    /// on which, and they are put in order.
    pub fn extend(&mut self, more: u32) {
        let worked: Vec<Option<Vec<Worked>>> =
            (self.drawn..self.drawn + more).into_par_iter().map(|index| self.instrument(index)).collect();
        for instrument in worked {
            match instrument {
                Some(strings) => self.add(&strings),
                None => self.left_out += 1,
            }
        }
        self.drawn += more;
    }

    /// One instrument; absent where a string of it cannot be worked out.
    fn instrument(&self, index: u32) -> Option<Vec<Worked>> {
        let (models, tolerances) = (&self.models.strings, &self.models.tolerances);
        let string = |(place, model): (usize, &super::model::StringModel)| {
            let draw = draw(index, tolerances.seed, place, models.len(), model.figures.setup.fret_mm.len());
            model.work(&draw, tolerances).ok()
        };
        models.iter().enumerate().map(string).collect()
    }

    fn add(&mut self, strings: &[Worked]) {
        let limit_cents = self.models.tolerances.limit_cents;
        let [first, last] = self.fit_frets.map(|fret| fret as usize);
        let mut every = [true, true];
        for (columns, worked) in self.columns.iter_mut().zip(strings) {
            columns.saddle_mm.push(worked.ideal.saddle_setback_mm);
            columns.nut_mm.push(worked.ideal.nut_setback_mm);
            let mut own = [true, true];
            for (index, (column, error)) in columns.errors.iter_mut().zip(&worked.errors).enumerate() {
                column.extend(*error);
                let holds = error.is_some_and(|error| error.abs() <= limit_cents);
                own[0] &= holds;
                own[1] &= holds || !(first..=last).contains(&(index + 1));
            }
            columns.within.count(own);
            every = [every[0] && own[0], every[1] && own[1]];
        }
        self.within.count(every);
    }

    /// What the sample says so far.
    pub fn summary(&self) -> Uncertainty {
        let worked = self.drawn - self.left_out;
        let strings: Vec<StringUncertainty> =
            (0..self.columns.len()).into_par_iter().map(|index| self.string(index, worked)).collect();
        Uncertainty {
            samples: self.drawn,
            left_out: self.left_out,
            seed: self.models.tolerances.seed,
            limit_cents: self.models.tolerances.limit_cents,
            chance_within: chance(self.within.all, worked),
            chance_within_fit: chance(self.within.fit, worked),
            strings,
        }
    }

    fn string(&self, index: usize, worked: u32) -> StringUncertainty {
        let (columns, order) = (&self.columns[index], &self.models.first_order[index]);
        let contacts = order.nominal.ideal;
        let fret = |(place, column): (usize, &Vec<f64>)| FretUncertainty {
            fret: u32::try_from(place + 1).unwrap_or(u32::MAX),
            sounds: chance(u32::try_from(column.len()).unwrap_or(u32::MAX), worked),
            error_cents: order.nominal.errors[place]
                .and_then(|nominal| Band::of(column.clone(), nominal, order.error_sd_cents(place))),
        };
        StringUncertainty {
            string: u32::try_from(index + 1).unwrap_or(u32::MAX),
            name: self.names[index].clone(),
            saddle_setback_mm: Band::of(
                columns.saddle_mm.clone(),
                contacts.saddle_setback_mm,
                order.saddle_sd_mm(),
            ),
            nut_setback_mm: self.models.strings[index]
                .fit
                .nut_moves
                .then(|| Band::of(columns.nut_mm.clone(), contacts.nut_setback_mm, order.nut_sd_mm()))
                .flatten(),
            chance_within: chance(columns.within.all, worked),
            chance_within_fit: chance(columns.within.fit, worked),
            frets: columns.errors.iter().enumerate().map(fret).collect(),
        }
    }
}

impl Within {
    fn count(&mut self, [all, fit]: [bool; 2]) {
        self.all += u32::from(all);
        self.fit += u32::from(fit);
    }
}

fn chance(count: u32, of: u32) -> f64 {
    if of == 0 { 0.0 } else { f64::from(count) / f64::from(of) }
}
