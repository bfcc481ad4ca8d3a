//! What a GeoPackage is to hold.

use crate::table::{Column, Table};
use std::collections::HashSet;

/// The geometry type of a layer; its shapes are promoted to it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum GeometryKind {
    /// No geometry: an attributes table.
    None,
    /// Points.
    Point,
    /// Polygons of one or more parts.
    MultiPolygon,
    /// Lines of one or more parts.
    MultiLineString,
}

/// One table to write as a layer.
#[derive(Debug, Clone)]
pub struct LayerToWrite<'a> {
    /// Columns and shapes; `Table::name` is the layer's name. Shapes are in the package's CRS, x (easting) first.
    pub table: &'a Table,
    /// Geometry type.
    pub geometry: GeometryKind,
    /// A title for people, unique in the package; the layer's name where empty.
    pub title: String,
    /// What a row is.
    pub description: String,
}

/// One record of metadata about the whole package.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Metadata {
    /// URI of the standard or convention that the record follows.
    pub standard_uri: String,
    /// For example `application/json` or `text/plain`.
    pub mime_type: String,
    /// The record itself.
    pub text: String,
}

/// A symbol style stored beside its layer, in the widespread table `layer_styles`.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Style {
    /// The layer it draws.
    pub layer: String,
    /// Name, at most 30 characters.
    pub name: String,
    /// The style as QML.
    pub qml: String,
    /// The style as SLD.
    pub sld: String,
    /// What it shows.
    pub description: String,
    /// True for the style to draw the layer with when nothing else is asked for.
    pub default: bool,
}

/// A GeoPackage to write.
#[derive(Debug, Clone)]
pub struct Package<'a> {
    /// CRS of every layer, as an authority code ("EPSG:32633") or WKT.
    pub crs: String,
    /// Layers, in this order.
    pub layers: Vec<LayerToWrite<'a>>,
    /// Metadata of the whole package.
    pub metadata: Vec<Metadata>,
    /// Styles.
    pub styles: Vec<Style>,
    /// Time stamp of everything in the file, `YYYY-MM-DDTHH:MM:SS.SSSZ`; the system's clock is never read.
    pub last_change: String,
}

/// Name of the primary key in every layer.
pub const KEY: &str = "fid";
/// Name of the geometry column in every layer that has one.
pub const GEOMETRY: &str = "geom";
/// Most columns of a layer beside key and geometry: SQLite's default limit is 2000.
const MOST_COLUMNS: usize = 1990;
/// Longest name of a style.
const STYLE_NAME: usize = 30;

impl Package<'_> {
    /// What keeps the package from being a valid GeoPackage, if anything.
    pub(super) fn fault(&self) -> Option<String> {
        if !is_time_stamp(&self.last_change) {
            return Some(format!("last_change \"{}\" is not YYYY-MM-DDTHH:MM:SS.SSSZ", self.last_change));
        }
        let mut names = HashSet::new();
        let mut titles = HashSet::new();
        for layer in &self.layers {
            let name = &layer.table.name;
            let lower = name.to_lowercase();
            if name.is_empty()
                || name.contains('\0')
                || ["gpkg_", "rtree_", "sqlite_"].iter().any(|p| lower.starts_with(p))
            {
                return Some(format!("\"{name}\" cannot be the name of a layer"));
            }
            if lower == STYLES || !names.insert(lower) {
                return Some(format!("two tables named \"{name}\""));
            }
            if !titles.insert(layer.title()) {
                return Some(format!("two layers titled \"{}\"", layer.title()));
            }
            if let Some(fault) = layer.fault() {
                return Some(format!("layer \"{name}\": {fault}"));
            }
        }
        self.styles.iter().find_map(|style| {
            if style.name.chars().count() > STYLE_NAME {
                return Some(format!("style name \"{}\" has more than {STYLE_NAME} characters", style.name));
            }
            let found = self.layers.iter().any(|l| l.table.name == style.layer && l.geometry != GeometryKind::None);
            (!found).then(|| {
                format!("style \"{}\" is for \"{}\", which is no layer with geometry", style.name, style.layer)
            })
        })
    }
}

/// Name of the table of styles.
pub(super) const STYLES: &str = "layer_styles";

impl LayerToWrite<'_> {
    /// Title for people, never empty.
    pub(super) fn title(&self) -> &str {
        if self.title.is_empty() { &self.table.name } else { &self.title }
    }

    fn fault(&self) -> Option<String> {
        let mut names = HashSet::from([KEY.to_owned()]);
        if self.geometry != GeometryKind::None {
            names.insert(GEOMETRY.to_owned());
        }
        let rows = self.table.len();
        if self.table.fields.len() > MOST_COLUMNS {
            let columns = self.table.fields.len();
            return Some(format!("{columns} columns, where a GeoPackage layer holds {MOST_COLUMNS} at most"));
        }
        for field in &self.table.fields {
            if field.name.is_empty() || field.name.contains('\0') {
                return Some(format!("\"{}\" cannot be the name of a column", field.name));
            }
            if !names.insert(field.name.to_lowercase()) {
                return Some(format!("two columns named \"{}\" (names differ by more than case)", field.name));
            }
            if field.column.len() != rows {
                return Some(format!("column \"{}\" has {} rows, not {rows}", field.name, field.column.len()));
            }
        }
        let shapes = super::shape_count(&self.table.shapes);
        (self.geometry != GeometryKind::None && shapes != rows).then(|| format!("{shapes} shapes for {rows} rows"))
    }
}

/// The GeoPackage type of a column.
pub(super) fn sql_type(column: &Column) -> &'static str {
    match column {
        Column::Text(_) | Column::Word(_) => "TEXT",
        Column::Real(_) => "DOUBLE",
        Column::Integer(_) => "INTEGER",
        Column::Boolean(_) => "BOOLEAN",
        Column::Date(_) => "DATE",
    }
}

/// True for `YYYY-MM-DDTHH:MM:SS.SSSZ`.
fn is_time_stamp(text: &str) -> bool {
    const FORM: &[u8] = b"0000-00-00T00:00:00.000Z";
    text.len() == FORM.len()
        && text.bytes().zip(FORM).all(|(b, &f)| if f == b'0' { b.is_ascii_digit() } else { b == f })
}
