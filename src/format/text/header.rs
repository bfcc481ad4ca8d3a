//! The names of the columns.

use super::super::FormatError;
use super::records::Records;
use crate::notice::{Notice, Place};
use crate::table::TextColumn;
use std::collections::HashSet;

/// A column's name and how it came about.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Name {
    /// As written.
    Given(String),
    /// Written before; numbered here.
    Repeated { written: String, used: String },
    /// Nothing was written.
    Made(String),
}

impl Name {
    /// The name to use.
    pub fn used(&self) -> &str {
        match self {
            Self::Given(name) | Self::Made(name) | Self::Repeated { used: name, .. } => name,
        }
    }

    /// The name, unless neither name nor cells were written: spreadsheets leave such columns at the end of rows.
    pub fn kept(&self, cells: &TextColumn) -> Option<String> {
        match self {
            Self::Made(_) if is_blank(cells) => None,
            name => Some(name.used().to_owned()),
        }
    }
}

fn is_blank(cells: &TextColumn) -> bool {
    (0..cells.len()).all(|row| cells.get(row).is_none())
}

/// The header of a text table.
#[derive(Debug)]
pub(super) struct Header {
    pub names: Vec<Name>,
    line: u64,
}

/// Reads the header: the first line that is not blank.
///
/// # Errors
/// Where there is none, or it is no UTF-8 text.
pub(super) fn read(file: &str, lines: &mut Records<'_>) -> Result<Header, FormatError> {
    let file = file.to_owned();
    let mut record = csv::ByteRecord::new();
    let Some(at) = lines.next(&mut record) else { return Err(FormatError::Empty { file }) };
    let raw = lines.raw(&at);
    if raw.len() > super::LONGEST {
        return Err(FormatError::LineTooLong { file, line: at.line, limit: super::LONGEST });
    }
    if raw.contains(&0) {
        return Err(FormatError::NotText { file, line: at.line });
    }
    if std::str::from_utf8(raw).is_err() {
        let header = String::from_utf8_lossy(raw).chars().take(200).collect();
        return Err(FormatError::HeaderNotUtf8 { file, line: at.line, header });
    }
    let written: Vec<String> = record.iter().map(|c| String::from_utf8_lossy(c).trim().to_owned()).collect();
    let mut taken: HashSet<String> = written.iter().cloned().collect();
    let mut seen = HashSet::new();
    let mut fresh = |stem: &str, from: usize| {
        let name = (from..).map(|n| format!("{stem}_{n}")).find(|n| !taken.contains(n)).unwrap_or_default();
        taken.insert(name.clone());
        name
    };
    let names = written.iter().enumerate().map(|(i, name)| {
        if name.is_empty() {
            Name::Made(fresh("column", i + 1))
        } else if seen.insert(name) {
            Name::Given(name.clone())
        } else {
            Name::Repeated { written: name.clone(), used: fresh(name, 2) }
        }
    });
    Ok(Header { names: names.collect(), line: at.line })
}

impl Header {
    /// What looks odd about the names.
    pub fn notices(&self, file: &str, columns: &[TextColumn]) -> Vec<Notice> {
        let place = || Place::file(file).at_row(self.line);
        let mut notices = Vec::new();
        for (name, cells) in self.names.iter().zip(columns) {
            match name {
                Name::Repeated { written, used } => notices.push(
                    Notice::warning(
                        "header-repeated",
                        place().in_column(written.clone()),
                        format!(
                            "the header has \"{written}\" more than once; the later column is called \"{used}\" here"
                        ),
                    )
                    .hint("give each column its own name"),
                ),
                Name::Made(used) if !is_blank(cells) => notices.push(Notice::warning(
                    "header-empty",
                    place(),
                    format!("a column with values has no name in the header; it is called \"{used}\" here"),
                )),
                _ => {}
            }
        }
        notices
    }
}
