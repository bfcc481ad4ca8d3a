//! All rows of a source, by chunks on all cores, in source order.

use super::attitude::{self, Evidence};
use super::choose::Columns;
use super::dates::{Dates, When};
use super::place;
use super::row::{HEAVIEST, RowFault};
use super::spec::StationSpec;
use super::structures::{Resolved, Structures};
use super::tallies::{Tallies, Tally, report};
use super::value::{NoNumber, Value, normal, number, value, written};
use crate::crs::{calendar, has_model};
use crate::notice::{Notice, Refusal};
use crate::orientation::notation::{Wanted, polarity};
use crate::orientation::{Measured, Polarity};
use crate::station::{Declination, Measurements, North};
use crate::table::{Cell, Table, TextColumn};
use geo_types::Coord;
use rayon::prelude::*;
use std::fmt::Write;

/// Rows per piece of work: enough to be worth a thread, few enough to share out evenly.
const CHUNK: usize = 1 << 14;

/// All that reading a row needs to know.
pub(super) struct Job<'a> {
    pub table: &'a Table,
    pub spec: &'a StationSpec,
    pub columns: &'a Columns,
    pub north: &'a North,
    pub dates: Option<Dates>,
    pub evidence: Evidence,
    pub structures: &'a Structures,
}

/// One accepted row.
struct Accepted {
    position: Coord<f64>,
    elevation: f32,
    structure: u16,
    measured: Measured,
    polarity: Polarity,
    weight: f64,
    declination: f64,
    year: f64,
}

type Fault = (Option<usize>, RowFault);

#[derive(Default)]
struct Piece {
    rows: Vec<u32>,
    accepted: Vec<Accepted>,
    refused: Vec<Refusal>,
    tallies: Tallies,
}

/// What U, O, 0 and 1 mean in the polarity column, where that is plain.
#[derive(Debug, Clone, Copy, Default)]
struct Letters {
    /// O stands beside U: upright and overturned.
    u_and_o: bool,
    /// The column is called overturned, so yes means overturned and no upright.
    flag: bool,
}

