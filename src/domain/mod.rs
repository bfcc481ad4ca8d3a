//! Structural domains: which there are, and which of them each reading belongs to.
//!
//! Invariant: a [`DomainId`] is issued only here, 1, 2, 3 … in the order of the domains.

pub mod clusters;
mod locate;
mod outline;
mod polygons;

pub use locate::{Located, Locator};
pub use outline::hull_of;
pub use polygons::{DomainError, NamedPolygon, SameName, clean};

use crate::notice::{Notice, Place};
use crate::station::Readings;
use geo::{Area, MultiPolygon};
use rayon::prelude::*;

/// Number of a domain, from 1.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct DomainId(u32);

impl DomainId {
    /// The number, from 1.
    pub fn number(self) -> u32 {
        self.0
    }
    /// Position in [`Domains::list`].
    pub fn index(self) -> usize {
        self.0 as usize - 1
    }
    fn of_index(index: usize) -> Self {
        Self(u32::try_from(index + 1).expect("fewer than 2^32 domains"))
    }
}

/// How the domains came about.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Method {
    /// The user's polygons.
    Polygons,
    /// One domain for the whole area.
    Single,
}

impl Method {
    /// The word written into layers and read from the area file.
    pub fn word(self) -> &'static str {
        match self {
            Self::Polygons => "polygons",
            Self::Single => "single",
        }
    }
}

/// One domain.
#[derive(Debug, Clone, PartialEq)]
pub struct Domain {
    /// Its number.
    pub id: DomainId,
    /// Its name.
    pub name: String,
    /// Its area on the map; empty where the stations of a single domain span none.
    pub shape: MultiPolygon<f64>,
}

impl Domain {
    /// Area in the square of the map's unit.
    pub fn area(&self) -> f64 {
        self.shape.unsigned_area()
    }
}

/// All domains, and the domain of every reading.
#[derive(Debug, Clone, PartialEq)]
pub struct Domains {
    /// How they came about.
    pub method: Method,
    /// In order of their ids.
    pub list: Vec<Domain>,
    /// For each reading its domain; `None` for a reading outside all of them.
    pub of: Vec<Option<DomainId>>,
}

/// One domain that holds every reading; its shape is the hull of the stations.
pub fn single(name: &str, readings: &Readings) -> Domains {
    let shape = hull_of(&readings.position);
    let id = DomainId::of_index(0);
    Domains {
        method: Method::Single,
        list: vec![Domain { id, name: name.to_owned(), shape }],
        of: vec![Some(id); readings.len()],
    }
}

/// How far a station outside every polygon may be from the one it joins.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Reach {
    /// As the user said it.
    pub metres: f64,
    /// On the map.
    pub map_units: f64,
}

/// Domains from polygons on the map, cleaned by [`clean`].
///
/// A station strictly inside a polygon belongs to it, to the lowest id where polygons overlap. A station on
/// boundaries alone belongs to the lowest id among the polygons that it touches. A station outside every
/// polygon joins the nearest within `nearest` (the lowest id where two are equally near), else none.
pub fn by_polygons(
    method: Method,
    polygons: Vec<NamedPolygon>,
    readings: &Readings,
    nearest: Reach,
) -> (Domains, Vec<Notice>) {
    let locator = Locator::new(polygons.iter().map(|p| &p.shape));
    let located: Vec<Located> = readings.position.par_iter().map(|&at| locator.locate(at, nearest.map_units)).collect();
    let count = |wanted: fn(&Located) -> bool| located.iter().filter(|l| wanted(l)).count();
    let mut notices = Vec::new();
    let on_boundary = count(|l| matches!(l, Located::OnBoundary { shared: true, .. }));
    if on_boundary > 0 {
        notices.push(Notice::info(
            "station-on-shared-boundary",
            Place::default(),
            format!("{on_boundary} readings lie on a boundary between domains; each went to the domain of lower id"),
        ));
    }
    let several = count(|l| matches!(l, Located::Inside { several: true, .. }));
    if several > 0 {
        notices.push(
            Notice::warning(
                "station-in-several-domains",
                Place::default(),
                format!("{several} readings lie inside more than one domain; each went to the domain of lowest id"),
            )
            .hint("mend the overlapping polygons in a GIS"),
        );
    }
    let joined = count(|l| matches!(l, Located::Near { .. }));
    if joined > 0 {
        notices.push(Notice::info(
            "station-joined-nearest",
            Place::default(),
            format!("{joined} readings outside every polygon joined the nearest domain within {} m", nearest.metres),
        ));
    }
    let outside = count(|l| matches!(l, Located::Outside));
    if outside == readings.len() && outside > 0 {
        let least = readings.position.par_iter().map(|&at| locator.distance(at)).reduce(|| f64::INFINITY, f64::min);
        notices.push(
            Notice::warning(
                "all-stations-outside",
                Place::default(),
                format!("all {outside} readings lie outside every polygon, the nearest {least:.6} map units away"),
            )
            .hint("check the CRS of the stations and of the polygons"),
        );
    } else if outside > 0 {
        notices.push(
            Notice::warning(
                "station-outside",
                Place::default(),
                format!(
                    "{outside} of {} readings lie outside every domain; they stay in the output with no domain",
                    readings.len()
                ),
            )
            .hint("domains.nearest_m lets stations near a polygon join it"),
        );
    }
    let of = located.iter().map(|l| l.index().map(DomainId::of_index)).collect();
    let list = polygons
        .into_iter()
        .enumerate()
        .map(|(i, p)| Domain { id: DomainId::of_index(i), name: p.name, shape: p.shape })
        .collect();
    (Domains { method, list, of }, notices)
}
