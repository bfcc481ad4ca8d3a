//! Fitted distributions of the reference samples against numbers computed outside the project
//! (see tests/reference/SOURCE.md).

mod fabric_support;

use approx::{assert_abs_diff_eq, assert_relative_eq};
use fabric_support::{latitude_longitude, poles, rows};
use homocline::fabric::fisher::Resultant;
use homocline::fabric::{
    Directed, Direction, FabricOptions, Kind, Shape, bingham, concentration, kent, summarise_directed, watson,
};
use homocline::orientation::{Axis, Eigen, OrientationTensor};
use nalgebra::Vector3;

fn eigen(axes: &[Axis]) -> Eigen {
    axes.iter().copied().collect::<OrientationTensor>().eigen().unwrap()
}

fn polar_vectors() -> Vec<Vector3<f64>> {
    rows("boot_polar.csv")
        .iter()
        .map(|r| {
            let (lat, long) = (r[0].to_radians(), r[1].to_radians());
            Vector3::new(lat.cos() * long.cos(), lat.cos() * long.sin(), lat.sin())
        })
        .collect()
}

// R package boot, data set polar; numpy, scipy.stats.vonmises_fisher.fit, R.
#[test]
fn fisher_statistics_of_fifty_poles() {
    let r = Resultant::of(polar_vectors().iter().map(|v| (*v, 1.0)));
    assert_abs_diff_eq!(r.length, 38.439_170_287_4, epsilon = 1e-8);
    let m = r.mean.unwrap();
    assert_abs_diff_eq!(m.z.asin().to_degrees(), -78.469_246_260_6, epsilon = 1e-7);
    assert_abs_diff_eq!(m.y.atan2(m.x).to_degrees(), 87.215_389_969_7, epsilon = 1e-7);
    let k = concentration::estimates(&r).unwrap();
    assert_relative_eq!(k.inverse_unbiased, 4.238_450_112_9, max_relative = 1e-9);
    assert_relative_eq!(k.unbiased, 4.151_951_131_0, max_relative = 1e-9);
    assert_relative_eq!(k.small_sample, 4.153_681_110_6, max_relative = 1e-9);
    assert_relative_eq!(k.likelihood, 4.318_318_399_9, max_relative = 1e-9);
    assert_abs_diff_eq!(r.alpha(0.95).unwrap(), 11.175_293_573_7, epsilon = 1e-8);
    assert_abs_diff_eq!(r.alpha(0.99).unwrap(), 13.984_031_581_1, epsilon = 1e-8);
    assert_abs_diff_eq!(concentration::circular_deviation(k.inverse_unbiased), 39.344_264, epsilon = 1e-5);
    assert_abs_diff_eq!(concentration::angular_deviation(&r), 39.755_235, epsilon = 1e-6);
    let (low, high) = concentration::interval(&r, 0.95).unwrap();
    assert_relative_eq!(low, 3.135_628_726_5, max_relative = 1e-8);
    assert_relative_eq!(high, 5.504_884_836_5, max_relative = 1e-8);
    // 3 R^2 / n = 88.654 and 103.487 corrected: far beyond chance either way.
    assert_abs_diff_eq!(3.0 * r.length.powi(2) / r.n, 88.654_188_743_1, epsilon = 1e-7);
    assert!(homocline::fabric::rayleigh_p(&r) < 1e-18);
}

// numpy and scipy; R optim for the Bingham fits. k1 = 0 belongs to S1.
#[test]
fn bingham_fits() {
    for (axes, k2, k3) in [
        (latitude_longitude("boot_polar.csv"), -2.760_227_607, -4.939_481_210),
        (poles("syn_steep8.csv"), -19.240_092_12, -62.833_841_08),
        (poles("syn_fold24.csv"), -0.528_086_166_1, -177.162_206_85),
        (poles("syn_bingham60.csv"), -6.636_332_563, -17.749_708_484),
    ] {
        let fit = bingham::fit(eigen(&axes).values).unwrap();
        assert_relative_eq!(fit.k2, k2, max_relative = 1e-7);
        assert_relative_eq!(fit.k3, k3, max_relative = 1e-7);
    }
    let e = eigen(&poles("syn_bingham60.csv"));
    let fit = bingham::fit(e.values).unwrap();
    assert_abs_diff_eq!(fit.log_constant, -3.013_656_146, epsilon = 1e-8);
    assert_abs_diff_eq!(fit.log_likelihood, -0.599_306_654_5, epsilon = 1e-8);
    let cone = bingham::cone(60.0, &e, &fit, 0, 0.95).unwrap();
    assert_abs_diff_eq!(cone.major, 5.553_020_731, epsilon = 1e-6);
    assert_abs_diff_eq!(cone.minor, 3.283_189_747, epsilon = 1e-6);
    let e = eigen(&latitude_longitude("boot_polar.csv"));
    let fit = bingham::fit(e.values).unwrap();
    assert_abs_diff_eq!(fit.log_constant, -1.797_702_193, epsilon = 1e-8);
    let cone = bingham::cone(50.0, &e, &fit, 0, 0.95).unwrap();
    assert_abs_diff_eq!(cone.major, 12.360_348_202, epsilon = 1e-6);
    assert_abs_diff_eq!(cone.minor, 8.438_548_896, epsilon = 1e-6);
}

