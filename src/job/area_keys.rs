//! The known keys of an area file, and the nearest known one to a key that is not.

use std::fmt;

/// The keys of each table; `structures` takes any key.
const KEYS: [(&str, &[&str]); 10] = [
    ("", &["area", "stations", "structures", "domains", "fabric", "compare", "symbols", "output"]),
    ("area", &["name", "crs", "seed"]),
    ("stations", &["file", "layer", "crs", "north", "declination", "date", "notation", "columns"]),
    (
        "stations.columns",
        &[
            "id",
            "x",
            "y",
            "z",
            "date",
            "structure",
            "azimuth",
            "dip",
            "dip_quadrant",
            "attitude",
            "rake",
            "polarity",
            "weight",
            "declination",
            "exposure",
        ],
    ),
    (
        "domains",
        &[
            "method",
            "polygons",
            "name",
            "same_name",
            "faults",
            "outline",
            "structure",
            "count",
            "smallest",
            "nearest_m",
        ],
    ),
    (
        "fabric",
        &["confidence", "uncertainty", "resamples", "directed", "sets", "terzaghi", "scanline", "plane", "max_weight"],
    ),
    ("compare", &["permutations", "level"]),
    ("symbols", &["scale", "spacing_mm"]),
    ("output", &["folder", "formats"]),
    ("stations.columns.structure", &["value"]),
];

/// A key that the area file does not have.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct UnknownKey {
    /// The table it stands in; empty at the top.
    pub table: String,
    /// The key as written.
    pub key: String,
    /// The known key most like it, where one is near.
    pub nearest: Option<String>,
    /// All keys known there.
    pub known: Vec<&'static str>,
}

impl fmt::Display for UnknownKey {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let place =
            if self.table.is_empty() { "at the top of the file".into() } else { format!("in [{}]", self.table) };
        write!(f, "unknown key \"{}\" {place}; ", self.key)?;
        match &self.nearest {
            Some(nearest) => write!(f, "did you mean \"{nearest}\"?"),
            None => write!(f, "known there: {}", self.known.join(", ")),
        }
    }
}

/// The first key of the file that is not known, in file order of its tables.
pub fn first_unknown(root: &toml::Table) -> Option<UnknownKey> {
    in_table("", root)
}

fn in_table(path: &str, table: &toml::Table) -> Option<UnknownKey> {
    let known = KEYS.iter().find(|(name, _)| *name == path)?.1;
    for (key, value) in table {
        if !known.contains(&key.as_str()) {
            return Some(UnknownKey {
                table: path.to_owned(),
                key: key.clone(),
                nearest: nearest(key, known),
                known: known.to_vec(),
            });
        }
        let inner = if path.is_empty() { key.clone() } else { format!("{path}.{key}") };
        let found = match value {
            toml::Value::Table(t) => in_table(&inner, t),
            toml::Value::Array(list) => list.iter().filter_map(toml::Value::as_table).find_map(|t| in_table(&inner, t)),
            _ => None,
        };
        if found.is_some() {
            return found;
        }
    }
    None
}

/// Words less like the typed one than this are no help.
const LEAST_LIKENESS: f64 = 0.7;

/// The known word most like the typed one, where one is near.
pub(super) fn nearest(key: &str, known: &[&str]) -> Option<String> {
    let likeness = |k: &&str| strsim::jaro_winkler(k, &key.to_lowercase());
    known
        .iter()
        .filter(|k| likeness(k) >= LEAST_LIKENESS)
        .max_by(|a, b| likeness(a).total_cmp(&likeness(b)))
        .map(|k| (*k).to_owned())
}
