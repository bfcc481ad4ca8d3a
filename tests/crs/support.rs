//! What several of these tests need.

use geo_types::Coord;
use homocline::crs::{MapCrs, Transformer};
use homocline::orientation::{Bearing, Dip, Measured, Polarity};
use homocline::station::{Kind, Measurements, North, Structure};
use homocline::table::TextColumn;

pub fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

pub fn dms(degrees: f64, minutes: f64, seconds: f64) -> f64 {
    degrees + minutes / 60.0 + seconds / 3600.0
}

/// A place of the map given by longitude and latitude in another CRS.
pub fn placed(map: &MapCrs, geographic: &str, lon: f64, lat: f64) -> Coord<f64> {
    let mut place = [at(lon, lat)];
    let from = MapCrs::parse(geographic).unwrap();
    assert!(Transformer::new(&from, map).unwrap().coords(&mut place).is_empty());
    place[0]
}

/// Bedding planes, strike 045 dip 30, one per position.
pub fn bedding(crs: &str, north: North, position: Vec<Coord<f64>>) -> Measurements {
    let n = position.len();
    let plane = Measured::Plane { strike: Some(Bearing::new(45.0).unwrap()), dip: Dip::new(30.0).unwrap() };
    let mut station_id = TextColumn::default();
    (0..n).for_each(|i| station_id.push(Some(&format!("S{i}"))));
    Measurements {
        source: "stations.csv".to_owned(),
        crs: crs.to_owned(),
        north,
        structures: vec![Structure { name: "bedding".to_owned(), kind: Kind::Planar }],
        table_row: (0..n as u32).collect(),
        source_row: (2..n as u64 + 2).collect(),
        station_id,
        position,
        elevation: vec![0.0; n],
        structure: vec![0; n],
        measured: vec![plane; n],
        polarity: vec![Polarity::Unknown; n],
        weight: vec![1.0; n],
        declination: Vec::new(),
        year: Vec::new(),
    }
}
