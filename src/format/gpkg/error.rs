//! Why a GeoPackage cannot be written.

use std::io;

/// A GeoPackage that was not written. Whatever stood at the target is untouched, and no temporary file is left.
#[derive(Debug, thiserror::Error)]
pub enum WriteError {
    /// The target's folder cannot take a file.
    #[error("{target}: cannot write in the folder {folder} ({cause}); does it exist, and may you write there?")]
    Folder {
        /// The file to write.
        target: String,
        /// Its folder.
        folder: String,
        /// What the system said.
        cause: io::Error,
    },
    /// The device is full.
    #[error("{target}: no space left in the folder {folder}; free some, or write elsewhere")]
    NoSpace {
        /// The file to write.
        target: String,
        /// Its folder.
        folder: String,
    },
    /// The tables do not make a valid GeoPackage.
    #[error("{target}: {fault}")]
    Invalid {
        /// The file to write.
        target: String,
        /// What is wrong.
        fault: String,
    },
    /// The CRS means nothing to PROJ.
    #[error("{target}: unknown CRS \"{crs}\" ({cause}); give an authority code such as \"EPSG:32633\", or WKT")]
    Crs {
        /// The file to write.
        target: String,
        /// The CRS as given.
        crs: String,
        /// What GDAL said.
        cause: String,
    },
    /// GDAL cannot make the file.
    #[error("{target}: cannot make a GeoPackage in the folder {folder} ({cause})")]
    Create {
        /// The file to write.
        target: String,
        /// Its folder.
        folder: String,
        /// What GDAL said.
        cause: String,
    },
    /// SQLite cannot write the content.
    #[error("{target}: writing {what} in the folder {folder} failed ({cause})")]
    Content {
        /// The file to write.
        target: String,
        /// Its folder.
        folder: String,
        /// What was being written.
        what: String,
        /// What SQLite said.
        cause: String,
    },
    /// The finished file cannot take the target's place.
    #[error("{target}: the finished file cannot be put in place ({cause}); is the target open elsewhere, or a folder?")]
    Place {
        /// The file to write.
        target: String,
        /// What the system said.
        cause: io::Error,
    },
}
