//! Headings and meanings of the columns that several layers share.

use crate::fabric;

/// Columns that are not statistics of [`fabric::ALL`]: name, heading, meaning.
const OTHERS: [(&str, &str, &str); 14] = [
    ("domain_id", "Domain number", "Number of the domain, from 1"),
    ("domain", "Domain", "Name of the domain"),
    ("structure", "Structure", "What was measured: bedding, joint, lineation …"),
    ("kind", "Kind", "planar (statistics work on poles) or linear"),
    ("directed", "Directed", "True where the statistics are of directions with a sense"),
    (
        "rotation_true",
        "Rotation, true north",
        "Strike or trend of the symbol; clockwise turn on a map whose top is true north, degrees",
    ),
    (
        "rotation_grid",
        "Rotation, grid north",
        "Clockwise turn of a north-up symbol on a map in this layer's CRS, degrees",
    ),
    ("rotation_ccw", "Rotation, counter-clockwise", "The same turn counted counter-clockwise, degrees"),
    ("symbol", "Symbol", "Code of the map symbol; a number is that of FGDC-STD-013-2006; null where there is none"),
    ("label", "Label", "Dip or plunge to print beside the symbol; null for horizontal and vertical"),
    ("trend", "Trend", "Trend of the fold axis; degrees clockwise from true north"),
    ("plunge", "Plunge", "Plunge of the fold axis; degrees down from horizontal"),
    ("set_id", "Set", "Number of the set within its domain and structure, from 1, the heaviest first"),
    ("arc", "Arc", "Shortest arc of the girdle that holds 95 % of the poles, degrees"),
];

/// A heading.
pub(super) fn titled(name: &str) -> String {
    let registered = fabric::ALL.iter().find(|s| s.name == name).map(|s| s.title);
    registered.or_else(|| OTHERS.iter().find(|o| o.0 == name).map(|o| o.1)).unwrap_or(name).to_owned()
}

/// What a column means, its unit, least number of readings and source.
pub(super) fn described(name: &str) -> String {
    if let Some(s) = fabric::ALL.iter().find(|s| s.name == name) {
        let unit = if s.unit.is_empty() { String::new() } else { format!(" Unit: {}.", s.unit) };
        let least = if s.least_n > 1 { format!(" Needs {} readings.", s.least_n) } else { String::new() };
        let is_published = s.source.bytes().any(|b| b.is_ascii_digit());
        let source = if is_published { format!(" Source: {}.", s.source) } else { String::new() };
        return format!("{}{unit}{least}{source}", s.description);
    }
    OTHERS.iter().find(|o| o.0 == name).map_or_else(String::new, |o| o.2.to_owned())
}
