//! Fold axes and cones of the reference samples against numbers computed outside the project
//! (see tests/reference/SOURCE.md).

mod fabric_support;

use approx::{assert_abs_diff_eq, assert_relative_eq};
use fabric_support::poles;
use homocline::fabric::fold::{Cylindricality, cone_test, fold_axis};
use homocline::fabric::{Kind, Sample, small_circle};
use homocline::orientation::Axis;

// numpy and scipy.
#[test]
fn a_cylindrical_fold() {
    let axes = poles("syn_fold24.csv");
    let f = fold_axis(&Sample::new(&axes, Kind::Planar), 0.95).unwrap();
    assert!(f.axis.angle_to(Axis::from_trend_plunge(40.552_442, 20.586_815)) < 1e-5);
    assert_abs_diff_eq!(f.rms_misfit, 3.049_290_854_6, epsilon = 1e-8);
    assert_eq!(f.class, Cylindricality::Cylindrical);
    assert!(f.cone_test.is_some_and(|t| t.p > 0.05));
    // The published fit takes the lower ends of the poles.
    let sample = Sample::new(&axes, Kind::Planar);
    let circle = small_circle::plane_fit_on_side(&sample, Axis::from_trend_plunge(0.0, 90.0)).unwrap();
    let t = cone_test(&sample, circle, 24.0).unwrap();
    assert_abs_diff_eq!(t.circle.half_angle, 87.723_846_693_9, epsilon = 1e-6);
    assert_relative_eq!(t.f, 1.124_332_266_5, max_relative = 1e-7);
    assert_abs_diff_eq!(t.p, 0.301_031_284_8, epsilon = 1e-7);
    assert_eq!(f.cone_half_angle(), None);
}

// numpy and scipy.
#[test]
fn a_conical_fold() {
    let axes = poles("syn_cone20.csv");
    let sample = Sample::new(&axes, Kind::Planar);
    let f = fold_axis(&sample, 0.95).unwrap();
    let t = f.cone_test.unwrap();
    assert!(t.circle.axis.angle_to(Axis::from_trend_plunge(100.727_631_8, 7.178_008_5)) < 1e-5);
    assert_abs_diff_eq!(t.circle.half_angle, 67.424_937_900_3, epsilon = 1e-6);
    assert_abs_diff_eq!(t.circle.misfit, 0.028_982_174_2, epsilon = 1e-9);
    assert_abs_diff_eq!(small_circle::great_circle_misfit(&sample.tensor()), 0.243_382_901_4, epsilon = 1e-9);
    assert_relative_eq!(t.f, 125.760_487_656_2, max_relative = 1e-7);
    assert_eq!(f.cone_half_angle(), Some(t.circle.half_angle));
    let angular = small_circle::angular_fit(&sample, &t.circle);
    assert!(angular.axis.angle_to(Axis::from_trend_plunge(100.669_952_7, 6.659_927_9)) < 1e-5);
    assert_abs_diff_eq!(angular.half_angle, 67.783_474_8, epsilon = 1e-5);
}

#[test]
fn the_ends_that_rows_give_do_not_matter_to_a_cone() {
    // A wide cone: the canonical ends of its poles are on both sides of it.
    for half in [50.0, 75.0, 85.0] {
        let centre = Axis::from_trend_plunge(35.0, 25.0).vector();
        let side = Axis::from_trend_plunge(125.0, 0.0).vector();
        let other = centre.cross(&side);
        let axes: Vec<Axis> = (0..30)
            .map(|k| {
                let (s, c) = f64::to_radians(f64::from(k) * 7.0).sin_cos();
                let (sh, ch) = f64::to_radians(half + f64::from(k % 3) - 1.0).sin_cos();
                let v = centre * ch + (side * c + other * s) * sh;
                Axis::new(v.x, v.y, v.z).unwrap()
            })
            .collect();
        let circle = small_circle::plane_fit(&Sample::new(&axes, Kind::Planar)).unwrap();
        assert_abs_diff_eq!(circle.half_angle, half, epsilon = 0.5);
        assert!(circle.axis.angle_to(Axis::from_trend_plunge(35.0, 25.0)) < 0.5);
    }
}
