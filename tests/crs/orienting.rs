//! Azimuths to true north and to the grid.

use crate::support::{at, bedding, dms, placed};
use homocline::crs::{MapCrs, orient};
use homocline::notice::{Progress, Severity, Silent};
use homocline::orientation::{Bearing, Dip, Measured};
use homocline::station::{Declination, Kind, Measurements, North, Structure};
use rayon::ThreadPoolBuilder;
use std::sync::atomic::{AtomicU64, Ordering};

fn bearing(degrees: f64) -> Measured {
    Measured::Line { trend: Bearing::new(degrees).unwrap(), plunge: Dip::new(10.0).unwrap() }
}

fn azimuths(oriented: &homocline::crs::Oriented) -> Vec<f64> {
    oriented.readings.attitude.iter().map(|a| a.azimuth().unwrap().degrees()).collect()
}

// Geocentric Datum of Australia Technical Manual: the line from Flinders Peak to Buninyong, azimuth
// 306 deg 52' 05.37", grid bearing 305 deg 17' 01.72".
#[test]
fn a_line_of_the_gda_manual_from_each_north() {
    let map = MapCrs::parse("EPSG:28355").unwrap();
    let (lon, lat) = (dms(144.0, 25.0, 29.52442), -dms(37.0, 57.0, 3.72030));
    let (azimuth, grid) = (dms(306.0, 52.0, 5.37), dms(305.0, 17.0, 1.72));
    let on_grid = placed(&map, "EPSG:4283", lon, lat);
    let constant = North::Magnetic(Declination::Constant(11.5));
    for (crs, north, place, read) in [
        ("EPSG:4283", North::True, at(lon, lat), azimuth),
        ("EPSG:28355", North::Grid, on_grid, grid),
        ("EPSG:28355", constant, on_grid, azimuth - 11.5),
    ] {
        let mut source = bedding(crs, north, vec![place]);
        source.measured = vec![bearing(read)];
        let oriented = orient(vec![source], &map, &Silent).unwrap();
        assert!((azimuths(&oriented)[0] - azimuth).abs() < 3.5e-6, "{crs}");
        assert!((oriented.readings.grid_azimuth[0].unwrap().degrees() - grid).abs() < 3.5e-6, "{crs}");
    }
}

// The grid that counts is the source's own: Buninyong lies in two zones, whose grid norths differ by
// 1 deg 52' 43.22" + 1 deg 47' 19.36" there (the same manual).
#[test]
fn grid_north_is_that_of_the_source() {
    let (map, zone_54) = (MapCrs::parse("EPSG:28355").unwrap(), MapCrs::parse("EPSG:28354").unwrap());
    let place = placed(&zone_54, "EPSG:4283", dms(143.0, 55.0, 35.38393), -dms(37.0, 39.0, 10.15611));
    let mut source = bedding("EPSG:28354", North::Grid, vec![place]);
    source.measured = vec![bearing(100.0)];
    let oriented = orient(vec![source], &map, &Silent).unwrap();
    let (west, east) = (dms(1.0, 47.0, 19.36), dms(1.0, 52.0, 43.22));
    assert!((azimuths(&oriented)[0] - (100.0 - west)).abs() < 3e-6);
    assert!((oriented.readings.grid_azimuth[0].unwrap().degrees() - (100.0 - west - east)).abs() < 6e-6);
    assert!((oriented.readings.convergence[0] - east).abs() < 3e-6);
    assert!(oriented.readings.declination[0].is_nan());
    assert!(oriented.notices.iter().any(|n| n.code == "convergence-added" && n.severity == Severity::Info));
}

#[test]
fn declinations_per_reading_are_added() {
    let map = MapCrs::parse("EPSG:32633").unwrap();
    let mut source = bedding("EPSG:4326", North::Magnetic(Declination::PerReading), vec![at(15.0, 50.0); 3]);
    source.measured = vec![bearing(350.0), bearing(5.0), bearing(0.0)];
    source.declination = vec![12.5, -10.0, 0.0];
    let oriented = orient(vec![source], &map, &Silent).unwrap();
    assert_eq!(azimuths(&oriented), [2.5, 355.0, 0.0]);
    assert_eq!(oriented.readings.declination, [12.5, -10.0, 0.0]);
}

