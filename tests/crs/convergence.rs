//! Convergence and grid bearings on conformal maps.

use crate::support::{dms, placed};
use homocline::crs::MapCrs;
use homocline::orientation::TrueAzimuth;

/// 0.01 arc second in degrees.
const HUNDREDTH_OF_A_SECOND: f64 = 0.01 / 3600.0;

struct Published {
    crs: &'static str,
    geographic: &'static str,
    lon: f64,
    lat: f64,
    convergence: f64,
    within: f64,
}

fn check(rows: &[Published]) {
    for row in rows {
        let map = MapCrs::parse(row.crs).unwrap();
        let got = map.convergence(placed(&map, row.geographic, row.lon, row.lat)).unwrap();
        let (want, crs) = (row.convergence, row.crs);
        assert!((got - want).abs() <= row.within, "{crs} at {} {}: {got}, published {want}", row.lon, row.lat);
    }
}

fn row(crs: &'static str, geographic: &'static str, lon: f64, lat: f64, convergence: f64, within: f64) -> Published {
    Published { crs, geographic, lon, lat, convergence, within }
}

// Geocentric Datum of Australia Technical Manual: Flinders Peak and Buninyong. The manual's grid convergence
// has the opposite sign. Printed to 0.01".
#[test]
fn gda_manual() {
    let flinders = (dms(144.0, 25.0, 29.52442), -dms(37.0, 57.0, 3.72030));
    let buninyong = (dms(143.0, 55.0, 35.38393), -dms(37.0, 39.0, 10.15611));
    let within = 1.05 * HUNDREDTH_OF_A_SECOND;
    check(&[
        row("EPSG:28355", "EPSG:4283", flinders.0, flinders.1, dms(1.0, 35.0, 3.65), within),
        row("EPSG:7855", "EPSG:7844", flinders.0, flinders.1, dms(1.0, 35.0, 3.65), within),
        row("EPSG:28355", "EPSG:4283", buninyong.0, buninyong.1, dms(1.0, 52.0, 43.22), within),
        row("EPSG:28354", "EPSG:4283", buninyong.0, buninyong.1, -dms(1.0, 47.0, 19.36), within),
    ]);
}

// The same manual: azimuth of the line between the two and its grid bearing at both ends, printed to 0.01".
#[test]
fn gda_manual_end_to_end() {
    let map = MapCrs::parse("EPSG:28355").unwrap();
    for (lon, lat, azimuth, bearing) in [
        (dms(144.0, 25.0, 29.52442), -dms(37.0, 57.0, 3.72030), dms(306.0, 52.0, 5.37), dms(305.0, 17.0, 1.72)),
        (dms(143.0, 55.0, 35.38393), -dms(37.0, 39.0, 10.15611), dms(127.0, 10.0, 25.07), dms(125.0, 17.0, 41.86)),
    ] {
        let place = placed(&map, "EPSG:4283", lon, lat);
        let got = map.grid_azimuth(place, TrueAzimuth::new(azimuth).unwrap()).unwrap().degrees();
        assert!((got - bearing).abs() <= 1.05 * HUNDREDTH_OF_A_SECOND, "{got}, published {bearing}");
    }
}

// Defense Mapping Agency, Technical Manual 8358.2, worked examples for UTM and the International ellipsoid. The
// manual counts convergence positive west of the central meridian in the north; the southern example follows
// the same rule without regard to the hemisphere, so its sign on the ground is the opposite. Printed to 0.01".
#[test]
fn dma_manual() {
    let within = 1.05 * HUNDREDTH_OF_A_SECOND;
    const BASE: &str = "+proj=longlat +ellps=intl";
    check(&[
        row("+proj=utm +zone=48 +ellps=intl", BASE, 102.0, 30.0, -dms(1.0, 30.0, 3.76), within),
        row(
            "+proj=utm +zone=12 +ellps=intl",
            BASE,
            -dms(113.0, 54.0, 43.321),
            dms(72.0, 4.0, 32.110),
            -dms(2.0, 46.0, 15.31),
            within,
        ),
        row(
            "+proj=utm +zone=47 +ellps=intl",
            BASE,
            dms(101.0, 59.0, 59.805),
            dms(30.0, 0.0, 6.489),
            dms(1.0, 30.0, 3.96),
            within,
        ),
        row(
            "+proj=utm +zone=31 +ellps=intl",
            BASE,
            dms(0.0, 16.0, 17.099),
            dms(9.0, 2.0, 10.706),
            -dms(0.0, 25.0, 43.95),
            within,
        ),
        row(
            "+proj=utm +zone=31 +south +ellps=intl",
            BASE,
            dms(0.0, 3.0, 33.695),
            -dms(54.0, 6.0, 28.992),
            dms(2.0, 22.0, 58.83),
            within,
        ),
    ]);
}

