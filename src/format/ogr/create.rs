//! An empty GeoPackage: CRS, tables with key and geometry column, spatial indexes.

use super::{cause, complaints, prepare};
use gdal::DriverManager;
use gdal::cpl::CslStringList;
use gdal::spatial_ref::SpatialRef;
use gdal::vector::{LayerOptions, OGRwkbGeometryType};
use std::path::Path;

/// What a layer is called and what its geometry is.
pub(in crate::format) struct LayerSpec<'a> {
    pub name: &'a str,
    pub title: &'a str,
    pub description: &'a str,
    pub key: &'a str,
    /// Name and type (POINT, MULTIPOLYGON, MULTILINESTRING) of the geometry column.
    pub geometry: Option<(&'a str, &'a str)>,
}

/// Why GDAL made no GeoPackage.
pub(in crate::format) enum CreateError {
    /// It knows no such CRS.
    Crs(String),
    /// Anything else.
    Other(String),
}

/// Makes a GeoPackage 1.3 of empty layers, indexed where they have geometry, and closes it.
///
/// # Errors
/// [`CreateError`] with GDAL's own words.
pub(in crate::format) fn create(path: &Path, crs: &str, layers: &[LayerSpec<'_>]) -> Result<(), CreateError> {
    prepare();
    let other = |error| CreateError::Other(cause(&error));
    let srs = SpatialRef::from_definition(crs).map_err(|error| CreateError::Crs(cause(&error)))?;
    let driver = DriverManager::get_driver_by_name("GPKG").map_err(other)?;
    let mut options = CslStringList::new();
    options.set_name_value("VERSION", "1.3").map_err(other)?;
    let mut dataset = driver.create_with_band_type_with_options::<u8, _>(path, 0, 0, 0, &options).map_err(other)?;
    for layer in layers {
        let mut options = vec![
            format!("FID={}", layer.key),
            format!("IDENTIFIER={}", layer.title),
            format!("DESCRIPTION={}", layer.description),
        ];
        let ty = match layer.geometry {
            None => OGRwkbGeometryType::wkbNone,
            Some((column, kind)) => {
                options.push(format!("GEOMETRY_NAME={column}"));
                match kind {
                    "POINT" => OGRwkbGeometryType::wkbPoint,
                    "MULTIPOLYGON" => OGRwkbGeometryType::wkbMultiPolygon,
                    "MULTILINESTRING" => OGRwkbGeometryType::wkbMultiLineString,
                    _ => OGRwkbGeometryType::wkbUnknown,
                }
            }
        };
        let options: Vec<&str> = options.iter().map(String::as_str).collect();
        dataset
            .create_layer(LayerOptions { name: layer.name, srs: Some(&srs), ty, options: Some(&options) })
            .map_err(other)?;
    }
    dataset.close().map_err(other)?;
    // GDAL writes much of the file only now, and closing tells of no failure.
    match complaints().into_iter().find(|c| c.failure) {
        Some(failure) => Err(CreateError::Other(failure.message)),
        None => Ok(()),
    }
}
