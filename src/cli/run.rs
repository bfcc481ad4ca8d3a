//! `homocline run`.

use super::args::RunArgs;
use super::messages::{Printer, is_finding};
use super::progress::progress;
use super::{DONE, FINDINGS, STOPPED};
use crate::job::{self, Outcome, Overrides};

/// What the command line says over the area file.
pub(super) fn overrides(args: &RunArgs) -> Overrides {
    Overrides {
        stations: args.stations.clone(),
        polygons: args.polygons.clone(),
        faults: args.faults.clone(),
        clusters: args.clusters,
        out: args.out.clone(),
        seed: args.seed,
    }
}

/// Does the whole job; returns the exit status.
pub(super) fn run(args: &RunArgs, printer: &Printer) -> u8 {
    let progress = progress(args.common.quiet);
    let outcome = job::plan(args.area.as_deref(), &overrides(args)).and_then(|plan| job::run(&plan, progress.as_ref()));
    let outcome = match outcome {
        Ok(outcome) => outcome,
        Err(error) => {
            printer.error(&error.to_string());
            return STOPPED;
        }
    };
    outcome.notices.iter().for_each(|notice| printer.notice(notice));
    printer.refusals(&outcome.refusals, false);
    print_outcome(&outcome, printer);
    let findings = !outcome.refusals.is_empty() || outcome.notices.iter().any(is_finding);
    if args.common.strict && findings { FINDINGS } else { DONE }
}

fn print_outcome(outcome: &Outcome, printer: &Printer) {
    let counts = &outcome.counts;
    for (source, c) in &counts.by_source {
        printer.line(&format!("{source}: {} rows read, {} kept, {} refused", c.read, c.kept, c.refused));
    }
    for (code, n) in &counts.refused_by_code {
        printer.line(&format!("  refused: {n} × {code}"));
    }
    for line in &outcome.fabric_lines {
        printer.line(line);
    }
    for path in &outcome.written {
        printer.line(&format!("wrote {}", path.display()));
    }
    printer.object(&serde_json::json!({
        "severity": "result",
        "counts": counts,
        "written": outcome.written.iter().map(|p| p.display().to_string()).collect::<Vec<_>>(),
    }));
}
