//! How long the heavier statistics take: `cargo bench --bench fabric`. `density_numpy.py` beside this file times the
//! same density sum in numpy, for comparison on the same machine. The readings are invented.

use criterion::{Criterion, criterion_group, criterion_main};
use homocline::fabric::density::{Method, density};
use homocline::fabric::net_grid::{Projection, nodes};
use homocline::fabric::sets::{SetCount, sets};
use homocline::fabric::{FabricOptions, Kind, Sample, bootstrap, summarise};
use homocline::orientation::Axis;
use std::hint::black_box;

/// Readings scattered about a fold's girdle, without a random generator.
fn readings(n: usize) -> Vec<Axis> {
    (0..n)
        .map(|i| {
            let (u, v) = ((i as f64 * 0.618_034) % 1.0, (i as f64 * 0.414_214) % 1.0);
            Axis::from_trend_plunge(40.0 + 12.0 * (u - 0.5), 180.0 * v)
        })
        .collect()
}

fn fabric(c: &mut Criterion) {
    let axes = readings(10_000);
    let sample = Sample::new(&axes, Kind::Planar);
    let grid = nodes(57, Projection::EqualArea);
    c.bench_function(&format!("density, 10,000 readings, {} nodes", grid.len()), |b| {
        b.iter(|| density(black_box(&sample), &grid, Method::ExponentialKamb(3.0)))
    });
    c.bench_function("pivotal bootstrap, 10,000 readings, 1,000 resamples", |b| {
        b.iter(|| bootstrap::pivotal(black_box(&sample), 2, 1_000, 0.95, 1))
    });
    c.bench_function("percentile bootstrap, 10,000 readings, 1,000 resamples", |b| {
        b.iter(|| bootstrap::percentile(black_box(&sample), 2, 1_000, 0.95, 1))
    });
    c.bench_function("summary, 10,000 readings", |b| {
        b.iter(|| summarise(black_box(&sample), &FabricOptions::default()))
    });
    c.bench_function("sets, 10,000 readings", |b| b.iter(|| sets(black_box(&sample), SetCount::Auto, 1)));
}

criterion_group! { name = benches; config = Criterion::default().sample_size(10); targets = fabric }
criterion_main!(benches);
