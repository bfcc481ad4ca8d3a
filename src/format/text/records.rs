//! Records and the lines they start on, cells into columns, and the rows that cannot be used.

use super::super::FormatError;
use super::decode::Text;
use super::dialect::Dialect;
use super::header::Header;
use crate::notice::{Notice, Place, Progress, Refusal};
use crate::table::TextColumn;
use std::ops::Range;

/// Rows between two reports of progress.
const STRIDE: u64 = 1 << 16;

/// Where a record lies.
#[derive(Debug, Clone)]
pub(super) struct At {
    /// Line it starts on; the first of the file is 1.
    pub line: u64,
    /// Its bytes in the text, line end included.
    bytes: Range<usize>,
}

/// Cuts a text into records.
pub(super) struct Records<'a> {
    text: &'a [u8],
    delimiter: u8,
    reader: csv::Reader<&'a [u8]>,
    /// Where the reader's own count starts.
    origin: usize,
    /// Where lines are counted up to, and the line there.
    counted: (usize, u64),
}

impl<'a> Records<'a> {
    /// Starts at the header.
    pub fn new(text: &'a Text<'_>, dialect: &Dialect) -> Self {
        let bytes: &[u8] = &text.bytes;
        let reader = Self::reader(&bytes[dialect.skip..], dialect.delimiter);
        Self { text: bytes, delimiter: dialect.delimiter, reader, origin: dialect.skip, counted: (0, 1) }
    }

    fn reader(bytes: &[u8], delimiter: u8) -> csv::Reader<&[u8]> {
        csv::ReaderBuilder::new().has_headers(false).flexible(true).delimiter(delimiter).from_reader(bytes)
    }

    /// The next record that is not an empty line.
    pub fn next(&mut self, record: &mut csv::ByteRecord) -> Option<At> {
        // Reading from memory with any number of cells allowed cannot fail.
        if !self.reader.read_byte_record(record).unwrap_or(false) {
            return None;
        }
        let end = self.origin + self.reader.position().byte() as usize;
        let mut start = self.origin + record.position().map_or(0, |p| p.byte() as usize);
        // The reader leaves empty lines, and the second half of CR LF, in front of the record.
        while start < end && matches!(self.text[start], b'\r' | b'\n') {
            start += 1;
        }
        let (from, line) = self.counted;
        let line = line + line_ends(&self.text[from..start]);
        self.counted = (start, line);
        Some(At { line, bytes: start..end })
    }

    /// A record as it stands in the text.
    pub fn raw(&self, at: &At) -> &'a [u8] {
        &self.text[at.bytes.clone()]
    }

    /// Number of line ends within a record, its own not counted.
    fn inner_lines(&self, at: &At) -> u64 {
        line_ends(self.raw(at).trim_ascii_end())
    }

    /// Goes back to the second line of a record.
    fn resume_on_next_line(&mut self, at: &At) {
        let raw = self.raw(at);
        let first = raw.iter().position(|&b| b == b'\n' || b == b'\r').unwrap_or(raw.len());
        self.origin = at.bytes.start + first;
        self.reader = Self::reader(&self.text[self.origin..], self.delimiter);
    }
}

/// True where every quote opens a cell, closes one, or is doubled within one. Text behind a closing quote, as in
/// `"open` … `,"again`, means that the quote was never meant to close that cell.
fn well_quoted(raw: &[u8], delimiter: u8) -> bool {
    let (mut inside, mut at_start) = (false, true);
    let mut bytes = raw.iter().copied().peekable();
    while let Some(byte) = bytes.next() {
        let ends = |b: u8| b == delimiter || b == b'\r' || b == b'\n';
        if !inside {
            inside = byte == b'"' && at_start;
            at_start = ends(byte);
        } else if byte == b'"' && bytes.next_if_eq(&b'"').is_none() {
            if bytes.peek().is_some_and(|&b| !ends(b)) {
                return false;
            }
            inside = false;
        }
    }
    !inside
}

/// Counts line ends: LF, CR LF or a lone CR.
fn line_ends(bytes: &[u8]) -> u64 {
    let feeds = bytes.iter().filter(|&&b| b == b'\n').count();
    let lone = if bytes.contains(&b'\r') {
        bytes.iter().enumerate().filter(|&(i, &b)| b == b'\r' && bytes.get(i + 1) != Some(&b'\n')).count()
    } else {
        0
    };
    (feeds + lone) as u64
}

/// What stands below the header.
pub(super) struct Body {
    pub columns: Vec<TextColumn>,
    /// Line of each row.
    pub rows: Vec<u64>,
    pub refused: Vec<Refusal>,
    /// Rows read, blank ones not counted.
    pub read: u64,
    /// Rows of delimiters alone.
    pub blank: u64,
    pub decimals: Decimals,
}

