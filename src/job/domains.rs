//! The domains of a job: the user's polygons or the whole area, read, put on the map and checked.

use super::area_error::AreaFileError;
use super::error::JobError;
use super::gather::read;
use super::ground::Ground;
use super::paths::Located;
use super::plan::{DomainPlan, Plan};
use crate::crs::{MapCrs, Transformer};
use crate::domain::{self, Domains, Method, NamedPolygon, Reach};
use crate::format;
use crate::notice::{Notice, Place, Progress};
use crate::station::Readings;
use crate::table::{Cell, Shapes, Table};
use geo::{BooleanOps, MultiPolygon};
use geo_types::Geometry;

/// Each reading's domain, or none.
pub(super) fn domains(
    plan: &Plan,
    readings: &Readings,
    map: &MapCrs,
    ground: &Ground,
    notices: &mut Vec<Notice>,
    progress: &dyn Progress,
) -> Result<Domains, JobError> {
    let reach = Reach { metres: plan.nearest, map_units: plan.nearest / ground.metres };
    if plan.nearest > 0.0 && !map.is_projected() {
        let message = "needs a map in metres: set area.crs to a projected CRS";
        return Err(AreaFileError::value(&plan.label, "domains.nearest_m", plan.nearest, message).into());
    }
    match &plan.domains {
        DomainPlan::Single => {
            let Some(located) = &plan.outline else {
                let domains = domain::single(&plan.title, readings);
                if domains.list[0].shape.0.is_empty() {
                    let message = "the stations lie on one line or at one place: the domain has no area to draw";
                    notices.push(Notice::warning("domain-without-area", Place::default(), message));
                }
                return Ok(domains);
            };
            let whole = NamedPolygon { name: plan.title.clone(), shape: outline(located, map, notices, progress)? };
            let (domains, more) = domain::by_polygons(Method::Single, vec![whole], readings, reach);
            notices.extend(more);
            Ok(domains)
        }
        DomainPlan::Polygons { source, name, same_name } => {
            let (table, shapes) = shapes(source, map, notices, progress)?;
            let names = names(&table, &source.named, name.as_deref(), notices)?;
            let features =
                feature_ids(&table).zip(names).zip(shapes).map(|((id, name), shape)| (id, name, shape)).collect();
            let (polygons, more) = domain::clean(&source.named, features, *same_name, &format::is_valid_polygon)?;
            notices.extend(more);
            progress.begin("assigning domains", None);
            let (domains, more) = domain::by_polygons(Method::Polygons, polygons, readings, reach);
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
            return Err(JobError::OffTheMap { file: file(), feature, from: from.label(), crs: map.label() });
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
            AreaFileError::value(
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
    let mut names: Vec<String> = (0..table.len())
        .map(|i| {
            let cell = position.map_or(Cell::Null, |p| table.fields[p].column.cell(i));
            match cell {
                Cell::Null => String::new(),
                Cell::Text(t) => t.trim().to_owned(),
                Cell::Integer(v) => v.to_string(),
                Cell::Real(v) => v.to_string(),
                Cell::Boolean(v) => v.to_string(),
            }
        })
        .collect();
    let nameless = names.iter().filter(|n| n.is_empty()).count();
    if nameless > 0 && position.is_some() {
        let message = format!("polygons without a name: {nameless}; they are called \"unnamed 1\", \"unnamed 2\" …");
        notices.push(Notice::warning("domain-without-name", Place::file(file), message));
    }
    let word = if position.is_some() { "unnamed" } else { "domain" };
    let mut number = 0;
    for name in names.iter_mut().filter(|n| n.is_empty()) {
        number += 1;
        *name = format!("{word} {number}");
    }
    Ok(names)
}

fn outline(
    located: &Located,
    map: &MapCrs,
    notices: &mut Vec<Notice>,
    progress: &dyn Progress,
) -> Result<MultiPolygon<f64>, JobError> {
    let (table, shapes) = shapes(located, map, notices, progress)?;
    let features = feature_ids(&table).zip(shapes).map(|(id, shape)| (id, format!("outline {id}"), shape)).collect();
    let (parts, more) = domain::clean(&located.named, features, domain::SameName::Merge, &format::is_valid_polygon)?;
    notices.extend(more);
    let empty = MultiPolygon::new(Vec::new());
    Ok(parts.into_iter().fold(empty, |whole, part| whole.union(&part.shape)))
}
