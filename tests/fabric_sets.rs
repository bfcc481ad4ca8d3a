//! Orientation sets: the reference sample of three, and made ones.

mod fabric_support;

use approx::assert_abs_diff_eq;
use fabric_support::{poles, rows};
use homocline::fabric::fold::{fold_axis, limbs_of_sets};
use homocline::fabric::sets::{SetCount, sets};
use homocline::fabric::{FabricOptions, Kind, Sample, Shape, summarise, with_sets};
use homocline::orientation::Axis;
use rand::{RngExt, SeedableRng};
use rand_chacha::ChaCha8Rng;

/// Made samples of each kind: fewer where nothing is optimised.
const REPEATS: usize = if cfg!(debug_assertions) { 1 } else { 4 };

fn normal(rng: &mut ChaCha8Rng) -> f64 {
    let (u, v): (f64, f64) = (rng.random(), rng.random());
    (-2.0 * (1.0 - u).ln()).sqrt() * (2.0 * std::f64::consts::PI * v).cos()
}

/// Axes scattered about one, `sd` degrees in each of two directions.
fn scattered(rng: &mut ChaCha8Rng, about: Axis, sd: [f64; 2]) -> Axis {
    let c = about.vector();
    let u = c.cross(&nalgebra::Vector3::new(0.3, 0.5, 0.8)).normalize();
    let v = c + u * (sd[0].to_radians() * normal(rng)) + c.cross(&u) * (sd[1].to_radians() * normal(rng));
    Axis::new(v.x, v.y, v.z).unwrap()
}

fn uniform(rng: &mut ChaCha8Rng) -> Axis {
    Axis::new(normal(rng), normal(rng), normal(rng)).unwrap()
}

// Synthetic; the true sets stand in the file. Centres by axial k-means in numpy, so to within a degree here.
#[test]
fn three_joint_sets() {
    let axes = poles("syn_joints90.csv");
    let truth: Vec<f64> = rows("syn_joints90.csv").iter().map(|r| r[0]).collect();
    let sample = Sample::new(&axes, Kind::Planar);
    for count in [SetCount::Auto, SetCount::Given(3)] {
        let found = sets(&sample, count, 1);
        assert_eq!(found.sets.len(), 3, "{}", found.note);
        assert_eq!(found.sets.iter().map(|s| s.n).sum::<usize>(), found.member.iter().flatten().count());
        for (set, (trend, plunge)) in
            found.sets.iter().zip([(272.669_98, 6.203_74), (186.600_40, 5.550_77), (45.360_32, 76.253_41)])
        {
            let off = set.eigen.axes[0].angle_to(Axis::from_trend_plunge(trend, plunge));
            assert!(off < 1.5, "{off} degrees off {trend}/{plunge}");
            assert!(set.fisher_kappa.unwrap() > 15.0 && set.fisher_alpha95.unwrap() < 10.0);
        }
        // No reading is in the wrong set; a few may be in none.
        for (member, truth) in found.member.iter().zip(&truth) {
            assert!(member.is_none_or(|m| m as f64 + 1.0 == *truth), "{member:?} {truth}");
        }
        assert!(found.member.iter().flatten().count() >= 84, "{}", found.note);
        assert_abs_diff_eq!(
            found.sets.iter().map(|s| s.share).sum::<f64>(),
            found.member.iter().flatten().count() as f64 / 90.0,
            epsilon = 1e-12
        );
    }
}

#[test]
fn rows_in_another_order_make_the_same_sets() {
    let axes = poles("syn_joints90.csv");
    let mut other = axes.clone();
    other.reverse();
    other.rotate_left(17);
    let a = sets(&Sample::new(&axes, Kind::Planar), SetCount::Auto, 1);
    let b = sets(&Sample::new(&other, Kind::Planar), SetCount::Auto, 1);
    assert_eq!(a.sets, b.sets);
    let mut back = b.member.clone();
    back.rotate_right(17);
    back.reverse();
    assert_eq!(a.member, back);
}

