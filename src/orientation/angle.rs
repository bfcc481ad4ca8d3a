//! Degrees with a meaning: which north an azimuth counts from is part of its type.

use thiserror::Error;

/// Why a number is not the angle it was offered as.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum AngleError {
    /// NaN or infinite.
    #[error("{0} is not a finite number of degrees")]
    NotFinite(f64),
    /// A dip or plunge outside its range.
    #[error("{value} is outside {low} to {high} degrees")]
    OutOfRange {
        /// The number offered.
        value: f64,
        /// Least allowed.
        low: f64,
        /// Greatest allowed.
        high: f64,
    },
}

/// `degrees` brought into [0, 360). The caller guarantees a finite number.
pub fn wrap_degrees(degrees: f64) -> f64 {
    let wrapped = degrees.rem_euclid(360.0);
    // rem_euclid of a tiny negative number rounds to 360 itself.
    if wrapped >= 360.0 { 0.0 } else { wrapped }
}

macro_rules! azimuth {
    ($(#[$doc:meta])* $name:ident) => {
        $(#[$doc])*
        #[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
        pub struct $name(f64);

        impl $name {
            /// From degrees clockwise; any finite number is brought into [0, 360).
            pub fn new(degrees: f64) -> Result<Self, AngleError> {
                if degrees.is_finite() { Ok(Self(wrap_degrees(degrees))) } else { Err(AngleError::NotFinite(degrees)) }
            }
            /// Degrees clockwise, in [0, 360).
            pub fn degrees(self) -> f64 {
                self.0
            }
            /// The azimuth turned clockwise by `degrees` (a finite number).
            pub fn turned(self, degrees: f64) -> Self {
                debug_assert!(degrees.is_finite());
                Self(wrap_degrees(self.0 + degrees))
            }
        }
    };
}

azimuth! {
    /// Clockwise from geographic north.
    TrueAzimuth
}
azimuth! {
    /// Clockwise from grid north of the map, at one place.
    GridAzimuth
}
azimuth! {
    /// Clockwise from magnetic north, at one place and date.
    MagneticAzimuth
}
azimuth! {
    /// Clockwise from whichever north a source used. Only [`crate::crs`] turns it into one of the others.
    Bearing
}

/// A dip or plunge, degrees downward from horizontal, [0, 90].
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Dip(f64);

impl Dip {
    /// From degrees; refuses what is not in [0, 90].
    pub fn new(degrees: f64) -> Result<Self, AngleError> {
        if !degrees.is_finite() {
            return Err(AngleError::NotFinite(degrees));
        }
        if !(0.0..=90.0).contains(&degrees) {
            return Err(AngleError::OutOfRange { value: degrees, low: 0.0, high: 90.0 });
        }
        Ok(Self(degrees + 0.0)) // + 0.0 turns -0 into 0
    }
    /// Degrees down from horizontal, in [0, 90].
    pub fn degrees(self) -> f64 {
        self.0
    }
}

/// How far a symbol drawn north-up is turned on the map. Built from a grid azimuth alone, so that a
/// true or magnetic one cannot be drawn by mistake.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Rotation(GridAzimuth);

impl Rotation {
    /// The rotation that points a north-up symbol along `azimuth`.
    pub fn along(azimuth: GridAzimuth) -> Self {
        Self(azimuth)
    }
    /// Clockwise degrees, [0, 360): what desktop GIS and the SLD standard want.
    pub fn clockwise(self) -> f64 {
        self.0.degrees()
    }
    /// Counter-clockwise degrees, [0, 360): what some map servers want.
    pub fn counter_clockwise(self) -> f64 {
        wrap_degrees(360.0 - self.0.degrees())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn azimuths_wrap_into_one_turn() {
        for (given, want) in [(0.0, 0.0), (360.0, 0.0), (-90.0, 270.0), (725.5, 5.5), (-1e-18, 0.0)] {
            assert_eq!(TrueAzimuth::new(given).unwrap().degrees(), want);
        }
        assert!(TrueAzimuth::new(f64::NAN).is_err());
        assert!(TrueAzimuth::new(f64::INFINITY).is_err());
    }

    #[test]
    fn dips_stay_between_flat_and_vertical() {
        assert_eq!(Dip::new(90.0).unwrap().degrees(), 90.0);
        assert!(Dip::new(-0.0).unwrap().degrees().is_sign_positive());
        for bad in [-0.1, 90.1, -99.0, f64::NAN, f64::INFINITY] {
            assert!(Dip::new(bad).is_err(), "{bad}");
        }
    }

    #[test]
    fn the_two_rotations_cancel() {
        for degrees in [0.0, 0.25, 90.0, 359.75] {
            let r = Rotation::along(GridAzimuth::new(degrees).unwrap());
            assert_eq!((r.clockwise() + r.counter_clockwise()) % 360.0, 0.0);
        }
    }
}
