//! Ranges, and the numbers that stand for "no value".

use super::{NotationError, Quantity};
use crate::orientation::{Bearing, Dip, Measured};

/// True for the numbers that databases write where there is no value and that no angle here can be.
///
/// -9, -99, ... and 999, 9999, ... ; 99 too, but it is an azimuth. Common practice, no source.
pub fn is_missing_code(value: f64) -> bool {
    [-9.0, -99.0, -999.0, -9999.0, -99999.0, 99.0, 999.0, 9999.0, 99999.0].contains(&value)
}

/// An azimuth in [0, 360), and whether it was wrapped.
///
/// The rule: [360, 720) is taken back by one turn (a strike made a dip direction by adding 90 runs over);
/// below 0 and from 720 on is refused.
pub fn azimuth(quantity: Quantity, value: f64) -> Result<(f64, bool), NotationError> {
    if (0.0..360.0).contains(&value) {
        Ok((value, false))
    } else if !value.is_finite() {
        Err(NotationError::NotFinite { quantity })
    } else if is_missing_code(value) {
        Err(NotationError::MissingCode { quantity, value })
    } else if value < 0.0 {
        Err(NotationError::NegativeAzimuth { quantity, value })
    } else if value < 720.0 {
        Ok((value - 360.0, true))
    } else {
        Err(NotationError::AzimuthRange { quantity, value })
    }
}

/// A dip or plunge in [0, 90]; `quantity` says which.
pub fn inclination(quantity: Quantity, value: f64) -> Result<Dip, NotationError> {
    if let Ok(dip) = Dip::new(value) {
        return Ok(dip);
    }
    Err(if !value.is_finite() {
        NotationError::NotFinite { quantity }
    } else if is_missing_code(value) {
        NotationError::MissingCode { quantity, value }
    } else if quantity == Quantity::Dip {
        NotationError::DipRange(value)
    } else if (-90.0..0.0).contains(&value) {
        NotationError::NegativePlunge(value)
    } else {
        NotationError::PlungeRange(value)
    })
}

/// A plunge in [-90, 90] of a line with a sense: its size, and whether it points up.
pub fn plunge_with_sense(value: f64) -> Result<(Dip, bool), NotationError> {
    let up = (-90.0..0.0).contains(&value);
    inclination(Quantity::Plunge, if up { -value } else { value }).map(|dip| (dip, up))
}

/// A line from its trend (in [0, 360), or none for a vertical line) and plunge.
pub fn line(trend: Option<f64>, plunge: Dip) -> Result<Measured, NotationError> {
    let trend = match trend {
        Some(trend) => trend,
        None if plunge.degrees() == 90.0 => 0.0,
        None => return Err(NotationError::Missing(Quantity::Trend)),
    };
    Ok(Measured::Line { trend: bearing(Quantity::Trend, trend)?, plunge })
}

pub(super) fn bearing(quantity: Quantity, degrees: f64) -> Result<Bearing, NotationError> {
    Bearing::new(degrees).map_err(|_| NotationError::NotFinite { quantity })
}

/// A rake in [0, `high`].
pub(super) fn rake(value: f64, high: f64) -> Result<f64, NotationError> {
    if (0.0..=high).contains(&value) {
        Ok(value)
    } else if !value.is_finite() {
        Err(NotationError::NotFinite { quantity: Quantity::Rake })
    } else if is_missing_code(value) {
        Err(NotationError::MissingCode { quantity: Quantity::Rake, value })
    } else {
        Err(NotationError::RakeRange { value, high })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn azimuths_over_a_turn_are_taken_back_and_others_named() {
        assert_eq!(azimuth(Quantity::Strike, 99.0), Ok((99.0, false)));
        for (given, want) in [(360.0, 0.0), (385.0, 25.0), (442.0, 82.0), (719.5, 359.5)] {
            assert_eq!(azimuth(Quantity::DipDirection, given), Ok((want, true)));
        }
        for (given, code) in [
            (-99.0, "missing-value-code"),
            (-9.0, "missing-value-code"),
            (999.0, "missing-value-code"),
            (-9999.0, "missing-value-code"),
            (-10.0, "azimuth-negative"),
            (720.0, "azimuth-out-of-range"),
            (1e308, "azimuth-out-of-range"),
            (f64::NAN, "not-finite"),
            (f64::INFINITY, "not-finite"),
        ] {
            assert_eq!(azimuth(Quantity::Azimuth, given).unwrap_err().code(), code, "{given}");
        }
    }

    #[test]
    fn dips_out_of_range_say_what_to_write() {
        let overturned = inclination(Quantity::Dip, 120.0).unwrap_err();
        assert_eq!(overturned.code(), "dip-out-of-range");
        assert_eq!(overturned.hint().unwrap(), "for an overturned bed write dip 60 and polarity overturned");
        assert_eq!(
            inclination(Quantity::Dip, -99.0).unwrap_err().to_string(),
            "-99 is a code for a missing value, not a dip"
        );
        assert_eq!(inclination(Quantity::Dip, 99.0).unwrap_err().code(), "missing-value-code");
        assert_eq!(inclination(Quantity::Plunge, -20.0).unwrap_err().code(), "plunge-negative");
        assert_eq!(plunge_with_sense(-9.0).unwrap(), (Dip::new(9.0).unwrap(), true));
        assert!(plunge_with_sense(-99.0).is_err());
    }
}
