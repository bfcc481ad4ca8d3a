//! Coordinates come out easting or longitude first, whatever the authority's axis order.

use crate::support::{at, dms, placed};
use geo_types::{Geometry, LineString, Polygon, Rect, coord};
use homocline::crs::{MapCrs, Transformer};
use rayon::ThreadPoolBuilder;

fn close(got: geo_types::Coord<f64>, want: (f64, f64), within: f64) {
    assert!((got.x - want.0).abs() <= within && (got.y - want.1).abs() <= within, "{got:?}, published {want:?}");
}

// Ordnance Survey, "A guide to coordinate systems in Great Britain", worked example: 1 deg 43' 4.5177" E,
// 52 deg 39' 27.2531" N is E 651409.903, N 313177.270.
#[test]
fn the_ordnance_survey_example() {
    let grid = MapCrs::parse("EPSG:27700").unwrap();
    let got = placed(&grid, "EPSG:4277", dms(1.0, 43.0, 4.5177), dms(52.0, 39.0, 27.2531));
    close(got, (651_409.903, 313_177.270), 0.0011);
}

// Geocentric Datum of Australia Technical Manual: Flinders Peak, MGA zone 55.
#[test]
fn flinders_peak() {
    let grid = MapCrs::parse("EPSG:28355").unwrap();
    let got = placed(&grid, "EPSG:4283", dms(144.0, 25.0, 29.52442), -dms(37.0, 57.0, 3.72030));
    close(got, (273_741.297, 5_796_489.777), 0.0011);
}

// Northing-first CRSs of the EPSG registry: New Zealand TM (2193), Gauss-Krueger zone 3 (31467), SWEREF 99 TM
// (3006). The places of false eastings and central meridians are in the registry: on the central meridian the
// easting is the false easting, and at the equator the northing is the false northing.
#[test]
fn northing_first_crss_come_out_easting_first() {
    for (code, base, meridian, easting, false_northing) in [
        ("EPSG:2193", "EPSG:4167", 173.0, 1_600_000.0, 10_000_000.0),
        ("EPSG:31467", "EPSG:4314", 9.0, 3_500_000.0, 0.0),
        ("EPSG:3006", "EPSG:4619", 15.0, 500_000.0, 0.0),
    ] {
        let grid = MapCrs::parse(code).unwrap();
        close(placed(&grid, base, meridian, 0.0), (easting, false_northing), 1e-6);
        let north = grid.local_north(placed(&grid, base, meridian + 1.0, 50.0)).unwrap();
        // East of the meridian in the north, grid north lies east of true north.
        assert!(north.convergence() > 0.7 && north.convergence() < 0.8, "{code} {}", north.convergence());
        close(north.longitude_latitude(), (meridian + 1.0, 50.0), 1e-9);
    }
}

#[test]
fn one_crs_leaves_every_bit_alone() {
    for code in ["EPSG:4326", "EPSG:2193"] {
        let crs = MapCrs::parse(code).unwrap();
        let given = vec![at(12.345678901234567, 54.32109876543211), at(-0.0, 1e-300)];
        let mut coords = given.clone();
        assert!(Transformer::new(&crs, &crs).unwrap().coords(&mut coords).is_empty());
        assert_eq!(coords, given);
    }
}

#[test]
fn there_and_back_for_many_on_any_number_of_threads() {
    let (wgs, utm) = (MapCrs::parse("EPSG:4326").unwrap(), MapCrs::parse("EPSG:32633").unwrap());
    let given: Vec<_> = (0..50_000).map(|i| at(12.0 + 6.0 * f64::from(i % 997) / 997.0, f64::from(i % 83))).collect();
    let there = Transformer::new(&wgs, &utm).unwrap();
    let run = |threads| {
        let mut coords = given.clone();
        let pool = ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        assert!(pool.install(|| there.coords(&mut coords)).is_empty());
        coords
    };
    let alone = run(1);
    assert_eq!(alone, run(2));
    assert_eq!(alone, run(5));
    let mut back = alone;
    assert!(Transformer::new(&utm, &wgs).unwrap().coords(&mut back).is_empty());
    for (b, g) in back.iter().zip(&given) {
        close(*b, (g.x, g.y), 1e-9);
    }
}

#[test]
fn what_has_no_place_is_named() {
    let (wgs, utm) = (MapCrs::parse("EPSG:4326").unwrap(), MapCrs::parse("EPSG:32633").unwrap());
    let good = at(15.0, 50.0);
    let mut coords =
        vec![good, at(15.0, 95.0), good, at(f64::NAN, 1.0), at(500_000.0, 5_000_000.0), at(105.0, 0.0), good];
    assert_eq!(Transformer::new(&wgs, &utm).unwrap().coords(&mut coords), [1, 3, 4, 5]);
    close(coords[6], (500_000.0, coords[0].y), 1e-6);
    assert!(coords[1].x.is_nan() && coords[1].y.is_nan());
    // A latitude beyond the pole is wrong even where nothing is to be transformed.
    assert_eq!(Transformer::new(&wgs, &wgs).unwrap().coords(&mut [at(15.0, 95.0)]), [0]);
}

#[test]
fn geometries_go_vertex_by_vertex() {
    let (wgs, utm) = (MapCrs::parse("EPSG:4326").unwrap(), MapCrs::parse("EPSG:32633").unwrap());
    let transformer = Transformer::new(&wgs, &utm).unwrap();
    let ring = |a: f64, b: f64| LineString::from(vec![(a, a + 30.0), (b, a + 30.0), (b, b + 30.0), (a, a + 30.0)]);
    let shape = Polygon::new(ring(14.0, 16.0), vec![ring(15.0, 15.5)]);
    let mut geometry = Geometry::Polygon(shape.clone());
    assert_eq!(transformer.geometry(&mut geometry), 0);
    let Geometry::Polygon(got) = &geometry else { panic!("still a polygon") };
    for (ring, original) in [(got.exterior(), shape.exterior()), (&got.interiors()[0], &shape.interiors()[0])] {
        assert_eq!(ring.0.len(), original.0.len());
        for (c, o) in ring.0.iter().zip(&original.0) {
            assert_eq!(*c, placed(&utm, "EPSG:4326", o.x, o.y));
        }
    }
    let mut bad = Geometry::LineString(LineString::from(vec![(15.0, 50.0), (15.0, 99.0)]));
    assert_eq!(transformer.geometry(&mut bad), 1);
    let mut rect = Geometry::Rect(Rect::new(coord! { x: 14.0, y: 50.0 }, coord! { x: 16.0, y: 51.0 }));
    assert_eq!(transformer.geometry(&mut rect), 0);
    assert!(matches!(rect, Geometry::Polygon(_)));
}

// From Earth to the Moon there is no way.
#[test]
fn no_way_is_an_error() {
    let earth = MapCrs::parse("EPSG:4326").unwrap();
    let moon = MapCrs::parse("IAU_2015:30100").unwrap();
    let error = Transformer::new(&earth, &moon).unwrap_err();
    assert!(error.to_string().contains("no transformation") && error.hint().is_some(), "{error}");
}