// IOGP Guidance Note 7-2 (Lambert conic conformal 2SP: theta; polar stereographic A and B: theta = longitude
// from the origin) and Snyder, USGS Professional Paper 1395 (Lambert conic conformal on the Clarke 1866
// ellipsoid: theta, its last digits from memory).
#[test]
fn guidance_note_and_snyder() {
    const SNYDER: &str = "+proj=lcc +lat_1=33 +lat_2=45 +lat_0=23 +lon_0=-96 +ellps=clrk66";
    check(&[
        row("EPSG:32040", "EPSG:4267", -96.0, 28.5, 0.025_651_77_f64.to_degrees(), 3e-7),
        row(SNYDER, "+proj=longlat +ellps=clrk66", -75.0, 35.0, 13.240_425_6, 1e-7),
        row("EPSG:32661", "EPSG:4326", 44.0, 73.0, 44.0, 1e-7),
        row("EPSG:3032", "EPSG:4283", 120.0, -75.0, -50.0, 1e-7),
    ]);
}

// Computed with pyproj 3.7.2 (PROJ 9.5.1) and verified there by finite differences along the meridian,
// six decimals.
#[test]
fn reference_library() {
    let within = 6e-7;
    check(&[
        row("EPSG:27700", "EPSG:4277", 1.717921583333, 52.657570305556, 2.957377, within),
        row("EPSG:27700", "EPSG:4277", 0.5, 50.5, 1.929561, within),
        row("EPSG:29903", "EPSG:4300", -6.25, 53.35, 1.404176, within),
        row("EPSG:2157", "EPSG:4173", -10.0, 52.1, -1.578412, within),
        row("EPSG:2154", "EPSG:4171", -4.5, 48.4, -5.442058, within),
        row("EPSG:3034", "EPSG:4258", 25.0, 60.0, 11.630724, within),
        row("EPSG:3413", "EPSG:4326", 0.0, 80.0, 45.0, within),
        row("EPSG:3031", "EPSG:4326", 150.0, -75.0, -150.0, within),
        row("EPSG:2193", "EPSG:4167", 168.0, -45.5, 3.570747, within),
        row("EPSG:31983", "EPSG:4674", -43.2, -22.9, -0.700622, within),
        row("EPSG:3067", "EPSG:4258", 21.0, 62.0, -5.301969, within),
    ]);
}

// At the pole itself every direction is south; the meridian of the longitude that the inverse projection
// answers decides. It must be a number, and grid north of UPS lies along the prime meridian.
#[test]
fn at_the_pole_there_is_still_a_grid() {
    for code in ["EPSG:32661", "EPSG:32761"] {
        let map = MapCrs::parse(code).unwrap();
        let north = map.local_north(geo_types::Coord { x: 2_000_000.0, y: 2_000_000.0 }).unwrap();
        assert!(north.convergence().is_finite());
        assert!((north.longitude_latitude().y.abs() - 90.0).abs() < 1e-9);
    }
}

// Far from where a projection works there is no convergence, rather than a wrong one.
#[test]
fn nowhere_has_no_convergence() {
    let map = MapCrs::parse("EPSG:32633").unwrap();
    for (x, y) in [(f64::NAN, 0.0), (f64::INFINITY, 0.0), (1e30, 1e30)] {
        assert_eq!(map.convergence(geo_types::Coord { x, y }), None, "{x} {y}");
    }
}
