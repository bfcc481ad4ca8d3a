//! The attitude of a row from its columns.

use super::choose::Columns;
use super::row::RowFault;
use super::value::{Value, value};
use crate::orientation::notation::{
    AzimuthCell, DipCell, Notation, NotationError, Order, Quantity, Reading, Wanted, agree, attitude, azimuth,
    azimuth_cell, dip_cell, inclination, line, line_from_rake, plane, plunge_with_sense, point_cell, rake_cell,
    written_as,
};
use crate::orientation::{Measured, Polarity};
use crate::table::Table;
use rayon::prelude::*;

/// What a source shows about its notation.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Evidence {
    /// How plain numbers are read; not auto.
    pub notation: Notation,
    /// Nobody said right-hand: it was assumed.
    pub assumed: bool,
    /// What the user declared.
    pub declared: Notation,
    /// Which number comes first in texts, where rows that leave no doubt agree.
    pub order: Order,
}

#[derive(Debug, Clone, Copy, Default)]
struct Count {
    rows: usize,
    letters: usize,
    quadrants: usize,
    arrows: usize,
    azimuth_first: usize,
    inclination_first: usize,
}

/// Looks through the attitude columns once.
///
/// Auto becomes: quadrant where a dip quadrant column holds anything, or more than half of the filled rows have compass
/// letters beside their numbers; dip-direction where the only
/// azimuth is a dip direction by name, or where more than half of the texts have an arrow; trend-plunge where only
/// a trend is there; right-hand otherwise, which is said in a notice when a plane is read by it.
pub(super) fn evidence(table: &Table, columns: &Columns, declared: Notation) -> Evidence {
    let texts = columns.attitude;
    let in_name = columns.strike.map(|(_, notation)| notation).unwrap_or(declared);
    let known = if declared == Notation::Auto { in_name } else { declared };
    let mut out = Evidence { notation: known, assumed: false, declared, order: Order::Unknown };
    let needed = texts.is_some() || in_name == Notation::Auto && columns.strike.is_some();
    let count = if needed { count(table, columns) } else { Count::default() };
    out.order = match (count.azimuth_first, count.inclination_first) {
        (1.., 0) => Order::AzimuthFirst,
        (0, 1..) => Order::InclinationFirst,
        _ => Order::Unknown,
    };
    if known == Notation::Auto {
        out.notation = if count.quadrants > 0 || 2 * count.letters > count.rows {
            Notation::Quadrant
        } else if texts.is_some() && 2 * count.arrows > count.rows
            || texts.is_none() && columns.strike.is_none() && columns.dip_direction.is_some()
        {
            Notation::DipDirection
        } else if texts.is_none() && columns.strike.is_none() && columns.trend.is_some() {
            Notation::TrendPlunge
        } else {
            out.assumed = columns.dip_direction.is_none();
            Notation::RightHand
        };
    }
    out
}

fn count(table: &Table, columns: &Columns) -> Count {
    const CHUNK: usize = 1 << 14;
    let rows = table.len();
    let text = |column: Option<usize>, row: usize| match column.map(|i| value(&table.fields[i].column, row)) {
        Some(Value::Text(text)) => Some(text),
        _ => None,
    };
    let filled =
        |column: Option<usize>, row| column.is_some_and(|i| value(&table.fields[i].column, row) != Value::Blank);
    // Letters are where a byte is one; "45d30m" has none of N, E, S, W.
    let lettered = |t: Option<&str>| {
        t.is_some_and(|t| t.bytes().any(|b| matches!(b, b'N' | b'E' | b'S' | b'W' | b'n' | b'e' | b's' | b'w')))
    };
    (0..rows.div_ceil(CHUNK))
        .into_par_iter()
        .map(|chunk| {
            let mut c = Count::default();
            for row in chunk * CHUNK..rows.min((chunk + 1) * CHUNK) {
                if let Some(t) = text(columns.attitude, row) {
                    let w = written_as(t);
                    c.rows += 1;
                    c.letters += usize::from(w.letters);
                    c.arrows += usize::from(w.arrow);
                    c.azimuth_first += usize::from(w.order == Order::AzimuthFirst);
                    c.inclination_first += usize::from(w.order == Order::InclinationFirst);
                } else if let Some((strike, _)) = columns.strike
                    && filled(Some(strike), row)
                {
                    c.rows += 1;
                    c.quadrants += usize::from(filled(columns.quadrant, row));
                    let (strike, dip) = (text(Some(strike), row), text(columns.dip, row));
                    c.letters += usize::from(
                        lettered(strike) && azimuth_has_letters(strike) || lettered(dip) && dip_has_letters(dip),
                    );
                }
            }
            c
        })
        .reduce(Count::default, |a, b| Count {
            rows: a.rows + b.rows,
            letters: a.letters + b.letters,
            quadrants: a.quadrants + b.quadrants,
            arrows: a.arrows + b.arrows,
            azimuth_first: a.azimuth_first + b.azimuth_first,
            inclination_first: a.inclination_first + b.inclination_first,
        })
}

