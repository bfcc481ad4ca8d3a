//! Layer `sets`: one orientation set of a structure in a domain.

use super::placed::{PlacedSet, azimuth_of, inclination_of, turns};
use super::words::{described, titled};
use super::{Results, rows};
use crate::orientation::{Plane, Polarity};
use crate::station::Kind;
use crate::symbol;
use crate::table::{Column, Table};

type Get = fn(&PlacedSet) -> Option<f64>;

const NUMBERS: [(&str, Get); 20] = [
    ("share", |p| Some(p.set.share)),
    ("mean_strike", |p| plane(p)?.strike.map(|s| s.degrees())),
    ("mean_dip", |p| Some(plane(p)?.dip.degrees())),
    ("mean_dip_direction", |p| plane(p)?.dip_direction().map(|d| d.degrees())),
    ("mean_trend", |p| Some(p.set.eigen.axes[0].trend())),
    ("mean_plunge", |p| Some(p.set.eigen.axes[0].plunge())),
    ("s1", |p| Some(p.set.eigen.values[0])),
    ("s2", |p| Some(p.set.eigen.values[1])),
    ("s3", |p| Some(p.set.eigen.values[2])),
    ("v1_trend", |p| Some(p.set.eigen.axes[0].trend())),
    ("v1_plunge", |p| Some(p.set.eigen.axes[0].plunge())),
    ("v2_trend", |p| Some(p.set.eigen.axes[1].trend())),
    ("v2_plunge", |p| Some(p.set.eigen.axes[1].plunge())),
    ("v3_trend", |p| Some(p.set.eigen.axes[2].trend())),
    ("v3_plunge", |p| Some(p.set.eigen.axes[2].plunge())),
    ("fisher_kappa", |p| p.set.fisher_kappa),
    ("fisher_alpha95", |p| p.set.fisher_alpha95),
    ("rotation_true", |p| Some(azimuth_of(p.set.eigen.axes[0], p.structure.kind))),
    ("rotation_grid", |p| Some(turns(p.grid_azimuth)?.0)),
    ("rotation_ccw", |p| Some(turns(p.grid_azimuth)?.1)),
];

fn plane(placed: &PlacedSet) -> Option<Plane> {
    (placed.structure.kind == Kind::Planar).then(|| Plane::from_pole(placed.set.eigen.axes[0]))
}

pub(super) fn table(results: &Results) -> Table {
    let sets = results.sets;
    let kinds: Column = sets.iter().map(|p| Some(p.structure.kind.word())).collect();
    let mut table = rows::head("sets", results, sets.iter().map(|p| (p.domain, &p.structure)))
        .with("kind", &titled("kind"), &described("kind"), kinds)
        .with(
            "set_id",
            &titled("set_id"),
            &described("set_id"),
            sets.iter().map(|p| Some(i64::from(p.number))).collect(),
        )
        .with("n", &titled("n"), &described("n"), sets.iter().map(|p| i64::try_from(p.set.n).ok()).collect());
    for (name, get) in NUMBERS {
        table = table.with(name, &titled(name), &described(name), sets.iter().map(get).collect());
    }
    let inclination = |p: &PlacedSet| inclination_of(p.set.eigen.axes[0], p.structure.kind);
    let code =
        |p: &PlacedSet| symbol::choose(&p.structure.name, p.structure.kind, inclination(p), Polarity::Unknown).code;
    let symbols: Column = sets.iter().map(|p| Some(code(p))).collect();
    let labels = sets.iter().map(|p| symbol::label(p.structure.kind, inclination(p)));
    let notes = sets.iter().map(|p| Some(p.set.note.clone()).filter(|n| !n.is_empty()));
    table = table
        .with("symbol", &titled("symbol"), &described("symbol"), symbols)
        .with("label", &titled("label"), &described("label"), rows::texts(labels))
        .with("note", &titled("note"), &described("note"), rows::texts(notes));
    rows::placed(table, results, sets.iter().map(|p| p.at))
}
