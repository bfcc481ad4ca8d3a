//! Everything that is read and settled before statistics: what `check` looks at and `run` goes on with.

use super::error::JobError;
use super::paths::Located;
use super::plan::{DomainPlan, Plan};
use super::summary::{AllCounts, Counts};
use crate::crs::{self, MapCrs, Transformer};
use crate::domain::{self, Domains};
use crate::format::{self, ReadTable, Source};
use crate::input;
use crate::notice::{Notice, Place, Progress, Refusal};
use crate::station::Readings;
use crate::table::{Cell, Shapes, Table};
use geo::{BooleanOps, MultiPolygon};
use geo_types::Geometry;

/// Readings on the map in their domains, and all that was said on the way.
pub(super) struct Gathered {
    pub map: MapCrs,
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

/// Reads and validates everything that a run would, and writes nothing.
pub fn check(plan: &Plan, progress: &dyn Progress) -> Result<Checked, JobError> {
    let Gathered { refusals, notices, counts, .. } = gather(plan, progress)?;
    Ok(Checked { refusals, notices, counts })
}

pub(super) fn gather(plan: &Plan, progress: &dyn Progress) -> Result<Gathered, JobError> {
    let (mut tables, mut measurements, mut refusals, mut notices) = (Vec::new(), Vec::new(), Vec::new(), Vec::new());
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
        let first = refusals.first().map_or_else(|| "there was no row".to_owned(), |r| r.reason.clone());
        return Err(JobError::NothingLeft { refused: counts.total.refused, first });
    }
    let domains = domains(plan, &readings, &map, &mut notices, progress)?;
    // Rows of one source stand together, in the order of the file.
    let order = |r: &Refusal| plan.sources.iter().position(|(l, _)| l.named == r.source);
    refusals.sort_by_key(|r| (order(r), r.row));
    Ok(Gathered { map, readings, tables, domains, refusals, notices, counts })
}

fn read(located: &Located, progress: &dyn Progress) -> Result<ReadTable, JobError> {
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

fn domains(
    plan: &Plan,
    readings: &Readings,
    map: &MapCrs,
    notices: &mut Vec<Notice>,
    progress: &dyn Progress,
) -> Result<Domains, JobError> {
    match &plan.domains {
        DomainPlan::Single => {
            let outline = match &plan.outline {
                Some(located) => Some(outline(located, map, notices, progress)?),
                None => None,
            };
            Ok(domain::single(&plan.title, readings, outline))
        }
        DomainPlan::Polygons { source, name, same_name, nearest } => {
            let (table, shapes) = shapes(source, map, notices, progress)?;
            let names = names(&table, &source.named, name.as_deref(), notices)?;
            let features =
                feature_ids(&table).zip(names).zip(shapes).map(|((id, name), shape)| (id, name, shape)).collect();
            let (polygons, more) = domain::clean(&source.named, features, *same_name)?;
            notices.extend(more);
            progress.begin("assigning domains", None);
            // The distance is in metres, the map's unit may be feet, or degrees of some 111 km.
            let metres = map.unit_in_metres().unwrap_or(111_195.0);
            let (domains, more) = domain::by_polygons(polygons, readings, nearest / metres);
            progress.end();
            notices.extend(more);
            Ok(domains)
        }
    }
}

/// A source's shapes in map coordinates, one per row.
type MapShapes = Vec<Option<Geometry<f64>>>;

/// A polygon source's table, with its shapes on the map.
fn shapes(
    located: &Located,
    map: &MapCrs,
    notices: &mut Vec<Notice>,
    progress: &dyn Progress,
) -> Result<(Table, MapShapes), JobError> {
    let read = read(located, progress)?;
    notices.extend(read.notices);
    notices.extend(
        read.refused
            .iter()
            .map(|r| Notice::warning(r.code, Place::file(&r.source).at_row(r.row), format!("left out: {}", r.reason))),
    );
    let mut table = read.table;
    let file = || located.named.clone();
    let definition = table.crs.clone().ok_or_else(|| JobError::NoCrs { file: file() })?;
    let from = MapCrs::parse(&definition).map_err(|cause| cause.in_source(&located.named))?;
    let transformer = Transformer::new(&from, map).map_err(|cause| cause.in_source(&located.named))?;
    let mut shapes = match std::mem::replace(&mut table.shapes, Shapes::None) {
        Shapes::None => vec![None; table.len()],
        Shapes::Points(points) => points.into_iter().map(|c| Some(Geometry::Point(c.into()))).collect(),
        Shapes::Any(shapes) => shapes,
    };
    for (shape, feature) in shapes.iter_mut().zip(feature_ids(&table)) {
        if shape.as_mut().is_some_and(|s| transformer.geometry(s) > 0) {
            return Err(JobError::OffTheMap { file: file(), feature, crs: map.label() });
        }
    }
    Ok((table, shapes))
}

fn feature_ids(table: &Table) -> impl Iterator<Item = u64> + '_ {
    (0..table.len()).map(|i| table.rows.get(i).copied().unwrap_or(i as u64))
}

/// Column names that usually hold a domain's name, most likely first.
const NAME_COLUMNS: [&str; 8] = ["domain", "name", "block", "domain_name", "label", "title", "unit", "id"];

fn names(table: &Table, file: &str, column: Option<&str>, notices: &mut Vec<Notice>) -> Result<Vec<String>, JobError> {
    let position = match column {
        Some(name) => Some(table.position(name).ok_or_else(|| {
            let known = table.fields.iter().map(|f| f.name.as_str()).collect::<Vec<_>>().join(", ");
            super::AreaFileError::value(
                file,
                "domains.name",
                format!("\"{name}\""),
                format!("there is no such column; there are: {known}"),
            )
        })?),
        None => NAME_COLUMNS.iter().find_map(|name| table.position(name)),
    };
    let guessed = match (column, position) {
        (Some(_), _) => None,
        (None, Some(i)) => Some(format!("domains are named by column \"{}\"", table.fields[i].name)),
        (None, None) => Some("no column looks like the domains' names; they are numbered in file order".to_owned()),
    };
    if let Some(message) = guessed {
        let notice = Notice::info("domain-names-guessed", Place::file(file), message);
        notices.push(notice.hint("domains.name sets the column"));
    }
    Ok((0..table.len())
        .map(|i| {
            let cell = position.map_or(Cell::Null, |p| table.fields[p].column.cell(i));
            let text = match cell {
                Cell::Null => String::new(),
                Cell::Text(t) => t.trim().to_owned(),
                Cell::Integer(v) => v.to_string(),
                Cell::Real(v) => v.to_string(),
                Cell::Boolean(v) => v.to_string(),
            };
            if text.is_empty() { format!("domain {}", i + 1) } else { text }
        })
        .collect())
}

fn outline(
    located: &Located,
    map: &MapCrs,
    notices: &mut Vec<Notice>,
    progress: &dyn Progress,
) -> Result<MultiPolygon<f64>, JobError> {
    let (table, shapes) = shapes(located, map, notices, progress)?;
    let features = feature_ids(&table).zip(shapes).map(|(id, shape)| (id, format!("outline {id}"), shape)).collect();
    let (parts, more) = domain::clean(&located.named, features, domain::SameName::Merge)?;
    notices.extend(more);
    let empty = MultiPolygon::new(Vec::new());
    Ok(parts.into_iter().fold(empty, |whole, part| whole.union(&part.shape)))
}
