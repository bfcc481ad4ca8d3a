//! Layer `domains`: one structural domain.

use super::Results;
use crate::table::{Column, Shapes, Table};
use geo_types::Geometry;

pub(super) fn table(results: &Results) -> Table {
    let domains = results.domains;
    let mut counts = vec![0_i64; domains.list.len()];
    for id in domains.of.iter().flatten() {
        counts[id.index()] += 1;
    }
    let area = |square_units: f64| (!results.geographic).then_some(square_units * results.metres * results.metres);
    let mut table = Table::new("domains")
        .with(
            "domain_id",
            "Domain number",
            "Number of the domain, from 1",
            domains.list.iter().map(|d| Some(i64::from(d.id.number()))).collect(),
        )
        .with("domain", "Domain", "Name of the domain", domains.list.iter().map(|d| Some(d.name.as_str())).collect())
        .with(
            "method",
            "Method",
            "How the domains came about: polygons, fault-blocks, clusters or single",
            domains.list.iter().map(|_| Some(domains.method.word())).collect(),
        )
        .with(
            "area_m2",
            "Area",
            "Area on the map in square metres; null where the layer's CRS is geographic",
            domains.list.iter().map(|d| area(d.area())).collect(),
        )
        .with(
            "n_orientations",
            "Readings",
            "Number of readings of all structures in the domain",
            counts.into_iter().map(Some).collect(),
        )
        .with(
            "stability",
            "Stability",
            "Mean overlap of a grown domain with its replicates, 0 to 1; null for domains that were given",
            domains.list.iter().map(|_| None::<f64>).collect::<Column>(),
        );
    table.shapes = Shapes::Any(
        domains.list.iter().map(|d| (!d.shape.0.is_empty()).then(|| Geometry::MultiPolygon(d.shape.clone()))).collect(),
    );
    table.crs = Some(results.crs.to_owned());
    table
}