impl Job<'_> {
    fn letters(&self) -> Letters {
        let Some(i) = self.columns.polarity else { return Letters::default() };
        let field = &self.table.fields[i];
        let is = |row: usize, want: &str| matches!(value(&field.column, row), Value::Text(t) if t.eq_ignore_ascii_case(want));
        let u_and_o = (0..self.table.len()).any(|row| is(row, "o")) && (0..self.table.len()).any(|row| is(row, "u"));
        Letters { u_and_o, flag: matches!(normal(&field.name).as_str(), "overturned" | "inverted") }
    }

    fn number(&self, column: usize, row: usize) -> Result<Option<f64>, Fault> {
        number(value(&self.table.fields[column].column, row), self.table.decimal_comma).map_err(|e| match e {
            NoNumber::Text => (Some(column), RowFault::NotANumber),
            NoNumber::NotFinite => (Some(column), RowFault::NotFinite),
        })
    }

    /// The structure of a row and how to read its attitude.
    fn structure(&self, row: usize) -> Result<(u16, Wanted, Resolved), Fault> {
        let column = self.structures.column();
        let (resolved, spelling) = match self.structures.constant() {
            Some(resolved) => (resolved, ""),
            None => {
                let Some(spelling) = self.structures.spelling(self.table, row) else {
                    return Err((column, RowFault::NoStructure));
                };
                (self.structures.get(spelling), spelling)
            }
        };
        let line = if resolved.directed { Wanted::DirectedLine } else { Wanted::Line };
        let choice = match (resolved.planar, resolved.linear) {
            (Some(p), None) => Some((p, Wanted::Plane)),
            (None, Some(l)) => Some((l, line)),
            (Some(p), Some(l)) => attitude::fills_plane(self.table, self.columns, row)
                .map(|plane| if plane { (p, Wanted::Plane) } else { (l, line) }),
            (None, None) => None,
        };
        match choice {
            Some((index, wanted)) => Ok((index, wanted, resolved)),
            None => {
                let name = match &self.columns.structure {
                    super::choose::StructureSource::Value(value) => value.trim(),
                    _ => spelling,
                };
                Err((column, RowFault::UnknownKind(Box::new(self.structures.unknown(name)))))
            }
        }
    }

    fn polarity(&self, row: usize, letters: Letters, tally: &mut Tally) -> Option<Polarity> {
        let i = self.columns.polarity?;
        let unclear = |tally: &mut Tally| {
            tally.add(row, Some(i));
            None
        };
        match value(&self.table.fields[i].column, row) {
            Value::Blank => None,
            Value::Number(v) if letters.flag && (v == 0.0 || v == 1.0) => {
                Some(if v == 1.0 { Polarity::Overturned } else { Polarity::Upright })
            }
            Value::Number(_) => unclear(tally),
            Value::Text(t)
                if letters.flag && ["1", "yes", "y", "true", "t"].iter().any(|w| t.eq_ignore_ascii_case(w)) =>
            {
                Some(Polarity::Overturned)
            }
            Value::Text(t)
                if letters.flag && ["0", "no", "n", "false", "f"].iter().any(|w| t.eq_ignore_ascii_case(w)) =>
            {
                Some(Polarity::Upright)
            }
            Value::Text(t) if letters.u_and_o && t.eq_ignore_ascii_case("u") => Some(Polarity::Upright),
            Value::Text(t) if letters.u_and_o && t.eq_ignore_ascii_case("o") => Some(Polarity::Overturned),
            Value::Text(t) => match polarity(t) {
                Ok(Polarity::Unknown) => None,
                Ok(known) => Some(known),
                Err(_) => unclear(tally),
            },
        }
    }

    fn row(&self, row: usize, letters: Letters, tallies: &mut Tallies) -> Result<Accepted, Fault> {
        let columns = self.columns;
        let position = place::position(self.table, columns, row)?;
        let (structure, wanted, resolved) = self.structure(row)?;
        let found = attitude::of_row(self.table, columns, &self.evidence, row, wanted)?;
        let weight = match columns.weight {
            None => 1.0,
            Some(column) => match self.number(column, row)? {
                None => 1.0,
                Some(w) if w > 0.0 && w <= HEAVIEST => w,
                Some(w) => return Err((Some(column), RowFault::Weight(w))),
            },
        };
        let declination = match (self.north, columns.declination) {
            (North::Magnetic(Declination::PerReading), Some(column)) => match self.number(column, row)? {
                None => return Err((Some(column), RowFault::NoDeclination)),
                Some(d) if d.abs() <= 180.0 => d,
                Some(d) => return Err((Some(column), RowFault::Declination(d))),
            },
            _ => 0.0,
        };
        let when = match self.dates {
            Some(dates) => {
                let when = dates.of_row(self.table, row)?;
                // What has no azimuth needs no declination.
                if found.reading.measured.bearing().is_some() && !has_model(when.year) {
                    return Err((columns.date, RowFault::DateOutsideModels { date: calendar(when.year) }));
                }
                when
            }
            None => When { year: 0.0, year_only: false },
        };
        let elevation = match columns.z {
            None => 0.0,
            Some(column) => match self.number(column, row)? {
                None => 0.0,
                Some(z) if (-12_000.0..=9_000.0).contains(&z) => z as f32,
                Some(z) => return Err((Some(column), RowFault::Elevation(z))),
            },
        };
        // From here on the row is accepted: only now may it count.
        if let Some(column) = found.wrapped {
            tallies.wrapped.add(row, Some(column));
            let just_a_turn = match value(&self.table.fields[column].column, row) {
                Value::Number(v) => v == 360.0,
                Value::Text(t) => t.parse() == Ok(360.0),
                Value::Blank => false,
            };
            tallies.over += usize::from(!just_a_turn);
        }
        if found.assumed {
            tallies.assumed.add(row, None);
        }
        if when.year_only {
            tallies.year_only.add(row, columns.date);
        }
        tallies.also(row, &found.also, columns);
        let polarity = match (wanted, found.reading.polarity) {
            (Wanted::DirectedLine, Some(sense)) => sense,
            (_, told) => {
                let column = self.polarity(row, letters, &mut tallies.polarity);
                let words = resolved.overturned.then_some(Polarity::Overturned);
                column.or(told).or(words).unwrap_or_default()
            }
        };
        let measured = found.reading.measured;
        Ok(Accepted { position, elevation, structure, measured, polarity, weight, declination, year: when.year })
    }

    pub fn source_row(&self, row: usize) -> u64 {
        self.table.rows.get(row).copied().unwrap_or(row as u64 + 1)
    }

    fn refusal(&self, row: usize, (column, fault): Fault) -> Refusal {
        let field = column.map(|i| &self.table.fields[i]);
        let value = field.and_then(|f| written(&f.column, row));
        Refusal {
            source: self.spec.file.clone(),
            row: self.source_row(row),
            column: field.map(|f| f.name.clone()),
            code: fault.code(),
            reason: fault.reason(field.map(|f| f.name.as_str()), value.as_deref()),
            value,
        }
    }

    fn piece(&self, chunk: usize, letters: Letters) -> Piece {
        let rows = chunk * CHUNK..self.table.len().min((chunk + 1) * CHUNK);
        let mut piece = Piece::default();
        piece.rows.reserve(rows.len());
        piece.accepted.reserve(rows.len());
        for row in rows {
            match self.row(row, letters, &mut piece.tallies) {
                Ok(accepted) => {
                    piece.rows.push(row as u32);
                    piece.accepted.push(accepted);
                }
                Err(fault) => piece.refused.push(self.refusal(row, fault)),
            }
        }
        piece
    }
}

