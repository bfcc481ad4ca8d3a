//! `homocline check`.

use super::args::RunArgs;
use super::messages::{Printer, is_finding};
use super::progress::progress;
use super::run::overrides;
use super::{DONE, FINDINGS, STOPPED};
use crate::job;

/// Reads and validates; returns the exit status.
pub(super) fn check(args: &RunArgs, printer: &Printer) -> u8 {
    let progress = progress(args.common.quiet);
    let checked =
        job::plan(args.area.as_deref(), &overrides(args)).and_then(|plan| job::check(&plan, progress.as_ref()));
    let checked = match checked {
        Ok(checked) => checked,
        Err(error) => {
            printer.stopped(&error);
            return STOPPED;
        }
    };
    checked.notices.iter().for_each(|notice| printer.notice(notice));
    printer.refusals(&checked.refusals, true);
    for (source, c) in &checked.counts.by_source {
        printer.line(&format!("{source}: {} rows read, {} would be kept, {} refused", c.read, c.kept, c.refused));
    }
    for (code, n) in &checked.counts.refused_by_code {
        printer.line(&format!("  refused: {n} × {code}"));
    }
    printer.line("nothing was written");
    printer.object(&serde_json::json!({ "severity": "result", "counts": checked.counts }));
    let findings = !checked.refusals.is_empty() || checked.notices.iter().any(is_finding);
    if findings { FINDINGS } else { DONE }
}
