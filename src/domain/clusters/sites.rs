//! Readings brought into one order and one frame, so that neither the order of rows, nor the origin of the map's
//! coordinates, nor their unit can change what is grown from them.

use super::{GrowError, Places};
use geo::Coord;
use rayon::prelude::*;
use std::cmp::Ordering;

/// Steps along the longer side of the bounding box: fine enough to move nobody (0.02 mm in 12 km), coarse enough
/// to round away what a shift of the origin leaves in the last digits. Products of two differences fit an i64.
const STEPS: f64 = 536_870_912.0;

/// One reading: its structure (renumbered from 0) and the products xx, yy, zz, xy, xz, yz of its axis.
#[derive(Debug, Clone, Copy)]
pub(super) struct Reading {
    pub structure: usize,
    pub products: [f64; 6],
}

/// The distinct positions in the order of a Hilbert curve, so that neighbours are near in memory, each with its readings, sorted by value.
#[derive(Debug)]
pub(super) struct Sites {
    pub at: Vec<[i64; 2]>,
    /// Readings of site i are `start[i]..start[i + 1]`.
    pub start: Vec<usize>,
    pub readings: Vec<Reading>,
    /// The site of each reading.
    pub site: Vec<u32>,
    /// Row of the input that each reading came from.
    pub row: Vec<u32>,
    /// How many different structures there are.
    pub structures: usize,
    west: f64,
    south: f64,
    step: f64,
}

impl Sites {
    pub(super) fn new(places: &Places) -> Result<Self, GrowError> {
        let n = places.position.len();
        if places.axis.len() != n || places.structure.len() != n {
            return Err(GrowError::UnequalColumns {
                positions: n,
                axes: places.axis.len(),
                structures: places.structure.len(),
            });
        }
        if n == 0 {
            return Err(GrowError::NoReadings);
        }
        if let Some(reading) = places.position.iter().position(|c| !(c.x.is_finite() && c.y.is_finite())) {
            return Err(GrowError::PositionNotFinite { reading });
        }
        let low = |get: fn(&Coord<f64>) -> f64| places.position.iter().map(get).fold(f64::INFINITY, f64::min);
        let high = |get: fn(&Coord<f64>) -> f64| places.position.iter().map(get).fold(f64::NEG_INFINITY, f64::max);
        let (west, south) = (low(|c| c.x), low(|c| c.y));
        let span = (high(|c| c.x) - west).max(high(|c| c.y) - south);
        if !span.is_finite() {
            return Err(GrowError::SpanNotFinite);
        }
        let step = if span > 0.0 { span / STEPS } else { 1.0 };
        let mut used: Vec<u16> = places.structure.to_vec();
        used.sort_unstable();
        used.dedup();
        let frame = Self {
            at: Vec::new(),
            start: Vec::new(),
            readings: Vec::with_capacity(n),
            site: Vec::with_capacity(n),
            row: Vec::new(),
            structures: used.len(),
            west,
            south,
            step,
        };
        let snapped: Vec<[i64; 2]> = places
            .position
            .iter()
            .map(|&c| {
                let c = frame.place(c);
                [c.x.round() as i64, c.y.round() as i64]
            })
            .collect();
        Ok(frame.fill(places, &snapped, &used))
    }

    fn fill(mut self, places: &Places, snapped: &[[i64; 2]], used: &[u16]) -> Self {
        let mut sorted: Vec<(u64, u32)> =
            snapped.par_iter().enumerate().map(|(row, &at)| (hilbert(at), row as u32)).collect();
        sorted.par_sort_unstable_by(|&(p, a), &(q, b)| {
            p.cmp(&q).then_with(|| {
                let (a, b) = (a as usize, b as usize);
                let (v, w) = (places.axis[a].vector(), places.axis[b].vector());
                let axes = v.iter().zip(w.iter()).map(|(x, y)| x.total_cmp(y)).find(|o| o.is_ne());
                places.structure[a].cmp(&places.structure[b]).then(axes.unwrap_or(Ordering::Equal))
            })
        });
        let row: Vec<u32> = sorted.into_iter().map(|(_, row)| row).collect();
        for &r in &row {
            let r = r as usize;
            if self.at.last() != Some(&snapped[r]) {
                self.at.push(snapped[r]);
                self.start.push(self.readings.len());
            }
            let v = places.axis[r].vector();
            let structure = used.partition_point(|&s| s < places.structure[r]);
            let products = [v.x * v.x, v.y * v.y, v.z * v.z, v.x * v.y, v.x * v.z, v.y * v.z];
            self.readings.push(Reading { structure, products });
            self.site.push(self.at.len() as u32 - 1);
        }
        self.start.push(self.readings.len());
        self.row = row;
        self
    }

    /// A map position in steps from the south-western corner, not rounded.
    pub(super) fn place(&self, c: Coord<f64>) -> Coord<f64> {
        Coord { x: (c.x - self.west) / self.step, y: (c.y - self.south) / self.step }
    }

    /// How many distinct positions there are.
    pub(super) fn len(&self) -> usize {
        self.at.len()
    }

    /// How many readings site `i` has.
    pub(super) fn load(&self, i: usize) -> usize {
        self.start[i + 1] - self.start[i]
    }

    /// A site's position as a coordinate.
    pub(super) fn coord(&self, i: usize) -> Coord<f64> {
        Coord { x: self.at[i][0] as f64, y: self.at[i][1] as f64 }
    }

    /// Distance of two sites, at least half a step.
    pub(super) fn distance(&self, a: usize, b: usize) -> f64 {
        let (a, b) = (self.coord(a), self.coord(b));
        (a.x - b.x).hypot(a.y - b.y)
    }
}

/// Place of a position along the Hilbert curve of order 30 over the bounding box.
fn hilbert(at: [i64; 2]) -> u64 {
    const TOP: i64 = (1 << 30) - 1;
    let [mut x, mut y] = at.map(|v| v.min(TOP));
    let mut place = 0u64;
    let mut half = 1i64 << 29;
    while half > 0 {
        let (right, upper) = (i64::from(x & half > 0), i64::from(y & half > 0));
        place += (half * half * ((3 * right) ^ upper)) as u64;
        if upper == 0 {
            if right == 1 {
                (x, y) = (TOP - x, TOP - y);
            }
            (x, y) = (y, x);
        }
        half >>= 1;
    }
    place
}
