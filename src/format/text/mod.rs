//! Delimited text: `.csv`, `.tsv`, `.txt`.

pub(super) mod decode;
mod dialect;
mod header;
mod records;

use super::{FormatError, ReadTable, Source, layer_is_the_file};
use crate::notice::{Notice, Place, Progress};
use crate::table::{Column, Field, Table};
use dialect::Dialect;

/// Longest record in bytes; a longer one means that the file is no table.
const LONGEST: usize = 16 << 20;

/// Reads delimited text. Every column is [`Column::Text`], trimmed, a null where nothing stands.
///
/// # Errors
/// [`FormatError`] where the file is no text table with at least one row.
pub(super) fn read(source: &Source, bytes: &[u8], progress: &dyn Progress) -> Result<ReadTable, FormatError> {
    let file = &source.path;
    layer_is_the_file(source, None)?;
    let text = decode::to_utf8(bytes);
    let dialect = Dialect::sniff(&text);
    let mut lines = records::Records::new(&text, &dialect);
    let header = header::read(file, &mut lines)?;
    let body = records::read(file, &mut lines, &header, progress)?;
    if body.read == 0 {
        return Err(FormatError::NoRows { file: file.clone() });
    }

    let mut notices = Vec::new();
    let place = || Place::file(file.clone());
    if let Some(encoding) = text.encoding {
        notices.push(Notice::info("encoding-decoded", place(), format!("the file is {encoding}; it was decoded")));
    }
    if dialect.delimiter != b',' {
        let message = format!("cells are taken to be separated by {}", dialect.delimiter_name());
        notices.push(Notice::info("delimiter-guessed", place(), message));
    }
    notices.extend(header.notices(file, &body.columns));
    if body.blank > 0 {
        let message = format!("{} rows without a single value were skipped", body.blank);
        notices.push(Notice::info("blank-rows", place(), message));
    }
    notices.extend(body.decimals.notice(file));

    let mut table = Table::new(file.clone());
    table.decimal_comma = body.decimals.comma();
    table.rows = body.rows;
    for (name, column) in header.names.iter().zip(body.columns) {
        if let Some(name) = name.kept(&column) {
            table.fields.push(Field {
                name,
                title: String::new(),
                description: String::new(),
                column: Column::Text(column),
            });
        }
    }
    Ok(ReadTable { table, refused: body.refused, notices, read: body.read })
}
