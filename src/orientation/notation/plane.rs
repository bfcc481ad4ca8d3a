//! From numbers whose range is known to planes, and to lines in them.

use super::check::{bearing, rake as rake_in_range};
use super::compass::{CompassPoint, between};
use super::{Notation, NotationError, Quantity};
use crate::orientation::{Dip, Measured, wrap_degrees};

/// How far strike and dip direction may be from a right angle and still agree: both were rounded when written.
/// Common practice, no source.
pub const STRIKE_TOLERANCE: f64 = 5.0;

/// A plane from an azimuth in [0, 360) (none for a horizontal plane), its dip and, where written, the side it dips to.
///
/// Right- and left-hand strikes and dip directions must agree with the side where one is written; in
/// [`Notation::Quadrant`] and [`Notation::Auto`] the side decides. Without a side, `Auto` is right-hand and
/// `Quadrant` is refused. A horizontal plane has no side to contradict; a vertical one has either.
pub fn plane(
    notation: Notation,
    azimuth: Option<f64>,
    dip: Dip,
    side: Option<CompassPoint>,
) -> Result<Measured, NotationError> {
    let d = dip.degrees();
    let Some(a) = azimuth else {
        return if d == 0.0 {
            Ok(Measured::Plane { strike: None, dip })
        } else {
            Err(NotationError::Missing(match notation {
                Notation::DipDirection => Quantity::DipDirection,
                _ => Quantity::Strike,
            }))
        };
    };
    let contradiction = |quantity, point: CompassPoint| {
        Err(NotationError::QuadrantContradicts { quantity, azimuth: a, point: point.name })
    };
    let strike = match notation {
        Notation::TrendPlunge => return Err(NotationError::PlaneByTrend),
        Notation::DipDirection => match side {
            Some(p) if d > 0.0 && !p.covers(a) && !(d == 90.0 && p.covers(a + 180.0)) => {
                return contradiction(Quantity::DipDirection, p);
            }
            _ => a - 90.0,
        },
        Notation::RightHand | Notation::LeftHand => {
            let strike = if notation == Notation::RightHand { a } else { a + 180.0 };
            match side {
                Some(p) if d > 0.0 && !p.covers(strike + 90.0) && !(d == 90.0 && p.covers(strike - 90.0)) => {
                    return contradiction(Quantity::Strike, p);
                }
                _ => strike,
            }
        }
        Notation::Quadrant | Notation::Auto => match side {
            Some(p) if p.covers(a + 90.0) => a,
            Some(p) if p.covers(a - 90.0) => a + 180.0,
            Some(p) if d > 0.0 => return contradiction(Quantity::Strike, p),
            None if notation == Notation::Quadrant && d > 0.0 && d < 90.0 => {
                return Err(NotationError::DipQuadrantMissing(a));
            }
            _ => a,
        },
    };
    Ok(Measured::Plane { strike: Some(bearing(Quantity::Strike, strike)?), dip })
}

/// The right-hand strike of a plane whose strike and dip direction are both written.
///
/// They must be 90 degrees apart within [`STRIKE_TOLERANCE`], on the side that `notation` says; in
/// [`Notation::Quadrant`] and [`Notation::Auto`] the dip direction decides the side. A horizontal plane is not
/// checked; a vertical one may have either side. The strike is kept, the dip direction only chooses its end.
pub fn agree(notation: Notation, strike: f64, dip_direction: f64, dip: Dip) -> Result<f64, NotationError> {
    let right = between(strike + 90.0, dip_direction) <= STRIKE_TOLERANCE;
    let left = between(strike - 90.0, dip_direction) <= STRIKE_TOLERANCE;
    let d = dip.degrees();
    let ends = match notation {
        Notation::RightHand => (right || d == 90.0 && left || d == 0.0).then_some(strike),
        Notation::LeftHand => (left || d == 90.0 && right || d == 0.0).then_some(strike + 180.0),
        _ if right || d == 0.0 => Some(strike),
        _ if left => Some(strike + 180.0),
        _ => None,
    };
    ends.map(wrap_degrees).ok_or(NotationError::AzimuthsContradict { strike, dip_direction, notation })
}

