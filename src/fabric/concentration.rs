//! More on Fisher's distribution: other estimators of kappa, its interval, spread, and the law of R under uniformity.

use super::fisher::Resultant;
use statrs::distribution::{ChiSquared, ContinuousCDF};

/// kappa by the estimators in use. They differ by a factor of 3 at n = 3, so each is named.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Estimates {
    /// (n-1)/(n-R): its inverse is unbiased (Fisher 1953).
    pub inverse_unbiased: f64,
    /// (n-2)/(n-R): unbiased itself (McFadden 1980, from memory).
    pub unbiased: f64,
    /// (1-1/n)^2 n/(n-R), for fewer than 16 (Fisher, Lewis & Embleton 1987, from memory).
    pub small_sample: f64,
    /// Maximum likelihood, coth k - 1/k = R/n (Mardia & Jupp 2000, from memory).
    pub likelihood: f64,
}

/// All estimates; `None` without a finite one.
pub fn estimates(r: &Resultant) -> Option<Estimates> {
    let inverse_unbiased = r.kappa()?;
    let n = r.n;
    Some(Estimates {
        inverse_unbiased,
        unbiased: (n - 2.0).max(0.0) / r.shortfall,
        small_sample: (1.0 - 1.0 / n).powi(2) * n / r.shortfall,
        likelihood: likelihood(r.shortfall / n),
    })
}

/// kappa with 1 - coth k + 1/k = gap, for gap in (0, 1].
fn likelihood(gap: f64) -> f64 {
    // 1 - A(k) = 1/k - 2/(exp(2k) - 1), written so that small k keeps its digits.
    let rest = |k: f64| if k < 1e-3 { 1.0 - k / 3.0 + k.powi(3) / 45.0 } else { 1.0 / k - 2.0 / (2.0 * k).exp_m1() };
    // rest falls from 1 to 0 and lies below 1/k.
    let (mut low, mut high) = (0.0, 1.0 / gap + 1.0);
    for _ in 0..200 {
        let middle = 0.5 * (low + high);
        if rest(middle) > gap {
            low = middle;
        } else {
            high = middle;
        }
        if high - low <= 1e-14 * high {
            break;
        }
    }
    0.5 * (low + high)
}

/// Confidence interval of kappa: 2 kappa (n-R) is chi-squared with 2n-2 degrees of freedom (Fisher, Lewis &
/// Embleton 1987, from memory); for kappa above 3 or so.
pub fn interval(r: &Resultant, confidence: f64) -> Option<(f64, f64)> {
    r.kappa()?;
    let law = ChiSquared::new(2.0 * r.n - 2.0).ok()?;
    let tail = (1.0 - confidence) / 2.0;
    let at = |p: f64| law.inverse_cdf(p) / (2.0 * r.shortfall);
    Some((at(tail), at(1.0 - tail)))
}

/// Radius in degrees within which some 63 % of directions lie: 81 / sqrt(kappa).
pub fn circular_deviation(kappa: f64) -> f64 {
    81.0 / kappa.sqrt()
}

/// Angle in degrees whose cosine is R/n.
pub fn angular_deviation(r: &Resultant) -> f64 {
    // 1 - cos d = 2 sin^2(d/2)
    2.0 * (r.shortfall / (2.0 * r.n)).clamp(0.0, 1.0).sqrt().asin().to_degrees()
}

/// P(R > r) for n uniform directions, exact (Watson 1956): 2 r p(r) + 2 P(Z > r), Z the sum of n uniforms on
/// (-1, 1) with density p. The alternating sums lose digits with n: for n up to 25.
pub fn resultant_tail(n: u32, r: f64) -> f64 {
    if r <= 0.0 {
        return 1.0;
    }
    let size = f64::from(n);
    // Terms C(n,k) (-1)^k ((n-r)/2-k)^m / m! with m = n (tail) and m = n-1 (twice the density).
    let (mut tail, mut density) = (0.0, 0.0);
    let mut binomial = 1.0;
    let log_factorial = |m: u32| (1..=m).map(|i| f64::from(i).ln()).sum::<f64>();
    let (tail_scale, density_scale) = (log_factorial(n), log_factorial(n.saturating_sub(1)));
    for k in 0..=n {
        let base = (size - r) / 2.0 - f64::from(k);
        if base <= 0.0 {
            break;
        }
        let sign = if k % 2 == 0 { 1.0 } else { -1.0 };
        tail += sign * binomial * (size * base.ln() - tail_scale).exp();
        density += sign * binomial * ((size - 1.0) * base.ln() - density_scale).exp() / 2.0;
        binomial *= (size - f64::from(k)) / (f64::from(k) + 1.0);
    }
    (2.0 * r * density + 2.0 * tail).clamp(0.0, 1.0)
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::{assert_abs_diff_eq, assert_relative_eq};

    // Watson 1956 as tabled in Tauxe, Essentials of Paleomagnetism, app. C: critical R at 95 and 99 %.
    #[test]
    fn the_law_of_the_resultant() {
        for (n, five, one) in [
            (3, 2.618_305, 2.833_595),
            (5, 3.500_794, 4.023_233),
            (6, 3.853_241, 4.480_040),
            (8, 4.479_765, 5.262_546),
            (10, 5.028_471, 5.940_822),
            (15, 6.190_337, 7.365_187),
            (20, 7.165_885, 8.554_239),
        ] {
            assert_abs_diff_eq!(resultant_tail(n, five), 0.05, epsilon = 1e-6);
            assert_abs_diff_eq!(resultant_tail(n, one), 0.01, epsilon = 1e-6);
        }
        for n in 1..=25 {
            assert_relative_eq!(resultant_tail(n, 1e-9), 1.0, max_relative = 1e-6);
            assert_eq!(resultant_tail(n, f64::from(n)), 0.0);
        }
    }

    #[test]
    fn likelihood_solves_its_equation() {
        for k in [0.01, 0.5, 4.3, 60.0, 1e6] {
            let gap: f64 = if k > 300.0 { 1.0 / k } else { 1.0 - 1.0 / f64::tanh(k) + 1.0 / k };
            assert_relative_eq!(likelihood(gap), k, max_relative = 1e-9);
        }
    }
}
