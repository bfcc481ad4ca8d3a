//! Layer `refusals`: one row that was read and not used.

use super::Results;
use crate::table::{Column, IntegerColumn, Table, TextColumn};

pub(super) fn table(results: &Results) -> Table {
    let mut row = IntegerColumn::default();
    let (mut value, mut reason) = (TextColumn::default(), TextColumn::default());
    for refusal in results.refusals {
        row.push(i64::try_from(refusal.row).ok());
        value.push(refusal.value.as_deref());
        reason.push(Some(&refusal.reason));
    }
    let words = |get: fn(&crate::notice::Refusal) -> Option<&str>| results.refusals.iter().map(get).collect::<Column>();
    Table::new("refusals")
        .with("source", "Source", "The file or layer, as the area file names it", words(|r| Some(&r.source)))
        .with(
            "row",
            "Row",
            "Line number in a text source (the header is line 1), feature id elsewhere",
            Column::Integer(row),
        )
        .with("column", "Column", "The column at fault", words(|r| r.column.as_deref()))
        .with("value", "Value", "What stands there", Column::Text(value))
        .with("code", "Code", "The kind of fault", words(|r| Some(r.code)))
        .with("reason", "Reason", "Why the row was not used, and what to do", Column::Text(reason))
}
