//! Domains grown from the readings themselves: connected areas whose axes are one population.
//!
//! The cost of joining two areas is a likelihood of axes that needs their orientation tensors alone, which add; so
//! a hierarchy of merges over neighbours costs little more than sorting. The number of domains is the one of least
//! description length, and may be one.

mod agglomerate;
mod barrier;
mod cells;
mod dispersion;
mod evidence;
mod graph;
mod grow;
mod path;
mod refine;
mod score;
mod search;
mod sites;
mod stability;

pub use agglomerate::Step;
pub use grow::grow;

use crate::orientation::Axis;
use geo::Coord;
use thiserror::Error;

/// Readings to grow domains from; the slices have one entry per reading, in any order. Readings at one position
/// form one station and go to one domain.
#[derive(Debug, Clone, Copy)]
pub struct Places<'a> {
    /// Map position, any planar unit.
    pub position: &'a [Coord<f64>],
    /// The axis read there: the pole of a plane, or a line.
    pub axis: &'a [Axis],
    /// Which structure the axis is of. Each structure has its own fabric in each domain; their evidence adds.
    pub structure: &'a [u16],
}

/// How many domains there shall be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Count {
    /// As many as make the description shortest, perhaps one.
    Auto,
    /// This many, from 1; more where barriers make more compartments.
    Exactly(usize),
}

/// What the user may choose.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GrowOptions {
    /// How many domains.
    pub count: Count,
    /// Fewest readings in a domain. At least one in two hundred of all readings is asked for in any case.
    pub smallest: usize,
    /// Seed of every random step.
    pub seed: u64,
    /// How often stability is tried; 0 for not at all.
    pub replicates: usize,
}

impl Default for GrowOptions {
    fn default() -> Self {
        Self { count: Count::Auto, smallest: 5, seed: 0, replicates: 50 }
    }
}

/// What was grown.
#[derive(Debug, Clone, PartialEq)]
pub struct Grown {
    /// Per reading its domain, from 0; domains are numbered from north to south, then from west to east, by the
    /// mean position of their stations.
    pub domain: Vec<u32>,
    /// Per reading the probability, 0 to 1, that it does not belong to its domain's fabric.
    pub outlier: Vec<f64>,
    /// The domains.
    pub domains: Vec<GrownDomain>,
    /// Every pair of adjacent domains.
    pub boundaries: Vec<GrownBoundary>,
    /// Energy against the number of domains, number falling; 0 for the domains found. Below 0 where more domains
    /// would describe the readings better, but some of them would be smaller than `smallest`.
    pub path: Vec<Step>,
    /// The next best number along the path, and how much worse it is in nats; `None` where there is no other.
    pub runner_up: Option<Step>,
    /// Mean overdispersion: how many neighbouring readings say as much as one independent reading.
    pub overdispersion: f64,
    /// Number of cells that the domains were grown from.
    pub cells: usize,
    /// Fewest readings in a domain, as used.
    pub smallest: usize,
    /// Number of domains in each replicate of the stability test.
    pub replicate_counts: Vec<usize>,
    /// What the barriers did.
    pub barriers: Barriers,
}

/// One domain that was grown.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GrownDomain {
    /// Number of readings.
    pub readings: usize,
    /// Number of distinct positions.
    pub stations: usize,
    /// Mean overlap, 0 to 1, with the most alike domain of each replicate (Jaccard index); `None` without replicates.
    pub stability: Option<f64>,
}

/// Where two domains meet.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GrownBoundary {
    /// The domain of lower number.
    pub a: u32,
    /// The other.
    pub b: u32,
    /// Pairs of close neighbours that it separates.
    pub pairs: usize,
    /// Share of replicates that tell the two apart; `None` without replicates.
    pub told_apart: Option<f64>,
}

/// What the barriers did.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct Barriers {
    /// How many lines were given.
    pub lines: usize,
    /// Lines that separate nothing: of one vertex, or outside the stations' bounding box.
    pub idle: usize,
    /// Stations in compartments of fewer than `smallest` readings; these were joined to their nearest neighbour
    /// across a barrier.
    pub joined_across: usize,
}

/// Why nothing could be grown.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
pub enum GrowError {
    /// No readings.
    #[error("there are no readings to grow domains from")]
    NoReadings,
    /// The slices differ in length.
    #[error("{positions} positions, {axes} axes and {structures} structures; one of each per reading is needed")]
    UnequalColumns {
        /// Number of positions.
        positions: usize,
        /// Number of axes.
        axes: usize,
        /// Number of structures.
        structures: usize,
    },
    /// A position is NaN or infinite.
    #[error("the position of reading {reading} (from 0) is not a number")]
    PositionNotFinite {
        /// Index of the reading, from 0.
        reading: usize,
    },
    /// The bounding box overflows.
    #[error("the positions lie too far apart to measure distances between them")]
    SpanNotFinite,
    /// A barrier has a vertex that is NaN or infinite.
    #[error("barrier {barrier} (from 0) has a vertex that is not a number")]
    BarrierNotFinite {
        /// Index of the barrier, from 0.
        barrier: usize,
    },
    /// Zero domains asked for.
    #[error("0 domains cannot be grown; ask for 1 or more, or for \"auto\"")]
    NoDomains,
    /// More domains than stations.
    #[error("{count} domains cannot be grown from {stations} stations; ask for at most {stations}, or for \"auto\"")]
    TooManyDomains {
        /// How many were asked for.
        count: usize,
        /// How many distinct positions there are.
        stations: usize,
    },
}
