//! A table of typed columns, each row traceable to its place in the source.
//!
//! One allocation per column, not one per cell: a million rows of forty columns fit in a few hundred MiB.

use geo_types::{Coord, Geometry};
use std::collections::HashMap;

/// A column of text in one buffer.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct TextColumn {
    buffer: String,
    /// End of each cell in the buffer, doubled; the low bit marks a null.
    ends: Vec<u64>,
}

impl TextColumn {
    /// Appends a cell.
    pub fn push(&mut self, cell: Option<&str>) {
        self.buffer.push_str(cell.unwrap_or(""));
        self.ends.push((self.buffer.len() as u64) << 1 | u64::from(cell.is_none()));
    }
    /// The cell of a row; `None` for a null. An empty string is a value.
    pub fn get(&self, row: usize) -> Option<&str> {
        let end = self.ends[row];
        let start = if row == 0 { 0 } else { self.ends[row - 1] >> 1 };
        if end & 1 == 1 { None } else { Some(&self.buffer[start as usize..(end >> 1) as usize]) }
    }
    /// Number of rows.
    pub fn len(&self) -> usize {
        self.ends.len()
    }
    /// True where there are no rows.
    pub fn is_empty(&self) -> bool {
        self.ends.is_empty()
    }
}

/// A column of text in which few values repeat: domain names, structures, symbols.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct WordColumn {
    words: Vec<String>,
    codes: HashMap<String, u32>,
    rows: Vec<u32>,
}

impl WordColumn {
    const NULL: u32 = u32::MAX;

    /// Appends a cell.
    pub fn push(&mut self, cell: Option<&str>) {
        let code = match cell {
            None => Self::NULL,
            Some(word) => match self.codes.get(word) {
                Some(&code) => code,
                None => {
                    let code = self.words.len() as u32;
                    self.words.push(word.to_owned());
                    self.codes.insert(word.to_owned(), code);
                    code
                }
            },
        };
        self.rows.push(code);
    }
    /// The different words, in order of first use.
    pub fn words(&self) -> impl Iterator<Item = &str> {
        self.words.iter().map(String::as_str)
    }
    /// The cell of a row; `None` for a null.
    pub fn get(&self, row: usize) -> Option<&str> {
        self.words.get(self.rows[row] as usize).map(String::as_str)
    }
    /// Number of rows.
    pub fn len(&self) -> usize {
        self.rows.len()
    }
    /// True where there are no rows.
    pub fn is_empty(&self) -> bool {
        self.rows.is_empty()
    }
}

/// A column of finite real numbers with nulls. NaN marks a null inside and never comes out.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct RealColumn(Vec<f64>);

impl RealColumn {
    /// Appends a cell; a number that is not finite becomes a null.
    pub fn push(&mut self, cell: Option<f64>) {
        self.0.push(cell.filter(|v| v.is_finite()).unwrap_or(f64::NAN));
    }
    /// The cell of a row; `None` for a null.
    pub fn get(&self, row: usize) -> Option<f64> {
        Some(self.0[row]).filter(|v| !v.is_nan())
    }
    /// Number of rows.
    pub fn len(&self) -> usize {
        self.0.len()
    }
    /// True where there are no rows.
    pub fn is_empty(&self) -> bool {
        self.0.is_empty()
    }
}

/// A column of integers with nulls. `i64::MIN` marks a null inside and never comes out.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct IntegerColumn(Vec<i64>);

impl IntegerColumn {
    /// Appends a cell.
    pub fn push(&mut self, cell: Option<i64>) {
        self.0.push(cell.unwrap_or(i64::MIN));
    }
    /// The cell of a row; `None` for a null.
    pub fn get(&self, row: usize) -> Option<i64> {
        Some(self.0[row]).filter(|&v| v != i64::MIN)
    }
    /// Number of rows.
    pub fn len(&self) -> usize {
        self.0.len()
    }
    /// True where there are no rows.
    pub fn is_empty(&self) -> bool {
        self.0.is_empty()
    }
}

/// One column.
#[derive(Debug, Clone, PartialEq)]
pub enum Column {
    /// Text of any kind.
    Text(TextColumn),
    /// Text that repeats.
    Word(WordColumn),
    /// Real numbers.
    Real(RealColumn),
    /// Whole numbers.
    Integer(IntegerColumn),
    /// Yes or no (1 or 0, with nulls).
    Boolean(IntegerColumn),
    /// Calendar dates as ISO 8601 text, `YYYY-MM-DD`.
    Date(TextColumn),
}

/// One cell, borrowed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Cell<'a> {
    /// No value.
    Null,
    /// Text or a date.
    Text(&'a str),
    /// A finite number.
    Real(f64),
    /// A whole number.
    Integer(i64),
    /// Yes or no.
    Boolean(bool),
}

impl Column {
    /// The cell of a row.
    pub fn cell(&self, row: usize) -> Cell<'_> {
        match self {
            Self::Text(c) | Self::Date(c) => c.get(row).map_or(Cell::Null, Cell::Text),
            Self::Word(c) => c.get(row).map_or(Cell::Null, Cell::Text),
            Self::Real(c) => c.get(row).map_or(Cell::Null, Cell::Real),
            Self::Integer(c) => c.get(row).map_or(Cell::Null, Cell::Integer),
            Self::Boolean(c) => c.get(row).map_or(Cell::Null, |v| Cell::Boolean(v != 0)),
        }
    }
    /// Number of rows.
    pub fn len(&self) -> usize {
        match self {
            Self::Text(c) | Self::Date(c) => c.len(),
            Self::Word(c) => c.len(),
            Self::Real(c) => c.len(),
            Self::Integer(c) | Self::Boolean(c) => c.len(),
        }
    }
    /// True where there are no rows.
    pub fn is_empty(&self) -> bool {
        self.len() == 0
    }
}

