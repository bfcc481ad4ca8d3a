//! Rows that say exactly the same twice: one outcrop digitised on two sheets, one file read in two halves.

use crate::notice::{Notice, Place};
use crate::orientation::Measured;
use crate::station::Measurements;
use rayon::prelude::*;

fn mix(hash: u64, bits: u64) -> u64 {
    let x = (hash ^ bits).wrapping_mul(0x9e37_79b9_7f4a_7c15);
    x ^ (x >> 29)
}

/// What makes two rows the same, as numbers.
fn key(m: &Measurements, i: usize) -> [u64; 5] {
    let (azimuth, inclination, flag) = match m.measured[i] {
        Measured::Plane { strike: Some(s), dip } => (s.degrees(), dip.degrees(), 0),
        Measured::Plane { strike: None, dip } => (0.0, dip.degrees(), 1),
        Measured::Line { trend, plunge } => (trend.degrees(), plunge.degrees(), 2),
    };
    let p = m.position[i];
    let structure = u64::from(m.structure[i]) << 2 | flag;
    [(p.x + 0.0).to_bits(), (p.y + 0.0).to_bits(), azimuth.to_bits(), inclination.to_bits(), structure]
}

fn hash(m: &Measurements, i: usize) -> u64 {
    let start = key(m, i).into_iter().fold(0x2545_f491_4f6c_dd1d, mix);
    m.station_id.get(i).unwrap_or("").bytes().fold(start, |h, b| mix(h, u64::from(b)))
}

fn same(m: &Measurements, i: usize, j: usize) -> bool {
    key(m, i) == key(m, j) && m.station_id.get(i) == m.station_id.get(j)
}

/// Warns of exact duplicates (place, structure, attitude and id); they are kept.
pub(super) fn report(m: &Measurements, file: &str, notices: &mut Vec<Notice>) {
    let mut order: Vec<(u64, u32)> = (0..m.position.len()).into_par_iter().map(|i| (hash(m, i), i as u32)).collect();
    order.par_sort_unstable();
    // Within one hash the rows stand in source order, so a duplicate follows one it repeats.
    let mut count = 0usize;
    let mut first: Option<(usize, usize)> = None;
    for group in order.chunk_by(|a, b| a.0 == b.0).filter(|g| g.len() > 1) {
        let mut originals: Vec<usize> = Vec::new();
        for &(_, i) in group {
            let i = i as usize;
            match originals.iter().find(|&&o| same(m, o, i)) {
                Some(&original) => {
                    count += 1;
                    if first.is_none_or(|(_, repeat)| i < repeat) {
                        first = Some((original, i));
                    }
                }
                None => originals.push(i),
            }
        }
    }
    if let Some((original, repeat)) = first {
        let rows = if count == 1 { "1 row repeats".to_owned() } else { format!("{count} rows repeat") };
        let text = format!(
            "{rows} an earlier one exactly (place, structure, attitude, id); the first is row {} as row {}",
            m.source_row[repeat], m.source_row[original]
        );
        notices.push(
            Notice::warning("duplicate-rows", Place::file(file).at_row(m.source_row[repeat]), text)
                .hint("they were kept; take them out where one reading was entered twice"),
        );
    }
}
