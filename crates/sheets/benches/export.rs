//! How long it takes to write a solved plan in the three forms of the drawing.
#![allow(missing_docs, clippy::unwrap_used)]

use crestline_plan::{Plan, check, example, read, solve};
use crestline_sheets::{Format, SheetOptions, export};
use criterion::{Bencher, BenchmarkId, Criterion, criterion_group, criterion_main};

/// Solves once and times the writing alone.
fn write_all(bencher: &mut Bencher<'_>, plan: &Plan) {
    let solution = solve(&check(plan).unwrap()).unwrap();
    let options = SheetOptions::for_plan(plan);
    let write = |format| export(format, plan, &solution, &options).len();
    bencher.iter(|| write(Format::Svg) + write(Format::Pdf) + write(Format::Dxf));
}

fn exports(criterion: &mut Criterion) {
    for name in ["steel_six", "fanned_eight"] {
        let plan = read(example(name).unwrap().text).unwrap();
        criterion.bench_function(&format!("{name}: SVG, PDF and DXF"), |bencher| write_all(bencher, &plan));
    }
    let mut group = criterion.benchmark_group("SVG, PDF and DXF");
    let example = read(example("steel_six").unwrap().text).unwrap();
    for strings in [1, 3, 6, 12] {
        let mut plan = example.clone();
        plan.strings = plan.strings.iter().cycle().take(strings).cloned().collect();
        group.bench_with_input(BenchmarkId::new("strings", strings), &plan, write_all);
    }
    for frets in [12, 24, 36] {
        let mut plan = example.clone();
        plan.instrument.frets = frets;
        group.bench_with_input(BenchmarkId::new("frets", frets), &plan, write_all);
    }
    group.finish();
}

criterion_group!(benches, exports);
criterion_main!(benches);
