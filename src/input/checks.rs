//! What is looked at before any column is chosen: the names the user gave, and that all columns have all rows.

use super::InputFault;
use super::choose::names;
use super::spec::{ColumnSpec, DeclinationSpec, StationSpec, StructureSpec};
use crate::table::{Shapes, Table};

/// The column of a name the user gave.
pub(super) fn find(table: &Table, key: &'static str, name: &str) -> Result<usize, InputFault> {
    table.position(name).ok_or_else(|| {
        let columns = names(table);
        let near = |c: &&String| strsim::jaro_winkler(&c.to_lowercase(), &name.to_lowercase());
        let nearest = columns.iter().max_by(|a, b| near(a).total_cmp(&near(b))).filter(|c| near(c) > 0.8).cloned();
        InputFault::NoSuchColumn { key, column: name.to_owned(), nearest, columns }
    })
}

/// Every name must be right, also one that is not needed here, and one column cannot be two numbers.
pub(super) fn named_well(table: &Table, spec: &StationSpec) -> Result<(), InputFault> {
    let c: &ColumnSpec = &spec.columns;
    let structure = match &c.structure {
        Some(StructureSpec::Column(name)) => Some(name),
        _ => None,
    };
    let declination = match &spec.declination {
        Some(DeclinationSpec::Column(name)) => Some(name),
        _ => c.declination.as_ref(),
    };
    let keys = [
        ("x", c.x.as_ref()),
        ("y", c.y.as_ref()),
        ("z", c.z.as_ref()),
        ("id", c.id.as_ref()),
        ("date", c.date.as_ref()),
        ("structure", structure),
        ("azimuth", c.azimuth.as_ref()),
        ("strike", c.strike.as_ref()),
        ("dip_direction", c.dip_direction.as_ref()),
        ("trend", c.trend.as_ref()),
        ("dip", c.dip.as_ref()),
        ("plunge", c.plunge.as_ref()),
        ("dip_quadrant", c.dip_quadrant.as_ref()),
        ("attitude", c.attitude.as_ref()),
        ("rake", c.rake.as_ref()),
        ("polarity", c.polarity.as_ref()),
        ("weight", c.weight.as_ref()),
        ("declination", declination),
    ];
    for (key, name) in keys {
        if let Some(name) = name {
            find(table, key, name)?;
        }
    }
    for (first, a, second, b) in [("x", &c.x, "y", &c.y), ("azimuth", &c.azimuth, "dip", &c.dip)] {
        if let (Some(a), Some(b)) = (a, b)
            && find(table, first, a)? == find(table, second, b)?
        {
            return Err(InputFault::SameColumn { first, second, column: a.clone() });
        }
    }
    Ok(())
}

/// Cells are read by row without further looks, so all columns must have all rows.
pub(super) fn ragged(table: &Table) -> Result<(), InputFault> {
    let rows = table.len();
    let shapes = match &table.shapes {
        Shapes::None => rows,
        Shapes::Points(p) => p.len(),
        Shapes::Any(g) => g.len(),
    };
    let numbers = if table.rows.is_empty() { rows } else { table.rows.len() };
    let lengths = table.fields.iter().map(|f| (f.name.as_str(), f.column.len()));
    for (what, len) in lengths.chain([("shapes", shapes), ("row numbers", numbers)]) {
        if len != rows || len > u32::MAX as usize {
            return Err(InputFault::Ragged { rows, what: what.to_owned(), len });
        }
    }
    Ok(())
}