impl FromIterator<Option<f64>> for Column {
    fn from_iter<I: IntoIterator<Item = Option<f64>>>(cells: I) -> Self {
        let mut column = RealColumn::default();
        cells.into_iter().for_each(|cell| column.push(cell));
        Self::Real(column)
    }
}

impl FromIterator<Option<i64>> for Column {
    fn from_iter<I: IntoIterator<Item = Option<i64>>>(cells: I) -> Self {
        let mut column = IntegerColumn::default();
        cells.into_iter().for_each(|cell| column.push(cell));
        Self::Integer(column)
    }
}

impl<'a> FromIterator<Option<&'a str>> for Column {
    /// A column of repeating words; use [`TextColumn`] directly for text that seldom repeats.
    fn from_iter<I: IntoIterator<Item = Option<&'a str>>>(cells: I) -> Self {
        let mut column = WordColumn::default();
        cells.into_iter().for_each(|cell| column.push(cell));
        Self::Word(column)
    }
}

/// A column with its name and what it means.
#[derive(Debug, Clone, PartialEq)]
pub struct Field {
    /// Column name.
    pub name: String,
    /// A few words for a heading; empty for a source's own columns.
    pub title: String,
    /// What the value means, its unit and sign; empty for a source's own columns.
    pub description: String,
    /// The values.
    pub column: Column,
}

/// The shapes of a table's rows.
#[derive(Debug, Clone, PartialEq)]
pub enum Shapes {
    /// No geometry.
    None,
    /// One point per row, x then y (easting or longitude first); a NaN pair for none.
    Points(Vec<Coord<f64>>),
    /// Any geometry per row.
    Any(Vec<Option<Geometry<f64>>>),
}

/// Named, typed columns with shapes, each row traceable to its source.
#[derive(Debug, Clone, PartialEq)]
pub struct Table {
    /// Layer name when written; the source as the user named it when read.
    pub name: String,
    /// Columns, all of one length.
    pub fields: Vec<Field>,
    /// Shapes, as many as rows where there are any.
    pub shapes: Shapes,
    /// CRS of the shapes as an authority code ("EPSG:32633") or WKT, where the source says.
    pub crs: Option<String>,
    /// For each row its line number (text sources) or feature id; empty in tables made here.
    pub rows: Vec<u64>,
    /// True where numbers in text cells use a comma for the decimal mark.
    pub decimal_comma: bool,
}

impl Table {
    /// An empty table.
    pub fn new(name: impl Into<String>) -> Self {
        Self {
            name: name.into(),
            fields: Vec::new(),
            shapes: Shapes::None,
            crs: None,
            rows: Vec::new(),
            decimal_comma: false,
        }
    }
    /// Appends a column that means something; returns the table for chaining.
    pub fn with(mut self, name: &str, title: &str, description: &str, column: Column) -> Self {
        self.fields.push(Field {
            name: name.to_owned(),
            title: title.to_owned(),
            description: description.to_owned(),
            column,
        });
        self
    }
    /// Number of rows.
    pub fn len(&self) -> usize {
        match (&self.shapes, self.fields.first()) {
            (_, Some(field)) => field.column.len(),
            (Shapes::Points(p), None) => p.len(),
            (Shapes::Any(g), None) => g.len(),
            (Shapes::None, None) => self.rows.len(),
        }
    }
    /// True where there are no rows.
    pub fn is_empty(&self) -> bool {
        self.len() == 0
    }
    /// Position of a column by its exact name, else by its name without regard to case.
    pub fn position(&self, name: &str) -> Option<usize> {
        self.fields
            .iter()
            .position(|f| f.name == name)
            .or_else(|| self.fields.iter().position(|f| f.name.to_lowercase() == name.to_lowercase()))
    }
    /// A column by name, as [`Table::position`] finds it.
    pub fn column(&self, name: &str) -> Option<&Column> {
        self.position(name).map(|i| &self.fields[i].column)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn text_keeps_empty_and_null_apart() {
        let mut c = TextColumn::default();
        for cell in [Some("a"), None, Some(""), Some("größe")] {
            c.push(cell);
        }
        assert_eq!((0..4).map(|i| c.get(i)).collect::<Vec<_>>(), [Some("a"), None, Some(""), Some("größe")]);
    }

    #[test]
    fn numbers_never_let_a_nan_out() {
        let c: Column = [Some(1.5), None, Some(f64::NAN), Some(f64::INFINITY)].into_iter().collect();
        assert_eq!(
            (0..4).map(|i| c.cell(i)).collect::<Vec<_>>(),
            [Cell::Real(1.5), Cell::Null, Cell::Null, Cell::Null]
        );
    }

    #[test]
    fn words_are_stored_once() {
        let c: Column = [Some("joint"), None, Some("joint")].into_iter().collect();
        assert_eq!((c.cell(0), c.cell(1), c.cell(2)), (Cell::Text("joint"), Cell::Null, Cell::Text("joint")));
    }
}
