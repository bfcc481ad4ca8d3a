//! The plan: an area file checked against what the job needs, with every path resolved.

use super::area_file::{AreaFile, ColumnOrValue, NumberOrText, StationsSection, StructureName};
use super::area_keys::nearest;
use super::fabric_plan::FabricPlan;
use super::one_or_many::OneOrMany;
use super::paths::Located;
use super::{AreaFileError, JobError};
use crate::domain::SameName;
use crate::input::{ColumnSpec, DeclinationSpec, NorthReference, StationSpec, StructureSpec};
use crate::notice::{Notice, Place};
use crate::orientation::notation::Notation;
use crate::station::Kind;
use std::collections::BTreeMap;
use std::path::{Path, PathBuf};

/// What the command line says over the area file; its paths are relative to the working folder.
#[derive(Debug, Clone, Default)]
pub struct Overrides {
    /// Station files instead of the area file's.
    pub stations: Vec<String>,
    /// Domain polygons.
    pub polygons: Option<String>,
    /// Fault lines.
    pub faults: Option<String>,
    /// Grow the domains from the readings.
    pub clusters: bool,
    /// Output folder.
    pub out: Option<PathBuf>,
    /// Seed.
    pub seed: Option<u64>,
}

/// How the domains are to be made.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum DomainPlan {
    /// One for the whole area.
    Single,
    /// The user's polygons.
    Polygons { source: Located, name: Option<String>, same_name: SameName },
}

/// A job that can be run. Exists only after everything that can be checked without reading data was.
#[derive(Debug, Clone)]
pub struct Plan {
    pub(super) title: String,
    pub(super) seed: u64,
    pub(super) crs: Option<String>,
    pub(super) sources: Vec<(Located, StationSpec)>,
    pub(super) domains: DomainPlan,
    pub(super) outline: Option<Located>,
    /// A station outside every polygon joins the nearest within this many metres.
    pub(super) nearest: f64,
    /// The area file as messages name it.
    pub(super) label: String,
    /// What is worth saying before anything is read.
    pub(super) notices: Vec<Notice>,
    pub(super) fabric: FabricPlan,
    pub(super) folder: PathBuf,
    /// The options as used, for the record.
    pub(super) options: AreaFile,
    /// The area file as typed, for the record.
    pub(super) text: Option<String>,
}

/// Reads the area file, if any, applies what the command line says, and checks the whole.
pub fn plan(area: Option<&Path>, overrides: &Overrides) -> Result<Plan, JobError> {
    let (mut options, base, label, text) = match area {
        Some(path) => {
            let (options, text) = AreaFile::read(path)?;
            let base = path.parent().unwrap_or(Path::new("")).to_owned();
            (options, base, path.display().to_string(), Some(text))
        }
        None if overrides.stations.is_empty() => return Err(JobError::NothingToDo),
        None => (AreaFile::default(), PathBuf::new(), "the command line".to_owned(), None),
    };
    let here = Path::new("");
    let mut notices = Vec::new();
    let from_command_line = !overrides.stations.is_empty();
    if from_command_line {
        notices.extend(replace_files(&mut options.stations, &overrides.stations));
    }
    let mut polygons_base = base.as_path();
    if let Some(polygons) = &overrides.polygons {
        options.domains.polygons = Some(polygons.clone());
        polygons_base = here;
    }
    if let Some(faults) = &overrides.faults {
        options.domains.faults = Some(faults.clone());
    }
    if overrides.clusters {
        options.domains.method = Some("clusters".into());
    }
    if let Some(seed) = overrides.seed {
        options.area.seed = seed;
    }
    let check = Checker { file: &label };
    check.ranges(&options)?;
    check.not_yet(&options)?;
    let sources = check.sources(&options, if from_command_line { here } else { &base })?;
    let domains = check.domains(&mut options, polygons_base)?;
    notices.extend(unused(&options));
    notices.extend(same_twice(&sources));
    let folder = overrides.out.clone().unwrap_or_else(|| base.join(&options.output.folder));
    let title = options.area.name.clone().unwrap_or_else(|| {
        area.and_then(Path::file_stem).map_or_else(|| "area".into(), |stem| stem.to_string_lossy().into_owned())
    });
    Ok(Plan {
        title,
        seed: options.area.seed,
        crs: options.area.crs.clone(),
        sources,
        domains,
        nearest: options.domains.nearest_m,
        notices,
        outline: options.domains.outline.as_deref().map(|o| Located::new(o, &base)),
        fabric: FabricPlan::new(&label, &options)?,
        folder,
        label,
        options,
        text,
    })
}

/// Source spelling to structure.
type Spellings = BTreeMap<String, String>;
/// Kinds of the user's own structures.
type Kinds = BTreeMap<String, Kind>;

