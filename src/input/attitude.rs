//! The attitude of a row from its columns.

use super::choose::Columns;
use super::row::RowFault;
use super::value::{Value, value};
use crate::orientation::notation::{
    AzimuthCell, DipCell, Notation, NotationError, Order, Quantity, Reading, STRIKE_TOLERANCE, Wanted, agree, attitude,
    azimuth, azimuth_cell, dip_cell, inclination, line, line_from_rake, plane, plunge_with_sense, point_cell,
    rake_cell, shown, written_as,
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
    /// The hand of a strike alone, where all rows with strike and dip direction agree on it.
    pub hand: Option<Notation>,
}

#[derive(Debug, Clone, Copy, Default)]
struct Count {
    rows: usize,
    letters: usize,
    quadrants: usize,
    arrows: usize,
    azimuth_first: usize,
    inclination_first: usize,
    right: usize,
    left: usize,
}

/// Looks through the attitude columns once.
///
/// Auto becomes: quadrant where a dip quadrant column holds anything, or more than half of the filled rows have compass
/// letters beside their numbers; dip-direction where the only
/// azimuth is a dip direction by name, or where more than half of the texts have an arrow; trend-plunge where only
/// a trend is there; the hand on which all rows with both a strike and a dip direction agree; right-hand otherwise, which is said in a notice when a plane is read by it.
pub(super) fn evidence(table: &Table, columns: &Columns, declared: Notation) -> Evidence {
    let texts = columns.attitude;
    let in_name = columns.strike.map(|(_, notation)| notation).unwrap_or(declared);
    let known = if declared == Notation::Auto { in_name } else { declared };
    let mut out = Evidence { notation: known, assumed: false, declared, order: Order::Unknown, hand: None };
    let needed = texts.is_some() || in_name == Notation::Auto && columns.strike.is_some();
    let count = if needed { count(table, columns) } else { Count::default() };
    out.order = match (count.azimuth_first, count.inclination_first) {
        (1.., 0) => Order::AzimuthFirst,
        (0, 1..) => Order::InclinationFirst,
        _ => Order::Unknown,
    };
    if known == Notation::Auto {
        out.hand = match (count.right, count.left) {
            (1.., 0) => Some(Notation::RightHand),
            (0, 1..) => Some(Notation::LeftHand),
            _ => None,
        };
        out.notation = if count.quadrants > 0 || 2 * count.letters > count.rows {
            Notation::Quadrant
        } else if texts.is_some() && 2 * count.arrows > count.rows
            || texts.is_none() && columns.strike.is_none() && columns.dip_direction.is_some()
        {
            Notation::DipDirection
        } else if texts.is_none() && columns.strike.is_none() && columns.trend.is_some() {
            Notation::TrendPlunge
        } else {
            out.assumed = out.hand.is_none();
            out.hand.unwrap_or(Notation::RightHand)
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
                    match hand_shown(table, columns, row) {
                        Some(Notation::LeftHand) => c.left += 1,
                        Some(_) => c.right += 1,
                        None => {}
                    }
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
            right: a.right + b.right,
            left: a.left + b.left,
        })
}

/// The hand of a strike, where the row's dip direction shows it.
fn hand_shown(table: &Table, columns: &Columns, row: usize) -> Option<Notation> {
    let cells = Cells { table, row };
    let (strike, _, letters) = cells.azimuth(Quantity::Strike, columns.strike.map(|(i, _)| i)).ok()??;
    let (direction, ..) = cells.azimuth(Quantity::DipDirection, columns.dip_direction).ok()??;
    let dip = cells.dip(Quantity::Dip, columns.dip).ok()?;
    let dip = inclination(Quantity::Dip, dip.degrees).ok()?;
    hand(strike, direction, dip.degrees()).filter(|_| !letters)
}

/// The hand of a strike beside a dip direction; none where the plane is flat or upright, or they contradict.
fn hand(strike: f64, direction: f64, dip: f64) -> Option<Notation> {
    let off = (direction - strike).rem_euclid(360.0);
    match dip > 0.0 && dip < 90.0 {
        true if (off - 90.0).abs() <= STRIKE_TOLERANCE => Some(Notation::RightHand),
        true if (off - 270.0).abs() <= STRIKE_TOLERANCE => Some(Notation::LeftHand),
        _ => None,
    }
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
    /// What else is to be counted about the row.
    pub also: Also,
}

