//! Coordinates from one CRS to another.

use super::definition::MapCrs;
use super::error::CrsError;
use super::ffi::Way;
use super::pool::{Pool, Recipe};
use geo::MapCoordsInPlace;
use geo_types::{Coord, Geometry};
use rayon::prelude::*;
use std::cell::{Cell, RefCell};

/// Coordinates handed to PROJ at a time.
pub(super) const CHUNK: usize = 4096;

/// Takes coordinates from one CRS to another, easting or longitude first on both sides. May be shared by threads.
#[derive(Debug)]
pub struct Transformer {
    /// `None` where both CRSs are one: coordinates then come through bit for bit.
    pool: Option<Pool>,
    /// Longest longitude and highest latitude allowed, where `from` is geographic.
    limits: Option<(f64, f64)>,
}

impl Transformer {
    /// From one CRS to another.
    ///
    /// # Errors
    /// [`CrsError::NoTransformation`] where PROJ knows no way.
    pub fn new(from: &MapCrs, to: &MapCrs) -> Result<Self, CrsError> {
        let pool = if from == to {
            None
        } else {
            let recipe = Recipe::Between(from.definition.clone(), to.definition.clone());
            let failed = |reason| CrsError::NoTransformation { from: from.label(), to: to.label(), reason };
            Some(Pool::new(recipe).map_err(failed)?)
        };
        let quarter = std::f64::consts::FRAC_PI_2 / from.base().unit;
        let limits = (!from.is_projected()).then_some((quarter * 6.0, quarter * (1.0 + 1e-12)));
        Ok(Self { pool, limits })
    }

    /// Transforms in place, in parallel. Returns the indices of those that have no place in the target CRS,
    /// in order; they become NaN.
    pub fn coords(&self, coords: &mut [Coord<f64>]) -> Vec<usize> {
        coords.par_chunks_mut(CHUNK).for_each(|chunk| self.chunk(chunk));
        coords.iter().enumerate().filter(|(_, c)| c.x.is_nan()).map(|(i, _)| i).collect()
    }

    /// Transforms a geometry in place, vertex by vertex. Returns how many of its vertices have no place in the
    /// target CRS; where that is not 0, the geometry holds NaN and must not be used.
    pub fn geometry(&self, geometry: &mut Geometry<f64>) -> usize {
        if let Geometry::Rect(rect) = geometry {
            // A box seldom stays one; its outline may.
            *geometry = Geometry::Polygon(rect.to_polygon());
        }
        // The same walk twice: once to collect, once to write back, so that PROJ sees one batch.
        let collected = RefCell::new(Vec::new());
        geometry.map_coords_in_place(|c| {
            collected.borrow_mut().push(c);
            c
        });
        let mut coords = collected.into_inner();
        coords.chunks_mut(CHUNK).for_each(|chunk| self.chunk(chunk));
        let failed = coords.iter().filter(|c| c.x.is_nan()).count();
        let next = Cell::new(0);
        geometry.map_coords_in_place(|_| coords[next.replace(next.get() + 1)]);
        failed
    }

    /// How the first of these coordinates that has a place gets there; `None` where both CRSs are one.
    pub(super) fn way(&self, coords: &[Coord<f64>]) -> Option<Way> {
        self.pool.as_ref()?.with(|operation| coords.iter().find_map(|&at| operation.way(at)))
    }

    /// One chunk, on this thread; what fails becomes NaN.
    pub(super) fn chunk(&self, coords: &mut [Coord<f64>]) {
        let nowhere = Coord { x: f64::NAN, y: f64::NAN };
        if let Some((longest, highest)) = self.limits {
            // PROJ would fold a longitude of any length into one turn and let a latitude through unchanged.
            for c in coords.iter_mut().filter(|c| !(c.x.abs() <= longest && c.y.abs() <= highest)) {
                *c = nowhere;
            }
        }
        if let Some(pool) = &self.pool {
            pool.with(|operation| operation.forward(coords));
        }
        for c in coords.iter_mut().filter(|c| !(c.x.is_finite() && c.y.is_finite())) {
            *c = nowhere;
        }
    }
}
