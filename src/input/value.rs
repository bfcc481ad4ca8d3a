//! Cells as numbers and words.

use crate::orientation::notation::shown;
use crate::table::{Cell, Column};

/// A cell with blanks and "no value" words taken out.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Value<'a> {
    Blank,
    Number(f64),
    Text(&'a str),
}

/// The value of a cell.
pub(super) fn value(column: &Column, row: usize) -> Value<'_> {
    match column.cell(row) {
        Cell::Null => Value::Blank,
        Cell::Real(v) => Value::Number(v),
        Cell::Integer(v) => Value::Number(v as f64),
        Cell::Boolean(v) => Value::Number(f64::from(u8::from(v))),
        Cell::Text(text) => {
            let text = text.trim();
            let blank = match text.len() {
                0 => true,
                1 => matches!(text, "-" | "?"),
                2 => text.eq_ignore_ascii_case("na") || text == "--",
                3 => text.eq_ignore_ascii_case("n/a"),
                4 => text.eq_ignore_ascii_case("null") || text.eq_ignore_ascii_case("none"),
                _ => false,
            };
            if blank { Value::Blank } else { Value::Text(text) }
        }
    }
}

/// A cell as the source wrote it, for messages.
pub(super) fn written(column: &Column, row: usize) -> Option<String> {
    match column.cell(row) {
        Cell::Null => None,
        Cell::Text(text) => Some(text.to_owned()),
        Cell::Real(v) => Some(shown(v)),
        Cell::Integer(v) => Some(v.to_string()),
        Cell::Boolean(v) => Some(v.to_string()),
    }
}

/// Why a cell is not a number.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum NoNumber {
    Text,
    NotFinite,
}

/// A finite number, or none for a blank. In text a comma is the decimal mark only where the table says so.
pub(super) fn number(value: Value<'_>, decimal_comma: bool) -> Result<Option<f64>, NoNumber> {
    let parsed = match value {
        Value::Blank => return Ok(None),
        Value::Number(v) => Some(v),
        Value::Text(text) if decimal_comma && text.contains(',') => decimal_point(text),
        Value::Text(text) => text.parse().ok(),
    };
    match parsed {
        None => Err(NoNumber::Text),
        Some(v) if v.is_finite() => Ok(Some(v)),
        Some(_) => Err(NoNumber::NotFinite),
    }
}

fn decimal_point(text: &str) -> Option<f64> {
    let mut bytes = [0u8; 64];
    let bytes = bytes.get_mut(..text.len())?;
    bytes.copy_from_slice(text.as_bytes());
    if bytes.contains(&b'.') {
        return None;
    }
    bytes.iter_mut().filter(|b| **b == b',').for_each(|b| *b = b'.');
    std::str::from_utf8(bytes).ok()?.parse().ok()
}

/// Lower-case letters and digits only, umlauts spelled out and accents dropped where they are common.
pub(super) fn normal(name: &str) -> String {
    let mut out = String::with_capacity(name.len());
    for c in name.chars().flat_map(char::to_lowercase).filter(|c| c.is_alphanumeric()) {
        match c {
            'ä' => out.push_str("ae"),
            'ö' => out.push_str("oe"),
            'ü' => out.push_str("ue"),
            'ß' => out.push_str("ss"),
            'é' | 'è' | 'ê' => out.push('e'),
            'á' | 'à' | 'â' | 'ã' => out.push('a'),
            'í' | 'ì' => out.push('i'),
            'ó' | 'ò' | 'ô' | 'õ' => out.push('o'),
            'ú' | 'ù' => out.push('u'),
            'ç' => out.push('c'),
            'ñ' => out.push('n'),
            'º' => {}
            c => out.push(c),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_in_text() {
        for (text, comma, want) in [
            ("1.5", false, Ok(Some(1.5))),
            ("1,5", true, Ok(Some(1.5))),
            ("1,5", false, Err(NoNumber::Text)),
            ("1.234,5", true, Err(NoNumber::Text)),
            ("1,234,5", true, Err(NoNumber::Text)),
            ("1e308", false, Ok(Some(1e308))),
            ("NaN", false, Err(NoNumber::NotFinite)),
            ("inf", false, Err(NoNumber::NotFinite)),
            ("about 5", false, Err(NoNumber::Text)),
        ] {
            assert_eq!(number(Value::Text(text), comma), want, "{text}");
        }
    }

    #[test]
    fn names_lose_case_punctuation_and_accents() {
        assert_eq!(normal("Dip_Dir. (°)"), "dipdir");
        assert_eq!(normal("Höhe"), "hoehe");
        assert_eq!(normal("Dirección"), "direccion");
    }
}
