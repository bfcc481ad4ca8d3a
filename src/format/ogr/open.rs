//! Opening a source and finding its layer.

use super::super::{FormatError, Source};
use super::cause;
use gdal::vector::{Layer, LayerAccess};
use gdal::{Dataset, DatasetOptions, GdalOpenFlags};
use std::collections::BTreeSet;
use std::path::Path;

/// Opens a source for reading; a zip file opens as what lies in it.
///
/// # Errors
/// Where GDAL cannot make anything of it.
pub(super) fn dataset(source: &Source, encoding: Option<&str>) -> Result<Dataset, FormatError> {
    let encoding = encoding.map(|name| format!("ENCODING={name}"));
    let open_options: Vec<&str> = encoding.as_deref().into_iter().collect();
    let options = DatasetOptions {
        open_flags: GdalOpenFlags::GDAL_OF_READONLY
            | GdalOpenFlags::GDAL_OF_VECTOR
            | GdalOpenFlags::GDAL_OF_VERBOSE_ERROR,
        open_options: Some(&open_options),
        ..DatasetOptions::default()
    };
    let extension = Path::new(&source.location).extension().map(|e| e.to_string_lossy().to_lowercase());
    let extension = extension.unwrap_or_default();
    let zipped = extension == "zip" && !source.location.starts_with("/vsi");
    let location = if zipped { within_zip(source)? } else { source.location.clone() };
    Dataset::open_ex(&location, options).map_err(|error| {
        let file = source.path.clone();
        let cause = cause(&error);
        match extension.as_str() {
            "gpkg" => FormatError::Corrupt { file, format: "a GeoPackage".into(), cause },
            "shp" => FormatError::Corrupt { file, format: "a shapefile".into(), cause },
            "zip" => FormatError::Corrupt { file, format: "a zipped vector file".into(), cause },
            _ if cause.contains("not recognized") => FormatError::Unsupported { file, cause: String::new() },
            _ => FormatError::Unsupported { file, cause: format!(" ({cause})") },
        }
    })
}

/// Where in a zip file the data lie; they are often in a folder of it.
///
/// # Errors
/// Where the zip holds data in several places.
fn within_zip(source: &Source) -> Result<String, FormatError> {
    const FORMATS: [&str; 8] = ["shp", "gpkg", "geojson", "json", "kml", "gml", "fgb", "tab"];
    let root = format!("/vsizip/{}", source.location);
    let mut places = BTreeSet::new();
    for member in gdal::vsi::read_dir(&root, true).unwrap_or_default() {
        let extension = member.extension().map(|e| e.to_string_lossy().to_lowercase()).unwrap_or_default();
        // Archives made on a Mac repeat each name in a folder of its own.
        if !FORMATS.contains(&extension.as_str()) || member.starts_with("__MACOSX") {
            continue;
        }
        // The shapefiles of a folder are layers of one source.
        let place = if extension == "shp" { member.parent().map(Path::to_owned).unwrap_or_default() } else { member };
        places.insert(place.to_string_lossy().into_owned());
    }
    match Vec::from_iter(places).as_slice() {
        [place] if !place.is_empty() => Ok(format!("{root}/{place}")),
        [] | [_] => Ok(root),
        several => Err(FormatError::Unsupported {
            file: source.path.clone(),
            cause: format!(" (the zip holds data in several places, {}; unpack it)", several.join(" and ")),
        }),
    }
}

/// Finds the layer that was named; else the only one, or the only one with geometry.
///
/// # Errors
/// Where the layer is not there or not clear.
pub(super) fn layer<'d>(source: &Source, dataset: &'d Dataset) -> Result<Layer<'d>, FormatError> {
    let file = source.path.clone();
    let names = || dataset.layers().map(|layer| layer.name()).collect::<Vec<_>>();
    if let Some(wanted) = &source.layer {
        let by_name = || dataset.layers().find(|layer| layer.name().eq_ignore_ascii_case(wanted));
        return dataset
            .layers()
            .find(|layer| &layer.name() == wanted)
            .or_else(by_name)
            .ok_or_else(|| FormatError::NoSuchLayer { file, layer: wanted.clone(), layers: names() });
    }
    let spatial = |layer: &Layer<'_>| layer.defn().geom_fields().next().is_some();
    let count = dataset.layer_count();
    let spatial_count = dataset.layers().filter(spatial).count();
    let only = match (count, spatial_count) {
        (0, _) => return Err(FormatError::NoLayers { file }),
        (1, _) => dataset.layers().next(),
        (_, 1) => dataset.layers().find(spatial),
        _ => None,
    };
    only.ok_or_else(|| FormatError::SeveralLayers { file, layers: names() })
}
