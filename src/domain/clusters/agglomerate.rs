//! Merging neighbours while the description gets shorter.

use super::evidence::{Scored, loss};
use super::graph::{Graph, Sets};
use super::score::Table;
use std::cmp::Ordering;
use std::collections::{BTreeMap, BinaryHeap};

/// Price of a border edge, in nats: it keeps boundaries short.
pub(super) const BORDER: f64 = 1.0;

/// Adjacent groups and the strong edges between them.
pub(super) type Links = Vec<BTreeMap<u32, u32>>;

/// Which groups are adjacent, and over how many strong edges (0 where only weak edges connect them).
pub(super) fn links(graph: &Graph, label: &[u32], groups: usize) -> Links {
    let mut links = vec![BTreeMap::new(); groups];
    for (edges, worth) in [(&graph.strong, 1), (&graph.weak, 0)] {
        for &[a, b] in edges {
            let (a, b) = (label[a as usize], label[b as usize]);
            if a != b {
                *links[a as usize].entry(b).or_insert(0) += worth;
                *links[b as usize].entry(a).or_insert(0) += worth;
            }
        }
    }
    links
}

/// A merge that could be done: the change of energy, the groups, and how often each had grown when it was priced.
#[derive(Debug, Clone, Copy)]
struct Candidate {
    change: f64,
    pair: [u32; 2],
    seen: [u32; 2],
}

impl PartialEq for Candidate {
    fn eq(&self, other: &Self) -> bool {
        self.cmp(other).is_eq()
    }
}
impl Eq for Candidate {}
impl PartialOrd for Candidate {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        Some(self.cmp(other))
    }
}
impl Ord for Candidate {
    /// The greatest candidate lowers the energy most; ties go to the smaller groups' numbers.
    fn cmp(&self, other: &Self) -> Ordering {
        other.change.total_cmp(&self.change).then_with(|| other.pair.cmp(&self.pair))
    }
}

/// Where a chain of merges stops.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Until {
    /// At the least energy on the way to one group per component.
    Least,
    /// At this many groups.
    Count(usize),
}

/// One point of the way: how many groups were left, at which energy (relative to the start).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Step {
    /// Number of domains.
    pub count: usize,
    /// Energy in nats, lower is better.
    pub energy: f64,
}

/// Groups that merge with their neighbours.
pub(super) struct Regions<'a> {
    table: &'a Table,
    structures: usize,
    terms: Vec<Scored>,
    links: Links,
    /// Price of one more group.
    address: f64,
    grown: Vec<u32>,
    alive: Vec<bool>,
    merges: Vec<[u32; 2]>,
}

impl<'a> Regions<'a> {
    pub(super) fn new(table: &'a Table, structures: usize, terms: Vec<Scored>, links: Links, address: f64) -> Self {
        let groups = links.len();
        Self {
            table,
            structures,
            terms,
            links,
            address,
            grown: vec![0; groups],
            alive: vec![true; groups],
            merges: vec![],
        }
    }

    fn terms_of(&self, group: u32) -> &[Scored] {
        &self.terms[group as usize * self.structures..(group as usize + 1) * self.structures]
    }

    /// Change of the energy when two linked groups merge.
    fn price(&self, a: u32, b: u32) -> f64 {
        let border = self.links[a as usize].get(&b).copied().unwrap_or(0);
        loss(self.terms_of(a), self.terms_of(b), self.table) - self.address - BORDER * f64::from(border)
    }

    fn candidate(&self, a: u32, b: u32) -> Candidate {
        let pair = [a.min(b), a.max(b)];
        let seen = pair.map(|g| self.grown[g as usize]);
        Candidate { change: self.price(pair[0], pair[1]), pair, seen }
    }

    /// Merges two linked groups; returns the one that lives on, the one with more neighbours.
    fn merge(&mut self, a: u32, b: u32) -> (u32, Vec<u32>) {
        let (a, b) = if self.links[a as usize].len() < self.links[b as usize].len() { (b, a) } else { (a, b) };
        for s in 0..self.structures {
            let (into, from) = (a as usize * self.structures + s, b as usize * self.structures + s);
            self.terms[into] = Scored::new(self.terms[into].moments + self.terms[from].moments, self.table);
        }
        self.alive[b as usize] = false;
        self.grown[a as usize] += 1;
        self.links[a as usize].remove(&b);
        let moved = std::mem::take(&mut self.links[b as usize]);
        let mut touched = Vec::with_capacity(moved.len());
        for (other, edges) in moved {
            if other == a {
                continue;
            }
            self.links[other as usize].remove(&b);
            let sum = self.links[a as usize].entry(other).or_insert(0);
            *sum += edges;
            let sum = *sum;
            self.links[other as usize].insert(a, sum);
            touched.push(other);
        }
        self.merges.push([a, b]);
        (a, touched)
    }

