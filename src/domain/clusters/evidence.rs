//! What a set of readings says for being one population, from sums that add.

use super::score::{Table, eigenvalues};
use super::sites::{Reading, Sites};
use nalgebra::{Matrix3, SymmetricEigen};
use rayon::prelude::*;
use std::ops::{Add, AddAssign};

/// Isotropic pseudo-readings that keep the likelihood of a few equal readings finite.
const PRIOR: f64 = 1.0;
/// How many readings the prior of a distribution's parameters is worth. One is Schwarz's criterion with a unit of
/// information; two tells domains of some thirty readings apart that one does not, without finding any where
/// there are none (own simulation).
const PRIOR_WORTH: f64 = 2.0;
/// Share of readings that belong to no domain's fabric.
pub(super) const STRAY: f64 = 0.05;

/// Weighted sums over readings of one structure: weight, xx, yy, zz, xy, xz, yz, weight times overdispersion.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub(super) struct Moments(pub [f64; 8]);

impl Moments {
    pub(super) fn add_reading(&mut self, products: &[f64; 6], weight: f64, overdispersion: f64) {
        self.0[0] += weight;
        for (sum, product) in self.0[1..7].iter_mut().zip(products) {
            *sum += weight * product;
        }
        self.0[7] += weight * overdispersion;
    }

    fn weight(&self) -> f64 {
        self.0[0]
    }

    /// The tensor of trace 1, pseudo-readings included.
    fn tensor(&self) -> [f64; 6] {
        let n = self.weight() + PRIOR;
        let m = &self.0;
        let q = PRIOR / 3.0;
        [(m[1] + q) / n, (m[2] + q) / n, (m[3] + q) / n, m[4] / n, m[5] / n, m[6] / n]
    }
}

impl Add for Moments {
    type Output = Self;
    fn add(mut self, other: Self) -> Self {
        self += other;
        self
    }
}

impl AddAssign for Moments {
    fn add_assign(&mut self, other: Self) {
        for (a, b) in self.0.iter_mut().zip(other.0) {
            *a += b;
        }
    }
}

/// Moments with the log-likelihoods of their best Watson (bipolar or girdle) and Bingham distributions.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Scored {
    pub moments: Moments,
    watson: f64,
    pub bingham: f64,
}

impl Scored {
    pub(super) fn new(moments: Moments, table: &Table) -> Self {
        if moments.weight() <= 0.0 {
            return Self { moments, ..Self::default() };
        }
        let t = eigenvalues(moments.tensor());
        let (small, large) = ((t[1] + t[2]) / 2.0, (t[0] + t[1]) / 2.0);
        let n = moments.weight() + PRIOR;
        Self {
            moments,
            watson: n * table.f([t[0], small, small]).max(table.f([large, large, t[2]])),
            bingham: n * table.f(t),
        }
    }

    /// Log-likelihood of the best of uniform, Watson and Bingham, less the price of its 0, 3 or 5 parameters,
    /// all at the overdispersion `phi`.
    fn evidence(&self, phi: f64) -> f64 {
        let price = parameter_price(self.moments.weight() / phi);
        (self.watson / phi - 3.0 * price).max(self.bingham / phi - 5.0 * price).max(0.0)
    }
}

/// Price in nats of one parameter fitted to `n` independent readings (Schwarz 1978).
pub(super) fn parameter_price(n: f64) -> f64 {
    0.5 * (n / PRIOR_WORTH).ln_1p()
}

/// What the evidence loses when groups `a` and `b` (one entry per structure) become one, priced at their pooled
/// overdispersion.
pub(super) fn loss(a: &[Scored], b: &[Scored], table: &Table) -> f64 {
    let (mut weight, mut heavy) = (0.0, 0.0);
    for s in a.iter().chain(b) {
        weight += s.moments.0[0];
        heavy += s.moments.0[7];
    }
    let phi = if weight > 0.0 { (heavy / weight).max(1.0) } else { 1.0 };
    a.iter()
        .zip(b)
        .map(|(a, b)| {
            if a.moments.weight() <= 0.0 || b.moments.weight() <= 0.0 {
                return 0.0;
            }
            let both = Scored::new(a.moments + b.moments, table);
            a.evidence(phi) + b.evidence(phi) - both.evidence(phi)
        })
        .sum()
}

/// Moments per group and structure (`group * structures + structure`) of readings whose site has a label.
pub(super) fn gather(sites: &Sites, label: &[u32], groups: usize, weight: &[f64], phi: &[f64]) -> Vec<Moments> {
    let mut sums = vec![Moments::default(); groups * sites.structures];
    for ((reading, &site), &w) in sites.readings.iter().zip(&sites.site).zip(weight) {
        let group = label[site as usize] as usize;
        sums[group * sites.structures + reading.structure].add_reading(&reading.products, w, phi[site as usize]);
    }
    sums
}

/// Gathered moments, scored.
pub(super) fn scored(moments: &[Moments], table: &Table) -> Vec<Scored> {
    moments.par_iter().with_min_len(64).map(|&m| Scored::new(m, table)).collect()
}

/// Bingham's distribution fitted to moments; ln density = x' m x - ln c.
#[derive(Debug, Clone, Copy)]
pub(super) struct Density {
    form: [f64; 6],
    log_constant: f64,
}

impl Density {
    pub(super) fn new(moments: &Moments, table: &Table) -> Self {
        let [xx, yy, zz, xy, xz, yz] = moments.tensor();
        let SymmetricEigen { eigenvalues, eigenvectors } =
            Matrix3::new(xx, xy, xz, xy, yy, yz, xz, yz, zz).symmetric_eigen();
        let mut order = [0, 1, 2];
        order.sort_by(|&a, &b| eigenvalues[b].total_cmp(&eigenvalues[a]));
        let t = order.map(|i| eigenvalues[i]);
        let fitted = table.fitted(t);
        let mut form = [0.0; 6];
        for (k, which) in [(fitted.k2, order[1]), (fitted.k3, order[2])] {
            let v = eigenvectors.column(which);
            let terms =
                [v[0] * v[0], v[1] * v[1], v[2] * v[2], 2.0 * v[0] * v[1], 2.0 * v[0] * v[2], 2.0 * v[1] * v[2]];
            for (sum, term) in form.iter_mut().zip(terms) {
                *sum += k * term;
            }
        }
        Self { form, log_constant: fitted.k2 * t[1] + fitted.k3 * t[2] - fitted.f }
    }

    /// Log of the density relative to uniform, a share [`STRAY`] of strays mixed in.
    pub(super) fn log_mixed(&self, reading: &Reading) -> f64 {
        let form: f64 = self.form.iter().zip(reading.products).map(|(m, x)| m * x).sum();
        ((1.0 - STRAY) * (form - self.log_constant).exp() + STRAY).ln()
    }
}

/// Densities of gathered moments.
pub(super) fn densities(moments: &[Moments], table: &Table) -> Vec<Density> {
    moments.iter().map(|m| Density::new(m, table)).collect()
}

/// Per reading: the log of its mixed density under its own group.
pub(super) fn own_logs(sites: &Sites, label: &[u32], densities: &[Density]) -> Vec<f64> {
    let pairs = sites.readings.par_iter().zip(&sites.site);
    pairs
        .map(|(r, &site)| densities[label[site as usize] as usize * sites.structures + r.structure].log_mixed(r))
        .collect()
}

/// Posterior of belonging to the group's fabric rather than to the strays, from [`Density::log_mixed`].
pub(super) fn membership(log_mixed: f64) -> f64 {
    (1.0 - STRAY * (-log_mixed).exp()).clamp(0.0, 1.0)
}