// mpmath and scipy.
#[test]
fn watson_fits() {
    let s = |name: &str| eigen(&poles(name)).values;
    assert_relative_eq!(watson::bipolar(s("syn_steep8.csv")).unwrap().kappa, 29.291_291_689_154, max_relative = 1e-9);
    assert_relative_eq!(watson::girdle(s("syn_fold24.csv")).unwrap().kappa, -176.932_434_78, max_relative = 1e-8);
    assert_relative_eq!(watson::bipolar(s("syn_bingham60.csv")).unwrap().kappa, 9.457_779_541_8, max_relative = 1e-9);
    assert!(watson::best(s("syn_fold24.csv")).unwrap().kappa < 0.0);
    assert!(watson::best(s("syn_steep8.csv")).unwrap().kappa > 0.0);
}

fn slip() -> Vec<Direction> {
    rows("syn_kent30.csv").iter().map(|r| Direction::from_trend_plunge(r[0], r[1])).collect()
}

// numpy, and fb8 1.2.9 for the Kent fits.
#[test]
fn thirty_directed_lines() {
    let weighted: Vec<(Vector3<f64>, f64)> = slip().iter().map(|d| (d.vector(), 1.0)).collect();
    let r = Resultant::of(weighted.iter().copied());
    assert_abs_diff_eq!(r.length, 28.192_847_965, epsilon = 1e-8);
    assert_relative_eq!(r.kappa().unwrap(), 16.047_349_333, max_relative = 1e-8);
    assert_abs_diff_eq!(r.alpha(0.95).unwrap(), 6.771_472_199, epsilon = 1e-7);
    let m = kent::fit_moments(&weighted).unwrap();
    assert_relative_eq!(m.kappa, 31.321_160_601_6, max_relative = 1e-9);
    assert_relative_eq!(m.beta, 10.736_173_855_5, max_relative = 1e-9);
    let major = Axis::new(m.frame[1].x, m.frame[1].y, m.frame[1].z).unwrap();
    assert!(major.angle_to(Axis::from_trend_plunge(56.516_791, 79.085_456)) < 1e-5);
    let e = kent::ellipse(&weighted, 0.95).unwrap();
    assert_abs_diff_eq!(e.major, 8.552_736_101_5, epsilon = 1e-7);
    assert_abs_diff_eq!(e.minor, 3.362_374_361_9, epsilon = 1e-7);
    let best = kent::fit(&weighted).unwrap();
    assert_abs_diff_eq!(best.kappa, 35.2908, epsilon = 1e-3);
    assert_abs_diff_eq!(best.beta, 14.8409, epsilon = 1e-3);
    assert_abs_diff_eq!(best.log_likelihood, 11.362_240_566_0, epsilon = 1e-6);
}

#[test]
fn directions_are_summarised_with_their_sense() {
    let directions = slip();
    let sample = Directed { directions: &directions, weights: None, stations: None, kind: Kind::Linear };
    let d = summarise_directed(&sample, &FabricOptions::default()).unwrap();
    let mean = d.mean.unwrap();
    // numpy
    assert!(mean.angle_to(Direction::from_trend_plunge(200.673_328_6, 8.884_248_8)) < 1e-5);
    assert_eq!(d.opposed, 0);
    assert!(d.rayleigh_p.unwrap() < 1e-12);
    assert!(d.fabric.shape == Shape::Cluster || d.fabric.shape == Shape::Transitional);
    assert_abs_diff_eq!(d.fabric.fisher_alpha95.unwrap(), 6.771_472_199, epsilon = 1e-7);
    assert!(d.kent.is_some());
    // Every second arrow reversed: the axes are as before, but no direction is preferred.
    let mixed: Vec<Direction> = directions
        .iter()
        .enumerate()
        .map(|(i, d)| if i % 2 == 0 { *d } else { Direction::from_trend_plunge(d.trend() + 180.0, -d.plunge()) })
        .collect();
    let sample = Directed { directions: &mixed, ..sample };
    let m = summarise_directed(&sample, &FabricOptions::default()).unwrap();
    assert_eq!((m.mean, m.fabric.fisher_kappa, m.kent), (None, None, None));
    assert_abs_diff_eq!(m.fabric.eigen.unwrap().values[0], d.fabric.eigen.unwrap().values[0], epsilon = 1e-12);
    assert!(m.fabric.note.contains("no mean direction"), "{}", m.fabric.note);
}