    fn all_candidates(&self) -> BinaryHeap<Candidate> {
        let mut heap = Vec::new();
        for (a, links) in self.links.iter().enumerate() {
            heap.extend(links.range(a as u32 + 1..).map(|(&b, _)| self.candidate(a as u32, b)));
        }
        heap.into()
    }

    /// Merges the pair of steepest descent again and again. Returns a label per group, how many there are, and
    /// the way from all groups to one per component.
    pub(super) fn agglomerate(mut self, until: Until) -> (Vec<u32>, usize, Vec<Step>) {
        let groups = self.links.len();
        let mut heap = self.all_candidates();
        let mut way = vec![Step { count: groups, energy: 0.0 }];
        let (mut energy, mut least, mut kept) = (0.0, 0.0, 0);
        while let Some(best) = self.next(&mut heap) {
            energy += best.change;
            let (into, touched) = self.merge(best.pair[0], best.pair[1]);
            way.push(Step { count: groups - self.merges.len(), energy });
            if energy <= least {
                (least, kept) = (energy, self.merges.len());
            }
            heap.extend(touched.into_iter().map(|other| self.candidate(into, other)));
        }
        if let Until::Count(wanted) = until {
            kept = groups.saturating_sub(wanted).min(self.merges.len());
        }
        let (label, count) = self.labels(kept);
        (label, count, way)
    }

    /// The best candidate still true. One whose groups have grown is priced again, and kept if still the best.
    fn next(&self, heap: &mut BinaryHeap<Candidate>) -> Option<Candidate> {
        while let Some(best) = heap.pop() {
            if best.pair.iter().any(|&g| !self.alive[g as usize]) {
                continue;
            }
            if best.seen == best.pair.map(|g| self.grown[g as usize]) {
                return Some(best);
            }
            let again = self.candidate(best.pair[0], best.pair[1]);
            if heap.peek().is_none_or(|top| again >= *top) {
                return Some(again);
            }
            heap.push(again);
        }
        None
    }

    /// Joins every group of fewer than `least` readings to the neighbour of least price, smallest first; then
    /// merges while that lowers the energy, or down to a given count.
    pub(super) fn tidy(mut self, mut size: Vec<usize>, least: usize, wanted: Option<usize>) -> (Vec<u32>, usize) {
        let groups = self.links.len();
        let small = |size: &[usize], g: usize| size[g] < least;
        let mut queue: std::collections::BTreeSet<(usize, u32)> =
            (0..groups).filter(|&g| small(&size, g)).map(|g| (size[g], g as u32)).collect();
        while let Some((_, group)) = queue.pop_first() {
            let choice = self.links[group as usize].keys().map(|&other| (self.price(group, other), other));
            let Some((_, other)) = choice.min_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1))) else { continue };
            queue.remove(&(size[other as usize], other));
            let sum = size[group as usize] + size[other as usize];
            let (into, _) = self.merge(group, other);
            size[into as usize] = sum;
            if small(&size, into as usize) {
                queue.insert((sum, into));
            }
        }
        let mut heap = self.all_candidates();
        while let Some(best) = self.next(&mut heap) {
            if wanted.map_or(best.change >= 0.0, |wanted| groups - self.merges.len() <= wanted) {
                break;
            }
            let (into, _) = self.merge(best.pair[0], best.pair[1]);
            let again: Vec<u32> = self.links[into as usize].keys().copied().collect();
            heap.extend(again.into_iter().map(|other| self.candidate(into, other)));
        }
        let all = self.merges.len();
        self.labels(all)
    }

    fn labels(&self, merges: usize) -> (Vec<u32>, usize) {
        let mut sets = Sets::new(self.links.len());
        for &[a, b] in &self.merges[..merges] {
            sets.unite(a, b);
        }
        sets.labels()
    }
}
