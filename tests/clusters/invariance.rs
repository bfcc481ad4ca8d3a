//! What must not matter does not.

use crate::support::{Invented, few, line, strewn};
use geo::Coord;
use homocline::domain::clusters::{GrowOptions, Grown};
use rand::SeedableRng;
use rand::seq::SliceRandom;
use rand_chacha::ChaCha8Rng;

/// Four quarters whose fabrics differ by little, and noise enough that the answer is not forced.
fn quarters() -> Invented {
    strewn(1200, 21, 15.0, |at| match (at.x < 504_000.0, at.y < 5_406_000.0) {
        (true, true) => (0, 100.0, 30.0),
        (true, false) => (1, 130.0, 30.0),
        (false, true) => (2, 100.0, 60.0),
        (false, false) => (3, 160.0, 50.0),
    })
}

fn grown_of(area: &Invented) -> Grown {
    area.grow_with(&[line(&[(503_000.0, 5_399_000.0), (505_500.0, 5_404_000.0)])], &few())
}

#[test]
fn order_of_rows() {
    let area = quarters();
    let first = grown_of(&area);
    assert!(first.domains.len() >= 3, "the area is meant to have something to find");
    let mut order: Vec<usize> = (0..area.position.len()).collect();
    order.shuffle(&mut ChaCha8Rng::seed_from_u64(5));
    let mut second = grown_of(&area.reordered(&order));
    let (domain, outlier) = (std::mem::take(&mut second.domain), std::mem::take(&mut second.outlier));
    for (place, &row) in order.iter().enumerate() {
        assert_eq!(domain[place], first.domain[row]);
        assert_eq!(outlier[place].to_bits(), first.outlier[row].to_bits());
    }
    // All that is not per reading is equal as it stands.
    let first = Grown { domain: vec![], outlier: vec![], ..first };
    assert_eq!(first, second);
}

#[test]
fn number_of_threads() {
    let area = quarters();
    let with = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        pool.install(|| grown_of(&area))
    };
    assert_eq!(with(1), with(4));
}

#[test]
fn origin_and_unit_of_the_positions() {
    let area = quarters();
    let first = area.grow();
    for (name, place) in [
        ("1000 km east", (|c| Coord { x: c.x + 1e6, y: c.y - 1e6 }) as fn(Coord<f64>) -> Coord<f64>),
        ("international feet", |c| Coord { x: c.x / 0.3048, y: c.y / 0.3048 }),
        ("kilometres", |c| Coord { x: c.x / 1000.0, y: c.y / 1000.0 }),
    ] {
        assert_eq!(area.moved(place).grow(), first, "{name}");
    }
}

#[test]
fn numbers_of_structures() {
    let mut area = quarters();
    let first = area.grow();
    area.structure.fill(4711);
    assert_eq!(area.grow(), first);
}

#[test]
fn the_seed_moves_stability_alone_in_a_clear_area() {
    let area = crate::support::two_blocks(300, 22);
    let with = |seed| area.grow_with(&[], &GrowOptions { seed, ..few() });
    assert_eq!(with(1), with(1));
    assert_eq!(with(1).domain, with(2).domain);
}
