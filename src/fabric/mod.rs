//! Every statistic of one sample of axes: [`summarise`] for poles and unsensed lines, [`summarise_directed`] for
//! what has a sense, [`fold::fold_axis`] and [`fold::limbs`] for girdles, [`sets::sets`] for several maxima.
//!
//! Invariants: no file here knows a map, a file or a layer. Angles cross the border in degrees. Sums are
//! exact, so a result does not depend on the order of readings; the sense of an axis changes nothing. Too few
//! readings are an answer (`None` and a note), never NaN. The station, not the reading, is the unit of tests
//! and cones: readings at one station are no independent witnesses.

pub mod axis_cone;
pub mod bingham;
pub mod bootstrap;
pub mod concentration;
pub mod density;
mod direction;
pub mod fisher;
pub mod fold;
pub mod girdle_arc;
pub mod harmonics;
pub mod kent;
mod mixture;
pub mod modes;
pub mod net_grid;
pub mod ratios;
mod registry;
mod sample;
pub mod sets;
mod shape;
pub mod small_circle;
pub mod special;
mod summary;
pub mod terzaghi;
pub mod uniformity;
pub mod watson;

pub use axis_cone::{Cone, NoCone};
pub use direction::{Directed, DirectedFabric, Direction, rayleigh_p, summarise_directed};
pub use registry::{ALL, Statistic};
pub use sample::{Kind, Part, Sample, SampleError, Stations, Unit, units};
pub use shape::{LEAST_ARC, Shape};
pub use summary::{Fabric, FabricOptions, LEAST, TRUSTED, summarise, with_sets};
