//! Maxima of the density of axes: how many are there that chance does not explain?

use super::sample::{Sample, heaviest};
use crate::orientation::Axis;
use nalgebra::Vector3;

/// Fewest independent readings for which maxima are looked for.
pub const LEAST: f64 = 20.0;

/// Readings used at most; beyond, every k-th of them in an order that rows do not decide.
const MOST_READINGS: usize = 4000;
/// Cap centres tried at most, and maxima examined at most.
const MOST_CENTRES: usize = 400;
const MOST_EXAMINED: usize = 60;
/// A maximum must hold this share of all readings within its cap, and stand this many standard deviations of
/// the difference above the lowest point of the best way to any greater one. Simulated: see tests/calibration.rs.
const LEAST_SHARE: f64 = 0.10;
const SADDLE: f64 = 3.0;

/// One maximum.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Mode {
    /// Where it is: the axis of the fullest cap.
    pub axis: Axis,
    /// Share of all weight within the cap.
    pub share: f64,
}

/// Caps of one size over a sample; counts are whole numbers, so their order does not matter.
struct Caps {
    vectors: Vec<Vector3<f64>>,
    weights: Vec<u64>,
    total: f64,
    cosine: f64,
    /// Independent readings that the sample is worth.
    n: f64,
}

impl Caps {
    fn new(sample: &Sample, independent: f64) -> Self {
        let scale = heaviest(sample);
        let mut all: Vec<(Vector3<f64>, u64)> =
            sample.readings().map(|(a, w)| (a.vector(), ((w / scale) * f64::from(1u32 << 30)).ceil() as u64)).collect();
        all.sort_unstable_by(|(a, v), (b, w)| {
            a.z.total_cmp(&b.z).then(a.y.total_cmp(&b.y)).then(a.x.total_cmp(&b.x)).then(v.cmp(w))
        });
        let step = all.len().div_ceil(MOST_READINGS).max(1);
        let (vectors, weights): (Vec<_>, Vec<_>) = all.iter().skip(step / 2).step_by(step).copied().unzip();
        let n = independent * vectors.len() as f64 / all.len().max(1) as f64;
        // Kamb's area for 3 standard deviations, held between caps of 10 and 25 degrees.
        let area = (9.0 / (n + 9.0)).clamp(1.0 - 10f64.to_radians().cos(), 1.0 - 25f64.to_radians().cos());
        let total = weights.iter().sum::<u64>() as f64;
        Self { vectors, weights, total, cosine: 1.0 - area, n }
    }

    fn share(&self, centre: &Vector3<f64>) -> f64 {
        let inside: u64 = self
            .vectors
            .iter()
            .zip(&self.weights)
            .filter_map(|(v, w)| (v.dot(centre).abs() >= self.cosine).then_some(*w))
            .sum();
        inside as f64 / self.total
    }

    /// Caps centred on readings with their shares, fullest first.
    fn centres(&self) -> Vec<(Vector3<f64>, f64)> {
        let step = self.vectors.len().div_ceil(MOST_CENTRES).max(1);
        let mut centres: Vec<_> =
            self.vectors.iter().skip(step / 2).step_by(step).map(|v| (*v, self.share(v))).collect();
        centres.sort_by(|a, b| b.1.total_cmp(&a.1));
        centres
    }

    /// The greatest over both ways round of the least share on the great circle from a to b.
    fn saddle(&self, a: &Vector3<f64>, b: &Vector3<f64>) -> f64 {
        const STEPS: usize = 16;
        let way = |b: Vector3<f64>| {
            let angle = a.dot(&b).clamp(-1.0, 1.0).acos();
            (1..STEPS)
                .map(|k| {
                    let t = k as f64 / STEPS as f64;
                    let p = (a * ((1.0 - t) * angle).sin() + b * (t * angle).sin()) / angle.sin().max(1e-9);
                    self.share(&p)
                })
                .fold(1.0, f64::min)
        };
        way(*b).max(way(-b))
    }
}

/// The maxima that stand clear of each other, greatest first. One at least where there are readings.
pub fn modes(sample: &Sample, independent: f64) -> Vec<Mode> {
    let caps = Caps::new(sample, independent);
    let radius = caps.cosine.acos();
    let mut found: Vec<(Vector3<f64>, f64)> = Vec::new();
    let mut examined = 0;
    for (centre, share) in caps.centres() {
        if found.is_empty() {
            found.push((centre, share));
            continue;
        }
        let apart = found.iter().all(|(v, _)| v.dot(&centre).abs() <= (2.0 * radius).cos());
        if share < LEAST_SHARE || examined >= MOST_EXAMINED {
            break;
        }
        if !apart {
            continue;
        }
        examined += 1;
        let clear = found.iter().all(|(v, _)| {
            let low = caps.saddle(v, &centre);
            (share - low) * caps.n.sqrt() > SADDLE * (share + low).sqrt()
        });
        if clear {
            found.push((centre, share));
        }
    }
    found.into_iter().filter_map(|(v, share)| Some(Mode { axis: Axis::new(v.x, v.y, v.z).ok()?, share })).collect()
}

/// An upper bound of the chance that uniform axes fill any cap as the fullest is filled: Chernoff's bound of
/// the binomial tail, times the number of caps tried. The reading at the cap's centre is not counted.
pub fn peak_p(sample: &Sample, independent: f64) -> f64 {
    let caps = Caps::new(sample, independent);
    let centres = caps.centres();
    let Some((_, share)) = centres.first() else { return 1.0 };
    let (n, area) = (caps.n - 1.0, 1.0 - caps.cosine);
    if n <= 0.0 {
        return 1.0;
    }
    let q = ((share * caps.n - 1.0) / n).clamp(0.0, 1.0);
    if q <= area {
        return 1.0;
    }
    let term = |a: f64, b: f64| if a > 0.0 { a * (a / b).ln() } else { 0.0 };
    let divergence = term(q, area) + term(1.0 - q, 1.0 - area);
    (centres.len() as f64 * (-n * divergence).exp()).min(1.0)
}