/// Puts the command line's files in place of the area file's; everything else that the sections say stays, where it
/// is plain which section is meant.
fn replace_files(stations: &mut OneOrMany<StationsSection>, files: &[String]) -> Option<Notice> {
    let typed: Vec<StationsSection> = stations.iter().cloned().collect();
    let like = |section: &StationsSection, file: &String| StationsSection {
        file: file.clone(),
        layer: None,
        ..section.clone()
    };
    let (sections, notice) = match typed.as_slice() {
        [one] => (files.iter().map(|f| like(one, f)).collect(), None),
        many if many.len() == files.len() => (many.iter().zip(files).map(|(s, f)| like(s, f)).collect(), None),
        many => {
            let plain = StationsSection::default();
            let message = format!(
                "--stations names {} files for the {} [[stations]] of the area file: their north, notation, columns and CRS are not used",
                files.len(),
                many.len()
            );
            let notice = Notice::warning("stations-settings-dropped", Place::default(), message);
            (files.iter().map(|f| like(&plain, f)).collect(), (!many.is_empty()).then_some(notice))
        }
    };
    *stations = OneOrMany::Many(sections);
    notice
}

/// Settings that have no effect as the rest stands.
fn unused(options: &AreaFile) -> Vec<Notice> {
    let (domains, default) = (&options.domains, AreaFile::default());
    let is_polygons = domains.method.as_deref() == Some("polygons");
    let cases = [
        (domains.polygons.is_some() && !is_polygons, "domains.polygons", "domains.method is not \"polygons\""),
        (domains.faults.is_some(), "domains.faults", "faults are not used with this domains.method"),
        (domains.outline.is_some() && is_polygons, "domains.outline", "the polygons are the domains"),
        (
            domains.nearest_m > 0.0 && !is_polygons && domains.outline.is_none(),
            "domains.nearest_m",
            "there is no polygon to be near",
        ),
        (options.symbols != default.symbols, "[symbols]", "this version does not thin symbols yet"),
        (options.compare != default.compare, "[compare]", "this version does not compare domains yet"),
    ];
    let said = cases.into_iter().filter(|(is_unused, ..)| *is_unused);
    said.map(|(_, key, why)| Notice::info("setting-unused", Place::default(), format!("{key} has no effect: {why}")))
        .collect()
}

/// Two sources that are one file read in one way: every reading would count twice.
fn same_twice(sources: &[(Located, StationSpec)]) -> Vec<Notice> {
    let twice = |i: usize| sources[..i].iter().any(|s| *s == sources[i]);
    let message = "is named twice with the same settings: each of its readings counts twice";
    (0..sources.len())
        .filter(|&i| twice(i))
        .map(|i| Notice::warning("source-twice", Place::file(&sources[i].0.named), message))
        .collect()
}

struct Checker<'a> {
    file: &'a str,
}

