//! Mixtures of Watson distributions and a uniform part, fitted by expectation-maximisation.

use super::watson;
use crate::orientation::{Axis, OrientationTensor};
use nalgebra::{Matrix3, SymmetricEigen, Vector3};
use rand::{RngExt, SeedableRng};
use rand_chacha::ChaCha8Rng;
use rayon::prelude::*;

/// Axes tighter than this concentration (about 1.3 degrees of scatter) are not told apart: a compass is no better.
const TIGHTEST: f64 = 2000.0;
/// A part wider than this (about 30 degrees of scatter) is background, not a set.
const WIDEST: f64 = 2.0;
/// Iterations to compare starts, to compare numbers of parts, and at most of the mixture chosen; and the gain per
/// reading that ends them.
const TRIAL: usize = 12;
const COMPARED: usize = 40;
const MOST: usize = 200;
const GAIN: f64 = 1e-5;
/// Readings used at most to compare starts.
const MOST_TRIED: usize = 500;
/// Random starts per number of parts, besides one from the fullest caps.
const RANDOM_STARTS: usize = 6;
/// Readings per parallel piece; fixed, so that sums do not depend on the number of threads.
const PIECE: usize = 4096;

/// One Watson part.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Part {
    /// Share of the mixture.
    pub share: f64,
    /// Its axis.
    pub mean: Vector3<f64>,
    /// Its concentration, above 0.
    pub kappa: f64,
    /// ln of exp(-kappa) M(1/2, 3/2, kappa).
    log_scale: f64,
}

impl Part {
    fn new(share: f64, mean: Vector3<f64>, kappa: f64) -> Self {
        Self { share, mean, kappa, log_scale: watson::log_kummer(kappa) - kappa }
    }
    /// Share times density, in multiples of the uniform density.
    pub fn density(&self, v: &Vector3<f64>) -> f64 {
        let t = v.dot(&self.mean);
        self.share * (self.kappa * (t * t - 1.0) - self.log_scale).exp()
    }
}

/// A fitted mixture.
#[derive(Debug, Clone, PartialEq)]
pub struct Mixture {
    /// The Watson parts.
    pub parts: Vec<Part>,
    /// Share of the uniform part.
    pub uniform: f64,
    /// Log-likelihood relative to uniform axes, readings weighted to sum to their effective number.
    pub log_likelihood: f64,
}

impl Mixture {
    /// Density at a direction, in multiples of the uniform density.
    pub fn density(&self, v: &Vector3<f64>) -> f64 {
        self.uniform + self.parts.iter().map(|p| p.density(v)).sum::<f64>()
    }
    /// Schwarz's criterion for `n` readings; each part has a share, an axis and a concentration.
    pub fn bic(&self, n: f64) -> f64 {
        4.0 * self.parts.len() as f64 * n.ln() - 2.0 * self.log_likelihood
    }
}

/// Unit vectors with weights that sum to the effective number, in an order that rows do not decide.
pub type Data = Vec<(Vector3<f64>, f64)>;

/// What one pass over the data gathers.
#[derive(Clone)]
struct Gathered {
    /// For each part its weight, then xx, xy, xz, yy, yz, zz.
    parts: Vec<[f64; 7]>,
    uniform: f64,
    log_likelihood: f64,
}

fn gather(data: &Data, m: &Mixture) -> Gathered {
    let empty = Gathered { parts: vec![[0.0; 7]; m.parts.len()], uniform: 0.0, log_likelihood: 0.0 };
    let one = |piece: &[(Vector3<f64>, f64)]| {
        let mut sums = empty.clone();
        let mut densities = vec![0.0; m.parts.len()];
        for (v, w) in piece {
            let mut total = m.uniform;
            for (d, part) in densities.iter_mut().zip(&m.parts) {
                *d = part.density(v);
                total += *d;
            }
            // A point that every part calls impossible counts for none of them.
            let total = total.max(1e-300);
            let scale = w / total;
            let terms = [1.0, v.x * v.x, v.x * v.y, v.x * v.z, v.y * v.y, v.y * v.z, v.z * v.z];
            for (sum, d) in sums.parts.iter_mut().zip(&densities) {
                let r = scale * d;
                for (s, t) in sum.iter_mut().zip(terms) {
                    *s += r * t;
                }
            }
            sums.uniform += scale * m.uniform;
            sums.log_likelihood += w * total.ln();
        }
        sums
    };
    if data.len() <= PIECE {
        return one(data);
    }
    let pieces: Vec<Gathered> = data.par_chunks(PIECE).map(one).collect();
    pieces.into_iter().fold(empty.clone(), |mut all, piece| {
        for (a, b) in all.parts.iter_mut().zip(piece.parts) {
            a.iter_mut().zip(b).for_each(|(a, b)| *a += b);
        }
        all.uniform += piece.uniform;
        all.log_likelihood += piece.log_likelihood;
        all
    })
}

