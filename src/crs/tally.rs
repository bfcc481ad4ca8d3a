//! What is worth saying once about many readings.

use super::definition::MapCrs;
use super::magnetic::CAUTION_NT;
use super::source::Outcome;
use crate::notice::{Notice, Place};
use crate::station::Measurements;
use std::collections::BTreeSet;

/// Turns below this many degrees are not worth a word: no symbol is drawn that finely.
const NEGLIGIBLE: f64 = 0.05;

/// Lowest and highest value seen, with their number.
#[derive(Debug, Clone, Copy)]
struct Span {
    n: usize,
    low: f64,
    high: f64,
}

impl Default for Span {
    fn default() -> Self {
        Self { n: 0, low: f64::INFINITY, high: f64::NEG_INFINITY }
    }
}

impl Span {
    fn add(&mut self, value: f64) {
        self.n += 1;
        self.low = self.low.min(value);
        self.high = self.high.max(value);
    }
    fn join(&mut self, other: &Self) {
        self.n += other.n;
        self.low = self.low.min(other.low);
        self.high = self.high.max(other.high);
    }
}

/// "1 reading", "2 readings".
fn counted(n: usize, what: &str) -> String {
    if n == 1 { format!("1 {what}") } else { format!("{n} {what}s") }
}

/// Two decimals, and no "-0.00".
fn hundredths(degrees: f64) -> String {
    format!("{:.2}", (degrees * 100.0).round() / 100.0 + 0.0)
}

/// Counts over the rows of one source, or of all.
#[derive(Debug, Default)]
pub(super) struct Tally {
    /// Rows outside the areas of use, or nowhere.
    pub misplaced: usize,
    outside: Span,
    first_outside: Option<u64>,
    /// Turn between azimuth - convergence and the line as drawn.
    drawn: Span,
    latitude: Span,
    grid: Span,
    model: Span,
    models: BTreeSet<&'static str>,
    weak: usize,
    first_weak: Option<u64>,
}

impl Tally {
    /// Takes in one row.
    pub fn count(&mut self, row: u64, outcome: &Outcome) {
        self.misplaced += usize::from(outcome.misplaced);
        let Ok(settled) = &outcome.settled else { return };
        if let Some(km) = outcome.outside_km {
            self.outside.add(km);
            self.first_outside.get_or_insert(row);
        }
        self.latitude.add(settled.latitude.abs());
        if let (Some(drawn), Some(azimuth)) = (settled.grid_azimuth, settled.attitude.azimuth()) {
            let turn = drawn.degrees() - (azimuth.degrees() - settled.convergence);
            self.drawn.add(((turn + 180.0).rem_euclid(360.0) - 180.0).abs());
        }
        if let Some(convergence) = settled.source_convergence {
            self.grid.add(convergence);
        }
        if let Some((horizontal, name)) = settled.model {
            self.model.add(settled.declination);
            self.models.insert(name);
            if horizontal < CAUTION_NT {
                self.weak += 1;
                self.first_weak.get_or_insert(row);
            }
        }
    }

    /// Takes in another source's tally, for [`Tally::map_notices`].
    pub fn join(&mut self, other: &Self) {
        self.drawn.join(&other.drawn);
        self.latitude.join(&other.latitude);
    }

    /// What concerns one source, whose CRS is called `crs`.
    pub fn source_notices(&self, source: &Measurements, crs: &str, map: &MapCrs) -> Vec<Notice> {
        let file = || Place::file(&source.source);
        let mut notices = Vec::new();
        if self.grid.n > 0 {
            let Span { n, low, high } = self.grid;
            let message = format!(
                "{} from grid north became true by adding the convergence of {crs}: {} to {} degrees",
                counted(n, "azimuth"),
                hundredths(low),
                hundredths(high)
            );
            notices.push(Notice::info("convergence-added", file(), message));
        }
        if self.model.n > 0 {
            let Span { n, low, high } = self.model;
            let names = self.models.iter().copied().collect::<Vec<_>>().join(" and ");
            let message = format!(
                "{} from magnetic north became true by adding the declination of {names}: {} to {} degrees",
                counted(n, "azimuth"),
                hundredths(low),
                hundredths(high)
            );
            notices.push(Notice::info("declination-from-model", file(), message));
        }
        if let Some(first) = self.first_weak {
            let message = format!(
                "at {} the horizontal magnetic field is below {CAUTION_NT} nT: a compass is not reliable there",
                counted(self.weak, "reading")
            );
            notices.push(Notice::warning("compass-unreliable", file().at_row(first), message));
        }
        if let (Some(first), Some(area)) = (self.first_outside, map.area_of_use()) {
            let message = format!(
                "{} of {} {} outside the area of use of {} ({}), by up to {:.1} km",
                self.outside.n,
                counted(source.position.len(), "reading"),
                if self.outside.n == 1 { "lies" } else { "lie" },
                map.label(),
                area,
                self.outside.high
            );
            notices.push(
                Notice::warning("outside-area-of-use", file().at_row(first), message)
                    .hint("check the positions and their CRS, or choose a map CRS made for this ground"),
            );
        }
        notices
    }

    /// What concerns the map.
    pub fn map_notices(&self, map: &MapCrs) -> Option<Notice> {
        if !map.is_projected() {
            let turn = map.largest_plate_carree_turn(self.latitude.high)?;
            let message = format!(
                "the map CRS {} is geographic: rotations are true azimuths, and a map drawn with degrees as x and y \
                 shows strikes turned by up to {turn:.1} degrees here",
                map.label()
            );
            return Some(
                Notice::warning("map-geographic", Place::default(), message)
                    .hint("choose a projected CRS for the map, for example the UTM zone"),
            );
        }
        (self.drawn.n > 0 && self.drawn.high >= NEGLIGIBLE).then(|| {
            let message = format!(
                "{} does not keep angles: symbols follow the strike as it is drawn, which differs from azimuth - \
                 convergence by up to {:.2} degrees here",
                map.label(),
                self.drawn.high
            );
            Notice::warning("map-not-conformal", Place::default(), message)
                .hint("a conformal CRS (UTM, Lambert conformal) shows angles as they are")
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_read_well() {
        assert_eq!(
            (hundredths(-0.001), hundredths(-0.005), hundredths(2.34567)),
            ("0.00".into(), "-0.01".into(), "2.35".into())
        );
        assert_eq!((counted(1, "reading"), counted(0, "reading")), ("1 reading".into(), "0 readings".into()));
    }
}
