//! One source on its way onto the map: its CRS, its north, and each of its rows.

use super::definition::MapCrs;
use super::error::CrsError;
use super::magnetic::{MODEL_YEARS, calendar, field, model_name};
use super::north::LocalNorth;
use super::transform::Transformer;
use crate::notice::{Notice, Place};
use crate::orientation::notation::shown;
use crate::orientation::{Attitude, Bearing, GridAzimuth, MagneticAzimuth, TrueAzimuth};
use crate::station::{Declination, Measurements, North};
use geo_types::Coord;
use std::ops::Range;

/// A source that can be settled.
pub(super) struct Source<'a> {
    rows: &'a Measurements,
    map: &'a MapCrs,
    crs: MapCrs,
    to_map: Transformer,
    north: Reference,
}

/// Which north, with what is needed to get from it to true north.
enum Reference {
    True,
    Grid,
    Constant(f64),
    PerReading,
    /// To WGS 84, which the models want.
    Model(Transformer),
}

/// What became of a row.
pub(super) struct Outcome {
    pub settled: Result<Settled, Refused>,
    /// Outside the areas of use, or nowhere.
    pub misplaced: bool,
    /// Kilometres outside the map CRS's area of use, where outside.
    pub outside_km: Option<f64>,
}

/// A reading on the map.
pub(super) struct Settled {
    pub position: Coord<f64>,
    pub attitude: Attitude,
    pub grid_azimuth: Option<GridAzimuth>,
    pub declination: f64,
    pub convergence: f64,
    pub latitude: f64,
    /// Convergence of the source's own grid that was added, degrees.
    pub source_convergence: Option<f64>,
    /// Strength of the horizontal magnetic field and name of its model, where one was asked.
    pub model: Option<(f64, &'static str)>,
}

/// Why a row is not on the map.
pub(super) struct Refused {
    pub code: &'static str,
    pub value: String,
    pub reason: String,
}

/// A position that has no place in the map CRS.
const NOT_PROJECTABLE: &str = "position-not-projectable";

const NOWHERE: Coord<f64> = Coord { x: f64::NAN, y: f64::NAN };

/// Bits of longitude, latitude, height and year that a model was asked for.
type ModelKey = [u64; 4];
/// Declination and horizontal field, where the model has them.
type ModelAnswer = Option<(f64, f64)>;

/// A turn to true north: degrees to add, and the declination among them (NaN where none).
#[derive(Clone, Copy)]
struct Turn {
    degrees: f64,
    declination: f64,
    source_convergence: Option<f64>,
    model: Option<(f64, &'static str)>,
}

impl<'a> Source<'a> {
    /// Checks what concerns the source as a whole.
    pub fn new(rows: &'a Measurements, map: &'a MapCrs) -> Result<Self, CrsError> {
        let crs = MapCrs::parse(&rows.crs)?;
        let to_map = Transformer::new(&crs, map)?;
        let per_row = |what, values: usize| match rows.position.len() {
            n if n == values => Ok(()),
            n => Err(CrsError::Lengths { what, rows: n, values }),
        };
        let north = match &rows.north {
            North::True => Reference::True,
            North::Grid if !crs.is_projected() => return Err(CrsError::NoGrid { crs: crs.label() }),
            North::Grid if crs.points_west_and_south() => return Err(CrsError::AxesReversed { crs: crs.label() }),
            North::Grid => Reference::Grid,
            North::Magnetic(Declination::Constant(d)) if (-180.0..=180.0).contains(d) => Reference::Constant(*d),
            North::Magnetic(Declination::Constant(d)) => return Err(CrsError::Declination { value: *d }),
            North::Magnetic(Declination::PerReading) => {
                per_row("declinations", rows.declination.len())?;
                Reference::PerReading
            }
            North::Magnetic(Declination::Model) => {
                per_row("dates", rows.year.len())?;
                per_row("elevations", rows.elevation.len())?;
                Reference::Model(Transformer::new(&crs, &MapCrs::parse("EPSG:4326")?)?)
            }
        };
        Ok(Self { rows, map, crs, to_map, north })
    }

    /// What messages call the source's CRS.
    pub fn label(&self) -> String {
        self.crs.label()
    }

    /// What to know about the shift between the source's datum and the map's; nothing where it is exact to a
    /// metre or there is none. Judged at the first position that has a place.
    pub fn datum_notice(&self) -> Option<Notice> {
        let way = self.to_map.way(&self.rows.position)?;
        let (from, to, file) = (self.crs.label(), self.map.label(), Place::file(&self.rows.source));
        if way.ballpark {
            let message = format!(
                "positions went from {from} to {to} without a datum shift, because none is known here: they may be \
                 off by up to some hundred metres"
            );
            let hint = "install the datum grids for PROJ, or give positions on the map's datum";
            return Some(Notice::warning("datum-shift-unknown", file, message).hint(hint));
        }
        let metres = way.accuracy.filter(|&metres| metres > 1.0)?;
        let message = format!("positions went from {from} to {to} by \"{}\", good to {metres} m", way.name);
        Some(Notice::info("datum-shift", file, message))
    }

