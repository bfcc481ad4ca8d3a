//! Domains that are there are found; what is not there is not.

use crate::support::{Invented, few, line, one_block, scattered, strewn, two_blocks};
use geo::Coord;
use homocline::domain::clusters::{Count, GrowOptions};
use rand::{RngExt, SeedableRng};
use rand_chacha::ChaCha8Rng;

fn exactly(count: usize) -> GrowOptions {
    GrowOptions { count: Count::Exactly(count), ..few() }
}

#[test]
fn two_blocks_are_found() {
    for (n, seed, least) in [(60, 1, 0.9), (400, 2, 0.97), (1500, 3, 0.98)] {
        let area = two_blocks(n, seed);
        let grown = area.grow();
        assert_eq!(grown.domains.len(), 2, "{n}");
        let agreement = area.agreement(&grown.domain);
        assert!(agreement >= least, "{n}: {agreement}");
        assert_eq!(grown.domains.iter().map(|d| d.readings).sum::<usize>(), n);
        // The two are told apart whatever the weights, and each comes back as it is.
        assert_eq!(grown.boundaries.len(), 1);
        assert_eq!(grown.boundaries[0].told_apart, Some(1.0));
        assert!(grown.domains.iter().all(|d| d.stability.unwrap() > 0.8), "{:?}", grown.domains);
        // One domain would cost much, three a little.
        let energy = |count| grown.path.iter().find(|s| s.count == count).unwrap().energy;
        assert_eq!(energy(2), 0.0);
        assert!(energy(1) > 20.0 && energy(3) > 0.0, "{:?}", grown.path);
        assert_ne!(grown.runner_up.unwrap().count, 2);
    }
}

#[test]
fn one_block_stays_one() {
    for (n, seed) in [(12, 1), (60, 2), (400, 3), (400, 4), (1500, 5)] {
        let grown = one_block(n, seed).grow();
        assert_eq!(grown.domains.len(), 1, "{n} {seed}");
        assert!(grown.boundaries.is_empty());
    }
}

/// Poles swing 60 degrees to either side along a wave of 400 m in the north; in the south they do not.
#[test]
fn a_folded_area_is_one_domain() {
    let area = strewn(1500, 6, 8.0, |at| {
        if at.y > 5_405_000.0 {
            let swing = 60.0 * (at.x / 400.0 * std::f64::consts::TAU).sin();
            (0, if swing < 0.0 { 270.0 } else { 90.0 }, 90.0 - swing.abs())
        } else {
            (1, 0.0, 40.0)
        }
    });
    let grown = area.grow();
    assert_eq!(grown.domains.len(), 2);
    assert!(area.agreement(&grown.domain) > 0.95);
    // Numbered from north to south.
    let north = area.position.iter().position(|c| c.y > 5_409_000.0).unwrap();
    assert_eq!(grown.domain[north], 0);
}

#[test]
fn strays_found_no_domain_and_are_named() {
    let mut area = two_blocks(600, 7);
    let mut rng = ChaCha8Rng::seed_from_u64(8);
    let stray: Vec<usize> = (0..30).map(|i| i * 20).collect();
    for &i in &stray {
        // Nearly along the one axis square to both blocks' poles.
        area.axis[i] = scattered(&mut rng, 310.0, 55.0, 5.0);
    }
    let grown = area.grow();
    assert_eq!(grown.domains.len(), 2);
    assert!(stray.iter().all(|&i| grown.outlier[i] > 0.9));
    let others: Vec<f64> = (0..600).filter(|i| !stray.contains(i)).map(|i| grown.outlier[i]).collect();
    assert!(others.iter().sum::<f64>() / 570.0 < 0.02);
    assert!(grown.outlier.iter().all(|p| (0.0..=1.0).contains(p)));
}

