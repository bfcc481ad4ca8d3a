//! The reference samples against numbers computed outside the project (see tests/reference/SOURCE.md).

mod fabric_support;

use approx::assert_abs_diff_eq;
use fabric_support::{latitude_longitude, poles, upper_end};
use homocline::fabric::{Fabric, FabricOptions, Kind, Sample, Shape, harmonics, ratios, summarise, uniformity};
use homocline::orientation::Axis;

fn planar(axes: &[Axis]) -> Fabric {
    summarise(&Sample::new(axes, Kind::Planar), &FabricOptions::default())
}

fn assert_values(fabric: &Fabric, want: [f64; 3]) {
    for (got, want) in fabric.eigen.unwrap().values.iter().zip(want) {
        assert_abs_diff_eq!(*got, want, epsilon = 1e-9);
    }
}

fn assert_axis(axis: Axis, trend: f64, plunge: f64) {
    assert!(axis.angle_to(Axis::from_trend_plunge(trend, plunge)) < 1e-5, "{}/{}", axis.trend(), axis.plunge());
}

fn u(fabric: &Fabric) -> f64 {
    uniformity::bingham_statistic(fabric.n as f64, fabric.eigen.unwrap().values)
}

// R package boot, data set polar; numpy.
#[test]
fn fifty_pole_positions() {
    let axes = latitude_longitude("boot_polar.csv");
    let f = summarise(&Sample::new(&axes, Kind::Linear), &FabricOptions::default());
    assert_values(&f, [0.675_202_318_2, 0.208_787_915_8, 0.116_009_766_0]);
    assert_abs_diff_eq!(f.woodcock_k.unwrap(), 1.997_284_398, epsilon = 1e-8);
    assert_abs_diff_eq!(f.woodcock_c.unwrap(), 1.761_338_000, epsilon = 1e-8);
    assert_abs_diff_eq!(ratios::intensity(f.eigen.unwrap().values), 1.347_116_226, epsilon = 1e-8);
    for (which, long, lat) in [(0, 263.815_081, 76.271_105), (2, 165.846_558, 1.939_763)] {
        let (got_long, got_lat) = upper_end(f.eigen.unwrap().axes[which]);
        assert_abs_diff_eq!(got_long, long, epsilon = 1e-5);
        assert_abs_diff_eq!(got_lat, lat, epsilon = 1e-5);
    }
    assert_abs_diff_eq!(u(&f), 67.355_811_301_9, epsilon = 1e-7);
    assert_eq!(f.shape, Shape::Cluster);
}

// Synthetic; numpy. Poles straddle the rim of the net: the vector mean of lower-hemisphere poles is 90 degrees off.
#[test]
fn eight_steep_beds() {
    let f = planar(&poles("syn_steep8.csv"));
    assert_values(&f, [0.965_220_084_8, 0.026_754_986_8, 0.008_024_928_4]);
    assert_axis(f.eigen.unwrap().axes[0], 273.892_429, 2.181_140);
    let cone = f.mean_cone.unwrap();
    assert_abs_diff_eq!(cone.major, 11.866_358_56, epsilon = 1e-5);
    assert_abs_diff_eq!(cone.minor, 6.407_778_60, epsilon = 1e-5);
    assert_eq!(f.shape, Shape::Cluster, "{}", f.note);
    assert!(f.note.contains("weak"));
    assert!(f.mean.is_some() && f.fisher_alpha95.is_some());
}

// Synthetic; numpy.
#[test]
fn twenty_four_folded_beds() {
    let f = planar(&poles("syn_fold24.csv"));
    assert_values(&f, [0.563_663_942_3, 0.433_510_120_2, 0.002_825_937_5]);
    assert_abs_diff_eq!(ratios::cylindricity(f.eigen.unwrap().values), 0.991_522_188, epsilon = 1e-8);
    assert_axis(f.eigen.unwrap().axes[2], 40.552_442, 20.586_815);
    let cone = f.third_cone.unwrap();
    assert_abs_diff_eq!(cone.major, 2.690_036_02, epsilon = 1e-5);
    assert_abs_diff_eq!(cone.minor, 2.112_494_77, epsilon = 1e-5);
    assert_eq!(f.shape, Shape::Girdle, "{}", f.note);
    assert_eq!((f.mean, f.fisher_kappa, f.fisher_alpha95), (None, None, None));
}

// Synthetic; numpy.
#[test]
fn twenty_poles_on_a_cone() {
    let f = planar(&poles("syn_cone20.csv"));
    assert_values(&f, [0.635_125_914_4, 0.352_704_940_6, 0.012_169_145_1]);
    assert_eq!(f.shape, Shape::Girdle, "{}", f.note);
}