    /// Settles a range of rows, on this thread.
    pub fn settle(&self, range: Range<usize>) -> Vec<Outcome> {
        let given = &self.rows.position[range.clone()];
        let mut mapped = given.to_vec();
        self.to_map.chunk(&mut mapped);
        let norths = self.map.local_norths_chunk(&mapped);
        let own_norths = match self.north {
            Reference::Grid if self.crs != *self.map => Some(self.crs.local_norths_chunk(given)),
            _ => None,
        };
        let global = match &self.north {
            Reference::Model(to_global) => {
                let mut global = given.to_vec();
                to_global.chunk(&mut global);
                Some(global)
            }
            _ => None,
        };
        let strays = self.strays(given);
        let mut last_model = None;
        (0..given.len())
            .map(|i| {
                let row = range.start + i;
                let Some(north) = norths[i] else {
                    return Outcome { settled: Err(self.nowhere(given[i])), misplaced: true, outside_km: None };
                };
                let outside_km = self.map.area_of_use().and_then(|area| {
                    let place = north.longitude_latitude();
                    (!area.contains(place)).then(|| area.distance_km(place))
                });
                let own = own_norths.as_ref().map_or(Some(north), |own| own[i]);
                let turn = self.turn(row, own, global.as_ref().map(|g| g[i]), &mut last_model);
                let settled = turn.map(|turn| self.on_the_map(row, mapped[i], north, &turn));
                Outcome { settled, misplaced: outside_km.is_some() || strays[i], outside_km }
            })
            .collect()
    }

    fn on_the_map(&self, row: usize, position: Coord<f64>, north: LocalNorth, turn: &Turn) -> Settled {
        let attitude = self.rows.measured[row].resolved(|bearing| self.settled_azimuth(bearing, turn));
        Settled {
            position,
            attitude,
            grid_azimuth: attitude.azimuth().map(|azimuth| north.grid_azimuth(azimuth)),
            declination: turn.declination,
            convergence: north.convergence(),
            latitude: north.longitude_latitude().y,
            source_convergence: turn.source_convergence,
            model: turn.model,
        }
    }

    /// The bearing named for what it is, then turned to true north.
    fn settled_azimuth(&self, bearing: Bearing, turn: &Turn) -> TrueAzimuth {
        const FINITE: &str = "bearings and turns are finite";
        match self.north {
            Reference::True => TrueAzimuth::new(bearing.degrees()).expect(FINITE),
            Reference::Grid => true_of_grid(GridAzimuth::new(bearing.degrees()).expect(FINITE), turn.degrees),
            _ => true_of_magnetic(MagneticAzimuth::new(bearing.degrees()).expect(FINITE), turn.degrees),
        }
    }

    fn turn(
        &self,
        row: usize,
        own: Option<LocalNorth>,
        global: Option<Coord<f64>>,
        last_model: &mut Option<(ModelKey, ModelAnswer)>,
    ) -> Result<Turn, Refused> {
        let none = Turn { degrees: 0.0, declination: f64::NAN, source_convergence: None, model: None };
        let magnetic = |d: f64, model| Turn { degrees: d, declination: d, source_convergence: None, model };
        let has_azimuth = self.rows.measured[row].bearing().is_some();
        let found = match self.north {
            Reference::True => Ok(none),
            Reference::Grid => match own {
                Some(north) => {
                    let gamma = north.convergence();
                    Ok(Turn { degrees: gamma, source_convergence: Some(gamma), ..none })
                }
                None => Err(self.nowhere(self.rows.position[row])),
            },
            Reference::Constant(d) => Ok(magnetic(d, None)),
            Reference::PerReading => declination_as_given(self.rows.declination[row]).map(|d| magnetic(d, None)),
            Reference::Model(_) => {
                let (place, year) = (global.unwrap_or(NOWHERE), self.rows.year[row]);
                let height = f64::from(self.rows.elevation[row]);
                let key = [place.x, place.y, height, year].map(f64::to_bits);
                // Readings of one station follow each other: the model is asked once for them.
                let answer = match last_model {
                    Some((asked, answer)) if *asked == key => *answer,
                    _ => field(place.x, place.y, height, year).map(|f| (f.declination, f.horizontal)),
                };
                *last_model = Some((key, answer));
                match (answer, model_name(year)) {
                    (Some((d, horizontal)), Some(name)) => Ok(magnetic(d, Some((horizontal, name)))),
                    _ => Err(no_model(year, place)),
                }
            }
        };
        match found {
            // A horizontal plane without azimuth has nothing to turn.
            Err(refused) if !has_azimuth && refused.code != NOT_PROJECTABLE => Ok(none),
            other => other,
        }
    }

