//! Why a table as a whole cannot be read.

use crate::orientation::notation::shown;
use thiserror::Error;

/// Why a source of stations cannot be read.
#[derive(Debug, Clone, PartialEq, Error)]
#[error("{file}: {fault}")]
pub struct InputError {
    /// The source as the user named it.
    pub file: String,
    /// What is wrong.
    pub fault: InputFault,
}

impl InputError {
    /// What the user can do about it.
    pub fn hint(&self) -> Option<String> {
        self.fault.hint()
    }
}

/// What is wrong with a source of stations.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum InputFault {
    /// A column the user named is not there.
    #[error("there is no column {column:?} (key {key}); the columns are: {}", list(.columns))]
    NoSuchColumn {
        /// Key under `[stations.columns]`.
        key: &'static str,
        /// The name given.
        column: String,
        /// A column with nearly that name.
        nearest: Option<String>,
        /// The names there are.
        columns: Vec<String>,
    },
    /// Two columns are equally good for one meaning.
    #[error("{} are equally good for {meaning}", list(.candidates))]
    Ambiguous {
        /// Key under `[stations.columns]`.
        key: &'static str,
        /// What is meant, in words.
        meaning: &'static str,
        /// The columns, or pairs of columns.
        candidates: Vec<String>,
    },
    /// No column could be found for a meaning that must be there.
    #[error("no column says {what}; the columns are: {}", list(.columns))]
    NoColumn {
        /// What is missing, in words.
        what: &'static str,
        /// Key or keys under `[stations.columns]`.
        keys: &'static str,
        /// Columns whose names come near.
        near: Vec<String>,
        /// The names there are.
        columns: Vec<String>,
    },
    /// Neither a structure column nor a fixed value.
    #[error("no column says which structure a row is; the columns are: {}", list(.columns))]
    NoStructure {
        /// Columns whose names come near.
        near: Vec<String>,
        /// The names there are.
        columns: Vec<String>,
    },
    /// One column named for two meanings.
    #[error("keys {first} and {second} both name column {column:?}")]
    SameColumn {
        /// Key under `[stations.columns]`.
        first: &'static str,
        /// The other key.
        second: &'static str,
        /// The column.
        column: String,
    },
    /// Latitudes out of range that would be longitudes.
    #[error("{swapped} of {rows} rows have longitude and latitude exchanged; row {row}: {reason}")]
    Swapped {
        /// Rows that fit only when exchanged.
        swapped: usize,
        /// All rows.
        rows: usize,
        /// The first such row.
        row: u64,
        /// Why it is refused.
        reason: String,
    },
    /// The notation and the name of the only azimuth column speak of different things.
    #[error("notation = \"{notation}\", but the only azimuth column, {column:?}, is by its name a {meaning}")]
    NotationDisagrees {
        /// As declared.
        notation: &'static str,
        /// The column.
        column: String,
        /// What its name says.
        meaning: &'static str,
    },
    /// Nobody says which CRS the positions are in.
    #[error("nothing says in which coordinate reference system the positions are")]
    NoCrs {
        /// True where columns named for longitude and latitude hold values in range.
        degrees: bool,
    },
    /// Magnetic north without a declination.
    #[error("north = \"magnetic\", but nothing says the declination")]
    NoDeclination,
    /// A declination that cannot be.
    #[error("declination {} is not within -180 to 180 degrees", shown(*.0))]
    DeclinationRange(f64),
    /// The geomagnetic model needs dates.
    #[error("declination = \"model\" needs a date, and there is none")]
    NoDate,
    /// The date in the area file.
    #[error("{0:?} is not a date")]
    BadDate(String),
    /// More structures than make sense.
    #[error("column {column:?} holds more than {most} different structures")]
    TooManyStructures {
        /// The column.
        column: String,
        /// The limit.
        most: usize,
    },
    /// Columns or shapes of different lengths, or more rows than can be counted.
    #[error("the table has {rows} rows, but {what} has {len}")]
    Ragged {
        /// Rows of the table.
        rows: usize,
        /// The column, or "shapes".
        what: String,
        /// Its length.
        len: usize,
    },
}

fn list(names: &[String]) -> String {
    if names.is_empty() { "none".to_owned() } else { names.join(", ") }
}

fn nearest(near: &[String]) -> String {
    if near.is_empty() { String::new() } else { format!("; the nearest: {}", near.join(", ")) }
}

impl InputFault {
    /// A stable name in kebab-case.
    pub fn code(&self) -> &'static str {
        match self {
            Self::NoSuchColumn { .. } => "no-such-column",
            Self::Ambiguous { .. } => "column-ambiguous",
            Self::NoColumn { .. } => "column-missing",
            Self::NoStructure { .. } => "structure-column-missing",
            Self::SameColumn { .. } => "column-named-twice",
            Self::Swapped { .. } => "position-swapped",
            Self::NotationDisagrees { .. } => "notation-disagrees",
            Self::NoCrs { .. } => "crs-missing",
            Self::NoDeclination => "declination-missing",
            Self::DeclinationRange(_) => "declination-out-of-range",
            Self::NoDate => "date-missing",
            Self::BadDate(_) => "date-unreadable",
            Self::TooManyStructures { .. } => "too-many-structures",
            Self::Ragged { .. } => "table-ragged",
        }
    }
    /// What the user can do about it.
    pub fn hint(&self) -> Option<String> {
        Some(match self {
            Self::NoSuchColumn { nearest: Some(name), .. } => format!("did you mean {name:?}?"),
            Self::NoSuchColumn { .. } | Self::Ragged { .. } => return None,
            Self::Ambiguous { key, .. } => format!("name one under [stations.columns], key {key}"),
            Self::NoColumn { keys, near, .. } => {
                format!("name it under [stations.columns], key {keys}{}", nearest(near))
            }
            Self::NoStructure { near, .. } => format!(
                "where all rows are one structure, write structure = {{ value = \"bedding\" }} under \
                 [stations.columns], else name the column there, key structure{}",
                nearest(near)
            ),
            Self::SameColumn { .. } => "name a column of its own for each under [stations.columns]".into(),
            Self::Swapped { .. } => {
                "exchange the columns: x is the longitude, y the latitude; name them under [stations.columns]".into()
            }
            Self::NotationDisagrees { .. } => {
                "set notation to what the column holds, or name the column under [stations.columns], key azimuth".into()
            }
            Self::NoCrs { degrees: true } => {
                "the values look like longitude and latitude: if they are WGS 84, say crs = \"EPSG:4326\"".into()
            }
            Self::NoCrs { degrees: false } => "say for example crs = \"EPSG:32633\" under [stations]".into(),
            Self::NoDeclination => {
                "say declination = degrees east, or \"model\", or name a column under [stations.columns]".into()
            }
            Self::DeclinationRange(_) => "degrees, east positive".into(),
            Self::NoDate => "say date = 2024-06-01 under [stations], or name a date column".into(),
            Self::BadDate(text) => super::dates::advice(text).into(),
            Self::TooManyStructures { .. } => "name the structure column under [stations.columns]".into(),
        })
    }
}
