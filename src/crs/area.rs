//! Where on Earth a CRS is meant to be used.

use geo_types::Coord;
use std::fmt;

/// Box in degrees of longitude and latitude; `west` is greater than `east` where it crosses the date line.
#[derive(Debug, Clone, PartialEq)]
pub struct AreaOfUse {
    /// In words.
    pub name: String,
    /// Western edge.
    pub west: f64,
    /// Southern edge.
    pub south: f64,
    /// Eastern edge.
    pub east: f64,
    /// Northern edge.
    pub north: f64,
}

/// Mean radius of the Earth (2a + b) / 3 for GRS 80, km.
const EARTH_RADIUS_KM: f64 = 6371.0088;

/// Slack on each edge, degrees (about 10 cm), for positions that came through a transformation.
const SLACK: f64 = 1e-6;

impl fmt::Display for AreaOfUse {
    /// The box, since names can list half the countries of the world.
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let Self { west, south, east, north, .. } = self;
        write!(f, "longitude {west} to {east}, latitude {south} to {north}")
    }
}

impl AreaOfUse {
    /// Degrees east of the western edge, [0, 360).
    fn eastward(&self, longitude: f64) -> f64 {
        (longitude - self.west + SLACK).rem_euclid(360.0)
    }
    /// Width in degrees; a box from -180 to 180 is the whole circle.
    fn width(&self) -> f64 {
        let width = self.east - self.west;
        if width < 0.0 { width + 360.0 } else { width }
    }

    /// Whether a longitude and latitude (degrees from Greenwich) lie inside. Never for one that is not finite.
    pub fn contains(&self, place: Coord<f64>) -> bool {
        place.x.is_finite()
            && place.y >= self.south - SLACK
            && place.y <= self.north + SLACK
            && self.eastward(place.x) <= self.width() + 2.0 * SLACK
    }

    /// Kilometres from a longitude and latitude to the box, about; 0 inside. Along the great circle to the
    /// nearest point of the box by latitude and longitude, good to a few per cent away from the poles.
    pub fn distance_km(&self, place: Coord<f64>) -> f64 {
        if self.contains(place) {
            return 0.0;
        }
        let beyond = self.eastward(place.x) - self.width();
        let aside = if beyond <= 2.0 * SLACK { 0.0 } else { beyond.min(360.0 - self.eastward(place.x)) };
        let (lat, near) = (place.y.to_radians(), place.y.clamp(self.south, self.north).to_radians());
        // Haversine: keeps its precision for short distances.
        let half = |angle: f64| (angle / 2.0).sin().powi(2);
        let h = half(lat - near) + lat.cos() * near.cos() * half(aside.to_radians());
        2.0 * EARTH_RADIUS_KM * h.sqrt().min(1.0).asin()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn area(west: f64, south: f64, east: f64, north: f64) -> AreaOfUse {
        AreaOfUse { name: String::new(), west, south, east, north }
    }
    fn at(x: f64, y: f64) -> Coord<f64> {
        Coord { x, y }
    }

    #[test]
    fn boxes_may_cross_the_date_line() {
        let pacific = area(178.0, -25.0, -178.0, -10.0);
        for x in [178.0, 179.5, 180.0, -180.0, -179.0, -178.0, 181.0] {
            assert!(pacific.contains(at(x, -18.0)), "{x}");
        }
        for x in [0.0, 177.9, -177.9] {
            assert!(!pacific.contains(at(x, -18.0)), "{x}");
        }
        assert!(!pacific.contains(at(f64::INFINITY, -18.0)));
        assert!(!pacific.contains(at(180.0, f64::NAN)));
    }

    #[test]
    fn the_whole_globe_contains_everything() {
        let globe = area(-180.0, -90.0, 180.0, 90.0);
        assert!(globe.contains(at(180.0, 90.0)) && globe.contains(at(-180.0, -90.0)) && globe.contains(at(12.0, 3.0)));
    }

    // One minute of latitude is one nautical mile, 1.852 km (common practice, no source).
    #[test]
    fn distances_go_to_the_nearest_edge() {
        let zone = area(12.0, 0.0, 18.0, 84.0);
        assert_eq!(zone.distance_km(at(15.0, 40.0)), 0.0);
        assert!((zone.distance_km(at(15.0, -1.0)) - 111.19).abs() < 0.02);
        assert!((zone.distance_km(at(19.0, 60.0)) - 111.19 / 2.0).abs() < 0.02);
        assert!((zone.distance_km(at(11.0, 60.0)) - 111.19 / 2.0).abs() < 0.02);
    }
}
