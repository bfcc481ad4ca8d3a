//! Collects geometries, as bare points for as long as every one is a point.

use crate::table::Shapes;
use geo_types::{Coord, Geometry};

/// A point that stands for no geometry.
pub(super) const NO_POINT: Coord<f64> = Coord { x: f64::NAN, y: f64::NAN };

/// Shapes in the making.
#[derive(Debug, Default)]
pub(super) struct ShapesBuilder {
    points: Vec<Coord<f64>>,
    any: Option<Vec<Option<Geometry<f64>>>>,
}

impl ShapesBuilder {
    /// Appends a point.
    pub fn push_point(&mut self, point: Option<Coord<f64>>) {
        match &mut self.any {
            Some(any) => any.push(point.map(|c| Geometry::Point(c.into()))),
            None => self.points.push(point.unwrap_or(NO_POINT)),
        }
    }

    /// Appends a geometry; a multipoint of one point is a point.
    pub fn push(&mut self, geometry: Option<Geometry<f64>>) {
        match geometry {
            None => self.push_point(None),
            Some(Geometry::Point(p)) => self.push_point(Some(p.0)),
            Some(Geometry::MultiPoint(m)) if m.0.len() == 1 => self.push_point(Some(m.0[0].0)),
            Some(other) => {
                let points = &mut self.points;
                let any = self.any.get_or_insert_with(|| {
                    std::mem::take(points)
                        .into_iter()
                        .map(|c| if c.x.is_nan() { None } else { Some(Geometry::Point(c.into())) })
                        .collect()
                });
                any.push(Some(other));
            }
        }
    }

    /// The shapes.
    pub fn finish(self) -> Shapes {
        match self.any {
            Some(any) => Shapes::Any(any),
            None => Shapes::Points(self.points),
        }
    }
}

/// True where every coordinate is finite.
pub(super) fn all_finite(geometry: &Geometry<f64>) -> bool {
    use geo::CoordsIter;
    geometry.coords_iter().all(|c| c.x.is_finite() && c.y.is_finite())
}

#[cfg(test)]
mod tests {
    use super::*;
    use geo_types::{MultiPoint, line_string, point};

    #[test]
    fn points_stay_bare_until_something_else_comes() {
        let mut b = ShapesBuilder::default();
        b.push(Some(point!(x: 1.0, y: 2.0).into()));
        b.push(None);
        b.push(Some(MultiPoint::from(vec![(3.0, 4.0)]).into()));
        let Shapes::Points(points) = b.finish() else { panic!("not points") };
        assert_eq!((points[0], points[1].x.is_nan(), points[2]), ((1.0, 2.0).into(), true, (3.0, 4.0).into()));

        let mut b = ShapesBuilder::default();
        b.push(Some(point!(x: 1.0, y: 2.0).into()));
        b.push(None);
        b.push(Some(line_string![(x: 0.0, y: 0.0), (x: 1.0, y: 1.0)].into()));
        b.push_point(Some(Coord { x: 5.0, y: 6.0 }));
        let Shapes::Any(any) = b.finish() else { panic!("still points") };
        assert_eq!(any[0], Some(point!(x: 1.0, y: 2.0).into()));
        assert_eq!((any[1].is_none(), any[3].clone()), (true, Some(point!(x: 5.0, y: 6.0).into())));
    }
}
