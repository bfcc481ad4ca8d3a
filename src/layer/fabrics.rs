//! Layer `fabrics`: the fabric of one structure in one domain.

use super::placed::{PlacedFabric, inclination_of, symbol_azimuth, turns};
use super::words::{described, titled};
use super::{Results, rows};
use crate::fabric::Fabric;
use crate::orientation::{Plane, Polarity};
use crate::station::Kind;
use crate::symbol;
use crate::table::{Column, IntegerColumn, Table};

type Get = fn(&PlacedFabric) -> Option<f64>;

/// The numbers, in order; headings and meanings come from [`fabric::ALL`].
const NUMBERS: [(&str, Get); 37] = [
    ("weight_sum", |p| Some(p.fabric.weight_sum)),
    ("n_effective", |p| Some(p.fabric.n_effective)),
    ("mean_strike", |p| mean_plane(p)?.strike.map(|s| s.degrees())),
    ("mean_dip", |p| Some(mean_plane(p)?.dip.degrees())),
    ("mean_dip_direction", |p| mean_plane(p)?.dip_direction().map(|d| d.degrees())),
    ("mean_trend", |p| Some(mean_line(p)?.0)),
    ("mean_plunge", |p| Some(mean_line(p)?.1)),
    ("s1", |p| value(&p.fabric, 0)),
    ("s2", |p| value(&p.fabric, 1)),
    ("s3", |p| value(&p.fabric, 2)),
    ("v1_trend", |p| Some(p.fabric.eigen?.axes[0].trend())),
    ("v1_plunge", |p| Some(p.fabric.eigen?.axes[0].plunge())),
    ("v2_trend", |p| Some(p.fabric.eigen?.axes[1].trend())),
    ("v2_plunge", |p| Some(p.fabric.eigen?.axes[1].plunge())),
    ("v3_trend", |p| Some(p.fabric.eigen?.axes[2].trend())),
    ("v3_plunge", |p| Some(p.fabric.eigen?.axes[2].plunge())),
    ("woodcock_k", |p| p.fabric.woodcock_k),
    ("woodcock_c", |p| p.fabric.woodcock_c),
    ("vollmer_p", |p| Some(p.fabric.vollmer?[0])),
    ("vollmer_g", |p| Some(p.fabric.vollmer?[1])),
    ("vollmer_r", |p| Some(p.fabric.vollmer?[2])),
    ("resultant", |p| p.fabric.resultant),
    ("fisher_kappa", |p| p.fabric.fisher_kappa),
    ("fisher_alpha95", |p| p.fabric.fisher_alpha95),
    ("kent_kappa", |p| Some(p.directed.as_ref()?.kent?.kappa)),
    ("kent_beta", |p| Some(p.directed.as_ref()?.kent?.beta)),
    ("watson_kappa", |p| p.fabric.watson_kappa),
    ("bingham_k2", |p| Some(p.fabric.bingham?.k2)),
    ("bingham_k3", |p| Some(p.fabric.bingham?.k3)),
    ("mean_cone_major", |p| Some(p.fabric.mean_cone?.major)),
    ("mean_cone_minor", |p| Some(p.fabric.mean_cone?.minor)),
    ("axis_cone_major", |p| Some(p.fabric.third_cone?.major)),
    ("axis_cone_minor", |p| Some(p.fabric.third_cone?.minor)),
    ("uniformity_p", |p| p.fabric.uniformity_p),
    ("rotation_true", symbol_azimuth),
    ("rotation_grid", |p| Some(turns(p.grid_azimuth)?.0)),
    ("rotation_ccw", |p| Some(turns(p.grid_azimuth)?.1)),
];

fn value(fabric: &Fabric, which: usize) -> Option<f64> {
    Some(fabric.eigen?.values[which])
}

fn mean_plane(placed: &PlacedFabric) -> Option<Plane> {
    if placed.structure.kind == Kind::Planar { placed.fabric.mean.map(Plane::from_pole) } else { None }
}

/// Trend and plunge of the mean: with its sense, upward plunges negative, where the structure is directed.
fn mean_line(p: &PlacedFabric) -> Option<(f64, f64)> {
    let mean = p.fabric.mean?;
    let directed = p.directed.as_ref().and_then(|d| d.mean);
    Some(directed.map_or((mean.trend(), mean.plunge()), |d| (d.trend(), d.plunge())))
}

/// Dip of the mean plane or plunge of the mean line.
fn symbol_inclination(p: &PlacedFabric) -> Option<f64> {
    p.fabric.mean.map(|mean| inclination_of(mean, p.structure.kind))
}

pub(super) fn table(results: &Results) -> Table {
    let fabrics = results.fabrics;
    let words = |get: &dyn Fn(&PlacedFabric) -> Option<&'static str>| fabrics.iter().map(get).collect::<Column>();
    let counts =
        |get: &dyn Fn(&PlacedFabric) -> usize| fabrics.iter().map(|p| i64::try_from(get(p)).ok()).collect::<Column>();
    let mut directed = IntegerColumn::default();
    fabrics.iter().for_each(|p| directed.push(Some(p.directed.is_some().into())));
    let notes = fabrics.iter().map(|p| Some(p.fabric.note.clone()).filter(|n| !n.is_empty()));
    let labels = fabrics.iter().map(|p| symbol_inclination(p).and_then(|i| symbol::label(p.structure.kind, i)));
    let mut table = rows::head("fabrics", results, fabrics.iter().map(|p| (p.domain, &p.structure)))
        .with("kind", &titled("kind"), &described("kind"), words(&|p| Some(p.structure.kind.word())))
        .with("n", &titled("n"), &described("n"), counts(&|p| p.fabric.n))
        .with("n_stations", &titled("n_stations"), &described("n_stations"), counts(&|p| p.fabric.n_stations))
        .with("n_clipped", &titled("n_clipped"), &described("n_clipped"), counts(&|p| p.clipped))
        .with("directed", &titled("directed"), &described("directed"), Column::Boolean(directed));
    for (name, get) in NUMBERS {
        table = table.with(name, &titled(name), &described(name), fabrics.iter().map(get).collect());
    }
    let code = |p: &PlacedFabric| {
        let inclination = symbol_inclination(p)?;
        Some(symbol::choose(&p.structure.name, p.structure.kind, inclination, Polarity::Unknown).code)
    };
    table = table
        .with("shape", &titled("shape"), &described("shape"), words(&|p| Some(p.fabric.shape.word())))
        .with("note", &titled("note"), &described("note"), rows::texts(notes))
        .with("symbol", &titled("symbol"), &described("symbol"), words(&code))
        .with("label", &titled("label"), &described("label"), rows::texts(labels));
    rows::placed(table, results, fabrics.iter().map(|p| p.at))
}
