//! How long a diagnosis takes, and how it grows with strings and readings.
#![allow(clippy::unwrap_used, missing_docs)]

use crestline_plan::{
    Checked, Priors, Reading, ReadingKind, check, diagnose, example, fit_supports, read, solve,
};
use criterion::{BenchmarkId, Criterion, criterion_group, criterion_main};

/// The frets that are read, the first ones where fewer are asked for.
const FRETS: [u32; 20] = [1, 2, 3, 5, 7, 9, 10, 12, 14, 15, 4, 6, 8, 11, 13, 16, 17, 18, 19, 20];
/// How far the crests of the instrument read stand beyond their place, mm, so that there is something to be found.
const OFF_MM: f64 = -1.5;
/// Errors of reading, cents, over and over: a mean of 0 and a standard deviation of 1 over the eight.
const NOISE_CENTS: [f64; 8] = [0.6, -1.4, 0.2, 1.5, -0.7, -0.9, 1.2, -0.5];

/// The steel-string six with so many strings, each read open and at so many frets.
fn plan(strings: usize, frets: usize) -> Checked {
    let mut plan = read(example("steel_six").unwrap().text).unwrap();
    plan.strings = plan.strings.iter().cycle().take(strings).cloned().collect();
    let ideal = solve(&check(&plan).unwrap()).unwrap().report;
    plan.as_built = Some(crestline_plan::AsBuilt {
        saddle_setback_mm: ideal
            .strings
            .iter()
            .map(|string| string.ideal.saddle_setback_mm + OFF_MM)
            .collect(),
        nut_setback_mm: vec![0.0; strings],
    });
    let sounds = solve(&check(&plan).unwrap()).unwrap().report;
    let mut noise = NOISE_CENTS.iter().cycle();
    for string in &sounds.strings {
        let mut reading = |fret, kind, cents: f64| {
            let cents = cents + noise.next().unwrap();
            plan.readings.push(Reading { string: string.string, fret, kind, cents });
        };
        reading(0, ReadingKind::Open, 0.0);
        for &fret in &FRETS[..frets] {
            reading(fret, ReadingKind::Fretted, string.frets[fret as usize - 1].as_built_cents.unwrap());
        }
    }
    check(&plan).unwrap()
}

fn diagnosing(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("diagnose");
    let priors = Priors::default();
    for strings in [1, 3, 6, 12] {
        let checked = plan(strings, 10);
        group.bench_with_input(BenchmarkId::new("strings, 10 frets", strings), &checked, |bench, checked| {
            bench.iter(|| diagnose(checked, &priors).unwrap());
        });
    }
    for frets in [5, 20] {
        let checked = plan(6, frets);
        group.bench_with_input(BenchmarkId::new("6 strings, frets", frets), &checked, |bench, checked| {
            bench.iter(|| diagnose(checked, &priors).unwrap());
        });
    }
    let checked = plan(6, 10);
    group.bench_function("fixities, 6 strings, 10 frets", |bench| {
        bench.iter(|| fit_supports(&checked, &priors).unwrap());
    });
    group.finish();
}

criterion_group!(benches, diagnosing);
criterion_main!(benches);
