//! GeoJSON: RFC 7946, and the `crs` member of its forerunner of 2008.
//!
//! The document is first cut into features, each still text, so that one bad feature costs no other.

mod feature;

use super::cells::{Given, Growing};
use super::shapes::ShapesBuilder;
use super::text::decode;
use super::{FormatError, ReadTable, Source, layer_is_the_file, ogr};
use crate::notice::{Progress, Refusal};
use crate::table::{Field, Table};
use feature::{Cell, Feature};
use rayon::iter::{IntoParallelRefIterator, ParallelIterator};
use serde::Deserialize;
use serde_json::Value;
use serde_json::value::RawValue;
use std::borrow::Cow;
use std::collections::HashMap;

/// Features parsed at a time.
const BATCH: usize = 1 << 15;

/// A document, as far as needed.
#[derive(Deserialize)]
struct Document<'a> {
    #[serde(borrow, rename = "type", default)]
    kind: Option<Cow<'a, str>>,
    #[serde(borrow, default)]
    name: Option<&'a RawValue>,
    #[serde(default)]
    crs: Option<Value>,
    #[serde(borrow, default)]
    features: Option<Vec<&'a RawValue>>,
}

/// Reads the features of a collection, or a lone feature or geometry. A row is the feature's place, from 0.
///
/// # Errors
/// [`FormatError`] where the file is no JSON, or has no features. JSON of another kind goes to GDAL.
pub(super) fn read(source: &Source, bytes: &[u8], progress: &dyn Progress) -> Result<ReadTable, FormatError> {
    let file = source.path.clone();
    let corrupt = |cause: String| FormatError::Corrupt { file: file.clone(), format: "GeoJSON".into(), cause };
    let text = decode::to_utf8(bytes);
    let text =
        std::str::from_utf8(&text.bytes).map_err(|e| corrupt(format!("byte {} is not UTF-8", e.valid_up_to())))?;
    let document: Document<'_> = match serde_json::from_str(text) {
        Ok(document) => document,
        Err(error) if error.is_data() => return ogr::read(source, progress),
        Err(error) => return Err(corrupt(error.to_string())),
    };
    let whole = || serde_json::from_str::<&RawValue>(text).map_err(|error| corrupt(error.to_string()));
    let features = match (document.kind.as_deref(), document.features) {
        (Some("FeatureCollection"), Some(features)) => features,
        (Some(kind), _) if kind == "Feature" || feature::is_geometry(kind) => vec![whole()?],
        _ => return ogr::read(source, progress),
    };
    let own_name = document.name.and_then(|name| serde_json::from_str::<String>(name.get()).ok());
    layer_is_the_file(source, own_name)?;
    if features.is_empty() {
        return Err(FormatError::NoFeatures { file });
    }

    let mut building = Building::default();
    for batch in features.chunks(BATCH) {
        let parsed: Vec<Result<Feature<'_>, String>> = batch.par_iter().map(|raw| feature::parse(raw.get())).collect();
        parsed.into_iter().for_each(|feature| building.push(feature, &file));
        progress.advance(batch.len() as u64);
    }
    let mut table = Table::new(file.clone());
    table.crs = crs(document.crs.as_ref());
    table.rows = building.rows;
    table.shapes = building.shapes.finish();
    for (name, column) in building.names.into_iter().zip(building.columns) {
        let (title, description) = (String::new(), String::new());
        table.fields.push(Field { name, title, description, column: column.finish() });
    }
    Ok(ReadTable { table, refused: building.refused, notices: Vec::new(), read: features.len() as u64 })
}

/// The CRS: RFC 7946 knows only WGS 84 with longitude first; files of 2008's kind may name another.
fn crs(member: Option<&Value>) -> Option<String> {
    const WGS_84: &str = "EPSG:4326";
    let Some(member) = member else { return Some(WGS_84.to_owned()) };
    let name = member.pointer("/properties/name")?.as_str()?;
    if name.ends_with("CRS84") {
        return Some(WGS_84.to_owned());
    }
    let urn = name.to_ascii_lowercase();
    let Some(parts) = urn.strip_prefix("urn:ogc:def:crs:").or_else(|| urn.strip_prefix("urn:x-ogc:def:crs:")) else {
        return Some(name.to_owned());
    };
    // authority:version:code, the version mostly empty
    let parts: Vec<&str> = parts.split(':').collect();
    match parts[..] {
        [authority, .., code] => Some(format!("{}:{code}", authority.to_uppercase())),
        _ => Some(name.to_owned()),
    }
}

/// Columns in the making, in the order in which their names first come.
#[derive(Default)]
struct Building {
    names: Vec<String>,
    places: HashMap<String, usize>,
    columns: Vec<Growing>,
    shapes: ShapesBuilder,
    rows: Vec<u64>,
    refused: Vec<Refusal>,
}

impl Building {
    fn push(&mut self, feature: Result<Feature<'_>, String>, file: &str) {
        let row = (self.rows.len() + self.refused.len()) as u64;
        let feature = match feature {
            Ok(feature) => feature,
            Err(reason) => {
                let (source, column, value) = (file.to_owned(), None, None);
                self.refused.push(Refusal { source, row, column, value, code: "bad-feature", reason });
                return;
            }
        };
        let before = self.rows.len();
        for (i, (name, cell)) in feature.cells.iter().enumerate() {
            // Features mostly name the same properties in the same order.
            let place =
                if self.names.get(i).is_some_and(|n| n == name) { Some(i) } else { self.places.get(&**name).copied() };
            let place = place.unwrap_or_else(|| {
                self.names.push(name.to_string());
                self.places.insert(name.to_string(), self.columns.len());
                self.columns.push(Growing::Nulls(before));
                self.columns.len() - 1
            });
            let column = &mut self.columns[place];
            // A name given twice in one feature counts once.
            if column.len() == before {
                column.push(match cell {
                    Cell::Null => Given::Null,
                    Cell::Integer(v) => Given::Integer(*v),
                    Cell::Real(v) => Given::Real(*v),
                    Cell::Boolean(v) => Given::Boolean(*v),
                    Cell::Text(v) => Given::Text(v),
                });
            }
        }
        self.columns.iter_mut().filter(|c| c.len() == before).for_each(|c| c.push(Given::Null));
        self.shapes.push(feature.shape);
        self.rows.push(row);
    }
}

#[cfg(test)]
mod tests {
    use super::crs;
    use serde_json::json;

    #[test]
    fn a_named_crs_is_used_and_none_means_wgs_84() {
        let named = |name: &str| crs(Some(&json!({"type": "name", "properties": {"name": name}})));
        assert_eq!(crs(None).as_deref(), Some("EPSG:4326"));
        assert_eq!(named("urn:ogc:def:crs:EPSG::32633").as_deref(), Some("EPSG:32633"));
        assert_eq!(named("urn:ogc:def:crs:OGC:1.3:CRS84").as_deref(), Some("EPSG:4326"));
        assert_eq!(named("EPSG:2056").as_deref(), Some("EPSG:2056"));
    }
}
