//! The whole job: the area file as typed, the plan as checked, and the run.

mod area_error;
mod area_file;
mod area_keys;

pub use area_error::AreaFileError;
pub use area_file::AreaFile;
