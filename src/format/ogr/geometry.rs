//! GDAL geometries to ours: heights and measures dropped, arcs already straightened.

use gdal::vector::Geometry as Ogr;
use gdal::vector::OGRwkbGeometryType as Kind;
use gdal::vector::ToGdal;
use gdal::vector::geometry_type_flatten;
use geo_types::{
    Coord, Geometry, GeometryCollection, LineString, MultiLineString, MultiPoint, MultiPolygon, Point, Polygon,
};

/// The geometry, or nothing where it is empty.
///
/// # Errors
/// The name of a kind of geometry that no map layer here can hold.
pub(super) fn convert(ogr: &Ogr) -> Result<Option<Geometry<f64>>, String> {
    if ogr.is_empty() {
        return Ok(None);
    }
    Ok(Some(match geometry_type_flatten(ogr.geometry_type()) {
        Kind::wkbPoint => Point(point(ogr)).into(),
        Kind::wkbLineString | Kind::wkbLinearRing => line(ogr).into(),
        Kind::wkbPolygon | Kind::wkbTriangle => polygon(ogr).into(),
        Kind::wkbMultiPoint => MultiPoint(parts(ogr, |part| Point(point(part)))).into(),
        Kind::wkbMultiLineString => MultiLineString(parts(ogr, line)).into(),
        Kind::wkbMultiPolygon | Kind::wkbPolyhedralSurface | Kind::wkbTIN => MultiPolygon(parts(ogr, polygon)).into(),
        Kind::wkbGeometryCollection => {
            let mut members = Vec::new();
            for i in 0..ogr.geometry_count() {
                members.extend(convert(&ogr.get_geometry(i))?);
            }
            Geometry::GeometryCollection(GeometryCollection(members))
        }
        _ => return Err(ogr.geometry_name()),
    }))
}

/// True where a polygon's rings neither cross nor overlap, as GEOS (through GDAL) sees it, in n log n time.
pub fn is_valid_polygon(shape: &MultiPolygon<f64>) -> bool {
    shape.to_gdal().is_ok_and(|ogr| ogr.is_valid())
}

/// The parts that are not empty.
fn parts<T>(ogr: &Ogr, part: impl Fn(&Ogr) -> T) -> Vec<T> {
    (0..ogr.geometry_count())
        .map(|i| ogr.get_geometry(i))
        .filter(|member| !member.is_empty())
        .map(|member| part(&member))
        .collect()
}

pub(super) fn point(ogr: &Ogr) -> Coord<f64> {
    let (x, y, _) = ogr.get_point(0);
    Coord { x, y }
}

fn line(ogr: &Ogr) -> LineString<f64> {
    let mut points = Vec::new();
    ogr.get_points(&mut points);
    points.into_iter().map(|(x, y, _)| Coord { x, y }).collect()
}

fn polygon(ogr: &Ogr) -> Polygon<f64> {
    let mut rings = parts(ogr, line).into_iter();
    let shell = rings.next().unwrap_or_else(|| LineString(Vec::new()));
    Polygon::new(shell, rings.collect())
}
