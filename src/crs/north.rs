//! How the map's grid lies against true north, place by place.

use super::definition::{Grid, MapCrs};
use super::ffi::Operation;
use super::transform::CHUNK;
use crate::orientation::{GridAzimuth, TrueAzimuth};
use geo_types::Coord;
use rayon::prelude::*;

/// Half the step of the finite differences, in radians of latitude (about 550 m). The error of a central
/// difference grows with its square (below 1e-8 of the convergence), that of rounding falls with it
/// (1e-9 m in 1 km); both stay far below the 3e-6 degrees (0.01 arc second) wanted.
const STEP: f64 = 8.726_646_259_971_648e-5; // 0.005 degrees

/// The lie of the map's grid at one place.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LocalNorth {
    convergence: f64,
    place: Coord<f64>,
    /// Directions on the map of a unit step to true north and to true east (dE, dN each); only where angles change.
    steps: Option<[f64; 4]>,
}

impl LocalNorth {
    /// Convergence in degrees, (-180, 180], positive where grid north lies east of true north.
    pub fn convergence(&self) -> f64 {
        self.convergence
    }
    /// Longitude (from Greenwich) and latitude on the map CRS's own datum, degrees.
    pub fn longitude_latitude(&self) -> Coord<f64> {
        self.place
    }
    /// Where a true azimuth points on the map. On a conformal map this is azimuth - convergence; on
    /// another one the direction of the projected line, which keeps strikes along the beds as drawn.
    pub fn grid_azimuth(&self, azimuth: TrueAzimuth) -> GridAzimuth {
        let plain = azimuth.degrees() - self.convergence;
        let drawn = self.steps.map(|[north_e, north_n, east_e, east_n]| {
            let (sin, cos) = azimuth.degrees().to_radians().sin_cos();
            let (de, dn) = (cos * north_e + sin * east_e, cos * north_n + sin * east_n);
            de.atan2(dn).to_degrees()
        });
        // At the very edge of a projection an eastward step may end nowhere.
        let degrees = drawn.filter(|d| d.is_finite()).unwrap_or(plain);
        GridAzimuth::new(degrees).expect("both parts are finite")
    }
}

impl MapCrs {
    /// The lie of the grid at each place (in this CRS), in parallel; `None` where a place has no longitude and
    /// latitude. In a geographic CRS the grid is taken to lie along true north.
    pub fn local_norths(&self, places: &[Coord<f64>]) -> Vec<Option<LocalNorth>> {
        places.par_chunks(CHUNK).flat_map_iter(|chunk| self.local_norths_chunk(chunk)).collect()
    }
    /// The lie of the grid at one place.
    pub fn local_north(&self, place: Coord<f64>) -> Option<LocalNorth> {
        self.local_norths_chunk(&[place]).pop().flatten()
    }
    /// Convergence at one place in degrees, positive where grid north lies east of true north.
    pub fn convergence(&self, place: Coord<f64>) -> Option<f64> {
        self.local_north(place).map(|north| north.convergence())
    }
    /// Where a true azimuth points on the map at one place.
    pub fn grid_azimuth(&self, place: Coord<f64>, azimuth: TrueAzimuth) -> Option<GridAzimuth> {
        self.local_north(place).map(|north| north.grid_azimuth(azimuth))
    }

    /// One chunk, on this thread.
    pub(super) fn local_norths_chunk(&self, places: &[Coord<f64>]) -> Vec<Option<LocalNorth>> {
        match self.grid() {
            Some(grid) => grid.projection.with(|operation| self.in_grid(grid, operation, places)),
            None => places.iter().map(|&c| self.without_grid(c)).collect(),
        }
    }

    /// Longitude and latitude from Greenwich, degrees on the CRS's own datum, on this thread; not finite where
    /// there is none.
    pub(super) fn geographic_chunk(&self, places: &[Coord<f64>]) -> Vec<Coord<f64>> {
        let mut geographic = places.to_vec();
        if let Some(grid) = self.grid() {
            grid.projection.with(|operation| operation.inverse(&mut geographic));
        }
        geographic.into_iter().map(|c| self.greenwich(c)).collect()
    }

    fn without_grid(&self, at: Coord<f64>) -> Option<LocalNorth> {
        let usable = at.x.is_finite() && at.y.is_finite();
        usable.then(|| LocalNorth { convergence: 0.0, place: self.greenwich(at), steps: None })
    }

