//! Survey weights and densities of the reference samples against numbers computed outside the project
//! (see tests/reference/SOURCE.md).

mod fabric_support;

use approx::assert_abs_diff_eq;
use fabric_support::poles;
use homocline::fabric::density::{Method, density};
use homocline::fabric::terzaghi::{Exposure, Survey, weights};
use homocline::fabric::{FabricOptions, Kind, Sample, summarise};
use homocline::orientation::Axis;

// numpy. The line is 075/10, the face has its pole at 200/60.
#[test]
fn weights_of_a_scanline_survey() {
    let axes = poles("syn_scanline30.csv");
    let line = Exposure::Line(Axis::from_trend_plunge(75.0, 10.0));
    let face = Exposure::Face(Axis::from_trend_plunge(200.0, 60.0));
    for (exposure, cap, clipped, sum, n, s) in [
        (line, 1e5, 0, 90.412_336_436_4, 14.379_585, [0.530_017_68, 0.280_986_5, 0.188_995_82]),
        (line, 10.0, 1, 84.929_454_6, 16.823_262, [0.500_888_98, 0.298_522_34, 0.200_588_69]),
        (line, 2.923_804_400, 10, 54.399_541_8, 24.591_189, [0.424_720_39, 0.368_533_70, 0.206_745_91]),
        (Exposure::Map, 10.0, 0, 39.175_868_337_6, 22.508_818, [0.476_691_36, 0.326_437_87, 0.196_870_76]),
        (face, 10.0, 0, 35.525_629_690_3, 29.541_225, [0.540_224_88, 0.291_468_14, 0.168_306_98]),
    ] {
        let w = weights(&axes, Survey::One(exposure), cap).unwrap();
        assert_eq!(w.clipped, clipped);
        let sample = Sample::new(&axes, Kind::Planar).weighted(&w.weights).unwrap();
        let f = summarise(&sample, &FabricOptions::default());
        assert_abs_diff_eq!(f.weight_sum, sum, epsilon = 1e-7);
        assert_abs_diff_eq!(f.n_effective, n, epsilon = 1e-6);
        for (got, want) in f.eigen.unwrap().values.iter().zip(s) {
            assert_abs_diff_eq!(*got, want, epsilon = 1e-7);
        }
    }
    let w = weights(&axes, Survey::One(line), 1e5).unwrap().weights;
    assert_abs_diff_eq!(w.iter().copied().fold(0.0, f64::max), 15.482_881_855_2, epsilon = 1e-8);
    let mixed: Vec<Option<Exposure>> = (0..30).map(|i| Some(if i % 2 == 0 { line } else { face })).collect();
    let each = weights(&axes, Survey::Each(&mixed), 10.0).unwrap();
    let all_line = weights(&axes, Survey::One(line), 10.0).unwrap();
    assert_eq!(each.weights[2], all_line.weights[2]);
    assert_ne!(each.weights[3], all_line.weights[3]);
}

fn at(trend: f64, plunge: f64) -> nalgebra::Vector3<f64> {
    Axis::from_trend_plunge(trend, plunge).vector()
}

// numpy.
#[test]
fn densities_at_four_nodes() {
    let fold = poles("syn_fold24.csv");
    let sample = Sample::new(&fold, Kind::Planar);
    let nodes = [at(0.0, 90.0), at(270.0, 0.0), at(143.0, 31.0), at(40.0, 20.0)];
    let d = density(&sample, &nodes, Method::ExponentialKamb(3.0)).unwrap();
    assert_abs_diff_eq!(d.expected, 3.272_727_272_7, epsilon = 1e-9);
    assert_abs_diff_eq!(d.deviation, 1.090_909_090_9, epsilon = 1e-9);
    for (got, want) in d.standardised().iter().zip([0.770_543_44, -0.941_883_01, 2.822_565_81, -2.979_329_74]) {
        assert_abs_diff_eq!(*got, want, epsilon = 1e-7);
    }
    let kamb = density(&sample, &nodes, Method::KambCount(3.0)).unwrap();
    assert_abs_diff_eq!(kamb.expected, 6.545_454_545_5, epsilon = 1e-9);
    assert_abs_diff_eq!(kamb.deviation, 2.181_818_181_8, epsilon = 1e-9);

    let joints = poles("syn_joints90.csv");
    let sample = Sample::new(&joints, Kind::Planar);
    let nodes = [at(0.0, 90.0), at(270.0, 0.0), at(0.0, 0.0), at(90.0, 45.0)];
    let d = density(&sample, &nodes, Method::ExponentialKamb(3.0)).unwrap();
    for (got, want) in d.standardised().iter().zip([5.563_076_09, 13.352_359_09, 7.401_804_86, -2.395_988_22]) {
        assert_abs_diff_eq!(*got, want, epsilon = 1e-7);
    }
    assert_eq!(density(&sample, &nodes, Method::KambCount(3.0)).unwrap().sums, [20.0, 34.0, 25.0, 1.0]);
    assert_eq!(density(&sample, &nodes, Method::OnePercent).unwrap().sums, [6.0, 13.0, 4.0, 0.0]);
}

#[test]
fn the_two_sides_of_the_rim_hold_the_same_number() {
    let joints = poles("syn_joints90.csv");
    let sample = Sample::new(&joints, Kind::Planar);
    for method in [Method::ExponentialKamb(2.0), Method::KambCount(3.0), Method::OnePercent] {
        for t in 0..180 {
            let v = at(f64::from(t), 0.0);
            let d = density(&sample, &[v, -v], method).unwrap();
            assert_eq!(d.sums[0], d.sums[1], "{t}");
        }
    }
    // Shuffled readings give the same bits.
    let mut other = joints.clone();
    other.reverse();
    let nodes = homocline::fabric::net_grid::nodes(21, homocline::fabric::net_grid::Projection::EqualArea);
    let method = Method::ExponentialKamb(3.0);
    assert_eq!(density(&sample, &nodes, method), density(&Sample::new(&other, Kind::Planar), &nodes, method));
}
