//! How long a map unit is on the ground, where the stations are.

use crate::crs::{MapCrs, Transformer};
use crate::notice::{Notice, Place};
use geo::{Coord, Distance, Geodesic, Point};

/// Maps whose scale departs from the truth by less than this (UTM: 0.0004) are taken at their word.
const TRUE_TO_SCALE: f64 = 0.01;

/// The length of a map unit on the ground.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Ground {
    /// Metres on the ground per map unit.
    pub metres: f64,
    /// The map's scale factor at the middle of the stations, where it departs from 1 by more than 1 %.
    stretched: Option<f64>,
}

impl Ground {
    /// At the middle of the stations.
    pub fn of(map: &MapCrs, stations: &[Coord<f64>]) -> Self {
        let unit = map.unit_in_metres().unwrap_or(111_195.0);
        let plain = Self { metres: unit, stretched: None };
        if !map.is_projected() || stations.is_empty() {
            return plain;
        }
        let middle = |get: fn(&Coord<f64>) -> f64| {
            let (low, high) =
                stations.iter().map(get).fold((f64::INFINITY, f64::NEG_INFINITY), |(l, h), v| (l.min(v), h.max(v)));
            f64::midpoint(low, high)
        };
        let (x, y) = (middle(|c| c.x), middle(|c| c.y));
        let Some(metres) = ground_length(map, Coord { x, y }, 500.0) else { return plain };
        let scale = unit / metres;
        if (scale - 1.0).abs() < TRUE_TO_SCALE { plain } else { Self { metres, stretched: Some(scale) } }
    }

    /// What to say of a map that is not true to scale.
    pub fn notice(&self) -> Option<Notice> {
        let scale = self.stretched?;
        let message = format!(
            "the map is drawn {scale:.3} times as long as the ground at the middle of the stations; areas and nearest_m are ground metres there"
        );
        Some(
            Notice::warning("map-not-to-scale", Place::default(), message)
                .hint("a UTM zone or a national grid is truer to scale"),
        )
    }
}

/// Metres on the ground per map unit about a place: geometric mean of both directions, over `half` units either way.
fn ground_length(map: &MapCrs, at: Coord<f64>, half: f64) -> Option<f64> {
    let globe = MapCrs::parse("EPSG:4326").ok()?;
    let transformer = Transformer::new(map, &globe).ok()?;
    let along = |dx: f64, dy: f64| {
        let mut ends = [Coord { x: at.x - dx, y: at.y - dy }, Coord { x: at.x + dx, y: at.y + dy }];
        transformer
            .coords(&mut ends)
            .is_empty()
            .then(|| Geodesic.distance(Point(ends[0]), Point(ends[1])) / (2.0 * half))
    };
    Some((along(half, 0.0)? * along(0.0, half)?).sqrt()).filter(|m| m.is_finite() && *m > 0.0)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn mercator_is_stretched_and_utm_is_not() {
        let web = MapCrs::parse("EPSG:3857").unwrap();
        // Closed form: the Mercator scale at latitude 60 is 1/cos 60 = 2 on the sphere; within 1 % on the ellipsoid.
        let ground = Ground::of(&web, &[Coord { x: 1_670_000.0, y: 8_399_737.889 }]);
        assert!((1.0 / ground.metres - 2.0).abs() < 0.02, "{ground:?}");
        assert!(ground.notice().is_some());
        let utm = MapCrs::parse("EPSG:32633").unwrap();
        let ground = Ground::of(&utm, &[Coord { x: 500_000.0, y: 5_400_000.0 }]);
        assert_eq!((ground.metres, ground.notice()), (1.0, None));
    }
}
