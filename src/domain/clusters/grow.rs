//! The whole way from readings to domains.

use super::barrier::Fence;
use super::cells::cells;
use super::dispersion;
use super::graph::Graph;
use super::path::{path, runner_up};
use super::score::Table;
use super::search::{Partition, Problem, Start, from_start, overlay};
use super::sites::Sites;
use super::stability::{Stability, stability};
use super::{Barriers, Count, GrowError, GrowOptions, Grown, GrownBoundary, GrownDomain, Places, Step};
use crate::notice::Progress;
use geo::LineString;
use rayon::prelude::*;

/// A domain holds at least one reading in this many.
const SHARE: usize = 200;
/// Readings in a cell, at most, below a million readings; and the divisor beyond.
const CELL: [f64; 2] = [60.0, 20_000.0];
/// Sizes of cells tried up to this many readings, as multiples of the first; beyond, the first alone.
const STARTS: (usize, [f64; 6]) = (20_000, [1.0, 2.0, 0.5, 1.4, 0.7, 2.8]);

/// Grows domains.
///
/// The answer is the same whatever the order of readings, the origin and unit of the positions, and the number of
/// threads. Barriers are lines that no domain crosses; one with a dangling end separates only what it cuts.
pub fn grow(
    places: &Places,
    barriers: &[LineString<f64>],
    options: &GrowOptions,
    progress: &dyn Progress,
) -> Result<Grown, GrowError> {
    let sites = Sites::new(places)?;
    let wanted = match options.count {
        Count::Auto => None,
        Count::Exactly(0) => return Err(GrowError::NoDomains),
        Count::Exactly(count) if count > sites.len() => {
            return Err(GrowError::TooManyDomains { count, stations: sites.len() });
        }
        Count::Exactly(count) => Some(count),
    };
    progress.begin("neighbours", None);
    let n = sites.readings.len();
    // Asking for many domains is asking for small ones.
    let fair = wanted.map_or(usize::MAX, |count| n / (2 * count));
    let smallest = options.smallest.max((n + SHARE / 2) / SHARE).min(fair).max(1);
    let (fence, used) = Fence::new(barriers, &sites)?;
    let graph = Graph::new(&sites, &fence, smallest);
    let barriers = Barriers { joined_across: graph.joined, ..used };
    progress.end();

    progress.begin("cells", None);
    let size = (smallest as f64 / 2.5).round().clamp(4.0, CELL[0]).min(fair as f64).max((n as f64 / CELL[1]).round());
    let multiples = if n <= STARTS.0 { &STARTS.1[..] } else { &STARTS.1[..1] };
    let starts: Vec<Start> = multiples
        .par_iter()
        .map(|multiple| {
            let (cell, count) = cells(&sites, &graph, (size * multiple).max(1.0));
            Start::new(&graph, cell, count)
        })
        .collect();
    let table = Table::get();
    let of_cell = dispersion::local(&sites, &starts[0].cell, &starts[0].links, table, options.seed);
    let phi: Vec<f64> = starts[0].cell.iter().map(|&c| of_cell[c as usize]).collect();
    progress.end();

    progress.begin("merging", None);
    let problem = Problem {
        sites: &sites,
        graph: &graph,
        table,
        phi: &phi,
        address: 0.5 * (n as f64 / size).max(1.0).ln(),
        least: smallest,
        wanted,
    };
    let found = number(&sites, search(&problem, &starts));
    progress.end();

    progress.begin("stability", Some(options.replicates as u64));
    let cut = starts[0].cut(&problem, &found);
    let path = path(&problem, &found, &cut);
    let stable = stability(&problem, &found, &cut, options.replicates, options.seed, progress);
    progress.end();
    Ok(report(&problem, found, stable, path, starts[0].links.len(), options, barriers))
}

/// The partition of least energy from all starts, or from what their partitions agree upon; ties go to the first.
fn search(problem: &Problem, starts: &[Start]) -> Partition {
    let from = |start: &Start| {
        let partition = from_start(problem, start);
        (partition.energy(problem), partition)
    };
    let mut tried: Vec<(f64, Partition)> = starts.par_iter().map(from).collect();
    if tried.len() > 1 {
        tried.push(from(&overlay(problem, &tried)));
    }
    let least = tried.into_iter().reduce(|best, next| if next.0 < best.0 - 1e-9 { next } else { best });
    least.expect("there is a start").1
}

/// Numbers the domains from north to south, then from west to east.
fn number(sites: &Sites, mut partition: Partition) -> Partition {
    let mut sums = vec![[0i64; 3]; partition.count];
    for (&label, at) in partition.label.iter().zip(&sites.at) {
        let sum = &mut sums[label as usize];
        *sum = [sum[0] + at[0], sum[1] + at[1], sum[2] + 1];
    }
    let mut order: Vec<usize> = (0..partition.count).collect();
    let mean = |d: usize, axis: usize| sums[d][axis] as f64 / sums[d][2].max(1) as f64;
    order.sort_by(|&a, &b| mean(b, 1).total_cmp(&mean(a, 1)).then(mean(a, 0).total_cmp(&mean(b, 0))));
    let mut rank = vec![0; partition.count];
    for (place, domain) in order.into_iter().enumerate() {
        rank[domain] = place as u32;
    }
    for label in &mut partition.label {
        *label = rank[*label as usize];
    }
    partition
}

fn report(
    problem: &Problem,
    found: Partition,
    stable: Stability,
    path: Vec<Step>,
    cells: usize,
    options: &GrowOptions,
    barriers: Barriers,
) -> Grown {
    let sites = problem.sites;
    let tried = options.replicates > 0;
    let mut domains: Vec<GrownDomain> = stable
        .overlap
        .iter()
        .map(|&overlap| GrownDomain { readings: 0, stations: 0, stability: tried.then_some(overlap) })
        .collect();
    for (i, &label) in found.label.iter().enumerate() {
        domains[label as usize].stations += 1;
        domains[label as usize].readings += sites.load(i);
    }
    let boundaries = stable
        .told_apart
        .iter()
        .map(|(&[a, b], &(share, pairs))| GrownBoundary { a, b, pairs, told_apart: tried.then_some(share) })
        .collect();
    let (mut domain, mut outlier) = (vec![0; sites.row.len()], vec![0.0; sites.row.len()]);
    for ((&row, &site), &weight) in sites.row.iter().zip(&sites.site).zip(&found.weight) {
        domain[row as usize] = found.label[site as usize];
        outlier[row as usize] = 1.0 - weight;
    }
    let total: f64 = sites.site.iter().map(|&s| problem.phi[s as usize]).sum();
    Grown {
        domain,
        outlier,
        domains,
        boundaries,
        runner_up: runner_up(&path, found.count),
        path,
        overdispersion: total / sites.readings.len() as f64,
        cells,
        smallest: problem.least,
        replicate_counts: stable.counts,
        barriers,
    }
}