    /// Degrees from Greenwich of a longitude and latitude in the base CRS.
    fn greenwich(&self, base: Coord<f64>) -> Coord<f64> {
        let unit = self.base().unit.to_degrees();
        Coord { x: base.x * unit + self.base().prime_meridian, y: base.y * unit }
    }

    fn in_grid(&self, grid: &Grid, operation: &mut Operation, places: &[Coord<f64>]) -> Vec<Option<LocalNorth>> {
        let n = places.len();
        let unit = self.base().unit;
        let (step, quarter) = (STEP / unit, std::f64::consts::FRAC_PI_2 / unit);
        let mut geographic = places.to_vec();
        operation.inverse(&mut geographic);

        // One batch: all steps north, then south, and where angles change, east, then west.
        let mut ends = Vec::with_capacity(n * if grid.conformal { 2 } else { 4 });
        // At a pole only the side that exists is stepped to; meridians are straight there.
        ends.extend(geographic.iter().map(|c| Coord { x: c.x, y: (c.y + step).min(quarter) }));
        ends.extend(geographic.iter().map(|c| Coord { x: c.x, y: (c.y - step).max(-quarter) }));
        if !grid.conformal {
            ends.extend(geographic.iter().map(|c| Coord { x: c.x + step, y: c.y }));
            ends.extend(geographic.iter().map(|c| Coord { x: c.x - step, y: c.y }));
        }
        operation.forward(&mut ends);

        (0..n)
            .map(|i| {
                let base = geographic[i];
                let north = ends[i] - ends[n + i];
                let usable = base.x.is_finite() && base.y.is_finite() && north.x.is_finite() && north.y.is_finite();
                if !usable || (north.x == 0.0 && north.y == 0.0) {
                    return None;
                }
                // A step to true north has the grid azimuth 0 - convergence.
                let convergence = (-north.x).atan2(north.y).to_degrees();
                let latitude = base.y * unit;
                let from_pole = std::f64::consts::FRAC_PI_2 - latitude.abs();
                let steps = (!grid.conformal && from_pole > STEP).then(|| {
                    let east = unfolded(ends[2 * n + i], places[i], ends[3 * n + i]);
                    // The steps are equal in angle; on the ground a step north is M and one east N cos(latitude)
                    // long (Snyder, PP 1395, chapter 4), so only their ratio matters.
                    let e2 = self.base().eccentricity_squared;
                    let meridian = (1.0 - e2) / (1.0 - e2 * latitude.sin().powi(2));
                    let parallel = latitude.cos();
                    [north.x / meridian, north.y / meridian, east.x / parallel, east.y / parallel]
                });
                Some(LocalNorth { convergence: convergence + 0.0, place: self.greenwich(base), steps })
            })
            .collect()
    }
}

/// The vector from west to east of a place; where the map is cut open between the two, twice the half that
/// is not cut.
fn unfolded(east: Coord<f64>, here: Coord<f64>, west: Coord<f64>) -> Coord<f64> {
    let (ahead, behind) = (east - here, here - west);
    let length = |v: Coord<f64>| v.x.hypot(v.y);
    if length(ahead) > 2.0 * length(behind) {
        behind * 2.0
    } else if length(behind) > 2.0 * length(ahead) {
        ahead * 2.0
    } else {
        east - west
    }
}

impl MapCrs {
    /// The most that a map drawn with degrees as x and y turns any line at a latitude, in degrees; `None`
    /// where no finite latitude is given. Such a map stretches by k along the parallel, and a line is turned
    /// most by asin((k - 1) / (k + 1)) (Tissot's indicatrix; Snyder, PP 1395, chapter 4).
    pub fn largest_plate_carree_turn(&self, latitude: f64) -> Option<f64> {
        if !latitude.is_finite() {
            return None;
        }
        let (sin, cos) = latitude.to_radians().sin_cos();
        let e2 = self.base().eccentricity_squared;
        let stretch = (1.0 - e2) / (1.0 - e2 * sin * sin) / cos.max(f64::MIN_POSITIVE);
        let (long, short) = (stretch.max(1.0), stretch.min(1.0));
        Some(((long - short) / (long + short)).asin().to_degrees())
    }
}