    fn nowhere(&self, at: Coord<f64>) -> Refused {
        let (x, y) = (at.x, at.y);
        let (as_x, as_y) = (shown(x), shown(y));
        let quarter = 90.0 / self.crs.base_unit_in_degrees();
        let hint = if self.crs.is_projected() {
            format!("check x, y and that the source's CRS is {}", self.crs.label())
        } else if y.abs() > quarter && x.abs() <= quarter && y.abs() <= 2.0 * quarter {
            "a latitude cannot be that large: longitude and latitude look exchanged".to_owned()
        } else if x.abs() > 4.0 * quarter || y.abs() > quarter {
            format!("not a longitude and latitude: they look projected, but the source's CRS is {}", self.crs.label())
        } else {
            "the place is too far from where this map projection works".to_owned()
        };
        let reason = format!("x {as_x}, y {as_y} has no place in {}; {hint}", self.map.label());
        Refused { code: NOT_PROJECTABLE, value: format!("{as_x}, {as_y}"), reason }
    }

    /// Whether each position lies outside the area of use of the source's own CRS.
    fn strays(&self, given: &[Coord<f64>]) -> Vec<bool> {
        match self.crs.area_of_use() {
            // The map's own area is looked at anyway.
            Some(area) if self.crs != *self.map => {
                self.crs.geographic_chunk(given).into_iter().map(|place| !area.contains(place)).collect()
            }
            _ => vec![false; given.len()],
        }
    }

    /// Whether each position lies where both CRSs are meant to be used.
    fn fits(&self, given: &[Coord<f64>]) -> Vec<bool> {
        let mut mapped = given.to_vec();
        self.to_map.coords(&mut mapped);
        let places = self.map.geographic_chunk(&mapped);
        let inside = |place| self.map.area_of_use().is_none_or(|area| area.contains(place)) && place.x.is_finite();
        places.into_iter().zip(self.strays(given)).map(|(place, stray)| inside(place) && !stray).collect()
    }

    /// An error where most positions would fit only with x and y exchanged.
    pub fn exchanged(&self) -> Result<(), CrsError> {
        let given = &self.rows.position;
        let turned: Vec<_> = given.iter().map(|c| Coord { x: c.y, y: c.x }).collect();
        let (as_given, as_turned) = (self.fits(given), self.fits(&turned));
        let mut only_turned = (0..given.len()).filter(|&i| !as_given[i] && as_turned[i]);
        let Some(first) = only_turned.next() else { return Ok(()) };
        let swapped = 1 + only_turned.count();
        if swapped * 2 <= given.len() {
            return Ok(());
        }
        let area = self.map.area_of_use().or(self.crs.area_of_use()).map_or("the map".to_owned(), ToString::to_string);
        Err(CrsError::Swapped {
            swapped,
            stations: given.len(),
            area,
            x: given[first].x,
            y: given[first].y,
            row: self.rows.source_row[first],
            geographic: !self.crs.is_projected(),
        })
    }
}

/// true = grid + convergence.
fn true_of_grid(grid: GridAzimuth, convergence: f64) -> TrueAzimuth {
    TrueAzimuth::new(grid.degrees() + convergence).expect("both are finite")
}

/// true = magnetic + declination.
fn true_of_magnetic(magnetic: MagneticAzimuth, declination: f64) -> TrueAzimuth {
    TrueAzimuth::new(magnetic.degrees() + declination).expect("both are finite")
}

fn declination_as_given(value: f64) -> Result<f64, Refused> {
    if (-180.0..=180.0).contains(&value) {
        return Ok(value);
    }
    let (code, reason) = if value.is_nan() {
        ("no-declination", "the azimuth counts from magnetic north, but the row has no declination".to_owned())
    } else {
        ("declination-out-of-range", format!("a declination of {} degrees is not within -180 to 180", shown(value)))
    };
    Err(Refused { code, value: if value.is_nan() { String::new() } else { value.to_string() }, reason })
}

fn no_model(year: f64, place: Coord<f64>) -> Refused {
    let (x, y) = (place.x, place.y);
    let (code, value, reason) = if !year.is_finite() {
        let reason = "the declination is to come from the geomagnetic model, but the row has no date; \
                      give a date column, or one date for the source";
        ("no-date", String::new(), reason.to_owned())
    } else if model_name(year).is_none() {
        let date = calendar(year);
        let reason = format!("no geomagnetic model covers the date {date} (years {MODEL_YEARS}); check the date");
        ("no-declination-model", date, reason)
    } else {
        let reason = format!("the geomagnetic model has no declination at longitude {x:.6}, latitude {y:.6}");
        ("no-declination-model", format!("{x:.6}, {y:.6}"), reason)
    };
    Refused { code, value, reason }
}
