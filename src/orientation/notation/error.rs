//! Why something written is not an attitude.

use super::compass::{CompassPoint, between, compass_point};
use super::{Notation, STRIKE_TOLERANCE, shown};
use std::fmt;
use thiserror::Error;

/// Which number is meant.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Quantity {
    /// Strike, dip direction or trend: not said which.
    Azimuth,
    /// Strike.
    Strike,
    /// Dip direction.
    DipDirection,
    /// Trend.
    Trend,
    /// Dip.
    Dip,
    /// Plunge.
    Plunge,
    /// Rake.
    Rake,
}

impl fmt::Display for Quantity {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            Self::Azimuth => "azimuth",
            Self::Strike => "strike",
            Self::DipDirection => "dip direction",
            Self::Trend => "trend",
            Self::Dip => "dip",
            Self::Plunge => "plunge",
            Self::Rake => "rake",
        })
    }
}

/// Why something written is not an attitude.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum NotationError {
    /// A number that is needed is not there.
    #[error("there is no {0}")]
    Missing(Quantity),
    /// Text where a number belongs.
    #[error("{text:?} is not a {quantity} in degrees")]
    NotANumber {
        /// Which number was wanted.
        quantity: Quantity,
        /// What stood there.
        text: String,
    },
    /// NaN or infinite.
    #[error("{quantity} is not a finite number")]
    NotFinite {
        /// Which number.
        quantity: Quantity,
    },
    /// A number that databases use for "no value".
    #[error("{} is a code for a missing value, not a {quantity}", shown(*.value))]
    MissingCode {
        /// Which number.
        quantity: Quantity,
        /// The code.
        value: f64,
    },
    /// An azimuth below zero.
    #[error("{quantity} {} is negative; azimuths count clockwise from 0", shown(*.value))]
    NegativeAzimuth {
        /// Which number.
        quantity: Quantity,
        /// The number.
        value: f64,
    },
    /// An azimuth of two turns or more.
    #[error("{quantity} {} is not an azimuth (0 to 360; up to 720 is taken back by one turn)", shown(*.value))]
    AzimuthRange {
        /// Which number.
        quantity: Quantity,
        /// The number.
        value: f64,
    },
    /// A dip outside [0, 90].
    #[error("dip {} is outside 0 to 90 degrees", shown(*.0))]
    DipRange(f64),
    /// A plunge outside [0, 90].
    #[error("plunge {} is outside 0 to 90 degrees", shown(*.0))]
    PlungeRange(f64),
    /// A plunge above the horizontal, of a line without a sense.
    #[error("plunge {} is negative", shown(*.0))]
    NegativePlunge(f64),
    /// A rake outside its range.
    #[error("rake {} is outside 0 to {high} degrees", shown(*.value))]
    RakeRange {
        /// The number.
        value: f64,
        /// 180, or 90 where compass letters name the end it is measured from.
        high: f64,
    },
    /// Compass letters that are not a bearing.
    #[error("{0:?} is not a quadrant bearing")]
    QuadrantBearing(String),
    /// Letters that name no compass point.
    #[error("{0:?} is not a compass point")]
    CompassPoint(String),
    /// A strike in quadrant notation that does not say which way the plane dips.
    #[error("strike {0} does not say to which side the plane dips")]
    DipQuadrantMissing(f64),
    /// The dip letters do not belong to the azimuth.
    #[error("{quantity} {azimuth} and dip quadrant {point} contradict each other")]
    QuadrantContradicts {
        /// What `azimuth` was read as.
        quantity: Quantity,
        /// As read.
        azimuth: f64,
        /// The letters.
        point: &'static str,
    },
    /// Strike and dip direction are not a right angle apart.
    #[error("strike {strike} and dip direction {dip_direction} contradict each other{}", hand(.notation))]
    AzimuthsContradict {
        /// As read.
        strike: f64,
        /// As read.
        dip_direction: f64,
        /// How the strike was to be read.
        notation: Notation,
    },
    /// The rake's letters name no end of the strike line.
    #[error("rake end {point} lies on neither end of strike {strike}")]
    RakeEnd {
        /// Right-hand strike of the plane.
        strike: f64,
        /// The letters.
        point: &'static str,
    },
    /// Two numbers of which either could be the trend.
    #[error("{0:?} can be read as trend and plunge or as plunge and trend")]
    OrderAmbiguous(String),
    /// No notation known here.
    #[error("{0:?} is not an attitude in any notation known here")]
    Unreadable(String),
    /// Trend and plunge given for a plane.
    #[error("a trend and a plunge do not say how a plane lies")]
    PlaneByTrend,
    /// A word that names no polarity, or more than one.
    #[error("{0:?} does not say upright or overturned")]
    Polarity(String),
}

