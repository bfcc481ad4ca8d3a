//! Bingham's distribution of axes: three different concentrations along three axes.

use super::axis_cone::{self, Cone, NoCone};
use super::special::{bessel_scaled, integrate};
use crate::orientation::Eigen;
use nalgebra::Matrix2;

/// A fitted Bingham distribution, density exp(k2 (e2.x)^2 + k3 (e3.x)^2) / (4 pi c) (Bingham 1974).
/// Gauge: k1 = 0 >= k2 >= k3, k1 belonging to S1; adding one constant to all three changes nothing.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Bingham {
    /// Concentration along e2, at most 0.
    pub k2: f64,
    /// Concentration along e3, at most k2.
    pub k3: f64,
    /// ln c; c = 1 for uniform axes.
    pub log_constant: f64,
    /// Mean log-likelihood per reading.
    pub log_likelihood: f64,
}

/// S3 below this has no finite concentration.
pub const LEAST_S3: f64 = 1e-9;

/// c with its first and second derivatives by (k2, k3), for k3 <= k2 <= 0.
struct Constant {
    value: f64,
    first: [f64; 2],
    second: [f64; 3],
}

/// c = int_0^1 exp(k3 z^2) exp((1-z^2) k2/2) I0((1-z^2) k2/2) dz, z along e3 (derived; exact).
fn constant(k2: f64, k3: f64) -> Constant {
    // Beyond exponents of -45 nothing is left to add.
    let top = (45.0 / -k3).sqrt().min(1.0);
    let [value, by2, by3, by22, by23, by33] = integrate(top, |z| {
        let (zz, a) = (z * z, (1.0 - z * z) / 2.0);
        let b = bessel_scaled(-a * k2);
        let w = (k3 * zz).exp();
        let slope = a * (b.zero - b.one);
        let bend = a * a * (2.0 * b.zero - 2.0 * b.one - b.one_over_x);
        [w * b.zero, w * slope, w * zz * b.zero, w * bend, w * zz * slope, w * zz * zz * b.zero]
    });
    Constant { value, first: [by2, by3], second: [by22, by23, by33] }
}

/// ln c for k3 <= k2 <= 0 = k1.
pub fn log_constant(k2: f64, k3: f64) -> f64 {
    constant(k2, k3).value.ln()
}

/// Maximum likelihood from the eigenvalues: d ln c / d k_j = S_j for j = 2, 3. `None` where S3 is 0 (the
/// likelihood then rises without bound).
pub fn fit(s: [f64; 3]) -> Option<Bingham> {
    let [s1, s2, s3] = s;
    if s3.is_nan() || s3 <= LEAST_S3 {
        return None;
    }
    // Concentrated limit for k3; k2 fades to 0 as S2 nears S1.
    let mut k = [-0.5 / s2 * ((s1 - s2) / s1).min(1.0), -0.5 / s3 + 0.5 / s1];
    k[1] = k[1].min(k[0]);
    let objective = |k: [f64; 2], c: &Constant| k[0] * s2 + k[1] * s3 - c.value.ln();
    let mut c = constant(k[0], k[1]);
    let mut best = objective(k, &c);
    // The log-likelihood is concave, so Newton's steps with halving find its only maximum.
    for _ in 0..100 {
        let mean = c.first.map(|d| d / c.value);
        let gradient = [s2 - mean[0], s3 - mean[1]];
        let [v22, v23, v33] = c.second.map(|d| d / c.value);
        let (a, b, d) = (v22 - mean[0] * mean[0], v23 - mean[0] * mean[1], v33 - mean[1] * mean[1]);
        let det = a * d - b * b;
        let step = if det > 0.0 {
            [(d * gradient[0] - b * gradient[1]) / det, (a * gradient[1] - b * gradient[0]) / det]
        } else {
            [gradient[0] / a, gradient[1] / d]
        };
        let mut length = 1.0;
        let mut moved = false;
        while length > 1e-10 {
            let k2 = (k[0] + length * step[0]).min(0.0);
            let next = [k2, (k[1] + length * step[1]).min(k2)];
            let c_next = constant(next[0], next[1]);
            let value = objective(next, &c_next);
            if value >= best {
                moved = (next[0] - k[0]).abs() > 1e-12 * (1.0 - k[0]) || (next[1] - k[1]).abs() > 1e-12 * (1.0 - k[1]);
                (k, c, best) = (next, c_next, value);
                break;
            }
            length /= 2.0;
        }
        if !moved {
            break;
        }
    }
    let log_constant = c.value.ln();
    Some(Bingham {
        k2: k[0],
        k3: k[1],
        log_constant,
        log_likelihood: k[0] * s2 + k[1] * s3 - log_constant - (4.0 * std::f64::consts::PI).ln(),
    })
}

