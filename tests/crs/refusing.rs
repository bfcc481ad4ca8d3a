//! Rows that cannot be placed, sources that are wrong as a whole, and positions that look odd.

use crate::support::{at, bedding};
use geo_types::Coord;
use homocline::crs::{CrsError, MapCrs, orient};
use homocline::notice::{Severity, Silent};
use homocline::station::{Declination, North};

fn utm() -> MapCrs {
    MapCrs::parse("EPSG:32633").unwrap()
}

/// Places in Bohemia, a little apart.
fn around(n: usize) -> Vec<Coord<f64>> {
    (0..n).map(|i| at(14.0 + 0.01 * i as f64, 50.0 + 0.01 * i as f64)).collect()
}

fn exchanged(places: Vec<Coord<f64>>) -> Vec<Coord<f64>> {
    places.into_iter().map(|c| at(c.y, c.x)).collect()
}

#[test]
fn a_row_without_a_place_is_refused_with_its_coordinates() {
    let mut places = around(5);
    places[1] = at(50.5, 114.5);
    places[3] = at(458_000.25, 5_540_000.5);
    let oriented = orient(vec![bedding("EPSG:4326", North::True, places)], &utm(), &Silent).unwrap();
    assert_eq!(oriented.readings.source_row, [2, 4, 6]);
    let [swapped, projected] = oriented.refusals.as_slice() else { panic!("{:?}", oriented.refusals) };
    assert_eq!((swapped.row, swapped.code), (3, "position-not-projectable"));
    assert_eq!(swapped.value.as_deref(), Some("50.5, 114.5"));
    assert!(swapped.reason.contains("x 50.5, y 114.5") && swapped.reason.contains("exchanged"), "{}", swapped.reason);
    assert_eq!((projected.row, projected.code), (5, "position-not-projectable"));
    assert!(projected.reason.contains("look projected"), "{}", projected.reason);
}

#[test]
fn a_row_without_declination_is_refused() {
    let mut dated = bedding("EPSG:4326", North::Magnetic(Declination::Model), around(4));
    dated.year = vec![2024.5, f64::NAN, 1850.0, 2030.0];
    let mut given = bedding("EPSG:4326", North::Magnetic(Declination::PerReading), around(3));
    given.declination = vec![f64::NAN, 200.0, 4.0];
    let oriented = orient(vec![dated, given], &utm(), &Silent).unwrap();
    let refused: Vec<_> = oriented.refusals.iter().map(|r| (r.row, r.code)).collect();
    assert_eq!(
        refused,
        [
            (3, "no-date"),
            (4, "no-declination-model"),
            (5, "no-declination-model"),
            (2, "no-declination"),
            (3, "declination-out-of-range")
        ]
    );
    assert!(oriented.refusals[1].reason.contains("1850") && oriented.refusals[1].reason.contains("1900 to 2029"));
    assert_eq!(oriented.readings.len(), 2);
}

#[test]
fn references_that_a_source_cannot_have_stop_the_job() {
    let fail = |crs: &str, north| orient(vec![bedding(crs, north, around(1))], &utm(), &Silent).unwrap_err();
    let error = fail("EPSG:4326", North::Grid);
    assert!(matches!(&error, CrsError::InSource { cause, .. } if matches!(**cause, CrsError::NoGrid { .. })));
    assert!(error.to_string().starts_with("stations.csv: ") && error.hint().unwrap().contains("true"));
    for declination in [f64::NAN, 181.0, f64::NEG_INFINITY] {
        let error = fail("EPSG:4326", North::Magnetic(Declination::Constant(declination)));
        assert!(error.to_string().contains("declination"), "{error}");
    }
    assert!(fail("", North::True).to_string().contains("no coordinate reference system"));
    assert!(fail("EPSG:4326", North::Magnetic(Declination::Model)).to_string().contains("0 dates"));
    assert!(fail("EPSG:2053", North::Grid).to_string().contains("west and south"));
    let reversed = MapCrs::parse("EPSG:2053").unwrap();
    let error = orient(vec![], &reversed, &Silent).unwrap_err();
    assert!(error.hint().unwrap().contains("UTM"));
}

#[test]
fn latitude_before_longitude_stops_the_job() {
    let source = bedding("EPSG:4326", North::True, exchanged(around(10)));
    let error = orient(vec![source], &utm(), &Silent).unwrap_err();
    let message = error.to_string();
    assert!(message.starts_with("stations.csv: 10 of 10") && message.contains("latitude, longitude"), "{message}");
    assert!(message.contains("50 and 14 (row 2)"), "{message}");
    assert!(error.hint().unwrap().contains("exchange"));
}

#[test]
fn northing_before_easting_stops_the_job() {
    let places: Vec<_> = (0..10).map(|i| at(5_540_000.0 + f64::from(i), 458_000.0)).collect();
    // Also where the map's own area is the whole world.
    for map in ["EPSG:32633", "EPSG:4326", "EPSG:3857"] {
        let source = bedding("EPSG:32633", North::True, places.clone());
        let error = orient(vec![source], &MapCrs::parse(map).unwrap(), &Silent).unwrap_err();
        assert!(error.to_string().contains("northing, easting"), "{map}: {error}");
    }
}

#[test]
fn few_exchanged_rows_do_not_stop_the_job() {
    let mut places = around(10);
    places[4] = at(50.0, 14.0);
    let oriented = orient(vec![bedding("EPSG:4326", North::True, places)], &utm(), &Silent).unwrap();
    assert_eq!(oriented.readings.len(), 10);
    let notice = &oriented.notices[0];
    assert_eq!((notice.code, notice.severity, notice.place.row), ("outside-area-of-use", Severity::Warning, Some(6)));
}

// One degree of latitude is about 111 km (60 nautical miles of 1.852 km).
#[test]
fn outside_the_area_of_use_is_said_once_per_source() {
    let mut places = around(6);
    places[2] = at(15.0, -1.0);
    places[5] = at(15.0, -0.5);
    let sources = vec![bedding("EPSG:4326", North::True, places), bedding("EPSG:4326", North::True, around(2))];
    let oriented = orient(sources, &utm(), &Silent).unwrap();
    assert_eq!(oriented.readings.len(), 8);
    let [notice] = oriented.notices.as_slice() else { panic!("{:?}", oriented.notices) };
    assert_eq!(notice.place.row, Some(4));
    assert!(notice.message.starts_with("2 of 6 readings") && notice.message.contains("111.2 km"), "{}", notice.message);
    assert!(notice.hint.is_some());
}

// A source that lies wholly elsewhere is not taken for an exchanged one when exchanging does not help.
#[test]
fn a_faraway_source_is_warned_about_only() {
    let source = bedding("EPSG:4326", North::True, vec![at(25.0, 60.0); 4]);
    let oriented = orient(vec![source], &utm(), &Silent).unwrap();
    assert_eq!(oriented.readings.len(), 4);
    assert!(oriented.notices.iter().any(|n| n.code == "outside-area-of-use"));
}
