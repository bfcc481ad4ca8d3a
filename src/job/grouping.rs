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
/// an id at exactly one place.
pub(super) fn stations(readings: &Readings) -> (Vec<u32>, Option<Notice>) {
    let mut by_id: HashMap<(u16, &str), u32> = HashMap::new();
    let mut by_place: HashMap<(u64, u64), u32> = HashMap::new();
    let mut next = 0_u32;
    let mut fresh = || {
        next += 1;
        next - 1
    };
    let numbers = (0..readings.len())
        .map(|i| match readings.station_id.get(i) {
            Some(id) => *by_id.entry((readings.source[i], id)).or_insert_with(&mut fresh),
            None => {
                let at = readings.position[i];
                // + 0.0 makes -0 and 0 one place.
                let key = ((at.x + 0.0).to_bits(), (at.y + 0.0).to_bits());
                *by_place.entry(key).or_insert_with(&mut fresh)
            }
        })
        .collect();
    let without_id = (0..readings.len()).filter(|&i| readings.station_id.get(i).is_none()).count();
    let shared = without_id - by_place.len();
    let notice = (shared > 0).then(|| {
        Notice::warning(
            "stations-by-place",
            Place::default(),
            format!(
                "{without_id} readings have no station id and lie at {} places; readings at exactly one place count as one station",
                by_place.len()
            ),
        )
        .hint("name the id column with stations.columns.id")
    });
    (numbers, notice)
}
