//! Fisher's distribution about a mean direction: resultant, concentration and the cone of the mean.

use super::sample::{Sample, Stations, heaviest};
use crate::orientation::{Axis, ExactSum};
use nalgebra::Vector3;

/// Fewest independent directions for alpha95: exact from 3 on (own simulation, coverage 0.948-0.952).
pub const LEAST: f64 = 3.0;

/// The sum of directions and what follows from it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Resultant {
    /// How many equally weighted directions these are worth: (sum w)^2 / sum w^2.
    pub n: f64,
    /// Length of the mean vector times `n`: R of equal weights.
    pub length: f64,
    /// n - R, summed without cancellation.
    pub shortfall: f64,
    /// Unit vector along the sum; `None` where the sum has no length.
    pub mean: Option<Vector3<f64>>,
}

impl Resultant {
    /// Of unit vectors with weights in (0, 1]. The order does not matter.
    pub fn of(directions: impl Iterator<Item = (Vector3<f64>, f64)> + Clone) -> Self {
        let mut sums = [ExactSum::default(); 5];
        for (v, w) in directions.clone() {
            for (sum, term) in sums.iter_mut().zip([w * v.x, w * v.y, w * v.z, w, w * w]) {
                sum.add_term(term);
            }
        }
        let [x, y, z, weight, squares] = sums.map(ExactSum::value);
        if weight <= 0.0 {
            return Self { n: 0.0, length: 0.0, shortfall: 0.0, mean: None };
        }
        let n = weight * weight / squares;
        let sum = Vector3::new(x, y, z);
        let norm = sum.norm();
        if norm <= 1e-12 * weight {
            return Self { n, length: 0.0, shortfall: n, mean: None };
        }
        let mean = sum / norm;
        // 1 - x.m = |x - m|^2 / 2 keeps its digits where all directions are close together.
        let gaps: ExactSum = directions.map(|(v, w)| w * (v - mean).norm_squared() / 2.0).collect();
        Self { n, length: n * norm / weight, shortfall: n * gaps.value() / weight, mean: Some(mean) }
    }

    /// kappa = (n-1)/(n-R) (Fisher 1953): 1/kappa is unbiased; kappa itself is high by (n-1)/(n-2).
    /// `None` for fewer than 2 directions, without a mean, or where all are equal (infinite).
    pub fn kappa(&self) -> Option<f64> {
        (self.mean.is_some() && self.n > 1.0 && self.shortfall > 1e-14 * self.n)
            .then(|| (self.n - 1.0) / self.shortfall)
    }

    /// Fisher's exact cone of the mean, degrees: cos a = 1 - ((n-R)/R) ((1/p)^(1/(n-1)) - 1), p = 1 - confidence
    /// (Fisher 1953). 180 where the cone takes in the whole sphere; `None` below 3 directions or without a mean.
    pub fn alpha(&self, confidence: f64) -> Option<f64> {
        if self.n < LEAST - 1e-9 || self.mean.is_none() {
            return None;
        }
        let spread = (1.0 - confidence).powf(-1.0 / (self.n - 1.0)) - 1.0;
        // 1 - cos a = 2 sin^2(a/2)
        let versine = self.shortfall / self.length * spread;
        Some(if versine >= 2.0 { 180.0 } else { 2.0 * (versine / 2.0).sqrt().asin().to_degrees() })
    }
}

/// The vector of an axis on the side of `pole`.
pub fn turned(axis: Axis, pole: Vector3<f64>) -> Vector3<f64> {
    let v = axis.vector();
    if v.dot(&pole) < 0.0 { -v } else { v }
}

/// The resultant of axes turned to the side of `pole`.
pub fn axial_resultant(sample: &Sample, pole: Axis) -> Resultant {
    let (p, scale) = (pole.vector(), heaviest(sample));
    Resultant::of(sample.readings().map(|(a, w)| (turned(a, p), w / scale)))
}

/// The resultant of the stations' mean directions, each one vote of the station's mean weight.
/// Readings of one station agree more than stations do: over 6 stations of 5 readings a cone from all 30
/// covers in 0.47 of samples, one from the 6 means in 0.95 (own simulation).
pub fn station_resultant(sample: &Sample, stations: &Stations, pole: Axis) -> Resultant {
    let (p, scale) = (pole.vector(), heaviest(sample));
    let votes: Vec<(Vector3<f64>, f64)> = stations
        .groups()
        .filter_map(|group| {
            let own = Resultant::of(group.iter().map(|&i| {
                let i = i as usize;
                (turned(sample.axes()[i], p), sample.weight(i) / scale)
            }));
            let weight: ExactSum = group.iter().map(|&i| sample.weight(i as usize) / scale).collect();
            Some((own.mean?, weight.value() / group.len() as f64))
        })
        .collect();
    Resultant::of(votes.iter().copied())
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    fn resultant(n: f64, length: f64) -> Resultant {
        Resultant { n, length, shortfall: n - length, mean: Some(Vector3::z()) }
    }

    // Tauxe, Essentials of Paleomagnetism, ch. 11: two sites of 20 with R 18.0818 and 19.0899; the book prints
    // k 9.9 and 20.9, alpha95 10.9 and 7.3.
    #[test]
    fn the_worked_pair_of_a_textbook() {
        for (r, k, a) in [(18.0818, 9.9051, 10.9230), (19.0899, 20.8768, 7.3163)] {
            let f = resultant(20.0, r);
            assert_abs_diff_eq!(f.kappa().unwrap(), k, epsilon = 1e-4);
            assert_abs_diff_eq!(f.alpha(0.95).unwrap(), a, epsilon = 1e-4);
        }
    }

    #[test]
    fn borders_are_answers() {
        let none = Resultant::of(std::iter::empty());
        assert_eq!((none.kappa(), none.alpha(0.95)), (None, None));
        let opposed = Resultant::of([(Vector3::x(), 1.0), (-Vector3::x(), 1.0)].into_iter());
        assert_eq!((opposed.length, opposed.mean, opposed.kappa()), (0.0, None, None));
        let equal = Resultant::of([(Vector3::y(), 1.0); 4].into_iter());
        assert_eq!((equal.kappa(), equal.alpha(0.95)), (None, Some(0.0)));
        assert_eq!(resultant(3.0, 0.5).alpha(0.95), Some(180.0));
    }
}
