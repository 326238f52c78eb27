//! How long it takes to write a solved plan in the three forms of the drawing.
#![allow(missing_docs, clippy::unwrap_used)]

use crestline_plan::{check, example, read, solve};
use crestline_sheets::{Format, SheetOptions, export};
use criterion::{Criterion, criterion_group, criterion_main};

fn exports(criterion: &mut Criterion) {
    for name in ["steel_six", "fanned_eight"] {
        let plan = read(example(name).unwrap().text).unwrap();
        let solution = solve(&check(&plan).unwrap()).unwrap();
        let options = SheetOptions::for_plan(&plan);
        let write = |format| export(format, &plan, &solution, &options).len();
        criterion.bench_function(&format!("{name}: SVG, PDF and DXF"), |bencher| {
            bencher.iter(|| write(Format::Svg) + write(Format::Pdf) + write(Format::Dxf));
        });
    }
}

criterion_group!(benches, exports);
criterion_main!(benches);
