//! Where true, grid and magnetic north meet, and where positions get onto the map.
//!
//! Convergence is positive where grid north lies east of true north, declination positive east:
//! true = magnetic + declination, grid = true - convergence. Only this folder calls PROJ and the
//! geomagnetic models, and only `ffi.rs` in it is unsafe.

mod area;
mod definition;
mod error;
mod ffi;
mod magnetic;
mod map_choice;
mod north;
mod orient;
mod pool;
mod source;
mod tally;
mod transform;

pub use area::AreaOfUse;
pub use definition::MapCrs;
pub use error::CrsError;
pub use magnetic::{MODEL_YEARS, calendar, has_model};
pub use map_choice::default_map_crs;
pub use north::LocalNorth;
pub use orient::{Oriented, orient};
pub use transform::Transformer;
