//! How well a principal axis is known: its elliptical confidence cone.

use super::sample::Unit;
use crate::orientation::{Axis, Eigen, ExactSum};
use nalgebra::{Matrix2, SymmetricEigen, Vector2, Vector3};

/// Fewest independent units for a cone that keeps its coverage (own simulation: 0.94 at 5).
pub const LEAST: f64 = 5.0;

/// A semi-axis beyond this many degrees leaves the axis undetermined.
pub const WIDEST: f64 = 45.0;

/// Elliptical confidence cone of an axis.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Cone {
    /// Greater semi-axis, degrees, at most 45.
    pub major: f64,
    /// Lesser semi-axis, degrees.
    pub minor: f64,
    /// The axis towards which the greater semi-axis is measured, perpendicular to the cone's own.
    pub toward: Axis,
}

/// Why there is no cone.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum NoCone {
    /// Fewer than [`LEAST`] independent units; the number there is.
    TooFew(f64),
    /// The axis could point anywhere within 45 degrees or more.
    Undetermined,
}

/// Covariance of the axis' two tangent offsets, towards the other two principal axes in their order.
///
/// Units are stations: a unit g moves e_i towards e_j by e_j' M_g e_i / (S_i - S_j) / sum w. With one reading
/// of equal weight per station the sum of squares is the matrix E/n of Fisher, Lewis & Embleton 1987 ch. 6
/// and Prentice 1984 (from memory), E_jl = mean[(e_j.x)(e_l.x)(e_i.x)^2] / ((S_i-S_j)(S_i-S_l)).
/// `None` where an eigenvalue equals S_i to round-off.
pub fn covariance(units: &[Unit], eigen: &Eigen, which: usize) -> Option<Matrix2<f64>> {
    let [j, l] = others(which);
    let vectors: [Vector3<f64>; 3] = eigen.axes.map(Axis::vector);
    let (gap_j, gap_l) = (eigen.values[which] - eigen.values[j], eigen.values[which] - eigen.values[l]);
    if gap_j.abs() <= Eigen::EQUAL || gap_l.abs() <= Eigen::EQUAL {
        return None;
    }
    let mut sums = [ExactSum::default(); 4];
    for unit in units {
        let (a, b) = (unit.form(&vectors[j], &vectors[which]), unit.form(&vectors[l], &vectors[which]));
        for (sum, term) in sums.iter_mut().zip([a * a, a * b, b * b, unit.weight]) {
            sum.add_term(term);
        }
    }
    let [aa, ab, bb, weight] = sums.map(ExactSum::value);
    let w2 = weight * weight;
    Some(Matrix2::new(aa / (gap_j * gap_j), ab / (gap_j * gap_l), ab / (gap_j * gap_l), bb / (gap_l * gap_l)) / w2)
}

/// How many equally weighted stations say as much as these: (sum w)^2 / sum w^2 of the stations' weights.
pub fn effective_units(units: &[Unit]) -> f64 {
    let weight: ExactSum = units.iter().map(|u| u.weight).collect();
    let squares: ExactSum = units.iter().map(|u| u.weight * u.weight).collect();
    if squares.value() > 0.0 { weight.value().powi(2) / squares.value() } else { 0.0 }
}

/// 2(n-1)/(n-2) F(confidence; 2, n-2): Hotelling's factor in place of the chi-squared one, which is too small
/// below some 50 readings. With 2 degrees of freedom above, F has a closed form.
pub fn small_sample_factor(n: f64, confidence: f64) -> f64 {
    (n - 1.0) * ((1.0 - confidence).powf(-2.0 / (n - 2.0)) - 1.0)
}

/// The confidence cone of principal axis `which` (0 for e1, 2 for e3): offsets v with v' C^-1 v <= factor.
/// Coverage 0.94-0.95 from 5 to 50 readings in own simulations of three Bingham populations.
pub fn cone(units: &[Unit], eigen: &Eigen, which: usize, confidence: f64) -> Result<Cone, NoCone> {
    let n = effective_units(units);
    // A hair below, so that weights that differ by round-off do not lose a sample of five.
    if n < LEAST - 1e-9 {
        return Err(NoCone::TooFew(n));
    }
    let covariance = covariance(units, eigen, which).ok_or(NoCone::Undetermined)?;
    from_covariance(&covariance, small_sample_factor(n, confidence), eigen, which)
}

/// Whether an axis lies within the confidence region of principal axis `which`, whatever its size. False where
/// the region is undefined.
pub fn covers(units: &[Unit], eigen: &Eigen, which: usize, confidence: f64, axis: Axis) -> bool {
    let n = effective_units(units);
    let Some(inverse) = covariance(units, eigen, which).and_then(|c| c.try_inverse()) else { return false };
    let [j, l] = others(which);
    let [own, a, b] = [which, j, l].map(|k| axis.vector().dot(&eigen.axes[k].vector()));
    let offset = Vector2::new(a, b) * own.signum();
    n > 2.0 && offset.dot(&(inverse * offset)) <= small_sample_factor(n, confidence)
}

/// The cone from a covariance of tangent offsets and a limit for their quadratic form.
pub(super) fn from_covariance(
    covariance: &Matrix2<f64>,
    factor: f64,
    eigen: &Eigen,
    which: usize,
) -> Result<Cone, NoCone> {
    build(covariance, factor, eigen, which, |offset| if offset <= 1.0 { offset.asin() } else { f64::INFINITY })
}

/// The same from a covariance of angles in radians.
pub(super) fn from_angles(covariance: &Matrix2<f64>, factor: f64, eigen: &Eigen, which: usize) -> Result<Cone, NoCone> {
    build(covariance, factor, eigen, which, |angle| angle)
}

fn build(
    covariance: &Matrix2<f64>,
    factor: f64,
    eigen: &Eigen,
    which: usize,
    angle: impl Fn(f64) -> f64,
) -> Result<Cone, NoCone> {
    let SymmetricEigen { eigenvalues, eigenvectors } = covariance.symmetric_eigen();
    let (big, small) = if eigenvalues[0] >= eigenvalues[1] { (0, 1) } else { (1, 0) };
    let semi = |k: usize| angle((eigenvalues[k].max(0.0) * factor).sqrt()).to_degrees();
    let [j, l] = others(which);
    let direction = eigen.axes[j].vector() * eigenvectors[(0, big)] + eigen.axes[l].vector() * eigenvectors[(1, big)];
    match Axis::new(direction.x, direction.y, direction.z) {
        Ok(toward) if semi(big) <= WIDEST => Ok(Cone { major: semi(big), minor: semi(small), toward }),
        _ => Err(NoCone::Undetermined),
    }
}

/// The two other principal axes, in their order.
pub(super) fn others(which: usize) -> [usize; 2] {
    match which {
        0 => [1, 2],
        1 => [0, 2],
        _ => [0, 1],
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    // 2(n-1)/(n-2) scipy.stats.f.ppf(0.95, 2, n-2)
    #[test]
    fn factors_match_the_f_quantiles_of_scipy() {
        for (n, want) in [(8.0, 12.000_923_316), (24.0, 7.199_745_993), (60.0, 6.420_689_182)] {
            assert_relative_eq!(small_sample_factor(n, 0.95), want, max_relative = 1e-9);
        }
    }
}
