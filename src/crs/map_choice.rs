//! Which CRS to draw the map in when nobody said.

use super::definition::MapCrs;
use super::error::CrsError;
use super::transform::Transformer;
use crate::notice::{Notice, Place};
use crate::orientation::ExactSum;
use crate::station::Measurements;
use geo_types::Coord;

/// Length of the mean of unit vectors below which "the middle" means nothing.
const NO_MIDDLE: f64 = 1e-3;

/// The CRS of the first source that is projected; where none is, the WGS 84 UTM zone, north or south, of the
/// stations' centroid on the sphere (beyond 84 N and 80 S the polar stereographic UPS). Always with a notice
/// that says so.
///
/// # Errors
/// A source's CRS that cannot be used; no usable position; stations spread over the whole globe.
pub fn default_map_crs(sources: &[Measurements]) -> Result<(MapCrs, Notice), CrsError> {
    let mut parsed = Vec::with_capacity(sources.len());
    for source in sources {
        parsed.push(MapCrs::parse(&source.crs).map_err(|cause| cause.in_source(&source.source))?);
    }
    let usable = |crs: &MapCrs| crs.is_projected() && !crs.points_west_and_south();
    if let Some(i) = parsed.iter().position(usable) {
        let crs = parsed.swap_remove(i);
        let message = format!("the map is drawn in the stations' CRS, {}", crs.label());
        return Ok((crs, Notice::info("map-crs-chosen", Place::file(&sources[i].source), message)));
    }

    let global = MapCrs::parse("EPSG:4326")?;
    let mut sums = [ExactSum::default(); 3];
    let mut n = 0_usize;
    for (source, crs) in sources.iter().zip(&parsed) {
        let to_global = Transformer::new(crs, &global).map_err(|cause| cause.in_source(&source.source))?;
        let mut places = source.position.clone();
        to_global.coords(&mut places);
        for place in places.iter().filter(|place| place.x.is_finite()) {
            let (sin_lon, cos_lon) = place.x.to_radians().sin_cos();
            let (sin_lat, cos_lat) = place.y.to_radians().sin_cos();
            n += 1;
            for (sum, term) in sums.iter_mut().zip([cos_lat * cos_lon, cos_lat * sin_lon, sin_lat]) {
                sum.add_term(term);
            }
        }
    }
    if n == 0 {
        return Err(CrsError::NoCentroid);
    }
    let [x, y, z] = sums.map(|sum| sum.value() / n as f64);
    if x.hypot(y).hypot(z) < NO_MIDDLE {
        return Err(CrsError::NoZone);
    }
    let centroid = Coord { x: y.atan2(x).to_degrees(), y: z.atan2(x.hypot(y)).to_degrees() };
    let crs = MapCrs::parse(&format!("EPSG:{}", zone_code(centroid)))?;
    let message = format!(
        "the map is drawn in {}, by the middle of the stations at longitude {:.4}, latitude {:.4}",
        crs.label(),
        centroid.x,
        centroid.y
    );
    Ok((crs, Notice::info("map-crs-chosen", Place::default(), message).hint("set the map's crs to draw it in another")))
}

/// EPSG code of the WGS 84 UTM zone at a longitude and latitude, or of UPS near the poles.
fn zone_code(at: Coord<f64>) -> u32 {
    // Zones are 6 degrees wide, the first from 180 W; UTM ends at 84 N and 80 S.
    let zone = ((at.x + 180.0).rem_euclid(360.0) / 6.0).floor() as u32 + 1;
    match at.y {
        lat if lat > 84.0 => 32661,
        lat if lat < -80.0 => 32761,
        lat if lat >= 0.0 => 32600 + zone.min(60),
        _ => 32700 + zone.min(60),
    }
}
