//! Compass points by their letters.

/// A compass point: one of the sixteen.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CompassPoint {
    /// Its letters.
    pub name: &'static str,
    /// Its azimuth in degrees.
    pub azimuth: f64,
    /// How far from it a dip direction may lie that the letters stand for.
    ///
    /// NE, SE, SW and NW name a quadrant: 45 degrees to either side, and 5 for rounding. N, E, S and W are used
    /// loosely for "that side": up to 67.5, the last half octant beside the strike line names no side. The eight
    /// points between are exact words: 45 degrees. Common practice, no source.
    pub reach: f64,
}

const POINTS: [(&str, &str, f64); 16] = [
    ("N", "north", 67.5),
    ("NNE", "northnortheast", 45.0),
    ("NE", "northeast", 50.0),
    ("ENE", "eastnortheast", 45.0),
    ("E", "east", 67.5),
    ("ESE", "eastsoutheast", 45.0),
    ("SE", "southeast", 50.0),
    ("SSE", "southsoutheast", 45.0),
    ("S", "south", 67.5),
    ("SSW", "southsouthwest", 45.0),
    ("SW", "southwest", 50.0),
    ("WSW", "westsouthwest", 45.0),
    ("W", "west", 67.5),
    ("WNW", "westnorthwest", 45.0),
    ("NW", "northwest", 50.0),
    ("NNW", "northnorthwest", 45.0),
];

/// The point that letters or an English word name, without regard to case. "O" is no point: east in one language,
/// west in another.
pub fn compass_point(letters: &str) -> Option<CompassPoint> {
    let i = POINTS
        .iter()
        .position(|(name, word, _)| name.eq_ignore_ascii_case(letters) || word.eq_ignore_ascii_case(letters))?;
    let (name, _, reach) = POINTS[i];
    Some(CompassPoint { name, azimuth: i as f64 * 22.5, reach })
}

/// Angle between two azimuths, [0, 180].
pub(super) fn between(a: f64, b: f64) -> f64 {
    let d = (a - b).rem_euclid(360.0);
    if d > 180.0 { 360.0 - d } else { d }
}

impl CompassPoint {
    /// True where the letters can stand for this direction.
    pub fn covers(self, azimuth: f64) -> bool {
        between(self.azimuth, azimuth) <= self.reach
    }
    /// N, E, S or W.
    pub(super) fn is_cardinal(self) -> bool {
        self.name.len() == 1
    }
}

/// The azimuth of "N 30 E": `degrees` (0 to 90) from one cardinal point toward another at a right angle to it.
pub(super) fn quadrant_bearing(from: CompassPoint, degrees: f64, toward: CompassPoint) -> Option<f64> {
    if !from.is_cardinal() || !toward.is_cardinal() || !(0.0..=90.0).contains(&degrees) {
        return None;
    }
    match (toward.azimuth - from.azimuth).rem_euclid(360.0) {
        90.0 => Some((from.azimuth + degrees).rem_euclid(360.0)),
        270.0 => Some((from.azimuth - degrees).rem_euclid(360.0)),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    // Common practice, no source.
    #[test]
    fn quadrant_bearings_are_azimuths() {
        let p = |s| compass_point(s).unwrap();
        for (from, degrees, toward, want) in [
            ("N", 45.0, "E", Some(45.0)),
            ("n", 45.0, "w", Some(315.0)),
            ("S", 20.0, "W", Some(200.0)),
            ("S", 20.0, "E", Some(160.0)),
            ("E", 20.0, "N", Some(70.0)),
            ("N", 0.0, "W", Some(0.0)),
            ("N", 91.0, "E", None),
            ("N", 10.0, "S", None),
            ("NE", 10.0, "S", None),
        ] {
            assert_eq!(quadrant_bearing(p(from), degrees, p(toward)), want, "{from} {degrees} {toward}");
        }
    }

    #[test]
    fn letters_of_two_languages_are_no_point() {
        assert!(compass_point("O").is_none() && compass_point("NO").is_none() && compass_point("").is_none());
        assert_eq!(compass_point("SouthEast").unwrap().azimuth, 135.0);
    }
}
