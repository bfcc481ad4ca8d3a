//! The user's domain polygons, made valid: closed, not self-crossing, one per name, overlaps known.

use crate::notice::{Notice, Place};
use geo::{Area, BooleanOps, BoundingRect, CoordsIter, Geometry, MakeValid, MultiPolygon, Point, Validation};
use rayon::prelude::*;
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, RTree};
use std::collections::HashMap;
use thiserror::Error;

/// A polygon with the name of its domain.
#[derive(Debug, Clone, PartialEq)]
pub struct NamedPolygon {
    /// The domain's name.
    pub name: String,
    /// Its area, in map coordinates.
    pub shape: MultiPolygon<f64>,
}

/// What to do where two polygons bear one name.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum SameName {
    /// Stop: the user must say what is meant.
    #[default]
    Refuse,
    /// They are parts of one domain.
    Merge,
}

/// Why the polygons cannot serve as domains.
#[derive(Debug, Error)]
pub enum DomainError {
    /// Points or lines where polygons are needed.
    #[error("{file}: feature {feature} is a {found}, not a polygon; domains need polygons")]
    NotAPolygon {
        /// The source.
        file: String,
        /// Feature id or line.
        feature: u64,
        /// What stands there.
        found: &'static str,
    },
    /// No usable polygon at all.
    #[error("{file}: holds no polygon that could be a domain")]
    None {
        /// The source.
        file: String,
    },
    /// Two features of one name.
    #[error(
        "{file}: two polygons are named \"{name}\" (features {first} and {second}); give them names of their own, or set domains.same_name = \"merge\" if they are parts of one domain"
    )]
    SameName {
        /// The source.
        file: String,
        /// The name that stands twice.
        name: String,
        /// Feature that bore it first.
        first: u64,
        /// Feature that bears it again.
        second: u64,
    },
}

/// Overlaps smaller than this share of the smaller polygon are round-off of digitised boundaries.
const NEGLIGIBLE_OVERLAP: f64 = 1e-9;
/// Polygons of more vertices are checked by the caller's quick test.
const MANY_VERTICES: usize = 1000;
/// How many overlapping pairs are named one by one.
const OVERLAPS_NAMED: usize = 20;

/// Polygons from features `(feature id, name, geometry)` of `file`, in file order.
///
/// Invalid rings are repaired where the repair keeps an area (odd-even rule, reported with the feature), and
/// the feature is left out with a warning where it does not. Overlaps are reported with their area.
///
/// `quick` answers validity for polygons of many vertices, for which the library's own check takes quadratic time.
pub fn clean(
    file: &str,
    features: Vec<(u64, String, Option<Geometry<f64>>)>,
    same_name: SameName,
    quick: &dyn Fn(&MultiPolygon<f64>) -> bool,
) -> Result<(Vec<NamedPolygon>, Vec<Notice>), DomainError> {
    let mut notices = Vec::new();
    let mut polygons: Vec<NamedPolygon> = Vec::new();
    let mut first_of: HashMap<String, (u64, usize)> = HashMap::new();
    let any_polygon = features.iter().any(|(_, _, g)| g.as_ref().is_some_and(|g| parts_of(g).is_some()));
    for (feature, name, geometry) in features {
        let place = Place::file(file).at_row(feature);
        let Some(geometry) = geometry else {
            notices.push(Notice::warning(
                "domain-without-shape",
                place,
                format!("domain \"{name}\" has no geometry and was left out"),
            ));
            continue;
        };
        let Some(shape) = as_multi_polygon(file, feature, geometry, any_polygon, &mut notices)? else { continue };
        let Some(shape) = valid(shape, &name, place, quick, &mut notices) else { continue };
        match first_of.get(&name) {
            Some(&(first, _)) if same_name == SameName::Refuse => {
                return Err(DomainError::SameName { file: file.to_owned(), name, first, second: feature });
            }
            Some(&(_, index)) => {
                let merged = polygons[index].shape.union(&shape);
                polygons[index].shape = merged;
            }
            None => {
                first_of.insert(name.clone(), (feature, polygons.len()));
                polygons.push(NamedPolygon { name, shape });
            }
        }
    }
    if polygons.is_empty() {
        return Err(DomainError::None { file: file.to_owned() });
    }
    report_overlaps(file, &polygons, &mut notices);
    Ok((polygons, notices))
}

