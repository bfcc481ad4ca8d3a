//! Why a job stopped. Each message names the file and what to do.

use super::area_error::AreaFileError;
use super::gather::Checked;
use super::outputs::OutputError;
use crate::crs::CrsError;
use crate::domain::DomainError;
use crate::format::FormatError;
use crate::format::gpkg::WriteError;
use crate::input::InputError;
use thiserror::Error;

/// Why a job stopped.
#[derive(Debug, Error)]
pub enum JobError {
    /// Neither an area file nor stations were named.
    #[error("nothing to do: name an area file, or stations with --stations FILE")]
    NothingToDo,
    /// The area file cannot be used.
    #[error(transparent)]
    AreaFile(#[from] AreaFileError),
    /// A source cannot be read.
    #[error(transparent)]
    Format(#[from] FormatError),
    /// A source cannot be understood.
    #[error("{}{}", .0, .0.hint().map(|h| format!(" ({h})")).unwrap_or_default())]
    Input(#[from] InputError),
    /// A CRS cannot be used.
    #[error("{}{}", .0, .0.hint().map(|h| format!(" ({h})")).unwrap_or_default())]
    Crs(CrsError),
    /// The polygons cannot serve as domains.
    #[error(transparent)]
    Domain(#[from] DomainError),
    /// A file has no CRS.
    #[error(
        "{file}: does not say its coordinate reference system; give the file a .prj, or choose a format that carries one"
    )]
    NoCrs {
        /// The file.
        file: String,
    },
    /// A shape has no place on the map.
    #[error(
        "{file}: feature {feature} has vertices with no place in {crs}, read as {from}; GeoJSON that does not name its CRS is longitude and latitude by its standard"
    )]
    OffTheMap {
        /// The file.
        file: String,
        /// Feature id or line.
        feature: u64,
        /// The CRS the file says.
        from: String,
        /// The map CRS.
        crs: String,
    },
    /// Every row was refused.
    #[error("no reading is left{}", .0.why())]
    NothingLeft(Box<Checked>),
    /// An input vanished or changed while it was hashed.
    #[error("{file}: cannot be read: {cause}")]
    Unreadable {
        /// The file.
        file: String,
        /// What the system says.
        cause: std::io::Error,
    },
    /// The results cannot be written.
    #[error(transparent)]
    Output(#[from] OutputError),
    /// The GeoPackage cannot be written.
    #[error("{0}; nothing was changed in the output folder")]
    Write(#[from] WriteError),
}

impl From<CrsError> for JobError {
    fn from(error: CrsError) -> Self {
        Self::Crs(error)
    }
}