#[test]
fn no_domain_crosses_a_barrier() {
    let area = one_block(800, 9);
    let fault = line(&[(505_000.0, 5_399_000.0), (504_700.0, 5_405_000.0), (505_000.0, 5_411_000.0)]);
    let grown = area.grow_with(&[fault], &few());
    assert_eq!(grown.domains.len(), 2);
    for (at, &domain) in area.position.iter().zip(&grown.domain) {
        let bend = 505_000.0 - 300.0 * (1.0 - (at.y - 5_405_000.0).abs() / 6000.0);
        assert_eq!(domain, u32::from(at.x > bend) ^ grown.domain[leftmost(&area)], "{at:?}");
    }
    // A barrier with a loose end separates nothing here.
    let loose = line(&[(505_000.0, 5_399_000.0), (505_000.0, 5_405_000.0)]);
    assert_eq!(area.grow_with(&[loose], &few()).domains.len(), 1);
}

fn leftmost(area: &Invented) -> usize {
    (0..area.position.len()).min_by(|&a, &b| area.position[a].x.total_cmp(&area.position[b].x)).unwrap()
}

#[test]
fn a_barrier_helps_where_readings_leave_the_boundary_open() {
    let mut area = two_blocks(400, 10);
    let fault = line(&[(505_000.0, 5_399_000.0), (505_000.0, 5_411_000.0)]);
    let with = area.grow_with(std::slice::from_ref(&fault), &few());
    assert_eq!(area.agreement(&with.domain), 1.0);
    // A station on the fault belongs to one of the sides; it does not stand alone, and opens no way.
    area.position[0] = Coord { x: 505_000.0, y: 5_404_321.0 };
    let with = area.grow_with(&[fault], &few());
    assert_eq!(with.domains.len(), 2);
    assert!(area.agreement(&with.domain) > 0.98);
}

#[test]
fn the_number_of_domains_can_be_given() {
    let area = two_blocks(400, 11);
    for count in 1..=6 {
        let grown = area.grow_with(&[], &GrowOptions { replicates: 0, ..exactly(count) });
        assert_eq!(grown.domains.len(), count);
    }
    // Barriers make three compartments: two domains would have to cross one.
    let faults = [503_000.0, 507_000.0].map(|x| line(&[(x, 5_399_000.0), (x, 5_411_000.0)]));
    assert_eq!(area.grow_with(&faults, &exactly(2)).domains.len(), 3);
}

#[test]
fn a_second_structure_tells_apart_what_the_first_cannot() {
    let mut area = one_block(400, 12);
    let lines = strewn(400, 12, 8.0, |at| if at.y < 5_405_000.0 { (0, 20.0, 10.0) } else { (1, 80.0, 10.0) });
    assert_eq!(area.grow().domains.len(), 1);
    area.position.extend(lines.position);
    area.axis.extend(lines.axis);
    area.structure.extend([7; 400]);
    area.truth = [lines.truth.clone(), lines.truth].concat();
    let grown = area.grow();
    assert_eq!(grown.domains.len(), 2);
    assert!(area.agreement(&grown.domain) > 0.95);
}

/// Many readings of one outcrop are no proof of a domain of its own; all of a station go to one domain.
#[test]
fn readings_of_one_station_stay_together() {
    let mut area = two_blocks(300, 13);
    let mut rng = ChaCha8Rng::seed_from_u64(14);
    for i in 0..100 {
        let (at, truth) = (area.position[i], area.truth[i]);
        for _ in 0..rng.random_range(1..6u32) {
            area.position.push(at);
            area.axis.push(scattered(&mut rng, [100.0, 160.0][truth as usize], 30.0, 8.0));
            area.structure.push(0);
            area.truth.push(truth);
        }
    }
    let grown = area.grow();
    assert_eq!(grown.domains.len(), 2);
    assert_eq!(grown.domains.iter().map(|d| d.stations).sum::<usize>(), 300);
    for (i, at) in area.position.iter().enumerate().skip(300) {
        let first = area.position.iter().position(|p| p == at).unwrap();
        assert_eq!(grown.domain[i], grown.domain[first]);
    }
}
