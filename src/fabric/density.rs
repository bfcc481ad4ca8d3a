//! Density of axes over the sphere: counts and smooth weights at any directions.
//!
//! Nodes and axes meet through the absolute dot product, so a node and its opposite get the same number: what
//! leaves the net at one side of the rim comes in at the other.

use super::sample::Sample;
use nalgebra::Vector3;
use rayon::prelude::*;

/// How density is told.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Method {
    /// Weights exp(f(|x.node| - 1)), f = 2(1 + N/s^2) (Vollmer 1995; Robin & Jowett 1986, from memory), so that
    /// the expected weight of uniform axes is `s` standard deviations. Any s > 0 smooths; 3 is usual.
    ExponentialKamb(f64),
    /// Axes within a cap of the area s^2/(N + s^2) of the half-sphere (Kamb 1959, from memory).
    KambCount(f64),
    /// Axes within a cap of 1 % of the half-sphere, 8.11 degrees (Schmidt 1925, from memory).
    OnePercent,
}

/// Density at nodes. Counts are no test of significance: nodes are many and not independent.
#[derive(Debug, Clone, PartialEq)]
pub struct Density {
    /// Sum of weights or count at each node, weights scaled to sum to `n`.
    pub sums: Vec<f64>,
    /// Effective number of axes.
    pub n: f64,
    /// What a node is expected to hold if axes are uniform.
    pub expected: f64,
    /// Standard deviation of the same.
    pub deviation: f64,
}

impl Density {
    /// (sum - expected) / standard deviation at each node.
    pub fn standardised(&self) -> Vec<f64> {
        self.sums.iter().map(|s| (s - self.expected) / self.deviation).collect()
    }
    /// Sum / expected at each node: multiples of a uniform density; with [`Method::OnePercent`], percent per
    /// 1 % of the area.
    pub fn multiples(&self) -> Vec<f64> {
        self.sums.iter().map(|s| s / self.expected).collect()
    }
}

/// Shape of the counting function.
enum Kernel {
    /// Counts within this cosine.
    Cap(f64),
    /// exp(f(c - 1)).
    Exponential(f64),
}

/// Density at `nodes` (unit vectors, east-north-up). `None` without readings or with a smoothing that is not a
/// positive number.
pub fn density(sample: &Sample, nodes: &[Vector3<f64>], method: Method) -> Option<Density> {
    if sample.is_empty() {
        return None;
    }
    let n = sample.tensor().effective_count();
    let (kernel, expected, deviation) = match method {
        Method::ExponentialKamb(s) | Method::KambCount(s) if !(s > 0.0 && s.is_finite()) => return None,
        Method::ExponentialKamb(s) => {
            let f = 2.0 * (1.0 + n / (s * s));
            (Kernel::Exponential(f), n / f, (n * (f / 2.0 - 1.0)).sqrt() / f)
        }
        Method::KambCount(s) => {
            let area = s * s / (n + s * s);
            (Kernel::Cap(1.0 - area), n * area, (n * area * (1.0 - area)).sqrt())
        }
        Method::OnePercent => (Kernel::Cap(0.99), n * 0.01, (n * 0.0099).sqrt()),
    };
    Some(Density { sums: sums(sample, nodes, &kernel, n), n, expected, deviation })
}

/// Axes as columns, in an order that rows do not decide, weights scaled to sum to n.
struct Columns {
    x: Vec<f64>,
    y: Vec<f64>,
    z: Vec<f64>,
    w: Vec<f64>,
}

fn columns(sample: &Sample, n: f64) -> Columns {
    let mut rows: Vec<(Vector3<f64>, f64)> = sample.readings().map(|(a, w)| (a.vector(), w)).collect();
    rows.par_sort_unstable_by(|(a, v), (b, w)| {
        a.z.total_cmp(&b.z).then(a.y.total_cmp(&b.y)).then(a.x.total_cmp(&b.x)).then(v.total_cmp(w))
    });
    let scale = n / sample.tensor().weight();
    Columns {
        x: rows.iter().map(|r| r.0.x).collect(),
        y: rows.iter().map(|r| r.0.y).collect(),
        z: rows.iter().map(|r| r.0.z).collect(),
        w: rows.iter().map(|r| r.1 * scale).collect(),
    }
}

fn sums(sample: &Sample, nodes: &[Vector3<f64>], kernel: &Kernel, n: f64) -> Vec<f64> {
    const BLOCK: usize = 512;
    let c = columns(sample, n);
    // A weight below exp(-45) adds nothing that a double holds; a reading on the cap's rim counts.
    let limit = match kernel {
        Kernel::Cap(cosine) => *cosine,
        Kernel::Exponential(f) => 1.0 - 45.0 / f,
    };
    nodes
        .par_iter()
        .map(|node| {
            let mut total = 0.0;
            let mut dots = [0.0; BLOCK];
            for (((x, y), z), w) in
                c.x.chunks(BLOCK).zip(c.y.chunks(BLOCK)).zip(c.z.chunks(BLOCK)).zip(c.w.chunks(BLOCK))
            {
                // One plain loop of products, which the compiler turns into vector instructions; the costly
                // part is left to the few axes near the node.
                for (((d, x), y), z) in dots.iter_mut().zip(x).zip(y).zip(z) {
                    *d = (x * node.x + y * node.y + z * node.z).abs();
                }
                for (d, w) in dots.iter().zip(w) {
                    if *d >= limit {
                        total += match kernel {
                            Kernel::Cap(_) => *w,
                            Kernel::Exponential(f) => w * (f * (d - 1.0)).exp(),
                        };
                    }
                }
            }
            total
        })
        .collect()
}
