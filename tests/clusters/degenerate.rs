//! Input that leaves little to do, or nothing.

use crate::support::{Invented, few, line, one_block, scattered, two_blocks};
use geo::{Coord, LineString};
use homocline::domain::clusters::{Count, GrowError, GrowOptions, Places, grow};
use homocline::notice::Silent;
use homocline::orientation::Axis;
use rand::SeedableRng;
use rand_chacha::ChaCha8Rng;

fn error(area: &Invented, barriers: &[LineString<f64>], options: &GrowOptions) -> GrowError {
    grow(&area.places(), barriers, options, &Silent).unwrap_err()
}

fn at(places: &[(f64, f64)]) -> Invented {
    let mut rng = ChaCha8Rng::seed_from_u64(31);
    Invented {
        position: places.iter().map(|&(x, y)| Coord { x, y }).collect(),
        axis: places.iter().map(|_| scattered(&mut rng, 40.0, 50.0, 10.0)).collect(),
        structure: vec![0; places.len()],
        truth: vec![0; places.len()],
    }
}

#[test]
fn few_stations_are_one_domain() {
    for places in
        [&[(0.0, 0.0)][..], &[(0.0, 0.0), (5.0, 1.0)], &[(0.0, 0.0), (5.0, 1.0), (3.0, 3.0)], &[(7.0, 7.0); 40]]
    {
        let grown = at(places).grow();
        assert_eq!(grown.domains.len(), 1);
        assert!(grown.domain.iter().all(|&d| d == 0));
        assert!(grown.outlier.iter().all(|p| p.is_finite()));
        assert!(grown.overdispersion == 1.0);
    }
}

#[test]
fn a_line_of_stations_is_divided_along_itself() {
    let mut area = two_blocks(200, 32);
    for (position, slope) in area.position.iter_mut().zip(std::iter::repeat(0.5)) {
        // Halving and doubling are exact, so all stations lie on one line exactly.
        position.y = position.x * slope;
    }
    let grown = area.grow();
    assert_eq!(grown.domains.len(), 2);
    assert!(area.agreement(&grown.domain) > 0.95);
}

#[test]
fn a_regular_grid_is_no_trouble() {
    let places: Vec<(f64, f64)> = (0..400).map(|i| (f64::from(i % 20) * 100.0, f64::from(i / 20) * 100.0)).collect();
    assert_eq!(at(&places).grow().domains.len(), 1);
}

#[test]
fn equal_axes_are_one_domain() {
    let mut area = one_block(100, 33);
    area.axis.fill(Axis::from_trend_plunge(10.0, 20.0));
    let grown = area.grow();
    assert_eq!(grown.domains.len(), 1);
    assert!(grown.outlier.iter().all(|&p| p < 0.01));
}

#[test]
fn odd_barriers() {
    let area = one_block(200, 34);
    let odd = [
        line(&[]),
        line(&[(505_000.0, 5_405_000.0)]),
        line(&[(505_000.0, 5_405_000.0), (505_000.0, 5_405_000.0)]),
        line(&[(0.0, 0.0), (1.0, 1.0)]),
        line(&[(502_000.0, 5_402_000.0), (504_000.0, 5_404_000.0), (504_000.0, 5_402_000.0), (502_000.0, 5_404_000.0)]),
    ];
    let grown = area.grow_with(&odd, &few());
    assert_eq!(grown.domains.len(), 1);
    assert_eq!((grown.barriers.lines, grown.barriers.idle), (5, 4));
    let broken = [line(&[(502_000.0, f64::NAN), (504_000.0, 5_404_000.0)])];
    assert_eq!(error(&area, &broken, &few()), GrowError::BarrierNotFinite { barrier: 0 });
}

/// A closed line about a few stations makes a compartment; one of too few readings goes to a neighbour.
#[test]
fn compartments() {
    let area = one_block(500, 35);
    let ring = |half: f64| {
        let (x, y) = (505_000.0, 5_405_000.0);
        let corners = [(-1.0, -1.0), (1.0, -1.0), (1.0, 1.0), (-1.0, 1.0), (-1.0, -1.0)];
        line(&corners.map(|(i, j)| (x + i * half, y + j * half)))
    };
    let inside = |half: f64| {
        area.position.iter().filter(|c| (c.x - 505_000.0).abs() < half && (c.y - 5_405_000.0).abs() < half).count()
    };
    let small = area.grow_with(&[ring(400.0)], &few());
    assert!((1..5).contains(&inside(400.0)), "{}", inside(400.0));
    assert_eq!((small.domains.len(), small.barriers.joined_across), (1, inside(400.0)));
    let large = area.grow_with(&[ring(2000.0)], &few());
    assert_eq!(large.domains.len(), 2);
    assert_eq!(large.domains.iter().map(|d| d.readings).min(), Some(inside(2000.0)));
}

#[test]
fn what_cannot_be_done_is_said() {
    let area = one_block(30, 36);
    let options = |count| GrowOptions { count: Count::Exactly(count), ..few() };
    assert_eq!(error(&area, &[], &options(0)), GrowError::NoDomains);
    assert_eq!(error(&area, &[], &options(31)), GrowError::TooManyDomains { count: 31, stations: 30 });
    assert_eq!(area.grow_with(&[], &options(30)).domains.len(), 30);
    assert_eq!(error(&Invented::default(), &[], &few()), GrowError::NoReadings);
    let mut broken = area.clone();
    broken.position[3].y = f64::INFINITY;
    assert_eq!(error(&broken, &[], &few()), GrowError::PositionNotFinite { reading: 3 });
    broken.position[3].y = f64::MAX;
    broken.position[4].y = -f64::MAX;
    assert_eq!(error(&broken, &[], &few()), GrowError::SpanNotFinite);
    let ragged = Places { structure: &[0], ..area.places() };
    assert!(matches!(
        grow(&ragged, &[], &GrowOptions::default(), &Silent),
        Err(GrowError::UnequalColumns { positions: 30, axes: 30, structures: 1 })
    ));
}

#[test]
fn without_replicates_nothing_is_said_of_stability() {
    let grown = two_blocks(100, 37).grow_with(&[], &GrowOptions { replicates: 0, ..few() });
    assert!(grown.domains.iter().all(|d| d.stability.is_none()));
    assert!(grown.boundaries.iter().all(|b| b.told_apart.is_none()));
    assert!(grown.replicate_counts.is_empty());
}
