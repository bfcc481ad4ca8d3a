//! Which polygon a point lies in, for thousands of polygons and millions of points.

use geo::indexed::IntervalTreeMultiPolygon;
use geo::orient::Direction;
use geo::{BoundingRect, Contains, Coord, Intersects, Line, LinesIter, MultiPolygon, Orient, Point};
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, RTree};

/// Where a point lies, as indices of polygons.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Located {
    /// Strictly inside; `several` where other polygons hold it as well.
    Inside {
        /// The lowest index that holds it.
        index: usize,
        /// True where polygons overlap here.
        several: bool,
    },
    /// On a boundary and inside none; `shared` where it touches more than one polygon.
    OnBoundary {
        /// The lowest index that it touches.
        index: usize,
        /// True on the boundary of two or more.
        shared: bool,
    },
    /// Outside all, within the distance asked of this one.
    Near {
        /// The nearest polygon.
        index: usize,
    },
    /// Outside all.
    Outside,
}

impl Located {
    /// The polygon that the point goes to.
    pub fn index(&self) -> Option<usize> {
        match *self {
            Self::Inside { index, .. } | Self::OnBoundary { index, .. } | Self::Near { index } => Some(index),
            Self::Outside => None,
        }
    }
}

/// An index over polygons that answers [`Located`].
pub struct Locator {
    /// Bounding boxes, with the polygon's index.
    boxes: RTree<GeomWithData<Rectangle<Point<f64>>, usize>>,
    /// Boundary segments, with the polygon's index.
    edges: RTree<GeomWithData<Line<f64>, usize>>,
    trees: Vec<IntervalTreeMultiPolygon<f64>>,
}

