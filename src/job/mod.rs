//! The whole job: the area file as typed, the plan as checked, the run, and the record of it.

mod area_error;
mod area_file;
mod area_keys;
mod domains;
mod error;
mod exposure;
mod fabric_plan;
mod gather;
mod ground;
mod grouping;
mod one_or_many;
mod outputs;
mod paths;
mod plan;
mod provenance;
mod run;
mod seeds;
mod statistics;
mod summary;

pub use area_error::AreaFileError;
pub use area_file::AreaFile;
pub use error::JobError;
pub use gather::{Checked, check};
pub use outputs::OutputError;
pub use plan::{Overrides, Plan, plan};
pub use run::{FabricLine, Outcome, run};
pub use summary::{AllCounts, Counts, Message};

use crate::notice::{Notice, Severity};

/// A notice as it stands in the summary and in `--format json`.
pub fn message_of(notice: &Notice) -> Message {
    Message {
        severity: match notice.severity {
            Severity::Info => "info",
            Severity::Warning => "warning",
        },
        code: notice.code.to_owned(),
        file: notice.place.file.clone(),
        row: notice.place.row,
        column: notice.place.column.clone(),
        message: notice.message.clone(),
        hint: notice.hint.clone(),
    }
}
