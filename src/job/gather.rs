//! Everything that is read and settled before statistics: what `check` looks at and `run` goes on with.

use super::domains::domains;
use super::error::JobError;
use super::ground::Ground;
use super::paths::Located;
use super::plan::Plan;
use super::summary::{AllCounts, Counts};
use crate::crs::{self, MapCrs};
use crate::domain::Domains;
use crate::format::{self, ReadTable, Source};
use crate::input;
use crate::notice::{Notice, Progress, Refusal};
use crate::station::{Measurements, Readings};
use crate::table::Table;

/// Readings on the map in their domains, and all that was said on the way.
pub(super) struct Gathered {
    pub map: MapCrs,
    pub ground: Ground,
    pub readings: Readings,
    /// The source tables, as [`Readings::source`] numbers them.
    pub tables: Vec<Table>,
    pub domains: Domains,
    pub refusals: Vec<Refusal>,
    pub notices: Vec<Notice>,
    pub counts: AllCounts,
}

/// What `check` found.
#[derive(Debug)]
pub struct Checked {
    /// Every refused row.
    pub refusals: Vec<Refusal>,
    /// Everything else worth saying.
    pub notices: Vec<Notice>,
    /// How many rows were read, and would be kept and refused.
    pub counts: AllCounts,
}

impl Checked {
    /// Why nothing is left, when nothing is.
    pub(super) fn why(&self) -> String {
        let Some(first) = self.refusals.first() else { return ": there was no row".to_owned() };
        let column = first.column.as_ref().map(|c| format!(", column \"{c}\"")).unwrap_or_default();
        let (source, row, reason) = (&first.source, first.row, &first.reason);
        format!(
            ": all {} rows were refused, the first ({source}, row {row}{column}) because: {reason}",
            self.counts.total.refused
        )
    }
}

/// Reads and validates everything that a run would, and writes nothing.
pub fn check(plan: &Plan, progress: &dyn Progress) -> Result<Checked, JobError> {
    let Gathered { refusals, notices, counts, .. } = gather(plan, progress)?;
    Ok(Checked { refusals, notices, counts })
}

pub(super) fn gather(plan: &Plan, progress: &dyn Progress) -> Result<Gathered, JobError> {
    let (mut tables, mut measurements, mut refusals) = (Vec::new(), Vec::new(), Vec::new());
    let mut notices = plan.notices.clone();
    let mut counts = AllCounts::default();
    for (located, spec) in &plan.sources {
        let read = read(located, progress)?;
        counts.by_source.entry(located.named.clone()).or_default().read += read.read;
        refusals.extend(read.refused);
        notices.extend(read.notices);
        let understood = input::readings(&read.table, spec)?;
        refusals.extend(understood.refusals);
        notices.extend(understood.notices);
        measurements.push(understood.measurements);
        tables.push(read.table);
    }
    if measurements.iter().all(|m: &Measurements| m.position.is_empty()) {
        tally(&mut counts, &Readings::default(), &refusals);
        return Err(JobError::NothingLeft(Box::new(Checked { refusals, notices, counts })));
    }
    let map = match &plan.crs {
        Some(definition) => MapCrs::parse(definition)?,
        None => {
            let (map, notice) = crs::default_map_crs(&measurements)?;
            notices.push(notice);
            map
        }
    };
    let oriented = crs::orient(measurements, &map, progress)?;
    refusals.extend(oriented.refusals);
    notices.extend(oriented.notices);
    let readings = oriented.readings;
    tally(&mut counts, &readings, &refusals);
    if readings.is_empty() {
        return Err(JobError::NothingLeft(Box::new(Checked { refusals, notices, counts })));
    }
    let ground = Ground::of(&map, &readings.position);
    notices.extend(ground.notice());
    let domains = domains(plan, &readings, &map, &ground, &mut notices, progress)?;
    // Rows of one source stand together, in the order of the file.
    let order = |r: &Refusal| plan.sources.iter().position(|(l, _)| l.named == r.source);
    refusals.sort_by_key(|r| (order(r), r.row));
    Ok(Gathered { map, ground, readings, tables, domains, refusals, notices, counts })
}

pub(super) fn read(located: &Located, progress: &dyn Progress) -> Result<ReadTable, JobError> {
    let source = Source {
        path: located.named.clone(),
        location: located.location.display().to_string(),
        layer: located.layer.clone(),
    };
    Ok(format::read(&source, progress)?)
}

fn tally(counts: &mut AllCounts, readings: &Readings, refusals: &[Refusal]) {
    let mut kept = vec![0_u64; readings.sources.len()];
    readings.source.iter().for_each(|&s| kept[s as usize] += 1);
    for (name, kept) in readings.sources.iter().zip(kept) {
        counts.by_source.entry(name.clone()).or_default().kept += kept;
    }
    for refusal in refusals {
        counts.by_source.entry(refusal.source.clone()).or_default().refused += 1;
        *counts.refused_by_code.entry(refusal.code.to_owned()).or_default() += 1;
    }
    for c in counts.by_source.values() {
        debug_assert_eq!(c.read, c.kept + c.refused, "every row is kept or refused");
        let t = &mut counts.total;
        *t = Counts { read: t.read + c.read, kept: t.kept + c.kept, refused: t.refused + c.refused };
    }
}
