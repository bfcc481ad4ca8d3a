//! Results to tables: one file per output layer. Pure; nothing here computes a statistic or writes a file.

mod carried;
mod domains;
mod fabrics;
mod fold_axes;
mod orientations;
mod placed;
mod refusals;
mod rows;
mod sets;
mod words;

pub use placed::{PlacedFabric, PlacedFold, PlacedSet, azimuth_of, symbol_azimuth};

use crate::domain::Domains;
use crate::notice::Refusal;
use crate::station::Readings;
use crate::table::Table;

/// Everything that the layers are made from.
pub struct Results<'a> {
    /// The accepted readings on the map.
    pub readings: &'a Readings,
    /// The tables they came from, one per source.
    pub sources: &'a [Table],
    /// The domains.
    pub domains: &'a Domains,
    /// One per domain and structure, sorted by both.
    pub fabrics: &'a [PlacedFabric],
    /// One per girdle of poles, in the same order.
    pub folds: &'a [PlacedFold],
    /// Orientation sets, in the same order, then by number.
    pub sets: &'a [PlacedSet],
    /// For each reading the number of its set.
    pub set_of: &'a [Option<u32>],
    /// The rows that were not used.
    pub refusals: &'a [Refusal],
    /// CRS of the map.
    pub crs: &'a str,
    /// True where the map's unit is a degree, so that areas mean nothing.
    pub geographic: bool,
    /// Metres per map unit.
    pub metres: f64,
}

/// The shapes of a layer's rows.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Geometry {
    /// Points.
    Point,
    /// Polygons with parts and holes.
    MultiPolygon,
    /// None.
    None,
}

/// One output layer.
pub struct Layer {
    /// Name in the GeoPackage.
    pub name: &'static str,
    /// A heading.
    pub title: &'static str,
    /// What a row is.
    pub description: &'static str,
    /// The shapes of its rows.
    pub geometry: Geometry,
    /// Makes the table.
    pub table: fn(&Results) -> Table,
}

/// Every output layer, in the order they are written.
pub const ALL: [Layer; 6] = [
    Layer {
        name: "orientations",
        title: "Orientations",
        description: "One accepted reading: attitude from true north, rotation for this layer's CRS, domain",
        geometry: Geometry::Point,
        table: orientations::table,
    },
    Layer {
        name: "domains",
        title: "Structural domains",
        description: "One structural domain",
        geometry: Geometry::MultiPolygon,
        table: domains::table,
    },
    Layer {
        name: "fabrics",
        title: "Fabric of each domain",
        description: "The fabric of one structure in one domain: mean attitude, eigenvalues, uncertainty",
        geometry: Geometry::Point,
        table: fabrics::table,
    },
    Layer {
        name: "fold_axes",
        title: "Fold axes",
        description: "The axis of one structure whose poles lie along a girdle in one domain",
        geometry: Geometry::Point,
        table: fold_axes::table,
    },
    Layer {
        name: "sets",
        title: "Orientation sets",
        description: "One orientation set of one structure in one domain",
        geometry: Geometry::Point,
        table: sets::table,
    },
    Layer {
        name: "refusals",
        title: "Refused rows",
        description: "One row that was read and not used, with the reason",
        geometry: Geometry::None,
        table: refusals::table,
    },
];
