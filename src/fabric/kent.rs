//! Kent's distribution of directions: an oval cluster on the sphere.

use super::special::{bessel_scaled, integrate};
use nalgebra::{Matrix3, Rotation3, SymmetricEigen, Vector3};

/// A Kent distribution, density exp(kappa g1.x + beta ((g2.x)^2 - (g3.x)^2)) / c (Kent 1982). One mode
/// where 2 beta < kappa.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Kent {
    /// Concentration about g1.
    pub kappa: f64,
    /// Ovalness.
    pub beta: f64,
    /// Mean, major and minor directions (east, north, up), right-handed.
    pub frame: [Vector3<f64>; 3],
    /// Sum of log-likelihoods over equally weighted directions.
    pub log_likelihood: f64,
}

/// Semi-axes in degrees of the confidence ellipse of the mean.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ellipse {
    /// Along g2.
    pub major: f64,
    /// Along g3.
    pub minor: f64,
}

/// Mean vector and mean of x x' of weighted unit vectors, with the effective number.
struct Sums {
    n: f64,
    mean: Vector3<f64>,
    tensor: Matrix3<f64>,
}

fn sums(directions: &[(Vector3<f64>, f64)]) -> Sums {
    let (mut weight, mut squares) = (0.0, 0.0);
    let (mut mean, mut tensor) = (Vector3::zeros(), Matrix3::zeros());
    for (v, w) in directions {
        weight += w;
        squares += w * w;
        mean += v * *w;
        tensor += v * v.transpose() * *w;
    }
    Sums { n: weight * weight / squares, mean: mean / weight, tensor: tensor / weight }
}

/// Mean of the directions, then the greater and lesser axes of the scatter normal to it.
fn moment_frame(s: &Sums) -> Option<Matrix3<f64>> {
    let g1 = s.mean.try_normalize(1e-12)?;
    let helper = if g1.z.abs() < 0.9 { Vector3::z() } else { Vector3::x() };
    let (u, v) = (g1.cross(&helper).normalize(), g1.cross(&g1.cross(&helper).normalize()));
    let plane = nalgebra::Matrix2::new(
        u.dot(&(s.tensor * u)),
        u.dot(&(s.tensor * v)),
        u.dot(&(s.tensor * v)),
        v.dot(&(s.tensor * v)),
    );
    let SymmetricEigen { eigenvalues, eigenvectors } = plane.symmetric_eigen();
    let big = usize::from(eigenvalues[1] > eigenvalues[0]);
    let g2 = (u * eigenvectors[(0, big)] + v * eigenvectors[(1, big)]).normalize();
    Some(Matrix3::from_columns(&[g1, g2, g1.cross(&g2)]))
}

/// r1 = g1.mean and r2 = g2'T g2 - g3'T g3 in a frame.
fn statistics(s: &Sums, frame: &Matrix3<f64>) -> (f64, f64) {
    let spread = |k: usize| frame.column(k).dot(&(s.tensor * frame.column(k)));
    (frame.column(0).dot(&s.mean), spread(1) - spread(2))
}

/// ln c, c = 2 pi int_-1^1 exp(kappa z) I0(beta (1-z^2)) dz (equal to Kent's series), for kappa >= 2 beta >= 0.
pub fn log_constant(kappa: f64, beta: f64) -> f64 {
    moments(kappa, beta)[0].ln() + kappa + (2.0 * std::f64::consts::PI).ln()
}

/// Scaled c, means of z and of b = (1-z^2) I1/I0, and means of z^2, z b, (1-z^2)^2 I0''/I0.
fn moments(kappa: f64, beta: f64) -> [f64; 6] {
    // With s = 1 - z the exponent is -s (kappa - 2 beta) - beta s^2; nothing is left to add beyond -45.
    let slope = kappa - 2.0 * beta;
    let top = 90.0 / (slope + (slope * slope + 180.0 * beta).sqrt()).max(1e-300);
    let [c, z, b, zz, zb, bb] = integrate(top.min(2.0), |s| {
        let (z, a) = (1.0 - s, s * (2.0 - s));
        let i = bessel_scaled(beta * a);
        let w = (beta * a - kappa * s).exp();
        let (one, two) = (w * a * i.one, w * a * a * (i.zero - i.one_over_x));
        [w * i.zero, w * i.zero * z, one, w * i.zero * z * z, one * z, two]
    });
    [c, z / c, b / c, zz / c, zb / c, bb / c]
}

/// kappa and beta by Kent's moments: 1/(2-2 r1-r2) + 1/(2-2 r1+r2), and half the difference.
fn moment_estimate(r1: f64, r2: f64) -> Option<(f64, f64)> {
    let (a, b) = (1.0 / (2.0 - 2.0 * r1 - r2), 1.0 / (2.0 - 2.0 * r1 + r2));
    (a.is_finite() && b.is_finite() && a > 0.0).then_some((a + b, (a - b) / 2.0))
}

fn built(n: f64, frame: &Matrix3<f64>, kappa: f64, beta: f64, r1: f64, r2: f64) -> Kent {
    Kent {
        kappa,
        beta,
        frame: [0, 1, 2].map(|k| frame.column(k).into_owned()),
        log_likelihood: n * (kappa * r1 + beta * r2 - log_constant(kappa, beta)),
    }
}

