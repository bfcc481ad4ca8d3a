//! Results placed on the map, and what their symbols show.

use crate::fabric::fold::{FoldAxis, Limbs};
use crate::fabric::sets::AxisSet;
use crate::fabric::{DirectedFabric, Fabric};
use crate::orientation::{Axis, GridAzimuth, Plane, Rotation};
use crate::station::{Kind, Structure};
use geo_types::Coord;

/// The fabric of one structure in one domain.
#[derive(Debug, Clone)]
pub struct PlacedFabric {
    /// Position in [`crate::domain::Domains::list`].
    pub domain: usize,
    /// The structure.
    pub structure: Structure,
    /// The statistics.
    pub fabric: Fabric,
    /// How many exposure weights were cut to the cap.
    pub clipped: usize,
    /// What the sense adds, for directed structures.
    pub directed: Option<DirectedFabric>,
    /// A point inside the domain.
    pub at: Coord<f64>,
    /// Mean strike or trend from the map's grid north at that point, where there is a mean.
    pub grid_azimuth: Option<GridAzimuth>,
}

/// The fold axis of one girdle.
#[derive(Debug, Clone)]
pub struct PlacedFold {
    /// Position in [`crate::domain::Domains::list`].
    pub domain: usize,
    /// The structure whose poles lie along the girdle.
    pub structure: Structure,
    /// How many readings.
    pub n: usize,
    /// The axis and its quality.
    pub fold: FoldAxis,
    /// Its limbs, where two were found.
    pub limbs: Option<Limbs>,
    /// A point inside the domain.
    pub at: Coord<f64>,
    /// Trend of the axis from the map's grid north at that point.
    pub grid_azimuth: Option<GridAzimuth>,
}

/// One orientation set.
#[derive(Debug, Clone)]
pub struct PlacedSet {
    /// Position in [`crate::domain::Domains::list`].
    pub domain: usize,
    /// The structure.
    pub structure: Structure,
    /// Number of the set within the domain and structure, from 1, the heaviest first.
    pub number: u32,
    /// The set.
    pub set: AxisSet,
    /// A point inside the domain.
    pub at: Coord<f64>,
    /// Mean strike or trend from the map's grid north at that point.
    pub grid_azimuth: Option<GridAzimuth>,
}

/// Strike of the plane with pole `axis`, or trend of the line along it; degrees from true north.
pub fn azimuth_of(axis: Axis, kind: Kind) -> f64 {
    match kind {
        Kind::Planar => Plane::from_pole(axis).strike.map_or(0.0, |s| s.degrees()),
        Kind::Linear => axis.trend(),
    }
}

/// Dip of the plane with pole `axis`, or plunge of the line along it.
pub(super) fn inclination_of(axis: Axis, kind: Kind) -> f64 {
    match kind {
        Kind::Planar => Plane::from_pole(axis).dip.degrees(),
        Kind::Linear => axis.plunge(),
    }
}

/// Strike of the mean plane or trend of the mean line, where there is a mean.
pub fn symbol_azimuth(placed: &PlacedFabric) -> Option<f64> {
    placed.fabric.mean.map(|mean| azimuth_of(mean, placed.structure.kind))
}

/// Clockwise and counter-clockwise turn of a symbol.
pub(super) fn turns(azimuth: Option<GridAzimuth>) -> Option<(f64, f64)> {
    let rotation = Rotation::along(azimuth?);
    Some((rotation.clockwise(), rotation.counter_clockwise()))
}