/// The line at `rake` in a plane.
///
/// Without letters the rake runs from 0 at the right-hand strike downward in the plane to 180 at the opposite end.
/// With letters it is the acute angle (0 to 90), downward from the end of the strike line that they name.
/// trend = strike + atan2(sin r cos d, cos r), plunge = asin(sin r sin d): plane trigonometry, no source needed.
pub fn line_from_rake(plane: Measured, rake: f64, end: Option<CompassPoint>) -> Result<Measured, NotationError> {
    let Measured::Plane { strike: Some(strike), dip } = plane else {
        return Err(NotationError::Missing(Quantity::Strike));
    };
    let strike = strike.degrees();
    let rake = match end {
        None => rake_in_range(rake, 180.0)?,
        Some(p) => {
            let acute = rake_in_range(rake, 90.0)?;
            if acute == 90.0 || p.covers(strike) {
                acute
            } else if p.covers(strike + 180.0) {
                180.0 - acute
            } else {
                return Err(NotationError::RakeEnd { strike, point: p.name });
            }
        }
    };
    let (r, d) = (rake.to_radians(), dip.degrees().to_radians());
    // atan2 of the components keeps its precision where asin loses it near the vertical.
    let down = r.sin() * d.sin();
    let (across, along) = (r.sin() * d.cos(), r.cos());
    let plunge = Dip::new(down.atan2(across.hypot(along)).to_degrees().clamp(0.0, 90.0))
        .map_err(|_| NotationError::NotFinite { quantity: Quantity::Plunge })?;
    let trend = bearing(Quantity::Trend, strike + across.atan2(along).to_degrees())?;
    Ok(Measured::Line { trend, plunge })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::orientation::notation::compass_point;
    use approx::assert_abs_diff_eq;

    fn strike(notation: Notation, a: f64, d: f64, side: &str) -> Result<f64, &'static str> {
        let side = (!side.is_empty()).then(|| compass_point(side).unwrap());
        match plane(notation, Some(a), Dip::new(d).unwrap(), side) {
            Ok(Measured::Plane { strike: Some(s), .. }) => Ok(s.degrees()),
            Ok(_) => Err("no strike"),
            Err(e) => Err(e.code()),
        }
    }

    // Common practice, no source.
    #[test]
    fn one_plane_in_every_notation() {
        use Notation::*;
        for (notation, a, side) in [
            (RightHand, 45.0, ""),
            (RightHand, 45.0, "SE"),
            (LeftHand, 225.0, ""),
            (DipDirection, 135.0, ""),
            (DipDirection, 135.0, "SE"),
            (Quadrant, 45.0, "SE"),
            (Quadrant, 225.0, "SE"),
            (Quadrant, 225.0, "E"),
            (Quadrant, 225.0, "S"),
            (Auto, 225.0, "SE"),
            (Auto, 45.0, ""),
        ] {
            assert_eq!(strike(notation, a, 45.0, side), Ok(45.0), "{notation:?} {a} {side}");
        }
    }

    #[test]
    fn letters_that_cannot_belong_are_refused() {
        use Notation::*;
        for (notation, a, side) in [
            (Quadrant, 45.0, "NE"),
            (Quadrant, 45.0, "SW"),
            (Quadrant, 10.0, "N"),
            (Quadrant, 10.0, "NE"),
            (Auto, 80.0, "E"),
            (RightHand, 45.0, "NW"),
            (LeftHand, 45.0, "SE"),
            (DipDirection, 45.0, "SE"),
        ] {
            assert_eq!(strike(notation, a, 30.0, side), Err("dip-quadrant-contradicts"), "{notation:?} {a} {side}");
        }
        assert_eq!(strike(Quadrant, 45.0, 30.0, ""), Err("dip-quadrant-missing"));
        assert_eq!(strike(Quadrant, 45.0, 90.0, ""), Ok(45.0));
        assert_eq!(strike(RightHand, 45.0, 90.0, "NW"), Ok(45.0));
        assert_eq!(strike(RightHand, 45.0, 0.0, "NE"), Ok(45.0));
    }

    #[test]
    fn two_columns_agree_within_five_degrees() {
        use Notation::*;
        let dip = Dip::new(40.0).unwrap();
        assert_eq!(agree(Auto, 45.0, 137.0, dip), Ok(45.0));
        assert_eq!(agree(Auto, 45.0, 315.0, dip), Ok(225.0));
        assert_eq!(agree(RightHand, 45.0, 315.0, dip).unwrap_err().code(), "strike-contradicts-dip-direction");
        assert_eq!(agree(LeftHand, 45.0, 315.0, dip), Ok(225.0));
        let e = agree(Auto, 45.0, 60.0, dip).unwrap_err().to_string();
        assert!(e.contains("45") && e.contains("60"), "{e}");
        assert!(agree(Auto, 358.0, 88.0, dip).is_ok());
    }

    // Plane trigonometry; a plane 000/60 E with a line raking 30 from its north end: tan(trend) = tan 30 cos 60,
    // sin(plunge) = sin 30 sin 60.
    #[test]
    fn rakes_become_trend_and_plunge() {
        let p = plane(Notation::RightHand, Some(0.0), Dip::new(60.0).unwrap(), None).unwrap();
        let at = |rake, end: &str| match line_from_rake(p, rake, compass_point(end)) {
            Ok(Measured::Line { trend, plunge }) => (trend.degrees(), plunge.degrees()),
            other => panic!("{other:?}"),
        };
        let trend = (30f64.to_radians().tan() * 0.5).atan().to_degrees();
        let plunge = (0.5 * 60f64.to_radians().sin()).asin().to_degrees();
        for (rake, end, want) in [
            (0.0, "", (0.0, 0.0)),
            (90.0, "", (90.0, 60.0)),
            (180.0, "", (180.0, 0.0)),
            (30.0, "", (trend, plunge)),
            (150.0, "", (180.0 - trend, plunge)),
            (30.0, "N", (trend, plunge)),
            (30.0, "S", (180.0 - trend, plunge)),
        ] {
            let got = at(rake, end);
            assert_abs_diff_eq!(got.0, want.0, epsilon = 1e-9);
            assert_abs_diff_eq!(got.1, want.1, epsilon = 1e-9);
        }
        assert_eq!(line_from_rake(p, -30.0, None).unwrap_err().code(), "rake-out-of-range");
        assert_eq!(line_from_rake(p, 30.0, compass_point("E")).unwrap_err().code(), "rake-end-contradicts");
        assert!(line_from_rake(p, 99.0, None).is_ok());
    }
}
