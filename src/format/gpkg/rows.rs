//! The rows of a table into its layer.

use super::blob::BlobWriter;
use super::content::quoted;
use super::package::{GEOMETRY, GeometryKind, KEY, LayerToWrite};
use crate::notice::Progress;
use crate::table::{Cell, Shapes};
use rusqlite::types::Null;
use rusqlite::{Connection, Error, Result, Statement};

/// Rows gathered column by column before they are given row by row: far fewer cache misses than one row at a time.
const BLOCK: usize = 256;

/// Inserts every row; keys run from 1 in the order of rows.
pub(super) fn insert(db: &Connection, layer: &LayerToWrite<'_>, srs_id: i32, progress: &dyn Progress) -> Result<()> {
    let table = layer.table;
    let has_shape = layer.geometry != GeometryKind::None;
    let mut names = vec![quoted(KEY)];
    names.extend(has_shape.then(|| quoted(GEOMETRY)));
    names.extend(table.fields.iter().map(|f| quoted(&f.name)));
    let marks = vec!["?"; names.len()].join(",");
    let sql = format!("INSERT INTO {} ({}) VALUES ({marks})", quoted(&table.name), names.join(","));
    let mut statement = db.prepare(&sql)?;
    let mut blobs = BlobWriter::new(srs_id, layer.geometry);
    let first_field = 2 + usize::from(has_shape);
    let (rows, width) = (table.len(), table.fields.len());
    let mut bound = vec![Bound::Other; width];
    let mut block = vec![Cell::Null; BLOCK * width];
    for start in (0..rows).step_by(BLOCK) {
        let end = rows.min(start + BLOCK);
        for (i, field) in table.fields.iter().enumerate() {
            (start..end).for_each(|row| block[(row - start) * width + i] = field.column.cell(row));
        }
        for row in start..end {
            statement.raw_bind_parameter(1, row as i64 + 1)?;
            if has_shape {
                bind_shape(&mut statement, &mut blobs, &table.shapes, row)?;
            }
            let cells = &block[(row - start) * width..][..width];
            for ((place, &cell), bound) in (first_field..).zip(cells).zip(&mut bound) {
                let was = std::mem::replace(bound, Bound::of(cell));
                if *bound == was && was != Bound::Other {
                    continue;
                }
                match cell {
                    Cell::Null => statement.raw_bind_parameter(place, Null)?,
                    Cell::Text(v) => statement.raw_bind_parameter(place, v)?,
                    Cell::Real(v) => statement.raw_bind_parameter(place, v)?,
                    Cell::Integer(v) => statement.raw_bind_parameter(place, v)?,
                    Cell::Boolean(v) => statement.raw_bind_parameter(place, v)?,
                }
            }
            statement.raw_execute()?;
        }
        progress.advance((end - start) as u64);
    }
    Ok(())
}

/// What a parameter holds from the row before: SQLite copies each text it is given, so a repeated word is not given
/// again.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Bound {
    Null,
    /// Where in the table the text lies, and how long it is.
    Text(*const u8, usize),
    Other,
}

impl Bound {
    fn of(cell: Cell<'_>) -> Self {
        match cell {
            Cell::Null => Self::Null,
            Cell::Text(v) => Self::Text(v.as_ptr(), v.len()),
            _ => Self::Other,
        }
    }
}

fn bind_shape(statement: &mut Statement<'_>, blobs: &mut BlobWriter, shapes: &Shapes, row: usize) -> Result<()> {
    let blob = match shapes {
        Shapes::None => None,
        Shapes::Points(points) => Some(points[row]).filter(|p| !p.x.is_nan()).map(|p| blobs.point(p)),
        Shapes::Any(any) => match &any[row] {
            None => None,
            Some(geometry) => blobs
                .any(geometry)
                .map_err(|fault| Error::ToSqlConversionFailure(format!("row {}: {fault}", row + 1).into()))?,
        },
    };
    statement.raw_bind_parameter(2, blob)
}
