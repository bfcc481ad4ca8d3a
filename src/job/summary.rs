//! `summary.json`: the layers' rows as arrays, and how the run came about.

use crate::table::{Cell, Shapes, Table};
use serde::ser::{SerializeMap, SerializeSeq};
use serde::{Serialize, Serializer};
use std::collections::BTreeMap;

/// The `orientations` array is left out of areas with more readings than this: the GeoPackage has them,
/// and a summary is read whole.
const READINGS_IN_SUMMARY: usize = 10_000;

/// How many rows a source had and what became of them; `read` = `kept` + `refused`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize)]
pub struct Counts {
    /// Data rows in the source.
    pub read: u64,
    /// Readings in the output.
    pub kept: u64,
    /// Rows in `refusals`.
    pub refused: u64,
}

/// The counts of the whole run and of each source.
#[derive(Debug, Clone, PartialEq, Eq, Default, Serialize)]
pub struct AllCounts {
    /// Of all sources.
    #[serde(flatten)]
    pub total: Counts,
    /// By source, as the area file names it.
    pub by_source: BTreeMap<String, Counts>,
    /// Refused rows by the kind of fault.
    pub refused_by_code: BTreeMap<String, u64>,
}

/// A file that went in.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Input {
    /// As the area file names it.
    pub file: String,
    /// What it was used as: stations, polygons …
    pub role: &'static str,
    /// Size in bytes; null where the source is not a file.
    pub bytes: Option<u64>,
    /// SHA-256 of its bytes; null where the source is not a file.
    pub sha256: Option<String>,
}

/// One message, as it stands in the summary and in `--format json`.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Message {
    /// `info`, `warning` or `error`.
    pub severity: &'static str,
    /// Stable name.
    pub code: String,
    /// Source.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub file: Option<String>,
    /// Row.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub row: Option<u64>,
    /// Column.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub column: Option<String>,
    /// One sentence.
    pub message: String,
    /// Advice.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub hint: Option<String>,
}

/// How the run came about.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RunRecord {
    /// Program version.
    pub version: &'static str,
    /// Title of the area.
    pub name: String,
    /// Seed of every random step.
    pub seed: u64,
    /// CRS of the layers.
    pub crs: String,
    /// The files that went in.
    pub inputs: Vec<Input>,
    /// The area file's options as used, defaults filled in.
    pub options: serde_json::Value,
    /// How many rows were read, kept and refused.
    pub counts: AllCounts,
    /// What the run had to say.
    pub messages: Vec<Message>,
}

/// The whole summary, ready to be serialised.
pub struct Summary<'a> {
    /// How the run came about.
    pub run: &'a RunRecord,
    /// The layers.
    pub layers: &'a [Table],
}

impl Serialize for Summary<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut map = serializer.serialize_map(None)?;
        map.serialize_entry("run", self.run)?;
        for layer in self.layers {
            if layer.name != "orientations" || layer.len() <= READINGS_IN_SUMMARY {
                map.serialize_entry(&layer.name, &Rows(layer))?;
            }
        }
        map.end()
    }
}

/// A table as an array of objects; points add `x` and `y`.
struct Rows<'a>(&'a Table);

impl Serialize for Rows<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut rows = serializer.serialize_seq(Some(self.0.len()))?;
        for row in 0..self.0.len() {
            rows.serialize_element(&Row { table: self.0, row })?;
        }
        rows.end()
    }
}

struct Row<'a> {
    table: &'a Table,
    row: usize,
}

impl Serialize for Row<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut map = serializer.serialize_map(None)?;
        for field in &self.table.fields {
            match field.column.cell(self.row) {
                Cell::Null => map.serialize_entry(&field.name, &())?,
                Cell::Text(v) => map.serialize_entry(&field.name, v)?,
                Cell::Real(v) => map.serialize_entry(&field.name, &v)?,
                Cell::Integer(v) => map.serialize_entry(&field.name, &v)?,
                Cell::Boolean(v) => map.serialize_entry(&field.name, &v)?,
            }
        }
        let has = |name: &str| self.table.fields.iter().any(|f| f.name == name);
        if let (Shapes::Points(points), false) = (&self.table.shapes, has("x") || has("y")) {
            let at = points[self.row];
            if at.x.is_finite() && at.y.is_finite() {
                map.serialize_entry("x", &at.x)?;
                map.serialize_entry("y", &at.y)?;
            }
        }
        map.end()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::table::Column;

    #[test]
    fn rows_become_objects_with_nulls_and_places() {
        let mut table = Table::new("fabrics")
            .with("n", "", "", [Some(3_i64), None].into_iter().collect::<Column>())
            .with("s1", "", "", [Some(0.5), None].into_iter().collect::<Column>());
        table.shapes = Shapes::Points(vec![(1.0, 2.0).into(), (f64::NAN, f64::NAN).into()]);
        let json = serde_json::to_string(&Rows(&table)).unwrap();
        assert_eq!(json, r#"[{"n":3,"s1":0.5,"x":1.0,"y":2.0},{"n":null,"s1":null}]"#);
    }
}