fn step(data: &Data, m: &Mixture) -> Mixture {
    let sums = gather(data, m);
    let total = sums.uniform + sums.parts.iter().map(|p| p[0]).sum::<f64>();
    let parts = sums
        .parts
        .iter()
        .zip(&m.parts)
        .map(|(&[weight, xx, xy, xz, yy, yz, zz], old)| {
            if weight <= 1e-9 * total {
                return Part { share: 0.0, ..*old };
            }
            let tensor = Matrix3::new(xx, xy, xz, xy, yy, yz, xz, yz, zz) / weight;
            let SymmetricEigen { eigenvalues, eigenvectors } = tensor.symmetric_eigen();
            let first = eigenvalues.imax();
            let kappa = watson::quick_bipolar(eigenvalues[first]).clamp(WIDEST, TIGHTEST);
            Part::new(weight / total, eigenvectors.column(first).into_owned(), kappa)
        })
        .collect();
    Mixture { parts, uniform: sums.uniform / total, log_likelihood: sums.log_likelihood }
}

fn iterate(data: &Data, mut m: Mixture, most: usize) -> Mixture {
    let mut last = f64::NEG_INFINITY;
    for _ in 0..most {
        let next = step(data, &m);
        let gained = next.log_likelihood - last;
        last = next.log_likelihood;
        m = next;
        if gained.abs() < GAIN * data.len() as f64 {
            break;
        }
    }
    m.log_likelihood = gather(data, &m).log_likelihood;
    m
}

fn started(centres: &[Vector3<f64>]) -> Mixture {
    let share = 0.9 / centres.len() as f64;
    Mixture {
        parts: centres.iter().map(|&c| Part::new(share, c, 15.0)).collect(),
        uniform: 0.1,
        log_likelihood: f64::NEG_INFINITY,
    }
}

/// The likeliest mixture of `parts` Watson parts over many starts: centres from the fullest caps, and random
/// ones from `seed`. The parts' order is of no meaning.
pub fn fit(data: &Data, parts: usize, seed: u64) -> Mixture {
    if parts == 0 || data.is_empty() {
        return Mixture { parts: Vec::new(), uniform: 1.0, log_likelihood: 0.0 };
    }
    let mut rng = ChaCha8Rng::seed_from_u64(seed);
    rng.set_stream(parts as u64);
    let mut starts = vec![started(&crowded(data, parts))];
    // One part has one likely place: the fullest cap.
    for _ in 0..if parts == 1 { 0 } else { RANDOM_STARTS } {
        let mut centres: Vec<Vector3<f64>> = Vec::with_capacity(parts);
        for _ in 0..parts {
            // The farthest of three draws from the centres so far: spread, but not at the mercy of outliers.
            let draws: Vec<Vector3<f64>> = (0..3).map(|_| data[rng.random_range(0..data.len())].0).collect();
            let nearest = |v: &Vector3<f64>| centres.iter().map(|c| c.dot(v).abs()).fold(0.0, f64::max);
            centres.extend(draws.iter().copied().min_by(|a, b| nearest(a).total_cmp(&nearest(b))));
        }
        starts.push(started(&centres));
    }
    let stride = data.len().div_ceil(MOST_TRIED).max(1);
    let few: Data = data.iter().step_by(stride).copied().collect();
    let tried: Vec<Mixture> = starts.into_par_iter().map(|s| iterate(&few, s, TRIAL)).collect();
    let best = tried.into_iter().reduce(|a, b| if b.log_likelihood > a.log_likelihood { b } else { a });
    best.map_or_else(|| fit(data, 0, seed), |b| iterate(data, b, COMPARED))
}

/// The mixture chosen, fitted to the end.
pub fn finish(data: &Data, m: Mixture) -> Mixture {
    iterate(data, m, MOST)
}

/// A few more steps of a fit on more of the data.
pub fn refine(data: &Data, m: Mixture) -> Mixture {
    iterate(data, m, 6)
}

/// Centres of caps of 15 degrees, each the fullest among readings not yet covered.
fn crowded(data: &Data, count: usize) -> Vec<Vector3<f64>> {
    const COSINE: f64 = 0.965_925_826;
    let stride = data.len().div_ceil(500).max(1);
    let candidates: Vec<Vector3<f64>> = data.iter().step_by(stride).map(|d| d.0).collect();
    let mut free: Vec<(Vector3<f64>, f64)> = data.clone();
    let mut centres = Vec::with_capacity(count);
    for _ in 0..count {
        let full =
            |c: &Vector3<f64>| -> f64 { free.iter().filter(|(v, _)| v.dot(c).abs() >= COSINE).map(|(_, w)| w).sum() };
        let counted: Vec<f64> = candidates.par_iter().map(full).collect();
        let best = (0..candidates.len()).reduce(|a, b| if counted[b] > counted[a] { b } else { a });
        let centre = best.map_or(Vector3::z(), |b| candidates[b]);
        // The middle of the cap, rather than the reading that happens to fill it best.
        let tensor: OrientationTensor = free
            .iter()
            .filter(|(v, _)| v.dot(&centre).abs() >= COSINE)
            .filter_map(|(v, _)| Axis::new(v.x, v.y, v.z).ok())
            .collect();
        centres.push(tensor.eigen().map_or(centre, |e| e.axes[0].vector()));
        free.retain(|(v, _)| v.dot(&centre).abs() < COSINE);
    }
    centres
}
