//! What must hold for any sample: order, sense and splits change nothing, and turning the data turns the answer.

use homocline::fabric::fold::fold_axis;
use homocline::fabric::{Directed, Direction, Fabric, FabricOptions, Kind, Sample, summarise, summarise_directed};
use homocline::orientation::{Axis, OrientationTensor};
use nalgebra::{Rotation3, Vector3};
use proptest::prelude::*;

fn readings(most: usize) -> impl Strategy<Value = Vec<(f64, f64, f64, u32)>> {
    // Whole degrees, so that equal and coplanar axes turn up often.
    prop::collection::vec((0u32..360, 0u32..=90, 1u32..8, 0u32..40), 0..most)
        .prop_map(|v| v.into_iter().map(|(t, p, w, s)| (t.into(), p.into(), f64::from(w) / 3.0, s)).collect())
}

fn fabric(readings: &[(Axis, f64, u32)]) -> Fabric {
    let axes: Vec<Axis> = readings.iter().map(|r| r.0).collect();
    let weights: Vec<f64> = readings.iter().map(|r| r.1).collect();
    let stations: Vec<u32> = readings.iter().map(|r| r.2).collect();
    let sample = Sample::new(&axes, Kind::Planar).weighted(&weights).unwrap().at_stations(&stations).unwrap();
    summarise(&sample, &FabricOptions::default())
}

fn numbers(f: &Fabric) -> Vec<f64> {
    let mut all = vec![f.weight_sum, f.n_effective, f.units];
    all.extend(f.eigen.iter().flat_map(|e| e.values));
    all.extend(f.eigen.iter().flat_map(|e| e.axes).flat_map(|a| [a.trend(), a.plunge()]));
    all.extend(f.mean_cone.iter().chain(&f.third_cone).flat_map(|c| [c.major, c.minor]));
    all.extend(f.vollmer.iter().flatten());
    all.extend(
        [f.woodcock_k, f.woodcock_c, f.resultant, f.fisher_kappa, f.fisher_alpha95, f.uniformity_p].iter().flatten(),
    );
    all
}

fn axis(t: f64, p: f64) -> Axis {
    Axis::from_trend_plunge(t, p)
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::with_cases(200) })]

    #[test]
    fn shuffles_and_flips_change_no_bit(rows in readings(60), turn in 0usize..60, rename in 1u32..1000) {
        let end = |t: f64, p: f64, sign: f64| {
            let v = axis(t, p).vector() * sign;
            Axis::new(v.x, v.y, v.z).unwrap()
        };
        let given: Vec<_> = rows.iter().map(|&(t, p, w, s)| (end(t, p, 1.0), w, s)).collect();
        // The other end of each axis. Stations are names only: any one-to-one renaming will do.
        let mut other: Vec<_> =
            rows.iter().map(|&(t, p, w, s)| (end(t, p, -1.0), w, s.wrapping_mul(2 * rename + 1) ^ rename)).collect();
        other.reverse();
        let n = other.len().max(1);
        other.rotate_left((turn % n).min(rows.len()));
        prop_assert_eq!(fabric(&given), fabric(&other));
    }

    #[test]
    fn no_sample_gives_nan_or_infinity(rows in readings(30), t in 0f64..360.0, p in 0f64..90.0, copies in 0usize..9) {
        let mut given: Vec<_> = rows.iter().map(|&(t, p, w, s)| (axis(t, p), w, s)).collect();
        let f = fabric(&given);
        prop_assert!(numbers(&f).iter().all(|v| v.is_finite()), "{f:?}");
        // All equal, then equal and one more.
        given.truncate(1);
        given.extend((0..copies as u32).map(|k| (axis(t, p), 1.0, k + 100)));
        let f = fabric(&given);
        prop_assert!(numbers(&f).iter().all(|v| v.is_finite()), "{f:?}");
    }

    #[test]
    fn what_is_missing_is_explained(rows in readings(30)) {
        let given: Vec<_> = rows.iter().map(|&(t, p, w, s)| (axis(t, p), w, s)).collect();
        let f = fabric(&given);
        let missing = [f.woodcock_k, f.woodcock_c, f.uniformity_p, f.mean.map(|_| 0.0), f.resultant].contains(&None);
        prop_assert!(!missing || !f.note.is_empty(), "{f:?}");
        prop_assert_eq!(f.mean.is_some() && !f.shape.has_mean(), false);
    }

    #[test]
    fn turning_the_data_turns_the_answer(rows in readings(60), roll in -3.0f64..3.0, pitch in -3.0f64..3.0, yaw in -3.0f64..3.0) {
        let given: Vec<_> = rows.iter().map(|&(t, p, w, s)| (axis(t, p), w, s)).collect();
        let rotation = Rotation3::from_euler_angles(roll, pitch, yaw);
        let turn = |a: Axis| {
            let v: Vector3<f64> = rotation * a.vector();
            Axis::new(v.x, v.y, v.z).unwrap()
        };
        let (a, b) = (fabric(&given), fabric(&given.iter().map(|&(x, w, s)| (turn(x), w, s)).collect::<Vec<_>>()));
        let Some((ea, eb)) = a.eigen.zip(b.eigen) else { return Ok(()) };
        for k in 0..3 {
            prop_assert!((ea.values[k] - eb.values[k]).abs() < 1e-12);
        }
        let gap = (ea.values[0] - ea.values[1]).min(ea.values[1] - ea.values[2]);
        if gap > 1e-3 {
            for k in 0..3 {
                prop_assert!(turn(ea.axes[k]).angle_to(eb.axes[k]) < 1e-7, "{k}");
            }
            for (ca, cb) in [(a.mean_cone, b.mean_cone), (a.third_cone, b.third_cone)] {
                if let Some((ca, cb)) = ca.zip(cb) {
                    prop_assert!((ca.major - cb.major).abs() < 1e-6 && (ca.minor - cb.minor).abs() < 1e-6);
                }
            }
            prop_assert_eq!(a.shape, b.shape);
        }
    }

    #[test]
    fn folds_and_directions_do_not_hang_on_the_order(rows in readings(40), turn in 0usize..40) {
        let mut other = rows.clone();
        other.rotate_left(turn.min(rows.len()));
        let fold = |rows: &[(f64, f64, f64, u32)]| {
            let axes: Vec<Axis> = rows.iter().map(|r| axis(r.0, r.1)).collect();
            fold_axis(&Sample::new(&axes, Kind::Planar), 0.95)
        };
        prop_assert_eq!(fold(&rows), fold(&other));
        if let Some(f) = fold(&rows) {
            prop_assert!(f.rms_misfit.is_finite() && f.cylindricity.is_finite());
            prop_assert!(f.cone_test.is_none_or(|t| t.f.is_finite() && t.p.is_finite() && t.circle.half_angle.is_finite()));
        }
        let directed = |rows: &[(f64, f64, f64, u32)]| {
            let directions: Vec<Direction> = rows.iter().map(|r| Direction::from_trend_plunge(r.0, r.1 - 30.0)).collect();
            let weights: Vec<f64> = rows.iter().map(|r| r.2).collect();
            let stations: Vec<u32> = rows.iter().map(|r| r.3).collect();
            let sample = Directed {
                directions: &directions,
                weights: Some(&weights),
                stations: Some(&stations),
                kind: Kind::Linear,
            };
            summarise_directed(&sample, &FabricOptions::default()).unwrap()
        };
        let d = directed(&rows);
        prop_assert_eq!(&d, &directed(&other));
        prop_assert!(d.rayleigh_p.is_none_or(f64::is_finite));
        prop_assert!(d.kent.is_none_or(|k| k.kappa.is_finite() && k.beta.is_finite() && k.log_likelihood.is_finite()));
    }

    #[test]
    fn split_and_merge_give_the_whole(rows in readings(80), cut in 0usize..80) {
        let axes: Vec<(Axis, f64)> = rows.iter().map(|&(t, p, w, _)| (axis(t, p), w)).collect();
        let sum = |part: &[(Axis, f64)]| {
            let mut tensor = OrientationTensor::default();
            part.iter().for_each(|&(a, w)| tensor.add(a, w));
            tensor
        };
        let cut = cut.min(axes.len());
        let mut merged = sum(&axes[cut..]);
        merged.merge(&sum(&axes[..cut]));
        prop_assert_eq!(merged, sum(&axes));
        prop_assert_eq!(merged.eigen(), sum(&axes).eigen());
    }
}

