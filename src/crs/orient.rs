//! Readings onto the map: positions into the map CRS, azimuths to true north and to the grid.

use super::definition::MapCrs;
use super::error::CrsError;
use super::source::{Settled, Source};
use super::tally::Tally;
use super::transform::CHUNK;
use crate::notice::{Notice, Progress, Refusal};
use crate::station::{Measurements, Readings, Structure};
use rayon::prelude::*;
use std::collections::BTreeSet;

/// Rows settled before their results are put in order: bounds the memory that intermediate results take.
const BLOCK: usize = 16 * CHUNK;

/// Readings that are on the map, and what happened on the way.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Oriented {
    /// Readings in order: sources as given, rows as in each.
    pub readings: Readings,
    /// Rows that have no place or no north, in the same order.
    pub refusals: Vec<Refusal>,
    /// What to know: source by source, then the map.
    pub notices: Vec<Notice>,
}

/// Puts every reading on the map. Azimuths become true: from grid north by the convergence of the source's
/// own CRS, from magnetic north by the declination. A horizontal plane without azimuth needs no north.
/// The result does not depend on the number of threads.
///
/// # Errors
/// A CRS that cannot be used, an azimuth reference that a source cannot have, or a source whose x and y are
/// exchanged; each names its source. A single row that cannot be settled is refused instead.
pub fn orient(sources: Vec<Measurements>, map: &MapCrs, progress: &dyn Progress) -> Result<Oriented, CrsError> {
    if map.points_west_and_south() {
        return Err(CrsError::AxesReversed { crs: map.label() });
    }
    let rows: usize = sources.iter().map(|s| s.position.len()).sum();
    progress.begin("orienting", Some(rows as u64));
    let structures: BTreeSet<&Structure> = sources.iter().flat_map(|s| &s.structures).collect();
    let structures: Vec<Structure> = structures.into_iter().cloned().collect();
    let mut oriented = Oriented::default();
    oriented.readings.structures = structures;
    let mut whole = Tally::default();
    for measurements in &sources {
        let tally = one_source(measurements, map, progress, &mut oriented)
            .map_err(|cause| cause.in_source(&measurements.source))?;
        whole.join(&tally);
    }
    oriented.notices.extend(whole.map_notices(map));
    progress.end();
    Ok(oriented)
}

fn one_source(
    measurements: &Measurements,
    map: &MapCrs,
    progress: &dyn Progress,
    oriented: &mut Oriented,
) -> Result<Tally, CrsError> {
    let source = Source::new(measurements, map)?;
    let index = oriented.readings.sources.len() as u16;
    oriented.readings.sources.push(measurements.source.clone());
    let place_of = |s: &Structure| oriented.readings.structures.iter().position(|known| known == s).unwrap_or(0) as u16;
    let structure: Vec<u16> = measurements.structures.iter().map(place_of).collect();

    let mut tally = Tally::default();
    let n = measurements.position.len();
    for start in (0..n).step_by(BLOCK) {
        let chunks: Vec<usize> = (start..n.min(start + BLOCK)).step_by(CHUNK).collect();
        let settled: Vec<Vec<_>> = chunks
            .into_par_iter()
            .map(|from| {
                let rows = from..n.min(from + CHUNK);
                let settled = source.settle(rows.clone());
                progress.advance(rows.len() as u64);
                settled
            })
            .collect();
        for (row, outcome) in (start..).zip(settled.into_iter().flatten()) {
            tally.count(measurements.source_row[row], &outcome);
            match outcome.settled {
                Ok(s) => append(&mut oriented.readings, measurements, row, index, &structure, s),
                Err(refused) => oriented.refusals.push(Refusal {
                    source: measurements.source.clone(),
                    row: measurements.source_row[row],
                    column: None,
                    value: Some(refused.value),
                    code: refused.code,
                    reason: refused.reason,
                }),
            }
        }
    }
    if tally.misplaced * 2 > n {
        source.exchanged()?;
    }
    oriented.notices.extend(source.datum_notice());
    oriented.notices.extend(tally.source_notices(measurements, &source.label(), map));
    Ok(tally)
}

fn append(to: &mut Readings, from: &Measurements, row: usize, source: u16, structure: &[u16], settled: Settled) {
    to.source.push(source);
    to.table_row.push(from.table_row[row]);
    to.source_row.push(from.source_row[row]);
    to.station_id.push(from.station_id.get(row));
    to.position.push(settled.position);
    to.structure.push(structure[usize::from(from.structure[row])]);
    to.attitude.push(settled.attitude);
    to.grid_azimuth.push(settled.grid_azimuth);
    to.polarity.push(from.polarity[row]);
    to.weight.push(from.weight[row]);
    to.declination.push(settled.declination);
    to.convergence.push(settled.convergence);
}
