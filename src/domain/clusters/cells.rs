//! Small compact cells that know nothing of orientation: pieces chosen by likeness would find likeness.

use super::graph::{Graph, Sets};
use super::sites::Sites;
use std::cmp::Reverse;
use std::collections::BinaryHeap;

/// Rounds of moving each seed to the middle of its cell (Lloyd 1982, on the graph's distances).
const ROUNDS: usize = 2;

/// A cell number per site, and how many cells there are; about `size` readings each.
pub(super) fn cells(sites: &Sites, graph: &Graph, size: f64) -> (Vec<u32>, usize) {
    let mut seeds = seeds(sites, graph, size);
    let mut cell = nearest_seed(sites, graph, &seeds);
    for _ in 0..ROUNDS {
        seeds = middles(sites, &cell, seeds.len());
        cell = nearest_seed(sites, graph, &seeds);
    }
    (cell, seeds.len())
}

/// Seeds at equal shares of the readings along the curve, in each connected component.
fn seeds(sites: &Sites, graph: &Graph, size: f64) -> Vec<u32> {
    let mut sets = Sets::new(sites.len());
    for &[a, b] in &graph.strong {
        sets.unite(a, b);
    }
    let (component, count) = sets.labels();
    let mut members: Vec<Vec<u32>> = vec![Vec::new(); count];
    for (site, &component) in component.iter().enumerate() {
        members[component as usize].push(site as u32);
    }
    let mut seeds = Vec::new();
    for members in members {
        let load: usize = members.iter().map(|&i| sites.load(i as usize)).sum();
        let wanted = (load as f64 / size).round().max(1.0);
        let (mut passed, mut next) = (0.0, 0.0);
        for site in members {
            passed += sites.load(site as usize) as f64;
            if passed > (next + 0.5) * load as f64 / wanted {
                seeds.push(site);
                // A site with many readings may stand for several seeds.
                while passed > (next + 0.5) * load as f64 / wanted {
                    next += 1.0;
                }
            }
        }
    }
    seeds
}

/// For every site the seed that is nearest along strong edges (Dijkstra 1959 from all seeds at once).
fn nearest_seed(sites: &Sites, graph: &Graph, seeds: &[u32]) -> Vec<u32> {
    const NONE: u32 = u32::MAX;
    let mut cell = vec![NONE; sites.len()];
    let mut reached = vec![f64::INFINITY; sites.len()];
    // Distances are not negative, so their bits sort as they do.
    let mut queue: BinaryHeap<Reverse<(u64, u32, u32)>> = BinaryHeap::new();
    for (number, &seed) in seeds.iter().enumerate() {
        reached[seed as usize] = 0.0;
        queue.push(Reverse((0, seed, number as u32)));
    }
    while let Some(Reverse((distance, site, number))) = queue.pop() {
        if cell[site as usize] != NONE {
            continue;
        }
        cell[site as usize] = number;
        for &next in graph.neighbours(site as usize) {
            let far = f64::from_bits(distance) + sites.distance(site as usize, next as usize);
            if cell[next as usize] == NONE && far <= reached[next as usize] {
                reached[next as usize] = far;
                queue.push(Reverse((far.to_bits(), next, number)));
            }
        }
    }
    cell
}

/// The site nearest to the mean position of each cell.
fn middles(sites: &Sites, cell: &[u32], count: usize) -> Vec<u32> {
    let mut mean = vec![[0.0; 3]; count];
    for (i, &c) in cell.iter().enumerate() {
        let at = sites.coord(i);
        let sum = &mut mean[c as usize];
        *sum = [sum[0] + at.x, sum[1] + at.y, sum[2] + 1.0];
    }
    let mut best = vec![(f64::INFINITY, 0u32); count];
    for (i, &c) in cell.iter().enumerate() {
        let ([x, y, n], at) = (mean[c as usize], sites.coord(i));
        let off = (at.x - x / n).hypot(at.y - y / n);
        if off < best[c as usize].0 {
            best[c as usize] = (off, i as u32);
        }
    }
    best.into_iter().map(|(_, i)| i).collect()
}
