//! GDAL: the only place that knows it. Reads any vector source, and makes the empty GeoPackage that rows go into.

mod create;
mod geometry;
mod layer;
mod linear;
mod open;
mod shapefile;

pub(super) use create::{CreateError, LayerSpec, create};

pub use geometry::is_valid_polygon;

use super::{FormatError, ReadTable, Source};
use crate::notice::Progress;
use std::cell::RefCell;
use std::path::Path;
use std::sync::Once;

thread_local! {
    /// What GDAL complained of on this thread since it was last asked.
    static COMPLAINTS: RefCell<Vec<Complaint>> = const { RefCell::new(Vec::new()) };
}

/// A warning or failure in GDAL's words.
struct Complaint {
    failure: bool,
    message: String,
}

/// Makes GDAL tell us instead of the terminal, and hand out straight lines in place of arcs.
fn prepare() {
    static ONCE: Once = Once::new();
    ONCE.call_once(|| {
        gdal::config::set_error_handler(|kind, _, message| {
            use gdal::errors::CplErrType::{Debug, Failure, Fatal, None};
            if !matches!(kind, Debug | None) {
                let failure = matches!(kind, Failure | Fatal);
                COMPLAINTS.with_borrow_mut(|list| {
                    if list.len() < 100 && !list.iter().any(|c| c.message == message) {
                        list.push(Complaint { failure, message: message.to_owned() });
                    }
                });
            }
        });
        linear::straighten_arcs();
    });
    complaints();
}

/// What GDAL complained of on this thread since the last call.
fn complaints() -> Vec<Complaint> {
    COMPLAINTS.with_borrow_mut(std::mem::take)
}

/// What GDAL complained of last, else the error itself.
fn cause(error: &gdal::errors::GdalError) -> String {
    complaints().pop().map_or_else(|| error.to_string(), |c| c.message)
}

/// True for a location that is no path of the file system: a GDAL virtual path, a database or a web address.
pub(super) fn is_connection(location: &str) -> bool {
    let scheme = location.split_once(':').map_or("", |(scheme, _)| scheme);
    // One letter is a drive; a file's own name may hold a colon.
    let is_scheme = scheme.len() > 1 && scheme.bytes().all(|b| b.is_ascii_alphanumeric() || b == b'_');
    location.starts_with("/vsi") || (is_scheme && !Path::new(location).exists())
}

/// Reads a layer.
///
/// # Errors
/// [`FormatError`] where GDAL cannot open the source, or the layer is not there, not clear or empty.
pub(super) fn read(source: &Source, progress: &dyn Progress) -> Result<ReadTable, FormatError> {
    prepare();
    let shapefile = shapefile::about(source)?;
    let dataset = open::dataset(source, shapefile.as_ref().and_then(|s| s.encoding))?;
    let mut layer = open::layer(source, &dataset)?;
    let mut read = layer::read(source, &mut layer, progress)?;
    if let Some(shapefile) = shapefile {
        read.notices.extend(shapefile.notice);
    }
    Ok(read)
}
