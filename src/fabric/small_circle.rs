//! The small circle that best holds axes of unknown sense: poles of a conical fold.

use super::sample::{Sample, heaviest};
use crate::orientation::{Axis, OrientationTensor};
use nalgebra::{Matrix3, Rotation3, SymmetricEigen, Vector3};

/// A small circle on the sphere of axes.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SmallCircle {
    /// Its centre.
    pub axis: Axis,
    /// Angle from the centre to the circle, degrees, (0, 90]; 90 is a great circle.
    pub half_angle: f64,
    /// Sum of squared misfits, scaled to equal weights of mean 1: of direction cosines for the plane fit,
    /// of angles in radians for the angular fit.
    pub misfit: f64,
    /// The ends of the axes that were fitted lie on this side.
    side: Vector3<f64>,
}

/// Start directions for the search: an even spread over the half-sphere.
const STARTS: usize = 120;

fn spread(k: usize) -> Vector3<f64> {
    // Fibonacci lattice.
    let z = (k as f64 + 0.5) / STARTS as f64;
    let angle = k as f64 * std::f64::consts::PI * (3.0 - 5f64.sqrt());
    let r = (1.0 - z * z).sqrt();
    Vector3::new(r * angle.cos(), r * angle.sin(), z)
}

/// Weighted vectors in an order that rows do not decide, weights of mean 1.
fn ordered(sample: &Sample) -> Vec<(Vector3<f64>, f64)> {
    let scale = heaviest(sample);
    let mut all: Vec<(Vector3<f64>, f64)> = sample.readings().map(|(a, w)| (a.vector(), w / scale)).collect();
    all.sort_unstable_by(|(a, v), (b, w)| {
        a.z.total_cmp(&b.z).then(a.y.total_cmp(&b.y)).then(a.x.total_cmp(&b.x)).then(v.total_cmp(w))
    });
    let mean = all.iter().map(|p| p.1).sum::<f64>() / all.len().max(1) as f64;
    all.iter_mut().for_each(|p| p.1 /= mean);
    all
}

/// Ends chosen by the side of the centre are trusted where the circle is this many standard misfits off the
/// great circle; nearer, noise would decide the ends and make any cylinder look like a cone. Of few poles
/// more is asked, since three parameters fitted to ten leave little misfit. Own simulation: tests/calibration.rs.
fn clear(n: usize) -> f64 {
    2.5 + 25.0 / n as f64
}

/// Least squares in direction cosines (Ramsay 1967; Gray, Geiser & Geiser 1980, from memory): the plane
/// nearest to the ends of the axes.
///
/// Which end of an axis counts is unknown. Tried are the ends that run on from each other along the best great
/// circle, cut at its widest gap (for an arc), and from many starts the ends on the side of the circle's own
/// centre (for a ring well off the great circle). `None` for fewer than 3 axes.
pub fn plane_fit(sample: &Sample) -> Option<SmallCircle> {
    let data = ordered(sample);
    if data.len() < 3 {
        return None;
    }
    let frame = sample.tensor().eigen()?.axes.map(Axis::vector);
    let mut best = fit_ends(&data, middle_of_arc(&data, &frame)).0;
    for start in (0..STARTS).map(spread).chain(frame) {
        let mut side = start;
        for _ in 0..30 {
            let (circle, sigma) = fit_ends(&data, side);
            let (centre, cosine) = (circle.centre, circle.cosine);
            if cosine <= clear(data.len()) * sigma {
                break;
            }
            // Equal to round-off: the first stays, so that the answer does not hang on the last digit.
            if (centre - side).norm() < 1e-9 && circle.misfit < best.misfit * (1.0 - 1e-9) - 1e-15 {
                best = circle;
            }
            if (centre - side).norm() < 1e-12 {
                break;
            }
            side = centre;
        }
    }
    best.circle()
}

/// The same for ends that are known: those on one side of the plane normal to `side`, for example the lower ones.
pub fn plane_fit_on_side(sample: &Sample, side: Axis) -> Option<SmallCircle> {
    let data = ordered(sample);
    if data.len() < 3 { None } else { fit_ends(&data, side.vector()).0.circle() }
}

struct Fit {
    centre: Vector3<f64>,
    cosine: f64,
    misfit: f64,
    side: Vector3<f64>,
}

impl Fit {
    fn circle(&self) -> Option<SmallCircle> {
        let axis = Axis::new(self.centre.x, self.centre.y, self.centre.z).ok()?;
        let half_angle = self.cosine.clamp(0.0, 1.0).acos().to_degrees();
        Some(SmallCircle { axis, half_angle, misfit: self.misfit, side: self.side })
    }
}

/// The plane nearest to the ends on one side of the plane normal to `side`, and the standard misfit.
fn fit_ends(data: &[(Vector3<f64>, f64)], side: Vector3<f64>) -> (Fit, f64) {
    let total: f64 = data.iter().map(|p| p.1).sum();
    let ends = data.iter().map(|(v, w)| (end(v, &side), *w));
    let mean: Vector3<f64> = ends.clone().map(|(v, w)| v * w).sum::<Vector3<f64>>() / total;
    let mut scatter = Matrix3::zeros();
    for (v, w) in ends {
        let d = v - mean;
        scatter += d * d.transpose() * w;
    }
    let SymmetricEigen { eigenvalues, eigenvectors } = scatter.symmetric_eigen();
    let least = eigenvalues.imin();
    let axis: Vector3<f64> = eigenvectors.column(least).into_owned();
    let cosine = axis.dot(&mean);
    let misfit = eigenvalues[least].max(0.0);
    let centre = if cosine < 0.0 { -axis } else { axis };
    (Fit { centre, cosine: cosine.abs(), misfit, side }, (misfit / total).sqrt())
}

