//! What the tables of (domain, structure) rows have in common.

use super::Results;
use super::words::{described, titled};
use crate::station::Structure;
use crate::table::{Column, Shapes, Table, TextColumn};
use geo_types::Coord;

/// A table that begins with the domain's number and name and the structure.
pub(super) fn head<'a>(
    name: &str,
    results: &Results,
    rows: impl Iterator<Item = (usize, &'a Structure)> + Clone,
) -> Table {
    let domain = |index: usize| &results.domains.list[index];
    let ids: Column = rows.clone().map(|(d, _)| Some(i64::from(domain(d).id.number()))).collect();
    let names: Column = rows.clone().map(|(d, _)| Some(domain(d).name.as_str())).collect();
    let structures: Column = rows.map(|(_, s)| Some(s.name.as_str())).collect();
    Table::new(name)
        .with("domain_id", &titled("domain_id"), &described("domain_id"), ids)
        .with("domain", &titled("domain"), &described("domain"), names)
        .with("structure", &titled("structure"), &described("structure"), structures)
}

/// The table with its points, in the map's CRS.
pub(super) fn placed(mut table: Table, results: &Results, points: impl Iterator<Item = Coord<f64>>) -> Table {
    table.shapes = Shapes::Points(points.collect());
    table.crs = Some(results.crs.to_owned());
    table
}

/// A column of text that seldom repeats.
pub(super) fn texts(cells: impl Iterator<Item = Option<String>>) -> Column {
    let mut column = TextColumn::default();
    cells.for_each(|cell| column.push(cell.as_deref()));
    Column::Text(column)
}
