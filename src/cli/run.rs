//! `homocline run`.

use super::args::RunArgs;
use super::messages::{Printer, is_finding};
use super::progress::progress;
use super::{DONE, FINDINGS, STOPPED};
use crate::fabric::Shape;
use crate::job::{self, FabricLine, Outcome, Overrides};
use crate::orientation::{Axis, Plane};
use crate::station::Kind;
use std::path::Path;

/// How many fabrics `run` prints; the rest are in the layer.
const FABRICS_SHOWN: usize = 40;

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
            printer.stopped(&error);
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
    for line in outcome.fabrics.iter().take(FABRICS_SHOWN) {
        printer.line(&fabric_line(line));
    }
    if outcome.fabrics.len() > FABRICS_SHOWN {
        printer.line(&format!("… and {} more fabrics in the fabrics layer", outcome.fabrics.len() - FABRICS_SHOWN));
    }
    let (styles, files): (Vec<_>, Vec<_>) = outcome.written.iter().partition(|p| is_style(p));
    for path in files {
        printer.line(&format!("wrote {}", path.display()));
    }
    if let Some(folder) = styles.first().and_then(|p| p.ancestors().find(|a| a.ends_with("styles"))) {
        printer.line(&format!("wrote {} ({} files)", folder.display(), styles.len()));
    }
    printer.object(&serde_json::json!({
        "severity": "result",
        "counts": counts,
        "written": outcome.written.iter().map(|p| p.display().to_string()).collect::<Vec<_>>(),
    }));
}

fn is_style(path: &Path) -> bool {
    path.ancestors().skip(1).any(|a| a.ends_with("styles"))
}

/// "North block · bedding: n 84, cluster, mean plane 043/31 SE, cone 5.1° × 3.2°".
fn fabric_line(line: &FabricLine) -> String {
    let fabric = &line.placed.fabric;
    let mut parts = vec![format!("n {}", fabric.n), fabric.shape.word().replace('_', " ")];
    if let Some(axis) = fabric.mean {
        parts.push(match line.placed.structure.kind {
            Kind::Planar => format!("mean plane {} (right-hand strike/dip)", attitude(axis, Kind::Planar)),
            Kind::Linear => format!("mean line {} (trend/plunge)", attitude(axis, Kind::Linear)),
        });
    }
    if let (Some(_), Some(cone)) = (fabric.mean, fabric.mean_cone) {
        parts.push(format!("cone of the mean {:.1}° × {:.1}°", cone.major, cone.minor));
    }
    if let (Shape::Girdle, Kind::Planar, Some(eigen)) = (fabric.shape, line.placed.structure.kind, fabric.eigen) {
        let axis = eigen.axes[2];
        parts.push(format!("fold axis {} (trend/plunge)", attitude(axis, Kind::Linear)));
        if let Some(cone) = fabric.third_cone {
            parts.push(format!("cone of the axis {:.1}° × {:.1}°", cone.major, cone.minor));
        }
    }
    if !line.sets.is_empty() {
        let kind = line.placed.structure.kind;
        let means: Vec<String> = line.sets.iter().map(|set| attitude(set.set.eigen.axes[0], kind)).collect();
        parts.push(format!("{} sets: {}", means.len(), means.join(", ")));
    }
    if let Some(eigen) = fabric.eigen {
        let [s1, s2, s3] = eigen.values;
        parts.push(format!("S {s1:.3} {s2:.3} {s3:.3}"));
    }
    format!("{} · {}: {}", line.domain, line.placed.structure.name, parts.join(", "))
}

/// "043/31": right-hand strike and dip of a pole's plane, or trend and plunge, to the degree.
fn attitude(axis: Axis, kind: Kind) -> String {
    let (azimuth, inclination) = match kind {
        Kind::Planar => {
            let plane = Plane::from_pole(axis);
            (plane.strike.map_or(0.0, |s| s.degrees()), plane.dip.degrees())
        }
        Kind::Linear => (axis.trend(), axis.plunge()),
    };
    format!("{:03.0}/{:02.0}", azimuth.round() % 360.0, inclination)
}