fn end(v: &Vector3<f64>, side: &Vector3<f64>) -> Vector3<f64> {
    if v.dot(side) < 0.0 { -v } else { *v }
}

/// The direction in the best great circle that is farthest from the widest gap between the axes.
fn middle_of_arc(data: &[(Vector3<f64>, f64)], frame: &[Vector3<f64>; 3]) -> Vector3<f64> {
    let pi = std::f64::consts::PI;
    let mut places: Vec<f64> =
        data.iter().map(|(v, _)| v.dot(&frame[1]).atan2(v.dot(&frame[0])).rem_euclid(pi)).collect();
    places.sort_unstable_by(f64::total_cmp);
    let n = places.len();
    let (mut widest, mut middle) = (0.0, 0.0);
    for i in 0..n {
        let next = if i + 1 < n { places[i + 1] } else { places[0] + pi };
        if next - places[i] > widest {
            widest = next - places[i];
            middle = 0.5 * (next + places[i]) + pi / 2.0;
        }
    }
    frame[0] * middle.cos() + frame[1] * middle.sin()
}

/// The shortest arc about the circle's centre, degrees in [0, 360], that holds `share` of the fitted ends.
pub fn coverage(sample: &Sample, circle: &SmallCircle, share: f64) -> f64 {
    let centre = circle.axis.vector();
    let helper = if centre.z.abs() < 0.9 { Vector3::z() } else { Vector3::x() };
    let u = centre.cross(&helper).normalize();
    let v = centre.cross(&u);
    let mut places: Vec<f64> = sample
        .axes()
        .iter()
        .map(|a| {
            let e = end(&a.vector(), &circle.side);
            e.dot(&v).atan2(e.dot(&u)).to_degrees().rem_euclid(360.0)
        })
        .collect();
    places.sort_unstable_by(f64::total_cmp);
    let n = places.len();
    let held = ((share * n as f64).ceil() as usize).clamp(1, n.max(1));
    (0..n)
        .map(|i| {
            let last = i + held - 1;
            places[last % n] + if last >= n { 360.0 } else { 0.0 } - places[i]
        })
        .fold(360.0, f64::min)
}

/// Least squares in angles (Mardia & Gadsden 1977, from memory), from the plane fit by Gauss-Newton steps.
pub fn angular_fit(sample: &Sample, start: &SmallCircle) -> SmallCircle {
    let data = ordered(sample);
    let mut centre = start.axis.vector();
    let total: f64 = data.iter().map(|p| p.1).sum();
    // Ends stay as the plane fit chose them.
    let ends: Vec<(Vector3<f64>, f64)> = data.iter().map(|(v, w)| (end(v, &start.side), *w)).collect();
    let score = |c: &Vector3<f64>| {
        let angle = |v: &Vector3<f64>| v.cross(c).norm().atan2(v.dot(c));
        let mean = ends.iter().map(|(v, w)| w * angle(v)).sum::<f64>() / total;
        (ends.iter().map(|(v, w)| w * (angle(v) - mean).powi(2)).sum::<f64>(), mean)
    };
    let (mut misfit, mut mean) = score(&centre);
    for _ in 0..100 {
        let helper = if centre.z.abs() < 0.9 { Vector3::z() } else { Vector3::x() };
        let u = centre.cross(&helper).normalize();
        let v = centre.cross(&u);
        // Angle to a centre moved by (a, b) along u, v: the slope is minus the unit vector towards the reading.
        let (mut normal, mut right) = (Matrix3::<f64>::zeros(), Vector3::zeros());
        for (x, w) in &ends {
            let sine = x.cross(&centre).norm().max(1e-12);
            let residual = x.cross(&centre).norm().atan2(x.dot(&centre)) - mean;
            let row = Vector3::new(-x.dot(&u) / sine, -x.dot(&v) / sine, -1.0);
            normal += row * row.transpose() * *w;
            right -= row * (residual * w);
        }
        let Some(mut step) = normal.try_inverse().map(|m| m * right) else { break };
        let mut moved = false;
        for _ in 0..30 {
            let turn = Rotation3::new(centre.cross(&(u * step.x + v * step.y)));
            let next = turn * centre;
            let (m, a) = score(&next);
            if m <= misfit {
                moved = (next - centre).norm() > 1e-14;
                (centre, misfit, mean) = (next, m, a);
                break;
            }
            step /= 2.0;
        }
        if !moved {
            break;
        }
    }
    let axis = Axis::new(centre.x, centre.y, centre.z).unwrap_or(start.axis);
    let degrees = mean.to_degrees();
    let half_angle = if degrees > 90.0 { 180.0 - degrees } else { degrees };
    SmallCircle { axis, half_angle, misfit, side: start.side }
}

/// Sum of squared direction cosines from the best great circle, scaled like [`SmallCircle::misfit`].
pub fn great_circle_misfit(tensor: &OrientationTensor) -> f64 {
    tensor.eigen().map_or(0.0, |e| e.values[2] * tensor.count() as f64)
}
