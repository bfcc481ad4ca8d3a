//! Positions that are numbers, but hardly places.

use crate::crs::MapCrs;
use crate::notice::{Notice, Place};
use crate::station::Measurements;
use geo_types::Coord;

struct Found {
    count: usize,
    first: usize,
}

fn found(m: &Measurements, odd: impl Fn(Coord<f64>) -> bool) -> Option<Found> {
    let mut rows = m.position.iter().enumerate().filter(|(_, at)| odd(**at)).map(|(i, _)| i);
    let first = rows.next()?;
    Some(Found { count: 1 + rows.count(), first })
}

fn zero(at: Coord<f64>) -> bool {
    at.x == 0.0 && at.y == 0.0
}

/// Warns of positions at exactly 0, 0, and of degrees in a CRS of metres; they are kept.
pub(super) fn report(m: &Measurements, file: &str, notices: &mut Vec<Notice>) {
    let rows = |n: usize| if n == 1 { "1 row".to_owned() } else { format!("{n} rows") };
    let place = |f: &Found| Place::file(file).at_row(m.source_row[f.first]);
    if let Some(f) = found(m, zero) {
        let verb = if f.count == 1 { "lies" } else { "lie" };
        let text = format!("{} {verb} at exactly x 0, y 0, which often stands for no position", rows(f.count));
        notices.push(
            Notice::warning("position-zero", place(&f), text).hint("leave the position blank where it is not known"),
        );
    }
    let degrees = |at: Coord<f64>| at.x.abs() <= 180.0 && at.y.abs() <= 90.0 && !zero(at);
    if let Some(f) = found(m, degrees)
        && MapCrs::parse(&m.crs).is_ok_and(|crs| crs.is_projected())
    {
        let at = m.position[f.first];
        let looks = if f.count == 1 { "has an x and y that look" } else { "have an x and y that look" };
        let text = format!(
            "{} of {} {looks} like longitude and latitude, though the CRS is projected; the first is {}, {}",
            rows(f.count),
            m.position.len(),
            at.x,
            at.y
        );
        notices.push(
            Notice::warning("position-in-degrees", place(&f), text)
                .hint("if they are WGS 84 degrees, say crs = \"EPSG:4326\" under [stations]"),
        );
    }
}
