//! The orientation tensor: the weighted sum of x x' over axes x, which adds.

use super::{Axis, ExactSum};
use nalgebra::{Matrix3, SymmetricEigen};

/// Weighted sum of outer products of axes, plus how many and how heavy they were.
///
/// Invariant: never normalised inside, so two tensors of disjoint readings merge by adding; the sums are
/// [`ExactSum`]s, so the result does not depend on the order of readings, on threads or on how a file was split.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct OrientationTensor {
    /// Upper triangle: ee, en, eu, nn, nu, uu.
    sums: [ExactSum; 6],
    weight: ExactSum,
    weight_squared: ExactSum,
    count: u64,
}

/// Eigenvalues and axes of a normalised tensor.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Eigen {
    /// S1 >= S2 >= S3 >= 0, sum 1.
    pub values: [f64; 3],
    /// The axes that belong to them, mutually perpendicular.
    pub axes: [Axis; 3],
}

impl Eigen {
    /// Eigenvalues closer than this cannot be told apart in double precision, and their axes are arbitrary
    /// in the plane (or space) that they span.
    pub const EQUAL: f64 = 1e-12;

    /// True where S1 and S2 are equal to round-off, so that the first axis is arbitrary.
    pub fn first_undetermined(&self) -> bool {
        self.values[0] - self.values[1] <= Self::EQUAL
    }
    /// True where S2 and S3 are equal to round-off, so that the third axis is arbitrary.
    pub fn third_undetermined(&self) -> bool {
        self.values[1] - self.values[2] <= Self::EQUAL
    }
}

impl OrientationTensor {
    /// Adds one axis with a weight in (0, 1e6].
    pub fn add(&mut self, axis: Axis, weight: f64) {
        let v = axis.vector();
        let terms = [v.x * v.x, v.x * v.y, v.x * v.z, v.y * v.y, v.y * v.z, v.z * v.z];
        for (sum, term) in self.sums.iter_mut().zip(terms) {
            sum.add_term(weight * term);
        }
        self.weight.add_term(weight);
        self.weight_squared.add_term(weight * weight);
        self.count += 1;
    }

    /// Adds all readings of another tensor.
    pub fn merge(&mut self, other: &Self) {
        for (sum, more) in self.sums.iter_mut().zip(other.sums) {
            *sum += more;
        }
        self.weight += other.weight;
        self.weight_squared += other.weight_squared;
        self.count += other.count;
    }

    /// How many axes were added.
    pub fn count(&self) -> u64 {
        self.count
    }
    /// Sum of weights.
    pub fn weight(&self) -> f64 {
        self.weight.value()
    }
    /// (sum w)^2 / sum w^2: how many equally weighted readings say as much; 0 where there are none.
    pub fn effective_count(&self) -> f64 {
        let squares = self.weight_squared.value();
        if squares > 0.0 { self.weight.value().powi(2) / squares } else { 0.0 }
    }

    /// The unnormalised sums: ee, en, eu, nn, nu, uu.
    pub fn moments(&self) -> [f64; 6] {
        self.sums.map(ExactSum::value)
    }

    /// The tensor with trace 1 (Scheidegger 1965; Watson 1966), frame east-north-up; `None` when empty.
    pub fn normalised(&self) -> Option<Matrix3<f64>> {
        let [ee, en, eu, nn, nu, uu] = self.sums.map(ExactSum::value);
        let trace = ee + nn + uu;
        if self.count == 0 || trace <= 0.0 {
            return None;
        }
        Some(Matrix3::new(ee, en, eu, en, nn, nu, eu, nu, uu) / trace)
    }

    /// Sorted eigenvalues and axes; `None` when empty.
    pub fn eigen(&self) -> Option<Eigen> {
        let SymmetricEigen { eigenvalues, eigenvectors } = self.normalised()?.symmetric_eigen();
        let mut order = [0, 1, 2];
        order.sort_by(|&a, &b| eigenvalues[b].total_cmp(&eigenvalues[a]));
        // Round-off leaves -1e-17 where the exact root is 0; the rest is rescaled to sum to 1.
        let clamped = order.map(|i| eigenvalues[i].max(0.0));
        let total: f64 = clamped.iter().sum();
        let axes = order.map(|i| {
            let v = eigenvectors.column(i);
            Axis::new(v[0], v[1], v[2]).expect("an eigenvector of a finite symmetric matrix has length 1")
        });
        Some(Eigen { values: clamped.map(|s| s / total), axes })
    }
}

impl FromIterator<Axis> for OrientationTensor {
    fn from_iter<I: IntoIterator<Item = Axis>>(axes: I) -> Self {
        let mut tensor = Self::default();
        for axis in axes {
            tensor.add(axis, 1.0);
        }
        tensor
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    fn eigenvalues(axes: &[(f64, f64)]) -> [f64; 3] {
        let t: OrientationTensor = axes.iter().map(|&(t, p)| Axis::from_trend_plunge(t, p)).collect();
        t.eigen().unwrap().values
    }

    // Closed form: the eigenvalues of a few axes follow from the definition.
    #[test]
    fn closed_form_tensors() {
        type Case<'a> = (&'a [(f64, f64)], [f64; 3]);
        let cases: [Case; 4] = [
            (&[(123.0, 45.0)], [1.0, 0.0, 0.0]),
            (&[(0.0, 0.0), (60.0, 0.0)], [0.75, 0.25, 0.0]),
            (&[(10.0, 0.0), (100.0, 0.0)], [0.5, 0.5, 0.0]),
            (&[(0.0, 0.0), (90.0, 0.0), (0.0, 90.0)], [1.0 / 3.0; 3]),
        ];
        for (axes, want) in cases {
            for (got, want) in eigenvalues(axes).into_iter().zip(want) {
                assert_abs_diff_eq!(got, want, epsilon = 1e-12);
            }
        }
    }

    #[test]
    fn merging_is_adding() {
        let axes: Vec<Axis> = (0..200).map(|i| Axis::from_trend_plunge(i as f64 * 7.3, (i % 90) as f64)).collect();
        let whole: OrientationTensor = axes.iter().copied().collect();
        let mut parts: OrientationTensor = axes[120..].iter().rev().copied().collect();
        parts.merge(&axes[..120].iter().copied().collect());
        assert_eq!(whole, parts);
    }

    #[test]
    fn an_empty_tensor_has_no_axes() {
        assert_eq!(OrientationTensor::default().eigen(), None);
        assert_eq!(OrientationTensor::default().effective_count(), 0.0);
    }
}
