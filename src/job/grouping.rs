//! Readings grouped by domain and structure, and which readings share a station.

use crate::domain::Domains;
use crate::notice::{Notice, Place};
use crate::orientation::Axis;
use crate::station::Readings;
use std::collections::HashMap;

/// The sample of one structure in one domain.
pub(super) struct Group {
    /// Position in [`Domains::list`].
    pub domain: usize,
    /// Index into [`Readings::structures`].
    pub structure: usize,
    /// Positions in [`Readings`].
    pub readings: Vec<u32>,
    /// One axis per reading.
    pub axes: Vec<Axis>,
    /// Its weight.
    pub weights: Vec<f64>,
    /// Its station, as [`stations`] numbers them.
    pub stations: Vec<u32>,
}

/// All samples that hold a reading, sorted by domain, then structure. Readings outside every domain are in none.
pub(super) fn groups(readings: &Readings, domains: &Domains, stations: &[u32]) -> Vec<Group> {
    let structures = readings.structures.len();
    let cell = |i: usize| domains.of[i].map(|id| id.index() * structures + readings.structure[i] as usize);
    let mut sizes = vec![0_usize; domains.list.len() * structures];
    (0..readings.len()).filter_map(cell).for_each(|c| sizes[c] += 1);
    let mut place = vec![usize::MAX; sizes.len()];
    let mut groups: Vec<Group> = Vec::new();
    for (c, &size) in sizes.iter().enumerate().filter(|(_, size)| **size > 0) {
        place[c] = groups.len();
        groups.push(Group {
            domain: c / structures,
            structure: c % structures,
            readings: Vec::with_capacity(size),
            axes: Vec::with_capacity(size),
            weights: Vec::with_capacity(size),
            stations: Vec::with_capacity(size),
        });
    }
    for (i, &station) in stations.iter().enumerate() {
        if let Some(c) = cell(i) {
            let group = &mut groups[place[c]];
            group.readings.push(i as u32);
            group.axes.push(readings.attitude[i].axis());
            group.weights.push(readings.weight[i]);
            group.stations.push(station);
        }
    }
    groups
}

/// A number per reading, equal for readings of one station: those of one source with one id, and those without
/// an id at exactly one place. `metres` is the length of a map unit.
pub(super) fn stations(readings: &Readings, metres: f64) -> (Vec<u32>, Vec<Notice>) {
    let mut by_id: HashMap<(u16, &str), u32> = HashMap::new();
    let mut by_place: HashMap<(u64, u64), u32> = HashMap::new();
    // Where each station was first met, and how far from there it was met again.
    let mut first: Vec<(usize, f64)> = Vec::new();
    let mut without_id = 0_usize;
    let mut numbers = Vec::with_capacity(readings.len());
    for i in 0..readings.len() {
        let at = readings.position[i];
        let next = first.len() as u32;
        let number = match readings.station_id.get(i) {
            Some(id) => *by_id.entry((readings.source[i], id)).or_insert(next),
            None => {
                without_id += 1;
                // + 0.0 makes -0 and 0 one place.
                *by_place.entry(((at.x + 0.0).to_bits(), (at.y + 0.0).to_bits())).or_insert(next)
            }
        };
        if number == next {
            first.push((i, 0.0));
        }
        let (start, apart) = &mut first[number as usize];
        *apart = apart.max((at.x - readings.position[*start].x).hypot(at.y - readings.position[*start].y));
        numbers.push(number);
    }
    let mut notices = Vec::new();
    if without_id > by_place.len() {
        let message = format!(
            "{without_id} readings have no station id and lie at {} different places; readings at exactly one place count as one station",
            by_place.len()
        );
        notices.push(
            Notice::warning("stations-by-place", Place::default(), message)
                .hint("name the id column with stations.columns.id"),
        );
    }
    let wide = first.iter().filter(|(_, apart)| apart * metres > WIDEST_STATION).count();
    let widest = first.iter().copied().reduce(|a, b| if b.1 > a.1 { b } else { a });
    if let (true, Some((reading, apart))) = (wide > 0, widest) {
        let id = readings.station_id.get(reading).unwrap_or_default();
        let message = format!(
            "stations whose readings lie more than {WIDEST_STATION} m apart: {wide}, the widest \"{id}\" with {:.0} m; each still counts as one station",
            apart * metres
        );
        let place = Place::file(&readings.sources[readings.source[reading] as usize]);
        notices.push(
            Notice::warning("station-wide", place, message).hint("is stations.columns.id really the station's id?"),
        );
    }
    (numbers, notices)
}

/// Readings of one outcrop lie closer than this, whatever the receiver.
const WIDEST_STATION: f64 = 250.0;
