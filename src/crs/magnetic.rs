//! Declination from a geomagnetic model.

use igrf::declination as igrf_field;
use std::ops::Range;
use world_magnetic_model::GeomagneticField;
use world_magnetic_model::time::{Date, util::days_in_year};
use world_magnetic_model::uom::si::angle::degree;
use world_magnetic_model::uom::si::f32::{Angle, Length};
use world_magnetic_model::uom::si::length::meter;
use world_magnetic_model::uom::si::magnetic_flux_density::nanotesla;

/// Years of the International Geomagnetic Reference Field used here.
const IGRF_YEARS: Range<f64> = 1900.0..2020.0;
/// Years of the World Magnetic Models used here (WMM2020, then WMM2025).
const WMM_YEARS: Range<f64> = 2020.0..2030.0;
/// Years for which there is a model, as messages say it.
pub(super) const MODEL_YEARS: &str = "1900 to 2029";

/// Horizontal field in nT below which a compass is not to be trusted (WMM2025 Technical Report, 1.8: caution zone).
pub(super) const CAUTION_NT: f64 = 6000.0;

/// Heights the models take, metres.
const HEIGHTS: (f64, f64) = (-1000.0, 600_000.0);

/// What a model says of one place and time.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Field {
    /// Degrees, east positive.
    pub declination: f64,
    /// Strength of the horizontal part, nT.
    pub horizontal: f64,
}

/// Name of the model used for a decimal year; `None` outside all models.
pub(super) fn model_name(year: f64) -> Option<&'static str> {
    if IGRF_YEARS.contains(&year) {
        Some("IGRF-13")
    } else if WMM_YEARS.contains(&year) {
        Some(if year < 2025.0 { "WMM2020" } else { "WMM2025" })
    } else {
        None
    }
}

/// The field at a longitude and latitude (degrees, WGS 84), height (metres above the ellipsoid) and decimal
/// year. Dates count to the day. `None` outside the models' years and at the poles, where there is no declination.
pub(super) fn field(longitude: f64, latitude: f64, height: f64, year: f64) -> Option<Field> {
    model_name(year)?;
    let longitude = (longitude + 180.0).rem_euclid(360.0) - 180.0;
    let height = if height.is_finite() { height.clamp(HEIGHTS.0, HEIGHTS.1) } else { 0.0 };
    let whole = year.floor();
    let days = f64::from(days_in_year(whole as i32));
    let elapsed = ((year - whole) * days).round().min(days - 1.0);
    let found = if WMM_YEARS.contains(&year) {
        let date = Date::from_ordinal_date(whole as i32, elapsed as u16 + 1).ok()?;
        let (height, angle) = (Length::new::<meter>(height as f32), |d: f64| Angle::new::<degree>(d as f32));
        let field = GeomagneticField::new(height, angle(latitude), angle(longitude), date).ok()?;
        Field {
            declination: f64::from(field.declination().get::<degree>()),
            horizontal: f64::from(field.h().get::<nanotesla>()),
        }
    } else {
        // This crate counts the first of January as one day gone, and heights in whole metres from 0.
        let date = Date::from_ordinal_date(whole as i32, (elapsed as u16).max(1)).ok()?;
        let field = igrf_field(latitude, longitude, height.max(0.0) as u32, date).ok()?;
        Field { declination: field.d, horizontal: field.h }
    };
    (found.declination.is_finite() && latitude.abs() < 90.0).then_some(found)
}

#[cfg(test)]
mod tests {
    use super::*;
    #[test]
    fn scratch() {
        let text = std::fs::read_to_string("/tmp/mag.txt").unwrap();
        let mut worst: std::collections::BTreeMap<String, Vec<f64>> = Default::default();
        for l in text.lines() {
            let v: Vec<f64> = l.split(' ').map(|x| x.parse().unwrap()).collect();
            let Some(f) = field(v[0], v[1], v[2], v[3]) else { panic!("{l}") };
            let e = (f.declination - v[4] + 540.0).rem_euclid(360.0) - 180.0;
            if f.horizontal < 6000.0 { continue; }
            let key = if v[3] < 2015.0 { "igrf<2015" } else if v[3] < 2020.0 { "igrf15-20" } else { model_name(v[3]).unwrap() };
            worst.entry(key.to_string()).or_default().push(e.abs());
        }
        for (k, mut v) in worst { v.sort_by(f64::total_cmp); println!("{k} n{} median {} p99 {} max {}", v.len(), v[v.len()/2], v[v.len()*99/100], v[v.len()-1]); }
        let t = std::time::Instant::now();
        for i in 0..20000 { std::hint::black_box(field(i as f64/1000., 40.0, 0.0, 2021.3)); }
        println!("wmm {:?}", t.elapsed()/20000);
        let t = std::time::Instant::now();
        for i in 0..20000 { std::hint::black_box(field(i as f64/1000., 40.0, 0.0, 2001.3)); }
        println!("igrf {:?}", t.elapsed()/20000);
    }
}
