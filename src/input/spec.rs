//! What the user says about a source of stations.

use crate::orientation::notation::Notation;
use crate::station::Kind;
use std::collections::{BTreeMap, BTreeSet};

/// What the user says about one source. `Default` says nothing: everything is guessed and reported.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct StationSpec {
    /// The source as the user named it.
    pub file: String,
    /// CRS of the positions; beats what the source says.
    pub crs: Option<String>,
    /// What the azimuths were read against; true north where nothing is said.
    pub north: Option<NorthReference>,
    /// How the declination is known, with [`NorthReference::Magnetic`].
    pub declination: Option<DeclinationSpec>,
    /// ISO date of all readings without one of their own, for [`DeclinationSpec::Model`].
    pub date: Option<String>,
    /// How the attitude columns are to be read.
    pub notation: Notation,
    /// Which column is what.
    pub columns: ColumnSpec,
    /// Source spelling to structure name.
    pub structures: BTreeMap<String, String>,
    /// Kinds of structures that are the user's own.
    pub kinds: BTreeMap<String, Kind>,
    /// Structures whose lines carry a sense: a negative plunge points up. Such a reading is kept as its lower end with
    /// polarity overturned; one that points down is upright.
    pub directed: BTreeSet<String>,
}

/// What azimuths were read against.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum NorthReference {
    /// Geographic north.
    True,
    /// Grid north of the source's CRS.
    Grid,
    /// The compass needle.
    Magnetic,
}

/// How the declination is known.
#[derive(Debug, Clone, PartialEq)]
pub enum DeclinationSpec {
    /// Degrees, east positive.
    Constant(f64),
    /// A column of degrees, east positive.
    Column(String),
    /// The geomagnetic model at place and date.
    Model,
}

/// Where the structure of a row is said.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum StructureSpec {
    /// In a column.
    Column(String),
    /// Nowhere: all rows are this structure.
    Value(String),
}

/// Source columns by meaning; what is absent is guessed.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct ColumnSpec {
    /// Station id.
    pub id: Option<String>,
    /// Easting or longitude.
    pub x: Option<String>,
    /// Northing or latitude.
    pub y: Option<String>,
    /// Height in metres.
    pub z: Option<String>,
    /// Date of the reading.
    pub date: Option<String>,
    /// Structure.
    pub structure: Option<StructureSpec>,
    /// Strike, dip direction or trend, as the notation says.
    pub azimuth: Option<String>,
    /// Strike, where dip direction or trend have columns of their own.
    pub strike: Option<String>,
    /// Dip direction, beside a strike (both must agree) or instead of one.
    pub dip_direction: Option<String>,
    /// Trend of lines, where planes have columns of their own.
    pub trend: Option<String>,
    /// Dip, or plunge.
    pub dip: Option<String>,
    /// Plunge of lines, where planes have columns of their own.
    pub plunge: Option<String>,
    /// Compass letters of the side a plane dips to.
    pub dip_quadrant: Option<String>,
    /// The whole attitude as one text.
    pub attitude: Option<String>,
    /// Rake of a line in the plane of the same row.
    pub rake: Option<String>,
    /// Way up.
    pub polarity: Option<String>,
    /// Weight of the reading.
    pub weight: Option<String>,
    /// Declination of the reading, degrees east.
    pub declination: Option<String>,
}