/// The polygons of a geometry, also those inside a collection; `None` where it has none.
fn parts_of(geometry: &Geometry<f64>) -> Option<MultiPolygon<f64>> {
    match geometry {
        Geometry::Polygon(p) => Some(MultiPolygon::new(vec![p.clone()])),
        Geometry::MultiPolygon(m) => Some(m.clone()),
        Geometry::Rect(r) => Some(MultiPolygon::new(vec![r.to_polygon()])),
        Geometry::Triangle(t) => Some(MultiPolygon::new(vec![t.to_polygon()])),
        Geometry::GeometryCollection(all) => {
            let parts: Vec<_> = all.iter().filter_map(parts_of).flat_map(|m| m.0).collect();
            (!parts.is_empty()).then(|| MultiPolygon::new(parts))
        }
        _ => None,
    }
}

/// A feature's polygons. One of another kind among polygons is left out with a warning; a file with no polygon at
/// all is an error.
fn as_multi_polygon(
    file: &str,
    feature: u64,
    geometry: Geometry<f64>,
    any_polygon: bool,
    notices: &mut Vec<Notice>,
) -> Result<Option<MultiPolygon<f64>>, DomainError> {
    if let Some(shape) = parts_of(&geometry) {
        return Ok(Some(shape));
    }
    let found = match geometry {
        Geometry::Point(_) | Geometry::MultiPoint(_) => "point",
        Geometry::Line(_) | Geometry::LineString(_) | Geometry::MultiLineString(_) => "line",
        _ => "geometry collection",
    };
    if !any_polygon {
        return Err(DomainError::NotAPolygon { file: file.to_owned(), feature, found });
    }
    let message = format!("a {found} is no domain and was left out");
    notices.push(Notice::warning("domain-not-a-polygon", Place::file(file).at_row(feature), message));
    Ok(None)
}

fn valid(
    shape: MultiPolygon<f64>,
    name: &str,
    place: Place,
    quick: &dyn Fn(&MultiPolygon<f64>) -> bool,
    notices: &mut Vec<Notice>,
) -> Option<MultiPolygon<f64>> {
    let verdict = if shape.coords_count() <= MANY_VERTICES {
        shape.check_validation().map_err(|fault| fault.to_string())
    } else if quick(&shape) {
        Ok(())
    } else {
        Err("its rings cross or touch where they may not".to_owned())
    };
    let Err(fault) = verdict else {
        if shape.unsigned_area() > 0.0 {
            return Some(shape);
        }
        notices.push(Notice::warning(
            "domain-without-area",
            place,
            format!("domain \"{name}\" has no area and was left out"),
        ));
        return None;
    };
    match shape.make_valid() {
        Ok(repaired) if repaired.unsigned_area() > 0.0 => {
            notices.push(
                Notice::warning(
                    "domain-repaired",
                    place,
                    format!(
                        "domain \"{name}\" is not a valid polygon ({fault}); it was repaired and now covers {} square map units",
                        plain(repaired.unsigned_area())
                    ),
                )
                .hint("look at the repaired polygon in the domains layer"),
            );
            Some(repaired)
        }
        Ok(_) => {
            notices.push(Notice::warning(
                "domain-not-repairable",
                place,
                format!("domain \"{name}\" is not a valid polygon ({fault}) and keeps no area when repaired; it was left out"),
            ));
            None
        }
        Err(error) => {
            notices.push(Notice::warning(
                "domain-not-repairable",
                place,
                format!("domain \"{name}\" is not a valid polygon ({fault}) and cannot be repaired ({error}); it was left out"),
            ));
            None
        }
    }
}

/// An area with about four digits that mean something, without an exponent.
fn plain(area: f64) -> String {
    let decimals = (4.0 - area.log10()).clamp(0.0, 12.0) as usize;
    format!("{area:.decimals$}")
}

