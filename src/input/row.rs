//! Why a row is refused.

use crate::orientation::notation::NotationError;
use thiserror::Error;

/// Heaviest weight a reading may have.
pub(super) const HEAVIEST: f64 = 1e6;

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
    #[error("{0} is a code for a missing value, not a coordinate")]
    PositionCode(f64),
    #[error("coordinate {value} is outside -{high} to {high}")]
    PositionRange { value: f64, high: f64 },
    #[error("the value is not a number")]
    NotANumber,
    #[error("the value is not a finite number")]
    NotFinite,
    #[error("the row does not say which structure it is")]
    NoStructure,
    #[error("\"{0}\" is no structure known here, and whether it is planar or linear is not said")]
    UnknownKind(String),
    #[error("weight {0} is not above 0 and up to 1000000")]
    Weight(f64),
    #[error("the row has no declination")]
    NoDeclination,
    #[error("declination {0} is not within -180 to 180 degrees")]
    Declination(f64),
    #[error("height {0} is not within -12000 to 9000 metres")]
    Elevation(f64),
    #[error("the row has no date, and the source has none")]
    NoDate,
    #[error("\"{0}\" is not a date")]
    Date(String),
    #[error("\"{0}\" can be day/month or month/day, and no row of the column tells which")]
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
        }
    }
    /// The whole sentence, with advice where there is some.
    pub fn reason(&self) -> String {
        let hint = match self {
            Self::Attitude(e) => e.hint(),
            Self::UnknownKind(_) => {
                Some("map it to a structure under [structures], or say there whether it is planar or linear".to_owned())
            }
            Self::NotANumber => Some("write digits with a decimal point, without units or thousands marks".to_owned()),
            Self::Date(_) | Self::DateOrder(_) => Some("write it as 2024-06-01".to_owned()),
            _ => None,
        };
        match hint {
            Some(hint) => format!("{self}; {hint}"),
            None => self.to_string(),
        }
    }
}