impl Checker<'_> {
    fn value(&self, key: &str, value: impl ToString, message: impl Into<String>) -> JobError {
        AreaFileError::value(self.file, key, value, message).into()
    }

    fn one_of(&self, key: &str, value: &str, known: &[&str]) -> Result<(), JobError> {
        if known.contains(&value) {
            Ok(())
        } else {
            Err(self.value(key, format!("\"{value}\""), choices(value, known)))
        }
    }

    fn ranges(&self, options: &AreaFile) -> Result<(), JobError> {
        let within = |key: &str, value: f64, low: f64, high: f64| {
            let fits = value.is_finite() && (low..=high).contains(&value);
            if fits { Ok(()) } else { Err(self.value(key, value, format!("must lie between {low} and {high}"))) }
        };
        within("fabric.confidence", options.fabric.confidence, 0.5, 0.999)?;
        within("fabric.max_weight", options.fabric.max_weight, 1.0, 1e6)?;
        within("compare.level", options.compare.level, 0.0, 1.0)?;
        within("domains.nearest_m", options.domains.nearest_m, 0.0, 1e9)?;
        within("symbols.scale", options.symbols.scale, 1.0, 1e9)?;
        within("symbols.spacing_mm", options.symbols.spacing_mm, 0.0, 1000.0)?;
        let exposures = ["none", "map", "scanline", "plane", "column"];
        self.one_of("fabric.terzaghi", &options.fabric.terzaghi, &exposures)?;
        if options.output.formats.is_empty() {
            return Err(self.value("output.formats", "[]", "must name at least \"gpkg\""));
        }
        for format in &options.output.formats {
            self.one_of("output.formats", format, &["gpkg"])?;
        }
        Ok(())
    }

    /// What the area file may ask for one day and this version cannot do: an error beats a silent omission.
    fn not_yet(&self, options: &AreaFile) -> Result<(), JobError> {
        let cannot =
            |key: &str, value: &str| Err(self.value(key, format!("\"{value}\""), "this version cannot do that yet"));
        match options.domains.method.as_deref() {
            Some(method @ ("clusters" | "fault-blocks")) => cannot("domains.method", method),
            _ => Ok(()),
        }
    }

    fn domains(&self, options: &mut AreaFile, base: &Path) -> Result<DomainPlan, JobError> {
        let section = &mut options.domains;
        let default = if section.polygons.is_some() { "polygons" } else { "single" };
        let method = section.method.get_or_insert_with(|| default.into()).clone();
        self.one_of("domains.method", &method, &["polygons", "fault-blocks", "clusters", "single"])?;
        self.one_of("domains.same_name", &section.same_name, &["refuse", "merge"])?;
        if method == "single" {
            return Ok(DomainPlan::Single);
        }
        let Some(polygons) = &section.polygons else {
            let message = "domains.method is \"polygons\" but domains.polygons names no file".to_owned();
            return Err(AreaFileError::Missing { file: self.file.to_owned(), message }.into());
        };
        Ok(DomainPlan::Polygons {
            source: Located::new(polygons, base),
            name: section.name.clone(),
            same_name: if section.same_name == "merge" { SameName::Merge } else { SameName::Refuse },
        })
    }

    fn sources(&self, options: &AreaFile, base: &Path) -> Result<Vec<(Located, StationSpec)>, JobError> {
        let mut sources = Vec::new();
        let (structures, kinds) = self.structures(options)?;
        for section in options.stations.iter() {
            if section.file.is_empty() {
                let message = "a [stations] table names no file; set stations.file".to_owned();
                return Err(AreaFileError::Missing { file: self.file.to_owned(), message }.into());
            }
            let mut source = Located::new(&section.file, base);
            source.layer = section.layer.clone().or(source.layer);
            let spec = StationSpec {
                structures: structures.clone(),
                kinds: kinds.clone(),
                directed: options.fabric.directed.iter().cloned().collect(),
                ..self.spec(section, &source.named)?
            };
            sources.push((source, spec));
        }
        if sources.is_empty() {
            let message = "names no stations; add a [stations] table with file = \"…\"".to_owned();
            return Err(AreaFileError::Missing { file: self.file.to_owned(), message }.into());
        }
        Ok(sources)
    }

    fn structures(&self, options: &AreaFile) -> Result<(Spellings, Kinds), JobError> {
        let mut names = BTreeMap::new();
        let mut kinds = BTreeMap::new();
        for (spelling, meaning) in &options.structures {
            match meaning {
                StructureName::Name(name) => {
                    names.insert(spelling.clone(), name.clone());
                }
                StructureName::Own { name, kind } => {
                    self.one_of(&format!("structures.{spelling}.kind"), kind, &["planar", "linear"])?;
                    names.insert(spelling.clone(), name.clone());
                    kinds.insert(name.clone(), if kind == "planar" { Kind::Planar } else { Kind::Linear });
                }
            }
        }
        Ok((names, kinds))
    }

    fn spec(&self, section: &StationsSection, named: &str) -> Result<StationSpec, JobError> {
        let north = match section.north.as_deref() {
            None => None,
            Some("true") => Some(NorthReference::True),
            Some("grid") => Some(NorthReference::Grid),
            Some("magnetic") => Some(NorthReference::Magnetic),
            Some(other) => {
                let message = choices(other, &["true", "grid", "magnetic"]);
                return Err(self.value("stations.north", format!("\"{other}\""), message));
            }
        };
        let declination = match &section.declination {
            None => section.columns.declination.clone().map(DeclinationSpec::Column),
            Some(NumberOrText::Number(degrees)) if degrees.is_finite() && degrees.abs() <= 180.0 => {
                Some(DeclinationSpec::Constant(*degrees))
            }
            Some(NumberOrText::Number(degrees)) => {
                return Err(self.value("stations.declination", degrees, "must lie between -180 and 180 degrees"));
            }
            Some(NumberOrText::Text(text)) if text == "model" => Some(DeclinationSpec::Model),
            Some(NumberOrText::Text(column)) => Some(DeclinationSpec::Column(column.clone())),
        };
        let notation = match section.notation.as_deref() {
            None => Notation::Auto,
            Some(word) => Notation::from_word(word).ok_or_else(|| {
                self.value(
                    "stations.notation",
                    format!("\"{word}\""),
                    choices(word, &Notation::ALL.map(Notation::word)),
                )
            })?,
        };
        let columns = &section.columns;
        Ok(StationSpec {
            file: named.to_owned(),
            crs: section.crs.clone(),
            north,
            declination,
            date: section.date.as_ref().map(|d| d.text()),
            notation,
            columns: ColumnSpec {
                id: columns.id.clone(),
                x: columns.x.clone(),
                y: columns.y.clone(),
                z: columns.z.clone(),
                date: columns.date.clone(),
                structure: columns.structure.as_ref().map(|s| match s {
                    ColumnOrValue::Column(column) => StructureSpec::Column(column.clone()),
                    ColumnOrValue::Value { value } => StructureSpec::Value(value.clone()),
                }),
                azimuth: columns.azimuth.clone(),
                dip: columns.dip.clone(),
                dip_quadrant: columns.dip_quadrant.clone(),
                attitude: columns.attitude.clone(),
                rake: columns.rake.clone(),
                polarity: columns.polarity.clone(),
                weight: columns.weight.clone(),
                declination: columns.declination.clone(),
                ..ColumnSpec::default()
            },
            ..StationSpec::default()
        })
    }
}

/// "one of a, b, c; did you mean b?"
fn choices(value: &str, known: &[&str]) -> String {
    let meant = nearest(value, known).map(|k| format!("; did you mean \"{k}\"?")).unwrap_or_default();
    format!("must be one of {}{meant}", known.join(", "))
}
