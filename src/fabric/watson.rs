//! Watson's distribution of axes: one axis of symmetry, about which axes crowd (bipolar) or which they avoid (girdle).

use super::special::integrate;
use std::sync::OnceLock;

/// A fitted Watson distribution, density exp(kappa (mu.x)^2) / (4 pi M(1/2, 3/2, kappa)) (Watson 1965).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Watson {
    /// Concentration: positive about e1 (bipolar), negative away from e3 (girdle).
    pub kappa: f64,
    /// Mean log-likelihood per reading.
    pub log_likelihood: f64,
}

/// Eigenvalue gaps to 0 or 1 below this have no finite concentration.
pub const LEAST_GAP: f64 = 1e-9;

/// exp(-max(k,0)) M(1/2, 3/2, k) and the mean square and fourth power of t = mu.x.
fn moments(k: f64) -> [f64; 3] {
    // M(1/2, 3/2, k) = int_0^1 exp(k t^2) dt. Beyond exponents of -45 nothing is left to add.
    let [c, square, fourth] = if k >= 0.0 {
        integrate((45.0 / k).min(1.0), |s| {
            let t = 1.0 - s;
            let w = (-k * s * (2.0 - s)).exp();
            [w, w * t * t, w * t.powi(4)]
        })
    } else {
        integrate((45.0 / -k).sqrt().min(1.0), |t| {
            let w = (k * t * t).exp();
            [w, w * t * t, w * t.powi(4)]
        })
    };
    [c, square / c, fourth / c]
}

/// ln M(1/2, 3/2, kappa), Kummer's function in the normalising constant.
pub fn log_kummer(kappa: f64) -> f64 {
    moments(kappa)[0].ln() + kappa.max(0.0)
}

/// D(kappa) = M(3/2, 5/2, kappa) / (3 M(1/2, 3/2, kappa)), the mean of (mu.x)^2.
pub fn mean_square(kappa: f64) -> f64 {
    moments(kappa)[1]
}

/// kappa with D(kappa) = s; `None` within [`LEAST_GAP`] of 0 or 1. Newton's steps, bracketed: D only rises.
fn solve(s: f64) -> Option<f64> {
    if !(LEAST_GAP..=1.0 - LEAST_GAP).contains(&s) {
        return None;
    }
    // Limits for great and for small concentrations, either side.
    let mut k = if s > 1.0 / 3.0 {
        if s > 0.6 { 1.0 / (1.0 - s) } else { 3.75 * (3.0 * s - 1.0) }
    } else if s < 0.1 {
        -0.5 / s
    } else {
        -3.75 * (1.0 - 3.0 * s)
    };
    let (mut low, mut high) = (-1.0 / s, 2.0 / (1.0 - s));
    for _ in 0..100 {
        let [_, d, fourth] = moments(k);
        if d > s {
            high = k;
        } else {
            low = k;
        }
        let mut next = k + (s - d) / (fourth - d * d);
        if !(low < next && next < high) {
            next = 0.5 * (low + high);
        }
        let step = (next - k).abs();
        k = next;
        if step <= 1e-13 * k.abs().max(1.0) {
            break;
        }
    }
    Some(k)
}

/// kappa with D(kappa) = s for s in [1/3, 1], from a table; relative error below 1e-4. For the inner loops of
/// iterations that end with [`bipolar`] or need no more.
pub(super) fn quick_bipolar(s: f64) -> f64 {
    const STEPS: usize = 2048;
    static TABLE: OnceLock<Vec<f64>> = OnceLock::new();
    // kappa (1 - s) runs smoothly from 0 to 1.
    let table = TABLE.get_or_init(|| {
        (0..=STEPS)
            .map(|i| {
                let s = 1.0 / 3.0 + 2.0 / 3.0 * i as f64 / STEPS as f64;
                if i == STEPS { 1.0 } else { solve(s).map_or(1.0, |k| k * (1.0 - s)) }
            })
            .collect()
    });
    let place = ((s - 1.0 / 3.0) * 1.5 * STEPS as f64).clamp(0.0, STEPS as f64 - 1e-6);
    let (i, t) = (place as usize, place.fract());
    (table[i] + t * (table[i + 1] - table[i])) / (1.0 - s).max(LEAST_GAP)
}

fn fit(s: f64) -> Option<Watson> {
    let kappa = solve(s)?;
    let log_likelihood = kappa * s - log_kummer(kappa) - (4.0 * std::f64::consts::PI).ln();
    Some(Watson { kappa, log_likelihood })
}

/// Maximum likelihood about e1: D(kappa) = S1 (Mardia & Jupp 2000, from memory).
pub fn bipolar(s: [f64; 3]) -> Option<Watson> {
    fit(s[0])
}

/// Maximum likelihood away from e3: D(kappa) = S3.
pub fn girdle(s: [f64; 3]) -> Option<Watson> {
    fit(s[2])
}

/// The likelier of the two.
pub fn best(s: [f64; 3]) -> Option<Watson> {
    match (bipolar(s), girdle(s)) {
        (Some(a), Some(b)) => Some(if a.log_likelihood >= b.log_likelihood { a } else { b }),
        (a, b) => a.or(b),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    // mpmath: hyp1f1(1.5, 2.5, k) / (3 hyp1f1(0.5, 1.5, k))
    #[test]
    fn mean_squares_and_kummer_functions() {
        for (k, d) in [
            (-20.0, 0.024_999_999_740),
            (-5.0, 0.098_297_261_208),
            (-1.0, 0.253_704_101_804),
            (1.0, 0.429_230_705_828),
            (5.0, 0.764_266_221_270),
            (20.0, 0.948_554_770_091),
        ] {
            assert_relative_eq!(mean_square(k), d, max_relative = 1e-10);
            assert_relative_eq!(solve(mean_square(k)).unwrap(), k, max_relative = 1e-9);
        }
        assert_relative_eq!(log_kummer(5.0).exp(), 17.172_157_773_841, max_relative = 1e-12);
        assert_relative_eq!(log_kummer(-5.0).exp(), 0.395_712_309_611, max_relative = 1e-11);
        assert_relative_eq!(mean_square(0.0), 1.0 / 3.0, max_relative = 1e-13);
    }

    #[test]
    fn the_table_is_near_the_solution() {
        for i in 1..500 {
            let s = 1.0 / 3.0 + 2.0 / 3.0 * f64::from(i) / 500.3;
            assert_relative_eq!(quick_bipolar(s), solve(s).unwrap(), max_relative = 1e-4);
        }
    }

    #[test]
    fn limits_are_refused_not_infinite() {
        assert_eq!(bipolar([1.0, 0.0, 0.0]), None);
        assert_eq!(girdle([0.5, 0.5, 0.0]), None);
        assert!(best([0.5, 0.5, 0.0]).is_some());
        assert!(best([1.0 / 3.0; 3]).unwrap().kappa.abs() < 1e-9);
        for s1 in [1.0 - 1e-8, 0.999, 0.34] {
            assert!(bipolar([s1, (1.0 - s1) / 2.0, (1.0 - s1) / 2.0]).unwrap().kappa.is_finite());
        }
        assert_relative_eq!(solve(1.0 - 1e-8).unwrap(), 1e8, max_relative = 1e-6);
    }
}