fn report_overlaps(file: &str, polygons: &[NamedPolygon], notices: &mut Vec<Notice>) {
    let boxes: Vec<_> = polygons
        .iter()
        .enumerate()
        .filter_map(|(i, p)| {
            let r = p.shape.bounding_rect()?;
            Some(GeomWithData::new(Rectangle::from_corners(Point(r.min()), Point(r.max())), i))
        })
        .collect();
    let tree = RTree::bulk_load(boxes.clone());
    let mut overlaps: Vec<(usize, usize, f64)> = boxes
        .par_iter()
        .flat_map_iter(|a| {
            let envelope = AABB::from_corners(a.geom().lower(), a.geom().upper());
            let partners: Vec<usize> =
                tree.locate_in_envelope_intersecting(&envelope).map(|b| b.data).filter(|&b| b > a.data).collect();
            partners.into_iter().filter_map(|b| {
                let (one, other) = (&polygons[a.data].shape, &polygons[b].shape);
                let area = one.intersection(other).unsigned_area();
                let smaller = one.unsigned_area().min(other.unsigned_area());
                (area > NEGLIGIBLE_OVERLAP * smaller).then_some((a.data, b, area))
            })
        })
        .collect();
    overlaps.sort_by(|a, b| b.2.total_cmp(&a.2).then((a.0, a.1).cmp(&(b.0, b.1))));
    for &(a, b, area) in overlaps.iter().take(OVERLAPS_NAMED) {
        let share = area / polygons[a].shape.unsigned_area().min(polygons[b].shape.unsigned_area());
        notices.push(
            Notice::warning(
                "domains-overlap",
                Place::file(file),
                format!(
                    "domains \"{}\" and \"{}\" overlap by {area} square map units ({:.3} % of the smaller)",
                    polygons[a].name,
                    polygons[b].name,
                    100.0 * share,
                    area = plain(area),
                ),
            )
            .hint("a station in the overlap goes to the domain of lower id"),
        );
    }
    if overlaps.len() > OVERLAPS_NAMED {
        notices.push(Notice::warning(
            "domains-overlap",
            Place::file(file),
            format!("{} further pairs of domains overlap by less", overlaps.len() - OVERLAPS_NAMED),
        ));
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use geo::wkt;

    fn feature(id: u64, name: &str, geometry: Geometry<f64>) -> (u64, String, Option<Geometry<f64>>) {
        (id, name.to_owned(), Some(geometry))
    }

    #[test]
    fn a_bow_tie_is_repaired_and_named() {
        let bow = wkt!(POLYGON((0. 0.,0. 10.,10. 0.,10. 10.,0. 0.))).into();
        let (polygons, notices) = clean("f", vec![feature(7, "north", bow)], SameName::Refuse, &|_| true).unwrap();
        assert_eq!(polygons[0].shape.unsigned_area(), 50.0);
        assert_eq!(notices[0].code, "domain-repaired");
        assert_eq!(notices[0].place.row, Some(7));
    }

    #[test]
    fn a_sliver_without_area_is_left_out_and_named() {
        let flat = wkt!(POLYGON((0. 0.,5. 0.,10. 0.,0. 0.))).into();
        let square = wkt!(POLYGON((0. 0.,0. 1.,1. 1.,1. 0.,0. 0.))).into();
        let (polygons, notices) =
            clean("f", vec![feature(1, "flat", flat), feature(2, "square", square)], SameName::Refuse, &|_| true)
                .unwrap();
        assert_eq!(polygons.len(), 1);
        assert!(notices[0].code.starts_with("domain-") && notices[0].message.contains("\"flat\""), "{notices:?}");
    }

    #[test]
    fn points_are_no_domains() {
        let error =
            clean("f", vec![feature(3, "p", Point::new(1.0, 2.0).into())], SameName::Refuse, &|_| true).unwrap_err();
        assert!(error.to_string().contains("feature 3 is a point"), "{error}");
    }

    #[test]
    fn one_name_twice_stops_or_merges() {
        let a = || feature(1, "n", wkt!(POLYGON((0. 0.,0. 1.,1. 1.,1. 0.,0. 0.))).into());
        let b = || feature(2, "n", wkt!(POLYGON((5. 0.,5. 1.,6. 1.,6. 0.,5. 0.))).into());
        assert!(matches!(clean("f", vec![a(), b()], SameName::Refuse, &|_| true), Err(DomainError::SameName { .. })));
        let (merged, _) = clean("f", vec![a(), b()], SameName::Merge, &|_| true).unwrap();
        assert_eq!((merged.len(), merged[0].shape.unsigned_area()), (1, 2.0));
    }

    #[test]
    fn overlaps_are_reported_with_their_area_and_shared_edges_are_not() {
        let a = feature(1, "a", wkt!(POLYGON((0. 0.,0. 10.,10. 10.,10. 0.,0. 0.))).into());
        let b = feature(2, "b", wkt!(POLYGON((8. 0.,8. 10.,20. 10.,20. 0.,8. 0.))).into());
        let c = feature(3, "c", wkt!(POLYGON((20. 0.,20. 10.,30. 10.,30. 0.,20. 0.))).into());
        let (_, notices) = clean("f", vec![a, b, c], SameName::Refuse, &|_| true).unwrap();
        assert_eq!(notices.len(), 1, "{notices:?}");
        assert!(notices[0].message.contains("20.00 square"), "{}", notices[0].message);
    }
}