/// Reads all rows.
pub(super) fn read(job: &Job<'_>, crs: String, notices: &mut Vec<Notice>) -> (Measurements, Vec<Refusal>) {
    let letters = job.letters();
    let pieces: Vec<Piece> =
        (0..job.table.len().div_ceil(CHUNK)).into_par_iter().map(|chunk| job.piece(chunk, letters)).collect();
    let kept = pieces.iter().map(|p| p.accepted.len()).sum();
    let per_reading = matches!(job.north, North::Magnetic(Declination::PerReading));
    let by_model = matches!(job.north, North::Magnetic(Declination::Model));
    let some = |yes: bool| Vec::with_capacity(if yes { kept } else { 0 });
    let mut out = Measurements {
        source: job.spec.file.clone(),
        crs,
        north: job.north.clone(),
        structures: job.structures.list.clone(),
        table_row: Vec::with_capacity(kept),
        source_row: Vec::with_capacity(kept),
        station_id: TextColumn::default(),
        position: Vec::with_capacity(kept),
        elevation: Vec::with_capacity(kept),
        structure: Vec::with_capacity(kept),
        measured: Vec::with_capacity(kept),
        polarity: Vec::with_capacity(kept),
        weight: Vec::with_capacity(kept),
        declination: some(per_reading),
        year: some(by_model),
    };
    let mut refused = Vec::new();
    let mut tallies = Tallies::default();
    let mut id = String::new();
    for piece in pieces {
        for (row, a) in piece.rows.into_iter().zip(piece.accepted) {
            out.table_row.push(row);
            out.source_row.push(job.source_row(row as usize));
            push_id(&mut out.station_id, job, row as usize, &mut id);
            out.position.push(a.position);
            out.elevation.push(a.elevation);
            out.structure.push(a.structure);
            out.measured.push(a.measured);
            out.polarity.push(a.polarity);
            out.weight.push(a.weight);
            if per_reading {
                out.declination.push(a.declination);
            }
            if by_model {
                out.year.push(a.year);
            }
        }
        refused.extend(piece.refused);
        tallies.merge(piece.tallies);
    }
    report(job, &tallies, notices);
    (out, refused)
}

fn push_id(ids: &mut TextColumn, job: &Job<'_>, row: usize, text: &mut String) {
    text.clear();
    let told = match job.columns.id.map_or(Cell::Null, |i| job.table.fields[i].column.cell(row)) {
        Cell::Null => Ok(()),
        Cell::Text(t) => return ids.push(Some(t.trim()).filter(|t| !t.is_empty())),
        Cell::Real(v) => write!(text, "{v}"),
        Cell::Integer(v) => write!(text, "{v}"),
        Cell::Boolean(v) => write!(text, "{v}"),
    };
    ids.push(told.ok().map(|()| text.as_str()).filter(|t| !t.is_empty()));
}
