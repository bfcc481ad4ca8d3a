//! Layer `fabrics`: the fabric of one structure in one domain.

use super::{PlacedFabric, Results};
use crate::fabric::{self, Fabric};
use crate::orientation::{Plane, Rotation};
use crate::station::Kind;
use crate::symbol;
use crate::table::{Column, Shapes, Table, TextColumn};

type Get = fn(&PlacedFabric) -> Option<f64>;

/// The numbers, in order; headings and meanings come from [`fabric::ALL`].
const NUMBERS: [(&str, Get); 37] = [
    ("weight_sum", |p| Some(p.fabric.weight_sum)),
    ("n_effective", |p| Some(p.fabric.n_effective)),
    ("mean_strike", |p| mean_plane(p)?.strike.map(|s| s.degrees())),
    ("mean_dip", |p| Some(mean_plane(p)?.dip.degrees())),
    ("mean_dip_direction", |p| mean_plane(p)?.dip_direction().map(|d| d.degrees())),
    ("mean_trend", |p| Some(p.fabric.mean?.trend())),
    ("mean_plunge", |p| Some(p.fabric.mean?.plunge())),
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
    ("kent_kappa", |_| None),
    ("kent_beta", |_| None),
    ("watson_kappa", |p| p.fabric.watson_kappa),
    ("bingham_k2", |p| Some(p.fabric.bingham?.k2)),
    ("bingham_k3", |p| Some(p.fabric.bingham?.k3)),
    ("mean_cone_major", |p| Some(p.fabric.mean_cone?.major)),
    ("mean_cone_minor", |p| Some(p.fabric.mean_cone?.minor)),
    ("axis_cone_major", |p| Some(p.fabric.third_cone?.major)),
    ("axis_cone_minor", |p| Some(p.fabric.third_cone?.minor)),
    ("uniformity_p", |p| p.fabric.uniformity_p),
    ("rotation_true", symbol_azimuth),
    ("rotation_grid", |p| Some(Rotation::along(p.grid_azimuth?).clockwise())),
    ("rotation_ccw", |p| Some(Rotation::along(p.grid_azimuth?).counter_clockwise())),
];

fn value(fabric: &Fabric, which: usize) -> Option<f64> {
    Some(fabric.eigen?.values[which])
}

fn mean_plane(placed: &PlacedFabric) -> Option<Plane> {
    if placed.structure.kind == Kind::Planar { placed.fabric.mean.map(Plane::from_pole) } else { None }
}

/// Strike of the mean plane or trend of the mean line.
pub fn symbol_azimuth(placed: &PlacedFabric) -> Option<f64> {
    match placed.structure.kind {
        Kind::Planar => mean_plane(placed)?.strike.map(|s| s.degrees()),
        Kind::Linear => Some(placed.fabric.mean?.trend()),
    }
}

/// Dip of the mean plane or plunge of the mean line.
fn symbol_inclination(placed: &PlacedFabric) -> Option<f64> {
    match placed.structure.kind {
        Kind::Planar => Some(mean_plane(placed)?.dip.degrees()),
        Kind::Linear => Some(placed.fabric.mean?.plunge()),
    }
}

