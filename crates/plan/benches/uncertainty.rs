//! Time of a sample, and how it grows with instruments and strings.
#![allow(clippy::unwrap_used, missing_docs)]

use std::ops::ControlFlow;

use crestline_plan::{Plan, Tolerances, check, example, read, shares, solve, uncertainty};
use criterion::{BenchmarkId, Criterion, criterion_group, criterion_main};

fn plan(strings: usize, samples: u32) -> Plan {
    let mut plan = read(example("steel_six").unwrap().text).unwrap();
    let all = plan.strings.clone();
    plan.strings = (0..strings).map(|index| all[index % all.len()].clone()).collect();
    plan.tolerances = Some(Tolerances { samples, ..Tolerances::default() });
    plan
}

fn sample(plan: &Plan) {
    let found = uncertainty(&check(plan).unwrap(), &mut |_| ControlFlow::Continue(())).unwrap().unwrap();
    assert_eq!(found.left_out, 0);
}

fn benches(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("uncertainty");
    group.sample_size(10);
    for (strings, samples) in [(6, 1_000), (6, 10_000), (1, 1_000), (12, 1_000)] {
        let plan = plan(strings, samples);
        let name = BenchmarkId::new(format!("{strings} strings"), samples);
        group.bench_function(name, |bencher| bencher.iter(|| sample(&plan)));
    }
    let plan = plan(6, 1_000);
    let checked = check(&plan).unwrap();
    group.bench_function("shares, 6 strings", |bencher| bencher.iter(|| shares(&checked).unwrap()));
    group.bench_function("solve with first-order bands", |bencher| bencher.iter(|| solve(&checked).unwrap()));
    group.finish();
}

criterion_group!(all, benches);
criterion_main!(all);
