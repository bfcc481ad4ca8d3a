//! Which character separates the cells.

use super::decode::Text;

/// How a text table is written.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Dialect {
    /// Separator of cells.
    pub delimiter: u8,
    /// Bytes before the header: a first line `sep=;`, as spreadsheets write.
    pub skip: usize,
}

const CANDIDATES: [u8; 4] = [b',', b';', b'\t', b'|'];
/// Records looked at.
const SAMPLE: usize = 200;
/// Bytes looked at, at most.
const SAMPLE_BYTES: usize = 1 << 20;

impl Dialect {
    /// Guesses the delimiter: the one that cuts most of the first records into as many cells as the header, and
    /// the header into most cells where several do equally well.
    pub fn sniff(text: &Text<'_>) -> Self {
        let bytes: &[u8] = &text.bytes;
        let first = bytes.split(|&b| b == b'\n' || b == b'\r').next().unwrap_or_default();
        if let [b's' | b'S', b'e' | b'E', b'p' | b'P', b'=', delimiter] = first
            && CANDIDATES.contains(delimiter)
        {
            return Self { delimiter: *delimiter, skip: first.len() };
        }
        let sample = &bytes[..bytes.len().min(SAMPLE_BYTES)];
        let best = CANDIDATES.into_iter().filter_map(|d| Some((score(sample, d)?, d)));
        // A tie goes to the earlier candidate.
        let best = best.reduce(|a, b| if b.0 > a.0 { b } else { a });
        Self { delimiter: best.map_or(b',', |(_, d)| d), skip: 0 }
    }

    /// The delimiter for a message.
    pub fn delimiter_name(&self) -> &'static str {
        match self.delimiter {
            b';' => "semicolons",
            b'\t' => "tabs",
            b'|' => "vertical bars",
            _ => "commas",
        }
    }
}

/// Share of records (per mille) as wide as the header, then the header's cells; none where it has but one.
fn score(sample: &[u8], delimiter: u8) -> Option<(usize, usize)> {
    let mut reader =
        csv::ReaderBuilder::new().has_headers(false).flexible(true).delimiter(delimiter).from_reader(sample);
    let mut record = csv::ByteRecord::new();
    let mut width = None;
    let (mut seen, mut alike) = (0, 0);
    while seen < SAMPLE && reader.read_byte_record(&mut record).unwrap_or(false) {
        match width {
            None => width = Some(record.len()),
            Some(width) => {
                seen += 1;
                alike += usize::from(record.len() == width);
            }
        }
    }
    let width = width.filter(|&w| w > 1)?;
    Some(((alike * 1000usize).checked_div(seen).unwrap_or(1000), width))
}

#[cfg(test)]
mod tests {
    use super::super::decode::to_utf8;
    use super::*;

    fn delimiter(text: &str) -> u8 {
        Dialect::sniff(&to_utf8(text.as_bytes())).delimiter
    }

    #[test]
    fn the_delimiter_that_fits_the_rows_wins() {
        assert_eq!(delimiter("id,x,y\n1,2,3\n"), b',');
        assert_eq!(delimiter("id;x;y\n1;2,5;3,5\n2;2,5;3,5\n"), b';');
        assert_eq!(delimiter("id\tx, east\ty\n1\t2\t3\n"), b'\t');
        assert_eq!(delimiter("id|note\n1|a,b,c\n"), b'|');
        assert_eq!(delimiter("id,note\n1,\"a;b;c\"\n2,a;b\n"), b',');
        assert_eq!(delimiter("id\n1\n2\n"), b',');
        assert_eq!(delimiter("sep=;\r\nid;x\r\n1;2\r\n"), b';');
    }
}
