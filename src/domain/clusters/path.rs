//! Energy against the number of domains, about the partition found.

use super::agglomerate::{Regions, Step, Until, links};
use super::evidence::scored;
use super::search::{Partition, Problem, Start};

/// Counts above the number found that are reported.
const MORE: usize = 20;

/// Energies of the best chain of merges through the partition found, which has 0: above its count the cells of
/// `cut` merge inside their domains, below it the domains merge. Counts fall.
pub(super) fn path(problem: &Problem, found: &Partition, cut: &Start) -> Vec<Step> {
    let mut label = vec![0; cut.links.len()];
    for (&cell, &domain) in cut.cell.iter().zip(&found.label) {
        label[cell as usize] = domain;
    }
    let mut inside = cut.links.clone();
    for (cell, links) in inside.iter_mut().enumerate() {
        links.retain(|&other, _| label[other as usize] == label[cell]);
    }
    let cells = cut.moments(problem, &found.weight, problem.phi);
    let way = |moments: &[_], links| {
        let terms = scored(moments, problem.table);
        Regions::new(problem.table, problem.sites.structures, terms, links, problem.address).agglomerate(Until::Least).2
    };
    let mut path = way(&cells, inside);
    let end = path.last().map_or(0.0, |s| s.energy);
    path.pop();
    path.retain(|s| s.count <= found.count + MORE);
    for step in &mut path {
        step.energy -= end;
    }
    path.extend(way(&found.moments(problem), links(problem.graph, &found.label, found.count)));
    path
}

/// The other count of least energy.
pub(super) fn runner_up(path: &[Step], count: usize) -> Option<Step> {
    path.iter().filter(|s| s.count != count).min_by(|a, b| a.energy.total_cmp(&b.energy)).copied()
}
