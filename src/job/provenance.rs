//! What went in: each input file with its size and hash.

use super::summary::Input;
use sha2::{Digest, Sha256};
use std::fs::File;
use std::io;
use std::path::{Path, PathBuf};

/// The files behind a source: a shapefile is several. Empty where the source is not a file (a database,
/// a virtual path).
pub fn files_of(source: &Path) -> Vec<PathBuf> {
    if !source.is_file() {
        return Vec::new();
    }
    let is_shapefile = source.extension().is_some_and(|e| e.eq_ignore_ascii_case("shp"));
    let mut files = vec![source.to_owned()];
    if is_shapefile {
        let parts = ["dbf", "shx", "prj", "cpg", "DBF", "SHX", "PRJ", "CPG"];
        files.extend(parts.iter().map(|e| source.with_extension(e)).filter(|p| p.is_file()));
    }
    files
}

/// Records a source, named `name` in the area file.
pub fn record(name: &str, source: &Path, role: &'static str) -> io::Result<Vec<Input>> {
    let files = files_of(source);
    if files.is_empty() {
        return Ok(vec![Input { file: name.to_owned(), role, bytes: None, sha256: None }]);
    }
    files
        .iter()
        .map(|path| {
            let mut hasher = Sha256::new();
            let bytes = io::copy(&mut File::open(path)?, &mut HashWriter(&mut hasher))?;
            let sha256 = hasher.finalize().iter().map(|b| format!("{b:02x}")).collect();
            let file = if path == source { name.to_owned() } else { sibling_name(name, path) };
            Ok(Input { file, role, bytes: Some(bytes), sha256: Some(sha256) })
        })
        .collect()
}

/// `name` with the ending of `path`.
fn sibling_name(name: &str, path: &Path) -> String {
    Path::new(name).with_extension(path.extension().unwrap_or_default()).display().to_string()
}

struct HashWriter<'a>(&'a mut Sha256);

impl io::Write for HashWriter<'_> {
    fn write(&mut self, bytes: &[u8]) -> io::Result<usize> {
        self.0.update(bytes);
        Ok(bytes.len())
    }
    fn flush(&mut self) -> io::Result<()> {
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    // The SHA-256 of "abc": FIPS 180-4 example, National Institute of Standards and Technology.
    #[test]
    fn the_published_hash_of_abc() {
        let home = tempfile::tempdir().unwrap();
        std::fs::write(home.path().join("a.shp"), "abc").unwrap();
        std::fs::write(home.path().join("a.dbf"), "").unwrap();
        let inputs = record("data/a.shp", &home.path().join("a.shp"), "stations").unwrap();
        assert_eq!(
            inputs[0].sha256.as_deref(),
            Some("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad")
        );
        assert_eq!((inputs[1].file.as_str(), inputs[1].bytes), ("data/a.dbf", Some(0)));
        assert_eq!(record("PG:db", Path::new("PG:db"), "stations").unwrap()[0].sha256, None);
    }
}
