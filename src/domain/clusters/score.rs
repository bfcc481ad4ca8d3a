//! How well Bingham's distribution describes a set of axes, from the eigenvalues of its tensor alone.
//!
//! f(t) = max over k of the mean log-likelihood relative to uniform axes = k2 t2 + k3 t3 - ln c(k), gauge
//! k1 = 0 >= k2 >= k3 (Bingham 1974). It is tabled once: the maximum is a Legendre transform, so df/dt2 = k2 and
//! df/dt3 = k3 exactly, and a bicubic Hermite table on few nodes holds both f and the concentrations.

use crate::fabric::bingham;
use rayon::prelude::*;
use std::sync::OnceLock;

/// Nodes along a = ln t3 and along b = ln(t2/t3) / ln(t1/t3 at t1 = t2).
const NODES: [usize; 2] = [49, 33];
/// A smallest eigenvalue below this counts as this: attitudes read to a degree scatter more.
const LEAST: f64 = 1e-5;
/// Where ln(t1/t3) at t1 = t2 is less, the axes count as uniform: f is below 1e-6.
const UNIFORM: f64 = 1e-3;
/// Five-point derivatives at each of five equidistant nodes, times 12 (Abramowitz & Stegun 1964, table 25.2).
const DIFFERENCES: [[f64; 5]; 5] = [
    [-25.0, 48.0, -36.0, 16.0, -3.0],
    [-3.0, -10.0, 18.0, -6.0, 1.0],
    [1.0, -8.0, 0.0, 8.0, -1.0],
    [-1.0, 6.0, -18.0, 10.0, 3.0],
    [3.0, -16.0, 36.0, -48.0, 25.0],
];

/// f + (ln t2 + ln t3)/2, which is smooth, with its derivatives by a, by b and by both.
#[derive(Debug, Clone, Copy, Default)]
struct Node {
    value: f64,
    by_a: f64,
    by_b: f64,
    by_both: f64,
}

/// f and the concentrations of its maximum.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Fitted {
    pub f: f64,
    pub k2: f64,
    pub k3: f64,
}

/// The table of f.
pub(super) struct Table(Vec<Node>);

fn range() -> (f64, f64) {
    (LEAST.ln(), -3f64.ln())
}

impl Table {
    /// The only table; built by the first who asks.
    pub(super) fn get() -> &'static Self {
        static TABLE: OnceLock<Table> = OnceLock::new();
        TABLE.get_or_init(Self::build)
    }

    fn build() -> Self {
        let [rows, columns] = NODES;
        let (low, high) = range();
        let step = (high - low) / (rows - 1) as f64;
        let mut nodes: Vec<Node> = (0..rows * columns)
            .into_par_iter()
            .map(|i| {
                let (a, b) = (low + (i / columns) as f64 * step, (i % columns) as f64 / (columns - 1) as f64);
                let t3 = a.exp();
                let room = ((1.0 - t3) / 2.0).ln() - a;
                let t2 = (a + b * room).exp().min((1.0 - t3) / 2.0);
                let slope = 1.0 - b / (1.0 - t3);
                // Round-off must not leave t1 below t2 where they are equal.
                let Some(fit) = bingham::fit([(1.0 - t2 - t3).max(t2), t2, t3]) else { return Node::default() };
                let f = fit.k2 * t2 + fit.k3 * t3 - fit.log_constant;
                Node {
                    value: f + 0.5 * (t2.ln() + a),
                    by_a: fit.k3 * t3 + (fit.k2 * t2 + 0.5) * slope + 0.5,
                    by_b: (fit.k2 * t2 + 0.5) * room,
                    by_both: 0.0,
                }
            })
            .collect();
        let by_b: Vec<f64> = nodes.iter().map(|n| n.by_b).collect();
        for i in 0..rows {
            let start = i.saturating_sub(2).min(rows - 5);
            for j in 0..columns {
                let rise = |(k, weight): (usize, &f64)| weight * by_b[(start + k) * columns + j];
                let sum: f64 = DIFFERENCES[i - start].iter().enumerate().map(rise).sum();
                nodes[i * columns + j].by_both = sum / (12.0 * step);
            }
        }
        Self(nodes)
    }

    /// f alone. `t` are eigenvalues, t1 >= t2 >= t3, sum 1.
    pub(super) fn f(&self, t: [f64; 3]) -> f64 {
        self.fitted(t).f
    }

    /// f and the concentrations.
    pub(super) fn fitted(&self, t: [f64; 3]) -> Fitted {
        let [rows, columns] = NODES;
        let (low, high) = range();
        let t3 = t[2].max(LEAST);
        let a = t3.ln();
        let most = (1.0 - t3) / 2.0;
        let room = most.ln() - a;
        if room < UNIFORM {
            return Fitted { f: 0.0, k2: 0.0, k3: 0.0 };
        }
        let t2 = t[1].clamp(t3, most);
        let b = ((t2 / t3).ln() / room).min(1.0);
        let (x, y) = ((a - low) / (high - low) * (rows - 1) as f64, b * (columns - 1) as f64);
        let (i, j) = ((x as usize).min(rows - 2), (y as usize).min(columns - 2));
        let (da, db) = ((high - low) / (rows - 1) as f64, 1.0 / (columns - 1) as f64);
        let (p, q) = (Hermite::at(x - i as f64, da), Hermite::at(y - j as f64, db));
        let (mut value, mut by_a, mut by_b) = (0.0, 0.0, 0.0);
        for (k, l) in [(0, 0), (0, 1), (1, 0), (1, 1)] {
            let n = &self.0[(i + k) * columns + j + l];
            let along = |u: [f64; 2], v: [f64; 2]| {
                u[0] * (v[0] * n.value + v[1] * n.by_b) + u[1] * (v[0] * n.by_a + v[1] * n.by_both)
            };
            value += along(p.value[k], q.value[l]);
            by_a += along(p.slope[k], q.value[l]);
            by_b += along(p.value[k], q.slope[l]);
        }
        let drift = by_b / room - 0.5;
        let slope = 1.0 - b / (1.0 - t3);
        let k2 = (drift / t2).min(0.0);
        let k3 = ((by_a - 0.5 - (drift + 0.5) * slope) / t3).min(k2);
        Fitted { f: (value - 0.5 * (t2.ln() + a)).max(0.0), k2, k3 }
    }
}

