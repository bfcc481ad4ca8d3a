//! How far the domains would come out the same from other readings of the same ground.

use super::agglomerate::{Regions, Until};
use super::evidence::scored;
use super::search::{Partition, Problem, Start};
use crate::notice::Progress;
use rand::{RngExt, SeedableRng};
use rand_chacha::ChaCha8Rng;
use rayon::prelude::*;
use std::collections::{BTreeMap, HashMap};

/// Random weights add about as much noise again as the readings have.
const NOISE: f64 = 2.0;
/// Stream of random numbers of the first replicate.
const STREAM: u64 = 1 << 40;

/// What the replicates say.
pub(super) struct Stability {
    /// Per domain: mean over replicates of its best overlap (Jaccard 1901) with a domain of the replicate.
    pub overlap: Vec<f64>,
    /// Per pair of adjacent domains: share of replicates that tell them apart, and strong edges between them.
    pub told_apart: BTreeMap<[u32; 2], (f64, usize)>,
    /// Number of domains of each replicate.
    pub counts: Vec<usize>,
}

/// Merges cells again under exponential weights of the readings (the Bayesian bootstrap, Rubin 1981). The cells
/// are `cut` along the boundaries found, so that none straddles one.
pub(super) fn stability(
    problem: &Problem,
    found: &Partition,
    cut: &Start,
    replicates: usize,
    seed: u64,
    progress: &dyn Progress,
) -> Stability {
    let until = problem.wanted.map_or(Until::Least, Until::Count);
    let phi: Vec<f64> = problem.phi.iter().map(|p| p * NOISE).collect();
    let drawn: Vec<(Vec<f64>, Vec<u32>, usize)> = (0..replicates)
        .into_par_iter()
        .map(|replicate| {
            let mut rng = ChaCha8Rng::seed_from_u64(seed);
            rng.set_stream(STREAM + replicate as u64);
            let weight: Vec<f64> = found.weight.iter().map(|w| -w * (1.0 - rng.random::<f64>()).ln()).collect();
            let terms = scored(&cut.moments(problem, &weight, &phi), problem.table);
            let regions =
                Regions::new(problem.table, problem.sites.structures, terms, cut.links.clone(), problem.address);
            let (merged, groups, _) = regions.agglomerate(until);
            let (best, most) = overlaps(problem, found, &cut.cell, &merged, groups);
            progress.advance(1);
            (best, most, groups)
        })
        .collect();
    let mut overlap = vec![0.0; found.count];
    for (best, _, _) in &drawn {
        for (sum, b) in overlap.iter_mut().zip(best) {
            *sum += b;
        }
    }
    for sum in &mut overlap {
        *sum /= replicates.max(1) as f64;
    }
    let mut told_apart: BTreeMap<[u32; 2], (f64, usize)> = BTreeMap::new();
    for (edges, worth) in [(&problem.graph.strong, 1), (&problem.graph.weak, 0)] {
        for &[a, b] in edges {
            let (a, b) = (found.label[a as usize], found.label[b as usize]);
            if a != b {
                told_apart.entry([a.min(b), a.max(b)]).or_default().1 += worth;
            }
        }
    }
    for ([a, b], (share, _)) in &mut told_apart {
        let apart = drawn.iter().filter(|(_, most, _)| most[*a as usize] != most[*b as usize]).count();
        *share = apart as f64 / replicates.max(1) as f64;
    }
    Stability { overlap, told_apart, counts: drawn.into_iter().map(|d| d.2).collect() }
}

/// Per domain: its best Jaccard overlap with a group of the replicate, and the group that most of it lies in.
fn overlaps(problem: &Problem, found: &Partition, cell: &[u32], merged: &[u32], groups: usize) -> (Vec<f64>, Vec<u32>) {
    let mut both: HashMap<(u32, u32), usize> = HashMap::new();
    let (mut domain, mut group) = (vec![0; found.count], vec![0; groups]);
    for (i, (&d, &c)) in found.label.iter().zip(cell).enumerate() {
        let (g, load) = (merged[c as usize], problem.sites.load(i));
        *both.entry((d, g)).or_default() += load;
        domain[d as usize] += load;
        group[g as usize] += load;
    }
    let mut best = vec![0.0f64; found.count];
    let mut most = vec![(0, 0u32); found.count];
    for ((d, g), shared) in both {
        let (d_, g_) = (d as usize, g as usize);
        best[d_] = best[d_].max(shared as f64 / (domain[d_] + group[g_] - shared) as f64);
        // Ties go to the smaller number: the order of a hash map must not show.
        if shared > most[d_].0 || (shared == most[d_].0 && g < most[d_].1) {
            most[d_] = (shared, g);
        }
    }
    (best, most.into_iter().map(|m| m.1).collect())
}