// NOAA/BGS, World Magnetic Model 2025, published test values: latitude 80, longitude 0, height 0: 1.28 degrees in
// 2025.0; latitude 0, longitude 120: -0.16. BGS calculator, IGRF-14: -0.342 at latitude 30, longitude -90 in 2013.0.
#[test]
fn declinations_from_the_model_are_added() {
    let map = MapCrs::parse("EPSG:4326").unwrap();
    let places = vec![at(0.0, 80.0), at(120.0, 0.0), at(-90.0, 30.0)];
    let mut source = bedding("EPSG:4326", North::Magnetic(Declination::Model), places);
    source.measured = vec![bearing(100.0); 3];
    source.year = vec![2025.0, 2025.0, 2013.0];
    let oriented = orient(vec![source], &map, &Silent).unwrap();
    for (got, want) in azimuths(&oriented).iter().zip([101.28, 99.84, 99.658]) {
        assert!((got - want).abs() < 0.0051, "{got} {want}");
    }
    let notice = oriented.notices.iter().find(|n| n.code == "declination-from-model").unwrap();
    assert!(notice.message.contains("IGRF-13 and WMM2025: -0.34 to 1.28"), "{}", notice.message);
}

// WMM2025 Technical Report, section 1.8: below 6000 nT of horizontal field compasses want caution. The north
// magnetic pole of the model is near 86 N, 139 E in 2025.
#[test]
fn near_a_magnetic_pole_the_compass_is_doubted() {
    let map = MapCrs::parse("EPSG:32661").unwrap();
    let mut source = bedding("EPSG:4326", North::Magnetic(Declination::Model), vec![at(139.0, 85.0)]);
    source.year = vec![2025.5];
    let oriented = orient(vec![source], &map, &Silent).unwrap();
    assert!(oriented.notices.iter().any(|n| n.code == "compass-unreliable" && n.place.row == Some(2)));
}

#[test]
fn horizontal_planes_need_no_north() {
    let flat = Measured::Plane { strike: None, dip: Dip::new(0.0).unwrap() };
    let map = MapCrs::parse("EPSG:32633").unwrap();
    let mut dated = bedding("EPSG:4326", North::Magnetic(Declination::Model), vec![at(16.0, 50.0)]);
    (dated.measured, dated.year) = (vec![flat], vec![f64::NAN]);
    let mut constant = bedding("EPSG:4326", North::Magnetic(Declination::Constant(3.0)), vec![at(16.0, 50.0)]);
    constant.measured = vec![flat];
    let oriented = orient(vec![dated, constant], &map, &Silent).unwrap();
    assert!(oriented.refusals.is_empty());
    let r = oriented.readings;
    assert_eq!(r.len(), 2);
    assert!(r.grid_azimuth.iter().all(Option::is_none) && r.attitude.iter().all(|a| a.azimuth().is_none()));
    assert!(r.declination[0].is_nan() && r.declination[1] == 3.0);
    assert!(r.convergence.iter().all(|c| (c - 0.766).abs() < 0.001), "sin 50 = 0.766 per degree (spherical rule)");
}

fn mixed(n: usize) -> Vec<Measurements> {
    let places = (0..n).map(|i| at(12.0 + 6.0 * ((i * 7919) % 1009) as f64 / 1009.0, 40.0 + (i % 20) as f64)).collect();
    let mut first = bedding("EPSG:4326", North::Magnetic(Declination::Model), places);
    first.year = (0..n).map(|i| if i % 101 == 0 { f64::NAN } else { 1990.0 + (i % 40) as f64 }).collect();
    first.measured = (0..n).map(|i| bearing((i % 360) as f64)).collect();
    first.structures = ["vein", "bedding"].map(|s| Structure { name: s.to_owned(), kind: Kind::Planar }).to_vec();
    first.structure = (0..n).map(|i| (i % 2) as u16).collect();
    let mut second = bedding("EPSG:32633", North::Grid, vec![at(500_000.0, 5_000_000.0); 5]);
    second.source = "other.gpkg".to_owned();
    second.structures = ["joint", "bedding"].map(|s| Structure { name: s.to_owned(), kind: Kind::Planar }).to_vec();
    vec![first, second]
}

