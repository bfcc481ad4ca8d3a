//! Special functions that no library here has: scaled Bessel functions and Gauss-Legendre quadrature.

use std::sync::OnceLock;

/// exp(-|x|) I0(x), exp(-|x|) I1(x) and their limit-safe ratio I1(x)/x scaled alike, for x >= 0.
///
/// Power series up to 30, all terms positive; asymptotic series beyond (Abramowitz & Stegun 9.6.10, 9.7.1).
pub fn bessel_scaled(x: f64) -> Bessel {
    debug_assert!(x >= 0.0);
    if x <= 30.0 {
        let q = x * x / 4.0;
        // I0 = sum q^k / k!^2; I1/x = (1/2) sum q^k / (k! (k+1)!)
        let (mut term, mut zero, mut one) = (1.0, 1.0, 1.0);
        for k in 1..200 {
            let k = f64::from(k);
            term *= q / (k * k);
            zero += term;
            one += term / (k + 1.0);
            if term < 1e-17 * zero {
                break;
            }
        }
        let scale = (-x).exp();
        Bessel { zero: zero * scale, one: 0.5 * x * one * scale, one_over_x: 0.5 * one * scale }
    } else {
        let series = |mu: f64| {
            let (mut term, mut sum) = (1.0, 1.0);
            for k in 1..40 {
                let k = f64::from(k);
                let next = -term * (mu - (2.0 * k - 1.0).powi(2)) / (8.0 * x * k);
                if next.abs() < 1e-17 || next.abs() > f64::abs(term) {
                    break;
                }
                term = next;
                sum += term;
            }
            sum / (2.0 * std::f64::consts::PI * x).sqrt()
        };
        let (zero, one) = (series(0.0), series(4.0));
        Bessel { zero, one, one_over_x: one / x }
    }
}

/// Values of [`bessel_scaled`].
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Bessel {
    /// exp(-x) I0(x).
    pub zero: f64,
    /// exp(-x) I1(x).
    pub one: f64,
    /// exp(-x) I1(x) / x, 1/2 at 0.
    pub one_over_x: f64,
}

const NODES: usize = 100;

/// Nodes and weights of the 100-point Gauss-Legendre rule on [0, 1].
fn rule() -> &'static [(f64, f64)] {
    static RULE: OnceLock<Vec<(f64, f64)>> = OnceLock::new();
    RULE.get_or_init(|| {
        let n = NODES as f64;
        (0..NODES)
            .map(|i| {
                // Tricomi's start, then Newton on the Legendre polynomial.
                let mut x = (std::f64::consts::PI * (i as f64 + 0.75) / (n + 0.5)).cos();
                let mut slope = 1.0;
                for _ in 0..20 {
                    let (mut p0, mut p1) = (1.0, x);
                    for k in 2..=NODES {
                        let k = k as f64;
                        (p0, p1) = (p1, ((2.0 * k - 1.0) * x * p1 - (k - 1.0) * p0) / k);
                    }
                    slope = n * (x * p1 - p0) / (x * x - 1.0);
                    let step = p1 / slope;
                    x -= step;
                    if step.abs() < 1e-16 {
                        break;
                    }
                }
                ((1.0 + x) / 2.0, 1.0 / ((1.0 - x * x) * slope * slope))
            })
            .collect()
    })
}

/// Integrals of several functions at once over [0, top], nodes crowded towards 0 (z = top t^2).
pub fn integrate<const N: usize>(top: f64, f: impl Fn(f64) -> [f64; N]) -> [f64; N] {
    let mut sums = [0.0; N];
    for &(t, w) in rule() {
        let weight = w * 2.0 * top * t;
        for (sum, value) in sums.iter_mut().zip(f(top * t * t)) {
            *sum += weight * value;
        }
    }
    sums
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    // scipy.special.i0e, i1e
    #[test]
    fn bessel_functions() {
        for (x, zero, one) in [
            (0.0, 1.0, 0.0),
            (0.5, 0.645_035_270_449_15, 0.156_420_803_184_871_73),
            (5.0, 0.183_540_812_609_328_34, 0.163_972_266_944_542_34),
            (29.9, 0.073_269_219_046_001_91, 0.072_033_374_911_868_8),
            (30.1, 0.073_023_294_131_060_94, 0.071_799_854_351_014_34),
            (700.0, 0.015_081_295_651_531_355, 0.015_070_519_444_716_846),
        ] {
            let b = bessel_scaled(x);
            assert_relative_eq!(b.zero, zero, max_relative = 1e-14);
            assert_relative_eq!(b.one, one, max_relative = 1e-14);
            assert_relative_eq!(b.one_over_x * x, one, max_relative = 1e-14);
        }
    }

    #[test]
    fn polynomials_are_integrated_exactly() {
        let [a, b] = integrate(2.0, |z| [z * z, 1.0]);
        assert_relative_eq!(a, 8.0 / 3.0, max_relative = 1e-14);
        assert_relative_eq!(b, 2.0, max_relative = 1e-14);
    }
}