impl Locator {
    /// An index over valid polygons.
    pub fn new<'a>(polygons: impl Iterator<Item = &'a MultiPolygon<f64>>) -> Self {
        let (mut boxes, mut edges, mut trees) = (Vec::new(), Vec::new(), Vec::new());
        for (index, polygon) in polygons.enumerate() {
            // The interval tree counts windings, so holes must run against their shells.
            let polygon = polygon.orient(Direction::Default);
            if let Some(rect) = polygon.bounding_rect() {
                let corners = Rectangle::from_corners(Point(rect.min()), Point(rect.max()));
                boxes.push(GeomWithData::new(corners, index));
            }
            edges.extend(polygon.lines_iter().map(|line| GeomWithData::new(line, index)));
            trees.push(IntervalTreeMultiPolygon::new(&polygon));
        }
        Self { boxes: RTree::bulk_load(boxes), edges: RTree::bulk_load(edges), trees }
    }

    /// Distance to the nearest boundary, in map units; infinite where there are no polygons.
    pub fn distance(&self, at: Coord<f64>) -> f64 {
        let nearest = self.edges.nearest_neighbor_iter_with_distance_2(&Point(at)).next();
        nearest.map_or(f64::INFINITY, |(_, squared)| squared.sqrt())
    }

    /// Where `at` lies; outside all polygons, one within `nearest` (map units, 0 for none) is taken.
    pub fn locate(&self, at: Coord<f64>, nearest: f64) -> Located {
        let here = AABB::from_point(Point(at));
        let mut lowest = usize::MAX;
        let mut inside = 0;
        for candidate in self.boxes.locate_in_envelope_intersecting(&here) {
            if self.trees[candidate.data].contains(&at) {
                lowest = lowest.min(candidate.data);
                inside += 1;
            }
        }
        if inside > 0 {
            return Located::Inside { index: lowest, several: inside > 1 };
        }
        let mut touched: Option<(usize, bool)> = None;
        for edge in self.edges.locate_in_envelope_intersecting(&here).filter(|e| e.geom().intersects(&at)) {
            touched = Some(match touched {
                None => (edge.data, false),
                Some((index, shared)) => (index.min(edge.data), shared || index != edge.data),
            });
        }
        if let Some((index, shared)) = touched {
            return Located::OnBoundary { index, shared };
        }
        if nearest > 0.0 {
            let mut best: Option<(f64, usize)> = None;
            for (edge, squared) in self.edges.nearest_neighbor_iter_with_distance_2(&Point(at)) {
                match best {
                    Some((least, _)) if squared > least => break,
                    Some((least, index)) => best = Some((least, index.min(edge.data))),
                    None if squared <= nearest * nearest => best = Some((squared, edge.data)),
                    None => break,
                }
            }
            if let Some((_, index)) = best {
                return Located::Near { index };
            }
        }
        Located::Outside
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use geo::{CoordinatePosition, coordinate_position::CoordPos, wkt};

    fn squares() -> Vec<MultiPolygon<f64>> {
        vec![
            wkt!(MULTIPOLYGON(((0. 0.,10. 0.,10. 10.,0. 10.,0. 0.),(4. 4.,6. 4.,6. 6.,4. 6.,4. 4.)))),
            wkt!(MULTIPOLYGON(((10. 0.,20. 0.,20. 10.,10. 10.,10. 0.)),((30. 0.,40. 0.,40. 10.,30. 10.,30. 0.)))),
        ]
    }

    #[test]
    fn inside_holes_parts_boundaries_and_outside() {
        let squares = squares();
        let locator = Locator::new(squares.iter());
        let at = |x, y, near| locator.locate(Coord { x, y }, near);
        assert_eq!(at(1.0, 1.0, 0.0), Located::Inside { index: 0, several: false });
        assert_eq!(at(5.0, 5.0, 0.0), Located::Outside, "in the hole");
        assert_eq!(at(4.0, 5.0, 0.0), Located::OnBoundary { index: 0, shared: false });
        assert_eq!(at(10.0, 5.0, 0.0), Located::OnBoundary { index: 0, shared: true });
        assert_eq!(at(10.0, 10.0, 0.0), Located::OnBoundary { index: 0, shared: true });
        assert_eq!(at(35.0, 5.0, 0.0), Located::Inside { index: 1, several: false });
        assert_eq!(at(25.0, 5.0, 4.9), Located::Outside);
        assert_eq!(at(25.0, 5.0, 5.0), Located::Near { index: 1 });
        assert_eq!(at(10.0, 12.0, 3.0), Located::Near { index: 0 }, "equally near: the lower id");
        assert_eq!(at(f64::MAX, 0.0, 0.0), Located::Outside);
    }

    #[test]
    fn overlaps_go_to_the_lower_id_whichever_way_they_are_wound() {
        let mut both = squares();
        both[1] = wkt!(MULTIPOLYGON(((5. 0.,5. 10.,20. 10.,20. 0.,5. 0.))));
        let locator = Locator::new(both.iter());
        assert_eq!(locator.locate(Coord { x: 7.0, y: 5.0 }, 0.0), Located::Inside { index: 0, several: true });
    }

    /// The library's plain point-in-polygon, vertex by vertex, as the reference.
    #[test]
    fn agrees_with_the_plain_test_on_a_ragged_polygon() {
        let ring: Vec<(f64, f64)> = (0..400)
            .map(|i| {
                let a = i as f64 / 400.0 * std::f64::consts::TAU;
                let r = 10.0 + 3.0 * (17.0 * a).sin() + (5.0 * a).cos();
                (r * a.cos(), r * a.sin())
            })
            .collect();
        let polygon = MultiPolygon::new(vec![geo::Polygon::new(ring.into(), vec![])]);
        let locator = Locator::new(std::iter::once(&polygon));
        let mut inside = 0;
        for i in 0..60 {
            for j in 0..60 {
                let at = Coord { x: i as f64 * 0.5 - 15.0 + 0.01, y: j as f64 * 0.5 - 15.0 + 0.02 };
                let plain = polygon.coordinate_position(&at) == CoordPos::Inside;
                assert_eq!(locator.locate(at, 0.0).index().is_some(), plain, "{at:?}");
                inside += usize::from(plain);
            }
        }
        assert!(inside > 500);
    }
}