pub(super) fn table(results: &Results) -> Table {
    let fabrics = results.fabrics;
    let words = |get: &dyn Fn(&PlacedFabric) -> Option<&'static str>| fabrics.iter().map(get).collect::<Column>();
    let domain = |p: &PlacedFabric| &results.domains.list[p.domain];
    let count = |n: usize| i64::try_from(n).ok();
    let (mut note, mut label) = (TextColumn::default(), TextColumn::default());
    for placed in fabrics {
        note.push(Some(placed.fabric.note.as_str()).filter(|n| !n.is_empty()));
        let text = symbol_inclination(placed).and_then(|i| symbol::label(placed.structure.kind, i));
        label.push(text.as_deref());
    }
    let mut table = Table::new("fabrics")
        .with(
            "domain_id",
            "Domain number",
            "Number of the domain, from 1",
            fabrics.iter().map(|p| Some(i64::from(domain(p).id.number()))).collect(),
        )
        .with("domain", "Domain", "Name of the domain", fabrics.iter().map(|p| Some(domain(p).name.as_str())).collect())
        .with(
            "structure",
            "Structure",
            "What was measured: bedding, joint, lineation …",
            fabrics.iter().map(|p| Some(p.structure.name.as_str())).collect(),
        )
        .with("kind", "Kind", "planar (statistics work on poles) or linear", words(&|p| Some(p.structure.kind.word())))
        .with("n", "Readings", &described("n"), fabrics.iter().map(|p| count(p.fabric.n)).collect())
        .with(
            "n_stations",
            "Stations",
            &described("n_stations"),
            fabrics.iter().map(|p| count(p.fabric.n_stations)).collect(),
        )
        .with(
            "n_clipped",
            "Clipped weights",
            "Readings whose weight was cut to the cap; 0 where no exposure weights were asked for",
            fabrics.iter().map(|_| Some(0_i64)).collect(),
        )
        .with("directed", "Directed", "True where the lines carry a sense", {
            let mut column = crate::table::IntegerColumn::default();
            fabrics.iter().for_each(|_| column.push(Some(0)));
            Column::Boolean(column)
        });
    for (name, get) in NUMBERS {
        table = table.with(name, &titled(name), &described(name), fabrics.iter().map(get).collect());
    }
    let symbols = fabrics.iter().map(|p| {
        let inclination = symbol_inclination(p)?;
        Some(
            symbol::choose(&p.structure.name, p.structure.kind, inclination, crate::orientation::Polarity::Unknown)
                .code,
        )
    });
    let symbols: Column = symbols.collect();
    table = table
        .with("shape", "Shape", &described("shape"), words(&|p| Some(p.fabric.shape.word())))
        .with("note", "Note", &described("note"), Column::Text(note))
        .with("symbol", "Symbol", "Code of the map symbol of the mean; null where there is none", symbols)
        .with("label", "Label", "Dip or plunge of the mean, to print beside the symbol", Column::Text(label));
    table.shapes = Shapes::Points(fabrics.iter().map(|p| p.at).collect());
    table.crs = Some(results.crs.to_owned());
    table
}

/// Names that are not statistics of [`fabric::ALL`]: heading, meaning.
const OTHERS: [(&str, &str, &str); 8] = [
    (
        "rotation_true",
        "Rotation, true north",
        "Strike or trend of the mean; clockwise turn on a map whose top is true north, degrees",
    ),
    (
        "rotation_grid",
        "Rotation, grid north",
        "Clockwise turn of a north-up symbol of the mean on a map in this layer's CRS, degrees",
    ),
    ("rotation_ccw", "Rotation, counter-clockwise", "The same turn counted counter-clockwise, degrees"),
    ("kent_kappa", "Kent kappa", "Concentration of the Kent distribution, directed readings only"),
    ("kent_beta", "Kent beta", "Ovalness of the Kent distribution, directed readings only"),
    (
        "watson_kappa",
        "Watson kappa",
        "Concentration of the Watson distribution: positive about e1, negative about e3's girdle",
    ),
    ("bingham_k2", "Bingham k2", "Bingham concentration of e2, with k1 = 0 for e1"),
    ("bingham_k3", "Bingham k3", "Bingham concentration of e3, with k1 = 0 for e1"),
];

fn titled(name: &str) -> String {
    let registered = fabric::ALL.iter().find(|s| s.name == name).map(|s| s.title);
    registered.or_else(|| OTHERS.iter().find(|o| o.0 == name).map(|o| o.1)).unwrap_or(name).to_owned()
}

fn described(name: &str) -> String {
    if let Some(s) = fabric::ALL.iter().find(|s| s.name == name) {
        let unit = if s.unit.is_empty() { String::new() } else { format!(" Unit: {}.", s.unit) };
        return format!("{}{unit} Needs {} readings. Source: {}.", s.description, s.least_n, s.source);
    }
    OTHERS.iter().find(|o| o.0 == name).map_or_else(String::new, |o| o.2.to_owned())
}