/// By moments (Kent 1982): quick, biased for small kappa. `None` where all directions are equal or balanced.
pub fn fit_moments(directions: &[(Vector3<f64>, f64)]) -> Option<Kent> {
    let s = sums(directions);
    let frame = moment_frame(&s)?;
    let (r1, r2) = statistics(&s, &frame);
    let (kappa, beta) = moment_estimate(r1, r2)?;
    Some(built(s.n, &frame, kappa, beta, r1, r2))
}

/// By maximum likelihood over all five parameters, one mode (2 beta <= kappa), starting from the moments.
pub fn fit(directions: &[(Vector3<f64>, f64)]) -> Option<Kent> {
    let s = sums(directions);
    let mut frame = moment_frame(&s)?;
    let (mut r1, mut r2) = statistics(&s, &frame);
    let (mut kappa, mut beta) = moment_estimate(r1, r2)?;
    if kappa > 1e9 {
        return None;
    }
    beta = beta.min(0.49 * kappa);
    for _ in 0..200 {
        let before = (kappa, beta);
        (kappa, beta) = concentrations(r1, r2, kappa, beta);
        frame = turned(&s, &frame, kappa, beta);
        (r1, r2) = statistics(&s, &frame);
        if (kappa - before.0).abs() <= 1e-11 * kappa && (beta - before.1).abs() <= 1e-11 * kappa {
            break;
        }
    }
    Some(built(s.n, &frame, kappa, beta, r1, r2))
}

/// The likeliest kappa and beta in a given frame. The log-likelihood is concave: Newton with halving.
fn concentrations(r1: f64, r2: f64, mut kappa: f64, mut beta: f64) -> (f64, f64) {
    let value = |k: f64, b: f64| k * r1 + b * r2 - log_constant(k, b);
    let mut best = value(kappa, beta);
    for _ in 0..60 {
        let [_, z, b, zz, zb, bb] = moments(kappa, beta);
        let (g1, g2) = (r1 - z, r2 - b);
        let (h11, h12, h22) = (zz - z * z, zb - z * b, bb - b * b);
        let det = h11 * h22 - h12 * h12;
        let (mut d1, mut d2) = ((h22 * g1 - h12 * g2) / det, (h11 * g2 - h12 * g1) / det);
        if !(d1.is_finite() && d2.is_finite()) {
            return (kappa, beta);
        }
        let mut moved = false;
        for _ in 0..40 {
            let k = (kappa + d1).max(1e-6);
            let b = (beta + d2).clamp(0.0, 0.5 * k);
            let v = value(k, b);
            if v >= best {
                moved = (k - kappa).abs() + (b - beta).abs() > 1e-12 * k;
                (kappa, beta, best) = (k, b, v);
                break;
            }
            (d1, d2) = (d1 / 2.0, d2 / 2.0);
        }
        if !moved {
            break;
        }
    }
    (kappa, beta)
}

/// One Newton step of the frame on the rotation group, halved until the likelihood does not fall.
fn turned(s: &Sums, frame: &Matrix3<f64>, kappa: f64, beta: f64) -> Matrix3<f64> {
    let at = |w: Vector3<f64>| {
        let (r1, r2) = statistics(s, &(frame * Rotation3::new(w).into_inner()));
        kappa * r1 + beta * r2
    };
    // The objective is smooth and of moderate size, so central differences are exact enough for a step.
    let h = 1e-4;
    let e = [Vector3::x() * h, Vector3::y() * h, Vector3::z() * h];
    let here = at(Vector3::zeros());
    let gradient = Vector3::from_fn(|i, _| (at(e[i]) - at(-e[i])) / (2.0 * h));
    let bend = Matrix3::from_fn(|i, j| {
        (at(e[i] + e[j]) - at(e[i] - e[j]) - at(e[j] - e[i]) + at(-e[i] - e[j])) / (4.0 * h * h)
    });
    let Some(mut step) = bend.try_inverse().map(|inverse| -inverse * gradient) else { return *frame };
    for _ in 0..20 {
        if step.norm() < 0.5 && at(step) > here {
            return frame * Rotation3::new(step).into_inner();
        }
        step /= 2.0;
    }
    *frame
}

/// Confidence ellipse of the mean: g = -2 ln(1-confidence) / (n r1^2), semi-axes asin sqrt(s2 g), asin sqrt(s3 g)
/// with s2, s3 the mean squares along the moment axes (Kent 1982 in Tauxe, app. C); for large samples. `None`
/// where a semi-axis has no sine.
pub fn ellipse(directions: &[(Vector3<f64>, f64)], confidence: f64) -> Option<Ellipse> {
    let s = sums(directions);
    let frame = moment_frame(&s)?;
    let (r1, _) = statistics(&s, &frame);
    let g = -2.0 * (1.0 - confidence).ln() / (s.n * r1 * r1);
    let semi = |k: usize| (frame.column(k).dot(&(s.tensor * frame.column(k))).max(0.0) * g).sqrt();
    (semi(1) <= 1.0).then(|| Ellipse { major: semi(1).asin().to_degrees(), minor: semi(2).asin().to_degrees() })
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    // Kent's series and the integral in mpmath agree; beta = 0 is Fisher's constant 4 pi sinh(k)/k.
    #[test]
    fn normalising_constants() {
        assert_abs_diff_eq!(log_constant(25.0, 8.0), 23.829_585_428_4, epsilon = 1e-9);
        for k in [0.1, 3.0, 100.0] {
            let fisher = (2.0 * std::f64::consts::PI / k).ln() + k + (-(-2.0 * k).exp()).ln_1p();
            assert_abs_diff_eq!(log_constant(k, 0.0), fisher, epsilon = 1e-12);
        }
    }
}
