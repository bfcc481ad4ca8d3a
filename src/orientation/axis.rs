//! A direction without sense: the pole of a plane, or a line that has no arrow.

use super::{Dip, TrueAzimuth, wrap_degrees};
use nalgebra::Vector3;
use thiserror::Error;

/// Why three numbers are not an axis.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
pub enum AxisError {
    /// All three components are zero (or too small to normalise).
    #[error("a vector of no length has no direction")]
    Zero,
    /// A component is NaN or infinite.
    #[error("a vector with a component that is not finite has no direction")]
    NotFinite,
}

/// A unit vector without sense, frame east-north-up, kept in its canonical (lower) hemisphere:
/// up < 0; on the horizontal, north > 0; on the east-west line, east > 0... so that x and -x are one value.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Axis(Vector3<f64>);

impl Axis {
    /// From any vector (east, north, up) of non-zero, finite length.
    pub fn new(east: f64, north: f64, up: f64) -> Result<Self, AxisError> {
        if !(east.is_finite() && north.is_finite() && up.is_finite()) {
            return Err(AxisError::NotFinite);
        }
        let scale = east.abs().max(north.abs()).max(up.abs());
        if scale == 0.0 {
            return Err(AxisError::Zero);
        }
        // Scaling first keeps very long and very short vectors from over- or underflowing when squared.
        let v = Vector3::new(east / scale, north / scale, up / scale).normalize();
        Ok(Self(canonical(v)))
    }

    /// From trend and plunge in degrees (trend clockwise from north, plunge down positive; any finite numbers).
    pub fn from_trend_plunge(trend: f64, plunge: f64) -> Self {
        debug_assert!(trend.is_finite() && plunge.is_finite());
        let (sin_t, cos_t) = sin_cos_degrees(trend);
        let (sin_p, cos_p) = sin_cos_degrees(plunge);
        Self(canonical(Vector3::new(cos_p * sin_t, cos_p * cos_t, -sin_p)))
    }

    /// The unit vector (east, north, up), up <= 0.
    pub fn vector(self) -> Vector3<f64> {
        self.0
    }

    /// Trend in degrees, [0, 360); 0 for a vertical axis.
    pub fn trend(self) -> f64 {
        if self.0.x == 0.0 && self.0.y == 0.0 { 0.0 } else { wrap_degrees(self.0.x.atan2(self.0.y).to_degrees()) }
    }

    /// Plunge in degrees, [0, 90].
    pub fn plunge(self) -> f64 {
        // atan2 keeps its precision near the vertical, where asin does not.
        (-self.0.z).atan2(self.0.x.hypot(self.0.y)).to_degrees().clamp(0.0, 90.0)
    }

    /// Trend and plunge as typed angles.
    pub fn trend_plunge(self) -> (TrueAzimuth, Dip) {
        let trend = TrueAzimuth::new(self.trend()).expect("a unit vector has a finite trend");
        let plunge = Dip::new(self.plunge()).expect("plunge is clamped to its range");
        (trend, plunge)
    }

    /// Acute angle to another axis, degrees, [0, 90].
    pub fn angle_to(self, other: Axis) -> f64 {
        // atan2 of cross and dot is exact where acos loses half its digits (near 0).
        let dot = self.0.dot(&other.0).abs();
        self.0.cross(&other.0).norm().atan2(dot).to_degrees()
    }
}

/// Sine and cosine of an angle in degrees, exact at the multiples of 90: a vertical plane's pole is
/// then exactly horizontal and lies on the net's rim, not 1e-17 off it.
fn sin_cos_degrees(degrees: f64) -> (f64, f64) {
    let d = wrap_degrees(degrees);
    let quarter = (d / 90.0).round();
    let (s, c) = (d - quarter * 90.0).to_radians().sin_cos();
    match quarter as i32 % 4 {
        0 => (s, c),
        1 => (c, -s),
        2 => (-s, -c),
        _ => (-c, s),
    }
}

fn canonical(v: Vector3<f64>) -> Vector3<f64> {
    // + 0.0 turns -0 into 0, so that equal axes are equal bit for bit.
    let v = v.map(|c| c + 0.0);
    let flip = if v.z != 0.0 {
        v.z > 0.0
    } else if v.y != 0.0 {
        v.y < 0.0
    } else {
        v.x < 0.0
    };
    if flip { (-v).map(|c| c + 0.0) } else { v }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    #[test]
    fn refuses_what_has_no_direction() {
        assert_eq!(Axis::new(0.0, 0.0, 0.0), Err(AxisError::Zero));
        assert_eq!(Axis::new(f64::NAN, 0.0, 1.0), Err(AxisError::NotFinite));
        assert_eq!(Axis::new(0.0, f64::INFINITY, 1.0), Err(AxisError::NotFinite));
        assert!(Axis::new(1e300, 1e300, 1e-300).is_ok());
        assert!(Axis::new(1e-320, 0.0, 0.0).is_ok());
    }

    #[test]
    fn opposite_vectors_are_one_axis() {
        for (e, n, u) in [(1.0, 2.0, 3.0), (1.0, 0.0, 0.0), (0.0, -1.0, 0.0), (-1.0, 1.0, 0.0), (0.0, 0.0, 1.0)] {
            assert_eq!(Axis::new(e, n, u).unwrap(), Axis::new(-e, -n, -u).unwrap());
        }
    }

    #[test]
    fn trend_and_plunge_come_back() {
        for trend in [0.0, 0.5, 89.0, 90.0, 179.9, 222.25, 359.5] {
            for plunge in [0.5, 10.0, 45.0, 89.999999, 60.0] {
                let a = Axis::from_trend_plunge(trend, plunge);
                assert_abs_diff_eq!(a.trend(), trend, epsilon = 1e-7);
                assert_abs_diff_eq!(a.plunge(), plunge, epsilon = 1e-12);
            }
        }
        assert_eq!(Axis::from_trend_plunge(123.0, 90.0).plunge(), 90.0);
        assert_eq!(Axis::from_trend_plunge(30.0, -20.0), Axis::from_trend_plunge(210.0, 20.0));
    }

    #[test]
    fn angles_are_acute_and_keep_small_differences() {
        let a = Axis::from_trend_plunge(10.0, 30.0);
        assert_eq!(a.angle_to(a), 0.0);
        let b = Axis::from_trend_plunge(10.0, 30.0 + 1e-9);
        assert_abs_diff_eq!(a.angle_to(b), 1e-9, epsilon = 1e-13);
        assert_abs_diff_eq!(
            Axis::from_trend_plunge(0.0, 0.0).angle_to(Axis::from_trend_plunge(100.0, 0.0)),
            80.0,
            epsilon = 1e-12
        );
    }
}
