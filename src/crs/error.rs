//! What stops a job because of a CRS or a north.

use thiserror::Error;

/// Why positions or azimuths cannot be settled. [`CrsError::hint`] says what to do about it.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum CrsError {
    /// Nothing was given.
    #[error("no coordinate reference system is given")]
    Missing,
    /// PROJ does not know what was given.
    #[error("{definition:?} is not a coordinate reference system that PROJ knows: {reason}")]
    Unknown {
        /// As the user wrote it, shortened.
        definition: String,
        /// PROJ's words.
        reason: String,
    },
    /// A CRS, but none that a map can be drawn in.
    #[error("{definition:?} is {what}, and a map needs a projected or geographic CRS")]
    Unsuited {
        /// As the user wrote it, shortened.
        definition: String,
        /// What it is instead, with its article.
        what: &'static str,
    },
    /// Axes that count towards west and south.
    #[error("the axes of {crs} point west and south, so that its grid north is not up on a map")]
    AxesReversed {
        /// Name of the CRS.
        crs: String,
    },
    /// No way from one CRS to the other.
    #[error("there is no transformation from {from} to {to}: {reason}")]
    NoTransformation {
        /// Name of the first CRS.
        from: String,
        /// Name of the second CRS.
        to: String,
        /// PROJ's words.
        reason: String,
    },
    /// Azimuths from grid north, but no grid.
    #[error("azimuths are said to count from grid north, but {crs} is geographic and has no grid")]
    NoGrid {
        /// Name of the source's CRS.
        crs: String,
    },
    /// A declination that cannot be one.
    #[error("a declination of {value} degrees is not within -180 to 180")]
    Declination {
        /// The number given.
        value: f64,
    },
    /// A column that is needed and is not as long as the others.
    #[error("for {rows} readings there are {values} {what}")]
    Lengths {
        /// What the column holds.
        what: &'static str,
        /// Readings.
        rows: usize,
        /// Values.
        values: usize,
    },
    /// Coordinates in the wrong order.
    #[error(
        "{swapped} of {stations} {} outside the area of use ({area}), but would be inside with x and y exchanged: \
         {x} and {y} (row {row}) look like {}",
        if *.stations == 1 { "position lies" } else { "positions lie" },
        if *.geographic { "latitude, longitude" } else { "northing, easting" }
    )]
    Swapped {
        /// Positions that only fit when exchanged.
        swapped: usize,
        /// All positions of the source.
        stations: usize,
        /// Where they were expected.
        area: String,
        /// First such position, as given.
        x: f64,
        /// First such position, as given.
        y: f64,
        /// Its row.
        row: u64,
        /// Whether the source's CRS is geographic.
        geographic: bool,
    },
    /// No station to choose a map CRS by.
    #[error("no station has a usable position, so no map CRS can be chosen")]
    NoCentroid,
    /// Stations so spread over the globe that no UTM zone is theirs.
    #[error("the stations are spread over the whole globe, so no UTM zone is theirs")]
    NoZone,
    /// Any of these, with the source it happened in.
    #[error("{source_name}: {cause}")]
    InSource {
        /// The source as the user named it.
        source_name: String,
        /// What happened.
        cause: Box<CrsError>,
    },
}

impl CrsError {
    /// The same error, with the source it happened in.
    pub fn in_source(self, source: &str) -> Self {
        Self::InSource { source_name: source.to_owned(), cause: Box::new(self) }
    }

    /// The source it happened in, where one is known.
    pub fn source_name(&self) -> Option<&str> {
        match self {
            Self::InSource { source_name, .. } => Some(source_name),
            _ => None,
        }
    }

    /// What the user can do about it.
    pub fn hint(&self) -> Option<&'static str> {
        Some(match self {
            Self::Missing => "set crs, for example crs = \"EPSG:4326\" for GPS longitudes and latitudes",
            Self::Unknown { .. } => {
                "give an authority code such as \"EPSG:32630\", a WKT or PROJJSON text, or a PROJ string"
            }
            Self::Unsuited { what, .. } if what.contains("engineering") => {
                "a local grid has no known place on Earth: tie it to one first, or give the CRS it was laid out in"
            }
            Self::Unsuited { what, .. } if what.contains("vertical") => {
                "heights alone place nothing on a map: give the horizontal CRS of the positions"
            }
            Self::Unsuited { what, .. } if what.contains("geocentric") => {
                "convert X, Y, Z to longitude and latitude first, or give the CRS of the positions"
            }
            Self::Unsuited { .. } => {
                "give a projected CRS such as a UTM zone, or a geographic one such as \"EPSG:4326\""
            }
            Self::AxesReversed { .. } => "take an east-north CRS for the same ground, for example its UTM zone",
            Self::NoTransformation { .. } => "the two may belong to different planets, or a datum may be missing",
            Self::NoGrid { .. } => {
                "set north to \"true\" or \"magnetic\", or give the projected CRS whose grid was used"
            }
            Self::Declination { .. } => "declination is in degrees, east positive",
            Self::Lengths { .. } => return None,
            Self::Swapped { .. } => {
                "exchange the x and y columns: x is the easting or longitude, y the northing or latitude"
            }
            Self::NoCentroid => "check the position columns and crs, or set the map's crs",
            Self::NoZone => "set the map's crs",
            Self::InSource { cause, .. } => return cause.hint(),
        })
    }
}
