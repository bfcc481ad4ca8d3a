//! Invented areas, seeded.

use geo::{Coord, LineString};
use homocline::domain::clusters::{GrowOptions, Grown, Places, grow};
use homocline::notice::Silent;
use homocline::orientation::Axis;
use rand::{RngExt, SeedableRng};
use rand_chacha::ChaCha8Rng;

/// Few replicates: the tests run without optimisation.
pub fn few() -> GrowOptions {
    GrowOptions { replicates: 8, ..GrowOptions::default() }
}

/// Readings, and the domain that each was made for.
#[derive(Clone, Default)]
pub struct Invented {
    pub position: Vec<Coord<f64>>,
    pub axis: Vec<Axis>,
    pub structure: Vec<u16>,
    pub truth: Vec<u32>,
}

/// An axis scattered about (trend, plunge) by about `degrees` in each of two directions.
pub fn scattered(rng: &mut ChaCha8Rng, trend: f64, plunge: f64, degrees: f64) -> Axis {
    // Twelve uniform numbers sum to nearly a normal one of variance 1.
    let mut normal = || (0..12).map(|_| rng.random::<f64>()).sum::<f64>() - 6.0;
    let mean = Axis::from_trend_plunge(trend, plunge).vector();
    let scale = degrees.to_radians();
    // An isotropic step in space; the part along the mean is lost in the normalisation.
    let v: [f64; 3] = std::array::from_fn(|i| mean[i] + scale * normal());
    Axis::new(v[0], v[1], v[2]).unwrap()
}

/// Stations strewn evenly over 10 km by 10 km; `fabric` gives a position its domain and its mean axis.
pub fn strewn(n: usize, seed: u64, degrees: f64, fabric: impl Fn(Coord<f64>) -> (u32, f64, f64)) -> Invented {
    let mut rng = ChaCha8Rng::seed_from_u64(seed);
    let mut area = Invented::default();
    for _ in 0..n {
        let at = Coord { x: 500_000.0 + tenths(&mut rng, 10_000.0), y: 5_400_000.0 + tenths(&mut rng, 10_000.0) };
        let (domain, trend, plunge) = fabric(at);
        area.position.push(at);
        area.axis.push(scattered(&mut rng, trend, plunge, degrees));
        area.structure.push(0);
        area.truth.push(domain);
    }
    area
}

fn tenths(rng: &mut ChaCha8Rng, most: f64) -> f64 {
    (rng.random::<f64>() * most * 10.0).round() / 10.0
}

/// West and east of x = 505 000, poles 60 degrees apart.
pub fn two_blocks(n: usize, seed: u64) -> Invented {
    strewn(n, seed, 8.0, |at| if at.x < 505_000.0 { (0, 100.0, 30.0) } else { (1, 160.0, 30.0) })
}

/// One population everywhere.
pub fn one_block(n: usize, seed: u64) -> Invented {
    strewn(n, seed, 12.0, |_| (0, 100.0, 40.0))
}

impl Invented {
    pub fn places(&self) -> Places<'_> {
        Places { position: &self.position, axis: &self.axis, structure: &self.structure }
    }
    pub fn grow(&self) -> Grown {
        self.grow_with(&[], &few())
    }
    pub fn grow_with(&self, barriers: &[LineString<f64>], options: &GrowOptions) -> Grown {
        grow(&self.places(), barriers, options, &Silent).unwrap()
    }
    /// Entries in another order: entry i of the result is entry `order[i]` of this.
    pub fn reordered(&self, order: &[usize]) -> Self {
        Self {
            position: order.iter().map(|&i| self.position[i]).collect(),
            axis: order.iter().map(|&i| self.axis[i]).collect(),
            structure: order.iter().map(|&i| self.structure[i]).collect(),
            truth: order.iter().map(|&i| self.truth[i]).collect(),
        }
    }
    pub fn moved(&self, place: impl Fn(Coord<f64>) -> Coord<f64>) -> Self {
        Self { position: self.position.iter().map(|&c| place(c)).collect(), ..self.clone() }
    }
    /// Share of pairs of readings that two labellings treat alike, corrected for chance (the adjusted Rand
    /// index, Hubert & Arabie 1985).
    pub fn agreement(&self, found: &[u32]) -> f64 {
        let pairs = |n: f64| n * (n - 1.0) / 2.0;
        let most = |l: &[u32]| *l.iter().max().unwrap() as usize + 1;
        let (rows, columns) = (most(&self.truth), most(found));
        let mut table = vec![vec![0.0; columns]; rows];
        for (&t, &f) in self.truth.iter().zip(found) {
            table[t as usize][f as usize] += 1.0;
        }
        let both: f64 = table.iter().flatten().map(|&n| pairs(n)).sum();
        let truth: f64 = table.iter().map(|r| pairs(r.iter().sum())).sum();
        let grown: f64 = (0..columns).map(|c| pairs(table.iter().map(|r| r[c]).sum())).sum();
        let chance = truth * grown / pairs(found.len() as f64);
        let most = (truth + grown) / 2.0;
        if most == chance { 1.0 } else { (both - chance) / (most - chance) }
    }
}

pub fn line(points: &[(f64, f64)]) -> LineString<f64> {
    points.iter().map(|&(x, y)| Coord { x, y }).collect()
}
