//! Planes and lines as a geologist states them, before and after north is settled.

use super::{Axis, Bearing, Dip, TrueAzimuth};

/// Which way the beds young, where someone saw it.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
pub enum Polarity {
    /// Tops face up.
    Upright,
    /// Tops face down.
    Overturned,
    /// Nobody said.
    #[default]
    Unknown,
}

impl Polarity {
    /// The word written into layers.
    pub fn word(self) -> &'static str {
        match self {
            Self::Upright => "upright",
            Self::Overturned => "overturned",
            Self::Unknown => "unknown",
        }
    }
}

/// A plane: strike by the right-hand rule (the plane dips to the right of the strike) and dip.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Plane {
    /// Right-hand strike; `None` for a horizontal plane given without one.
    pub strike: Option<TrueAzimuth>,
    /// Dip, down to the right of the strike.
    pub dip: Dip,
}

impl Plane {
    /// Azimuth of steepest descent: strike + 90.
    pub fn dip_direction(self) -> Option<TrueAzimuth> {
        self.strike.map(|s| s.turned(90.0))
    }
    /// The plane's pole: trend = dip direction + 180, plunge = 90 - dip.
    pub fn pole(self) -> Axis {
        match self.dip_direction() {
            Some(d) => Axis::from_trend_plunge(d.degrees() + 180.0, 90.0 - self.dip.degrees()),
            None => Axis::from_trend_plunge(0.0, 90.0),
        }
    }
    /// The plane whose pole this is. A vertical pole gives a horizontal plane with strike 000.
    pub fn from_pole(pole: Axis) -> Self {
        let strike = TrueAzimuth::new(pole.trend() + 90.0).expect("a finite trend");
        let dip = Dip::new((90.0 - pole.plunge()).clamp(0.0, 90.0)).expect("clamped to its range");
        Self { strike: Some(strike), dip }
    }
}

/// A line: trend and plunge.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Line {
    /// Azimuth of the down-plunge end.
    pub trend: TrueAzimuth,
    /// Plunge, positive down.
    pub plunge: Dip,
}

impl Line {
    /// The line as an axis.
    pub fn axis(self) -> Axis {
        Axis::from_trend_plunge(self.trend.degrees(), self.plunge.degrees())
    }
}

/// What a reading says, with its azimuth from true north.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Attitude {
    /// Bedding, foliation, a joint, a fault plane...
    Plane(Plane),
    /// A lineation, a fold axis, a slickenline...
    Line(Line),
}

impl Attitude {
    /// The axis that statistics work on: a plane's pole, or the line itself.
    pub fn axis(self) -> Axis {
        match self {
            Self::Plane(p) => p.pole(),
            Self::Line(l) => l.axis(),
        }
    }
    /// Strike or trend.
    pub fn azimuth(self) -> Option<TrueAzimuth> {
        match self {
            Self::Plane(p) => p.strike,
            Self::Line(l) => Some(l.trend),
        }
    }
    /// Dip or plunge.
    pub fn inclination(self) -> Dip {
        match self {
            Self::Plane(p) => p.dip,
            Self::Line(l) => l.plunge,
        }
    }
    /// `planar` or `linear`, as layers spell it.
    pub fn kind(self) -> &'static str {
        match self {
            Self::Plane(_) => "planar",
            Self::Line(_) => "linear",
        }
    }
}

/// What a source says, before anyone settled which north its azimuth counts from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Measured {
    /// Right-hand strike (`None` for a horizontal plane given without one) and dip.
    Plane {
        /// Right-hand strike.
        strike: Option<Bearing>,
        /// Dip.
        dip: Dip,
    },
    /// Trend and plunge.
    Line {
        /// Azimuth of the down-plunge end.
        trend: Bearing,
        /// Plunge, positive down.
        plunge: Dip,
    },
}

impl Measured {
    /// Strike or trend as the source counts it.
    pub fn bearing(self) -> Option<Bearing> {
        match self {
            Self::Plane { strike, .. } => strike,
            Self::Line { trend, .. } => Some(trend),
        }
    }
    /// The same reading with its azimuth settled by `resolve`.
    pub fn resolved(self, resolve: impl FnOnce(Bearing) -> TrueAzimuth) -> Attitude {
        match self {
            Self::Plane { strike, dip } => Attitude::Plane(Plane { strike: strike.map(resolve), dip }),
            Self::Line { trend, plunge } => Attitude::Line(Line { trend: resolve(trend), plunge }),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    fn plane(strike: f64, dip: f64) -> Plane {
        Plane { strike: Some(TrueAzimuth::new(strike).unwrap()), dip: Dip::new(dip).unwrap() }
    }

    // Common practice, no source.
    #[test]
    fn a_plane_045_45_se_has_its_pole_at_315_45() {
        let p = plane(45.0, 45.0);
        assert_eq!(p.dip_direction().unwrap().degrees(), 135.0);
        assert_abs_diff_eq!(p.pole().trend(), 315.0, epsilon = 1e-12);
        assert_abs_diff_eq!(p.pole().plunge(), 45.0, epsilon = 1e-12);
    }

    // Common practice, no source.
    #[test]
    fn flat_poles_are_vertical_and_vertical_poles_are_flat() {
        assert_eq!(plane(77.0, 0.0).pole().plunge(), 90.0);
        assert_eq!(plane(77.0, 90.0).pole().plunge(), 0.0);
        assert_eq!(Plane { strike: None, dip: Dip::new(0.0).unwrap() }.pole().plunge(), 90.0);
    }

    #[test]
    fn a_vertical_plane_is_the_same_seen_from_either_side() {
        for strike in [0.0, 30.0, 90.0, 137.5] {
            assert!(plane(strike, 90.0).pole().angle_to(plane(strike + 180.0, 90.0).pole()) < 1e-12);
        }
    }

    #[test]
    fn planes_come_back_from_their_poles() {
        for strike in [0.0, 12.5, 90.0, 181.0, 359.0] {
            for dip in [0.5, 30.0, 89.5] {
                let back = Plane::from_pole(plane(strike, dip).pole());
                assert_abs_diff_eq!(back.strike.unwrap().degrees(), strike, epsilon = 1e-9);
                assert_abs_diff_eq!(back.dip.degrees(), dip, epsilon = 1e-12);
            }
        }
    }
}