#[test]
fn order_is_kept_on_any_number_of_threads() {
    let map = MapCrs::parse("EPSG:32633").unwrap();
    let n = 20_000;
    let run = |threads| {
        let pool = ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        pool.install(|| orient(mixed(n), &map, &Silent)).unwrap()
    };
    let (one, many) = (run(1), run(4));
    assert_eq!(one.refusals, many.refusals);
    assert_eq!(one.notices, many.notices);
    assert_eq!(format!("{:?}", one.readings), format!("{:?}", many.readings));

    let r = &one.readings;
    assert_eq!(r.len() + one.refusals.len(), n + 5);
    assert_eq!(r.sources, ["stations.csv", "other.gpkg"]);
    let names: Vec<_> = r.structures.iter().map(|s| s.name.as_str()).collect();
    assert_eq!(names, ["bedding", "joint", "vein"]);
    for i in 0..r.len() {
        let row = r.table_row[i] as usize;
        assert_eq!(r.station_id.get(i), Some(format!("S{row}").as_str()));
        assert_eq!(r.source_row[i], row as u64 + 2);
        let name = names[usize::from(r.structure[i])];
        let want = if r.source[i] == 1 { "joint" } else { ["vein", "bedding"][row % 2] };
        assert_eq!(name, want, "row {row}");
    }
    assert!(r.source_row[..r.len() - 5].is_sorted() && one.refusals.iter().all(|f| f.code == "no-date"));
}

// Datum shifts of the EPSG registry: ED50 to WGS 84 has some, good to metres; the datum of a PROJ string that
// names an ellipsoid alone has none.
#[test]
fn a_rough_datum_shift_is_said() {
    let map = MapCrs::parse("EPSG:32633").unwrap();
    let notices = |crs: &str| {
        let source = bedding(crs, North::True, vec![at(f64::NAN, 0.0), at(500_000.0, 5_000_000.0)]);
        orient(vec![source], &map, &Silent).unwrap().notices
    };
    let [shift] = &notices("EPSG:23033")[..] else { panic!("{:?}", notices("EPSG:23033")) };
    assert_eq!((shift.code, shift.severity), ("datum-shift", Severity::Info));
    assert!(shift.message.contains("ED50 to WGS 84"), "{}", shift.message);
    let [unknown] = &notices("+proj=utm +zone=33 +ellps=intl")[..] else { panic!("one notice") };
    assert_eq!((unknown.code, unknown.severity), ("datum-shift-unknown", Severity::Warning));
    assert!(notices("EPSG:32633").is_empty() && notices("EPSG:25833").is_empty());
}

#[derive(Default)]
struct Counted {
    total: AtomicU64,
    done: AtomicU64,
}
impl Progress for Counted {
    fn begin(&self, _stage: &str, total: Option<u64>) {
        self.total.store(total.unwrap(), Ordering::Relaxed);
    }
    fn advance(&self, units: u64) {
        self.done.fetch_add(units, Ordering::Relaxed);
    }
    fn end(&self) {
        assert_eq!(self.done.load(Ordering::Relaxed), self.total.load(Ordering::Relaxed));
    }
}

#[test]
fn progress_adds_up() {
    let heard = Counted::default();
    orient(mixed(9000), &MapCrs::parse("EPSG:32633").unwrap(), &heard).unwrap();
    assert_eq!(heard.total.load(Ordering::Relaxed), 9005);
    assert_eq!(heard.done.load(Ordering::Relaxed), 9005);
}
