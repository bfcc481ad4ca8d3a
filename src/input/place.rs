//! Where a row is, and in which CRS.

use super::InputFault;
use super::choose::{Columns, Position};
use super::row::RowFault;
use super::spec::StationSpec;
use super::value::{NoNumber, number, value};
use crate::notice::{Notice, Place};
use crate::table::{Shapes, Table};
use geo_types::{Coord, Geometry};

/// Farther from the origin than any map grid reaches, in metres. Chosen here: twice the Earth's circumference.
pub(super) const FARTHEST: f64 = 8.0e7;

/// True where a CRS by its code or WKT is one of longitude and latitude. Unknown codes are taken for map grids,
/// so this may only choose between columns and narrow a range.
pub(super) fn is_geographic(crs: &str) -> bool {
    let upper = crs.trim().to_uppercase();
    matches!(
        upper.as_str(),
        "EPSG:4326" | "OGC:CRS84" | "CRS84" | "EPSG:4258" | "EPSG:4269" | "EPSG:4267" | "EPSG:4283" | "EPSG:7844"
    ) || upper.starts_with("GEOG")
}

/// The CRS of the positions: the user's word, else the source's.
pub(super) fn crs(
    table: &Table,
    spec: &StationSpec,
    columns: &Columns,
    notices: &mut Vec<Notice>,
) -> Result<String, InputFault> {
    let own = table.crs.as_deref().filter(|c| !c.trim().is_empty());
    match (spec.crs.as_deref().filter(|c| !c.trim().is_empty()), own) {
        (Some(said), Some(own)) if !said.eq_ignore_ascii_case(own) => {
            let short: String = own.chars().take(60).collect();
            notices.push(Notice::warning(
                "crs-overridden",
                Place::file(&spec.file),
                format!("crs = {said:?} was used, though the source itself says {short}"),
            ));
            Ok(said.to_owned())
        }
        (Some(said), _) => Ok(said.to_owned()),
        (None, Some(own)) => Ok(own.to_owned()),
        (None, None) => {
            let degrees = matches!(columns.position, Position::Columns { degrees: true, .. })
                && (0..table.len()).filter_map(|row| position(table, columns, row).ok()).any(|_| true);
            Err(InputFault::NoCrs { degrees })
        }
    }
}

/// The position of a row; longitude and latitude are held to their range.
pub(super) fn position(table: &Table, columns: &Columns, row: usize) -> Result<Coord<f64>, (Option<usize>, RowFault)> {
    let whole = |fault| (None, fault);
    match (columns.position, &table.shapes) {
        (Position::Columns { x, y, degrees }, _) => {
            let read = |column: usize, what: &'static str, high: f64| {
                let fail = |fault| (Some(column), fault);
                match number(value(&table.fields[column].column, row), table.decimal_comma) {
                    Ok(None) => Err(fail(RowFault::NoPosition)),
                    Err(NoNumber::Text) => Err(fail(RowFault::NotANumber)),
                    Err(NoNumber::NotFinite) => Err(fail(RowFault::NotFinite)),
                    Ok(Some(v)) if [-99.0, -999.0, -9999.0, -99999.0].contains(&v) && !degrees => {
                        Err(fail(RowFault::PositionCode(v)))
                    }
                    Ok(Some(v)) if v.abs() > high => Err(fail(RowFault::PositionRange { what, value: v, high })),
                    Ok(Some(v)) => Ok(v),
                }
            };
            let ([what_x, what_y], (high_x, high_y)) = (words(degrees), highest(degrees));
            let at = Coord { x: read(x, what_x, high_x)?, y: read(y, what_y, if degrees { high_x } else { high_y })? };
            if degrees && at.y.abs() > high_y {
                return Err((Some(y), latitude(at)));
            }
            Ok(at)
        }
        (Position::Shapes { degrees }, Shapes::Points(points)) => point(points[row], degrees).map_err(whole),
        (Position::Shapes { degrees }, Shapes::Any(shapes)) => match &shapes[row] {
            None => Err(whole(RowFault::NoPosition)),
            Some(Geometry::Point(p)) => point(p.0, degrees).map_err(whole),
            Some(Geometry::MultiPoint(points)) if points.0.len() == 1 => point(points.0[0].0, degrees).map_err(whole),
            Some(_) => Err(whole(RowFault::NotAPoint)),
        },
        (Position::Shapes { .. }, Shapes::None) => Err(whole(RowFault::NoPosition)),
    }
}

fn point(at: Coord<f64>, degrees: bool) -> Result<Coord<f64>, RowFault> {
    if at.x.is_nan() || at.y.is_nan() {
        return Err(RowFault::NoPosition);
    }
    let ([what_x, what_y], (high_x, high_y)) = (words(degrees), highest(degrees));
    if degrees && at.y.abs() > high_y {
        return Err(latitude(at));
    }
    for (what, value, high) in [(what_x, at.x, high_x), (what_y, at.y, high_y)] {
        if value.abs() > high {
            return Err(RowFault::PositionRange { what, value, high });
        }
    }
    Ok(at)
}

fn words(degrees: bool) -> [&'static str; 2] {
    if degrees { ["longitude", "latitude"] } else { ["coordinate"; 2] }
}

/// A latitude out of range: an exchanged longitude, where the other would be a latitude.
fn latitude(at: Coord<f64>) -> RowFault {
    if at.x.abs() <= 90.0 && at.y.abs() <= 360.0 {
        return RowFault::LooksSwapped(at.y);
    }
    RowFault::PositionRange { what: "latitude", value: at.y, high: 90.0 }
}

fn highest(degrees: bool) -> (f64, f64) {
    if degrees { (360.0, 90.0) } else { (FARTHEST, FARTHEST) }
}