fn azimuth_has_letters(text: Option<&str>) -> bool {
    text.is_some_and(|t| azimuth_cell(Quantity::Azimuth, t).is_ok_and(|a| a.letters))
}

fn dip_has_letters(text: Option<&str>) -> bool {
    text.is_some_and(|t| dip_cell(Quantity::Dip, t).is_ok_and(|d| d.side.is_some()))
}

/// What a row's attitude came to.
#[derive(Debug, Clone, Copy)]
pub(super) struct Row {
    pub reading: Reading,
    /// The column whose azimuth was taken back by a turn.
    pub wrapped: Option<usize>,
    /// A plane was read as right-hand only because nothing says otherwise.
    pub assumed: bool,
    /// A plane's rake was left aside.
    pub rake_unused: bool,
}

type Fault = (Option<usize>, RowFault);

fn at(column: Option<usize>) -> impl Fn(NotationError) -> Fault {
    move |e| (column, RowFault::Attitude(e))
}

struct Cells<'a> {
    table: &'a Table,
    row: usize,
}

impl<'a> Cells<'a> {
    fn value(&self, column: Option<usize>) -> Value<'a> {
        column.map_or(Value::Blank, |i| value(&self.table.fields[i].column, self.row))
    }
    /// An azimuth in [0, 360), whether it was wrapped, whether it was in letters; none for a blank.
    fn azimuth(&self, quantity: Quantity, column: Option<usize>) -> Result<Option<(f64, bool, bool)>, Fault> {
        let cell = match self.value(column) {
            Value::Blank => return Ok(None),
            Value::Number(degrees) => AzimuthCell { degrees, letters: false },
            Value::Text(text) => azimuth_cell(quantity, text).map_err(at(column))?,
        };
        let (degrees, wrapped) = azimuth(quantity, cell.degrees).map_err(at(column))?;
        Ok(Some((degrees, wrapped, cell.letters)))
    }
    fn dip(&self, quantity: Quantity, column: Option<usize>) -> Result<DipCell, Fault> {
        match self.value(column) {
            Value::Blank => Err(at(column)(NotationError::Missing(quantity))),
            Value::Number(degrees) => Ok(DipCell { degrees, side: None }),
            Value::Text(text) => dip_cell(quantity, text).map_err(at(column)),
        }
    }
}

/// Reads the attitude of a row as what its structure is.
pub(super) fn of_row(
    table: &Table,
    columns: &Columns,
    evidence: &Evidence,
    row: usize,
    wanted: Wanted,
) -> Result<Row, Fault> {
    let cells = Cells { table, row };
    if let Some(column) = columns.attitude {
        return text(&cells, column, evidence, wanted);
    }
    let raked = cells.value(columns.rake) != Value::Blank;
    if wanted == Wanted::Plane {
        let mut out = of_plane(&cells, columns, evidence)?;
        out.rake_unused = raked;
        return Ok(out);
    }
    let own_trend = cells.value(columns.trend) != Value::Blank;
    if raked && !own_trend {
        return of_rake(&cells, columns, evidence);
    }
    of_line(&cells, columns, wanted)
}

fn text(cells: &Cells<'_>, column: usize, evidence: &Evidence, wanted: Wanted) -> Result<Row, Fault> {
    let text = match cells.value(Some(column)) {
        Value::Text(text) => text,
        Value::Blank => return Err((Some(column), RowFault::NoAttitude)),
        Value::Number(v) => {
            return Err(at(Some(column))(NotationError::Unreadable(v.to_string())));
        }
    };
    // In auto each text speaks for itself first; what is left plain is read as the source shows.
    let written = written_as(text);
    let plain = !written.letters && !written.arrow;
    let notation = if plain { evidence.notation } else { evidence.declared };
    let reading = attitude(text, wanted, notation, evidence.order).map_err(at(Some(column)))?;
    Ok(Row {
        reading,
        wrapped: reading.wrapped.then_some(column),
        assumed: evidence.assumed && plain && wanted == Wanted::Plane,
        rake_unused: false,
    })
}

