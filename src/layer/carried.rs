//! The sources' own columns, carried through to the `orientations` layer.
//!
//! Columns of one name in several sources become one. Text columns that hold only whole numbers, or only
//! numbers, become numeric (a leading zero, as in an id "007", keeps a column text).

use super::Results;
use crate::table::{Cell, Column, Field, IntegerColumn, RealColumn, Table, TextColumn};
use rayon::prelude::*;
use std::collections::{HashMap, HashSet};

/// What a column's cells are.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
enum Nature {
    /// Nothing but nulls.
    Empty,
    Integer,
    Real,
    Boolean,
    Text,
}

impl Nature {
    fn joined(self, other: Self) -> Self {
        match (self, other) {
            (a, b) if a == b => a,
            (Self::Empty, x) | (x, Self::Empty) => x,
            (Self::Integer, Self::Real) | (Self::Real, Self::Integer) => Self::Real,
            _ => Self::Text,
        }
    }
}

/// The carried columns, one entry per reading, named so as not to clash with `taken` (or the geometry's
/// and key's names) whatever the case.
pub(super) fn fields(results: &Results, taken: &Table) -> Vec<Field> {
    let mut used: HashSet<String> = ["fid", "geom"].map(str::to_owned).into();
    used.extend(taken.fields.iter().map(|f| f.name.to_lowercase()));
    let mut groups: Vec<(String, Vec<Option<usize>>)> = Vec::new();
    // Columns of one source whose names differ by case alone stay apart: the second of them is another group.
    let mut group_of: HashMap<(String, usize), usize> = HashMap::new();
    for (source, table) in results.sources.iter().enumerate() {
        let mut seen: HashMap<String, usize> = HashMap::new();
        for (position, field) in table.fields.iter().enumerate() {
            let lower = field.name.to_lowercase();
            let before = seen.entry(lower.clone()).or_default();
            let key = (lower, *before);
            *before += 1;
            let group = *group_of.entry(key).or_insert_with(|| {
                groups.push((field.name.clone(), vec![None; results.sources.len()]));
                groups.len() - 1
            });
            groups[group].1[source] = Some(position);
        }
    }
    let named: Vec<(String, Vec<Option<usize>>)> = groups
        .into_iter()
        .map(|(name, positions)| {
            let mut unique = name;
            while !used.insert(unique.to_lowercase()) {
                unique = format!("src_{unique}");
            }
            (unique, positions)
        })
        .collect();
    // A column's cells are looked at twice, the second time to build it: worth a thread each.
    let gathered = |(name, positions): (String, Vec<Option<usize>>)| {
        let columns: Vec<Option<&Column>> = positions
            .iter()
            .zip(results.sources)
            .map(|(position, table)| position.map(|i| &table.fields[i].column))
            .collect();
        let column = gathered(results, &columns);
        Field { name, title: String::new(), description: String::new(), column }
    };
    named.into_par_iter().map(gathered).collect()
}

fn gathered(results: &Results, columns: &[Option<&Column>]) -> Column {
    let readings = results.readings;
    let commas: Vec<bool> = results.sources.iter().map(|t| t.decimal_comma).collect();
    let cells = || {
        (0..readings.len()).map(|i| {
            let source = readings.source[i] as usize;
            let cell = columns[source].map_or(Cell::Null, |c| c.cell(readings.table_row[i] as usize));
            (cell, commas[source])
        })
    };
    let mut nature = Nature::Empty;
    for (cell, comma) in cells() {
        nature = nature.joined(nature_of(cell, comma));
        if nature == Nature::Text {
            break;
        }
    }
    let is_date = columns.iter().flatten().all(|c| matches!(c, Column::Date(_)));
    match nature {
        Nature::Integer => {
            let mut column = IntegerColumn::default();
            cells().for_each(|(cell, comma)| column.push(number(cell, comma).map(|v| v as i64)));
            Column::Integer(column)
        }
        Nature::Real => {
            let mut column = RealColumn::default();
            cells().for_each(|(cell, comma)| column.push(number(cell, comma)));
            Column::Real(column)
        }
        Nature::Boolean => {
            let mut column = IntegerColumn::default();
            cells()
                .for_each(|(cell, _)| column.push(if let Cell::Boolean(b) = cell { Some(i64::from(b)) } else { None }));
            Column::Boolean(column)
        }
        Nature::Empty | Nature::Text => {
            let mut column = TextColumn::default();
            for (cell, _) in cells() {
                match cell {
                    Cell::Null => column.push(None),
                    Cell::Text(text) => column.push(Some(text)),
                    Cell::Real(v) => column.push(Some(&v.to_string())),
                    Cell::Integer(v) => column.push(Some(&v.to_string())),
                    Cell::Boolean(v) => column.push(Some(if v { "true" } else { "false" })),
                }
            }
            if is_date { Column::Date(column) } else { Column::Text(column) }
        }
    }
}

fn nature_of(cell: Cell, comma: bool) -> Nature {
    match cell {
        Cell::Null => Nature::Empty,
        Cell::Integer(_) => Nature::Integer,
        Cell::Real(_) => Nature::Real,
        Cell::Boolean(_) => Nature::Boolean,
        Cell::Text("") => Nature::Empty,
        Cell::Text(text) => {
            let digits = text.strip_prefix('-').unwrap_or(text);
            let padded = digits.len() > 1 && digits.starts_with('0') && digits.as_bytes()[1].is_ascii_digit();
            let plain = digits.bytes().all(|b| b.is_ascii_digit());
            match number(cell, comma) {
                // 15 digits: what a double, and so every consumer, keeps exactly.
                Some(_) if !padded && plain && digits.len() <= 15 => Nature::Integer,
                Some(_) if !padded && !plain => Nature::Real,
                _ => Nature::Text,
            }
        }
    }
}

/// A plain decimal number; "inf", "nan" and the like stay text.
fn number(cell: Cell, comma: bool) -> Option<f64> {
    match cell {
        Cell::Integer(v) => Some(v as f64),
        Cell::Real(v) => Some(v),
        Cell::Text(text)
            if text.bytes().all(|b| matches!(b, b'0'..=b'9' | b'.' | b',' | b'-' | b'+' | b'e' | b'E')) =>
        {
            let value = if comma && text.contains(',') { text.replace(',', ".").parse() } else { text.parse::<f64>() };
            value.ok().filter(|v| v.is_finite())
        }
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn text_becomes_a_number_only_where_nothing_is_lost() {
        let cases = [
            ("12", false, Nature::Integer),
            ("-3", false, Nature::Integer),
            ("0", false, Nature::Integer),
            ("007", false, Nature::Text),
            ("0.5", false, Nature::Real),
            ("1,5", true, Nature::Real),
            ("1,5", false, Nature::Text),
            ("1e5", false, Nature::Real),
            ("inf", false, Nature::Text),
            ("1e999", false, Nature::Text),
            ("1234567890123456", false, Nature::Text),
            ("", false, Nature::Empty),
            ("2024-06-01", false, Nature::Text),
        ];
        for (text, comma, nature) in cases {
            assert_eq!(nature_of(Cell::Text(text), comma), nature, "{text}");
        }
    }
}
