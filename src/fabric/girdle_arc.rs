//! How far axes spread along their best-fit great circle.

use super::sample::{Sample, heaviest};
use crate::orientation::Eigen;

/// The shortest arc, degrees in [0, 180], of the great circle normal to e3 that holds `share` of the weight,
/// each axis projected onto it. The whole circle of axes is 180 degrees.
pub fn arc(sample: &Sample, eigen: &Eigen, share: f64) -> f64 {
    let [e1, e2, _] = eigen.axes.map(|a| a.vector());
    let scale = heaviest(sample);
    let mut places: Vec<(f64, u64)> = sample
        .readings()
        .map(|(a, w)| {
            let v = a.vector();
            let angle = v.dot(&e2).atan2(v.dot(&e1)).to_degrees().rem_euclid(180.0);
            (angle, ((w / scale) * f64::from(1u32 << 30)).ceil() as u64)
        })
        .collect();
    places.sort_unstable_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
    let total: u64 = places.iter().map(|p| p.1).sum();
    let wanted = (share * total as f64).ceil() as u64;
    let n = places.len();
    let (mut shortest, mut end, mut held) = (180.0f64, 0, 0u64);
    for start in 0..n {
        while held < wanted && end < start + n {
            held += places[end % n].1;
            end += 1;
        }
        if held < wanted {
            break;
        }
        let turn = if end > n && (end - 1) / n > 0 { 180.0 } else { 0.0 };
        shortest = shortest.min(places[(end - 1) % n].0 + turn - places[start].0);
        held -= places[start].1;
    }
    shortest.clamp(0.0, 180.0)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fabric::Kind;
    use crate::orientation::Axis;
    use approx::assert_abs_diff_eq;

    #[test]
    fn arcs_of_even_fans() {
        for (from, to, want) in [(0, 60, 60.0), (100, 220, 120.0), (0, 170, 170.0)] {
            let axes: Vec<Axis> =
                (from / 10..=to / 10).map(|k| Axis::from_trend_plunge(f64::from(k) * 10.0, 0.0)).collect();
            let sample = Sample::new(&axes, Kind::Linear);
            let eigen = sample.tensor().eigen().unwrap();
            assert_abs_diff_eq!(arc(&sample, &eigen, 1.0), want, epsilon = 1e-9);
            assert!(arc(&sample, &eigen, 0.8) < want);
        }
        let one = [Axis::from_trend_plunge(3.0, 4.0)];
        let sample = Sample::new(&one, Kind::Linear);
        assert_eq!(arc(&sample, &sample.tensor().eigen().unwrap(), 0.9), 0.0);
    }
}
