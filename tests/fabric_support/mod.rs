//! Reads the reference samples.
#![allow(dead_code)] // each test binary uses its own part

use homocline::orientation::Axis;
use std::path::Path;

/// The numbers of a reference file, row by row; text columns are left out.
pub fn rows(name: &str) -> Vec<Vec<f64>> {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/reference").join(name);
    let mut reader = csv::Reader::from_path(path).unwrap();
    reader.records().map(|r| r.unwrap().iter().filter_map(|f| f.trim().parse().ok()).collect()).collect()
}

/// Poles of planes whose dip direction and dip are the last two numbers of each row.
pub fn poles(name: &str) -> Vec<Axis> {
    rows(name).iter().map(|r| Axis::from_trend_plunge(r[r.len() - 2] + 180.0, 90.0 - r[r.len() - 1])).collect()
}

/// Axes of latitudes and longitudes: x = cos lat cos long towards the first axis of the frame.
pub fn latitude_longitude(name: &str) -> Vec<Axis> {
    rows(name)
        .iter()
        .map(|r| {
            let (lat, long) = (r[0].to_radians(), r[1].to_radians());
            Axis::new(lat.cos() * long.cos(), lat.cos() * long.sin(), lat.sin()).unwrap()
        })
        .collect()
}

/// Longitude and latitude of the end of an axis with z >= 0.
pub fn upper_end(axis: Axis) -> (f64, f64) {
    let v = -axis.vector();
    (v.y.atan2(v.x).to_degrees().rem_euclid(360.0), v.z.atan2(v.x.hypot(v.y)).to_degrees())
}
