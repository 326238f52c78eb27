//! How long solving and comparing takes, and how it grows with strings and frets.
#![allow(clippy::unwrap_used, missing_docs)]

use crestline_plan::{Checked, FitRule, SaddleStyle, check, compare, example, read, solve};
use criterion::{BenchmarkId, Criterion, criterion_group, criterion_main};

/// The steel-string six with other numbers of strings and frets, a straight saddle and this rule.
fn plan(strings: usize, frets: u32, rule: FitRule) -> Checked {
    let mut plan = read(example("steel_six").unwrap().text).unwrap();
    plan.strings = plan.strings.iter().cycle().take(strings).cloned().collect();
    plan.instrument.frets = frets;
    plan.saddle.style = SaddleStyle::Straight;
    plan.fit.rule = rule;
    check(&plan).unwrap()
}

fn solving(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("solve");
    for rule in [FitRule::LeastSquares, FitRule::Twelfth, FitRule::Minimax] {
        let checked = plan(6, 20, rule);
        group.bench_function(format!("6 strings, 20 frets, straight, {rule:?}"), |bench| {
            bench.iter(|| solve(&checked).unwrap());
        });
    }
    for strings in [1, 2, 4, 8, 16] {
        let checked = plan(strings, 20, FitRule::LeastSquares);
        group.bench_with_input(BenchmarkId::new("strings", strings), &checked, |bench, checked| {
            bench.iter(|| solve(checked).unwrap());
        });
    }
    for frets in [12, 24, 36] {
        let checked = plan(6, frets, FitRule::LeastSquares);
        group.bench_with_input(BenchmarkId::new("frets", frets), &checked, |bench, checked| {
            bench.iter(|| solve(checked).unwrap());
        });
    }
    group.finish();
}

fn comparing(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("compare");
    for strings in [1, 3, 6, 12] {
        let checked = plan(strings, 20, FitRule::LeastSquares);
        group.bench_with_input(BenchmarkId::new("strings", strings), &checked, |bench, checked| {
            bench.iter(|| compare(checked).unwrap());
        });
    }
    for frets in [12, 24, 36] {
        let checked = plan(6, frets, FitRule::LeastSquares);
        group.bench_with_input(BenchmarkId::new("frets", frets), &checked, |bench, checked| {
            bench.iter(|| compare(checked).unwrap());
        });
    }
    group.finish();
}

criterion_group!(benches, solving, comparing);
criterion_main!(benches);
