//! What GDAL has to be told about a shapefile: the encoding of its texts. And its missing parts, in clear words.

use super::super::{FormatError, Source};
use crate::notice::{Notice, Place};
use std::path::{Path, PathBuf};

/// What was found beside a `.shp`.
pub(super) struct About {
    /// Encoding to read the texts in, where no `.cpg` says.
    pub encoding: Option<&'static str>,
    pub notice: Option<Notice>,
}

/// Looks at the parts of a shapefile; nothing for any other source.
///
/// # Errors
/// [`FormatError::MissingPart`] for a missing `.dbf` or `.shx`.
pub(super) fn about(source: &Source) -> Result<Option<About>, FormatError> {
    let path = Path::new(&source.location);
    if path.extension().is_none_or(|e| !e.eq_ignore_ascii_case("shp")) || !path.is_file() {
        return Ok(None);
    }
    let dbf = part(path, "dbf").ok_or_else(|| missing(source, path, "dbf"))?;
    part(path, "shx").ok_or_else(|| missing(source, path, "shx"))?;
    if part(path, "cpg").is_some() || part(path, "cst").is_some() {
        return Ok(Some(About { encoding: None, notice: None }));
    }
    let bytes = std::fs::read(&dbf).map_err(|cause| FormatError::io(&source.path, cause))?;
    // Bytes 8-9 of a dBASE file hold the length of its header; byte 29 names a code page.
    let (Some(&[low, high]), Some(&page)) = (bytes.get(8..10).and_then(|b| b.first_chunk()), bytes.get(29)) else {
        return Ok(Some(About { encoding: None, notice: None }));
    };
    let records = bytes.get(usize::from(u16::from_le_bytes([low, high]))..).unwrap_or_default();
    if records.is_ascii() {
        return Ok(Some(About { encoding: None, notice: None }));
    }
    let (encoding, name) = match std::str::from_utf8(records) {
        Ok(_) => (Some("UTF-8"), "UTF-8"),
        // 0x57 stands for "the machine's own", that is Windows-1252 on most that wrote shapefiles.
        Err(_) if page == 0 || page == 0x57 => (Some("CP1252"), "Windows-1252"),
        Err(_) => (None, "the code page that the .dbf names"),
    };
    let notice = Notice::info(
        "encoding-guessed",
        Place::file(source.path.clone()),
        format!("the shapefile has no .cpg to say how its texts are encoded; they are read as {name}"),
    )
    .hint("put the encoding's name in a .cpg file beside the .shp where letters come out wrong");
    Ok(Some(About { encoding, notice: Some(notice) }))
}

/// A part of the shapefile, its extension in lower or upper case.
fn part(shp: &Path, extension: &str) -> Option<PathBuf> {
    [extension.to_owned(), extension.to_uppercase()].iter().map(|e| shp.with_extension(e)).find(|p| p.is_file())
}

fn missing(source: &Source, shp: &Path, extension: &str) -> FormatError {
    let part = shp.with_extension(extension).file_name().map(|n| n.to_string_lossy().into_owned());
    FormatError::MissingPart { file: source.path.clone(), part: part.unwrap_or_default() }
}