#[test]
fn tiny_and_degenerate_samples_are_answered() {
    let flat: Vec<Axis> = (0..12).map(|k| axis(15.0 * f64::from(k), 0.0)).collect();
    let cube = [axis(0.0, 0.0), axis(90.0, 0.0), axis(0.0, 90.0)].repeat(4);
    let ring: Vec<Axis> = (0..12).map(|k| axis(30.0 * f64::from(k), 70.0)).collect();
    let same = vec![axis(123.0, 45.0); 12];
    for (name, axes) in [
        ("none", vec![]),
        ("one", vec![axis(10.0, 20.0)]),
        ("two", vec![axis(10.0, 20.0), axis(80.0, 30.0)]),
        ("flat", flat),
        ("cube", cube),
        ("ring", ring),
        ("same", same),
    ] {
        let given: Vec<_> = axes.iter().enumerate().map(|(i, &a)| (a, 1.0, i as u32)).collect();
        let f = fabric(&given);
        assert!(numbers(&f).iter().all(|v| v.is_finite()), "{name}: {f:?}");
        assert!(!f.note.is_empty(), "{name}");
        let want = match name {
            "none" | "one" | "two" => "too_few",
            "flat" => "girdle",
            "cube" => "random",
            _ => "cluster",
        };
        assert_eq!(f.shape.word(), want, "{name}: {}", f.note);
    }
}

#[test]
fn equal_and_opposed_directions_are_answered() {
    let d = Direction::from_trend_plunge;
    for directions in [vec![], vec![d(10.0, -20.0); 8], [d(10.0, -20.0), d(190.0, 20.0)].repeat(4)] {
        let sample = Directed { directions: &directions, weights: None, stations: None, kind: Kind::Linear };
        let f = summarise_directed(&sample, &FabricOptions::default()).unwrap();
        assert!(numbers(&f.fabric).iter().all(|v| v.is_finite()));
        assert_eq!(f.kent, None);
        match (directions.len(), f.mean) {
            (8, Some(mean)) => assert!(mean.angle_to(d(10.0, -20.0)) < 1e-9 && mean.plunge() < 0.0),
            (_, mean) => assert_eq!(mean, None),
        }
        assert!(!f.fabric.note.is_empty());
    }
}
