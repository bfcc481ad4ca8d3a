//! The area file as the user typed it: every key of `area.toml`, typed, with its default.
//!
//! Relative paths are relative to the area file. Unknown keys are errors that suggest the nearest known key.

use super::area_error::AreaFileError;
use super::area_keys::first_unknown;
use super::one_or_many::OneOrMany;
use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;
use std::path::Path;

/// The whole file.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, Default)]
#[serde(deny_unknown_fields, default)]
pub struct AreaFile {
    /// `[area]`
    pub area: AreaSection,
    /// `[stations]` or `[[stations]]`
    pub stations: OneOrMany<StationsSection>,
    /// `[structures]`: source spelling → structure
    pub structures: BTreeMap<String, StructureName>,
    /// `[domains]`
    pub domains: DomainsSection,
    /// `[fabric]`
    pub fabric: FabricSection,
    /// `[compare]`
    pub compare: CompareSection,
    /// `[symbols]`
    pub symbols: SymbolsSection,
    /// `[output]`
    pub output: OutputSection,
}

/// `[area]`
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields, default)]
pub struct AreaSection {
    /// Title.
    pub name: Option<String>,
    /// CRS of every output layer.
    pub crs: Option<String>,
    /// Seed of every random step.
    pub seed: u64,
}

impl Default for AreaSection {
    fn default() -> Self {
        Self { name: None, crs: None, seed: 1 }
    }
}

/// `[stations]`
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, Default)]
#[serde(deny_unknown_fields, default)]
pub struct StationsSection {
    /// Path or GDAL source.
    pub file: String,
    /// Layer of a source with several.
    pub layer: Option<String>,
    /// CRS, where the file does not say.
    pub crs: Option<String>,
    /// `true`, `grid` or `magnetic`.
    pub north: Option<String>,
    /// Degrees east, `"model"`, or a column.
    pub declination: Option<NumberOrText>,
    /// Date of the readings, for the model.
    pub date: Option<DateValue>,
    /// How the attitude columns are to be read.
    pub notation: Option<String>,
    /// `[stations.columns]`
    pub columns: ColumnsSection,
}

/// A number or a text.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(untagged, expecting = "expected a number or a text")]
pub enum NumberOrText {
    /// A number.
    Number(f64),
    /// A text.
    Text(String),
}

/// A date, written as a TOML date or as text.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(untagged, expecting = "expected a date, as 2024-06-01")]
pub enum DateValue {
    /// `2024-06-01`
    Date(toml::value::Datetime),
    /// `"2024-06-01"`
    Text(String),
}

impl DateValue {
    /// The date as text.
    pub fn text(&self) -> String {
        match self {
            Self::Date(date) => date.to_string(),
            Self::Text(text) => text.clone(),
        }
    }
}

/// `[stations.columns]`: each names a source column; what is absent is guessed and reported.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, Default)]
#[serde(deny_unknown_fields, default)]
#[allow(missing_docs)] // the keys are the columns they name
pub struct ColumnsSection {
    pub id: Option<String>,
    pub x: Option<String>,
    pub y: Option<String>,
    pub z: Option<String>,
    pub date: Option<String>,
    pub structure: Option<ColumnOrValue>,
    pub azimuth: Option<String>,
    pub dip: Option<String>,
    pub dip_quadrant: Option<String>,
    pub attitude: Option<String>,
    pub rake: Option<String>,
    pub polarity: Option<String>,
    pub weight: Option<String>,
    pub declination: Option<String>,
    pub exposure: Option<String>,
}

/// A column, or one value for every row.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(untagged, expecting = "expected a column name, or { value = \"bedding\" } for every row")]
pub enum ColumnOrValue {
    /// `structure = "column"`
    Column(String),
    /// `structure = { value = "bedding" }`
    Value {
        /// The value of every row.
        value: String,
    },
}

/// What a source spelling stands for.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(
    untagged,
    expecting = "expected a structure name, or { name = \"banding\", kind = \"planar\" } for one of your own"
)]
pub enum StructureName {
    /// `S0 = "bedding"`
    Name(String),
    /// `Sx = { name = "banding", kind = "planar" }`, for structures of one's own
    Own {
        /// Name in the layers.
        name: String,
        /// `planar` or `linear`.
        kind: String,
    },
}