/// Cubic Hermite weights of (value, derivative) at the two ends of a step, and their derivatives.
struct Hermite {
    value: [[f64; 2]; 2],
    slope: [[f64; 2]; 2],
}

impl Hermite {
    fn at(u: f64, step: f64) -> Self {
        let v = 1.0 - u;
        Self {
            value: [[v * v * (1.0 + 2.0 * u), u * v * v * step], [u * u * (1.0 + 2.0 * v), -u * u * v * step]],
            slope: [[-6.0 * u * v / step, v * (1.0 - 3.0 * u)], [6.0 * u * v / step, u * (3.0 * u - 2.0)]],
        }
    }
}

/// Eigenvalues of a symmetric matrix (xx, yy, zz, xy, xz, yz), falling; trigonometric solution (Smith 1961).
pub(super) fn eigenvalues([xx, yy, zz, xy, xz, yz]: [f64; 6]) -> [f64; 3] {
    let mean = (xx + yy + zz) / 3.0;
    let (a, b, c) = (xx - mean, yy - mean, zz - mean);
    let spread = ((a * a + b * b + c * c + 2.0 * (xy * xy + xz * xz + yz * yz)) / 6.0).sqrt();
    if spread < 1e-15 {
        return [mean; 3];
    }
    let determinant = a * (b * c - yz * yz) - xy * (xy * c - yz * xz) + xz * (xy * yz - b * xz);
    let angle = (determinant / (2.0 * spread.powi(3))).clamp(-1.0, 1.0).acos() / 3.0;
    let first = mean + 2.0 * spread * angle.cos();
    let third = mean + 2.0 * spread * (angle + std::f64::consts::TAU / 3.0).cos();
    [first, 3.0 * mean - first - third, third]
}

#[cfg(test)]
mod tests {
    use super::*;
    use rand::{RngExt, SeedableRng};
    use rand_chacha::ChaCha8Rng;

    #[test]
    fn the_table_holds_the_exact_function() {
        let mut rng = ChaCha8Rng::seed_from_u64(1);
        let (mut worst, mut sum, mut n) = (0.0f64, 0.0, 0.0);
        for _ in 0..2000 {
            // Weights towards small eigenvalues and towards equal ones.
            let mut t: [f64; 3] = std::array::from_fn(|_| rng.random::<f64>().powi(3) + 1e-9);
            t.sort_by(|a, b| b.total_cmp(a));
            if rng.random::<f64>() < 0.3 {
                t[1] = t[0] * (1.0 - 1e-3 * rng.random::<f64>());
            }
            let total: f64 = t.iter().sum();
            let t = t.map(|v| v / total);
            if t[2] < LEAST {
                continue;
            }
            let exact = bingham::fit(t).unwrap();
            let f = exact.k2 * t[1] + exact.k3 * t[2] - exact.log_constant;
            let got = Table::get().fitted(t);
            worst = worst.max((f - got.f).abs());
            sum += (f - got.f).abs();
            n += 1.0;
            // The log of the constant that goes with the tabled concentrations, to second order.
            let constant = got.k2 * t[1] + got.k3 * t[2] - got.f;
            assert!((constant - bingham::log_constant(got.k2, got.k3)).abs() < 2e-3, "{t:?} {got:?} {exact:?}");
        }
        assert!(n > 1500.0 && worst < 3e-4 && sum / n < 3e-5, "{n} {worst} {}", sum / n);
    }

    #[test]
    fn uniform_axes_score_nothing_and_smaller_models_score_less() {
        let table = Table::get();
        assert_eq!(table.f([1.0 / 3.0; 3]), 0.0);
        for t in [[0.8, 0.15, 0.05], [0.5, 0.45, 0.05], [0.99, 0.009, 0.001]] {
            let (m, g) = ((t[1] + t[2]) / 2.0, (t[0] + t[1]) / 2.0);
            assert!(table.f(t) >= table.f([t[0], m, m]) && table.f(t) >= table.f([g, g, t[2]]));
        }
    }

    #[test]
    fn eigenvalues_of_known_matrices() {
        // Rank one, along (1, 2, 2)/3.
        let e = eigenvalues([1.0, 4.0, 4.0, 2.0, 2.0, 4.0].map(|v| v / 9.0));
        assert!((e[0] - 1.0).abs() < 1e-12 && e[1].abs() < 1e-8 && e[2].abs() < 1e-8, "{e:?}");
        assert_eq!(eigenvalues([0.5, 0.5, 0.5, 0.0, 0.0, 0.0]), [0.5; 3]);
    }
}
