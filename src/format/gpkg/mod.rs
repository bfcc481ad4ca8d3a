//! Tables to one GeoPackage 1.3, as a whole or not at all.
//!
//! GDAL makes the empty file; the rows then go in through SQLite in one transaction, and the spatial index of each
//! layer is packed in bulk rather than grown row by row. The file is built in a temporary folder beside the target
//! and renamed onto it when complete. The same tables and time stamp give the same bytes.

mod blob;
mod content;
mod error;
mod extras;
mod package;
mod rows;
mod rtree;

pub use error::WriteError;
pub use package::{GEOMETRY, GeometryKind, KEY, LayerToWrite, Metadata, Package, Style};

use super::ogr::{self, CreateError, LayerSpec};
use crate::notice::Progress;
use crate::table::Shapes;
use std::path::{Path, PathBuf};
use std::{fs, io};

/// Writes the package to `path`, in the place of whatever file is there.
///
/// # Errors
/// [`WriteError`] where the package is not valid or the folder cannot take it; the target is then as it was.
pub fn write(path: &Path, package: &Package<'_>, progress: &dyn Progress) -> Result<(), WriteError> {
    let rows = package.layers.iter().map(|l| l.table.len() as u64).sum();
    progress.begin(&format!("writing {}", path.display()), Some(rows));
    let outcome = write_whole(&Target::new(path), package, progress);
    progress.end();
    outcome
}

fn write_whole(target: &Target<'_>, package: &Package<'_>, progress: &dyn Progress) -> Result<(), WriteError> {
    if let Some(fault) = package.fault() {
        return Err(WriteError::Invalid { target: target.name(), fault });
    }
    if target.path.is_dir() {
        return Err(WriteError::Place { target: target.name(), cause: io::Error::from(io::ErrorKind::IsADirectory) });
    }
    // Dropped at the end or on the way out, and all within it.
    let workshop = tempfile::Builder::new()
        .prefix(".homocline-")
        .tempdir_in(&target.folder)
        .map_err(|cause| target.folder_error(cause))?;
    let draft = workshop.path().join("draft.gpkg");
    let specs: Vec<_> = package.layers.iter().map(spec).collect();
    ogr::create(&draft, &package.crs, &specs).map_err(|error| match error {
        CreateError::Crs(cause) => WriteError::Crs { target: target.name(), crs: package.crs.clone(), cause },
        CreateError::Other(cause) if cause.contains("disk is full") => target.no_space(),
        CreateError::Other(cause) => WriteError::Create { target: target.name(), folder: target.folder_name(), cause },
    })?;
    content::fill(&draft, package, progress).map_err(|(what, cause)| target.content_error(what, &cause))?;
    target.put_in_place(&draft)
}

fn spec<'a>(layer: &'a LayerToWrite<'_>) -> LayerSpec<'a> {
    let kind = match layer.geometry {
        GeometryKind::None => None,
        GeometryKind::Point => Some("POINT"),
        GeometryKind::MultiPolygon => Some("MULTIPOLYGON"),
        GeometryKind::MultiLineString => Some("MULTILINESTRING"),
    };
    LayerSpec {
        name: &layer.table.name,
        title: layer.title(),
        description: &layer.description,
        key: KEY,
        geometry: kind.map(|kind| (GEOMETRY, kind)),
    }
}

/// Number of shapes, the empty ones too.
fn shape_count(shapes: &Shapes) -> usize {
    match shapes {
        Shapes::None => 0,
        Shapes::Points(points) => points.len(),
        Shapes::Any(any) => any.len(),
    }
}

/// The file to write, and its folder.
struct Target<'a> {
    path: &'a Path,
    folder: PathBuf,
}

impl<'a> Target<'a> {
    fn new(path: &'a Path) -> Self {
        let folder = path.parent().filter(|p| !p.as_os_str().is_empty()).unwrap_or(Path::new("."));
        Self { path, folder: folder.to_owned() }
    }

    fn name(&self) -> String {
        self.path.display().to_string()
    }

    fn folder_name(&self) -> String {
        self.folder.display().to_string()
    }

    fn folder_error(&self, cause: io::Error) -> WriteError {
        if cause.kind() == io::ErrorKind::StorageFull {
            return self.no_space();
        }
        WriteError::Folder { target: self.name(), folder: self.folder_name(), cause }
    }

    fn no_space(&self) -> WriteError {
        WriteError::NoSpace { target: self.name(), folder: self.folder_name() }
    }

    fn content_error(&self, what: String, cause: &rusqlite::Error) -> WriteError {
        if cause.sqlite_error_code() == Some(rusqlite::ErrorCode::DiskFull) {
            return self.no_space();
        }
        let (target, folder) = (self.name(), self.folder_name());
        WriteError::Content { target, folder, what, cause: cause.to_string() }
    }

    /// Makes the draft durable, then the target.
    fn put_in_place(&self, draft: &Path) -> Result<(), WriteError> {
        let file = fs::File::open(draft).map_err(|cause| self.folder_error(cause))?;
        file.sync_all().map_err(|cause| self.folder_error(cause))?;
        // A journal that another program left beside the old file would be played into the new one.
        for suffix in ["-wal", "-shm", "-journal"] {
            let mut stale = self.path.as_os_str().to_owned();
            stale.push(suffix);
            match fs::remove_file(&stale) {
                Err(cause) if cause.kind() != io::ErrorKind::NotFound => {
                    return Err(WriteError::Place { target: self.name(), cause });
                }
                _ => {}
            }
        }
        fs::rename(draft, self.path).map_err(|cause| WriteError::Place { target: self.name(), cause })?;
        // Not every file system can sync a folder; the file itself is safe by now.
        let _ = fs::File::open(&self.folder).and_then(|folder| folder.sync_all());
        Ok(())
    }
}
