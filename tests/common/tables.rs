//! Small tables for tests of reading.

use homocline::table::{Column, Table, TextColumn};

/// A table of text columns from bar-parted lines, the first the header; rows count from line 2.
pub fn bar_parted(name: &str, text: &str) -> Table {
    let mut lines = text.lines().map(|l| l.split('|').map(str::trim).collect::<Vec<_>>());
    let header = lines.next().unwrap();
    let mut columns = vec![TextColumn::default(); header.len()];
    let mut table = Table::new(name);
    for (i, line) in lines.enumerate() {
        assert_eq!(line.len(), header.len(), "{line:?}");
        line.iter().zip(&mut columns).for_each(|(cell, column)| column.push(Some(cell)));
        table.rows.push(i as u64 + 2);
    }
    for (name, column) in header.into_iter().zip(columns) {
        table = table.with(name, "", "", Column::Text(column));
    }
    table
}
