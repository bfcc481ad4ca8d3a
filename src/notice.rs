//! What the program tells its user, and where in the input it happened.
//!
//! Nothing here prints: floors below the program return these values, and only `cli` writes them out.

use std::fmt;

/// A place in an input: which file, which row, which column.
///
/// A row is a line number in a text source (the header is line 1) and a feature id elsewhere.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Place {
    /// The source as the user named it.
    pub file: Option<String>,
    /// Line number or feature id.
    pub row: Option<u64>,
    /// Column name as the source spells it.
    pub column: Option<String>,
}

impl Place {
    /// A whole file.
    pub fn file(file: impl Into<String>) -> Self {
        Self { file: Some(file.into()), row: None, column: None }
    }
    /// The same place, narrowed to a row.
    pub fn at_row(mut self, row: u64) -> Self {
        self.row = Some(row);
        self
    }
    /// The same place, narrowed to a column.
    pub fn in_column(mut self, column: impl Into<String>) -> Self {
        self.column = Some(column.into());
        self
    }
}

impl fmt::Display for Place {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let mut parts = Vec::new();
        if let Some(file) = &self.file {
            parts.push(file.clone());
        }
        if let Some(row) = self.row {
            parts.push(format!("row {row}"));
        }
        if let Some(column) = &self.column {
            parts.push(format!("column \"{column}\""));
        }
        f.write_str(&parts.join(", "))
    }
}

/// How much a notice matters.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Severity {
    /// What the program assumed or guessed: worth knowing, nothing wrong.
    Info,
    /// Something a geologist should look at; the run went on. Counts as a finding under `--strict`.
    Warning,
}

/// One message that does not stop the job.
#[derive(Debug, Clone, PartialEq)]
pub struct Notice {
    /// How much it matters.
    pub severity: Severity,
    /// A stable, searchable name in kebab-case, for example `north-assumed`.
    pub code: &'static str,
    /// Where it happened.
    pub place: Place,
    /// One sentence, with the values that matter in it.
    pub message: String,
    /// What the user can do about it.
    pub hint: Option<String>,
}

impl Notice {
    /// A notice of what was assumed.
    pub fn info(code: &'static str, place: Place, message: impl Into<String>) -> Self {
        Self { severity: Severity::Info, code, place, message: message.into(), hint: None }
    }
    /// A notice of something to look at.
    pub fn warning(code: &'static str, place: Place, message: impl Into<String>) -> Self {
        Self { severity: Severity::Warning, code, place, message: message.into(), hint: None }
    }
    /// The same notice with advice.
    pub fn hint(mut self, hint: impl Into<String>) -> Self {
        self.hint = Some(hint.into());
        self
    }
}

/// One row that was read but not used, and why. A row is refused once, for the first reason found.
#[derive(Debug, Clone, PartialEq)]
pub struct Refusal {
    /// The source as the user named it.
    pub source: String,
    /// Line number in a text source, feature id elsewhere.
    pub row: u64,
    /// The column at fault, where one is.
    pub column: Option<String>,
    /// What stood there, as the source wrote it.
    pub value: Option<String>,
    /// A stable name in kebab-case, for example `dip-out-of-range`.
    pub code: &'static str,
    /// One sentence with the reason, both values where two contradict, and a hint where there is one.
    pub reason: String,
}

/// Hears how far a long job is. Implementations draw a bar, or nothing at all.
pub trait Progress: Sync {
    /// A stage begins; `total` in units of the stage (rows, pairs), where known.
    fn begin(&self, stage: &str, total: Option<u64>);
    /// `units` more are done.
    fn advance(&self, units: u64);
    /// The stage is over.
    fn end(&self);
}

/// Hears and says nothing.
#[derive(Debug, Clone, Copy, Default)]
pub struct Silent;

impl Progress for Silent {
    fn begin(&self, _stage: &str, _total: Option<u64>) {}
    fn advance(&self, _units: u64) {}
    fn end(&self) {}
}
