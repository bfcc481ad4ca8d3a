//! The search for the partition of least energy, from several starts.

use super::agglomerate::{BORDER, Links, Regions, Until, links};
use super::evidence::{Moments, densities, gather, membership, own_logs, parameter_price, scored};
use super::graph::{Graph, Sets};
use super::refine::refine;
use super::score::Table;
use super::sites::Sites;

/// Passes of merging and weighing readings.
const PASSES: usize = 3;

/// Parameters of a domain's fabric in the energy of a whole partition, between Watson's 3 and Bingham's 5.
const PARAMETERS: f64 = 4.0;

/// All that a search needs to know.
pub(super) struct Problem<'a> {
    pub sites: &'a Sites,
    pub graph: &'a Graph,
    pub table: &'a Table,
    /// Overdispersion per site.
    pub phi: &'a [f64],
    /// Price of one more domain.
    pub address: f64,
    /// Fewest readings in a domain.
    pub least: usize,
    /// The number of domains asked for; `None` finds it.
    pub wanted: Option<usize>,
}

/// Cells to start from.
pub(super) struct Start {
    pub cell: Vec<u32>,
    pub links: Links,
}

impl Start {
    pub(super) fn new(graph: &Graph, cell: Vec<u32>, count: usize) -> Self {
        let links = links(graph, &cell, count);
        Self { cell, links }
    }

    /// These cells cut along the boundaries of a partition.
    pub(super) fn cut(&self, problem: &Problem, found: &Partition) -> Self {
        let mut sets = Sets::new(self.cell.len());
        for &[a, b] in problem.graph.strong.iter().chain(&problem.graph.weak) {
            let (i, j) = (a as usize, b as usize);
            if found.label[i] == found.label[j] && self.cell[i] == self.cell[j] {
                sets.unite(a, b);
            }
        }
        let (piece, count) = sets.labels();
        Self::new(problem.graph, piece, count)
    }

    pub(super) fn moments(&self, problem: &Problem, weight: &[f64], phi: &[f64]) -> Vec<Moments> {
        gather(problem.sites, &self.cell, self.links.len(), weight, phi)
    }
}

/// A label per site, a weight per reading.
#[derive(Debug, Clone)]
pub(super) struct Partition {
    pub label: Vec<u32>,
    pub count: usize,
    pub weight: Vec<f64>,
}

impl Partition {
    pub(super) fn moments(&self, problem: &Problem) -> Vec<Moments> {
        gather(problem.sites, &self.label, self.count, &self.weight, problem.phi)
    }

    fn weigh(&mut self, problem: &Problem) {
        let densities = densities(&self.moments(problem), problem.table);
        self.weight = own_logs(problem.sites, &self.label, &densities).into_iter().map(membership).collect();
    }

    /// Energy at the level of readings: that of the robust fits, the parameters, the addresses and the borders.
    pub(super) fn energy(&self, problem: &Problem) -> f64 {
        let sites = problem.sites;
        let mut fitted = self.clone();
        fitted.weight.fill(1.0);
        for _ in 0..PASSES {
            fitted.weigh(problem);
        }
        let densities = densities(&fitted.moments(problem), problem.table);
        let logs = own_logs(sites, &self.label, &densities);
        let likelihood: f64 = logs.iter().zip(&sites.site).map(|(l, &s)| l / problem.phi[s as usize]).sum();
        let mut count = vec![[0.0, 0.0]; self.count * sites.structures];
        for (reading, &site) in sites.readings.iter().zip(&sites.site) {
            let c = &mut count[self.label[site as usize] as usize * sites.structures + reading.structure];
            *c = [c[0] + 1.0, c[1] + problem.phi[site as usize]];
        }
        let parameters: f64 =
            count.iter().filter(|c| c[0] > 0.0).map(|c| PARAMETERS * parameter_price(c[0] * c[0] / c[1])).sum();
        let border =
            problem.graph.strong.iter().filter(|&&[a, b]| self.label[a as usize] != self.label[b as usize]).count();
        parameters - likelihood + problem.address * self.count as f64 + BORDER * border as f64
    }
}

/// Merges the cells of one start, weighs the readings, and refines the outcome.
pub(super) fn from_start(problem: &Problem, start: &Start) -> Partition {
    refine(problem, merged(problem, start))
}

/// Partitions laid over each other: their pieces are what all agree upon, and a start of their own, which can
/// take each boundary from the partition that drew it best.
pub(super) fn overlay(problem: &Problem, partitions: &[(f64, Partition)]) -> Start {
    let mut sets = Sets::new(problem.sites.len());
    for &[a, b] in problem.graph.strong.iter().chain(&problem.graph.weak) {
        if partitions.iter().all(|(_, p)| p.label[a as usize] == p.label[b as usize]) {
            sets.unite(a, b);
        }
    }
    let (piece, count) = sets.labels();
    Start::new(problem.graph, piece, count)
}

/// Merges the cells of one start, readings weighed by what the last pass found.
pub(super) fn merged(problem: &Problem, start: &Start) -> Partition {
    let until = problem.wanted.map_or(Until::Least, Until::Count);
    let mut weight = vec![1.0; problem.sites.readings.len()];
    let mut pass = 0;
    loop {
        let moments = start.moments(problem, &weight, problem.phi);
        let terms = scored(&moments, problem.table);
        let regions =
            Regions::new(problem.table, problem.sites.structures, terms, start.links.clone(), problem.address);
        let (merged, count, _) = regions.agglomerate(until);
        let label = start.cell.iter().map(|&c| merged[c as usize]).collect();
        let mut partition = Partition { label, count, weight };
        pass += 1;
        if pass == PASSES {
            return partition;
        }
        partition.weigh(problem);
        weight = partition.weight;
    }
}
