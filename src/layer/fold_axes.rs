//! Layer `fold_axes`: the axis of one structure whose poles lie along a girdle.

use super::placed::{PlacedFold, turns};
use super::words::{described, titled};
use super::{Results, rows};
use crate::fabric::fold::Cylindricality;
use crate::orientation::{Plane, Polarity};
use crate::station::Kind;
use crate::symbol;
use crate::table::{Column, Table};

type Get = fn(&PlacedFold) -> Option<f64>;

const NUMBERS: [(&str, Get); 8] = [
    ("trend", |p| Some(p.fold.axis.trend())),
    ("plunge", |p| Some(p.fold.axis.plunge())),
    ("axis_cone_major", |p| Some(p.fold.cone?.major)),
    ("axis_cone_minor", |p| Some(p.fold.cone?.minor)),
    ("cylindricity", |p| Some(p.fold.cylindricity)),
    ("rms_misfit", |p| Some(p.fold.rms_misfit)),
    ("cone_half_angle", |p| p.fold.cone_half_angle()),
    ("interlimb", |p| Some(p.limbs?.interlimb)),
];

/// Columns of ours beside the fixed ones: name, heading, meaning, value.
const MORE: [(&str, &str, &str, Get); 7] = [
    ("arc", "Arc", "Shortest arc of the girdle that holds 95 % of the poles; degrees", |p| Some(p.fold.arc)),
    (
        "cone_p",
        "Cone test p",
        "p-value of the F test of a cone against a cylinder (one test per row); null where the arc is too short or the poles are too few",
        |p| Some(p.fold.cone_test?.p),
    ),
    (
        "axial_plane_strike",
        "Axial plane, strike",
        "Right-hand strike of the plane through the axis that halves the interlimb angle; degrees from true north",
        |p| axial_plane(p)?.strike.map(|s| s.degrees()),
    ),
    ("axial_plane_dip", "Axial plane, dip", "Dip of that plane; degrees", |p| Some(axial_plane(p)?.dip.degrees())),
    ("rotation_true", "", "", |p| Some(p.fold.axis.trend())),
    ("rotation_grid", "", "", |p| Some(turns(p.grid_azimuth)?.0)),
    ("rotation_ccw", "", "", |p| Some(turns(p.grid_azimuth)?.1)),
];

fn axial_plane(placed: &PlacedFold) -> Option<Plane> {
    placed.limbs.map(|l| Plane::from_pole(l.axial_plane))
}

fn class(placed: &PlacedFold) -> &'static str {
    match placed.fold.class {
        Cylindricality::Cylindrical => "cylindrical",
        Cylindricality::SubCylindrical => "sub-cylindrical",
        Cylindricality::NonCylindrical => "non-cylindrical",
    }
}

pub(super) fn table(results: &Results) -> Table {
    let folds = results.folds;
    let mut table = rows::head("fold_axes", results, folds.iter().map(|p| (p.domain, &p.structure))).with(
        "n",
        &titled("n"),
        &described("n"),
        folds.iter().map(|p| i64::try_from(p.n).ok()).collect(),
    );
    for (name, get) in NUMBERS {
        table = table.with(name, &titled(name), &described(name), folds.iter().map(get).collect());
    }
    for (name, title, description, get) in MORE {
        let (title, description) =
            if title.is_empty() { (titled(name), described(name)) } else { (title.to_owned(), description.to_owned()) };
        table = table.with(name, &title, &description, folds.iter().map(get).collect());
    }
    let chosen = |p: &PlacedFold| symbol::choose("fold_axis", Kind::Linear, p.fold.axis.plunge(), Polarity::Unknown);
    let symbols: Column = folds.iter().map(|p| Some(chosen(p).code)).collect();
    let classes: Column = folds.iter().map(|p| Some(class(p))).collect();
    let notes = folds.iter().map(|p| {
        let hinge = p.limbs.filter(|l| !l.hinge_seen).map(|_| "no reading in the hinge says which angle between the limbs is the fold's: the steeper axial plane was taken");
        [hinge, Some(p.fold.note.as_str()).filter(|n| !n.is_empty())].into_iter().flatten().collect::<Vec<_>>().join("; ")
    });
    let labels = folds.iter().map(|p| symbol::label(Kind::Linear, p.fold.axis.plunge()));
    table = table
        .with("cylindricality", "Cylindricality", "cylindrical (90 % of the poles within 10° of the great circle), sub-cylindrical (20°) or non-cylindrical. Source: Ramsay & Huber 1987 (from memory).", classes)
        .with("symbol", &titled("symbol"), &described("symbol"), symbols)
        .with("label", &titled("label"), &described("label"), rows::texts(labels))
        .with("note", &titled("note"), &described("note"), rows::texts(notes.map(|n| Some(n).filter(|n| !n.is_empty()))));
    rows::placed(table, results, folds.iter().map(|p| p.at))
}
