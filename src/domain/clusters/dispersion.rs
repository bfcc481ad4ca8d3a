//! Local overdispersion: how much more alike readings near each other are than independent draws.
//!
//! Neighbouring cells of one population should differ as little as when their readings are dealt again at
//! random. Where they differ more (a fold's limbs, several readings of one outcrop), the surplus is structure at
//! a scale below the domains, and evidence there is worth less.

use super::evidence::{Moments, Scored};
use super::score::Table;
use super::sites::Sites;
use rand::SeedableRng;
use rand::seq::SliceRandom;
use rand_chacha::ChaCha8Rng;
use rayon::prelude::*;
use std::collections::BTreeSet;

/// Fewest cells for an estimate.
pub(super) const LEAST_CELLS: usize = 100;
/// The quantile compared: below the middle, so that pairs on domain boundaries weigh little.
const QUANTILE: f64 = 0.4;
/// Rings of cells about a cell whose pairs count for it.
const RINGS: usize = 3;
/// Fewest pairs for an estimate of its own.
const LEAST_PAIRS: usize = 12;
/// The null quantile counts as at least this.
const LEAST_NULL: f64 = 0.3;
/// Stream of random numbers of the first pair.
const STREAM: u64 = 1 << 32;

/// Overdispersion per cell, at least 1.
pub(super) fn local(
    sites: &Sites,
    cell: &[u32],
    links: &super::agglomerate::Links,
    table: &Table,
    seed: u64,
) -> Vec<f64> {
    let count = links.len();
    if count < LEAST_CELLS {
        return vec![1.0; count];
    }
    let mut members: Vec<Vec<u32>> = vec![Vec::new(); count];
    for (reading, &site) in sites.site.iter().enumerate() {
        members[cell[site as usize] as usize].push(reading as u32);
    }
    let mut pairs: Vec<[u32; 2]> = Vec::new();
    let mut pairs_of: Vec<Vec<u32>> = vec![Vec::new(); count];
    for (a, links) in links.iter().enumerate() {
        for (&b, _) in links.range(a as u32 + 1..) {
            pairs_of[a].push(pairs.len() as u32);
            pairs_of[b as usize].push(pairs.len() as u32);
            pairs.push([a as u32, b]);
        }
    }
    let likelihood = |readings: &[&[u32]]| score(sites, readings, table);
    let alone: Vec<f64> = members.par_iter().map(|m| likelihood(&[m])).collect();
    let (real, mut null): (Vec<f64>, Vec<f64>) = pairs
        .par_iter()
        .enumerate()
        .map(|(number, &[a, b])| {
            let (first, second) = (&members[a as usize], &members[b as usize]);
            let both = likelihood(&[first, second]);
            let mut rng = ChaCha8Rng::seed_from_u64(seed);
            rng.set_stream(STREAM + number as u64);
            let mut dealt: Vec<u32> = first.iter().chain(second).copied().collect();
            dealt.shuffle(&mut rng);
            let (left, right) = dealt.split_at(first.len());
            (alone[a as usize] + alone[b as usize] - both, likelihood(&[left]) + likelihood(&[right]) - both)
        })
        .unzip();
    let expected = quantile(&mut null).max(LEAST_NULL);
    (0..count)
        .into_par_iter()
        .map(|cell| {
            let mut near: BTreeSet<u32> = BTreeSet::from([cell as u32]);
            let mut rim: Vec<u32> = vec![cell as u32];
            for _ in 0..RINGS {
                rim = rim.iter().flat_map(|&c| links[c as usize].keys().copied()).filter(|&c| near.insert(c)).collect();
            }
            let about: BTreeSet<u32> = near.iter().flat_map(|&c| pairs_of[c as usize].iter().copied()).collect();
            let mut values: Vec<f64> = about.into_iter().map(|p| real[p as usize]).collect();
            if values.len() < LEAST_PAIRS { 1.0 } else { (quantile(&mut values) / expected).max(1.0) }
        })
        .collect()
}

/// Log-likelihood of the best Bingham distribution of these readings, summed over structures.
fn score(sites: &Sites, readings: &[&[u32]], table: &Table) -> f64 {
    let mut moments = vec![Moments::default(); sites.structures];
    for &r in readings.iter().copied().flatten() {
        let reading = &sites.readings[r as usize];
        moments[reading.structure].add_reading(&reading.products, 1.0, 1.0);
    }
    moments.into_iter().map(|m| Scored::new(m, table).bingham).sum()
}

/// The quantile [`QUANTILE`], interpolated linearly.
fn quantile(values: &mut [f64]) -> f64 {
    values.sort_unstable_by(f64::total_cmp);
    let at = QUANTILE * values.len().saturating_sub(1) as f64;
    let (low, part) = (at as usize, at.fract());
    match (values.get(low), values.get(low + 1)) {
        (Some(a), Some(b)) => a + part * (b - a),
        (Some(a), None) => *a,
        _ => 0.0,
    }
}
