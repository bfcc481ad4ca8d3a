//! Which sites are neighbours: the Delaunay triangulation, its Gabriel edges strong, the others weak, both cut
//! by the barriers.

use super::barrier::Fence;
use super::sites::Sites;
use spade::{DelaunayTriangulation, Point2, Triangulation};

/// Edges between sites, each with its smaller site first, sorted.
#[derive(Debug, Default)]
pub(super) struct Graph {
    /// Gabriel edges: no third site in the circle over the edge (Gabriel & Sokal 1969). They hold the minimum
    /// spanning tree, so without barriers they connect all sites.
    pub strong: Vec<[u32; 2]>,
    /// The other edges of the triangulation.
    pub weak: Vec<[u32; 2]>,
    /// Neighbours over strong edges, `ends[first[i]..first[i + 1]]` for site i.
    first: Vec<usize>,
    ends: Vec<u32>,
    /// Sites that too small a compartment of the barriers held, and that were joined across one.
    pub joined: usize,
}

impl Graph {
    /// `least` readings make a compartment of the barriers stand alone; a smaller one (a sliver, a site on a
    /// barrier) is tied to what is nearest across it by one edge, which opens no way between larger ones.
    pub(super) fn new(sites: &Sites, fence: &Fence, least: usize) -> Self {
        let (strong, weak) = triangulate(sites);
        let mut graph = Self::default();
        let mut barred = Vec::new();
        for (edges, kept) in [(strong, &mut graph.strong), (weak, &mut graph.weak)] {
            let crossed = fence.crossed(&edges, sites);
            for (edge, crossed) in edges.into_iter().zip(crossed) {
                if crossed { barred.push(edge) } else { kept.push(edge) }
            }
        }
        if !barred.is_empty() {
            graph.tie_slivers(sites, barred, least);
        }
        graph.strong.sort_unstable();
        graph.weak.sort_unstable();
        (graph.first, graph.ends) = adjacency(sites.len(), &graph.strong);
        graph
    }

    /// Neighbours of a site over strong edges.
    pub(super) fn neighbours(&self, site: usize) -> &[u32] {
        &self.ends[self.first[site]..self.first[site + 1]]
    }

    fn tie_slivers(&mut self, sites: &Sites, mut barred: Vec<[u32; 2]>, least: usize) {
        let mut sets = Sets::new(sites.len());
        for &[a, b] in self.strong.iter().chain(&self.weak) {
            sets.unite(a, b);
        }
        let mut load = vec![0; sites.len()];
        for i in 0..sites.len() {
            load[sets.root(i as u32) as usize] += sites.load(i);
        }
        let small: Vec<bool> = (0..sites.len()).map(|i| load[sets.root(i as u32) as usize] < least).collect();
        self.joined = small.iter().filter(|&&s| s).count();
        barred.retain(|&[a, b]| small[a as usize] || small[b as usize]);
        let length = |e: &[u32; 2]| sites.distance(e[0] as usize, e[1] as usize);
        barred.sort_by(|a, b| length(a).total_cmp(&length(b)).then(a.cmp(b)));
        for [a, b] in barred {
            let (p, q) = (sets.root(a) as usize, sets.root(b) as usize);
            if p != q && (load[p] < least || load[q] < least) {
                let sum = load[p] + load[q];
                sets.unite(a, b);
                load[sets.root(a) as usize] = sum;
                self.strong.push([a, b]);
            }
        }
    }
}

/// Strong and weak edges, no barriers yet.
fn triangulate(sites: &Sites) -> (Vec<[u32; 2]>, Vec<[u32; 2]>) {
    let points: Vec<Point2<f64>> = sites.at.iter().map(|at| Point2::new(at[0] as f64, at[1] as f64)).collect();
    let mesh: DelaunayTriangulation<Point2<f64>> =
        DelaunayTriangulation::bulk_load_stable(points).expect("the sites' steps are small whole numbers");
    let (mut strong, mut weak) = (Vec::new(), Vec::new());
    for edge in mesh.undirected_edges() {
        let [a, b] = edge.vertices().map(|v| v.fix().index());
        let half = edge.as_directed();
        let outside = [half, half.rev()].into_iter().filter_map(|h| h.opposite_vertex()).all(|v| {
            let (a, b, c) = (sites.at[a], sites.at[b], sites.at[v.fix().index()]);
            (a[0] - c[0]) * (b[0] - c[0]) + (a[1] - c[1]) * (b[1] - c[1]) >= 0
        });
        let ends = [a.min(b) as u32, a.max(b) as u32];
        if outside { strong.push(ends) } else { weak.push(ends) }
    }
    (strong, weak)
}

fn adjacency(n: usize, edges: &[[u32; 2]]) -> (Vec<usize>, Vec<u32>) {
    let mut first = vec![0; n + 1];
    for &site in edges.iter().flatten() {
        first[site as usize + 1] += 1;
    }
    for i in 0..n {
        first[i + 1] += first[i];
    }
    let mut ends = vec![0; 2 * edges.len()];
    let mut next = first.clone();
    for &[a, b] in edges {
        for (from, to) in [(a, b), (b, a)] {
            ends[next[from as usize]] = to;
            next[from as usize] += 1;
        }
    }
    (first, ends)
}

/// Disjoint sets; the root of a set is its smallest member.
pub(super) struct Sets(Vec<u32>);

impl Sets {
    pub(super) fn new(n: usize) -> Self {
        Self((0..n as u32).collect())
    }
    pub(super) fn root(&mut self, mut i: u32) -> u32 {
        while self.0[i as usize] != i {
            self.0[i as usize] = self.0[self.0[i as usize] as usize];
            i = self.0[i as usize];
        }
        i
    }
    pub(super) fn unite(&mut self, a: u32, b: u32) {
        let (a, b) = (self.root(a), self.root(b));
        self.0[a.max(b) as usize] = a.min(b);
    }
    /// A label per member, numbered from 0 in the order of first occurrence, and how many there are.
    pub(super) fn labels(&mut self) -> (Vec<u32>, usize) {
        let mut label = Vec::with_capacity(self.0.len());
        let mut count = 0;
        for i in 0..self.0.len() as u32 {
            let root = self.root(i);
            // The root is the smallest member, so it has been met before the others.
            if root == i {
                label.push(count);
                count += 1;
            } else {
                label.push(label[root as usize]);
            }
        }
        (label, count as usize)
    }
}