#[test]
fn one_cluster_one_girdle_and_noise_are_not_cut_into_sets() {
    let mut rng = ChaCha8Rng::seed_from_u64(5);
    let (mut wrong, mut tries) = (Vec::new(), 0);
    for n in [30, 100, 300] {
        for repeat in 0..REPEATS {
            let centre = uniform(&mut rng);
            let oval: Vec<Axis> = (0..n).map(|_| scattered(&mut rng, centre, [20.0, 7.0])).collect();
            let round: Vec<Axis> = (0..n).map(|_| scattered(&mut rng, centre, [12.0, 12.0])).collect();
            let noise: Vec<Axis> = (0..n).map(|_| uniform(&mut rng)).collect();
            let girdle: Vec<Axis> = (0..n)
                .map(|_| {
                    let a = Axis::from_trend_plunge(rng.random_range(0.0..180.0), 0.0);
                    scattered(&mut rng, a, [4.0, 4.0])
                })
                .collect();
            for (name, axes) in [("oval", oval), ("round", round), ("noise", noise), ("girdle", girdle)] {
                tries += 1;
                let found = sets(&Sample::new(&axes, Kind::Planar), SetCount::Auto, 1);
                if !found.sets.is_empty() {
                    wrong.push((name, n, repeat, found.sets.len()));
                }
            }
        }
    }
    // None would be perfect; a few are the price of finding real sets.
    assert!(wrong.len() <= 3, "{} of {tries}: {wrong:?}", wrong.len());
}

#[test]
fn two_sets_in_a_background_are_found() {
    let mut rng = ChaCha8Rng::seed_from_u64(6);
    let mut missed = Vec::new();
    for n in [40, 150, 2500] {
        for repeat in 0..REPEATS {
            let a = uniform(&mut rng);
            let b = loop {
                let b = uniform(&mut rng);
                if a.angle_to(b) > 50.0 {
                    break b;
                }
            };
            let axes: Vec<Axis> = (0..n)
                .map(|i| match i % 10 {
                    0 => uniform(&mut rng),
                    1..=5 => scattered(&mut rng, a, [8.0, 8.0]),
                    _ => scattered(&mut rng, b, [8.0, 8.0]),
                })
                .collect();
            let found = sets(&Sample::new(&axes, Kind::Planar), SetCount::Auto, 1);
            let near = |t: Axis| found.sets.iter().any(|s| s.eigen.axes[0].angle_to(t) < 8.0);
            if found.sets.len() != 2 || !near(a) || !near(b) {
                missed.push((n, repeat, a.angle_to(b), found.sets.len()));
            }
        }
    }
    assert!(missed.len() <= 1, "{missed:?}");
}

// Two close joint sets look like a girdle to the tensor; two limbs are one.
#[test]
fn sets_correct_the_shape() {
    let mut rng = ChaCha8Rng::seed_from_u64(8);
    let means = [Axis::from_trend_plunge(10.0, 20.0), Axis::from_trend_plunge(62.0, 20.0)];
    let axes: Vec<Axis> = (0..60).map(|i| scattered(&mut rng, means[i % 2], [8.0, 8.0])).collect();
    let sample = Sample::new(&axes, Kind::Planar);
    let found = sets(&sample, SetCount::Auto, 1);
    assert_eq!(found.sets.len(), 2);
    for (folded, shape) in [(false, Shape::Multimodal), (true, Shape::Girdle)] {
        let options = FabricOptions { folded, ..FabricOptions::default() };
        let f = with_sets(summarise(&sample, &options), &found, &options);
        assert_eq!((f.shape, f.mean), (shape, None), "{}", f.note);
    }
    let axis = fold_axis(&sample, 0.95).unwrap().axis;
    let limbs = limbs_of_sets(&sample, axis, &found).unwrap();
    assert!((limbs.interlimb - 49.0).abs() < 8.0 || (limbs.interlimb - 131.0).abs() < 8.0, "{limbs:?}");
}

#[test]
fn too_few_is_an_answer() {
    let axes = poles("syn_steep8.csv");
    let sample = Sample::new(&axes, Kind::Planar);
    let auto = sets(&sample, SetCount::Auto, 1);
    assert!(auto.sets.is_empty() && auto.note.contains("need 20"));
    assert!(sets(&sample, SetCount::Given(2), 1).note.contains("need 10"));
    assert!(sets(&Sample::new(&[], Kind::Planar), SetCount::Auto, 1).sets.is_empty());
    let same = [Axis::from_trend_plunge(1.0, 2.0); 40];
    let found = sets(&Sample::new(&same, Kind::Planar), SetCount::Given(2), 1);
    assert!(found.sets.iter().all(|s| s.eigen.values[0].is_finite()));
}
