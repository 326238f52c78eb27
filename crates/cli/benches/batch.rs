//! How long `solve` takes over many plans, from the files to the lines of JSON: `cargo bench -p crestline-cli`.
#![allow(missing_docs, clippy::expect_used)]

use std::hint::black_box;
use std::path::PathBuf;

use crestline_cli::{Outcome, Streams, run};
use criterion::{BenchmarkId, Criterion, criterion_group, criterion_main};

/// Solves the plan as often as the paths name it and gives the bytes printed.
fn solved(paths: &[PathBuf]) -> Vec<u8> {
    let (mut input, mut output, mut messages) = (std::io::empty(), Vec::new(), Vec::new());
    let mut streams = Streams { input: &mut input, output: &mut output, messages: &mut messages };
    let words = ["crestline", "solve", "--lines"].map(PathBuf::from);
    let arguments: Vec<_> = words.into_iter().chain(paths.iter().cloned()).collect();
    assert_eq!(run(arguments, &mut streams), Outcome::Finished(0));
    output
}

fn batch(criterion: &mut Criterion) {
    let folder = tempfile::tempdir().expect("a folder for the plans");
    let plan = crestline_plan::example("steel_six").expect("the example is there").text;
    let paths: Vec<PathBuf> = (0..1000).map(|index| folder.path().join(format!("{index}.json"))).collect();
    for path in &paths {
        std::fs::write(path, plan).expect("the plan can be written");
    }
    let mut group = criterion.benchmark_group("six-string plans by one command");
    group.sample_size(10);
    for count in [1, 10, 100, 1000] {
        group.bench_with_input(BenchmarkId::from_parameter(count), &paths[..count], |bencher, paths| {
            bencher.iter(|| solved(black_box(paths)));
        });
    }
    group.finish();
}

criterion_group!(benches, batch);
criterion_main!(benches);