fn of_plane(cells: &Cells<'_>, columns: &Columns, evidence: &Evidence) -> Result<Row, Fault> {
    let strike_column = columns.strike.map(|(i, _)| i);
    if strike_column.is_none() && columns.dip_direction.is_none() {
        return Err(at(columns.trend)(NotationError::PlaneByTrend));
    }
    let dip_column = columns.dip.or(columns.plunge.filter(|_| columns.trend.is_none()));
    let dip_cell = cells.dip(Quantity::Dip, dip_column)?;
    let dip = inclination(Quantity::Dip, dip_cell.degrees).map_err(at(dip_column))?;
    let (side, side_column) = match (cells.value(columns.quadrant), dip_cell.side) {
        (Value::Blank, side) => (side, dip_column),
        (Value::Text(text), own) => {
            let side = point_cell(text).map_err(at(columns.quadrant))?;
            if let Some(own) = own.filter(|own| own.azimuth != side.azimuth) {
                let error = NotationError::Unreadable(format!("{} and {}", own.name, side.name));
                return Err(at(columns.quadrant)(error));
            }
            (Some(side), columns.quadrant)
        }
        (Value::Number(v), _) => return Err(at(columns.quadrant)(NotationError::CompassPoint(v.to_string()))),
    };
    let strike = cells.azimuth(Quantity::Strike, strike_column)?;
    let direction = cells.azimuth(Quantity::DipDirection, columns.dip_direction)?;
    let strike_notation = columns.strike.map_or(evidence.notation, |(_, notation)| notation);
    let wrapped = match (strike, direction) {
        (Some((_, true, _)), _) => strike_column,
        (_, Some((_, true, _))) => columns.dip_direction,
        _ => None,
    };
    let mut assumed = false;
    let (notation, azimuth, column) = match (strike, direction) {
        (Some((s, _, _)), Some((d, _, _))) => {
            let right = agree(strike_notation, s, d, dip).map_err(at(columns.dip_direction))?;
            (Notation::RightHand, Some(right), strike_column)
        }
        (None, Some((d, _, _))) => (Notation::DipDirection, Some(d), columns.dip_direction),
        (Some((s, _, letters)), None) => {
            let auto = strike_notation == Notation::Auto;
            // A side decides; letters without a side are either end of the strike line.
            let notation = match (auto, side.is_some() || letters) {
                (true, true) => Notation::Quadrant,
                (true, false) => evidence.notation,
                _ => strike_notation,
            };
            assumed = auto && evidence.assumed && notation == Notation::RightHand && dip.degrees() > 0.0;
            (notation, Some(s), strike_column)
        }
        (None, None) => (evidence.notation, None, strike_column.or(columns.dip_direction)),
    };
    let measured = plane(notation, azimuth, dip, side).map_err(|e| {
        at(if matches!(e, NotationError::QuadrantContradicts { .. }) { side_column } else { column })(e)
    })?;
    Ok(Row {
        reading: Reading { measured, wrapped: wrapped.is_some(), polarity: None },
        wrapped,
        assumed,
        rake_unused: false,
    })
}

fn of_rake(cells: &Cells<'_>, columns: &Columns, evidence: &Evidence) -> Result<Row, Fault> {
    let mut out = of_plane(cells, columns, evidence)?;
    let rake = match cells.value(columns.rake) {
        Value::Number(degrees) => DipCell { degrees, side: None },
        Value::Text(text) => rake_cell(text).map_err(at(columns.rake))?,
        Value::Blank => return Err(at(columns.rake)(NotationError::Missing(Quantity::Rake))),
    };
    out.reading.measured = line_from_rake(out.reading.measured, rake.degrees, rake.side).map_err(at(columns.rake))?;
    Ok(out)
}

fn of_line(cells: &Cells<'_>, columns: &Columns, wanted: Wanted) -> Result<Row, Fault> {
    // Lines share the planes' columns unless they have their own.
    let trend_column = columns.trend.or(columns.strike.map(|(i, _)| i)).or(columns.dip_direction);
    let plunge_column = columns.plunge.or(columns.dip);
    let cell = cells.dip(Quantity::Plunge, plunge_column)?;
    if let Some(side) = cell.side {
        return Err(at(plunge_column)(NotationError::NotANumber {
            quantity: Quantity::Plunge,
            text: format!("{} {}", cell.degrees, side.name),
        }));
    }
    let (plunge, up) = match wanted {
        Wanted::DirectedLine => plunge_with_sense(cell.degrees),
        _ => inclination(Quantity::Plunge, cell.degrees).map(|p| (p, false)),
    }
    .map_err(at(plunge_column))?;
    let trend = cells.azimuth(Quantity::Trend, trend_column)?;
    let wrapped = trend.filter(|t| t.1).and(trend_column);
    let lower = trend.map(|(t, _, _)| if up { (t + 180.0) % 360.0 } else { t });
    let measured: Measured = line(lower, plunge).map_err(at(trend_column))?;
    let polarity =
        (wanted == Wanted::DirectedLine).then_some(if up { Polarity::Overturned } else { Polarity::Upright });
    Ok(Row {
        reading: Reading { measured, wrapped: wrapped.is_some(), polarity },
        wrapped,
        assumed: false,
        rake_unused: false,
    })
}

/// Whether a row fills only the columns of planes (true) or only those of lines (false); none where it does neither.
pub(super) fn fills_plane(table: &Table, columns: &Columns, row: usize) -> Option<bool> {
    let filled = |column: Option<usize>| column.is_some_and(|i| value(&table.fields[i].column, row) != Value::Blank);
    let line = filled(columns.trend);
    let plane = filled(columns.strike.map(|(i, _)| i)) || filled(columns.dip_direction);
    (line != plane).then_some(plane)
}