/// `[domains]`
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields, default)]
pub struct DomainsSection {
    /// `polygons`, `fault-blocks`, `clusters` or `single`; default: `polygons` where polygons are given, else `single`.
    pub method: Option<String>,
    /// Polygon file, `file:layer` where it has several.
    pub polygons: Option<String>,
    /// Column with the polygons' names.
    pub name: Option<String>,
    /// `refuse` or `merge`: what two polygons of one name are.
    pub same_name: String,
    /// Fault lines.
    pub faults: Option<String>,
    /// The project area.
    pub outline: Option<String>,
    /// What clusters are grown from.
    pub structure: Option<StructureChoice>,
    /// `"auto"` or a whole number.
    pub count: NumberOrText,
    /// Fewest readings in a domain.
    pub smallest: u32,
    /// A station outside every polygon joins the nearest within this distance.
    pub nearest_m: f64,
}

/// One structure or several.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(untagged, expecting = "expected a structure, or a list of them")]
pub enum StructureChoice {
    /// One.
    One(String),
    /// Several.
    Several(Vec<String>),
}

impl Default for DomainsSection {
    fn default() -> Self {
        Self {
            method: None,
            polygons: None,
            name: None,
            same_name: "refuse".into(),
            faults: None,
            outline: None,
            structure: None,
            count: NumberOrText::Text("auto".into()),
            smallest: 15,
            nearest_m: 0.0,
        }
    }
}

/// `[fabric]`
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields, default)]
pub struct FabricSection {
    /// Confidence of intervals and ellipses.
    pub confidence: f64,
    /// How cones are found: `ellipse`, `pivotal` or `percentile`.
    pub uncertainty: String,
    /// Bootstrap resamples.
    pub resamples: u32,
    /// Structures whose lines carry a sense.
    pub directed: Vec<String>,
    /// `"auto"`, a whole number, or 0 for none.
    pub sets: NumberOrText,
    /// `none`, `map`, `scanline`, `plane` or `column`.
    pub terzaghi: String,
    /// Trend/plunge of the scanline.
    pub scanline: Option<String>,
    /// Dip direction/dip of the face.
    pub plane: Option<String>,
    /// Cap on a Terzaghi weight.
    pub max_weight: f64,
}

impl Default for FabricSection {
    fn default() -> Self {
        Self {
            confidence: 0.95,
            uncertainty: "ellipse".into(),
            resamples: 1000,
            directed: Vec::new(),
            sets: NumberOrText::Text("auto".into()),
            terzaghi: "none".into(),
            scanline: None,
            plane: None,
            max_weight: 10.0,
        }
    }
}

/// `[compare]`
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields, default)]
pub struct CompareSection {
    /// Random permutations of a test.
    pub permutations: u32,
    /// Level of the adjusted p-value.
    pub level: f64,
}

impl Default for CompareSection {
    fn default() -> Self {
        Self { permutations: 9999, level: 0.05 }
    }
}

/// `[symbols]`
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields, default)]
pub struct SymbolsSection {
    /// The map's scale denominator.
    pub scale: f64,
    /// Least distance between drawn symbols at that scale.
    pub spacing_mm: f64,
}

impl Default for SymbolsSection {
    fn default() -> Self {
        Self { scale: 25_000.0, spacing_mm: 6.0 }
    }
}

/// `[output]`
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields, default)]
pub struct OutputSection {
    /// Folder for the results.
    pub folder: String,
    /// Formats to write.
    pub formats: Vec<String>,
}

impl Default for OutputSection {
    fn default() -> Self {
        Self { folder: "out".into(), formats: vec!["gpkg".into()] }
    }
}

