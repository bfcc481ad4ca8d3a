//! One GeoJSON feature.

use super::super::shapes::all_finite;
use geo_types::Geometry;
use geojson::GeometryValue;
use serde::Deserialize;
use serde::de::{Deserializer, MapAccess, Visitor};
use serde_json::value::RawValue;
use std::borrow::Cow;
use std::fmt;

/// A feature's geometry and properties, the latter in the order written.
pub(super) struct Feature<'a> {
    pub shape: Option<Geometry<f64>>,
    pub cells: Vec<(Cow<'a, str>, Cell<'a>)>,
}

/// A property.
pub(super) enum Cell<'a> {
    Null,
    Integer(i64),
    Real(f64),
    Boolean(bool),
    Text(Cow<'a, str>),
}

/// True for the name of a kind of geometry.
pub(super) fn is_geometry(kind: &str) -> bool {
    const KINDS: [&str; 7] =
        ["Point", "MultiPoint", "LineString", "MultiLineString", "Polygon", "MultiPolygon", "GeometryCollection"];
    KINDS.contains(&kind)
}

#[derive(Deserialize)]
struct Written<'a> {
    #[serde(borrow, rename = "type")]
    kind: Cow<'a, str>,
    #[serde(borrow, default)]
    id: Option<&'a RawValue>,
    #[serde(borrow, default)]
    geometry: Option<&'a RawValue>,
    #[serde(borrow, default)]
    properties: Option<Properties<'a>>,
}

/// Reads a feature, or a bare geometry. A feature's `id` is a property of that name unless there is one.
///
/// # Errors
/// What is wrong with it, as the reason of a refusal.
pub(super) fn parse(text: &str) -> Result<Feature<'_>, String> {
    let written: Written<'_> = serde_json::from_str(text).map_err(|error| format!("not a feature: {error}"))?;
    if is_geometry(&written.kind) {
        return Ok(Feature { shape: shape(text)?, cells: Vec::new() });
    }
    if written.kind != "Feature" {
        return Err(format!("not a feature but a \"{}\"", written.kind));
    }
    let shape = written.geometry.map_or(Ok(None), |raw| shape(raw.get()))?;
    let mut cells = Vec::new();
    for (name, raw) in written.properties.map(|p| p.0).unwrap_or_default() {
        cells.push((name, cell(raw.get())));
    }
    if let Some(id) = written.id
        && !cells.iter().any(|(name, _)| name == "id")
    {
        cells.push(("id".into(), cell(id.get())));
    }
    Ok(Feature { shape, cells })
}

/// Lists and objects stay text; so do whole numbers too large for 64 bits.
fn cell(raw: &str) -> Cell<'_> {
    match raw.as_bytes().first() {
        Some(b'n') => Cell::Null,
        Some(b't') => Cell::Boolean(true),
        Some(b'f') => Cell::Boolean(false),
        Some(b'"') => Cell::Text(match serde_json::from_str::<Quoted<'_>>(raw) {
            Ok(text) => text.0,
            Err(_) => raw.into(),
        }),
        Some(b'-' | b'0'..=b'9') => {
            if let Ok(whole) = raw.parse::<i64>()
                && whole != i64::MIN
            {
                return Cell::Integer(whole);
            }
            match raw.parse::<f64>() {
                Ok(real) if real.is_finite() && raw.contains(['.', 'e', 'E']) => Cell::Real(real),
                _ => Cell::Text(raw.into()),
            }
        }
        _ => Cell::Text(raw.into()),
    }
}

#[derive(Deserialize)]
struct Quoted<'a>(#[serde(borrow)] Cow<'a, str>);

/// Properties in the order written.
struct Properties<'a>(Vec<(Cow<'a, str>, &'a RawValue)>);

impl<'de: 'a, 'a> Deserialize<'de> for Properties<'a> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        struct InOrder;
        impl<'de> Visitor<'de> for InOrder {
            type Value = Properties<'de>;

            fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
                f.write_str("an object of properties")
            }

            fn visit_map<M: MapAccess<'de>>(self, mut map: M) -> Result<Self::Value, M::Error> {
                let mut list = Vec::new();
                while let Some((Quoted(name), value)) = map.next_entry::<Quoted<'de>, &'de RawValue>()? {
                    list.push((name, value));
                }
                Ok(Properties(list))
            }
        }
        deserializer.deserialize_map(InOrder)
    }
}

/// The geometry; nothing for an empty one.
fn shape(text: &str) -> Result<Option<Geometry<f64>>, String> {
    let written: geojson::Geometry =
        serde_json::from_str(text).map_err(|error| format!("its geometry cannot be read: {error}"))?;
    if !positions_whole(&written.value) {
        return Err("its geometry has a position of fewer than two numbers".to_owned());
    }
    let shape: Geometry<f64> =
        (&written.value).try_into().map_err(|error| format!("its geometry cannot be read: {error}"))?;
    if !all_finite(&shape) {
        return Err("a coordinate of its geometry is not a finite number".to_owned());
    }
    use geo::HasDimensions;
    Ok(Some(shape).filter(|s| !s.is_empty()))
}

/// True where every position has at least two numbers.
fn positions_whole(value: &GeometryValue) -> bool {
    let position = |p: &geojson::Position| p.len() >= 2;
    let line = |l: &Vec<geojson::Position>| l.iter().all(position);
    let polygon = |p: &Vec<Vec<geojson::Position>>| p.iter().all(line);
    match value {
        GeometryValue::Point { coordinates } => position(coordinates),
        GeometryValue::MultiPoint { coordinates } | GeometryValue::LineString { coordinates } => line(coordinates),
        GeometryValue::MultiLineString { coordinates } | GeometryValue::Polygon { coordinates } => polygon(coordinates),
        GeometryValue::MultiPolygon { coordinates } => coordinates.iter().all(polygon),
        GeometryValue::GeometryCollection { geometries } => geometries.iter().all(|g| positions_whole(&g.value)),
    }
}
