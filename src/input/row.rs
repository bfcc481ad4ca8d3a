//! Why a row is refused.

use super::dates::advice;
use super::structures::Unknown;
use crate::crs::MODEL_YEARS;
use crate::orientation::notation::{NotationError, shown};
use thiserror::Error;

/// Heaviest weight a reading may have.
pub(super) const HEAVIEST: f64 = 1e6;

/// Code of a latitude out of range whose longitude could be one.
pub(super) const LOOKS_SWAPPED: &str = "position-swapped";

/// Why a row cannot be used.
#[derive(Debug, Clone, PartialEq, Error)]
pub(super) enum RowFault {
    #[error(transparent)]
    Attitude(#[from] NotationError),
    #[error("the row has no attitude")]
    NoAttitude,
    #[error("the row has no position")]
    NoPosition,
    #[error("the shape is not a single point")]
    NotAPoint,
    #[error("{} is a code for a missing value, not a coordinate", shown(*.0))]
    PositionCode(f64),
    #[error("{what} {} is outside -{high} to {high}", shown(*.value))]
    PositionRange { what: &'static str, value: f64, high: f64 },
    #[error("latitude {} is outside -90 to 90", shown(*.0))]
    LooksSwapped(f64),
    #[error("the value is not a number")]
    NotANumber,
    #[error("the value is not a finite number")]
    NotFinite,
    #[error("the row does not say which structure it is")]
    NoStructure,
    #[error("{}, and whether it is planar or linear is not said", .0.what)]
    UnknownKind(Box<Unknown>),
    #[error("weight {} is not above 0 and up to 1000000", shown(*.0))]
    Weight(f64),
    #[error("the row has no declination")]
    NoDeclination,
    #[error("declination {} is not within -180 to 180 degrees", shown(*.0))]
    Declination(f64),
    #[error("height {} is not within -12000 to 9000 metres", shown(*.0))]
    Elevation(f64),
    #[error("the row has no date, and the source has none")]
    NoDate,
    #[error("{0:?} is not a date")]
    Date(String),
    #[error("no geomagnetic model covers the date {date} (years {MODEL_YEARS})")]
    DateOutsideModels { date: String },
    #[error("{0:?} can be day/month or month/day, and no row of the column tells which")]
    DateOrder(String),
}

impl RowFault {
    /// Stable, in kebab-case.
    pub fn code(&self) -> &'static str {
        match self {
            Self::Attitude(e) => e.code(),
            Self::NoAttitude => "attitude-missing",
            Self::NoPosition => "position-missing",
            Self::NotAPoint => "not-a-point",
            Self::PositionCode(_) => "missing-value-code",
            Self::PositionRange { .. } => "position-out-of-range",
            Self::LooksSwapped(_) => LOOKS_SWAPPED,
            Self::NotANumber => "not-a-number",
            Self::NotFinite => "not-finite",
            Self::NoStructure => "structure-missing",
            Self::UnknownKind(_) => "structure-kind-unknown",
            Self::Weight(_) => "weight-out-of-range",
            Self::NoDeclination => "declination-missing",
            Self::Declination(_) => "declination-out-of-range",
            Self::Elevation(_) => "height-out-of-range",
            Self::NoDate => "date-missing",
            Self::Date(_) => "date-unreadable",
            Self::DateOrder(_) => "date-ambiguous",
            Self::DateOutsideModels { .. } => "no-declination-model",
        }
    }
    /// The whole sentence, with advice where there is some; what stood in the column where the fault itself does
    /// not say it.
    pub fn reason(&self, column: Option<&str>, value: Option<&str>) -> String {
        let hint = match self {
            Self::Attitude(e) => e.hint(),
            Self::UnknownKind(unknown) => Some(unknown.advice.clone()),
            Self::LooksSwapped(_) => Some("x and y look exchanged: x is the longitude, y the latitude".to_owned()),
            Self::DateOutsideModels { .. } => Some("check the date, or give a declination".to_owned()),
            Self::NotANumber => Some("write digits with a decimal point, without units or thousands marks".to_owned()),
            Self::Date(text) => Some(advice(text).to_owned()),
            Self::DateOrder(_) => Some("write it as 2024-06-01".to_owned()),
            _ => None,
        };
        let what = match (self, column, value) {
            (Self::NotANumber, Some(column), Some(value)) => format!("{column} {value:?} is not a number"),
            (Self::NotFinite, Some(column), Some(value)) => format!("{column} {value:?} is not a finite number"),
            (Self::NoPosition, Some(column), _) => format!("{self}: {column} is blank"),
            (Self::PositionCode(_) | Self::PositionRange { .. } | Self::LooksSwapped(_), Some(column), _) => {
                format!("{column}: {self}")
            }
            _ => self.to_string(),
        };
        match hint {
            Some(hint) => format!("{what}; {hint}"),
            None => what,
        }
    }
}
