//! Could these axes come from no preferred orientation at all?

use super::sample::Unit;
use crate::orientation::ExactSum;
use statrs::distribution::{ChiSquared, ContinuousCDF};

/// Fewest independent units for a uniformity test: below, the corrected statistic was not checked.
pub const LEAST: f64 = 5.0;

/// Bingham's statistic U = (15 n / 2) sum (S_i - 1/3)^2 (Bingham 1974), chi-squared with 5 degrees of freedom
/// for many uniform axes.
pub fn bingham_statistic(n: f64, s: [f64; 3]) -> f64 {
    n * super::ratios::intensity(s)
}

/// p-value of Bingham's test with the correction of order 1/n for small samples (Jupp 2001, form from
/// memory; signs fixed by simulation): U* = U (1 - (B0 + B1 U + B2 U^2)/n), chi-squared with 5 degrees of
/// freedom. The cubic turns down again far beyond any critical value; there its greatest value is kept.
pub fn bingham_p(n: f64, u: f64) -> f64 {
    const B0: f64 = 31.0 / 42.0;
    const B1: f64 = -41.0 / 294.0;
    const B2: f64 = 20.0 / 5292.0;
    let root = (4.0 * B1 * B1 - 12.0 * B2 * (B0 - n)).max(0.0).sqrt();
    let turn = (root - 2.0 * B1) / (6.0 * B2);
    let u = u.clamp(0.0, turn.max(0.0));
    chi_squared_tail(5.0, u * (1.0 - (B0 + B1 * u + B2 * u * u) / n))
}

/// How many independent uniform axes would make as noisy a tensor as these units do:
/// (2/3) (sum w)^2 / sum |D|^2 with D a unit's deviator; 2/3 is the squared norm of one axis' deviator.
/// Equal weights and one reading per station give n itself. Readings that agree within each station count
/// as little more than one vote per station; readings that differ there as much as elsewhere count singly.
pub fn independent_axes(units: &[Unit]) -> f64 {
    let noise: ExactSum = units.iter().map(Unit::deviator_squared).collect();
    let weight: ExactSum = units.iter().map(|u| u.weight).collect();
    if noise.value() > 0.0 { 2.0 / 3.0 * weight.value().powi(2) / noise.value() } else { 0.0 }
}

/// Limits of S1/S3 for uniform axes: n, 95 %, 99 %. Own simulation, 400,000 samples a row up to 50 readings,
/// 150,000 to 150, 60,000 above; the idea is Woodcock & Naylor 1983.
const RATIO_LIMITS: [(f64, f64, f64); 17] = [
    (5.0, 35.83, 109.0),
    (6.0, 19.13, 44.92),
    (8.0, 9.731, 17.86),
    (10.0, 6.764, 10.81),
    (12.0, 5.336, 7.872),
    (15.0, 4.265, 5.806),
    (20.0, 3.386, 4.331),
    (25.0, 2.926, 3.588),
    (30.0, 2.631, 3.159),
    (40.0, 2.285, 2.658),
    (50.0, 2.085, 2.383),
    (75.0, 1.808, 2.011),
    (100.0, 1.668, 1.822),
    (150.0, 1.514, 1.627),
    (200.0, 1.432, 1.525),
    (300.0, 1.338, 1.408),
    (500.0, 1.253, 1.301),
];

/// The S1/S3 that uniform axes pass in 5 % (`strict` false) or 1 % (`strict` true) of samples of `n`.
///
/// Interpolated in sqrt(n) ln(S1/S3), which hardly varies (8.0 at n = 5, 5.2 at 50, 5.0 at 500), linearly in
/// 1/n; beyond the table the last two rows are carried on. `None` below 5.
pub fn ratio_limit(n: f64, strict: bool) -> Option<f64> {
    if n.is_nan() || n < LEAST {
        return None;
    }
    let scaled = |row: (f64, f64, f64)| row.0.sqrt() * if strict { row.2 } else { row.1 }.ln();
    let upper = RATIO_LIMITS.iter().position(|row| row.0 > n).unwrap_or(RATIO_LIMITS.len() - 1);
    let (a, b) = (RATIO_LIMITS[upper - 1], RATIO_LIMITS[upper]);
    let t = (1.0 / n - 1.0 / a.0) / (1.0 / b.0 - 1.0 / a.0);
    Some(((scaled(a) + t * (scaled(b) - scaled(a))) / n.sqrt()).exp())
}

/// P(X > x) of a chi-squared variable.
pub(super) fn chi_squared_tail(freedom: f64, x: f64) -> f64 {
    // The constructor fails only for a non-positive number of degrees of freedom.
    ChiSquared::new(freedom).map_or(1.0, |d| d.sf(x.max(0.0)).clamp(0.0, 1.0))
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    // scipy.stats.chi2.ppf
    #[test]
    fn chi_squared_limits() {
        for (df, x, p) in [
            (5.0, 11.070_497_69, 0.05),
            (5.0, 15.086_272_47, 0.01),
            (3.0, 7.814_727_903, 0.05),
            (2.0, 5.991_464_547, 0.05),
        ] {
            assert_relative_eq!(chi_squared_tail(df, x), p, max_relative = 1e-8);
        }
    }

    #[test]
    fn the_corrected_p_only_falls_as_the_statistic_grows() {
        for n in [5.0, 6.5, 10.0, 50.0, 1e3, 1e6] {
            let mut last = 1.0;
            for step in 0..=1000 {
                let p = bingham_p(n, 5.0 * n * step as f64 / 1000.0);
                assert!((0.0..=last).contains(&p), "n {n}, step {step}: {p} after {last}");
                last = p;
            }
            assert!(last < 1e-4, "{n}: {last}");
        }
    }

    #[test]
    fn ratio_limits_meet_the_table_and_fall_between() {
        for (n, five, one) in RATIO_LIMITS {
            assert_relative_eq!(ratio_limit(n, false).unwrap(), five, max_relative = 1e-12);
            assert_relative_eq!(ratio_limit(n, true).unwrap(), one, max_relative = 1e-12);
        }
        let mut last = f64::INFINITY;
        for n in 5..3000 {
            let limit = ratio_limit(n as f64, false).unwrap();
            assert!(limit > 1.0 && limit < last);
            last = limit;
        }
        assert_eq!(ratio_limit(4.9, false), None);
        assert_eq!(ratio_limit(f64::NAN, false), None);
    }
}
