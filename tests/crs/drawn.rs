//! Maps that do not keep angles: symbols follow the line as drawn.

use crate::support::{at, bedding, placed};
use homocline::crs::{MapCrs, orient};
use homocline::notice::{Severity, Silent};
use homocline::orientation::TrueAzimuth;
use homocline::station::North;

fn azimuth(degrees: f64) -> TrueAzimuth {
    TrueAzimuth::new(degrees).unwrap()
}

// Computed with pyproj 3.7.2 (PROJ 9.5.1): 1 m to either side along the geodesic azimuth, projected.
#[test]
fn equal_area_maps_turn_strikes() {
    for (code, base, lon, lat, drawn, plain) in [
        ("EPSG:5070", "EPSG:4269", -120.0, 48.0, 59.943, 59.470),
        ("EPSG:3035", "EPSG:4258", -8.0, 40.0, 58.141, 57.409),
    ] {
        let map = MapCrs::parse(code).unwrap();
        assert!(map.is_projected() && !map.is_conformal());
        let place = placed(&map, base, lon, lat);
        let north = map.local_north(place).unwrap();
        let got = north.grid_azimuth(azimuth(45.0)).degrees();
        assert!((got - drawn).abs() < 6e-4, "{code}: {got}, reference {drawn}");
        assert!((45.0 - north.convergence() - plain).abs() < 6e-4, "{code}: {}", north.convergence());
        // Along the meridian both ways agree.
        assert!((north.grid_azimuth(azimuth(0.0)).degrees() - (-north.convergence()).rem_euclid(360.0)).abs() < 1e-9);
    }
}

// A strike as drawn is the direction between two projected points of the geodesic: here the independent
// check is two points 0.00001 degrees of latitude apart and their offset in longitude on a sphere, where an
// azimuth of 45 degrees means equal lengths.
#[test]
fn on_a_sphere_the_drawn_line_joins_projected_points() {
    let sphere = "+proj=longlat +R=6371000";
    let map = MapCrs::parse("+proj=laea +lat_0=50 +lon_0=10 +R=6371000").unwrap();
    let (lon, lat, step) = (-20.0_f64, 35.0_f64, 1e-5);
    let aside = step / lat.to_radians().cos();
    let from = placed(&map, sphere, lon - aside, lat - step);
    let to = placed(&map, sphere, lon + aside, lat + step);
    let want = (to.x - from.x).atan2(to.y - from.y).to_degrees();
    let got = map.grid_azimuth(placed(&map, sphere, lon, lat), azimuth(45.0)).unwrap().degrees();
    assert!((got - want).abs() < 1e-5, "{got} {want}");
}

// An equal-area azimuthal map is not conformal, but at its centre, where all its scales are one, it is.
#[test]
fn at_the_centre_of_an_azimuthal_map_nothing_turns() {
    let map = MapCrs::parse("+proj=laea +lat_0=50 +lon_0=10 +ellps=GRS80").unwrap();
    for degrees in [0.0, 33.0, 90.0, 211.0, 359.0] {
        let got = map.grid_azimuth(at(0.0, 0.0), azimuth(degrees)).unwrap().degrees();
        assert!(((got - degrees + 180.0).rem_euclid(360.0) - 180.0).abs() < 1e-6, "{got} {degrees}");
    }
}

// On the edge where a map of the world is cut open, one of the two sides is on the far side of the map.
#[test]
fn the_cut_of_a_world_map_does_not_turn_strikes() {
    let map = MapCrs::parse("+proj=cea +lat_ts=0 +lon_0=0 +R=6371000").unwrap();
    let edge = std::f64::consts::PI * 6_371_000.0;
    let inner = map.grid_azimuth(at(edge - 100_000.0, 3_000_000.0), azimuth(45.0)).unwrap().degrees();
    for x in [edge - 1.0, 1.0 - edge, edge - 300.0] {
        let got = map.grid_azimuth(at(x, 3_000_000.0), azimuth(45.0)).unwrap().degrees();
        assert!((got - inner).abs() < 1e-6, "{x}: {got}, inside {inner}");
    }
}

#[test]
fn such_a_map_is_warned_about() {
    let map = MapCrs::parse("EPSG:3035").unwrap();
    let oriented = orient(vec![bedding("EPSG:4258", North::True, vec![at(-8.0, 40.0)])], &map, &Silent).unwrap();
    let drawn = oriented.readings.grid_azimuth[0].unwrap().degrees();
    assert!((drawn - 58.141).abs() < 6e-4);
    let notice = oriented.notices.iter().find(|n| n.code == "map-not-conformal").unwrap();
    assert_eq!(notice.severity, Severity::Warning);
    assert!(notice.message.contains("0.73 degrees"), "{}", notice.message);

    let utm = MapCrs::parse("EPSG:32629").unwrap();
    let oriented = orient(vec![bedding("EPSG:4326", North::True, vec![at(-8.0, 40.0)])], &utm, &Silent).unwrap();
    assert!(oriented.notices.is_empty(), "{:?}", oriented.notices);
}

// Degrees drawn as x and y at latitude 60: a strike of 45 is drawn at 63.4 (computed with pyproj 3.7.2), turned
// by 18.4; the most on a sphere is asin((2 - 1) / (2 + 1)) = 19.47 degrees.
#[test]
fn a_geographic_map_keeps_true_azimuths_and_says_so() {
    let map = MapCrs::parse("EPSG:4326").unwrap();
    let oriented = orient(vec![bedding("EPSG:4326", North::True, vec![at(25.0, 60.0)])], &map, &Silent).unwrap();
    assert_eq!(oriented.readings.grid_azimuth[0].unwrap().degrees(), 45.0);
    assert_eq!(oriented.readings.convergence[0], 0.0);
    let notice = oriented.notices.iter().find(|n| n.code == "map-geographic").unwrap();
    assert!(notice.message.contains("19.4 degrees"), "{}", notice.message);
    let sphere = MapCrs::parse("+proj=longlat +R=6371000").unwrap();
    let most = sphere.largest_plate_carree_turn(60.0).unwrap();
    assert!((most - (1.0_f64 / 3.0).asin().to_degrees()).abs() < 1e-9);
}
