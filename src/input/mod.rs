//! From a table as found to readings: which column is what, how the attitude is written, which rows can be used.
//!
//! Invariant: every row of the table ends as one measurement or one refusal, in source order, whatever the number of
//! threads; what was guessed on the way stands in a notice.

mod attitude;
mod checks;
mod choose;
mod dates;
mod duplicates;
mod error;
mod names;
mod place;
mod positions;
mod row;
mod rows;
mod spec;
mod structures;
mod tallies;
mod value;

pub use choose::UsedColumn;
pub use error::{InputError, InputFault};
pub use spec::{ColumnSpec, DeclinationSpec, NorthReference, StationSpec, StructureSpec};

use self::row::LOOKS_SWAPPED;
use crate::notice::{Notice, Place, Refusal};
use crate::orientation::notation::Notation;
use crate::station::{Declination, Measurements, North};
use crate::table::Table;

/// What a table of stations gave.
#[derive(Debug, Clone, PartialEq)]
pub struct InputReadings {
    /// The accepted rows.
    pub measurements: Measurements,
    /// The others: `measurements` and `refusals` together are all rows of the table.
    pub refusals: Vec<Refusal>,
    /// What was assumed, and what to look at.
    pub notices: Vec<Notice>,
    /// Which column was read as what.
    pub columns: Vec<UsedColumn>,
    /// How plain azimuths of planes were read; never [`Notation::Auto`].
    pub notation: Notation,
}

/// Reads a table of stations.
///
/// Columns that `spec` does not name are guessed from common spellings. An error means that the table as a whole cannot
/// be read (no position, no attitude, no structure, no CRS, two columns equally good for one meaning); a row that
/// cannot be read is a refusal. All angles are degrees.
pub fn readings(table: &Table, spec: &StationSpec) -> Result<InputReadings, InputError> {
    let fail = |fault| InputError { file: spec.file.clone(), fault };
    let mut notices = Vec::new();
    let mut columns = choose::columns(table, spec, &mut notices).map_err(fail)?;
    let crs = place::crs(table, spec, &columns, &mut notices).map_err(fail)?;
    if place::is_geographic(&crs) {
        columns.position = columns.position.in_degrees();
    }
    let north = north(spec, &columns, &mut notices).map_err(fail)?;
    let dates = match north {
        North::Magnetic(Declination::Model) => {
            Some(dates::Dates::new(table, columns.date, spec.date.as_deref()).map_err(fail)?)
        }
        _ => None,
    };
    let evidence = attitude::evidence(table, &columns, spec.notation);
    let structures = structures::resolve(table, spec, &columns, &mut notices).map_err(fail)?;
    let job = rows::Job { table, spec, columns: &columns, north: &north, dates, evidence, structures: &structures };
    let (measurements, refusals) = rows::read(&job, crs, &mut notices);
    swapped(&refusals, &measurements).map_err(fail)?;
    positions::report(&measurements, &spec.file, &mut notices);
    duplicates::report(&measurements, &spec.file, &mut notices);
    Ok(InputReadings { measurements, refusals, notices, columns: columns.used, notation: evidence.notation })
}

/// An error where most rows have a latitude that can only be a longitude.
fn swapped(refusals: &[Refusal], kept: &Measurements) -> Result<(), InputFault> {
    let mut found = refusals.iter().filter(|r| r.code == LOOKS_SWAPPED);
    let Some(first) = found.next() else { return Ok(()) };
    let (swapped, rows) = (1 + found.count(), refusals.len() + kept.position.len());
    if swapped * 2 <= rows {
        return Ok(());
    }
    Err(InputFault::Swapped { swapped, rows, row: first.row, reason: first.reason.clone() })
}

fn north(spec: &StationSpec, columns: &choose::Columns, notices: &mut Vec<Notice>) -> Result<North, InputFault> {
    Ok(match spec.north {
        None => {
            notices.push(
                Notice::info("north-assumed", Place::file(&spec.file), "azimuths were read as counted from true north")
                    .hint("say north = \"true\", \"grid\" or \"magnetic\""),
            );
            North::True
        }
        Some(NorthReference::True) => North::True,
        Some(NorthReference::Grid) => North::Grid,
        Some(NorthReference::Magnetic) => North::Magnetic(match &spec.declination {
            Some(DeclinationSpec::Constant(d)) if !d.is_finite() || d.abs() > 180.0 => {
                return Err(InputFault::DeclinationRange(*d));
            }
            Some(DeclinationSpec::Constant(d)) => Declination::Constant(*d),
            Some(DeclinationSpec::Model) => Declination::Model,
            Some(DeclinationSpec::Column(_)) => Declination::PerReading,
            None if columns.declination.is_some() => Declination::PerReading,
            None => return Err(InputFault::NoDeclination),
        }),
    })
}
