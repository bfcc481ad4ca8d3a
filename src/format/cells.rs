//! A column whose type is learnt from its cells.

use crate::table::{Column, IntegerColumn, RealColumn, TextColumn};

/// A column in the making: nothing yet, then the narrowest type that holds every cell.
///
/// Whole numbers widen to reals; any other mixture becomes text.
#[derive(Debug)]
pub(super) enum Growing {
    /// Only nulls so far, and how many.
    Nulls(usize),
    Integer(IntegerColumn),
    Real(RealColumn),
    Boolean(IntegerColumn),
    Text(TextColumn),
}

/// One cell as a source gives it.
#[derive(Debug, Clone, Copy)]
pub(super) enum Given<'a> {
    Null,
    Integer(i64),
    Real(f64),
    Boolean(bool),
    Text(&'a str),
}

impl Growing {
    /// Number of rows.
    pub fn len(&self) -> usize {
        match self {
            Self::Nulls(n) => *n,
            Self::Integer(c) | Self::Boolean(c) => c.len(),
            Self::Real(c) => c.len(),
            Self::Text(c) => c.len(),
        }
    }

    /// Appends a cell, widening the column where it must.
    pub fn push(&mut self, cell: Given<'_>) {
        match (&mut *self, cell) {
            (Self::Nulls(n), Given::Null) => *n += 1,
            (Self::Integer(c) | Self::Boolean(c), Given::Null) => c.push(None),
            (Self::Real(c), Given::Null) => c.push(None),
            (Self::Text(c), Given::Null) => c.push(None),
            (Self::Integer(c), Given::Integer(v)) => c.push(Some(v)),
            (Self::Boolean(c), Given::Boolean(v)) => c.push(Some(i64::from(v))),
            (Self::Real(c), Given::Real(v)) => c.push(Some(v)),
            (Self::Real(c), Given::Integer(v)) if exact(v) => c.push(Some(v as f64)),
            (Self::Text(c), Given::Text(v)) => c.push(Some(v)),
            (Self::Text(c), Given::Integer(v)) => c.push(Some(&v.to_string())),
            (Self::Text(c), Given::Real(v)) => c.push(Some(&v.to_string())),
            (Self::Text(c), Given::Boolean(v)) => c.push(Some(&v.to_string())),
            _ => {
                self.widen(cell);
                self.push(cell);
            }
        }
    }

    /// Changes to the narrowest type that also holds `cell`.
    fn widen(&mut self, cell: Given<'_>) {
        let rows = self.len();
        let old = std::mem::replace(self, Self::Nulls(0));
        *self = match (old, cell) {
            (Self::Nulls(_), Given::Integer(_)) => Self::Integer(filled(rows, |c: &mut IntegerColumn| c.push(None))),
            (Self::Nulls(_), Given::Real(_)) => Self::Real(filled(rows, |c: &mut RealColumn| c.push(None))),
            (Self::Nulls(_), Given::Boolean(_)) => Self::Boolean(filled(rows, |c: &mut IntegerColumn| c.push(None))),
            (Self::Integer(c), Given::Real(_)) if (0..rows).all(|i| c.get(i).is_none_or(exact)) => {
                let mut reals = RealColumn::default();
                (0..rows).for_each(|i| reals.push(c.get(i).map(|v| v as f64)));
                Self::Real(reals)
            }
            (old, _) => {
                let mut text = TextColumn::default();
                for i in 0..rows {
                    match &old {
                        Self::Nulls(_) => text.push(None),
                        Self::Integer(c) => text.push(c.get(i).map(|v| v.to_string()).as_deref()),
                        Self::Real(c) => text.push(c.get(i).map(|v| v.to_string()).as_deref()),
                        Self::Boolean(c) => text.push(c.get(i).map(|v| if v == 0 { "false" } else { "true" })),
                        Self::Text(c) => text.push(c.get(i)),
                    }
                }
                Self::Text(text)
            }
        };
    }

    /// The finished column; one of nulls alone is text.
    pub fn finish(self) -> Column {
        match self {
            Self::Nulls(n) => Column::Text(filled(n, |c: &mut TextColumn| c.push(None))),
            Self::Integer(c) => Column::Integer(c),
            Self::Real(c) => Column::Real(c),
            Self::Boolean(c) => Column::Boolean(c),
            Self::Text(c) => Column::Text(c),
        }
    }
}

fn filled<C: Default>(rows: usize, null: impl Fn(&mut C)) -> C {
    let mut column = C::default();
    (0..rows).for_each(|_| null(&mut column));
    column
}

/// True where the integer is exact as a double.
fn exact(v: i64) -> bool {
    v.unsigned_abs() <= 1 << f64::MANTISSA_DIGITS
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::table::Cell;

    fn grow(cells: &[Given<'_>]) -> Column {
        let mut column = Growing::Nulls(0);
        cells.iter().for_each(|&c| column.push(c));
        column.finish()
    }

    #[test]
    fn whole_numbers_widen_to_reals_and_mixtures_to_text() {
        assert_eq!(grow(&[Given::Null, Given::Integer(3)]).cell(1), Cell::Integer(3));
        assert_eq!(grow(&[Given::Integer(3), Given::Real(0.5)]).cell(0), Cell::Real(3.0));
        assert_eq!(grow(&[Given::Integer(3), Given::Text("3W")]).cell(0), Cell::Text("3"));
        assert_eq!(grow(&[Given::Boolean(true), Given::Integer(3)]).cell(0), Cell::Text("true"));
        assert_eq!(grow(&[Given::Real(0.25), Given::Null, Given::Boolean(false)]).cell(0), Cell::Text("0.25"));
        assert_eq!(grow(&[Given::Null]).cell(0), Cell::Null);
    }

    #[test]
    fn a_whole_number_beyond_a_double_is_not_rounded() {
        let big = (1_i64 << 53) + 1;
        assert_eq!(grow(&[Given::Integer(big), Given::Real(0.5)]).cell(0), Cell::Text("9007199254740993"));
        assert_eq!(grow(&[Given::Real(0.5), Given::Integer(big)]).cell(1), Cell::Text("9007199254740993"));
    }
}