/// Bingham's own confidence cone of principal axis `which`: the angle towards e_j has the variance
/// 1 / (2 n (S_i - S_j)(k_i - k_j)), chi-squared limit with 2 degrees of freedom (Bingham 1974; general formula
/// in Tauxe, Essentials of Paleomagnetism, app. C). A cross-check for large samples; with fitted
/// concentrations it covers 0.71 at n = 5, 0.87 at 10, 0.92 at 25 (own simulation).
pub fn cone(n: f64, eigen: &Eigen, fit: &Bingham, which: usize, confidence: f64) -> Result<Cone, NoCone> {
    let k = [0.0, fit.k2, fit.k3];
    let variance = |j: usize| 1.0 / (2.0 * n * (eigen.values[which] - eigen.values[j]) * (k[which] - k[j]));
    let [j, l] = axis_cone::others(which);
    let covariance = Matrix2::new(variance(j), 0.0, 0.0, variance(l));
    if !covariance.iter().all(|v| v.is_finite()) {
        return Err(NoCone::Undetermined);
    }
    // The variances are of angles, in radians.
    axis_cone::from_angles(&covariance, -2.0 * (1.0 - confidence).ln(), eigen, which)
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::{assert_abs_diff_eq, assert_relative_eq};

    // Bingham's series and the integral in mpmath and scipy agree.
    #[test]
    fn normalising_constants() {
        assert_relative_eq!(log_constant(-3.0, -10.0).exp(), 0.106_523_033_040_708, max_relative = 1e-12);
        let four_pi = (4.0 * std::f64::consts::PI).ln();
        for (k2, k3, want) in [
            (0.0, 0.0, 2.531_024_247_0),
            (-2.0, -5.0, 0.903_955_889_0),
            (-4.0, -15.0, -0.097_897_668_8),
            (-50.0, -100.0, -2.413_062_924_3),
            (-1.0, -200.0, -0.676_418_107_5),
        ] {
            assert_abs_diff_eq!(log_constant(k2, k3) + four_pi, want, epsilon = 1e-9);
        }
    }

    #[test]
    fn derivatives_match_differences() {
        for (k2, k3) in [(-0.5, -3.0), (-20.0, -60.0), (-0.01, -300.0)] {
            let (c, h) = (constant(k2, k3), 1e-5);
            let (a, b) = (constant(k2 - h, k3), constant(k2, k3 - h));
            assert_relative_eq!((c.value - a.value) / h, c.first[0], max_relative = 1e-4);
            assert_relative_eq!((c.value - b.value) / h, c.first[1], max_relative = 1e-4);
            assert_relative_eq!((c.first[0] - a.first[0]) / h, c.second[0], max_relative = 1e-4);
            assert_relative_eq!((c.first[1] - a.first[1]) / h, c.second[1], max_relative = 1e-4);
            assert_relative_eq!((c.first[1] - b.first[1]) / h, c.second[2], max_relative = 1e-4);
        }
    }

    #[test]
    fn a_fit_returns_the_eigenvalues_it_was_given() {
        for s in [
            [0.4, 0.35, 0.25],
            [0.5, 0.5 - 1e-6, 1e-6],
            [1.0 - 3e-7, 2e-7, 1e-7],
            [0.9, 0.05, 0.05],
            [0.6, 0.399, 0.001],
            [1.0 / 3.0; 3],
        ] {
            let f = fit(s).unwrap();
            let c = constant(f.k2, f.k3);
            assert!(0.0 >= f.k2 && f.k2 >= f.k3, "{s:?} {f:?}");
            assert_relative_eq!(c.first[0] / c.value, s[1], max_relative = 1e-7);
            assert_relative_eq!(c.first[1] / c.value, s[2], max_relative = 1e-7);
        }
        assert_eq!(fit([0.5, 0.5, 0.0]), None);
        assert_eq!(fit([1.0, 0.0, 0.0]), None);
    }
}
