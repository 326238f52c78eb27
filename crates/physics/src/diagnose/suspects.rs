//! A string that no setup explains, though its neighbours are explained.

use super::search::Found;
use super::unknowns::Unknowns;

/// Fewest readings of a string that can say that nothing explains it.
const FEWEST_READINGS: usize = 5;
/// Typical residual beyond which a string is suspect, in units of the noise.
const SUSPECT_NOISE: f64 = 2.5;
/// The same in units of the other strings' typical residual.
const SUSPECT_OTHERS: f64 = 2.5;
/// A reading is wild where its residual exceeds this, in units of the noise.
const WILD: f64 = 4.0;
/// Least number and share of wild readings that make a string suspect: a slip or two are not the string's.
const WILD_COUNT: usize = 3;
const WILD_SHARE: f64 = 0.25;
/// Median absolute value of a normal distribution, inverse: makes a median a standard deviation.
const NORMAL_MEDIAN: f64 = 1.4826;

/// The string that is explained least, with its typical residual, if that is far from the noise and from the others.
pub(super) fn most_suspect(unknowns: &Unknowns, found: &Found, known: &[bool]) -> Option<(usize, f64)> {
    let residuals: Vec<Vec<f64>> = (0..known.len())
        .map(|string| unknowns.residuals_cents(string, &found.at, &found.errors[string]))
        .collect();
    let typical: Vec<f64> = residuals.iter().map(|own| NORMAL_MEDIAN * median_size(own)).collect();
    let noise = unknowns.priors.reading_cents;
    let is_wild = |own: &[f64]| {
        let wild = own.iter().filter(|residual| residual.abs() > WILD * noise).count();
        wild >= WILD_COUNT && wild as f64 >= WILD_SHARE * own.len() as f64
    };
    let stands_out = |&string: &usize| {
        let others: Vec<usize> = (0..typical.len())
            .filter(|&other| other != string && !known[other] && !residuals[other].is_empty())
            .collect();
        let sizes: Vec<f64> = others.iter().map(|&other| typical[other]).collect();
        let usual = median_size(&sizes).max(noise);
        let are_others_wild =
            2 * others.iter().filter(|&&other| is_wild(&residuals[other])).count() > others.len();
        let is_far = typical[string] > SUSPECT_NOISE * noise && typical[string] > SUSPECT_OTHERS * usual;
        !known[string]
            && residuals[string].len() >= FEWEST_READINGS
            && (is_far || (is_wild(&residuals[string]) && !are_others_wild))
    };
    let size = |string: usize| residuals[string].iter().map(|residual| residual * residual).sum::<f64>();
    let worst = (0..typical.len()).filter(stands_out).max_by(|&a, &b| size(a).total_cmp(&size(b)))?;
    Some((worst, (size(worst) / residuals[worst].len() as f64).sqrt().max(noise)))
}

/// Median of the absolute values; 0 for none.
fn median_size(values: &[f64]) -> f64 {
    let mut sizes: Vec<f64> = values.iter().map(|value| value.abs()).collect();
    sizes.sort_unstable_by(f64::total_cmp);
    match sizes.len() {
        0 => 0.0,
        odd if odd % 2 == 1 => sizes[odd / 2],
        even => 0.5 * (sizes[even / 2 - 1] + sizes[even / 2]),
    }
}
