//! Dates to decimal years.

use super::InputFault;
use super::row::RowFault;
use super::value::{Value, value};
use crate::orientation::notation::shown;
use crate::table::Table;

/// Which part comes first in dates like 3/4/2024.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Slashes {
    DayFirst,
    MonthFirst,
    Undecided,
}

/// When a reading was taken.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct When {
    /// Decimal year.
    pub year: f64,
    /// Only the year was written; its middle was taken.
    pub year_only: bool,
}

fn day(year: f64) -> When {
    When { year, year_only: false }
}

/// The dates of a source.
#[derive(Debug, Clone, Copy)]
pub(super) struct Dates {
    column: Option<usize>,
    common: Option<When>,
    slashes: Slashes,
}

impl Dates {
    /// Looks through the column once: a part over 12 tells day from month, for all rows unless rows contradict.
    pub fn new(table: &Table, column: Option<usize>, common: Option<&str>) -> Result<Self, InputFault> {
        let common = match common {
            Some(text) => Some(date(text, Slashes::Undecided).map_err(|_| InputFault::BadDate(text.to_owned()))?),
            None => None,
        };
        if column.is_none() && common.is_none() {
            return Err(InputFault::NoDate);
        }
        let (mut day_first, mut month_first) = (false, false);
        if let Some(i) = column {
            let cells = &table.fields[i].column;
            for row in 0..cells.len() {
                if let Value::Text(text) = value(cells, row)
                    && let Some([a, b, _]) = parts(text, &['/', '-'])
                    && a.1 <= 2
                {
                    day_first |= a.0 > 12;
                    month_first |= b.0 > 12;
                }
            }
        }
        let slashes = match (day_first, month_first) {
            (true, false) => Slashes::DayFirst,
            (false, true) => Slashes::MonthFirst,
            _ => Slashes::Undecided,
        };
        Ok(Self { column, common, slashes })
    }

    /// The date of a row.
    pub fn of_row(&self, table: &Table, row: usize) -> Result<When, (Option<usize>, RowFault)> {
        let found = match self.column.map(|i| value(&table.fields[i].column, row)) {
            None | Some(Value::Blank) => self.common.ok_or(RowFault::NoDate),
            Some(Value::Number(n)) => number_year(n).ok_or_else(|| RowFault::Date(shown(n))),
            Some(Value::Text(text)) => date(text, self.slashes),
        };
        found.map_err(|fault| (self.column, fault))
    }
}

/// 20240601, a decimal year, or a year alone.
fn number_year(n: f64) -> Option<When> {
    if (1900.0..2101.0).contains(&n) {
        return Some(if n.fract() == 0.0 { When { year: n + 0.5, year_only: true } } else { day(n) });
    }
    let whole = n as i64;
    if n.fract() != 0.0 || !(19_000_101..=21_001_231).contains(&whole) {
        return None;
    }
    from_parts(whole / 10_000, whole / 100 % 100, whole % 100).map(day)
}

/// Three whole numbers with their number of digits, parted by one of `marks` (the same one twice).
fn parts(text: &str, marks: &[char]) -> Option<[(i64, usize); 3]> {
    // A time after the date begins with T or a blank.
    let date = text.trim().split(['T', 't', ' ']).next()?;
    let mark = date.chars().find(|c| !c.is_ascii_digit()).filter(|c| marks.contains(c))?;
    let mut out = [(0, 0); 3];
    let mut pieces = date.split(mark);
    for slot in &mut out {
        let piece = pieces.next()?;
        if piece.is_empty() || piece.len() > 4 || !piece.bytes().all(|b| b.is_ascii_digit()) {
            return None;
        }
        *slot = (piece.parse().ok()?, piece.len());
    }
    pieces.next().is_none().then_some(out)
}

fn date(text: &str, slashes: Slashes) -> Result<When, RowFault> {
    let trimmed = text.trim();
    match trimmed.parse().ok().and_then(number_year) {
        // "2024.0" counts from the year's first day; "2024" says no more than the year.
        Some(when) if when.year_only && trimmed.contains('.') => Ok(day(when.year - 0.5)),
        Some(when) => Ok(when),
        None => day_in_parts(text, slashes).map(day),
    }
}

fn day_in_parts(text: &str, slashes: Slashes) -> Result<f64, RowFault> {
    let bad = || RowFault::Date(text.to_owned());
    if let Some((y, m, d)) = with_month_name(text) {
        return from_parts(y, m, d).ok_or_else(bad);
    }
    if let Some([(y, 4), (m, _), (d, _)]) = parts(text, &['-', '/', '.']) {
        return from_parts(y, m, d).ok_or_else(bad);
    }
    // With dots the day comes first everywhere it is written so.
    if let Some([(d, 1..=2), (m, _), (y, 4)]) = parts(text, &['.']) {
        return from_parts(y, m, d).ok_or_else(bad);
    }
    let Some([(a, 1..=2), (b, 1..=2), (y, 4)]) = parts(text, &['/', '-']) else { return Err(bad()) };
    let (d, m) = match slashes {
        _ if a == b => (a, b),
        Slashes::DayFirst => (a, b),
        Slashes::MonthFirst => (b, a),
        Slashes::Undecided if a > 12 => (a, b),
        Slashes::Undecided if b > 12 => (b, a),
        Slashes::Undecided => return Err(RowFault::DateOrder(text.to_owned())),
    };
    from_parts(y, m, d).ok_or_else(bad)
}

