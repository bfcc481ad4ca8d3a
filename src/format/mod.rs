//! Bytes to [`Table`], and tables to a GeoPackage.
//!
//! A row that cannot be read is refused and listed; only a source that cannot be read at all is an error.
//! After every read `read = table.len() + refused.len()`.
//!
//! Text (`.csv`, `.tsv`, `.txt`) and GeoJSON (`.geojson`, `.json`) are read here; every other source, shapefiles
//! included, goes through GDAL. Shapefiles do so because GDAL honours records marked as deleted and sorts the rings
//! of a polygon into shells and holes by position, not by their order in the file.

mod cells;
mod error;
mod geojson;
pub mod gpkg;
mod ogr;
mod shapes;
mod text;

pub use error::FormatError;
pub use ogr::is_valid_polygon;

use crate::notice::{Notice, Progress, Refusal};
use crate::table::Table;
use std::path::Path;

/// A vector source as the user named it and where it lies.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Source {
    /// The source as the user named it; messages use this spelling.
    pub path: String,
    /// What to open: a path that resolves from the working folder, or a GDAL connection string ("PG:…", "/vsi…").
    pub location: String,
    /// The layer, where the source has several.
    pub layer: Option<String>,
}

/// What came out of a source.
#[derive(Debug, Clone, PartialEq)]
pub struct ReadTable {
    /// The rows that could be read.
    pub table: Table,
    /// The rows that could not.
    pub refused: Vec<Refusal>,
    /// What was guessed or looks odd.
    pub notices: Vec<Notice>,
    /// All data rows of the source, the refused ones too.
    pub read: u64,
}

/// Reads one layer of a source.
///
/// `Table::rows` holds line numbers for text (the header is line 1), the position of the feature from 0 for GeoJSON,
/// and GDAL's feature id elsewhere (for a shapefile the record number from 0).
///
/// # Errors
/// [`FormatError`] where the source is missing, unreadable, empty, or has no such layer.
pub fn read(source: &Source, progress: &dyn Progress) -> Result<ReadTable, FormatError> {
    progress.begin(&format!("reading {}", source.path), None);
    let outcome = read_by_kind(source, progress);
    progress.end();
    outcome
}

fn read_by_kind(source: &Source, progress: &dyn Progress) -> Result<ReadTable, FormatError> {
    if ogr::is_connection(&source.location) {
        return ogr::read(source, progress);
    }
    let path = Path::new(&source.location);
    match extension(path).as_str() {
        "csv" | "tsv" | "txt" => text::read(source, &plain_file(source)?, progress),
        "geojson" | "json" => geojson::read(source, &plain_file(source)?, progress),
        "gdb" if path.is_dir() => ogr::read(source, progress),
        _ => {
            let size = plain_size(source)?;
            if size == 0 {
                return Err(FormatError::Empty { file: source.path.clone() });
            }
            ogr::read(source, progress)
        }
    }
}

fn extension(path: &Path) -> String {
    path.extension().map(|e| e.to_string_lossy().to_lowercase()).unwrap_or_default()
}

/// Size of a plain file, or why it cannot be one.
fn plain_size(source: &Source) -> Result<u64, FormatError> {
    let about = std::fs::metadata(&source.location).map_err(|cause| FormatError::io(&source.path, cause))?;
    if about.is_dir() {
        return Err(FormatError::Directory { file: source.path.clone() });
    }
    std::fs::File::open(&source.location).map_err(|cause| FormatError::io(&source.path, cause))?;
    Ok(about.len())
}

/// The bytes of a plain file that is not empty.
fn plain_file(source: &Source) -> Result<Vec<u8>, FormatError> {
    plain_size(source)?;
    let bytes = std::fs::read(&source.location).map_err(|cause| FormatError::io(&source.path, cause))?;
    if bytes.is_empty() { Err(FormatError::Empty { file: source.path.clone() }) } else { Ok(bytes) }
}

/// Holds a named layer against a file that has but one: its own name, or the file's without extension.
fn layer_is_the_file(source: &Source, own_name: Option<String>) -> Result<(), FormatError> {
    let stem = Path::new(&source.location).file_stem().map(|s| s.to_string_lossy().into_owned());
    let names: Vec<String> = own_name.into_iter().chain(stem).collect();
    match &source.layer {
        Some(layer) if !names.contains(layer) => Err(FormatError::NoSuchLayer {
            file: source.path.clone(),
            layer: layer.clone(),
            layers: names.into_iter().take(1).collect(),
        }),
        _ => Ok(()),
    }
}
