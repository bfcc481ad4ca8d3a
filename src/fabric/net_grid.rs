//! A square grid of nodes behind the net, and contour polygons from it.

use super::density::{Method, density};
use super::sample::Sample;
use geo_types::{Coord, MultiPolygon};
use nalgebra::Vector3;

/// How the lower half-sphere is drawn in the unit disc, east right, north up.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Projection {
    /// Lambert's: equal areas.
    EqualArea,
    /// Stereographic: equal angles.
    EqualAngle,
}

impl Projection {
    /// Where a direction of the lower half-sphere (up <= 0) falls.
    pub fn project(self, v: Vector3<f64>) -> Coord<f64> {
        // With d = -up = cos(colatitude): the radius is sqrt(2) sin(colatitude/2), or its tangent.
        let d = -v.z;
        let scale = match self {
            Self::EqualArea => 1.0 / (1.0 + d).sqrt(),
            Self::EqualAngle => 1.0 / (1.0 + d),
        };
        Coord { x: v.x * scale, y: v.y * scale }
    }
    /// The direction at a point; beyond the rim it is one of the upper half-sphere.
    pub fn direction(self, at: Coord<f64>) -> Vector3<f64> {
        let r2 = at.x * at.x + at.y * at.y;
        match self {
            Self::EqualArea => {
                let r2 = r2.min(2.0);
                let s = (2.0 - r2).sqrt();
                Vector3::new(at.x * s, at.y * s, r2 - 1.0)
            }
            Self::EqualAngle => Vector3::new(2.0 * at.x, 2.0 * at.y, r2 - 1.0) / (1.0 + r2),
        }
    }
}

/// The grid reaches this far from the centre, so that contours cross the rim (radius 1) before it ends.
pub const REACH: f64 = 1.06;

/// A contour: where the density is at least `level`, as polygons in the coordinates of the net. They reach
/// beyond the rim: clip them to the unit circle.
#[derive(Debug, Clone, PartialEq)]
pub struct Contour {
    /// The level, in the unit asked for.
    pub level: f64,
    /// Polygons with holes.
    pub polygons: MultiPolygon<f64>,
}

/// What levels are counted in.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Unit {
    /// Standard deviations above the expectation of uniform axes.
    Deviations,
    /// Multiples of a uniform density.
    Multiples,
}

/// The nodes of a grid of `side` x `side` points, row by row from the south-west.
pub fn nodes(side: usize, projection: Projection) -> Vec<Vector3<f64>> {
    let step = 2.0 * REACH / (side.max(2) - 1) as f64;
    (0..side * side)
        .map(|k| {
            let (column, row) = (k % side, k / side);
            projection.direction(Coord { x: column as f64 * step - REACH, y: row as f64 * step - REACH })
        })
        .collect()
}

/// Contours of a sample at increasing levels, from a grid of `side` x `side` nodes (51 is plain, 101 smooth).
/// None where there are no readings.
pub fn contours(
    sample: &Sample,
    method: Method,
    unit: Unit,
    projection: Projection,
    levels: &[f64],
    side: usize,
) -> Vec<Contour> {
    let side = side.max(2);
    let Some(density) = density(sample, &nodes(side, projection), method) else { return Vec::new() };
    let values = match unit {
        Unit::Deviations => density.standardised(),
        Unit::Multiples => density.multiples(),
    };
    let step = 2.0 * REACH / (side - 1) as f64;
    // The builder takes a value for the middle of a cell, half a step in from the cell's corner.
    let builder = contour::ContourBuilder::new(side, side, true)
        .x_origin(-REACH - step / 2.0)
        .y_origin(-REACH - step / 2.0)
        .x_step(step)
        .y_step(step);
    // It fails only where values and grid differ in size.
    builder.contours(&values, levels).map_or_else(
        |_| Vec::new(),
        |found| {
            found
                .into_iter()
                .map(|c| {
                    let (polygons, level) = c.into_inner();
                    Contour { level, polygons }
                })
                .collect()
        },
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fabric::Kind;
    use crate::orientation::Axis;
    use approx::assert_abs_diff_eq;

    #[test]
    fn projections_come_back() {
        for p in [Projection::EqualArea, Projection::EqualAngle] {
            for (trend, plunge) in [(10.0, 80.0), (200.0, 5.0), (77.0, 0.0), (0.0, 90.0)] {
                let v = Axis::from_trend_plunge(trend, plunge).vector();
                assert!((p.direction(p.project(v)) - v).norm() < 1e-12);
                let at = p.project(v);
                // Textbook forms of the radius.
                let half = f64::to_radians((90.0 - plunge) / 2.0);
                let radius = if p == Projection::EqualArea { 2f64.sqrt() * half.sin() } else { half.tan() };
                assert_abs_diff_eq!(at.x.hypot(at.y), radius, epsilon = 1e-12);
            }
        }
    }

    #[test]
    fn contours_ring_a_maximum_and_its_other_side() {
        // A level axis north-south shows at both ends of the net.
        let axes = [Axis::from_trend_plunge(0.0, 0.0); 30];
        let sample = Sample::new(&axes, Kind::Linear);
        let found = contours(&sample, Method::OnePercent, Unit::Multiples, Projection::EqualArea, &[50.0], 201);
        assert_eq!(found.len(), 1);
        assert_eq!(found[0].polygons.0.len(), 2);
        for polygon in &found[0].polygons {
            for at in polygon.exterior().coords().filter(|at| at.x.hypot(at.y) < REACH - 0.02) {
                let angle = Axis::from_trend_plunge(0.0, 0.0).vector().dot(&Projection::EqualArea.direction(*at));
                // The cap's radius is 8.11 degrees; the grid resolves about 1.
                assert_abs_diff_eq!(angle.abs().acos().to_degrees(), 8.11, epsilon = 0.7);
            }
        }
        assert!(
            contours(
                &Sample::new(&[], Kind::Linear),
                Method::OnePercent,
                Unit::Multiples,
                Projection::EqualArea,
                &[1.0],
                21
            )
            .is_empty()
        );
    }
}
