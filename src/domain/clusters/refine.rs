//! From cells to sites: boundaries move site by site to where the readings put them.

use super::agglomerate::{BORDER, Regions, links};
use super::evidence::{Density, Moments, densities, gather, membership, own_logs, scored};
use super::graph::Sets;
use super::search::{Partition, Problem};

/// Sweeps over the sites in one round, at most.
const SWEEPS: usize = 30;
/// Rounds of sweeping, cutting into components and merging, at most.
const ROUNDS: usize = 3;

/// Moves boundary sites to the neighbouring domain that describes them better, then cuts the domains into
/// connected pieces, joins pieces that are too small and merges where that pays; up to three rounds.
pub(super) fn refine(problem: &Problem, mut partition: Partition) -> Partition {
    for _ in 0..ROUNDS {
        let mut next = partition.clone();
        let moments = next.moments(problem);
        let densities = densities(&moments, problem.table);
        next.weight = own_logs(problem.sites, &next.label, &densities).into_iter().map(membership).collect();
        let moved = sweep(problem, &mut next.label, &densities);
        let next = tidy(problem, next);
        if problem.wanted.is_some_and(|wanted| next.count < wanted.min(partition.count)) {
            break;
        }
        partition = next;
        if !moved {
            break;
        }
    }
    partition
}

/// Iterated conditional modes (Besag 1986): boundary sites in the order of the curve take the neighbouring label
/// of the greatest log density plus border saved, until nothing moves. True where something moved.
///
/// Overdispersion is left out here: it keeps limbs of a fold from becoming domains, while which of two settled
/// fabrics a site belongs to is told by its readings in full.
fn sweep(problem: &Problem, label: &mut [u32], densities: &[Density]) -> bool {
    let sites = problem.sites;
    let mut waiting = vec![true; sites.len()];
    let mut any = false;
    for _ in 0..SWEEPS {
        let mut moved = false;
        for site in 0..sites.len() {
            if !std::mem::take(&mut waiting[site]) {
                continue;
            }
            let own = label[site];
            let around = problem.graph.neighbours(site);
            let mut choices: Vec<u32> = around.iter().map(|&j| label[j as usize]).filter(|&l| l != own).collect();
            if choices.is_empty() {
                continue;
            }
            choices.sort_unstable();
            choices.dedup();
            let worth = |l: u32| {
                let logs: f64 = sites.readings[sites.start[site]..sites.start[site + 1]]
                    .iter()
                    .map(|r| densities[l as usize * sites.structures + r.structure].log_mixed(r))
                    .sum();
                let alike = around.iter().filter(|&&j| label[j as usize] == l).count();
                logs + BORDER * alike as f64
            };
            let mut best = (own, worth(own));
            for l in choices {
                let value = worth(l);
                if value > best.1 + 1e-12 {
                    best = (l, value);
                }
            }
            if best.0 != own {
                label[site] = best.0;
                moved = true;
                for &j in around {
                    waiting[j as usize] = true;
                }
            }
        }
        any |= moved;
        if !moved {
            break;
        }
    }
    any
}

/// Labels to connected pieces, small pieces joined, neighbours merged while that lowers the energy.
pub(super) fn tidy(problem: &Problem, mut partition: Partition) -> Partition {
    let sites = problem.sites;
    let mut sets = Sets::new(sites.len());
    for &[a, b] in problem.graph.strong.iter().chain(&problem.graph.weak) {
        if partition.label[a as usize] == partition.label[b as usize] {
            sets.unite(a, b);
        }
    }
    let (piece, count) = sets.labels();
    let mut size = vec![0; count];
    for (i, &p) in piece.iter().enumerate() {
        size[p as usize] += sites.load(i);
    }
    let moments: Vec<Moments> = gather(sites, &piece, count, &partition.weight, problem.phi);
    let regions = Regions::new(
        problem.table,
        sites.structures,
        scored(&moments, problem.table),
        links(problem.graph, &piece, count),
        problem.address,
    );
    let (merged, count) = regions.tidy(size, problem.least, problem.wanted);
    partition.label = piece.into_iter().map(|p| merged[p as usize]).collect();
    partition.count = count;
    partition
}