/// What is worth a notice about a row that was read.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Also {
    /// A plane's rake was left aside.
    pub rake_unused: bool,
    /// The line was made from a rake.
    pub raked: bool,
    /// The row was read as a plane and its trend and plunge left aside.
    pub line_unused: Option<usize>,
    /// The row was read as a line and its strike or dip direction left aside.
    pub plane_unused: Option<usize>,
    /// The hand of the strike, where nobody said it and the row's dip direction shows it.
    pub hand: Option<Notation>,
    /// A strike alone was read by the hand that other rows show.
    pub followed: bool,
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
    fn filled(&self, column: usize) -> bool {
        self.value(Some(column)) != Value::Blank
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
        out.also.rake_unused = raked;
        out.also.line_unused = columns.trend.filter(|&i| cells.filled(i));
        return Ok(out);
    }
    let own_trend = cells.value(columns.trend) != Value::Blank;
    if raked && !own_trend {
        return of_rake(&cells, columns, evidence);
    }
    let mut out = of_line(&cells, columns, wanted)?;
    if own_trend {
        let strike = columns.strike.map(|(i, _)| i);
        let mut others = [strike, columns.dip_direction].into_iter().flatten().filter(|&i| Some(i) != columns.trend);
        out.also.plane_unused = others.find(|&i| cells.filled(i));
    }
    Ok(out)
}

fn text(cells: &Cells<'_>, column: usize, evidence: &Evidence, wanted: Wanted) -> Result<Row, Fault> {
    let text = match cells.value(Some(column)) {
        Value::Text(text) => text,
        Value::Blank => return Err((Some(column), RowFault::NoAttitude)),
        Value::Number(v) => {
            return Err(at(Some(column))(NotationError::Unreadable(shown(v))));
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
        also: Also::default(),
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
        (Value::Number(v), _) => return Err(at(columns.quadrant)(NotationError::CompassPoint(shown(v)))),
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
    let mut also = Also::default();
    let (notation, azimuth, column) = match (strike, direction) {
        (Some((s, _, letters)), Some((d, _, _))) => {
            also.hand = hand(s, d, dip.degrees()).filter(|_| strike_notation == Notation::Auto && !letters);
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
            also.followed = auto && evidence.hand == Some(notation) && dip.degrees() > 0.0;
            assumed = auto && evidence.assumed && notation == Notation::RightHand && dip.degrees() > 0.0;
            (notation, Some(s), strike_column)
        }
        (None, None) => (evidence.notation, None, strike_column.or(columns.dip_direction)),
    };
    let measured = plane(notation, azimuth, dip, side).map_err(|e| {
        at(if matches!(e, NotationError::QuadrantContradicts { .. }) { side_column } else { column })(e)
    })?;
    Ok(Row { reading: Reading { measured, wrapped: wrapped.is_some(), polarity: None }, wrapped, assumed, also })
}

fn of_rake(cells: &Cells<'_>, columns: &Columns, evidence: &Evidence) -> Result<Row, Fault> {
    let mut out = of_plane(cells, columns, evidence)?;
    let rake = match cells.value(columns.rake) {
        Value::Number(degrees) => DipCell { degrees, side: None },
        Value::Text(text) => rake_cell(text).map_err(at(columns.rake))?,
        Value::Blank => return Err(at(columns.rake)(NotationError::Missing(Quantity::Rake))),
    };
    out.also.raked = true;
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
        also: Also::default(),
    })
}

/// Whether a row fills only the columns of planes (true) or only those of lines (false); none where it does neither.
pub(super) fn fills_plane(table: &Table, columns: &Columns, row: usize) -> Option<bool> {
    let filled = |column: Option<usize>| column.is_some_and(|i| value(&table.fields[i].column, row) != Value::Blank);
    let line = filled(columns.trend);
    let plane = filled(columns.strike.map(|(i, _)| i)) || filled(columns.dip_direction);
    (line != plane).then_some(plane)
}
