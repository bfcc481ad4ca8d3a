//! One GDAL layer to a table.

use super::super::shapes::{ShapesBuilder, all_finite};
use super::super::{FormatError, ReadTable, Source};
use super::{complaints, geometry};
use crate::notice::{Notice, Place, Progress, Refusal};
use crate::table::{Column, Field, IntegerColumn, RealColumn, Shapes, Table, TextColumn};
use gdal::spatial_ref::SpatialRef;
use gdal::vector::{Feature, Layer, LayerAccess, OGRFieldType};

/// Features between two reports of progress.
const STRIDE: u64 = 1 << 14;

/// Reads every feature.
///
/// # Errors
/// [`FormatError::NoFeatures`].
pub(super) fn read(source: &Source, layer: &mut Layer<'_>, progress: &dyn Progress) -> Result<ReadTable, FormatError> {
    let file = source.path.clone();
    let crs = layer.spatial_ref().and_then(|srs| crs_name(&srs));
    let spatial = layer.defn().geom_fields().next().is_some();
    let mut fields: Vec<Growing> = layer.defn().fields().map(|f| Growing::new(f.name(), f.field_type())).collect();
    let mut shapes = ShapesBuilder::default();
    let (mut rows, mut refused, mut read) = (Vec::new(), Vec::new(), 0);
    for feature in layer.features() {
        let row = feature.fid().unwrap_or(read);
        read += 1;
        if read.is_multiple_of(STRIDE) {
            progress.advance(STRIDE);
        }
        if spatial {
            match shape(&feature) {
                Ok(shape) => shapes.push(shape),
                Err(reason) => {
                    let (source, column, value) = (file.clone(), None, None);
                    refused.push(Refusal { source, row, column, value, code: "bad-geometry", reason });
                    continue;
                }
            }
        }
        fields.iter_mut().enumerate().for_each(|(i, field)| field.push(&feature, i));
        rows.push(row);
    }
    progress.advance(read % STRIDE);
    let complaints = complaints();
    if read == 0 {
        return Err(match complaints.last() {
            Some(cause) => FormatError::Corrupt { file, format: "a vector layer".into(), cause: cause.message.clone() },
            None => FormatError::NoFeatures { file },
        });
    }
    let notices =
        complaints.into_iter().map(|c| Notice::warning("reader-complains", Place::file(file.clone()), c.message));
    let mut table = Table::new(file.clone());
    table.fields = fields.into_iter().map(Growing::finish).collect();
    table.shapes = if spatial { shapes.finish() } else { Shapes::None };
    table.crs = crs;
    table.rows = rows;
    Ok(ReadTable { table, refused, notices: notices.collect(), read })
}

/// A CRS as an authority code where it has one, else as WKT.
fn crs_name(srs: &SpatialRef) -> Option<String> {
    let mut srs = srs.clone();
    // ESRI's WKT seldom carries a code; GDAL recognises the common ones.
    if srs.auth_code().is_err() {
        let _ = srs.auto_identify_epsg();
    }
    let code = srs.authority().ok().or_else(|| srs.to_wkt().ok());
    complaints();
    code.filter(|c| !c.is_empty()).map(|c| if c == "OGC:CRS84" { "EPSG:4326".to_owned() } else { c })
}

fn shape(feature: &Feature<'_>) -> Result<Option<geo_types::Geometry<f64>>, String> {
    let Ok(ogr) = feature.geometry_by_index(0) else { return Ok(None) };
    let shape = geometry::convert(ogr)
        .map_err(|kind| format!("its geometry is a {kind}, which cannot be used; points, lines and polygons can"))?;
    match shape {
        Some(shape) if !all_finite(&shape) => Err("a coordinate of its geometry is not a finite number".to_owned()),
        shape => Ok(shape),
    }
}

/// A column in the making.
struct Growing {
    name: String,
    kind: OGRFieldType::Type,
    column: Column,
}

impl Growing {
    fn new(name: String, kind: OGRFieldType::Type) -> Self {
        let column = match kind {
            OGRFieldType::OFTInteger | OGRFieldType::OFTInteger64 => Column::Integer(IntegerColumn::default()),
            OGRFieldType::OFTReal => Column::Real(RealColumn::default()),
            OGRFieldType::OFTDate => Column::Date(TextColumn::default()),
            _ => Column::Text(TextColumn::default()),
        };
        Self { name, kind, column }
    }

    fn push(&mut self, feature: &Feature<'_>, index: usize) {
        // The index is within the layer's own fields: what cannot be had is a null.
        match &mut self.column {
            Column::Integer(c) => c.push(feature.field_as_integer64(index).ok().flatten()),
            Column::Real(c) => c.push(feature.field_as_double(index).ok().flatten()),
            Column::Text(c) | Column::Date(c) => {
                let text = feature.field_as_string(index).ok().flatten();
                let text = match self.kind {
                    OGRFieldType::OFTDate | OGRFieldType::OFTDateTime => text.map(|t| iso(&t)),
                    _ => text,
                };
                c.push(text.as_deref());
            }
            Column::Word(_) | Column::Boolean(_) => {}
        }
    }

    fn finish(self) -> Field {
        Field { name: self.name, title: String::new(), description: String::new(), column: self.column }
    }
}

/// GDAL writes 2024/06/01 12:30:00+00; ISO 8601 is 2024-06-01T12:30:00Z.
fn iso(text: &str) -> String {
    match text.split_once(' ') {
        None => text.replace('/', "-"),
        Some((date, time)) => {
            let time = time.strip_suffix("+00").map_or_else(|| time.to_owned(), |t| format!("{t}Z"));
            format!("{}T{time}", date.replace('/', "-"))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::iso;

    #[test]
    fn dates_come_out_as_iso_8601() {
        assert_eq!(iso("2024/06/01"), "2024-06-01");
        assert_eq!(iso("2024/06/01 12:30:00+00"), "2024-06-01T12:30:00Z");
        assert_eq!(iso("2024/06/01 12:30:00"), "2024-06-01T12:30:00");
    }
}
