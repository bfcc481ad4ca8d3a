//! A uniformity test that sees what the tensor cannot: three orthogonal sets, or a cone of 54.7 degrees.
//!
//! Such samples have an isotropic tensor (the harmonics of degree 2 vanish), but not the degree 4 ones.

use super::sample::{Sample, Stations, heaviest};
use super::uniformity::chi_squared_tail;
use crate::orientation::ExactSum;
use nalgebra::Vector3;

/// The nine real harmonics of degree 4, mean square 1 over the sphere: their products over two axes sum to
/// 9 P4(x.y) (addition theorem).
fn degree_four(v: Vector3<f64>) -> [f64; 9] {
    let (x, y, z) = (v.x, v.y, v.z);
    let (x2, y2, z2) = (x * x, y * y, z * z);
    let (r5, r10, r35, r70) = (5f64.sqrt(), 10f64.sqrt(), 35f64.sqrt(), 70f64.sqrt());
    [
        0.375 * (35.0 * z2 * z2 - 30.0 * z2 + 3.0),
        0.75 * r10 * x * z * (7.0 * z2 - 3.0),
        0.75 * r10 * y * z * (7.0 * z2 - 3.0),
        0.75 * r5 * (x2 - y2) * (7.0 * z2 - 1.0),
        1.5 * r5 * x * y * (7.0 * z2 - 1.0),
        0.75 * r70 * (x2 - 3.0 * y2) * x * z,
        0.75 * r70 * (3.0 * x2 - y2) * y * z,
        0.375 * r35 * (x2 * x2 - 6.0 * x2 * y2 + y2 * y2),
        1.5 * r35 * x * y * (x2 - y2),
    ]
}

/// p-value of the degree 4 score test of uniformity for axes (of the class of Beran 1968 and Gine 1975, from
/// memory): 9 |sum h|^2 / sum |h|^2 over stations' sums h of harmonics, chi-squared with 9 degrees of freedom.
/// 1 where there is nothing to test.
pub fn degree_four_p(sample: &Sample, stations: &Stations) -> f64 {
    let scale = heaviest(sample);
    let mut totals = [ExactSum::default(); 9];
    let mut noise = ExactSum::default();
    for group in stations.groups() {
        let mut own = [ExactSum::default(); 9];
        for &i in group {
            let w = sample.weight(i as usize) / scale;
            for (sum, h) in own.iter_mut().zip(degree_four(sample.axes()[i as usize].vector())) {
                sum.add_term(w * h);
            }
        }
        noise.add_term(own.iter().map(|s| s.value().powi(2)).sum());
        for (total, s) in totals.iter_mut().zip(own) {
            *total += s;
        }
    }
    let signal: f64 = totals.iter().map(|t| t.value().powi(2)).sum();
    if noise.value() > 0.0 { chi_squared_tail(9.0, 9.0 * signal / noise.value()) } else { 1.0 }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fabric::Kind;
    use crate::orientation::Axis;
    use approx::assert_abs_diff_eq;

    #[test]
    fn the_harmonics_obey_the_addition_theorem() {
        for (a, b) in [((10.0, 20.0), (200.0, 70.0)), ((0.0, 90.0), (45.0, 3.0)), ((77.0, 41.0), (77.0, 41.0))] {
            let (x, y) = (Axis::from_trend_plunge(a.0, a.1).vector(), Axis::from_trend_plunge(b.0, b.1).vector());
            let sum: f64 = degree_four(x).iter().zip(degree_four(y)).map(|(p, q)| p * q).sum();
            let t = x.dot(&y).powi(2);
            assert_abs_diff_eq!(sum, 9.0 * (35.0 * t * t - 30.0 * t + 3.0) / 8.0, epsilon = 1e-12);
        }
    }

    #[test]
    fn a_cone_with_an_isotropic_tensor_is_seen() {
        let plunge = 1f64.atan2(2f64.sqrt()).to_degrees(); // 35.26 = 90 - 54.74
        let axes: Vec<Axis> = (0..36).map(|i| Axis::from_trend_plunge(10.0 * i as f64, plunge)).collect();
        let sample = Sample::new(&axes, Kind::Linear);
        assert_abs_diff_eq!(sample.tensor().eigen().unwrap().values[0], 1.0 / 3.0, epsilon = 1e-14);
        assert!(degree_four_p(&sample, &sample.stations()) < 1e-6);
    }
}
