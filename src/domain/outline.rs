//! The outline of a set of stations.

use geo::{ConcaveHull, ConvexHull, Coord, MultiPoint, MultiPolygon, Point, Validation};
use std::collections::HashMap;

/// Stations are thinned to the extremes of cells of this many per side before the hull is drawn: what the
/// eye sees of an outline does not change, and a million stations take no longer than ten thousand.
const CELLS: f64 = 256.0;

/// The concave hull of the stations, convex where the concave one does not close; empty where all
/// stations lie on one line or at one point.
pub fn hull_of(stations: &[Coord<f64>]) -> MultiPolygon<f64> {
    let points = extremes_of_cells(stations);
    let hull = points.concave_hull();
    let hull = if hull.is_valid() { hull } else { points.convex_hull() };
    if hull.is_valid() && geo::Area::unsigned_area(&hull) > 0.0 { hull.into() } else { MultiPolygon::new(vec![]) }
}

/// The westernmost, easternmost, southernmost and northernmost station of every cell.
fn extremes_of_cells(stations: &[Coord<f64>]) -> MultiPoint<f64> {
    let low = |get: fn(&Coord<f64>) -> f64| stations.iter().map(get).fold(f64::INFINITY, f64::min);
    let high = |get: fn(&Coord<f64>) -> f64| stations.iter().map(get).fold(f64::NEG_INFINITY, f64::max);
    let (west, south) = (low(|c| c.x), low(|c| c.y));
    let size = ((high(|c| c.x) - west).max(high(|c| c.y) - south) / CELLS).max(f64::MIN_POSITIVE);
    let mut cells: HashMap<(u32, u32), [Coord<f64>; 4]> = HashMap::new();
    for &at in stations {
        let cell = (((at.x - west) / size) as u32, ((at.y - south) / size) as u32);
        let kept = cells.entry(cell).or_insert([at; 4]);
        // Ties go to the smaller other coordinate, so that the order of stations does not matter.
        let keys = |c: Coord<f64>| [(c.x, c.y), (-c.x, c.y), (c.y, c.x), (-c.y, c.x)];
        for (side, key) in keys(at).into_iter().enumerate() {
            if key < keys(kept[side])[side] {
                kept[side] = at;
            }
        }
    }
    let mut points: Vec<(f64, f64)> = cells.into_values().flatten().map(|c| (c.x, c.y)).collect();
    points.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.total_cmp(&b.1)));
    points.dedup();
    points.into_iter().map(Point::from).collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use geo::{Area, Intersects};

    fn scattered(n: usize) -> Vec<Coord<f64>> {
        // The golden ratio's multiples spread evenly without a random generator.
        (0..n)
            .map(|i| Coord { x: (i as f64 * 0.618_033_988_75) % 1.0 * 900.0, y: i as f64 / n as f64 * 700.0 })
            .collect()
    }

    #[test]
    fn the_hull_holds_nearly_the_whole_area_whatever_the_order() {
        let stations = scattered(5000);
        let hull = hull_of(&stations);
        assert!(hull.is_valid());
        assert!((0.9..=1.0).contains(&(hull.unsigned_area() / 630_000.0)), "{}", hull.unsigned_area());
        let outside = stations.iter().filter(|&&c| !hull.intersects(&Point(c))).count();
        assert_eq!(outside, 0);
        let mut reversed = stations;
        reversed.reverse();
        assert_eq!(hull_of(&reversed), hull);
    }

    #[test]
    fn stations_on_a_line_or_at_a_point_have_no_outline() {
        let line: Vec<_> = (0..10).map(|i| Coord { x: i as f64, y: 2.0 * i as f64 }).collect();
        for stations in [&line[..], &line[..1], &line[..2], &[line[3]; 5][..]] {
            assert!(hull_of(stations).0.is_empty(), "{stations:?}");
        }
    }
}