const MONTHS: [&str; 12] = [
    "january",
    "february",
    "march",
    "april",
    "may",
    "june",
    "july",
    "august",
    "september",
    "october",
    "november",
    "december",
];

/// "6 July 2023", "6-Jul-2023", "July 6, 2023": year, month and day. A time may follow.
fn with_month_name(text: &str) -> Option<(i64, i64, i64)> {
    let month = |word: &str| {
        let word = word.to_ascii_lowercase();
        let known = |m: &&str| **m == word || m[..3] == word || word == "sept" && m.starts_with("sept");
        MONTHS.iter().position(known).map(|i| i as i64 + 1)
    };
    let number = |word: &str, widths: std::ops::RangeInclusive<usize>| {
        (widths.contains(&word.len()) && word.bytes().all(|b| b.is_ascii_digit())).then(|| word.parse().ok()).flatten()
    };
    let mut words = text.split([' ', '-', '/', '.', ',']).filter(|w| !w.is_empty());
    let (a, b, c) = (words.next()?, words.next()?, words.next()?);
    if words.next().is_some_and(|time| !time.contains(':')) {
        return None;
    }
    let (d, m, y) = match (month(a), month(b)) {
        (None, Some(m)) => (a, m, c),
        (Some(m), None) => (b, m, c),
        _ => return None,
    };
    Some((number(y, 4..=4)?, m, number(d, 1..=2)?))
}

/// How to write a date that was not understood.
pub(super) fn advice(text: &str) -> &'static str {
    let digits = |p: &&str| p.bytes().all(|b| b.is_ascii_digit());
    let marks = [' ', '-', '/', '.', ',', '\''];
    let pieces: Vec<&str> = text.split(marks).filter(|p| !p.is_empty() && !p.contains(':')).collect();
    let short = pieces.iter().filter(|p| digits(p) && p.len() <= 2).count();
    if pieces.len() == 3 && short >= 2 && !pieces.iter().any(|p| digits(p) && p.len() > 2) {
        "write the year with four digits, as in 2024-06-01"
    } else {
        "write it as 2024-06-01"
    }
}

/// The year and the part of it gone by at the start of the day.
fn from_parts(year: i64, month: i64, day: i64) -> Option<f64> {
    let leap = year % 4 == 0 && (year % 100 != 0 || year % 400 == 0);
    let months = [31, if leap { 29 } else { 28 }, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];
    let length = *months.get(usize::try_from(month.checked_sub(1)?).ok()?)?;
    if !(1..=length).contains(&day) || !(1500..=2500).contains(&year) {
        return None;
    }
    let before: i64 = months.iter().take(month as usize - 1).sum::<i64>() + day - 1;
    Some(year as f64 + before as f64 / if leap { 366.0 } else { 365.0 })
}

#[cfg(test)]
mod tests {
    use super::*;

    // Common practice, no source.
    #[test]
    fn dates_in_their_spellings() {
        for (text, slashes, want) in [
            ("2024-07-02", Slashes::Undecided, Some(2024.5)),
            ("2024/07/02", Slashes::Undecided, Some(2024.5)),
            ("2024-07-02T10:30:00Z", Slashes::Undecided, Some(2024.5)),
            ("2024-07-02 10:30", Slashes::Undecided, Some(2024.5)),
            ("2.7.2024", Slashes::Undecided, Some(2024.5)),
            ("02/07/2024", Slashes::DayFirst, Some(2024.5)),
            ("07/02/2024", Slashes::MonthFirst, Some(2024.5)),
            ("07/02/2024", Slashes::Undecided, None),
            ("1/1/2024", Slashes::Undecided, Some(2024.0)),
            ("20240702", Slashes::Undecided, Some(2024.5)),
            ("2 July 2024", Slashes::Undecided, Some(2024.5)),
            ("2-Jul-2024", Slashes::Undecided, Some(2024.5)),
            ("July 2, 2024", Slashes::Undecided, Some(2024.5)),
            ("02 JUL 2024 10:30", Slashes::Undecided, Some(2024.5)),
            ("31 June 2024", Slashes::Undecided, None),
            ("2 Juli 2024", Slashes::Undecided, None),
            ("2 July 24", Slashes::Undecided, None),
            ("02/07/24", Slashes::DayFirst, None),
            ("2023", Slashes::Undecided, Some(2023.5)),
            ("2024.0", Slashes::Undecided, Some(2024.0)),
            ("2024.5", Slashes::Undecided, Some(2024.5)),
            ("2023-02-29", Slashes::Undecided, None),
            ("2024-13-01", Slashes::Undecided, None),
            ("yesterday", Slashes::Undecided, None),
            ("-", Slashes::Undecided, None),
            ("2024-07-02-03", Slashes::Undecided, None),
        ] {
            assert_eq!(date(text, slashes).ok().map(|when| when.year), want, "{text}");
        }
        assert!(date("2023", Slashes::Undecided).unwrap().year_only);
        assert!(!date("2023-01-01", Slashes::Undecided).unwrap().year_only);
        for (text, short) in [
            ("02/07/24", true),
            ("2 July 24", true),
            ("2 Oct 24", true),
            ("6.7.'23", true),
            ("yesterday", false),
            ("2024-13-01", false),
        ] {
            assert_eq!(advice(text).contains("four digits"), short, "{text}");
        }
    }
}