impl AreaFile {
    /// Parses the text of an area file; `path` is for messages.
    pub fn parse(text: &str, path: &Path) -> Result<Self, AreaFileError> {
        let file = path.display().to_string();
        let table: toml::Table = toml::from_str(text).map_err(|e| AreaFileError::syntax(&file, text, &e))?;
        if let Some(unknown) = first_unknown(&table) {
            let line = line_of_key(text, &unknown.key);
            return Err(AreaFileError::UnknownKey { file, line, unknown: Box::new(unknown) });
        }
        toml::from_str(text).map_err(|e| AreaFileError::syntax(&file, text, &e))
    }

    /// Reads an area file; returns it with its text.
    pub fn read(path: &Path) -> Result<(Self, String), AreaFileError> {
        let file = path.display().to_string();
        let ending = path.extension().map(|e| e.to_string_lossy().to_lowercase()).unwrap_or_default();
        if ["csv", "tsv", "txt", "geojson", "json", "shp", "gpkg", "zip", "kml"].contains(&ending.as_str())
            && path.exists()
        {
            return Err(AreaFileError::NotToml { file });
        }
        let bytes = std::fs::read(path).map_err(|cause| AreaFileError::Unreadable { file: file.clone(), cause })?;
        let text = String::from_utf8(bytes).map_err(|_| AreaFileError::NotUtf8 { file })?;
        let text = text.strip_prefix('\u{feff}').unwrap_or(&text).to_owned();
        Ok((Self::parse(&text, path)?, text))
    }
}

/// The line on which a key is first set, where one can be found.
fn line_of_key(text: &str, key: &str) -> Option<usize> {
    let is_set = |line: &str| {
        let line = line.trim_start();
        let line = line.strip_prefix(['[', '"', '\'']).unwrap_or(line).trim_start_matches('[');
        line.rsplit_once('=').map_or(line, |(left, _)| left).contains(key) && (line.contains('=') || line.contains(']'))
    };
    text.lines().position(is_set).map(|i| i + 1)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn parse(text: &str) -> Result<AreaFile, AreaFileError> {
        AreaFile::parse(text, Path::new("area.toml"))
    }

    #[test]
    fn one_source_or_several() {
        let one = parse("[stations]\nfile = \"a.csv\"\ndate = 2024-06-01\ndeclination = 1.25\n").unwrap();
        assert_eq!(one.stations.iter().map(|s| s.file.as_str()).collect::<Vec<_>>(), ["a.csv"]);
        assert_eq!(one.stations.iter().next().unwrap().date.as_ref().unwrap().text(), "2024-06-01");
        let two = parse("[[stations]]\nfile = \"a.csv\"\n[[stations]]\nfile = \"b.shp\"\ndeclination = \"model\"\n[stations.columns]\nstructure = { value = \"joint\" }\n").unwrap();
        assert_eq!(two.stations.iter().count(), 2);
    }

    #[test]
    fn unknown_keys_name_their_line_and_the_nearest_key() {
        let error = parse("[area]\nname = \"x\"\n[domains]\npolygon = \"b.geojson\"\n").unwrap_err().to_string();
        assert!(error.contains("area.toml, line 4"), "{error}");
        assert!(error.contains("\"polygon\"") && error.contains("\"polygons\""), "{error}");
        let error = parse("[[stations]]\nfile = \"a\"\n[stations.columns]\nazimut = \"s\"\n").unwrap_err().to_string();
        assert!(error.contains("\"azimuth\""), "{error}");
        let error = parse("[outputs]\nfolder = \"x\"\n").unwrap_err().to_string();
        assert!(error.contains("\"output\""), "{error}");
    }

    #[test]
    fn wrong_types_and_broken_syntax_name_the_line() {
        let error = parse("[area]\nseed = \"one\"\n").unwrap_err().to_string();
        assert!(error.contains("line 2"), "{error}");
        let error = parse("[area\nseed = 1\n").unwrap_err().to_string();
        assert!(error.contains("line 1"), "{error}");
    }

    #[test]
    fn structures_of_ones_own_say_their_kind() {
        let file = parse("[structures]\nS0 = \"bedding\"\nBd = { name = \"banding\", kind = \"planar\" }\n").unwrap();
        assert_eq!(file.structures["S0"], StructureName::Name("bedding".into()));
        assert_eq!(file.structures["Bd"], StructureName::Own { name: "banding".into(), kind: "planar".into() });
    }
}
