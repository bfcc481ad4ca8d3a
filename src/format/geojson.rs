//! GeoJSON (RFC 7946, and the `crs` member of its 2008 forerunner).

use super::{FormatError, ReadTable, Source, ogr};
use crate::notice::Progress;

pub(super) fn read(source: &Source, bytes: &[u8], progress: &dyn Progress) -> Result<ReadTable, FormatError> {
    let _ = bytes;
    ogr::read(source, progress)
}
