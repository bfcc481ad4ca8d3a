//! Why a source cannot be read at all.

use std::io;

/// A source that cannot be read; every message names the source and says what to do.
#[derive(Debug, thiserror::Error)]
pub enum FormatError {
    /// Nothing lies at the path.
    #[error("{file}: no such file; check the spelling, and that the path is relative to where it is written")]
    Missing {
        /// The source as the user named it.
        file: String,
    },
    /// The path is a folder.
    #[error("{file}: is a folder, not a file; name the file in it")]
    Directory {
        /// The source as the user named it.
        file: String,
    },
    /// The system forbids reading.
    #[error("{file}: permission denied; make the file readable for your user")]
    Denied {
        /// The source as the user named it.
        file: String,
    },
    /// The system cannot read the bytes.
    #[error("{file}: cannot be read ({cause})")]
    Unreadable {
        /// The source as the user named it.
        file: String,
        /// What the system said.
        cause: io::Error,
    },
    /// No bytes at all.
    #[error("{file}: the file is empty; was the export or download finished?")]
    Empty {
        /// The source as the user named it.
        file: String,
    },
    /// A header, and nothing below it.
    #[error("{file}: has a header but no rows; was the export finished, or a filter left on?")]
    NoRows {
        /// The source as the user named it.
        file: String,
    },
    /// A layer or collection without features.
    #[error("{file}: has no features; was the export finished, or a filter left on?")]
    NoFeatures {
        /// The source as the user named it.
        file: String,
    },
    /// A text file that holds binary data.
    #[error("{file}, line {line}: holds binary data, not text; save the table as CSV in UTF-8")]
    NotText {
        /// The source as the user named it.
        file: String,
        /// Where the first NUL byte stands.
        line: u64,
    },
    /// A header that is not UTF-8.
    #[error("{file}, line {line}: the header is not UTF-8 (it reads \"{header}\"); save the table as CSV in UTF-8")]
    HeaderNotUtf8 {
        /// The source as the user named it.
        file: String,
        /// Where the header stands.
        line: u64,
        /// The header with each undecodable byte replaced.
        header: String,
    },
    /// A line longer than any table has.
    #[error("{file}, line {line}: longer than {limit} bytes; is this a table, with one record to a line?")]
    LineTooLong {
        /// The source as the user named it.
        file: String,
        /// Where the line starts.
        line: u64,
        /// The limit in bytes.
        limit: usize,
    },
    /// The content breaks the rules of its format.
    #[error("{file}: cannot be read as {format}: {cause}; the file is damaged or of another kind than its name says")]
    Corrupt {
        /// The source as the user named it.
        file: String,
        /// The format it was taken for.
        format: String,
        /// What the reader found.
        cause: String,
    },
    /// GDAL knows no such format.
    #[error(
        "{file}: not a format that can be read{cause}; use .csv, .geojson, .shp, .gpkg or another vector format of GDAL"
    )]
    Unsupported {
        /// The source as the user named it.
        file: String,
        /// What GDAL said, in brackets, or nothing.
        cause: String,
    },
    /// A shapefile without one of its parts.
    #[error("{file}: its part {part} is missing; copy it beside the .shp, a shapefile is .shp, .shx and .dbf together")]
    MissingPart {
        /// The source as the user named it.
        file: String,
        /// File name of what is missing.
        part: String,
    },
    /// The layer asked for is not there.
    #[error("{file}: has no layer \"{layer}\"; it has {}", listed(.layers))]
    NoSuchLayer {
        /// The source as the user named it.
        file: String,
        /// The layer asked for.
        layer: String,
        /// What is there.
        layers: Vec<String>,
    },
    /// Several layers, and none was named.
    #[error("{file}: has {} layers, name one: {}", .layers.len(), listed(.layers))]
    SeveralLayers {
        /// The source as the user named it.
        file: String,
        /// What is there.
        layers: Vec<String>,
    },
    /// Not one layer.
    #[error("{file}: has no vector layer")]
    NoLayers {
        /// The source as the user named it.
        file: String,
    },
}

impl FormatError {
    pub(super) fn io(file: &str, cause: io::Error) -> Self {
        let file = file.to_owned();
        match cause.kind() {
            io::ErrorKind::NotFound => Self::Missing { file },
            io::ErrorKind::PermissionDenied => Self::Denied { file },
            io::ErrorKind::IsADirectory => Self::Directory { file },
            _ => Self::Unreadable { file, cause },
        }
    }
}

fn listed(layers: &[String]) -> String {
    const MOST: usize = 20;
    let mut list = layers.iter().take(MOST).map(|l| format!("\"{l}\"")).collect::<Vec<_>>().join(", ");
    if layers.len() > MOST {
        list.push_str(&format!(" and {} more", layers.len() - MOST));
    }
    list
}
