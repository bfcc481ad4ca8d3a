//! Readings as a set: where, what structure, which attitude. Struct of arrays, one entry per reading.

use crate::orientation::{Attitude, GridAzimuth, Measured, Polarity};
use crate::table::TextColumn;
use geo_types::Coord;

/// Planar or linear: what an attitude of this structure is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Kind {
    /// Has strike and dip; statistics work on its pole.
    Planar,
    /// Has trend and plunge.
    Linear,
}

impl Kind {
    /// The word written into layers.
    pub fn word(self) -> &'static str {
        match self {
            Self::Planar => "planar",
            Self::Linear => "linear",
        }
    }
}

/// The structures of the contract, with their kinds.
pub const STRUCTURES: [(&str, Kind); 14] = [
    ("bedding", Kind::Planar),
    ("foliation", Kind::Planar),
    ("cleavage", Kind::Planar),
    ("igneous_foliation", Kind::Planar),
    ("joint", Kind::Planar),
    ("fault", Kind::Planar),
    ("vein", Kind::Planar),
    ("dike", Kind::Planar),
    ("contact", Kind::Planar),
    ("axial_plane", Kind::Planar),
    ("lineation", Kind::Linear),
    ("fold_axis", Kind::Linear),
    ("slickenline", Kind::Linear),
    ("intersection_lineation", Kind::Linear),
];

/// The kind of a structure of the contract; `None` for a name of the user's own.
pub fn kind_of(structure: &str) -> Option<Kind> {
    STRUCTURES.iter().find(|(name, _)| *name == structure).map(|&(_, kind)| kind)
}

/// A structure as it occurs in a reading set.
#[derive(Debug, Clone, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Structure {
    /// Its name in layers.
    pub name: String,
    /// Planar or linear.
    pub kind: Kind,
}

/// Which north a source's azimuths count from.
#[derive(Debug, Clone, PartialEq)]
pub enum North {
    /// Geographic north.
    True,
    /// Grid north of the source's own CRS.
    Grid,
    /// Magnetic north, with how the declination is known.
    Magnetic(Declination),
}

/// How the declination of a source is known.
#[derive(Debug, Clone, PartialEq)]
pub enum Declination {
    /// One number for the source, degrees, east positive.
    Constant(f64),
    /// A number per reading ([`Measurements::declination`]).
    PerReading,
    /// The geomagnetic model at the station's place and date ([`Measurements::year`]).
    Model,
}

/// The accepted rows of one source, before positions and azimuths are settled.
/// All vectors have one entry per accepted row, in source order.
#[derive(Debug, Clone, PartialEq)]
pub struct Measurements {
    /// The source as the user named it.
    pub source: String,
    /// CRS of `position`, an authority code or WKT.
    pub crs: String,
    /// Which north `measured` counts from.
    pub north: North,
    /// Structures that `structure` points into.
    pub structures: Vec<Structure>,
    /// Row of the source's table (0-based index).
    pub table_row: Vec<u32>,
    /// Line number or feature id of the row.
    pub source_row: Vec<u64>,
    /// Station id where the source has one.
    pub station_id: TextColumn,
    /// Place in the source's CRS, easting or longitude first.
    pub position: Vec<Coord<f64>>,
    /// Height in metres where given, else 0; only the geomagnetic model uses it.
    pub elevation: Vec<f32>,
    /// Index into `structures`.
    pub structure: Vec<u16>,
    /// The attitude as read.
    pub measured: Vec<Measured>,
    /// Polarity.
    pub polarity: Vec<Polarity>,
    /// Weight, (0, 1e6]; 1 where the source has none.
    pub weight: Vec<f64>,
    /// Declination in degrees, for [`Declination::PerReading`]; else empty.
    pub declination: Vec<f64>,
    /// Decimal year of the reading, for [`Declination::Model`]; else empty.
    pub year: Vec<f64>,
}

/// All readings of the job, on the map: positions in the map CRS, azimuths from true north.
/// All vectors have one entry per reading, sources one after another.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Readings {
    /// Source names.
    pub sources: Vec<String>,
    /// Structures of all sources, sorted by name.
    pub structures: Vec<Structure>,
    /// Index into `sources`.
    pub source: Vec<u16>,
    /// Row of that source's table (0-based index).
    pub table_row: Vec<u32>,
    /// Line number or feature id of the row.
    pub source_row: Vec<u64>,
    /// Station id where the source has one.
    pub station_id: TextColumn,
    /// Place in the map CRS.
    pub position: Vec<Coord<f64>>,
    /// Index into `structures`.
    pub structure: Vec<u16>,
    /// The attitude, from true north.
    pub attitude: Vec<Attitude>,
    /// Azimuth (strike or trend) from grid north of the map; `None` where the reading has no azimuth.
    pub grid_azimuth: Vec<Option<GridAzimuth>>,
    /// Polarity.
    pub polarity: Vec<Polarity>,
    /// Weight.
    pub weight: Vec<f64>,
    /// Declination that was added, degrees east; NaN for sources not read against magnetic north.
    pub declination: Vec<f64>,
    /// Convergence of the map CRS at the place, degrees, positive when grid north lies east of true north.
    pub convergence: Vec<f64>,
}

impl Readings {
    /// Number of readings.
    pub fn len(&self) -> usize {
        self.position.len()
    }
    /// True where there are none.
    pub fn is_empty(&self) -> bool {
        self.position.is_empty()
    }
}
