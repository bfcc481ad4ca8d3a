//! The run: gather, summarise, make the layers, write them.

use super::error::JobError;
use super::gather::{Gathered, gather};
use super::outputs::Staging;
use super::plan::{DomainPlan, Plan};
use super::statistics::describe;
use super::summary::{AllCounts, RunRecord, Summary};
use super::{message_of, provenance};
use crate::format::gpkg::{self, GeometryKind, LayerToWrite, Metadata, Package, Style};
use crate::layer::{self, PlacedFabric, PlacedSet, Results};
use crate::notice::{Notice, Progress, Refusal};
use crate::style::{self, Turning};
use crate::table::{Column, Table};
use std::path::PathBuf;

/// What a run did.
pub struct Outcome {
    /// How many rows were read, kept and refused.
    pub counts: AllCounts,
    /// What is worth saying.
    pub notices: Vec<Notice>,
    /// The rows that were not used.
    pub refusals: Vec<Refusal>,
    /// The fabrics, for printing.
    pub fabrics: Vec<FabricLine>,
    /// The files written.
    pub written: Vec<PathBuf>,
}

/// One fabric, ready for a line of text.
pub struct FabricLine {
    /// Name of the domain.
    pub domain: String,
    /// The statistics, with their structure.
    pub placed: PlacedFabric,
    /// Its orientation sets, where there are several.
    pub sets: Vec<PlacedSet>,
}

/// Time stamp of the GeoPackage's contents: fixed, so that the same input writes the same bytes.
const NO_TIME: &str = "1970-01-01T00:00:00.000Z";
/// The record of a run is our own JSON; the URI of the format stands for it.
const RECORD_URI: &str = "https://www.rfc-editor.org/rfc/rfc8259";
/// The area file's format.
const TOML_URI: &str = "https://toml.io/en/v1.0.0";
/// Files written besides the styles.
const TARGETS: [&str; 2] = ["area.gpkg", "summary.json"];

/// Does the whole job.
pub fn run(plan: &Plan, progress: &dyn Progress) -> Result<Outcome, JobError> {
    let style_files = style::files();
    let mut targets = TARGETS.to_vec();
    let style_names: Vec<String> = style_files.iter().map(|(name, _)| format!("styles/{name}")).collect();
    targets.extend(style_names.iter().map(String::as_str));
    let mut staging = Staging::prepare(&plan.folder, &targets, &inputs(plan))?;

    let Gathered { map, ground, readings, tables, domains, refusals, mut notices, counts } = gather(plan, progress)?;
    let statistics = describe(plan, &readings, &tables, &domains, &map, ground.metres, progress);
    notices.extend(statistics.notices);
    let fabrics = statistics.fabrics;
    let results = Results {
        readings: &readings,
        sources: &tables,
        domains: &domains,
        fabrics: &fabrics,
        folds: &statistics.folds,
        sets: &statistics.sets,
        set_of: &statistics.set_of,
        refusals: &refusals,
        crs: map.code_or_wkt(),
        geographic: !map.is_projected(),
        metres: ground.metres,
    };
    progress.begin("making layers", None);
    let layers: Vec<_> = layer::ALL.iter().map(|layer| (layer.table)(&results)).collect();
    progress.end();
    drop(tables);

    let record = record(plan, map.code_or_wkt(), &counts, &notices)?;
    let package = Package {
        crs: map.code_or_wkt().to_owned(),
        layers: layer::ALL.iter().zip(&layers).map(|(layer, table)| to_write(layer, table)).collect(),
        metadata: metadata(plan, &record),
        styles: layers.iter().filter_map(style_of).collect(),
        last_change: NO_TIME.to_owned(),
    };
    gpkg::write(&staging.path("area.gpkg")?, &package, progress)?;
    staging.write("summary.json", |file| {
        serde_json::to_writer(&mut *file, &Summary { run: &record, layers: &layers })?;
        file.write_all(b"\n")
    })?;
    for ((_, text), name) in style_files.iter().zip(&style_names) {
        staging.write(name, |file| file.write_all(text.as_bytes()))?;
    }
    let written = staging.commit()?;
    let line = |placed: PlacedFabric| {
        let own = |s: &&PlacedSet| s.domain == placed.domain && s.structure == placed.structure;
        let sets = statistics.sets.iter().filter(own).cloned().collect();
        FabricLine { domain: domains.list[placed.domain].name.clone(), placed, sets }
    };
    Ok(Outcome { counts, notices, refusals, fabrics: fabrics.into_iter().map(line).collect(), written })
}

/// Every file that the run reads, which no output may replace.
fn inputs(plan: &Plan) -> Vec<PathBuf> {
    sources(plan).into_iter().flat_map(|(source, _)| provenance::files_of(&source.location)).collect()
}

fn sources(plan: &Plan) -> Vec<(&super::paths::Located, &'static str)> {
    let mut sources: Vec<_> = plan.sources.iter().map(|(source, _)| (source, "stations")).collect();
    if let DomainPlan::Polygons { source, .. } = &plan.domains {
        sources.push((source, "polygons"));
    }
    sources.extend(plan.outline.iter().map(|outline| (outline, "outline")));
    sources
}

fn record(plan: &Plan, crs: &str, counts: &AllCounts, notices: &[Notice]) -> Result<RunRecord, JobError> {
    let mut inputs = Vec::new();
    for (source, role) in sources(plan) {
        let hashed = provenance::record(&source.named, &source.location, role);
        inputs.extend(hashed.map_err(|cause| JobError::Unreadable { file: source.named.clone(), cause })?);
    }
    Ok(RunRecord {
        version: env!("CARGO_PKG_VERSION"),
        name: plan.title.clone(),
        seed: plan.seed,
        crs: crs.to_owned(),
        inputs,
        options: serde_json::to_value(&plan.options).unwrap_or_default(),
        counts: counts.clone(),
        messages: notices.iter().map(message_of).collect(),
    })
}

/// The record of the run, and the area file as typed, inside the GeoPackage.
fn metadata(plan: &Plan, record: &RunRecord) -> Vec<Metadata> {
    let json = serde_json::to_string(record).unwrap_or_default();
    let mut list = vec![Metadata { standard_uri: RECORD_URI.into(), mime_type: "application/json".into(), text: json }];
    list.extend(plan.text.clone().map(|text| Metadata {
        standard_uri: TOML_URI.into(),
        mime_type: "application/toml".into(),
        text,
    }));
    list
}

fn to_write<'a>(layer: &layer::Layer, table: &'a Table) -> LayerToWrite<'a> {
    LayerToWrite {
        table,
        geometry: match layer.geometry {
            layer::Geometry::Point => GeometryKind::Point,
            layer::Geometry::MultiPolygon => GeometryKind::MultiPolygon,
            layer::Geometry::None => GeometryKind::None,
        },
        title: layer.title.to_owned(),
        description: layer.description.to_owned(),
    }
}

/// The style stored beside a layer, with the symbols that occur in it.
fn style_of(table: &Table) -> Option<Style> {
    let mut codes: Vec<&str> = match table.column("symbol") {
        Some(Column::Word(codes)) => codes.words().collect(),
        _ => Vec::new(),
    };
    codes.sort_unstable();
    Some(Style {
        layer: table.name.clone(),
        name: table.name.clone(),
        qml: style::qml(&table.name, &codes)?,
        sld: if table.name == "orientations" { style::sld(Turning::Clockwise) } else { String::new() },
        description: if codes.is_empty() {
            "Areas with their names"
        } else {
            "Symbols after FGDC-STD-013-2006, turned by rotation_grid"
        }
        .to_owned(),
        default: true,
    })
}