// Synthetic; numpy.
#[test]
fn sixty_poles_of_a_bingham_cluster() {
    let f = planar(&poles("syn_bingham60.csv"));
    assert_values(&f, [0.885_876_504_1, 0.084_917_511_8, 0.029_205_984_2]);
    assert_axis(f.eigen.unwrap().axes[0], 81.988_538, 7.587_274);
    assert_abs_diff_eq!(u(&f), 206.778_519_2, epsilon = 1e-6);
    let cone = f.mean_cone.unwrap();
    assert_abs_diff_eq!(cone.major, 5.513_963_39, epsilon = 1e-5);
    assert_abs_diff_eq!(cone.minor, 3.414_236_82, epsilon = 1e-5);
    assert_eq!(f.shape, Shape::Cluster, "{}", f.note);
}

// Synthetic; numpy. Three tight sets that the tensor calls uniform.
#[test]
fn three_joint_sets_are_not_random() {
    let axes = poles("syn_joints90.csv");
    let f = planar(&axes);
    assert_values(&f, [0.407_063_478_4, 0.321_787_363_3, 0.271_149_158_3]);
    assert_abs_diff_eq!(u(&f), 6.369_512_858_4, epsilon = 1e-7);
    assert!(f.uniformity_p.unwrap() > 0.2);
    assert_eq!(f.shape, Shape::Multimodal, "{}", f.note);
    assert_eq!(f.mean, None);
    let sample = Sample::new(&axes, Kind::Planar);
    assert!(harmonics::degree_four_p(&sample, &sample.stations()) < 1e-9);
}

// Synthetic; numpy. One traverse over three homoclines, together and apart.
#[test]
fn a_traverse_over_three_domains() {
    let rows = fabric_support::rows("syn_traverse42.csv");
    let axes = poles("syn_traverse42.csv");
    for (from, to, trend, plunge) in
        [(0.0, 1049.0, 20.3948, 5.1847), (1049.0, 2200.0, 76.6773, 29.3940), (2200.0, 9e9, 330.4994, 13.2718)]
    {
        let part: Vec<Axis> =
            rows.iter().zip(&axes).filter(|(r, _)| (from..to).contains(&r[0])).map(|(_, &a)| a).collect();
        let f = planar(&part);
        // Each part is a cylindrical fold; the published axes are e3.
        assert!(f.eigen.unwrap().axes[2].angle_to(Axis::from_trend_plunge(trend, plunge)) < 1e-3);
        assert_eq!(f.shape, Shape::Girdle, "{from}: {}", f.note);
    }
}

// Synthetic; numpy.
#[test]
fn weights_of_a_scanline_survey_enter_the_tensor() {
    let axes = poles("syn_scanline30.csv");
    let line = Axis::from_trend_plunge(75.0, 10.0).vector();
    let weights: Vec<f64> = axes.iter().map(|a| 1.0 / a.vector().dot(&line).abs()).collect();
    let sample = Sample::new(&axes, Kind::Planar).weighted(&weights).unwrap();
    let f = summarise(&sample, &FabricOptions::default());
    for (got, want) in f.eigen.unwrap().values.iter().zip([0.530_017_68, 0.280_986_5, 0.188_995_82]) {
        assert_abs_diff_eq!(*got, want, epsilon = 1e-7);
    }
    assert_abs_diff_eq!(f.weight_sum, 90.412_336_436_4, epsilon = 1e-7);
    assert_abs_diff_eq!(f.n_effective, 14.379_585, epsilon = 1e-6);
}

// Own simulation: readings at one station agree more than stations do.
#[test]
fn readings_at_one_station_are_one_witness() {
    let axes = poles("syn_bingham60.csv");
    let alone = planar(&axes[..12]);
    let repeated = axes[..12].repeat(5);
    let stations: Vec<u32> = (0..60).map(|i| i % 12).collect();
    let sample = Sample::new(&repeated, Kind::Planar).at_stations(&stations).unwrap();
    let f = summarise(&sample, &FabricOptions::default());
    assert_eq!((f.n, f.n_stations), (60, 12));
    assert_abs_diff_eq!(f.units, 12.0, epsilon = 1e-9);
    let (a, b) = (alone.mean_cone.unwrap(), f.mean_cone.unwrap());
    assert_abs_diff_eq!(a.major, b.major, epsilon = 1e-6);
    assert_abs_diff_eq!(a.minor, b.minor, epsilon = 1e-6);
    assert_abs_diff_eq!(alone.uniformity_p.unwrap(), f.uniformity_p.unwrap(), epsilon = 1e-9);
    assert_eq!(alone.shape, f.shape);
    let pooled = planar(&repeated).mean_cone.unwrap();
    assert!(pooled.major < 0.6 * b.major, "the readings alone would claim too much");

    // Three stations cannot speak for a domain, however many readings they have.
    let three: Vec<u32> = (0..60).map(|i| i % 3).collect();
    let f = summarise(&Sample::new(&repeated, Kind::Planar).at_stations(&three).unwrap(), &FabricOptions::default());
    assert_eq!((f.mean_cone, f.uniformity_p, f.fisher_alpha95), (None, None, None));
    assert!(f.mean.is_some() && f.note.contains("need 5 stations"), "{}", f.note);
}
