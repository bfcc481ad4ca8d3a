//! Samples whose statistics follow from geometry alone.

use approx::assert_abs_diff_eq;
use homocline::fabric::{Fabric, FabricOptions, Kind, Sample, Shape, summarise};
use homocline::orientation::{Axis, Dip, Plane, TrueAzimuth};

fn fabric(axes: &[Axis]) -> Fabric {
    summarise(&Sample::new(axes, Kind::Planar), &FabricOptions::default())
}

fn assert_values(f: &Fabric, want: [f64; 3]) {
    for (got, want) in f.eigen.unwrap().values.iter().zip(want) {
        assert_abs_diff_eq!(*got, want, epsilon = 1e-9);
    }
}

// An even small circle of half-angle a has the eigenvalues cos^2 a and, twice, sin^2 a / 2.
#[test]
fn small_circles() {
    for (half, along, across) in
        [(15.0, 0.933_012_701_9, 0.033_493_649_05), (30.0, 0.75, 0.125), (70.0, 0.116_977_778_4, 0.441_511_110_8)]
    {
        let axes: Vec<Axis> = (0..36).map(|k| Axis::from_trend_plunge(10.0 * f64::from(k), 90.0 - half)).collect();
        let f = fabric(&axes);
        let vertical = Axis::from_trend_plunge(0.0, 90.0);
        if half < 54.0 {
            assert_values(&f, [along, across, across]);
            assert!(f.eigen.unwrap().axes[0].angle_to(vertical) < 1e-6);
            assert_eq!(f.woodcock_k, None);
            // A ring of 30 degrees is hollow: no reading is near its middle, so that is no mean attitude.
            assert_eq!(f.shape, if half < 20.0 { Shape::Cluster } else { Shape::Multimodal });
        } else {
            assert_values(&f, [across, across, along]);
            assert!(f.eigen.unwrap().axes[2].angle_to(vertical) < 1e-6);
            assert_eq!((f.woodcock_k, f.shape, f.mean), (Some(0.0), Shape::Girdle, None));
        }
    }
}

// At 54.7356 degrees the tensor is isotropic: 36 axes on a perfect cone must not be called random.
#[test]
fn the_cone_that_a_tensor_cannot_see() {
    let plunge = 1f64.atan2(2f64.sqrt()).to_degrees();
    let axes: Vec<Axis> = (0..36).map(|k| Axis::from_trend_plunge(10.0 * f64::from(k), plunge)).collect();
    let f = fabric(&axes);
    assert_values(&f, [1.0 / 3.0; 3]);
    assert!(f.uniformity_p.unwrap() > 0.99);
    assert_eq!((f.shape, f.mean, f.mean_cone), (Shape::Multimodal, None, None));
}

#[test]
fn axes_spread_evenly_in_a_plane() {
    for n in [5, 8, 30] {
        let axes: Vec<Axis> =
            (0..n).map(|k| Axis::from_trend_plunge(180.0 * f64::from(k) / f64::from(n), 0.0)).collect();
        let f = fabric(&axes);
        assert_values(&f, [0.5, 0.5, 0.0]);
        let [p, g, r] = f.vollmer.unwrap();
        for (got, want) in [(p, 0.0), (g, 1.0), (r, 0.0)] {
            assert_abs_diff_eq!(got, want, epsilon = 1e-9);
        }
        assert_eq!((f.woodcock_k, f.woodcock_c), (Some(0.0), None));
        assert!(f.note.contains("infinite"), "{}", f.note);
    }
}

// numpy. Four beds that strike about north: the mean of the numbers 350, 10, 5 and 355 is 180.
#[test]
fn strikes_about_north() {
    let poles: Vec<Axis> = [(350.0, 80.0), (10.0, 85.0), (5.0, 90.0), (355.0, 88.0)]
        .map(|(s, d)| Plane { strike: Some(TrueAzimuth::new(s).unwrap()), dip: Dip::new(d).unwrap() }.pole())
        .to_vec();
    let f = fabric(&poles);
    assert_values_loosely(&f, [0.977_054_36, 0.019_878_49, 0.003_067_15]);
    let plane = Plane::from_pole(f.eigen.unwrap().axes[0]);
    assert_abs_diff_eq!(plane.strike.unwrap().degrees(), 0.039_543_097_7, epsilon = 1e-8);
    assert_abs_diff_eq!(plane.dip.degrees(), 85.733_573_9, epsilon = 1e-7);
    // Four readings are too few for a mean to be stated.
    assert_eq!((f.shape, f.mean), (Shape::TooFew, None));
    assert!(f.note.contains("need 5 readings, there are 4"), "{}", f.note);
}

fn assert_values_loosely(f: &Fabric, want: [f64; 3]) {
    for (got, want) in f.eigen.unwrap().values.iter().zip(want) {
        assert_abs_diff_eq!(*got, want, epsilon = 1e-8);
    }
}

// The tensor of a Fisher distribution of concentration k: S1 = 1 - 2 A/k, S2 = S3 = A/k, A = coth k - 1/k.
#[test]
fn even_quantiles_of_a_fisher_distribution() {
    for (k, s1) in [(5.0, 0.679_963_678_4), (10.0, 0.819_999_999_2), (50.0, 0.9608)] {
        let mut axes = Vec::new();
        for ring in 0..2000 {
            // Inverse of the distribution of the cosine, at even steps.
            let u = (f64::from(ring) + 0.5) / 2000.0;
            let cosine = 1.0 + (u + (1.0 - u) * f64::exp(-2.0 * k)).ln() / k;
            let plunge = f64::asin(cosine).to_degrees();
            axes.extend((0..5).map(|j| Axis::from_trend_plunge(72.0 * f64::from(j), plunge)));
        }
        let f = fabric(&axes);
        assert_abs_diff_eq!(f.eigen.unwrap().values[0], s1, epsilon = 2e-4);
    }
}