/// Where a hand was declared, it is what the two contradict.
fn hand(notation: &Notation) -> &'static str {
    match notation {
        Notation::RightHand => " (the strike read as right-hand)",
        Notation::LeftHand => " (the strike read as left-hand)",
        _ => "",
    }
}

impl NotationError {
    /// The code written into the list of refused rows; stable.
    pub fn code(&self) -> &'static str {
        match self {
            Self::Missing(Quantity::Dip) => "dip-missing",
            Self::Missing(Quantity::Plunge) => "plunge-missing",
            Self::Missing(Quantity::Rake) => "rake-missing",
            Self::Missing(_) => "azimuth-missing",
            Self::NotANumber { .. } => "not-a-number",
            Self::NotFinite { .. } => "not-finite",
            Self::MissingCode { .. } => "missing-value-code",
            Self::NegativeAzimuth { .. } => "azimuth-negative",
            Self::AzimuthRange { .. } => "azimuth-out-of-range",
            Self::DipRange(_) => "dip-out-of-range",
            Self::PlungeRange(_) => "plunge-out-of-range",
            Self::NegativePlunge(_) => "plunge-negative",
            Self::RakeRange { .. } => "rake-out-of-range",
            Self::QuadrantBearing(_) => "quadrant-bearing-unreadable",
            Self::CompassPoint(_) => "compass-point-unknown",
            Self::DipQuadrantMissing(_) => "dip-quadrant-missing",
            Self::QuadrantContradicts { .. } => "dip-quadrant-contradicts",
            Self::AzimuthsContradict { .. } => "strike-contradicts-dip-direction",
            Self::RakeEnd { .. } => "rake-end-contradicts",
            Self::OrderAmbiguous(_) => "order-ambiguous",
            Self::Unreadable(_) => "attitude-unreadable",
            Self::PlaneByTrend => "plane-by-trend-plunge",
            Self::Polarity(_) => "polarity-unknown",
        }
    }

    /// What the user can do about it.
    pub fn hint(&self) -> Option<String> {
        Some(match self {
            Self::Missing(Quantity::Azimuth | Quantity::Strike | Quantity::DipDirection) => {
                "only a horizontal plane (dip 0) may leave it blank".into()
            }
            Self::Missing(Quantity::Trend) => "only a vertical line (plunge 90) may leave it blank".into(),
            Self::DipRange(v) if *v > 90.0 && *v <= 180.0 => {
                format!("for an overturned bed write dip {} and polarity overturned", 180.0 - v)
            }
            Self::DipRange(v) if *v < 0.0 => "write the dip as positive, with the other dip direction".into(),
            Self::NegativePlunge(v) if *v >= -90.0 => {
                format!("write plunge {} with the opposite trend, or list the structure as directed", -v)
            }
            Self::NegativeAzimuth { value, .. } if *value > -360.0 => {
                format!("if it counts counter-clockwise, write {}", value + 360.0)
            }
            Self::RakeRange { .. } => {
                "rake is measured downward from the right-hand strike (0 to 180), or from a named end (0 to 90)".into()
            }
            Self::QuadrantBearing(_) => "write for example N45E, S20W, E-W".into(),
            Self::CompassPoint(_) => "write N, NE, ENE, E, ...".into(),
            Self::DipQuadrantMissing(_) => {
                "add the dip quadrant (N45E 30SE), or declare notation = \"right-hand\"".into()
            }
            Self::QuadrantContradicts { quantity: Quantity::Strike, azimuth, point } => {
                let either = |p: CompassPoint| p.covers(azimuth + 90.0) || p.covers(azimuth - 90.0);
                if compass_point(point).is_some_and(either) {
                    "the letters name the other side; with notation = \"quadrant\" they decide it".into()
                } else {
                    "a plane dips at a right angle to its strike, and the letters name neither side of it".into()
                }
            }
            Self::AzimuthsContradict { strike, dip_direction, notation } => {
                let left = between(strike - 90.0, *dip_direction) <= STRIKE_TOLERANCE;
                let right = between(strike + 90.0, *dip_direction) <= STRIKE_TOLERANCE;
                match notation {
                    Notation::RightHand if left => "they agree as a left-hand strike".into(),
                    Notation::LeftHand if right => "they agree as a right-hand strike".into(),
                    _ => format!("they should be 90 degrees apart, within {STRIKE_TOLERANCE}"),
                }
            }
            Self::OrderAmbiguous(_) => "write the trend with three digits: 045/30".into(),
            Self::Unreadable(_) => "write for example 045/45, 045/45 SE, N45E 45SE, 225->30".into(),
            Self::PlaneByTrend => "set notation to dip-direction or right-hand for planes".into(),
            _ => return None,
        })
    }
}