/// Reads all rows.
///
/// # Errors
/// [`FormatError::LineTooLong`].
pub(super) fn read(
    file: &str,
    lines: &mut Records<'_>,
    header: &Header,
    progress: &dyn Progress,
) -> Result<Body, FormatError> {
    let width = header.names.len();
    let mut body = Body {
        columns: vec![TextColumn::default(); width],
        rows: Vec::new(),
        refused: Vec::new(),
        read: 0,
        blank: 0,
        decimals: Decimals { possible: lines.delimiter != b',', ..Decimals::default() },
    };
    let mut record = csv::ByteRecord::new();
    while let Some(at) = lines.next(&mut record) {
        let raw = lines.raw(&at);
        // Only a quoted cell can hold a line end.
        let inner = if raw.contains(&b'"') { lines.inner_lines(&at) } else { 0 };
        let runaway = inner > 0 && !well_quoted(raw, lines.delimiter);
        if raw.len() > super::LONGEST && !runaway {
            return Err(FormatError::LineTooLong { file: file.to_owned(), line: at.line, limit: super::LONGEST });
        }
        if record.iter().all(|cell| cell.trim_ascii().is_empty()) {
            body.blank += 1;
            continue;
        }
        body.read += 1;
        if body.read.is_multiple_of(STRIDE) {
            progress.advance(STRIDE);
        }
        let refuse = |column: Option<usize>, value: &[u8], code, reason| Refusal {
            source: file.to_owned(),
            row: at.line,
            column: column.and_then(|i| header.names.get(i)).map(|n| n.used().to_owned()),
            value: Some(shortened(value)),
            code,
            reason,
        };
        if runaway {
            let first = raw.split(|&b| b == b'\n' || b == b'\r').next().unwrap_or_default();
            let reason = "a quotation mark opens a cell here and none closes it on its line or properly below; remove or close it".to_owned();
            body.refused.push(refuse(None, first, "quote-not-closed", reason));
            lines.resume_on_next_line(&at);
            continue;
        }
        if record.len() != width {
            let mut reason = format!("has {} cells, the header has {width}", record.len());
            reason += if record.len() < width { "; a cell is missing" } else { "; does a cell need quotation marks?" };
            if inner > 0 {
                reason += &format!(" (a quoted cell makes it span lines {} to {})", at.line, at.line + inner);
            }
            let code = if record.len() < width { "too-few-cells" } else { "too-many-cells" };
            body.refused.push(refuse(None, raw, code, reason));
            continue;
        }
        if raw.contains(&0) {
            let i = record.iter().position(|cell| cell.contains(&0));
            let reason = "holds a NUL byte; the file may be damaged here".to_owned();
            body.refused.push(refuse(i, i.map_or(raw, |i| &record[i]), "nul-byte", reason));
            continue;
        }
        let whole = |cell: &[u8]| std::str::from_utf8(cell).is_ok();
        let cells = std::str::from_utf8(record.as_slice());
        // All cells together may be UTF-8 where one ends in half a character and the next begins with its rest.
        let Some(cells) = cells.ok().filter(|text| text.is_ascii() || record.iter().all(whole)) else {
            let i = record.iter().position(|cell| !whole(cell));
            let reason = "is not UTF-8; save the table as CSV in UTF-8".to_owned();
            body.refused.push(refuse(i, i.map_or(raw, |i| &record[i]), "not-utf8", reason));
            continue;
        };
        for (i, column) in body.columns.iter_mut().enumerate() {
            let cell = record.range(i).and_then(|range| cells.get(range)).unwrap_or_default().trim();
            body.decimals.see(cell);
            column.push(Some(cell).filter(|c| !c.is_empty()));
        }
        body.rows.push(at.line);
    }
    progress.advance(body.read % STRIDE);
    Ok(body)
}

/// A cell or row for a message.
fn shortened(value: &[u8]) -> String {
    const MOST: usize = 200;
    let text = String::from_utf8_lossy(&value[..value.len().min(4 * MOST)]);
    let text = text.trim();
    match text.char_indices().nth(MOST) {
        Some((cut, _)) => format!("{}…", &text[..cut]),
        None => text.to_owned(),
    }
}

/// Which decimal mark the numbers have.
#[derive(Debug, Default)]
pub(super) struct Decimals {
    /// False where the comma separates cells.
    possible: bool,
    commas: u64,
    points: u64,
}

impl Decimals {
    fn see(&mut self, cell: &str) {
        if !self.possible || cell.len() > 24 {
            return;
        }
        let digits = cell.strip_prefix(['-', '+']).unwrap_or(cell);
        let Some(mark) = digits.find([',', '.']) else { return };
        let (whole, fraction) = (&digits[..mark], &digits[mark + 1..]);
        let number = |part: &str| !part.is_empty() && part.bytes().all(|b| b.is_ascii_digit());
        if number(whole) && number(fraction) {
            *(if digits.as_bytes()[mark] == b',' { &mut self.commas } else { &mut self.points }) += 1;
        }
    }

    /// True where most decimal numbers have a comma.
    pub fn comma(&self) -> bool {
        self.commas > self.points
    }

    /// What was decided, where there was something to decide.
    pub fn notice(&self, file: &str) -> Option<Notice> {
        let place = Place::file(file);
        match (self.commas, self.points) {
            (0, _) => None,
            (_, 0) => Some(Notice::info(
                "decimal-comma",
                place,
                format!("{} numbers have a comma; it is taken for the decimal mark", self.commas),
            )),
            (commas, points) => Some(
                Notice::warning(
                    "decimal-mark-mixed",
                    place,
                    format!(
                        "numbers with a comma: {commas}, with a point: {points}; angles are read with either, all others with the {}",
                        if self.comma() { "comma" } else { "point" }
                    ),
                )
                .hint("write all numbers with one decimal mark"),
            ),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_kind_of_line_end_counts_once() {
        assert_eq!(line_ends(b"a\nb\r\nc\rd"), 3);
        assert_eq!(line_ends(b"\r\r\n\n"), 3);
    }

    #[test]
    fn decimal_commas_outvote_points() {
        let mut d = Decimals { possible: true, ..Decimals::default() };
        ["1,5", "-0,25", "1.234,5", "12", "N45E", "1,5,6", "3.5"].iter().for_each(|c| d.see(c));
        assert_eq!((d.commas, d.points, d.comma()), (2, 1, true));
    }
}
