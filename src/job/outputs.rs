//! The output folder: everything is written beside its place first and moved there at the end, so that a run
//! that fails leaves the folder as it was.

use std::fs;
use std::io::{self, Write};
use std::path::{Path, PathBuf};
use tempfile::TempDir;
use thiserror::Error;

/// Why the results could not be written.
#[derive(Debug, Error)]
pub enum OutputError {
    /// The folder cannot be made or written to.
    #[error("output folder {folder}: {cause}; choose another with --out or output.folder")]
    Folder {
        /// The folder.
        folder: String,
        /// What the system says.
        cause: io::Error,
    },
    /// Writing or moving one file failed.
    #[error("{file}: {cause}; nothing was changed in the output folder")]
    File {
        /// The file.
        file: String,
        /// What the system says.
        cause: io::Error,
    },
    /// The result would replace a source.
    #[error(
        "{file} is an input of this run and would be overwritten; choose another folder with --out or output.folder"
    )]
    OverwritesInput {
        /// The file.
        file: String,
    },
}

/// Results on their way into the output folder. Dropped without [`Staging::commit`], nothing remains.
pub struct Staging {
    folder: PathBuf,
    /// Folders that this run made, innermost first; removed again if the run fails.
    made: Vec<PathBuf>,
    stage: Option<TempDir>,
    files: Vec<PathBuf>,
}

impl Staging {
    /// Prepares `folder`, making it where it is missing. `inputs` must not be among `targets` in it.
    pub fn prepare(folder: &Path, targets: &[&str], inputs: &[PathBuf]) -> Result<Self, OutputError> {
        let fault = |cause| OutputError::Folder { folder: folder.display().to_string(), cause };
        let mut made = Vec::new();
        let mut missing = folder;
        while !missing.as_os_str().is_empty() && !missing.exists() {
            made.push(missing.to_owned());
            missing = missing.parent().unwrap_or(Path::new(""));
        }
        let mut staging = Self { folder: folder.to_owned(), made, stage: None, files: Vec::new() };
        fs::create_dir_all(folder).map_err(fault)?;
        for target in targets {
            let target = folder.join(target);
            let same = |input: &PathBuf| matches!((fs::canonicalize(input), fs::canonicalize(&target)), (Ok(a), Ok(b)) if a == b);
            if inputs.iter().any(same) {
                return Err(OutputError::OverwritesInput { file: target.display().to_string() });
            }
        }
        staging.stage = Some(tempfile::Builder::new().prefix(".homocline-").tempdir_in(folder).map_err(fault)?);
        Ok(staging)
    }

    /// Where to write `name` (a relative path) for now.
    pub fn path(&mut self, name: &str) -> Result<PathBuf, OutputError> {
        let path = self.stage.as_ref().expect("prepared").path().join(name);
        let fault = |cause| OutputError::File { file: self.folder.join(name).display().to_string(), cause };
        fs::create_dir_all(path.parent().expect("inside the stage")).map_err(fault)?;
        self.files.push(PathBuf::from(name));
        Ok(path)
    }

    /// Writes a whole file through `fill`.
    pub fn write(
        &mut self,
        name: &str,
        fill: impl FnOnce(&mut dyn Write) -> io::Result<()>,
    ) -> Result<(), OutputError> {
        let path = self.path(name)?;
        let attempt = || {
            let mut file = io::BufWriter::new(fs::File::create(&path)?);
            fill(&mut file)?;
            file.into_inner().map_err(io::IntoInnerError::into_error)?.sync_all()
        };
        attempt().map_err(|cause| OutputError::File { file: self.folder.join(name).display().to_string(), cause })
    }

    /// Moves everything into place; returns the paths.
    pub fn commit(mut self) -> Result<Vec<PathBuf>, OutputError> {
        let stage = self.stage.take().expect("prepared");
        let mut placed = Vec::new();
        for name in std::mem::take(&mut self.files) {
            let target = self.folder.join(&name);
            let fault = |cause| OutputError::File { file: target.display().to_string(), cause };
            fs::create_dir_all(target.parent().expect("inside the folder")).map_err(fault)?;
            fs::rename(stage.path().join(&name), &target).map_err(fault)?;
            placed.push(target);
        }
        self.made.clear();
        Ok(placed)
    }
}

impl Drop for Staging {
    fn drop(&mut self) {
        drop(self.stage.take());
        for folder in &self.made {
            // Only an empty folder goes; anything in it is not ours to delete.
            let _ = fs::remove_dir(folder);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_failed_run_leaves_nothing_and_a_whole_one_everything() {
        let home = tempfile::tempdir().unwrap();
        let out = home.path().join("a/b");
        let mut staging = Staging::prepare(&out, &["x.txt"], &[]).unwrap();
        staging.write("x.txt", |w| w.write_all(b"1")).unwrap();
        drop(staging);
        assert!(!home.path().join("a").exists());

        let mut staging = Staging::prepare(&out, &["x.txt"], &[]).unwrap();
        staging.write("x.txt", |w| w.write_all(b"1")).unwrap();
        staging.write("s/y.txt", |w| w.write_all(b"2")).unwrap();
        assert!(staging.write("z.txt", |_| Err(io::Error::other("full"))).is_err());
        assert!(!out.join("x.txt").exists());
        staging.files.pop();
        staging.commit().unwrap();
        assert_eq!(fs::read(out.join("s/y.txt")).unwrap(), b"2");
        let names: Vec<_> = fs::read_dir(&out).unwrap().map(|e| e.unwrap().file_name()).collect();
        assert_eq!(names.len(), 2, "{names:?}");
    }

    #[test]
    fn an_input_is_never_a_target() {
        let home = tempfile::tempdir().unwrap();
        let input = home.path().join("area.gpkg");
        fs::write(&input, b"").unwrap();
        let dotted = home.path().join("./area.gpkg");
        assert!(matches!(
            Staging::prepare(home.path(), &["area.gpkg"], &[dotted]),
            Err(OutputError::OverwritesInput { .. })
        ));
    }
}
